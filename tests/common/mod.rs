//! What several tests share: running a spec and reading off what the compiler knows.

#![allow(dead_code)]

use cosetta::derive::search::Quiet;
use cosetta::derive::{Effort, Verdict, properties, structure};
use cosetta::finding::Finding;
use cosetta::project::{self, Options, View};
use cosetta::source::NoFiles;
use std::collections::BTreeMap;

/// What is known of one code of a spec.
#[derive(Debug, Clone)]
pub struct Known {
    pub n: usize,
    pub k: usize,
    pub d: (usize, usize),
    pub weights: Option<BTreeMap<usize, String>>,
    pub properties: BTreeMap<String, bool>,
    pub measures: BTreeMap<String, usize>,
    pub findings: Vec<String>,
}

/// Runs a spec given as text.
pub fn with_spec<T>(text: &str, look: impl FnOnce(View) -> T) -> T {
    let files = [("spec.coset".to_string(), text.to_string())];
    let options = Options {
        seconds: 20.0,
        ..Options::default()
    };
    project::run(&files, &NoFiles, &options, &Quiet, look)
}

/// The findings of a spec.
pub fn findings(text: &str) -> Vec<Finding> {
    with_spec(text, |view| view.findings)
}

/// All that is compared of one code.
pub fn examine(text: &str, name: &str) -> Known {
    with_spec(text, |view| {
        let findings: Vec<String> = view
            .findings
            .iter()
            .map(|finding| finding.message.clone())
            .collect();
        let Some(checked) = view
            .codes
            .iter()
            .find(|checked| checked.compiled.name == name)
        else {
            panic!("{name} was not built:\n{text}\n{findings:#?}");
        };
        let code = &checked.compiled.code;
        let distance = view.session.distance_by(code, Effort::Full);
        let weights = view.session.weights_by(code, Effort::Full).map(|weights| {
            weights
                .counts
                .into_iter()
                .map(|(weight, count)| (weight, count.to_string()))
                .collect()
        });
        let properties = properties::PROPERTIES
            .iter()
            .map(|property| {
                (
                    property.name.to_string(),
                    (property.decide)(view.session, code),
                )
            })
            .filter(|(_, judgement)| judgement.verdict != Verdict::Undecided)
            .map(|(name, judgement)| (name, judgement.verdict == Verdict::Holds))
            .collect();
        let mut measures = BTreeMap::new();
        if let Some(radius) = view.session.covering_radius(code) {
            measures.insert("covering_radius".to_string(), radius);
        }
        let check = structure::check_matrix(code);
        if check.columns() < 2000 {
            let most = |weights: Vec<usize>| weights.into_iter().max().unwrap_or(0);
            measures.insert(
                "row_weight".to_string(),
                most(structure::row_weights(check)),
            );
            measures.insert(
                "column_weight".to_string(),
                most(structure::column_weights(check)),
            );
            if let Ok(Some(girth)) = structure::girth(check) {
                measures.insert("girth".to_string(), girth);
            }
        }
        Known {
            n: code.length(),
            k: code.dimension(),
            d: (distance.lower, distance.upper),
            weights,
            properties,
            measures,
            findings,
        }
    })
}
