//! ifcXML of IFC4: a stream of elements into the entity graph.
//!
//! Elements alternate between an entity and its attributes. An attribute's element either *is* the entity
//! (`<Location Coordinates="0 0 0"/>`) or holds entities and wrapped values (`<Items><IfcExtrudedAreaSolid/></Items>`);
//! which of the two is told by its XML attributes or, failing those, by its first child.

mod head;
mod resolve;

use std::borrow::Cow;
use std::collections::HashMap;

use quick_xml::Reader;
use quick_xml::errors::Error;
use quick_xml::events::Event;

use self::head::{Head, Pos};
use super::problems::{Problems, Ruler, Spot};
use super::scalar;
use super::schema::{Base, ClassId, Kind, Schema};
use super::{Entities, Exchange, Id, Value};

/// How deep elements may nest; what lies deeper is not read, and a problem says so. Shop models stay below 200.
const DEEPEST: usize = 1000;

/// Ids from here on stand for references whose target had not been read yet.
const WAITING: u32 = 1 << 31;

/// Reads a document.
///
/// # Errors
/// Why it is no ifcXML at all, in one sentence.
pub(super) fn read(bytes: &[u8], problems: Problems, entities: Entities) -> Result<Exchange, String> {
    let mut xml = Reader::from_reader(bytes);
    xml.config_mut().allow_dangling_amp = true; // one badly written name must not lose the file
    let mut ruler = Ruler::new(bytes);
    let mut parser = Parser::new(entities, problems);
    let mut form = None;
    loop {
        let offset = xml.buffer_position() as usize;
        let event = match xml.read_event() {
            Ok(event) => event,
            Err(error) => {
                let spot = Ruler::new(bytes).spot(xml.error_position() as usize);
                return Err(not_well_formed(&error, spot));
            }
        };
        if let Event::Eof = event {
            let spot = ruler.spot(bytes.len());
            return match form {
                Some(_) if !parser.is_done() => Err(format!(
                    "breaks off at line {}, column {}: an element is not closed, the file is truncated",
                    spot.line, spot.column
                )),
                Some(form) => Ok(parser.finish(form)),
                None => Err("holds no XML element".into()),
            };
        }
        let spot = if parser.is_skipping() { Spot::default() } else { ruler.spot(offset) };
        let done = form.is_some() && parser.is_done();
        match event {
            Event::Start(_) | Event::Empty(_) if done => {
                let spot = ruler.spot(offset);
                return Err(format!("has a second document element at line {}, column {}", spot.line, spot.column));
            }
            Event::Start(_) if parser.is_skipping() => parser.skipping += 1,
            Event::Empty(_) if parser.is_skipping() => {}
            Event::Start(ref start) | Event::Empty(ref start) => {
                if form.is_none() {
                    form = Some(super::sniff::ifcxml_form(start, spot, &mut parser.problems)?);
                    parser.stack.push(Frame::Root);
                } else {
                    let head = Head::read(start, spot, &mut parser.problems).map_err(|error| {
                        format!("is not well-formed XML at line {}, column {}: {error}", spot.line, spot.column)
                    })?;
                    parser.start(head);
                }
                if let Event::Empty(_) = event {
                    parser.end();
                }
            }
            Event::End(_) => parser.end(),
            _ if parser.is_skipping() && !matches!(event, Event::End(_) | Event::DocType(_)) => {}
            Event::Text(text) => {
                let text = head::text(text.into_inner(), spot, &mut parser.problems);
                parser.text(text, spot);
            }
            Event::CData(data) => {
                let data = String::from_utf8_lossy(&data).into_owned();
                parser.text(data.into(), spot);
            }
            Event::GeneralRef(reference) => {
                let escape = [b"&", &reference[..], b";"].concat();
                let text = head::text(escape.into(), spot, &mut parser.problems);
                parser.text(text, spot);
            }
            Event::DocType(_) => {
                return Err(format!(
                    "holds a document type declaration (DTD) at line {}, column {}, which is not allowed in an exchange",
                    spot.line, spot.column
                ));
            }
            Event::Comment(_) | Event::PI(_) | Event::Decl(_) | Event::Eof => {}
        }
    }
}

fn not_well_formed(error: &Error, spot: Spot) -> String {
    let Spot { line, column } = spot;
    match error {
        Error::Syntax(error) => format!("breaks off inside the markup at line {line}, column {column}: {error}"),
        error => format!("is not well-formed XML at line {line}, column {column}: {error}"),
    }
}

/// What an open element is.
enum Frame {
    Root,
    Entity(Open),
    Slot(Slot),
}

