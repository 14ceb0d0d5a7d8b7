//! The words of the language, for the scan and for messages; the grammar says where each stands.

/// The words that begin a declaration.
pub const DECLARATIONS: &[&str] = &[
    "use", "field", "let", "matrix", "code", "channel", "deliver",
];

/// The words that no declaration, parameter or variable may take as its name.
pub const RESERVED: &[&str] = &[
    "use",
    "field",
    "let",
    "matrix",
    "code",
    "channel",
    "deliver",
    "over",
    "then",
    "is",
    "require",
    "prefer",
    "bits",
    "note",
    "where",
    "as",
    "to",
    "if",
    "else",
    "for",
    "in",
    "and",
    "or",
    "not",
    "mod",
    "div",
    "true",
    "false",
    "pick",
    "from",
    "minimizing",
    "maximizing",
];

/// Whether `word` cannot be a name.
pub fn is_reserved(word: &str) -> bool {
    RESERVED.contains(&word)
}
