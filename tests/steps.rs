//! Every step, judged by words listed one by one: a step does to each word what its documentation
//! says, over four fields, and n, k, d, weights and the words themselves must agree.

mod common;

use common::{findings, with_spec};
use cosetta::algebra::Field;
use cosetta::code::weight;
use cosetta::derive::{Effort, Verdict, properties};
use rand::{Rng, SeedableRng};
use rand_chacha::ChaCha8Rng;
use std::collections::{BTreeMap, BTreeSet};

type Word = Vec<u32>;
type Words = BTreeSet<Word>;

/// A field as a spec declares it and as the tests calculate in it.
struct Sample {
    declared: &'static str,
    field: Field,
    longest: usize,
}

fn fields() -> Vec<Sample> {
    let prime = |p| Field::prime(p).expect("a prime");
    let sample = |declared, field, longest| Sample {
        declared,
        field,
        longest,
    };
    let quad = Field::with_modulus(2, &[1, 1, 1], true).expect("a field");
    vec![
        sample("GF(2)", prime(2), 7),
        sample("GF(3)", prime(3), 5),
        sample("GF(4) where a^2 = a + 1", quad, 4),
        sample("GF(5)", prime(5), 4),
    ]
}

fn space(field: &Field, length: usize) -> Vec<Word> {
    let mut all = vec![Vec::new()];
    for _ in 0..length {
        let longer = |word: Word| {
            let entries = 0..field.order() as u32;
            entries.map(move |entry| [word.as_slice(), &[entry]].concat())
        };
        all = all.into_iter().flat_map(longer).collect();
    }
    all
}

fn add(field: &Field, one: &[u32], other: &[u32]) -> Word {
    let pairs = one.iter().zip(other);
    pairs
        .map(|(&left, &right)| field.add(left, right))
        .collect()
}

fn times(field: &Field, factor: u32, word: &[u32]) -> Word {
    word.iter().map(|&entry| field.mul(factor, entry)).collect()
}

fn dot(field: &Field, one: &[u32], other: &[u32]) -> u32 {
    let pairs = one.iter().zip(other);
    pairs.fold(0, |sum, (&left, &right)| {
        field.add(sum, field.mul(left, right))
    })
}

fn span(field: &Field, length: usize, rows: &[Word]) -> Words {
    let mut words = Words::from([vec![0; length]]);
    for row in rows {
        words = words
            .iter()
            .flat_map(|word| {
                (0..field.order() as u32).map(|factor| add(field, word, &times(field, factor, row)))
            })
            .collect();
    }
    words
}

fn null(field: &Field, length: usize, rows: &[Word]) -> Words {
    let passes = |word: &Word| rows.iter().all(|row| dot(field, row, word) == 0);
    space(field, length).into_iter().filter(passes).collect()
}

fn orthogonal(field: &Field, length: usize, words: &Words) -> Words {
    let rows: Vec<Word> = words.iter().cloned().collect();
    null(field, length, &rows)
}

fn literal(rows: &[Word]) -> String {
    let line = |row: &Word| {
        let entries: Vec<String> = row.iter().map(u32::to_string).collect();
        format!("| {} |", entries.join(" "))
    };
    rows.iter().map(line).collect::<Vec<_>>().join(" ")
}

fn list(word: &[u32]) -> String {
    let entries: Vec<String> = word.iter().map(u32::to_string).collect();
    format!("[{}]", entries.join(", "))
}

fn rows(random: &mut ChaCha8Rng, field: &Field, count: usize, length: usize) -> Vec<Word> {
    let entry = |random: &mut ChaCha8Rng| random.random_range(0..field.order() as u32);
    (0..count)
        .map(|_| (0..length).map(|_| entry(random)).collect())
        .collect()
}

/// A code as a spec writes it, its words, and the rows of its generator matrix when built by one.
#[derive(Clone)]
struct Base {
    text: String,
    length: usize,
    words: Words,
    rows: Option<Vec<Word>>,
}

