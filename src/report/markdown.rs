//! The report as Markdown (CommonMark, with the tables of GitHub's dialect).

use super::Report;
use super::document::{Block, VerdictLine, document};

/// The report as Markdown; whatever a spec contains is text there, never markup.
pub fn markdown(report: &Report) -> String {
    let mut out = String::new();
    for block in document(report) {
        one(&mut out, &block);
    }
    out.truncate(out.trim_end().len());
    out.push('\n');
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
            out.push_str(&format!("## {name} {parameters}<sub>{order}</sub>\n\n"));
        }
        Block::Paragraph(text) => {
            for line in text.lines() {
                out.push_str(&escaped_line(line));
                out.push('\n');
            }
            out.push('\n');
        }
        Block::Heading(text) => out.push_str(&format!("### {}\n\n", escaped(text))),
        Block::Facts(facts) => {
            let rows: Vec<Vec<String>> = facts
                .iter()
                .map(|(name, value)| vec![escaped(name), escaped(value)])
                .collect();
            table(out, &[String::new(), String::new()], &[false, false], &rows);
        }
        Block::Table {
            head,
            numeric,
            rows,
        } => {
            let head: Vec<String> = head.iter().map(|cell| escaped(cell)).collect();
            let rows: Vec<Vec<String>> = rows
                .iter()
                .map(|row| row.iter().map(|cell| escaped(cell)).collect())
                .collect();
            table(out, &head, numeric, &rows);
        }
        Block::Bars(bars) => {
            let rows: Vec<Vec<String>> = bars
                .iter()
                .map(|bar| match bar.label.as_str() {
                    "" => vec!["⋮".to_string(), escaped(&bar.value), String::new()],
                    label => {
                        let bar_text = "█".repeat(((bar.share * 24.0).round() as usize).max(1));
                        vec![escaped(label), escaped(&bar.value), bar_text]
                    }
                })
                .collect();
            let head = ["weight", "words", ""].map(str::to_string);
            table(out, &head, &[true, true, false], &rows);
        }
        Block::Verdicts(lines) => {
            let rows: Vec<Vec<String>> = lines.iter().map(verdict).collect();
            let head = ["verdict", "statement", "why"].map(str::to_string);
            table(out, &head, &[false, false, false], &rows);
        }
        Block::List(items) => {
            for item in items {
                out.push_str(&format!("- {}\n", escaped(item)));
            }
            out.push('\n');
        }
        Block::Caution(text) => out.push_str(&format!("---\n\n*{}*\n", escaped(text))),
    }
}

fn verdict(line: &VerdictLine) -> Vec<String> {
    let says: Vec<String> = line.says.iter().map(|says| escaped(says)).collect();
    vec![
        format!("**{}**", line.verdict.word()),
        escaped(&line.text),
        says.join("<br>"),
    ]
}

fn table(out: &mut String, head: &[String], numeric: &[bool], rows: &[Vec<String>]) {
    let rule: Vec<&str> = numeric
        .iter()
        .map(|&numeric| if numeric { "---:" } else { "---" })
        .collect();
    out.push_str(&format!(
        "| {} |\n| {} |\n",
        head.join(" | "),
        rule.join(" | ")
    ));
    for row in rows {
        out.push_str(&format!("| {} |\n", row.join(" | ")));
    }
    out.push('\n');
}

/// Text on one line, without meaning to Markdown or HTML.
fn escaped(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for character in crate::finding::render::plain(text).chars() {
        match character {
            '\n' => out.push(' '),
            '&' => out.push_str("&amp;"),
            '<' => out.push_str("&lt;"),
            '>' => out.push_str("&gt;"),
            '\\' | '`' | '*' | '_' | '[' | ']' | '|' | '#' | '~' | '$' => {
                out.push('\\');
                out.push(character);
            }
            _ => out.push(character),
        }
    }
    out
}

/// The same for a line that may begin with a mark of a list, a rule or a heading.
fn escaped_line(line: &str) -> String {
    let line = escaped(line.trim());
    let digits = line.chars().take_while(char::is_ascii_digit).count();
    if line.starts_with(['-', '+', '=']) {
        format!("\\{line}")
    } else if digits > 0 && line[digits..].starts_with(['.', ')']) {
        format!("{}\\{}", &line[..digits], &line[digits..])
    } else {
        line
    }
}
