//! A column of an I section on a rectangular base plate with anchors, in the column's frame: along its depth and across it,
//! from its axis.

use glam::DVec3;

use crate::joints::bolts::{self, Placed};
use crate::joints::draft::Draft;
use crate::joints::end_plate::member_at;
use crate::joints::frame::{Frame, Span, are_parallel};
use crate::joints::scene::Scene;
use crate::joints::welds::{self, Role};
use crate::joints::{Kind, MemberAt, cut};
use crate::origin::{Ask, Known, Missing, Origin};
use crate::rulebook::Grade;
use crate::shop::{Part, Shape};
use crate::units::{Length, Stress, mm};

/// How far the foundation lets the load spread below the plate.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Spread {
    /// √(A_c1/A_c0) itself, 1 to 3.
    Ratio(f64),
    /// By the foundation: from the plate's edges to its own, the lesser of both sides, and its depth.
    Foundation {
        /// Along the column's depth.
        e_h: Length,
        /// Across it.
        e_b: Length,
        /// Depth of the foundation.
        depth: Length,
    },
}

/// What a model of the steel does not show and the schedule states; what is not stated is not taken.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Foundation {
    /// Strength class and f_ck: "C30/37", 30 N/mm².
    pub concrete: Option<(String, Stress)>,
    /// γ_c.
    pub gamma_c: Option<f64>,
    /// α_cc.
    pub alpha_cc: Option<f64>,
    /// Thickness of the bed of sand and cement mortar below the plate.
    pub bed: Option<Length>,
    /// Its characteristic strength.
    pub bed_strength: Option<Stress>,
    /// How far the load spreads.
    pub spread: Option<Spread>,
    /// Whether the concrete's designer vouches that it holds the anchors up to their own resistance, in tension and shear.
    pub anchors_held: Option<bool>,
}

/// An anchor in the plate.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Anchor {
    /// Along the column's depth.
    pub along: Length,
    /// Across it.
    pub across: Length,
}

/// A column base.
#[derive(Clone, Debug)]
pub struct ColumnBase {
    /// The column.
    pub column: MemberAt,
    /// GlobalId of the plate.
    pub plate: String,
    /// t_p.
    pub thickness: Length,
    /// Steel grade of the plate.
    pub grade: Known<Grade>,
    /// From the axis to the plate's edges along the column's depth, the lesser first.
    pub half_depths: [Length; 2],
    /// The same across it.
    pub half_widths: [Length; 2],
    /// d of the anchors.
    pub diameter: Known<Length>,
    /// Their strength class.
    pub class: Known<String>,
    /// Their holes; missing unless modelled or stated, since those of base plates are seldom normal ones.
    pub hole: Known<Length>,
    /// The anchors, along the depth first.
    pub anchors: Vec<Anchor>,
    /// Throat of the fillets at the flanges: the least of both.
    pub flange_weld: Known<Length>,
    /// Throat of the fillets at the web.
    pub web_weld: Known<Length>,
    /// Whether flanges and web have butt welds of full penetration: the throats are their thickness.
    pub full: (bool, bool),
    /// What touches the plate besides and is not credited, one sentence each: shear keys, stiffeners.
    pub beside: Vec<String>,
    /// What the schedule states of the foundation, and where.
    pub foundation: Option<(Foundation, Origin)>,
}

impl ColumnBase {
    /// The detail in lines.
    pub(super) fn lines(&self) -> Vec<String> {
        fn known<T>(of: &Known<T>, print: impl Fn(&T) -> String) -> String {
            of.as_ref().map_or("not known".into(), |datum| print(&datum.value))
        }
        let length = |of: &Known<Length>| known(of, Length::to_string);
        let mut lines = vec![
            format!("column: {}", known(&self.column.section, |s| s.designation.clone())),
            format!("column grade: {}", known(&self.column.grade, |g| g.0.clone())),
            format!("base plate thickness: {}", self.thickness),
            format!("base plate depth: {} and {} from the axis", self.half_depths[0], self.half_depths[1]),
            format!("base plate width: {} and {} from the axis", self.half_widths[0], self.half_widths[1]),
            format!("base plate grade: {}", known(&self.grade, |g| g.0.clone())),
            format!("anchor diameter: {}", length(&self.diameter)),
            format!("anchor class: {}", known(&self.class, String::clone)),
            format!("anchor hole: {}", length(&self.hole)),
            format!("weld at the flanges: {}", length(&self.flange_weld)),
            format!("weld at the web: {}", length(&self.web_weld)),
        ];
        lines.extend(self.anchors.iter().map(|a| format!("anchor at {} along, {} across", a.along, a.across)));
        lines
    }
}

/// Lays out a base with anchors; `None` for one without, which keeps its own reason.
///
/// # Errors
/// One sentence on what the assessment does not cover.
pub(super) fn lay_out(scene: &Scene, draft: &mut Draft) -> Option<Result<ColumnBase, String>> {
    if draft.joint.bolts.is_empty() {
        return None;
    }
    let refused = |why: String| format!("kind not assessed yet: {}: {why}", Kind::ColumnBase.word());
    Some(laid(scene, draft).map_err(refused))
}

