//! A matrix as JSON: the object that `emit` writes, or a bare array of rows.

use serde_json::Value;

use super::text::quoted;
use super::{ReadError, check_size, element, modulus_text, no_element};
use crate::algebra::{Element, Field, Matrix};

/// Reads `{"entries": [[…], …]}` or `[[…], …]`. Where the object states `columns`, `rows` or a
/// field, they must agree with what is read.
pub(super) fn read(bytes: &[u8], field: &Field) -> Result<Matrix, ReadError> {
    let value: Value = serde_json::from_slice(bytes)
        .map_err(|error| ReadError::at(error.line(), format!("this is not JSON: {error}")))?;
    parse(&value, field).map_err(ReadError::new)
}

fn parse(value: &Value, field: &Field) -> Result<Matrix, String> {
    let entries = match value {
        Value::Object(object) => object
            .get("entries")
            .ok_or("the object has no `entries`, an array of rows")?,
        other => other,
    };
    if let Some(stated) = value.get("field") {
        check_field(stated, field)?;
    }
    let rows = entries
        .as_array()
        .ok_or("the entries are not an array of rows")?;
    let mut read: Vec<Vec<Element>> = Vec::with_capacity(rows.len());
    for (at, row) in rows.iter().enumerate() {
        let row = row
            .as_array()
            .ok_or_else(|| format!("row {at} (from 0) is not an array"))?;
        let row: Result<Vec<Element>, String> = row.iter().map(|entry| one(entry, field)).collect();
        read.push(row.map_err(|says| format!("row {at} (from 0): {says}"))?);
    }
    let columns = match (read.first(), value.get("columns").and_then(Value::as_u64)) {
        (Some(first), None) => first.len() as u64,
        (Some(first), Some(stated)) if first.len() as u64 != stated => {
            return Err(format!(
                "row 0 has {} entries, `columns` says {stated}",
                first.len()
            ));
        }
        (_, Some(stated)) => stated,
        (None, None) => return Err("there are no rows".to_string()),
    };
    if value
        .get("rows")
        .is_some_and(|stated| stated.as_u64() != Some(read.len() as u64))
    {
        return Err(format!(
            "there are {} rows, `rows` says otherwise",
            read.len()
        ));
    }
    if let Some(at) = read.iter().position(|row| row.len() as u64 != columns) {
        return Err(format!(
            "row {at} (from 0) has {} entries, not {columns}",
            read[at].len()
        ));
    }
    // Without rows nothing but the stated number stands for the columns.
    if read.is_empty() && columns > 1 << 20 {
        return Err(format!(
            "{columns} columns without a row are more than are read"
        ));
    }
    check_size(read.len() as u64, columns)?;
    Ok(Matrix::from_rows(field, columns as usize, &read))
}

fn one(entry: &Value, field: &Field) -> Result<Element, String> {
    match entry.as_u64() {
        Some(value) => element(value, field),
        None => Err(no_element(&quoted(&entry.to_string()), field)),
    }
}

fn check_field(stated: &Value, field: &Field) -> Result<(), String> {
    if stated
        .get("order")
        .is_some_and(|order| order.as_u64() != Some(field.order()))
    {
        return Err(format!(
            "the file is over GF({}), not {field}",
            stated["order"]
        ));
    }
    match stated.get("modulus").and_then(Value::as_str) {
        Some(modulus) if modulus_text(field).as_deref() != Some(modulus) => Err(format!(
            "the file's field has modulus {}, this one {}",
            quoted(modulus),
            modulus_text(field).unwrap_or_else(|| "none".to_string()),
        )),
        _ => Ok(()),
    }
}
