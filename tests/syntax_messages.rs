//! What a person reads for each mistake: the place, what is wrong, what to write.

mod syntax_support;

use cosetta::syntax::tree::DeclarationKind;
use insta::assert_snapshot;
use std::fmt::Write;
use syntax_support::{findings, read};

/// Each text followed by its findings.
fn told(texts: &[&str]) -> String {
    let mut out = String::new();
    for text in texts {
        let _ = writeln!(out, "{text}\n{}", findings(text).replace("a.coset:", ""));
    }
    out
}

#[test]
fn declarations() {
    assert_snapshot!(told(&[
        "cod memory over bit = hamming(3)",
        "feild bit = GF(2)",
        "Matrix m = identity(3)",
        "ues \"shore.coset\"",
        "this is prose",
        "42",
        "field bit GF(2)",
        "field = GF(2)",
        "let width",
        "let width =",
        "let 3 = 4",
        "let f(x = ) = 3",
        "let f(3) = 3",
        "let f(x y) = 3",
        "use memory",
        "use \"x\" (a b)",
        "use \"x\" (",
        "channel sea bsc(0.004)",
        "code c bit = hamming(3)",
        "code c bit over = hamming(3)",
        "code c over = hamming(3)",
        "code c over bit hamming(3)",
        "code c over bit",
        "code c over bit =",
        "code c(r in ) over bit = hamming(r)",
        "code c(r in 3..) over bit = hamming(r)",
    ]));
}

#[test]
fn steps_and_clauses() {
    assert_snapshot!(told(&[
        "code c over bit = hamming(3)\n  extend",
        "code c over bit = hamming(3) extend is [8, 4, 4]",
        "code c over bit = hamming(3) then",
        "code c over bit = hamming(3) then 3",
        "code c over bit = hamming(3) then is [8, 4, 4]",
        "code c over bit = hamming(3)\n  is 8, 4, 4",
        "code c over bit = hamming(3)\n  is [7]",
        "code c over bit = hamming(3)\n  is [7, 4, 3, 2]",
        "code c over bit = hamming(3)\n  is [7, 4, 3",
        "code c over bit = hamming(3)\n  is [7, , 3]",
        "code c over bit = hamming(3)\n  is [7, = 4, 3]",
        "code c over bit = hamming(3)\n  is [7, 4, 3] with {0: 1}",
        "code c over bit = hamming(3)\n  is [7, 4, 3] with weights {0 1}",
        "code c over bit = hamming(3)\n  require",
        "code c over bit = hamming(3)\n  require corects 1",
        "code c over bit = hamming(3)\n  require corrects 1 whlie detecting 2",
        "code c over bit = hamming(3)\n  require corrects adjcent 2",
        "code c over bit = hamming(3)\n  require recovers 4 5",
        "code c over bit = hamming(3)\n  require d => 3",
        "code c over bit = hamming(3)\n  require d == 3",
        "code c over bit = hamming(3)\n  require 1 <= d <= 3",
        "code c over bit = hamming(3)\n  require failure(sea) <= 0,5",
        "code c over bit = hamming(3)\n  prefer row_weight is 3",
        "code c over bit = hamming(3)\n  bits 3..0",
        "code c over bit = hamming(3)\n  bits data[3..0",
        "code c over bit = hamming(3)\n  note unquoted",
    ]));
}

#[test]
fn deliveries() {
    assert_snapshot!(told(&[
        "deliver c \"out\"\n  check_matrix as mtx",
        "deliver c to out\n  check_matrix as mtx",
        "deliver c to \"out\"",
        "deliver c to \"out\"\n  check_matrix mtx",
        "deliver c to \"out\"\n  check_matrix as",
        "deliver c to \"out\"\n  check_matrix in systematic as mtx",
    ]));
}

