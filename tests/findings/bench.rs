//! An invented joint that is as intended and carries what is required; each test spoils one thing.

use std::sync::Arc;

use faying::assess::{About, Assessment, CaseResult, MomentResistance, Sense, State, Verdict};
use faying::findings::{Context, rule};
use faying::intent::{InFrame, IntendedDetail, IntendedStiffener, LoadCase, ScheduledJoint};
use faying::joints::{
    Backing, BoltRow, Bolts, Diagonal, EdgeWeld, EndPlate, EndPlateLayout, FullButts, Held, Joint, Kind, Laid, Layout,
    MemberAt, Stiffener, WebPlate, Welds,
};
use faying::origin::{Ask, Datum, Known, Missing, Origin, Place};
use faying::review::Finding;
use faying::rulebook::{Grade, Rulebook, Section};
use faying::shop::{Bolt, Identity, Member, Plate, Shape, Steelwork, Weld, WeldSort};
use faying::units::{Length, kn, knm, mm};
use glam::{DVec2, DVec3};

/// Marks and GlobalIds that no message may name.
const NAMES: [&str; 4] = ["0guid", "B7", "C3", "J7"];

pub struct Bench {
    pub rulebook: Rulebook,
    pub steelwork: Steelwork,
    pub schedule_given: bool,
    pub unclear: bool,
    pub joint: Option<Joint>,
    pub scheduled: Option<ScheduledJoint>,
    pub intended: Option<IntendedDetail>,
    pub assessment: Option<Assessment>,
    pub intended_assessment: Option<Assessment>,
}

impl Bench {
    /// The joint as intended, proven to carry.
    pub fn good() -> Self {
        let rulebook = Rulebook::embedded();
        let mut bench = Self {
            steelwork: steelwork(&rulebook),
            joint: Some(joint(&rulebook)),
            rulebook,
            schedule_given: true,
            unclear: false,
            scheduled: Some(scheduled()),
            intended: Some(intended()),
            assessment: None,
            intended_assessment: None,
        };
        bench.carries(State::Met);
        bench
    }

    /// With an assessment whose moment is of that state, the rest met.
    pub fn carries(&mut self, state: State) {
        let verdicts = vec![
            verdict(About::Moment, state, 300.0, "kNm"),
            verdict(About::Shear, State::Met, 100.0, "kN"),
            verdict(About::Weld, State::Met, 300.0, "kNm"),
            verdict(About::Axial, State::Met, 0.0, "kN"),
        ];
        let cases = vec![CaseResult { case: 0, verdicts, moment: None, shear: None, axial: None }];
        self.assessment = Some(Assessment { cases, ..Assessment::default() });
    }

    pub fn context(&self) -> Context<'_> {
        Context {
            rulebook: &self.rulebook,
            steelwork: &self.steelwork,
            schedule_given: self.schedule_given,
            unclear: self.unclear,
            joint: self.joint.as_ref(),
            layout: self.joint.as_ref().and_then(|joint| joint.layout.as_ref().ok()?.plates()),
            scheduled: self.scheduled.as_ref(),
            intended: self.intended.as_ref(),
            assessment: self.assessment.as_ref(),
            intended_assessment: self.intended_assessment.as_ref(),
        }
    }

    /// What one rule finds; holds each finding to what every finding must be.
    pub fn find(&self, id: &str) -> Vec<Finding> {
        let found = (rule(id).unwrap_or_else(|| panic!("no rule {id}")).look)(&self.context());
        for finding in &found {
            assert_eq!(finding.rule, id);
            assert!(NAMES.iter().all(|name| !finding.message.contains(name)), "{}", finding.message);
            assert!(finding.at.is_some(), "{id} has no place");
        }
        found
    }

    /// Findings as "severity | message | intended | detailed".
    pub fn lines(&self, id: &str) -> Vec<String> {
        let print = |text: &Option<String>| text.clone().unwrap_or("-".into());
        let line = |f: &Finding| {
            format!("{} | {} | {} | {}", f.severity.word(), f.message, print(&f.intended), print(&f.detailed))
        };
        self.find(id).iter().map(line).collect()
    }

    pub fn joint(&mut self) -> &mut Joint {
        self.joint.as_mut().expect("a joint")
    }

    pub fn layout(&mut self) -> &mut EndPlateLayout {
        let Laid::Plates(laid) = self.joint().layout.as_mut().expect("a layout") else { panic!("no end plate") };
        match &mut **laid {
            Layout::EndPlate(layout) => layout,
            other => panic!("{other:?}"),
        }
    }

    pub fn intended(&mut self) -> &mut IntendedDetail {
        self.intended.as_mut().expect("an intended detail")
    }

    pub fn cases(&mut self) -> &mut Vec<LoadCase> {
        &mut self.scheduled.as_mut().expect("a scheduled joint").cases
    }

    /// The first case's verdict about something.
    pub fn verdict(&mut self, about: About) -> &mut Verdict {
        let assessment = self.assessment.as_mut().expect("an assessment");
        assessment.cases[0].verdicts.iter_mut().find(|v| v.about == about).expect("a verdict")
    }
}