/// An entity whose element is open.
struct Open {
    id: Id,
    class: ClassId,
    values: Vec<Value>,
    extras: Vec<(Box<str>, Value)>,
}

/// An element that holds the value of an attribute, or one value of a list or SELECT.
struct Slot {
    name: Box<str>,
    spot: Spot,
    target: Target,
    kind: Kind,
    /// The defined type that was chosen in a SELECT.
    typed: Option<Box<str>>,
    pos: Option<Pos>,
    items: Vec<(Option<Pos>, Value)>,
    text: String,
}

/// Where a value goes.
#[derive(Clone, PartialEq)]
enum Target {
    /// The attribute of that position of the entity around it.
    Attribute(usize),
    /// The inverse attribute of that position.
    Inverse(usize),
    /// An attribute that the schema does not know.
    Extra(Box<str>),
    /// The items of the slot around it.
    Item,
}

/// A reference whose target had not been read yet.
struct Waiting {
    label: Box<str>,
    spot: Spot,
}

/// A relation that stands inside `parent` by its inverse name, or is referred to there.
struct Link {
    relation: Id,
    attribute: &'static str,
    parent: Id,
    spot: Spot,
}

struct Parser {
    schema: &'static Schema,
    entities: Entities,
    labels: HashMap<Box<str>, Id>,
    waiting: Vec<Waiting>,
    links: Vec<Link>,
    problems: Problems,
    stack: Vec<Frame>,
    /// How many open elements are passed over.
    skipping: usize,
}

impl Parser {
    fn new(entities: Entities, problems: Problems) -> Self {
        Self {
            schema: Schema::ifc4(),
            entities,
            labels: HashMap::new(),
            waiting: Vec::new(),
            links: Vec::new(),
            problems,
            stack: Vec::new(),
            skipping: 0,
        }
    }

    fn is_skipping(&self) -> bool {
        self.skipping > 0
    }

    fn is_done(&self) -> bool {
        self.stack.is_empty() && self.skipping == 0
    }

    /// An element starts; exactly one [`Parser::end`] follows it.
    fn start(&mut self, head: Head) {
        if self.stack.len() >= DEEPEST {
            self.problems.add("element nested too deep", head.spot, || {
                format!("{} is nested deeper than {DEEPEST} elements and is not read", head.name)
            });
            self.skipping = 1;
        } else if head.name == "include" {
            self.problems.add("XInclude", head.spot, || "XInclude is not read; only this one document is".into());
            self.skipping = 1;
        } else {
            match self.stack.last() {
                Some(Frame::Entity(open)) => {
                    let class = open.class;
                    self.start_attribute(head, class);
                }
                Some(Frame::Slot(_)) => self.start_in_slot(head),
                Some(Frame::Root) | None => self.start_at_root(head),
            }
        }
    }

    fn start_at_root(&mut self, head: Head) {
        if is_entity_name(&head.name) {
            self.start_item(head, Kind::ANY);
        } else {
            if head.name != "header" {
                self.problems.add("element that is no entity", head.spot, || {
                    format!("{} is not read: entities and one header are allowed here", head.name)
                });
            }
            self.skipping = 1;
        }
    }

    /// An attribute's element inside an entity.
    fn start_attribute(&mut self, head: Head, class: ClassId) {
        let known = self.schema.class(class);
        let attribute = known.and_then(|c| c.attributes.iter().position(|a| a.name == head.name));
        let inverse = known.and_then(|c| c.inverses.iter().position(|i| i.name == head.name));
        let (target, kind) = match (known, attribute, inverse) {
            (Some(class), Some(index), _) => (Target::Attribute(index), class.attributes[index].kind),
            (Some(class), None, Some(index)) => {
                let base = Base::Entity(class.inverses[index].class);
                (Target::Inverse(index), Kind { base, depth: 1, row: 0 })
            }
            _ => {
                self.unknown_attribute(class, &head.name, head.spot);
                (Target::Extra(head.name.as_ref().into()), Kind::ANY)
            }
        };
        if head.reference.is_some() || head.elsewhere.is_some() {
            if let Some(id) = self.reference(&head) {
                self.deliver(target, kind, head.pos, Value::Entity(id), head.spot);
            }
            self.skipping = 1;
        } else if head.nil {
            self.skipping = 1;
        } else {
            let typed = head.class.as_deref().and_then(|name| self.schema.find_type(name));
            let mut slot = Slot::new(&head, target, kind);
            if let Some((name, kind)) = typed {
                slot = slot.typed(name, kind);
            } else if head.class.is_some() || head.id.is_some() || !head.rest.is_empty() {
                return self.start_direct(slot, head);
            }
            self.stack.push(Frame::Slot(slot));
        }
    }

