//! Requirements against brute force over all errors, on small random codes, and as their failures
//! are told to a reader.

mod common;

use common::{findings, with_spec};
use cosetta::algebra::Field;
use cosetta::code::weight;
use cosetta::derive::Verdict;
use num_bigint::BigInt;
use num_rational::BigRational;
use num_traits::{One, Zero};
use rand::{Rng, SeedableRng};
use rand_chacha::ChaCha8Rng;
use std::collections::HashSet;

type Word = Vec<u32>;

const FIELDS: [(u64, usize, &str); 3] = [
    (2, 8, "GF(2)"),
    (3, 5, "GF(3)"),
    (4, 5, "GF(4) where a^2 = a + 1"),
];

/// A small code and all that can be listed of it.
struct Small {
    field: Field,
    n: usize,
    spec: String,
    all: Vec<Word>,
    words: HashSet<Word>,
    d: usize,
}

impl Small {
    /// A random code with at least one word beside zero.
    fn random(random: &mut ChaCha8Rng, q: u64, n: usize, field: &str) -> Small {
        loop {
            let rows = random.random_range(1..n);
            let lines: Vec<String> = (0..rows)
                .map(|_| {
                    let entries: Vec<String> = (0..n)
                        .map(|_| random.random_range(0..q).to_string())
                        .collect();
                    format!("    | {} |", entries.join(" "))
                })
                .collect();
            let spec = format!(
                "field f = {field}\nchannel sea = bsc(1/10)\nchannel shore = bec(1/10)\nmatrix h over f =\n{}\ncode c over f = check(h)\n",
                lines.join("\n")
            );
            let (field, words) = with_spec(&spec, |view| {
                let code = view.codes[0].compiled.code.clone();
                let all = vectors(q, n);
                let words: HashSet<Word> =
                    all.into_iter().filter(|word| code.contains(word)).collect();
                (code.field().clone(), words)
            });
            if words.len() < 2 {
                continue;
            }
            let weights = words.iter().map(|word| weight(word));
            return Small {
                field,
                n,
                spec,
                all: vectors(q, n),
                d: weights.filter(|&weight| weight > 0).min().expect("a word"),
                words,
            };
        }
    }

    fn minus(&self, left: &Word, right: &Word) -> Word {
        left.iter()
            .zip(right)
            .map(|(&left, &right)| self.field.sub(left, right))
            .collect()
    }

    fn detects(&self, class: impl Fn(&Word) -> bool) -> bool {
        !self
            .words
            .iter()
            .any(|word| weight(word) > 0 && class(word))
    }

    fn corrects(&self, class: impl Fn(&Word) -> bool) -> bool {
        let errors: Vec<&Word> = self.all.iter().filter(|error| class(error)).collect();
        !errors.iter().enumerate().any(|(at, one)| {
            errors[..at]
                .iter()
                .any(|other| self.words.contains(&self.minus(one, other)))
        })
    }

    /// How many errors of each weight end within t of a word other than zero.
    fn miscorrected(&self) -> Vec<u64> {
        let t = (self.d - 1) / 2;
        let mut counts = vec![0; self.n + 1];
        for error in &self.all {
            let wrong = self
                .words
                .iter()
                .any(|word| weight(word) > 0 && weight(&self.minus(error, word)) <= t);
            counts[weight(error)] += u64::from(wrong);
        }
        counts
    }

    /// Whether the symbol at a place follows from those of a set of places.
    fn follows(&self, at: usize, from: usize) -> bool {
        !self
            .words
            .iter()
            .any(|word| word[at] != 0 && (0..self.n).all(|i| from >> i & 1 == 0 || word[i] == 0))
    }
}

fn vectors(q: u64, n: usize) -> Vec<Word> {
    (0..q.pow(n as u32))
        .map(|number| {
            (0..n)
                .map(|at| (number / q.pow(at as u32) % q) as u32)
                .collect()
        })
        .collect()
}

fn within(word: &Word, span: usize, wrap: bool) -> bool {
    let n = word.len();
    let starts = if wrap { n } else { n - span.min(n) + 1 };
    (0..starts).any(|start| (0..n).all(|at| word[at] == 0 || (at + n - start) % n < span))
}

fn groups_hit(word: &Word, size: usize) -> usize {
    word.chunks(size).filter(|chunk| weight(chunk) > 0).count()
}

