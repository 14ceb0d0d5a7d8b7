//! Whatever is written, a run ends soon, without a panic, and points only into the text.

use cosetta::construct::{CONSTRUCTIONS, functions};
use cosetta::derive::search::Quiet;
use cosetta::finding::Finding;
use cosetta::project::{self, Options};
use cosetta::source::{NoFiles, Sources};
use cosetta::step::STEPS;
use std::path::Path;
use std::sync::mpsc;
use std::time::{Duration, Instant};

/// Mutants in all, unless the time is over before.
const MUTANTS: usize = 1500;
const TIME: Duration = Duration::from_secs(60);
/// The longest a run with next to no budget may take here, on a busy machine.
const ONE_RUN: Duration = Duration::from_secs(20);
/// Next to no budget, in nominal seconds.
const LITTLE: f64 = 0.05;
const STACK: usize = 256 << 20;

/// Runs a text and gives what is said of it; every place that a finding names is looked at.
fn run(text: &str, seconds: f64) -> Vec<String> {
    let files = [("spec.coset".to_string(), text.to_string())];
    let options = Options {
        seconds,
        ..Options::default()
    };
    project::run(&files, &NoFiles, &options, &Quiet, |view| {
        for checked in &view.codes {
            let _ = view.parameters(checked);
        }
        view.findings
            .iter()
            .map(|finding| {
                within(finding, view.sources);
                format!("{}: {}", finding.code.name, finding.message)
            })
            .collect()
    })
}

fn within(finding: &Finding, sources: &Sources) {
    let related = finding.related.iter().map(|related| related.span);
    for span in std::iter::once(finding.span).chain(related) {
        let text = &sources.get(span.source).text;
        let (start, end) = (span.start as usize, span.end as usize);
        assert!(start <= end && end <= text.len(), "{finding:?}");
        assert!(
            text.is_char_boundary(start) && text.is_char_boundary(end),
            "{finding:?}"
        );
    }
    assert!(!finding.message.is_empty());
}

/// Runs a text on a thread of its own, with a stack as large as the command's.
fn apart(text: String, seconds: f64) -> Result<(Vec<String>, Duration), String> {
    let (sender, receiver) = mpsc::channel();
    let work = move || {
        let start = Instant::now();
        let outcome = std::panic::catch_unwind(|| run(&text, seconds));
        let _ = sender.send((outcome, start.elapsed()));
    };
    let thread = std::thread::Builder::new().stack_size(STACK);
    thread.spawn(work).expect("a thread");
    match receiver.recv_timeout(ONE_RUN) {
        Ok((Ok(findings), time)) => Ok((findings, time)),
        Ok((Err(_), _)) => Err("it panics".to_string()),
        Err(_) => Err("it does not end".to_string()),
    }
}

/// A small generator of numbers (splitmix64; Steele, Lea and Flood, 2014).
struct Dice(u64);

