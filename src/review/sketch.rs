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
    /// From an axis to the column flange's nearer side edge, mm.
    pub edge_column_mm: f64,
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

/// An end-plate joint as it is drawn.
#[derive(Clone, Debug, PartialEq)]
pub struct Sketch {
    /// The column.
    pub column: Profile,
    /// Height of the column's upper end, mm; `None` where it runs on past 10 m.
    pub column_top_mm: Option<f64>,
    /// Height of the column's lower end, mm; `None` where it runs on past 10 m.
    pub column_bottom_mm: Option<f64>,
    /// The beam.
    pub beam: Profile,
    /// The end plate.
    pub plate: PlateFace,
    /// "M24 8.8", as far as it is known.
    pub bolts: String,
    /// d, mm, if known.
    pub bolt_mm: Option<f64>,
    /// Rows from the top down.
    pub rows: Vec<SketchRow>,
    /// Throats of the beam's fillets at upper flange, web and lower flange, mm; `None` if not known.
    pub throats_mm: [Option<f64>; 3],
    /// The column's stiffeners, from the top down.
    pub stiffeners: Vec<SketchStiffener>,
}
