//! The intended strengthening of the column, laid over what stands there.

use super::{Stated, missing};
use crate::intent::{DiagonalForm, IntendedStiffener};
use crate::joints::{Backing, Diagonal, EdgeWeld, EndPlateLayout, Stiffener, WebPlate};
use crate::origin::{Datum, Known, Missing};
use crate::rulebook::{Grade, Section};
use crate::units::{Length, mm};

/// An intended web plate whose length nobody states reaches this far beyond the beam's flanges: over all of the web in tension
/// and compression, as 6.2.6.1(10) asks.
const BEYOND: Length = mm(1000.0);

impl Stated<'_> {
    /// Everything that the detail states about the column's stiffeners; nothing where a section is not known.
    ///
    /// # Errors
    /// [`Missing`] where a grade or a thickness can't be resolved.
    pub(super) fn strengthening(&self, meant: &mut EndPlateLayout) -> Result<(), Missing> {
        let (Ok(beam), Ok(column)) = (&meant.beam.section, &meant.column.section) else { return Ok(()) };
        let (beam, column) = (beam.value.clone(), column.value.clone());
        self.stiffeners(meant, &beam, &column)?;
        self.web_plates(meant, &beam, &column)?;
        self.diagonals(meant, &beam, &column)?;
        self.backing(meant, &column)
    }

    fn stiffeners(&self, meant: &mut EndPlateLayout, beam: &Section, column: &Section) -> Result<(), Missing> {
        let (h, t_f) = (beam.h, beam.t_f);
        let stated = [(&self.detail.stiffener_top, h - 0.5 * t_f), (&self.detail.stiffener_bottom, 0.5 * t_f)];
        for (intended, height) in stated {
            let Some(intended) = intended else { continue };
            let level = |s: &Stiffener| (s.height - height).abs() <= t_f;
            let own = meant.stiffeners.iter().position(level).map(|i| meant.stiffeners.remove(i));
            let Some(pair) = intended else { continue };
            let stands = own.as_ref().map(|s| (s.thickness, &s.grade));
            let (thickness, grade) = self.plates("stiffener", pair, stands, &meant.column.grade)?;
            meant.stiffeners.push(Stiffener {
                guids: own.as_ref().map(|s| s.guids.clone()).unwrap_or_default(),
                height,
                thickness,
                outstand: own.as_ref().filter(|s| s.both_sides).map_or(free(column), |s| s.outstand),
                reach: pair.length.unwrap_or(column.h - 2.0 * column.t_f),
                both_sides: true,
                full_depth: pair.length.is_none_or(|length| length >= column.h - 2.0 * column.t_f),
                grade,
                weld: self.throat("stiffener", pair, own.map(|s| s.weld)),
            });
        }
        meant.stiffeners.sort_by(|a, b| b.height.get().total_cmp(&a.height.get()));
        Ok(())
    }

    fn web_plates(&self, meant: &mut EndPlateLayout, beam: &Section, column: &Section) -> Result<(), Missing> {
        let Some(intended) = &self.detail.web_plates else { return Ok(()) };
        let own = std::mem::take(&mut meant.strengthening.web_plates);
        let Some(plates) = intended else { return Ok(()) };
        let sides = self.detail.web_plate_sides.map_or(own.len().clamp(1, 2), usize::from);
        let width = column.h - 2.0 * (column.t_f + column.r.unwrap_or(Length::ZERO));
        for positive in [true, false].into_iter().take(sides) {
            let stands = own.iter().find(|plate| plate.positive == positive).or(own.first());
            let (thickness, grade) =
                self.plates("web plate", plates, stands.map(|p| (p.thickness, &p.grade)), &meant.column.grade)?;
            let weld = match plates.throat {
                Some(throat) => Ok(Datum::new(EdgeWeld::Fillet(throat), self.by("weld of the web plate"))),
                None => stands.map_or_else(|| Err(self.unstated("web plate")), |plate| plate.weld.clone()),
            };
            meant.strengthening.web_plates.push(WebPlate {
                guid: stands.map(|plate| plate.guid.clone()).unwrap_or_default(),
                positive,
                thickness,
                width,
                half_width: 0.5 * width,
                bottom: Length::ZERO - BEYOND,
                top: beam.h + BEYOND,
                grade,
                weld,
            });
        }
        Ok(())
    }

    fn diagonals(&self, meant: &mut EndPlateLayout, beam: &Section, column: &Section) -> Result<(), Missing> {
        let Some(intended) = &self.detail.diagonals else { return Ok(()) };
        let own = std::mem::take(&mut meant.strengthening.diagonals);
        let Some(plates) = intended else { return Ok(()) };
        let as_detailed = if own.len() == 2 { DiagonalForm::K } else { DiagonalForm::N };
        let (top, bottom) = (beam.h - 0.5 * beam.t_f, 0.5 * beam.t_f);
        let ends = match self.detail.diagonal_form.unwrap_or(as_detailed) {
            DiagonalForm::N => vec![(bottom, top)],
            DiagonalForm::K => vec![(top, 0.5 * beam.h), (bottom, 0.5 * beam.h)],
        };
        let first = own.first();
        let stands = first.map(|d| (d.thickness, &d.grade));
        let (thickness, grade) = self.plates("diagonal", plates, stands, &meant.column.grade)?;
        let weld = self.throat("diagonal", plates, first.map(|d| d.weld.clone()));
        let pairs = ends.into_iter().map(|(near, far)| Diagonal {
            guids: first.map(|d| d.guids.clone()).unwrap_or_default(),
            near,
            far,
            thickness,
            outstand: first.filter(|d| d.both_sides).map_or(free(column), |d| d.outstand),
            both_sides: true,
            full_depth: true,
            grade: grade.clone(),
            weld: weld.clone(),
        });
        meant.strengthening.diagonals = pairs.collect();
        Ok(())
    }

    /// Over all rows and 2 d beyond, from the root radius to the flange's edge.
    fn backing(&self, meant: &mut EndPlateLayout, column: &Section) -> Result<(), Missing> {
        let Some(intended) = &self.detail.backing_plates else { return Ok(()) };
        let own = std::mem::take(&mut meant.strengthening.backing);
        let Some(plates) = intended else { return Ok(()) };
        let stands = own.first().map(|b| (b.thickness, &b.grade));
        let (thickness, grade) = self.plates("backing plate", plates, stands, &meant.column.grade)?;
        let (Some(first), Some(last), Ok(d)) =
            (meant.bolts.rows.first(), meant.bolts.rows.last(), &meant.bolts.diameter)
        else {
            return Ok(());
        };
        let beyond = 2.0 * d.value;
        meant.strengthening.backing = vec![Backing {
            guids: own.first().map(|b| b.guids.clone()).unwrap_or_default(),
            thickness,
            bottom: last.height - beyond,
            top: first.height + beyond,
            from_web: column.r.unwrap_or(Length::ZERO),
            short_of_edge: Length::ZERO,
            both_sides: true,
            grade,
        }];
        Ok(())
    }

    /// Thickness and grade: as stated, else as they stand there, else the column's grade.
    fn plates(
        &self,
        what: &str,
        intended: &IntendedStiffener,
        stands: Option<(Length, &Known<Grade>)>,
        column: &Known<Grade>,
    ) -> Result<(Length, Known<Grade>), Missing> {
        let thickness = intended.thickness.or(stands.map(|(thickness, _)| thickness)).ok_or_else(|| {
            let reason = format!("the detail asks for a {what} and states no thickness");
            missing(&format!("intended {what} thickness"), reason, self.detail)
        })?;
        let grade = match &intended.grade {
            Some(text) => self.grade(&format!("intended {what} grade"), text)?,
            None => stands.map_or_else(|| column.clone(), |(_, grade)| grade.clone()),
        };
        Ok((thickness, grade))
    }

    fn throat(&self, what: &str, intended: &IntendedStiffener, stands: Option<Known<Length>>) -> Known<Length> {
        match intended.throat {
            Some(throat) => Ok(Datum::new(throat, self.by(&format!("weld of the {what}")))),
            None => stands.unwrap_or_else(|| Err(self.unstated(what))),
        }
    }

    fn unstated(&self, what: &str) -> Missing {
        missing(&format!("{what} weld"), "the detail states none".into(), self.detail)
    }
}

/// From the web to the flange's edge.
fn free(column: &Section) -> Length {
    0.5 * (column.b - column.t_w)
}
