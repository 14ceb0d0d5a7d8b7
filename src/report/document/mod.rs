//! A report in prose, before it is laid out: headings, tables, bars, verdicts.
//!
//! What is said, and in which order, is decided here once; [`mod@super::text`], [`mod@super::markdown`]
//! and [`mod@super::html`] only set it.

mod weights;

use serde_json::Value;

use super::model::{
    CodeReport, Interval, Kind, Nature, Report, RequirementReport, Verdict, plain_value,
};

/// The sentence every report ends with.
pub const CAUTION: &str = "The figures above follow from the specification as written and support a \
    review of it. They are no safety certification: which standard applies, and whether it is met, \
    is for qualified people to decide.";

/// A piece of a report.
#[derive(Clone, PartialEq, Debug)]
pub enum Block {
    /// The name of a code and its parameters, with q.
    Title {
        /// The name with arguments.
        name: String,
        /// `[n, k, d]`.
        parameters: String,
        /// q.
        order: u64,
    },
    /// Running text.
    Paragraph(String),
    /// The heading of what follows.
    Heading(String),
    /// Names and what they stand for.
    Facts(Vec<(String, String)>),
    /// A table; numbers to the right.
    Table {
        /// The heads of the columns.
        head: Vec<String>,
        /// For each column, whether it holds numbers.
        numeric: Vec<bool>,
        /// The rows.
        rows: Vec<Vec<String>>,
    },
    /// Bars of a length between 0 and 1.
    Bars(Vec<Bar>),
    /// Statements and their verdicts.
    Verdicts(Vec<VerdictLine>),
    /// Items of equal standing.
    List(Vec<String>),
    /// The sentence at the end.
    Caution(String),
}

/// One bar.
#[derive(Clone, PartialEq, Debug)]
pub struct Bar {
    /// What is counted; empty for a row that stands for left-out ones.
    pub label: String,
    /// The length, 0 to 1.
    pub share: f64,
    /// The count in words.
    pub value: String,
}

/// One statement with its verdict.
#[derive(Clone, PartialEq, Debug)]
pub struct VerdictLine {
    /// How it was settled.
    pub verdict: Verdict,
    /// The statement.
    pub text: String,
    /// Reasons and witnesses, one line each.
    pub says: Vec<String>,
}

/// The blocks of a whole report.
pub fn document(report: &Report) -> Vec<Block> {
    let mut blocks = Vec::new();
    for code in &report.codes {
        one_code(&mut blocks, code);
    }
    findings(&mut blocks, &report.findings);
    blocks.push(Block::Caution(CAUTION.to_string()));
    blocks
}

fn one_code(blocks: &mut Vec<Block>, code: &CodeReport) {
    blocks.push(Block::Title {
        name: code.title(),
        parameters: code.parameters(),
        order: code.field.order,
    });
    if let Some(text) = &code.documentation {
        blocks.push(Block::Paragraph(text.trim().to_string()));
    }
    blocks.push(Block::Facts(facts(code)));
    derivation(blocks, code);
    grounds(blocks, code);
    verdicts(blocks, "Claims", &code.claims, code);
    verdicts(blocks, "Requirements", &code.requirements, code);
    bounds(blocks, code);
    if let Some(found) = &code.weights {
        weights::bars(blocks, found, code);
    }
    if let Some(found) = &code.dual_weights {
        blocks.push(Block::Heading("Weights of the dual".to_string()));
        blocks.push(Block::Paragraph(weights::short(found)));
    }
    properties(blocks, code);
    figures(blocks, code);
    list(blocks, "Conventions in force", &code.assumptions);
    list(blocks, "Notes", &code.notes);
}

