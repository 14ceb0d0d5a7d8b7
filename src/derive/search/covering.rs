//! The covering radius: how far a vector can be from a code.
//!
//! A table holds, for each syndrome, the least number of columns that combine to it. Columns are
//! let in one at a time: along a line in a column's direction no syndrome is further than one
//! step from the nearest on that line. That costs n · q^(n−k), however far the vectors are.

use super::Budget;
use super::arithmetic::{Arithmetic, power, product};
use crate::algebra::{Element, Matrix};

/// The most cosets that are looked at: a byte each.
const MOST_COSETS: u64 = 1 << 26;
/// Not reached yet; leaves room for one more step.
const FAR: u8 = 200;

/// The covering radius of the code with this check matrix (dependent rows are left out): the
/// largest weight of a coset leader. `None` when the code has more than 2^26 cosets or the budget
/// is too small.
pub fn covering_radius(check: &Matrix, budget: &Budget) -> Option<usize> {
    let reduced = check.reduced().matrix;
    let (q, r, n) = (check.field().order(), reduced.rows(), reduced.columns());
    let cosets = power(q, r);
    let columns = distinct_lines(&reduced);
    let cost = product(&[cosets, columns.len() as u64 + 1]);
    if cosets > MOST_COSETS || n == 0 && r > 0 || !budget.spend(cost) {
        return None;
    }
    let mut far = vec![FAR; cosets as usize];
    far[0] = 0;
    if q == 2 {
        for column in &columns {
            let direction = column
                .iter()
                .fold(0, |sum, &entry| sum << 1 | entry as usize);
            let_in_binary(&mut far, direction);
        }
    } else {
        let space = Space::new(check, r);
        for column in &columns {
            space.let_in(&mut far, column);
        }
    }
    far.iter().copied().max().map(usize::from)
}

/// The non-zero columns, one of each line through zero: first non-zero entry 1.
fn distinct_lines(reduced: &Matrix) -> Vec<Vec<Element>> {
    let field = reduced.field();
    let mut columns: Vec<Vec<Element>> = (0..reduced.columns())
        .filter_map(|at| {
            let column = reduced.column(at);
            let scale = field.inv(column.iter().copied().find(|&entry| entry != 0)?)?;
            Some(
                column
                    .iter()
                    .map(|&entry| field.mul(scale, entry))
                    .collect(),
            )
        })
        .collect();
    columns.sort_unstable();
    columns.dedup();
    columns
}

fn let_in_binary(far: &mut [u8], direction: usize) {
    let high = 1usize << direction.ilog2();
    let rest = direction ^ high;
    // Runs of partners that stay next to each other.
    let run = if rest == 0 {
        high
    } else {
        1 << rest.trailing_zeros()
    };
    for block in far.chunks_exact_mut(2 * high) {
        let (low, top) = block.split_at_mut(high);
        for start in (0..high).step_by(run) {
            let partner = start ^ rest;
            for (one, two) in low[start..start + run]
                .iter_mut()
                .zip(&mut top[partner..partner + run])
            {
                (*one, *two) = ((*one).min(*two + 1), (*two).min(*one + 1));
            }
        }
    }
}

/// Syndromes over GF(q), q > 2, as numbers in base q; the upper and the lower half of the digits
/// are added by table.
struct Space {
    arithmetic: Arithmetic,
    height: usize,
    /// Digits in the lower half, and q to that power.
    low_digits: usize,
    low_size: usize,
}

impl Space {
    fn new(check: &Matrix, height: usize) -> Space {
        let arithmetic = Arithmetic::new(check.field());
        let low_digits = height / 2;
        let low_size = power(arithmetic.order, low_digits) as usize;
        Space {
            arithmetic,
            height,
            low_digits,
            low_size,
        }
    }

    /// Where adding `vector` takes each number below q^length.
    fn moved(&self, vector: &[Element]) -> Vec<usize> {
        let q = self.arithmetic.order as usize;
        let mut moved = vec![0];
        let mut place = 1;
        for &add in vector {
            moved = (0..q)
                .flat_map(|digit| {
                    let digit = self.arithmetic.add(digit as Element, add) as usize * place;
                    moved.iter().map(move |lower| digit + lower)
                })
                .collect();
            place *= q;
        }
        moved
    }

    fn let_in(&self, far: &mut [u8], column: &[Element]) {
        let q = self.arithmetic.order as usize;
        let pivot = column.iter().position(|&entry| entry != 0).unwrap_or(0);
        let place = power(self.arithmetic.order, pivot) as usize;
        let steps: Vec<(Vec<usize>, Vec<usize>)> = (1..q)
            .map(|scalar| {
                let step = self.arithmetic.scaled(scalar as Element, column);
                let (low, high) = step.split_at(self.low_digits.min(self.height));
                (self.moved(low), self.moved(high))
            })
            .collect();
        let mut line = vec![0; q];
        for start in (0..far.len()).filter(|start| (start / place).is_multiple_of(q)) {
            line[0] = start;
            for (entry, (low, high)) in line[1..].iter_mut().zip(&steps) {
                *entry = high[start / self.low_size] * self.low_size + low[start % self.low_size];
            }
            let nearest = line.iter().map(|&at| far[at]).min().unwrap_or(FAR) + 1;
            for &at in &line {
                far[at] = far[at].min(nearest);
            }
        }
    }
}