/// Codes of one length: by checks, by a span, and cyclic.
fn base(random: &mut ChaCha8Rng, field: &Field, length: usize, kind: usize) -> Base {
    let count = random.random_range(1..length);
    match kind {
        0 => {
            let rows = rows(random, field, count, length);
            Base {
                text: format!("check({})", literal(&rows)),
                length,
                words: null(field, length, &rows),
                rows: None,
            }
        }
        1 => {
            let rows = rows(random, field, count, length);
            Base {
                text: format!("span({})", literal(&rows)),
                length,
                words: span(field, length, &rows),
                rows: Some(rows),
            }
        }
        _ => {
            let minus = field.neg(1);
            let rows: Vec<Word> = (0..length - 1)
                .map(|row| {
                    let mut word = vec![0; length];
                    word[row] = 1;
                    word[row + 1] = minus;
                    word
                })
                .collect();
            Base {
                text: format!("cyclic(length: {length}, generator: x - 1)"),
                length,
                words: span(field, length, &rows),
                rows: Some(rows),
            }
        }
    }
}

/// Compares the code `after` of a spec with its words; `declared` fields come with the text.
fn judge(text: &str, field: &Field, length: usize, words: &Words) {
    judge_masked(text, field, length, words, None);
}

fn judge_masked(text: &str, field: &Field, length: usize, words: &Words, mask: Option<&[u32]>) {
    with_spec(text, |view| {
        let messages: Vec<&String> = view.findings.iter().map(|found| &found.message).collect();
        let found = view.codes.iter().find(|code| code.compiled.name == "after");
        let Some(checked) = found else {
            panic!("not built: {messages:?}\n{text}")
        };
        let code = &checked.compiled.code;
        assert_eq!(code.field(), field, "{text}");
        assert_eq!(code.length(), length, "{text}");
        let size = field.order().pow(code.dimension() as u32);
        assert_eq!(size, words.len() as u64, "k = {}\n{text}", code.dimension());
        assert!(words.iter().all(|word| code.contains(word)), "{text}");
        let generator = code.generator_matrix();
        assert!(
            (0..generator.rows()).all(|row| words.contains(&generator.row(row))),
            "{text}"
        );
        assert_eq!(code.check_matrix().rows(), length - code.dimension());

        let mut counts = BTreeMap::new();
        for word in words {
            *counts.entry(weight(word)).or_insert(0u64) += 1;
        }
        let distance = view.session.distance_by(code, Effort::Full);
        let least = counts.keys().copied().find(|&weight| weight > 0);
        let least = least.unwrap_or(0);
        assert_eq!(
            (distance.lower, distance.upper),
            (least, least),
            "{:?}\n{text}",
            distance.grounds
        );
        let known = view.session.weights_by(code, Effort::Full).expect("small");
        let known: BTreeMap<usize, u64> = known
            .counts
            .iter()
            .map(|(&weight, count)| (weight, count.to_string().parse().expect("small")))
            .collect();
        assert_eq!(known, counts, "{text}");
        let cyclic = properties::property("cyclic").expect("a property");
        let verdict = (cyclic.decide)(view.session, code).verdict;
        let shifted = words.iter().all(|word| {
            let mut word = word.clone();
            word.rotate_right(1);
            words.contains(&word)
        });
        assert_eq!(verdict == Verdict::Holds, shifted, "cyclic\n{text}");
        let sent = mask.filter(|word| weight(word) > 0);
        assert_eq!(code.offset(), sent, "mask\n{text}");
    });
}

/// Goes through the fields and kinds of codes with one step.
fn each(seed: u64, look: impl Fn(&mut ChaCha8Rng, &Sample, &Base, &dyn Fn(&str) -> String)) {
    let mut random = ChaCha8Rng::seed_from_u64(seed);
    for sample in fields() {
        for kind in [0, 1, 2, 0, 1] {
            let length = random.random_range(3..=sample.longest);
            let base = base(&mut random, &sample.field, length, kind);
            let text = |step: &str| {
                format!(
                    "field f = {}\ncode after over f = {} then {step}\n",
                    sample.declared, base.text
                )
            };
            look(&mut random, &sample, &base, &text);
        }
    }
}

fn map(words: &Words, change: impl Fn(&Word) -> Word) -> Words {
    words.iter().map(change).collect()
}

