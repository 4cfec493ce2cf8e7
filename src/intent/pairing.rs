//! Which scheduled joint means which joint of the steel.
//!
//! A joint that stands under the wrong line of the schedule is worse than one that stands under none: whatever is not
//! certain is left unpaired and said.

use std::collections::{BTreeMap, BTreeSet};

use super::source::{fold, given, is_global_id};
use super::{Intent, Pairing, ScheduledJoint};
use crate::joints::{Joint, Joints};
use crate::origin::Problem;
use crate::shop::{Member, Steelwork};

/// Most candidates that a message names.
const MAX_NAMED: usize = 5;

/// The end of the supported member: false = start, true = end; `None` if the words name neither.
pub(super) fn end(words: &str) -> Option<bool> {
    match words.trim().to_lowercase().as_str() {
        "start" => Some(false),
        "end" => Some(true),
        _ => None,
    }
}

/// Pairs the schedule with the joints: by the members' GlobalIds, then the joint's mark, then the members' marks and
/// the end. Everything that a line states must fit, and what it states must fit one joint only.
///
/// The outcome depends on the order of neither list.
pub fn pair(intent: &Intent, joints: &Joints, steelwork: &Steelwork) -> Pairing {
    let steel = Steel::new(joints, steelwork);
    let mut pairing = Pairing { scheduled: vec![None; joints.joints.len()], ..Pairing::default() };
    let mut claims: BTreeMap<usize, Vec<usize>> = BTreeMap::new();
    for (index, line) in intent.joints.iter().enumerate() {
        match steel.meant(line) {
            Meant::One(joint) => claims.entry(joint).or_default().push(index),
            Meant::Nothing => pairing.not_found.push(index),
            Meant::Unclear(why) => {
                pairing.unclear.push(index);
                let message = format!("{} is not paired: {why}", name(line));
                pairing.problems.push(Problem { at: Some(line.at.clone()), message });
            }
        }
        if let Some(detail) = line.detail.as_ref().filter(|name| !intent.details.iter().any(|d| d.name == **name)) {
            let message = format!("{} uses the detail {}, which is not defined", name(line), given(detail));
            pairing.problems.push(Problem { at: Some(line.at.clone()), message });
        }
    }
    for (joint, lines) in claims {
        if let ([line], Some(place)) = (lines.as_slice(), pairing.scheduled.get_mut(joint)) {
            *place = Some(*line);
            continue;
        }
        let claimants = lines.iter().filter_map(|index| intent.joints.get(*index));
        let mut named: Vec<_> = claimants.map(|line| (&line.at, format!("{} ({})", name(line), line.at))).collect();
        named.sort();
        let at = named.first().map(|(at, _)| (*at).clone());
        let named: Vec<String> = named.into_iter().map(|(_, named)| named).collect();
        let message = format!(
            "{} all mean {}; none of them is paired",
            named.join(" and "),
            steel.names(&BTreeSet::from([joint]))
        );
        pairing.problems.push(Problem { at, message });
        pairing.unclear.extend(lines);
    }
    pairing.unclear.sort_unstable();
    pairing.problems.sort();
    pairing
}

/// How a scheduled joint is called in messages.
fn name(line: &ScheduledJoint) -> String {
    let stated = [("on", &line.supporting), ("at its", &line.end)];
    let mut name = match (&line.mark, &line.supported) {
        (Some(mark), _) => return format!("scheduled joint {}", given(mark)),
        (None, Some(supported)) => format!("scheduled joint of {}", given(supported)),
        (None, None) => "scheduled joint without a name".into(),
    };
    for (word, text) in stated {
        if let Some(text) = text {
            name += &format!(" {word} {}", given(text));
        }
    }
    name
}

/// What a scheduled joint means.
enum Meant {
    One(usize),
    /// No joint of the steel.
    Nothing,
    /// Perhaps some joint, but nobody can say which; a clause that says why.
    Unclear(String),
}