/// Runs the requirements and compares their verdicts with what is expected.
fn compare(small: &Small, expected: &[(String, bool)]) {
    let mut spec = small.spec.clone();
    for (text, _) in expected {
        spec.push_str(&format!("  require {text}\n"));
    }
    with_spec(&spec, |view| {
        let clauses = &view.codes[0].verdicts.clauses;
        let seen: Vec<&str> = clauses.iter().map(|judged| judged.text.as_str()).collect();
        assert_eq!(
            seen.len(),
            expected.len(),
            "{spec}\n{:#?}",
            view.findings
                .iter()
                .map(|finding| &finding.message)
                .collect::<Vec<_>>()
        );
        for (judged, (text, holds)) in clauses.iter().zip(expected) {
            let verdict = if *holds {
                Verdict::Holds
            } else {
                Verdict::Fails
            };
            assert_eq!(
                judged.judgement.verdict, verdict,
                "{text}: {}\n{}",
                judged.judgement.says, small.spec
            );
            if let (Verdict::Fails, Some(word)) = (verdict, &judged.judgement.witness) {
                assert!(small.words.contains(word), "{text}: {word:?} is no word");
            }
        }
    });
}

fn each(seed: u64, count: usize, look: impl Fn(&Small, &mut Vec<(String, bool)>)) {
    let mut random = ChaCha8Rng::seed_from_u64(seed);
    for (q, n, field) in FIELDS {
        for _ in 0..count {
            let length = random.random_range(n - 2..=n);
            let small = Small::random(&mut random, q, length, field);
            let mut expected = Vec::new();
            look(&small, &mut expected);
            compare(&small, &expected);
        }
    }
}

#[test]
fn bursts_agree_with_brute_force() {
    each(1, 20, |small, expected| {
        for (kind, name, wrap) in [
            ("bursts", "burst", false),
            ("cyclic bursts", "cyclic_burst", true),
        ] {
            let (mut detection, mut correction) = (0, 0);
            for span in 1..=small.n {
                let detects = small.detects(|word| within(word, span, wrap));
                let corrects = small.corrects(|word| within(word, span, wrap));
                expected.push((format!("detects {kind} of {span}"), detects));
                expected.push((format!("corrects {kind} of {span}"), corrects));
                if !wrap {
                    expected.push((format!("detects adjacent {span}"), detects));
                    expected.push((format!("corrects adjacent {span}"), corrects));
                }
                detection = if detects { span } else { detection };
                correction = if corrects { span } else { correction };
            }
            expected.push((format!("{name}_detection = {detection}"), true));
            expected.push((format!("{name}_correction = {correction}"), true));
        }
    });
}

#[test]
fn groups_agree_with_brute_force() {
    each(2, 20, |small, expected| {
        for size in (1..=small.n).filter(|size| small.n.is_multiple_of(*size)) {
            for count in 1..=2 {
                let detects = small.detects(|word| groups_hit(word, size) <= count);
                let corrects = small.corrects(|word| groups_hit(word, size) <= count);
                expected.push((format!("detects {count} groups of {size}"), detects));
                expected.push((format!("recovers {count} groups of {size}"), detects));
                expected.push((format!("corrects {count} groups of {size}"), corrects));
            }
        }
        expected.push((
            "detects odd errors".into(),
            small.detects(|word| weight(word) % 2 == 1),
        ));
        expected.push((
            "detects all-ones".into(),
            !small.words.contains(&vec![1; small.n]),
        ));
        expected.push(("detects all-zeros".into(), false));
        for by in 1..=4 {
            let divisible = small
                .words
                .iter()
                .all(|word| weight(word).is_multiple_of(by));
            expected.push((format!("divisible by {by}"), divisible));
        }
    });
}

#[test]
fn miscorrection_agrees_with_brute_force() {
    each(3, 20, |small, expected| {
        let counts = small.miscorrected();
        for (weight, name) in [(1, "singles"), (2, "doubles"), (3, "triples")] {
            expected.push((format!("never miscorrects {name}"), counts[weight] == 0));
        }
        let t = (small.d - 1) / 2;
        let all = small
            .all
            .iter()
            .filter(|error| weight(error) == t + 1)
            .count();
        let wrong = counts[t + 1];
        expected.push((format!("miscorrects at most {wrong} of {all}"), true));
        if wrong > 0 {
            expected.push((format!("miscorrects at most {} of {all}", wrong - 1), false));
        }
    });
}

