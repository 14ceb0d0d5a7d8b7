//! `cyclic(length:, roots:)`: all multiples of a generator polynomial.

use super::{Construction, cyclic_bounds};
use crate::algebra::{Field, RootError, generator_from_roots};
use crate::code::{Bound, Code, Cyclic, Knowledge, Made, Rules, Space, lower};
use crate::finding::{Found, catalogue};
use crate::value::{CODE_LENGTH, Call, Value, needed, optional};
use num_bigint::BigInt;
use num_integer::Integer;
use num_traits::ToPrimitive;
use std::collections::BTreeSet;

/// The register's entry.
pub const ENTRY: Construction = Construction {
    name: "cyclic",
    parameters: &[
        needed("length", "an integer", "n, prime to q when roots are given"),
        optional(
            "roots",
            "a set of integers",
            "exponents of a primitive n-th root of unity; their conjugates are roots too",
        ),
        optional(
            "generator",
            "a polynomial in x",
            "a divisor of x^n - 1, in place of roots",
        ),
        optional("in", "a field", "the field in which the roots are named"),
    ],
    says: "The multiples of a generator polynomial modulo x^n - 1; position i of a word carries x^(n-1-i), highest power first.",
    theory: "k is n minus the generator's degree. d is at least one more than the longest run of roots \
             b, b + s, b + 2s, … with s prime to n (Bose and Ray-Chaudhuri, 1960; Hocquenghem, 1959), \
             and more by a second direction (Hartmann and Tzeng, 1972).",
    example: "\
field bit = GF(2)
code gauge_word over bit
  = cyclic(length: 15, roots: 1..4)
  is [15, 7, 5]
",
    run,
};

fn run(call: &Call) -> Found<Made> {
    let field = call.field()?;
    let length = call.size("length", 1, CODE_LENGTH)?;
    match (call.has("roots"), call.has("generator")) {
        (true, false) => by_roots(call, field, length),
        (false, true) => by_generator(call, field, length),
        _ => Err(call.trouble(
            catalogue::BAD_ARGUMENT,
            "`cyclic` takes either `roots:` or `generator:`",
        )),
    }
}

fn by_roots(call: &Call, field: &Field, length: usize) -> Found<Made> {
    let exponents = exponents(call, length)?;
    let stated = if call.has("in") {
        Some(call.field_argument("in")?)
    } else {
        None
    };
    let found = generator_from_roots(field, length as u64, &exponents, stated)
        .map_err(|error| refused(call, field, length, &error))?;
    let cyclic = Cyclic::new(field, length, found.generator.coefficients().to_vec())
        .expect("a product of minimal polynomials of n-th roots of unity divides x^n - 1");
    Ok(made(field, length, cyclic)
        .rules(ByRoots {
            length,
            roots: found.exponents,
        })
        .assuming(found.convention.to_string()))
}

fn made(field: &Field, length: usize, cyclic: Cyclic) -> Made {
    let dimension = cyclic.dimension();
    Made::new(field.clone(), length, Space::Cyclic(cyclic))
        .dimension(dimension)
        .assuming("position i of a word carries x^(n-1-i): highest power first")
}

/// The exponents of the roots modulo n.
fn exponents(call: &Call, length: usize) -> Found<BTreeSet<u64>> {
    let modulus = BigInt::from(length);
    call.items("roots")?
        .iter()
        .map(|item| match item {
            Value::Integer(number) => Ok(number
                .mod_floor(&modulus)
                .to_u64()
                .expect("below the length")),
            other => Err(call.wrong(
                "roots",
                catalogue::WRONG_TYPE,
                format!(
                    "roots are named by their exponents, integers, not by {}",
                    other.kind()
                ),
            )),
        })
        .collect()
}

