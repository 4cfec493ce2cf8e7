//! What each element means: an entity, an attribute of one, an item of a list, or nothing known.

use std::borrow::Cow;
use std::sync::Arc;

use super::super::cell::Cell;
use super::super::labels::Labels;
use super::super::limits::Limits;
use super::super::problems::{Problems, Spot};
use super::super::scalar;
use super::super::schema::{Attribute, Base, ClassId, Kind, Named, Schema};
use super::super::source::Source;
use super::super::waiting::WAITING;
use super::super::{Entities, Id};
use super::head::{self, Head, Pos};
use super::memory::Memory;
use super::scan::Unusual;
use super::slot::{Item, Slot, Target, stray_text, untyped};

/// What an open element is.
enum Frame<'x> {
    /// Around documents.
    Envelope,
    Document,
    Entity(Open),
    Slot(Slot<'x>),
}

/// An entity whose element is open.
#[derive(Clone, Copy)]
struct Open {
    id: Id,
    class: ClassId,
    /// Where in `Parser::repeated` its own start.
    repeated: usize,
}

/// A reference whose target had not been read yet.
pub(super) struct Waiting<'x> {
    pub label: Cow<'x, str>,
    pub spot: Spot,
}

/// A relation that stands inside `parent` by its inverse name, or is referred to there.
pub(super) struct Link {
    pub relation: Id,
    pub attribute: &'static str,
    pub parent: Id,
    pub spot: Spot,
}

pub(super) struct Parser<'x> {
    document: Source<'x>,
    schema: &'static Schema,
    pub entities: Entities,
    pub labels: Labels,
    pub waiting: Vec<Waiting<'x>>,
    pub links: Vec<Link>,
    pub problems: Problems,
    stack: Vec<Frame<'x>>,
    /// The items of all open slots, those of the innermost last.
    items: Vec<Item>,
    /// What comes for attributes of the open entities that have their list already, by the attribute's position.
    repeated: Vec<(usize, Cell)>,
    memory: Memory<'x>,
    /// How many open elements are passed over.
    skipping: usize,
    limits: Limits,
}

impl<'x> Parser<'x> {
    pub fn new(document: Source<'x>, file: Arc<str>, problems: Problems, limits: Limits) -> Self {
        let schema = Schema::ifc4(); // until the document says which
        Self {
            document,
            schema,
            entities: Entities::new(schema, file),
            labels: Labels::default(),
            waiting: Vec::new(),
            links: Vec::new(),
            problems,
            stack: Vec::new(),
            items: Vec::new(),
            repeated: Vec::new(),
            memory: Memory::new(),
            skipping: 0,
            limits,
        }
    }

    /// One for a later part of the document, which starts where this one stands among elements that hold entities.
    pub fn further_on(&self) -> Self {
        let mut part = Self::new(self.document, self.entities.file(), self.problems.without_any(), self.limits);
        part.labels = self.labels.further_on();
        part.start_document(self.schema);
        part.stack.clear();
        part.stack.extend(self.stack.iter().map(|frame| match frame {
            Frame::Envelope => Frame::Envelope,
            _ => Frame::Document,
        }));
        part
    }

    /// Whether it stands among elements that hold entities, that many of them within one another.
    pub fn is_among_entities(&self, depth: usize) -> bool {
        matches!(self.stack.last(), Some(Frame::Document)) && self.stack.len() == depth && self.skipping == 0
    }

    /// Takes over what was read of a later part of the document.
    ///
    /// # Errors
    /// An id is given in both of them, so that references in the later part may mean another entity.
    pub fn absorb(&mut self, part: Self) -> Result<(), Unusual> {
        if part.labels.find("", &part.entities).is_some() {
            return Err(Unusual); // it can't be told from those that have no id
        }
        let (ids, waiting) = (self.entities.len() as u32, self.waiting.len() as u32);
        let moved = |id: Id| Id(id.0 + if id.0 < WAITING { ids } else { waiting });
        if !self.labels.absorb(&self.entities, part.labels, &part.entities) {
            return Err(Unusual);
        }
        self.entities.absorb(part.entities, moved);
        self.waiting.extend(part.waiting);
        self.links.extend(part.links.into_iter().map(|link| Link {
            relation: moved(link.relation),
            parent: moved(link.parent),
            ..link
        }));
        self.problems.absorb(part.problems);
        Ok(())
    }

