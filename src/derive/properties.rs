//! Properties of a code, each with its decision procedure and grounds.

use super::{Effort, Judgement, Session, Verdict, small_check, small_generator};
use crate::algebra::Matrix;
use crate::code::{Code, Space, weight};
use num_bigint::BigUint;

/// The most multiplications that a property may cost.
const WORK: usize = 1 << 33;

/// The most entries of a matrix whose columns are all kept at once.
const COLUMN_ENTRIES: usize = 1 << 26;

/// A property: its name in the language, what it means, how it is decided.
pub struct Property {
    /// The name.
    pub name: &'static str,
    /// What it means.
    pub says: &'static str,
    /// Decides it.
    pub decide: fn(&Session, &Code) -> Judgement,
}

/// All properties, in the order of reports.
pub const PROPERTIES: &[Property] = &[
    Property {
        name: "mds",
        says: "d = n - k + 1, the most that Singleton's bound allows",
        decide: mds,
    },
    Property {
        name: "perfect",
        says: "the balls of radius (d - 1)/2 around the words fill the space",
        decide: perfect,
    },
    Property {
        name: "self_dual",
        says: "the code is its own dual",
        decide: self_dual,
    },
    Property {
        name: "self_orthogonal",
        says: "all words are orthogonal to each other: the code lies in its dual",
        decide: self_orthogonal,
    },
    Property {
        name: "dual_containing",
        says: "the dual lies in the code",
        decide: dual_containing,
    },
    Property {
        name: "complementary_dual",
        says: "the code and its dual share only the zero word",
        decide: complementary_dual,
    },
    Property {
        name: "cyclic",
        says: "every cyclic shift of a word is a word",
        decide: is_cyclic,
    },
    Property {
        name: "even",
        says: "every weight is even",
        decide: even,
    },
    Property {
        name: "doubly_even",
        says: "every weight is divisible by 4",
        decide: doubly_even,
    },
    Property {
        name: "systematic",
        says: "the data stand unchanged at one end of the word",
        decide: systematic,
    },
    Property {
        name: "equidistant",
        says: "all words but zero have the same weight",
        decide: equidistant,
    },
    Property {
        name: "projective",
        says: "no two positions are multiples of each other: the dual's distance is at least 3",
        decide: projective,
    },
];

/// The property of this name.
pub fn property(name: &str) -> Option<&'static Property> {
    PROPERTIES.iter().find(|property| property.name == name)
}

fn mds(session: &Session, code: &Code) -> Judgement {
    if code.dimension() == 0 {
        return Judgement::undecided("the zero code has no distance");
    }
    let singleton = code.redundancy() + 1;
    let distance = session.distance_until(code, |known| {
        known.lower == singleton || known.upper < singleton
    });
    if distance.lower == singleton {
        Judgement::holds(format!("d = n - k + 1 = {singleton}"))
    } else if distance.upper < singleton {
        Judgement::fails(format!(
            "d is at most {}, but n - k + 1 = {singleton}",
            distance.upper
        ))
        .witness(distance.witness)
    } else {
        Judgement::undecided(format!(
            "d lies in {}..{}; n - k + 1 = {singleton}",
            distance.lower, distance.upper
        ))
    }
}

fn perfect(session: &Session, code: &Code) -> Judgement {
    if code.dimension() == 0 {
        return Judgement::undecided("the zero code has no distance");
    }
    let distance = session.distance_by(code, Effort::Full);
    let Some(d) = distance.exact() else {
        return Judgement::undecided(format!(
            "d is only known to lie in {}..{}",
            distance.lower, distance.upper
        ));
    };
    let radius = (d - 1) / 2;
    let ball = ball(code.length(), code.field().order(), radius);
    let cosets = BigUint::from(code.field().order()).pow(code.redundancy() as u32);
    Judgement::of(
        ball == cosets,
        format!(
            "a ball of radius {radius} holds q^(n-k) = {} words",
            short(&cosets)
        ),
        format!(
            "a ball of radius {radius} holds {} words, q^(n-k) is {}",
            short(&ball),
            short(&cosets)
        ),
    )
}

