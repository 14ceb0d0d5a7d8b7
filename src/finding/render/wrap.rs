//! Folding of running text at a width.

use unicode_width::UnicodeWidthStr;

/// The width of a text on a terminal, in columns.
pub fn width_of(text: &str) -> usize {
    UnicodeWidthStr::width(text)
}

/// `text` folded at blanks into lines of at most `width` columns; a longer word stays whole. Line
/// feeds are kept, and so are the blanks a line begins with (an example inside a help text); a line
/// that fits stays as it is.
pub fn wrap(text: &str, width: usize) -> Vec<String> {
    let mut lines = Vec::new();
    for paragraph in text.split('\n') {
        if width_of(paragraph) <= width {
            lines.push(paragraph.trim_end().to_string());
            continue;
        }
        let indent: String = paragraph
            .chars()
            .take_while(|character| *character == ' ')
            .collect();
        let mut line = indent.clone();
        let mut empty = true;
        for word in paragraph.split_whitespace() {
            if !empty && width_of(&line) + 1 + width_of(word) > width {
                lines.push(std::mem::replace(&mut line, indent.clone()));
                empty = true;
            }
            if !empty {
                line.push(' ');
            }
            line.push_str(word);
            empty = false;
        }
        lines.push(if empty { String::new() } else { line });
    }
    lines
}

#[cfg(test)]
mod tests {
    use super::wrap;

    #[test]
    fn words_are_folded_and_never_cut() {
        assert_eq!(wrap("one two three", 7), ["one two", "three"]);
        assert_eq!(wrap("extraordinary x", 5), ["extraordinary", "x"]);
        assert_eq!(wrap("a\n  b c", 4), ["a", "  b", "  c"]);
        assert_eq!(wrap("| 1  0 |", 8), ["| 1  0 |"]);
        assert_eq!(wrap("", 10), [""]);
    }
}