    /// Whether the open element is passed over with all that it holds.
    pub fn is_skipping(&self) -> bool {
        self.skipping > 0
    }

    /// Passes over one more element.
    pub fn skip(&mut self) {
        self.skipping += 1;
    }

    /// Whether no element is open.
    pub fn is_done(&self) -> bool {
        self.stack.is_empty() && self.skipping == 0
    }

    /// Whether an element that holds the entities is open.
    pub fn is_in_document(&self) -> bool {
        !matches!(self.stack.last(), None | Some(Frame::Envelope))
    }

    /// An element starts that holds those that hold the entities.
    pub fn start_envelope(&mut self) {
        self.stack.push(Frame::Envelope);
    }

    /// An element starts that holds the entities; all that are started have one schema.
    pub fn start_document(&mut self, schema: &'static Schema) {
        if self.entities.is_empty() {
            self.schema = schema;
            self.entities = Entities::new(schema, self.entities.file());
        }
        self.stack.push(Frame::Document);
    }

    /// An element starts; exactly one [`Parser::end`] follows it.
    pub fn start(&mut self, head: &Head<'x>) {
        if self.stack.len() >= self.limits.depth {
            let limits = self.limits;
            self.problems.add("element nested too deep", head.spot, || limits.too_deep(&head.name));
            self.skip();
        } else if head.name == "include" {
            self.problems
                .add("XInclude", head.spot, || "an XInclude is not followed: only this one document is read".into());
            self.skip();
        } else {
            match self.stack.last() {
                Some(Frame::Entity(open)) => {
                    let class = open.class;
                    self.start_attribute(head, class);
                }
                Some(Frame::Slot(_)) => self.start_in_slot(head),
                Some(Frame::Document | Frame::Envelope) | None => self.start_in_document(head),
            }
        }
    }

    fn start_in_document(&mut self, head: &Head<'x>) {
        if is_entity_name(&head.name) {
            return self.start_item(head, Kind::ANY);
        }
        if head.name != "header" {
            self.problems.add("element that is not understood", head.spot, || {
                format!("{} is not read: entities and one header are allowed here", head.name)
            });
        }
        self.skip();
    }

    /// An attribute's element inside an entity.
    fn start_attribute(&mut self, head: &Head<'x>, class: ClassId) {
        let (target, kind) = if let Some((index, kind)) = self.attribute(class, &head.name) {
            (Target::Attribute(index), kind)
        } else if let Some(inverse) = self.schema.inverse(class, &head.name) {
            (Target::Inverse(inverse.attribute), Kind { depth: 1, ..Kind::one(Base::Entity(inverse.class)) })
        } else {
            self.unknown_attribute(class, &head.name, head.spot);
            (Target::Extra, Kind::ANY)
        };
        if head.is_reference() {
            self.deliver_reference(head, target, kind);
        } else if head.nil {
            self.skip();
        } else {
            let named = head.class.as_deref().map_or(Named::Neither, |name| self.schema.named(name));
            let slot = Slot::new(head, self.items.len(), target, kind);
            if let Named::Type(name, kind) = named {
                self.stack.push(Frame::Slot(slot.typed(name, kind)));
            } else if head.class.is_some() || head.id.is_some() || !head.rest.is_empty() {
                self.start_direct(slot, named, head);
            } else {
                self.stack.push(Frame::Slot(slot));
            }
        }
    }

    /// An attribute's element that is itself the entity.
    fn start_direct(&mut self, slot: Slot<'x>, named: Named, head: &Head<'x>) {
        let class = match (slot.kind.base, &head.class) {
            (Base::Entity(_) | Base::Select | Base::Any, Some(name)) => self.class(name, named, head),
            (Base::Entity(class), None) if !self.schema.class(class).is_some_and(|c| c.is_abstract) => class,
            (Base::Entity(_) | Base::Select | Base::Any, None) => {
                let class = if let Base::Entity(class) = slot.kind.base { class } else { self.entities.class_id("") };
                self.problems.add("missing xsi:type", head.spot, || {
                    format!("{} does not say by xsi:type which entity it is", head.name)
                });
                class
            }
            _ => {
                for (name, _) in &head.rest {
                    self.problems.add("unknown attribute", head.spot, || {
                        format!("{} holds a plain value and has no attribute {name}", head.name)
                    });
                }
                return self.stack.push(Frame::Slot(slot));
            }
        };
        let open = self.open(class, head);
        self.deliver(slot.target, &slot.name, slot.kind, slot.pos, Cell::entity(open.id), slot.spot);
        self.push(open);
    }