#[test]
fn words_are_repeated_scaled_and_cut_off() {
    each(1, |random, sample, base, text| {
        let field = &sample.field;
        let t = random.random_range(1..4);
        let repeated = map(&base.words, |word| word.repeat(t));
        judge(
            &text(&format!("repeat(times: {t})")),
            field,
            base.length * t,
            &repeated,
        );

        let factors: Word = (0..base.length)
            .map(|_| random.random_range(1..field.order() as u32))
            .collect();
        let scaled = map(&base.words, |word| {
            (0..base.length)
                .map(|at| field.mul(word[at], factors[at]))
                .collect()
        });
        let step = format!("scale(by: {})", list(&factors));
        judge(&text(&step), field, base.length, &scaled);

        let length = random.random_range(1..=base.length);
        let cut = map(&base.words, |word| word[..length].to_vec());
        judge(
            &text(&format!("truncate(length: {length})")),
            field,
            length,
            &cut,
        );
    });
}

#[test]
fn words_are_interleaved_position_by_position() {
    each(2, |_, sample, base, text| {
        if base.words.len() > 30 {
            return;
        }
        let mut pairs = Words::new();
        for one in &base.words {
            for two in &base.words {
                pairs.insert(
                    one.iter()
                        .zip(two)
                        .flat_map(|(&left, &right)| [left, right])
                        .collect(),
                );
            }
        }
        judge(
            &text("interleave(depth: 2)"),
            &sample.field,
            2 * base.length,
            &pairs,
        );
    });
}

#[test]
fn lengthening_is_augmenting_and_extending() {
    each(3, |random, sample, base, text| {
        let field = &sample.field;
        let ones = vec![1; base.length];
        let mut lengthened = Words::new();
        for word in &base.words {
            for factor in 0..field.order() as u32 {
                let mut word = add(field, word, &times(field, factor, &ones));
                let sum = word.iter().fold(0, |sum, &entry| field.add(sum, entry));
                word.push(field.neg(sum));
                lengthened.insert(word);
            }
        }
        judge(&text("lengthen"), field, base.length + 1, &lengthened);

        let Some(basis) = &base.rows else { return };
        if base.words.len() as u64 != field.order().pow(basis.len() as u32) {
            return;
        }
        let columns = rows(random, field, basis.len(), 2);
        let longer: Vec<Word> = basis
            .iter()
            .zip(&columns)
            .map(|(row, more)| [row.as_slice(), more].concat())
            .collect();
        judge(
            &text(&format!("lengthen(columns: {})", literal(&columns))),
            field,
            base.length + 2,
            &span(field, base.length + 2, &longer),
        );
    });
}

#[test]
fn a_subcode_is_spanned_by_rows() {
    each(4, |random, sample, base, text| {
        let Some(rows) = &base.rows else {
            assert!(!findings(&text("subcode(rows: {0})")).is_empty());
            return;
        };
        let kept: Vec<usize> = (0..rows.len())
            .filter(|_| random.random_bool(0.6))
            .collect();
        let chosen: Vec<Word> = kept.iter().map(|&row| rows[row].clone()).collect();
        let named: Vec<String> = kept.iter().map(usize::to_string).collect();
        judge(
            &text(&format!("subcode(rows: {{{}}})", named.join(", "))),
            &sample.field,
            base.length,
            &span(&sample.field, base.length, &chosen),
        );
        judge(
            &text("subcode(dimension: 1)"),
            &sample.field,
            base.length,
            &span(&sample.field, base.length, &rows[..1]),
        );
    });
}

#[test]
fn the_hull_is_what_code_and_dual_share() {
    each(5, |_, sample, base, text| {
        let dual = orthogonal(&sample.field, base.length, &base.words);
        let hull = base.words.intersection(&dual).cloned().collect();
        judge(&text("hull"), &sample.field, base.length, &hull);
        judge(&text("dual"), &sample.field, base.length, &dual);
    });
}

#[test]
fn a_systematic_form_has_the_identity_in_front() {
    each(6, |_, sample, base, text| {
        let text = text("systematic");
        with_spec(&text, |view| {
            let code = &view.codes[0].compiled.code;
            let matrix = code.generator_matrix_as_built().expect("by rows");
            let k = code.dimension();
            assert_eq!(matrix.rows(), k);
            for row in 0..k {
                for column in 0..k {
                    assert_eq!(matrix.get(row, column), u32::from(row == column), "{text}");
                }
            }
            // The same words in some order of positions: weights stay, and so does the count.
            let words = span(
                &sample.field,
                base.length,
                &(0..k).map(|row| matrix.row(row)).collect::<Vec<_>>(),
            );
            let sorted = |words: &Words| {
                let mut weights: Vec<usize> = words.iter().map(|word| weight(word)).collect();
                weights.sort_unstable();
                weights
            };
            assert_eq!(sorted(&words), sorted(&base.words), "{text}");
            judge(&text, &sample.field, base.length, &words);
        });
    });
}

