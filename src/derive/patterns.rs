//! Errors confined to certain sets of positions: bursts, neighbours, groups.
//!
//! All errors that lie in a set S of positions are detected when the check matrix's columns at S
//! are independent. All errors that lie in one of a family of sets are corrected when the columns
//! of any two sets' union are: the difference of two such errors lies there, and every vector
//! there is such a difference. So each question is one of independence, and what refutes it is a
//! word of the code.

use super::{Judgement, Session, Verdict, properties};
use crate::algebra::{Element, Field, Matrix};
use crate::code::Code;

/// The most row operations on single machine words that a question may cost.
const WORK: u64 = 1 << 31;
/// How many of these a row operation on one element of a larger field counts for.
const ELEMENT_WORK: u64 = 4;
/// The most entries of a check matrix that is looked at.
const ENTRIES: usize = 1 << 28;

/// The columns of a check matrix, ready to be tested for independence.
pub struct Columns<'a> {
    check: &'a Matrix,
    field: &'a Field,
    /// Machine words, or elements, a column.
    stride: usize,
    bits: Vec<u64>,
    elements: Vec<Element>,
}

impl<'a> Columns<'a> {
    /// The columns of a code's check matrix; `None` when it is too large.
    pub fn of(code: &'a Code) -> Option<Columns<'a>> {
        if code.redundancy().saturating_mul(code.length()) > ENTRIES {
            return None;
        }
        Some(Columns::from_matrix(code.check_matrix()))
    }

    /// The columns of a matrix.
    pub fn from_matrix(check: &'a Matrix) -> Columns<'a> {
        let (rows, n, field) = (check.rows(), check.columns(), check.field());
        let binary = field.is_binary();
        let stride = if binary { rows.div_ceil(64) } else { rows };
        let mut columns = Columns {
            check,
            field,
            stride,
            bits: vec![0; if binary { stride * n } else { 0 }],
            elements: vec![0; if binary { 0 } else { stride * n }],
        };
        for row in 0..rows {
            for (at, value) in check.nonzero(row) {
                if binary {
                    columns.bits[at * stride + row / 64] |= 1 << (row % 64);
                } else {
                    columns.elements[at * stride + row] = value;
                }
            }
        }
        columns
    }

    /// How many there are.
    pub fn len(&self) -> usize {
        self.check.columns()
    }

    /// Whether there are none.
    pub fn is_empty(&self) -> bool {
        self.len() == 0
    }

    /// A word of the code that lives at some of these positions, if there is one.
    pub fn word_at(&self, positions: &[usize]) -> Option<Vec<Element>> {
        let relations = self.check.select_columns(positions).null_space();
        if relations.rows() == 0 {
            return None;
        }
        let mut word = vec![0; self.len()];
        for (&position, value) in positions.iter().zip(relations.row(0)) {
            word[position] = value;
        }
        Some(word)
    }
}

/// Independent columns in echelon form; columns are added and the last ones taken off again.
pub struct Basis<'a> {
    columns: &'a Columns<'a>,
    pivots: Vec<usize>,
    bits: Vec<u64>,
    elements: Vec<Element>,
    /// The work done so far.
    pub work: u64,
}

impl<'a> Basis<'a> {
    /// No columns.
    pub fn new(columns: &'a Columns<'a>) -> Basis<'a> {
        Basis {
            columns,
            pivots: Vec::new(),
            bits: Vec::new(),
            elements: Vec::new(),
            work: 0,
        }
    }

    /// The columns it takes from.
    pub fn columns(&self) -> &'a Columns<'a> {
        self.columns
    }

    /// How many columns it holds.
    pub fn len(&self) -> usize {
        self.pivots.len()
    }

    /// Whether it holds none.
    pub fn is_empty(&self) -> bool {
        self.pivots.is_empty()
    }

    /// Adds a column if it is independent of those held; says whether it is.
    pub fn push(&mut self, column: usize) -> bool {
        if self.columns.field.is_binary() {
            self.push_bits(column)
        } else {
            self.push_elements(column)
        }
    }

