//! What is registered is told whole: each entry's example runs and holds what it claims.

mod common;

use cosetta::construct::{CONSTRUCTIONS, functions};
use cosetta::derive::{MEASURES, Verdict, properties};
use cosetta::finding::{Severity, catalogue};
use cosetta::require;
use cosetta::step::STEPS;
use cosetta::value::Parameter;
use std::collections::BTreeSet;

/// What is the same of every entry: kind, name, parameters, the sentence, and the example.
struct Entry {
    kind: &'static str,
    name: &'static str,
    parameters: &'static [Parameter],
    says: &'static str,
    theory: &'static str,
    example: &'static str,
}

macro_rules! entry {
    ($kind:literal, $entry:expr) => {
        Entry {
            kind: $kind,
            name: $entry.name,
            parameters: $entry.parameters,
            says: $entry.says,
            theory: $entry.theory,
            example: $entry.example,
        }
    };
}

fn entries() -> Vec<Entry> {
    let mut entries = Vec::new();
    entries.extend(
        CONSTRUCTIONS
            .iter()
            .map(|entry| entry!("construction", entry)),
    );
    entries.extend(STEPS.iter().map(|entry| entry!("step", entry)));
    entries.extend(functions::all().map(|entry| entry!("function", entry)));
    entries
}

#[test]
fn every_example_runs_and_holds_what_it_claims() {
    let mut wrong = Vec::new();
    for entry in entries() {
        let title = format!("{} `{}`", entry.kind, entry.name);
        if !entry.example.contains(entry.name) {
            wrong.push(format!("{title}: its example does without it"));
        }
        common::with_spec(entry.example, |view| {
            for finding in &view.findings {
                if finding.severity == Severity::Error {
                    wrong.push(format!(
                        "{title}: {}: {}",
                        finding.code.name, finding.message
                    ));
                }
            }
            for checked in &view.codes {
                for clause in &checked.verdicts.clauses {
                    if clause.judgement.verdict != Verdict::Holds {
                        wrong.push(format!("{title}: {} is not shown to hold", clause.text));
                    }
                }
            }
            let claims = view.codes.iter().map(|code| code.verdicts.clauses.len());
            if entry.kind != "function" && claims.sum::<usize>() == 0 {
                wrong.push(format!("{title}: its example claims nothing"));
            }
        });
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

#[test]
fn every_entry_says_what_it_is() {
    for entry in entries() {
        let title = format!("{} `{}`", entry.kind, entry.name);
        assert!(entry.says.ends_with('.'), "{title} says a sentence");
        if entry.kind != "function" {
            assert!(
                !entry.theory.is_empty(),
                "{title} says what is known of the result"
            );
        }
        let names: BTreeSet<&str> = entry.parameters.iter().map(|known| known.name).collect();
        assert_eq!(
            names.len(),
            entry.parameters.len(),
            "{title}: each parameter once"
        );
        for parameter in entry.parameters {
            // The sentence of a function often says all that there is to say of its parameters.
            let told = !parameter.says.is_empty() || entry.kind == "function";
            assert!(
                told && !parameter.takes.is_empty(),
                "{title}: `{}` says what it means",
                parameter.name
            );
        }
    }
}

#[test]
fn no_two_entries_of_a_kind_share_a_name() {
    let mut seen = BTreeSet::new();
    for entry in entries() {
        assert!(
            seen.insert((entry.kind, entry.name)),
            "two {}s `{}`",
            entry.kind,
            entry.name
        );
    }
}

#[test]
fn every_phrase_property_quantity_and_finding_says_what_it_means() {
    let mut names = BTreeSet::new();
    for phrase in require::phrases() {
        assert!(
            phrase.says.ends_with('.'),
            "`{}` says a sentence",
            phrase.pattern
        );
        assert!(
            names.insert(phrase.pattern),
            "`{}` is there once",
            phrase.pattern
        );
    }
    for property in properties::PROPERTIES {
        assert!(
            !property.says.is_empty(),
            "`{}` says what it means",
            property.name
        );
        assert!(
            names.insert(property.name),
            "`{}` is there once",
            property.name
        );
    }
    for &(name, says) in MEASURES {
        assert!(!says.is_empty(), "`{name}` says what it means");
        assert!(names.insert(name), "`{name}` is there once");
    }
    let mut codes = BTreeSet::new();
    for code in catalogue::ALL {
        assert!(code.says.ends_with('.'), "{} says a sentence", code.name);
        assert!(codes.insert(code.name), "{} is there once", code.name);
    }
}
