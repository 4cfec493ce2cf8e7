//! What a rule may look at, and where its parts stand.

use crate::assess::{About, Assessment, Sense, State};
use crate::intent::{IntendedDetail, ScheduledJoint};
use crate::joints::{Joint, Layout, PlateSide};
use crate::origin::Place;
use crate::rulebook::Rulebook;
use crate::shop::{Identity, Steelwork};

/// All that a rule may look at: one joint (or one scheduled joint without steel).
pub struct Context<'a> {
    /// Rules and tables.
    pub rulebook: &'a Rulebook,
    /// The steel.
    pub steelwork: &'a Steelwork,
    /// Whether a schedule was given at all.
    pub schedule_given: bool,
    /// The joint; `None` if the scheduled joint has no steel, or fits no single joint.
    pub joint: Option<&'a Joint>,
    /// Its layout, where it could be laid out.
    pub layout: Option<&'a Layout>,
    /// What the schedule requires of it.
    pub scheduled: Option<&'a ScheduledJoint>,
    /// The intended detail.
    pub intended: Option<&'a IntendedDetail>,
    /// The assessment of what was detailed.
    pub assessment: Option<&'a Assessment>,
    /// The assessment of what was intended.
    pub intended_assessment: Option<&'a Assessment>,
    /// Whether the scheduled joint may have steel, but nobody can say which.
    pub unclear: bool,
}

/// GlobalIds of parts, and where to look in the model.
pub(super) type Parts = (Vec<String>, Option<Place>);

impl<'a> Context<'a> {
    /// Whether what was detailed carries what is required.
    ///
    /// An axial force beyond the limit of 6.2.7.1(2) takes the joint out of the method; that proves nothing either way.
    pub fn carries(&self) -> State {
        let Some(assessment) = self.assessment else { return State::Unproven };
        let mut verdicts = assessment.cases.iter().flat_map(|case| &case.verdicts);
        let short = verdicts.any(|v| v.state == State::NotMet && v.about != About::Axial);
        match assessment.carries() {
            State::NotMet if !short => State::Unproven,
            state => state,
        }
    }

    /// What was detailed and what was intended, where both are there to be compared.
    pub(super) fn both(&self) -> Option<(&'a Layout, &'a IntendedDetail)> {
        Some((self.layout?, self.intended?))
    }

    /// The sense of the largest required moment; `None` if no moment is asked for.
    pub(super) fn leading_sense(&self) -> Option<Sense> {
        let moments = self.scheduled?.cases.iter().filter_map(|case| case.moment);
        super::sense(moments.max_by(|a, b| a.abs().get().total_cmp(&b.abs().get()))?.get())
    }

    /// Every end plate with its beam, and what was intended of it, where both are there to be compared.
    pub(super) fn plates(&self) -> impl Iterator<Item = (PlateSide<'a>, &'a IntendedDetail)> + use<'a> {
        let both = self.both();
        both.into_iter().flat_map(|(layout, intended)| layout.sides().into_iter().map(move |side| (side, intended)))
    }

    /// The end plate of one side.
    pub(super) fn plate_of(&self, side: PlateSide<'_>) -> Parts {
        self.parts([side.plate.guid.as_str()])
    }

    /// The end plate, or the supported member's.
    pub(super) fn plate(&self) -> Parts {
        self.parts(self.layout.map(|layout| layout.side().plate.guid.as_str()))
    }

    /// The supporting member.
    pub(super) fn column(&self) -> Parts {
        self.parts(self.layout.map(|layout| layout.supporting().guid.as_str()))
    }

    /// The supported member.
    pub(super) fn beam(&self) -> Parts {
        self.parts(self.layout.map(|layout| layout.side().beam.guid.as_str()))
    }

    /// End plate and both members: all that a resistance stands on, the plate first.
    pub(super) fn whole(&self) -> Parts {
        let guids = self.layout.map(|l| [&l.side().plate.guid, &l.side().beam.guid, &l.supporting().guid]);
        self.parts(guids.iter().flatten().map(|guid| guid.as_str()))
    }

    /// Both members.
    pub(super) fn members(&self) -> Parts {
        let joint = self.joint.into_iter();
        let indices = joint.flat_map(|joint| [joint.supported, joint.supporting]).flatten();
        let guids = indices.filter_map(|i| self.steelwork.members.get(i)).map(|member| member.identity.guid.clone());
        (guids.filter(|guid| !guid.is_empty()).collect(), self.joint.and_then(|joint| joint.place.clone()))
    }

    /// The bolts.
    pub(super) fn bolts(&self) -> Parts {
        let bolts = self.joint.into_iter().flat_map(|joint| &joint.bolts);
        self.identified(bolts.filter_map(|&i| self.steelwork.bolts.get(i)).map(|bolt| &bolt.identity))
    }

    /// The welds of a role; the end plate where none is modelled.
    pub(super) fn welds(&self, role: &str) -> Parts {
        let welds = self.joint.into_iter().flat_map(|joint| &joint.welds).filter(|(_, of)| *of == role);
        let parts = self.identified(welds.filter_map(|(i, _)| self.steelwork.welds.get(*i)).map(|weld| &weld.identity));
        if parts.0.is_empty() { self.plate() } else { parts }
    }

    /// Parts by their GlobalIds; the place is that of the first, else the joint's.
    pub(super) fn parts<'g>(&self, guids: impl IntoIterator<Item = &'g str>) -> Parts {
        let guids: Vec<String> = guids.into_iter().filter(|guid| !guid.is_empty()).map(Into::into).collect();
        let first = guids.first().and_then(|guid| self.identities().find(|identity| identity.guid == *guid));
        let place = first.map(|identity| identity.place.clone());
        let joint = || self.joint.and_then(|joint| joint.place.clone());
        (guids, place.or_else(joint))
    }

    /// A group's bolts share one GlobalId, which is named once.
    fn identified<'i>(&self, identities: impl Iterator<Item = &'i Identity>) -> Parts {
        let mut guids: Vec<String> = Vec::new();
        let mut place = None;
        for identity in identities {
            place.get_or_insert_with(|| identity.place.clone());
            if !identity.guid.is_empty() && !guids.contains(&identity.guid) {
                guids.push(identity.guid.clone());
            }
        }
        (guids, place.or_else(|| self.joint.and_then(|joint| joint.place.clone())))
    }

    /// Members and plates of the joint.
    fn identities(&self) -> impl Iterator<Item = &'a Identity> {
        let (joint, steelwork) = (self.joint, self.steelwork);
        let members = joint.into_iter().flat_map(|joint| [joint.supporting, joint.supported]).flatten();
        let members = members.filter_map(|i| steelwork.members.get(i)).map(|member| &member.identity);
        let plates = joint.into_iter().flat_map(|joint| &joint.plates);
        members.chain(plates.filter_map(|(i, _)| steelwork.plates.get(*i)).map(|plate| &plate.identity))
    }
}
