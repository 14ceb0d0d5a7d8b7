//! The examples that come with the language, and what the README shows of them: the tide gauges
//! hold, the broken specs are refused for the one mistake each has, and no page shows anything
//! that the compiler does not say.

use cosetta::derive::Verdict;
use cosetta::derive::search::Quiet;
use cosetta::finding::{Class, render};
use cosetta::project::{self, Options, View};
use cosetta::report::describe::describe;
use cosetta::report::model::Report;
use cosetta::source::{LoadError, Loader};
use std::path::{Path, PathBuf};

/// Reads what a spec names, beside the spec.
struct Beside;

impl Loader for Beside {
    fn load(&self, from: &str, path: &str) -> Result<(String, Vec<u8>), LoadError> {
        let wanted = Path::new(from).parent().unwrap_or(Path::new("")).join(path);
        let shown = wanted.to_string_lossy().replace('\\', "/");
        let bytes = std::fs::read(root().join(&wanted))
            .map_err(|error| LoadError(format!("{shown}: {error}")))?;
        Ok((shown, bytes))
    }
}

fn root() -> PathBuf {
    PathBuf::from(env!("CARGO_MANIFEST_DIR"))
}

fn read(path: &str) -> String {
    std::fs::read_to_string(root().join(path)).unwrap_or_else(|error| panic!("{path}: {error}"))
}

/// The specs of a folder, as shown names and texts, in order.
fn specs(folder: &str) -> Vec<(String, String)> {
    let mut names: Vec<String> = std::fs::read_dir(root().join(folder))
        .unwrap_or_else(|error| panic!("{folder}: {error}"))
        .map(|entry| entry.expect("a readable folder").file_name())
        .map(|name| name.to_string_lossy().into_owned())
        .filter(|name| name.ends_with(".coset"))
        .map(|name| format!("{folder}/{name}"))
        .collect();
    names.sort();
    names
        .into_iter()
        .map(|name| (name.clone(), read(&name)))
        .collect()
}

fn run<T>(files: &[(String, String)], look: impl FnOnce(View) -> T) -> T {
    project::run(files, &Beside, &Options::default(), &Quiet, look)
}

fn rendered(view: &View) -> String {
    render::terminal(&view.findings, view.sources, render::Style::default())
}

#[test]
fn the_tide_gauges_hold_without_a_remark() {
    let files = specs("examples/tide-gauge");
    assert_eq!(files.len(), 4, "{files:?}");
    run(&files, |view| {
        assert!(view.findings.is_empty(), "{}", rendered(&view));
        for checked in &view.codes {
            let clauses = &checked.verdicts.clauses;
            assert!(
                !clauses.is_empty(),
                "{} claims nothing",
                checked.compiled.title()
            );
            for clause in clauses {
                assert_eq!(
                    clause.judgement.verdict,
                    Verdict::Holds,
                    "{}: {}",
                    checked.compiled.title(),
                    clause.text
                );
            }
        }
        let lines: Vec<String> = view
            .codes
            .iter()
            .map(|checked| {
                let clauses = &checked.verdicts.clauses;
                let texts: Vec<&str> = clauses.iter().map(|clause| clause.text.as_str()).collect();
                format!("{}: {}", checked.compiled.title(), texts.join("; "))
            })
            .collect();
        insta::assert_snapshot!("the_tide_gauges", lines.join("\n"));
    });
}

#[test]
fn each_tide_gauge_spec_stands_alone() {
    for file in specs("examples/tide-gauge") {
        run(std::slice::from_ref(&file), |view| {
            assert!(view.findings.is_empty(), "{}", rendered(&view));
        });
    }
}

/// What each broken spec is refused for, and with which exit status.
const MISTAKES: &[(&str, Class, &[&str])] = &[
    (
        "correct_and_detect",
        Class::Refuted,
        &["not-at-once", "requirement-fails"],
    ),
    ("crc_too_long", Class::Refuted, &["requirement-fails"]),
    ("cycle", Class::Malformed, &["cycle"]),
    (
        "dependent_checks",
        Class::Refuted,
        &["claim-dimension", "requirement-fails"],
    ),
    ("designed_distance", Class::Refuted, &["claim-distance"]),
    ("dimension_by_rule", Class::Refuted, &["claim-dimension"]),
    (
        "element_out_of_range",
        Class::Malformed,
        &["not-an-element"],
    ),
    ("equal_columns", Class::Refuted, &["claim-distance"]),
    (
        "imprimitive_modulus",
        Class::Malformed,
        &["modulus-not-primitive"],
    ),
    ("inner_width", Class::Malformed, &["symbol-width"]),
    ("lost_parity", Class::Refuted, &["requirement-fails"]),
    ("mixed_fields", Class::Malformed, &["field-mismatch"]),
    ("no_member", Class::Malformed, &["empty-choice"]),
    ("no_such_field", Class::Malformed, &["bad-field-order"]),
    (
        "reducible_modulus",
        Class::Malformed,
        &["reducible-modulus"],
    ),
    ("syntax_error", Class::Malformed, &["syntax"]),
    ("unbalanced_bits", Class::Malformed, &["bad-bits"]),
    (
        "unknown_name",
        Class::Malformed,
        &["unknown-name", "unknown-name"],
    ),
    (
        "unknown_requirement",
        Class::Malformed,
        &["unknown-requirement"],
    ),
    ("unstated_positions", Class::Malformed, &["bad-positions"]),
    (
        "vandermonde_shards",
        Class::Refuted,
        &["requirement-fails", "requirement-fails"],
    ),
    ("wrong_end", Class::Refuted, &["requirement-fails"]),
];

