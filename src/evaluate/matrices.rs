//! Matrix literals, blocks and circulants.

use super::expression::{mistyped, placed, wrong};
use super::{Evaluator, Outcome, Scope};
use crate::algebra::{Field, Matrix};
use crate::finding::{Finding, catalogue};
use crate::source::Span;
use crate::syntax::tree::Expression;
use crate::value::{MATRIX_ENTRIES, Value, element_of};
use std::sync::Arc;

impl Evaluator<'_> {
    fn field_here(&self, span: Span, scope: &Scope, what: &str) -> Outcome<Field> {
        scope.field.clone().ok_or_else(|| {
            Box::new(
                Finding::new(
                    catalogue::FIELD_UNSTATED,
                    span,
                    format!("which field {what} lies over does not follow"),
                )
                .help("state it: `matrix NAME over FIELD = …`, or `… over GF(2)` behind the expression"),
            )
            .into()
        })
    }

    /// `| 1 0 | | 0 1 |`
    pub(super) fn rows(
        &self,
        rows: &[Vec<Expression>],
        span: Span,
        scope: &Scope,
    ) -> Outcome<Value> {
        let field = self.field_here(span, scope, "this matrix")?;
        let columns = rows.first().map_or(0, Vec::len);
        let mut entries = Vec::with_capacity(rows.len());
        for (at, row) in rows.iter().enumerate() {
            if row.len() != columns {
                return Err(wrong(
                    catalogue::SHAPE,
                    covering(row).unwrap_or(span),
                    format!(
                        "row {at} has {} entries, but row 0 has {columns}",
                        row.len()
                    ),
                ));
            }
            let mut values = Vec::with_capacity(columns);
            for entry in row {
                let value = self.evaluate(entry, scope)?;
                values.push(placed(signed_element(&field, &value), entry.span)?);
            }
            entries.push(values);
        }
        Ok(Value::Matrix(Arc::new(Matrix::from_rows(
            &field, columns, &entries,
        ))))
    }

    /// `blocks | A B | | C D |`; a row of blocks is as high as its blocks, a plain 0 fills.
    pub(super) fn blocks(
        &self,
        rows: &[Vec<Expression>],
        span: Span,
        scope: &Scope,
    ) -> Outcome<Value> {
        let mut whole: Option<Matrix> = None;
        for row in rows {
            let mut line: Option<Matrix> = None;
            for block in row {
                let matrix = match self.evaluate(block, scope)? {
                    Value::Matrix(matrix) => matrix,
                    other => return Err(mistyped(block.span, "a block is a matrix", &other)),
                };
                line = Some(match line {
                    None => (*matrix).clone(),
                    Some(line) => {
                        self.same_field(&line, &matrix, block.span)?;
                        if line.rows() != matrix.rows() {
                            return Err(wrong(
                                catalogue::SHAPE,
                                block.span,
                                format!(
                                    "this block has {} rows, the one before it {}",
                                    matrix.rows(),
                                    line.rows()
                                ),
                            ));
                        }
                        self.fits(line.rows(), line.columns() + matrix.columns(), span)?;
                        line.beside(&matrix)
                    }
                });
            }
            let Some(line) = line else { continue };
            whole = Some(match whole {
                None => line,
                Some(whole) => {
                    let place = covering(row).unwrap_or(span);
                    self.same_field(&whole, &line, place)?;
                    if whole.columns() != line.columns() {
                        return Err(wrong(
                            catalogue::SHAPE,
                            place,
                            format!(
                                "this row of blocks has {} columns, the ones above {}",
                                line.columns(),
                                whole.columns()
                            ),
                        ));
                    }
                    self.fits(whole.rows() + line.rows(), whole.columns(), span)?;
                    whole.above(&line)
                }
            });
        }
        match whole {
            Some(matrix) => Ok(Value::Matrix(Arc::new(matrix))),
            None => Err(wrong(
                catalogue::SHAPE,
                span,
                "there are no blocks here".into(),
            )),
        }
    }

    /// `circulants of size z | 0 - 5 |`: identities shifted to the right, `-` for zero.
    pub(super) fn circulants(
        &self,
        size: &Expression,
        rows: &[Vec<Option<Expression>>],
        span: Span,
        scope: &Scope,
    ) -> Outcome<Value> {
        let field = self.field_here(span, scope, "this matrix")?;
        let size = self.size(size, scope, "the size of a block", 1, 1 << 20)?;
        let width = rows.first().map_or(0, Vec::len);
        self.fits(rows.len() * size, width.saturating_mul(size), span)?;
        let height = rows.len() * size;
        let mut entries: Vec<Vec<(usize, u32)>> = vec![Vec::new(); height];
        for (block_row, row) in rows.iter().enumerate() {
            if row.len() != width {
                let place = row.iter().flatten().next().map_or(span, |entry| entry.span);
                let message = format!(
                    "row {block_row} has {} blocks, but row 0 has {width}",
                    row.len()
                );
                return Err(wrong(catalogue::SHAPE, place, message));
            }
            for (block_column, shift) in row.iter().enumerate() {
                let Some(shift) = shift else { continue };
                let shift = self.size(shift, scope, "a shift", 0, size - 1)?;
                for at in 0..size {
                    entries[block_row * size + at]
                        .push((block_column * size + (at + shift) % size, 1));
                }
            }
        }
        let matrix = Matrix::from_sparse(&field, height, width * size, entries);
        Ok(Value::Matrix(Arc::new(matrix)))
    }

    fn same_field(&self, one: &Matrix, other: &Matrix, span: Span) -> Outcome<()> {
        if one.field() == other.field() {
            return Ok(());
        }
        let message = format!(
            "this block is over {}, the ones before it over {}",
            other.field(),
            one.field()
        );
        Err(wrong(catalogue::FIELD_MISMATCH, span, message))
    }

    pub(super) fn fits(&self, rows: usize, columns: usize, span: Span) -> Outcome<()> {
        if rows.saturating_mul(columns) > MATRIX_ENTRIES {
            let message = format!(
                "a {rows} x {columns} matrix has more than the {MATRIX_ENTRIES} entries allowed"
            );
            return Err(wrong(catalogue::LIMIT, span, message));
        }
        Ok(())
    }
}

/// An entry of a matrix: an element, or the negative of one.
fn signed_element(field: &Field, value: &Value) -> Result<u32, crate::value::Trouble> {
    match value {
        Value::Integer(number) if num_traits::Signed::is_negative(number) => {
            Ok(field.neg(element_of(field, &Value::Integer(-number))?))
        }
        _ => element_of(field, value),
    }
}

fn covering(entries: &[Expression]) -> Option<Span> {
    Some(entries.first()?.span.to(entries.last()?.span))
}