fn facts(code: &CodeReport) -> Vec<(String, String)> {
    let mut facts = Vec::new();
    let mut fact = |name: &str, value: String| facts.push((name.to_string(), value));
    let field = match &code.field.modulus {
        Some(modulus) => format!("GF({}), modulus {modulus}", code.field.order),
        None => format!("GF({})", code.field.order),
    };
    fact("field", field);
    fact("length", format!("n = {}", code.n));
    fact("dimension", format!("k = {}", code.k));
    fact("redundancy", format!("n − k = {}", code.redundancy));
    let rate = if code.rate.contains('/') {
        format!("{} ≈ {:.4}", code.rate, code.k as f64 / code.n as f64)
    } else {
        code.rate.clone()
    };
    fact("rate", rate);
    let distance = match (code.k, code.distance()) {
        (0, _) => "none: the zero word is the only one".to_string(),
        (_, exact) if exact.lower == exact.upper && exact.lower.is_some() => format!("d = {exact}"),
        (
            _,
            Interval {
                lower: None,
                upper: None,
            },
        ) => "not derived".to_string(),
        (_, open) => match (open.lower, open.upper) {
            (Some(lower), Some(upper)) => format!("undecided: {lower} ≤ d ≤ {upper}"),
            _ => format!("undecided: d {open}"),
        },
    };
    fact("distance", distance);
    if let Some(radius) = code.covering_radius {
        fact("covering radius", radius.to_string());
    }
    for (name, measure) in code.measures.iter() {
        let value = match (&measure.value["least"], &measure.value["most"]) {
            (Value::Number(least), Value::Number(most)) if least == most => least.to_string(),
            (Value::Number(least), Value::Number(most)) => format!("{least}..{most}"),
            _ => plain_value(&measure.value),
        };
        let says = measure.says.as_ref().map(|says| format!(" ({says})"));
        fact(&spaced(name), value + &says.unwrap_or_default());
    }
    facts
}

fn derivation(blocks: &mut Vec<Block>, code: &CodeReport) {
    if code.steps.is_empty() {
        return;
    }
    blocks.push(Block::Heading("Derivation".to_string()));
    let with_remarks = code.steps.iter().any(|step| step.says.is_some());
    let rows = code.steps.iter().enumerate().map(|(at, step)| {
        let then = if at == 0 { "" } else { "then " };
        let d = match step.k {
            0 if step.d == Interval::default() => "–".to_string(),
            _ => step.d.to_string(),
        };
        let mut row = vec![
            at.to_string(),
            format!("{then}{}", step.text),
            step.n.to_string(),
            step.k.to_string(),
            d,
        ];
        if with_remarks {
            row.push(step.says.clone().unwrap_or_default());
        }
        row
    });
    let mut head = strings(&["step", "", "n", "k", "d"]);
    let mut numeric = vec![true, false, true, true, true];
    if with_remarks {
        head.push(String::new());
        numeric.push(false);
    }
    blocks.push(Block::Table {
        head,
        numeric,
        rows: rows.collect(),
    });
}

fn grounds(blocks: &mut Vec<Block>, code: &CodeReport) {
    let names = code.positions.as_deref();
    let mut items: Vec<String> = code
        .d
        .grounds
        .iter()
        .map(|ground| {
            let sign = match ground.bound {
                super::model::Side::Lower => "≥",
                super::model::Side::Upper => "≤",
            };
            let step = ground.step.map(|step| format!(", step {step}"));
            let (value, rule) = (ground.value, spaced(&ground.rule));
            let step = step.unwrap_or_default();
            let says = match ground.says.as_str() {
                "" => String::new(),
                says => format!(": {says}"),
            };
            format!("d {sign} {value} ({rule}{step}){says}")
        })
        .collect();
    if let Some(witness) = &code.d.witness {
        items.push(format!("witness: {}", witness.describe(names)));
    }
    list(blocks, "Grounds of the distance", &items);
}

fn verdicts(blocks: &mut Vec<Block>, heading: &str, all: &[RequirementReport], code: &CodeReport) {
    if all.is_empty() {
        return;
    }
    blocks.push(Block::Heading(heading.to_string()));
    let names = code.positions.as_deref();
    let lines = all.iter().map(|one| {
        let word = match one.kind {
            Kind::Claim => "is",
            Kind::Require => "require",
            Kind::Prefer => "prefer",
        };
        let mut says = Vec::new();
        if !one.says.is_empty() {
            says.push(one.says.clone());
        }
        if let Some(witness) = &one.witness {
            says.push(format!("witness: {}", witness.describe(names)));
        }
        VerdictLine {
            verdict: one.verdict,
            text: format!("{word} {}", one.text),
            says,
        }
    });
    blocks.push(Block::Verdicts(lines.collect()));
}

