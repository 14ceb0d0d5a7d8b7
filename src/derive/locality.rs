//! Repair of single symbols: how many others have to be read, in how many ways at once, and how
//! many checks an update touches. All of it lies in the light words of the dual.

use super::patterns::{Basis, Columns};
use super::{Effort, Session};
use crate::algebra::Element;
use crate::code::{Code, information_positions};

/// The most words of the dual that are gone through.
const WORDS: u64 = 1 << 20;
/// The most sets of columns of a generator matrix that are tested.
const SETS: u64 = 1 << 22;
/// The most entries of a generator matrix that is looked at.
const ENTRIES: usize = 1 << 26;
/// The longest code whose repair sets are packed, and the most words of its dual.
const PACKED: usize = 256;
const PACKED_WORDS: f64 = 4096.0;
/// The most choices of repair sets that are tried for one position.
const CHOICES: u64 = 1 << 20;

/// What is known of a quantity of the worst position.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
pub struct Known {
    /// It is at least this.
    pub lower: usize,
    /// It is at most this.
    pub upper: usize,
}

/// The locality: the fewest other symbols from which each symbol follows, for the worst position.
/// `Err` names a position that follows from no others.
///
/// # Errors
/// The first position that no check touches.
pub fn locality(session: &Session, code: &Code) -> Result<Known, usize> {
    let positions = of_positions(session, code)?;
    let most = |end: fn(&Known) -> usize| positions.iter().map(end).max().unwrap_or(0);
    Ok(Known {
        lower: most(|known| known.lower),
        upper: most(|known| known.upper),
    })
}

/// The locality of each position.
///
/// # Errors
/// The first position that no check touches.
pub fn of_positions(session: &Session, code: &Code) -> Result<Vec<Known>, usize> {
    let (n, k) = (code.length(), code.dimension());
    let check = code.check_matrix();
    let mut touched = vec![false; n];
    // At most k: the other columns of a generator matrix span all of it.
    let mut known = vec![Known { lower: 0, upper: k }; n];
    for matrix in [Some(check), code.check_matrix_as_built()]
        .into_iter()
        .flatten()
    {
        for row in 0..matrix.rows() {
            let weight = matrix.row_weight(row);
            for (at, _) in matrix.nonzero(row) {
                touched[at] = true;
                known[at].upper = known[at].upper.min(weight - 1);
            }
        }
    }
    if let Some(alone) = touched.iter().position(|&touched| !touched) {
        return Err(alone);
    }
    let words = (code.field().order() as f64).powf(code.redundancy() as f64);
    if words <= WORDS as f64 && words * n as f64 <= (WORDS << 8) as f64 {
        go_through_dual(code, |word| {
            let weight = crate::code::weight(word);
            for (at, _) in word.iter().enumerate().filter(|&(_, &entry)| entry != 0) {
                known[at].upper = known[at].upper.min(weight - 1);
            }
        });
        for known in &mut known {
            known.lower = known.upper;
        }
        return Ok(known);
    }
    let dual = session.distance_by(&session.dual(code), Effort::Small);
    for known in &mut known {
        known.lower = dual.lower.saturating_sub(1).min(known.upper);
    }
    if k.saturating_mul(n) <= ENTRIES {
        by_sets(code, &mut known);
    }
    Ok(known)
}

/// Every word of the dual but zero, by its rows' combinations.
fn go_through_dual(code: &Code, mut look: impl FnMut(&[Element])) {
    let (check, field) = (code.check_matrix(), code.field());
    let rows: Vec<Vec<Element>> = (0..check.rows()).map(|row| check.row(row)).collect();
    let mut word = vec![0; code.length()];
    let mut digits = vec![0u64; rows.len()];
    loop {
        // The next combination: count up, the first digit fastest.
        let Some(at) = digits.iter().position(|&digit| digit + 1 < field.order()) else {
            return;
        };
        for (digit, row) in digits[..at].iter_mut().zip(&rows) {
            field.add_multiple(&mut word, field.neg(*digit as Element), row);
            *digit = 0;
        }
        let (old, new) = (digits[at] as Element, digits[at] as Element + 1);
        field.add_multiple(&mut word, field.sub(new, old), &rows[at]);
        digits[at] += 1;
        look(&word);
    }
}

/// Settles the positions size by size: a dual word of weight s lives on s dependent columns of a
/// generator matrix, and of minimal words through a position one is met as soon as its last
/// column is added to the others.
fn by_sets(code: &Code, known: &mut [Known]) {
    let n = code.length();
    let generator = code.generator_matrix();
    let columns = Columns::from_matrix(generator);
    let first = known.iter().map(|known| known.lower).min().unwrap_or(0) + 1;
    let mut spent = 0u64;
    for size in first..=n {
        if known.iter().all(|known| known.lower == known.upper) {
            return;
        }
        let sets = (0..size).fold(1u64, |product, at| {
            product.saturating_mul((n - at) as u64) / (at as u64 + 1)
        });
        spent = spent.saturating_add(sets);
        if spent > SETS {
            return;
        }
        let mut found = Vec::new();
        dependent(
            &mut Basis::new(&columns),
            0,
            size,
            &mut Vec::new(),
            &mut found,
        );
        for set in found {
            let word = columns.word_at(&set).expect("dependent columns");
            let weight = crate::code::weight(&word);
            for (at, _) in word.iter().enumerate().filter(|&(_, &entry)| entry != 0) {
                known[at].upper = known[at].upper.min(weight - 1);
            }
        }
        // Nothing of weight `size` or less is left to be met.
        for known in known.iter_mut() {
            known.lower = known.lower.max(size).min(known.upper);
        }
    }
}

