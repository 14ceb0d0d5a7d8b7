//! Codes with published parameters, each built from a spec and compared in n, k, d, weights and
//! properties. Every entry of `data/published_codes.json` names its source.

mod common;

use common::{Asked, Known, examine_only};
use serde_json::Value;
use std::collections::BTreeMap;
use std::time::Instant;

fn entries() -> Vec<Value> {
    let text = include_str!("data/published_codes.json");
    serde_json::from_str(text).expect("the table is JSON")
}

/// The entry as a spec: its body over its field, in a code of one name.
fn spec(entry: &Value) -> String {
    let field = entry["field"].as_str().expect("a field");
    let body = entry["body"].as_str().expect("a body");
    // A concatenation ends in the inner code's field, so its outer field is stated in place.
    if body.contains("concatenate") {
        let (outer, rest) = body.split_once(" then ").expect("an outer code and a step");
        return format!(
            "field bit = GF(2)\nfield outer_field = {field}\ncode published = {outer} over outer_field then {rest}\n"
        );
    }
    format!("field bit = GF(2)\nfield f = {field}\ncode published over f\n  = {body}\n")
}

fn compare(entry: &Value, known: &Known) -> Vec<String> {
    let id = entry["id"].as_str().unwrap_or("?");
    let mut wrong = Vec::new();
    let mut expect = |what: &str, ok: bool, seen: String| {
        if !ok {
            wrong.push(format!("{id}: {what} is {seen}, published {}", entry[what]));
        }
    };
    expect("n", entry["n"] == known.n, known.n.to_string());
    expect("k", entry["k"] == known.k, known.k.to_string());
    expect(
        "d",
        entry["d"] == known.d.0 && known.d.0 == known.d.1,
        format!("{:?}", known.d),
    );
    if let Some(weights) = entry["weights"].as_object() {
        let published: BTreeMap<usize, String> = weights
            .iter()
            .map(|(weight, count)| {
                (
                    weight.parse().expect("a weight"),
                    count.as_str().expect("a count").to_string(),
                )
            })
            .collect();
        expect(
            "weights",
            known.weights.as_ref() == Some(&published),
            format!("{:?}", known.weights),
        );
    }
    for (name, value) in entry["extra"].as_object().into_iter().flatten() {
        let seen = match name.as_str() {
            "covering_radius" | "girth" | "row_weight" | "column_weight" => {
                known.measures.get(name).map(|&value| Value::from(value))
            }
            "perfect" | "equidistant" | "mds" | "self_dual" | "even" | "doubly_even" => {
                known.properties.get(name).map(|&holds| Value::from(holds))
            }
            // Not statements about the code itself.
            "designed_distance" | "note" | "dual_equals" => continue,
            other => panic!("{id}: nobody compares `{other}`"),
        };
        expect(
            "extra",
            seen.as_ref() == Some(value),
            format!("{name}: {seen:?}"),
        );
    }
    wrong
}

fn run(wanted: impl Fn(&str) -> bool) -> usize {
    let mut wrong = Vec::new();
    let mut count = 0;
    for entry in entries()
        .iter()
        .filter(|entry| wanted(entry["id"].as_str().unwrap_or("")))
    {
        let names: Vec<&str> = entry["extra"]
            .as_object()
            .into_iter()
            .flatten()
            .map(|(name, _)| name.as_str())
            .collect();
        let asked = Asked {
            weights: !entry["weights"].is_null(),
            names: Some(&names),
        };
        let start = Instant::now();
        let known = examine_only(&spec(entry), "published", asked);
        let id = entry["id"].as_str().unwrap_or("?");
        println!("{id}: {:.2} s", start.elapsed().as_secs_f64());
        wrong.extend(compare(entry, &known));
        count += 1;
    }
    assert!(
        wrong.is_empty(),
        "{} of {count} differ:\n{}",
        wrong.len(),
        wrong.join("\n")
    );
    count
}

fn family(id: &str) -> &str {
    id.split('-').next().unwrap_or(id)
}

#[test]
fn hamming_codes_their_duals_and_extensions_are_as_published() {
    let families = ["hamming", "simplex", "linear", "extended"];
    assert_eq!(run(|id| families.contains(&family(id))), 43);
}

#[test]
fn reed_muller_codes_are_as_published() {
    assert_eq!(run(|id| ["rm", "grm"].contains(&family(id))), 10);
}

#[test]
fn golay_and_quadratic_residue_codes_are_as_published() {
    assert_eq!(
        run(|id| ["golay", "hexacode", "qr"].contains(&family(id))),
        11
    );
}

#[test]
fn bch_codes_are_as_published() {
    assert_eq!(run(|id| family(id) == "bch"), 36);
}

#[test]
fn reed_solomon_codes_are_as_published() {
    assert_eq!(run(|id| family(id) == "rs"), 10);
}

#[test]
fn composed_codes_are_as_published() {
    assert_eq!(
        run(|id| ["secded", "product", "plotkin", "concat"].contains(&family(id))),
        5
    );
}

#[test]
fn codes_from_check_matrices_are_as_published() {
    assert_eq!(
        run(|id| ["crc16", "pg", "gallager"].contains(&family(id))),
        5
    );
}

#[test]
fn every_published_code_belongs_to_a_test() {
    let named = [
        "hamming", "simplex", "linear", "extended", "rm", "grm", "golay", "hexacode", "qr", "bch",
        "rs", "secded", "product", "plotkin", "concat", "crc16", "pg", "gallager",
    ];
    for entry in entries() {
        let id = entry["id"].as_str().expect("an id");
        assert!(named.contains(&family(id)), "{id} is never compared");
    }
    assert_eq!(entries().len(), 120);
}