fn tenth_power(changed: usize, n: usize, wrong: u64) -> BigRational {
    let ten = |power: usize| BigInt::from(10).pow(power as u32);
    let top = BigInt::from(9).pow((n - changed) as u32);
    BigRational::new(top, ten(n) * BigInt::from(wrong).pow(changed as u32))
}

#[test]
fn channel_figures_agree_with_brute_force() {
    each(4, 15, |small, expected| {
        let (n, q) = (small.n, small.field.order());
        let sum = |class: &dyn Fn(&Word) -> bool| -> BigRational {
            small
                .all
                .iter()
                .filter(|error| class(error))
                .map(|error| tenth_power(weight(error), n, q - 1))
                .sum()
        };
        let t = (small.d - 1) / 2;
        let undetected = sum(&|error| weight(error) > 0 && small.words.contains(error));
        let failure = sum(&|error| weight(error) > t);
        let miscorrection = sum(&|error| {
            small
                .words
                .iter()
                .any(|word| weight(word) > 0 && weight(&small.minus(error, word)) <= t)
        });
        let loss: BigRational = (0usize..1 << n)
            .filter(|lost| {
                small.words.iter().any(|word| {
                    weight(word) > 0 && (0..n).all(|at| word[at] == 0 || lost >> at & 1 == 1)
                })
            })
            .map(|lost| tenth_power(lost.count_ones() as usize, n, 1))
            .sum();
        for (name, value) in [
            ("undetected(sea)", undetected),
            ("failure(sea)", failure),
            ("miscorrection(sea)", miscorrection),
            ("loss(shore)", loss),
        ] {
            assert!(value <= BigRational::one() && value >= BigRational::zero());
            expected.push((
                format!("{name} = {}/{}", value.numer(), value.denom()),
                true,
            ));
            expected.push((
                format!("{name} < {}/{}", value.numer(), value.denom()),
                false,
            ));
        }
    });
}

#[test]
fn repair_agrees_with_brute_force() {
    each(5, 20, |small, expected| {
        let n = small.n;
        let sets = |at: usize| -> Vec<usize> {
            (0usize..1 << n)
                .filter(|set| set >> at & 1 == 0 && small.follows(at, *set))
                .collect()
        };
        if (0..n).any(|at| sets(at).is_empty()) {
            expected.push((format!("repairs one loss reading <= {n}"), false));
            return;
        }
        let locality = (0..n)
            .map(|at| {
                sets(at)
                    .iter()
                    .map(|set| set.count_ones())
                    .min()
                    .unwrap_or(0)
            })
            .max()
            .unwrap_or(0);
        expected.push((format!("locality = {locality}"), true));
        expected.push((format!("repairs one loss reading <= {locality}"), true));
        if locality > 0 {
            expected.push((
                format!("repairs one loss reading <= {}", locality - 1),
                false,
            ));
        }
        let availability = (0..n)
            .map(|at| {
                let sets = sets(at);
                if sets.contains(&0) {
                    return n;
                }
                packed(&sets, 0)
            })
            .min()
            .unwrap_or(n);
        expected.push((format!("availability = {availability}"), true));
    });
}

/// The most of these sets, and not the places taken, no two of which meet.
fn packed(sets: &[usize], taken: usize) -> usize {
    let smallest: Vec<usize> = sets
        .iter()
        .copied()
        .filter(|set| {
            !sets
                .iter()
                .any(|other| other != set && other & set == *other)
        })
        .collect();
    best(&smallest, taken)
}

fn best(sets: &[usize], taken: usize) -> usize {
    let mut most = 0;
    for (at, set) in sets.iter().enumerate() {
        if set & taken == 0 {
            most = most.max(1 + best(&sets[at + 1..], taken | set));
        }
    }
    most
}

