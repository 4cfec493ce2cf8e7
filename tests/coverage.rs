//! `rules/coverage.md` is true: what it says is checked is there, and what a calculation prints stands in it.

use std::fs;
use std::path::PathBuf;

use faying::assess::end_plate::{Opposite, assess};
use faying::assess::{Component, Sense};
use faying::rulebook::Rulebook;

use crate::assess::joint::{PLAIN, Sketch, asked, case, resistance};
use crate::assess::{column_bases, flexible, strengthened};

const PAGE: &str = include_str!("../rules/coverage.md");

fn root() -> PathBuf {
    PathBuf::from(env!("CARGO_MANIFEST_DIR"))
}

/// The cells of the table under a heading, without its head.
fn table(heading: &str) -> Vec<Vec<&'static str>> {
    let section = PAGE.split("\n## ").find(|section| section.starts_with(heading)).unwrap_or_default();
    let rows = section.lines().filter(|line| line.starts_with('|')).skip(2);
    rows.map(|row| row.trim_matches('|').split('|').map(str::trim).collect()).collect()
}

#[test]
fn the_headings_stand_in_order() {
    let headings: Vec<_> = PAGE.lines().filter_map(|line| line.strip_prefix("## ")).collect();
    let expected = ["Checked", "Readings chosen where a clause is open or practice is split", "Not yet", "Refused"];
    assert_eq!(headings, expected);
    assert!(PAGE.starts_with("# Coverage\n"));
}

/// `assess::end_plate::shear`: a module file, or an item in one.
fn exists(path: &str) -> bool {
    let parts: Vec<&str> = path.split("::").collect();
    let file = |parts: &[&str]| {
        let base = root().join("src").join(parts.join("/"));
        [base.with_extension("rs"), base.join("mod.rs")].into_iter().find(|file| file.is_file())
    };
    if file(&parts).is_some() {
        return true;
    }
    let Some((item, module)) = parts.split_last() else { return false };
    let Some(source) = file(module).and_then(|file| fs::read_to_string(file).ok()) else { return false };
    ["fn", "struct", "enum"].iter().any(|kind| {
        let start = format!("{kind} {item}");
        source
            .match_indices(&start)
            .any(|(at, _)| !source[at + start.len()..].starts_with(|c: char| c.is_alphanumeric() || c == '_'))
    })
}

#[test]
fn everything_said_to_be_checked_is_there() {
    let rows = table("Checked");
    assert!(rows.len() > 10);
    for row in rows {
        let [clause, what, code] = row[..] else { panic!("a row of three cells: {row:?}") };
        assert!(!clause.is_empty() && !what.is_empty());
        let paths: Vec<_> = code.split('`').skip(1).step_by(2).collect();
        assert!(!paths.is_empty(), "{clause} names no code");
        for path in paths {
            assert!(exists(path), "{clause}: no {path}");
        }
    }
    assert!(!exists("eurocode::t_stub::t_stu") && !exists("eurocode::no_such_module"));
}

/// Every clause that a component or a step of it names, for one sort of joint.
fn printed(components: &[Component], all: &mut Vec<String>) {
    all.extend(components.iter().map(|c| c.clause.to_owned()));
    for step in components.iter().flat_map(|c| &c.working.steps).filter(|step| step.expression.is_some()) {
        all.push(step.clause.to_owned());
    }
}

/// The first clause or table named in a text: "EN 1993-1-5 9.1", "6.2.6.2", "Table 6.2".
fn cited(text: &str) -> Option<(Option<&str>, String)> {
    let standard = ["EN 1992-1-1", "EN 1993-1-1", "EN 1993-1-5", "EN 1993-1-8:2005", "EN 1993-1-8"]
        .into_iter()
        .find(|s| text.starts_with(s));
    let rest = text.trim_start_matches(standard.unwrap_or("")).trim_start();
    let words = ["Tables ", "Table ", "Figure "];
    let (word, tail) = words.into_iter().find_map(|word| Some((word, rest.strip_prefix(word)?))).unwrap_or(("", rest));
    let number: String = tail.chars().take_while(|c| c.is_ascii_digit() || *c == '.').collect();
    let number = number.trim_end_matches('.').to_owned();
    (number.contains('.')).then(|| (standard, format!("{}{number}", word.replace("Tables", "Table"))))
}

#[test]
fn every_clause_that_a_calculation_prints_stands_there() {
    let rulebook = Rulebook::embedded();
    let mut all = Vec::new();
    let stiffened = Sketch { top: Some(12.0), bottom: Some(12.0), ..PLAIN };
    let plain = [PLAIN, stiffened].map(|sketch| sketch.layout(&rulebook));
    for layout in plain.into_iter().chain(strengthened::each()) {
        for sense in [Sense::Hogging, Sense::Sagging] {
            printed(&resistance(&layout, sense, 1.5, &rulebook).unwrap().components, &mut all);
        }
        printed(&assess(&layout, &[], false, &rulebook).shear.unwrap().components, &mut all);
        // A shear above half of the beam's own.
        let sheared = asked(&layout, &case(Some(1.0), Some(700.0), Some(0.0)), Opposite::None, &rulebook);
        printed(&sheared.cases[0].moment.as_ref().unwrap().components, &mut all);
    }
    for n in [-300.0, 300.0] {
        let based = column_bases::asked(&column_bases::base(), [Some(n), Some(80.0), Some(50.0)]);
        printed(&based.beside.iter().map(|(component, _)| component.clone()).collect::<Vec<_>>(), &mut all);
        printed(&based.shear.as_ref().unwrap().components, &mut all);
    }
    let cut = Some((90.0, 50.0));
    let notched = flexible::Plain { top: cut, gauge: 180.0, shared: true, ..flexible::PLAIN };
    for detail in [notched, flexible::Plain { top: cut, bottom: cut, ..flexible::PLAIN }] {
        let simple = detail.assessed(&flexible::RULES);
        printed(&simple.tying, &mut all);
        printed(&simple.shear.unwrap().components, &mut all);
    }
    all.sort();
    all.dedup();
    let rows: Vec<(String, String)> =
        table("Checked").iter().map(|row| (row[0].to_owned(), format!("{} {}", row[1], row[0]))).collect();
    let mut checked = 0;
    for text in &all {
        let Some((standard, clause)) = cited(text) else { continue };
        let standard = standard.filter(|s| !s.starts_with("EN 1993-1-8")).unwrap_or("EN 1993-1-8:2005");
        let stands = rows.iter().filter(|(name, _)| name.starts_with(standard)).any(|(_, words)| {
            // A row for 6.3.1 covers 6.3.1.2; "Tables 6.4 and 6.5" covers Table 6.5.
            let number = clause.trim_start_matches(|c: char| !c.is_ascii_digit());
            let numbers = words.split(|c: char| !(c.is_ascii_digit() || c == '.')).map(|n| n.trim_matches('.'));
            numbers.filter(|n| n.contains('.')).any(|n| number == n || number.starts_with(&format!("{n}.")))
        });
        assert!(stands, "{text} ({standard} {clause}) has no row in rules/coverage.md");
        checked += 1;
    }
    assert!(checked > 25, "{all:?}");
}