#[test]
fn two_codes_join_meet_and_make_a_tensor() {
    each(7, |random, sample, first, _| {
        let field = &sample.field;
        let kind = random.random_range(0..3);
        let second = base(random, field, first.length, kind);
        let text = |step: &str| {
            format!(
                "field f = {}\ncode other over f = {}\ncode after over f = {} then {step}(other)\n",
                sample.declared, second.text, first.text
            )
        };
        let mut sums = Words::new();
        for one in &first.words {
            sums.extend(second.words.iter().map(|two| add(field, one, two)));
        }
        judge(&text("join"), field, first.length, &sums);
        let shared = first.words.intersection(&second.words).cloned().collect();
        judge(&text("meet"), field, first.length, &shared);
    });
    // The dual of the product of the duals.
    for (sample, sizes) in fields().iter().zip([(3, 4), (2, 3), (2, 2), (2, 2)]) {
        let field = &sample.field;
        let mut random = ChaCha8Rng::seed_from_u64(70);
        for kind in [0, 1, 2] {
            let first = base(&mut random, field, sizes.0, kind);
            let second = base(&mut random, field, sizes.1, (kind + 1) % 3);
            let n = sizes.0 * sizes.1;
            let mut products = Vec::new();
            for one in orthogonal(field, sizes.0, &first.words) {
                for two in orthogonal(field, sizes.1, &second.words) {
                    let product = one.iter().flat_map(|&entry| times(field, entry, &two));
                    products.push(product.collect());
                }
            }
            let text = format!(
                "field f = {}\ncode after over f = {} then tensor({})\n",
                sample.declared, first.text, second.text
            );
            judge(&text, field, n, &null(field, n, &products));
        }
    }
}

#[test]
fn a_residue_is_the_rest_outside_a_word() {
    each(8, |random, sample, base, text| {
        let words: Vec<&Word> = base
            .words
            .iter()
            .filter(|word| (1..base.length).contains(&weight(word)))
            .collect();
        if words.is_empty() {
            return;
        }
        let word = words[random.random_range(0..words.len())];
        let rest = map(&base.words, |other| {
            (0..base.length)
                .filter(|&at| word[at] == 0)
                .map(|at| other[at])
                .collect()
        });
        judge(
            &text(&format!("residue(word: {})", list(word))),
            &sample.field,
            base.length - weight(word),
            &rest,
        );
        let support: Vec<usize> = (0..base.length).filter(|&at| word[at] != 0).collect();
        let inside = base
            .words
            .iter()
            .filter(|other| (0..base.length).all(|at| word[at] != 0 || other[at] == 0))
            .count();
        let places: Vec<String> = support.iter().map(usize::to_string).collect();
        let step = format!("residue(at: {{{}}})", places.join(", "));
        if inside as u64 == sample.field.order() {
            judge(
                &text(&step),
                &sample.field,
                base.length - weight(word),
                &rest,
            );
        } else {
            assert!(!findings(&text(&step)).is_empty(), "{step}");
        }
    });
}

#[test]
fn construction_x_tells_the_cosets_apart() {
    for sample in fields() {
        let field = &sample.field;
        let mut random = ChaCha8Rng::seed_from_u64(9);
        for _ in 0..6 {
            let n = sample.longest;
            // Rows in echelon form, so that they are independent.
            let all: Vec<Word> = (0..3)
                .map(|at| {
                    let mut row = rows(&mut random, field, 1, n).remove(0);
                    row[..at].fill(0);
                    row[at] = 1;
                    row
                })
                .collect();
            let tail = vec![vec![1, 0, 1], vec![0, 1, 1]];
            let text = format!(
                "field f = {}\ncode after over f = span({}) then construction_x(sub: span({}), tail: span({}))\n",
                sample.declared,
                literal(&all),
                literal(&all[..1]),
                literal(&tail)
            );
            let longer: Vec<Word> = [vec![0; 3], tail[0].clone(), tail[1].clone()]
                .iter()
                .zip(&all)
                .map(|(tail, row)| [row.as_slice(), tail].concat())
                .collect();
            judge(&text, field, n + 3, &span(field, n + 3, &longer));
        }
    }
}

