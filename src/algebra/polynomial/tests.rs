use std::collections::BTreeSet;

use super::roots::{RootConvention, RootError, cyclotomic_coset, generator_from_roots};
use super::splitting::{PowerTable, cyclotomic_factors};
use super::*;

fn field(p: u64, m: u32) -> Field {
    Field::conway(p, m).unwrap()
}

fn poly(field: &Field, coefficients: &[u32]) -> Polynomial {
    Polynomial::new(field, coefficients.to_vec())
}

fn random(field: &Field, length: usize, seed: u64) -> Polynomial {
    let mut state = seed;
    let coefficients = (0..length)
        .map(|_| {
            state = state
                .wrapping_mul(6_364_136_223_846_793_005)
                .wrapping_add(99);
            ((state >> 33) % field.order()) as u32
        })
        .collect();
    Polynomial::new(field, coefficients)
}

#[test]
fn quotient_and_remainder_make_the_dividend() {
    for (p, m) in [(2, 1), (3, 1), (2, 4), (3, 2), (257, 1)] {
        let field = field(p, m);
        for seed in 0..20 {
            let dividend = random(&field, 12, seed);
            let divisor = random(&field, 5, seed + 100).add(&Polynomial::monomial(&field, 1, 5));
            let (quotient, rest) = dividend.div_rem(&divisor);
            assert!(rest.degree().is_none_or(|degree| degree < 5));
            assert_eq!(quotient.mul(&divisor).add(&rest), dividend);
            let common = dividend.gcd(&divisor);
            if !dividend.is_zero() {
                assert!(dividend.rem(&common).is_zero() && divisor.rem(&common).is_zero());
                assert_eq!(
                    dividend.lcm(&divisor).mul(&common),
                    dividend.mul(&divisor).monic()
                );
            }
        }
    }
}

#[test]
fn irreducible_polynomials_are_those_without_factors() {
    for (p, m, top) in [(2, 1, 7), (3, 1, 4), (2, 2, 3)] {
        let field = field(p, m);
        let q = field.order();
        let all = |degree: u32| {
            (0..q.pow(degree)).map(move |low| {
                let mut rest = low;
                let mut digits: Vec<u32> = (0..degree)
                    .map(|_| {
                        let digit = rest % q;
                        rest /= q;
                        digit as u32
                    })
                    .collect();
                digits.push(1);
                digits
            })
        };
        for degree in 1..=top {
            for digits in all(degree) {
                let candidate = poly(&field, &digits);
                let divisible = (1..=degree / 2)
                    .flat_map(&all)
                    .any(|divisor| candidate.rem(&poly(&field, &divisor)).is_zero());
                assert_eq!(candidate.is_irreducible(), !divisible, "{candidate}");
            }
        }
        assert!(!Polynomial::one(&field).is_irreducible());
    }
}

#[test]
fn polynomials_are_written_highest_power_first() {
    let field = field(2, 4);
    assert_eq!(poly(&field, &[1, 2, 0, 0, 1]).to_string(), "x^4 + 2*x + 1");
    assert_eq!(Polynomial::zero(&field).to_string(), "0");
    assert_eq!(poly(&field, &[5, 3, 7]).derivative(), poly(&field, &[3]));
    let roots = Polynomial::from_roots(&field, &[1, 2, 4]);
    assert_eq!(roots.degree(), Some(3));
    assert!([1, 2, 4].iter().all(|&root| roots.evaluate(root) == 0));
}

#[test]
fn known_generators_of_length_fifteen() {
    // P. Lin and D. Costello, Error Control Coding, table of BCH generators of length 15; from memory.
    let bits = field(2, 1);
    let generator = |top: u64| {
        let exponents = (1..=top).collect();
        generator_from_roots(&bits, 15, &exponents, None)
            .unwrap()
            .generator
            .to_string()
    };
    assert_eq!(generator(2), "x^4 + x + 1");
    assert_eq!(generator(4), "x^8 + x^7 + x^6 + x^4 + 1");
    assert_eq!(generator(6), "x^10 + x^8 + x^5 + x^4 + x^2 + x + 1");
}

#[test]
fn generators_have_the_roots_of_their_set() {
    let cases: [(u64, u32, u64, &[u64]); 10] = [
        (2, 1, 15, &[0, 1, 3, 7]),
        (2, 3, 7, &[0, 1, 2, 4, 5]),
        (2, 1, 21, &[1, 2, 3]),
        (2, 1, 23, &[1]),
        (3, 1, 11, &[1]),
        (2, 2, 21, &[0, 1, 5]),
        (2, 8, 255, &[0, 1, 2, 3, 40]),
        (3, 2, 40, &[1, 7]),
        (5, 1, 31, &[2, 5]),
        (2, 1, 1, &[0]),
    ];
    for (p, m, n, exponents) in cases {
        let field = field(p, m);
        let asked: BTreeSet<u64> = exponents.iter().copied().collect();
        let roots = generator_from_roots(&field, n, &asked, None).unwrap();
        assert!(asked.is_subset(&roots.exponents));
        assert_eq!(roots.generator.degree(), Some(roots.exponents.len()));
        let modulus = Polynomial::cyclic_modulus(&field, n as usize);
        assert!(modulus.rem(&roots.generator).is_zero(), "{field} {n}");
        let (RootConvention::OwnField(large) | RootConvention::Conway(large)) = &roots.convention
        else {
            panic!("small splitting fields have tables");
        };
        let embedding = large.embedding_of(&field).unwrap();
        for exponent in 0..n {
            let beta = large.power_of_generator((large.order() - 1) / n * exponent);
            let value = roots
                .generator
                .coefficients()
                .iter()
                .rev()
                .fold(0, |value, &c| {
                    large.add(large.mul(value, beta), embedding.up(c))
                });
            assert_eq!(value == 0, roots.exponents.contains(&exponent));
        }
    }
}

