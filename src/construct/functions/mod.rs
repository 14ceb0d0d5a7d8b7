//! Functions: matrix builders, and what the expression language knows of numbers, sets, vectors
//! and fields.

mod fields;
mod files;
mod geometry;
mod matrices;
mod numbers;

use super::Function;

/// All functions.
pub fn all() -> impl Iterator<Item = &'static Function> {
    [
        numbers::FUNCTIONS,
        fields::FUNCTIONS,
        matrices::FUNCTIONS,
        geometry::FUNCTIONS,
        files::FUNCTIONS,
    ]
    .into_iter()
    .flatten()
}