    /// A child of an attribute's element: an item of it, or the sign that the element is itself the entity.
    fn start_in_slot(&mut self, head: &Head<'x>) {
        let Some(Frame::Slot(slot)) = self.stack.last() else { return };
        let kind = slot.kind;
        if is_entity_name(&head.name) || head.name.ends_with("-wrapper") {
            return self.start_item(head, kind);
        }
        let may_be_entity = matches!(kind.base, Base::Entity(_) | Base::Select | Base::Any)
            && slot.items == self.items.len()
            && slot.target != Target::Item
            && slot.typed.is_none();
        if !may_be_entity {
            self.problems.add("element that is not understood", head.spot, || {
                format!("{} is not read: an entity or a wrapped value is required here", head.name)
            });
            return self.skip();
        }
        if let Some(Frame::Slot(slot)) = self.stack.pop() {
            stray_text(&slot.text, &slot.name, slot.spot, &mut self.problems);
            let outer = Head { name: slot.name.clone(), spot: slot.spot, ..Head::default() };
            self.start_direct(slot, Named::Neither, &outer);
        }
        if let Some(Frame::Entity(open)) = self.stack.last() {
            let class = open.class;
            self.start_attribute(head, class);
        }
    }

    /// An entity, a reference to one, or a wrapped value, at the top of the document or in a slot of that kind.
    fn start_item(&mut self, head: &Head<'x>, kind: Kind) {
        let (name, wrapped) = match head.name.strip_suffix("-wrapper") {
            Some(name) => (name, true),
            None => (head.class.as_deref().unwrap_or(&head.name), false),
        };
        let item = Kind { depth: 0, row: 0, ..kind };
        if head.is_reference() {
            return self.deliver_reference(head, Target::Item, kind);
        }
        if head.nil {
            return self.skip();
        }
        let named = self.schema.named(name);
        if let Named::Type(name, typed) = named {
            let slot = Slot::new(head, self.items.len(), Target::Item, item);
            self.stack.push(Frame::Slot(slot.typed(name, typed)));
        } else if wrapped {
            let row = name.starts_with("Seq-"); // one row of a list of lists
            let mut slot = Slot::new(head, self.items.len(), Target::Item, Kind { depth: u8::from(row), ..item });
            if !row && matches!(kind.base, Base::Select | Base::Any) {
                self.problems.add("unknown type", head.spot, || format!("{name} is no type of the schema"));
                slot = slot.typed(self.entities.store.type_id(name), Kind::ANY);
            }
            self.stack.push(Frame::Slot(slot));
        } else {
            let class = self.class(name, named, head);
            let open = self.open(class, head);
            self.deliver(Target::Item, &head.name, kind, head.pos, Cell::entity(open.id), head.spot);
            self.push(open);
        }
    }

    /// The class of that name, which stands for `named` in the schema.
    fn class(&mut self, name: &str, named: Named, head: &Head<'x>) -> ClassId {
        let class = if let Named::Class(class) = named { class } else { self.entities.class_id(name) };
        match self.schema.class(class) {
            None => self.problems.add("unknown entity", head.spot, || {
                format!("{name} is no entity of the schema; it is kept, but nothing of it is understood")
            }),
            Some(known) if known.is_abstract => self
                .problems
                .add("abstract entity", head.spot, || format!("{name} is abstract: one of its subtypes is required")),
            Some(_) => {}
        }
        class
    }

