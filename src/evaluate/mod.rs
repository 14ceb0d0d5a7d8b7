//! From the graph to codes: walks declarations in the order of their dependencies and evaluates
//! what is asked for.
//!
//! In: a [`Program`]. Out: [`CompiledCode`]s with their clauses still to be judged, and findings.
//! A declaration is evaluated once; whatever fails is reported once and stays silent wherever it
//! is used. Work is counted, so every spec ends.

mod calls;
mod clauses;
mod codes;
mod declared;
mod expression;
mod families;
mod fields;
mod library;
mod matrices;
mod names;
mod scope;

pub use clauses::{Claimed, Expected};
pub use codes::{CompiledCode, position_names};
pub use library::LIBRARY;
pub use names::builtins;
pub use scope::{Scope, Subject};

use crate::code::Code;
use crate::finding::{Finding, catalogue};
use crate::graph::Program;
use crate::source::{Loader, Sources, Span};
use crate::value::Value;
use num_rational::BigRational;
use petgraph::graph::NodeIndex;
use std::cell::{Cell, RefCell};
use std::collections::HashMap;

/// The most evaluation steps of one run.
pub const STEPS: u64 = 200_000_000;
/// The most members of a family that are compiled.
pub const MEMBERS: usize = 4096;

/// Why there is no value.
#[derive(Clone, Debug)]
pub enum Stop {
    /// Something is wrong that is not yet reported.
    Finding(Box<Finding>),
    /// Something it depends on is wrong, and that is reported.
    Reported,
    /// A quantity of a code is only known to lie between two integers.
    Unsettled {
        /// Its name.
        name: String,
        /// At least this.
        lower: usize,
        /// At most this.
        upper: usize,
    },
    /// A probability is only known to lie between two fractions.
    Enclosed {
        /// Its name.
        name: String,
        /// The two, both included.
        ends: Box<(BigRational, BigRational)>,
    },
}

impl From<Box<Finding>> for Stop {
    fn from(finding: Box<Finding>) -> Stop {
        Stop::Finding(finding)
    }
}

/// A value, or why there is none.
pub type Outcome<T> = Result<T, Stop>;

/// A quantity of a code, as far as it is known.
#[derive(Clone, Debug)]
pub enum Measured {
    /// Exactly this.
    Exactly(Value),
    /// An integer between these.
    Between(usize, usize),
    /// A number between these, both included.
    Within(BigRational, BigRational),
}

/// Answers what an expression asks of a code: its distance, its weights, its dual, a property.
/// Evaluation comes before derivation, so what can be derived is passed in.
pub trait Measures {
    /// The quantity of that name, with arguments if it takes any; `None` when there is none.
    ///
    /// # Errors
    /// When it cannot be had for this code or these arguments.
    fn measure(
        &self,
        code: &Code,
        name: &str,
        arguments: &[Value],
    ) -> Option<Result<Measured, crate::value::Trouble>>;
}

/// Evaluates the declarations of a program.
pub struct Evaluator<'a> {
    /// What is evaluated.
    pub program: &'a Program,
    /// All texts.
    pub sources: &'a Sources,
    loader: &'a dyn Loader,
    measures: &'a dyn Measures,
    memo: RefCell<HashMap<(NodeIndex, String), Result<Value, ()>>>,
    findings: RefCell<Vec<Finding>>,
    steps: Cell<u64>,
}

impl<'a> Evaluator<'a> {
    /// An evaluator of a program whose files were read by `loader`.
    pub fn new(
        program: &'a Program,
        sources: &'a Sources,
        loader: &'a dyn Loader,
        measures: &'a dyn Measures,
    ) -> Evaluator<'a> {
        Evaluator {
            program,
            sources,
            loader,
            measures,
            memo: RefCell::new(HashMap::new()),
            findings: RefCell::new(Vec::new()),
            steps: Cell::new(0),
        }
    }

    /// Reports a finding once.
    pub fn report(&self, finding: Finding) {
        let mut findings = self.findings.borrow_mut();
        if !findings.contains(&finding) {
            findings.push(finding);
        }
    }

    /// The findings so far, in the order they were met.
    pub fn take_findings(&self) -> Vec<Finding> {
        std::mem::take(&mut self.findings.borrow_mut())
    }

    /// Turns why there is no value into a report; gives nothing back.
    pub fn give_up(&self, stop: Stop, span: Span) {
        match stop {
            Stop::Finding(finding) => self.report(*finding),
            Stop::Reported => {}
            Stop::Unsettled { name, lower, upper } => self.report(
                Finding::new(
                    catalogue::CLAIM_UNDECIDED,
                    span,
                    format!("{name} is only known to lie in {lower}..{upper} here"),
                )
                .help("give a larger --budget, or do not choose by it"),
            ),
            Stop::Enclosed { name, .. } => self.report(
                Finding::new(
                    catalogue::CLAIM_UNDECIDED,
                    span,
                    format!("{name} is only known between two bounds here"),
                )
                .help("compare it alone with a number"),
            ),
        }
    }

    /// Counts evaluation steps against the limit.
    fn spend(&self, steps: u64, span: Span) -> Outcome<()> {
        let spent = self.steps.get().saturating_add(steps);
        self.steps.set(spent);
        if spent > STEPS {
            return Err(Box::new(
                Finding::new(
                    catalogue::LIMIT,
                    span,
                    format!("evaluating this passes the limit of {STEPS} steps"),
                )
                .help("choose smaller ranges, or narrower conditions"),
            )
            .into());
        }
        Ok(())
    }

    /// The source text of a span, comments left out and white space folded.
    pub fn text(&self, span: Span) -> String {
        fold(self.sources.text(span))
    }
}

/// Text without comments, white space folded, at most some 120 characters.
fn fold(text: &str) -> String {
    let mut folded = String::new();
    let mut quoted = false;
    let mut comment = false;
    for character in text.chars() {
        match character {
            '\n' => comment = false,
            _ if comment => continue,
            '"' => quoted = !quoted,
            '#' if !quoted => {
                comment = true;
                continue;
            }
            _ => {}
        }
        if character.is_whitespace() {
            if !folded.ends_with(' ') {
                folded.push(' ');
            }
        } else {
            folded.push(character);
        }
    }
    let folded = folded.trim();
    if folded.chars().count() <= 120 {
        return folded.to_string();
    }
    let short: String = folded.chars().take(117).collect();
    format!("{short}...")
}
