//! Mutated and nasty specs through the whole compiler: findings, never a panic or a hang.

mod common;

use cosetta::construct::{self, functions};
use cosetta::derive::search::Quiet;
use cosetta::evaluate::LIBRARY;
use cosetta::finding::render::{self, Style};
use cosetta::project::{self, Options};
use cosetta::report::{self, Report, describe::describe};
use cosetta::source::NoFiles;
use cosetta::step;
use rand::seq::IndexedRandom;
use rand::{Rng, SeedableRng};
use rand_chacha::ChaCha8Rng;

/// Runs a spec on a stack as large as the program's and renders all that comes of it.
fn survive(text: &str) -> usize {
    let text = text.to_string();
    let worker = std::thread::Builder::new()
        .stack_size(1 << 28)
        .spawn(move || {
            let files = [("spec.coset".to_string(), text)];
            let options = Options {
                seconds: 0.01,
                ..Options::default()
            };
            project::run(&files, &NoFiles, &options, &Quiet, |view| {
                for finding in &view.findings {
                    let length = view.sources.get(finding.span.source).text.len();
                    assert!(
                        finding.span.start <= finding.span.end
                            && finding.span.end as usize <= length
                    );
                }
                let _ = render::terminal(&view.findings, view.sources, Style::default());
                let small = view
                    .codes
                    .iter()
                    .filter(|checked| checked.compiled.code.length() <= 64);
                let codes = small
                    .take(3)
                    .map(|checked| describe(&view, checked))
                    .collect();
                let report = Report::new(codes, render::json(&view.findings, view.sources));
                let _ = (
                    report::text(&report, Style::default()),
                    report::json(&report).to_string(),
                );
                view.findings.len()
            })
        });
    worker.expect("a thread").join().expect("no panic")
}

fn texts() -> Vec<&'static str> {
    let mut texts: Vec<&str> = construct::CONSTRUCTIONS
        .iter()
        .map(|entry| entry.example)
        .collect();
    texts.extend(step::STEPS.iter().map(|entry| entry.example));
    texts.extend(functions::all().map(|entry| entry.example));
    texts.extend(LIBRARY.iter().map(|(_, text)| *text));
    texts.push(include_str!("../examples/tide-gauge/memory_word.coset"));
    texts
}

/// Pieces of text a mutant is made of.
const PIECES: &[&str] = &[
    "then",
    "over",
    "is",
    "(",
    ")",
    "{",
    "}",
    "|",
    "[",
    "]",
    "..",
    "^",
    "-",
    "*",
    "/",
    "=",
    ">=",
    ",",
    ":",
    "\"",
    "#",
    "0",
    "1",
    "2",
    "7",
    "999999999999",
    "bit",
    "code",
    "field",
    "matrix",
    "let",
    "where",
    "x",
    "a",
    "n",
    "k",
    "d",
    "GF(2)",
    "GF(256)",
    "hamming(3)",
    "extend",
    "dual",
    "shorten(first: 1)",
    "require",
    "corrects",
    "losses",
    "pick",
    "minimizing",
    "{ i for i in 1..9 }",
    "true",
    "not",
    "mod",
    "div",
    "points",
    "monomials",
    "columns v of height 3",
    "é",
    "\t",
    "\u{0}",
];

fn mutated(random: &mut ChaCha8Rng, text: &str) -> String {
    let mut tokens: Vec<String> = text
        .split_inclusive([' ', '\n', '(', ')', ','])
        .map(String::from)
        .collect();
    for _ in 0..random.random_range(1..=3) {
        if tokens.is_empty() {
            break;
        }
        let at = random.random_range(0..tokens.len());
        match random.random_range(0..5) {
            0 => {
                tokens.remove(at);
            }
            1 => {
                let again = tokens[at].clone();
                tokens.insert(at, again);
            }
            2 => {
                let other = random.random_range(0..tokens.len());
                tokens.swap(at, other);
            }
            3 => tokens[at] = format!("{} ", PIECES.choose(random).expect("pieces")),
            _ => {
                let characters: Vec<char> = tokens[at].chars().collect();
                let cut = random.random_range(0..=characters.len());
                let piece = PIECES.choose(random).expect("pieces");
                tokens[at] = characters[..cut]
                    .iter()
                    .chain(piece.chars().collect::<Vec<_>>().iter())
                    .collect();
            }
        }
    }
    tokens.concat()
}

#[test]
fn mutated_specs_never_panic() {
    let texts = texts();
    let mut random = ChaCha8Rng::seed_from_u64(2026);
    let mut refused = 0;
    for _ in 0..1200 {
        let text = texts.choose(&mut random).expect("texts");
        refused += usize::from(survive(&mutated(&mut random, text)) > 0);
    }
    assert!(
        refused > 400,
        "only {refused} mutants gave a finding, so they were hardly mutated"
    );
}

