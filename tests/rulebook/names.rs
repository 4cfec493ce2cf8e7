//! Spellings of sections, grades and bolt classes. The expected readings are our own decisions.

use faying::rulebook::{Grade, Rulebook};

#[test]
fn section_spellings() {
    let rules = Rulebook::embedded();
    let cases: &[(&str, Option<&str>)] = &[
        ("UKB 457 x 191 x 67", Some("UB 457x191x67")),
        ("UB457x191x67", Some("UB 457x191x67")),
        ("457x191x67UB", Some("UB 457x191x67")),
        ("457 x 191 x 67 UKB", Some("UB 457x191x67")),
        ("457×191×67 UKB", Some("UB 457x191x67")),
        ("UB457*191*67", Some("UB 457x191x67")),
        ("UB 457X191X67", Some("UB 457x191x67")),
        ("457x191x67", Some("UB 457x191x67")),
        ("UB-457x191x67", Some("UB 457x191x67")),
        ("ukb_457x191x67", Some("UB 457x191x67")),
        ("UC 254x254x107", Some("UC 254x254x107")),
        ("254x254x107 UKC", Some("UC 254x254x107")),
        ("HE220B", Some("HE 220 B")),
        ("HE 220 B", Some("HE 220 B")),
        ("HEB 220", Some("HE 220 B")),
        ("HEB220", Some("HE 220 B")),
        ("HE-B 220", Some("HE 220 B")),
        ("he 1000 m", Some("HE 1000 M")),
        ("IPE300", Some("IPE 300")),
        ("IPE 300", Some("IPE 300")),
        ("IPE-80", Some("IPE 80")),
        // inside a longer name
        ("UKB 457x191x67 S355", Some("UB 457x191x67")),
        ("Beam:UKB457x191x67:1234", Some("UB 457x191x67")),
        ("Beam 457x191x67", Some("UB 457x191x67")),
        ("457x191x67 S355", Some("UB 457x191x67")),
        ("column HEB 240, S235JR", Some("HE 240 B")),
        ("IPE 500 (B12)", Some("IPE 500")),
        ("IPE300/IPE300", Some("IPE 300")),
        // two, or none
        ("IPE300/IPE330", None),
        ("HEA 200 + HEB 200", None),
        ("UB 457x191x67 or UB 457x191x68", None),
        ("IPE 300 or IPE 300 A", None),
        ("", None),
        ("IPE", None),
        ("beam", None),
        ("UKB 457x191x68", None),
        ("PL 25x250", None),
        // neighbours in name only: other series and other families have other sizes
        ("IPE 300 A", None),
        ("IPE300O", None),
        ("IPE A 300", None),
        ("IPEA300", None),
        ("IPE 300 R", None),
        ("HE 220 AA", None),
        ("HE 220 C", None),
        ("HE 1000 x 393", None),
        ("HEB 2200", None),
        ("UBP 305x305x97", None),
        ("305x305x97 UBP", None),
        ("RHS 203x102x23", None),
        ("UC 457x191x67", None),
        ("457x191x67 UC", None),
        ("UB 457x191x67 UC", None),
        ("UB 457x191x67 x 8", None),
        ("UB 457x191x67.1", None),
        ("1457x191x67", None),
        ("8x457x191x67", None),
    ];
    for (name, expected) in cases {
        assert_eq!(rules.section(name).map(|s| s.designation.as_str()), *expected, "{name:?}");
    }
}

#[test]
fn every_section_is_found_by_its_own_name() {
    let rules = Rulebook::embedded();
    for section in rules.sections() {
        let name = &section.designation;
        for spelled in [name.clone(), name.replace(' ', ""), format!("Beam:{name} S355:17"), name.to_lowercase()] {
            assert_eq!(rules.section(&spelled).map(|s| &s.designation), Some(name), "{spelled:?}");
        }
    }
}

#[test]
fn grade_spellings() {
    let rules = Rulebook::embedded();
    let cases: &[(&str, Option<&str>)] = &[
        ("S355JR", Some("S355")),
        ("STEEL/S235JR", Some("S235")),
        ("S235JRG2", Some("S235")),
        ("S355JO", Some("S355")),
        ("S355J0", Some("S355")),
        ("S355J2+N", Some("S355")),
        ("S355K2+N", Some("S355")),
        ("S355J2H", Some("S355")),
        ("S355J0W", Some("S355")),
        ("S 235 JR", Some("S235")),
        ("s-275 jr", Some("S275")),
        ("S355", Some("S355")),
        ("Steel S275J2+N", Some("S275")),
        ("EN 10025-2: S460JR", Some("S460")),
        ("S450J0", Some("S450")),
        ("S355 M20", Some("S355")),
        ("S355/S355J2", Some("S355")),
        // own product standards, own strengths
        ("S275N", Some("S275N")),
        ("S275 NL", Some("S275N")),
        ("S355ML", Some("S355M")),
        ("S460QL1", Some("S460Q")),
        ("S355MC", Some("S355MC")),
        ("S690QL", Some("S690Q")),
        // other names of the same steel (from memory, rules/steel.toml)
        ("St52-3", Some("S355")),
        ("ST 37-2", Some("Fe360")),
        ("Fe 510 D", Some("S355")),
        ("1.0577", Some("S355")),
        ("1.0038", Some("S235")),
        ("S235JR (1.0038)", Some("S235")),
        ("St37-2 (S235JR)", Some("S235")),
        // two, or none
        ("S235/S355", None),
        ("S355JR or S275JR", None),
        ("S275 / S275N", None),
        ("St37-2 S355", None),
        ("St37-2 or St52-3", None),
        ("S235, formerly S123", Some("S235")),
        ("steel", None),
        ("Steel", None),
        ("", None),
        ("8.8", None),
        ("10.9", None),
        ("355", None),
        ("S35", None),
        ("S3555", None),
        ("S123", None),
        ("SS355", None),
        ("HS355", None),
        ("C30/37", None),
        ("UKB 457x191x67", None),
    ];
    for (text, expected) in cases {
        assert_eq!(rules.grade(text), expected.map(|e| Grade(e.into())), "{text:?}");
    }
}

