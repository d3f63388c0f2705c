//! A checker for the part of JSON Schema (draft 2020-12) that docs/output.md uses.
//!
//! Stricter than the standard in one point: an object may hold only what its schema lists, so that no
//! field goes undocumented. A keyword it does not know is a failure, never passed over.

use serde_json::Value;

/// Checks a value; `Err` says where and why it fails.
pub(crate) fn check(schema: &Value, value: &Value) -> Result<(), String> {
    at(schema, schema, value, "$")
}

fn at(root: &Value, schema: &Value, value: &Value, place: &str) -> Result<(), String> {
    let keywords = schema.as_object().ok_or("a schema is an object")?;
    for (keyword, argument) in keywords {
        let holds = match keyword.as_str() {
            "$schema" | "$defs" | "title" | "description" => true,
            "$ref" => return at(root, target(root, argument)?, value, place),
            "type" => is_of(value, argument.as_str().ok_or("type is a word")?)?,
            "const" => value == argument,
            "enum" => list(argument)?.contains(value),
            "minimum" => value.as_f64() >= argument.as_f64(),
            "minItems" => list(value)?.len() as u64 >= argument.as_u64().ok_or("a number")?,
            "maxItems" => list(value)?.len() as u64 <= argument.as_u64().ok_or("a number")?,
            "required" => list(argument)?
                .iter()
                .all(|name| name.as_str().is_some_and(|name| value.get(name).is_some())),
            "oneOf" => {
                let fits = |option: &&Value| at(root, option, value, place).is_ok();
                list(argument)?.iter().filter(fits).count() == 1
            }
            "items" => {
                for (index, item) in list(value)?.iter().enumerate() {
                    at(root, argument, item, &format!("{place}[{index}]"))?;
                }
                true
            }
            "properties" => {
                for (name, field) in value.as_object().ok_or("an object")? {
                    let place = format!("{place}.{name}");
                    let schema = argument.get(name).ok_or(format!("{place} is not listed"))?;
                    at(root, schema, field, &place)?;
                }
                true
            }
            unknown => return Err(format!("the keyword {unknown} is not known")),
        };
        if !holds {
            return Err(format!("{place}: {value} against {keyword} {argument}"));
        }
    }
    Ok(())
}

fn target<'s>(root: &'s Value, reference: &Value) -> Result<&'s Value, String> {
    let pointer = reference.as_str().and_then(|text| text.strip_prefix('#'));
    let found = pointer.and_then(|pointer| root.pointer(pointer));
    found.ok_or(format!("{reference} leads nowhere"))
}

fn is_of(value: &Value, kind: &str) -> Result<bool, String> {
    Ok(match kind {
        "object" => value.is_object(),
        "array" => value.is_array(),
        "string" => value.is_string(),
        "boolean" => value.is_boolean(),
        "null" => value.is_null(),
        "number" => value.is_number(),
        "integer" => value.is_i64() || value.is_u64(),
        unknown => return Err(format!("the type {unknown} is not known")),
    })
}

fn list(value: &Value) -> Result<&Vec<Value>, String> {
    value.as_array().ok_or(format!("{value} is no list"))
}
