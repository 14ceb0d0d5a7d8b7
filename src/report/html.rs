//! The report as one HTML page without scripts or outside parts, light or dark as the reader's
//! system is, fit to be printed.

use super::Report;
use super::document::{Bar, Block, VerdictLine, document};
use crate::finding::render::plain;

const STYLE: &str = "\
:root{color-scheme:light dark;--ink:#1b1f24;--soft:#59636e;--line:#d1d9e0;--page:#fff;--bar:#0072b2;\
--good:#00664b;--bad:#a33a00;--open:#6b5a00}\
@media(prefers-color-scheme:dark){:root{--ink:#e6e9ed;--soft:#9aa4af;--line:#3d444d;--page:#14171b;\
--bar:#56b4e9;--good:#4dc9a2;--bad:#ff9b66;--open:#e6cf5a}}\
body{font:15px/1.5 system-ui,sans-serif;color:var(--ink);background:var(--page);max-width:60rem;\
margin:2rem auto;padding:0 1rem}\
h1{font-size:1.5rem;border-bottom:2px solid var(--line);padding-bottom:.3rem;margin-top:3rem}\
h1:first-child{margin-top:0}h2{font-size:1.1rem;margin:1.6rem 0 .4rem}p{margin:.4rem 0}\
.doc{white-space:pre-line}\
table{border-collapse:collapse}th,td{padding:.15rem .9rem .15rem 0;text-align:left;vertical-align:top}\
th{font-weight:600;color:var(--soft)}.r{text-align:right;font-variant-numeric:tabular-nums}\
td.bar{width:24rem}td.bar i{display:block;height:.7rem;margin-top:.4rem;background:var(--bar)}\
.holds,.fails,.undecided{min-width:5.5rem;font-weight:600}.holds{color:var(--good)}.fails{color:var(--bad)}.undecided{color:var(--open)}\
td small{display:block;color:var(--soft);font-size:.9em}\
footer{margin-top:3rem;border-top:1px solid var(--line);padding-top:.6rem;color:var(--soft)}\
@media print{body{margin:0;max-width:none}h1,h2{break-after:avoid}tr{break-inside:avoid}\
td.bar i{print-color-adjust:exact;-webkit-print-color-adjust:exact}}";

/// The report as a page that stands alone.
pub fn html(report: &Report) -> String {
    let names: Vec<String> = report.codes.iter().map(|code| code.title()).collect();
    let title = match names.as_slice() {
        [one] => escaped(one),
        _ => format!("{} codes", names.len()),
    };
    let mut out = format!(
        "<!DOCTYPE html>\n<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\">\n\
         <meta name=\"viewport\" content=\"width=device-width, initial-scale=1\">\n\
         <title>{title}</title>\n<style>{STYLE}</style>\n</head>\n<body>\n"
    );
    for block in document(report) {
        one(&mut out, &block);
    }
    out.push_str("</body>\n</html>\n");
    out
}

fn one(out: &mut String, block: &Block) {
    match block {
        Block::Title {
            name,
            parameters,
            order,
        } => {
            let (name, parameters) = (escaped(name), escaped(parameters));
            out.push_str(&format!("<h1>{name} {parameters}<sub>{order}</sub></h1>\n"));
        }
        Block::Paragraph(text) => {
            out.push_str(&format!("<p class=\"doc\">{}</p>\n", escaped(text)));
        }
        Block::Heading(text) => out.push_str(&format!("<h2>{}</h2>\n", escaped(text))),
        Block::Facts(facts) => {
            out.push_str("<table>\n");
            for (name, value) in facts {
                let (name, value) = (escaped(name), escaped(value));
                out.push_str(&format!(
                    "<tr><th scope=\"row\">{name}</th><td>{value}</td></tr>\n"
                ));
            }
            out.push_str("</table>\n");
        }
        Block::Table {
            head,
            numeric,
            rows,
        } => table(out, head, numeric, rows),
        Block::Bars(bars) => {
            out.push_str("<table>\n<tr><th class=\"r\">weight</th><th class=\"r\">words</th><th></th></tr>\n");
            bars.iter().for_each(|line| bar(out, line));
            out.push_str("</table>\n");
        }
        Block::Verdicts(lines) => {
            out.push_str("<table>\n");
            lines.iter().for_each(|line| verdict(out, line));
            out.push_str("</table>\n");
        }
        Block::List(items) => {
            out.push_str("<ul>\n");
            for item in items {
                out.push_str(&format!("<li>{}</li>\n", escaped(item)));
            }
            out.push_str("</ul>\n");
        }
        Block::Caution(text) => out.push_str(&format!("<footer>{}</footer>\n", escaped(text))),
    }
}

fn table(out: &mut String, head: &[String], numeric: &[bool], rows: &[Vec<String>]) {
    out.push_str("<table>\n");
    let mut line = |cells: &[String], tag: &str| {
        out.push_str("<tr>");
        for (cell, &numeric) in cells.iter().zip(numeric) {
            let class = if numeric { " class=\"r\"" } else { "" };
            out.push_str(&format!("<{tag}{class}>{}</{tag}>", escaped(cell)));
        }
        out.push_str("</tr>\n");
    };
    line(head, "th");
    rows.iter().for_each(|row| line(row, "td"));
    out.push_str("</table>\n");
}

fn bar(out: &mut String, bar: &Bar) {
    let value = escaped(&bar.value);
    if bar.label.is_empty() {
        out.push_str(&format!(
            "<tr><td class=\"r\">⋮</td><td class=\"r\">{value}</td><td></td></tr>\n"
        ));
        return;
    }
    let percent = (bar.share.clamp(0.0, 1.0) * 100.0).max(0.3);
    out.push_str(&format!(
        "<tr><td class=\"r\">{}</td><td class=\"r\">{value}</td>\
         <td class=\"bar\"><i style=\"width:{percent:.1}%\"></i></td></tr>\n",
        escaped(&bar.label)
    ));
}

fn verdict(out: &mut String, line: &VerdictLine) {
    let word = line.verdict.word();
    let says: String = line
        .says
        .iter()
        .map(|says| format!("<small>{}</small>", escaped(says)))
        .collect();
    out.push_str(&format!(
        "<tr><td class=\"{word}\">{word}</td><td>{}{says}</td></tr>\n",
        escaped(&line.text)
    ));
}

/// Text without meaning to HTML, in content and in quoted attributes.
pub(super) fn escaped(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for character in plain(text).chars() {
        match character {
            '&' => out.push_str("&amp;"),
            '<' => out.push_str("&lt;"),
            '>' => out.push_str("&gt;"),
            '"' => out.push_str("&quot;"),
            '\'' => out.push_str("&#39;"),
            _ => out.push(character),
        }
    }
    out
}
