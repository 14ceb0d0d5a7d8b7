//! `cosetta graph`: what depends on what.

use super::{complain, files, print, progress::Bar, seconds, show_findings, status};
use crate::derive::Verdict;
use crate::emit;
use crate::project::{self, Options, View};
use crate::report::drawing::{self, Diagram, DiagramNode};
use clap::{Args, ValueEnum};
use std::path::Path;
use std::process::ExitCode;

/// Arguments of `graph`.
#[derive(Args)]
pub struct Arguments {
    /// Specs; a folder stands for every *.coset below it
    #[arg(required = true, value_name = "FILE")]
    files: Vec<String>,
    /// How it is drawn
    #[arg(long = "as", value_enum, default_value = "svg")]
    format: Format,
    /// Where it is written; `-`, standard output, unless said
    #[arg(short, long, value_name = "PATH", default_value = "-")]
    output: String,
    /// Work allowed on each code, in nominal seconds of one core
    #[arg(long, value_name = "TIME", default_value = "1s", value_parser = seconds)]
    budget: f64,
}

#[derive(Clone, Copy, ValueEnum)]
enum Format {
    Svg,
    Dot,
}

pub(super) fn run(arguments: &Arguments) -> ExitCode {
    let files = match files::specs(&arguments.files) {
        Ok(files) => files,
        Err(message) => return complain(&message),
    };
    let options = Options {
        seconds: arguments.budget,
        ..Options::default()
    };
    project::run(&files, &files::Disk, &options, &Bar::new(), |view| {
        show_findings(&view.findings, view.sources);
        let diagram = diagram(&view);
        let drawn = match arguments.format {
            Format::Svg => drawing::svg(&diagram),
            Format::Dot => drawing::dot(&diagram),
        };
        match arguments.output.as_str() {
            "-" => print(&drawn),
            path => {
                if let Err(error) = emit::write_whole(Path::new(path), drawn.as_bytes()) {
                    return complain(&format!("cannot write {path}: {error}"));
                }
            }
        }
        status(project::class(&view.findings))
    })
}

/// The declarations of the specs and of the library as far as they are used.
fn diagram(view: &View) -> Diagram {
    let graph = &view.program.graph;
    let mut index = std::collections::BTreeMap::new();
    let mut diagram = Diagram {
        title: view
            .program
            .files
            .iter()
            .filter(|file| file.root)
            .map(|file| file.name.clone())
            .collect::<Vec<_>>()
            .join(", "),
        files: view
            .program
            .files
            .iter()
            .map(|file| file.name.clone())
            .collect(),
        ..Diagram::default()
    };
    for node in graph.node_indices() {
        let declared = &graph[node];
        let used = graph
            .neighbors_directed(node, petgraph::Direction::Incoming)
            .any(|user| !graph[user].library);
        if declared.library && !used {
            continue;
        }
        let codes: Vec<_> = view
            .codes
            .iter()
            .filter(|checked| checked.compiled.node == node)
            .collect();
        let caption = match codes.as_slice() {
            [one] => view.parameters(one),
            [] => String::new(),
            many => format!("{} members", many.len()),
        };
        let verdicts = codes
            .iter()
            .flat_map(|checked| &checked.verdicts.clauses)
            .map(|clause| clause.judgement.verdict);
        index.insert(node, diagram.nodes.len());
        diagram.nodes.push(DiagramNode {
            name: declared.name.clone(),
            kind: declared.kind.word().to_string(),
            caption,
            library: declared.library,
            file: declared.file,
            verdict: verdicts.max_by_key(|verdict| match verdict {
                Verdict::Holds => 0,
                Verdict::Undecided => 1,
                Verdict::Fails => 2,
            }),
        });
    }
    for edge in graph.edge_indices() {
        let (user, used) = graph.edge_endpoints(edge).expect("an edge of the graph");
        if let (Some(&user), Some(&used)) = (index.get(&user), index.get(&used)) {
            diagram.edges.push((user, used));
        }
    }
    diagram
}
