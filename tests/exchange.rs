//! Reading an exchange: the same graph from every way of writing it, and a place for what is not understood.

mod archive;
mod broken;
mod dialects;
mod forms;
mod hostile;
mod limits;
mod part28;
mod parts;
mod problems;
mod step;
mod unreadable;
mod values;

use faying::exchange::{Entity, Exchange, Value, View, read};

/// A document of IFC4 ADD2 TC1 around entities; they start on line 2.
fn document(body: &str) -> String {
    let namespaces = "xmlns=\"http://www.buildingsmart-tech.org/ifc/IFC4/Add2TC1\" \
                      xmlns:ifc=\"http://www.buildingsmart-tech.org/ifc/IFC4/Add2TC1\" \
                      xmlns:xsi=\"http://www.w3.org/2001/XMLSchema-instance\"";
    format!("<ifcXML {namespaces}>\n{body}\n</ifcXML>\n")
}

/// Reads entities, whatever is wrong with them.
fn read_body(body: &str) -> Exchange {
    read(document(body).as_bytes(), "t.ifcxml").unwrap()
}

/// Reads entities in which nothing may be wrong.
fn read_clean(body: &str) -> Exchange {
    let exchange = read_body(body);
    assert_eq!(exchange.problems, [], "{body}");
    exchange
}

/// The entity that the file calls so.
fn labelled<'a>(exchange: &'a Exchange, label: &str) -> Entity<'a> {
    exchange.entities.all().find(|e| e.label() == label).unwrap_or_else(|| panic!("no entity {label}"))
}

/// Everything that can be reached from an entity, written out without labels and places.
fn written_out(entity: Entity, exchange: &Exchange) -> String {
    fn value(v: View, exchange: &Exchange) -> String {
        match v {
            View::Entity(id) => written_out(exchange.entities.get(id), exchange),
            View::List(items) => {
                format!("({})", items.iter().map(|i| value(i, exchange)).collect::<Vec<_>>().join(" "))
            }
            View::Typed(name, inner) => format!("{name}:{}", value(inner.view(), exchange)),
            other => format!("{other:?}"),
        }
    }
    let given = entity.values().filter(|(_, v)| !v.is_absent());
    let given: Vec<String> = given.map(|(name, v)| format!("{name}={}", value(v, exchange))).collect();
    format!("{}[{}]", entity.class(), given.join(", "))
}

/// A whole graph written out, independent of order and labels.
fn graph(exchange: &Exchange) -> Vec<String> {
    let mut all: Vec<String> = exchange.entities.all().map(|e| written_out(e, exchange)).collect();
    all.sort();
    all
}

/// The problems as "line:column message".
fn problems_of(exchange: &Exchange) -> Vec<String> {
    let place =
        |at: &Option<faying::origin::Place>| at.as_ref().map_or(String::new(), |p| format!("{}:{} ", p.line, p.column));
    exchange.problems.iter().map(|p| format!("{}{}", place(&p.at), p.message)).collect()
}
