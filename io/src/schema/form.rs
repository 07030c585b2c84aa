//! The schema of one value.

use serde_json::{Map, Value, json};

use crate::explain::Form;

/// A quantity as a text: a number and what follows it.
const QUANTITY: &str = "^\\s*[-+\u{2212}]?\\s*[0-9.]";

/// The keywords that hold a value to its form.
pub(super) fn form_schema(form: &Form) -> Map<String, Value> {
    match object(form) {
        Value::Object(keywords) => keywords,
        _ => Map::new(),
    }
}

fn object(form: &Form) -> Value {
    match form {
        Form::Table => json!({"type": "object"}),
        Form::Tables => json!({"type": "array", "items": {"type": "object"}}),
        Form::Tolerances => json!({"type": "object", "additionalProperties": {"$ref": "#/$defs/tolerance"}}),
        Form::Text => json!({"type": "string"}),
        Form::Pattern(pattern) => json!({"type": "string", "pattern": pattern}),
        Form::Quantity(..) => json!({"type": ["string", "number"], "pattern": QUANTITY}),
        Form::Choice(choices) => json!({"type": "string", "enum": choices}),
        Form::Count { least, most } => json!({"type": "integer", "minimum": least, "maximum": most}),
        Form::List { of, least, most } => {
            let mut list = json!({"type": "array", "items": object(of), "minItems": least});
            if let (Some(most), Some(entries)) = (most, list.as_object_mut()) {
                entries.insert("maxItems".to_owned(), json!(most));
            }
            list
        }
        Form::Any(forms) => json!({"anyOf": forms.iter().map(object).collect::<Vec<_>>()}),
    }
}

/// A tolerance, or a table of them: a path may be written with points instead of quotes.
pub(super) fn tolerance() -> Value {
    json!({
        "anyOf": [
            {"type": ["string", "number"]},
            {"type": "array", "items": {"type": ["string", "number"]}, "minItems": 2, "maxItems": 2},
            {"type": "object", "additionalProperties": {"$ref": "#/$defs/tolerance"}},
        ]
    })
}
