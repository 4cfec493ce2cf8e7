//! Quantities in fixed units: lengths in mm, forces in N, stresses in N/mm².
//!
//! Only the products that a formula of EN 1993-1-8 needs are defined, so that a formula which mixes up its
//! units does not compile. Comparisons and `min`/`max` let NaN through to the result, never hide it.

use std::fmt;
use std::ops::{Add, AddAssign, Div, Mul, Neg, Sub, SubAssign};

/// A value with its unit as it is printed in a working: the number is already in `unit`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Shown {
    /// The number, in `unit`.
    pub value: f64,
    /// The unit it is printed in; empty for a plain number.
    pub unit: &'static str,
}

impl fmt::Display for Shown {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        // By the value as it is rounded: 99.9999 and 100 read alike.
        let digits = match self.value.abs() {
            a if a >= 999.95 => 0,
            a if a >= 99.995 => 1,
            a if a >= 9.9995 => 2,
            _ => 3,
        };
        write!(f, "{:.digits$}", self.value)?;
        if self.unit.is_empty() { Ok(()) } else { write!(f, " {}", self.unit) }
    }
}

/// What can stand on a line of a working.
pub trait Quantity: Copy {
    /// The value in the unit in which engineers read it (kN, kNm, mm, N/mm²).
    fn shown(self) -> Shown;
}

impl Quantity for f64 {
    fn shown(self) -> Shown {
        Shown { value: self, unit: "" }
    }
}

macro_rules! quantity {
    ($(#[$doc:meta])* $name:ident, $unit:literal, $printed:literal, $per:literal) => {
        $(#[$doc])*
        #[derive(Clone, Copy, Debug, PartialEq, PartialOrd, Default)]
        pub struct $name(pub f64);

        impl $name {
            /// Nothing of it.
            pub const ZERO: Self = Self(0.0);

            /// The number in the fixed unit.
            pub const fn get(self) -> f64 {
                self.0
            }

            /// The smaller; NaN if either is NaN.
            pub fn min(self, other: Self) -> Self {
                if self.0.is_nan() || other.0 >= self.0 { self } else { other }
            }

            /// The larger; NaN if either is NaN.
            pub fn max(self, other: Self) -> Self {
                if self.0.is_nan() || other.0 <= self.0 { self } else { other }
            }

            /// Without its sign.
            pub fn abs(self) -> Self {
                Self(self.0.abs())
            }
        }

        impl Quantity for $name {
            fn shown(self) -> Shown {
                Shown { value: self.0 / $per, unit: $printed }
            }
        }

        impl fmt::Display for $name {
            fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
                self.shown().fmt(f)
            }
        }

        impl Add for $name {
            type Output = Self;
            fn add(self, other: Self) -> Self {
                Self(self.0 + other.0)
            }
        }

        impl Sub for $name {
            type Output = Self;
            fn sub(self, other: Self) -> Self {
                Self(self.0 - other.0)
            }
        }

        impl AddAssign for $name {
            fn add_assign(&mut self, other: Self) {
                self.0 += other.0;
            }
        }

        impl SubAssign for $name {
            fn sub_assign(&mut self, other: Self) {
                self.0 -= other.0;
            }
        }

        impl Neg for $name {
            type Output = Self;
            fn neg(self) -> Self {
                Self(-self.0)
            }
        }

        impl Mul<f64> for $name {
            type Output = Self;
            fn mul(self, by: f64) -> Self {
                Self(self.0 * by)
            }
        }

        impl Mul<$name> for f64 {
            type Output = $name;
            fn mul(self, by: $name) -> $name {
                $name(self * by.0)
            }
        }

        impl Div<f64> for $name {
            type Output = Self;
            fn div(self, by: f64) -> Self {
                Self(self.0 / by)
            }
        }

        impl Div for $name {
            type Output = f64;
            fn div(self, by: Self) -> f64 {
                self.0 / by.0
            }
        }

        impl std::iter::Sum for $name {
            fn sum<I: Iterator<Item = Self>>(all: I) -> Self {
                Self(all.map(|q| q.0).sum())
            }
        }
    };
}

quantity!(
    /// A length, mm.
    Length, "mm", "mm", 1.0
);
quantity!(
    /// An area, mm².
    Area, "mm2", "mm²", 1.0
);
quantity!(
    /// A section modulus (or any length cubed), mm³.
    Modulus, "mm3", "cm³", 1e3
);
quantity!(
    /// A stress or strength, N/mm².
    Stress, "N/mm2", "N/mm²", 1.0
);
quantity!(
    /// A force, N; printed in kN.
    Force, "N", "kN", 1e3
);
quantity!(
    /// A moment, N·mm; printed in kNm.
    Moment, "Nmm", "kNm", 1e6
);
quantity!(
    /// A second moment of area, mm⁴.
    SecondMoment, "mm4", "cm⁴", 1e4
);
quantity!(
    /// A rotational stiffness, N·mm/rad; printed in kNm/rad.
    Stiffness, "Nmm/rad", "kNm/rad", 1e6
);
quantity!(
    /// A force per length (of weld), N/mm.
    LineForce, "N/mm", "N/mm", 1.0
);

macro_rules! product {
    ($($a:ident * $b:ident = $c:ident);* $(;)?) => {$(
        impl Mul<$b> for $a {
            type Output = $c;
            fn mul(self, other: $b) -> $c {
                $c(self.0 * other.0)
            }
        }
    )*};
}

macro_rules! quotient {
    ($($a:ident / $b:ident = $c:ident);* $(;)?) => {$(
        impl Div<$b> for $a {
            type Output = $c;
            fn div(self, other: $b) -> $c {
                $c(self.0 / other.0)
            }
        }
    )*};
}

product! {
    Length * Length = Area;
    Length * Area = Modulus;
    Area * Length = Modulus;
    Modulus * Length = SecondMoment;
    Area * Stress = Force;
    Stress * Area = Force;
    Modulus * Stress = Moment;
    Stress * Modulus = Moment;
    Force * Length = Moment;
    Length * Force = Moment;
    Stress * Length = LineForce;
    Length * Stress = LineForce;
    LineForce * Length = Force;
    Length * LineForce = Force;
}

quotient! {
    Area / Length = Length;
    Modulus / Length = Area;
    SecondMoment / Length = Modulus;
    Modulus / Area = Length;
    Force / Area = Stress;
    Force / Stress = Area;
    Force / Length = LineForce;
    Force / LineForce = Length;
    Moment / Length = Force;
    Moment / Force = Length;
    Moment / Stress = Modulus;
    Moment / Modulus = Stress;
    LineForce / Stress = Length;
    LineForce / Length = Stress;
}

/// A length from mm.
pub const fn mm(value: f64) -> Length {
    Length(value)
}

/// A force from kN.
pub const fn kn(value: f64) -> Force {
    Force(value * 1e3)
}

/// A moment from kNm.
pub const fn knm(value: f64) -> Moment {
    Moment(value * 1e6)
}

/// A stress from N/mm².
pub const fn mpa(value: f64) -> Stress {
    Stress(value)
}

impl Force {
    /// The force in kN.
    pub const fn kn(self) -> f64 {
        self.0 / 1e3
    }
}

impl Moment {
    /// The moment in kNm.
    pub const fn knm(self) -> f64 {
        self.0 / 1e6
    }
}

impl Stiffness {
    /// The stiffness against which this moment turns by one radian.
    pub const fn per_radian(moment: Moment) -> Self {
        Self(moment.0)
    }

    /// The stiffness in kNm/rad.
    pub const fn knm_per_rad(self) -> f64 {
        self.0 / 1e6
    }
}
