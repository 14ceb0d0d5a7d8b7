//! The matrix that a step works on.

use crate::algebra::Matrix;
use crate::code::{Code, Space};

/// A code as a check or a generator matrix.
pub(super) enum Plain<'a> {
    /// The null space of a check matrix.
    Check(&'a Matrix),
    /// The row space of a generator matrix.
    Span(&'a Matrix),
}

impl Plain<'_> {
    /// The presentation as built; of a cyclic code the matrix with fewer rows.
    pub fn of(code: &Code) -> Plain<'_> {
        match code.space() {
            Space::Check(matrix) => Plain::Check(matrix),
            Space::Span(matrix) => Plain::Span(matrix),
            Space::Cyclic(_) if code.redundancy() <= code.dimension() => {
                Plain::Check(code.check_matrix())
            }
            Space::Cyclic(_) => Plain::Span(code.generator_matrix()),
        }
    }
}

/// The check matrix as built where there is one, else one of full rank.
pub(super) fn checks(code: &Code) -> &Matrix {
    code.check_matrix_as_built()
        .unwrap_or_else(|| code.check_matrix())
}

/// The generator matrix as built where there is one, else one of full rank.
pub(super) fn generators(code: &Code) -> &Matrix {
    code.generator_matrix_as_built()
        .unwrap_or_else(|| code.generator_matrix())
}
