//! One source file as the excerpt printer wants it.

use std::ops::Range;

use miette::{MietteError, MietteSpanContents, SourceCode, SourceSpan, SpanContents};

use super::plain;
use crate::source::{SourceFile, Span};

/// Spans of more lines than this are marked on their first line only.
const LONGEST_MARKED: usize = 8;

/// A file's text, safe to print, with one blank after its end for marks that stand there.
#[derive(Debug)]
pub(super) struct Excerpt {
    name: String,
    text: String,
    line_starts: Vec<usize>,
}

impl Excerpt {
    pub(super) fn new(file: &SourceFile) -> Excerpt {
        let text = format!("{} ", plain(&file.text));
        let line_starts = std::iter::once(0)
            .chain(text.match_indices('\n').map(|(at, _)| at + 1))
            .collect();
        Excerpt {
            name: plain(&file.name).replace(['\n', '\t'], " "),
            text,
            line_starts,
        }
    }

    /// The bytes to mark for a span, and the line it really ends on when that is too far away to
    /// be marked.
    pub(super) fn mark(&self, span: Span) -> (Range<usize>, Option<usize>) {
        let last = self.text.len() - 1;
        let mut start = (span.start as usize).min(last);
        let mut end = (span.end as usize).clamp(start, last);
        while !self.text.is_char_boundary(start) {
            start -= 1;
        }
        while !self.text.is_char_boundary(end) {
            end += 1;
        }
        end = start + self.text[start..end].trim_end().len();
        let (first_line, last_line) = (self.line_of(start), self.line_of(end));
        if last_line - first_line < LONGEST_MARKED {
            return (start..end, None);
        }
        let line = &self.text[start..self.line_end(first_line)];
        (start..start + line.trim_end().len(), Some(last_line + 1))
    }

    fn line_of(&self, offset: usize) -> usize {
        self.line_starts.partition_point(|&start| start <= offset) - 1
    }

    fn line_end(&self, line: usize) -> usize {
        let next = self.line_starts.get(line + 1).copied();
        next.unwrap_or(self.text.len())
    }
}

impl SourceCode for Excerpt {
    fn read_span<'a>(
        &'a self,
        span: &SourceSpan,
        before: usize,
        after: usize,
    ) -> Result<Box<dyn SpanContents<'a> + 'a>, MietteError> {
        let start = span.offset().min(self.text.len() - 1);
        let end = (span.offset() + span.len()).clamp(start, self.text.len() - 1);
        let (first, last) = (self.line_of(start), self.line_of(end));
        // The line that only holds the added blank is worth showing only when marked.
        let blank_end = self.line_starts.last() == Some(&(self.text.len() - 1));
        let lines = self.line_starts.len() - usize::from(blank_end);
        let from = first.saturating_sub(before);
        let to = (last + after).min(lines.saturating_sub(1)).max(last);
        let column = match before {
            0 => self.text[self.line_starts[first]..start].chars().count(),
            _ => 0,
        };
        let bytes = self.line_starts[from]..self.line_end(to);
        Ok(Box::new(MietteSpanContents::new_named(
            self.name.clone(),
            &self.text.as_bytes()[bytes.clone()],
            (bytes.start, bytes.len()).into(),
            from,
            column,
            to - from,
        )))
    }
}
