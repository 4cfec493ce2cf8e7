//! The numbers of an end-plate joint: what the layout states and the rulebook adds, or what is missing.

mod column_side;
mod haunch_side;
mod noted;
mod plate_side;

use std::sync::Arc;

pub use column_side::{ColumnSide, StiffenerPair};
pub use haunch_side::HaunchSide;
pub use noted::Noted;
pub(in crate::assess) use noted::print_length;
use plate_side::NOISE;
pub use plate_side::PlateSide;

use super::sound;
use crate::assess::Input;
use crate::eurocode::bolts;
use crate::joints::{self, BoltedPlate, Held, Which};
use crate::origin::Ask;
use crate::rulebook::{Category, Rulebook};
use crate::units::{Area, Force, Length, Stress};
use crate::working::Working;

/// What is assumed of packing.
const PACKING: &str = "packing lies loose between the plies and bears no shear of its own: the bolts' shear is reduced by \
                       3.6.1(12), compression and prying go through it";

/// Strengths of a rolled section's flange and web, and the smaller f_u.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct MemberStrength {
    pub f_y_flange: Stress,
    pub f_y_web: Stress,
    pub f_u: Stress,
}

/// One row, seen from the tension side.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Row {
    /// Its number from the top of the joint, from 1, whatever the sense.
    pub number: usize,
    pub height: Length,
    pub gauge: Length,
    /// e of the supported member's end plate.
    pub e_plate: Length,
    /// e of the supporting side: the column's flange or the other end plate.
    pub e_support: Length,
}

impl Row {
    /// e of one side's end plate.
    pub fn edge(&self, side: &PlateSide) -> Length {
        if side.which == Which::Supporting { self.e_support } else { self.e_plate }
    }

    /// e_min of both plies.
    pub fn e_min(&self) -> Length {
        self.e_plate.min(self.e_support)
    }
}

/// What slip resistance needs.
#[derive(Clone, Copy, Debug, PartialEq)]
#[allow(non_snake_case)]
pub struct Slip {
    pub mu: f64,
    pub gamma_M3: f64,
}

/// The bolts, all alike.
#[derive(Clone, Debug, PartialEq)]
#[allow(non_snake_case)]
pub struct BoltNumbers {
    pub d: Length,
    pub d_0: Length,
    pub d_m: Length,
    pub f_ub: Stress,
    pub A_s: Area,
    pub A: Area,
    /// With the thread in the shear plane.
    pub alpha_v: f64,
    /// Whether the thread lies in the shear plane; `None` where the model does not show it.
    pub thread_in_plane: Option<bool>,
    pub washer: Length,
    pub washer_thickness: Length,
    pub head: Length,
    pub nut: Length,
    /// Total thickness of the packing between the plies.
    pub packing: Length,
    /// Slip at the ultimate limit state, where the bolts are of category C and everything for it is known.
    pub slip: Option<Slip>,
    pub F_t_Rd: Force,
    pub tension_working: Worked,
}

/// The working of what stands beside it, whose words follow from that: compared by its values alone.
#[derive(Clone, Debug)]
pub struct Worked(pub Arc<Working>);

impl PartialEq for Worked {
    fn eq(&self, other: &Self) -> bool {
        let values = self.0.steps.iter().map(|step| step.value.value);
        Arc::ptr_eq(&self.0, &other.0) || values.eq(other.0.steps.iter().map(|step| step.value.value))
    }
}

/// What the end plate is bolted to.
#[derive(Clone, Debug, PartialEq)]
#[allow(clippy::large_enum_variant, reason = "one a joint")]
pub enum Support {
    Column(ColumnSide),
    Plate(PlateSide),
    /// Another end plate and beam just like this one.
    Twin,
}

