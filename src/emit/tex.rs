//! The matrix for a document in TeX, with LaTeX's own `array` (amsmath's matrices stop at ten
//! columns unless told).

use super::{Delivery, Format, needs_rows};

pub(super) const FORMAT: Format = Format {
    name: "tex",
    extension: "tex",
    says: "LaTeX array in parentheses, for math mode",
    write,
};

fn write(delivery: &Delivery) -> Result<Vec<u8>, String> {
    needs_rows(delivery, FORMAT.name)?;
    let mut out = String::new();
    for line in delivery.head() {
        out.push_str(&format!("% {line}\n"));
    }
    let columns = delivery.matrix.columns();
    out.push_str(&format!(
        "\\left(\\begin{{array}}{{@{{}}*{{{columns}}}{{c}}@{{}}}}\n"
    ));
    let rows: Vec<String> = delivery
        .rows()
        .map(|row| format!("  {}", row.join(" & ")))
        .collect();
    out.push_str(&rows.join(" \\\\\n"));
    out.push_str("\n\\end{array}\\right)\n");
    Ok(out.into_bytes())
}
