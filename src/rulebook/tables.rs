//! What the rule files hold, as plain data.

use std::collections::BTreeMap;

use crate::units::{Area, Length, Modulus, Stress};

/// A steel grade of a product standard: "S355". Sub-grades that do not change its strength (JR, J0, J2, K2) are dropped;
/// grades with a product standard of their own keep their mark: "S275N", "S355M".
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Grade(pub String);

/// f_y and f_u of a part.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Strength {
    /// f_y.
    pub f_y: Stress,
    /// f_u.
    pub f_u: Stress,
}

/// A doubly symmetric I or H section: sizes and what follows from them.
#[derive(Clone, Debug, PartialEq)]
pub struct Section {
    /// The designation in the catalogue's spelling, or the model's own name.
    pub designation: String,
    /// Overall depth.
    pub h: Length,
    /// Flange width.
    pub b: Length,
    /// Web thickness.
    pub t_w: Length,
    /// Flange thickness.
    pub t_f: Length,
    /// Root radius; `None` if nobody states it (then resistances are a lower bound with r = 0).
    pub r: Option<Length>,
    /// A.
    pub area: Area,
    /// W_pl,y.
    pub w_pl_y: Modulus,
    /// W_el,y.
    pub w_el_y: Modulus,
    /// A_v,z of EN 1993-1-1 6.2.6(3)a: A − 2 b t_f + (t_w + 2 r) t_f, at least h_w t_w (η = 1).
    pub a_v_z: Area,
    /// Rolled (strength by flange thickness, if the setting says so) or welded.
    pub rolled: bool,
}

/// A bolt size of the coarse metric series.
#[derive(Clone, Debug, PartialEq)]
pub struct BoltSize {
    /// d.
    pub d: Length,
    /// p: pitch of the coarse thread.
    pub pitch: Length,
    /// A: gross area of the shank.
    pub a: Area,
    /// A_s: tensile stress area.
    pub a_s: Area,
    /// d_0: normal round hole of EN 1090-2.
    pub d_0: Length,
    /// Across flats of head and nut, ISO 4014/4032.
    pub across_flats: Length,
    /// Across corners that goes with it (the least that the product standard allows).
    pub across_corners: Length,
    /// Across flats of EN 14399 assemblies.
    pub across_flats_preloaded: Length,
    /// Washer: outer diameter.
    pub washer: Length,
    /// Washer: thickness.
    pub washer_thickness: Length,
    /// k: head height.
    pub head: Length,
    /// m: nut height.
    pub nut: Length,
    /// m of EN 14399-4: no nut of class 10.9 is lower.
    pub nut_preloaded: Length,
}

/// A bolt strength class.
#[derive(Clone, Debug, PartialEq)]
pub struct BoltClass {
    /// "8.8".
    pub name: String,
    /// f_yb.
    pub f_yb: Stress,
    /// f_ub.
    pub f_ub: Stress,
    /// α_v with the thread in the shear plane.
    pub alpha_v: f64,
}

/// Category of a bolted connection, EN 1993-1-8:2005 3.4, Table 3.2.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Category {
    /// Bearing type.
    A,
    /// Slip-resistant at serviceability.
    B,
    /// Slip-resistant at the ultimate limit state.
    C,
    /// In tension, not preloaded.
    D,
    /// In tension, preloaded.
    E,
}

impl Category {
    /// By its letter.
    pub fn named(letter: &str) -> Option<Self> {
        match letter.trim() {
            "A" | "a" => Some(Self::A),
            "B" | "b" => Some(Self::B),
            "C" | "c" => Some(Self::C),
            "D" | "d" => Some(Self::D),
            "E" | "e" => Some(Self::E),
            _ => None,
        }
    }

    /// Whether its bolts are preloaded.
    pub fn preloaded(self) -> bool {
        matches!(self, Self::B | Self::C | Self::E)
    }
}

/// Slip of preloaded bolts.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct SlipRules {
    /// Bolt classes that may be preloaded, 3.1.2.
    pub preloaded: Vec<String>,
    /// μ by class of friction surface, Table 3.7.
    pub friction: BTreeMap<String, f64>,
    /// Whether a bolt's own tension takes off its slip resistance (3.8), or is counterbalanced by 3.9.2(3).
    pub reduced_by_tension: bool,
}

/// What a hole is larger than the bolt, EN 1090-2.
#[derive(Clone, Debug, PartialEq)]
pub struct Clearance {
    /// The largest bolt diameter that it is for.
    pub up_to: Length,
    /// Normal round hole.
    pub round: Length,
    /// Oversize round hole.
    pub oversize: Length,
    /// Short slotted hole, along the slot (across it: as a normal round hole).
    pub short_slot: Length,
    /// Long slotted hole: its overall length in bolt diameters.
    pub long_slot: f64,
}

