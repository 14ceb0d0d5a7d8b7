//! Random small codes through random steps, judged by a second path that is written plainly: words
//! are listed one by one, and a step does to each word what its documentation says.

mod common;
mod plain;

use common::with_spec;
use cosetta::derive::{Effort, Verdict, properties};
use plain::{PlainField, Word, Words, dual, span, weights};
use rand::seq::SliceRandom;
use rand::{Rng, SeedableRng};
use rand_chacha::ChaCha8Rng;
use std::collections::BTreeMap;

/// The most words that are listed.
const MOST: u64 = 20_000;

/// A code as a spec writes it, and as its words.
struct Sample {
    field: PlainField,
    text: String,
    words: Words,
}

fn literal(rows: &[Word]) -> String {
    let rows: Vec<String> = rows
        .iter()
        .map(|row| {
            let entries: Vec<String> = row.iter().map(u32::to_string).collect();
            format!("| {} |", entries.join(" "))
        })
        .collect();
    rows.join(" ")
}

fn random_rows(
    random: &mut ChaCha8Rng,
    field: &PlainField,
    rows: usize,
    columns: usize,
) -> Vec<Word> {
    (0..rows)
        .map(|_| {
            (0..columns)
                .map(|_| random.random_range(0..field.order))
                .collect()
        })
        .collect()
}

/// The longest length whose whole space can still be listed.
fn longest(field: &PlainField) -> usize {
    (1..15)
        .take_while(|&n| field.lists(n, MOST))
        .last()
        .unwrap_or(1)
}

fn base(random: &mut ChaCha8Rng, field: &PlainField) -> Sample {
    let longest = longest(field);
    let length = random.random_range(2..=longest);
    let (text, words) = match random.random_range(0..6) {
        0 | 1 => {
            let rows = random.random_range(1..=length.min(4));
            let rows = random_rows(random, field, rows, length);
            (
                format!("check({})", literal(&rows)),
                dual(field, length, &rows),
            )
        }
        2 | 3 => {
            let rows = random.random_range(1..=length.min(4));
            let rows = random_rows(random, field, rows, length);
            (
                format!("span({})", literal(&rows)),
                span(field, length, &rows),
            )
        }
        4 => (
            format!("repetition({length})"),
            span(field, length, &[vec![1; length]]),
        ),
        _ => (
            format!("parity({length})"),
            dual(field, length, &[vec![1; length]]),
        ),
    };
    Sample {
        field: field.clone(),
        text,
        words,
    }
}

/// Some positions, at least one, never all.
fn places(random: &mut ChaCha8Rng, length: usize) -> Vec<usize> {
    let mut all: Vec<usize> = (0..length).collect();
    all.shuffle(random);
    all.truncate(random.random_range(1..length.max(2)).min(length - 1));
    all.sort_unstable();
    all
}

fn shown(places: &[usize]) -> String {
    let places: Vec<String> = places.iter().map(usize::to_string).collect();
    format!("{{{}}}", places.join(", "))
}

fn kept(word: &Word, dropped: &[usize]) -> Word {
    let entries = word
        .iter()
        .enumerate()
        .filter(|(at, _)| !dropped.contains(at));
    entries.map(|(_, &entry)| entry).collect()
}

/// One random step, when its result is small enough to list.
fn step(random: &mut ChaCha8Rng, sample: Sample) -> Sample {
    let Sample { field, text, words } = sample;
    let length = words.length;
    let count = words.list.len() as u64;
    let each = |words: Words, length: usize, change: &dyn Fn(&Word) -> Word| Words {
        length,
        list: words.list.iter().map(change).collect(),
    };
    let (added, words) = match random.random_range(0..11) {
        0 => (
            "extend".to_string(),
            each(words, length + 1, &|word| {
                let mut word = word.clone();
                word.push(field.neg(field.sum(&word)));
                word
            }),
        ),
        1 if length > 1 => {
            let places = places(random, length);
            let text = format!("puncture(at: {})", shown(&places));
            (
                text,
                each(words, length - places.len(), &|word| kept(word, &places)),
            )
        }
        2 if length > 1 => {
            let places = places(random, length);
            let list = words
                .list
                .iter()
                .filter(|word| places.iter().all(|&at| word[at] == 0));
            let list = list.map(|word| kept(word, &places)).collect();
            (
                format!("shorten(at: {})", shown(&places)),
                Words {
                    length: length - places.len(),
                    list,
                },
            )
        }
        3 if field.lists(length, MOST) => {
            let rows: Vec<Word> = words.list.iter().cloned().collect();
            ("dual".to_string(), dual(&field, length, &rows))
        }
        4 => {
            let list = words
                .list
                .iter()
                .filter(|word| field.sum(word) == 0)
                .cloned()
                .collect();
            ("expurgate".to_string(), Words { length, list })
        }
        5 if count * u64::from(field.order) <= MOST => {
            let mut rows: Vec<Word> = words.list.iter().cloned().collect();
            rows.push(vec![1; length]);
            (
                "augment".to_string(),
                plain::closure(&field, length, &words, &rows[rows.len() - 1]),
            )
        }
        6 => {
            let mut order: Vec<usize> = (0..length).collect();
            order.shuffle(random);
            let listed: Vec<String> = order.iter().map(usize::to_string).collect();
            let text = format!("permute([{}])", listed.join(", "));
            (
                text,
                each(words, length, &|word| {
                    order.iter().map(|&at| word[at]).collect()
                }),
            )
        }
        7 if field.degree > 1 && length * field.degree <= 24 => {
            let prime = field.prime();
            let words = each(words, length * field.degree, &|word| {
                word.iter().flat_map(|&entry| field.digits(entry)).collect()
            });
            return Sample {
                field: prime,
                text: format!("{text} then image"),
                words,
            };
        }
        8 if field.degree > 1 => {
            let prime = field.prime();
            let small = prime.order;
            let list = words
                .list
                .iter()
                .filter(|word| word.iter().all(|&entry| entry < small))
                .cloned()
                .collect();
            let text = format!("{text} then subfield(GF({small}))");
            return Sample {
                field: prime,
                text,
                words: Words { length, list },
            };
        }
        9 => {
            let rows = random_rows(random, &field, 1, length);
            let other = span(&field, length, &rows);
            if count * other.list.len() as u64 > MOST {
                return Sample { field, text, words };
            }
            let mut list = plain::Set::new();
            for u in &words.list {
                for v in &other.list {
                    list.insert([u.clone(), field.add_words(u, v)].concat());
                }
            }
            (
                format!("plotkin(span({}))", literal(&rows)),
                Words {
                    length: 2 * length,
                    list,
                },
            )
        }
        10 => {
            let more = random.random_range(1..4);
            let rows = random_rows(random, &field, 1, more);
            let other = span(&field, more, &rows);
            if count * other.list.len() as u64 > MOST {
                return Sample { field, text, words };
            }
            let mut list = plain::Set::new();
            for u in &words.list {
                for v in &other.list {
                    list.insert([u.clone(), v.clone()].concat());
                }
            }
            (
                format!("direct_sum(span({}))", literal(&rows)),
                Words {
                    length: length + more,
                    list,
                },
            )
        }
        _ => return Sample { field, text, words },
    };
    Sample {
        field,
        text: format!("{text} then {added}"),
        words,
    }
}

