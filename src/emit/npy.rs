//! NumPy's array format, version 1.0 (NumPy Enhancement Proposal 1): the smallest unsigned type
//! that holds q − 1, little-endian, stored by rows.

use super::{Delivery, Format};

pub(super) const FORMAT: Format = Format {
    name: "npy",
    extension: "npy",
    says: "NumPy array of unsigned integers, stored by rows",
    write,
};

fn write(delivery: &Delivery) -> Result<Vec<u8>, String> {
    let matrix = &delivery.matrix;
    let (width, descr) = match delivery.field.order() - 1 {
        0..=0xff => (1, "|u1"),
        0x100..=0xffff => (2, "<u2"),
        _ => (4, "<u4"),
    };
    let (rows, columns) = (matrix.rows(), matrix.columns());
    let mut header =
        format!("{{'descr': '{descr}', 'fortran_order': False, 'shape': ({rows}, {columns}), }}");
    // Magic, version and length take 10 bytes; the data begin at a multiple of 64.
    while (10 + header.len() + 1) % 64 != 0 {
        header.push(' ');
    }
    header.push('\n');
    let mut out = b"\x93NUMPY\x01\x00".to_vec();
    out.extend_from_slice(&(header.len() as u16).to_le_bytes());
    out.extend_from_slice(header.as_bytes());
    for row in 0..rows {
        for value in matrix.row(row) {
            out.extend_from_slice(&value.to_le_bytes()[..width]);
        }
    }
    Ok(out)
}
