//! Rows of integers separated by blanks.

use super::{Delivery, Format, needs_rows};

pub(super) const FORMAT: Format = Format {
    name: "txt",
    extension: "txt",
    says: "rows of integers separated by blanks",
    write,
};

fn write(delivery: &Delivery) -> Result<Vec<u8>, String> {
    needs_rows(delivery, FORMAT.name)?;
    let lines = delivery.rows().map(|row| row.join(" ") + "\n");
    Ok(lines.collect::<String>().into_bytes())
}
