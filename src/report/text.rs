//! The report for a terminal and for a review: plain lines, made to be quoted.

use super::Report;
use super::document::{Bar, Block, VerdictLine, document};
use super::model::Verdict;
use crate::finding::render::{Style, plain, width_of, wrap};

/// Narrower than this, folding would do more harm than good.
const LEAST_WIDTH: usize = 48;

/// The report as text.
pub fn text(report: &Report, style: Style) -> String {
    blocks(&document(report), style)
}

/// Blocks as text.
pub fn blocks(blocks: &[Block], style: Style) -> String {
    let mut writer = Writer {
        out: String::new(),
        style: Style {
            width: style.width.max(LEAST_WIDTH),
            ..style
        },
    };
    for block in blocks {
        writer.block(block);
    }
    writer.out
}

struct Writer {
    out: String,
    style: Style,
}

impl Writer {
    fn block(&mut self, block: &Block) {
        match block {
            Block::Title {
                name,
                parameters,
                order,
            } => self.title(&format!("{name}   {parameters}_{order}")),
            Block::Paragraph(text) => self.folded("", text),
            Block::Heading(text) => {
                self.line("");
                let text = self.style.paint("1", &plain(text));
                self.line(&text);
            }
            Block::Facts(facts) => self.facts(facts),
            Block::Table {
                head,
                numeric,
                rows,
            } => self.table(head, numeric, rows),
            Block::Bars(bars) => self.bars(bars),
            Block::Verdicts(lines) => self.verdicts(lines),
            Block::List(items) => {
                for item in items {
                    self.folded("- ", item);
                }
            }
            Block::Caution(text) => {
                self.line("");
                let rule = "─".repeat(self.style.width.min(78));
                self.line(&rule);
                self.folded("", text);
            }
        }
    }

    fn line(&mut self, text: &str) {
        self.out.push_str(text.trim_end());
        self.out.push('\n');
    }

    /// Indented text; what follows the first line stands under it, beside the mark.
    fn folded(&mut self, mark: &str, text: &str) {
        let indent = 2 + width_of(mark);
        let text = plain(text);
        for (at, line) in wrap(&text, self.style.width - indent).iter().enumerate() {
            let mark = if at == 0 { mark } else { "" };
            self.line(&format!("  {mark:0$}{line}", indent - 2));
        }
    }

    fn title(&mut self, text: &str) {
        if !self.out.is_empty() {
            self.line("");
            self.line("");
        }
        let text = plain(text).replace('\n', " ");
        let bold = self.style.paint("1", &text);
        self.line(&bold);
        self.line(&"═".repeat(width_of(&text).min(self.style.width)));
    }

    fn facts(&mut self, facts: &[(String, String)]) {
        let widest = facts
            .iter()
            .map(|(name, _)| width_of(name))
            .max()
            .unwrap_or(0);
        self.line("");
        for (name, value) in facts {
            let mark = format!("{}  ", padded(name, widest, false));
            self.folded(&mark, value);
        }
    }

    /// Columns aligned; where they are too wide together, those of text fold.
    fn table(&mut self, head: &[String], numeric: &[bool], rows: &[Vec<String>]) {
        let flat = |row: &[String]| -> Vec<String> {
            row.iter()
                .map(|cell| plain(cell).replace('\n', " "))
                .collect()
        };
        let lines: Vec<Vec<String>> = std::iter::once(head)
            .chain(rows.iter().map(Vec::as_slice))
            .map(flat)
            .collect();
        let widths = column_widths(&lines, numeric, self.style.width);
        for (at, row) in lines.iter().enumerate() {
            let cells: Vec<Vec<String>> = row
                .iter()
                .zip(&widths)
                .map(|(cell, &width)| wrap(cell, width))
                .collect();
            for line in 0..cells.iter().map(Vec::len).max().unwrap_or(0) {
                let mut text = String::new();
                for (column, cell) in cells.iter().enumerate() {
                    let part = cell.get(line).map_or("", String::as_str);
                    text.push_str("  ");
                    text.push_str(&padded(part, widths[column], numeric[column]));
                }
                let text = text.trim_end();
                let text = if at == 0 {
                    self.style.paint("2", text)
                } else {
                    text.to_string()
                };
                self.line(&text);
            }
        }
    }