    /// Starts an entity with what its start tag tells.
    fn open(&mut self, class: ClassId, head: &Head<'x>) -> Open {
        let label = head.id.as_deref().unwrap_or_default();
        let id = self.entities.open(class, label, head.spot);
        if head.id.is_some() {
            let first = self.labels.enter(id, &self.entities);
            if first != id {
                let at = self.entities.get(first).place();
                self.problems.add("id given twice", head.spot, || {
                    format!("the id {label} is given a second time; references to it mean the one at {at}")
                });
            }
        }
        for (name, raw) in &head.rest {
            let Some((index, kind)) = self.attribute(class, name) else {
                self.unknown_attribute(class, name, head.spot);
                let text = head::text(self.document, raw, head.spot, &mut self.problems);
                let text = self.entities.store.text(&text);
                self.entities.add_extra(id, name, text);
                continue;
            };
            match self.scalar(kind, raw, head.spot) {
                Ok(value) if self.entities.cell(id, index).is_absent() => {
                    if kind.base == Base::Select {
                        untyped(name, head.spot, &mut self.problems);
                    }
                    self.entities.set(id, index, value);
                }
                Ok(_) => self.given_twice(class, name, head.spot),
                Err(wrong) => {
                    let class = self.entities.class_name(class);
                    self.problems
                        .add("value that is not understood", head.spot, || format!("{name} of {class} {wrong}"));
                }
            }
        }
        Open { id, class, repeated: 0 }
    }

    /// Opens the element of an entity, once the entity has been delivered.
    fn push(&mut self, open: Open) {
        self.stack.push(Frame::Entity(Open { repeated: self.repeated.len(), ..open }));
    }

    /// The value of an XML attribute.
    ///
    /// # Errors
    /// What is wrong with it, in words that follow "…: ".
    fn scalar(&mut self, kind: Kind, raw: &'x [u8], spot: Spot) -> Result<Cell, String> {
        let (known, place) = self.memory.recall(kind, raw);
        if let Some(cell) = known {
            return Ok(cell);
        }
        let Some(text) = head::plain(self.document, raw) else {
            let text = head::text(self.document, raw, spot, &mut self.problems);
            return scalar::parse(&mut self.entities.store, kind, &text);
        };
        let cell = scalar::parse(&mut self.entities.store, kind, text)?;
        if let Some(place) = place {
            self.memory.remember(place, kind, raw, cell);
        }
        Ok(cell)
    }

    fn deliver_reference(&mut self, head: &Head<'x>, target: Target, kind: Kind) {
        self.skip(); // content beside a reference would define the entity a second time
        if let Some(elsewhere) = &head.elsewhere {
            self.problems.add("reference to another document", head.spot, || {
                format!("{} refers to {}: other documents are not read", head.name, scalar::quoted(elsewhere))
            });
        } else if let Some(label) = &head.reference {
            let id = self.labels.find(label, &self.entities).unwrap_or_else(|| {
                self.waiting.push(Waiting { label: label.clone(), spot: head.spot });
                Id(WAITING + (self.waiting.len() - 1) as u32)
            });
            self.deliver(target, &head.name, kind, head.pos, Cell::entity(id), head.spot);
        }
    }

    /// Brings a value to its target in the innermost open element; `name` is that of the element it comes from.
    fn deliver(&mut self, target: Target, name: &str, kind: Kind, pos: Option<Pos>, value: Cell, spot: Spot) {
        match (self.stack.last(), target) {
            (_, _) if value.is_absent() => {}
            (Some(Frame::Slot(_)), Target::Item) => self.items.push((pos, value)),
            (Some(Frame::Entity(open)), Target::Extra) => self.entities.add_extra(open.id, name, value),
            (Some(Frame::Entity(open)), Target::Inverse(attribute)) => {
                let single = [value];
                let relations = if value.is_list() { self.entities.store.items(value) } else { &single };
                let parent = open.id;
                let relations = relations.iter().filter_map(|relation| relation.to_entity());
                self.links.extend(relations.map(|relation| Link { relation, attribute, parent, spot }));
            }
            (Some(Frame::Entity(open)), Target::Attribute(index)) => {
                let Open { id, class, .. } = *open;
                // the element of an attribute that takes several entities may be one of them, and be repeated
                let several = kind.depth > 0 && matches!(kind.base, Base::Entity(_) | Base::Select);
                let held = self.entities.cell(id, index);
                if held.is_absent() && !(several && value.to_entity().is_some()) {
                    self.entities.set(id, index, value);
                } else if several && (held.is_absent() || held.is_list()) {
                    if held.is_absent() {
                        self.entities.set(id, index, Cell::EMPTY_LIST);
                    }
                    if value.is_list() {
                        let items = self.entities.store.items(value);
                        self.repeated.extend(items.iter().map(|item| (index, *item)));
                    } else {
                        self.repeated.push((index, value));
                    }
                } else {
                    self.given_twice(class, self.attributes(class)[index].name, spot);
                }
            }
            _ => {}
        }
    }

