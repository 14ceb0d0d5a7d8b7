//! What a code is: its space, the presentation as built, and where it came from.
//!
//! In: spaces from constructions and steps. Out: [`Code`]s whose n and k are computed, whose
//! matrices are built when asked for, and whose [`Origin`] carries the theorems ([`Rules`]) that
//! turn what is known of the parents into what is known of the code. Nothing is searched here.

mod arrange;
mod cyclic;
mod knowledge;
mod weights;

pub use arrange::{check_positions, information_positions};
pub use cyclic::Cyclic;
pub use knowledge::{
    Bound, Counts, Distance, Knowledge, NoRules, Rules, SameCode, Side, Weights, lower, upper,
};
pub use weights::{counted, listed, macwilliams};

use crate::algebra::{Element, Field, Matrix};
use crate::source::Span;
use std::sync::{Arc, OnceLock};

/// The subspace itself, in the presentation it was built with.
#[derive(Clone, Debug)]
pub enum Space {
    /// All words that a check matrix sends to zero; rows may be dependent.
    Check(Matrix),
    /// All combinations of the rows of a matrix; rows may be dependent.
    Span(Matrix),
    /// A cyclic code, kept as its generator polynomial.
    Cyclic(Cyclic),
}

/// A linear code: a subspace of F^n, how it is presented, and how it came about. Cheap to clone.
#[derive(Clone)]
pub struct Code {
    body: Arc<Body>,
    origin: Arc<Origin>,
}

struct Body {
    field: Field,
    length: usize,
    dimension: usize,
    space: Space,
    offset: Option<Vec<Element>>,
    generator: OnceLock<Matrix>,
    check: OnceLock<Matrix>,
}

/// What kind of line a code is in a derivation.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
pub enum OriginKind {
    /// A construction or a named code: a derivation begins here.
    Start,
    /// A step on the first parent.
    Step,
}

/// How a code came about.
pub struct Origin {
    /// The construction or step as written.
    pub text: String,
    /// Where it was written.
    pub span: Span,
    /// Whether it begins a derivation or continues one.
    pub kind: OriginKind,
    /// The codes it was made from; for a step, the code so far comes first.
    pub parents: Vec<Code>,
    /// The theorems that hold for it.
    pub rules: Arc<dyn Rules>,
    /// Conventions that were assumed or stated on the way, in plain words.
    pub assumptions: Vec<String>,
    /// What was assumed because the spec leaves it open, if anything.
    pub unstated: Option<Unstated>,
}

/// A convention that a spec leaves open.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Unstated {
    /// Which kind of finding it is where a file depends on it.
    pub code: crate::finding::Code,
    /// What is assumed.
    pub says: String,
    /// What to write to state it.
    pub help: String,
}

/// What a construction or step hands back: a space and what follows from the way it was made.
pub struct Made {
    /// The field.
    pub field: Field,
    /// n.
    pub length: usize,
    /// The space.
    pub space: Space,
    /// k, when it follows from a theorem; otherwise it is computed as a rank.
    pub dimension: Option<usize>,
    /// The codes it was made from.
    pub parents: Vec<Code>,
    /// The theorems that hold for it.
    pub rules: Arc<dyn Rules>,
    /// Conventions assumed or stated.
    pub assumptions: Vec<String>,
    /// What was assumed because the spec leaves it open, if anything.
    pub unstated: Option<Unstated>,
    /// The fixed word added to every word on the wire, of length n. A step on a masked code that
    /// leaves it out does not know what becomes of the mask, and is refused.
    pub offset: Option<Vec<Element>>,
}

impl Made {
    /// A code given by a check matrix.
    pub fn check(matrix: Matrix) -> Made {
        Made::new(
            matrix.field().clone(),
            matrix.columns(),
            Space::Check(matrix),
        )
    }

    /// A code given as the row space of a matrix.
    pub fn span(matrix: Matrix) -> Made {
        Made::new(
            matrix.field().clone(),
            matrix.columns(),
            Space::Span(matrix),
        )
    }

    /// A code of length n in the given space.
    pub fn new(field: Field, length: usize, space: Space) -> Made {
        Made {
            field,
            length,
            space,
            dimension: None,
            parents: Vec::new(),
            rules: Arc::new(NoRules),
            assumptions: Vec::new(),
            unstated: None,
            offset: None,
        }
    }

