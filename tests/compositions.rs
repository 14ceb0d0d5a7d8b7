//! Random specs, judged by the words that their lines mean: no disagreement, ever.

mod brute_force;
mod common;

use brute_force::compose::{Composed, composed};
use brute_force::{Plain, Word, ball, rank, weight};
use common::{Asked, Known, known};
use cosetta::algebra::Matrix;
use cosetta::code::{Code, information_positions};
use cosetta::derive::Effort;
use cosetta::derive::search::macwilliams;
use cosetta::project::View;
use num_bigint::BigUint;
use std::collections::BTreeSet;
use std::time::{Duration, Instant};

/// Random specs of one test, unless the time is over before.
const SPECS: u64 = 500;
const TIME: Duration = Duration::from_secs(50);

fn rows(matrix: &Matrix) -> Vec<Word> {
    (0..matrix.rows()).map(|row| matrix.row(row)).collect()
}

/// What is wrong with the matrices of a code that should have these words.
fn wrong_matrices(code: &Code, plain: &Plain, wrong: &mut Vec<String>) {
    let field = &plain.field;
    if u64::from(field.q()) != code.field().order() {
        wrong.push(format!(
            "field {}, not of order {}",
            code.field(),
            field.q()
        ));
        return;
    }
    let generator = rows(code.generator_matrix());
    let check = rows(code.check_matrix());
    if (code.length(), code.dimension()) != (plain.n, plain.k()) {
        wrong.push(format!(
            "[{}, {}], not [{}, {}]",
            code.length(),
            code.dimension(),
            plain.n,
            plain.k()
        ));
        return;
    }
    if generator.len() != plain.k() || rank(field, &generator) != plain.k() {
        wrong.push("the generator matrix has not rank k".to_string());
    }
    if check.len() != plain.n - plain.k() || rank(field, &check) != check.len() {
        wrong.push("the check matrix has not rank n - k".to_string());
    }
    if !generator.iter().all(|row| plain.contains(row)) {
        wrong.push("a row of the generator matrix is no word".to_string());
    }
    let orthogonal = |rows: &[Word]| {
        rows.iter()
            .all(|row| plain.basis().iter().all(|word| field.dot(row, word) == 0))
    };
    if !orthogonal(&check) {
        wrong.push("a row of the check matrix misses a word".to_string());
    }
    if let Some(built) = code.generator_matrix_as_built() {
        let built = rows(built);
        if Plain::span(field, plain.n, &built).words != plain.words {
            wrong.push("the generator matrix as built spans another code".to_string());
        }
    }
    if let Some(built) = code.check_matrix_as_built() {
        let built = rows(built);
        if !orthogonal(&built) || rank(field, &built) != plain.n - plain.k() {
            wrong.push("the check matrix as built checks another code".to_string());
        }
    }
}

