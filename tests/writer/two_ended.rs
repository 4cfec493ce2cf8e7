//! Relations with both of their ends, for forms that know no inverse attributes.

use std::collections::BTreeMap;
use std::io;

use super::entity::{Declared, Entity, Field, Link, Sink};
use super::model::Reference;
use super::version::Version;

/// The end of a relation that takes several; a relation that is shared waits for all of them.
const SEVERAL: &str = "RelatedObjects";

/// Takes relations out of the entities that hold them and gives them the end that this implied.
pub struct TwoEnded<S> {
    to: S,
    /// An end whose relations stay where they are.
    kept: Option<&'static str>,
    waiting: BTreeMap<u64, (Entity, Vec<Reference>)>,
}

/// A relation, the attribute that points back, and to whom.
type Held = (Link, &'static str, Reference);

impl<S: Sink> TwoEnded<S> {
    /// Before such a sink.
    pub fn new(to: S) -> Self {
        Self { to, kept: None, waiting: BTreeMap::new() }
    }

    /// Before a sink that knows inverses of this end.
    pub fn but(to: S, kept: &'static str) -> Self {
        Self { kept: Some(kept), ..Self::new(to) }
    }

    /// Writes the relations that waited.
    pub fn finish(mut self) -> io::Result<S> {
        for (relation, ends) in self.waiting.into_values() {
            let ends = ends.iter().map(|(class, id)| Link::To(class, *id)).collect();
            self.to.put(sorted(relation.many(SEVERAL, ends)))?;
        }
        Ok(self.to)
    }

    fn take(&mut self, entity: &mut Entity, held: &mut Vec<Held>) {
        for field in std::mem::take(&mut entity.fields) {
            match field {
                Field::Inverse { back, relations, .. } if self.kept != Some(back) => {
                    let id = *entity.id.get_or_insert_with(|| self.to.new_id());
                    for mut relation in relations {
                        self.take_owned(&mut relation, held);
                        held.push((relation, back, (entity.class, id)));
                    }
                }
                mut other => {
                    other.links_mut().iter_mut().for_each(|link| self.take_owned(link, held));
                    entity.fields.push(other);
                }
            }
        }
    }

    fn take_owned(&mut self, link: &mut Link, held: &mut Vec<Held>) {
        if let Link::Own(owned) = link {
            self.take(owned, held);
        }
    }
}

impl<S: Sink> Sink for TwoEnded<S> {
    fn new_id(&mut self) -> u64 {
        self.to.new_id()
    }

    fn put(&mut self, mut entity: Entity) -> io::Result<()> {
        let mut held = Vec::new();
        self.take(&mut entity, &mut held);
        self.to.put(entity)?;
        for (relation, back, end) in held {
            match relation {
                Link::To(_, id) => {
                    self.waiting.get_mut(&id).expect("a shared relation is held where it is defined first").1.push(end);
                }
                Link::Own(relation) => match relation.id {
                    Some(id) if back == SEVERAL => {
                        self.waiting.insert(id, (relation, vec![end]));
                    }
                    _ => {
                        let end = Link::To(end.0, end.1);
                        let field = match back {
                            SEVERAL => Field::Many(back, vec![end]),
                            _ => Field::One(back, Declared::Wider, end),
                        };
                        self.to.put(sorted(relation.field(field)))?;
                    }
                },
            }
        }
        Ok(())
    }
}

/// With its attributes in the order of the schema, as the XSD wants it.
fn sorted(mut relation: Entity) -> Entity {
    let attributes = Version::Ifc4.schema().attributes(relation.class);
    relation.fields.sort_by_key(|field| attributes.iter().position(|a| a.name == field.name()));
    relation
}
