//! The three verdicts.

use crate::algebra::Element;

/// Whether something holds. Undecided is an answer; a wrong "holds" never is.
#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Debug, serde::Serialize)]
#[serde(rename_all = "lowercase")]
pub enum Verdict {
    /// Proven.
    Holds,
    /// Refuted.
    Fails,
    /// Neither, within the budget.
    Undecided,
}

impl Verdict {
    /// The word for it.
    pub fn word(self) -> &'static str {
        match self {
            Verdict::Holds => "holds",
            Verdict::Fails => "fails",
            Verdict::Undecided => "undecided",
        }
    }
}

/// A verdict with its grounds.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Judgement {
    /// The verdict.
    pub verdict: Verdict,
    /// The grounds in one line.
    pub says: String,
    /// A word that shows it, if there is one.
    pub witness: Option<Vec<Element>>,
}

impl Judgement {
    /// Proven.
    pub fn holds(says: impl Into<String>) -> Judgement {
        Judgement {
            verdict: Verdict::Holds,
            says: says.into(),
            witness: None,
        }
    }

    /// Refuted.
    pub fn fails(says: impl Into<String>) -> Judgement {
        Judgement {
            verdict: Verdict::Fails,
            ..Judgement::holds(says)
        }
    }

    /// Neither.
    pub fn undecided(says: impl Into<String>) -> Judgement {
        Judgement {
            verdict: Verdict::Undecided,
            ..Judgement::holds(says)
        }
    }

    /// Proven or refuted.
    pub fn of(holds: bool, yes: impl Into<String>, no: impl Into<String>) -> Judgement {
        if holds {
            Judgement::holds(yes)
        } else {
            Judgement::fails(no)
        }
    }

    /// With a word that shows it.
    pub fn witness(mut self, word: Option<Vec<Element>>) -> Judgement {
        self.witness = word;
        self
    }
}
