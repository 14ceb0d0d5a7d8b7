//! The order of the house: which room may use which, who prints, and how long a file may be.

use cosetta::finding::catalogue;
use std::path::{Path, PathBuf};

/// Files longer than this are hard to keep in mind.
const LINES: usize = 450;

/// Files that are longer, each with the reason.
const LONG_FILES: &[(&str, &str)] = &[
    (
        "src/derive/properties.rs",
        "one table of properties, each beside its decision",
    ),
    (
        "src/syntax/tree.rs",
        "the whole tree on one page, as a reader looks it up",
    ),
    (
        "src/derive/search/columns.rs",
        "two ways to meet columns that share their tables",
    ),
    ("src/evaluate/calls.rs", "a little over"),
    ("src/algebra/field/mod.rs", "a little over"),
];

/// Uses of a room further down, each with the reason.
const EXCEPTIONS: &[(&str, &str, &str)] = &[];

/// Kinds of findings that no rule raises so far, each with what they wait for.
const WAITING: &[(&str, &str)] = &[
    (
        "unstated-modulus",
        "a field of prime power order without `where`",
    ),
    ("unstated-root-field", "roots named in an assumed field"),
    (
        "unstated-convention",
        "a delivered file that depends on an open convention",
    ),
    (
        "redundant-checks",
        "a given check matrix of less than full rank",
    ),
    ("bad-file-content", "matrices read from files"),
];

fn root() -> &'static Path {
    Path::new(env!("CARGO_MANIFEST_DIR"))
}

/// All files below a folder with an ending, as paths from the root with `/` between folders.
fn files(folder: &str, ending: &str) -> Vec<(String, String)> {
    let mut found = Vec::new();
    let mut folders: Vec<PathBuf> = vec![root().join(folder)];
    while let Some(folder) = folders.pop() {
        let Ok(entries) = std::fs::read_dir(&folder) else {
            continue;
        };
        for entry in entries {
            let path = entry.expect("an entry").path();
            if path.is_dir() {
                folders.push(path);
            } else if path.to_string_lossy().ends_with(ending) {
                let text = std::fs::read_to_string(&path).expect("text");
                let name = path.strip_prefix(root()).expect("below the root");
                found.push((name.to_string_lossy().replace('\\', "/"), text));
            }
        }
    }
    found.sort();
    found
}

/// The rooms in the order of `src/lib.rs`.
fn rooms() -> Vec<String> {
    let text = std::fs::read_to_string(root().join("src/lib.rs")).expect("lib.rs");
    text.lines()
        .filter_map(|line| line.strip_prefix("pub mod ")?.strip_suffix(';'))
        .map(str::to_string)
        .collect()
}

fn room_of(file: &str) -> Option<&str> {
    let inside = file.strip_prefix("src/")?;
    let (room, _) = inside
        .split_once('/')
        .unwrap_or((inside.strip_suffix(".rs")?, ""));
    Some(room)
}

/// A file's code, line by line: comments left out, and what follows the first test module.
fn code(text: &str) -> impl Iterator<Item = (usize, &str)> {
    text.lines()
        .enumerate()
        .take_while(|(_, line)| !line.starts_with("#[cfg(test)]"))
        .filter(|(_, line)| !line.trim_start().starts_with("//"))
        .map(|(at, line)| (at + 1, line))
}

/// The names after `crate::`, braces opened.
fn used_rooms(line: &str) -> Vec<String> {
    let mut found = Vec::new();
    for (at, _) in line.match_indices("crate::") {
        let rest = &line[at + "crate::".len()..];
        let name = |text: &str| -> String {
            text.chars()
                .take_while(|letter| letter.is_alphanumeric() || *letter == '_')
                .collect()
        };
        match rest.strip_prefix('{') {
            Some(list) => found.extend(list.split(',').map(|part| name(part.trim()))),
            None => found.push(name(rest)),
        }
    }
    found
}

