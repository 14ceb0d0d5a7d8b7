//! Numbers and strings as written, to their exact values.

use super::tree::ExpressionKind as Kind;
use crate::finding::{Finding, Found, catalogue};
use crate::source::Span;
use num_bigint::BigInt;
use num_rational::BigRational;
use num_traits::{Num, One};

/// The longest number that is read, in digits.
pub const MAX_DIGITS: usize = 20_000;

/// The largest exponent of a decimal, either way.
const MAX_EXPONENT: i64 = 5_000;

/// `42`, `0x1d`, `0b101`; `text` is the whole file, for messages.
///
/// # Errors
/// When it has more than [`MAX_DIGITS`] digits or a leading zero.
pub fn integer(written: &str, span: Span, text: &str) -> Found<Kind> {
    if written.len() > MAX_DIGITS {
        return Err(too_long(span));
    }
    let (digits, base) = match written.get(..2) {
        Some("0x") => (&written[2..], 16),
        Some("0b") => (&written[2..], 2),
        _ => (written, 10),
    };
    if base == 10 && digits.len() > 1 && digits.starts_with('0') {
        return Err(leading_zero(digits, span, text));
    }
    match BigInt::from_str_radix(digits, base) {
        Ok(value) => Ok(Kind::Integer(value)),
        Err(_) => unreachable!("the grammar reads digits of base {base} only"),
    }
}

fn leading_zero(digits: &str, span: Span, text: &str) -> Box<Finding> {
    let before = text.get(..span.start as usize).unwrap_or("");
    let whole = before.strip_suffix(',').map(|before| {
        let start = before
            .trim_end_matches(|digit: char| digit.is_ascii_digit())
            .len();
        &before[start..]
    });
    let finding = Finding::new(catalogue::SYNTAX, span, "a number has no leading zeros");
    Box::new(match whole.filter(|whole| !whole.is_empty()) {
        Some(whole) => finding.label("digits after a decimal comma?").help(format!(
            "decimals are written with a point: `{whole}.{digits}`"
        )),
        None => {
            let plain = digits.trim_start_matches('0');
            let plain = if plain.is_empty() { "0" } else { plain };
            finding.label("begins with 0").help(format!(
                "write `{plain}`; `0x…` and `0b…` begin hexadecimal and binary numbers"
            ))
        }
    })
}

/// `0.004`, `1e-12`, exactly.
///
/// # Errors
/// When digits or exponent pass the stated limits.
pub fn decimal(written: &str, span: Span) -> Found<Kind> {
    let (mantissa, exponent) = written.split_once(['e', 'E']).unwrap_or((written, "0"));
    let (whole, fraction) = mantissa.split_once('.').unwrap_or((mantissa, ""));
    let exponent = exponent.parse::<i64>().unwrap_or(i64::MAX);
    if mantissa.len() > MAX_DIGITS || !(-MAX_EXPONENT..=MAX_EXPONENT).contains(&exponent) {
        return Err(too_long(span));
    }
    let Ok(digits) = BigInt::from_str_radix(&format!("{whole}{fraction}"), 10) else {
        unreachable!("the grammar reads decimal digits only");
    };
    let places = exponent - fraction.len() as i64;
    let scale = BigInt::from(10).pow(places.unsigned_abs() as u32);
    Ok(Kind::Decimal(if places < 0 {
        BigRational::new(digits, scale)
    } else {
        BigRational::new(digits * scale, BigInt::one())
    }))
}

fn too_long(span: Span) -> Box<Finding> {
    Box::new(
        Finding::new(catalogue::LIMIT, span, "this number is too long to be read")
            .label("too many digits")
            .help(format!(
                "numbers may have {MAX_DIGITS} digits and decimals an exponent up to {MAX_EXPONENT}; write a power such as `2^4096`"
            )),
    )
}

/// The content of a quoted string.
pub fn unescape(quoted: &str) -> String {
    let inner = quoted
        .strip_prefix('"')
        .and_then(|rest| rest.strip_suffix('"'))
        .unwrap_or(quoted);
    let mut content = String::with_capacity(inner.len());
    let mut letters = inner.chars();
    while let Some(letter) = letters.next() {
        content.push(match letter {
            '\\' => match letters.next() {
                Some('n') => '\n',
                Some(other) => other,
                None => '\\',
            },
            other => other,
        });
    }
    content
}
