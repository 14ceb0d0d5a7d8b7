//! Non-negative numbers enclosed between two that are rounded outward.

use num_bigint::{BigInt, BigUint};
use num_rational::BigRational;
use num_traits::{One, Zero};

/// Binary digits kept of each end.
const PRECISION: u64 = 256;
/// Ends below 2^−DEPTH become zero or this, so that fractions stay of a sensible size.
const DEPTH: i64 = 1 << 18;

#[derive(Clone, Copy, PartialEq, Eq)]
enum Toward {
    Below,
    Above,
}

/// mantissa · 2^exponent.
#[derive(Clone, Debug)]
struct Rounded {
    mantissa: BigUint,
    exponent: i64,
}

impl Rounded {
    fn new(mantissa: BigUint, exponent: i64, toward: Toward) -> Rounded {
        let surplus = mantissa.bits().saturating_sub(PRECISION);
        if surplus == 0 {
            return Rounded { mantissa, exponent };
        }
        let mut kept = &mantissa >> surplus;
        if toward == Toward::Above
            && mantissa
                .trailing_zeros()
                .is_some_and(|zeros| zeros < surplus)
        {
            kept += 1u8;
        }
        Rounded {
            mantissa: kept,
            exponent: exponent + surplus as i64,
        }
    }

    /// left / right of two integers, right not zero.
    fn quotient(left: &BigUint, right: &BigUint, exponent: i64, toward: Toward) -> Rounded {
        let lift = (PRECISION + 2 + right.bits()).saturating_sub(left.bits());
        let lifted = left << lift;
        let mut quotient = &lifted / right;
        if toward == Toward::Above && &quotient * right != lifted {
            quotient += 1u8;
        }
        Rounded::new(quotient, exponent - lift as i64, toward)
    }

    fn times(&self, other: &Rounded, toward: Toward) -> Rounded {
        Rounded::new(
            &self.mantissa * &other.mantissa,
            self.exponent + other.exponent,
            toward,
        )
    }

    fn plus(&self, other: &Rounded, toward: Toward) -> Rounded {
        let (large, small) = if self.top() >= other.top() {
            (self, other)
        } else {
            (other, self)
        };
        if small.mantissa.is_zero() {
            return large.clone();
        }
        // What lies far below the last digit kept only pushes that digit up, if anything.
        let gap = large.exponent - small.exponent;
        if large.top() - small.top() > 2 * PRECISION as i64 {
            let low = match toward {
                Toward::Below => BigUint::zero(),
                Toward::Above => BigUint::one(),
            };
            return Rounded::new(
                (&large.mantissa << PRECISION) + low,
                large.exponent - PRECISION as i64,
                toward,
            );
        }
        let (mantissa, exponent) = if gap >= 0 {
            ((&large.mantissa << gap) + &small.mantissa, small.exponent)
        } else {
            ((&small.mantissa << -gap) + &large.mantissa, large.exponent)
        };
        Rounded::new(mantissa, exponent, toward)
    }

    /// The place above the first digit; far below everything for zero.
    fn top(&self) -> i64 {
        if self.mantissa.is_zero() {
            i64::MIN / 4
        } else {
            self.mantissa.bits() as i64 + self.exponent
        }
    }

    fn to_fraction(&self, toward: Toward) -> BigRational {
        if self.mantissa.is_zero() {
            return BigRational::zero();
        }
        if self.top() < -DEPTH {
            return match toward {
                Toward::Below => BigRational::zero(),
                Toward::Above => {
                    BigRational::new_raw(BigInt::one(), BigInt::one() << DEPTH as usize)
                }
            };
        }
        let mantissa = BigInt::from(self.mantissa.clone());
        if self.exponent >= 0 {
            return BigRational::from_integer(mantissa << self.exponent as usize);
        }
        // Both sides share powers of two only.
        let common = (self.mantissa.trailing_zeros().unwrap_or(0) as i64).min(-self.exponent);
        BigRational::new_raw(
            mantissa >> common as usize,
            BigInt::one() << (-self.exponent - common) as usize,
        )
    }
}

