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

/// The words that begin a phrase of the requirement vocabulary.
pub const PHRASE_VERBS: &[&str] = &[
    "corrects",
    "detects",
    "recovers",
    "repairs",
    "miscorrects",
    "never",
    "contains",
    "within",
    "same",
    "equivalent",
    "meets",
    "full",
    "balanced",
    "checks",
    "divisible",
    "quasi_cyclic",
    "proper",
];

/// The other words of its phrases, for near matches.
pub const PHRASE_WORDS: &[&str] = &[
    "while",
    "detecting",
    "correcting",
    "losses",
    "errors",
    "bursts",
    "cyclic",
    "adjacent",
    "slips",
    "most",
    "miscorrects",
    "singles",
    "doubles",
    "triples",
    "reading",
    "with",
    "groups",
    "rank",
    "rows",
    "index",
    "code",
    "matrix",
    "positions",
    "symbols",
    "words",
    "four_cycles",
    "all_zeros",
    "all_ones",
];
