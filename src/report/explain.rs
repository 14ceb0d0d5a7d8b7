//! What the compiler itself knows about its words: constructions, steps, functions, requirements,
//! properties, quantities, findings and the library, each from its one register.

use crate::construct;
use crate::derive::{MEASURES, properties::PROPERTIES};
use crate::evaluate::LIBRARY;
use crate::finding::render::wrap;
use crate::finding::{Class, catalogue, near_names};
use crate::require::phrases;
use crate::source::SourceId;
use crate::step;
use crate::syntax;
use crate::syntax::tree::{CodeDeclaration, DeclarationKind};
use crate::value::Entry;

/// The width that text is folded at.
const WIDTH: usize = 88;

/// The documentation of a word, or of every word of a kind (`constructions`, `steps`, `functions`,
/// `requirements`, `properties`, `quantities`, `findings`, `library`).
///
/// # Errors
/// When nothing is called so: what may have been meant.
pub fn explain(name: &str) -> Result<String, String> {
    let wanted = name.trim().replace('-', "_");
    if let Some((_, list)) = kinds().into_iter().find(|(kind, _)| *kind == wanted) {
        return Ok(listed(&list));
    }
    let mut found = Vec::new();
    for entry in construct::CONSTRUCTIONS
        .iter()
        .filter(|entry| entry.name == wanted)
    {
        found.push(documented("construction", entry));
    }
    for entry in step::STEPS.iter().filter(|entry| entry.name == wanted) {
        found.push(documented("step", entry));
    }
    for entry in construct::functions::all().filter(|entry| entry.name == wanted) {
        found.push(documented("function", entry));
    }
    for (code, text) in library()
        .into_iter()
        .filter(|(code, _)| code.name.text == wanted)
    {
        found.push(defined(&code, &text));
    }
    for phrase in
        phrases().filter(|phrase| phrase.pattern.split(' ').next() == Some(wanted.as_str()))
    {
        found.push(format!(
            "{}\n  requirement\n\n{}\n",
            shown(phrase.pattern),
            folded(phrase.says)
        ));
    }
    for property in PROPERTIES.iter().filter(|property| property.name == wanted) {
        found.push(format!(
            "{}\n  property\n\n{}\n",
            property.name,
            folded(&sentence(property.says))
        ));
    }
    for (measure, says) in MEASURES.iter().filter(|(measure, _)| *measure == wanted) {
        found.push(format!(
            "{measure}\n  quantity of a code\n\n{}\n",
            folded(&sentence(says))
        ));
    }
    for code in catalogue::ALL
        .iter()
        .filter(|code| code.name == name.trim())
    {
        found.push(format!(
            "{}\n  finding, {}\n\n{}\n",
            code.name,
            class(code.class),
            folded(code.says)
        ));
    }
    if found.is_empty() {
        return Err(unknown(name));
    }
    Ok(found.join("\n"))
}

/// The kinds of words, for a first look.
pub fn overview() -> String {
    let mut text = String::from("What can be explained, by name or by kind:\n");
    for (kind, list) in kinds() {
        let names: Vec<&str> = list.iter().map(|(name, _)| name.as_str()).collect();
        text.push_str(&format!("\n{kind}\n{}\n", folded(&names.join(", "))));
    }
    text
}

fn kinds() -> Vec<(&'static str, Vec<(String, String)>)> {
    let entry = |signature: String, says: &str| (signature, says.to_string());
    vec![
        (
            "constructions",
            construct::CONSTRUCTIONS
                .iter()
                .map(|it| entry(it.signature(), it.says))
                .collect(),
        ),
        (
            "steps",
            step::STEPS
                .iter()
                .map(|it| entry(it.signature(), it.says))
                .collect(),
        ),
        (
            "functions",
            construct::functions::all()
                .map(|it| entry(it.signature(), it.says))
                .collect(),
        ),
        (
            "requirements",
            phrases()
                .map(|it| entry(shown(it.pattern), it.says))
                .collect(),
        ),
        (
            "properties",
            PROPERTIES
                .iter()
                .map(|it| entry(it.name.to_string(), &sentence(it.says)))
                .collect(),
        ),
        (
            "quantities",
            MEASURES
                .iter()
                .map(|&(name, says)| entry(name.to_string(), &sentence(says)))
                .collect(),
        ),
        (
            "library",
            library()
                .iter()
                .map(|(code, text)| entry(signature(code), text.lines().next().unwrap_or("")))
                .collect(),
        ),
        (
            "findings",
            catalogue::ALL
                .iter()
                .map(|code| entry(code.name.to_string(), code.says))
                .collect(),
        ),
    ]
}

