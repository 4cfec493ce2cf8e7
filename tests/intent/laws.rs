//! Laws that hold for every schedule.

use std::collections::{BTreeMap, BTreeSet};

use faying::intent::{Intent, pair, read, read_all};
use proptest::prelude::*;

use super::pairing::{FRAME, steel};

/// Joint, supported, case, M_Ed, V_Ed.
type Row = (u8, Option<u8>, u8, Option<i32>, Option<i32>);

/// Lines of at most 6 joints with different (joint, case); a joint's supported member is the same on each line or blank.
fn rows() -> impl Strategy<Value = Vec<Row>> {
    let row = (any::<bool>(), any::<Option<i32>>(), any::<Option<i32>>());
    proptest::collection::btree_map((0_u8..6, 0_u8..4), row, 1..20).prop_map(|rows| {
        let rows = rows.into_iter();
        rows.map(|((joint, case), (member, m, v))| (joint, member.then_some(joint), case, m, v)).collect()
    })
}

const HEADINGS: [&str; 6] = ["Joint mark", "supported", "case", "M_Ed [kNm]", "V_Ed_kN", "remarks"];

fn csv(rows: &[Row], columns: &[usize], separator: char, comma: bool) -> String {
    let number = |value: Option<i32>| {
        let text = value.map_or(String::new(), |v| format!("{}", f64::from(v) / 8.0));
        if comma { text.replace('.', ",") } else { text }
    };
    let mut text = columns.iter().map(|c| HEADINGS[*c].to_owned()).collect::<Vec<_>>().join(&separator.to_string());
    for (joint, member, case, m, v) in rows {
        let cells = [
            format!("J{joint}"),
            member.map_or(String::new(), |member| format!("B{member}")),
            format!("ULS {case}"),
            number(*m),
            number(*v),
            "\"a remark, with; everything\"".into(),
        ];
        text.push('\n');
        text += &columns.iter().map(|c| cells[*c].clone()).collect::<Vec<_>>().join(&separator.to_string());
    }
    text
}

type Case = (Option<f64>, Option<f64>);

/// A joint's supported member and its cases by name.
type Said = (Option<String>, Vec<(String, Case)>);

/// What a schedule says by joint, without order and places.
fn said(intent: &Intent) -> BTreeMap<String, Said> {
    let joint = |joint: &faying::intent::ScheduledJoint| {
        let mut cases: Vec<(String, Case)> = joint
            .cases
            .iter()
            .map(|case| (case.name.clone(), (case.moment.map(|m| m.knm()), case.shear.map(|v| v.kn()))))
            .collect();
        cases.sort_by(|a, b| a.0.cmp(&b.0));
        (joint.mark.clone().unwrap(), (joint.supported.clone(), cases))
    };
    intent.joints.iter().map(joint).collect()
}

