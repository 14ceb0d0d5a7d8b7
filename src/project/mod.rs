//! One run over some files: load, resolve, evaluate, judge.
//!
//! In: texts and a loader. Out: a [`View`] on everything that is known, handed to whoever asked,
//! and the findings. This is the whole compiler in one call; the rooms below only show it.

use crate::code::{Distance, Space};
use crate::derive::search::Progress;
use crate::derive::{Effort, Session, SessionMeasures, structure};
use crate::evaluate::{self, CompiledCode, Evaluator};
use crate::finding::{Class, Finding, catalogue};
use crate::graph::{self, NodeKind, Program};
use crate::require::{self, Court, Verdicts};
use crate::source::{Loader, SourceId, Sources};
use crate::syntax::tree::{Clause, ClauseKind, DeclarationKind};
use petgraph::graph::NodeIndex;

/// What a run may spend, and what it looks at.
#[derive(Clone, Debug)]
pub struct Options {
    /// Work on each code, in nominal seconds of one core.
    pub seconds: f64,
    /// Only these declared codes; all when empty.
    pub only: Vec<String>,
    /// A further text, in the language, that is not part of the program: what was asked for on
    /// the command line.
    pub request: Option<String>,
}

impl Default for Options {
    fn default() -> Options {
        Options {
            seconds: 10.0,
            only: Vec::new(),
            request: None,
        }
    }
}

/// A code with its clauses judged.
pub struct Checked {
    /// The code.
    pub compiled: CompiledCode,
    /// Its clauses.
    pub verdicts: Verdicts,
}

/// What a run gives to look at.
pub struct View<'a> {
    /// All texts.
    pub sources: &'a Sources,
    /// The graph.
    pub program: &'a Program,
    /// Evaluates.
    pub evaluator: &'a Evaluator<'a>,
    /// Derives.
    pub session: &'a Session<'a>,
    /// The codes of the files asked for, in the order of declaration, each member of a family.
    pub codes: Vec<Checked>,
    /// All findings so far.
    pub findings: Vec<Finding>,
    /// The request, as a text that messages can point into.
    pub request: Option<SourceId>,
}

/// Runs the compiler over files, given as shown names and texts, and hands what it found to
/// `look`.
pub fn run<T>(
    files: &[(String, String)],
    loader: &dyn Loader,
    options: &Options,
    progress: &dyn Progress,
    look: impl FnOnce(View) -> T,
) -> T {
    let mut sources = Sources::default();
    let roots: Vec<SourceId> = files
        .iter()
        .map(|(name, text)| sources.add(name, text))
        .collect();
    let library: Vec<SourceId> = evaluate::LIBRARY
        .iter()
        .map(|(name, text)| sources.add_library(format!("library/{name}"), *text))
        .collect();
    let request = options
        .request
        .as_ref()
        .map(|text| sources.add("command line", text));
    let names = evaluate::builtins(&require::quantities());
    let (program, mut findings) = graph::build(&mut sources, &roots, &library, loader, &names);
    let session = Session::new(options.seconds, progress);
    let measures = SessionMeasures::new(&session);
    let evaluator = Evaluator::new(&program, &sources, loader, &measures);
    let court = Court {
        evaluator: &evaluator,
        session: &session,
        measures: &measures,
    };
    let mut codes = Vec::new();
    for node in declared(&program, &roots) {
        let declared = &program.graph[node];
        if declared.kind != NodeKind::Code {
            // Every declaration is evaluated, so that a mistake in an unused one is seen too.
            evaluator.try_declaration(node);
            continue;
        }
        if !options.only.is_empty() && !options.only.contains(&declared.name) {
            continue;
        }
        for compiled in evaluator.compile(node) {
            findings.extend(redundant_checks(&evaluator, &compiled));
            let verdicts = court.judge(&compiled);
            findings.extend(verdicts.findings.iter().cloned());
            codes.push(Checked { compiled, verdicts });
        }
    }
    findings.extend(unstated_conventions(&program, &evaluator));
    findings.extend(evaluator.take_findings());
    look(View {
        sources: &sources,
        program: &program,
        evaluator: &evaluator,
        session: &session,
        codes,
        findings,
        request,
    })
}