    /// An attribute's element that is itself the entity.
    fn start_direct(&mut self, slot: Slot, head: Head) {
        let class = match (&head.class, slot.kind.base) {
            (Some(name), _) => self.class(name, &head),
            (None, Base::Entity(class)) => {
                if self.schema.class(class).is_some_and(|c| c.is_abstract) {
                    let name = self.entities.class_name(class);
                    self.problems.add("missing xsi:type", head.spot, || {
                        format!("{} does not say by xsi:type which {name} it is", head.name)
                    });
                }
                class
            }
            (None, Base::Select | Base::Any) => {
                self.problems.add("missing xsi:type", head.spot, || {
                    format!("{} does not say by xsi:type which entity it is", head.name)
                });
                self.entities.class_id("")
            }
            (None, _) => {
                // a plain value with XML attributes that the schema does not have
                for (name, _) in &head.rest {
                    self.problems.add("unknown attribute", head.spot, || {
                        format!("{} holds a plain value and has no attribute {name}", head.name)
                    });
                }
                self.stack.push(Frame::Slot(slot));
                return;
            }
        };
        let open = self.open(class, &head);
        self.deliver(slot.target, slot.kind, slot.pos, Value::Entity(open.id), slot.spot);
        self.stack.push(Frame::Entity(open));
    }

    /// A child of an attribute's element: an item of it, or the sign that the element is itself the entity.
    fn start_in_slot(&mut self, head: Head) {
        let Some(Frame::Slot(slot)) = self.stack.last() else { return };
        let kind = slot.kind;
        if is_entity_name(&head.name) || head.name.ends_with("-wrapper") {
            return self.start_item(head, kind);
        }
        let direct = slot.items.is_empty() && slot.target != Target::Item && slot.typed.is_none();
        let class = match kind.base {
            Base::Entity(class) if direct => class,
            Base::Any | Base::Select if direct => self.entities.class_id(""),
            _ => {
                self.problems.add("element that is not understood", head.spot, || {
                    format!("{} is not read: an entity or a wrapped value is required here", head.name)
                });
                self.skipping = 1;
                return;
            }
        };
        if let Some(Frame::Slot(slot)) = self.stack.pop() {
            self.stray_text(&slot.text, &slot.name, slot.spot);
            let outer = Head { name: slot.name.to_string().into(), spot: slot.spot, ..Head::default() };
            self.start_direct(slot, outer);
        }
        self.start_attribute(head, class);
    }

    /// An entity, a reference to one, or a wrapped value, at the root or in a slot of that kind.
    fn start_item(&mut self, head: Head, kind: Kind) {
        let (name, wrapped) = match head.name.strip_suffix("-wrapper") {
            Some(name) => (name, true),
            None => (head.class.as_deref().unwrap_or(&head.name), false),
        };
        let item = Kind { depth: 0, row: 0, ..kind };
        if head.reference.is_some() || head.elsewhere.is_some() {
            if let Some(id) = self.reference(&head) {
                self.deliver(Target::Item, kind, head.pos, Value::Entity(id), head.spot);
            }
            self.skipping = 1;
        } else if head.nil {
            self.skipping = 1;
        } else if let Some((name, typed)) = self.schema.find_type(name) {
            let slot = Slot::new(&head, Target::Item, item);
            self.stack.push(Frame::Slot(slot.typed(name, typed)));
        } else if wrapped {
            let row = name.starts_with("Seq-"); // one row of a list of lists
            let mut slot = Slot::new(&head, Target::Item, Kind { depth: u8::from(row), ..item });
            if !row && matches!(kind.base, Base::Select | Base::Any) {
                let name = name.to_owned();
                self.problems.add("unknown type", head.spot, || format!("{name} is no type of the schema"));
                slot = slot.typed(&name, Kind::ANY);
            }
            self.stack.push(Frame::Slot(slot));
        } else {
            let class = self.class(name, &head);
            let open = self.open(class, &head);
            self.deliver(Target::Item, kind, head.pos, Value::Entity(open.id), head.spot);
            self.stack.push(Frame::Entity(open));
        }
    }

    /// The class of that name.
    fn class(&mut self, name: &str, head: &Head) -> ClassId {
        let class = self.entities.class_id(name);
        match self.schema.class(class) {
            None => self.problems.add("unknown entity", head.spot, || format!("{name} is no entity of the schema")),
            Some(known) if known.is_abstract => self
                .problems
                .add("abstract entity", head.spot, || format!("{name} is abstract: one of its subtypes is required")),
            Some(_) => {}
        }
        class
    }