/// The three ways down that are tried: field, subfield, and how both are declared.
fn towers() -> Vec<(Field, Field, &'static str)> {
    let prime = |p| Field::prime(p).expect("a prime");
    let extension = |p, modulus: &[u32]| Field::with_modulus(p, modulus, true).expect("a field");
    vec![
        (
            extension(2, &[1, 1, 1]),
            prime(2),
            "field f = GF(4) where a^2 = a + 1\nfield s = GF(2)\n",
        ),
        (
            extension(2, &[1, 1, 0, 0, 1]),
            extension(2, &[1, 1, 1]),
            "field f = GF(16) where a^4 = a + 1\nfield s = GF(4) where a^2 = a + 1\n",
        ),
        (
            extension(3, &[2, 2, 1]),
            prime(3),
            "field f = GF(9) where a^2 = a + 1\nfield s = GF(3)\n",
        ),
        (
            extension(2, &[1, 1, 0, 1]),
            prime(2),
            "field f = GF(8) where a^3 = a + 1\nfield s = GF(2)\n",
        ),
    ]
}

#[test]
fn subfields_are_reached_by_subcode_trace_and_image() {
    let mut random = ChaCha8Rng::seed_from_u64(10);
    for (field, small, declared) in towers() {
        let embedding = field.embedding_of(&small).expect("a subfield");
        let m = embedding.degree() as usize;
        for kind in [0, 1, 2, 0, 1] {
            let length = 3;
            let base = base(&mut random, &field, length, kind);
            let text =
                |step: &str| format!("{declared}code after = {} over f then {step}\n", base.text);
            let inside = base
                .words
                .iter()
                .filter_map(|word| word.iter().map(|&entry| embedding.down(entry)).collect())
                .collect();
            judge(&text("subfield(s)"), &small, length, &inside);

            let traces = map(&base.words, |word| {
                word.iter().map(|&entry| embedding.trace(entry)).collect()
            });
            judge(&text("trace(s)"), &small, length, &traces);

            // Delsarte: the dual of the subfield subcode of the dual.
            let delsarte = "dual then subfield(s) then dual";
            judge(&text(delsarte), &small, length, &traces);

            if base.words.len() > 256 {
                continue;
            }
            let up = |digits: &[u32], basis: &[u32]| {
                digits.iter().zip(basis).fold(0, |sum, (&digit, &element)| {
                    field.add(sum, field.mul(embedding.up(digit), element))
                })
            };
            let root = field.characteristic();
            let polynomial: Word = (0..m as u64).map(|at| field.pow(root, at)).collect();
            let dual: Word = (0..m)
                .map(|at| {
                    let fits = |&e: &u32| {
                        (0..m).all(|other| {
                            let trace = embedding.trace(field.mul(e, polynomial[other]));
                            trace == u32::from(at == other)
                        })
                    };
                    (0..field.order() as u32).find(fits).expect("a dual basis")
                })
                .collect();
            for (written, basis) in [
                ("image(to: s)".to_string(), &polynomial),
                ("image(basis: polynomial, to: s)".to_string(), &polynomial),
                ("image(basis: dual, to: s)".to_string(), &dual),
                (format!("image(basis: {}, to: s)", list(&dual)), &dual),
            ] {
                let digits = space(&small, m);
                let of: BTreeMap<u32, &Word> = digits
                    .iter()
                    .map(|digits| (up(digits, basis), digits))
                    .collect();
                let written_words = map(&base.words, |word| {
                    word.iter().flat_map(|entry| of[entry].clone()).collect()
                });
                judge(&text(&written), &small, length * m, &written_words);
            }
        }
    }
}

