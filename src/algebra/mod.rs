//! Fields, polynomials and matrices: the arithmetic under the language.
//!
//! Elements are plain integers ([`Element`]), interpreted by a [`Field`]; a [`Matrix`] knows its
//! field. Nothing here knows of codes or of spans, and errors are values that the rooms below
//! turn into findings.

pub mod field;
pub mod formats;
pub mod kernels;
pub mod matrix;

pub use field::{Element, Field, FieldError};
pub use matrix::Matrix;
pub use shim::*;
