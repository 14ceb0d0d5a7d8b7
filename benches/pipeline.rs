//! How long small specs take, warm, and which share parsing, the graph, evaluation and derivation
//! have: each bench goes one room further than the one before.

use cosetta::derive::search::Quiet;
use cosetta::evaluate;
use cosetta::graph;
use cosetta::project::{self, Options};
use cosetta::require;
use cosetta::source::{NoFiles, Sources};
use cosetta::syntax;
use criterion::{Criterion, criterion_group, criterion_main};
use std::hint::black_box;

const WORD: &str = "\
field bit = GF(2)
code gauge_word over bit
  = hamming(7)
  then extend
  then shorten(first: n - 72)
  then arrange(data: first)
";

const FRAME: &str = "\
field octal = GF(8) where a^3 = a + 1
field bit = GF(2)
code gauge_frame
  = reed_solomon(length: 7, dimension: 3) over octal
  then concatenate(simplex(3) over bit)
";

fn files(text: &str) -> [(String, String); 1] {
    [("gauge.coset".to_string(), text.to_string())]
}

fn run(text: &str) -> usize {
    project::run(
        &files(text),
        &NoFiles,
        &Options::default(),
        &Quiet,
        |view| view.findings.len() + view.codes.len(),
    )
}

fn graph_of(text: &str) -> usize {
    let mut sources = Sources::default();
    let root = sources.add("gauge.coset", text);
    let library: Vec<_> = evaluate::LIBRARY
        .iter()
        .map(|(name, text)| sources.add_library(format!("library/{name}"), *text))
        .collect();
    let names = evaluate::builtins(&require::quantities());
    let (program, findings) = graph::build(&mut sources, &[root], &library, &NoFiles, &names);
    program.graph.node_count() + findings.len()
}

fn parsed(text: &str) -> usize {
    let mut sources = Sources::default();
    let root = sources.add("gauge.coset", text);
    let parsed = syntax::parse(root, text);
    parsed.file.declarations.len() + parsed.findings.len()
}

fn pipeline(criterion: &mut Criterion) {
    for (name, text, claim, require) in [
        (
            "word",
            WORD,
            "  is [72, 64, 4]\n",
            "  require corrects 1 while detecting 2\n",
        ),
        (
            "frame",
            FRAME,
            "  is [49, 9, 20]\n",
            "  require detects 19\n",
        ),
    ] {
        let mut group = criterion.benchmark_group(name);
        group.sample_size(20);
        let judged = format!("{text}{claim}{require}");
        group.bench_function("1 parse", |bench| bench.iter(|| parsed(black_box(&judged))));
        group.bench_function("2 graph", |bench| {
            bench.iter(|| graph_of(black_box(&judged)))
        });
        group.bench_function("3 evaluate", |bench| bench.iter(|| run(black_box(text))));
        group.bench_function("4 derive and judge", |bench| {
            bench.iter(|| run(black_box(&judged)))
        });
        group.finish();
    }
}

criterion_group!(benches, pipeline);
criterion_main!(benches);