    /// Ends an entity: its lists take up what came for them later.
    fn close(&mut self, open: Open) {
        if self.repeated.len() > open.repeated {
            let mut repeated = self.repeated.split_off(open.repeated);
            repeated.sort_by_key(|(index, _)| *index); // stable: the order of the document stands
            for group in repeated.chunk_by(|(a, _), (b, _)| a == b) {
                let index = group[0].0;
                let held = self.entities.store.items(self.entities.cell(open.id, index));
                let items: Vec<Cell> = held.iter().copied().chain(group.iter().map(|(_, cell)| *cell)).collect();
                let list = self.entities.store.list(&items);
                self.entities.set(open.id, index, list);
            }
        }
        // the schema derives these from others; some writers put a value nevertheless
        for (index, _) in self.attributes(open.class).iter().enumerate().filter(|(_, a)| a.derived) {
            self.entities.set(open.id, index, Cell::ABSENT);
        }
    }

    /// Whether white space that comes next may be part of a value.
    pub fn is_in_text(&self) -> bool {
        matches!(self.stack.last(), Some(Frame::Slot(slot)) if !slot.text.is_empty())
    }

    /// Text inside the innermost open element.
    pub fn text(&mut self, text: Cow<'x, str>, spot: Spot) {
        match self.stack.last_mut() {
            Some(Frame::Slot(slot)) if slot.text.is_empty() && text.trim().is_empty() => {}
            Some(Frame::Slot(slot)) if slot.text.is_empty() => slot.text = text,
            Some(Frame::Slot(slot)) => slot.text.to_mut().push_str(&text),
            Some(Frame::Entity(open)) => {
                stray_text(&text, self.entities.class_name(open.class), spot, &mut self.problems);
            }
            Some(Frame::Document | Frame::Envelope) | None => {
                stray_text(&text, "the document", spot, &mut self.problems)
            }
        }
    }

    /// The innermost open element ends.
    pub fn end(&mut self) {
        if self.is_skipping() {
            self.skipping -= 1;
            return;
        }
        match self.stack.pop() {
            Some(Frame::Entity(open)) => self.close(open),
            Some(Frame::Slot(slot)) => {
                let value = slot.value(&mut self.items, &mut self.entities.store, &mut self.problems);
                self.deliver(slot.target, &slot.name, slot.kind, slot.pos, value, slot.spot);
            }
            Some(Frame::Document | Frame::Envelope) | None => {}
        }
    }

    /// The position and kind of an attribute.
    fn attribute(&self, class: ClassId, name: &str) -> Option<(usize, Kind)> {
        let class = self.schema.class(class)?;
        let index = class.position(name)?;
        Some((index, class.attributes.get(index)?.kind))
    }

    fn attributes(&self, class: ClassId) -> &'static [Attribute] {
        self.schema.class(class).map_or(&[], |c| &c.attributes)
    }

    fn unknown_attribute(&mut self, class: ClassId, name: &str, spot: Spot) {
        if self.schema.class(class).is_some() {
            let class = self.entities.class_name(class);
            self.problems.add("unknown attribute", spot, || format!("{class} has no attribute {name}"));
        }
    }

    fn given_twice(&mut self, class: ClassId, name: &str, spot: Spot) {
        let class = self.entities.class_name(class);
        self.problems.add("attribute given twice", spot, || {
            format!("{name} of {class} is given more than once; the first is kept")
        });
    }
}

/// Entities and types begin with Ifc, attributes never do.
fn is_entity_name(name: &str) -> bool {
    name.get(..3).is_some_and(|start| start.eq_ignore_ascii_case("ifc"))
}