fn listed(list: &[(String, String)]) -> String {
    let mut text = String::new();
    for (name, says) in list {
        text.push_str(&format!("{name}\n{}\n", folded(says)));
    }
    text
}

fn documented<Run>(kind: &str, entry: &Entry<Run>) -> String {
    let mut text = format!(
        "{}\n  {kind}\n\n{}\n",
        entry.signature(),
        folded(entry.says)
    );
    if !entry.parameters.is_empty() {
        text.push('\n');
    }
    for parameter in entry.parameters {
        let optional = if parameter.optional {
            ", may be left out"
        } else {
            ""
        };
        let says = if parameter.says.is_empty() {
            String::new()
        } else {
            format!(": {}", parameter.says)
        };
        text.push_str(&format!(
            "  {}  {}{optional}{says}\n",
            parameter.name, parameter.takes
        ));
    }
    if !entry.theory.is_empty() {
        text.push_str(&format!("\n{}\n", folded(entry.theory)));
    }
    let example: Vec<String> = entry
        .example
        .lines()
        .map(|line| format!("    {line}"))
        .collect();
    text.push_str(&format!("\nFor example:\n\n{}\n", example.join("\n")));
    text
}

/// The library's codes with their documentation and text.
fn library() -> Vec<(CodeDeclaration, String)> {
    let mut found = Vec::new();
    for (at, (_, text)) in LIBRARY.iter().enumerate() {
        let parsed = syntax::parse(SourceId(at as u32), text);
        for declaration in parsed.file.declarations {
            if let DeclarationKind::Code(code) = declaration.kind {
                let source = text
                    .get(declaration.span.start as usize..declaration.span.end as usize)
                    .unwrap_or("");
                let says = declaration.documentation.unwrap_or_default();
                found.push((code, format!("{says}\n{source}")));
            }
        }
    }
    found
}

fn signature(code: &CodeDeclaration) -> String {
    let parameters: Vec<String> = code
        .parameters
        .iter()
        .map(|parameter| match parameter.default {
            Some(_) => format!("[{}]", parameter.name.text),
            None => parameter.name.text.clone(),
        })
        .collect();
    if parameters.is_empty() {
        return code.name.text.clone();
    }
    format!("{}({})", code.name.text, parameters.join(", "))
}

fn defined(code: &CodeDeclaration, text: &str) -> String {
    let (says, source) = text.split_at(text.find("\ncode ").unwrap_or(0));
    let source: Vec<String> = source
        .trim()
        .lines()
        .map(|line| format!("    {line}"))
        .collect();
    format!(
        "{}\n  code of the library\n\n{}\n\nIts definition:\n\n{}\n",
        signature(code),
        folded(says),
        source.join("\n")
    )
}

/// A pattern with letters for its operands.
fn shown(pattern: &str) -> String {
    let mut letters = ["N", "M", "L"].into_iter().cycle();
    let words: Vec<&str> = pattern
        .split(' ')
        .map(|word| {
            if word == "_" {
                letters.next().unwrap_or("N")
            } else {
                word
            }
        })
        .collect();
    words.join(" ")
}

fn sentence(says: &str) -> String {
    let mut letters = says.chars();
    let first = letters
        .next()
        .map(|letter| letter.to_uppercase().to_string());
    format!("{}{}.", first.unwrap_or_default(), letters.as_str())
}

fn class(class: Class) -> &'static str {
    match class {
        Class::Remark => "a remark: the exit status stays as it is",
        Class::Undecided => "exit status 3",
        Class::Refuted => "exit status 1",
        Class::Malformed => "exit status 2",
    }
}

fn folded(text: &str) -> String {
    let text: Vec<&str> = text.split_whitespace().collect();
    let lines: Vec<String> = wrap(&text.join(" "), WIDTH - 2)
        .into_iter()
        .map(|line| format!("  {line}"))
        .collect();
    lines.join("\n")
}

fn unknown(name: &str) -> String {
    let kinds = kinds();
    let names: Vec<&str> = kinds
        .iter()
        .flat_map(|(kind, list)| {
            let words = list
                .iter()
                .map(|(name, _)| name.split(['(', ' ']).next().unwrap_or(name));
            std::iter::once(*kind).chain(words)
        })
        .collect();
    match near_names(name, names).first() {
        Some(near) => format!("nothing is called `{name}`; did you mean `{near}`?"),
        None => format!("nothing is called `{name}`; `cosetta explain` lists what there is"),
    }
}
