//! A rule folder of the user's own: what it may change, and what it is told when it is wrong.

use faying::rulebook::{ModeOne, RowForces, Rulebook};
use faying::units::mm;
use miette::Diagnostic;

const BOLTS: &str = include_str!("../../rules/bolts.toml");
const DETAILING: &str = include_str!("../../rules/detailing.toml");
const RECOMMENDED: &str = include_str!("../../rules/annexes/recommended.toml");
const STEEL: &str = include_str!("../../rules/steel.toml");
const TOLERANCES: &str = include_str!("../../rules/tolerances.toml");
const UC: &str = include_str!("../../rules/sections/uc.csv");
const VOCABULARY: &str = include_str!("../../rules/vocabulary.toml");
const WELDS: &str = include_str!("../../rules/welds.toml");

/// The text with one place changed.
fn with(text: &str, old: &str, new: &str) -> String {
    assert!(text.contains(old), "{old:?} is not in the file");
    text.replacen(old, new, 1)
}

#[test]
fn the_embedded_files_are_valid_and_are_what_no_overrides_give() {
    let none = Rulebook::with_overrides::<&str, &str>(&[]).unwrap();
    assert_eq!(format!("{none:?}"), format!("{:?}", Rulebook::embedded()));
}

#[test]
fn the_embedded_settings() {
    let settings = Rulebook::embedded().settings;
    assert_eq!(settings.row_forces, RowForces::LinearBeyond19);
    assert_eq!(settings.mode_one, ModeOne::Method1);
    assert!(settings.strength_by_flange && !settings.shear_with_full_tension && settings.thread_in_shear_plane);
    assert_eq!((settings.alpha_max, settings.shear_only_below), (8.0, 0.5));
    assert_eq!((settings.axial_limit, settings.k_wc), (0.05, 1.0));
}

#[test]
fn words_of_ones_own_come_beside_the_embedded_ones() {
    let own = "hole-diameter = [\"Bore Ø\"]\nbolt = [\"Zugstift\"]\n";
    let rules = Rulebook::with_overrides(&[("vocabulary.toml", own)]).unwrap();
    assert!(rules.means("hole-diameter", "bore-ø") && rules.says("bolt", "M20 zugstift verzinkt"));
    assert!(
        rules.means("hole-diameter", "Lochdurchmesser") && rules.says("bolt", "Bolt M20"),
        "the embedded words stay"
    );
    assert!(rules.means("mark", "part mark"));
    assert!(!Rulebook::embedded().says("bolt", "zugstift"));
}

#[test]
fn single_files_can_be_changed() {
    let detailing = with(DETAILING, "\"by-annex\"\n", "\"thin-plate-or-linear\"\n");
    let detailing = with(&detailing, "\"method-1\"\n", "\"method-2\"\n");
    let detailing = with(&detailing, "annex = \"recommended\"", "annex = \"own\"");
    let annex = with(RECOMMENDED, "value = 1.25", "value = 1.30");
    let tolerances = with(TOLERANCES, "position = 2.0", "position = 3.0");
    let sections = "designation,h,b,t_w,t_f,r,A,W_el_y,W_pl_y,A_v_z,source\nXY 9,300,150,7,11,15,,,,,own drawing\n";
    let rules = Rulebook::with_overrides(&[
        ("detailing.toml", detailing.as_str()),
        ("annexes/own.toml", &annex),
        ("tolerances.toml", &tolerances),
        ("sections/own.csv", sections),
    ])
    .unwrap();
    assert_eq!(rules.settings.row_forces, RowForces::ThinPlateOrLinear);
    assert_eq!(rules.settings.mode_one, ModeOne::Method2);
    assert_eq!(rules.annex.gamma_m2, 1.30);
    assert_eq!(rules.tolerances.position, mm(3.0));
    assert_eq!(rules.section("xy-9").unwrap().b, mm(150.0));
    assert_eq!(rules.section_source("XY 9"), Some("own drawing"));
    assert!(rules.section("HEB 300").is_some(), "the other files stay");
}