#[test]
fn a_lifted_code_keeps_its_distance() {
    let mut random = ChaCha8Rng::seed_from_u64(11);
    for (field, small, declared) in towers() {
        let embedding = field.embedding_of(&small).expect("a subfield");
        for kind in [0, 1, 2] {
            let base = base(&mut random, &small, 3, kind);
            let above: Vec<Word> = base
                .words
                .iter()
                .map(|word| word.iter().map(|&entry| embedding.up(entry)).collect())
                .collect();
            let mut lifted = Words::from([vec![0; 3]]);
            for word in &above {
                if !lifted.contains(word) {
                    let further = span(&field, 3, std::slice::from_ref(word));
                    lifted = lifted
                        .iter()
                        .flat_map(|one| further.iter().map(|two| add(&field, one, two)))
                        .collect();
                }
            }
            let text = format!("{declared}code after = {} over s then lift(f)\n", base.text);
            judge(&text, &field, 3, &lifted);
        }
    }
}

#[test]
fn concatenation_goes_to_any_subfield() {
    let mut random = ChaCha8Rng::seed_from_u64(12);
    for (field, small, declared) in towers() {
        let embedding = field.embedding_of(&small).expect("a subfield");
        let m = embedding.degree() as usize;
        let basis = embedding.polynomial_basis();
        let outer = base(&mut random, &field, 2, 1);
        let inner: Vec<Word> = (0..m)
            .map(|at| {
                let mut row = rows(&mut random, &small, 1, m + 1).remove(0);
                row[..at].fill(0);
                row[at] = 1;
                row
            })
            .collect();
        let framed = map(&outer.words, |word| {
            word.iter()
                .flat_map(|&entry| {
                    let digits = basis.coordinates(entry);
                    digits
                        .iter()
                        .zip(&inner)
                        .fold(vec![0; m + 1], |sum, (&digit, row)| {
                            add(&small, &sum, &times(&small, digit, row))
                        })
                })
                .collect()
        });
        let text = format!(
            "{declared}code inner over s = span({})\ncode after = {} over f then concatenate(inner)\n",
            literal(&inner),
            outer.text
        );
        judge(&text, &small, 2 * (m + 1), &framed);
    }
}

#[test]
fn generalized_concatenation_chooses_cosets_level_by_level() {
    let mut random = ChaCha8Rng::seed_from_u64(14);
    for (field, small, declared) in towers() {
        let embedding = field.embedding_of(&small).expect("a subfield");
        let m = embedding.degree() as usize;
        let basis = embedding.polynomial_basis();
        let n = m + 2;
        let inner: Vec<Word> = (0..=m)
            .map(|at| {
                let mut row = rows(&mut random, &small, 1, n).remove(0);
                row[..at].fill(0);
                row[at] = 1;
                row
            })
            .collect();
        let first = base(&mut random, &field, 2, 1);
        let second = base(&mut random, &small, 2, 1);
        let mut framed = Words::new();
        for one in &first.words {
            for two in &second.words {
                let block = |place: usize| {
                    // The last row spans the smaller inner code.
                    let coordinates = basis.coordinates(one[place]);
                    let digits = [coordinates, vec![two[place]]].concat();
                    digits
                        .iter()
                        .zip(&inner)
                        .fold(vec![0; n], |sum, (&digit, row)| {
                            add(&small, &sum, &times(&small, digit, row))
                        })
                };
                framed.insert([block(0), block(1)].concat());
            }
        }
        let text = format!(
            "{declared}code wide over s = span({})\ncode narrow over s = span({})\ncode second over s = {}\ncode after = {} over f then generalized_concatenate(outers: [second], inners: [wide, narrow])\n",
            literal(&inner),
            literal(&inner[m..]),
            second.text,
            first.text
        );
        judge(&text, &small, 2 * n, &framed);
    }
}

