//! A stronger part never makes a weaker joint, but for the cliff of 6.2.7.2(9), which a note then names.

use faying::assess::{MomentResistance, Sense};
use faying::rulebook::{RowForces, Rulebook};
use proptest::prelude::*;

use super::joint::{RULES, Sketch, resistance, sketches};

fn hogging(sketch: &Sketch, rulebook: &Rulebook) -> Option<std::sync::Arc<MomentResistance>> {
    resistance(&sketch.layout(rulebook), Sense::Hogging, 1.0, rulebook).ok()
}

/// By the standard's own rule, where the stronger joint may stand beyond the cliff and says so; and again with plastic row
/// forces throughout (a column flange of 14 mm and bolts from M20 are thin enough for any), where nothing excuses it.
fn never_weaker(
    sketch: &Sketch,
    weak: impl Fn(&mut Sketch),
    strong: impl Fn(&mut Sketch),
) -> Result<(), TestCaseError> {
    let standard = &*RULES;
    let mut plastic = standard.clone();
    plastic.settings.row_forces = RowForces::ThinPlateOrLinear;
    let thin = Sketch { column: "HEA 300", d: sketch.d.max(20.0), ..sketch.clone() };
    for (sketch, rulebook, may_fall) in [(sketch, standard, true), (&thin, &plastic, false)] {
        let [mut a, mut b] = [sketch.clone(), sketch.clone()];
        weak(&mut a);
        strong(&mut b);
        let (Some(a), Some(b)) = (hogging(&a, rulebook), hogging(&b, rulebook)) else { continue };
        let cliff = may_fall && b.notes.iter().any(|note| note.contains("1.9 Ft,Rd"));
        prop_assert!(
            b.without_welds >= a.without_welds * (1.0 - 1e-9) || cliff,
            "{} {:?}\n{} {:?}",
            a.without_welds,
            a.rows,
            b.without_welds,
            b.rows
        );
    }
    Ok(())
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(100))]
    /// Within one band of strength: a plate above 16 mm has a lower f_y.
    #[test]
    fn thicker_plate(sketch in sketches(), thin in 8.0..16.0f64, thick in 8.0..16.0f64) {
        for band in [0.0, 17.0] {
            never_weaker(&sketch, |s| s.t_p = band + thin.min(thick), |s| s.t_p = band + thin.max(thick))?;
        }
    }

    #[test]
    fn better_plate_grade(sketch in sketches()) {
        never_weaker(&sketch, |s| s.plate_grade = "S235", |s| s.plate_grade = "S275")?;
        never_weaker(&sketch, |s| s.plate_grade = "S275", |s| s.plate_grade = "S355")?;
    }

    #[test]
    fn stronger_bolts(sketch in sketches()) {
        never_weaker(&sketch, |s| s.class = "8.8", |s| s.class = "10.9")?;
    }

    /// The flanges' fillets only: the web's shorten 2πm, and with it the beam's web in tension by 6.2.6.8.
    #[test]
    fn larger_flange_weld(sketch in sketches(), more in 0.0..4.0f64) {
        never_weaker(&sketch, |_| (), |s| s.flange_weld += more)?;
    }

    #[test]
    fn compression_stiffener(sketch in sketches(), t in 6.0..16.0f64, more in 0.0..10.0f64) {
        let thicker = (t + more).min(16.0);
        never_weaker(&sketch, |s| s.bottom = None, |s| s.bottom = Some(t))?;
        never_weaker(&sketch, |s| s.bottom = Some(t), |s| s.bottom = Some(thicker))?;
    }

    /// With e ≤ 3.2 m in the column's flange: beyond, the chart's largest α, 8, is less than the plain pattern's
    /// 4 + 1.25 e/m.
    #[test]
    fn tension_stiffener(sketch in sketches(), gauge in 118.0..130.0f64, t in 4.0..16.0f64, more in 0.0..10.0f64) {
        let sketch = Sketch { gauge, ..sketch };
        let thicker = (t + more).min(16.0);
        never_weaker(&sketch, |s| s.top = None, |s| s.top = Some(t))?;
        never_weaker(&sketch, |s| s.top = Some(t), |s| s.top = Some(thicker))?;
    }
}