proptest! {
    #[test]
    fn the_order_of_columns_and_lines_and_the_separator_do_not_matter(
        (rows, shuffled) in rows().prop_flat_map(|rows| (Just(rows.clone()), Just(rows).prop_shuffle())),
        columns in Just(vec![0, 1, 2, 3, 4, 5]).prop_shuffle(),
        (separator, comma) in prop_oneof![
            Just((',', false)), Just((';', false)), Just((';', true)), Just(('\t', true))
        ],
    ) {
        let plain = read_all(&[("a.csv", csv(&rows, &[0, 1, 2, 3, 4, 5], ',', false).as_bytes())]).unwrap();
        let other = read_all(&[("b.csv", csv(&shuffled, &columns, separator, comma).as_bytes())]).unwrap();
        prop_assert_eq!(said(&plain), said(&other));
        // And it is what was written: eighths are exact in binary.
        let cases = |intent: &Intent| intent.joints.iter().map(|j| j.cases.len()).sum::<usize>();
        prop_assert_eq!(cases(&plain), rows.len());
        for (joint, _, case, m, v) in &rows {
            let found = &said(&plain)[&format!("J{joint}")];
            let (_, (moment, shear)) = found.1.iter().find(|(name, _)| *name == format!("ULS {case}")).unwrap();
            let close = |a: Option<f64>, b: Option<i32>| match (a, b) {
                (Some(a), Some(b)) => (a - f64::from(b) / 8.0).abs() <= f64::from(b).abs() * 1e-15,
                (None, None) => true,
                _ => false,
            };
            prop_assert!(close(*moment, *m) && close(*shear, *v), "{:?} {:?}", moment, m);
        }
    }

    #[test]
    fn no_text_makes_the_reader_panic(bytes in proptest::collection::vec(any::<u8>(), 0..200)) {
        for file in ["s.csv", "s.toml", "s"] {
            let _ = read(&bytes, file);
        }
    }

    #[test]
    fn no_words_in_the_wrong_place_make_the_reader_panic(
        words in proptest::collection::vec(
            proptest::sample::select(vec![
                "joint", "M_Ed_kNm", "é", "\"", ",", ";", "\t", "\n", "\r\n", "J1", "1,5", "-1e999", "[[", "]]", "[", "]",
                "joint.case", "detail.M3", "=", "{", "}", "bolts", "rows_mm", "'none'", "top", "stiffeners", "\u{feff}",
            ]),
            0..60,
        ),
    ) {
        let text = words.concat();
        for file in ["s.csv", "s.toml"] {
            if let Err(error) = read_all(&[(file, text.as_bytes())]) {
                for fault in error.faults() {
                    let line = text.replace("\r\n", "\n");
                    let line = line.strip_prefix('\u{feff}').unwrap_or(&line).split('\n').nth(fault.at.line as usize - 1);
                    prop_assert!(line.is_some_and(|line| fault.at.column as usize <= line.chars().count() + 1));
                }
            }
        }
    }

    /// The order of the lines and of the joints changes nothing.
    #[test]
    fn pairing_does_not_depend_on_order(
        lines in proptest::collection::btree_set(
            (
                proptest::sample::select(vec!["", "B1/C1", "B9/C8", "J5a", "J77"]),
                proptest::sample::select(vec!["", "C1", "gC2", "C8", "C5", "B1"]),
                proptest::sample::select(vec!["B1", "gB1", "B9", "gB9'", "B5", "C1"]),
                proptest::sample::select(vec!["", "start", "end"]),
            ),
            1..8,
        ),
        order in Just((0..FRAME.1.len()).collect::<Vec<usize>>()).prop_shuffle(),
    ) {
        let forward: Vec<_> = lines.iter().map(|(a, b, c, d)| format!("{a},{b},{c},{d}\n")).collect();
        let heading = "joint,supporting,supported,end\n";
        // Lines of one joint mark that disagree are no schedule.
        let Ok(one) = read(format!("{heading}{}", forward.concat()).as_bytes(), "s.csv") else { return Ok(()) };
        let backward: String = forward.iter().rev().cloned().collect();
        let two = read(format!("{heading}{backward}").as_bytes(), "s.csv").unwrap();
        let shuffled: Vec<_> = order.iter().map(|i| FRAME.1[*i]).collect();

        let outcome = |intent: &Intent, met: &[super::pairing::Met<'_>]| {
            let (joints, steelwork) = steel(FRAME.0, met);
            let pairing = pair(intent, &joints, &steelwork);
            let name = |index: usize| {
                let joint = &intent.joints[index];
                format!("{:?} {:?} {:?} {:?}", joint.mark, joint.supporting, joint.supported, joint.end)
            };
            let paired: BTreeSet<(String, String)> = pairing
                .scheduled
                .iter()
                .enumerate()
                .filter_map(|(joint, line)| Some((format!("{:?}", met[joint]), name((*line)?))))
                .collect();
            let names = |list: &[usize]| list.iter().map(|i| name(*i)).collect::<BTreeSet<_>>();
            // Every scheduled joint is in one list.
            assert_eq!(paired.len() + pairing.not_found.len() + pairing.unclear.len(), intent.joints.len());
            (paired, names(&pairing.not_found), names(&pairing.unclear), pairing.problems)
        };
        let (a, b, c) = (outcome(&one, FRAME.1), outcome(&one, &shuffled), outcome(&two, FRAME.1));
        prop_assert_eq!(&a, &b);
        prop_assert_eq!((a.0, a.1, a.2), (c.0, c.1, c.2));
    }
}
