//! What a reader of a report sees, and what a machine is promised.

mod report_models;

use cosetta::finding::render::{Style, width_of};
use cosetta::report::model::{Interval, Report, rate};
use cosetta::report::{json, text};
use report_models::{link, shards, silent, sram_word};
use serde_json::{Value, json as value};

fn report() -> Report {
    let finding = value!({
        "code": "requirement-fails", "severity": "error", "help": null, "label": "", "related": [],
        "message": "sram_word does not correct adjacent pairs", "file": "gauge/sram.coset",
        "span": {"start": {"line": 9, "column": 3}, "end": {"line": 9, "column": 30}},
    });
    Report::new(
        vec![sram_word(), shards(), link(), silent()],
        value!([finding]),
    )
}

#[test]
fn a_report_is_fit_to_be_quoted() {
    insta::assert_snapshot!(text(
        &report(),
        Style {
            color: false,
            width: 90
        }
    ));
}

#[test]
fn a_narrow_report_stays_within_its_width() {
    let narrow = text(
        &report(),
        Style {
            color: false,
            width: 60,
        },
    );
    let long: Vec<&str> = narrow.lines().filter(|line| width_of(line) > 60).collect();
    assert!(long.is_empty(), "{long:#?}");
}

#[test]
fn colour_is_only_there_when_asked_for() {
    let plain = text(
        &report(),
        Style {
            color: false,
            width: 80,
        },
    );
    let color = text(
        &report(),
        Style {
            color: true,
            width: 80,
        },
    );
    assert!(!plain.contains('\u{1b}') && color.contains("\u{1b}[32m✓ holds"));
}

#[test]
fn text_from_a_spec_cannot_command_the_terminal() {
    let mut code = silent();
    code.name = "sil\u{1b}[2Jent".into();
    code.documentation = Some("a\u{9b}31mb\u{202e}".into());
    let shown = text(&Report::new(vec![code], value!([])), Style::default());
    assert!(!shown.contains(['\u{1b}', '\u{9b}', '\u{202e}']), "{shown}");
}

#[test]
fn counts_that_do_not_add_up_are_told() {
    let mut code = silent();
    code.k = 1;
    let shown = text(&Report::new(vec![code], value!([])), Style::default());
    assert!(
        shown.contains("1 words are counted, but there are 3^1"),
        "{shown}"
    );
}

/// The keys of the contract's example, each with the kind of its value.
#[test]
fn the_json_keeps_the_contract() {
    let report = json(&report());
    assert_eq!(report["format"], "cosetta-report");
    assert_eq!(report["version"], 1);
    let code = &report["codes"][0];
    assert_eq!(code["name"], "sram_word");
    assert_eq!(code["arguments"], value!({}));
    let field = value!({"order": 2, "characteristic": 2, "degree": 1, "modulus": null});
    assert_eq!(code["field"], field);
    assert_eq!((&code["n"], &code["k"]), (&value!(72), &value!(64)));
    assert_eq!(
        (&code["d"]["lower"], &code["d"]["upper"]),
        (&value!(4), &value!(4))
    );
    let ground = &code["d"]["grounds"][0];
    assert_eq!(ground["bound"], "lower");
    assert_eq!(ground["value"], 4);
    assert_eq!(ground["rule"], "extension");
    assert_eq!(ground["step"], 1);
    assert!(ground["says"].is_string());
    let witness = value!({"positions": [0, 1, 2, 3], "values": [1, 1, 1, 1]});
    assert_eq!(code["d"]["witness"], witness);
    assert_eq!(code["weights"]["0"], "1");
    assert!(code["weights"]["4"].is_string());
    assert_eq!(code["covering_radius"], value!({"lower": 2, "upper": 8}));
    assert_eq!(code["bounds"]["singleton"], 9);
    assert_eq!(code["bounds"]["linear_programming"], 4);
    assert_eq!(code["properties"]["mds"]["verdict"], "fails");
    assert!(code["properties"]["mds"]["says"].is_string());
    assert_eq!(
        code["properties"]["self_dual"],
        value!({"verdict": "fails"})
    );
    let step = value!({"text": "hamming(7)", "n": 127, "k": 120, "d": {"lower": 3, "upper": 3}});
    assert_eq!(code["steps"][0], step);
    let requirement = &code["requirements"][0];
    assert_eq!(requirement["text"], "corrects 1 while detecting 2");
    assert_eq!(requirement["kind"], "require");
    assert_eq!(requirement["verdict"], "holds");
    assert_eq!(requirement["witness"], Value::Null);
    assert_eq!(code["requirements"][2]["kind"], "prefer");
    assert_eq!(code["claims"][0]["kind"], "claim");

    let silent = &report["codes"][3];
    assert_eq!(
        silent["d"],
        value!({"lower": null, "upper": null, "grounds": [], "witness": null})
    );
    assert_eq!(silent["dual_weights"], Value::Null);
    assert_eq!(silent["covering_radius"], Value::Null);
    assert_eq!(
        report["codes"][1]["field"]["modulus"],
        "x^8 + x^4 + x^3 + x^2 + 1"
    );
    assert_eq!(
        report["codes"][2]["arguments"],
        value!({"size": 54, "shift": "a^5"})
    );
}

#[test]
fn weights_come_in_numeric_order_as_decimal_strings() {
    let report = json(&report());
    let weights = report["codes"][1]["weights"].as_object().unwrap();
    let keys: Vec<&str> = weights.keys().map(String::as_str).collect();
    assert_eq!(keys[..4], ["0", "5", "6", "7"]);
    assert_eq!(keys.last(), Some(&"14"));
    // C(14, 5) · 255 words of least weight.
    assert_eq!(weights["5"], "510510");
}

#[test]
fn rates_are_in_lowest_terms() {
    assert_eq!(rate(72, 64), "8/9");
    assert_eq!(rate(7, 7), "1");
    assert_eq!(rate(7, 0), "0");
    assert_eq!(rate(0, 0), "0");
}

#[test]
fn intervals_read_as_an_engineer_writes_them() {
    assert_eq!(Interval::exact(4).to_string(), "4");
    assert_eq!(Interval::between(4, 6).to_string(), "4..6");
    assert_eq!(
        Interval {
            lower: Some(3),
            upper: None
        }
        .to_string(),
        "≥ 3"
    );
    assert_eq!(
        Interval {
            lower: None,
            upper: Some(9)
        }
        .to_string(),
        "≤ 9"
    );
    assert_eq!(Interval::default().to_string(), "?");
}