/// Distances and room of bolts: what the detailing rules ask for.
#[derive(Clone, Debug, PartialEq)]
pub struct Distances {
    /// Least e_1 in d_0.
    pub end: f64,
    /// Least e_2 in d_0.
    pub edge: f64,
    /// Least p_1 in d_0.
    pub pitch: f64,
    /// Least p_2 in d_0.
    pub gauge: f64,
    /// Greatest e_1 and e_2 of exposed steel: so many t …
    pub greatest_edge: f64,
    /// … and this.
    pub greatest_edge_beside: Length,
    /// Greatest p_1 and p_2 of exposed steel: so many t …
    pub greatest_spacing: f64,
    /// … and at most this.
    pub greatest_spacing_most: Length,
    /// Whether steel is exposed where the schedule does not say.
    pub exposed: bool,
    /// Threads that a bolt shows past its nut.
    pub threads_past_nut: f64,
    /// Washers on a bolt where nobody counts them.
    pub washers: f64,
    /// A socket's outer diameter in widths across flats.
    pub socket: f64,
}

/// Rules for fillet welds, EN 1993-1-8 section 4; throats a and lengths.
#[derive(Clone, Debug, PartialEq)]
pub struct WeldRules {
    /// The smallest throat that may be counted, 4.5.2(2).
    pub min_throat: Length,
    /// The shortest weld that may be counted, 4.5.1(2).
    pub min_length: Length,
    /// The same in throats; the larger counts.
    pub min_length_in_throats: f64,
    /// What each open end takes off the length, in throats, 4.5.1(1).
    pub end_loss_in_throats: f64,
    /// β_w by grade.
    pub(super) beta_w: BTreeMap<String, f64>,
}

/// Partial factors with their source.
#[derive(Clone, Debug, PartialEq)]
pub struct Annex {
    /// Its name: "recommended values".
    pub name: String,
    /// γ_M0.
    pub gamma_m0: f64,
    /// γ_M1.
    pub gamma_m1: f64,
    /// γ_M2.
    pub gamma_m2: f64,
    /// γ_Mu, for the resistance to tying; `None` where the annex states none.
    pub gamma_mu: Option<f64>,
    /// What "by-annex" means for [`Settings::row_forces`].
    pub row_forces: Option<RowForces>,
    /// γ_M3 and γ_M3,ser, for slip; `None` where the annex does not state both.
    pub gamma_m3: Option<(f64, f64)>,
    /// Where the values come from.
    pub source: String,
}

/// How row forces may be distributed.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum RowForces {
    /// EN 1993-1-8 6.2.7.2(9): beyond 1.9 F_t,Rd in a row the lower rows are limited in proportion to their lever arm.
    LinearBeyond19,
    /// UK practice: plastic if the plate or the flange is thin enough, else linear.
    ThinPlateOrLinear,
}

/// Where α comes from.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Alpha {
    /// EN 1993-1-8:2005 Figure 6.11.
    Chart,
    /// The formula of a draft of EN 1993-1-8:2024.
    Draft2024,
}

/// Which formula of Table 6.2 is used for mode 1.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum ModeOne {
    /// Method 1.
    Method1,
    /// Method 2: the bolt force spread under the washer.
    Method2,
}

/// Readings of the standard that practice is split on, and assumptions that are printed as such.
#[derive(Clone, Debug, PartialEq)]
pub struct Settings {
    /// See [`RowForces`].
    pub row_forces: RowForces,
    /// Whether the annex in use chooses it.
    pub row_forces_by_annex: bool,
    /// See [`Alpha`].
    pub alpha: Alpha,
    /// See [`ModeOne`].
    pub mode_one: ModeOne,
    /// A rolled section's strength by its flange thickness (true) or each element by its own (false).
    pub strength_by_flange: bool,
    /// The upper clamp of α in Figure 6.11.
    pub alpha_max: f64,
    /// Rows nearer to the centre of compression than this share of the supported member's depth carry shear only.
    pub shear_only_below: f64,
    /// Bolt tension that goes with shear: from the row's share (false) or as if fully used (true).
    pub shear_with_full_tension: bool,
    /// Thread in the shear plane.
    pub thread_in_shear_plane: bool,
    /// Limit of |N_Ed| / N_pl,Rd of the beam below which N is neglected, 6.2.7.1(2).
    pub axial_limit: f64,
    /// k_wc where the column's axial stress is not given.
    pub k_wc: f64,
}

/// Factors that EN 1993-1-8 leaves open in joints that carry shear.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SimpleRules {
    /// What divides the gross shear area of a plate.
    pub gross_shear: f64,
    /// The share of the bolts' shear resistance that a group beside a flexible end plate has.
    pub bolt_group: f64,
    /// The share of the shear area that a web has beside an end plate or a hole pattern.
    pub local_shear: f64,
    /// The share of the tension part in block tearing of a group loaded eccentrically.
    pub block_tearing: f64,
}

/// What counts as the same place or as touching, mm.
#[derive(Clone, Debug, PartialEq)]
pub struct Tolerances {
    /// Positions nearer than this are the same position.
    pub position: Length,
    /// Faces nearer than this touch.
    pub touch: Length,
    /// Sizes nearer than this are equal (float noise, rounding of an export).
    pub size: Length,
    /// Directions within this angle are parallel, degrees.
    pub angle: f64,
    /// Utilisation above 1 by less than this is still met (rounding of inputs); 0 unless edited.
    pub utilisation: f64,
}