/// The joints by what a schedule may call them.
struct Steel<'a> {
    joints: &'a [Joint],
    members: &'a [Member],
    guids: BTreeSet<&'a str>,
    by_mark: BTreeMap<String, BTreeSet<usize>>,
    by_supported: BTreeMap<String, BTreeSet<usize>>,
    by_supporting: BTreeMap<String, BTreeSet<usize>>,
}

impl<'a> Steel<'a> {
    fn new(joints: &'a Joints, steelwork: &'a Steelwork) -> Self {
        let members = steelwork.members.as_slice();
        let guids = members.iter().map(|m| m.identity.guid.as_str()).filter(|guid| !guid.is_empty()).collect();
        let joints = joints.joints.as_slice();
        let mut steel = Self {
            joints,
            members,
            guids,
            by_mark: BTreeMap::new(),
            by_supported: BTreeMap::new(),
            by_supporting: BTreeMap::new(),
        };
        for (index, joint) in joints.iter().enumerate() {
            steel.by_mark.entry(fold(&joint.mark)).or_default().insert(index);
            let of = |member: Option<usize>| member.and_then(|i| members.get(i)).map(|member| &member.identity);
            for (role, identity) in
                [(&mut steel.by_supported, of(joint.supported)), (&mut steel.by_supporting, of(joint.supporting))]
            {
                let keys = identity.map(|who| [Some(who.guid.clone()), who.mark.as_deref().map(fold)]);
                for key in keys.into_iter().flatten().flatten() {
                    role.entry(key).or_default().insert(index);
                }
            }
        }
        steel
    }

    /// Whether a text of the schedule means this member; `None` if nobody knows.
    fn is(&self, text: &str, member: Option<usize>) -> Option<bool> {
        let identity = &self.members.get(member?)?.identity;
        if self.guids.contains(text) {
            return Some(identity.guid == text);
        }
        match &identity.mark {
            Some(mark) => Some(fold(mark) == fold(text)),
            // The GlobalId of some other model: not this member.
            None => is_global_id(text).then_some(false),
        }
    }

    /// Whether anything that the line states speaks against the joint.
    fn contradicts(&self, line: &ScheduledJoint, joint: &Joint) -> bool {
        let wrong = |text: &Option<String>, member| text.as_ref().is_some_and(|t| self.is(t, member) == Some(false));
        let wrong_end = match (line.end.as_deref().and_then(end), joint.at_end) {
            (Some(stated), Some(found)) => stated != found,
            _ => false,
        };
        wrong(&line.supporting, joint.supporting) || wrong(&line.supported, joint.supported) || wrong_end
    }

    fn meant(&self, line: &ScheduledJoint) -> Meant {
        if let Some(words) = line.end.as_deref().filter(|words| end(words).is_none()) {
            return Meant::Unclear(format!("its end is {}; allowed are start and end", given(words)));
        }
        let by_members = self.by_members(line);
        let Some(mark) = &line.mark else {
            return by_members.unwrap_or_else(|| Meant::Unclear("it has no name".into()));
        };
        let none = BTreeSet::new();
        let by_mark = self.by_mark.get(&fold(mark)).unwrap_or(&none);
        let mut marked = by_mark.iter();
        match (marked.next(), marked.next(), by_members) {
            (None, _, by_members) => by_members.unwrap_or(Meant::Nothing),
            (Some(_), _, Some(Meant::One(joint))) if !by_mark.contains(&joint) => Meant::Unclear(format!(
                "its mark fits {}, its members fit {}",
                self.names(by_mark),
                self.names(&BTreeSet::from([joint]))
            )),
            (Some(joint), None, _) if self.joints.get(*joint).is_none_or(|found| self.contradicts(line, found)) => {
                Meant::Unclear(format!("its mark fits {}, but its members or end do not", self.names(by_mark)))
            }
            (Some(joint), None, _) => Meant::One(*joint),
            (Some(_), Some(_), Some(Meant::One(joint))) => Meant::One(joint),
            (Some(_), Some(_), _) => Meant::Unclear(format!("its mark fits several joints: {}", self.names(by_mark))),
        }
    }