/// Sets of at most `size` columns of which all but the last are independent.
fn dependent(
    basis: &mut Basis,
    first: usize,
    size: usize,
    chosen: &mut Vec<usize>,
    found: &mut Vec<Vec<usize>>,
) {
    let n = basis.columns().len();
    for column in first..n {
        chosen.push(column);
        if !basis.push(column) {
            if chosen.len() == size {
                found.push(chosen.clone());
            }
        } else {
            if chosen.len() < size {
                dependent(basis, column + 1, size, chosen, found);
            }
            basis.truncate(chosen.len() - 1);
        }
        chosen.pop();
    }
}

/// The availability: for the worst position, how many sets of other positions, no two of which
/// meet, each give its symbol.
///
/// # Errors
/// The first position that no check touches.
pub fn availability(session: &Session, code: &Code) -> Result<Known, usize> {
    let positions = of_positions(session, code)?;
    let n = code.length();
    let words = (code.field().order() as f64).powf(code.redundancy() as f64);
    // Each repair set takes as many places as the locality says.
    let ceiling = |known: &Known| (n - 1).checked_div(known.lower).unwrap_or(n);
    if words > PACKED_WORDS || n > PACKED {
        return Ok(Known {
            lower: 1,
            upper: positions.iter().map(ceiling).min().unwrap_or(n),
        });
    }
    let mut supports: Vec<Support> = Vec::new();
    go_through_dual(code, |word| supports.push(Support::of(word)));
    supports.sort_by_key(|support| (support.size(), support.0));
    supports.dedup();
    let mut worst = Known { lower: n, upper: n };
    for (at, known) in positions.iter().enumerate() {
        if known.upper == 0 {
            continue;
        }
        let mut through: Vec<Support> = Vec::new();
        for support in supports.iter().filter(|support| support.has(at)) {
            let rest = support.without(at);
            if !through.iter().any(|smaller| smaller.inside(&rest)) {
                through.push(rest);
            }
        }
        let mut packing = Packing {
            sets: &through,
            best: 0,
            most: ceiling(known),
            tried: 0,
        };
        packing.extend(0, Support([0; 4]), 0, n - 1);
        let upper = if packing.tried > CHOICES {
            packing.most
        } else {
            packing.best
        };
        worst.lower = worst.lower.min(packing.best);
        worst.upper = worst.upper.min(upper);
    }
    Ok(worst)
}

/// A set of positions below 256.
#[derive(Clone, Copy, PartialEq, Eq)]
struct Support([u64; 4]);

impl Support {
    fn of(word: &[Element]) -> Support {
        let mut bits = [0; 4];
        for (at, _) in word.iter().enumerate().filter(|&(_, &entry)| entry != 0) {
            bits[at / 64] |= 1 << (at % 64);
        }
        Support(bits)
    }

    fn size(&self) -> u32 {
        self.0.iter().map(|word| word.count_ones()).sum()
    }

    fn has(&self, at: usize) -> bool {
        self.0[at / 64] >> (at % 64) & 1 == 1
    }

    fn without(mut self, at: usize) -> Support {
        self.0[at / 64] &= !(1 << (at % 64));
        self
    }

    fn meets(&self, other: &Support) -> bool {
        self.0
            .iter()
            .zip(other.0)
            .any(|(left, right)| left & right != 0)
    }

    fn inside(&self, other: &Support) -> bool {
        self.0
            .iter()
            .zip(other.0)
            .all(|(left, right)| left & !right == 0)
    }

    fn with(self, other: &Support) -> Support {
        Support(std::array::from_fn(|at| self.0[at] | other.0[at]))
    }
}

/// The most sets no two of which meet, smaller ones first.
struct Packing<'a> {
    sets: &'a [Support],
    best: usize,
    most: usize,
    tried: u64,
}

impl Packing<'_> {
    fn extend(&mut self, from: usize, taken: Support, count: usize, free: usize) {
        self.best = self.best.max(count);
        for at in from..self.sets.len() {
            let size = self.sets[at].size() as usize;
            // All later sets are as large.
            if self.best >= self.most || count + free / size <= self.best {
                return;
            }
            self.tried += 1;
            if self.tried > CHOICES {
                return;
            }
            if !self.sets[at].meets(&taken) {
                self.extend(at + 1, taken.with(&self.sets[at]), count + 1, free - size);
            }
        }
    }
}

/// The most checks that change when one data symbol does, the data standing at the code's
/// information positions; `None` when the matrix is too large.
pub fn update_cost(code: &Code) -> Option<usize> {
    let (n, k) = (code.length(), code.dimension());
    if k.saturating_mul(n) > ENTRIES {
        return None;
    }
    let mut order = information_positions(code);
    let data: std::collections::BTreeSet<usize> = order.iter().copied().collect();
    order.extend((0..n).filter(|at| !data.contains(at)));
    let systematic = code.generator_matrix().reduced_in(&order).matrix;
    (0..systematic.rows())
        .map(|row| systematic.row_weight(row) - 1)
        .max()
        .or(Some(0))
}