/// Spoils the good joint and compares what the rule finds.
pub fn check(id: &str, spoil: impl Fn(&mut Bench), expected: &[&str]) {
    let mut bench = Bench::good();
    spoil(&mut bench);
    assert_eq!(bench.lines(id), expected, "{id}");
}

/// The rule goes by the severity of a deviation, and stands on these parts.
pub fn check_deviation(id: &str, spoil: impl Fn(&mut Bench), elements: &[&str]) {
    for (state, word) in [(State::Met, "comment"), (State::NotMet, "hold"), (State::Unproven, "unproven")] {
        let mut bench = Bench::good();
        spoil(&mut bench);
        bench.carries(state);
        let found = bench.find(id);
        assert_eq!(found.len(), 1, "{id}: {found:#?}");
        assert_eq!(found[0].severity.word(), word, "{id} {state:?}");
        assert_eq!(found[0].elements, elements, "{id}");
    }
}

pub fn verdict(about: About, state: State, required: f64, unit: &'static str) -> Verdict {
    let resistance = 400.0;
    Verdict {
        about,
        state,
        required: Some(required),
        resistance: Some(resistance),
        unit,
        utilisation: Some(f64::abs(required) / resistance),
        governed_by: "column web in compression".into(),
        reason: None,
    }
}

pub fn moment(sense: Sense, resistance: f64) -> Arc<MomentResistance> {
    Arc::new(MomentResistance {
        sense,
        beta: 1.0,
        moment: knm(resistance),
        without_welds: knm(resistance),
        web_in_tension: Length::ZERO,
        governed_by: "column web in compression".into(),
        rows: Vec::new(),
        components: Vec::new(),
        stiffness: None,
        notes: Vec::new(),
    })
}

pub fn load_case(name: &str, moment: Option<f64>, shear: Option<f64>, axial: Option<f64>, line: u32) -> LoadCase {
    let at = Place { file: "schedule.csv".into(), line, column: 1 };
    LoadCase { moment: moment.map(knm), shear: shear.map(kn), axial: axial.map(kn), ..LoadCase::blank(name, at) }
}

pub fn place(line: u32) -> Place {
    Place { file: Arc::from("model.ifcxml"), line, column: 1 }
}

pub fn missing(what: &str) -> Missing {
    Missing { what: what.into(), reason: "no property states it".into(), at: None, ask: Ask::Fabricator }
}

pub fn known<T>(value: T) -> Known<T> {
    Ok(Datum::new(value, Origin::Assumed("this test".into())))
}

pub fn grade(name: &str) -> Known<Grade> {
    known(Grade(name.into()))
}

pub fn section(rulebook: &Rulebook, name: &str) -> Section {
    rulebook.section(name).unwrap_or_else(|| panic!("{name} is in no catalogue")).clone()
}

/// A row symmetrical about the web, in a plate 220 wide on a flange 300 wide.
pub fn row(height: f64) -> BoltRow {
    BoltRow { height: mm(height), gauge: mm(120.0), edge_plate: mm(50.0), edge_column: mm(90.0) }
}

