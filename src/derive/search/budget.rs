//! A deterministic allowance of work, and the trait by which long engines say how far they are.
//!
//! A unit is about a nanosecond of one core of a plain machine, but is counted, never measured:
//! the same call with the same budget gives the same answer on every machine and with any number
//! of threads. Engines spend a stage's units before they start it, from one thread.

use std::sync::Arc;
use std::sync::atomic::{AtomicU64, Ordering};

/// The nominal rate: units a second.
pub const UNITS_A_SECOND: f64 = 1e9;

/// An allowance of work units. Clones share the allowance.
#[derive(Clone, Debug)]
pub struct Budget {
    purse: Arc<AtomicU64>,
    parent: Option<Arc<Budget>>,
}

impl Budget {
    /// So many units.
    pub fn units(units: u64) -> Budget {
        Budget {
            purse: Arc::new(AtomicU64::new(units)),
            parent: None,
        }
    }

    /// The work of so many seconds at the nominal rate; negative and NaN count as zero.
    pub fn seconds(seconds: f64) -> Budget {
        // The cast saturates, and takes NaN to zero.
        Budget::units(((seconds * UNITS_A_SECOND) as u64).min(u64::MAX - 1))
    }

    /// No limit.
    pub fn unlimited() -> Budget {
        Budget::units(u64::MAX)
    }

    /// Takes `units` away when that many are left; otherwise takes nothing and says `false`.
    pub fn spend(&self, units: u64) -> bool {
        if self.left() < units {
            return false;
        }
        if let Some(parent) = &self.parent
            && !parent.spend(units)
        {
            return false;
        }
        self.purse
            .fetch_update(Ordering::SeqCst, Ordering::SeqCst, |left| match left {
                u64::MAX => Some(left),
                _ => left.checked_sub(units),
            })
            .is_ok()
    }

    /// How many units are left; `u64::MAX` without a limit.
    pub fn left(&self) -> u64 {
        let own = self.purse.load(Ordering::SeqCst);
        self.parent
            .as_ref()
            .map_or(own, |parent| own.min(parent.left()))
    }

    /// A part of this budget: at most `units`, spent from this one too.
    pub fn limited_to(&self, units: u64) -> Budget {
        Budget {
            purse: Arc::new(AtomicU64::new(units)),
            parent: Some(Arc::new(self.clone())),
        }
    }
}

/// Hears how far a long engine is. Called from one thread at a time, with `done <= total`.
pub trait Progress: Sync {
    /// `done` of `total` parts of `what` are through.
    fn tick(&self, what: &str, done: u64, total: u64);
}

/// Hears nothing.
#[derive(Clone, Copy, Debug, Default)]
pub struct Quiet;

impl Progress for Quiet {
    fn tick(&self, _what: &str, _done: u64, _total: u64) {}
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_part_is_spent_from_the_whole() {
        let whole = Budget::units(100);
        let part = whole.limited_to(30);
        assert!(part.spend(20));
        assert!(!part.spend(11));
        assert!(part.spend(10));
        assert_eq!((whole.left(), part.left()), (70, 0));
        assert!(whole.spend(70));
        assert!(!whole.limited_to(5).spend(1));
    }

    #[test]
    fn no_limit_stays_so() {
        let budget = Budget::unlimited();
        assert!(budget.spend(u64::MAX));
        assert_eq!(budget.left(), u64::MAX);
        assert!(!Budget::seconds(f64::NAN).spend(1));
        assert!(Budget::seconds(f64::INFINITY).left() > 1 << 62);
    }
}
