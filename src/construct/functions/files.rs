//! Matrices from files.

use super::Function;

/// The register of this file.
pub const FUNCTIONS: &[Function] = &[];