pub fn rows(heights: &[f64]) -> Vec<BoltRow> {
    heights.iter().map(|height| row(*height)).collect()
}

pub fn lengths(values: &[f64]) -> Vec<Length> {
    values.iter().map(|value| mm(*value)).collect()
}

/// A pair of column stiffeners; IPE 500 has its flanges' middles at 8 and 492.
pub fn stiffener(height: f64) -> Stiffener {
    Stiffener {
        guids: vec!["0guidS1".into(), "0guidS2".into()],
        height: mm(height),
        thickness: mm(12.0),
        outstand: mm(140.0),
        reach: mm(262.0),
        both_sides: true,
        full_depth: true,
        grade: grade("S355"),
        weld: known(mm(5.0)),
    }
}

fn joint(rulebook: &Rulebook) -> Joint {
    let member = |guid: &str, mark: &str, name: &str| MemberAt {
        guid: guid.into(),
        mark: Some(mark.into()),
        section: known(section(rulebook, name)),
        grade: grade("S355"),
    };
    let layout = EndPlateLayout {
        column: member("0guidC", "C3", "HEB 300"),
        beam: member("0guidB", "B7", "IPE 500"),
        plate: EndPlate {
            guid: "0guidP".into(),
            thickness: mm(25.0),
            width: mm(220.0),
            bottom: mm(-25.0),
            top: mm(610.0),
            grade: grade("S355"),
        },
        bolts: Bolts {
            diameter: known(mm(24.0)),
            class: known("8.8".into()),
            hole: known(mm(26.0)),
            rows: rows(&[560.0, 440.0, 350.0, 60.0]),
            held: Held::default(),
        },
        welds: Welds {
            flange_top: known(mm(8.5)),
            flange_bottom: known(mm(8.5)),
            web: known(mm(5.0)),
            full: FullButts::default(),
        },
        haunch: None,
        stiffeners: vec![stiffener(8.0)],
        strengthening: Default::default(),
        column_above: Some(mm(500.0)),
        column_below: None,
        not_credited: Vec::new(),
    };
    Joint {
        mark: "J7".into(),
        kind: Kind::EndPlateMoment,
        supporting: Some(0),
        supported: Some(1),
        at_end: Some(false),
        bolts: vec![0, 1],
        plates: vec![(0, "end-plate"), (1, "stiffener")],
        welds: vec![(0, "flange-top"), (1, "web")],
        layout: Ok(Laid::Plates(Box::new(Layout::EndPlate(layout)))),
        opposite: None,
        opposite_unclear: None,
        disagreements: Vec::new(),
        place: Some(place(1)),
    }
}

fn steelwork(rulebook: &Rulebook) -> Steelwork {
    let identity = |guid: &str, line: u32| Identity {
        guid: guid.into(),
        class: "IfcElement".into(),
        name: String::new(),
        mark: None,
        place: place(line),
    };
    let member = |guid: &str, line: u32, name: &str| Member {
        identity: identity(guid, line),
        start: DVec3::ZERO,
        end: DVec3::Z,
        along: DVec3::Z,
        across: DVec3::X,
        depth: DVec3::Y,
        shape: Shape::I,
        extents: DVec2::ONE,
        section: known(section(rulebook, name)),
        grade: grade("S355"),
        notches: Vec::new(),
        not_assessed: None,
        disagreements: Vec::new(),
    };
    let plate = |guid: &str, line: u32| Plate {
        identity: identity(guid, line),
        centre: DVec3::ZERO,
        u: DVec3::X,
        v: DVec3::Y,
        normal: DVec3::Z,
        outline: Vec::new(),
        holes: Vec::new(),
        thickness: mm(25.0),
        grade: grade("S355"),
        disagreements: Vec::new(),
    };
    let bolt = Bolt {
        identity: identity("0guidG", 41),
        start: DVec3::ZERO,
        end: DVec3::X,
        diameter: known(mm(24.0)),
        length: known(mm(90.0)),
        thread: None,
        class: known("8.8".into()),
        hole: None,
        slot: None,
        anchor: false,
    };
    let weld = |guid: &str, line: u32| Weld {
        identity: identity(guid, line),
        sort: WeldSort::Fillet,
        throat: known(mm(8.5)),
        length: known(mm(200.0)),
        points: Vec::new(),
    };
    Steelwork {
        members: vec![member("0guidC", 11, "HEB 300"), member("0guidB", 21, "IPE 500")],
        plates: vec![plate("0guidP", 31), plate("0guidS1", 32)],
        bolts: vec![bolt.clone(), bolt],
        welds: vec![weld("0guidWF", 51), weld("0guidWW", 52)],
        ..Steelwork::default()
    }
}

