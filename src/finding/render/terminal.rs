//! Findings for a person at a terminal.

use std::collections::BTreeMap;
use std::fmt;

use miette::{
    Diagnostic, GraphicalReportHandler, GraphicalTheme, LabeledSpan, SourceCode, ThemeCharacters,
    ThemeStyles,
};

use super::excerpt::Excerpt;
use super::{Style, ordered, plain, severity_word, wrap};
use crate::finding::{Finding, Severity};
use crate::source::{SourceId, Sources, Span};

/// Narrower than this, folding would do more harm than good.
const LEAST_WIDTH: usize = 40;

/// All findings as text, each with its place in the source, and a line that counts them; empty
/// when there are none.
pub fn terminal(findings: &[Finding], sources: &Sources, style: Style) -> String {
    let mut excerpts: BTreeMap<SourceId, Excerpt> = BTreeMap::new();
    for finding in findings {
        let places = finding.related.iter().map(|related| related.span);
        for span in places.chain([finding.span]) {
            excerpts
                .entry(span.source)
                .or_insert_with(|| Excerpt::new(sources.get(span.source)));
        }
    }
    let printer = printer(style);
    let shown = ordered(findings);
    let mut out = String::new();
    for finding in &shown {
        show(&mut out, &printer, finding, &excerpts, style);
        out.push('\n');
    }
    if !shown.is_empty() {
        out.push_str(&summary(findings));
        out.push('\n');
    }
    // The printer pads; what is kept in files and reviews should not.
    out.lines().fold(String::new(), |mut text, line| {
        text.push_str(line.trim_end());
        text.push('\n');
        text
    })
}

/// How many findings of each severity there are, as `2 errors, 1 warning`; equal ones count once.
pub fn summary(findings: &[Finding]) -> String {
    let shown = ordered(findings);
    let parts: Vec<String> = [
        (Severity::Error, "error"),
        (Severity::Warning, "warning"),
        (Severity::Advice, "remark"),
    ]
    .into_iter()
    .filter_map(|(severity, word)| {
        let of_this = |finding: &&&Finding| finding.severity == severity;
        match shown.iter().filter(of_this).count() {
            0 => None,
            1 => Some(format!("1 {word}")),
            count => Some(format!("{count} {word}s")),
        }
    })
    .collect();
    if parts.is_empty() {
        "no findings".to_string()
    } else {
        parts.join(", ")
    }
}

fn printer(style: Style) -> GraphicalReportHandler {
    let theme = GraphicalTheme {
        characters: ThemeCharacters {
            error: "✗".into(),
            warning: "!".into(),
            advice: "›".into(),
            ..ThemeCharacters::unicode()
        },
        styles: if style.color {
            ThemeStyles::ansi()
        } else {
            ThemeStyles::none()
        },
    };
    // Folding is done here and not by the printer, which would break words at their hyphens.
    GraphicalReportHandler::new_themed(theme)
        .with_links(false)
        .with_width(usize::MAX / 4)
        .with_wrap_lines(false)
        .without_syntax_highlighting()
        .without_cause_chain()
}

fn show(
    out: &mut String,
    printer: &GraphicalReportHandler,
    finding: &Finding,
    excerpts: &BTreeMap<SourceId, Excerpt>,
    style: Style,
) {
    let home = finding.span.source;
    let mut message = Shown::new(finding.severity, &finding.message, &excerpts[&home], style);
    message.help = finding.help.as_deref().map(|help| folded(help, style, 8));
    let accompanied = finding
        .related
        .iter()
        .any(|related| related.span.source == home);
    let label = match finding.label.as_str() {
        // Beside labelled places, an unlabelled one would not be seen to be the one meant.
        "" if accompanied => "here",
        label => label,
    };
    message.mark(finding.span, label, true);
    for related in &finding.related {
        if related.span.source == home {
            message.mark(related.span, &related.message, false);
        }
    }
    let word = severity_word(finding.severity);
    let color = match finding.severity {
        Severity::Error => "1;31",
        Severity::Warning => "1;33",
        Severity::Advice => "1;36",
    };
    out.push_str(&style.paint(color, &format!("{word} {}", finding.code.name)));
    out.push('\n');
    print(out, printer, &message);
    for related in &finding.related {
        if related.span.source != home {
            let excerpt = &excerpts[&related.span.source];
            let mut place = Shown::new(Severity::Advice, &related.message, excerpt, style);
            place.mark(related.span, "", true);
            print(out, printer, &place);
        }
    }
}

fn print(out: &mut String, printer: &GraphicalReportHandler, shown: &Shown<'_>) {
    let before = out.len();
    if printer.render_report(out, shown).is_err() {
        // An excerpt that cannot be drawn must not cost the message itself.
        out.truncate(before);
        out.push_str(&format!("  {shown}\n"));
    }
}

fn folded(text: &str, style: Style, indent: usize) -> String {
    let width = style.width.max(LEAST_WIDTH) - indent;
    wrap(&plain(text), width).join("\n")
}

/// One excerpt with its message, in the printer's terms.
#[derive(Debug)]
struct Shown<'a> {
    severity: Severity,
    message: String,
    help: Option<String>,
    labels: Vec<LabeledSpan>,
    excerpt: &'a Excerpt,
}

impl<'a> Shown<'a> {
    fn new(severity: Severity, message: &str, excerpt: &'a Excerpt, style: Style) -> Shown<'a> {
        Shown {
            severity,
            message: folded(message, style, 4),
            help: None,
            labels: Vec::new(),
            excerpt,
        }
    }

    fn mark(&mut self, span: Span, label: &str, primary: bool) {
        let (bytes, far_end) = self.excerpt.mark(span);
        let mut text = plain(label).replace(['\n', '\t'], " ");
        if let Some(line) = far_end {
            let blank = if text.is_empty() { "" } else { " " };
            text.push_str(&format!("{blank}(down to line {line})"));
        }
        let text = (!text.is_empty()).then_some(text);
        let (start, length) = (bytes.start, bytes.len());
        self.labels.push(if primary {
            LabeledSpan::new_primary_with_span(text, (start, length))
        } else {
            LabeledSpan::new(text, start, length)
        });
    }
}

impl fmt::Display for Shown<'_> {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        formatter.write_str(&self.message)
    }
}

impl std::error::Error for Shown<'_> {}

impl Diagnostic for Shown<'_> {
    fn severity(&self) -> Option<miette::Severity> {
        Some(match self.severity {
            Severity::Error => miette::Severity::Error,
            Severity::Warning => miette::Severity::Warning,
            Severity::Advice => miette::Severity::Advice,
        })
    }

    fn help<'b>(&'b self) -> Option<Box<dyn fmt::Display + 'b>> {
        let help = self.help.as_ref()?;
        Some(Box::new(help))
    }

    fn source_code(&self) -> Option<&dyn SourceCode> {
        Some(self.excerpt)
    }

    fn labels(&self) -> Option<Box<dyn Iterator<Item = LabeledSpan> + '_>> {
        Some(Box::new(self.labels.iter().cloned()))
    }
}
