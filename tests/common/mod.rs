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

/// What is asked of a code beside n, k and d.
#[derive(Clone, Copy)]
pub struct Asked<'a> {
    pub weights: bool,
    /// Properties and measures by name; all that are cheap when `None`.
    pub names: Option<&'a [&'a str]>,
}

/// All that is compared of one code.
pub fn examine(text: &str, name: &str) -> Known {
    let all = Asked {
        weights: true,
        names: None,
    };
    examine_only(text, name, all)
}

/// Of one code, what is asked for; the rest is left out, as it may cost much.
pub fn examine_only(text: &str, name: &str, asked: Asked) -> Known {
    with_spec(text, |view| known(&view, name, asked, text))
}

/// What a view knows of one of its codes.
pub fn known(view: &View, name: &str, asked: Asked, text: &str) -> Known {
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
    let wanted = |name: &str| asked.names.is_none_or(|names| names.contains(&name));
    let code = &checked.compiled.code;
    let distance = view.session.distance_by(code, Effort::Full);
    let weights = asked
        .weights
        .then(|| view.session.weights_by(code, Effort::Full))
        .flatten()
        .map(|weights| {
            weights
                .counts
                .into_iter()
                .map(|(weight, count)| (weight, count.to_string()))
                .collect()
        });
    let properties = properties::PROPERTIES
        .iter()
        .filter(|property| wanted(property.name))
        .map(|property| {
            (
                property.name.to_string(),
                (property.decide)(view.session, code),
            )
        })
        .filter(|(_, judgement)| judgement.verdict != Verdict::Undecided)
        .map(|(name, judgement)| (name, judgement.verdict == Verdict::Holds))
        .collect();
    Known {
        n: code.length(),
        k: code.dimension(),
        d: (distance.lower, distance.upper),
        weights,
        properties,
        measures: measures(view, code, wanted),
        findings,
    }
}

fn measures(
    view: &View,
    code: &cosetta::code::Code,
    wanted: impl Fn(&str) -> bool,
) -> BTreeMap<String, usize> {
    let mut measures = BTreeMap::new();
    let mut add = |name: &str, value: &dyn Fn() -> Option<usize>| {
        if wanted(name)
            && let Some(value) = value()
        {
            measures.insert(name.to_string(), value);
        }
    };
    let most = |weights: Vec<usize>| weights.into_iter().max();
    let check = || structure::check_matrix(code);
    add("covering_radius", &|| view.session.covering_radius(code));
    add("row_weight", &|| most(structure::row_weights(check())));
    add("column_weight", &|| {
        most(structure::column_weights(check()))
    });
    add("girth", &|| structure::girth(check()).ok().flatten());
    measures
}
