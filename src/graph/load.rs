//! Reads the files of a run: those asked for, the library, and what they import.

use super::{LoadedFile, Program};
use crate::finding::{Finding, catalogue};
use crate::source::{Loader, SourceId, Sources, Span};
use crate::syntax::parse;
use crate::syntax::tree::{DeclarationKind, Use};
use petgraph::algo::kosaraju_scc;
use petgraph::graph::{DiGraph, NodeIndex};
use std::collections::{BTreeMap, BTreeSet, VecDeque};

/// The most files that one run reads.
const MAX_FILES: usize = 1000;

/// A `use` that was followed.
#[derive(Clone, Debug)]
pub struct Import {
    /// Which file says so.
    pub file: usize,
    /// Which of its declarations.
    pub declaration: usize,
    /// Which file is meant; `None` when it could not be read.
    pub target: Option<usize>,
}

/// Fills [`Program::files`], each file once.
pub fn files(
    program: &mut Program,
    sources: &mut Sources,
    roots: &[SourceId],
    library: &[SourceId],
    loader: &dyn Loader,
    findings: &mut Vec<Finding>,
) -> Vec<Import> {
    let mut reading = Reading {
        program,
        sources,
        findings,
        by_name: BTreeMap::new(),
    };
    let given = roots
        .iter()
        .map(|&id| (id, true))
        .chain(library.iter().map(|&id| (id, false)));
    for (id, root) in given {
        reading.add(id, root);
    }
    let mut imports = Vec::new();
    let mut file = 0;
    while file < reading.program.files.len() {
        for (declaration, it) in uses(&reading.program.files[file]) {
            let target = reading.follow(file, &it, loader);
            imports.push(Import {
                file,
                declaration,
                target,
            });
        }
        file += 1;
    }
    circles(program, &imports, findings);
    imports
}

struct Reading<'a> {
    program: &'a mut Program,
    sources: &'a mut Sources,
    findings: &'a mut Vec<Finding>,
    by_name: BTreeMap<(bool, String), usize>,
}

impl Reading<'_> {
    fn add(&mut self, source: SourceId, root: bool) -> usize {
        let file = self.sources.get(source);
        let (name, library) = (file.name.clone(), file.library);
        if let Some(&known) = self.by_name.get(&(library, name.clone())) {
            return known;
        }
        let parsed = parse(source, &file.text);
        let faulty = !parsed.findings.is_empty();
        self.findings.extend(parsed.findings);
        let index = self.program.files.len();
        self.by_name.insert((library, name.clone()), index);
        self.program.files.push(LoadedFile {
            source,
            name,
            tree: parsed.file,
            library,
            root,
            broken: parsed.broken,
            faulty,
            uncertain: parsed.broken_use,
            own: BTreeMap::new(),
            imports: BTreeMap::new(),
            missing: BTreeSet::new(),
        });
        index
    }

    fn follow(&mut self, file: usize, it: &Use, loader: &dyn Loader) -> Option<usize> {
        let from = &self.program.files[file];
        let (name, bytes) = match loader.load(&from.name, &it.path.value) {
            Ok(loaded) => loaded,
            Err(error) => {
                self.findings.push(
                    Finding::new(catalogue::UNREADABLE_FILE, it.path.span, format!("cannot read {error}"))
                        .label("imported here")
                        .help("paths are relative to the file that names them, with `/` between folders, and stay below the project's root"),
                );
                return None;
            }
        };
        let library = from.library;
        if let Some(&known) = self.by_name.get(&(library, name.clone())) {
            return Some(known);
        }
        if self.program.files.len() >= MAX_FILES {
            let message = format!("more than {MAX_FILES} files are imported");
            self.findings.push(
                Finding::new(catalogue::LIMIT, it.path.span, message).label("one file too many"),
            );
            return None;
        }
        match String::from_utf8(bytes) {
            Ok(text) if library => {
                let id = self.sources.add_library(name, text);
                Some(self.add(id, false))
            }
            Ok(text) => {
                let id = self.sources.add(name, text);
                Some(self.add(id, false))
            }
            Err(error) => {
                let at = error.utf8_error().valid_up_to();
                let message = format!("{name} is not UTF-8 text: byte {at} begins no character");
                self.findings.push(
                    Finding::new(catalogue::BAD_TEXT, it.path.span, message)
                        .label("imported here")
                        .help("save the file as UTF-8"),
                );
                None
            }
        }
    }
}

