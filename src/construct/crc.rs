//! `crc(length:, generator:)`: the words that leave no remainder.

use super::{Construction, cyclic};
use crate::algebra::{Field, Matrix};
use crate::code::{Bound, Code, Knowledge, Made, Rules, Space, lower, upper};
use crate::finding::{Found, catalogue};
use crate::value::{CODE_LENGTH, Call, needed};

/// The register's entry.
pub const ENTRY: Construction = Construction {
    name: "crc",
    parameters: &[
        needed("length", "an integer", "data and checks together"),
        needed("generator", "a polynomial in x", "with a constant term"),
    ],
    says: "The words whose polynomial, highest power first, is a multiple of the generator: a message followed by its remainder.",
    theory: "The check matrix holds the remainders of the powers of x, so two equal columns, at a \
             distance of the order of x, end the promise (Peterson and Brown, 1961). A generator \
             with the factor x + 1 over GF(2) lets only even weights through. An initial value, a \
             reflection and a final complement add a fixed word and leave the distance as it is.",
    example: "\
field bit = GF(2)
code gauge_frame over bit
  = crc(length: 40, generator: x^8 + x^2 + x + 1)
  is [40, 32, 4]
",
    run,
};

fn run(call: &Call) -> Found<Made> {
    let field = call.field()?;
    let length = call.size("length", 1, CODE_LENGTH)?;
    let generator = cyclic::polynomial(call, "generator", field, length)?;
    if generator[0] == 0 {
        let mut finding = call.wrong(
            "generator",
            catalogue::BAD_ROOTS,
            "this generator has the factor x, which checks nothing",
        );
        finding.help = Some("divide by x, or add the constant term".to_string());
        return Err(finding);
    }
    let redundancy = generator.len() - 1;
    if redundancy > length {
        let message =
            format!("the generator has degree {redundancy}, more than the length {length}");
        return Err(call.wrong("generator", catalogue::BAD_ROOTS, message));
    }
    let even = field.is_binary() && generator.iter().filter(|&&entry| entry != 0).count() % 2 == 0;
    let (matrix, order) = remainders(field, length, &generator);
    Ok(Made::new(field.clone(), length, Space::Check(matrix))
        .dimension(length - redundancy)
        .rules(Crc {
            even,
            checks: redundancy,
            order,
        })
        .assuming("position i of a word carries x^(n-1-i): highest power first, checks last"))
}

/// The remainder of x^(n−1−i) in column i, highest power in the first row: the identity comes
/// last. With it the order of x, when it is less than n.
fn remainders(field: &Field, length: usize, generator: &[u32]) -> (Matrix, Option<usize>) {
    let redundancy = generator.len() - 1;
    let mut matrix = Matrix::zero(field, redundancy, length);
    let mut power = vec![0; redundancy];
    if let Some(first) = power.first_mut() {
        *first = 1;
    }
    let mut order = None;
    for position in (0..length).rev() {
        let exponent = length - 1 - position;
        let is_one = power.first() == Some(&1) && power[1..].iter().all(|&entry| entry == 0);
        if exponent > 0 && order.is_none() && is_one {
            order = Some(exponent);
        }
        for (at, &coefficient) in power.iter().enumerate() {
            if coefficient != 0 {
                matrix.set(redundancy - 1 - at, position, coefficient);
            }
        }
        let Some(&top) = power.last() else { continue };
        power.rotate_right(1);
        power[0] = 0;
        if top != 0 {
            for (entry, &coefficient) in power.iter_mut().zip(generator) {
                *entry = field.sub(*entry, field.mul(top, coefficient));
            }
        }
    }
    (matrix, order)
}

struct Crc {
    even: bool,
    checks: usize,
    /// The least e > 0 below the length with remainder 1 for x^e.
    order: Option<usize>,
}

impl Crc {
    /// x^e - 1 is a multiple of the generator, and fits into the length.
    fn two_terms(&self, code: &Code) -> Option<Bound> {
        let order = self.order.filter(|_| code.dimension() > 0)?;
        let length = code.length();
        let mut word = vec![0; length];
        word[length - 1 - order] = 1;
        word[length - 1] = code.field().neg(1);
        let says = format!(
            "x^{order} leaves the remainder 1, so two errors {order} positions apart go unseen; \
             no length up to {order} has room for them"
        );
        Some(upper(2, "order of x", says, Some(word)))
    }
}

impl Rules for Crc {
    fn distance(&self, code: &Code, _known: &dyn Knowledge) -> Vec<Bound> {
        let mut bounds: Vec<Bound> = self.two_terms(code).into_iter().collect();
        if self.even && self.checks > 0 && code.dimension() > 0 {
            bounds.push(lower(
                2,
                "even",
                "the generator has the factor x + 1, so every weight is even",
            ));
        }
        bounds
    }
}