/// Everything the formulas need, for tension at the top; [`Numbers::upside_down`] gives the other sense.
#[derive(Clone, Debug, PartialEq)]
pub struct Numbers {
    /// The supported member's side.
    pub side: PlateSide,
    /// The other side.
    pub support: Support,
    pub bolts: BoltNumbers,
    pub punching_working: Worked,
    pub rows: Vec<Row>,
}

/// Either side before the bolts are known.
#[allow(clippy::large_enum_variant, reason = "one a joint")]
enum Behind {
    Column(column_side::Member),
    Plate(plate_side::Ends),
}

impl Numbers {
    /// Gathers the numbers; `None` if something is missing without which no resistance can be computed (the gaps in
    /// `noted` say what).
    pub fn gather(joint: BoltedPlate<'_>, rulebook: &Rulebook, noted: &mut Noted) -> Option<Self> {
        let (ends, behind) = match joint.support {
            joints::Support::Column(layout) => {
                let column = column_side::Member::gather(layout, rulebook, noted);
                let ends = plate_side::Ends::gather(joint.side, rulebook, noted);
                (ends, column.map(Behind::Column))
            }
            joints::Support::Plate(other) => {
                let ends = plate_side::Ends::gather(joint.side, rulebook, noted);
                let other = plate_side::Ends::gather(other, rulebook, noted);
                (ends, other.map(Behind::Plate))
            }
        };
        let haunch = HaunchSide::gather(joint.side.haunch, ends.as_ref(), rulebook, noted);
        let bolts = BoltNumbers::gather(joint.bolts, joint.plies(), rulebook, noted);
        let (behind, ends, haunch, bolts) = (behind?, ends?, haunch?, bolts?);

        let other_h = if let Behind::Plate(other) = &behind { Some(other.beam.h) } else { None };
        let reasons = sound::reasons(joint, ends.beam.h, other_h, &bolts, rulebook);
        if !reasons.is_empty() {
            for (what, reason) in reasons {
                noted.not_checked(what, reason, Ask::Method);
            }
            return None;
        }
        let mut w = Working::default();
        let side = ends.with(joint.side, haunch, &bolts, rulebook, noted, &mut w);
        let support = match (behind, joint.support) {
            (Behind::Column(column), joints::Support::Column(layout)) => {
                Some(Support::Column(column.with(layout, &bolts, rulebook, &mut w)))
            }
            (Behind::Plate(other), joints::Support::Plate(laid)) => {
                other.with(laid, None, &bolts, rulebook, noted, &mut w).map(Support::Plate)
            }
            _ => None,
        };
        let (mut side, mut support) = (side?, support?);
        let same_edges = |row: &joints::BoltRow| (row.edge_plate - row.edge_column).abs() <= NOISE;
        if let Support::Plate(other) = &support
            && side.is_like(other)
            && joint.bolts.rows.iter().all(same_edges)
        {
            (side.which, support) = (Which::Both, Support::Twin);
        }
        Some(Self {
            side,
            support,
            bolts,
            punching_working: Worked(Arc::new(w)),
            rows: (joint.bolts.rows.iter().enumerate())
                .map(|(i, row)| Row {
                    number: i + 1,
                    height: row.height,
                    gauge: row.gauge,
                    e_plate: row.edge_plate,
                    e_support: row.edge_column,
                })
                .collect(),
        })
    }

    /// Every end plate with its beam that is unlike the others.
    pub fn sides(&self) -> impl Iterator<Item = &PlateSide> + Clone {
        let other = if let Support::Plate(other) = &self.support { Some(other) } else { None };
        [Some(&self.side), other].into_iter().flatten()
    }

    /// The column, if it stands on one.
    pub fn column(&self) -> Option<&ColumnSide> {
        if let Support::Column(column) = &self.support { Some(column) } else { None }
    }

    /// B_p,Rd of the plies under head and nut.
    pub fn punching(&self) -> Force {
        let behind = match &self.support {
            Support::Column(column) => column.B_p_Rd,
            Support::Plate(other) => other.B_p_Rd,
            Support::Twin => self.side.B_p_Rd,
        };
        self.side.B_p_Rd.min(behind)
    }

