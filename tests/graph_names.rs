//! Names, imports, circles and remarks: what a person is told, and in which order things are built.

mod syntax_support;

use cosetta::finding::Finding;
use cosetta::graph::{Builtins, Program, build};
use cosetta::source::{LoadError, Loader, Sources};
use insta::assert_snapshot;
use std::collections::BTreeMap;
use syntax_support::list;

/// Files in a table.
struct Table(BTreeMap<&'static str, &'static [u8]>);

impl Loader for Table {
    fn load(&self, _from: &str, path: &str) -> Result<(String, Vec<u8>), LoadError> {
        match self.0.get(path) {
            Some(bytes) => Ok((path.to_string(), bytes.to_vec())),
            None => Err(LoadError(format!("{path}: no such file"))),
        }
    }
}

const LIBRARY: &str = "
code hamming(r in 2..16) over F = check(columns v of height r where v != 0)
code reed_muller(order, variables) over F = evaluate(monomials in variables variables where degree <= order, at: points in variables variables)
code repetition(length) over F = span(ones(1, length))
";

fn builtins() -> Builtins {
    Builtins {
        functions: vec![
            "check", "span", "evaluate", "ones", "zeros", "identity", "cauchy", "powers", "weight",
            "bsc", "file", "cyclic", "size",
        ],
        steps: vec![
            "extend",
            "shorten",
            "puncture",
            "dual",
            "arrange",
            "concatenate",
            "direct_sum",
        ],
        properties: vec![
            "n",
            "k",
            "d",
            "q",
            "mds",
            "row_weight",
            "failure",
            "dual",
            "girth",
        ],
    }
}

fn run(
    text: &'static str,
    others: &[(&'static str, &'static str)],
) -> (Sources, Program, Vec<Finding>) {
    let mut sources = Sources::default();
    let root = sources.add("a.coset", text);
    let library = sources.add_library("library.coset", LIBRARY);
    let mut table: BTreeMap<_, _> = others
        .iter()
        .map(|&(name, text)| (name, text.as_bytes()))
        .collect();
    table.insert("a.coset", text.as_bytes());
    table.insert("bytes.coset", &[0x66, 0xff, 0x66]);
    let (program, findings) = build(
        &mut sources,
        &[root],
        &[library],
        &Table(table),
        &builtins(),
    );
    (sources, program, findings)
}

fn told(text: &'static str, others: &[(&'static str, &'static str)]) -> String {
    let (sources, _, findings) = run(text, others);
    list(&sources, &findings)
}

fn order(text: &'static str) -> String {
    let (_, program, _) = run(text, &[]);
    let names = program.order().into_iter().map(|node| &program.graph[node]);
    let own: Vec<_> = names
        .filter(|node| !node.library)
        .map(|node| node.name.as_str())
        .collect();
    own.join(" ")
}

#[test]
fn a_whole_spec_says_nothing() {
    let text = r#"
field bit = GF(2)
field byte = GF(2^8) where w^8 = w^4 + w^3 + w^2 + 1
let width = 72
channel sea = bsc(0.004)
code memory over bit = hamming(7) then extend then shorten(first: n - width) then arrange(data: first)
  is [width, k, 4]
  require corrects 1 while detecting 2
  require failure(sea) <= 1e-12 and 2*d > n - k
  require mds
  require recovers 2 groups of bits(data)
  prefer row_weight <= 36
  bits data[63..0], check[7..0]
code guarded(r in 4..9) over bit = hamming(r - 1) then extend
code chosen over bit = pick r in 4..9 minimizing n + d from guarded(r) then shorten(first: k - 32) where k > 3
code family(m in 1..3) over F = hamming(m) over F
matrix tall over byte = | w^5 x a |
matrix odd over bit = columns v of height 8 where weight(v) mod 2 = 1 sorted by weight(v), v
code late over byte = evaluate(monomials x^i * y^j where 4*i + 5*j <= 21, at: points (s, t) where t^4 + t = s^5)
code table over bit = check(odd)
code shards over byte = span(blocks | tall identity(10) cauchy(rows: powers(0..9), columns: { i^2 for i in 1..5 where i != 2 }) |)
  require same code as memory then dual
  require dual.d >= 4
deliver memory to "out"
  check_matrix as mtx
"#;
    assert_eq!(told(text, &[]), "");
    assert_eq!(
        order(text),
        "bit byte width sea memory guarded chosen family tall odd late table shards memory"
    );
}

#[test]
fn an_unknown_name_comes_with_its_neighbours() {
    assert_snapshot!(told(
        r"
field bit = GF(2)
let width = 72
code one over bit = haming(3)
code two over bti = hamming(3)
code three over bit = hamming(widht)
code four over bit = hamming(3) then extnd
code five over bit = hamming(3) then frobnicate
code six over bit = quuxify(3)
  require row_wieght <= 3
  require within sevn
code seven over bit = hamming(3) then shorten(first: m)
  require mds and nothing_like_it
code eight over bit = hamming(3) then concatenate(sevenn)
code nine(r in 1..rr) over F = hamming(r)
matrix ten over bit = columns v of height 8 where weight(w) = 1
code eleven over bit = hamming(3) then shorten(first: widht)
",
        &[]
    ));
}

#[test]
fn steps_constructions_and_properties_are_told_apart() {
    assert_snapshot!(told(
        r"
field bit = GF(2)
code one over bit = extend(3)
code two over bit = extend
code three over bit = hamming(3) then hamming(4)
code four over bit = hamming(3) then check
code five over bit = hamming(3) then shorten(first: d - 1)
code six over bit = hamming(n)
",
        &[]
    ));
}