    /// Starts an entity with what its start tag tells.
    fn open(&mut self, class: ClassId, head: &Head) -> Open {
        let label = head.id.as_deref().unwrap_or_default();
        let id = self.entities.open(class, label, head.spot);
        if head.id.is_some() {
            let first = *self.labels.entry(label.into()).or_insert(id);
            if first != id {
                let at = self.entities.get(first).place();
                self.problems.add("id given twice", head.spot, || {
                    format!("the id {label} is given a second time; references to it mean the one at {at}")
                });
            }
        }
        let known = self.schema.class(class).map_or(&[][..], |c| &c.attributes);
        let mut open = Open { id, class, values: vec![Value::Absent; known.len()], extras: Vec::new() };
        for (name, text) in &head.rest {
            let Some(index) = known.iter().position(|a| a.name == name) else {
                self.unknown_attribute(class, name, head.spot);
                open.extras.push((name.as_ref().into(), Value::Text(text.as_ref().into())));
                continue;
            };
            match scalar::parse(known[index].kind, text) {
                Ok(value) if open.values[index] == Value::Absent => open.values[index] = value,
                Ok(_) => self.given_twice(class, name, head.spot),
                Err(wrong) => self.wrong_value(class, name, &wrong, head.spot),
            }
        }
        open
    }

    fn reference(&mut self, head: &Head) -> Option<Id> {
        if let Some(elsewhere) = &head.elsewhere {
            self.problems.add("reference to another document", head.spot, || {
                format!("{} refers to {elsewhere}: other documents are not read", head.name)
            });
            return None;
        }
        let label = head.reference.as_deref()?;
        Some(self.labels.get(label).copied().unwrap_or_else(|| {
            self.waiting.push(Waiting { label: label.into(), spot: head.spot });
            Id(WAITING + (self.waiting.len() - 1) as u32)
        }))
    }

    /// Brings a value to its target: the innermost open element.
    fn deliver(&mut self, target: Target, kind: Kind, pos: Option<Pos>, value: Value, spot: Spot) {
        match (self.stack.last_mut(), target) {
            (Some(Frame::Slot(slot)), Target::Item) => {
                slot.items.push((pos, value));
            }
            (Some(Frame::Entity(open)), Target::Attribute(index)) => {
                let held = &mut open.values[index];
                match (held, value) {
                    // an attribute's element may be repeated where it takes several
                    (Value::List(items), value @ Value::Entity(_)) => items.push(value),
                    (Value::List(items), Value::List(more)) => items.extend(more),
                    (held @ Value::Absent, value @ Value::Entity(_)) if kind.depth > 0 => {
                        *held = Value::List(vec![value]);
                    }
                    (held @ Value::Absent, value) => *held = value,
                    _ => {
                        let class = open.class;
                        let name = self.schema.class(class).map_or("", |c| c.attributes[index].name);
                        self.given_twice(class, name, spot);
                    }
                }
            }
            (Some(Frame::Entity(open)), Target::Inverse(index)) => {
                let inverse = self.schema.class(open.class).map(|c| c.inverses[index]);
                let ids = match value {
                    Value::Entity(id) => vec![Value::Entity(id)],
                    Value::List(items) => items,
                    _ => Vec::new(),
                };
                for id in ids {
                    if let (Value::Entity(relation), Some(inverse)) = (id, inverse) {
                        let attribute = inverse.attribute;
                        self.links.push(Link { relation, attribute, parent: open.id, spot });
                    }
                }
            }
            (Some(Frame::Entity(open)), Target::Extra(name)) => open.extras.push((name, value)),
            _ => {}
        }
    }

    fn text(&mut self, text: Cow<str>, spot: Spot) {
        match self.stack.last_mut() {
            Some(Frame::Slot(slot)) => {
                if !text.trim().is_empty() || !slot.text.is_empty() {
                    slot.text.push_str(&text);
                }
            }
            _ => {
                let name = match self.stack.last() {
                    Some(Frame::Entity(open)) => self.entities.class_name(open.class).to_owned(),
                    _ => "the document element".to_owned(),
                };
                self.stray_text(&text, &name, spot);
            }
        }
    }

    fn end(&mut self) {
        if self.is_skipping() {
            self.skipping -= 1;
            return;
        }
        match self.stack.pop() {
            Some(Frame::Entity(open)) => self.entities.close(open.id, open.values, open.extras),
            Some(Frame::Slot(slot)) => self.end_slot(slot),
            Some(Frame::Root) | None => {}
        }
    }

