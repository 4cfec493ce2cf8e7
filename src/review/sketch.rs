//! The joint's geometry as plain data, for drawings: heights from the soffit of the beam's lower flange, lengths in mm.

/// A rolled or welded I section as it is drawn.
#[derive(Clone, Debug, PartialEq)]
pub struct Profile {
    /// Mark, section and grade, as far as they are known.
    pub label: String,
    /// h, mm.
    pub depth_mm: f64,
    /// b, mm.
    pub width_mm: f64,
    /// t_w, mm; `None` where the section is not known.
    pub web_mm: Option<f64>,
    /// t_f, mm; `None` where the section is not known.
    pub flange_mm: Option<f64>,
}

/// An end plate as it is drawn.
#[derive(Clone, Debug, PartialEq)]
pub struct PlateFace {
    /// Mark, thickness and grade, as far as they are known.
    pub label: String,
    /// t_p, mm.
    pub thickness_mm: f64,
    /// b_p, mm.
    pub width_mm: f64,
    /// Height of its lower edge, mm; negative below the soffit.
    pub bottom_mm: f64,
    /// Height of its upper edge, mm.
    pub top_mm: f64,
}

/// A row of two bolts, symmetrical about the web.
#[derive(Clone, Debug, PartialEq)]
pub struct SketchRow {
    /// Height, mm.
    pub height_mm: f64,
    /// Between the bolts' axes, mm.
    pub gauge_mm: f64,
    /// From an axis to the plate's nearer side edge, mm.
    pub edge_plate_mm: f64,
    /// From an axis to the nearer side edge of what the plate is bolted to, mm.
    pub edge_other_mm: f64,
}

/// A transverse stiffener of the column.
#[derive(Clone, Debug, PartialEq)]
pub struct SketchStiffener {
    /// Height of its middle plane, mm.
    pub height_mm: f64,
    /// t_s, mm.
    pub thickness_mm: f64,
    /// Length along the column's depth, mm.
    pub reach_mm: f64,
    /// Whether there is a plate on both sides of the web.
    pub both_sides: bool,
    /// Whether it reaches from flange to flange.
    pub full_depth: bool,
}

/// A plate flat on the column's web, or behind its flange.
#[derive(Clone, Debug, PartialEq)]
pub struct FlatPlate {
    /// mm.
    pub thickness_mm: f64,
    /// Along the column's depth (on the web) or across it (behind the flange), mm.
    pub width_mm: f64,
    /// Height of its lower edge, mm.
    pub bottom_mm: f64,
    /// Height of its upper edge, mm.
    pub top_mm: f64,
}

/// A diagonal stiffener of the column's web.
#[derive(Clone, Debug, PartialEq)]
pub struct SketchDiagonal {
    /// t, mm.
    pub thickness_mm: f64,
    /// Height at which it meets the flange with the joint, mm.
    pub near_mm: f64,
    /// The same at the other flange, mm.
    pub far_mm: f64,
    /// Whether there is a plate on both sides of the web.
    pub both_sides: bool,
}

/// A beam's end with its end plate.
#[derive(Clone, Debug, PartialEq)]
pub struct BeamEnd {
    /// The beam.
    pub beam: Profile,
    /// Height of its lower flange's soffit, mm: 0 for the beam that heights are measured from.
    pub soffit_mm: f64,
    /// Its end plate.
    pub plate: PlateFace,
    /// Throats of its fillets at upper flange, web and lower flange, mm; `None` if not known.
    pub throats_mm: [Option<f64>; 3],
}

/// The column that an end plate is bolted to.
#[derive(Clone, Debug, PartialEq)]
pub struct ColumnPart {
    /// The column.
    pub column: Profile,
    /// Height of its upper end, mm; `None` where it runs on past 10 m.
    pub top_mm: Option<f64>,
    /// Height of its lower end, mm; `None` where it runs on past 10 m.
    pub bottom_mm: Option<f64>,
    /// Its stiffeners, from the top down.
    pub stiffeners: Vec<SketchStiffener>,
    /// Supplementary plates on its web.
    pub web_plates: Vec<FlatPlate>,
    /// Diagonal stiffeners.
    pub diagonals: Vec<SketchDiagonal>,
    /// Backing plates behind its flange.
    pub backing: Vec<FlatPlate>,
}

/// What an end plate is bolted to.
#[derive(Clone, Debug, PartialEq)]
pub enum Against {
    /// A column's flange.
    Column(ColumnPart),
    /// Another beam's end plate.
    Beam(BeamEnd),
}

/// A joint with an end plate as it is drawn.
#[derive(Clone, Debug, PartialEq)]
pub struct Sketch {
    /// The supported member's end.
    pub end: BeamEnd,
    /// What it is bolted to.
    pub against: Against,
    /// "M24 8.8", as far as it is known.
    pub bolts: String,
    /// d, mm, if known.
    pub bolt_mm: Option<f64>,
    /// Rows from the top down.
    pub rows: Vec<SketchRow>,
}
