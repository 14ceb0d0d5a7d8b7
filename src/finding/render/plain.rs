//! Text from a spec made safe to print.

use std::borrow::Cow;

/// `text` with every character that could command a terminal, or reorder what is read, replaced
/// by a visible one of the same length in bytes, so that offsets stay valid.
///
/// Line feeds and tabs stay; a carriage return stays before a line feed. Replaced are the C0 and
/// C1 controls and the bidirectional controls (Unicode Standard Annex 9, §2).
pub fn plain(text: &str) -> Cow<'_, str> {
    if !text.chars().any(is_unsafe) {
        return Cow::Borrowed(text);
    }
    let mut out = String::with_capacity(text.len());
    let mut characters = text.chars().peekable();
    while let Some(character) = characters.next() {
        let line_end = character == '\r' && characters.peek() == Some(&'\n');
        out.push(match character.len_utf8() {
            _ if line_end || !is_unsafe(character) => character,
            1 => '?',
            2 => '¿',
            _ => '\u{fffd}',
        });
    }
    Cow::Owned(out)
}

fn is_unsafe(character: char) -> bool {
    match character {
        '\n' | '\t' => false,
        '\u{200e}' | '\u{200f}' | '\u{202a}'..='\u{202e}' | '\u{2066}'..='\u{2069}' => true,
        // Line and paragraph separators, the byte order mark and the Arabic letter mark.
        '\u{2028}' | '\u{2029}' | '\u{feff}' | '\u{61c}' => true,
        _ => character.is_control(),
    }
}

#[cfg(test)]
mod tests {
    use super::plain;

    #[test]
    fn offsets_survive_the_replacement() {
        let text = "a\u{1b}[31m\u{9b}b\u{202e}c\rd\r\ne\tf";
        let safe = plain(text);
        assert_eq!(safe, "a?[31m¿b\u{fffd}c?d\r\ne\tf");
        assert_eq!(safe.len(), text.len());
    }
}