#[test]
fn steps_that_choose_words_or_join_them_move_the_mask_too() {
    let offset = |step: &str| {
        let text = format!(
            "field f = GF(4) where a^2 = a + 1\ncode c over GF(2) = span(| 1 0 0 1 | | 0 1 1 0 |)\ncode after = c then mask(with: [1, 0, 1, 1]) then {step}\n"
        );
        with_spec(&text, |view| {
            let codes = &view.codes;
            let after = codes.iter().find(|code| code.compiled.name == "after");
            let after = after.unwrap_or_else(|| panic!("{step}: {:?}", view.findings));
            after.compiled.code.offset().map(<[u32]>::to_vec)
        })
    };
    for (step, expected) in [
        ("shorten(first: 1)", vec![0, 1, 1]),
        ("expurgate", vec![1, 0, 1, 1]),
        ("augment", vec![1, 0, 1, 1]),
        ("subcode(dimension: 1)", vec![1, 0, 1, 1]),
        ("lengthen", vec![1, 0, 1, 1, 1]),
        ("interleave(depth: 2)", vec![1, 1, 0, 0, 1, 1, 1, 1]),
        (
            "plotkin(repetition(4) over GF(2))",
            vec![1, 0, 1, 1, 1, 0, 1, 1],
        ),
        ("direct_sum(parity(2) over GF(2))", vec![1, 0, 1, 1, 0, 0]),
        (
            "concatenate(repetition(2) over GF(2))",
            vec![1, 1, 0, 0, 1, 1, 1, 1],
        ),
        ("image", vec![1, 0, 1, 1]),
        ("lift(f)", vec![1, 0, 1, 1]),
        ("lift(f) then image", vec![1, 0, 0, 0, 1, 0, 1, 0]),
        ("arrange(data: last)", vec![1, 1, 1, 0]),
    ] {
        assert_eq!(offset(step), Some(expected), "{step}");
    }
}

#[test]
fn a_mask_moves_with_what_is_sent() {
    each(13, |random, sample, base, text| {
        let field = &sample.field;
        let n = base.length;
        let mask = rows(random, field, 1, n).remove(0);
        let masked = |step: &str| text(&format!("mask(with: {}) then {step}", list(&mask)));
        let sent = |word: &Word| add(field, word, &mask);
        // A step on what is sent: the words of the code are the differences of words sent.
        let check = |step: &str, change: &dyn Fn(&Word) -> Word| {
            let moved = change(&mask);
            let minus = times(field, field.neg(1), &moved);
            let words = map(&base.words, |word| add(field, &change(&sent(word)), &minus));
            judge_masked(&masked(step), field, moved.len(), &words, Some(&moved));
        };
        check("extend", &|word| {
            let sum = word.iter().fold(0, |sum, &entry| field.add(sum, entry));
            [word.as_slice(), &[field.neg(sum)]].concat()
        });
        check("repeat(times: 2)", &|word| word.repeat(2));
        check("puncture(first: 1)", &|word| word[1..].to_vec());
        check("truncate(length: 2)", &|word| word[..2].to_vec());
        let order: Word = (0..n as u32).rev().collect();
        check(&format!("permute({})", list(&order)), &|word| {
            word.iter().rev().copied().collect()
        });
        let two = field.order() as u32 - 1;
        check(&format!("scale(by: {})", list(&vec![two; n])), &|word| {
            times(field, two, word)
        });
    });
}

#[test]
fn two_masks_add_up_and_may_cancel() {
    let text =
        "code after over GF(2) = parity(3) then mask(with: [1, 0, 1]) then mask(with: [1, 0, 1])\n";
    with_spec(text, |view| {
        assert_eq!(view.codes[0].compiled.code.offset(), None);
    });
    let text =
        "code after over GF(3) = parity(3) then mask(with: [1, 0, 1]) then mask(with: [1, 1, 1])\n";
    with_spec(text, |view| {
        assert_eq!(
            view.codes[0].compiled.code.offset(),
            Some([2, 1, 2].as_slice())
        );
    });
}

#[test]
fn the_order_of_mask_and_extension_is_told_apart() {
    let before =
        "code after over GF(2) = hamming(3) then mask(with: [1, 0, 0, 0, 0, 0, 0]) then extend\n";
    let after = "code after over GF(2) = hamming(3) then extend then mask(with: [1, 0, 0, 0, 0, 0, 0, 0])\n";
    let offset = |text| {
        with_spec(text, |view| {
            view.codes[0].compiled.code.offset().map(<[u32]>::to_vec)
        })
    };
    assert_eq!(offset(before), Some(vec![1, 0, 0, 0, 0, 0, 0, 1]));
    assert_eq!(offset(after), Some(vec![1, 0, 0, 0, 0, 0, 0, 0]));
}

