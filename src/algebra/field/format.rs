//! How elements and polynomials over GF(p) are written.

use super::{Element, Field};

impl Field {
    /// The element as its integer in the polynomial basis.
    pub fn format_element(&self, element: Element) -> String {
        element.to_string()
    }

    /// The element as a power of the generator: `0`, `1`, `a`, `a^5`.
    pub fn format_as_power(&self, element: Element) -> String {
        match self.log(element) {
            None => "0".into(),
            Some(0) => "1".into(),
            Some(1) => self.symbol().into(),
            Some(exponent) => format!("{}^{exponent}", self.symbol()),
        }
    }
}

/// A polynomial with integer coefficients, given lowest first, written highest power first:
/// `a^4 + 2*a + 1`; `0` when there is nothing to write.
pub fn format_polynomial(coefficients: &[u32], symbol: &str) -> String {
    let terms: Vec<String> = coefficients
        .iter()
        .enumerate()
        .rev()
        .filter(|&(_, &coefficient)| coefficient != 0)
        .map(|(power, &coefficient)| {
            let variable = match power {
                0 => return coefficient.to_string(),
                1 => symbol.to_string(),
                _ => format!("{symbol}^{power}"),
            };
            if coefficient == 1 {
                variable
            } else {
                format!("{coefficient}*{variable}")
            }
        })
        .collect();
    if terms.is_empty() {
        "0".into()
    } else {
        terms.join(" + ")
    }
}
