//! The matrix and all that is known of it, as one JSON object; one row a line.

use serde_json::{Value, json};

use super::{Delivery, Format};
use crate::algebra::Field;
use crate::algebra::formats::modulus_text;

pub(super) const FORMAT: Format = Format {
    name: "json",
    extension: "json",
    says: "object with entries, field, form, information positions and names",
    write,
};

/// A field as the machine-readable files name it: `order`, `characteristic`, `degree`, and as
/// `modulus` a polynomial in x, null for a prime field.
fn field_json(field: &Field) -> Value {
    json!({
        "order": field.order(),
        "characteristic": field.characteristic(),
        "degree": field.degree(),
        "modulus": modulus_text(field),
    })
}

fn write(delivery: &Delivery) -> Result<Vec<u8>, String> {
    let matrix = &delivery.matrix;
    let members = [
        ("format", json!("cosetta-matrix")),
        ("version", json!(1)),
        ("name", json!(delivery.name)),
        ("what", json!(delivery.what.name())),
        ("form", json!(delivery.form.name())),
        ("field", field_json(&delivery.field)),
        ("n", json!(delivery.n)),
        ("k", json!(delivery.k)),
        (
            "information_positions",
            json!(delivery.information_positions),
        ),
        ("positions", json!(delivery.position_names)),
        ("notes", json!(delivery.notes)),
        ("rows", json!(matrix.rows())),
        ("columns", json!(matrix.columns())),
    ];
    let mut out = String::from("{\n");
    for (key, value) in members {
        out.push_str(&format!("  \"{key}\": {value},\n"));
    }
    let rows: Vec<String> = delivery
        .rows()
        .map(|row| format!("\n    [{}]", row.join(", ")))
        .collect();
    let end = if rows.is_empty() { "" } else { "\n  " };
    out.push_str(&format!("  \"entries\": [{}{end}]\n}}\n", rows.join(",")));
    Ok(out.into_bytes())
}
