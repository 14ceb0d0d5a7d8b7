//! What a person reads when a spec is understood but wrong: one small spec for each kind.

mod common;

use cosetta::derive::search::Quiet;
use cosetta::finding::render::{self, Style};
use cosetta::project::{self, Options};
use cosetta::source::NoFiles;
use insta::assert_snapshot;
use std::collections::BTreeSet;
use std::fmt::Write;

const FIELDS: &str = "field bit = GF(2)\nfield octal = GF(8) where a^3 = a + 1\n";

/// Each text, its first lines left out, followed by what is shown of it.
fn told(texts: &[&str]) -> String {
    let mut out = String::new();
    for text in texts {
        let files = [("gauge.coset".to_string(), format!("{FIELDS}{text}\n"))];
        let options = Options {
            seconds: 0.000_001,
            ..Options::default()
        };
        let shown = project::run(&files, &NoFiles, &options, &Quiet, |view| {
            let remark =
                |finding: &&cosetta::finding::Finding| finding.code.name != "unused-declaration";
            let findings: Vec<_> = view.findings.iter().filter(remark).cloned().collect();
            render::terminal(&findings, view.sources, Style::default())
        });
        let _ = writeln!(out, "{text}\n\n{shown}");
    }
    out
}

#[test]
fn values_and_arguments() {
    assert_snapshot!(told(&[
        "let width = 1 + true",
        "let width = 8 / 0",
        "let width = 2^(2^40)",
        "code c over bit = hamming",
        "code c over bit = hamming(0)",
        "code c over bit = hamming(\"three\")",
        "code c over bit = hamming(3) then shorten(front: 1)",
        "code c over bit = hamming(3) then extend(1)",
        "code c over bit = cyclic(length: 7)",
        "code c over bit = pick r in 2..4 minimizing n from hamming(r) where k > 100",
        "code c over bit = check(matrix_file(\"absent.mtx\"))",
        "code c over bit = hamming(3) then frobnicate",
    ]));
}

#[test]
fn fields_and_their_elements() {
    assert_snapshot!(told(&[
        "field f = GF(6)",
        "field f = GF(8) where a^3 = a^2 + a + 1",
        "field f = GF(16) where a^4 = a^3 + a^2 + a + 1",
        "field f = GF(16) where a^3 = a + 1",
        "code c over bit = span(| 1 0 2 |)",
        "code c over bit = hamming(3) then plotkin(repetition(7) over octal)",
        "code c = hamming(3)",
        "code c over octal = hamming(2) then subfield(GF(3))",
    ]));
}

#[test]
fn constructions_and_steps() {
    assert_snapshot!(told(&[
        "code c over bit = span(| 1 0 1 |\n  | 1 0 |)",
        "code c over bit = hamming(3) then plotkin(parity(4))",
        "code c over bit = hamming(3) then expurgate(with: [1, 1])",
        "code c over bit = hamming(3) then shorten(at: {7})",
        "code c over bit = hamming(3) then puncture(first: 7)",
        "code c over bit = hamming(3) then shorten",
        "code c over bit = hamming(3) then permute([0, 0, 1, 2, 3, 4, 5])",
        "code c over bit = cyclic(length: 6, roots: 1..2)",
        "code c over bit = cyclic(length: 7, generator: x^2 + 1)",
        "code c over bit = crc(length: 8, generator: x^3 + x)",
        "code c over octal = evaluate(monomials in 1 variables where degree <= 1, at: points (x) where x != x)",
        "code c over octal = evaluate(monomials in 1 variables where degree <= 1, at: points in 2 variables)",
        "code c = hamming(2) over octal then concatenate(hamming(3) over bit)",
        "code c over bit = hamming(3)\n  bits data[2..0], check[7..0]",
    ]));
}

