//! Matrix Market exchange format (Boisvert, Pozo and Remington, The Matrix Market Exchange
//! Formats: Initial Design, NISTIR 5935, 1996).
//!
//! Read are `coordinate` and `array` objects of kind `integer` or `pattern`, with every symmetry
//! those kinds have. An entry given twice is refused, for the description leaves its meaning open.

use super::text::{self, Words};
use super::{ReadError, check_size, check_sparse_size};
use crate::algebra::{Element, Field, Matrix};

#[derive(Clone, Copy, PartialEq, Eq)]
enum Symmetry {
    General,
    Symmetric,
    Skew,
}

struct Header {
    coordinate: bool,
    pattern: bool,
    symmetry: Symmetry,
}

pub(super) fn read(bytes: &[u8], field: &Field) -> Result<Matrix, ReadError> {
    let text = text::utf8(bytes)?;
    let header = header(text.lines().next().unwrap_or_default())?;
    // Blanking comments keeps the line numbers of what follows.
    let mut body = String::with_capacity(text.len());
    let mut comments = true;
    for line in text.lines() {
        comments &= line.trim().is_empty() || line.starts_with('%');
        if !comments {
            body.push_str(line);
        }
        body.push('\n');
    }
    let mut words = Words::new(&body);
    let rows = words.count("the number of rows")?;
    let columns = words.count("the number of columns")?;
    if header.symmetry != Symmetry::General && rows != columns {
        return Err(ReadError::at(words.line(), "a symmetric matrix is square"));
    }
    let matrix = if header.coordinate {
        coordinate(&mut words, &header, (rows, columns), bytes.len(), field)?
    } else {
        array(&mut words, &header, (rows, columns), bytes.len(), field)?
    };
    match words.next_line() {
        Some(line) => Err(ReadError::at(
            line,
            "there is more here than the size line announces",
        )),
        None => Ok(matrix),
    }
}

fn header(line: &str) -> Result<Header, ReadError> {
    let lower = line.to_ascii_lowercase();
    let words: Vec<&str> = lower.split_whitespace().collect();
    let [banner, "matrix", layout, kind, symmetry] = words[..] else {
        return Err(ReadError::at(1, EXPECTED));
    };
    let symmetry = match symmetry {
        "general" => Symmetry::General,
        "symmetric" => Symmetry::Symmetric,
        "skew-symmetric" => Symmetry::Skew,
        _ => return Err(ReadError::at(1, EXPECTED)),
    };
    let coordinate = layout == "coordinate";
    let pattern = kind == "pattern";
    if banner != "%%matrixmarket" || !(coordinate || layout == "array") {
        return Err(ReadError::at(1, EXPECTED));
    }
    if kind != "integer" && !pattern {
        let kind = text::quoted(kind);
        return Err(ReadError::at(
            1,
            format!("entries of kind {kind} name no field elements; write `integer` or `pattern`"),
        ));
    }
    if pattern && (!coordinate || symmetry == Symmetry::Skew) {
        return Err(ReadError::at(
            1,
            "a pattern is a coordinate matrix, general or symmetric",
        ));
    }
    Ok(Header {
        coordinate,
        pattern,
        symmetry,
    })
}

const EXPECTED: &str =
    "the first line must read `%%MatrixMarket matrix coordinate|array integer|pattern general`";

fn coordinate(
    words: &mut Words<'_>,
    header: &Header,
    (rows, columns): (u64, u64),
    bytes: usize,
    field: &Field,
) -> Result<Matrix, ReadError> {
    let count = words.count("the number of entries")?;
    let size_line = words.line();
    check_sparse_size(rows, columns, bytes).map_err(|says| ReadError::at(size_line, says))?;
    // An entry takes four bytes at least, so this bounds the loop and the list by the file.
    if count > bytes as u64 {
        return Err(ReadError::at(
            size_line,
            format!("{count} entries are announced, the file has fewer"),
        ));
    }
    let mut matrix = Matrix::zero(field, rows as usize, columns as usize);
    let mut seen = std::collections::BTreeSet::new();
    for _ in 0..count {
        let row = index(words, rows, "row")?;
        let column = index(words, columns, "column")?;
        let value = if header.pattern {
            1
        } else {
            let (line, word) = words.word("the value of an entry")?;
            text::entry(word, line, field)?
        };
        let line = words.line();
        if !seen.insert((row, column)) {
            return Err(ReadError::at(
                line,
                format!("row {}, column {} is given twice", row + 1, column + 1),
            ));
        }
        place(&mut matrix, header.symmetry, row, column, value)
            .map_err(|says| ReadError::at(line, says))?;
    }
    Ok(matrix)
}

fn index(words: &mut Words<'_>, end: u64, what: &str) -> Result<usize, ReadError> {
    let value = words.count("the last entry announced")?;
    if value == 0 || value > end {
        return Err(ReadError::at(
            words.line(),
            format!("there is no {what} {value}; they run from 1 to {end}"),
        ));
    }
    Ok(value as usize - 1)
}

fn array(
    words: &mut Words<'_>,
    header: &Header,
    (rows, columns): (u64, u64),
    bytes: usize,
    field: &Field,
) -> Result<Matrix, ReadError> {
    let size_line = words.line();
    check_size(rows, columns).map_err(|says| ReadError::at(size_line, says))?;
    // A triangle is at least a third of its square (one row apart, which is checked as read).
    if (rows * columns) / 4 > bytes as u64 || rows.max(columns) > MOST_EMPTY.max(bytes as u64) {
        return Err(ReadError::at(
            size_line,
            "the file is too short for this size",
        ));
    }
    let mut matrix = Matrix::zero(field, rows as usize, columns as usize);
    for column in 0..columns as usize {
        let first = match header.symmetry {
            Symmetry::General => 0,
            Symmetry::Symmetric => column,
            Symmetry::Skew => column + 1,
        };
        for row in first..rows as usize {
            let (line, word) = words.word("the last entry")?;
            let value = text::entry(word, line, field)?;
            place(&mut matrix, header.symmetry, row, column, value)
                .map_err(|says| ReadError::at(line, says))?;
        }
    }
    Ok(matrix)
}

/// The longest side of an array without entries.
const MOST_EMPTY: u64 = 1 << 20;

fn place(
    matrix: &mut Matrix,
    symmetry: Symmetry,
    row: usize,
    column: usize,
    value: Element,
) -> Result<(), String> {
    let below = match symmetry {
        Symmetry::General => true,
        Symmetry::Symmetric => row >= column,
        Symmetry::Skew => row > column,
    };
    if !below {
        return Err("a symmetric matrix is given by its entries below the diagonal".to_string());
    }
    matrix.set(row, column, value);
    match symmetry {
        Symmetry::General => {}
        Symmetry::Symmetric => matrix.set(column, row, value),
        Symmetry::Skew => {
            let negative = matrix.field().neg(value);
            matrix.set(column, row, negative);
        }
    }
    Ok(())
}
