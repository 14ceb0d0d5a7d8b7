//! Reports as Markdown and HTML, and a family's members as a table.

mod report_models;

use cosetta::finding::render::Style;
use cosetta::report::model::{Interval, Report, Verdict};
use cosetta::report::table::{FamilyTable, Figures, Member};
use cosetta::report::{html, markdown};
use report_models::{link, silent, sram_word};
use serde_json::{Map, json};

#[test]
fn a_report_as_markdown() {
    let report = Report::new(vec![sram_word(), link(), silent()], json!([]));
    insta::assert_snapshot!(markdown(&report));
}

#[test]
fn a_report_as_a_page() {
    let page = html(&Report::new(vec![sram_word(), silent()], json!([])));
    assert!(!page.contains("<script") && !page.contains("http"));
    for tag in [
        "table", "tr", "td", "th", "ul", "li", "p", "h1", "h2", "small",
    ] {
        let opened =
            page.matches(&format!("<{tag}>")).count() + page.matches(&format!("<{tag} ")).count();
        assert_eq!(opened, page.matches(&format!("</{tag}>")).count(), "{tag}");
    }
    insta::assert_snapshot!(page);
}

#[test]
fn a_spec_cannot_smuggle_markup_into_a_page() {
    let mut code = silent();
    code.name = "<script>".into();
    code.documentation = Some("1. <img src=x>\n- *bold* | `code` [a](b)\n# head & \"quote'".into());
    code.assumptions = vec!["<b>|</b>".into()];
    let report = Report::new(vec![code], json!([]));
    let page = html(&report);
    assert!(!page.contains("<script") && !page.contains("<img") && !page.contains("<b>"));
    let text = markdown(&report);
    assert!(!text.contains("<script") && !text.contains("<img") && !text.contains("<b>"));
    assert!(
        text.contains("\\- \\*bold\\* \\| \\`code\\` \\[a\\](b)"),
        "{text}"
    );
    assert!(text.contains("\n\\# head"), "{text}");
    assert!(text.contains("1\\. &lt;img"), "{text}");
}

fn family() -> FamilyTable {
    let member = |r: u64, figures, verdict, says: Option<&str>| Member {
        arguments: Map::from_iter([("r".to_string(), json!(r))]),
        figures,
        verdict,
        says: says.map(str::to_string),
    };
    let known = |n, k, d| Some(Figures::new(n, k, d));
    FamilyTable::new(
        "guarded",
        vec![
            member(1, None, None, Some("r lies below 4, \"the least\"")),
            member(
                4,
                known(8, 4, Interval::exact(4)),
                Some(Verdict::Holds),
                None,
            ),
            member(
                9,
                known(256, 247, Interval::between(3, 4)),
                Some(Verdict::Undecided),
                None,
            ),
            member(
                10,
                known(3, 0, Interval::default()),
                Some(Verdict::Fails),
                Some("k is 0"),
            ),
        ],
    )
}

#[test]
fn the_members_of_a_family_stand_side_by_side() {
    let table = family();
    let json = serde_json::to_string_pretty(&table.json()).unwrap();
    insta::assert_snapshot!(format!(
        "{}\n{}\n{json}",
        table.text(Style {
            color: false,
            width: 80
        }),
        table.csv()
    ));
}

#[test]
fn a_family_without_members_is_still_a_table() {
    let table = FamilyTable::new("guarded", vec![]);
    assert_eq!(table.csv().lines().count(), 1);
    assert!(table.text(Style::default()).contains("redundancy"));
}
