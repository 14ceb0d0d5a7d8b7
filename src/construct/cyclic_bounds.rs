//! Lower bounds on the distance of cyclic codes from their roots.

use crate::code::{Bound, lower};
use num_integer::Integer;
use std::collections::BTreeSet;

/// The most look-ups that the search for a run of roots may cost.
const WORK: u64 = 1 << 24;

/// The bounds that a set of roots gives, exponents of a primitive n-th root of unity, closed under
/// conjugation. Runs: Bose and Ray-Chaudhuri, 1960, Hocquenghem, 1959; a second direction: Hartmann
/// and Tzeng, 1972 (MacWilliams and Sloane, 1977, ch. 7 §6 theorems 8 and problem 24).
pub fn bounds(length: u64, roots: &BTreeSet<u64>) -> Vec<Bound> {
    if roots.is_empty() || roots.len() as u64 == length {
        return Vec::new();
    }
    let set = RootSet::new(length, roots);
    let mut found = Vec::new();
    let Some(best) = set.longest_run() else {
        return found;
    };
    let value = best.run as usize + 1;
    found.push(lower(
        value,
        "bch-bound",
        format!(
            "{} of b are roots, so d is at least {value} (BCH bound)",
            written(best.start, best.step, best.run, length)
        ),
    ));
    if let Some((value, says)) = set.two_directions(value) {
        found.push(lower(value, "hartmann-tzeng", says));
    }
    found
}

struct RootSet {
    length: u64,
    member: Vec<bool>,
    roots: Vec<u64>,
}

#[derive(Clone, Copy)]
struct Run {
    start: u64,
    step: u64,
    run: u64,
}

impl RootSet {
    fn new(length: u64, roots: &BTreeSet<u64>) -> RootSet {
        let mut member = vec![false; length as usize];
        for &root in roots {
            member[root as usize] = true;
        }
        RootSet {
            length,
            member,
            roots: roots.iter().copied().collect(),
        }
    }

    fn has(&self, exponent: u64) -> bool {
        self.member[(exponent % self.length) as usize]
    }

    /// The longest run with the given step, which is prime to n.
    fn run_with(&self, step: u64) -> Run {
        let back = self.length - step % self.length;
        let mut best = Run {
            start: 0,
            step,
            run: 0,
        };
        for &root in &self.roots {
            // A run is counted from its first root only.
            if self.has(root + back) {
                continue;
            }
            let mut run = 1;
            let mut at = (root + step) % self.length;
            while self.has(at) {
                run += 1;
                at = (at + step) % self.length;
            }
            if run > best.run {
                best = Run {
                    start: root,
                    step,
                    run,
                };
            }
        }
        best
    }

    /// Steps prime to n, small ones first, as many as the work allows; a step and its negative
    /// give the same runs.
    fn steps(&self) -> impl Iterator<Item = u64> + '_ {
        let most = (WORK / (self.roots.len() as u64 + 1)).max(1);
        (1..=self.length / 2 + 1)
            .filter(|step| step.gcd(&self.length) == 1)
            .take(most as usize)
    }

    fn longest_run(&self) -> Option<Run> {
        let mut best: Option<Run> = None;
        for step in self.steps() {
            let run = self.run_with(step);
            if run.run > 0 && best.is_none_or(|best| run.run > best.run) {
                best = Some(run);
            }
        }
        best
    }

    /// Hartmann and Tzeng: if b + i s + j t are roots for i in 0..=e-2 and j in 0..=f, with s prime
    /// to n and gcd(t, n) < e, then d is at least e + f. Tried as far as the work allows.
    fn two_directions(&self, known: usize) -> Option<(usize, String)> {
        let mut best = known;
        let mut says = None;
        let mut work = 0;
        for step in (1..=self.length / 2).filter(|step| step.gcd(&self.length) == 1) {
            work += self.length + self.roots.len() as u64;
            for (start, run) in self.runs(step) {
                for shorter in 1..=run {
                    let designed = shorter + 1;
                    for second in 1..self.length {
                        work += 1;
                        if work > WORK || best > self.roots.len() {
                            // By Singleton, d is at most one more than the number of roots.
                            return says.map(|says| (best, says));
                        }
                        if second.gcd(&self.length) >= designed {
                            continue;
                        }
                        let mut repeats = 0;
                        while repeats < self.length
                            && (0..shorter)
                                .all(|at| self.has(start + at * step + (repeats + 1) * second))
                        {
                            repeats += 1;
                            work += shorter;
                        }
                        let value = (designed + repeats) as usize;
                        if value > best {
                            best = value;
                            says = Some(format!(
                                "b^({start} + {step} i + {second} j), i = 0..{}, j = 0..{repeats}, are roots, so d is at least {value} (Hartmann and Tzeng)",
                                shorter - 1
                            ));
                        }
                    }
                }
            }
        }
        says.map(|says| (best, says))
    }

    /// All roots with the number of roots in a row from each, in steps. The step is prime to n, so
    /// one way round passes every exponent; it goes backwards and begins where no root is.
    fn runs(&self, step: u64) -> Vec<(u64, u64)> {
        let Some(gap) = self.member.iter().position(|&member| !member) else {
            return Vec::new();
        };
        let mut length_from = vec![0u64; self.member.len()];
        let back = self.length - step % self.length;
        let mut at = gap as u64;
        for _ in 1..self.length {
            let next = (at + back) % self.length;
            if self.has(next) {
                length_from[next as usize] = length_from[at as usize] + 1;
            }
            at = next;
        }
        self.roots
            .iter()
            .map(|&start| (start, length_from[start as usize]))
            .collect()
    }
}

fn written(start: u64, step: u64, run: u64, length: u64) -> String {
    match (run, step) {
        (1, _) => format!("power {start}"),
        (_, 1) => format!("powers {start}..{}", start + run - 1),
        _ => format!(
            "powers {start}, {}, … ({run} in steps of {step})",
            (start + step) % length
        ),
    }
}