fn laid(scene: &Scene, draft: &mut Draft) -> Result<ColumnBase, String> {
    let plates = draft.joint.plates.iter().find(|(_, role)| *role == "end-plate");
    let index = plates.map(|(plate, _)| *plate).ok_or("no base plate")?;
    let end = *cut::ends_on(scene, index).first().ok_or("no column ends on the plate")?;
    let (plate, column) = (&scene.steel.plates[index], &scene.steel.members[end.member]);
    let (angle, position) = (scene.tolerances().angle, scene.tolerances().position.get());
    if column.shape != Shape::I {
        return Err("the column is no I section".into());
    }
    if column.not_assessed.is_some() {
        return Err("the column itself can't be assessed".into());
    }
    if !are_parallel(plate.normal, column.along, angle) {
        return Err("the column does not stand square on its plate".into());
    }
    let frame = Frame::new(column, &end, plate).ok_or("the column has no direction")?;
    let outline = frame.outline(plate);
    let middle = column.extents.y / 2.0;
    let depths = Span::of(outline.iter().map(|p| p.y - middle)).ok_or("the plate has no outline")?;
    let widths = Span::of(outline.iter().map(|p| p.x)).ok_or("the plate has no outline")?;
    let on = |span: Span, x: f64| (x - span.lo).abs() <= position || (x - span.hi).abs() <= position;
    if !outline.iter().all(|p| on(depths, p.y - middle) && on(widths, p.x)) {
        return Err("the base plate is no rectangle square to the column".into());
    }
    let half = |span: Span| {
        let (a, b) = (-span.lo, span.hi);
        [mm(a.min(b)), mm(a.max(b))]
    };
    let (half_depths, half_widths) = (half(depths), half(widths));
    if !(half_depths[0].get() >= middle - position && half_widths[0].get() >= column.extents.x / 2.0 - position) {
        return Err("the base plate does not reach beyond the column all round".into());
    }

    let placed: Result<Vec<Placed>, String> = (draft.joint.bolts.iter())
        .map(|bolt| {
            let body = &scene.steel.bolts[*bolt];
            let axis = (body.end - body.start).normalize_or_zero();
            if !are_parallel(axis, frame.out, angle) {
                return Err("an anchor leans from the plate's normal".into());
            }
            let point: DVec3 = body.start + axis * (plate.centre - body.start).dot(frame.out) / axis.dot(frame.out);
            Ok(Placed { bolt: *bolt, point, across: frame.across(point), height: frame.height(point) - middle })
        })
        .collect();
    let mut placed = placed?;
    placed.sort_by(|a, b| a.height.total_cmp(&b.height).then(a.across.total_cmp(&b.across)));
    let bodies = || placed.iter().map(|p| &scene.steel.bolts[p.bolt]);
    let size = scene.tolerances().size;
    let same = |a: &Length, b: &Length| (*a - *b).abs() <= size;
    let diameter = bolts::all_alike("anchor diameter", bodies().map(|b| &b.diameter), same, Length::to_string);
    let class = bolts::all_alike("anchor class", bodies().map(|b| &b.class), |a, b| a == b, Clone::clone);
    let no_hole = |reason: &str| Missing {
        what: "holes of the anchors".into(),
        reason: reason.into(),
        at: None,
        ask: Ask::Fabricator,
    };
    let hole = match bolts::hole(scene, draft, &[index], &placed, &diameter) {
        Ok(Ok(hole)) if matches!(hole.origin, Origin::Assumed(_)) => {
            Err(no_hole("none is modelled, and those of base plates are seldom normal ones"))
        }
        Ok(known) => known,
        Err(reason) => Err(no_hole(&reason)),
    };

    let roles = welds::at_plate(scene, &frame, end.member, index);
    let throat = |role, what: &str| welds::throat(scene, &frame, end.member, &roles, role, what);
    let full = |role| welds::full_butt(scene, &frame, end.member, &roles, role);
    let flange = "weld at the column's flanges";
    let flange_weld = match (throat(Role::FlangeTop, flange), throat(Role::FlangeBottom, flange)) {
        (Ok(a), Ok(b)) => Ok(if a.value <= b.value { a } else { b }),
        (Err(why), _) | (_, Err(why)) => Err(why),
    };
    Ok(ColumnBase {
        column: member_at(scene, end.member),
        plate: plate.identity.guid.clone(),
        thickness: plate.thickness,
        grade: plate.grade.clone(),
        half_depths,
        half_widths,
        diameter,
        class,
        hole,
        anchors: placed.iter().map(|p| Anchor { along: mm(p.height), across: mm(p.across) }).collect(),
        flange_weld,
        web_weld: throat(Role::Web, "weld at the column's web"),
        full: (full(Role::FlangeTop) && full(Role::FlangeBottom), full(Role::Web)),
        beside: beside(scene, &frame, index, end.member),
        foundation: None,
    })
}

/// What else touches the plate: below it a shear key, above it whatever stiffens it.
fn beside(scene: &Scene, frame: &Frame, plate: usize, column: usize) -> Vec<String> {
    let half = scene.steel.plates[plate].thickness.get() / 2.0;
    let level = frame.outward(scene.steel.plates[plate].centre);
    let said = |part: Part, middle: DVec3| {
        let below = frame.outward(middle) < level - half;
        let what = if below { "a shear key or the like below the plate" } else { "beside the column on the plate" };
        format!("{}: {what}, which no check credits", scene.label(part))
    };
    let members = scene.touches.members[plate].iter().filter(|member| **member != column).map(|member| {
        let body = &scene.steel.members[*member];
        said(Part::Member(*member), (body.start + body.end) / 2.0)
    });
    let plates = &scene.touches.plates[plate];
    let plates = plates.iter().map(|other| said(Part::Plate(*other), scene.steel.plates[*other].centre));
    let mut sentences: Vec<String> = members.chain(plates).collect();
    sentences.sort();
    sentences.dedup();
    sentences
}