    /// The least of something over the beams.
    pub fn least<T: PartialOrd>(&self, of: impl Fn(&PlateSide) -> T) -> T {
        self.sides().skip(1).map(&of).fold(of(&self.side), |least, own| if !(own >= least) { own } else { least })
    }

    /// From the centre of compression; where the beams differ, from the one that leaves the shorter arm.
    pub fn lever_arm(&self, row: &Row) -> Length {
        self.least(|side| row.height - side.compression())
    }

    /// Whether a row lies below a haunched beam.
    pub fn beside_haunch(&self, row: &Row) -> bool {
        self.side.haunch.is_some() && !(row.height >= self.side.soffit)
    }

    /// The same joint turned upside down, so that its lower side is the tension side. A haunch is left out then, with the
    /// rows beside it: what is left carries no more than the whole.
    pub fn upside_down(&self) -> Self {
        let h = self.side.beam.h;
        let mut rows = self.rows.clone();
        if self.side.haunch.is_some() {
            rows.retain(|row| row.height >= self.side.soffit);
        }
        let left_out = match (rows.last(), self.rows.last()) {
            (Some(last), Some(lowest)) => last.height - lowest.height,
            _ => Length::ZERO,
        };
        Self {
            side: self.side.upside_down(h),
            support: match &self.support {
                Support::Column(column) => {
                    let mut column = column.upside_down(h);
                    column.above = column.above.map(|above| above + left_out);
                    Support::Column(column)
                }
                Support::Plate(other) => Support::Plate(other.upside_down(h)),
                Support::Twin => Support::Twin,
            },
            rows: rows.iter().rev().map(|row| Row { height: h - row.height, ..*row }).collect(),
            ..self.clone()
        }
    }

    /// What the fillet of throat `a` takes off m, m_2 and m_x: 0.8 √2 a (Figures 6.8, 6.10).
    pub fn fillet(a: Option<Length>) -> Length {
        0.8 * 2.0_f64.sqrt() * a.unwrap_or(Length::ZERO)
    }
}

impl BoltNumbers {
    /// `plies`: thickness of both plies, where known.
    pub(in crate::assess) fn gather(
        laid: &joints::Bolts,
        plies: Option<[Length; 2]>,
        rulebook: &Rulebook,
        noted: &mut Noted,
    ) -> Option<Self> {
        let d = noted.take("bolt diameter", &laid.diameter, print_length);
        let class = noted.take("bolt class", &laid.class, String::clone);
        let d_0 = noted.take("bolt hole", &laid.hole, print_length);
        let size = d.and_then(|d| {
            let size = rulebook.bolt_size(d);
            if size.is_none() {
                noted.not_checked("bolt size", format!("no table has a bolt of {d}"), Ask::Method);
            }
            size
        });
        let class = class.and_then(|name| {
            let class = rulebook.bolt_class(&name);
            if class.is_none() {
                noted.not_checked(
                    "bolt class",
                    format!("{name} is no class of EN 1993-1-8 Table 3.1"),
                    Ask::Fabricator,
                );
            }
            class
        });
        for (i, row) in laid.rows.iter().enumerate() {
            noted.given(&format!("row {} height", i + 1), row.height, "bolt axes above the soffit");
            noted.given(&format!("row {} gauge", i + 1), row.gauge, "between the bolts' axes");
        }
        let (size, class, d_0) = (size?, class?, d_0?);
        noted.assumptions.push(format!(
            "head and nut across flats {}, the smallest that the product standards allow, for punching",
            size.across_flats
        ));
        let thread_in_plane = laid.held.shank.zip(plies).map(|(shank, [a, b])| {
            // From under the head, which may be on either side, through a washer to the furthest shear plane.
            let packing: Length = laid.held.packing.iter().copied().sum();
            let plane = a.max(b) + packing + rulebook.distances.washers * size.washer_thickness;
            let in_plane = !(shank >= plane);
            if !in_plane {
                noted.given("shank without thread", shank, "the bolts' stated length less their thread's");
            }
            in_plane
        });
        noted.assumptions.push(match thread_in_plane {
            Some(true) => "thread in the shear plane, by the bolts' length and thread".into(),
            Some(false) => "shank in the shear plane, by the bolts' length and thread".into(),
            None if rulebook.settings.thread_in_shear_plane => {
                "thread in the shear plane: no model says where it ends".into()
            }
            None => "shank in the shear plane, by the rule file: no model says where the thread ends".into(),
        });
        let slip = slip(&laid.held, &class.name, rulebook, noted);
        let packing: Length = laid.held.packing.iter().copied().sum();
        for t_p in &laid.held.packing {
            noted.given("packing thickness", *t_p, "the packing plate's body");
        }
        if packing > Length::ZERO {
            noted.assumptions.push(PACKING.into());
        }
        let tension = bolts::tension(class.f_ub, size.a_s, rulebook.annex.gamma_m2);
        Some(Self {
            d: size.d,
            d_0,
            d_m: 0.5 * (size.across_flats + size.across_corners),
            f_ub: class.f_ub,
            A_s: size.a_s,
            A: size.a,
            alpha_v: class.alpha_v,
            thread_in_plane,
            washer: size.washer,
            washer_thickness: size.washer_thickness,
            head: size.head,
            nut: size.nut,
            packing,
            slip,
            F_t_Rd: tension.value,
            tension_working: Worked(Arc::new(tension.working)),
        })
    }
}