    fn push_bits(&mut self, column: usize) -> bool {
        let stride = self.columns.stride;
        let start = self.bits.len();
        let entries = &self.columns.bits[column * stride..(column + 1) * stride];
        self.bits.extend_from_slice(entries);
        self.work += ((self.pivots.len() + 1) * stride.max(1)) as u64;
        let (held, new) = self.bits.split_at_mut(start);
        for (at, &pivot) in self.pivots.iter().enumerate() {
            if new[pivot / 64] >> (pivot % 64) & 1 == 1 {
                for (entry, other) in new.iter_mut().zip(&held[at * stride..]) {
                    *entry ^= other;
                }
            }
        }
        match new.iter().position(|&entry| entry != 0) {
            Some(word) => {
                self.pivots
                    .push(word * 64 + new[word].trailing_zeros() as usize);
                true
            }
            None => {
                self.bits.truncate(start);
                false
            }
        }
    }

    fn push_elements(&mut self, column: usize) -> bool {
        let (stride, field) = (self.columns.stride, self.columns.field);
        let start = self.elements.len();
        let entries = &self.columns.elements[column * stride..(column + 1) * stride];
        self.elements.extend_from_slice(entries);
        self.work += ((self.pivots.len() + 1) * stride.max(1)) as u64 * ELEMENT_WORK;
        let (held, new) = self.elements.split_at_mut(start);
        for (at, &pivot) in self.pivots.iter().enumerate() {
            // What is held is 1 at its pivot.
            let factor = field.neg(new[pivot]);
            if factor != 0 {
                field.add_multiple(new, factor, &held[at * stride..(at + 1) * stride]);
            }
        }
        let Some(pivot) = new.iter().position(|&entry| entry != 0) else {
            self.elements.truncate(start);
            return false;
        };
        let scale = field.inv(new[pivot]).expect("a pivot is not zero");
        for entry in new.iter_mut() {
            *entry = field.mul(*entry, scale);
        }
        self.pivots.push(pivot);
        true
    }

    /// Keeps the first so many columns.
    pub fn truncate(&mut self, size: usize) {
        self.pivots.truncate(size);
        self.bits.truncate(size * self.columns.stride);
        self.elements.truncate(size * self.columns.stride);
    }
}

/// What came of testing sets of positions.
#[derive(Clone, PartialEq, Eq, Debug)]
pub enum Tested {
    /// The columns of every union are independent.
    Independent,
    /// Those of one are not.
    Dependent {
        /// The united sets, by their place in the family.
        sets: Vec<usize>,
        /// A word of the code that lives on their union.
        word: Vec<Element>,
    },
    /// There is too much to test.
    TooMuch,
}

/// Tests the unions of every `at_once` sets of a family (of all of them, when there are fewer);
/// with `through_first`, only those that take in the first set.
pub fn test_unions(
    code: &Code,
    sets: &[Vec<usize>],
    at_once: usize,
    through_first: bool,
) -> Tested {
    let at_once = at_once.min(sets.len());
    if at_once == 0 || code.dimension() == 0 {
        return Tested::Independent;
    }
    let Some(columns) = Columns::of(code) else {
        return Tested::TooMuch;
    };
    let mut search = Unions {
        columns: &columns,
        basis: Basis::new(&columns),
        taken: vec![false; code.length()],
        chosen: Vec::new(),
        sets,
    };
    let last = if through_first { 1 } else { sets.len() };
    search
        .unite(0, last, at_once)
        .unwrap_or(Tested::Independent)
}

struct Unions<'a> {
    columns: &'a Columns<'a>,
    basis: Basis<'a>,
    taken: Vec<bool>,
    chosen: Vec<usize>,
    sets: &'a [Vec<usize>],
}