/// A number with its digits, or roughly when it has more than a reader counts.
fn short(number: &BigUint) -> String {
    let digits = number.to_string();
    if digits.len() <= 24 {
        return digits;
    }
    format!(
        "about {}.{} * 10^{}",
        &digits[..1],
        &digits[1..4],
        digits.len() - 1
    )
}

/// The number of words within a distance of one.
pub fn ball(length: usize, order: u64, radius: usize) -> BigUint {
    let mut term = BigUint::from(1u8);
    let mut sum = term.clone();
    for at in 0..radius.min(length) {
        term = term * (length - at) * (order - 1) / (at + 1);
        sum += &term;
    }
    sum
}

fn too_large() -> Judgement {
    Judgement::undecided("the matrices are too large to build")
}

/// The first pair of rows of two matrices that are not orthogonal; `Err` when it costs too much.
fn skew_pair(one: &Matrix, two: &Matrix) -> Result<Option<(usize, usize)>, ()> {
    if one
        .rows()
        .saturating_mul(two.rows())
        .saturating_mul(one.columns())
        > WORK
    {
        return Err(());
    }
    for row in 0..one.rows() {
        let products = two.times(&one.row(row));
        if let Some(other) = products.iter().position(|&product| product != 0) {
            return Ok(Some((row, other)));
        }
    }
    Ok(None)
}

fn orthogonal(one: &Matrix, two: &Matrix, yes: &str, what: &str) -> Judgement {
    match skew_pair(one, two) {
        Ok(None) => Judgement::holds(yes),
        Ok(Some((row, other))) => Judgement::fails(format!(
            "rows {row} and {other} of {what} are not orthogonal"
        )),
        Err(()) => Judgement::undecided("the matrices are too large to multiply"),
    }
}

fn self_orthogonal(_session: &Session, code: &Code) -> Judgement {
    if code.dimension() > code.redundancy() {
        return Judgement::fails(format!(
            "k = {} is more than n - k = {}",
            code.dimension(),
            code.redundancy()
        ));
    }
    let Some(generator) = small_generator(code) else {
        return too_large();
    };
    orthogonal(
        generator,
        generator,
        "all rows of a generator matrix are orthogonal to each other",
        "the generator matrix",
    )
}

fn dual_containing(_session: &Session, code: &Code) -> Judgement {
    if code.dimension() < code.redundancy() {
        return Judgement::fails(format!(
            "k = {} is less than n - k = {}",
            code.dimension(),
            code.redundancy()
        ));
    }
    let Some(check) = small_check(code) else {
        return too_large();
    };
    orthogonal(
        check,
        check,
        "all rows of a check matrix are orthogonal to each other",
        "the check matrix",
    )
}

fn self_dual(session: &Session, code: &Code) -> Judgement {
    if code.dimension() != code.redundancy() {
        return Judgement::fails(format!(
            "k = {} is not n - k = {}",
            code.dimension(),
            code.redundancy()
        ));
    }
    let judgement = self_orthogonal(session, code);
    if judgement.verdict == Verdict::Holds {
        return Judgement::holds(
            "k = n - k, and all rows of a generator matrix are orthogonal to each other",
        );
    }
    judgement
}

fn complementary_dual(_session: &Session, code: &Code) -> Judgement {
    // The code and its dual have one hull, so the smaller of the two matrices decides.
    let by_checks = code.redundancy() < code.dimension();
    let size = code.dimension().min(code.redundancy());
    if size.saturating_mul(size).saturating_mul(code.length()) > WORK {
        return Judgement::undecided("the matrices are too large to multiply");
    }
    let (matrix, name) = match by_checks {
        true => (code.check_matrix(), "H"),
        false => (code.generator_matrix(), "G"),
    };
    let rank = matrix.multiply(&matrix.transpose()).rank();
    Judgement::of(
        rank == size,
        format!("{name} times its transpose is invertible (Massey, 1992)"),
        format!(
            "{name} times its transpose has rank {rank}, not {size}: the code meets its dual in dimension {}",
            size - rank
        ),
    )
}

