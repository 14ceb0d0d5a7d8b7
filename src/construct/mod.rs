//! Primitives: from matrices, polynomials and point sets to codes and to other matrices.
//!
//! One file a construction, one line in the register. A construction checks its arguments,
//! builds a space and says which theorems hold for it; it never searches.

mod check;
mod crc;
mod cyclic;
mod cyclic_bounds;

mod evaluate;
pub mod functions;
mod span;

use crate::code::Made;
use crate::finding::Found;
use crate::value::{Call, Entry, Value};

/// A construction: arguments in, a code out.
pub type Construction = Entry<fn(&Call) -> Found<Made>>;

/// A function: arguments in, a value out.
pub type Function = Entry<fn(&Call) -> Found<Value>>;

/// All constructions of codes.
pub const CONSTRUCTIONS: &[&Construction] = &[
    &check::ENTRY,
    &span::ENTRY,
    &evaluate::ENTRY,
    &cyclic::ENTRY,
    &crc::ENTRY,
];

/// The construction of this name.
pub fn construction(name: &str) -> Option<&'static Construction> {
    CONSTRUCTIONS
        .iter()
        .copied()
        .find(|entry| entry.name == name)
}

/// The function of this name.
pub fn function(name: &str) -> Option<&'static Function> {
    functions::all().find(|entry| entry.name == name)
}
