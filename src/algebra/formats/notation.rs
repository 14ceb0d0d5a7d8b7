//! How a field is named in files and reports.

use crate::algebra::Field;

/// The modulus as a polynomial in x, highest power first (`x^8 + x^4 + x^3 + x^2 + 1`); `None` for
/// a prime field, which needs none.
pub fn modulus_text(field: &Field) -> Option<String> {
    if field.degree() == 1 {
        return None;
    }
    let terms: Vec<String> = field
        .modulus()
        .iter()
        .enumerate()
        .rev()
        .filter(|&(_, &coefficient)| coefficient != 0)
        .map(|(power, &coefficient)| match (coefficient, power) {
            (_, 0) => coefficient.to_string(),
            (1, 1) => "x".to_string(),
            (_, 1) => format!("{coefficient}x"),
            (1, _) => format!("x^{power}"),
            _ => format!("{coefficient}x^{power}"),
        })
        .collect();
    Some(terms.join(" + "))
}
