//! Fills the plain data of a report from what was derived.

use super::model::{
    CodeReport, DistanceReport, Ground, Interval, Measure, PropertyReport, RequirementReport, Side,
    StepReport, Weights, Witness,
};
use crate::code::{self, Code, Distance};
use crate::derive::search::bounds;
use crate::derive::{Effort, Session, properties, structure, support};
use crate::evaluate::{CompiledCode, Evaluator};
use crate::project::{Checked, View};
use crate::require::{Judged, Kind};
use crate::syntax::tree::ClauseKind;
use crate::value::Value;
use serde_json::json;

/// The most entries of a check matrix whose rows and columns are weighed for a report.
const ENTRIES: usize = 1 << 26;

/// All that is derived of a code.
pub fn describe(view: &View, checked: &Checked) -> CodeReport {
    let compiled = &checked.compiled;
    let code = &compiled.code;
    let session = view.session;
    let mut report = CodeReport::new(
        &compiled.name,
        code.field(),
        code.length(),
        code.dimension(),
    );
    for (name, value) in &compiled.arguments {
        report.arguments.insert(name.clone(), argument(value));
    }
    report.documentation = compiled.documentation.clone();
    report.d = distance(session, code);
    report.weights = session
        .weights_by(code, Effort::Full)
        .map(|weights| Weights(weights.counts));
    report.dual_weights = session
        .dual_weights(code, Effort::Full)
        .map(|weights| Weights(weights.counts));
    report.covering_radius = session
        .covering_radius(code)
        .map(|radius| Interval::exact(radius as u64));
    largest_distances(code, &mut report);
    for property in properties::PROPERTIES {
        let judgement = (property.decide)(session, code);
        report.properties.push(
            property.name,
            PropertyReport {
                verdict: judgement.verdict,
                says: Some(judgement.says),
            },
        );
    }
    measures(code, &mut report);
    report.steps = steps(session, code);
    for judged in &checked.verdicts.clauses {
        let entry = requirement(judged);
        match judged.kind {
            Kind::Claim => report.claims.push(entry),
            Kind::Require | Kind::Prefer => report.requirements.push(entry),
        }
    }
    report.assumptions = code.assumptions();
    report.notes = notes(view.evaluator, compiled);
    report.positions = compiled.position_names.clone();
    report
}

/// A parameter's value in JSON: a number where it fits, otherwise as written.
pub fn argument(value: &Value) -> serde_json::Value {
    use num_traits::ToPrimitive;
    match value {
        Value::Integer(number) => match number.to_i64() {
            Some(number) => json!(number),
            None => json!(number.to_string()),
        },
        other => json!(other.to_string()),
    }
}

/// What is known of a distance; nothing for the zero code.
pub fn interval(distance: &Distance) -> Interval {
    if distance.lower == 0 {
        return Interval::default();
    }
    Interval::between(distance.lower as u64, distance.upper as u64)
}

fn distance(session: &Session, code: &Code) -> DistanceReport {
    let distance = session.distance_by(code, Effort::Full);
    let interval = interval(&distance);
    let last = code.trail().len() - 1;
    DistanceReport {
        lower: interval.lower,
        upper: interval.upper,
        grounds: distance
            .grounds
            .iter()
            .map(|bound| Ground {
                bound: match bound.side {
                    code::Side::Lower => Side::Lower,
                    code::Side::Upper => Side::Upper,
                },
                value: bound.value as u64,
                rule: bound.rule.to_string(),
                step: Some(last.saturating_sub(bound.steps_ago)),
                says: bound.says.clone(),
            })
            .collect(),
        witness: distance.witness.as_deref().map(witness),
    }
}

fn witness(word: &[u32]) -> Witness {
    let (positions, values) = support(word);
    Witness { positions, values }
}

