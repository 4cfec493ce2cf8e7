//! A small building with two joints that are clear, and ways to spoil its exchange or its schedule.

use std::collections::BTreeSet;
use std::io;

use faying::review::{JointReview, Review};
use faying::run::{Failed, Inputs, run};

use crate::writer::building::{
    Along, Beam, BoltBody, Bolts, Building, ClassIn, Column, Detail, End, EndPlate, Joint, Level, PlateAs, Section,
    Stiffener, Storey, Welds,
};
use crate::writer::entity::{Entity, Field, Link, Simple, Sink};
use crate::writer::guid::global_id;
use crate::writer::ifcxml::{IfcXml, Style};
use crate::writer::model;

/// The building's name, from which its GlobalIds follow.
const NAME: &str = "Boat shed";

/// What both joints have to carry: one set each way, well inside what they resist (249 kNm one-sided, our own run).
pub const SCHEDULE: &str = r#"
[[joint]]
mark = "J1"
supporting = "C1"
supported = "B1"
end = "start"
case = [
  { name = "LC1", M_Ed_kNm = 150, V_Ed_kN = 120, N_Ed_kN = -10 },
  { name = "LC2", M_Ed_kNm = -40, V_Ed_kN = 60, N_Ed_kN = 12 },
]

[[joint]]
mark = "J2"
supporting = "C2"
supported = "B1"
end = "end"
case = [{ name = "LC1", M_Ed_kNm = 150, V_Ed_kN = 120, N_Ed_kN = -10 }]
"#;

// Sizes: BS 4-1, from memory; the rule book's section tables hold the same.
fn column(mark: &str, x: f64) -> Column {
    Column {
        mark: mark.into(),
        section: Section { name: "UKC 254x254x89".into(), h: 260.3, b: 256.3, t_w: 10.3, t_f: 17.3, r: 12.7 },
        grade: "S355JR".into(),
        at: [x, 0.0],
        bottom: 0.0,
        top: 4200.0,
        depth: Along::X,
    }
}

fn detail() -> Detail {
    Detail {
        plate: EndPlate { thickness: 25.0, width: 200.0, bottom: -20.0, top: 552.0, grade: "S275JR".into() },
        bolts: Bolts {
            diameter: 24.0,
            class: Some(("8.8".into(), ClassIn::Material)),
            gauge: 100.0,
            rows: vec![502.0, 392.0, 302.0, 70.0],
            length: None,
            body: BoltBody::Shank,
        },
        welds: Some(Welds { flange: 10.0, web: 6.0, bodies: false }),
        stiffeners: vec![Stiffener { at: Level::Bottom, thickness: 12.0, grade: "S275JR".into(), throat: 6.0 }],
    }
}

/// Beam B1 from C1 (joint J1, at its start) to C2 (joint J2, at its end), bolted through one flange each.
pub fn shed() -> Building {
    let end = |column, mark: &str| End::Joint {
        column,
        joint: Box::new(Joint { mark: mark.into(), told: false, detail: detail() }),
    };
    Building {
        name: NAME.into(),
        site: [1200.0, -300.0, 4000.0],
        storeys: vec![
            Storey { name: "Ground".into(), elevation: 0.0 },
            Storey { name: "Loft".into(), elevation: 3300.0 },
        ],
        columns: vec![column("C1", 0.0), column("C2", 6500.0)],
        beams: vec![Beam {
            mark: "B1".into(),
            section: Section { name: "UKB 457x191x74".into(), h: 457.0, b: 190.4, t_w: 9.0, t_f: 14.5, r: 10.2 },
            grade: "S355JR".into(),
            top: 3600.0,
            ends: [end(0, "J1"), end(1, "J2")],
        }],
        fittings: Vec::new(),
        boltings: Vec::new(),
        notches: Vec::new(),
        plates: PlateAs::Plate,
    }
}

