//! Invented joints of sections from the tables, and how they are asked.

use std::sync::LazyLock;

use faying::assess::end_plate::{Demand, Opposite, assess};
use faying::assess::{About, Assessment, MomentResistance, Sense, State, Verdict};
use faying::intent::LoadCase;
use faying::joints::{
    BoltRow, Bolts, EndPlate, EndPlateLayout, FullButts, Held, MemberAt, Stiffener, Strengthening, Welds,
};
use faying::origin::{Ask, Datum, Known, Missing, Origin, Place};
use faying::rulebook::{Rulebook, Section};
use faying::units::{Length, kn, knm, mm};
use proptest::prelude::*;

pub const COLUMNS: [&str; 5] = ["HEB 240", "HEA 300", "HEB 300", "UKC 254x254x107", "UKC 305x305x137"];
pub const BEAMS: [&str; 5] = ["IPE 300", "IPE 400", "IPE 500", "UKB 457x191x67", "UKB 533x210x92"];

/// The embedded rules, once for all cases.
pub static RULES: LazyLock<Rulebook> = LazyLock::new(Rulebook::embedded);

pub fn known<T>(value: T) -> Known<T> {
    Ok(Datum::new(value, Origin::Derived("invented".into())))
}

pub fn unknown<T>(what: &str) -> Known<T> {
    Err(Missing { what: what.into(), reason: "nobody states it".into(), at: None, ask: Ask::Fabricator })
}

/// What a joint is made of, before heights and edge distances are worked out.
#[derive(Clone, Debug)]
pub struct Sketch {
    pub column: &'static str,
    pub beam: &'static str,
    pub grade: &'static str,
    pub plate_grade: &'static str,
    pub t_p: f64,
    pub d: f64,
    pub class: &'static str,
    pub gauge: f64,
    /// A row 45 mm above the top flange.
    pub extended: bool,
    /// Rows 55 mm below the top flange and 90 mm below each other.
    pub inner: usize,
    pub flange_weld: f64,
    pub web_weld: f64,
    pub top: Option<f64>,
    pub bottom: Option<f64>,
    pub column_above: Option<f64>,
}

/// A plain joint that every check passes through.
pub const PLAIN: Sketch = Sketch {
    column: "HEB 300",
    beam: "IPE 400",
    grade: "S355",
    plate_grade: "S355",
    t_p: 20.0,
    d: 20.0,
    class: "8.8",
    gauge: 110.0,
    extended: true,
    inner: 2,
    flange_weld: 7.0,
    web_weld: 5.0,
    top: None,
    bottom: None,
    column_above: None,
};

pub fn section(rulebook: &Rulebook, name: &str) -> Section {
    rulebook.section(name).unwrap_or_else(|| panic!("no section {name}")).clone()
}

pub fn stiffener(
    rulebook: &Rulebook,
    grade: &str,
    height: f64,
    thickness: f64,
    outstand: f64,
    reach: Length,
) -> Stiffener {
    Stiffener {
        guids: Vec::new(),
        height: mm(height),
        thickness: mm(thickness),
        outstand: mm(outstand),
        reach,
        both_sides: true,
        full_depth: true,
        grade: known(rulebook.grade(grade).unwrap()),
        weld: known(mm(5.0)),
    }
}

impl Sketch {
    /// The joint: the plate ends 25 mm below the beam, one low row 60 mm above the soffit.
    pub fn layout(&self, rulebook: &Rulebook) -> EndPlateLayout {
        let (column, beam) = (section(rulebook, self.column), section(rulebook, self.beam));
        let (h, t_f) = (beam.h.get(), beam.t_f.get());
        let width = self.gauge + 90.0;
        let row = |height: f64| BoltRow {
            height: mm(height),
            gauge: mm(self.gauge),
            edge_plate: mm(45.0),
            edge_column: 0.5 * (column.b - mm(self.gauge)),
        };
        let outer = self.extended.then_some(h + 45.0);
        let inner = (0..self.inner).map(|i| h - t_f - 55.0 - 90.0 * i as f64).filter(|height| *height > 150.0);
        let rows = outer.into_iter().chain(inner).chain([60.0]).map(row).collect();
        let reach = column.h - 2.0 * column.t_f;
        let outstand = 0.5 * (column.b - column.t_w).get() - 5.0;
        let pair = |height: f64, t: f64| stiffener(rulebook, self.grade, height, t, outstand, reach);
        let member = |section: Section| MemberAt {
            guid: String::new(),
            mark: None,
            section: known(section),
            grade: known(rulebook.grade(self.grade).unwrap()),
        };
        EndPlateLayout {
            plate: EndPlate {
                guid: String::new(),
                thickness: mm(self.t_p),
                width: mm(width),
                bottom: mm(-25.0),
                top: mm(h + if self.extended { 90.0 } else { 25.0 }),
                grade: known(rulebook.grade(self.plate_grade).unwrap()),
            },
            bolts: Bolts {
                diameter: known(mm(self.d)),
                class: known(self.class.into()),
                hole: known(rulebook.bolt_size(mm(self.d)).unwrap().d_0),
                rows,
                held: Held::default(),
            },
            welds: Welds {
                flange_top: known(mm(self.flange_weld)),
                flange_bottom: known(mm(self.flange_weld)),
                web: known(mm(self.web_weld)),
                full: FullButts::default(),
            },
            stiffeners: (self.top.map(|t| pair(h - 0.5 * t_f, t)).into_iter())
                .chain(self.bottom.map(|t| pair(0.5 * t_f, t)))
                .collect(),
            strengthening: Strengthening::default(),
            column_above: self.column_above.map(mm),
            column_below: None,
            not_credited: Vec::new(),
            haunch: None,
            column: member(column),
            beam: member(beam),
        }
    }
}

