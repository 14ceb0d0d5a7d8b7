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

#[test]
fn information_sets_raise_the_bound_to_the_distance() {
    each_code(60, |generator, check, counts| {
        let n = generator.columns();
        let Some(d) = distance(counts) else { return };
        let raised = raise_lower_bound(generator, 1, n + 1, 1, &Budget::unlimited(), &Quiet);
        assert_eq!(raised.lower, d, "{generator:?}");
        let word = raised.upper.unwrap();
        assert_eq!((word.weight, weight(&word.word)), (d, d));
        assert!(is_word(check, &word.word));
        // With the right upper bound known, no lighter word is met.
        let again = raise_lower_bound(generator, 0, d, 1, &Budget::unlimited(), &Quiet);
        assert_eq!((again.lower, again.upper), (d, None));
    });
}

#[test]
fn no_bound_is_claimed_that_the_budget_did_not_pay_for() {
    each_code(20, |generator, check, counts| {
        let Some(d) = distance(counts) else { return };
        for units in [0, 1, 10, 100, 1000, 10_000] {
            let budget = Budget::units(units);
            let raised = raise_lower_bound(generator, 1, generator.columns(), 1, &budget, &Quiet);
            assert!(raised.lower <= d && raised.upper.is_none_or(|word| word.weight >= d));
            let found = dependent_columns(check, generator.columns(), &Budget::units(units));
            assert!(found.independent < d && found.word.is_none_or(|word| word.weight == d));
            let word = light_word(generator, d, 1, &Budget::units(units));
            assert!(word.is_none_or(|word| word.weight >= d && is_word(check, &word.word)));
        }
    });
}

#[test]
fn light_words_are_found_and_are_words() {
    each_code(30, |generator, check, counts| {
        let light = light_word(
            generator,
            distance(counts).unwrap_or(0),
            7,
            &Budget::seconds(1.0),
        );
        assert_eq!(light.as_ref().map(|light| light.weight), distance(counts));
        assert!(
            light.is_none_or(
                |light| weight(&light.word) == light.weight && is_word(check, &light.word)
            )
        );
    });
}

/// The largest distance of any vector from the nearest word.
fn plain_covering_radius(check: &Matrix) -> usize {
    let field = check.field();
    let zero = vec![0; check.rows()];
    let mut seen = std::collections::HashMap::from([(zero.clone(), 0)]);
    let mut queue = std::collections::VecDeque::from([zero]);
    let mut last = 0;
    while let Some(syndrome) = queue.pop_front() {
        let steps = seen[&syndrome];
        last = steps;
        for column in 0..check.columns() {
            for scale in 1..field.order() as Element {
                let next: Vec<Element> = syndrome
                    .iter()
                    .zip(check.column(column))
                    .map(|(&a, b)| field.add(a, field.mul(scale, b)))
                    .collect();
                seen.entry(next.clone()).or_insert_with(|| {
                    queue.push_back(next);
                    steps + 1
                });
            }
        }
    }
    last
}

#[test]
fn covering_radii() {
    each_code(30, |generator, check, _| {
        let (r, q) = (check.rows(), generator.field().order());
        if q.pow(r as u32) <= 5000 {
            let found = covering_radius(check, &Budget::unlimited());
            assert_eq!(found, Some(plain_covering_radius(check)), "{check:?}");
        }
    });
}

#[test]
fn settling_gives_the_distance_from_either_matrix() {
    each_code(40, |generator, check, counts| {
        let n = generator.columns();
        for (one, two) in [
            (Some(generator), None),
            (None, Some(check)),
            (Some(generator), Some(check)),
        ] {
            let settled = settle(one, two, 0, n + 1, 1, &Budget::seconds(1.0), &Quiet);
            match distance(counts) {
                None => assert_eq!((settled.lower, settled.upper), (0, 0)),
                Some(d) => {
                    assert_eq!(
                        (settled.lower, settled.upper),
                        (d, d),
                        "{generator:?} {settled:?}"
                    );
                    let word = settled.word.expect("a word to show");
                    assert_eq!(weight(&word), d);
                    assert!(is_word(check, &word));
                }
            }
        }
        for units in [0, 100, 3000] {
            let settled = settle(
                Some(generator),
                None,
                1,
                n,
                1,
                &Budget::units(units),
                &Quiet,
            );
            assert!(distance(counts).is_none_or(|d| settled.lower <= d && d <= settled.upper));
        }
    });
}
