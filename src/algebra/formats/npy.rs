//! NumPy's array format, versions 1.0 to 3.0 (NumPy Enhancement Proposal 1, A Simple File Format
//! for NumPy Arrays, and the documentation of `numpy.lib.format`).
//!
//! Read are two-dimensional arrays of integers or truth values, of either byte order, stored by
//! rows or by columns.

use super::{ReadError, check_size, element, no_element};
use crate::algebra::{Element, Field, Matrix};

const MAGIC: &[u8] = b"\x93NUMPY";

pub(super) fn read(bytes: &[u8], field: &Field) -> Result<Matrix, ReadError> {
    parse(bytes, field).map_err(ReadError::new)
}

struct Layout {
    width: usize,
    signed: bool,
    big_endian: bool,
    by_columns: bool,
    rows: u64,
    columns: u64,
}

fn parse(bytes: &[u8], field: &Field) -> Result<Matrix, String> {
    let (header, data) = split(bytes)?;
    let layout = layout(header)?;
    check_size(layout.rows, layout.columns)?;
    let (rows, columns) = (layout.rows as usize, layout.columns as usize);
    let expected = layout.rows * layout.columns * layout.width as u64;
    if data.len() as u64 != expected {
        let found = data.len();
        return Err(format!(
            "the shape asks for {expected} bytes of data, there are {found}"
        ));
    }
    if rows.max(columns) > bytes.len().max(1 << 20) {
        return Err("the file is too short for this shape".to_string());
    }
    let mut matrix = Matrix::zero(field, rows, columns);
    for (at, item) in data.chunks_exact(layout.width).enumerate() {
        let (row, column) = if layout.by_columns {
            (at % rows, at / rows)
        } else {
            (at / columns, at % columns)
        };
        let value = value(item, &layout, field)
            .map_err(|says| format!("row {row}, column {column} (from 0): {says}"))?;
        if value != 0 {
            matrix.set(row, column, value);
        }
    }
    Ok(matrix)
}

fn split(bytes: &[u8]) -> Result<(&str, &[u8]), String> {
    let short = || "the file ends within its header".to_string();
    let rest = bytes
        .strip_prefix(MAGIC)
        .ok_or("this is not a NumPy array file: it does not begin with \\x93NUMPY")?;
    let (&[major, _minor], rest) = rest.split_first_chunk::<2>().ok_or_else(short)?;
    let (length, rest) = match major {
        1 => {
            let (length, rest) = rest.split_first_chunk::<2>().ok_or_else(short)?;
            (usize::from(u16::from_le_bytes(*length)), rest)
        }
        2 | 3 => {
            let (length, rest) = rest.split_first_chunk::<4>().ok_or_else(short)?;
            (u32::from_le_bytes(*length) as usize, rest)
        }
        _ => {
            return Err(format!(
                "format version {major} is not known; versions 1 to 3 are"
            ));
        }
    };
    let (header, data) = rest.split_at_checked(length).ok_or_else(short)?;
    let header = std::str::from_utf8(header).map_err(|_| "the header is not text".to_string())?;
    Ok((header, data))
}

/// The header is a dictionary literal with three keys.
fn layout(header: &str) -> Result<Layout, String> {
    let odd = || "the header is not a dictionary of descr, fortran_order and shape".to_string();
    let descr = after(header, "descr").ok_or_else(odd)?;
    let quote = descr
        .chars()
        .next()
        .filter(|mark| matches!(mark, '\'' | '"'));
    let descr = quote
        .and_then(|quote| descr[1..].split_once(quote))
        .ok_or("only plain integer arrays are read, no structured ones")?
        .0;
    let fortran = after(header, "fortran_order").ok_or_else(odd)?;
    let by_columns = match fortran {
        text if text.starts_with("True") => true,
        text if text.starts_with("False") => false,
        _ => return Err(odd()),
    };
    let shape = after(header, "shape")
        .and_then(|text| text.strip_prefix('('))
        .and_then(|text| text.split_once(')'))
        .ok_or_else(odd)?
        .0;
    let sides: Option<Vec<u64>> = shape
        .split(',')
        .map(str::trim)
        .filter(|side| !side.is_empty())
        .map(|side| side.parse().ok())
        .collect();
    let &[rows, columns] = sides.ok_or_else(odd)?.as_slice() else {
        return Err(format!(
            "the array has shape ({shape}); a matrix has two dimensions"
        ));
    };
    let (signed, width, big_endian) = item(descr).ok_or_else(|| {
        format!("entries of type {descr:?} are not read; integers of at most 64 bits are")
    })?;
    Ok(Layout {
        width,
        signed,
        big_endian,
        by_columns,
        rows,
        columns,
    })
}

/// What follows `'key':` in the dictionary.
fn after<'a>(header: &'a str, key: &str) -> Option<&'a str> {
    let quoted = [format!("'{key}'"), format!("\"{key}\"")];
    let (at, found) = quoted
        .iter()
        .find_map(|name| header.find(name.as_str()).map(|at| (at, name)))?;
    let rest = header[at + found.len()..].trim_start();
    Some(rest.strip_prefix(':')?.trim_start())
}

/// Signedness, bytes and byte order of a type code such as `<u2`.
fn item(descr: &str) -> Option<(bool, usize, bool)> {
    let big_endian = descr.starts_with('>');
    let code = descr.trim_start_matches(['<', '>', '|', '=']);
    let (kind, width) = code.split_at_checked(1)?;
    let width: usize = width.parse().ok()?;
    let single = width == 1;
    // Several bytes without a byte order would be a guess.
    let ordered = single || descr.starts_with(['<', '>']);
    match kind {
        "u" | "i" if matches!(width, 1 | 2 | 4 | 8) && ordered => {
            Some((kind == "i", width, big_endian))
        }
        "b" if single => Some((false, width, big_endian)),
        _ => None,
    }
}

fn value(item: &[u8], layout: &Layout, field: &Field) -> Result<Element, String> {
    let fold = |sum: u64, byte: &u8| sum << 8 | u64::from(*byte);
    let value = if layout.big_endian {
        item.iter().fold(0, fold)
    } else {
        item.iter().rev().fold(0, fold)
    };
    let shift = 64 - 8 * layout.width as u32;
    let negative = ((value << shift) as i64) >> shift;
    if layout.signed && negative < 0 {
        return Err(no_element(&negative.to_string(), field));
    }
    element(value, field)
}
