//! The probability of an event that is known by how many error patterns of each weight it holds.

use super::enclosure::Enclosure;
use num_bigint::{BigInt, BigUint};
use num_rational::BigRational;
use num_traits::{One, Zero};

/// Fractions with denominators of up to so many binary digits are kept exact.
const EXACT_BITS: u64 = 1 << 13;
/// Terms are left out, and bounded, when they are this many binary digits below the sum.
const NEGLIGIBLE: i64 = 280;

/// A probability between two bounds, both included; exact when they are equal.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Probability {
    /// It is at least this.
    pub lower: BigRational,
    /// It is at most this.
    pub upper: BigRational,
}

impl Probability {
    /// Known exactly.
    pub fn exact(value: BigRational) -> Probability {
        Probability {
            lower: value.clone(),
            upper: value,
        }
    }

    /// Known to lie between the lower end of one and the upper end of another.
    pub fn between(lower: &Probability, upper: &Probability) -> Probability {
        Probability {
            lower: lower.lower.clone(),
            upper: upper.upper.clone(),
        }
        .at_most_one()
    }

    fn at_most_one(mut self) -> Probability {
        let one = BigRational::one();
        if self.upper > one {
            self.upper = one;
        }
        self
    }

    fn enclosed(value: &Enclosure) -> Probability {
        let (lower, upper) = value.ends();
        Probability { lower, upper }.at_most_one()
    }
}

impl std::fmt::Display for Probability {
    /// `is 0.25`, `is 1.5e-9` when so many digits are certain, or the bounds.
    fn fmt(&self, formatter: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        let (lower, upper) = (decimal(&self.lower, false), decimal(&self.upper, true));
        let nearest = decimal(&self.upper, false);
        if lower == upper {
            write!(formatter, "is {lower}")
        } else if lower == nearest {
            write!(formatter, "is {lower}…")
        } else if self.lower.is_zero() {
            write!(formatter, "is at most {upper}")
        } else {
            write!(formatter, "lies between {lower} and {upper}")
        }
    }
}

/// How likely n symbols are to change, each with probability `rate` on its own and to each of
/// `wrong` values alike.
#[derive(Clone, Debug)]
pub struct Noise {
    length: usize,
    wrong: BigUint,
    /// rate = top / bottom.
    top: BigUint,
    bottom: BigUint,
}

impl Noise {
    /// Of so many symbols; `rate` lies between 0 and 1, `wrong` is 1 when only the places count.
    pub fn new(length: usize, rate: &BigRational, wrong: u64) -> Noise {
        Noise {
            length,
            wrong: BigUint::from(wrong),
            top: rate.numer().magnitude().clone(),
            bottom: rate.denom().magnitude().clone(),
        }
    }

    fn rest(&self) -> BigUint {
        &self.bottom - &self.top
    }

    /// The probability of an event that holds `counts(w)` patterns of each weight w: (w, count) in
    /// ascending order, zeros left out.
    pub fn of_patterns(&self, counts: &[(usize, BigUint)]) -> Probability {
        let bits = (self.bottom.bits() + self.wrong.bits()) * self.length as u64;
        if bits <= EXACT_BITS || self.rest().is_zero() {
            return self.exactly(counts);
        }
        let mut sum = Enclosure::zero();
        let mut term = Enclosure::fraction(&self.rest(), &self.bottom).power(self.length);
        // Each further wrong symbol, to one wrong value.
        let step = Enclosure::fraction(&self.top, &(self.rest() * &self.wrong));
        let mut at = 0;
        for (weight, count) in counts {
            term = term.times(&step.power(weight - at));
            at = *weight;
            sum = sum.plus(&term.times(&Enclosure::integer(count)));
        }
        Probability::enclosed(&sum)
    }

    fn exactly(&self, counts: &[(usize, BigUint)]) -> Probability {
        let rest = self.rest();
        let n = self.length as u32;
        let mut sum = BigUint::zero();
        for (weight, count) in counts {
            let weight = *weight as u32;
            sum += count * self.top.pow(weight) * (&rest * &self.wrong).pow(n - weight);
        }
        Probability::exact(BigRational::new(
            BigInt::from(sum),
            BigInt::from((&self.bottom * &self.wrong).pow(n)),
        ))
    }

    /// The probability that more than `most` symbols change.
    pub fn more_than(&self, most: usize) -> Probability {
        let n = self.length;
        if most >= n || self.top.is_zero() {
            return Probability::exact(BigRational::zero());
        }
        if self.rest().is_zero() {
            return Probability::exact(BigRational::one());
        }
        if self.bottom.bits() * n as u64 <= EXACT_BITS {
            return self.tail_exactly(most);
        }
        let rest = self.rest();
        let mut term = Enclosure::fraction(&rest, &self.bottom).power(n);
        let mut sum = Enclosure::zero();
        for weight in 0..=n {
            if weight > most {
                sum = sum.plus(&term);
            }
            if weight == n {
                break;
            }
            // C(n, w + 1) / C(n, w) times the odds.
            let (up, down) = (&self.top * (n - weight), &rest * (weight + 1));
            let falling = up < down;
            term = term.scaled(&up, &down);
            if weight >= most && falling && term.negligible_beside(&sum, NEGLIGIBLE) {
                // No later term is larger than this one.
                let left = Enclosure::integer(&BigUint::from(n - weight));
                sum = sum.widened(&term.times(&left));
                break;
            }
        }
        Probability::enclosed(&sum)
    }