/// The shed with a third column and a second beam B2 between C2 and C3, level with B1: joints J3 and J4.
pub fn long_shed() -> Building {
    let mut building = shed();
    building.columns.push(column("C3", 13000.0));
    let mut second = building.beams[0].clone();
    second.mark = "B2".into();
    for (end, at, name) in [(0, 1, "J3"), (1, 2, "J4")] {
        if let End::Joint { column, joint } = &mut second.ends[end] {
            (*column, joint.mark) = (at, name.into());
        }
    }
    building.beams.push(second);
    building
}

/// A schedule of joints with one load case LC1: mark, column, beam, end, M in kNm.
pub fn one_case(lines: &[(&str, &str, &str, &str, f64)]) -> String {
    let line = |(mark, column, beam, end, moment): &(&str, &str, &str, &str, f64)| {
        format!(
            "[[joint]]\nmark = \"{mark}\"\nsupporting = \"{column}\"\nsupported = \"{beam}\"\nend = \"{end}\"\n\
             case = [{{ name = \"LC1\", M_Ed_kNm = {moment}, V_Ed_kN = 120, N_Ed_kN = 0 }}]\n\n"
        )
    };
    lines.iter().map(line).collect()
}

/// The detail of joint J1.
pub fn j1(building: &mut Building) -> &mut Detail {
    match &mut building.beams[0].ends[0] {
        End::Joint { joint, .. } => &mut joint.detail,
        End::Free(_) => unreachable!("the shed's beam has joints at both ends"),
    }
}

/// The GlobalId of a part by the writer's path: "beam B1/start/bolt 1L".
pub fn guid(path: &str) -> String {
    global_id(&format!("{NAME}/{path}"))
}

/// Changes an entity, owned ones included; `false` leaves it out, and whatever refers to it forgets it.
pub type Edit<'a> = &'a dyn Fn(&mut Entity) -> bool;

/// Writes what an [`Edit`] leaves of each entity.
struct Edited<'a, S> {
    to: S,
    /// Sees each entity that stands by itself, before its own are edited.
    before: &'a dyn Fn(&mut Entity),
    edit: Edit<'a>,
    left_out: BTreeSet<u64>,
}

impl<S: Sink> Sink for Edited<'_, S> {
    fn new_id(&mut self) -> u64 {
        self.to.new_id()
    }

    fn put(&mut self, mut entity: Entity) -> io::Result<()> {
        (self.before)(&mut entity);
        if self.keep(&mut entity) { self.to.put(entity) } else { Ok(()) }
    }
}

impl<S> Edited<'_, S> {
    fn keep(&mut self, entity: &mut Entity) -> bool {
        entity.fields.retain_mut(|field| {
            let links = match field {
                Field::One(_, _, link) => return self.keep_link(link),
                Field::Many(_, links) => links,
                Field::Inverse { relations, .. } => relations,
                Field::Simple(..) | Field::Typed(..) => return true,
            };
            links.retain_mut(|link| self.keep_link(link));
            true
        });
        let keep = (self.edit)(entity);
        if !keep {
            self.left_out.extend(entity.id);
        }
        keep
    }

    fn keep_link(&mut self, link: &mut Link) -> bool {
        match link {
            Link::Own(owned) => self.keep(owned),
            Link::To(_, id) => !self.left_out.contains(id),
        }
    }
}

/// The exchange of a building, edited on its way.
pub fn written(building: &Building, edit: Edit<'_>) -> String {
    written_as(Style::default(), building, edit)
}

/// The same in a style.
pub fn written_as(style: Style, building: &Building, edit: Edit<'_>) -> String {
    write(style, building, &|_| {}, edit)
}

/// The same; `before` sees each entity that stands by itself before its own are edited.
pub fn written_within(building: &Building, before: &dyn Fn(&mut Entity), edit: Edit<'_>) -> String {
    write(Style::default(), building, before, edit)
}

