//! Sizes of bolts, nuts and washers, mm.

/// A bolt size.
#[derive(Clone, Copy, Debug)]
pub struct Size {
    /// d.
    pub d: f64,
    /// Normal round hole: EN 1090-2, 2 mm clearance for these sizes.
    pub hole: f64,
    /// Thread pitch, coarse series.
    pub pitch: f64,
    /// Head height, ISO 4014.
    pub head: f64,
    /// Nut height at most, ISO 4032.
    pub nut: f64,
    /// Across flats of head and nut.
    pub across_flats: f64,
    /// Washer thickness and outer diameter, ISO 7089.
    pub washer: (f64, f64),
    /// Thread length up to l = 125, ISO 4014: 2 d + 6.
    pub thread: f64,
}

// From memory: ISO 4014, ISO 4032, ISO 7089.
const SIZES: [Size; 3] = [
    Size {
        d: 16.0,
        hole: 18.0,
        pitch: 2.0,
        head: 10.0,
        nut: 14.8,
        across_flats: 24.0,
        washer: (3.0, 30.0),
        thread: 38.0,
    },
    Size {
        d: 20.0,
        hole: 22.0,
        pitch: 2.5,
        head: 12.5,
        nut: 18.0,
        across_flats: 30.0,
        washer: (3.0, 37.0),
        thread: 46.0,
    },
    Size {
        d: 24.0,
        hole: 26.0,
        pitch: 3.0,
        head: 15.0,
        nut: 21.5,
        across_flats: 36.0,
        washer: (4.0, 44.0),
        thread: 54.0,
    },
];

// From memory: preferred lengths of ISO 4014 and ISO 4017.
const LENGTHS: [f64; 16] =
    [40.0, 45.0, 50.0, 55.0, 60.0, 65.0, 70.0, 80.0, 90.0, 100.0, 110.0, 120.0, 130.0, 140.0, 150.0, 160.0];

/// The size of a nominal diameter: M16, M20 or M24.
pub fn size(d: f64) -> Size {
    SIZES.into_iter().find(|size| size.d == d).unwrap_or_else(|| panic!("no bolt M{d}: M16, M20 and M24 are kept here"))
}

/// The shortest length whose thread sticks out of the nut by a pitch, with one washer under the nut.
pub fn length(size: Size, grip: f64) -> f64 {
    let least = grip + size.washer.0 + size.nut + size.pitch;
    LENGTHS.into_iter().find(|length| *length >= least).unwrap_or_else(|| panic!("no bolt as long as {least} mm"))
}
