//! The probability that what an erasure channel loses cannot be recovered: that the columns of the
//! check matrix at the lost places are dependent.

use super::patterns::choose;
use super::{Figure, Noise, Probability};
use crate::code::Code;
use crate::derive::patterns::{Basis, Columns};
use crate::derive::{Effort, Session};
use num_bigint::BigUint;
use num_traits::{One, Zero};

/// The most sets of columns that are gone through.
const SETS: usize = 1 << 22;
/// The longest code whose sets are bounded size by size.
const LENGTH: usize = 1 << 11;

/// The probability that the lost symbols cannot be recovered.
pub(super) fn loss(session: &Session, code: &Code, noise: &Noise) -> Figure {
    let (n, checks) = (code.length(), code.redundancy());
    let distance = session.distance_by(code, Effort::Full);
    if distance.lower == checks + 1 {
        return Figure {
            value: noise.more_than(checks),
            says: format!("an MDS code recovers any {checks} losses and never more"),
        };
    }
    if let Some(bad) = dependent_sets(code) {
        return Figure {
            value: noise.of_patterns(&bad),
            says: "every set of places that can be recovered was counted".to_string(),
        };
    }
    if n > LENGTH {
        return Figure {
            value: Probability::between(
                &noise.more_than(checks),
                &noise.more_than(distance.lower - 1),
            ),
            says: format!(
                "at least all losses of more than n - k = {checks}, at most all of {} or more",
                distance.lower
            ),
        };
    }
    let (fewest, most) = bounds(session, code);
    Figure {
        value: Probability::between(&noise.of_patterns(&fewest), &noise.of_patterns(&most)),
        says: "bounded, size by size, by how many places hold a word".to_string(),
    }
}

/// How many sets of each size have dependent columns, by going through the independent ones;
/// `None` when these may be too many.
fn dependent_sets(code: &Code) -> Option<Vec<(usize, BigUint)>> {
    let (n, checks) = (code.length(), code.redundancy());
    let mut most = BigUint::zero();
    for size in 0..=checks {
        most += choose(n, size);
        if most > BigUint::from(SETS) {
            return None;
        }
    }
    let columns = Columns::of(code)?;
    let mut independent = vec![0u64; checks + 1];
    count(&mut Basis::new(&columns), 0, n, &mut independent);
    Some(
        (0..=n)
            .map(|size| {
                let good = independent.get(size).copied().unwrap_or(0);
                (size, choose(n, size) - BigUint::from(good))
            })
            .filter(|(_, bad)| !bad.is_zero())
            .collect(),
    )
}

fn count(basis: &mut Basis, first: usize, n: usize, independent: &mut [u64]) {
    let size = basis.len();
    independent[size] += 1;
    for column in first..n {
        if basis.push(column) {
            count(basis, column + 1, n, independent);
            basis.truncate(size);
        }
    }
}

type Sets = Vec<(usize, BigUint)>;

/// The fewest and the most sets of each size that can have dependent columns. At most: each such
/// set holds the places of a word, and each place set of weight w carries q − 1 words or more. At
/// least: of the sets of a size, the share with dependent columns never falls as the size grows,
/// for a set that holds one has dependent columns too.
fn bounds(session: &Session, code: &Code) -> (Sets, Sets) {
    let (n, checks) = (code.length(), code.redundancy());
    let distance = session.distance_by(code, Effort::Full);
    let weights = session.weights_by(code, Effort::Full);
    let multiples = BigUint::from(code.field().order() - 1);
    // For each weight w, how many place sets there are, times C(n - w, s - w).
    let mut held: Sets = Vec::new();
    let (mut fewest, mut most): (Sets, Sets) = (Vec::new(), Vec::new());
    let mut all = choose(n, distance.lower);
    for size in distance.lower..=n {
        if size > distance.lower {
            all = all * (n - size + 1) / size;
        }
        if size > checks {
            fewest.push((size, all.clone()));
            most.push((size, all.clone()));
            continue;
        }
        for (weight, count) in &mut held {
            *count = &*count * (n - size + 1) / (size - *weight);
        }
        let at_size = weights
            .as_ref()
            .map(|weights| weights.counts.get(&size).cloned().unwrap_or_default() / &multiples);
        if let Some(count) = &at_size {
            held.push((size, count.clone()));
        }
        let ceiling = match &at_size {
            Some(_) => held
                .iter()
                .map(|(_, count)| count)
                .sum::<BigUint>()
                .min(all.clone()),
            None => all.clone(),
        };
        // On the places of a lightest word live its multiples and nothing else.
        let floor = match (at_size, distance.exact()) {
            (Some(count), Some(d)) if size == d => count,
            (None, Some(d)) if size == d => BigUint::one(),
            _ => match fewest.last() {
                // C(n, s) / C(n, s - 1) = (n - s + 1) / s, rounded up.
                Some((before, bad)) if before + 1 == size => {
                    (bad * (n - size + 1) + (size - 1)) / size
                }
                _ => BigUint::zero(),
            },
        };
        if !floor.is_zero() {
            fewest.push((size, floor));
        }
        most.push((size, ceiling));
    }
    (fewest, most)
}