fn scheduled() -> ScheduledJoint {
    ScheduledJoint {
        mark: Some("J7".into()),
        supporting: Some("C3".into()),
        supported: Some("B7".into()),
        end: Some("start".into()),
        cases: vec![load_case("W1", Some(300.0), Some(100.0), Some(0.0), 2)],
        detail: Some("E1".into()),
        frame: InFrame::default(),
        at: Place { file: "schedule.csv".into(), line: 2, column: 1 },
    }
}

fn intended() -> IntendedDetail {
    IntendedDetail {
        haunch: None,
        base: None,
        name: "E1".into(),
        supporting_section: Some("HEB 300".into()),
        supported_section: Some("IPE 500".into()),
        supporting_grade: Some("S355".into()),
        supported_grade: Some("S355".into()),
        bolt_diameter: Some(mm(24.0)),
        bolt_class: Some("8.8".into()),
        rows: Some(lengths(&[560.0, 440.0, 350.0, 60.0])),
        gauge: Some(mm(120.0)),
        plate_thickness: Some(mm(25.0)),
        plate_width: Some(mm(220.0)),
        plate_top: Some(mm(610.0)),
        plate_bottom: Some(mm(-25.0)),
        plate_grade: Some("S355".into()),
        flange_weld: Some(mm(8.5)),
        web_weld: Some(mm(5.0)),
        stiffener_top: Some(None),
        stiffener_bottom: Some(Some(IntendedStiffener {
            thickness: Some(mm(12.0)),
            grade: Some("S355".into()),
            ..IntendedStiffener::default()
        })),
        exposed: None,
        bolt_category: None,
        friction: None,
        web_plates: None,
        web_plate_sides: None,
        diagonals: None,
        diagonal_form: None,
        backing_plates: None,
        at: Some(Place { file: "details.toml".into(), line: 1, column: 1 }),
    }
}

/// A 12 mm plate of S355 on one side of the web, its fillets 7 mm.
pub fn web_plate(positive: bool) -> WebPlate {
    WebPlate {
        guid: if positive { "0guidS1" } else { "0guidS2" }.into(),
        positive,
        thickness: mm(12.0),
        width: mm(240.0),
        half_width: mm(120.0),
        bottom: mm(-300.0),
        top: mm(800.0),
        grade: grade("S355"),
        weld: known(EdgeWeld::Fillet(mm(7.0))),
    }
}

/// A pair of 12 mm diagonals of S355, its fillets 6 mm.
pub fn diagonal(near: f64, far: f64) -> Diagonal {
    Diagonal {
        guids: vec!["0guidS1".into(), "0guidS2".into()],
        near: mm(near),
        far: mm(far),
        thickness: mm(12.0),
        outstand: mm(120.0),
        both_sides: true,
        full_depth: true,
        grade: grade("S355"),
        weld: known(mm(6.0)),
    }
}

/// A pair of 10 mm backing plates of S355.
pub fn backing() -> Backing {
    Backing {
        guids: vec!["0guidS1".into(), "0guidS2".into()],
        thickness: mm(10.0),
        bottom: mm(0.0),
        top: mm(600.0),
        from_web: mm(20.0),
        short_of_edge: mm(0.0),
        both_sides: true,
        grade: grade("S355"),
    }
}

/// Intended plates of S355.
pub fn plates(thickness: f64, throat: Option<f64>) -> Option<Option<IntendedStiffener>> {
    let (thickness, throat) = (Some(mm(thickness)), throat.map(mm));
    Some(Some(IntendedStiffener { thickness, throat, grade: Some("S355".into()), length: None }))
}