/// The most entries of a matrix in which dependent rows are looked for.
const ENTRIES: usize = 1 << 22;

/// A remark on a given check matrix whose rows are dependent, unless a clause asks just that.
fn redundant_checks(evaluator: &Evaluator, compiled: &CompiledCode) -> Option<Finding> {
    let asked = |clause: &Clause| match &clause.kind {
        ClauseKind::Requirement(requirement) => requirement.text == "full rank",
        _ => false,
    };
    if evaluator.declaration_of(compiled).clauses.iter().any(asked) {
        return None;
    }
    let start = compiled.code.trail().into_iter().next()?;
    let start = start.unnamed();
    let Space::Check(matrix) = start.space() else {
        return None;
    };
    let (rows, rank) = (matrix.rows(), start.redundancy());
    if rows == rank || start.origin().span.source != compiled.span.source {
        return None;
    }
    let message = format!(
        "{}: the check matrix has {rows} rows of rank {rank}, so k is {} and not {}",
        compiled.title(),
        start.dimension(),
        start.length() as i64 - rows as i64
    );
    let dependent = (rows * matrix.columns() <= ENTRIES)
        .then(|| structure::dependent_rows(matrix))
        .flatten()
        .filter(|rows| rows.len() <= 16);
    let label = dependent.map_or(String::new(), |rows| {
        let rows: Vec<String> = rows.iter().map(usize::to_string).collect();
        format!("rows {} are dependent", rows.join(", "))
    });
    let finding =
        Finding::new(catalogue::REDUNDANT_CHECKS, start.origin().span, message).label(label);
    Some(finding.help("say `require full rank` where an encoder or a rate depends on it"))
}

/// Remarks on what is delivered and depends on a convention that the spec leaves open.
fn unstated_conventions(program: &Program, evaluator: &Evaluator) -> Vec<Finding> {
    let mut found = Vec::new();
    for (at, file) in program
        .files
        .iter()
        .enumerate()
        .filter(|(_, file)| file.root)
    {
        for declaration in &file.tree.declarations {
            let DeclarationKind::Deliver(deliver) = &declaration.kind else {
                continue;
            };
            let Ok(compiled) = evaluator.code_named(&deliver.code, at) else {
                continue;
            };
            for unstated in compiled.code.unstated() {
                let message = format!("{}: {}", compiled.title(), unstated.says);
                let finding = Finding::new(unstated.code, deliver.code.span, message);
                found.push(finding.help(unstated.help));
            }
        }
    }
    found
}

/// The declarations of the files asked for, in their order.
fn declared(program: &Program, roots: &[SourceId]) -> Vec<NodeIndex> {
    let mut nodes: Vec<NodeIndex> = program
        .graph
        .node_indices()
        .filter(|&node| roots.contains(&program.graph[node].span.source))
        .collect();
    nodes.sort_by_key(|&node| program.graph[node].span);
    nodes
}

/// The worst that the findings say of the run.
pub fn class(findings: &[Finding]) -> Class {
    findings
        .iter()
        .map(|finding| finding.code.class)
        .max()
        .unwrap_or(Class::Remark)
}

impl View<'_> {
    /// What is known of a code's distance after a quick look, or the longer one that its clauses
    /// took.
    pub fn distance(&self, checked: &Checked) -> Distance {
        self.session
            .distance_by(&checked.compiled.code, Effort::Small)
    }

    /// A code's parameters as text: `[72, 64, 4]`.
    pub fn parameters(&self, checked: &Checked) -> String {
        let code = &checked.compiled.code;
        let distance = if code.dimension() == 0 {
            "-".to_string()
        } else {
            require::interval(&self.distance(checked))
        };
        format!("[{}, {}, {distance}]", code.length(), code.dimension())
    }
}
