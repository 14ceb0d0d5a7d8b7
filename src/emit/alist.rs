//! alist (D. MacKay, Encyclopedia of Sparse Graph Codes, description of the alist format; from
//! memory), lists filled up with zeros. Over fields larger than GF(2), q is the third number of
//! the first line, and each index is followed by the integer that names its value in the
//! polynomial basis (fillings are `0 0`).

use std::fmt::Write;

use super::{Delivery, Format};
use crate::algebra::Element;

pub(super) const FORMAT: Format = Format {
    name: "alist",
    extension: "alist",
    says: "alist, with zeros filled up; with values over fields larger than GF(2)",
    write,
};

type List = Vec<(usize, Element)>;

fn write(delivery: &Delivery) -> Result<Vec<u8>, String> {
    let matrix = &delivery.matrix;
    let mut columns: Vec<List> = vec![List::new(); matrix.columns()];
    let mut rows: Vec<List> = vec![List::new(); matrix.rows()];
    for (row, list) in rows.iter_mut().enumerate() {
        for (column, value) in matrix.row(row).into_iter().enumerate() {
            if value != 0 {
                list.push((column, value));
                columns[column].push((row, value));
            }
        }
    }
    let valued = !delivery.field.is_binary();
    let heaviest = |lists: &[List]| lists.iter().map(Vec::len).max().unwrap_or(0);
    let (heaviest_column, heaviest_row) = (heaviest(&columns), heaviest(&rows));
    let mut out = format!("{} {}", columns.len(), rows.len());
    if valued {
        let _ = write!(out, " {}", delivery.field.order());
    }
    let _ = writeln!(out, "\n{heaviest_column} {heaviest_row}");
    for lists in [&columns, &rows] {
        let weights: Vec<String> = lists.iter().map(|list| list.len().to_string()).collect();
        let _ = writeln!(out, "{}", weights.join(" "));
    }
    for (lists, length) in [(&columns, heaviest_column), (&rows, heaviest_row)] {
        for list in lists {
            let mut words: Vec<String> = Vec::with_capacity(length);
            for at in 0..length {
                let (index, value) = list.get(at).map_or((0, 0), |&(at, value)| (at + 1, value));
                words.push(if valued {
                    format!("{index} {value}")
                } else {
                    index.to_string()
                });
            }
            let _ = writeln!(out, "{}", words.join(" "));
        }
    }
    Ok(out.into_bytes())
}