#[test]
fn values() {
    assert_snapshot!(told(&[
        "let p == 3",
        "let p := 3",
        "let p = 2x + 1",
        "let p = 007",
        "let p = 0xzz",
        "let p = 0b12",
        "let p = bsc(0,004)",
        "let p = 1 < 2 < 3",
        "let p = 1..2..3",
        "let p = f(a b)",
        "let p = f(a",
        "let p = (1 + 2]",
        "let p = {1, 2",
        "let p = 1 + 2)",
        "let p = 1 if x",
        "let p = not",
        "let p = 3 +",
        "let p = {x^2 for x in}",
        "let p = {x^2 for in S}",
        "let p = \"abc",
        "let p = \"a\\qb\"",
        "let p = 'abc'",
        "let p = 2 ** 3",
        "let p = 7 % 3",
        "let p = a && b",
        "let p = 3;",
        "let p = v[1",
        "let p = 1 2",
    ]));
}

#[test]
fn forms() {
    assert_snapshot!(told(&[
        "matrix m over bit = | 1 0 1\n                    | 0 1 1 |",
        "matrix m over bit = | 1 0 1 |\n                    | 0 1 1",
        "matrix m over bit = | 1 a+1 0 |",
        "matrix m over bit = | 1, 0, 0 |",
        "matrix m over bit = | 1 a ^ 2 |",
        "matrix m over bit = | |",
        "matrix m = blocks identity(3)",
        "matrix m = circulants of 3 | 0 |",
        "matrix m = circulants of size 3 | 0 + 1 |",
        "matrix m = columns v of 8",
        "matrix m = columns v of height 8 sorted v",
        "code c over bit = pick r in 4..9 from hamming(r)",
        "code c over bit = pick r minimizing n from hamming(r)",
        "code c over bit = pick r in 4..9 minimizing n",
        "code c = evaluate(monomials in m, at: points in m)",
        "code c = evaluate(monomials x^2, at: points (x, ) where x = 1)",
        "field f = GF(16 where a^4 = a + 1",
        "field f = GF(16) where a^4 + a + 1",
        "field f = GF(16) where a^4 = b + 1",
        "field f = GF(16) where 1 = 2",
    ]));
}

#[test]
fn reserved_words_are_no_names() {
    assert_snapshot!(told(&[
        "code note over bit = hamming(3)",
        "let code = 5",
        "code over bit = hamming(3)",
        "let f(is) = 3",
        "let f = { where for to in S }",
        "let f = { x for to in S }",
        "code c = hamming(3)\n  bits data[3..0], over[2..0]",
    ]));
}

#[test]
fn foreign_marks_and_characters() {
    assert_snapshot!(told(&[
        "! a comment\nlet p = 1",
        "// a comment\nlet p = 1",
        "let p = 1\n// a comment",
        "let p = 2 × 3",
        "let p = 2 – 3",
        "let p = “abc”",
        "let p = x²",
        "let p = a ≤ b",
        "let p = 1\u{a0}+ 2",
        "let größe = 3",
        "let p = 🦀",
        "let p = \u{0}",
        "let p = (1 + 2",
    ]));
}

#[test]
fn deep_and_long_texts() {
    assert_snapshot!(told(&[&format!(
        "let p = {}1{}",
        "(".repeat(65),
        ")".repeat(65)
    )]));
    assert_eq!(
        findings(&format!("let p = {}1{}", "(".repeat(64), ")".repeat(64))),
        ""
    );
    assert!(findings(&format!("let p = 1{}", " + 1".repeat(1001))).starts_with("limit "));
}

const TWENTY: &str = include_str!("specs/syntax_twenty_mistakes.coset");

#[test]
fn twenty_mistakes_are_found_in_one_run() {
    let parsed = read(TWENTY);
    assert_snapshot!(findings(TWENTY));
    assert_eq!(parsed.findings.len(), 20);
    let codes = parsed
        .file
        .declarations
        .iter()
        .filter_map(|declaration| match &declaration.kind {
            DeclarationKind::Code(code) => Some((code.name.text.as_str(), code.clauses.len())),
            _ => None,
        });
    assert_eq!(
        codes.collect::<Vec<_>>(),
        [("good", 1), ("half", 2), ("last", 1)]
    );
}