    /// With the word that is added on the wire, when there is one.
    pub fn masked(mut self, offset: Option<Vec<Element>>) -> Made {
        self.offset = offset;
        self
    }

    /// With the codes it was made from.
    pub fn from(mut self, parents: impl IntoIterator<Item = Code>) -> Made {
        self.parents.extend(parents);
        self
    }

    /// With the theorems that hold for it.
    pub fn rules(mut self, rules: impl Rules + 'static) -> Made {
        self.rules = Arc::new(rules);
        self
    }

    /// With a dimension that follows from a theorem.
    pub fn dimension(mut self, dimension: usize) -> Made {
        self.dimension = Some(dimension);
        self
    }

    /// With a convention to state in reports.
    pub fn assuming(mut self, assumption: impl Into<String>) -> Made {
        self.assumptions.push(assumption.into());
        self
    }
}

impl Code {
    /// A code from what a construction or step made.
    pub fn new(made: Made, text: impl Into<String>, span: Span, kind: OriginKind) -> Code {
        let dimension = made.dimension.unwrap_or_else(|| match &made.space {
            Space::Check(matrix) => made.length - matrix.rank(),
            Space::Span(matrix) => matrix.rank(),
            Space::Cyclic(cyclic) => cyclic.dimension(),
        });
        Code {
            body: Arc::new(Body {
                field: made.field,
                length: made.length,
                dimension,
                space: made.space,
                offset: made.offset.filter(|word| weight(word) > 0),
                generator: OnceLock::new(),
                check: OnceLock::new(),
            }),
            origin: Arc::new(Origin {
                text: text.into(),
                span,
                kind,
                parents: made.parents,
                rules: made.rules,
                assumptions: made.assumptions,
                unstated: made.unstated,
            }),
        }
    }

    /// The same code under a name: a derivation that uses it begins with this one line.
    pub fn named(&self, text: impl Into<String>, span: Span) -> Code {
        Code {
            body: self.body.clone(),
            origin: Arc::new(Origin {
                text: text.into(),
                span,
                kind: OriginKind::Start,
                parents: vec![self.clone()],
                rules: Arc::new(SameCode),
                assumptions: Vec::new(),
                unstated: None,
            }),
        }
    }

    /// The code as it was made, all names it was given taken off.
    pub fn unnamed(&self) -> &Code {
        let mut code = self;
        while let [parent] = code.origin.parents.as_slice()
            && parent.is_same_object(code)
        {
            code = parent;
        }
        code
    }

    /// The field.
    pub fn field(&self) -> &Field {
        &self.body.field
    }

    /// n.
    pub fn length(&self) -> usize {
        self.body.length
    }

    /// k.
    pub fn dimension(&self) -> usize {
        self.body.dimension
    }

    /// n − k.
    pub fn redundancy(&self) -> usize {
        self.length() - self.dimension()
    }

    /// The presentation as built.
    pub fn space(&self) -> &Space {
        &self.body.space
    }

    /// The fixed word, not zero, that is added to every word on the wire (`mask`). The code itself
    /// stays linear: distance, weights and membership are those without it.
    pub fn offset(&self) -> Option<&[Element]> {
        self.body.offset.as_deref()
    }

    /// How the code came about.
    pub fn origin(&self) -> &Origin {
        &self.origin
    }

    /// Whether both are one space in memory (a quick yes; a no says nothing).
    pub fn is_same_object(&self, other: &Code) -> bool {
        Arc::ptr_eq(&self.body, &other.body)
    }

    /// A key that is equal for clones and renamings of one code, for memos within one run; keep a
    /// clone of the code beside it.
    pub fn key(&self) -> usize {
        Arc::as_ptr(&self.body) as usize
    }

    /// A generator matrix of full rank, k × n; as built when that has full rank.
    pub fn generator_matrix(&self) -> &Matrix {
        self.body.generator.get_or_init(|| match &self.body.space {
            Space::Check(matrix) => matrix.null_space(),
            Space::Span(matrix) if matrix.rows() == self.dimension() => matrix.clone(),
            Space::Span(matrix) => matrix.reduced().matrix,
            Space::Cyclic(cyclic) => cyclic.generator_matrix(),
        })
    }

