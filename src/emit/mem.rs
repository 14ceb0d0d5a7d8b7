//! One row a line in binary digits, as `$readmemb` reads it (IEEE Std 1800-2017, §21.4).

use super::{Delivery, Format, needs_rows};

pub(super) const FORMAT: Format = Format {
    name: "mem",
    extension: "mem",
    says: "one row a line in binary digits, for $readmemb; over GF(2) only",
    write,
};

fn write(delivery: &Delivery) -> Result<Vec<u8>, String> {
    if !delivery.field.is_binary() {
        let field = &delivery.field;
        return Err(format!(
            "mem holds bits, and this matrix is over {field}; take txt or json"
        ));
    }
    needs_rows(delivery, FORMAT.name)?;
    let mut out = String::new();
    for line in delivery.head() {
        out.push_str(&format!("// {line}\n"));
    }
    let last = delivery.matrix.columns() - 1;
    out.push_str(&format!(
        "// position 0 is the leftmost digit, bit [{last}] of a [{last}:0] memory word\n"
    ));
    for row in delivery.rows() {
        out.push_str(&row.concat());
        out.push('\n');
    }
    Ok(out.into_bytes())
}