fn largest_distances(code: &Code, report: &mut CodeReport) {
    let (q, n, k) = (code.field().order(), code.length(), code.dimension());
    if k == 0 {
        return;
    }
    let plain: [(&str, fn(u64, usize, usize) -> usize); 4] = [
        ("singleton", bounds::singleton),
        ("hamming", bounds::hamming),
        ("plotkin", bounds::plotkin),
        ("griesmer", bounds::griesmer),
    ];
    for (name, bound) in plain {
        report.bounds.push(name, bound(q, n, k) as u64);
    }
    for (name, bound) in [
        ("johnson", bounds::johnson(q, n, k)),
        ("elias", bounds::elias(q, n, k)),
    ] {
        if let Some(bound) = bound {
            report.bounds.push(name, bound as u64);
        }
    }
    report.gilbert_varshamov = Some(bounds::gilbert_varshamov(q, n, k) as u64);
}

fn measures(code: &Code, report: &mut CodeReport) {
    let Some(check) = code.check_matrix_as_built() else {
        return;
    };
    if check.rows().saturating_mul(check.columns()) > ENTRIES {
        return;
    }
    let as_built = "of the check matrix as built";
    let mut push = |name: &str, value: serde_json::Value| {
        report.measures.push(
            name,
            Measure {
                value,
                says: Some(as_built.to_string()),
            },
        );
    };
    let span = |weights: &[usize]| (weights.iter().min().copied(), weights.iter().max().copied());
    if let (Some(least), Some(most)) = span(&structure::row_weights(check)) {
        push("row_weight", json!({"least": least, "most": most}));
    }
    if let (Some(least), Some(most)) = span(&structure::column_weights(check)) {
        push("column_weight", json!({"least": least, "most": most}));
    }
    push("check_rows", json!(check.rows()));
    push("redundant_rows", json!(check.rows() - code.redundancy()));
    if let Ok(Some(girth)) = structure::girth(check) {
        push("girth", json!(girth));
    }
}

fn steps(session: &Session, code: &Code) -> Vec<StepReport> {
    let trail = code.trail();
    let last = trail.len() - 1;
    trail
        .iter()
        .enumerate()
        .map(|(at, step)| {
            let effort = if at == last {
                Effort::Full
            } else {
                Effort::Small
            };
            StepReport {
                text: step.origin().text.clone(),
                n: step.length(),
                k: step.dimension(),
                d: interval(&session.distance_by(step, effort)),
                says: None,
            }
        })
        .collect()
}

fn requirement(judged: &Judged) -> RequirementReport {
    RequirementReport {
        text: judged.text.clone(),
        kind: judged.kind,
        verdict: judged.judgement.verdict,
        says: judged.judgement.says.clone(),
        witness: judged.judgement.witness.as_deref().map(witness),
    }
}

fn notes(evaluator: &Evaluator, compiled: &CompiledCode) -> Vec<String> {
    evaluator
        .declaration_of(compiled)
        .clauses
        .iter()
        .filter_map(|clause| match &clause.kind {
            ClauseKind::Note(text) => Some(text.value.clone()),
            _ => None,
        })
        .collect()
}

/// A code's parameters and verdicts in short.
#[derive(Clone, PartialEq, Debug, serde::Serialize)]
pub struct Summary {
    /// The name.
    pub name: String,
    /// The arguments of a member.
    pub arguments: serde_json::Map<String, serde_json::Value>,
    /// n.
    pub n: usize,
    /// k.
    pub k: usize,
    /// What is known of d.
    pub d: Interval,
    /// Claims and requirements with their verdicts.
    pub requirements: Vec<RequirementReport>,
}

/// A code's parameters and verdicts in short.
pub fn summary(view: &View, checked: &Checked) -> Summary {
    let code = &checked.compiled.code;
    Summary {
        name: checked.compiled.name.clone(),
        arguments: checked
            .compiled
            .arguments
            .iter()
            .map(|(name, value)| (name.clone(), argument(value)))
            .collect(),
        n: code.length(),
        k: code.dimension(),
        d: interval(&view.session.distance_by(code, Effort::Full)),
        requirements: checked.verdicts.clauses.iter().map(requirement).collect(),
    }
}