    /// A check matrix of full rank, (n − k) × n; as built when that has full rank.
    pub fn check_matrix(&self) -> &Matrix {
        self.body.check.get_or_init(|| match &self.body.space {
            Space::Check(matrix) if matrix.rows() == self.redundancy() => matrix.clone(),
            Space::Check(matrix) => matrix.reduced().matrix,
            Space::Span(matrix) => matrix.null_space(),
            Space::Cyclic(cyclic) => cyclic.check_matrix(),
        })
    }

    /// The check matrix as built, redundant rows included; `None` when the code was not built
    /// from one.
    pub fn check_matrix_as_built(&self) -> Option<&Matrix> {
        match &self.body.space {
            Space::Check(matrix) => Some(matrix),
            Space::Cyclic(_) => Some(self.check_matrix()),
            Space::Span(_) => None,
        }
    }

    /// The generator matrix as built, redundant rows included; `None` when the code was not
    /// built from one.
    pub fn generator_matrix_as_built(&self) -> Option<&Matrix> {
        match &self.body.space {
            Space::Span(matrix) => Some(matrix),
            Space::Cyclic(_) => Some(self.generator_matrix()),
            Space::Check(_) => None,
        }
    }

    /// Whether a word of length n lies in the code.
    pub fn contains(&self, word: &[Element]) -> bool {
        match &self.body.space {
            Space::Check(matrix) => matrix.times(word).iter().all(|&entry| entry == 0),
            Space::Cyclic(cyclic) => cyclic.contains(word),
            // A check matrix of a long code with few words is far larger than the code itself.
            Space::Span(matrix) if self.redundancy() > 4 * (matrix.rows() + 16) => {
                let row = Matrix::from_rows(self.field(), self.length(), &[word.to_vec()]);
                matrix.above(&row).rank() == self.dimension()
            }
            Space::Span(_) => self
                .check_matrix()
                .times(word)
                .iter()
                .all(|&entry| entry == 0),
        }
    }

    /// The space of all words orthogonal to this code's, in the matching presentation.
    pub fn dual_space(&self) -> Space {
        match &self.body.space {
            Space::Check(matrix) => Space::Span(matrix.clone()),
            Space::Span(matrix) => Space::Check(matrix.clone()),
            Space::Cyclic(cyclic) => Space::Cyclic(cyclic.dual()),
        }
    }

    /// The derivation: the start and each step, first to last, each a code.
    pub fn trail(&self) -> Vec<Code> {
        let mut trail = vec![self.clone()];
        while let Some(before) = trail
            .last()
            .filter(|code| code.origin.kind == OriginKind::Step)
            .and_then(|code| code.origin.parents.first())
            .cloned()
        {
            trail.push(before);
        }
        trail.reverse();
        trail
    }

    /// All conventions assumed or stated on the way to this code, each once, oldest first.
    pub fn assumptions(&self) -> Vec<String> {
        let mut found = Vec::new();
        self.collect_assumptions(&mut found);
        found
    }

    /// What was assumed on the way to this code because the spec leaves it open, each once.
    pub fn unstated(&self) -> Vec<Unstated> {
        let mut found: Vec<Unstated> = Vec::new();
        let earlier = self.origin.parents.iter().flat_map(Code::unstated);
        for unstated in earlier.chain(self.origin.unstated.clone()) {
            if !found.contains(&unstated) {
                found.push(unstated);
            }
        }
        found
    }

    fn collect_assumptions(&self, found: &mut Vec<String>) {
        for parent in &self.origin.parents {
            parent.collect_assumptions(found);
        }
        for assumption in &self.origin.assumptions {
            if !found.contains(assumption) {
                found.push(assumption.clone());
            }
        }
    }
}

impl std::fmt::Debug for Code {
    fn fmt(&self, formatter: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        write!(
            formatter,
            "[{}, {}] over {}",
            self.length(),
            self.dimension(),
            self.field()
        )
    }
}

/// The Hamming weight of a word.
pub fn weight(word: &[Element]) -> usize {
    word.iter().filter(|&&entry| entry != 0).count()
}
