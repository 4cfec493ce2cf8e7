//! What is noted while the numbers of a joint are gathered.

use super::MemberStrength;
use crate::assess::{Gap, Input};
use crate::joints::MemberAt;
use crate::origin::{Ask, Datum, Known, Missing, Origin};
use crate::rulebook::{Grade, Rulebook, Section, Strength};
use crate::units::{Length, mm};

/// No rolled I section of the tables has a larger root radius.
pub(super) const R_MOST: Length = mm(30.0);

/// What was noted while the numbers were gathered.
#[derive(Debug, Default)]
pub struct Noted {
    pub inputs: Vec<Input>,
    pub assumptions: Vec<String>,
    pub gaps: Vec<Gap>,
    pub not_credited: Vec<String>,
}

impl Noted {
    pub(in crate::assess) fn take<T: Clone>(
        &mut self,
        name: &str,
        known: &Known<T>,
        print: impl Fn(&T) -> String,
    ) -> Option<T> {
        match known {
            Ok(datum) => {
                self.inputs.push(Input::of(name, datum, print));
                if let Origin::Assumed(by) = &datum.origin {
                    self.assumptions.push(format!("{name}: {by}"));
                }
                Some(datum.value.clone())
            }
            Err(missing) => {
                self.gaps.push(Gap::NotChecked(missing.clone()));
                None
            }
        }
    }

    pub(in crate::assess) fn not_checked(&mut self, what: &str, reason: String, ask: Ask) {
        self.gaps.push(Gap::NotChecked(Missing { what: what.into(), reason, at: None, ask }));
    }

    pub(in crate::assess) fn lower_bound(&mut self, what: &str, reason: String) {
        self.gaps.push(Gap::LowerBound(Missing { what: what.into(), reason, at: None, ask: Ask::Fabricator }));
    }

    pub(in crate::assess) fn member(
        &mut self,
        role: &str,
        at: &MemberAt,
        rulebook: &Rulebook,
    ) -> Option<(Section, MemberStrength, Length)> {
        let section = self.take(&format!("{role} section"), &at.section, |s| s.designation.clone());
        let grade = self.take(&format!("{role} grade"), &at.grade, |g: &Grade| g.0.clone());
        let (section, grade) = (section?, grade?);
        let flange = self.strength(&format!("{role} flange strength"), rulebook, &grade, section.t_f)?;
        let web = if section.rolled && rulebook.settings.strength_by_flange {
            flange
        } else {
            self.strength(&format!("{role} web strength"), rulebook, &grade, section.t_w)?
        };
        let r = section.r.unwrap_or_else(|| {
            self.lower_bound(
                &format!("{role} root radius"),
                format!("the model gives none and the section is in no table; taken as 0, or as {R_MOST} where a large one is the worse"),
            );
            Length::ZERO
        });
        let strength = MemberStrength { f_y_flange: flange.f_y, f_y_web: web.f_y, f_u: flange.f_u.min(web.f_u) };
        Some((section, strength, r))
    }

    pub(in crate::assess) fn strength(
        &mut self,
        name: &str,
        rulebook: &Rulebook,
        grade: &Grade,
        t: Length,
    ) -> Option<Strength> {
        let known = rulebook.strength(grade, t);
        self.take(name, &known, |s| format!("fy {}, fu {} at {t}", s.f_y, s.f_u))
    }

    /// A size taken from the geometry.
    pub(in crate::assess) fn given(&mut self, name: &str, value: Length, what: &str) {
        self.inputs.push(Input::of(name, &Datum::new(value, Origin::Derived(what.into())), print_length));
    }
}

pub(in crate::assess) fn print_length(length: &Length) -> String {
    length.to_string()
}
