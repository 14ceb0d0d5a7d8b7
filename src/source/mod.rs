//! Files and places in them: what every message points with.
//!
//! In: texts and the names they are shown under. Out: [`Span`]s, and from a span the 1-based line
//! and column that a person or a machine reads. No file is opened here; [`Loader`] is how the
//! rooms below ask for one.

use std::fmt;

/// A file among the [`Sources`] of one run.
#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Debug, Default)]
pub struct SourceId(pub u32);

/// A stretch of text: bytes `start..end` of one file.
#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Debug, Default)]
pub struct Span {
    /// The file it lies in.
    pub source: SourceId,
    /// First byte.
    pub start: u32,
    /// One past the last byte.
    pub end: u32,
}

impl Span {
    /// The span of bytes `start..end` of `source`.
    pub fn new(source: SourceId, start: usize, end: usize) -> Span {
        Span {
            source,
            start: start as u32,
            end: end as u32,
        }
    }

    /// The smallest span that covers both; `other` must lie in the same file.
    pub fn to(self, other: Span) -> Span {
        Span {
            source: self.source,
            start: self.start.min(other.start),
            end: self.end.max(other.end),
        }
    }
}

/// A place as a person names it: line and column, both counted from 1, columns in characters.
#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Debug, serde::Serialize)]
pub struct Position {
    /// Line, from 1.
    pub line: usize,
    /// Column in characters, from 1.
    pub column: usize,
}

/// One text and the name it is shown under.
#[derive(Debug)]
pub struct SourceFile {
    /// As given on the command line, with `/` between folders.
    pub name: String,
    /// The whole text.
    pub text: String,
    /// Whether it belongs to the language's own library.
    pub library: bool,
    line_starts: Vec<usize>,
}

impl SourceFile {
    fn new(name: String, text: String, library: bool) -> SourceFile {
        let line_starts = std::iter::once(0)
            .chain(text.match_indices('\n').map(|(at, _)| at + 1))
            .collect();
        SourceFile {
            name,
            text,
            library,
            line_starts,
        }
    }

    /// Line and column of a byte offset; an offset past the end is the end.
    pub fn position(&self, offset: usize) -> Position {
        let offset = offset.min(self.text.len());
        let line = self.line_starts.partition_point(|&start| start <= offset) - 1;
        let before = self.text.get(self.line_starts[line]..offset);
        Position {
            line: line + 1,
            column: before.map_or(0, |text| text.chars().count()) + 1,
        }
    }
}

/// All texts of one run, the library's among them.
#[derive(Debug, Default)]
pub struct Sources {
    files: Vec<SourceFile>,
}

impl Sources {
    /// Adds a file of the user's.
    pub fn add(&mut self, name: impl Into<String>, text: impl Into<String>) -> SourceId {
        self.push(SourceFile::new(name.into(), text.into(), false))
    }

    /// Adds a file of the language's library.
    pub fn add_library(&mut self, name: impl Into<String>, text: impl Into<String>) -> SourceId {
        self.push(SourceFile::new(name.into(), text.into(), true))
    }

    fn push(&mut self, file: SourceFile) -> SourceId {
        self.files.push(file);
        SourceId(self.files.len() as u32 - 1)
    }

    /// The file behind an id that this value handed out.
    pub fn get(&self, id: SourceId) -> &SourceFile {
        &self.files[id.0 as usize]
    }

    /// The text a span covers.
    pub fn text(&self, span: Span) -> &str {
        let text = &self.get(span.source).text;
        text.get(span.start as usize..span.end as usize)
            .unwrap_or("")
    }

    /// First and last place of a span.
    pub fn positions(&self, span: Span) -> (Position, Position) {
        let file = self.get(span.source);
        (
            file.position(span.start as usize),
            file.position(span.end as usize),
        )
    }
}

/// Why a file that a spec asks for could not be had, in words that fit after "cannot read".
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct LoadError(pub String);

impl fmt::Display for LoadError {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        formatter.write_str(&self.0)
    }
}

/// How the compiler reads the files that a spec names (`use`, `file(…)`).
///
/// The command line gives one that reads the disk below the project's root, a test one that
/// reads a table.
pub trait Loader {
    /// The bytes of `path` as written in the file shown as `from`, and the name to show it under.
    ///
    /// # Errors
    /// When the file does not exist, is too large, or lies outside the project's root.
    fn load(&self, from: &str, path: &str) -> Result<(String, Vec<u8>), LoadError>;
}

/// A loader without files: whatever a spec asks for does not exist.
#[derive(Clone, Copy, Debug, Default)]
pub struct NoFiles;

impl Loader for NoFiles {
    fn load(&self, _from: &str, path: &str) -> Result<(String, Vec<u8>), LoadError> {
        Err(LoadError(format!("{path}: there are no files here")))
    }
}
