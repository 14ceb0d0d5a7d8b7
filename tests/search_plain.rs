//! Every engine against a second, plain way of counting, over hundreds of small random codes.

use cosetta::algebra::{Element, Field, Matrix};
use cosetta::derive::search::*;
use num_bigint::BigUint;
use rand::{Rng, SeedableRng};
use rand_chacha::ChaCha8Rng;

fn fields() -> Vec<Field> {
    let moduli: [(u32, &[u32]); 3] = [(2, &[1, 1, 1]), (2, &[1, 1, 0, 1]), (3, &[2, 1, 1])];
    let primes = [2, 3, 5, 7].iter().map(|&p| Field::prime(p).unwrap());
    let others = moduli
        .iter()
        .map(|&(p, modulus)| Field::with_modulus(p, modulus, true).unwrap());
    primes.chain(others).collect()
}

/// All combinations of the rows, one at a time.
fn words(generator: &Matrix) -> Vec<Vec<Element>> {
    let field = generator.field();
    let mut words = vec![vec![0; generator.columns()]];
    for row in 0..generator.rows() {
        let row = generator.row(row);
        let mut more = Vec::new();
        for word in &words {
            for scale in 0..field.order() as Element {
                more.push(
                    word.iter()
                        .zip(&row)
                        .map(|(&a, &b)| field.add(a, field.mul(scale, b)))
                        .collect(),
                );
            }
        }
        words = more;
    }
    words
}

fn weight(word: &[Element]) -> usize {
    word.iter().filter(|&&entry| entry != 0).count()
}

fn plain_counts(generator: &Matrix) -> Counts {
    let mut counts = vec![BigUint::ZERO; generator.columns() + 1];
    for word in words(generator) {
        counts[weight(&word)] += 1u32;
    }
    counts
}

fn distance(counts: &Counts) -> Option<usize> {
    (1..counts.len()).find(|&weight| counts[weight] != BigUint::ZERO)
}

/// A generator of full rank with at most `most` words; sparse at times, so that zero and equal
/// columns come up.
fn random_generator(field: &Field, random: &mut ChaCha8Rng, most: u64) -> Matrix {
    let n = random.random_range(1..=14usize);
    let mut k = random.random_range(0..=n);
    while field.order().pow(k as u32) > most {
        k -= 1;
    }
    let sparse = random.random_range(0..3) == 0;
    let matrix = Matrix::from_fn(field, k, n, |_, _| {
        if sparse && random.random_range(0..3) > 0 {
            0
        } else {
            random.random_range(0..field.order()) as Element
        }
    });
    matrix.reduced().matrix
}

fn each_code(rounds: usize, mut examine: impl FnMut(&Matrix, &Matrix, &Counts)) {
    for field in fields() {
        let mut random = ChaCha8Rng::seed_from_u64(field.order());
        for _ in 0..rounds {
            let generator = random_generator(&field, &mut random, 2500);
            let counts = plain_counts(&generator);
            examine(&generator, &generator.null_space(), &counts);
        }
    }
}

fn is_word(check: &Matrix, word: &[Element]) -> bool {
    check.times(word).iter().all(|&entry| entry == 0)
}

#[test]
fn weights_and_lightest_words_by_enumeration() {
    each_code(60, |generator, check, counts| {
        let budget = Budget::unlimited();
        assert_eq!(
            weight_counts(generator, &budget, &Quiet).as_ref(),
            Some(counts),
            "{generator:?}"
        );
        let light = minimum_by_words(generator, &budget);
        assert_eq!(
            light.as_ref().map(|light| light.weight),
            distance(counts),
            "{generator:?}"
        );
        if let Some(light) = light {
            assert_eq!(weight(&light.word), light.weight);
            assert!(is_word(check, &light.word));
        }
    });
}

#[test]
fn the_dual_weights_both_ways() {
    each_code(40, |generator, check, counts| {
        let (n, k, q) = (
            generator.columns(),
            generator.rows(),
            generator.field().order(),
        );
        let dual = macwilliams(counts, q, n, k).unwrap();
        assert_eq!(macwilliams(&dual, q, n, n - k).as_ref(), Some(counts));
        if q.pow((n - k) as u32) <= 2500 {
            assert_eq!(dual, plain_counts(check));
        }
    });
}

#[test]
fn dependent_columns_give_the_distance() {
    each_code(60, |generator, check, counts| {
        let found = dependent_columns(check, generator.columns(), &Budget::unlimited());
        match distance(counts) {
            None => assert_eq!(
                (found.independent, &found.word),
                (generator.columns(), &None)
            ),
            Some(d) => {
                let word = found.word.unwrap_or_else(|| panic!("d = {d}: {check:?}"));
                assert_eq!((found.independent + 1, word.weight), (d, d), "{check:?}");
                assert!(is_word(check, &word.word));
            }
        }
    });
}