fn check(sample: &Sample, first: &PlainField) {
    let spec = written(&sample.text, first);
    with_spec(&spec, |view| {
        let messages: Vec<&String> = view
            .findings
            .iter()
            .map(|finding| &finding.message)
            .collect();
        let found = view
            .codes
            .first()
            .unwrap_or_else(|| panic!("not built: {spec}{messages:?}"));
        let code = &found.compiled.code;
        let field = &sample.field;
        assert_eq!(code.length(), sample.words.length, "n of {spec}");
        assert_eq!(
            u64::from(field.order).pow(code.dimension() as u32),
            sample.words.list.len() as u64,
            "k of {spec}"
        );
        for row in 0..code.generator_matrix().rows() {
            let row = code.generator_matrix().row(row);
            assert!(
                sample.words.list.contains(&row),
                "{row:?} is no word of {spec}"
            );
        }
        for word in sample.words.list.iter().take(50) {
            assert!(code.contains(word), "{word:?} is a word of {spec}");
        }
        let counts = weights(&sample.words);
        let distance = view.session.distance_by(code, Effort::Full);
        let least = counts.keys().copied().find(|&weight| weight > 0);
        assert_eq!(distance.exact(), least, "d of {spec}");
        if let Some(word) = &distance.witness {
            assert!(sample.words.list.contains(word), "the witness of {spec}");
        }
        let known = view
            .session
            .weights_by(code, Effort::Full)
            .unwrap_or_else(|| panic!("no weights: {spec}"));
        let known: BTreeMap<usize, u64> = known
            .counts
            .into_iter()
            .map(|(weight, count)| (weight, count.try_into().expect("few words")))
            .collect();
        assert_eq!(known, counts, "weights of {spec}");
        for property in properties::PROPERTIES {
            let judged = (property.decide)(view.session, code);
            let truth = plain::property(field, &sample.words, property.name);
            if let (Some(truth), false) = (truth, judged.verdict == Verdict::Undecided) {
                assert_eq!(
                    judged.verdict == Verdict::Holds,
                    truth,
                    "{} of {spec}: {}",
                    property.name,
                    judged.says
                );
            }
        }
    });
}

/// The sample's text as a spec: its first field is stated behind the construction.
fn written(text: &str, first: &PlainField) -> String {
    let (start, steps) = match text.split_once(" then ") {
        Some((start, steps)) => (start, format!(" then {steps}")),
        None => (text, String::new()),
    };
    format!("code sample = {start} over {}{steps}\n", first.text)
}

fn run(field: &PlainField, seed: u64, cases: usize) {
    let mut random = ChaCha8Rng::seed_from_u64(seed);
    for _ in 0..cases {
        let mut sample = base(&mut random, field);
        for _ in 0..random.random_range(0..=4) {
            sample = step(&mut random, sample);
        }
        check(&sample, field);
    }
}

#[test]
fn random_steps_over_gf2_agree_with_brute_force() {
    run(&PlainField::new(2, &[0, 1]), 2, 150);
}

#[test]
fn random_steps_over_gf3_agree_with_brute_force() {
    run(&PlainField::new(3, &[1, 1]), 3, 100);
}

#[test]
fn random_steps_over_gf4_agree_with_brute_force() {
    run(&PlainField::new(2, &[1, 1, 1]), 4, 100);
}

#[test]
fn random_steps_over_gf5_and_gf7_agree_with_brute_force() {
    run(&PlainField::new(5, &[3, 1]), 5, 60);
    run(&PlainField::new(7, &[4, 1]), 7, 60);
}

#[test]
fn random_steps_over_gf8_and_gf9_agree_with_brute_force() {
    run(&PlainField::new(2, &[1, 1, 0, 1]), 8, 60);
    run(&PlainField::new(3, &[2, 2, 1]), 9, 60);
}
