//! Invented reviews, built by hand.

use faying::origin::{Ask, Missing, Place, Problem};
use faying::review::{
    Basis, BoltsBrief, CheckResult, Counts, Finding, JointReview, MemberBrief, Outcome, PlateBrief, Required,
    Resistance, Review, RowResult, Survey, WeldBrief,
};
use faying::working::Working;

pub fn place(file: &str, line: u32, column: u32) -> Place {
    Place { file: file.into(), line, column }
}

/// A joint of beam `B<n>` on column `C<n>` that ends so, without anything else to say.
pub fn joint(n: usize, outcome: Outcome) -> JointReview {
    let member = |mark: String, section: &str| MemberBrief {
        guid: format!("guid-{mark}"),
        mark: Some(mark),
        section: Some(section.into()),
        grade: Some("S355".into()),
    };
    JointReview {
        mark: format!("B{n}/C{n}"),
        kind: "end-plate-moment".into(),
        detail: None,
        outcome,
        reasons: Vec::new(),
        supporting: Some(member(format!("C{n}"), "HEB 260")),
        supported: Some(member(format!("B{n}"), "IPE 400")),
        bolts: None,
        plates: Vec::new(),
        welds: Vec::new(),
        resistance: Resistance::default(),
        intended_resistance: None,
        required: Vec::new(),
        rows: Vec::new(),
        row_basis: None,
        shear_case: None,
        stiffness: None,
        checks: Default::default(),
        findings: Vec::new(),
        missing: Vec::new(),
        assumptions: Vec::new(),
        inputs: Vec::new(),
        difference: None,
        sketch: None,
        at: Some(place("hall.ifcxml", 100 + u32::try_from(n).unwrap(), 3)),
    }
}

/// Gives a joint a resistance, and one load case that uses it so far.
pub fn used(mut joint: JointReview, resistance_knm: f64, moment_knm: f64) -> JointReview {
    let governed_by = Some("end plate in bending, rows 1-2 (mode 1)".to_owned());
    joint.resistance = Resistance {
        moment_without_welds_knm: Some(262.0),
        moment_knm: Some(resistance_knm),
        moment_reversed_knm: Some(90.0),
        shear_kn: Some(400.0),
        axial_kn: None,
        governed_by: governed_by.clone(),
    };
    joint.required.push(Required {
        case: "LC1".into(),
        moment_knm: Some(moment_knm),
        shear_kn: Some(120.0),
        axial_kn: None,
        tying_kn: None,
        utilisation: Some(moment_knm / resistance_knm),
        governed_by,
        moment_resistance_knm: Some(resistance_knm),
        at: Some(place("schedule.csv", 2, 1)),
    });
    joint
}

pub fn finding(rule: &'static str, severity: Outcome, message: &str, values: Option<(&str, &str)>) -> Finding {
    Finding {
        rule,
        severity,
        message: message.into(),
        intended: values.map(|(intended, _)| intended.into()),
        detailed: values.map(|(_, detailed)| detailed.into()),
        elements: Vec::new(),
        at: None,
    }
}

pub fn missing(what: &str, reason: &str, at: Option<Place>) -> Missing {
    Missing { what: what.into(), reason: reason.into(), at, ask: Ask::Fabricator }
}

/// A review of these joints; the counts follow from them.
pub fn review(joints: Vec<JointReview>) -> Review {
    let count = |is: &dyn Fn(&JointReview) -> bool| joints.iter().filter(|joint| is(joint)).count();
    let counts = Counts {
        found: count(&|j| j.found()),
        scheduled: count(&|j| !j.required.is_empty()),
        paired: count(&|j| j.found() && !j.required.is_empty()),
        assessed: count(&|j| j.resistance.moment_knm.is_some()),
        clear: count(&|j| j.outcome == Outcome::Clear),
        comment: count(&|j| j.outcome == Outcome::Comment),
        hold: count(&|j| j.outcome == Outcome::Hold),
        unproven: count(&|j| j.outcome == Outcome::Unproven),
    };
    Review {
        file: "hall.ifcxml".into(),
        exchange: "IFC4 ifcXML".into(),
        sha256: "ab12".repeat(16),
        schedule: Some("schedule.csv".into()),
        basis: Basis {
            standard: "EN 1993-1-8:2005",
            annex: "recommended values".into(),
            annex_source: "EN 1993-1-8:2005 Table 2.1".into(),
            gamma_m0: 1.0,
            gamma_m1: 1.0,
            gamma_m2: 1.25,
            settings: vec![("row forces".into(), "in proportion beyond 1.9 Ft,Rd".into())],
        },
        counts,
        joints,
        problems: Vec::new(),
        survey: Survey::default(),
    }
}

/// The plate of a joint, marked `P<n>`.
pub fn plate(n: usize, thickness_mm: f64) -> PlateBrief {
    PlateBrief {
        guid: format!("guid-P{n}"),
        mark: Some(format!("P{n}")),
        role: "end-plate".into(),
        thickness_mm,
        width_mm: 180.0,
        depth_mm: 510.0,
        grade: Some("S275".into()),
    }
}

