//! A grid of cells over the steelwork, so that each part is held only against its neighbours.

use std::collections::HashMap;

use foldhash::fast::RandomState;
use glam::DVec3;

use super::boxes::Slab;

/// Edge of a cell, mm: about a joint's size.
const CELL: f64 = 1000.0;

/// A box over more cells than this is a neighbour of everything.
const MOST_CELLS: i64 = 4096;

type Cell = [i64; 3];

/// Which parts lie in which cell. The map is only looked up, never walked, so that its order shows nowhere.
#[derive(Default)]
pub(super) struct Grid {
    cells: HashMap<Cell, Vec<usize>, RandomState>,
    wide: Vec<usize>,
    count: usize,
}

impl Grid {
    /// A grid of boxes, each under its index; long ones are put in slice by slice.
    pub(super) fn of(boxes: &[Option<Slab>]) -> Self {
        let mut grid = Self { count: boxes.len(), ..Self::default() };
        for (index, slab) in boxes.iter().enumerate() {
            let Some(slab) = slab else { continue };
            grid.put(index, slab);
        }
        grid
    }

    fn put(&mut self, index: usize, slab: &Slab) {
        let slices = (slab.half.z * 2.0 / CELL).ceil().max(1.0);
        if !(slices <= MOST_CELLS as f64) {
            return self.wide.push(index);
        }
        let step = slab.half.z * 2.0 / slices;
        for slice in 0..slices as usize {
            let along = (slice as f64 + 0.5) * step - slab.half.z;
            let part = Slab {
                centre: slab.centre + slab.axes[2] * along,
                half: DVec3::new(slab.half.x, slab.half.y, step / 2.0),
                ..*slab
            };
            let (lo, hi) = part.bounds();
            let Some(cells) = cells(lo, hi) else { return self.wide.push(index) };
            for cell in cells {
                let inside = self.cells.entry(cell).or_default();
                if inside.last() != Some(&index) {
                    inside.push(index);
                }
            }
        }
    }

    /// Puts the indices of the boxes that may reach into the given extents, ascending, in place of what is in `found`.
    pub(super) fn near(&self, lo: DVec3, hi: DVec3, found: &mut Vec<usize>) {
        found.clear();
        let Some(cells) = cells(lo, hi) else { return found.extend(0..self.count) };
        found.extend(&self.wide);
        for cell in cells {
            found.extend(self.cells.get(&cell).into_iter().flatten());
        }
        found.sort_unstable();
        found.dedup();
    }
}

fn cells(lo: DVec3, hi: DVec3) -> Option<impl Iterator<Item = Cell>> {
    let (lo, hi) = ((lo / CELL).floor(), (hi / CELL).floor());
    let spans = hi - lo + DVec3::ONE;
    let few = lo.is_finite() && hi.is_finite() && spans.element_product() <= MOST_CELLS as f64;
    let [x, y, z] = [0, 1, 2].map(|i| lo[i] as i64..=hi[i] as i64);
    few.then(move || {
        x.flat_map(move |x| {
            let z = z.clone();
            y.clone().flat_map(move |y| z.clone().map(move |z| [x, y, z]))
        })
    })
}