#[test]
fn shifts_agree_with_brute_force() {
    each(6, 20, |small, expected| {
        let n = small.n;
        for index in (1..=n).filter(|index| n.is_multiple_of(*index)) {
            let size = n / index;
            let closed = |from: &dyn Fn(usize) -> usize| {
                small.words.iter().all(|word| {
                    small
                        .words
                        .contains(&(0..n).map(|at| word[from(at)]).collect::<Word>())
                })
            };
            let holds = closed(&|at| (at + index) % n)
                || closed(&|at| at / size * size + (at % size + 1) % size);
            expected.push((format!("quasi_cyclic of index {index}"), holds));
        }
    });
}

/// Each finding of a spec as a reader sees it, without its place.
fn told(spec: &str) -> String {
    let findings = findings(spec);
    let lines: Vec<String> = findings
        .iter()
        .filter(|finding| !finding.code.name.starts_with("un"))
        .map(|finding| {
            let mut text = format!("{}: {}", finding.code.name, finding.message);
            text.push_str(&format!("\n  label: {}", finding.label));
            if let Some(help) = &finding.help {
                text.push_str(&format!("\n  help: {help}"));
            }
            for related in &finding.related {
                text.push_str(&format!("\n  related: {}", related.message));
            }
            text
        })
        .collect();
    lines.join("\n")
}

/// The word that keeps one gauge reading, and a channel of each kind.
const GAUGE: &str = "\
field bit = GF(2)
channel sea = bsc(0.004)
channel shore = bec(0.01)
code gauge over bit
  = hamming(4)
  then extend
  then shorten(first: 8)
  bits data[3..0], check[3..0]
";

#[test]
fn failures_of_shape_are_told() {
    let wishes = [
        "detects bursts of 5",
        "corrects bursts of 3",
        "detects cyclic bursts of 6",
        "corrects cyclic bursts of 2",
        "corrects adjacent 3",
        "detects all-zeros",
        "detects all-ones",
        "corrects 1 groups of 4",
        "detects 2 groups of 2",
        "recovers 1 groups",
        "recovers any 1 of bits(data, check[1..0])",
        "corrects 1 groups of bits(dta)",
        "corrects 1 groups of 3",
    ];
    let spec = wishes.iter().fold(GAUGE.to_string(), |spec, wish| {
        format!("{spec}  require {wish}\n")
    });
    insta::assert_snapshot!(told(&spec));
}

#[test]
fn failures_of_storage_and_form_are_told() {
    let wishes = [
        "locality <= 2",
        "availability >= 9",
        "update_cost <= 1",
        "repairs one loss reading <= 2",
        "regular",
        "triangular",
        "divisible by 3",
        "quasi_cyclic of index 3",
        "quasi_cyclic of index 1",
        "meets singleton",
        "mds",
        "burst_correction >= 2",
    ];
    let spec = wishes.iter().fold(GAUGE.to_string(), |spec, wish| {
        format!("{spec}  require {wish}\n")
    });
    insta::assert_snapshot!(told(&spec));
}

#[test]
fn failures_on_a_channel_are_told() {
    let wishes = [
        "miscorrects at most 1 of 10",
        "never miscorrects triples",
        "undetected(sea) <= 1e-12",
        "failure(sea) <= 1e-6",
        "miscorrection(sea) <= 1e-9",
        "loss(shore) <= 1e-9",
        "loss(sea) <= 1e-9",
        "failure(shore) <= 1e-9",
        "failure(3) <= 1e-9",
        "failure <= 1e-9",
    ];
    let spec = wishes.iter().fold(GAUGE.to_string(), |spec, wish| {
        format!("{spec}  require {wish}\n")
    });
    insta::assert_snapshot!(told(&spec));
}

#[test]
fn common_mistakes_are_explained() {
    let specs = [
        // Identity beside Vandermonde is taken for MDS.
        "field byte = GF(256) where a^8 = a^4 + a^3 + a^2 + 1
matrix powers_of over byte = vandermonde(points: {1, 2, 3, 4, 5, 6, 7, 8}, rows: 4)
code shards over byte = check(blocks | identity(4) powers_of |)
  require mds
",
        // Two equal columns.
        "field bit = GF(2)
matrix edited over bit
  = | 1 0 1 1 0 |
    | 0 1 1 1 0 |
    | 0 0 1 1 1 |
code memory over bit = check(edited)
  is [5, 2, 3]
  require corrects 1
",
        // Rows that are dependent.
        "field bit = GF(2)
matrix edited over bit
  = | 1 1 0 0 1 |
    | 0 1 1 0 1 |
    | 1 0 1 0 0 |
code memory over bit = check(edited)
  is [5, 2, _]
  require full rank
",
        // A remainder check beyond its length.
        "field bit = GF(2)
code frame over bit = crc(length: 200, generator: x^8 + x^2 + x + 1)
  is [200, 192, 4]
",
        // Correction and detection at once.
        "field bit = GF(2)
code word over bit = bch(length: 15, distance: 5)
  require corrects 2
  require detects 4
",
    ];
    let all: Vec<String> = specs.iter().map(|spec| told(spec)).collect();
    insta::assert_snapshot!(all.join("\n\n"));
}

