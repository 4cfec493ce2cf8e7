//! One building in every form: the same graph where the version is the same, and the same review of all.

mod forms;
mod shapes;

use faying::review::Review;
use faying::run::{Inputs, run};
use serde_json::Value;

use crate::sample::folder;

/// The review of a model of the sample building.
fn reviewed(model: &[u8]) -> Review {
    let schedule = std::fs::read(folder().join("schedule.toml")).expect("the sample's schedule");
    let inputs = Inputs { model: ("a model", model), schedules: vec![("schedule.toml", &schedule)], rules: Vec::new() };
    run(&inputs).unwrap_or_else(|failed| panic!("{failed}"))
}

/// A report as data, without the form and the places, which differ by form.
fn data(report: serde_json::Result<String>) -> Value {
    let mut data: Value = serde_json::from_str(&report.expect("JSON")).expect("JSON");
    let head = data["model"].as_object_mut().expect("the model is an object");
    for differs in ["file", "exchange", "sha256"] {
        assert!(head.remove(differs).is_some(), "{differs}");
    }
    texts(&mut data, &without_place);
    forget_places(&mut data);
    data
}

/// Leaves of each place only that there is one.
fn forget_places(data: &mut Value) {
    match data {
        Value::Array(items) => items.iter_mut().for_each(forget_places),
        Value::Object(fields) => fields.iter_mut().for_each(|(key, field)| match key.as_str() {
            "at" | "first_at" if field.is_object() => *field = "somewhere".into(),
            _ => forget_places(field),
        }),
        _ => {}
    }
}

/// Changes every text.
fn texts(data: &mut Value, change: &dyn Fn(&str) -> String) {
    match data {
        Value::String(text) => *text = change(text),
        Value::Array(items) => items.iter_mut().for_each(|item| texts(item, change)),
        Value::Object(fields) => fields.values_mut().for_each(|field| texts(field, change)),
        _ => {}
    }
}

/// A text whose places in the model, "a model:3:1" or "a model/model.ifc:3:1", are left out.
fn without_place(text: &str) -> String {
    let mut parts = text.split("a model");
    let mut left = parts.next().unwrap_or_default().to_owned();
    for part in parts {
        left += part.trim_start_matches("/model.ifc").trim_start_matches(|c: char| c == ':' || c.is_ascii_digit());
    }
    left
}

/// What two reviews do not have in common, by their path.
fn differences(a: &Value, b: &Value) -> Vec<String> {
    fn walk(path: &str, a: &Value, b: &Value, found: &mut Vec<String>) {
        match (a, b) {
            (Value::Object(own), Value::Object(other)) if own.keys().eq(other.keys()) => {
                own.iter().zip(other).for_each(|((key, a), (_, b))| walk(&format!("{path}/{key}"), a, b, found));
            }
            (Value::Array(own), Value::Array(other)) if own.len() == other.len() => {
                let pairs = own.iter().zip(other).enumerate();
                pairs.for_each(|(index, (a, b))| walk(&format!("{path}/{index}"), a, b, found));
            }
            (a, b) if a == b => {}
            (a, b) => found.push(format!("{path}: {a:.300} | {b:.300}")),
        }
    }
    let mut found = Vec::new();
    walk("", a, b, &mut found);
    found
}
