//! Small counts and lists of positions, as a reader expects them in a line of text.

/// A count with its noun, the number in words up to twelve: `three columns`, `40 columns`.
pub(super) fn count(number: usize, one: &str, many: &str) -> String {
    const WORDS: [&str; 13] = [
        "no", "one", "two", "three", "four", "five", "six", "seven", "eight", "nine", "ten",
        "eleven", "twelve",
    ];
    let noun = if number == 1 { one } else { many };
    match WORDS.get(number) {
        Some(word) => format!("{word} {noun}"),
        None => format!("{number} {noun}"),
    }
}

/// Positions in a sentence: `0, 1, 64 and 71`.
pub(super) fn list(positions: &[usize]) -> String {
    let Some((last, others)) = positions.split_last() else {
        return String::new();
    };
    if others.is_empty() {
        return last.to_string();
    }
    let others: Vec<String> = others.iter().map(usize::to_string).collect();
    format!("{} and {last}", others.join(", "))
}
