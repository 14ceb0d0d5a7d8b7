//! Delsarte's linear-programming bound (1973), solved exactly.
//!
//! The weights A_d, …, A_n of a code are not negative, and neither are those of its transform:
//! Σ Aᵢ Kⱼ(i) ≥ −C(n, j)(q − 1)ʲ. The largest Σ Aᵢ under these is found by the simplex method over
//! whole numbers with a common denominator (Edmonds, 1967; Bareiss, 1968), so that nothing is
//! excluded by rounding.

use num_bigint::{BigInt, BigUint};
use num_integer::Integer;
use num_traits::{One, Signed, Zero};

use super::bounds::{binomial, hamming, largest, power, singleton};

/// The longest codes for which the bound is computed: binary, and over other fields.
const MOST_BINARY: usize = 96;
const MOST_OTHER: usize = 40;
/// Steps without progress after which Bland's rule takes over, which never circles.
const MOST_IDLE: usize = 12;

/// The largest d for which the linear program does not exclude a code with q^k words of length n;
/// `None` for codes that are too long to solve it (n > 96 over GF(2), n > 40 elsewhere). Like all
/// in [`super::bounds`], n when k = 0.
pub fn linear_programming(q: u64, n: usize, k: usize) -> Option<usize> {
    let longest = if q == 2 { MOST_BINARY } else { MOST_OTHER };
    if n > longest {
        return None;
    }
    if k == 0 || k > n {
        return Some(n);
    }
    let most = singleton(q, n, k).min(hamming(q, n, k));
    Some(largest(most, |d| {
        let words = power(q, k);
        // A binary code with an odd distance is one with an even distance and even weights, once
        // extended by a check; one with an even distance may be taken to have even weights.
        let (length, d) = if q == 2 && d % 2 == 1 {
            (n + 1, d + 1)
        } else {
            (n, d)
        };
        Program::new(q, length, d).reaches(&words)
    }))
}

/// A simplex tableau without the basic columns; every entry is over `denominator`.
struct Program {
    /// Constraints, the right-hand side last; below them the objective.
    rows: Vec<Vec<BigInt>>,
    denominator: BigInt,
    /// Names of the variables out of and in the basis.
    outside: Vec<usize>,
    basis: Vec<usize>,
}

impl Program {
    fn new(q: u64, n: usize, d: usize) -> Program {
        let even = q == 2;
        let weights: Vec<usize> = (d..=n).filter(|weight| !even || weight % 2 == 0).collect();
        // For even weights, the constraints j and n − j are the same.
        let constraints = if even { n / 2 } else { n };
        let table = krawtchouk(q, n);
        let mut rows: Vec<Vec<BigInt>> = (1..=constraints)
            .map(|j| {
                let mut row: Vec<BigInt> =
                    weights.iter().map(|&weight| -&table[j][weight]).collect();
                row.push(table[j][0].clone());
                let common = row
                    .iter()
                    .fold(BigInt::zero(), |common, entry| common.gcd(entry));
                row.into_iter().map(|entry| entry / &common).collect()
            })
            .collect();
        let mut objective = vec![-BigInt::one(); weights.len()];
        objective.push(BigInt::zero());
        rows.push(objective);
        Program {
            outside: (0..weights.len()).collect(),
            basis: (weights.len()..weights.len() + constraints).collect(),
            rows,
            denominator: BigInt::one(),
        }
    }

    /// Whether 1 + Σ Aᵢ can be as large as `words`.
    fn reaches(mut self, words: &BigUint) -> bool {
        let wanted = BigInt::from(words.clone()) - 1;
        let mut idle = 0;
        loop {
            let objective = self.rows.last().expect("the objective is a row");
            let value = objective.last().expect("a row has a right-hand side");
            if value >= &(&wanted * &self.denominator) {
                return true;
            }
            let Some(column) = self.entering(idle > MOST_IDLE) else {
                return false;
            };
            // Unbounded: every word count is reached.
            let Some(row) = self.leaving(column) else {
                return true;
            };
            let stuck = self.rows[row].last().is_some_and(Zero::is_zero);
            idle = if stuck { idle + 1 } else { 0 };
            self.pivot(row, column);
        }
    }

    /// The column that improves the objective most, or the first by name.
    fn entering(&self, by_name: bool) -> Option<usize> {
        let objective = self.rows.last()?;
        let improving = (0..self.outside.len()).filter(|&column| objective[column].is_negative());
        if by_name {
            improving.min_by_key(|&column| self.outside[column])
        } else {
            improving.min_by(|&one, &two| {
                objective[one]
                    .cmp(&objective[two])
                    .then(self.outside[one].cmp(&self.outside[two]))
            })
        }
    }

    /// The row that limits the column first; of several, the first by name.
    fn leaving(&self, column: usize) -> Option<usize> {
        let right = self.outside.len();
        (0..self.basis.len())
            .filter(|&row| self.rows[row][column].is_positive())
            .min_by(|&one, &two| {
                let (a, b) = (&self.rows[one], &self.rows[two]);
                (&a[right] * &b[column])
                    .cmp(&(&b[right] * &a[column]))
                    .then(self.basis[one].cmp(&self.basis[two]))
            })
    }

    fn pivot(&mut self, row: usize, column: usize) {
        let pivot_row = self.rows[row].clone();
        let pivot = &pivot_row[column];
        for (at, entries) in self
            .rows
            .iter_mut()
            .enumerate()
            .filter(|(at, _)| *at != row)
        {
            let factor = std::mem::take(&mut entries[column]);
            for (place, entry) in entries
                .iter_mut()
                .enumerate()
                .filter(|(place, _)| *place != column)
            {
                *entry *= pivot;
                if !factor.is_zero() {
                    *entry -= &factor * &pivot_row[place];
                }
                *entry /= &self.denominator;
            }
            entries[column] = -factor;
            debug_assert!(at != row);
        }
        self.rows[row][column] = std::mem::replace(&mut self.denominator, pivot.clone());
        std::mem::swap(&mut self.basis[row], &mut self.outside[column]);
    }
}

/// Kⱼ(i) at [j][i]: the coefficient of zʲ in (1 + (q − 1)z)^(n−i) (1 − z)^i.
fn krawtchouk(q: u64, n: usize) -> Vec<Vec<BigInt>> {
    let less = BigInt::from(q - 1);
    let mut table = vec![vec![BigInt::zero(); n + 1]; n + 1];
    for (j, row) in table.iter_mut().enumerate() {
        row[0] = BigInt::from(binomial(n, j)) * less.pow(j as u32);
    }
    // Kⱼ(i) = Kⱼ(i−1) − (q−1) Kⱼ₋₁(i) − Kⱼ₋₁(i−1).
    for i in 1..=n {
        table[0][i] = BigInt::one();
        for j in 1..=n {
            table[j][i] = &table[j][i - 1] - &less * &table[j - 1][i] - &table[j - 1][i - 1];
        }
    }
    table
}
