//! The dependency graph of a spec, drawn.
//!
//! In: a [`Diagram`], plain names and edges. Out: a description for Graphviz ([`dot`]) or a
//! finished picture ([`svg`]), which is laid out here so that nobody needs another program to see
//! it. What is used stands to the left of what uses it; each file has a lane of its own.

mod dot;
mod heights;
mod layout;
mod svg;

pub use dot::dot;
pub use svg::svg;

use super::model::Verdict;

/// Declarations and what they use.
#[derive(Clone, PartialEq, Eq, Debug, Default)]
pub struct Diagram {
    /// What it shows: the spec's name, say.
    pub title: String,
    /// The files, in the order of their lanes.
    pub files: Vec<String>,
    /// The declarations.
    pub nodes: Vec<DiagramNode>,
    /// Pairs of indices into the nodes: the user, and what it uses.
    pub edges: Vec<(usize, usize)>,
}

/// One declaration.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct DiagramNode {
    /// As declared.
    pub name: String,
    /// The word it is declared with: `field`, `matrix`, `code`, `channel`, `deliver`, `let`.
    pub kind: String,
    /// What is known of it in a few characters (`[72, 64, 4]`); may be empty.
    pub caption: String,
    /// Whether it belongs to the language's library.
    pub library: bool,
    /// The index of its file.
    pub file: usize,
    /// The worst verdict of its claims and requirements, if it has any.
    pub verdict: Option<Verdict>,
}

impl Diagram {
    /// The edges that can be drawn, each once, sorted.
    fn clean_edges(&self) -> Vec<(usize, usize)> {
        let count = self.nodes.len();
        let mut edges: Vec<(usize, usize)> = self
            .edges
            .iter()
            .copied()
            .filter(|&(user, used)| user < count && used < count)
            .collect();
        edges.sort_unstable();
        edges.dedup();
        edges
    }
}

/// Outline and fill of a kind of declaration. The outlines are the colours that Okabe and Ito
/// chose to be told apart by the colour-blind (Color Universal Design, 2008); the fills are tints
/// light enough for black print.
fn colors(kind: &str) -> (&'static str, &'static str) {
    match kind {
        "field" => ("#b57b00", "#fdf1d8"),
        "matrix" => ("#2b8fc7", "#e6f4fc"),
        "code" => ("#005a8c", "#dcebf5"),
        "channel" => ("#a8557f", "#f8e9f1"),
        "deliver" => ("#007a59", "#dcf2eb"),
        _ => ("#59636e", "#f0f2f4"),
    }
}

/// The second line of a node: its kind and what is known of it.
fn second_line(node: &DiagramNode) -> String {
    if node.caption.is_empty() {
        node.kind.clone()
    } else {
        format!("{} {}", node.kind, node.caption)
    }
}