#[test]
fn large_splitting_fields_are_reached_through_a_factor() {
    for n in [47, 79, 97, 103] {
        let bits = field(2, 1);
        let asked = BTreeSet::from([0, 1, n - 1]);
        let roots = generator_from_roots(&bits, n, &asked, None).unwrap();
        let RootConvention::LeastFactor(factor) = &roots.convention else {
            panic!("{n}: the splitting field is large");
        };
        assert!(factor.is_irreducible());
        // Evaluate at powers of x modulo the factor: the roots are exactly the set claimed.
        let x = Polynomial::monomial(&bits, 1, 1);
        for exponent in 0..n {
            let beta = x.pow_mod(exponent, factor);
            let value = roots
                .generator
                .coefficients()
                .iter()
                .rev()
                .fold(Polynomial::zero(&bits), |value, &c| {
                    value.mul(&beta).rem(factor).add(&poly(&bits, &[c]))
                });
            assert_eq!(
                value.is_zero(),
                roots.exponents.contains(&exponent),
                "{n} {exponent}"
            );
        }
    }
}

#[test]
fn cyclotomic_factors_multiply_to_the_cyclotomic_polynomial() {
    for (p, m, n) in [
        (2, 1, 47),
        (2, 1, 73),
        (3, 1, 13),
        (3, 1, 40),
        (2, 2, 51),
        (7, 1, 43),
        (5, 2, 37),
        (2, 3, 79),
    ] {
        let field = field(p, m);
        let factors = cyclotomic_factors(&field, n);
        let product = factors
            .iter()
            .fold(Polynomial::one(&field), |product, f| product.mul(f));
        assert!(
            factors.iter().all(Polynomial::is_irreducible),
            "{field} {n}"
        );
        let x = Polynomial::monomial(&field, 1, 1);
        for factor in &factors {
            let order = (1..=n as u64).find(|&e| x.pow_mod(e, factor) == Polynomial::one(&field));
            assert_eq!(order, Some(n as u64));
        }
        assert_eq!(
            product.degree(),
            Some(crate::algebra::numbers::euler_phi(n as u64) as usize)
        );
        let powers = PowerTable::new(&factors[0], n);
        assert_eq!(powers.minimal_polynomial(1), factors[0]);
        let other = powers.minimal_polynomial(2);
        assert!(other.is_irreducible());
        assert!(Polynomial::cyclic_modulus(&field, n).rem(&other).is_zero());
    }
}

#[test]
fn impossible_roots_are_refused() {
    let bits = field(2, 1);
    let one = BTreeSet::from([1]);
    let error = |n, large: Option<&Field>| generator_from_roots(&bits, n, &one, large).unwrap_err();
    assert_eq!(error(0, None), RootError::EmptyLength);
    assert_eq!(error(14, None), RootError::SharedFactor { factor: 2 });
    assert_eq!(error(15, Some(&field(3, 2))), RootError::NotAnExtension);
    assert_eq!(
        error(15, Some(&field(2, 3))),
        RootError::NoPrimitiveRoot { degree: 4 }
    );
    assert_eq!(
        error(1_000_003, None),
        RootError::TooLarge {
            degree: order(1_000_003)
        }
    );
    assert!(generator_from_roots(&bits, 15, &one, Some(&field(2, 8))).is_ok());
}

fn order(n: u64) -> u64 {
    crate::algebra::order_modulo(2, n).unwrap()
}

#[test]
fn cosets_are_closed() {
    assert_eq!(cyclotomic_coset(2, 1, 15), [1, 2, 4, 8]);
    assert_eq!(cyclotomic_coset(2, 5, 15), [5, 10]);
    assert_eq!(cyclotomic_coset(2, 17, 15), [2, 4, 8, 1]);
    assert_eq!(cyclotomic_coset(4, 0, 15), [0]);
}

#[test]
fn long_generators_have_their_degree() {
    let symbols = field(2, 16);
    let roots = generator_from_roots(&symbols, 65535, &(0..32).collect(), None).unwrap();
    assert_eq!(roots.generator.degree(), Some(32));
    let odd = (0..60).map(|i| 2 * i + 1).collect();
    let roots = generator_from_roots(&field(2, 1), 32767, &odd, None).unwrap();
    assert_eq!(roots.generator.degree(), Some(900));
}
