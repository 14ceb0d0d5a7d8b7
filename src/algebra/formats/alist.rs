//! alist: the lists of a sparse matrix by columns and by rows (D. MacKay, Encyclopedia of Sparse
//! Graph Codes, description of the alist format; from memory).
//!
//! `columns rows`, the largest column and row weight, all column weights, all row weights, then
//! for each column its row indices and for each row its column indices, counted from 1 and filled
//! up with zeros. Over larger fields the first line has q as a third number, and each index is
//! followed by its value, here the integer that names the element in the polynomial basis.

use super::text::{self, Words};
use super::{ReadError, check_sparse_size};
use crate::algebra::{Element, Field, Matrix};

/// Reads both variants; the lists may or may not be filled up with zeros.
pub(super) fn read(bytes: &[u8], field: &Field) -> Result<Matrix, ReadError> {
    let text = text::utf8(bytes)?;
    let mut words = Words::new(text);
    let columns = words.count("the number of columns")?;
    let rows = words.count("the number of rows")?;
    let size_line = words.line();
    let valued = words.next_line() == Some(size_line);
    if valued {
        let order = words.count("the order of the field")?;
        if order != field.order() {
            let says = format!("the file is over GF({order}), not {field}");
            return Err(ReadError::at(size_line, says));
        }
    }
    check_sparse_size(rows, columns, bytes.len()).map_err(|says| ReadError::at(size_line, says))?;
    let largest_column = words.count("the largest column weight")?;
    let largest_row = words.count("the largest row weight")?;
    let column_weights = weights(&mut words, columns, largest_column, bytes.len())?;
    let row_weights = weights(&mut words, rows, largest_row, bytes.len())?;

    let mut matrix = Matrix::zero(field, rows as usize, columns as usize);
    for (column, &weight) in column_weights.iter().enumerate() {
        list(&mut words, weight, rows, valued, field, |row, value| {
            let fresh = matrix.get(row, column) == 0;
            matrix.set(row, column, value);
            fresh
                .then_some(())
                .ok_or("an index stands twice in this list")
        })?;
    }
    for (row, &weight) in row_weights.iter().enumerate() {
        let mut left = (0..matrix.columns())
            .filter(|&column| matrix.get(row, column) != 0)
            .count();
        let mut seen = std::collections::BTreeSet::new();
        list(
            &mut words,
            weight,
            columns,
            valued,
            field,
            |column, value| {
                left = left.saturating_sub(1);
                let agrees = matrix.get(row, column) == value && seen.insert(column);
                agrees
                    .then_some(())
                    .ok_or("the lists by rows and by columns disagree here")
            },
        )?;
        if left > 0 {
            let says = format!(
                "the list of row {} lacks entries that the columns have",
                row + 1
            );
            return Err(ReadError::at(words.line(), says));
        }
    }
    match words.next_line() {
        Some(line) => Err(ReadError::at(
            line,
            "there is more here than the weights announce",
        )),
        None => Ok(matrix),
    }
}

fn weights(
    words: &mut Words<'_>,
    count: u64,
    largest: u64,
    bytes: usize,
) -> Result<Vec<u64>, ReadError> {
    if count > bytes as u64 {
        return Err(ReadError::at(
            words.line(),
            "the file is too short for this size",
        ));
    }
    (0..count)
        .map(|_| {
            let weight = words.count("the last weight")?;
            if weight > largest {
                let says = format!("weight {weight} is above the stated largest, {largest}");
                return Err(ReadError::at(words.line(), says));
            }
            Ok(weight)
        })
        .collect()
}

/// Takes one list of `weight` indices (with values), and the zeros that fill it up.
fn list(
    words: &mut Words<'_>,
    weight: u64,
    end: u64,
    valued: bool,
    field: &Field,
    mut take: impl FnMut(usize, Element) -> Result<(), &'static str>,
) -> Result<(), ReadError> {
    for _ in 0..weight {
        let index = words.count("the last list")?;
        if index == 0 || index > end {
            let says = format!("an index from 1 to {end} is expected here, not {index}");
            return Err(ReadError::at(words.line(), says));
        }
        let value = if valued {
            let (line, word) = words.word("the value of an entry")?;
            text::entry(word, line, field)?
        } else {
            1
        };
        if value == 0 {
            return Err(ReadError::at(words.line(), "a listed entry is not zero"));
        }
        take(index as usize - 1, value).map_err(|says| ReadError::at(words.line(), says))?;
    }
    // No index is zero, so what follows as zero is filling; with values, zeros come in pairs.
    while words.peek().is_some_and(is_zero) {
        words.count("")?;
        if valued && words.count("the value of an entry")? != 0 {
            return Err(ReadError::at(words.line(), "a value without an index"));
        }
    }
    Ok(())
}

fn is_zero(word: &str) -> bool {
    word.bytes().all(|byte| byte == b'0')
}