/// What is wrong with what was derived.
fn wrong_facts(view: &View, code: &Code, known: &Known, plain: &Plain, wrong: &mut Vec<String>) {
    let dual = plain.dual();
    let d = plain.d().unwrap_or(0);
    if known.d != (d, d) {
        wrong.push(format!("d is {:?}, not {d}", known.d));
    }
    if known.weights.as_ref() != Some(&plain.weights()) {
        wrong.push(format!(
            "weights are {:?}, not {:?}",
            known.weights,
            plain.weights()
        ));
    }
    let distance = view.session.distance_by(code, Effort::Full);
    if let Some(word) = &distance.witness
        && (!plain.contains(word) || weight(word) != d)
    {
        wrong.push(format!("the witness {word:?} shows nothing"));
    }
    let dual_weights = view
        .session
        .dual_weights(code, Effort::Full)
        .map(|weights| {
            weights
                .counts
                .into_iter()
                .map(|(weight, count)| (weight, count.to_string()))
                .collect()
        });
    if dual_weights.as_ref() != Some(&dual.weights()) {
        wrong.push(format!("the dual's weights are {dual_weights:?}"));
    }
    let both = view.session.dual(&view.session.dual(code));
    if !rows(both.generator_matrix())
        .iter()
        .all(|row| plain.contains(row))
        || both.dimension() != plain.k()
    {
        wrong.push("the dual's dual is another code".to_string());
    }
    let dual_distance = view
        .session
        .distance_by(&view.session.dual(code), Effort::Full);
    let expected = dual.d().unwrap_or(0);
    if (dual_distance.lower, dual_distance.upper) != (expected, expected) {
        wrong.push(format!(
            "the dual's d is {}..{}, not {expected}",
            dual_distance.lower, dual_distance.upper
        ));
    }
    for (from, to, k) in [(plain, &dual, plain.k()), (&dual, plain, dual.k())] {
        let mut counts = vec![BigUint::default(); plain.n + 1];
        for (weight, count) in from.weights() {
            counts[weight] = count.parse().expect("a count");
        }
        let turned = macwilliams(&counts, code.field().order(), plain.n, k).expect("counts");
        let expected = to.weights();
        for (weight, count) in turned.iter().enumerate() {
            let expected = expected.get(&weight).map_or("0", String::as_str);
            if count.to_string() != expected {
                wrong.push(format!(
                    "MacWilliams: {count} words of weight {weight}, not {expected}"
                ));
            }
        }
    }
    for (name, verdict) in &known.properties {
        let expected = plain.property(name, &dual);
        if expected.is_some_and(|expected| expected != *verdict) {
            wrong.push(format!("{name} is said to be {verdict}"));
        }
    }
    let space = f64::from(plain.field.q()).powi(plain.n as i32);
    if space * plain.words.len() as f64 <= 1e5
        && let Some(&radius) = known.measures.get("covering_radius")
        && radius != plain.covering_radius()
    {
        wrong.push(format!(
            "the covering radius is {radius}, not {}",
            plain.covering_radius()
        ));
    }
}

/// The code after an `arrange`, as far as the second path can follow: the compiler chose which
/// positions carry data, and that choice is judged.
fn rearranged(code: &Code, before: &Plain, text: &str, wrong: &mut Vec<String>) -> Plain {
    let parent = &code.origin().parents[0];
    let data = information_positions(parent);
    if data.len() != before.k() || !before.informative(&data) {
        wrong.push(format!("{data:?} cannot carry the data"));
    }
    let checks: Vec<usize> = (0..before.n).filter(|at| !data.contains(at)).collect();
    let order = if text.contains("arrange(data: first)") {
        [data, checks].concat()
    } else {
        [checks, data].concat()
    };
    before.permute(&order)
}

fn disagreements(composed: &Composed) -> Vec<String> {
    let mut wrong = Vec::new();
    common::with_spec(&composed.text, |view| {
        let asked = Asked {
            weights: true,
            names: None,
        };
        let known = known(&view, "subject", asked, &composed.text);
        let code = &view
            .codes
            .iter()
            .find(|checked| checked.compiled.name == "subject")
            .expect("the subject")
            .compiled
            .code;
        let plain = match &composed.arranged {
            Some(before) => rearranged(code, before, &composed.text, &mut wrong),
            None => composed.plain.clone(),
        };
        wrong_matrices(code, &plain, &mut wrong);
        if wrong.is_empty() {
            wrong_facts(&view, code, &known, &plain, &mut wrong);
        }
        if composed.arranged.is_some() && known.properties.get("systematic") != Some(&true) {
            wrong.push("arranged, but not systematic".to_string());
        }
    });
    wrong
}

