//! Rows of integers separated by commas, no header line.

use super::{Delivery, Format, needs_rows};

pub(super) const FORMAT: Format = Format {
    name: "csv",
    extension: "csv",
    says: "rows of integers separated by commas",
    write,
};

fn write(delivery: &Delivery) -> Result<Vec<u8>, String> {
    needs_rows(delivery, FORMAT.name)?;
    let lines = delivery.rows().map(|row| row.join(",") + "\n");
    Ok(lines.collect::<String>().into_bytes())
}