/// A number known to lie between two.
#[derive(Clone, Debug)]
pub(super) struct Enclosure {
    lower: Rounded,
    upper: Rounded,
}

impl Enclosure {
    /// An integer.
    pub(super) fn integer(number: &BigUint) -> Enclosure {
        Enclosure {
            lower: Rounded::new(number.clone(), 0, Toward::Below),
            upper: Rounded::new(number.clone(), 0, Toward::Above),
        }
    }

    /// Nothing.
    pub(super) fn zero() -> Enclosure {
        Enclosure::integer(&BigUint::zero())
    }

    /// numerator / denominator, the latter not zero.
    pub(super) fn fraction(numerator: &BigUint, denominator: &BigUint) -> Enclosure {
        Enclosure {
            lower: Rounded::quotient(numerator, denominator, 0, Toward::Below),
            upper: Rounded::quotient(numerator, denominator, 0, Toward::Above),
        }
    }

    /// The product.
    pub(super) fn times(&self, other: &Enclosure) -> Enclosure {
        Enclosure {
            lower: self.lower.times(&other.lower, Toward::Below),
            upper: self.upper.times(&other.upper, Toward::Above),
        }
    }

    /// The sum.
    pub(super) fn plus(&self, other: &Enclosure) -> Enclosure {
        Enclosure {
            lower: self.lower.plus(&other.lower, Toward::Below),
            upper: self.upper.plus(&other.upper, Toward::Above),
        }
    }

    /// This · numerator / denominator, the latter not zero.
    pub(super) fn scaled(&self, numerator: &BigUint, denominator: &BigUint) -> Enclosure {
        let end = |end: &Rounded, toward| {
            Rounded::quotient(
                &(&end.mantissa * numerator),
                denominator,
                end.exponent,
                toward,
            )
        };
        Enclosure {
            lower: end(&self.lower, Toward::Below),
            upper: end(&self.upper, Toward::Above),
        }
    }

    /// The power.
    pub(super) fn power(&self, exponent: usize) -> Enclosure {
        let mut result = Enclosure::integer(&BigUint::one());
        for bit in (0..usize::BITS - exponent.leading_zeros()).rev() {
            result = result.times(&result);
            if exponent >> bit & 1 == 1 {
                result = result.times(self);
            }
        }
        result
    }

    /// With more added to the upper end alone.
    pub(super) fn widened(&self, more: &Enclosure) -> Enclosure {
        Enclosure {
            lower: self.lower.clone(),
            upper: self.upper.plus(&more.upper, Toward::Above),
        }
    }

    /// Whether it is surely less than another divided by 2^bits.
    pub(super) fn negligible_beside(&self, other: &Enclosure, bits: i64) -> bool {
        self.upper.top() + bits < other.lower.top()
    }

    /// The ends as fractions.
    pub(super) fn ends(&self) -> (BigRational, BigRational) {
        (
            self.lower.to_fraction(Toward::Below),
            self.upper.to_fraction(Toward::Above),
        )
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn sums_and_products_lie_within_their_enclosures() {
        // 1/3 + 1/7 = 10/21 and (2/3)^50, by fractions.
        let number = |value: u32| BigUint::from(value);
        let third = Enclosure::fraction(&number(1), &number(3));
        let seventh = Enclosure::fraction(&number(1), &number(7));
        let within = |enclosure: Enclosure, top: BigInt, bottom: BigInt| {
            let (lower, upper) = enclosure.ends();
            let exact = BigRational::new(top, bottom);
            assert!(lower < exact && exact < upper);
            assert!((upper - lower) < exact / BigInt::from(10).pow(70));
        };
        within(third.plus(&seventh), 10.into(), 21.into());
        within(
            third.scaled(&number(2), &number(1)).power(50),
            BigInt::from(2).pow(50),
            BigInt::from(3).pow(50),
        );
        // Far apart: the small one may not be lost from the upper end.
        let tiny = third.power(2000);
        let (lower, upper) = Enclosure::integer(&number(1)).plus(&tiny).ends();
        assert!(lower <= BigRational::one() && upper > BigRational::one());
    }
}
