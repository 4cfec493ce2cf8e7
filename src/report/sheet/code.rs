//! What stands in a step's code, and what it comes to with the values that were noted before it.

use std::f64::consts::PI;

use syn::{BinOp, Expr, Lit, UnOp};

use crate::units::Shown;
use crate::working::Step;

/// What the symbols stood for so far: the last of a name counts.
pub(super) struct Values<'a> {
    steps: &'a [Step],
    /// Values that every working may use: partial factors.
    common: &'a [(&'static str, f64)],
}

impl<'a> Values<'a> {
    /// Those of the steps before a step.
    pub(super) fn before(steps: &'a [Step], common: &'a [(&'static str, f64)]) -> Self {
        Self { steps, common }
    }

    pub(super) fn of(&self, name: &str) -> Option<Shown> {
        if let Some(step) = self.steps.iter().rev().find(|step| step.symbol == name) {
            return Some(step.value);
        }
        let own = self.common.iter().find(|(own, _)| *own == name);
        own.map(|(_, value)| Shown { value: *value, unit: "" }).or(match name {
            // E of EN 1993-1-1 3.2.6.
            "E" => Some(Shown { value: crate::eurocode::E.get(), unit: "N/mm²" }),
            _ => None,
        })
    }
}

/// How much of the fixed unit (mm, N) one of a printed unit is.
pub(super) fn scale(unit: &str) -> Option<f64> {
    Some(match unit {
        "" | "mm" | "mm²" | "N/mm²" | "N/mm" => 1.0,
        "kN" | "cm³" => 1e3,
        "kNm" => 1e6,
        _ => return None,
    })
}

pub(super) fn strip(expr: &Expr) -> &Expr {
    match expr {
        Expr::Paren(inner) => strip(&inner.expr),
        Expr::Group(inner) => strip(&inner.expr),
        other => other,
    }
}

/// How tightly an expression binds: a sum, a product, a sign, or a thing of its own.
pub(super) fn binding(expr: &Expr) -> u8 {
    match expr {
        Expr::Binary(binary) if squared(binary) => 4,
        Expr::Binary(binary) => match binary.op {
            BinOp::Add(_) | BinOp::Sub(_) => 1,
            _ => 2,
        },
        Expr::Unary(_) => 3,
        _ => 4,
    }
}

/// Tighter than anything binds: always in brackets.
pub(super) const ALONE: u8 = 5;

/// The last part of a path: `PI` of `std::f64::consts::PI`; `ZERO` of `Length::ZERO`.
pub(super) fn name_of(expr: &Expr) -> Option<String> {
    match expr {
        Expr::Path(path) => path.path.segments.last().map(|segment| segment.ident.to_string()),
        _ => None,
    }
}

pub(super) fn literal(expr: &Expr) -> Option<f64> {
    match expr {
        Expr::Lit(lit) => match &lit.lit {
            Lit::Float(float) => float.base10_parse().ok(),
            Lit::Int(int) => int.base10_parse().ok(),
            _ => None,
        },
        _ => None,
    }
}

/// The name and arguments of a call, the receiver of a method being its first: least(a, b), a.min(b).
pub(super) fn call(expr: &Expr) -> Option<(String, Vec<&Expr>)> {
    match expr {
        Expr::MethodCall(call) => {
            Some((call.method.to_string(), std::iter::once(&*call.receiver).chain(&call.args).collect()))
        }
        Expr::Call(call) => Some((name_of(&call.func)?, call.args.iter().collect())),
        _ => None,
    }
}

/// Flattens min(min(a, b), c).
pub(super) fn flat<'a>(name: &str, args: Vec<&'a Expr>) -> Vec<&'a Expr> {
    let nested = |arg: &'a Expr| match call(strip(arg)) {
        Some((inner, args)) if least(&inner) == least(name) && least(name) => flat(name, args),
        Some((inner, args)) if inner == "max" && name == "max" => flat(name, args),
        _ => vec![arg],
    };
    args.into_iter().flat_map(nested).collect()
}

pub(super) fn least(name: &str) -> bool {
    matches!(name, "min" | "least")
}

pub(super) fn evaluate(expr: &Expr, values: &Values<'_>) -> Option<f64> {
    let expr = strip(expr);
    if let Some(number) = literal(expr) {
        return Some(number);
    }
    if let Some((name, args)) = call(expr) {
        let args: Vec<f64> = args.into_iter().map(|arg| evaluate(arg, values)).collect::<Option<_>>()?;
        return match (name.as_str(), args.as_slice()) {
            ("min" | "least", [a, b]) => Some(a.min(*b)),
            ("max", [a, b]) => Some(a.max(*b)),
            ("not_negative", [a]) => Some(a.max(0.0)),
            ("sqrt", [a]) => Some(a.sqrt()),
            ("abs", [a]) => Some(a.abs()),
            ("powi", [a, b]) => Some(a.powf(*b)),
            ("epsilon", [f_y]) => Some((235.0 / f_y).sqrt()),
            _ => None,
        };
    }
    match expr {
        Expr::Binary(binary) => {
            let (a, b) = (evaluate(&binary.left, values)?, evaluate(&binary.right, values)?);
            match binary.op {
                BinOp::Add(_) => Some(a + b),
                BinOp::Sub(_) => Some(a - b),
                BinOp::Mul(_) => Some(a * b),
                BinOp::Div(_) => Some(a / b),
                _ => None,
            }
        }
        Expr::Unary(unary) if matches!(unary.op, UnOp::Neg(_)) => Some(-evaluate(&unary.expr, values)?),
        Expr::Path(_) => match name_of(expr)?.as_str() {
            "PI" => Some(PI),
            "ZERO" => Some(0.0),
            name => values.of(name).and_then(|shown| Some(shown.value * scale(shown.unit)?)),
        },
        _ => None,
    }
}

/// Whether a product is something times itself.
pub(super) fn squared(product: &syn::ExprBinary) -> bool {
    let (left, right) = (name_of(strip(&product.left)), name_of(strip(&product.right)));
    matches!(product.op, BinOp::Mul(_)) && left.is_some() && left == right
}

/// What is no formula, as it stands in the code.
pub(super) fn as_code(expr: &Expr) -> String {
    match expr {
        Expr::Field(field) => match &field.member {
            syn::Member::Named(name) => name.to_string(),
            syn::Member::Unnamed(index) => index.index.to_string(),
        },
        _ => "…".to_owned(),
    }
}
