//! The shape of a JSON value: the same members, no more and no fewer, each of the same type.

use serde_json::Value;

/// Holds a value against a shape: text stands for any text, a number for any number, null for null
/// alone, a list of one for a list, not empty, of such.
pub fn assert_shape(value: &Value, shape: &Value) {
    let mut off = Vec::new();
    compare(value, shape, "", &mut off);
    assert!(off.is_empty(), "{}\nin {value}", off.join("\n"));
}

fn compare(value: &Value, shape: &Value, at: &str, off: &mut Vec<String>) {
    match (value, shape) {
        (Value::Null, Value::Null)
        | (Value::Bool(_), Value::Bool(_))
        | (Value::Number(_), Value::Number(_))
        | (Value::String(_), Value::String(_)) => {}
        (Value::Array(values), Value::Array(shapes)) => {
            if values.is_empty() != shapes.is_empty() {
                off.push(format!("{at}: {} members", values.len()));
            }
            for (index, value) in values.iter().enumerate() {
                if let Some(shape) = shapes.first() {
                    compare(value, shape, &format!("{at}/{index}"), off);
                }
            }
        }
        (Value::Object(members), Value::Object(shapes)) => {
            for (name, shape) in shapes {
                match members.get(name) {
                    Some(value) => compare(value, shape, &format!("{at}/{name}"), off),
                    None => off.push(format!("{at}/{name} is missing")),
                }
            }
            for name in members.keys().filter(|name| !shapes.contains_key(*name)) {
                off.push(format!("{at}/{name} is too much"));
            }
        }
        _ => off.push(format!("{at}: {value}, where {shape} was expected")),
    }
}

mod tests {
    use serde_json::json;

    use super::compare;

    #[test]
    fn what_is_missing_too_much_or_of_another_type_is_seen() {
        let shape = json!({"a": 0.0, "b": [{"c": ""}], "d": null});
        let count = |value| {
            let mut off = Vec::new();
            compare(&value, &shape, "", &mut off);
            off.len()
        };
        assert_eq!(
            count(json!({"a": 7, "b": [{"c": "x"}, {"c": ""}], "d": null})),
            0
        );
        assert_eq!(
            count(json!({"a": "7", "b": [{"c": "x"}, {}], "d": 1, "e": 1})),
            4
        );
        assert_eq!(count(json!({"a": null, "b": []})), 3);
    }
}