/// The `use` declarations of a file and their places among its declarations.
fn uses(file: &LoadedFile) -> Vec<(usize, Use)> {
    let declarations = file.tree.declarations.iter().enumerate();
    declarations
        .filter_map(|(index, declaration)| match &declaration.kind {
            DeclarationKind::Use(it) => Some((index, it.clone())),
            _ => None,
        })
        .collect()
}

/// Files that import each other in a circle, one finding a circle.
fn circles(program: &Program, imports: &[Import], findings: &mut Vec<Finding>) {
    let mut graph: DiGraph<(), Span> = DiGraph::new();
    for _ in &program.files {
        graph.add_node(());
    }
    for import in imports {
        let declaration = &program.files[import.file].tree.declarations[import.declaration];
        if let (Some(target), DeclarationKind::Use(it)) = (import.target, &declaration.kind) {
            graph.add_edge(
                NodeIndex::new(import.file),
                NodeIndex::new(target),
                it.path.span,
            );
        }
    }
    let name = |file: NodeIndex| program.files[file.index()].name.clone();
    for group in kosaraju_scc(&graph) {
        let Some(path) = circle(&graph, &group) else {
            continue;
        };
        let Some(&(_, first)) = path.first() else {
            continue;
        };
        let mut names: Vec<String> = path.iter().map(|&(file, _)| name(file)).collect();
        names.push(names[0].clone());
        let message = format!("files import each other in a circle: {}", names.join(" → "));
        let mut finding = Finding::new(catalogue::CYCLE, first, message)
            .label("the circle begins here")
            .help("move what both need into a file of its own, and import that");
        for (step, &(_, span)) in path.iter().enumerate().skip(1) {
            finding = finding.related(span, format!("{} imports {}", names[step], names[step + 1]));
        }
        findings.push(finding);
    }
}

/// The shortest circle through the first node of a strongly connected group, as the nodes it runs
/// along with the weights of the edges that leave them; `None` for a group without a circle.
///
/// Breadth-first search, linear in the group's edges.
pub fn circle<N, E: Copy>(
    graph: &DiGraph<N, E>,
    group: &[NodeIndex],
) -> Option<Vec<(NodeIndex, E)>> {
    use petgraph::visit::EdgeRef;
    let inside: BTreeSet<NodeIndex> = group.iter().copied().collect();
    let start = *inside.first()?;
    let mut came_by: BTreeMap<NodeIndex, (NodeIndex, E)> = BTreeMap::new();
    let mut waiting = VecDeque::from([start]);
    while let Some(node) = waiting.pop_front() {
        let mut edges: Vec<_> = graph.edges(node).collect();
        edges.sort_by_key(|edge| edge.id());
        for edge in edges {
            let next = edge.target();
            if !inside.contains(&next) || came_by.contains_key(&next) {
                continue;
            }
            came_by.insert(next, (node, *edge.weight()));
            if next == start {
                return Some(trace_back(&came_by, start));
            }
            waiting.push_back(next);
        }
    }
    None
}

fn trace_back<E: Copy>(
    came_by: &BTreeMap<NodeIndex, (NodeIndex, E)>,
    start: NodeIndex,
) -> Vec<(NodeIndex, E)> {
    let mut path = Vec::new();
    let mut node = start;
    while let Some(&(before, weight)) = came_by.get(&node) {
        path.push((before, weight));
        node = before;
        if node == start {
            break;
        }
    }
    path.reverse();
    path
}
