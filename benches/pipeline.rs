//! Compiling and checking the tide gauges with everything warm: the whole, and the share of each
//! room. Read as ratios within one run.

use cosetta::derive::search::Quiet;
use cosetta::evaluate::{self, LIBRARY};
use cosetta::graph;
use cosetta::project::{self, Options};
use cosetta::require;
use cosetta::source::{NoFiles, SourceId, Sources};
use cosetta::syntax;
use criterion::{Criterion, criterion_group, criterion_main};
use std::hint::black_box;

const SPECS: &[(&str, &str)] = &[
    (
        "memory_word",
        include_str!("../examples/tide-gauge/memory_word.coset"),
    ),
    (
        "flash_page",
        include_str!("../examples/tide-gauge/flash_page.coset"),
    ),
    (
        "radio_frame",
        include_str!("../examples/tide-gauge/radio_frame.coset"),
    ),
    (
        "shore_shards",
        include_str!("../examples/tide-gauge/shore_shards.coset"),
    ),
];

/// The sources of a spec with the library, as a run sets them out.
fn sources(text: &str) -> (Sources, Vec<SourceId>, Vec<SourceId>) {
    let mut sources = Sources::default();
    let root = sources.add("spec.coset", text);
    let library = LIBRARY
        .iter()
        .map(|(name, text)| sources.add_library(*name, *text))
        .collect();
    (sources, vec![root], library)
}

fn pipeline(bench: &mut Criterion) {
    for (name, text) in SPECS {
        let mut group = bench.benchmark_group(*name);
        group.sample_size(20);
        group.bench_function("parse", |run| {
            run.iter(|| syntax::parse(SourceId(0), black_box(text)))
        });
        group.bench_function("parse and graph, library included", |run| {
            let names = evaluate::builtins(&require::quantities());
            run.iter(|| {
                let (mut sources, roots, library) = sources(text);
                graph::build(&mut sources, &roots, &library, &NoFiles, &names)
            });
        });
        let files = [("spec.coset".to_string(), text.to_string())];
        for (what, seconds) in [
            ("evaluate, theorems only", 0.0),
            ("evaluate, derive and judge", 10.0),
        ] {
            let options = Options {
                seconds,
                ..Options::default()
            };
            group.bench_function(what, |run| {
                run.iter(|| {
                    project::run(&files, &NoFiles, &options, &Quiet, |view| view.codes.len())
                });
            });
        }
        group.finish();
    }
}

criterion_group!(benches, pipeline);
criterion_main!(benches);