impl Dice {
    fn below(&mut self, bound: usize) -> usize {
        self.0 = self.0.wrapping_add(0x9e37_79b9_7f4a_7c15);
        let mut mixed = self.0;
        mixed = (mixed ^ (mixed >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
        mixed = (mixed ^ (mixed >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
        ((mixed ^ (mixed >> 31)) % bound.max(1) as u64) as usize
    }
}

/// The texts that mutants are made from.
fn texts() -> Vec<String> {
    let mut texts: Vec<String> = Vec::new();
    texts.extend(CONSTRUCTIONS.iter().map(|entry| entry.example.to_string()));
    texts.extend(STEPS.iter().map(|entry| entry.example.to_string()));
    texts.extend(functions::all().map(|entry| entry.example.to_string()));
    let root = Path::new(env!("CARGO_MANIFEST_DIR"));
    let mut folders = vec![root.join("specs"), root.join("examples")];
    let mut found = Vec::new();
    while let Some(folder) = folders.pop() {
        for entry in std::fs::read_dir(folder).into_iter().flatten().flatten() {
            let path = entry.path();
            if path.is_dir() {
                folders.push(path);
            } else if path.extension().is_some_and(|ending| ending == "coset") {
                found.push(path);
            }
        }
    }
    found.sort();
    texts.extend(
        found
            .into_iter()
            .filter_map(|path| std::fs::read_to_string(path).ok())
            .filter(|text| text.len() < 4000),
    );
    texts
}

/// Words, numbers and marks, blanks left with the piece before.
fn pieces(text: &str) -> Vec<String> {
    let mut pieces: Vec<String> = Vec::new();
    let mut word = false;
    for letter in text.chars() {
        let in_word = letter.is_alphanumeric() || letter == '_';
        if in_word && word || letter == ' ' && !pieces.is_empty() {
            pieces.last_mut().expect("a piece").push(letter);
        } else {
            pieces.push(letter.to_string());
        }
        word = in_word;
    }
    pieces
}

fn mutant(dice: &mut Dice, texts: &[String]) -> String {
    let text = &texts[dice.below(texts.len())];
    if dice.below(4) == 0 {
        let mut bytes = text.clone().into_bytes();
        for _ in 0..1 + dice.below(3) {
            let at = dice.below(bytes.len());
            bytes[at] = match dice.below(3) {
                0 => b"0123456789"[dice.below(10)],
                1 => b"()[]{}|,.:=<>*^-+#\"/ \n"[dice.below(22)],
                _ => bytes[at] ^ (1 << dice.below(8)),
            };
        }
        return String::from_utf8_lossy(&bytes).into_owned();
    }
    let mut parts = pieces(text);
    for _ in 0..1 + dice.below(3) {
        let (at, to) = (dice.below(parts.len()), dice.below(parts.len()));
        match dice.below(6) {
            0 => parts.swap(at, to),
            1 => {
                parts.remove(at);
            }
            2 => {
                let part = parts[at].clone();
                parts.insert(to, part);
            }
            3 => {
                let other = pieces(&texts[dice.below(texts.len())]);
                parts[at] = other[dice.below(other.len())].clone();
            }
            4 => {
                let numbers = [
                    "0 ", "1 ", "-1 ", "2 ", "17 ", "1/2 ", "10^9 ", "2^40 ", "true ", "{} ",
                ];
                parts[at] = numbers[dice.below(numbers.len())].to_string();
            }
            _ => {
                let end = parts.len().min(at + 1 + dice.below(12));
                let some: Vec<String> = parts[at..end].to_vec();
                parts.splice(to..to, some);
            }
        }
        if parts.is_empty() {
            break;
        }
    }
    parts.concat()
}

#[test]
fn mutants_are_read_in_good_time() {
    let start = Instant::now();
    let texts = texts();
    let mut dice = Dice(2024);
    let mut failures = Vec::new();
    let mut tried = 0;
    let mut slowest = (Duration::ZERO, String::new());
    while tried < MUTANTS && start.elapsed() < TIME && failures.len() < 8 {
        let text = mutant(&mut dice, &texts);
        match apart(text.clone(), LITTLE) {
            Ok((_, time)) if time > slowest.0 => slowest = (time, text),
            Ok(_) => {}
            Err(why) => failures.push(format!("{why}:\n{text}")),
        }
        tried += 1;
    }
    println!(
        "{tried} mutants; the slowest took {:?}:\n{}",
        slowest.0, slowest.1
    );
    assert!(failures.is_empty(), "{}", failures.join("\n----\n"));
    assert!(tried >= 200, "only {tried} mutants were tried");
}

/// Specs that ask for too much, and a word that one of their findings holds.
fn too_much() -> Vec<(String, &'static str)> {
    let bit = |text: &str| format!("field bit = GF(2)\n{text}\n");
    let octal =
        |text: &str| format!("field bit = GF(2)\nfield f = GF(8) where a^3 = a + 1\n{text}\n");
    vec![
        ("let x = 2^(2^40)\n".to_string(), "limit"),
        ("let x = (1/3)^(10^12)\n".to_string(), "limit"),
        ("let s = {i for i in 0..10^30}\n".to_string(), "limit"),
        (
            "let s = {i * j for i in 0..10^5 for j in 0..10^5}\n".to_string(),
            "",
        ),
        (
            bit("code c over bit = span(identity(10^9))"),
            "bad-argument",
        ),
        (bit("code c over bit = check(ones(10^6, 10^6))"), "limit"),
        (
            "field f = GF(2^8) where a^8 = a^4 + a^3 + a^2 + 1\ncode c over f = hamming(20)\n"
                .to_string(),
            "limit",
        ),
        ("field f = GF(2^40)\n".to_string(), ""),
        ("field f = GF(10^400)\n".to_string(), ""),
        ("field f = GF(6)\n".to_string(), "bad-field-order"),
        ("field f = GF(0)\n".to_string(), "bad-field-order"),
        ("field f = GF(7/2)\n".to_string(), "wrong-type"),
        (
            format!("let x = {}1{}\n", "(".repeat(100_000), ")".repeat(100_000)),
            "bad-text",
        ),
        (format!("let x = {}1\n", "-".repeat(100_000)), ""),
        (format!("let x = {}1\n", "2^".repeat(20_000)), ""),
        (format!("let x = {}\n", vec!["1"; 100_000].join(" + ")), ""),
        (
            format!("let x = {}\nlet y = x * x\n", "9".repeat(400_000)),
            "",
        ),
        (bit("code c over bit = span(zeros(3, 0))"), "shape"),
        (
            octal(
                "code c over f = evaluate(monomials in 2 variables where degree <= 1, at: points (x, y) where x != x)",
            ),
            "bad-points",
        ),
        (
            bit(
                "code c over bit = evaluate(monomials in 64 variables where degree <= 1, at: points in 64 variables)",
            ),
            "limit",
        ),
        (bit("code c(r in 1..4) over bit = c(r)"), "cycle"),
        (
            bit("code c(r in 1..4) over bit = d(r)\ncode d(r in 1..4) over bit = c(r) then extend"),
            "cycle",
        ),
        ("let f(x) = f(x - 1)\nlet y = f(3)\n".to_string(), "cycle"),
        (bit("code c over bit = hamming(3/2)"), ""),
        (
            bit("code c over bit = hamming(3) then shorten(first: 1/2)"),
            "wrong-type",
        ),
        (bit("code c over bit = repetition(-3)"), ""),
        (
            bit("code c over bit = hamming(3)\n  is [7, 4, 3/2]"),
            "wrong-type",
        ),
        (
            bit("code c over bit = hamming(3)\n  require corrects 10^30"),
            "wrong-type",
        ),
        (
            bit("code c over bit = hamming(3)\n  require corrects 2^39 with 2^39 losses"),
            "requirement-fails",
        ),
        (
            bit("code c over bit = hamming(3)\n  is [10^400, 2^2000, -5]"),
            "claim-length",
        ),
        (
            bit("code c over bit = hamming(3)\n  bits data[10^30..0]"),
            "",
        ),
        (
            bit("code c over bit = hamming(12) then product(hamming(12))"),
            "limit",
        ),
        (bit("code c(r in 1..10^9) over bit = hamming(r)"), "limit"),
        (
            bit("code c over bit = pick r in {} minimizing n from hamming(r)"),
            "empty-choice",
        ),
        (
            bit("matrix m over bit = circulants of size 10^9 | 0 1 |"),
            "bad-argument",
        ),
        (
            bit("code c over bit = check(incidence(projective_plane(10^9)))"),
            "",
        ),
        (
            bit("code c over bit = hamming(3) then permute(0..10^30)"),
            "",
        ),
        (
            bit("code c over bit = crc(length: 5, generator: x^(10^30) + 1)"),
            "",
        ),
        (
            octal(
                "code c over bit = evaluate((monomials in 2 variables where degree <= 12) over f, at: (points in 2 variables) over bit)",
            ),
            "",
        ),
        ("let x = 1/0\n".to_string(), "bad-number"),
    ]
}

#[test]
fn asking_for_too_much_is_told_in_good_time() {
    let mut wrong = Vec::new();
    for (text, word) in too_much() {
        let shown: String = text.chars().take(200).collect();
        match apart(text, LITTLE) {
            Ok((findings, _)) if !findings.iter().any(|finding| finding.contains(word)) => {
                wrong.push(format!("{shown}says {findings:?}, not {word}"));
            }
            Ok((findings, _)) if findings.is_empty() && !word.is_empty() => {
                wrong.push(format!("{shown}says nothing"));
            }
            Ok(_) => {}
            Err(why) => wrong.push(format!("{shown}{why}")),
        }
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

#[test]
fn long_codes_are_judged_without_their_large_matrices() {
    let bit = |text: &str| format!("field bit = GF(2)\n{text}\n");
    let octal = "field f = GF(8) where a^3 = a + 1\n";
    let mut wrong = Vec::new();
    for text in [
        bit("code c over bit = hamming(12)\n  is [4095, 4083, 3]\n  require perfect"),
        bit("code c over bit = hamming(20)\n  prefer self_orthogonal\n  prefer complementary_dual\n  prefer projective"),
        bit("code c over bit = repetition(2^20)\n  is [2^20, 1, 2^20]\n  prefer mds"),
        bit("code c over bit = parity(2^20)\n  is [2^20, 2^20 - 1, 2]\n  require mds\n  prefer even"),
        bit("code c over bit = reed_muller(order: 1, variables: 17)\n  is [2^17, 18, 2^16]"),
        bit("code c over bit = cyclic(length: 2^17 - 1, roots: 1..200)\n  prefer even"),
        format!("{octal}code c = repetition(2^16) over f then concatenate(simplex(3) over GF(2))\n"),
        "field f = GF(2^12) where a^12 = a^6 + a^4 + a + 1\ncode c over f = reed_solomon(length: 2^12 - 1, dimension: 2^11)\n  is [4095, 2048, 2048]\n  require mds\n".to_string(),
    ] {
        match apart(text.clone(), 5.0) {
            Ok((findings, _)) => {
                let errors: Vec<&String> = findings
                    .iter()
                    .filter(|finding| !finding.starts_with("preference"))
                    .collect();
                if !errors.is_empty() {
                    wrong.push(format!("{text}{errors:?}"));
                }
            }
            Err(why) => wrong.push(format!("{text}{why}")),
        }
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

#[test]
fn the_smallest_codes_are_judged() {
    let bit = |text: &str| format!("field bit = GF(2)\n{text}\n");
    let none = "code nought over bit = check(identity(5))";
    let mut wrong = Vec::new();
    for text in [
        bit(&format!(
            "{none}\n  is [5, 0, _]\n  require even\n  require systematic\n  require corrects 2\n  require weights(0) = 1\n  require rate = 0"
        )),
        bit(&format!(
            "{none}\ncode c over bit = nought then extend\n  is [6, 0, _]"
        )),
        bit(&format!(
            "{none}\ncode c over bit = nought then puncture(first: 2)\n  is [3, 0, _]"
        )),
        bit(&format!(
            "{none}\ncode c over bit = nought then shorten(first: 2)\n  is [3, 0, _]"
        )),
        bit(&format!(
            "{none}\ncode c over bit = nought then augment\n  is [5, 1, 5]"
        )),
        bit(&format!(
            "{none}\ncode c over bit = nought then expurgate\n  is [5, 0, _]"
        )),
        bit(&format!(
            "{none}\ncode c over bit = nought then dual\n  is [5, 5, 1]\n  require mds\n  require perfect\n  require cyclic"
        )),
        bit(&format!(
            "{none}\ncode c over bit = nought then plotkin(nought then dual)\n  is [10, 5, 1]"
        )),
        bit(&format!(
            "{none}\ncode c over bit = nought then dual then plotkin(nought)\n  is [10, 5, 2]"
        )),
        bit(&format!(
            "{none}\ncode c over bit = nought then direct_sum(nought then dual)\n  is [10, 5, 1]"
        )),
        bit(&format!(
            "{none}\ncode c over bit = nought then product(nought then dual)\n  is [25, 0, _]"
        )),
        bit(&format!(
            "{none}\ncode c over bit = nought then arrange(data: first)\n  is [5, 0, _]"
        )),
        bit(
            "code c over bit = span(identity(5))\n  is [5, 5, 1] with weights {0: 1, 1: 5, 2: 10, 3: 10, 4: 5, 5: 1}\n  require dual_containing\n  require covering_radius = 0",
        ),
        bit(
            "code c over bit = repetition(1)\n  is [1, 1, 1]\n  require mds\n  require perfect\n  require cyclic",
        ),
        bit("code c over bit = check(| 1 |)\n  is [1, 0, _]"),
        bit("code c over bit = cyclic(length: 7, roots: {})\n  is [7, 7, 1]"),
        bit("code c over bit = cyclic(length: 7, roots: 0..6)\n  is [7, 0, _]"),
        bit("code c over bit = crc(length: 5, generator: x^5 + 1)\n  is [5, 0, _]"),
        bit("code c over bit = crc(length: 5, generator: 1)\n  is [5, 5, 1]"),
        bit("code c over bit = span(identity(5))\n  is [5, 5, 1]"),
        bit("code c over bit = reed_muller(order: 0, variables: 0)\n  is [1, 1, 1]"),
        bit("code c over bit = reed_muller(order: 9, variables: 3)\n  is [8, 8, 1]"),
    ] {
        match apart(text.clone(), LITTLE) {
            Ok((findings, _))
                if findings
                    .iter()
                    .any(|finding| !finding.starts_with("unused")) =>
            {
                wrong.push(format!("{text}{findings:?}"));
            }
            Ok(_) => {}
            Err(why) => wrong.push(format!("{text}{why}")),
        }
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}