    fn tail_exactly(&self, most: usize) -> Probability {
        let (n, rest) = (self.length, self.rest());
        let mut term = rest.pow(n as u32);
        let mut sum = term.clone();
        for weight in 0..most {
            term = term * &self.top * (n - weight) / (&rest * (weight + 1));
            sum += &term;
        }
        let whole = self.bottom.pow(n as u32);
        Probability::exact(BigRational::new(
            BigInt::from(&whole - sum),
            BigInt::from(whole),
        ))
    }
}

/// A fraction from 0 on in decimal notation with six digits, rounded up or down.
pub fn decimal(value: &BigRational, up: bool) -> String {
    if value.is_zero() {
        return "0".to_string();
    }
    let ten = BigInt::from(10);
    let power = |exponent: i64| ten.pow(exponent.unsigned_abs() as u32);
    // 0.30103 is log10(2); the guess is off by one at most and mended below.
    let bits = value.numer().bits() as i64 - value.denom().bits() as i64;
    let mut exponent = bits * 30_103 / 100_000 - 1;
    let at_least = |exponent: i64| {
        if exponent >= 0 {
            *value.numer() >= value.denom() * power(exponent)
        } else {
            value.numer() * power(exponent) >= *value.denom()
        }
    };
    while at_least(exponent + 1) {
        exponent += 1;
    }
    while !at_least(exponent) {
        exponent -= 1;
    }
    let shift = 5 - exponent;
    let (top, bottom) = if shift >= 0 {
        (value.numer() * power(shift), value.denom().clone())
    } else {
        (value.numer().clone(), value.denom() * power(shift))
    };
    let mut digits = &top / &bottom;
    if up && &digits * &bottom != top {
        digits += 1;
    }
    if digits == power(6) {
        digits = power(5);
        exponent += 1;
    }
    let digits = digits.to_string();
    if (-4..6).contains(&exponent) {
        return plain(&digits, exponent);
    }
    let tail = digits[1..].trim_end_matches('0');
    let point = if tail.is_empty() { "" } else { "." };
    format!("{}{point}{tail}e{exponent}", &digits[..1])
}

/// Six digits with the first at 10^exponent, no power of ten written.
fn plain(digits: &str, exponent: i64) -> String {
    if exponent < 0 {
        let zeros = "0".repeat((-exponent - 1) as usize);
        return format!("0.{zeros}{}", digits.trim_end_matches('0'));
    }
    let (whole, tail) = digits.split_at(exponent as usize + 1);
    let tail = tail.trim_end_matches('0');
    let point = if tail.is_empty() { "" } else { "." };
    format!("{whole}{point}{tail}")
}

#[cfg(test)]
mod tests {
    use super::*;

    fn fraction(top: i64, bottom: i64) -> BigRational {
        BigRational::new(top.into(), bottom.into())
    }

    #[test]
    fn numbers_are_written_as_readers_expect() {
        assert_eq!(decimal(&fraction(1, 2), false), "0.5");
        assert_eq!(decimal(&fraction(1, 3), false), "0.333333");
        assert_eq!(decimal(&fraction(1, 3), true), "0.333334");
        assert_eq!(decimal(&fraction(2, 300_000), true), "6.66667e-6");
        assert_eq!(decimal(&fraction(1, 1_000_000), false), "1e-6");
        assert_eq!(decimal(&fraction(1, 1), false), "1");
        assert_eq!(decimal(&fraction(9_999_999, 10_000_000), true), "1");
        assert_eq!(decimal(&fraction(1500, 1), false), "1500");
    }

    #[test]
    fn long_and_short_ways_agree() {
        let noise = Noise::new(60, &fraction(1, 250), 1);
        for most in [0, 1, 5, 30, 59] {
            let exact = noise.tail_exactly(most);
            // The same digits with a length beyond the exact way, symbols split in two halves.
            let counts: Vec<(usize, BigUint)> = (most + 1..=60)
                .map(|weight| (weight, choose(60, weight)))
                .collect();
            assert_eq!(noise.of_patterns(&counts), exact);
        }
    }

    #[test]
    fn an_enclosed_tail_holds_the_exact_one() {
        let noise = Noise::new(2000, &fraction(1, 250), 1);
        for most in [0, 3, 8, 20, 100] {
            let exact = noise.tail_exactly(most);
            let enclosed = noise.more_than(most);
            assert!(enclosed.lower < exact.lower && exact.upper < enclosed.upper);
            let width = (&enclosed.upper - &enclosed.lower) / &exact.lower;
            assert!(width < fraction(1, 1_000_000_000_000));
        }
    }

    fn choose(n: usize, k: usize) -> BigUint {
        (0..k).fold(BigUint::one(), |product, at| product * (n - at) / (at + 1))
    }
}
