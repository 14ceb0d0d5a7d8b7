//! What a person and a machine see of findings.

use cosetta::finding::render::{Style, json, sarif, summary, terminal};
use cosetta::finding::{Finding, Severity, catalogue};
use cosetta::source::{SourceId, Sources, Span};

const SRAM: &str = "## SRAM word of the tide gauge.\nfield bit = GF(2)\n\ncode sram_word over bit\n  = hamming(7)\n  then extend\n  then puncture(last: 1)\n  then shorten(first: n - 72)\n  is [71, 64, 4]\n";

fn place(text: &str, id: SourceId, needle: &str) -> Span {
    let start = text.find(needle).expect("the needle is there");
    Span::new(id, start, start + needle.len())
}

fn story() -> (Sources, Vec<Finding>) {
    let mut sources = Sources::default();
    let main = sources.add("gauge/sram.coset", SRAM);
    let library_text = "code hamming(r in 2..20)\n  = check(all_lines(r))\n";
    let library = sources.add_library("library/hamming.coset", library_text);
    let claim = Finding::new(
        catalogue::CLAIM_DISTANCE,
        Span::new(main, SRAM.find("4]").unwrap(), SRAM.find("4]").unwrap() + 1),
        "sram_word has minimum distance 3, not 4",
    )
    .label("claimed here")
    .help("write `is [71, 64, 3]`, or drop the step that lost the parity")
    .related(
        place(SRAM, main, "puncture(last: 1)"),
        "d fell from 4 to 3 here",
    )
    .related(
        place(library_text, library, "hamming"),
        "the code it starts from",
    );
    let remark = Finding::new(
        catalogue::UNUSED,
        place(SRAM, main, "bit"),
        "nothing uses bit",
    );
    let preference = Finding::new(
        catalogue::PREFERENCE_FAILS,
        place(SRAM, main, "sram_word"),
        "row_weight <= 36 is preferred, but row 3 has weight 38",
    );
    (sources, vec![claim, preference.clone(), remark, preference])
}

#[test]
fn a_refuted_claim_points_at_the_step_that_lost_it() {
    let (sources, findings) = story();
    let text = terminal(
        &findings,
        &sources,
        Style {
            color: false,
            width: 80,
        },
    );
    assert!(!text.contains('\u{1b}'));
    insta::assert_snapshot!(text);
}

#[test]
fn colour_adds_escape_codes_and_changes_no_word() {
    let (sources, findings) = story();
    let with = terminal(
        &findings,
        &sources,
        Style {
            color: true,
            width: 80,
        },
    );
    let without = terminal(
        &findings,
        &sources,
        Style {
            color: false,
            width: 80,
        },
    );
    assert!(with.contains("\u{1b}["));
    let mut stripped = String::new();
    let mut rest = with.as_str();
    while let Some(at) = rest.find('\u{1b}') {
        stripped.push_str(&rest[..at]);
        let end = rest[at..].find('m').expect("every code ends") + at + 1;
        rest = &rest[end..];
    }
    stripped.push_str(rest);
    let squeeze = |text: &str| {
        text.lines()
            .map(str::trim_end)
            .collect::<Vec<_>>()
            .join("\n")
    };
    assert_eq!(squeeze(&stripped), squeeze(&without));
}

#[test]
fn the_order_given_does_not_matter() {
    let (sources, mut findings) = story();
    let style = Style::default();
    let first = (
        terminal(&findings, &sources, style),
        json(&findings, &sources),
    );
    findings.reverse();
    assert_eq!(
        first,
        (
            terminal(&findings, &sources, style),
            json(&findings, &sources)
        )
    );
}

#[test]
fn findings_are_counted_once_each() {
    let (_, findings) = story();
    assert_eq!(summary(&findings), "1 error, 1 warning, 1 remark");
    assert_eq!(summary(&[]), "no findings");
}

#[test]
fn the_json_keeps_the_contract() {
    let (sources, findings) = story();
    let value = json(&findings, &sources);
    let claim = value
        .as_array()
        .and_then(|all| all.iter().find(|one| one["code"] == "claim-distance"))
        .expect("the claim is among them");
    assert_eq!(claim["severity"], "error");
    assert_eq!(claim["file"], "gauge/sram.coset");
    assert_eq!(claim["span"]["start"]["line"], 9);
    assert_eq!(claim["span"]["start"]["column"], 15);
    assert_eq!(claim["span"]["end"]["column"], 16);
    assert_eq!(claim["related"][0]["message"], "d fell from 4 to 3 here");
    assert_eq!(claim["related"][0]["span"]["start"]["line"], 7);
    assert_eq!(claim["related"][1]["file"], "library/hamming.coset");
    insta::assert_json_snapshot!(value);
}