    /// What the members and the end of a line mean; `None` if they are not enough to name a joint.
    fn by_members(&self, line: &ScheduledJoint) -> Option<Meant> {
        let supported = line.supported.as_ref()?;
        let key = if self.guids.contains(supported.as_str()) { supported.clone() } else { fold(supported) };
        let none = BTreeSet::new();
        let of_beam = self.by_supported.get(&key).unwrap_or(&none);
        let at_end = |index: &usize| self.joints.get(*index).and_then(|joint| joint.at_end);
        let supporting = |index: &usize| self.joints.get(*index).and_then(|joint| joint.supporting);
        let fits: BTreeSet<usize> = match &line.supporting {
            Some(text) => of_beam.iter().filter(|i| self.is(text, supporting(i)) == Some(true)).copied().collect(),
            None => of_beam.clone(),
        };
        if let Some(text) = line.supporting.as_ref().filter(|_| fits.is_empty()) {
            let of_support = self.by_supporting.get(&key).unwrap_or(&none);
            let supported = |index: &usize| self.joints.get(*index).and_then(|joint| joint.supported);
            let exchanged: BTreeSet<usize> =
                of_support.iter().filter(|i| self.is(text, supported(i)) == Some(true)).copied().collect();
            if !exchanged.is_empty() {
                let names = self.names(&exchanged);
                let why = format!("its members fit {names} with supporting and supported exchanged");
                return Some(Meant::Unclear(why));
            }
        }
        let Some(stated) = line.end.as_deref().and_then(end) else {
            // A member has two ends. If one of its joints is not in the steel, the other must not stand in for it.
            return match line.supporting {
                None if line.mark.is_some() => None,
                None if !fits.is_empty() => {
                    let names = self.names(&fits);
                    Some(Meant::Unclear(format!("neither end nor supporting member is stated; it may be {names}")))
                }
                _ => Some(self.only(&fits)),
            };
        };
        let exact: BTreeSet<usize> = fits.iter().filter(|i| at_end(i) == Some(stated)).copied().collect();
        if !exact.is_empty() || fits.is_empty() {
            return Some(self.only(&exact));
        }
        let unknown = fits.iter().any(|i| at_end(i).is_none());
        Some(match &line.supporting {
            Some(_) if fits.len() == 1 && unknown => self.only(&fits),
            None if !unknown => Meant::Nothing,
            _ => Meant::Unclear(format!("its members fit {}, its end does not", self.names(&fits))),
        })
    }

    /// One joint, none, or a choice that nobody may make.
    fn only(&self, fits: &BTreeSet<usize>) -> Meant {
        let mut all = fits.iter();
        match (all.next(), all.next()) {
            (None, _) => Meant::Nothing,
            (Some(joint), None) => Meant::One(*joint),
            _ => Meant::Unclear(format!("its members fit several joints: {}", self.names(fits))),
        }
    }

    /// The marks of joints with their places, sorted.
    fn names(&self, joints: &BTreeSet<usize>) -> String {
        let mut names: Vec<String> = joints.iter().filter_map(|i| self.joints.get(*i)).map(|j| self.name(j)).collect();
        names.sort();
        let more = names.len().saturating_sub(MAX_NAMED);
        names.truncate(MAX_NAMED);
        let more = if more > 0 { format!(" and {more} more") } else { String::new() };
        names.join(", ") + &more
    }

    fn name(&self, joint: &Joint) -> String {
        let supported = joint.supported.and_then(|i| self.members.get(i)).map(|m| m.identity.guid.as_str());
        let place = joint.place.as_ref().map(ToString::to_string);
        let words: Vec<&str> = [supported, place.as_deref()].into_iter().flatten().filter(|w| !w.is_empty()).collect();
        let mark = given(&joint.mark);
        if words.is_empty() { mark } else { format!("{mark} ({})", words.join(", ")) }
    }
}
