//! What the readers of text formats share: lines, words, integers.

use super::{ReadError, element, no_element};
use crate::algebra::{Element, Field};

/// The bytes as text.
pub(super) fn utf8(bytes: &[u8]) -> Result<&str, ReadError> {
    let text = std::str::from_utf8(bytes).map_err(|error| {
        let before = &bytes[..error.valid_up_to()];
        let line = before.iter().filter(|&&byte| byte == b'\n').count() + 1;
        ReadError::at(line, "this is not UTF-8 text")
    })?;
    Ok(text.strip_prefix('\u{feff}').unwrap_or(text))
}

/// The lines with their numbers from 1, without their ends.
pub(super) fn lines(text: &str) -> impl Iterator<Item = (usize, &str)> {
    text.lines().enumerate().map(|(at, line)| (at + 1, line))
}

/// A word as a count or an index.
pub(super) fn count(word: &str, line: usize) -> Result<u64, ReadError> {
    let digits = word.bytes().all(|byte| byte.is_ascii_digit());
    match word.parse() {
        Ok(value) if digits => Ok(value),
        _ => Err(ReadError::at(
            line,
            format!("a whole number is expected here, not {}", quoted(word)),
        )),
    }
}

/// A word as a field element.
pub(super) fn entry(word: &str, line: usize, field: &Field) -> Result<Element, ReadError> {
    let digits = !word.is_empty() && word.bytes().all(|byte| byte.is_ascii_digit());
    let value = match word.parse::<u64>() {
        Ok(value) if digits => element(value, field),
        _ => Err(no_element(&quoted(word), field)),
    };
    value.map_err(|says| ReadError::at(line, says))
}

/// A piece of the file as a message may quote it.
pub(super) fn quoted(word: &str) -> String {
    let mut short: String = word.chars().take(64).collect();
    if short.len() < word.len() {
        short.push('…');
    }
    format!("`{}`", short.escape_debug())
}

/// All words of a text, each with its line.
pub(super) struct Words<'a> {
    words: std::iter::Peekable<Box<dyn Iterator<Item = (usize, &'a str)> + 'a>>,
    last_line: usize,
}

impl<'a> Words<'a> {
    pub(super) fn new(text: &'a str) -> Words<'a> {
        let words = lines(text)
            .flat_map(|(number, line)| line.split_whitespace().map(move |word| (number, word)));
        let words: Box<dyn Iterator<Item = (usize, &'a str)> + 'a> = Box::new(words);
        Words {
            words: words.peekable(),
            last_line: 1,
        }
    }

    /// The line of the word read last.
    pub(super) fn line(&self) -> usize {
        self.last_line
    }

    /// The next word, not taken.
    pub(super) fn peek(&mut self) -> Option<&'a str> {
        self.words.peek().map(|&(_, word)| word)
    }

    /// The line of the next word, not taken.
    pub(super) fn next_line(&mut self) -> Option<usize> {
        self.words.peek().map(|&(line, _)| line)
    }

    /// The next word; `what` says what is missing at the end of the file.
    pub(super) fn word(&mut self, what: &str) -> Result<(usize, &'a str), ReadError> {
        match self.words.next() {
            Some((line, word)) => {
                self.last_line = line;
                Ok((line, word))
            }
            None => Err(ReadError::at(
                self.last_line,
                format!("the file ends before {what}"),
            )),
        }
    }

    /// The next word as a whole number.
    pub(super) fn count(&mut self, what: &str) -> Result<u64, ReadError> {
        let (line, word) = self.word(what)?;
        count(word, line)
    }
}