#[test]
fn a_room_uses_only_rooms_above_it() {
    let rooms = rooms();
    let place = |room: &str| rooms.iter().position(|known| known == room);
    let mut wrong = Vec::new();
    for (file, text) in files("src", ".rs") {
        let Some(own) = room_of(&file).and_then(place) else {
            continue;
        };
        for (at, line) in code(&text) {
            for used in used_rooms(line) {
                let below = place(&used).is_some_and(|used| used > own);
                let allowed = EXCEPTIONS
                    .iter()
                    .any(|&(known, room, _)| known == file && room == used);
                if below && !allowed {
                    wrong.push(format!("{file}:{at} uses {used}, further down"));
                }
            }
        }
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

#[test]
fn every_folder_of_the_source_is_a_room_of_the_list() {
    let rooms = rooms();
    for (file, _) in files("src", ".rs") {
        let room = room_of(&file).expect("below src");
        assert!(
            ["lib", "main"].contains(&room) || rooms.iter().any(|known| known == room),
            "{file} is in no room of src/lib.rs"
        );
    }
}

#[test]
fn only_the_command_prints_or_reads_the_environment() {
    let words = [
        "println!",
        "print!(",
        "eprintln!",
        "eprint!(",
        "dbg!",
        "std::env",
        "env::var",
        "stdout()",
        "stderr()",
    ];
    let mut wrong = Vec::new();
    for (file, text) in files("src", ".rs") {
        // Tests of a room may print: it is their way to tell how long something took.
        if file.ends_with("/tests.rs") {
            continue;
        }
        if ["command", "editor", "main"].contains(&room_of(&file).expect("below src")) {
            continue;
        }
        for (at, line) in code(&text) {
            if words.iter().any(|word| line.contains(word)) {
                wrong.push(format!("{file}:{at}: {}", line.trim()));
            }
        }
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

#[test]
fn unsafe_stands_only_in_the_kernels() {
    for (file, text) in files("src", ".rs") {
        if file.starts_with("src/algebra/kernels") {
            continue;
        }
        for (at, line) in code(&text) {
            let words = line.split(|letter: char| !letter.is_alphanumeric() && letter != '_');
            assert!(
                words.into_iter().all(|word| word != "unsafe"),
                "{file}:{at}: {line}"
            );
        }
    }
}

#[test]
fn no_file_is_too_long_to_keep_in_mind() {
    let mut wrong = Vec::new();
    for (file, text) in files("src", ".rs") {
        let lines = text.lines().count();
        let allowed = LONG_FILES.iter().any(|&(known, _)| known == file);
        if lines > LINES && !allowed {
            wrong.push(format!("{file} has {lines} lines"));
        }
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

#[test]
fn every_module_says_what_it_is_for() {
    for (file, text) in files("src", ".rs") {
        let allowed = text.starts_with("//!") || file.ends_with("tests.rs");
        assert!(allowed, "{file} does not say what it is for");
    }
}

#[test]
fn nothing_is_left_to_be_done() {
    // The words are put together here so that this file does not hold them.
    let words = [["TO", "DO"], ["FIX", "ME"]].map(|halves| halves.concat());
    let macros =
        ["to".to_string() + "do", "un".to_string() + "implemented"].map(|name| format!("{name}!"));
    for folder in ["src", "tests", "specs", "grammar", "benches"] {
        for (file, text) in files(folder, "") {
            if file == "tests/house.rs" {
                continue;
            }
            for word in words.iter().chain(&macros) {
                assert!(!text.contains(word.as_str()), "{file} says {word}");
            }
        }
    }
}

/// The name of the constant of a finding's code, as `catalogue.rs` has it.
fn constants() -> Vec<(String, String)> {
    let text = std::fs::read_to_string(root().join("src/finding/catalogue.rs")).expect("text");
    let found: Vec<(String, String)> = text
        .lines()
        .filter_map(|line| {
            let (constant, rest) = line.trim().split_once(" = \"")?;
            let (name, rest) = rest.split_once('"')?;
            rest.starts_with(", ")
                .then(|| (constant.to_string(), name.to_string()))
        })
        .collect();
    assert_eq!(found.len(), catalogue::ALL.len());
    found
}

#[test]
fn every_kind_of_finding_is_raised_and_seen() {
    let source = files("src", ".rs");
    let mut seen = files("tests", ".snap");
    seen.extend(
        files("tests", ".rs")
            .into_iter()
            .filter(|(file, _)| file != "tests/house.rs"),
    );
    let mut wrong = Vec::new();
    for (constant, name) in constants() {
        if WAITING.iter().any(|&(waiting, _)| waiting == name) {
            continue;
        }
        let raised = source
            .iter()
            .filter(|(file, _)| file != "src/finding/catalogue.rs")
            .any(|(_, text)| {
                text.contains(&format!("catalogue::{constant}"))
                    || text.contains(&format!("{constant},"))
            });
        if !raised {
            wrong.push(format!("{name} is never raised"));
        }
        let whole = |text: &str| {
            text.match_indices(&name).any(|(at, _)| {
                let after = text[at + name.len()..].chars().next();
                let before = text[..at].chars().next_back();
                let part = |letter: Option<char>| {
                    letter.is_some_and(|letter| letter.is_alphanumeric() || letter == '-')
                };
                !part(before) && !part(after)
            })
        };
        if !seen.iter().any(|(_, text)| whole(text)) {
            wrong.push(format!("{name} is seen by no test"));
        }
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}
