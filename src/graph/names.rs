//! Makes a node of every declaration and ties imported names to them.

use super::load::Import;
use super::{Node, NodeKind, Program, declared, suggestion};
use crate::finding::{Finding, catalogue};
use crate::source::Span;
use crate::syntax::tree::{DeclarationKind, ExpressionKind, Name, Use};
use std::collections::BTreeMap;

/// Adds a node for every declaration but `use`; of two with one name the first is meant.
pub fn declare(program: &mut Program, findings: &mut Vec<Finding>) {
    for file in 0..program.files.len() {
        for declaration in 0..program.files[file].tree.declarations.len() {
            declare_one(program, file, declaration, findings);
        }
    }
}

fn declare_one(
    program: &mut Program,
    file: usize,
    declaration: usize,
    findings: &mut Vec<Finding>,
) {
    let library = program.files[file].library;
    let kind = &program.files[file].tree.declarations[declaration].kind;
    let node = |name: &str, kind, span| Node {
        name: name.to_string(),
        kind,
        file,
        declaration,
        span,
        library,
    };
    if let DeclarationKind::Deliver(it) = kind {
        let name = match &it.code.kind {
            ExpressionKind::Name(name) => name.as_str(),
            ExpressionKind::Call { function, .. } => function.text.as_str(),
            _ => "",
        };
        let node = node(name, NodeKind::Deliver, it.code.span);
        program.graph.add_node(node);
        return;
    }
    let Some((name, kind)) = declared(kind) else {
        return;
    };
    let (text, span) = (name.text.clone(), name.span);
    let index = program.graph.add_node(node(&text, kind, span));
    if let Some(&first) = program.files[file].own.get(&text) {
        findings.push(duplicate(&text, span, program.graph[first].span));
        return;
    }
    program.files[file].own.insert(text.clone(), index);
    if library {
        program.library.entry(text).or_insert(index);
    }
}

fn duplicate(name: &str, span: Span, first: Span) -> Finding {
    Finding::new(
        catalogue::DUPLICATE_NAME,
        span,
        format!("`{name}` is declared twice"),
    )
    .label("declared again")
    .related(first, "declared first here, and this one is meant")
    .help("give one of them another name, or delete it")
}

/// Ties the names that `use` brings in.
pub fn import(program: &mut Program, imports: &[Import], findings: &mut Vec<Finding>) {
    let mut places: BTreeMap<(usize, String), Span> = BTreeMap::new();
    for import in imports {
        let declarations = &program.files[import.file].tree.declarations;
        let DeclarationKind::Use(it) = declarations[import.declaration].kind.clone() else {
            continue;
        };
        let Some(target) = import.target else {
            let file = &mut program.files[import.file];
            file.uncertain |= it.names.is_none();
            file.missing
                .extend(it.names.into_iter().flatten().map(|name| name.text));
            continue;
        };
        for name in wanted(program, &it, target) {
            import_one(program, import.file, target, &name, &mut places, findings);
        }
    }
}

/// The names a `use` takes; those of a plain `use` stand where its path does.
fn wanted(program: &Program, it: &Use, target: usize) -> Vec<Name> {
    let all = || {
        let own = program.files[target].own.keys().cloned();
        let broken = program.files[target]
            .broken
            .iter()
            .map(|name| name.text.clone());
        own.chain(broken)
            .map(|text| Name {
                text,
                span: it.path.span,
            })
            .collect()
    };
    it.names.clone().unwrap_or_else(all)
}

fn import_one(
    program: &mut Program,
    file: usize,
    target: usize,
    name: &Name,
    places: &mut BTreeMap<(usize, String), Span>,
    findings: &mut Vec<Finding>,
) {
    let Some(&node) = program.files[target].own.get(&name.text) else {
        if !program.files[target]
            .broken
            .iter()
            .any(|broken| broken.text == name.text)
        {
            findings.push(unknown_import(program, target, name));
        }
        program.files[file].missing.insert(name.text.clone());
        return;
    };
    let key = (file, name.text.clone());
    let other = program.files[file]
        .imports
        .get(&name.text)
        .filter(|&&other| other != node);
    if let (Some(_), Some(&first)) = (other, places.get(&key)) {
        findings.push(
            Finding::new(
                catalogue::DUPLICATE_NAME,
                name.span,
                format!("`{}` is imported from two files", name.text),
            )
            .label("imported again")
            .related(first, "imported first here, and this one is meant")
            .help("name what is wanted of each file: `use \"file.coset\" (a, b)`"),
        );
        return;
    }
    let own = program.files[file]
        .own
        .get(&name.text)
        .map(|&own| program.graph[own].span);
    let path_only = program.sources_path(file, name.span);
    if let (Some(own), false) = (own, path_only) {
        findings.push(duplicate(&name.text, name.span, own));
        return;
    }
    places.insert(key, name.span);
    program.files[file].imports.insert(name.text.clone(), node);
}

fn unknown_import(program: &Program, target: usize, name: &Name) -> Finding {
    let file = &program.files[target];
    let message = format!("{} declares no `{}`", file.name, name.text);
    let finding =
        Finding::new(catalogue::UNKNOWN_IMPORT, name.span, message).label("not declared there");
    let quoted = |names: Vec<&str>| {
        names
            .iter()
            .map(|name| format!("`{name}`"))
            .collect::<Vec<_>>()
    };
    if let Some(help) = suggestion(&name.text, file.own.keys().map(String::as_str)) {
        return finding.help(help);
    }
    match file.own.len() {
        0 => finding.help("it declares nothing"),
        1..=8 => {
            let names = quoted(file.own.keys().map(String::as_str).collect());
            finding.help(format!("it declares {}", names.join(", ")))
        }
        count => finding.help(format!("none of its {count} names is near this one")),
    }
}

impl Program {
    /// Whether `span` is the path of a `use`, so that the name was not asked for by itself.
    fn sources_path(&self, file: usize, span: Span) -> bool {
        self.files[file].tree.declarations.iter().any(|declaration| {
            matches!(&declaration.kind, DeclarationKind::Use(it) if it.path.span == span)
        })
    }
}