/// A held joint whose plate is thinner than intended.
pub fn thin(n: usize, moment_knm: f64) -> JointReview {
    let mut joint = used(joint(n, Outcome::Hold), 200.0, moment_knm);
    joint.detail = Some("M3".into());
    joint.plates = vec![plate(n, 15.0)];
    joint.intended_resistance =
        Some(Resistance { moment_knm: Some(270.14), shear_kn: Some(400.0), ..Resistance::default() });
    let ratio = moment_knm / 200.0;
    let short = format!("M_Ed = {moment_knm:.1} kNm is {ratio:.2} of the resistance");
    let mut thinner =
        finding("plate-thinner", Outcome::Hold, "the end plate is thinner than intended", Some(("20 mm", "15 mm")));
    thinner.elements = vec![format!("guid-P{n}")];
    thinner.at = Some(place("hall.ifcxml", 2, 27));
    joint.reasons = vec![short.clone(), thinner.message.clone()];
    joint.findings = vec![finding("moment-short", Outcome::Hold, &short, None), thinner];
    joint.difference = Some((
        vec!["bolts M20 8.8".into(), "gauge 100 mm".into(), "end plate 20 mm S275".into()],
        vec!["bolts M20 8.8".into(), "gauge 100 mm".into(), "end plate 15 mm S275".into(), "backing plate".into()],
    ));
    joint
}

/// One joint of every sort: two held alike, one unproven, one without steel, one unscheduled, a comment, a clear one.
pub fn small() -> Review {
    let mut unproven = used(joint(3, Outcome::Unproven), 200.0, 120.0);
    unproven.missing =
        vec![missing("bolt class", "no material, name or property of the bolts states one", unproven.at.clone())];
    let mut bare = joint(4, Outcome::Hold);
    bare.kind = "not-found".into();
    bare.supporting = None;
    bare.supported = None;
    bare.required = used(joint(4, Outcome::Hold), 1.0, 80.0).required;
    bare.required[0].utilisation = None;
    bare.required[0].governed_by = None;
    bare.required[0].moment_resistance_knm = None;
    bare.at = Some(place("schedule.csv", 5, 1));
    let mut unscheduled = used(joint(5, Outcome::Unproven), 200.0, 0.0);
    unscheduled.required.clear();
    unscheduled.missing = vec![missing("required actions", "no schedule line pairs with this joint", None)];
    let mut comment = used(joint(6, Outcome::Comment), 240.0, 180.0);
    comment.findings = vec![finding(
        "plate-thicker",
        Outcome::Comment,
        "the end plate is thicker than intended",
        Some(("20 mm", "25 mm")),
    )];
    comment.assumptions = vec!["thread in the shear plane (rule file)".into()];
    let mut clear = used(joint(7, Outcome::Clear), 200.0, 194.0);
    clear.bolts = Some(BoltsBrief {
        count: 6,
        diameter_mm: Some(20.0),
        class: Some("8.8".into()),
        gauge_mm: Some(100.0),
        row_heights_mm: vec![450.40004, 345.0, 73.0],
    });
    clear.welds = vec![
        WeldBrief { role: "flange-top".into(), throat_mm: Some(7.0) },
        WeldBrief { role: "web".into(), throat_mm: None },
    ];
    clear.rows = vec![RowResult {
        row: 1,
        lever_arm_mm: 443.6,
        potential_kn: 196.4,
        force_kn: 196.4,
        governed_by: "end plate in bending (mode 2)".into(),
    }];
    clear.checks = [CheckResult {
        id: "column-web-in-compression".into(),
        title: "column web in compression".into(),
        clause: "EN 1993-1-8:2005 6.2.6.2".into(),
        resistance: Some(885.6),
        action: Some(437.3),
        unit: "kN",
        utilisation: Some(437.3 / 885.6),
        outcome: "met",
        needed_throat_mm: None,
        working: Working::default().into(),
    }]
    .into();
    clear.assumptions = vec!["thread in the shear plane (rule file)".into()];
    clear.inputs = vec![("bolt class".into(), "8.8".into(), "modelled: name of the bolts".into())];
    let mut review = review(vec![thin(1, 262.0), thin(2, 205.0), unproven, bare, unscheduled, comment, clear]);
    review.problems = vec![
        Problem { at: Some(place("hall.ifcxml", 9, 5)), message: "the length \"abc\" is no number".into() },
        Problem { at: None, message: "the schedule states no intended detail M9".into() },
    ];
    review
}

/// The lines that the held joints of [`small`] point to.
pub const MODEL: &str = "<ifcXML>\n  <IfcPlate id=\"i7\" Name=\"end plate\" Tag=\"P1\"><x/></IfcPlate>\n</ifcXML>\n";