fn write(style: Style, building: &Building, before: &dyn Fn(&mut Entity), edit: Edit<'_>) -> String {
    let mut bytes = Vec::new();
    let document = IfcXml::begin(&mut bytes, style, &building.name).expect("memory takes it");
    let mut sink = Edited { to: document, before, edit, left_out: BTreeSet::new() };
    model::write(building, &mut sink).expect("memory takes it");
    sink.to.finish().expect("memory takes it");
    String::from_utf8(bytes).expect("the writer writes UTF-8")
}

/// The exchange as it is.
pub fn plain(building: &Building) -> String {
    written(building, &|_| true)
}

/// A value of an entity by its attribute.
pub fn simple<'a>(entity: &'a mut Entity, name: &str) -> Option<&'a mut Simple> {
    entity.fields.iter_mut().find_map(|field| match field {
        Field::Simple(own, value) if *own == name => Some(value),
        _ => None,
    })
}

/// An owned entity by the attribute that holds it.
pub fn owned<'a>(entity: &'a mut Entity, name: &str) -> Option<&'a mut Entity> {
    entity.fields.iter_mut().find_map(|field| match field {
        Field::One(own, _, Link::Own(owned)) if *own == name => Some(owned),
        _ => None,
    })
}

/// Whether an entity is the part of that path.
pub fn is(entity: &mut Entity, path: &str) -> bool {
    matches!(simple(entity, "GlobalId"), Some(Simple::Text(own)) if *own == guid(path))
}

/// A list of entities by the attribute that holds it.
pub fn many<'a>(entity: &'a mut Entity, name: &str) -> Option<&'a mut Vec<Link>> {
    entity.fields.iter_mut().find_map(|field| match field {
        Field::Many(own, links) if *own == name => Some(links),
        _ => None,
    })
}

/// The profile of a product's first solid.
pub fn profile(product: &mut Entity) -> &mut Entity {
    let mut at = owned(product, "Representation").expect("a product with a shape");
    for list in ["Representations", "Items"] {
        at = match many(at, list).and_then(|links| links.first_mut()) {
            Some(Link::Own(inner)) => inner,
            _ => unreachable!("a shape has {list}"),
        };
    }
    owned(at, "SweptArea").expect("a solid with a profile of its own")
}

/// The axis placement of a product.
pub fn axes(entity: &mut Entity) -> &mut Entity {
    let local = owned(entity, "ObjectPlacement").expect("a product with a placement");
    owned(local, "RelativePlacement").expect("a local placement")
}

/// The coordinates of a product's origin, in its storey, mm.
pub fn origin(entity: &mut Entity) -> &mut Vec<f64> {
    let location = owned(axes(entity), "Location").expect("a location");
    match simple(location, "Coordinates") {
        Some(Simple::Reals(own)) => own,
        _ => unreachable!("a point has coordinates"),
    }
}

/// Reviews a model against a schedule, if any.
pub fn review(model: &str, schedule: Option<&str>) -> Result<Review, Failed> {
    let schedules = schedule.iter().map(|text| ("schedule.toml", text.as_bytes())).collect();
    run(&Inputs { model: ("model.ifcxml", model.as_bytes()), schedules, rules: Vec::new() })
}

/// The joint of that mark.
pub fn joint<'a>(review: &'a Review, mark: &str) -> Option<&'a JointReview> {
    review.joints.iter().find(|joint| joint.mark == mark)
}

/// Everything that a joint says about how it ends, for messages.
pub fn told(review: &Review) -> String {
    let one = |j: &JointReview| {
        let rules: Vec<&str> = j.findings.iter().map(|f| f.rule).collect();
        format!("{} {} {:?} {:?} {rules:?} {:#?}", j.mark, j.kind, j.outcome, j.utilisation(), j.reasons)
    };
    let joints: Vec<String> = review.joints.iter().map(one).collect();
    let problems: Vec<String> = review.problems.iter().map(|p| p.message.clone()).collect();
    let rejected: Vec<String> = review.survey.rejected.iter().map(|(who, why, _)| format!("{who}: {why}")).collect();
    format!("{}\nproblems {problems:#?}\nrejected {rejected:#?}", joints.join("\n"))
}
