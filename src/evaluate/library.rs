//! The language's own library, read at build time: always in scope.

macro_rules! library {
    ($($name:literal),* $(,)?) => {
        &[$(($name, include_str!(concat!("../../specs/", $name)))),*]
    };
}

/// File names and texts.
pub const LIBRARY: &[(&str, &str)] = library![
    "basic.coset",
    "hamming.coset",
    "reed_muller.coset",
    "cyclic.coset",
    "classics.coset",
    "memory.coset",
    "standards/crc.coset",
    "standards/reed_solomon.coset",
];
