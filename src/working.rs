//! The working of a calculation: its steps, each with symbol, expression, value and clause.
//!
//! The code of a formula is its printed working: [`step!`](crate::step) evaluates an expression, binds it to the
//! symbol and notes the very text that was evaluated, so the calculation sheet can't drift from the calculation.

use crate::units::{Quantity, Shown};

/// One line of a working.
#[derive(Clone, Debug, PartialEq)]
pub struct Step {
    /// A heading printed before this step: "row 2".
    pub heading: Option<String>,
    /// The symbol of the standard, in code spelling: `F_T_1_Rd`.
    pub symbol: &'static str,
    /// The expression as it was evaluated; `None` for a value given from outside.
    pub expression: Option<&'static str>,
    /// The value.
    pub value: Shown,
    /// Clause, table or figure; for a given value, what it is.
    pub clause: &'static str,
}

/// The steps of one calculation, in the order in which they were made.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Working {
    /// The steps.
    pub steps: Vec<Step>,
    pending: Option<String>,
}

impl Working {
    /// Puts a heading before the next step.
    pub fn heading(&mut self, heading: impl Into<String>) {
        self.pending = Some(heading.into());
    }

    /// Notes one evaluated step; called by [`step!`](crate::step).
    pub fn step<Q: Quantity>(
        &mut self,
        symbol: &'static str,
        expression: &'static str,
        value: Q,
        clause: &'static str,
    ) {
        let heading = self.pending.take();
        self.steps.push(Step { heading, symbol, expression: Some(expression), value: value.shown(), clause });
    }

    /// Notes a value given from outside; called by [`given!`](crate::given).
    pub fn given<Q: Quantity>(&mut self, symbol: &'static str, value: Q, what: &'static str) {
        let heading = self.pending.take();
        self.steps.push(Step { heading, symbol, expression: None, value: value.shown(), clause: what });
    }

    /// Takes over the steps of another working.
    pub fn absorb(&mut self, mut other: Working) {
        if let (Some(first), heading @ Some(_)) = (other.steps.first_mut(), self.pending.take()) {
            first.heading = heading;
        }
        self.steps.append(&mut other.steps);
    }
}

/// Binds `symbol = expression` and notes it in the working with its clause.
///
/// `step!(w, "Table 6.2", F_T_1_Rd = 4.0 * M_pl_1_Rd / m);`
#[macro_export]
macro_rules! step {
    ($working:expr, $clause:expr, $symbol:ident = $expression:expr) => {
        let $symbol = $expression;
        $working.step(stringify!($symbol), stringify!($expression), $symbol, $clause);
    };
}

/// Notes values given from outside: `given!(w, "of the end plate"; t_f, m, e);`
#[macro_export]
macro_rules! given {
    ($working:expr, $what:expr; $($symbol:ident),+ $(,)?) => {
        $($working.given(stringify!($symbol), $symbol, $what);)+
    };
}
