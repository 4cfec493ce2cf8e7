//! The rules: one small module a rule, and what holds for all of them.

mod action_not_stated;
mod axial_force_beyond_limit;
mod axial_short;
mod backing_plate_missing;
mod bench;
mod bolt_class_higher;
mod bolt_class_lower;
mod bolt_class_unknown;
mod bolt_count_differs;
mod bolt_larger;
mod bolt_size_unknown;
mod bolt_smaller;
mod bolt_too_short;
mod diagonal_missing;
mod distance_beyond_greatest;
mod edge_distance_short;
mod gauge_differs;
mod grade_unknown;
mod haunch_differs;
mod head_without_room;
mod joint_handed_wrong;
mod joint_not_found;
mod joint_not_paired;
mod joint_not_scheduled;
mod kind_not_assessed;
mod lost_capacity;
mod moment_short;
mod not_credited;
mod plate_grade_lower;
mod plate_grade_unknown;
mod plate_size_differs;
mod plate_thicker;
mod plate_thinner;
mod plate_wider_than_flange;
mod row_missing;
mod row_moved;
mod rows;
mod section_differs;
mod section_unknown;
mod shear_short;
mod stiffener_added;
mod stiffener_in_root;
mod stiffener_missing;
mod stiffness_differs;
mod strengthening_added;
mod tool_without_room;
mod tying_short;
mod web_plate_missing;
mod weld_not_found;
mod weld_short;
mod weld_thinner;
mod witnesses_disagree;

use std::collections::BTreeSet;
use std::path::Path;

use faying::assess::{About, State};
use faying::findings::{RULES, look};
use faying::joints::{EndPlate, Half, Laid, Layout, SpliceLayout, Welds};
use faying::review::Outcome;
use faying::units::{Length, mm};

use bench::Bench;

const HEADINGS: [&str; 5] = ["## What it finds", "## Why it matters", "## Example", "## What to do", "## Source"];

fn folder(path: &str) -> std::path::PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join(path)
}

fn stems(path: &str, extension: &str) -> BTreeSet<String> {
    let files = std::fs::read_dir(folder(path)).expect(path).map(|file| file.expect(path).path());
    let files = files.filter(|file| file.extension().is_some_and(|e| e == extension));
    files.map(|file| file.file_stem().expect(path).to_string_lossy().into_owned()).collect()
}

#[test]
fn ids_are_unique_and_kebab_case() {
    let ids: BTreeSet<&str> = RULES.iter().map(|rule| rule.id).collect();
    assert_eq!(ids.len(), RULES.len());
    for id in ids {
        let words = id.split('-').all(|word| !word.is_empty() && word.chars().all(|c| c.is_ascii_lowercase()));
        assert!(words, "{id}");
    }
}

#[test]
fn every_rule_has_its_page_its_file_and_its_tests_and_no_page_lacks_a_rule() {
    let ids: BTreeSet<String> = RULES.iter().map(|rule| rule.id.into()).collect();
    assert_eq!(stems("rules/findings", "md"), ids);
    for id in &ids {
        let file = id.replace('-', "_");
        assert!(stems("src/findings", "rs").contains(&file), "{id} has no file");
        assert!(stems("tests/findings", "rs").contains(&file), "{id} has no tests");
    }
}

#[test]
fn every_page_has_its_headings_in_order_and_something_under_each() {
    for rule in RULES {
        let id = rule.id;
        let mut lines = rule.page.lines();
        assert_eq!(lines.next(), Some(format!("# {id}").as_str()));
        assert_eq!(lines.next(), Some(""), "{id}");
        assert!(lines.next().is_some_and(|first| first.ends_with('.')), "{id}: first one sentence");
        let headings: Vec<&str> = rule.page.lines().filter(|line| line.starts_with("## ")).collect();
        assert_eq!(headings, HEADINGS, "{id}");
        let parts: Vec<&str> = rule.page.split("\n## ").skip(1).collect();
        assert!(parts.iter().all(|part| part.lines().filter(|line| !line.is_empty()).count() > 1), "{id}: empty part");
        assert!(rule.page.lines().all(|line| line.chars().count() <= 120), "{id}: line too long");
    }
}