#[test]
fn a_broken_clause_leaves_the_others() {
    let text = "code c over bit = hamming(3)\n  is [7, 4, 3]\n  require d => 3\n  require mds prefer\n  prefer d >= 2\n  note \"x\"";
    let parsed = read(text);
    assert_eq!(parsed.findings.len(), 2);
    let [declaration] = &parsed.file.declarations[..] else {
        panic!("one declaration")
    };
    let DeclarationKind::Code(code) = &declaration.kind else {
        panic!("a code")
    };
    assert_eq!(code.clauses.len(), 3);
    assert_eq!(declaration.span.end as usize, text.len());
}

#[test]
fn declarations_may_share_a_line_and_phrases_keep_their_words() {
    let text = "field bit = GF(2) code c over bit = hamming(3) require same code as d code d over bit = c require same matrix as file(\"h.mtx\") use \"x\"";
    assert_eq!(findings(text), "");
    assert_eq!(read(text).file.declarations.len(), 4);
    let text = "code c over bit = f(3,\n  field: bit,\n  code: 3)\n  require same\n  code as d";
    assert_eq!(findings(text), "");
    assert_eq!(read(text).file.declarations.len(), 1);
}

#[test]
fn clause_words_inside_brackets_begin_no_clause() {
    let text = "code c over bit = f(3,\n  bits: 3,\n  note: \"x\")\n  require recovers 2 groups of\n    bits(data)\n  require (d\n    >= 3)";
    assert_eq!(findings(text), "");
    let text = "code c over bit = f(3)\n  require (d >= 3\n  require mds)\n  require d >= (3 + \n  note \"x\" code e over bit = f";
    let parsed = read(text);
    assert_eq!(
        (parsed.findings.len(), parsed.file.declarations.len()),
        (3, 2)
    );
}

#[test]
fn documentation_belongs_to_what_follows_it_directly() {
    let text = "## About the file.\n\n## One.\n## Two.\n# not part of it\nlet a1 = 1 ## no documentation\nlet a2 = 2\n##Tight.\nlet a3 = 3\n## Lost.\n\nlet a4 = 4";
    let parsed = read(text);
    let documentation: Vec<_> = parsed
        .file
        .declarations
        .iter()
        .map(|declaration| declaration.documentation.as_deref())
        .collect();
    assert_eq!(
        documentation,
        [Some("One.\nTwo."), None, Some("Tight."), None]
    );
}

#[test]
fn windows_line_ends_and_a_byte_order_mark_are_fine() {
    assert_eq!(
        findings("\u{feff}## Doc.\r\nfield bit = GF(2)\r\n\r\n# c\r\nlet x1 = 1\r\n"),
        ""
    );
    let parsed = read("\u{feff}## Doc.\r\nfield bit = GF(2)\r\n");
    assert_eq!(
        parsed.file.declarations[0].documentation.as_deref(),
        Some("Doc.")
    );
}

#[test]
fn spans_leave_out_blanks_and_comments() {
    let text = "let p = (a + b) * c # one\n  # two\nlet q = f # three\n  let r = [1,\n 2 ] ";
    let parsed = read(text);
    let spans = parsed.file.declarations.iter().map(|declaration| {
        let DeclarationKind::Let(it) = &declaration.kind else {
            panic!("a value")
        };
        let of = |span: cosetta::source::Span| &text[span.start as usize..span.end as usize];
        (of(declaration.span), of(it.value.span))
    });
    assert_eq!(
        spans.collect::<Vec<_>>(),
        [
            ("let p = (a + b) * c", "(a + b) * c"),
            ("let q = f", "f"),
            ("let r = [1,\n 2 ]", "[1,\n 2 ]"),
        ]
    );
}