#[test]
fn a_long_frame_is_settled_without_a_search() {
    let spec = "\
field byte = GF(2^8) where a^8 = a^4 + a^3 + a^2 + 1
channel sea = bsc(0.004)
code outer over byte = reed_solomon(length: 60, dimension: 44, first_root: 0)
code inner over GF(2) = reed_muller(order: 1, variables: 7)
code frame = outer then concatenate(inner)
  is [7680, 352, >= 1088]
  require corrects 500
  require failure(sea) <= 1e-12
";
    assert_eq!(told(spec), "");
}

#[test]
fn bursts_of_known_codes_are_as_published() {
    // (x^(2b - 1) - 1) p(x) with p of degree m >= b and order e: Fire's code of length
    // lcm(2b - 1, e) corrects every burst of span b, here 3 at length lcm(5, 7) = 35. Fire, 1959;
    // MacWilliams and Sloane, 1977, ch. 10 §9; from memory. Redundancy 8 allows a span of 4
    // (Reiger, 1960) and detects 8. A Reed-Solomon code reaches Reiger's bound.
    let spec = "\
field bit = GF(2)
code fire over bit = cyclic(length: 35, generator: (x^5 + 1)*(x^3 + x + 1))
  require corrects cyclic bursts of 3
  require cyclic_burst_correction = 3
  require cyclic_burst_detection = 8
  require burst_detection = 8
field byte = GF(256) where a^8 = a^4 + a^3 + a^2 + 1
code gauge over byte = reed_solomon(length: 20, dimension: 14)
  require burst_correction = 3
  require burst_detection = 6
";
    assert_eq!(told(spec), "");
}

#[test]
fn a_mask_moves_the_words_that_a_stuck_bus_gives() {
    let verdicts = |steps: &str| -> Vec<Verdict> {
        let spec = format!(
            "field bit = GF(2)\ncode word over bit = repetition(3){steps}\n  require detects all_zeros\n  require detects all_ones\n"
        );
        common::with_spec(&spec, |view| {
            let clauses = &view.codes[0].verdicts.clauses;
            clauses
                .iter()
                .map(|clause| clause.judgement.verdict)
                .collect()
        })
    };
    use Verdict::{Fails, Holds};
    // As sent, the words are 000 and 111; with the mask 101 and 010.
    assert_eq!(verdicts(""), [Fails, Fails]);
    assert_eq!(verdicts(" then mask(with: [1, 0, 1])"), [Holds, Holds]);
    // The mask is a word: the same words are sent.
    assert_eq!(verdicts(" then mask(with: [1, 1, 1])"), [Fails, Fails]);
    let even = "field bit = GF(2)\ncode word over bit = span(| 1 1 0 |) then mask(with: [0, 0, 1])\n  require detects all_ones\n";
    let seen = common::with_spec(even, |view| {
        view.codes[0].verdicts.clauses[0].judgement.verdict
    });
    assert_eq!(seen, Fails, "110 with the mask 001 is 111");
}

#[test]
fn a_mask_makes_another_code_on_the_wire() {
    let spec = "\
field bit = GF(2)
code plain over bit = repetition(3)
code moved over bit = repetition(3) then mask(with: [1, 0, 1])
  require same code as plain
code kept over bit = repetition(3) then mask(with: [1, 1, 1])
  require same code as plain
";
    let seen: Vec<Verdict> = common::with_spec(spec, |view| {
        let clauses = view
            .codes
            .iter()
            .flat_map(|checked| &checked.verdicts.clauses);
        clauses.map(|clause| clause.judgement.verdict).collect()
    });
    assert_eq!(seen, [Verdict::Fails, Verdict::Holds]);
}