#[test]
fn claims_and_requirements() {
    assert_snapshot!(told(&[
        "code c over bit = hamming(3)\n  is [8, 4, 3]",
        "code c over bit = hamming(3)\n  is [7, 3, 3]",
        "code c over bit = hamming(3) then extend then puncture(last: 1)\n  is [7, 4, 4]",
        "code c over bit = check(identity(3))\n  is [3, 0, 1]",
        "code c over bit = hamming(3)\n  is [7, 4, 3] with weights {0: 1, 3: 7, 4: 7, 7: 2}",
        "code c over bit = bch(length: 255, distance: 41)\n  is [_, _, 41]",
        "code c over bit = bch(length: 255, distance: 41)\n  is [_, _, 61]",
        "code c over bit = hamming(3)\n  require corrects 2",
        "code c over bit = hamming(3)\n  require corrects 1 while detecting 2",
        "code c over bit = hamming(3)\n  require self_dual",
        "code c over bit = hamming(3)\n  prefer row_weight <= 3",
        "code c over bit = bch(length: 255, distance: 41)\n  require corrects 30",
        "code c over bit = bch(length: 255, distance: 41)\n  prefer corrects 30",
        "code c over bit = hamming(3)\n  require corects 1",
        "code c over bit = hamming(3)\n  require no cycles",
    ]));
}

/// Twenty mistakes, none of which hides another or is caused by one.
const TWENTY: &str = "\
field f6 = GF(6)
field f8 = GF(8) where a^3 = a^2 + a + 1
field f16 = GF(16) where a^3 = a + 1
let width = 8 / 0
let depth = 1 + true
let height = unheard_of
code c1 over bit = hamming(0)
code c2 over bit = hamming(3) then shorten(at: {7})
code c3 over bit = hamming(3) then permute([0, 0, 1, 2, 3, 4, 5])
code c4 over bit = cyclic(length: 6, roots: 1..2)
code c5 over bit = crc(length: 8, generator: x^3 + x)
code c6 over bit = hamming(3) then plotkin(parity(4))
code c7 over bit = hamming(3) then frobnicate
code c8 over bit = span(| 1 0 2 |)
code c9 over bit = hamming(3)
  is [8, 4, 3]
code c10 over bit = hamming(3)
  is [7, 3, 3]
code c11 over bit = hamming(3)
  is [7, 4, 4]
code c12 over bit = hamming(3)
  require corrects 2
  require corects 1
  bits data[2..0], check[7..0]
";

#[test]
fn twenty_mistakes_are_all_told_in_one_run() {
    let findings = common::findings(&format!("field bit = GF(2)\n{TWENTY}"));
    let told: Vec<String> = findings
        .iter()
        .filter(|finding| finding.code.name != "unused-declaration")
        .map(|finding| format!("{}: {}", finding.code.name, finding.message))
        .collect();
    let places: BTreeSet<_> = findings
        .iter()
        .filter(|finding| finding.code.name != "unused-declaration")
        .map(|finding| finding.span)
        .collect();
    assert_eq!((told.len(), places.len()), (20, 20), "{}", told.join("\n"));
}

#[test]
fn an_artefact_that_is_none_is_told_with_those_that_are() {
    let folder = tempfile::tempdir().expect("a folder");
    let path = folder.path().join("gauge.coset");
    let text = format!("{FIELDS}code gauge_word over bit = hamming(3)\n");
    std::fs::write(&path, text).expect("a file");
    let run = std::process::Command::new(env!("CARGO_BIN_EXE_cosetta"))
        .arg("emit")
        .arg(&path)
        .args(["gauge_word", "chek_matrix", "--as", "mtx"])
        .output()
        .expect("the compiler runs");
    let told =
        String::from_utf8_lossy(&run.stderr).into_owned() + &String::from_utf8_lossy(&run.stdout);
    assert_eq!(run.status.code(), Some(2), "{told}");
    assert!(told.contains("unknown-artefact"), "{told}");
    assert!(told.contains("check_matrix"), "{told}");
}