#[test]
fn an_old_name_says_that_it_was_read_as_another() {
    let rules = Rulebook::embedded();
    let note = rules.grade_note("St 52-3").unwrap();
    assert!(note.contains("St52-3 read as S355") && note.contains("from memory"), "{note}");
    assert_eq!(rules.grade_note("S355JR"), None);
    assert_eq!(rules.grade_note("steel"), None);
}

#[test]
fn class_spellings() {
    let rules = Rulebook::embedded();
    let cases: &[(&str, Option<&str>)] = &[
        ("8.8", Some("8.8")),
        ("10.9", Some("10.9")),
        ("8,8", Some("8.8")),
        ("M20-8.8", Some("8.8")),
        ("M20 x 60 8.8", Some("8.8")),
        ("M20x60 - 10.9", Some("10.9")),
        ("10.9HV", Some("10.9")),
        ("HV 10.9", Some("10.9")),
        ("Gr8.8", Some("8.8")),
        ("class 4.6", Some("4.6")),
        ("5.6 M16", Some("5.6")),
        ("ISO 4014 M24 8.8.", Some("8.8")),
        ("8.8/8.8", Some("8.8")),
        ("bolt 8.8, nut 8", Some("8.8")),
        ("18.8", None),
        ("8.80", None),
        ("8.8.1", None),
        ("1.8.8", None),
        ("8.8/10.9", None),
        ("10x8.8", None),
        ("4.6 mm", None),
        ("4.6mm", None),
        ("88", None),
        ("8 8", None),
        ("7.7", None),
        ("12.9", None),
        ("", None),
        ("S355", None),
    ];
    for (text, expected) in cases {
        assert_eq!(rules.class_in(text).as_deref(), *expected, "{text:?}");
    }
}

#[test]
fn words() {
    let rules = Rulebook::embedded();
    for (concept, word) in [
        ("mark", "Part Mark"),
        ("mark", "PART_MARK"),
        ("mark", "Repere"),
        ("bolt-diameter", "Nominal-Diameter"),
        ("bolt-diameter", "Diámetro"),
        ("bolt-length", "Länge"),
        ("bolt-length", "Lange"),
        ("bolt-class", "Festigkeitsklasse"),
        ("hole-diameter", "HoleDiameter"),
        ("weld-throat", "a"),
        ("weld-throat", "throat thickness"),
        ("weld-leg", "Leg length"),
        ("weld-length", "Nahtlänge"),
        ("grade", "SteelGrade"),
        ("section", "cross-section"),
        ("thickness", "Blechdicke"),
    ] {
        assert!(rules.means(concept, word), "{word:?} as {concept}");
    }
    for (concept, word) in [
        ("mark", "remark"),
        ("weld-leg", "throat"),
        ("weld-throat", "weld size"),
        ("weld-leg", "weld size"),
        ("bolt-diameter", "hole diameter"),
        ("hole-diameter", "diameter"),
        ("mark", ""),
        ("no such concept", "mark"),
    ] {
        assert!(!rules.means(concept, word), "{word:?} as {concept}");
    }
}

/// A throat read as a leg, or a hole as a bolt, would be a wrong number with a good origin.
#[test]
fn concepts_that_one_part_can_have_share_no_word() {
    let rules = Rulebook::embedded();
    let bolt = ["bolt-diameter", "bolt-length", "bolt-class", "hole-diameter", "mark", "section"];
    let weld = ["weld-throat", "weld-leg", "weld-length", "mark", "grade"];
    let plate = ["thickness", "grade", "section", "mark"];
    for group in [&bolt[..], &weld, &plate] {
        for (i, one) in group.iter().enumerate() {
            assert!(rules.vocabulary(one).next().is_some(), "{one} has words");
            for other in &group[i + 1..] {
                let both: Vec<_> = rules.vocabulary(one).filter(|word| rules.means(other, word)).collect();
                assert!(both.is_empty(), "{one} and {other}: {both:?}");
            }
        }
    }
}

#[test]
fn words_of_a_name() {
    let rules = Rulebook::embedded();
    for (concept, text) in [
        ("anchor", "M24 anchor-bolt galv."),
        ("anchor", "HOLDING DOWN BOLT M30"),
        ("anchor", "Ankerschraube"),
        ("bolt", "Bolt_M20x70"),
        ("bolt", "Śruba M20"),
        ("nut", "Écrou H M20"),
        ("nut", "Hex nut"),
        ("washer", "Unterlegscheibe A21"),
        ("weld", "Schweißnaht 5"),
        ("stud", "Shear stud 19 x 100"),
        ("no-steel", "Béton C25/30"),
        ("stiffener", "Full stiffener"),
    ] {
        assert!(rules.says(concept, text), "{text:?} as {concept}");
    }
    for (concept, text) in
        [("bolt", "bolted plate"), ("nut", "minute"), ("anchor", "bolt"), ("washer", ""), ("no such concept", "bolt")]
    {
        assert!(!rules.says(concept, text), "{text:?} as {concept}");
    }
    assert!(rules.says_only(&["weld", "fillet-weld"], "Fillet weld 12") && !rules.says_only(&["weld"], "weld plate"));
    assert!(!rules.says_only(&["weld"], "12"));
}
