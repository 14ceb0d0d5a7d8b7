//! Whatever the text, reading it ends soon, never panics, and every span lies in the text.

mod syntax_support;

use cosetta::source::{Sources, Span};
use cosetta::syntax::parse;
use proptest::prelude::*;
use std::time::{Duration, Instant};

const SEED: &str = include_str!("specs/syntax_every_form.coset");

/// Reads `text` and holds what must always hold.
fn hold(text: &str) {
    let began = Instant::now();
    let mut sources = Sources::default();
    let id = sources.add("a.coset", text);
    let parsed = parse(id, text);
    assert!(began.elapsed() < Duration::from_secs(20), "{text:?}");
    let inside = |span: Span| text.get(span.start as usize..span.end as usize).is_some();
    for finding in &parsed.findings {
        assert!(inside(finding.span), "{finding:?}");
        assert!(!finding.message.is_empty());
        assert!(finding.related.iter().all(|related| inside(related.span)));
    }
    for declaration in &parsed.file.declarations {
        assert!(inside(declaration.span));
    }
    let blank = text
        .lines()
        .map(|line| line.trim_matches([' ', '\t', '\r', '\u{FEFF}']))
        .all(|line| line.is_empty() || line.starts_with('#'));
    assert!(
        blank || !parsed.findings.is_empty() || !parsed.file.declarations.is_empty(),
        "{text:?}"
    );
}

#[test]
fn deep_nesting_is_a_finding() {
    let nests = [
        ("(", "1", ")"),
        ("{", "1", "}"),
        ("[", "1", "]"),
        ("f(", "1", ")"),
        ("f(a: ", "1", ")"),
        ("GF(", "2", ")"),
        ("GF(2) where (", "a", ")"),
        ("{x for x in GF(", "2", ")}"),
        ("{x for x in {", "2", "}}"),
        ("pick r in ", "1", ""),
        ("pick r in 1..2 minimizing ", "n", ""),
        ("pick r in 1..2 minimizing n from ", "n", ""),
        ("monomials in ", "2", ""),
        ("monomials in ", "2", " variables"),
        ("points in ", "2", ""),
        ("columns v of height ", "2", ""),
        ("circulants of size ", "2", ""),
        ("| (", "1", ") |"),
        ("blocks | (", "1", ") |"),
        ("- ", "1", ""),
        ("not ", "true", ""),
        ("1 if true else ", "1", ""),
        ("2^", "2", ""),
        ("2 ^ -", "2", ""),
        ("v[", "2", "]"),
    ];
    for depth in [10, 63, 64, 65, 900, 20_000] {
        for (open, middle, close) in nests {
            let full = format!(
                "let x = {}{middle}{}",
                open.repeat(depth),
                close.repeat(depth)
            );
            hold(&full);
            hold(&format!("let x = {}", open.repeat(depth)));
            hold(&format!("let x = {}{middle}", open.repeat(depth)));
            hold(&format!("let x = {}", close.repeat(depth)));
            hold(&format!(
                "code c = f\n require {}{middle}{}",
                open.repeat(depth),
                close.repeat(depth)
            ));
        }
    }
}

#[test]
fn long_chains_are_findings() {
    for (first, link) in [
        ("1", " + 1"),
        ("1", " ^ 1"),
        ("1", " = 1"),
        ("1", "[1]"),
        ("a", ".b"),
        ("a", " then b"),
        ("a", " over b"),
        ("a", " if b else c"),
    ] {
        for count in [900, 1100, 50_000] {
            let text = format!("let x = {first}{}", link.repeat(count));
            hold(&text);
            if count > 1000 {
                assert!(!syntax_support::read(&text).findings.is_empty(), "{link}");
            }
        }
    }
}

#[test]
fn a_long_plain_polynomial_is_read() {
    let terms: Vec<String> = (0..900).map(|power| format!("x^{power}")).collect();
    assert_eq!(
        syntax_support::findings(&format!("let g = {}", terms.join(" + "))),
        ""
    );
}

#[test]
fn a_large_matrix_is_read() {
    let row = format!("| {}|\n", "1 0 ".repeat(128));
    let text = format!("matrix m =\n{}", row.repeat(256));
    assert_eq!(syntax_support::findings(&text), "");
    hold(&text);
}

#[test]
fn numbers_without_measure_are_findings() {
    for text in [
        "let x = 1e999999999999999999999".to_string(),
        "let x = 1e-99999999".to_string(),
        format!("let x = {}", "9".repeat(100_000)),
        format!("let x = 0x{}", "f".repeat(100_000)),
        format!("let x = 0.{}", "9".repeat(100_000)),
    ] {
        assert!(
            syntax_support::findings(&text).starts_with("limit "),
            "{:.60}",
            text
        );
    }
}

/// Words and marks that mutations put in.
const SCRAPS: &[&str] = &[
    "(",
    ")",
    "[",
    "]",
    "{",
    "}",
    "|",
    "\"",
    "#",
    "##",
    "\n",
    " ",
    "code",
    "let",
    "then",
    "is",
    "require",
    "where",
    "in",
    "..",
    "=",
    "==",
    "-",
    "^",
    "é",
    "“",
    "\u{1F980}",
    "\0",
    "\r\n",
    "\t",
    ",",
    ":",
    "GF(",
    "pick",
    "points",
    "monomials",
    "if",
    "else",
    "_",
    "0x",
    "1e5",
    "a.b",
    "bits",
    "over",
    "\\",
    "\u{FEFF}",
];

proptest! {
    #![proptest_config(ProptestConfig { cases: 300, failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn any_text_is_survived(text in "\\PC{0,200}") {
        hold(&text);
    }

    #[test]
    fn any_bytes_are_survived(bytes in prop::collection::vec(any::<u8>(), 0..300)) {
        hold(&String::from_utf8_lossy(&bytes));
    }

    #[test]
    fn scraps_of_the_language_are_survived(scraps in prop::collection::vec(prop::sample::select(SCRAPS), 0..80)) {
        hold(&scraps.concat());
        hold(&scraps.join(" "));
    }

    #[test]
    fn mutations_of_a_good_file_are_survived(
        changes in prop::collection::vec((any::<prop::sample::Index>(), 0usize..6, prop::sample::select(SCRAPS)), 1..6),
    ) {
        let mut text: Vec<char> = SEED.chars().collect();
        for (place, remove, scrap) in changes {
            let at = place.index(text.len());
            let end = (at + remove).min(text.len());
            text.splice(at..end, scrap.chars());
        }
        hold(&text.into_iter().collect::<String>());
    }
}
