//! Fields, polynomials and matrices: the arithmetic under the language.
//!
//! Elements are plain integers ([`Element`]), interpreted by a [`Field`]; a [`Matrix`] knows its
//! field. Nothing here knows of codes or of spans, and errors are values that the rooms below
//! turn into findings.

pub mod field;
pub mod formats;
pub mod kernels;
pub mod matrix;
pub mod numbers;
pub mod polynomial;

pub use field::{Basis, Element, Embedding, Field, FieldError, format_polynomial};
pub use matrix::Matrix;
pub use numbers::{factor_u64, is_prime, order_modulo, prime_power};
pub use polynomial::Polynomial;
pub use polynomial::roots::{
    CyclicRoots, RootConvention, RootError, cyclotomic_coset, generator_from_roots,
};
