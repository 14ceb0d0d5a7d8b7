//! Names, imports, and what depends on what.
//!
//! In: the texts of a run. Out: a [`Program`]: every file's tree, and a graph with a node for each
//! declaration and an edge from each user to what it uses, ready to be walked dependencies first.
//! Names that mean nothing, circles, and leftovers become findings here, so that the rooms below
//! look up a name and find it.

mod cycles;
mod load;
mod names;
mod remarks;
mod resolve;
mod walk;

use crate::finding::{Finding, near_names};
use crate::source::{Loader, SourceId, Sources, Span};
use crate::syntax::tree::{Declaration, DeclarationKind, File, Name};
use petgraph::graph::{DiGraph, NodeIndex};
use std::collections::{BTreeMap, BTreeSet};

/// The names that the compiler itself knows.
#[derive(Clone, Debug, Default)]
pub struct Builtins {
    /// Constructions, matrix builders, channel models and functions: what is called.
    pub functions: Vec<&'static str>,
    /// Steps: what follows `then`.
    pub steps: Vec<&'static str>,
    /// What a requirement may speak of: `n`, `d`, `row_weight`, `failure`, …
    pub properties: Vec<&'static str>,
}

/// What a node of the graph declares.
#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Debug)]
pub enum NodeKind {
    /// `field`
    Field,
    /// `let`
    Let,
    /// `matrix`
    Matrix,
    /// `code`
    Code,
    /// `channel`
    Channel,
    /// `deliver`
    Deliver,
}

impl NodeKind {
    /// The kind in a message: `field`, `value`, …
    pub fn word(self) -> &'static str {
        match self {
            NodeKind::Field => "field",
            NodeKind::Let => "value",
            NodeKind::Matrix => "matrix",
            NodeKind::Code => "code",
            NodeKind::Channel => "channel",
            NodeKind::Deliver => "delivery",
        }
    }
}

/// A declaration in the graph.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Node {
    /// Its name; for a delivery the name of the code.
    pub name: String,
    /// What it declares.
    pub kind: NodeKind,
    /// Which of [`Program::files`] it stands in.
    pub file: usize,
    /// Which of the file's declarations it is.
    pub declaration: usize,
    /// Where its name stands.
    pub span: Span,
    /// Whether it belongs to the language's library.
    pub library: bool,
}

/// A use of one declaration by another.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
pub struct Edge {
    /// Where the user names the used.
    pub span: Span,
}

/// A file of the program.
#[derive(Clone, Debug)]
pub struct LoadedFile {
    /// Its id among the sources.
    pub source: SourceId,
    /// The name it is shown under.
    pub name: String,
    /// What could be read of it.
    pub tree: File,
    /// Whether it belongs to the language's library.
    pub library: bool,
    /// Whether it was asked for, and not only imported.
    pub root: bool,
    /// Names that exist but whose declarations could not be read.
    pub broken: Vec<Name>,
    /// Some of it could not be read, so that something in it may be used after all.
    faulty: bool,
    /// It imports all of a file that could not be had, so that any name may come from there.
    uncertain: bool,
    own: BTreeMap<String, NodeIndex>,
    imports: BTreeMap<String, NodeIndex>,
    /// Imported names whose declarations could not be had.
    missing: BTreeSet<String>,
}

/// All files of a run and how their declarations depend on each other.
#[derive(Clone, Debug, Default)]
pub struct Program {
    /// The files: those asked for, those they import, the library.
    pub files: Vec<LoadedFile>,
    /// A node a declaration, an edge from each user to what it uses.
    pub graph: DiGraph<Node, Edge>,
    library: BTreeMap<String, NodeIndex>,
    broken: BTreeSet<NodeIndex>,
    broken_clauses: BTreeSet<(NodeIndex, usize)>,
    order: Vec<NodeIndex>,
}

/// Reads `roots` and `library` (already among `sources`) and all files they import, and ties names
/// to what they mean. Findings come in the order of files and places.
pub fn build(
    sources: &mut Sources,
    roots: &[SourceId],
    library: &[SourceId],
    loader: &dyn Loader,
    builtins: &Builtins,
) -> (Program, Vec<Finding>) {
    let mut findings = Vec::new();
    let mut program = Program::default();
    let imports = load::files(&mut program, sources, roots, library, loader, &mut findings);
    names::declare(&mut program, &mut findings);
    names::import(&mut program, &imports, &mut findings);
    let references = resolve::resolve(&mut program, builtins, &mut findings);
    cycles::find(&mut program, &mut findings);
    remarks::unused(&program, &imports, &references, &mut findings);
    remarks::shadowed(&program, builtins, &mut findings);
    findings.sort_by_key(|finding| (finding.span.source, finding.span.start));
    (program, findings)
}

impl Program {
    /// What `name` means in a file: its own declarations first, then what it imports, then the
    /// library.
    pub fn lookup(&self, file: usize, name: &str) -> Option<NodeIndex> {
        let file = self.files.get(file)?;
        let found = file.own.get(name).or_else(|| file.imports.get(name));
        found.or_else(|| self.library.get(name)).copied()
    }

    /// The declaration behind a node.
    pub fn declaration(&self, node: NodeIndex) -> &Declaration {
        let Node {
            file, declaration, ..
        } = &self.graph[node];
        &self.files[*file].tree.declarations[*declaration]
    }

    /// All sound declarations, each behind what it depends on.
    pub fn order(&self) -> Vec<NodeIndex> {
        self.order.clone()
    }

    /// Whether a declaration has no meaning: a name in it is unknown, it lies in a circle, or it
    /// depends on such a one. A finding has said so already.
    pub fn broken(&self, node: NodeIndex) -> bool {
        self.broken.contains(&node)
    }

    /// Whether a clause of a code (counted from 0) names something that is unknown or broken,
    /// while the code itself is sound. A finding has said so already.
    pub fn broken_clause(&self, node: NodeIndex, clause: usize) -> bool {
        self.broken_clauses.contains(&(node, clause))
    }
}

/// The name a declaration gives, and its kind; nothing for `use`.
fn declared(kind: &DeclarationKind) -> Option<(&Name, NodeKind)> {
    Some(match kind {
        DeclarationKind::Field(it) => (&it.name, NodeKind::Field),
        DeclarationKind::Let(it) => (&it.name, NodeKind::Let),
        DeclarationKind::Matrix(it) => (&it.name, NodeKind::Matrix),
        DeclarationKind::Code(it) => (&it.name, NodeKind::Code),
        DeclarationKind::Channel(it) => (&it.name, NodeKind::Channel),
        DeclarationKind::Use(_) | DeclarationKind::Deliver(_) => return None,
    })
}

/// `did you mean …?` with the nearest of `known`; nothing when none is near.
fn suggestion<'a>(wanted: &str, known: impl IntoIterator<Item = &'a str>) -> Option<String> {
    let near = near_names(wanted, known);
    let distance = |name: &str| strsim::damerau_levenshtein(wanted, name);
    let best = near.first().map(|name| distance(name))?;
    let nearest: Vec<String> = near
        .into_iter()
        .filter(|name| distance(name) <= best)
        .map(|name| format!("`{name}`"))
        .collect();
    Some(format!("did you mean {}?", nearest.join(" or ")))
}