#[test]
fn the_joint_as_intended_finds_nothing() {
    let bench = Bench::good();
    let findings = look(&bench.context());
    assert!(findings.is_empty(), "{findings:#?}");
}

#[test]
fn what_deviates_is_a_comment_a_hold_or_unproven_as_the_joint_carries() {
    for (state, severity) in [
        (Some(State::Met), Outcome::Comment),
        (Some(State::NotMet), Outcome::Hold),
        (Some(State::Unproven), Outcome::Unproven),
        (None, Outcome::Unproven),
    ] {
        let mut bench = Bench::good();
        bench.layout().plate.thickness = mm(20.0);
        match state {
            Some(state) => bench.carries(state),
            None => bench.assessment = None,
        }
        assert_eq!(bench.find("plate-thinner")[0].severity, severity, "{state:?}");
    }
}

#[test]
fn an_axial_force_beyond_the_limit_proves_no_shortfall() {
    let mut bench = Bench::good();
    bench.verdict(About::Axial).state = State::NotMet;
    assert_eq!(bench.context().carries(), State::Unproven);
    bench.verdict(About::Shear).state = State::NotMet;
    assert_eq!(bench.context().carries(), State::NotMet);
}

#[test]
fn findings_come_worst_first_and_then_in_the_order_of_the_rules() {
    let mut bench = Bench::good();
    bench.layout().not_credited = vec!["a web plate is not credited".into()];
    bench.layout().plate.thickness = mm(20.0);
    bench.layout().plate.width = mm(170.0);
    bench.layout().bolts.rows.iter_mut().for_each(|row| row.edge_plate = mm(25.0));
    bench.layout().plate.grade = Err(bench::missing("steel grade"));
    let rules: Vec<(Outcome, &str)> = look(&bench.context()).iter().map(|f| (f.severity, f.rule)).collect();
    assert_eq!(
        rules,
        [
            (Outcome::Hold, "edge-distance-short"),
            (Outcome::Unproven, "plate-grade-unknown"),
            (Outcome::Comment, "plate-thinner"),
            (Outcome::Comment, "plate-size-differs"),
            (Outcome::Comment, "not-credited"),
        ]
    );
}

/// Plate and welds of a splice's other half are held against the same intention, and named.
#[test]
fn the_other_half_of_a_splice_is_compared_too() {
    let mut bench = Bench::good();
    let good = bench.layout().clone();
    let half = |thickness: f64, throat: f64, guid: &str| Half {
        beam: good.beam.clone(),
        soffit: Length::ZERO,
        plate: EndPlate { guid: guid.into(), thickness: mm(thickness), ..good.plate.clone() },
        welds: Welds { web: bench::known(mm(throat)), ..good.welds.clone() },
    };
    let throat = good.welds.web.as_ref().unwrap().value.get();
    let supported = half(25.0, throat, "0guidP");
    let mut supporting = half(15.0, throat - 1.0, "0guidQ");
    supporting.plate.width = mm(170.0);
    supporting.plate.grade = Err(bench::missing("steel grade"));
    supporting.welds.flange_top = Err(bench::missing("throat"));
    let mut bolts = good.bolts.clone();
    bolts.rows.iter_mut().for_each(|row| row.edge_column = mm(20.0));
    bench.joint().layout = Ok(Laid::Plates(Box::new(Layout::Splice(SpliceLayout { supported, supporting, bolts }))));
    let rules = ["plate-thinner", "plate-size-differs", "plate-grade-unknown", "weld-thinner", "weld-not-found"];
    for rule in rules {
        let found = bench.find(rule);
        assert_eq!(found.len(), 1, "{rule}: {found:?}");
        assert!(found[0].message.contains("the supporting beam"), "{}", found[0].message);
        assert!(found[0].elements.contains(&"0guidQ".to_owned()), "{rule}: {:?}", found[0].elements);
    }
    assert_eq!(bench.find("edge-distance-short").len(), 1);
    assert_eq!(bench.find("section-differs").len(), 1, "the supporting member is a beam, a column was intended");
}