/// Whether the code is cyclic in its order of positions.
pub fn is_cyclic(session: &Session, code: &Code) -> Judgement {
    if let Space::Cyclic(_) = code.space() {
        return Judgement::holds("built from a generator polynomial that divides x^n - 1");
    }
    if let Some(says) = code
        .unnamed()
        .origin()
        .rules
        .cyclic(code.unnamed(), session)
    {
        return Judgement::holds(says);
    }
    let length = code.length();
    if code
        .dimension()
        .saturating_mul(code.redundancy())
        .saturating_mul(length)
        > WORK
    {
        return Judgement::undecided("the matrices are too large to multiply");
    }
    let order: Vec<usize> = (0..length).map(|at| (at + length - 1) % length).collect();
    let (Some(generator), Some(check)) = (small_generator(code), small_check(code)) else {
        return too_large();
    };
    let shifted = generator.select_columns(&order);
    match skew_pair(&shifted, check) {
        Ok(None) => Judgement::holds("the shifts of a generator matrix's rows are words"),
        Ok(Some((row, _))) => {
            Judgement::fails("a word's cyclic shift is no word").witness(Some(generator.row(row)))
        }
        Err(()) => Judgement::undecided("the matrices are too large to multiply"),
    }
}

fn divisible(session: &Session, code: &Code, by: usize) -> Judgement {
    let weights = session.weights_by(code, Effort::Small);
    let Some(weights) = weights else {
        let distance = session.distance_by(code, Effort::Theorems);
        if let Some(d) = distance.exact().filter(|d| d % by != 0) {
            return Judgement::fails(format!("words of weight d = {d} occur"))
                .witness(distance.witness);
        }
        if !affordable(code) {
            return Judgement::undecided(
                "the weights are not known, and a generator matrix is too large to build",
            );
        }
        let divisor = divisor(code);
        if divisor.is_multiple_of(by) {
            return Judgement::holds(format!(
                "all rows of a generator matrix have weights divisible by {by}, and so have their sums"
            ));
        }
        let Some(generator) = small_generator(code) else {
            return too_large();
        };
        let odd = (0..generator.rows())
            .map(|row| generator.row(row))
            .find(|row| !weight(row).is_multiple_of(by));
        return match odd {
            Some(word) => {
                Judgement::fails(format!("a word has weight {}", weight(&word))).witness(Some(word))
            }
            None => skew_sum(code, generator, by),
        };
    };
    match weights.counts.keys().find(|&&weight| weight % by != 0) {
        None => Judgement::holds(format!("every weight that occurs is divisible by {by}")),
        Some(weight) => Judgement::fails(format!("words of weight {weight} occur")),
    }
}

/// Two rows whose sum has a weight that is not divisible, when each row's is.
fn skew_sum(code: &Code, generator: &Matrix, by: usize) -> Judgement {
    let field = code.field();
    if let Ok(Some((row, other))) = skew_pair(generator, generator)
        && row != other
    {
        let sum: Vec<u32> = generator
            .row(row)
            .iter()
            .zip(generator.row(other))
            .map(|(&left, right)| field.add(left, right))
            .collect();
        if !weight(&sum).is_multiple_of(by) {
            return Judgement::fails(format!("a word has weight {}", weight(&sum)))
                .witness(Some(sum));
        }
    }
    Judgement::undecided("the weights are not known")
}

fn even(session: &Session, code: &Code) -> Judgement {
    divisible(session, code, 2)
}

fn doubly_even(session: &Session, code: &Code) -> Judgement {
    divisible(session, code, 4)
}

