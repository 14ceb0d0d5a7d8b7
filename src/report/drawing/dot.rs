//! The diagram in Graphviz's language (The DOT Language, graphviz.org).

use std::fmt::Write;

use super::{Diagram, DiagramNode, colors, second_line};
use crate::finding::render::plain;
use crate::report::model::Verdict;

/// A `digraph` with one cluster a file; arrows lead from what is used to what uses it.
pub fn dot(diagram: &Diagram) -> String {
    let mut out = format!("digraph {} {{\n", quoted(&diagram.title));
    out.push_str(
        "  rankdir=LR;\n  node [shape=box, style=\"filled,rounded\", fontname=\"Helvetica\"];\n",
    );
    let lanes = diagram.files.len().max(1);
    for file in 0..lanes {
        let members: Vec<(usize, &DiagramNode)> = diagram
            .nodes
            .iter()
            .enumerate()
            .filter(|(_, node)| node.file.min(lanes - 1) == file)
            .collect();
        if members.is_empty() {
            continue;
        }
        let _ = writeln!(out, "  subgraph cluster_{file} {{");
        if let Some(name) = diagram.files.get(file) {
            let _ = writeln!(out, "    label={};", quoted(name));
        }
        for (index, node) in members {
            let _ = writeln!(out, "    n{index} [{}];", attributes(node));
        }
        out.push_str("  }\n");
    }
    for (user, used) in diagram.clean_edges() {
        let _ = writeln!(out, "  n{used} -> n{user};");
    }
    out.push_str("}\n");
    out
}

fn attributes(node: &DiagramNode) -> String {
    let (outline, fill) = colors(&node.kind);
    let verdict = match node.verdict {
        Some(verdict) => format!("\n{}", verdict.word()),
        None => String::new(),
    };
    let label = format!("{}\n{}{verdict}", node.name, second_line(node));
    let style = match (node.library, node.verdict) {
        (true, _) => ", style=\"filled,rounded,dashed\"",
        (false, Some(Verdict::Fails)) => ", penwidth=3",
        _ => "",
    };
    format!(
        "label={}, color=\"{outline}\", fillcolor=\"{fill}\"{style}",
        quoted(&label)
    )
}

/// A double-quoted string: quotes and backslashes are escaped, line feeds are `\n`.
fn quoted(text: &str) -> String {
    let text = plain(text);
    let text = text.replace('\\', "\\\\").replace('"', "\\\"");
    format!("\"{}\"", text.replace('\n', "\\n").replace('\t', " "))
}
