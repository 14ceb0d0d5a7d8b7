//! Incidence structures from finite geometries.

use super::Function;
use crate::algebra::Field;
use crate::finding::{Found, catalogue};
use crate::value::{Call, Incidence, Value, needed};
use std::sync::Arc;

/// The register of this file.
pub const FUNCTIONS: &[Function] = &[
    Function {
        name: "projective_plane",
        parameters: &[needed("order", "an integer", "a prime power, at most 64")],
        says: "The plane PG(2, s): its lines as blocks, its points in the order of their coordinates (first non-zero one 1).",
        theory: "",
        example: "field bit = GF(2)\ncode tide over bit = check(incidence(projective_plane(2)))\n  is [7, 3, 4]\n",
        run: projective_plane,
    },
    Function {
        name: "incidence",
        parameters: &[needed("structure", "an incidence structure", "")],
        says: "The 0/1 matrix of an incidence structure over the field meant: a row a block, a column a point.",
        theory: "",
        example: "field bit = GF(2)\ncode tide over bit = check(incidence(projective_plane(4)))\n  is [21, 11, 6]\n",
        run: |call| match call.value("structure") {
            Value::Incidence(_) => Ok(Value::Matrix(call.matrix("structure")?)),
            other => Err(call.wrong(
                "structure",
                catalogue::WRONG_TYPE,
                format!(
                    "`incidence` takes an incidence structure such as projective_plane(4), not {}",
                    other.kind()
                ),
            )),
        },
    },
];

fn projective_plane(call: &Call) -> Found<Value> {
    let order = call.size("order", 2, 64)?;
    let field = crate::algebra::prime_power(order as u64)
        .and_then(|(p, m)| Field::conway(p, m).ok())
        .ok_or_else(|| {
            call.wrong(
                "order",
                catalogue::BAD_FIELD_ORDER,
                format!("{order} is no prime power, so there is no plane over GF({order})"),
            )
        })?;
    let points = projective_points(&field);
    let blocks = points
        .iter()
        .map(|line| {
            (0..points.len())
                .filter(|&at| {
                    let products = line.iter().zip(&points[at]);
                    products.fold(0, |sum, (&left, &right)| {
                        field.add(sum, field.mul(left, right))
                    }) == 0
                })
                .collect()
        })
        .collect();
    Ok(Value::Incidence(Arc::new(Incidence {
        name: format!("projective_plane({order})"),
        points: points.len(),
        blocks,
    })))
}

/// One vector of length 3 a line through zero, first non-zero entry 1, in numeric order.
fn projective_points(field: &Field) -> Vec<[u32; 3]> {
    let order = field.order() as u32;
    let mut points = vec![[0, 0, 1]];
    points.extend((0..order).map(|last| [0, 1, last]));
    points.extend((0..order).flat_map(|middle| (0..order).map(move |last| [1, middle, last])));
    points
}