    fn end_slot(&mut self, mut slot: Slot) {
        let items = std::mem::take(&mut slot.items);
        let value = if !items.is_empty() {
            self.stray_text(&slot.text, &slot.name, slot.spot);
            self.gather(&slot, items)
        } else if slot.text.trim().is_empty() && !matches!(slot.kind, Kind { base: Base::Text, depth: 0, .. }) {
            return; // an empty element has no value
        } else if slot.kind.depth == 0 && matches!(slot.kind.base, Base::Select) {
            self.problems.add("value without a type", slot.spot, || {
                format!("{} holds a bare value; its type, such as IfcLabel-wrapper, is required around it", slot.name)
            });
            Value::Text(slot.text.as_str().into())
        } else {
            match scalar::parse(slot.kind, &slot.text) {
                Ok(value) => value,
                Err(wrong) => {
                    self.problems.add("value that is not understood", slot.spot, || format!("{} {wrong}", slot.name));
                    return;
                }
            }
        };
        let value = match slot.typed {
            Some(name) if value != Value::Absent => Value::Typed(name, value.into()),
            _ => value,
        };
        self.deliver(slot.target, slot.kind, slot.pos, value, slot.spot);
    }

    /// The items of a slot as one value.
    fn gather(&mut self, slot: &Slot, mut items: Vec<(Option<Pos>, Value)>) -> Value {
        let nested = slot.kind.depth == 2 && slot.kind.row == 0 && items.iter().all(|(pos, _)| pos.is_some());
        let mut next = 0;
        for (pos, _) in &mut items {
            let (index, _) = *pos.get_or_insert((next, 0));
            next = index.saturating_add(1);
        }
        items.sort_by_key(|(pos, _)| *pos);
        if slot.kind.depth == 0 && slot.kind.base != Base::Any && items.len() > 1 {
            self.problems.add("several values for one", slot.spot, || {
                format!("{} holds {} values where one is allowed; the first is read", slot.name, items.len())
            });
        }
        match slot.kind.depth {
            0 if slot.kind.base == Base::Any && items.len() > 1 => {
                Value::List(items.into_iter().map(|(_, value)| value).collect())
            }
            0 => items.into_iter().next().map_or(Value::Absent, |(_, value)| value),
            2 if nested => {
                let mut rows: Vec<(u32, Vec<Value>)> = Vec::new();
                for (pos, value) in items {
                    let row = pos.map_or(0, |(row, _)| row);
                    match rows.last_mut() {
                        Some((last, values)) if *last == row => values.push(value),
                        _ => rows.push((row, vec![value])),
                    }
                }
                Value::List(rows.into_iter().map(|(_, values)| Value::List(values)).collect())
            }
            depth => {
                let items: Vec<Value> = items.into_iter().map(|(_, value)| value).collect();
                let flat = depth == 2 && !items.iter().any(|item| matches!(item, Value::List(_)));
                let row = if flat { usize::from(slot.kind.row) } else { 0 };
                scalar::rows(items, row).unwrap_or_else(|wrong| {
                    self.problems.add("value that is not understood", slot.spot, || format!("{} {wrong}", slot.name));
                    Value::Absent
                })
            }
        }
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

    fn wrong_value(&mut self, class: ClassId, name: &str, wrong: &str, spot: Spot) {
        let class = self.entities.class_name(class);
        self.problems.add("value that is not understood", spot, || format!("{name} of {class} {wrong}"));
    }

    fn stray_text(&mut self, text: &str, name: &str, spot: Spot) {
        let text = text.trim();
        if !text.is_empty() {
            self.problems.add("text where none is allowed", spot, || {
                format!("{name} holds the text {}, which is not read", scalar::quoted(text))
            });
        }
    }

    fn finish(self, form: String) -> Exchange {
        resolve::resolve(self, form)
    }
}

impl Slot {
    fn new(head: &Head, target: Target, kind: Kind) -> Self {
        Self {
            name: head.name.as_ref().into(),
            spot: head.spot,
            target,
            kind,
            typed: None,
            pos: head.pos,
            items: Vec::new(),
            text: String::new(),
        }
    }

    /// Makes it hold a value of a defined type; the type is kept only where the schema leaves a choice.
    fn typed(mut self, name: &str, kind: Kind) -> Self {
        if matches!(self.kind.base, Base::Select | Base::Any) {
            self.typed = Some(name.into());
        }
        self.kind = kind;
        self
    }
}

/// Entities and types begin with Ifc, attributes never do.
fn is_entity_name(name: &str) -> bool {
    name.get(..3).is_some_and(|start| start.eq_ignore_ascii_case("ifc"))
}
