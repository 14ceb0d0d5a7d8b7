//! Matrix Market coordinate format (Boisvert, Pozo and Remington, NISTIR 5935, 1996): non-zero
//! entries row by row, indices from 1.

use std::fmt::Write;

use super::{Delivery, Format};

pub(super) const FORMAT: Format = Format {
    name: "mtx",
    extension: "mtx",
    says: "Matrix Market, coordinate integer general; comments say field and form",
    write,
};

fn write(delivery: &Delivery) -> Result<Vec<u8>, String> {
    let matrix = &delivery.matrix;
    let mut entries = String::new();
    let mut count = 0usize;
    for row in 0..matrix.rows() {
        for (column, value) in matrix.row(row).into_iter().enumerate() {
            if value != 0 {
                count += 1;
                let _ = writeln!(entries, "{} {} {value}", row + 1, column + 1);
            }
        }
    }
    let mut out = String::from("%%MatrixMarket matrix coordinate integer general\n");
    for line in delivery.head() {
        // The format limits lines to 1024 characters.
        for part in crate::finding::render::wrap(&line, 1000) {
            let _ = writeln!(out, "% {part}");
        }
    }
    let _ = writeln!(out, "{} {} {count}", matrix.rows(), matrix.columns());
    out.push_str(&entries);
    Ok(out.into_bytes())
}