fn judge(seeds: std::ops::Range<u64>) {
    let start = Instant::now();
    let mut judged = 0;
    let mut failures = Vec::new();
    for seed in seeds {
        if start.elapsed() > TIME {
            break;
        }
        let composed = composed(seed);
        let outcome = std::panic::catch_unwind(|| disagreements(&composed));
        let wrong = outcome.unwrap_or_else(|_| vec!["it panicked".to_string()]);
        if !wrong.is_empty() {
            failures.push(format!(
                "seed {seed}:\n{}{}\n",
                composed.text,
                wrong.join("\n")
            ));
        }
        judged += 1;
    }
    println!("{judged} specs in {:.1} s", start.elapsed().as_secs_f64());
    assert!(
        failures.is_empty(),
        "{} of {judged} disagree\n\n{}",
        failures.len(),
        failures.join("\n")
    );
    assert!(judged >= 100, "only {judged} specs were judged");
}

#[test]
fn composed_codes_have_the_words_their_lines_mean() {
    judge(0..SPECS);
}

#[test]
fn other_composed_codes_have_the_words_their_lines_mean() {
    judge(10_000..10_000 + SPECS);
}

/// Whether a promise about errors holds, by going through all patterns of errors.
struct Trial<'a> {
    plain: &'a Plain,
    dual: Vec<Word>,
    patterns: Vec<Word>,
}

impl Trial<'_> {
    fn syndrome(&self, word: &Word) -> Word {
        self.dual
            .iter()
            .map(|row| self.plain.field.dot(row, word))
            .collect()
    }

    fn up_to(&self, most: usize) -> impl Iterator<Item = &Word> {
        self.patterns
            .iter()
            .filter(move |word| weight(word) <= most)
    }

    /// A decoder that corrects the first number of errors takes none of the second for those.
    fn corrects_while_detecting(&self, corrected: usize, detected: usize) -> bool {
        let mut claimed = std::collections::HashMap::new();
        for pattern in self.up_to(corrected) {
            if claimed.insert(self.syndrome(pattern), pattern).is_some() {
                return false;
            }
        }
        self.up_to(detected).all(|pattern| {
            claimed
                .get(&self.syndrome(pattern))
                .is_none_or(|&known| known == pattern)
        })
    }

    fn detects(&self, errors: usize) -> bool {
        self.up_to(errors)
            .all(|pattern| weight(pattern) == 0 || !self.plain.contains(pattern))
    }

    /// No two words agree outside some lost positions.
    fn recovers(&self, losses: usize) -> bool {
        subsets(self.plain.n, losses).iter().all(|lost| {
            let kept: BTreeSet<Word> = self
                .plain
                .words
                .iter()
                .map(|word| brute_force::without(word, lost))
                .collect();
            kept.len() == self.plain.words.len()
        })
    }

    /// For all losses: no two words, each with some errors, agree on the rest.
    fn corrects_with_losses(&self, errors: usize, losses: usize) -> bool {
        subsets(self.plain.n, losses).iter().all(|lost| {
            let kept: Vec<Word> = self
                .plain
                .words
                .iter()
                .map(|word| brute_force::without(word, lost))
                .collect();
            let near = |one: &Word, other: &Word| {
                one.iter()
                    .zip(other)
                    .filter(|(left, right)| left != right)
                    .count()
                    <= 2 * errors
            };
            (0..kept.len()).all(|at| (0..at).all(|before| !near(&kept[at], &kept[before])))
        })
    }
}

fn subsets(n: usize, size: usize) -> Vec<Vec<usize>> {
    (0u32..1 << n)
        .filter(|chosen| chosen.count_ones() as usize == size)
        .map(|chosen| (0..n).filter(|&at| chosen >> at & 1 == 1).collect())
        .collect()
}

#[test]
fn promises_about_errors_are_decided_as_trying_all_patterns_does() {
    let start = Instant::now();
    let mut judged = 0;
    for seed in 50_000..52_000 {
        if start.elapsed() > TIME || judged >= 150 {
            break;
        }
        let composed = composed(seed);
        let plain = &composed.plain;
        let space = f64::from(plain.field.q()).powi(plain.n as i32);
        if composed.arranged.is_some() || space > 3000.0 || plain.words.len() > 128 {
            continue;
        }
        judged += 1;
        promises(&composed, seed);
    }
    assert!(judged >= 50, "only {judged} codes were tried");
}