/// Whether a generator matrix is small enough to be built for a question on the side.
fn affordable(code: &Code) -> bool {
    code.dimension().saturating_mul(code.length()) <= 1 << 26
}

/// A number that surely divides every weight: 2 or 4 for binary codes whose generators show it,
/// otherwise 1. For GF(2): all rows even, or all divisible by 4 and orthogonal to each other
/// (MacWilliams and Sloane, 1977, ch. 1 §8 problem 38). For GF(3), a self-orthogonal code's weights are
/// divisible by 3.
pub fn divisor(code: &Code) -> usize {
    let order = code.field().order();
    if order > 3 || !affordable(code) {
        return 1;
    }
    let generator = code.generator_matrix();
    let rows: Vec<usize> = (0..generator.rows())
        .map(|row| weight(&generator.row(row)))
        .collect();
    let all = |by: usize| rows.iter().all(|weight| weight % by == 0);
    let orthogonal = || skew_pair(generator, generator) == Ok(None);
    match order {
        2 if all(4) && orthogonal() => 4,
        2 if all(2) => 2,
        3 if all(3) && orthogonal() => 3,
        _ => 1,
    }
}

fn systematic(_session: &Session, code: &Code) -> Judgement {
    let (n, k) = (code.length(), code.dimension());
    if let Space::Cyclic(_) = code.space() {
        return Judgement::holds(
            "the first k positions of a cyclic code are free to carry data, the checks come last",
        );
    }
    // Some positions carry the data just when the others can carry the checks.
    let informative = |data: std::ops::Range<usize>, checks: std::ops::Range<usize>| {
        if k <= n - k {
            let positions: Vec<usize> = data.collect();
            small_generator(code).map(|matrix| matrix.select_columns(&positions).rank() == k)
        } else {
            let positions: Vec<usize> = checks.collect();
            small_check(code).map(|matrix| matrix.select_columns(&positions).rank() == n - k)
        }
    };
    let (Some(first), Some(last)) = (informative(0..k, k..n), informative(n - k..n, 0..n - k))
    else {
        return too_large();
    };
    if first {
        return Judgement::holds(
            "the first k positions are free to carry data, the checks come last",
        );
    }
    if last {
        return Judgement::holds(
            "the last k positions are free to carry data, the checks come first",
        );
    }
    Judgement::fails(
        "neither the first nor the last k positions are independent; `arrange(data: first)` moves the data there",
    )
}

fn equidistant(session: &Session, code: &Code) -> Judgement {
    let Some(weights) = session.weights_by(code, Effort::Full) else {
        return Judgement::undecided("the weights are not known");
    };
    let occurring: Vec<usize> = weights
        .counts
        .keys()
        .copied()
        .filter(|&weight| weight > 0)
        .collect();
    match occurring.as_slice() {
        [] => Judgement::holds("there is no word but zero"),
        [only] => Judgement::holds(format!("every word but zero has weight {only}")),
        [least, .., most] => Judgement::fails(format!("words of weights {least} and {most} occur")),
    }
}

fn projective(_session: &Session, code: &Code) -> Judgement {
    let field = code.field();
    if code.dimension().saturating_mul(code.length()) > COLUMN_ENTRIES {
        return too_large();
    }
    let generator = code.generator_matrix();
    let mut seen = std::collections::HashMap::new();
    for position in 0..code.length() {
        let mut column = generator.column(position);
        let Some(leading) = column.iter().copied().find(|&entry| entry != 0) else {
            return Judgement::fails(format!("position {position} is zero in every word"));
        };
        let scale = field.inv(leading).expect("not zero");
        for entry in &mut column {
            *entry = field.mul(*entry, scale);
        }
        if let Some(other) = seen.insert(column, position) {
            return Judgement::fails(format!(
                "positions {other} and {position} carry multiples of the same symbol"
            ));
        }
    }
    Judgement::holds("no two columns of a generator matrix are multiples of each other")
}