#[test]
fn each_broken_spec_is_refused_for_its_own_mistake() {
    let files = specs("examples/broken");
    let present: Vec<&str> = files.iter().map(|(name, _)| stem(name)).collect();
    let listed: Vec<&str> = MISTAKES.iter().map(|&(name, ..)| name).collect();
    assert_eq!(present, listed, "the folder and the list differ");
    for (file, (name, class, codes)) in files.iter().zip(MISTAKES) {
        run(std::slice::from_ref(file), |view| {
            let shown = render::ordered(&view.findings);
            let found: Vec<&str> = shown.iter().map(|finding| finding.code.name).collect();
            assert_eq!(found, *codes, "{name}:\n{}", rendered(&view));
            assert_eq!(project::class(&view.findings), *class, "{name}");
            insta::assert_snapshot!(format!("broken_{name}"), rendered(&view));
        });
    }
}

fn stem(name: &str) -> &str {
    name.rsplit('/')
        .next()
        .and_then(|name| name.strip_suffix(".coset"))
        .unwrap_or(name)
}

/// The blocks of a page fenced with this word, each with the number of its first line.
fn blocks(page: &str, fence: &str) -> Vec<(usize, String)> {
    let mut found = Vec::new();
    let mut open: Option<(bool, usize, Vec<&str>)> = None;
    for (at, line) in page.lines().enumerate() {
        match (&mut open, line.strip_prefix("```")) {
            (None, Some(words)) => open = Some((words.trim() == fence, at + 2, Vec::new())),
            (Some(_), Some(_)) => {
                let (wanted, first, lines) = open.take().expect("an open block");
                if wanted {
                    found.push((first, format!("{}\n", lines.join("\n"))));
                }
            }
            (Some((_, _, lines)), None) => lines.push(line),
            (None, None) => {}
        }
    }
    assert!(open.is_none(), "a block is never closed");
    found
}

#[test]
fn specs_shown_in_the_readme_hold() {
    let page = read("README.md");
    let shown = blocks(&page, "coset run");
    assert!(shown.len() >= 8, "the tour is gone: {} specs", shown.len());
    for (line, text) in shown {
        let file = (format!("README.md, line {line}"), text);
        run(std::slice::from_ref(&file), |view| {
            assert!(view.findings.is_empty(), "{}", rendered(&view));
            assert!(!view.codes.is_empty(), "line {line} declares no code");
        });
    }
}

/// ```` ```text broken/NAME ```` shows the findings of `examples/broken/NAME.coset`, all of them or
/// the last.
#[test]
fn diagnostics_shown_in_the_readme_are_real() {
    let page = read("README.md");
    let mut count = 0;
    for (name, ..) in MISTAKES {
        for (line, text) in blocks(&page, &format!("text broken/{name}")) {
            count += 1;
            let path = format!("examples/broken/{name}.coset");
            let file = (path.clone(), read(&path));
            let real = run(std::slice::from_ref(&file), |view| rendered(&view));
            assert!(
                real.contains(text.trim_end()),
                "line {line} shows\n{text}\nbut {path} gives\n{real}"
            );
        }
    }
    assert!(count >= 3, "only {count} diagnostics are shown");
}

/// ```` ```text report NAME ```` shows lines of the report on a code of the tide gauges.
#[test]
fn the_report_shown_in_the_readme_is_real() {
    let page = read("README.md");
    let name = "sram_word";
    let shown = blocks(&page, &format!("text report {name}"));
    assert_eq!(shown.len(), 1);
    let path = "examples/tide-gauge/memory_word.coset";
    let file = (path.to_string(), read(path));
    let real = run(std::slice::from_ref(&file), |view| report(&view, name));
    for line in shown[0].1.lines().filter(|line| line.trim() != "…") {
        assert!(
            real.lines()
                .any(|known| known.trim_end() == line.trim_end()),
            "the report has no line\n{line}\nit reads\n{real}"
        );
    }
}

fn report(view: &View, name: &str) -> String {
    let codes = view
        .codes
        .iter()
        .filter(|checked| checked.compiled.name == name)
        .map(|checked| describe(view, checked))
        .collect();
    let report = Report::new(codes, serde_json::Value::Array(Vec::new()));
    cosetta::report::text(&report, render::Style::default())
}