fn promises(composed: &Composed, seed: u64) {
    let plain = &composed.plain;
    let trial = Trial {
        plain,
        dual: plain.dual().basis(),
        patterns: plain.field.vectors(plain.n),
    };
    let mut asked: Vec<(String, bool)> = Vec::new();
    for one in 0..=plain.n.min(3) {
        asked.push((
            format!("corrects {one}"),
            trial.corrects_while_detecting(one, one),
        ));
        asked.push((format!("detects {one}"), trial.detects(one)));
        asked.push((format!("recovers {one} losses"), trial.recovers(one)));
        for other in 0..=(plain.n - one).min(2) {
            asked.push((
                format!("corrects {one} with {other} losses"),
                trial.corrects_with_losses(one, other),
            ));
        }
        for other in one..=plain.n.min(4) {
            asked.push((
                format!("corrects {one} while detecting {other}"),
                trial.corrects_while_detecting(one, other),
            ));
        }
    }
    let mut text = composed.text.clone();
    for (promise, _) in &asked {
        text += &format!("  require {promise}\n");
    }
    let (n, k) = (plain.n, plain.k());
    if let Some(d) = plain.d() {
        let weights: Vec<String> = plain
            .weights()
            .into_iter()
            .map(|(weight, count)| format!("{weight}: {count}"))
            .collect();
        let weights = weights.join(", ");
        text += &format!("code right = subject\n  is [{n}, {k}, {d}] with weights {{{weights}}}\n");
        text += &format!("code above = subject\n  is [{n}, {k}, {}]\n", d + 1);
        text += &format!("code below = subject\n  is [{n}, {k}, {}]\n", d - 1);
        text += &format!("code least = subject\n  is [{n}, {k}, >= {d}]\n");
        text += &format!("code more = subject\n  is [{n}, {k}, >= {}]\n", d + 1);
        text += &format!("code longer = subject\n  is [{}, {k}, {d}]\n", n + 1);
        text += &format!("code larger = subject\n  is [{n}, {}, _]\n", k + 1);
        text += "code heavier = subject\n  is [_, _, _] with weights {0: 1}\n";
    }
    use cosetta::derive::Verdict;
    common::with_spec(&text, |view| {
        let clauses = |name: &str| {
            let checked = view
                .codes
                .iter()
                .find(|checked| checked.compiled.name == name);
            &checked.expect("the code").verdicts.clauses
        };
        let verdict = |holds: bool| {
            if holds {
                Verdict::Holds
            } else {
                Verdict::Fails
            }
        };
        let judged = clauses("subject");
        assert_eq!(
            judged.len(),
            asked.len(),
            "seed {seed}:\n{text}\n{:#?}",
            view.findings
        );
        for (clause, (promise, holds)) in judged.iter().zip(&asked) {
            assert_eq!(
                clause.judgement.verdict,
                verdict(*holds),
                "seed {seed}: {promise}\n{text}\n{}",
                clause.judgement.says
            );
        }
        if plain.d().is_some() {
            for (name, holds) in [
                ("right", true),
                ("above", false),
                ("below", false),
                ("least", true),
                ("more", false),
                ("longer", false),
                ("larger", false),
                ("heavier", false),
            ] {
                let clause = clauses(name).first();
                assert_eq!(
                    clause.map(|clause| clause.judgement.verdict),
                    Some(verdict(holds)),
                    "seed {seed}: {name}\n{text}\n{:#?}",
                    view.findings
                );
            }
        }
    });
}

#[test]
fn the_second_path_counts_right() {
    // Against counting by hand, so that both paths are not wrong together.
    assert_eq!(ball(2, 7, 1), 8);
    assert_eq!(ball(3, 4, 1), 9);
    let field = brute_force::Field::of_order(9);
    // a^2 = a + 1 in GF(9), where a is 3.
    assert_eq!(field.mul(3, 3), 4);
    assert_eq!(field.mul(3, field.inv(3)), 1);
    assert_eq!(field.add(5, 7), 0);
}