#[test]
fn two_of_one_name_are_told() {
    assert_snapshot!(told(
        r#"
use "b.coset" (shared, apart)
use "c.coset"
field bit = GF(2)
code memory over bit = hamming(shared)
code memory over bit = hamming(both)
code apart(r, r) over bit = hamming(r)
"#,
        &[
            ("b.coset", "let shared = 3\nlet both = 4\nlet apart = 1"),
            ("c.coset", "let shared = 4\nlet both = 5")
        ]
    ));
}

#[test]
fn circles_are_shown_as_the_path_they_run_along() {
    assert_snapshot!(told(
        r"
field bit = GF(2)
code first over bit = second then extend
code second over bit = hamming(width)
let width = rows_of(third)
let rows_of(c) = c
code third over bit = first then dual
code itself over bit = itself then extend
code behind over bit = third then dual
",
        &[]
    ));
}

#[test]
fn what_lies_behind_a_circle_is_left_out_of_the_order() {
    let text = "
field bit = GF(2)
code behind over bit = first then dual
code first over bit = second then extend
code second over bit = first then extend
code fine over bit = hamming(3)
code unknown over bit = nonesuch(3)
code after over bit = unknown then extend
code half over bit = hamming(3)
  require within nonesuch
  require mds
";
    assert_eq!(order(text), "bit fine half");
    let (_, program, _) = run(text, &[]);
    let half = program.lookup(0, "half").unwrap();
    assert!(!program.broken(half));
    assert!(program.broken_clause(half, 0) && !program.broken_clause(half, 1));
    assert!(program.broken(program.lookup(0, "after").unwrap()));
}

#[test]
fn imports_that_cannot_be_had_are_told_once() {
    assert_snapshot!(told(
        r#"
use "missing.coset" (lost)
use "bytes.coset" (torn)
use "b.coset" (widht, nothing)
field bit = GF(2)
code one over bit = hamming(lost + torn + widht + nothing)
"#,
        &[("b.coset", "let width = 3\nfield other = GF(3)")]
    ));
    assert_snapshot!(told(
        "use \"missing.coset\"\nfield bit = GF(2)\ncode one over bit = hamming(anything) then extnd",
        &[]
    ));
}

#[test]
fn files_that_import_each_other_are_shown_as_a_path() {
    assert_snapshot!(told(
        "use \"b.coset\" (width)\nfield bit = GF(2)\ncode one over bit = hamming(width)\nlet back = 3",
        &[
            ("b.coset", "use \"c.coset\" (deep)\nlet width = deep"),
            ("c.coset", "use \"a.coset\" (back)\nlet deep = back")
        ]
    ));
}

#[test]
fn leftovers_and_borrowed_names_are_remarked_on() {
    assert_snapshot!(told(
        r#"
use "b.coset" (width, height)
use "c.coset"
field bit = GF(2)
field spare = GF(3)
let unused = 3
let count(unheard) = 3
matrix idle over bit = identity(3)
channel quiet = bsc(0.1)
code repetition(length) over bit = hamming(width)
code check over bit = hamming(3)
"#,
        &[
            ("b.coset", "let width = 3\nlet height = 4\nlet own = 5"),
            ("c.coset", "let deep = 3")
        ]
    ));
}

#[test]
fn a_file_for_others_has_no_leftovers() {
    assert_eq!(told("field bit = GF(2)\nlet width = 3", &[]), "");
}

#[test]
fn a_broken_declaration_is_told_once_and_its_users_are_spared() {
    assert_snapshot!(told(
        r"
field bit GF(2)
field other = GF(3)
code one over bit = hamming(3)
cod two over bit = hamming(3)
code three over bit = two then extend
",
        &[]
    ));
}

#[test]
fn names_are_looked_up_own_first_then_imports_then_library() {
    let (_, program, _) = run(
        "use \"b.coset\"\ncode hamming(r) over F = check(repetition(r))",
        &[(
            "b.coset",
            "code hamming(r) over F = check(r)\ncode repetition(r) over F = check(r)",
        )],
    );
    let place = |name| {
        let node = program.lookup(0, name).unwrap();
        program.files[program.graph[node].file].name.clone()
    };
    assert_eq!(place("hamming"), "a.coset");
    assert_eq!(place("repetition"), "b.coset");
    assert_eq!(place("reed_muller"), "library.coset");
    assert!(program.lookup(0, "nonesuch").is_none());
}

#[test]
fn long_chains_and_many_declarations_are_walked() {
    let steps = " then extend".repeat(999);
    let sum = vec!["w"; 900].join(" + ");
    let mut text = format!(
        "field bit = GF(2)\nlet w = 1\ncode long over bit = hamming(3){steps}\nlet s = {sum}\n"
    );
    for index in 0..5000 {
        text += &format!("let v{} = v{index} + s\n", index + 1);
    }
    text += "let v0 = 1\ncode c over bit = hamming(v5000)";
    let text: &'static str = text.leak();
    assert_eq!(told(text, &[]), "");
    assert!(order(text).ends_with("v5000 c"));
}

#[test]
fn a_code_may_be_called_like_the_word_its_steps_take() {
    let text = "field bit = GF(2)\ncode first over bit = hamming(3) then arrange(data: first)";
    assert_eq!(told(text, &[]), "");
    assert_eq!(order(text), "bit first");
}
