//! The findings that evaluation, construction and judgement raise, as a person reads them: a small
//! spec for each, and its rendered text held by a snapshot.

mod common;

use common::Shelf;
use cosetta::derive::search::Quiet;
use cosetta::finding::render::{self, Style};
use cosetta::project::{self, Options};

/// The findings of a spec, rendered; `budget` in nominal seconds.
fn told(text: &str, budget: f64) -> String {
    let files = [("gauge.coset".to_string(), text.to_string())];
    let options = Options {
        seconds: budget,
        ..Options::default()
    };
    project::run(&files, &Shelf, &options, &Quiet, |view| {
        render::terminal(&view.findings, view.sources, Style::default())
    })
}

/// One after the other, each under its spec's first line.
fn all(specs: &[&str]) -> String {
    specs
        .iter()
        .map(|text| told(text, 1.0))
        .collect::<Vec<String>>()
        .join("\n")
}

#[test]
fn values_that_do_not_fit() {
    insta::assert_snapshot!(all(&[
        "let depth = 3 + true",
        "let depth = 5 mod 0",
        "let depth = 2^-1 + {1, 2}",
        "let depth = min({})",
        "let depth = 2^(2^40)",
        "let depth = { i for i in 1..2^40 }",
        "field bit = GF(2)\ncode word over bit = hamming(r: 3, size: 4)",
        "field bit = GF(2)\ncode word over bit = hamming(-1)",
        "field bit = GF(2)\ncode word over bit = hamming",
        "field bit = GF(2)\ncode word over bit = repetition(3)\n  is [1/2, 1, 3]",
    ]));
}

#[test]
fn fields_that_do_not_fit() {
    insta::assert_snapshot!(all(&[
        "field byte = GF(2^8) where a^7 = a + 1",
        "field byte = GF(2^8)\ncode word over byte = parity(4)",
        "code word = hamming(3)",
        "code word = check(| 1 1 0 |)",
        "field trit = GF(3)\ncode word over trit = check(| 1 2 3 |)",
        "field bit = GF(2)\nfield trit = GF(3)\ncode word over bit = parity(3) then plotkin(parity(3) over trit)",
    ]));
}

#[test]
fn roots_and_points_that_do_not_fit() {
    insta::assert_snapshot!(all(&[
        "field bit = GF(2)\ncode word over bit = cyclic(length: 14, roots: 1..2)",
        "field bit = GF(2)\ncode word over bit = cyclic(length: 7, generator: x^3 + 1)",
        "field bit = GF(2)\ncode word over bit = crc(length: 12, generator: x^8 + x)",
        "field bit = GF(2)\nfield hex = GF(16) where a^4 = a + 1\ncode word over bit = cyclic(length: 7, roots: 1..2, in: hex)",
        "field bit = GF(2)\ncode word over bit = evaluate(monomials in 2 variables where degree <= 1, at: points in 3 variables)",
        "field bit = GF(2)\ncode word over bit = evaluate(monomials in 1 variables where degree <= 1, at: points (x) where x = x + 1)",
        "field bit = GF(2)\ncode word over bit = bch(length: 15, distance: 5)\n  is [15, 7, 5]\ndeliver word to \"out\"\n  check_matrix as txt",
        "field bit = GF(2)\ncode word over bit = check(| 1 1 0 | | 0 1 1 | | 1 0 1 |)\n  is [3, 1, 3]",
    ]));
}

#[test]
fn files_that_do_not_fit() {
    insta::assert_snapshot!(all(&[
        "field bit = GF(2)\ncode word over bit = check(file(\"missing.txt\"))",
        "field bit = GF(2)\ncode word over bit = check(file(\"torn.txt\"))",
        "field bit = GF(2)\ncode word over bit = check(file(\"gauge_word.doc\"))",
        "field bit = GF(2)\ncode word over bit = hamming(3)\n  require same matrix as file(\"gauge_word.txt\")\n  require mds",
    ]));
}

#[test]
fn claims_that_fail() {
    insta::assert_snapshot!(all(&[
        "field bit = GF(2)\ncode word over bit = hamming(3)\n  is [8, 4, 3]",
        "field bit = GF(2)\ncode word over bit = hamming(3)\n  is [7, 5, 3]",
        "field bit = GF(2)\ncode word over bit = hamming(3) then extend then puncture(last: 1)\n  is [7, 4, 4]",
        "field bit = GF(2)\ncode word over bit = hamming(3)\n  is [7, 4, 3] with weights {0: 1, 3: 8, 4: 6, 7: 1}",
    ]));
}

#[test]
fn what_stays_undecided_within_a_small_budget() {
    let spec = "\
field bit = GF(2)
code word over bit
  = quadratic_residue(127)
  is [127, 64, 19]
  require corrects 9
  prefer d >= 19
";
    insta::assert_snapshot!(told(spec, 0.000_001));
}

/// What `cosetta emit` says of a spec, on standard error, and its exit status.
fn emitted(text: &str) -> String {
    let folder = tempfile::tempdir().expect("a folder");
    std::fs::write(folder.path().join("gauge.coset"), text).expect("a file");
    let output = std::process::Command::new(env!("CARGO_BIN_EXE_cosetta"))
        .args(["emit", "gauge.coset"])
        .current_dir(folder.path())
        .output()
        .expect("the program runs");
    assert!(!folder.path().join("out").exists(), "nothing is written");
    let status = output.status.code().expect("a status");
    format!(
        "{}exit status {status}\n",
        String::from_utf8_lossy(&output.stderr)
    )
}

#[test]
fn a_delivery_that_cannot_be_written() {
    let word = "field bit = GF(2)\ncode word over bit = hamming(3)\n  is [7, 4, 3]\n";
    insta::assert_snapshot!(
        [
            emitted(&format!(
                "{word}deliver word to \"out\"\n  check_matrx as txt"
            )),
            emitted(&format!(
                "{word}deliver word to \"out\"\n  check_matrix as docx"
            )),
            emitted(&format!(
                "{word}deliver word to \"out\"\n  generator_matrix in as_built form as csv"
            )),
            emitted(&format!(
                "{word}  require mds\ndeliver word to \"out\"\n  check_matrix as csv"
            )),
        ]
        .join("\n")
    );
}