/// What is wrong, which words the message holds, and which text the span covers (`None`: no place is told).
#[test]
fn every_error_says_what_was_given_and_what_is_allowed() {
    let cases: &[(&str, String, &str, Option<&str>)] = &[
        // names of files
        ("nonsense.toml", String::new(), "no such rule file; allowed is bolts.toml, detailing.toml", None),
        ("annexes/deeper/x.toml", String::new(), "no such rule file", None),
        ("annexes/.toml", String::new(), "no such rule file", None),
        ("sections/x.toml", String::new(), "no such rule file", None),
        // syntax and keys
        ("tolerances.toml", "position = ".into(), "", Some("")),
        ("tolerances.toml", with(TOLERANCES, "angle =", "angel ="), "unknown field `angel`", Some("angel")),
        ("tolerances.toml", with(TOLERANCES, "angle = 1.0\n", ""), "missing field `angle`", None),
        ("tolerances.toml", with(TOLERANCES, "angle = 1.0", "angle = \"1\""), "expected f64", Some("\"1\"")),
        // ranges
        (
            "tolerances.toml",
            with(TOLERANCES, "position = 2.0", "position = -2.0"),
            "position = -2; allowed is 0.01 to 20",
            Some("-2.0"),
        ),
        (
            "tolerances.toml",
            with(TOLERANCES, "position = 2.0", "position = nan"),
            "position = NaN; allowed is",
            Some("nan"),
        ),
        ("tolerances.toml", with(TOLERANCES, "touch = 2.0", "touch = inf"), "touch = inf; allowed is", Some("inf")),
        (
            "tolerances.toml",
            with(TOLERANCES, "utilisation = 0.0", "utilisation = 0.2"),
            "utilisation = 0.2; allowed is 0 to 0.05",
            Some("0.2"),
        ),
        (
            "annexes/recommended.toml",
            with(RECOMMENDED, "value = 1.25", "value = 0.90"),
            "gamma_M2 = 0.9; allowed is 1 to 2",
            Some("0.90"),
        ),
        (
            "annexes/recommended.toml",
            with(RECOMMENDED, "value = 1.00", "value = 10.0"),
            "gamma_M0 = 10; allowed is 1 to 2",
            Some("10.0"),
        ),
        (
            "annexes/recommended.toml",
            with(RECOMMENDED, "\"EN 1993-1-8:2005 Table 2.1, recommended value\"", "\" \""),
            "source is empty",
            Some("\" \""),
        ),
        (
            "annexes/recommended.toml",
            with(RECOMMENDED, "[gamma_M2]", "[gamma_M9]"),
            "unknown field `gamma_M9`",
            Some("gamma_M9"),
        ),
        // detailing
        (
            "detailing.toml",
            with(DETAILING, "annex = \"recommended\"", "annex = \"zz\""),
            "annex = \"zz\"; allowed is \"de\", \"es\", \"fr\", \"it\", \"nl\", \"recommended\", \"uk\"",
            Some("\"zz\""),
        ),
        (
            "detailing.toml",
            with(DETAILING, "mode_one = \"method-1\"", "mode_one = \"three\""),
            "unknown variant `three`, expected `method-1` or `method-2`",
            Some("\"three\""),
        ),
        (
            "detailing.toml",
            with(DETAILING, "alpha_max = 8.0", "alpha_max = 9"),
            "alpha_max = 9; allowed is 4.45 to 8",
            Some("9"),
        ),
        ("detailing.toml", with(DETAILING, "k_wc = 1.0", "k_wc = 1.1"), "k_wc = 1.1; allowed is 0.7 to 1", Some("1.1")),
        (
            "detailing.toml",
            with(DETAILING, "axial_limit = 0.05", "axial_limit = 0.06"),
            "axial_limit = 0.06; allowed is 0 to 0.05",
            Some("0.06"),
        ),
        (
            "detailing.toml",
            with(DETAILING, "shear_only_below = 0.5", "shear_only_below = -0.5"),
            "shear_only_below = -0.5; allowed is 0 to 1",
            Some("-0.5"),
        ),
        // bolts
        (
            "bolts.toml",
            with(BOLTS, "a_s = 245", "a_s = 345"),
            "a_s = 345; allowed is more than 0 up to 314.15",
            Some("345"),
        ),
        ("bolts.toml", with(BOLTS, "a_s = 245", "a_s = 0"), "a_s = 0; allowed is more than 0", Some("0")),
        ("bolts.toml", with(BOLTS, "\nd = 16", "\nd = 12"), "does not rise", Some("12")),
        ("bolts.toml", with(BOLTS, "\nd = 36", "\nd = 40"), "no clearance goes up to d", Some("40")),
        (
            "bolts.toml",
            with(BOLTS, "across_corners = 32.95", "across_corners = 29"),
            "across_corners = 29; allowed is 30 to",
            Some("29"),
        ),
        ("bolts.toml", with(BOLTS, "name = \"4.8\"", "name = \"4.6\""), "class 4.6 stands twice", Some("\"4.6\"")),
        ("bolts.toml", with(BOLTS, "f_yb = 640", "f_yb = 940"), "f_yb = 940.0 N/mm² is above f_ub", Some("940")),
        (
            "bolts.toml",
            with(BOLTS, "alpha_v = 0.6\n", "alpha_v = 0.8\n"),
            "alpha_v = 0.8; allowed is 0.1 to 0.7",
            Some("0.8"),
        ),
        ("bolts.toml", with(BOLTS, "up_to = 22", "up_to = 14"), "does not rise", Some("14")),
        ("bolts.toml", with(BOLTS, "round = 2", "round = -2"), "round = -2; allowed is 0 to 20", Some("-2")),
        // steel
        (
            "steel.toml",
            with(STEEL, "table = \"EN 10025-2\"", "table = \"EN 1\""),
            "table = \"EN 1\"; allowed is \"EN 10025-2\" or \"EN 1993-1-1:2005 Table 3.1\"",
            Some("\"EN 1\""),
        ),
        ("steel.toml", with(STEEL, "f_y = 235, f_u = 360", "f_y = 435, f_u = 360"), "is above f_u", Some("435")),
        ("steel.toml", with(STEEL, "up_to = 40", "up_to = 4"), "does not rise", Some("4")),
        ("steel.toml", with(STEEL, "up_to = 16", "up_to = 2"), "does not rise", Some("2")),
        ("steel.toml", with(STEEL, "name = \"S275\"", "name = \"S235\""), "S235 stands twice", Some("\"S235\"")),
        ("steel.toml", with(STEEL, "f_u = 360", "f_u = -360"), "f_u = -360; allowed is more than 0", Some("-360")),
        (
            "steel.toml",
            with(STEEL, "[[alias]]\ngrade = \"S275\"", "[[alias]]\ngrade = \"S234\""),
            "S234 is in no table",
            Some("\"S234\""),
        ),
        // welds
        ("welds.toml", with(WELDS, "value = 0.80", "value = 0.70"), "beta_w = 0.7; allowed is 0.8 to 1", Some("0.70")),
        ("welds.toml", with(WELDS, "\"S275\",", "\"S235\","), "S235 stands twice", Some("\"S235\"")),
        (
            "welds.toml",
            with(WELDS, "min_throat = 3.0", "min_throat = 0"),
            "min_throat = 0; allowed is more than 0",
            Some("0"),
        ),
        // vocabulary
        (
            "vocabulary.toml",
            with(VOCABULARY, "weld-leg = [", "weld-lag = ["),
            "\"weld-lag\" is no concept; allowed is mark,",
            Some("weld-lag"),
        ),
        ("vocabulary.toml", with(VOCABULARY, "\"d0\",", "\"-\","), "a word without letters or digits", Some("\"-\"")),
        // sections
        (
            "sections/uc.csv",
            with(UC, ",152.4,152.2,5.8,", ",152.4,152.2,8.5,"),
            "UC 152x152x23: A = 29.2, but the sizes give",
            Some("UC 152x152x23,152.4,152.2,8.5"),
        ),
        (
            "sections/uc.csv",
            with(UC, ",152.4,152.2,5.8,", ",152.4,152.2,-5.8,"),
            "t_w = -5.8 mm",
            Some("UC 152x152x23,"),
        ),
        (
            "sections/uc.csv",
            with(UC, ",152.4,152.2,5.8,", ",152.4,152.2,,"),
            "t_w: cannot parse float from empty string",
            Some("UC 152x152x23,"),
        ),
        (
            "sections/uc.csv",
            with(UC, ",152.4,152.2,5.8,", ",152.4,"),
            "the row has 9 cells; 11 are needed",
            Some("UC 152x152x23,"),
        ),
        (
            "sections/uc.csv",
            with(UC, "designation,h,b,", "designation,h,c,"),
            "unknown field `c`",
            Some("UC 152x152x23,"),
        ),
        ("sections/uc.csv", with(UC, "UC 152x152x30", "UC 152X152x23"), "stands twice", None),
        ("sections/uc.csv", with(UC, "UC 152x152x23", ""), "needs a designation", None),
    ];
    for (name, text, said, covered) in cases {
        let error = Rulebook::with_overrides(&[(*name, text)]).expect_err(said);
        assert_eq!(error.file(), *name);
        assert!(error.message().contains(said), "{said:?} is not in {error}");
        assert!(error.to_string().starts_with(&format!("{name}: ")), "{error}");
        if let Some(covered) = covered {
            let span = error.span().unwrap_or_else(|| panic!("no place: {error}"));
            assert!(text[span.clone()].starts_with(covered), "{:?} for {error}", &text[span]);
            assert!(error.source_code().is_some() && error.labels().is_some_and(|mut labels| labels.next().is_some()));
        }
    }
}