    fn bars(&mut self, bars: &[Bar]) {
        let label = bars
            .iter()
            .map(|bar| width_of(&bar.label))
            .max()
            .unwrap_or(0);
        let counted = || bars.iter().filter(|bar| !bar.label.is_empty());
        let value = counted().map(|bar| width_of(&bar.value)).max().unwrap_or(0);
        let room = self
            .style
            .width
            .saturating_sub(label + value + 6)
            .clamp(8, 50);
        for bar in bars {
            if bar.label.is_empty() {
                let text = format!("  {}  {}", padded("⋮", label, true), bar.value);
                self.line(&text);
                continue;
            }
            let drawn = drawn(bar.share, room);
            let blank = " ".repeat(room - width_of(&drawn));
            let drawn = self.style.paint("36", &drawn);
            let text = format!(
                "  {}  {}  {drawn}{blank}",
                padded(&bar.label, label, true),
                padded(&bar.value, value, true),
            );
            self.line(&text);
        }
    }

    fn verdicts(&mut self, lines: &[VerdictLine]) {
        // Statements without a reason share a line with their like.
        let bare = |line: &VerdictLine| line.says.is_empty();
        for verdict in [Verdict::Holds, Verdict::Fails, Verdict::Undecided] {
            let of_this: Vec<&VerdictLine> = lines
                .iter()
                .filter(|line| line.verdict == verdict)
                .collect();
            let short: Vec<&str> = of_this
                .iter()
                .filter(|line| bare(line))
                .map(|line| line.text.as_str())
                .collect();
            if !short.is_empty() {
                self.verdict(verdict, &short.join(", "), &[]);
            }
            for line in of_this.iter().filter(|line| !bare(line)) {
                self.verdict(verdict, &line.text, &line.says);
            }
        }
    }

    fn verdict(&mut self, verdict: Verdict, text: &str, says: &[String]) {
        let (mark, color) = match verdict {
            Verdict::Holds => ("✓", "32"),
            Verdict::Fails => ("✗", "31"),
            Verdict::Undecided => ("?", "33"),
        };
        let word = format!("{mark} {:<9}", verdict.word());
        let indent = 2 + 11 + 2;
        let room = self.style.width - indent;
        for (at, line) in wrap(&plain(text), room).iter().enumerate() {
            let start = match at {
                0 => self.style.paint(color, &word),
                _ => " ".repeat(11),
            };
            self.line(&format!("  {start}  {line}"));
        }
        for reason in says {
            for line in wrap(&plain(reason), room - 2) {
                self.line(&format!("{:indent$}  {line}", ""));
            }
        }
    }
}

/// The narrowest that a column of text is folded to.
const LEAST_COLUMN: usize = 12;

/// The widths of a table's columns (each with two blanks before it), the widest columns of text
/// narrowed until all fit into `room`, or no further.
fn column_widths(lines: &[Vec<String>], numeric: &[bool], room: usize) -> Vec<usize> {
    let widest = |column: usize| {
        let cells = lines.iter().filter_map(|line| line.get(column));
        cells.map(|cell| width_of(cell)).max().unwrap_or(0)
    };
    let mut widths: Vec<usize> = (0..numeric.len()).map(widest).collect();
    while widths.iter().map(|width| width + 2).sum::<usize>() > room {
        let text = (0..widths.len()).filter(|&column| !numeric[column]);
        match text.max_by_key(|&column| widths[column]) {
            Some(column) if widths[column] > LEAST_COLUMN => widths[column] -= 1,
            _ => break,
        }
    }
    widths
}

/// A text filled up with blanks, on the left for numbers.
pub(super) fn padded(text: &str, width: usize, to_the_right: bool) -> String {
    let blank = " ".repeat(width.saturating_sub(width_of(text)));
    if to_the_right {
        blank + text
    } else {
        text.to_string() + &blank
    }
}

/// A bar of at most `room` columns, to an eighth of one; never nothing for a share above zero.
fn drawn(share: f64, room: usize) -> String {
    const EIGHTHS: [&str; 8] = ["", "▏", "▎", "▍", "▌", "▋", "▊", "▉"];
    let share = if share.is_finite() {
        share.clamp(0.0, 1.0)
    } else {
        0.0
    };
    let mut eighths = (share * room as f64 * 8.0).round() as usize;
    if share > 0.0 {
        eighths = eighths.max(1);
    }
    "█".repeat(eighths / 8) + EIGHTHS[eighths % 8]
}