#[test]
fn the_sarif_log_names_rules_that_it_defines() {
    let (sources, findings) = story();
    let log = sarif(&findings, &sources);
    assert_eq!(log["version"], "2.1.0");
    let run = &log["runs"][0];
    let results = run["results"].as_array().unwrap();
    assert_eq!(results.len(), 3);
    for result in results {
        let index = result["ruleIndex"].as_u64().unwrap() as usize;
        assert_eq!(
            run["tool"]["driver"]["rules"][index]["id"],
            result["ruleId"]
        );
    }
    // The index moves whenever the catalogue grows.
    let mut kept = results.clone();
    for result in &mut kept {
        result.as_object_mut().unwrap().remove("ruleIndex");
    }
    insta::assert_json_snapshot!(kept);
}

#[test]
fn a_file_name_becomes_a_valid_reference() {
    let mut sources = Sources::default();
    let id = sources.add("dépôt/a b:c%.coset", "x");
    let finding = Finding::new(catalogue::SYNTAX, Span::new(id, 0, 1), "m");
    let log = sarif(&[finding], &sources);
    let place = &log["runs"][0]["results"][0]["locations"][0]["physicalLocation"];
    assert_eq!(
        place["artifactLocation"]["uri"],
        "d%C3%A9p%C3%B4t/a%20b:c%25.coset"
    );
}

/// Marks an empty span at `offset`, and returns what is shown.
fn at(text: &str, start: usize, end: usize) -> String {
    let mut sources = Sources::default();
    let id = sources.add("x.coset", text);
    let finding = Finding::new(
        catalogue::SYNTAX,
        Span::new(id, start, end),
        "a step is missing",
    )
    .label("here");
    terminal(
        &[finding],
        &sources,
        Style {
            color: false,
            width: 60,
        },
    )
}

#[test]
fn odd_places_are_marked_all_the_same() {
    let cases = [
        ("empty span inside a line", at("code x\n  = dual\n", 9, 9)),
        (
            "empty span at the end of a line",
            at("code x\n  = dual\n", 6, 6),
        ),
        ("end of file after a line feed", at("code x\n", 7, 7)),
        ("end of file without a line feed", at("code x", 6, 6)),
        ("empty file", at("", 0, 0)),
        ("beyond the end", at("code x\n", 90, 95)),
        (
            "several lines",
            at("code x\n  = dual\n  then extend\n  is [1, 1, 1]\n", 9, 28),
        ),
        ("many lines", at(&"| 1 0 1 |\n".repeat(20), 2, 190)),
        ("tabs", at("code x\n\t=\tdual\n", 10, 14)),
        (
            "non-ASCII text",
            at(
                "## Gezeiten über Häfen, 潮位計\ncode größe = dual\n",
                41,
                48,
            ),
        ),
        ("inside a character", at("é = ü\n", 1, 6)),
        (
            "carriage returns",
            at("code x\r\n  = dual\r\nnext\r\n", 12, 16),
        ),
        (
            "escape codes in the text",
            at("code \u{1b}[31mx\u{202e}y = dual\n", 0, 4),
        ),
    ];
    let shown: Vec<String> = cases
        .into_iter()
        .map(|(name, text)| {
            assert!(text.contains("a step is missing"), "{name}");
            assert!(text.contains("here"), "{name}: {text}");
            assert!(!text.contains('\u{1b}'), "{name}");
            format!("{name}:\n{text}")
        })
        .collect();
    insta::assert_snapshot!(shown.join("\n"));
}

#[test]
fn places_far_apart_get_an_excerpt_each_and_long_texts_fold() {
    let text = format!(
        "code a\n  = dual\n{}code b\n  = dual\n",
        "# sea\n".repeat(20)
    );
    let mut sources = Sources::default();
    let id = sources.add("x.coset", text.as_str());
    let finding = Finding::new(
        catalogue::DUPLICATE_NAME,
        place(&text, id, "code b"),
        "two declarations of this file share a name, and a name that stands for two things stands for neither",
    )
    .help("rename one of them:\n  code a  = dual\nand write the other name where that one is meant")
    .related(place(&text, id, "code a"), "the first one");
    insta::assert_snapshot!(terminal(
        &[finding],
        &sources,
        Style {
            color: false,
            width: 60
        }
    ));
}

#[test]
fn no_span_whatever_makes_it_fail() {
    let text = "a\té\n\r\n潮位 b\n\n| 1 |\n";
    for start in 0..=text.len() + 2 {
        for end in start..=text.len() + 2 {
            let mut sources = Sources::default();
            let id = sources.add("x.coset", text);
            let finding = Finding::new(catalogue::SYNTAX, Span::new(id, start, end), "m")
                .label("here")
                .severity(Severity::Warning)
                .related(Span::new(id, end, end), "and here")
                .related(Span::new(id, start / 2, end), "over");
            let findings = [finding];
            let shown = terminal(
                &findings,
                &sources,
                Style {
                    color: false,
                    width: 1,
                },
            );
            assert!(shown.contains("and here"), "{start}..{end}: {shown}");
            json(&findings, &sources);
            sarif(&findings, &sources);
        }
    }
}