#[test]
fn a_mask_is_never_lost_in_silence() {
    for step in [
        "dual",
        "hull",
        "join(parity(4))",
        "meet(parity(4))",
        "product(parity(3))",
        "tensor(parity(3))",
        "residue(at: {0, 1})",
        "subfield(GF(2))",
        "trace(GF(2))",
    ] {
        let text =
            format!("code c over GF(2) = parity(4) then mask(with: [1, 0, 0, 0]) then {step}\n");
        let found = findings(&text);
        assert!(
            found.iter().any(|finding| finding.code.name == "mask-lost"),
            "{step}: {found:?}"
        );
    }
    // A named code keeps its mask, also as the other code of a step.
    let text = "code sent over GF(2) = parity(4) then mask(with: [1, 0, 0, 0])\ncode c over GF(2) = parity(4) then join(sent)\n";
    assert!(
        findings(text)
            .iter()
            .any(|finding| finding.code.name == "mask-lost")
    );
    let text = "code sent over GF(2) = parity(4) then mask(with: [1, 0, 0, 0])\ncode after over GF(2) = parity(2) then direct_sum(sent)\n";
    with_spec(text, |view| {
        let offset = view.codes[1].compiled.code.offset();
        assert_eq!(offset, Some([0, 0, 1, 0, 0, 0].as_slice()));
    });
}

#[test]
fn bad_arguments_get_a_finding() {
    for step in [
        "scale(by: [1, 0, 1, 1])",
        "scale(by: [1, 1])",
        "mask(with: [1, 1])",
        "repeat(times: 0)",
        "repeat(times: 16777216)",
        "interleave(depth: 16777216)",
        "truncate(length: 0)",
        "truncate(length: 5)",
        "subcode(rows: {0})",
        "subcode",
        "lengthen(columns: | 1 |)",
        "residue(word: [1, 0, 0, 0])",
        "residue(word: [0, 0, 0, 0])",
        "residue(word: [1, 1, 1, 1])",
        "residue(at: {0})",
        "residue(at: {0, 1, 2})",
        "residue",
        "lift(GF(3))",
        "subfield(GF(4))",
        "trace(GF(3))",
        "join(parity(5))",
        "meet(parity(3) over GF(3))",
        "construction_x(sub: parity(5), tail: repetition(1))",
        "construction_x(sub: span(| 1 0 0 0 |), tail: parity(3))",
        "construction_x(sub: repetition(4), tail: repetition(3))",
        "image(basis: first)",
        "image(to: GF(4))",
        "image(basis: [1, 1])",
        "concatenate(parity(3))",
        "generalized_concatenate(outers: [], inners: [parity(3)])",
        "generalized_concatenate(outers: [parity(5)], inners: [parity(3), repetition(3)])",
        "generalized_concatenate(outers: [parity(4)], inners: [repetition(3), parity(3)])",
        "generalized_concatenate(outers: [1], inners: [2])",
    ] {
        let text = format!("code c over GF(2) = parity(4) then {step}\n");
        let found = findings(&text);
        assert!(
            found
                .iter()
                .any(|finding| finding.code.severity == cosetta::finding::Severity::Error),
            "{step}: {found:?}"
        );
    }
}

#[test]
fn the_examples_of_all_steps_hold() {
    for entry in cosetta::step::STEPS {
        with_spec(entry.example, |view| {
            assert!(entry.example.contains(entry.name), "{}", entry.name);
            for checked in &view.codes {
                for clause in &checked.verdicts.clauses {
                    assert_eq!(
                        clause.judgement.verdict,
                        Verdict::Holds,
                        "{}: {}: {}",
                        entry.name,
                        clause.text,
                        clause.judgement.says
                    );
                }
            }
            let errors: Vec<&String> = view
                .findings
                .iter()
                .filter(|finding| finding.code.severity == cosetta::finding::Severity::Error)
                .map(|finding| &finding.message)
                .collect();
            assert!(errors.is_empty(), "{}: {errors:?}", entry.name);
        });
    }
}

#[test]
fn one_position_of_a_cyclic_code_always_costs_one() {
    // The theorem alone, without a search: no budget, and a code too large to enumerate.
    let text = "field b = GF(256) where a^8 = a^4 + a^3 + a^2 + 1\ncode after = reed_solomon(length: 255, dimension: 223) over b then puncture(first: 1)\n  is [254, 223, 32]\n";
    with_spec(text, |view| {
        let checked = &view.codes[0];
        let distance = view
            .session
            .distance_by(&checked.compiled.code, Effort::Small);
        assert_eq!((distance.lower, distance.upper), (32, 32));
    });
}
