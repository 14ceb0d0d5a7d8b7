//! Advice: what nothing uses, and what takes a name of the library.

use super::load::Import;
use super::{Builtins, NodeKind, Program};
use crate::finding::{Finding, catalogue};
use crate::source::Span;
use crate::syntax::tree::DeclarationKind;
use petgraph::Direction;
use std::collections::BTreeSet;

/// Declarations that nothing uses, in files that were asked for and that declare a code or a
/// delivery: a file of shared fields or matrices is there for others.
pub fn unused(
    program: &Program,
    imports: &[Import],
    used: &BTreeSet<(usize, String)>,
    findings: &mut Vec<Finding>,
) {
    for node in program.graph.node_indices() {
        let declared = &program.graph[node];
        let file = &program.files[declared.file];
        let kept = matches!(declared.kind, NodeKind::Code | NodeKind::Deliver);
        let meant = file.own.get(&declared.name) == Some(&node);
        let mut users = program.graph.neighbors_directed(node, Direction::Incoming);
        if kept || !meant || !worth_remarks(program, declared.file) || users.next().is_some() {
            continue;
        }
        let what = format!("the {} `{}`", declared.kind.word(), declared.name);
        findings.push(remark(declared.span, &what));
    }
    for import in imports {
        unused_import(program, import, used, findings);
    }
}

fn worth_remarks(program: &Program, file: usize) -> bool {
    let file = &program.files[file];
    let whole = |kind: &DeclarationKind| {
        matches!(kind, DeclarationKind::Code(_) | DeclarationKind::Deliver(_))
    };
    file.root
        && !file.library
        && !file.faulty
        && !file.uncertain
        && file
            .tree
            .declarations
            .iter()
            .any(|declaration| whole(&declaration.kind))
}

fn unused_import(
    program: &Program,
    import: &Import,
    used: &BTreeSet<(usize, String)>,
    findings: &mut Vec<Finding>,
) {
    let declaration = &program.files[import.file].tree.declarations[import.declaration];
    let (DeclarationKind::Use(it), Some(target)) = (&declaration.kind, import.target) else {
        return;
    };
    if !worth_remarks(program, import.file) {
        return;
    }
    let is_used = |name: &str| used.contains(&(import.file, name.to_string()));
    match &it.names {
        Some(names) => {
            for name in names.iter().filter(|name| !is_used(&name.text)) {
                if program.files[import.file].imports.contains_key(&name.text) {
                    findings.push(remark(name.span, &format!("the imported `{}`", name.text)));
                }
            }
        }
        None => {
            if !program.files[target].own.keys().any(|name| is_used(name)) {
                findings.push(remark(
                    it.path.span,
                    &format!("what {} declares", program.files[target].name),
                ));
            }
        }
    }
}

fn remark(span: Span, what: &str) -> Finding {
    Finding::new(catalogue::UNUSED, span, format!("{what} is never used"))
        .label("not used in this file")
        .help("delete it if it is a leftover, or look for a misspelt use")
}

/// Declarations that take the name of one in the library or of the compiler's own.
pub fn shadowed(program: &Program, builtins: &Builtins, findings: &mut Vec<Finding>) {
    for node in program.graph.node_indices() {
        let declared = &program.graph[node];
        if declared.library || declared.kind == NodeKind::Deliver {
            continue;
        }
        let name = &declared.name;
        let finding = |owner: &str| {
            Finding::new(
                catalogue::SHADOWED_LIBRARY,
                declared.span,
                format!("`{name}` takes the name of {owner}"),
            )
            .label("this file now means its own")
            .help("choose another name if that one is still wanted here")
        };
        if let Some(&other) = program.library.get(name) {
            let owner = format!("the library's {}", program.graph[other].kind.word());
            findings.push(finding(&owner).related(program.graph[other].span, "the library's"));
        } else if builtins.functions.contains(&name.as_str()) {
            findings.push(finding("a construction or function of the compiler"));
        }
    }
}