/// A name that only differs in case or blanks is the same section: which of the two rows would count?
#[test]
fn a_section_of_another_file_is_not_shadowed() {
    let own = "designation,h,b,t_w,t_f,r,A,W_el_y,W_pl_y,A_v_z,source\nhe300b,310,300,11,19,27,,,,,own\n";
    let error = Rulebook::with_overrides(&[("sections/own.csv", own)]).unwrap_err();
    assert!(error.message().contains("he300b stands twice"), "{error}");
}

/// What the command line prints: the line of the file, with a mark under the place.
#[test]
fn an_error_can_be_printed_with_an_excerpt() {
    let text = with(TOLERANCES, "touch = 2.0", "touch = 200");
    let error = Rulebook::with_overrides(&[("tolerances.toml", &text)]).unwrap_err();
    let mut printed = String::new();
    miette::NarratableReportHandler::new().render_report(&mut printed, &error).unwrap();
    for part in ["touch = 200; allowed is 0.01 to 20", "tolerances.toml", "touch = 200", "here"] {
        assert!(printed.contains(part), "{part:?} is not in {printed}");
    }
}

/// An editor's byte order mark is no fault of the rules.
#[test]
fn a_byte_order_mark_is_passed_over() {
    let text = format!("\u{feff}{TOLERANCES}");
    assert!(Rulebook::with_overrides(&[("tolerances.toml", text)]).is_ok());
}

/// A file under `rules/` that is not embedded would be read by people and not by the program.
#[test]
fn every_rule_file_is_embedded() {
    let rules = Rulebook::embedded();
    let stems = |folder: &str| {
        let folder = std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("rules").join(folder);
        let mut paths: Vec<_> = std::fs::read_dir(folder).unwrap().map(|entry| entry.unwrap().path()).collect();
        paths.sort();
        paths
    };
    let annexes: Vec<_> =
        stems("annexes").iter().map(|p| p.file_stem().unwrap().to_str().unwrap().to_owned()).collect();
    assert_eq!(rules.annexes().collect::<Vec<_>>(), annexes);
    let rows = stems("sections").into_iter().map(|path| {
        let text = std::fs::read_to_string(path).unwrap();
        text.lines().filter(|line| !line.starts_with('#')).count() - 1
    });
    assert_eq!(rules.sections().count(), rows.sum::<usize>());
    for path in stems("").iter().filter(|path| path.extension().is_some_and(|e| e == "toml")) {
        let name = path.file_name().unwrap().to_str().unwrap();
        let error = Rulebook::with_overrides(&[(name, "nonsense = 1")]).unwrap_err();
        assert!(!error.message().contains("no such rule file"), "{name}");
    }
}