impl Unions<'_> {
    /// Unites one of the sets from `first` on, and before `end`, with those chosen.
    fn unite(&mut self, first: usize, end: usize, left: usize) -> Option<Tested> {
        for at in first..end {
            if self.basis.work > WORK {
                return Some(Tested::TooMuch);
            }
            let held = self.basis.len();
            self.chosen.push(at);
            let mut added = Vec::new();
            for &position in &self.sets[at] {
                if self.taken[position] {
                    continue;
                }
                if !self.basis.push(position) {
                    return Some(self.dependent());
                }
                self.taken[position] = true;
                added.push(position);
            }
            if left > 1
                && let Some(found) = self.unite(at + 1, self.sets.len(), left - 1)
            {
                return Some(found);
            }
            for position in added {
                self.taken[position] = false;
            }
            self.basis.truncate(held);
            self.chosen.pop();
        }
        None
    }

    fn dependent(&self) -> Tested {
        let mut positions: Vec<usize> = self
            .chosen
            .iter()
            .flat_map(|&at| self.sets[at].iter().copied())
            .collect();
        positions.sort_unstable();
        positions.dedup();
        let word = self
            .columns
            .word_at(&positions)
            .expect("dependent columns have a relation");
        Tested::Dependent {
            sets: self.chosen.clone(),
            word,
        }
    }
}

/// The sets of so many neighbouring positions; with `wrap`, the last and the first are neighbours.
pub fn windows(length: usize, span: usize, wrap: bool) -> Vec<Vec<usize>> {
    let span = span.min(length);
    if span == 0 {
        return Vec::new();
    }
    let starts = if wrap && span < length {
        length
    } else {
        length - span + 1
    };
    (0..starts)
        .map(|start| (start..start + span).map(|at| at % length).collect())
        .collect()
}

/// Tests bursts: whether every one of this span is detected (`at_once` 1) or corrected (2). In a
/// cyclic code every burst can be shifted to begin at position 0, so the first window stands for
/// all.
pub fn test_bursts(
    session: &Session,
    code: &Code,
    span: usize,
    wrap: bool,
    at_once: usize,
) -> Tested {
    let sets = windows(code.length(), span, wrap);
    let cyclic = sets.len() > 1 && properties::is_cyclic(session, code).verdict == Verdict::Holds;
    test_unions(code, &sets, at_once, cyclic)
}

/// The largest span of bursts that are all detected, as an interval: exact unless the check matrix
/// is too large.
pub fn burst_detection(session: &Session, code: &Code, wrap: bool) -> (usize, usize) {
    let (n, most) = (code.length(), code.redundancy());
    if code.dimension() == 0 {
        return (n, n);
    }
    let cyclic = properties::is_cyclic(session, code).verdict == Verdict::Holds;
    // A burst in a cyclic code is a shift of a polynomial, and one of degree below n - k is no
    // multiple of the generator (Peterson and Brown, 1961).
    if cyclic {
        return (most, most);
    }
    let Some(columns) = Columns::of(code) else {
        return (0, most);
    };
    let mut basis = Basis::new(&columns);
    let mut best = most;
    for start in 0..n {
        let reach = if wrap {
            start + best
        } else {
            n.min(start + best)
        };
        basis.truncate(0);
        if let Some(end) = (start..reach).find(|&at| !basis.push(at % n)) {
            best = end - start;
        }
        if basis.work > WORK {
            return (0, best);
        }
    }
    (best, best)
}

/// The largest span of bursts that are all corrected, as an interval.
pub fn burst_correction(session: &Session, code: &Code, wrap: bool) -> (usize, usize) {
    let n = code.length();
    if code.dimension() == 0 {
        return (n, n);
    }
    // Reiger, 1960: two windows side by side have independent columns.
    let most = code.redundancy() / 2;
    for span in 1..=most {
        match test_bursts(session, code, span, wrap, 2) {
            Tested::Independent => {}
            Tested::Dependent { .. } => return (span - 1, span - 1),
            Tested::TooMuch => return (span - 1, most),
        }
    }
    (most, most)
}

/// Whether every error in an odd number of places is detected: whether no word has an odd weight.
pub fn detects_odd(session: &Session, code: &Code) -> Judgement {
    let judgement = (properties::property("even")
        .expect("a property of this name")
        .decide)(session, code);
    if judgement.verdict != Verdict::Fails || judgement.witness.is_some() {
        return judgement;
    }
    let generator = code.generator_matrix();
    let odd = (0..generator.rows()).find(|&row| generator.row_weight(row) % 2 == 1);
    judgement.witness(odd.map(|row| generator.row(row)))
}