fn refused(
    call: &Call,
    field: &Field,
    length: usize,
    error: &RootError,
) -> Box<crate::finding::Finding> {
    let (place, message, help) = match error {
        RootError::EmptyLength => (
            "length",
            "a code needs at least one position".to_string(),
            None,
        ),
        RootError::SharedFactor { factor } => (
            "length",
            format!(
                "the length {length} and q = {} share the factor {factor}, so x^{length} - 1 has repeated roots",
                field.order()
            ),
            Some("name the code by `generator:` instead".to_string()),
        ),
        RootError::NotAnExtension => (
            "in",
            format!("the stated root field does not contain {field}"),
            None,
        ),
        RootError::NoPrimitiveRoot { degree } => (
            "in",
            format!("the stated root field has no primitive root of unity of order {length}"),
            Some(format!(
                "take GF({}^{})",
                field.characteristic(),
                u64::from(field.degree()) * degree
            )),
        ),
        RootError::TooLarge { degree } => (
            "length",
            format!(
                "the roots lie in GF({}^{degree}), too large to work in at length {length}",
                field.order()
            ),
            Some("name the code by `generator:` instead".to_string()),
        ),
    };
    let mut finding = call.wrong(place, catalogue::BAD_ROOTS, message);
    finding.help = help;
    finding
}

fn by_generator(call: &Call, field: &Field, length: usize) -> Found<Made> {
    let generator = polynomial(call, "generator", field, length)?;
    let degree = generator.len() - 1;
    let Some(cyclic) = Cyclic::new(field, length, generator) else {
        return Err(call.wrong(
            "generator",
            catalogue::BAD_ROOTS,
            format!("this polynomial of degree {degree} does not divide x^{length} - 1, so its multiples are no cyclic code"),
        ));
    };
    Ok(made(field, length, cyclic).rules(ByGenerator))
}

/// A non-zero polynomial argument of degree at most n, made monic; coefficients lowest first.
pub(super) fn polynomial(call: &Call, name: &str, field: &Field, length: usize) -> Found<Vec<u32>> {
    let coefficients = match call.value(name) {
        Value::Polynomial(polynomial) => {
            call.at(name, polynomial.coefficients(field, length + 1))?
        }
        other => match crate::value::element_of(field, other) {
            Ok(0) => Vec::new(),
            Ok(constant) => vec![constant],
            Err(_) => {
                let message = format!("`{name}` takes a polynomial in x, not {}", other.kind());
                return Err(call.wrong(name, catalogue::WRONG_TYPE, message));
            }
        },
    };
    let Some(&leading) = coefficients.last() else {
        return Err(call.wrong(
            name,
            catalogue::BAD_ROOTS,
            "the zero polynomial generates nothing",
        ));
    };
    let scale = field
        .inv(leading)
        .expect("a leading coefficient is not zero");
    Ok(coefficients
        .iter()
        .map(|&entry| field.mul(entry, scale))
        .collect())
}

struct ByRoots {
    length: usize,
    roots: BTreeSet<u64>,
}

impl Rules for ByRoots {
    fn distance(&self, code: &Code, _known: &dyn Knowledge) -> Vec<Bound> {
        if code.dimension() == 0 {
            return Vec::new();
        }
        cyclic_bounds::bounds(self.length as u64, &self.roots)
    }

    fn cyclic(&self, _code: &Code, _known: &dyn Knowledge) -> Option<String> {
        Some("built from a generator polynomial that divides x^n - 1".to_string())
    }
}

/// A generator polynomial without named roots: x = 1 is still seen.
struct ByGenerator;

impl Rules for ByGenerator {
    fn distance(&self, code: &Code, _known: &dyn Knowledge) -> Vec<Bound> {
        let Space::Cyclic(cyclic) = code.space() else {
            return Vec::new();
        };
        let generator = cyclic.generator();
        if code.dimension() == 0 || generator.len() < 2 || generator[0] == 0 {
            return Vec::new();
        }
        // A single power of x is no multiple of a polynomial with a constant term and a degree.
        vec![lower(
            2,
            "cyclic",
            "no single power of x is a multiple of the generator",
        )]
    }
}
