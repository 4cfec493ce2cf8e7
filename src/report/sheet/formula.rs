//! Formulas as engineers read them, from the very text that was evaluated.
//!
//! A step of a working holds its expression as code: `(2.0 * M_pl_2_Rd + n * sum_F_t_Rd) / (m + n)`. It is printed in
//! symbols, then in numbers, and the numbers are shown only if the printed operation on them gives the printed result:
//! a name that meant something else further up can't slip in.

use syn::{BinOp, Expr};

use super::code::{
    ALONE, Values, as_code, binding, call, evaluate, flat, least, literal, name_of, scale, squared, strip,
};
use crate::working::Step;

/// A piece of a printed line.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::report) enum Piece {
    /// As it is.
    Text(String),
    /// A symbol in code spelling: `F_T_1_Rd`.
    Symbol(String),
}

/// A line in pieces.
pub(in crate::report) type Line = Vec<Piece>;

/// A line of one text.
pub(in crate::report) fn text(text: impl Into<String>) -> Line {
    vec![Piece::Text(text.into())]
}

/// Greek letters by their names in code.
const GREEK: [(&str, &str); 12] = [
    ("alpha", "α"),
    ("beta", "β"),
    ("gamma", "γ"),
    ("eps", "ε"),
    ("epsilon", "ε"),
    ("lambda", "λ"),
    ("sigma", "σ"),
    ("tau", "τ"),
    ("rho", "ρ"),
    ("chi", "χ"),
    ("omega", "ω"),
    ("Phi", "Φ"),
];

/// A symbol's letter and its subscript: `F_T_1_Rd` is F and "T,1,Rd", `gamma_M0` is γ and "M0", `leg` is a word.
pub(in crate::report) fn symbol(code: &str) -> (String, String) {
    let (sum, code) = match code.strip_prefix("sum_") {
        Some(rest) => ("Σ", rest),
        None => ("", code),
    };
    let (base, rest) = code.split_once('_').unwrap_or((code, ""));
    let (base, squared) = if rest == "squared" { (format!("{base}²"), "") } else { (base.to_owned(), rest) };
    let letter = GREEK.iter().find(|(name, _)| *name == base).map(|(_, letter)| *letter);
    match letter {
        Some(letter) => (format!("{sum}{letter}"), squared.replace('_', ",")),
        None if base.chars().count() <= 2 => (format!("{sum}{base}"), squared.replace('_', ",")),
        None => (format!("{sum}{}", code.replace('_', " ")), String::new()),
    }
}

/// A step's expression in symbols, and in numbers if they give its value; `None` for a value given from outside.
pub(in crate::report) fn printed(step: &Step, values: &Values<'_>) -> Option<(Line, Option<Line>)> {
    let code = step.expression?;
    let Ok(parsed) = syn::parse_str::<Expr>(code) else { return Some((text(code), None)) };
    let mut symbols = Writer { values: None, out: Vec::new(), unknown: false };
    symbols.write(&parsed, 0);
    // A number or another symbol gives the value without an operation.
    let bare = matches!(strip(&parsed), Expr::Lit(_) | Expr::Path(_));
    let gives = evaluate(&parsed, values).zip(scale(step.value.unit)).is_some_and(|(got, per)| {
        let expected = step.value.value * per;
        (got - expected).abs() <= 1e-9 * expected.abs().max(1e-9)
    });
    let mut numbers = Writer { values: Some(values), out: Vec::new(), unknown: false };
    numbers.write(&parsed, 0);
    let numbers = (gives && !bare && !numbers.unknown).then_some(numbers.out);
    Some((symbols.out, numbers))
}

struct Writer<'a> {
    /// Whose numbers stand for the symbols; `None` prints symbols.
    values: Option<&'a Values<'a>>,
    out: Line,
    /// Whether something has no number.
    unknown: bool,
}

impl Writer<'_> {
    fn put(&mut self, text: &str) {
        if let Some(Piece::Text(last)) = self.out.last_mut() {
            last.push_str(text);
        } else {
            self.out.push(Piece::Text(text.to_owned()));
        }
    }

    /// An expression, in brackets if it binds less tightly than what it stands in.
    fn write(&mut self, expr: &Expr, within: u8) {
        let expr = strip(expr);
        let brackets = binding(expr) < within;
        if brackets {
            self.put("(");
        }
        self.bare(expr);
        if brackets {
            self.put(")");
        }
    }

    fn bare(&mut self, expr: &Expr) {
        if let Some(number) = literal(expr) {
            return self.put(&number.to_string());
        }
        if let Some((name, args)) = call(expr) {
            return self.call(&name, args);
        }
        match expr {
            Expr::Binary(binary) if squared(binary) => self.power(&binary.left, Some(2.0)),
            Expr::Binary(binary) => {
                let (sign, left, right) = match binary.op {
                    BinOp::Add(_) => (" + ", 1, 1),
                    BinOp::Sub(_) => (" − ", 1, 2),
                    BinOp::Mul(_) => (" · ", 2, 2),
                    // A quotient under a quotient needs its brackets.
                    _ => (" / ", 2, 3),
                };
                self.write(&binary.left, left);
                self.put(sign);
                self.write(&binary.right, right);
            }
            Expr::Unary(unary) => {
                self.put("−");
                self.write(&unary.expr, 3);
            }
            Expr::Path(_) => match (name_of(expr).unwrap_or_default().as_str(), self.values) {
                ("PI", _) => self.put("π"),
                ("ZERO", _) => self.put("0"),
                (name, None) => self.out.push(Piece::Symbol(name.to_owned())),
                (name, Some(values)) => match values.of(name) {
                    // A negative number in the middle of a formula would read as an operation.
                    Some(shown) if shown.value < 0.0 => self.put(&format!("({shown})")),
                    Some(shown) => self.put(&shown.to_string()),
                    None => self.unknown = true,
                },
            },
            other => {
                self.unknown = true;
                self.put(&as_code(other));
            }
        }
    }

    /// A square or another whole power.
    fn power(&mut self, base: &Expr, power: Option<f64>) {
        let one_sign = literal(strip(base)).is_some() || name_of(strip(base)).is_some() && self.values.is_none();
        self.write(base, if one_sign { 0 } else { ALONE });
        match power {
            Some(2.0) => self.put("²"),
            Some(3.0) => self.put("³"),
            Some(other) => self.put(&format!("^{other}")),
            None => self.unknown = true,
        }
    }

    fn call(&mut self, name: &str, args: Vec<&Expr>) {
        match (name, args.as_slice()) {
            ("not_negative", [only]) => {
                self.put("max(");
                self.write(only, 0);
                self.put("; 0)");
            }
            ("sqrt", [only]) if binding(strip(only)) == 4 && call(strip(only)).is_none() => {
                self.put("√");
                self.write(only, 0);
            }
            ("sqrt", [only]) => {
                self.put("√(");
                self.write(only, 0);
                self.put(")");
            }
            ("abs", [only]) => {
                self.put("|");
                self.write(only, 0);
                self.put("|");
            }
            ("powi", [base, power]) => self.power(base, literal(strip(power))),
            _ => {
                let known = least(name) || matches!(name, "max" | "epsilon");
                self.unknown |= !known && self.values.is_some();
                self.put(match name {
                    "min" | "least" => "min",
                    "epsilon" => "ε",
                    other => other,
                });
                self.put("(");
                for (i, arg) in flat(name, args).into_iter().enumerate() {
                    if i > 0 {
                        self.put("; ");
                    }
                    self.write(arg, 0);
                }
                self.put(")");
            }
        }
    }
}