/// Joints as they are built: thin and thick plates, one to three rows beside the web, stiffened or not.
pub fn sketches() -> impl Strategy<Value = Sketch> {
    let parts = (0..COLUMNS.len(), 0..BEAMS.len(), 0..3usize, 0..3usize);
    let sizes = (10.0..30.0f64, 0..3usize, any::<bool>(), 95.0..130.0f64, any::<bool>(), 1..4usize);
    let welds = (4.0..9.0f64, 3.5..7.0f64);
    let pair = || proptest::option::of(8.0..20.0f64);
    let rest = (pair(), pair(), proptest::option::of(40.0..400.0f64));
    (parts, sizes, welds, rest).prop_map(
        |((column, beam, grade, plate), (t_p, d, strong, gauge, extended, inner), (flange_weld, web_weld), rest)| {
            let grades = ["S235", "S275", "S355"];
            let (top, bottom, column_above) = rest;
            Sketch {
                column: COLUMNS[column],
                beam: BEAMS[beam],
                grade: grades[grade],
                plate_grade: grades[plate],
                t_p,
                d: [16.0, 20.0, 24.0][d],
                class: if strong { "10.9" } else { "8.8" },
                gauge,
                extended,
                inner,
                flange_weld,
                web_weld,
                top,
                bottom,
                column_above,
            }
        },
    )
}

pub fn case(moment: Option<f64>, shear: Option<f64>, axial: Option<f64>) -> LoadCase {
    let at = Place { file: "".into(), line: 0, column: 0 };
    LoadCase { moment: moment.map(knm), shear: shear.map(kn), axial: axial.map(kn), ..LoadCase::blank("ULS", at) }
}

/// The joint alone, with one load case.
pub fn asked(layout: &EndPlateLayout, case: &LoadCase, opposite: Opposite, rulebook: &Rulebook) -> Assessment {
    assess(layout, &[Demand { case, opposite }], opposite != Opposite::None, rulebook)
}

/// The moment resistance in one sense and for one β.
pub fn resistance(
    layout: &EndPlateLayout,
    sense: Sense,
    beta: f64,
    rulebook: &Rulebook,
) -> Result<std::sync::Arc<MomentResistance>, String> {
    let own = if sense == Sense::Hogging { 1.0 } else { -1.0 };
    let assessment =
        asked(layout, &case(Some(own), Some(0.0), Some(0.0)), Opposite::Moment(knm(own * (1.0 - beta))), rulebook);
    let result = assessment.cases.first().and_then(|case| case.moment.clone());
    result.ok_or_else(|| format!("{:?}", assessment.gaps))
}

pub fn verdict(assessment: &Assessment, about: About) -> &Verdict {
    let verdicts = &assessment.cases.first().unwrap().verdicts;
    verdicts.iter().find(|v| v.about == about).unwrap_or_else(|| panic!("no verdict about {about:?}"))
}

pub fn state(assessment: &Assessment, about: About) -> State {
    verdict(assessment, about).state
}

/// Upside down: what was the top is the bottom.
pub fn mirrored(layout: &EndPlateLayout) -> EndPlateLayout {
    let h = layout.beam.section.as_ref().unwrap().value.h;
    let mut turned = layout.clone();
    (turned.plate.top, turned.plate.bottom) = (h - layout.plate.bottom, h - layout.plate.top);
    turned.bolts.rows =
        layout.bolts.rows.iter().rev().map(|row| BoltRow { height: h - row.height, ..row.clone() }).collect();
    turned.welds.flange_top = layout.welds.flange_bottom.clone();
    turned.welds.flange_bottom = layout.welds.flange_top.clone();
    turned.stiffeners = layout.stiffeners.iter().map(|s| Stiffener { height: h - s.height, ..s.clone() }).collect();
    let strengthening = &mut turned.strengthening;
    strengthening.web_plates.iter_mut().for_each(|p| (p.top, p.bottom) = (h - p.bottom, h - p.top));
    strengthening.diagonals.iter_mut().for_each(|d| (d.near, d.far) = (h - d.near, h - d.far));
    strengthening.backing.iter_mut().for_each(|b| (b.top, b.bottom) = (h - b.bottom, h - b.top));
    (turned.column_above, turned.column_below) = (layout.column_below, layout.column_above);
    turned
}