fn bounds(blocks: &mut Vec<Block>, code: &CodeReport) {
    if code.bounds.is_empty() && code.gilbert_varshamov.is_none() {
        return;
    }
    let (n, k, order) = (code.n, code.k, code.field.order);
    blocks.push(Block::Heading(format!(
        "Bounds on d for [{n}, {k}] over GF({order})"
    )));
    let mut rows: Vec<Vec<String>> = code
        .bounds
        .iter()
        .map(|(name, &most)| {
            let name = spaced(name);
            vec![name, format!("≤ {most}"), room(most, code.distance())]
        })
        .collect();
    if let Some(reached) = code.gilbert_varshamov {
        let says = match code.d.lower {
            Some(lower) if lower >= reached => "reached".to_string(),
            _ => "some code reaches it".to_string(),
        };
        rows.push(vec![
            "gilbert varshamov".to_string(),
            format!("≥ {reached}"),
            says,
        ]);
    }
    for row in &mut rows {
        row[0] = proper(&row[0]);
    }
    blocks.push(Block::Table {
        head: strings(&["bound", "d", "room left"]),
        numeric: vec![false, true, false],
        rows,
    });
}

/// How far a d in the interval stays below what a bound allows.
fn room(most: u64, d: Interval) -> String {
    match (d.lower, d.upper) {
        (Some(lower), Some(upper)) if lower == upper && lower == most => "met".to_string(),
        (Some(lower), _) if lower > most => "exceeded, which cannot be".to_string(),
        (Some(lower), Some(upper)) if lower == upper => (most - lower).to_string(),
        (Some(lower), upper) => {
            let least = upper.map_or(0, |upper| most.saturating_sub(upper));
            match most - lower {
                widest if widest == least => widest.to_string(),
                widest => format!("{least}..{widest}"),
            }
        }
        (None, _) => "–".to_string(),
    }
}

fn properties(blocks: &mut Vec<Block>, code: &CodeReport) {
    if code.properties.is_empty() {
        return;
    }
    blocks.push(Block::Heading("Properties".to_string()));
    let mut lines: Vec<VerdictLine> = code
        .properties
        .iter()
        .map(|(name, property)| VerdictLine {
            verdict: property.verdict,
            text: proper(&spaced(name)),
            says: property.says.iter().cloned().collect(),
        })
        .collect();
    lines.sort_by_key(|line| line.verdict);
    blocks.push(Block::Verdicts(lines));
}

fn figures(blocks: &mut Vec<Block>, code: &CodeReport) {
    if code.figures.is_empty() {
        return;
    }
    blocks.push(Block::Heading("Figures on a channel".to_string()));
    let rows = code.figures.iter().map(|figure| {
        let sign = match figure.nature {
            Nature::Exact => "=",
            Nature::Upper => "≤",
            Nature::Lower => "≥",
        };
        vec![
            spaced(&figure.name),
            figure.channel.clone(),
            format!("{sign} {}", figure.value),
            figure.says.clone(),
        ]
    });
    blocks.push(Block::Table {
        head: strings(&["figure", "channel", "probability", "how"]),
        numeric: vec![false, false, true, false],
        rows: rows.collect(),
    });
}

fn findings(blocks: &mut Vec<Block>, findings: &Value) {
    let items: Vec<String> = findings
        .as_array()
        .into_iter()
        .flatten()
        .map(|finding| {
            let text = |key: &str| plain_value(&finding[key]);
            let start = &finding["span"]["start"];
            format!(
                "{} {} at {}:{}:{}: {}",
                text("severity"),
                text("code"),
                text("file"),
                start["line"],
                start["column"],
                text("message")
            )
        })
        .collect();
    list(blocks, "Findings", &items);
}

fn list(blocks: &mut Vec<Block>, heading: &str, items: &[String]) {
    if !items.is_empty() {
        blocks.push(Block::Heading(heading.to_string()));
        blocks.push(Block::List(items.to_vec()));
    }
}

fn strings(words: &[&str]) -> Vec<String> {
    words.iter().map(|word| word.to_string()).collect()
}

/// A name of the language as running text.
fn spaced(name: &str) -> String {
    name.replace('_', " ")
}

/// Names of people and abbreviations as they are written.
fn proper(name: &str) -> String {
    match name {
        "mds" => "MDS".to_string(),
        "self dual" | "self orthogonal" | "dual containing" | "quasi cyclic" => {
            name.replace(' ', "-")
        }
        "gilbert varshamov" => "Gilbert–Varshamov".to_string(),
        "singleton" | "hamming" | "griesmer" | "plotkin" | "johnson" | "elias" => {
            name[..1].to_uppercase() + &name[1..]
        }
        _ => name.to_string(),
    }
}