/// Specs that ask for too much, or for nothing.
const NASTY: &[&str] = &[
    "let huge = 2^(2^40)",
    "let huge = 10^(10^7)",
    "let many = { i for i in 0..10^30 }",
    "let many = { i + j for i in 1..5000, j in 1..5000 }",
    "field f = GF(2^40)",
    "field f = GF(6)",
    "field f = GF(-4)",
    "field f = GF(2^16) where a^16 = a",
    "field f = GF(10^30)",
    "field bit = GF(2)\ncode c over bit = span(identity(10^9))",
    "field bit = GF(2)\ncode c over bit = span(identity(1000000))",
    "field byte = GF(256)\ncode c over byte = hamming(24)",
    "field bit = GF(2)\ncode c over bit = hamming(24)",
    "field bit = GF(2)\ncode c over bit = hamming(0)",
    "field bit = GF(2)\ncode c over bit = hamming(1)\n  is [1, 0, _]\n  require corrects 1\n  require mds",
    "field bit = GF(2)\ncode c over bit = hamming(1) then dual then dual then extend",
    "field bit = GF(2)\ncode c over bit = span(zeros(3, 4))\n  is [4, 0, 1]\n  require perfect",
    "field bit = GF(2)\ncode c over bit = check(zeros(3, 4))\n  is [4, 4, 1]\n  require corrects 1",
    "field bit = GF(2)\ncode c over bit = check(zeros(0, 4))",
    "field bit = GF(2)\ncode c over bit = check(zeros(4, 0))",
    "field bit = GF(2)\ncode c over bit = evaluate(monomials in 2 variables where degree <= 1, at: points (x, y) where x = x + 1)",
    "field bit = GF(2)\ncode c over bit = evaluate(monomials in 2 variables where degree < 0, at: points in 2 variables)",
    "field bit = GF(2)\ncode c over bit = evaluate(monomials in 60 variables where degree <= 1, at: points in 60 variables)",
    "field bit = GF(2)\ncode c over bit = cyclic(length: 7, roots: 0..6)\n  is [7, 0, _]",
    "field bit = GF(2)\ncode c over bit = cyclic(length: 8, roots: 1..2)",
    "field bit = GF(2)\ncode c over bit = cyclic(length: 7, generator: x^3)",
    "field bit = GF(2)\ncode c over bit = cyclic(length: 7, generator: x^30 + 1)",
    "field bit = GF(2)\ncode c over bit = crc(length: 3, generator: x^16 + 1)",
    "field bit = GF(2)\ncode c over bit = crc(length: 20, generator: 1)",
    "field bit = GF(2)\ncode c over bit = repetition(5) then shorten(first: 5)",
    "field bit = GF(2)\ncode c over bit = repetition(5) then shorten(first: 4)\n  is [1, 0, 1]",
    "field bit = GF(2)\ncode c over bit = repetition(5) then puncture(at: {0, 0, 9})",
    "field bit = GF(2)\ncode c over bit = repetition(5) then permute([0, 0, 1, 2, 3])",
    "field bit = GF(2)\ncode c over bit = c",
    "field bit = GF(2)\ncode c(r in 1..3) over bit = c(r)",
    "field bit = GF(2)\ncode c(r in 1..10^9) over bit = repetition(r)",
    "field bit = GF(2)\ncode c over bit = pick r in 2..3 minimizing d from hamming(r) where d > 100",
    "field bit = GF(2)\ncode c over bit = repetition(3)\n  require corrects 1/2\n  require corrects -1\n  require detects x\n  require d\n  require weights(1, 2) = 3",
    "field bit = GF(2)\ncode c over bit = repetition(3)\n  bits data[10^20..0]",
    "field bit = GF(2)\ncode c over bit = repetition(3)\n  is [3, 1, 10^40]",
    "field bit = GF(2)\ncode c over bit = repetition(1000000)\n  is [1000000, 1, 1000000]",
    "field p = GF(2147483647)\ncode c over p = parity(5)\n  is [5, 4, 2]",
    "field p = GF(2147483647)\ncode c over p = span(| 1 2 3 | | 4 5 6 |)\n  is [3, 2, 2]",
    "field q = GF(65536)\ncode c over q = span(| 1 2 3 | | 4 5 6 |)\n  is [3, 2, 2]",
    "field bit = GF(2)\nmatrix m over bit = columns v of height 64",
    "field bit = GF(2)\nmatrix m over bit = circulants of size 10000000 | 0 |",
    "field bit = GF(2)\nchannel sea = bsc(2)\nchannel tide = gauss(1)",
];

#[test]
fn nasty_specs_end_in_findings_or_answers() {
    for text in NASTY {
        survive(text);
    }
}

#[test]
fn long_sums_and_deep_nests_end() {
    let sum = vec!["1"; 100_000].join(" + ");
    assert!(survive(&format!("let total = {sum}")) > 0);
    let nest = format!("{}1{}", "(".repeat(5000), ")".repeat(5000));
    assert!(survive(&format!("let total = {nest}")) > 0);
    let steps = " then dual".repeat(900);
    survive(&format!(
        "field bit = GF(2)\ncode c over bit = hamming(3){steps}\n"
    ));
}