/// Slip by the category that the schedule states; what keeps it from being checked is noted.
#[allow(non_snake_case, reason = "the standard's symbol")]
fn slip(held: &Held, class: &str, rulebook: &Rulebook, noted: &mut Noted) -> Option<Slip> {
    let Some(category) = &held.category else {
        noted.assumptions.push("bolts of category A, bearing type (Table 3.2): the schedule states no category".into());
        return None;
    };
    noted.inputs.push(Input::of("bolt category", category, |category| format!("{category:?}")));
    let category = category.value;
    if category.preloaded() && !rulebook.slip.preloaded.iter().any(|own| own == class) {
        let allowed = rulebook.slip.preloaded.join(" and ");
        let reason =
            format!("category {category:?} asks for preloaded bolts of class {allowed}, these are {class} (3.1.2)");
        noted.not_checked("preloaded bolts", reason, Ask::Fabricator);
        return None;
    }
    match category {
        Category::A | Category::D => None,
        Category::E => {
            noted
                .assumptions
                .push("bolts of category E: their preload is controlled (EN 1090-2); it adds no resistance".into());
            None
        }
        Category::B => {
            let reason =
                "category B asks for it at serviceability (3.4.1(4)), and the schedule states no actions there";
            noted.not_checked("slip of the bolts", reason.into(), Ask::Engineer);
            None
        }
        Category::C => {
            let (mu, gamma_M3) = match (&held.slip_factor, rulebook.annex.gamma_m3) {
                (Some(mu), Some((gamma_M3, _))) => (mu, gamma_M3),
                (None, _) => {
                    let reason =
                        "category C asks for it, and the schedule states neither friction class nor slip factor";
                    noted.not_checked("slip of the bolts", reason.into(), Ask::Engineer);
                    return None;
                }
                (_, None) => {
                    let reason = "category C asks for it, and the annex states no gamma_M3";
                    noted.not_checked("slip of the bolts", reason.into(), Ask::Method);
                    return None;
                }
            };
            noted.inputs.push(Input::of("slip factor", mu, f64::to_string));
            noted
                .assumptions
                .push("bolts of category C: their preload of 0.7 fub As is controlled (3.9.1(2), EN 1090-2)".into());
            Some(Slip { mu: mu.value, gamma_M3 })
        }
    }
}
