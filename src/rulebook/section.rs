//! What follows from the sizes of an I or H section.

use std::f64::consts::PI;

use super::Section;
use crate::units::{Area, Length, Modulus, SecondMoment};

impl Section {
    /// I_y.
    pub fn i_y(&self) -> SecondMoment {
        0.5 * (self.w_el_y * self.h)
    }

    /// A doubly symmetric I or H section from its sizes (overall depth, flange width, web and flange thickness, root
    /// radius): every property is computed here and nowhere else, for catalogue sections too.
    ///
    /// A, W_el,y and W_pl,y of a rolled section include the four root fillets; without a radius they are left out,
    /// which is a lower bound. The fillets of a welded section are weld and are never counted.
    /// A_v,z: EN 1993-1-1:2005 6.2.6(3)a for rolled, d for welded sections, with η = 1.
    ///
    /// # Errors
    /// A sentence that says which sizes are no I section: not finite, not positive, or not fitting into each other.
    pub fn from_sizes(
        designation: &str,
        h: Length,
        b: Length,
        t_w: Length,
        t_f: Length,
        r: Option<Length>,
        rolled: bool,
    ) -> Result<Self, String> {
        let fillet = if rolled { r.unwrap_or(Length::ZERO) } else { Length::ZERO };
        for (name, size) in [("h", h), ("b", b), ("t_w", t_w), ("t_f", t_f)] {
            if !(size.get() > 0.0 && size.get().is_finite()) {
                return Err(format!("{designation}: {name} = {} mm; a size is a positive number", size.get()));
            }
        }
        if let Some(r) = r.filter(|r| !(r.get() >= 0.0 && r.get().is_finite())) {
            return Err(format!("{designation}: r = {} mm; a radius is a number from 0 up", r.get()));
        }
        let h_w = h - 2.0 * t_f;
        if !(h_w > 2.0 * fillet && b > t_w + 2.0 * fillet) {
            return Err(format!(
                "{designation}: h {} b {} t_w {} t_f {} r {} mm; the flanges, web and radii of an I section fit inside h and b",
                h.get(),
                b.get(),
                t_w.get(),
                t_f.get(),
                fillet.get()
            ));
        }

        // One fillet: a square r x r less a quarter circle. Its centroid lies `c` off the flange's face, its second
        // moment about that face is (1 - 5π/16) r^4.
        let a_fillet = (1.0 - PI / 4.0) * fillet.get().powi(2);
        let c = fillet.get() * (10.0 - 3.0 * PI) / (12.0 - 3.0 * PI);
        let i_fillet = (1.0 - 5.0 * PI / 16.0) * fillet.get().powi(4) - a_fillet * c * c;
        let arm = h_w.get() / 2.0 - c;

        let (h_, b_, t_w_, t_f_, h_w_) = (h.get(), b.get(), t_w.get(), t_f.get(), h_w.get());
        let area = 2.0 * b_ * t_f_ + h_w_ * t_w_ + 4.0 * a_fillet;
        let i_y = (b_ * h_.powi(3) - (b_ - t_w_) * h_w_.powi(3)) / 12.0 + 4.0 * (i_fillet + a_fillet * arm * arm);
        let w_pl_y = b_ * t_f_ * (h_ - t_f_) + t_w_ * h_w_ * h_w_ / 4.0 + 4.0 * a_fillet * arm;
        let web = h_w_ * t_w_;
        let a_v_z = if rolled { web.max(area - 2.0 * b_ * t_f_ + (t_w_ + 2.0 * fillet.get()) * t_f_) } else { web };
        Ok(Self {
            designation: designation.to_owned(),
            h,
            b,
            t_w,
            t_f,
            r,
            area: Area(area),
            w_pl_y: Modulus(w_pl_y),
            w_el_y: Modulus(2.0 * i_y / h_),
            a_v_z: Area(a_v_z),
            rolled,
        })
    }
}
