//! How long a word may be while a check by remainders keeps its promise.

use crate::code::{Code, OriginKind, Space};
use crate::derive::search::{Budget, dependent_columns};

/// The work that one length may cost.
const WORK: u64 = 1 << 27;
/// The longest code whose shorter ones are looked at.
const LENGTH: usize = 1 << 16;

/// The greatest length at which the remainders of a `crc(...)` keep a distance, when the code is
/// one and its own length is too long; the shorter words are its last positions.
pub(super) fn longest(code: &Code, wanted: usize) -> Option<usize> {
    let code = code.unnamed();
    let origin = code.origin();
    let Space::Check(check) = code.space() else {
        return None;
    };
    let plain = origin.kind == OriginKind::Start && origin.text.starts_with("crc(");
    let (n, checks) = (code.length(), code.redundancy());
    if !plain || wanted < 2 || n > LENGTH {
        return None;
    }
    let keeps = |length: usize| -> Option<bool> {
        let positions: Vec<usize> = (n - length..n).collect();
        let found = dependent_columns(
            &check.select_columns(&positions),
            wanted - 1,
            &Budget::units(WORK),
        );
        match (found.independent + 1 >= wanted, found.word) {
            (true, _) => Some(true),
            (false, Some(_)) => Some(false),
            (false, None) => None,
        }
    };
    // A longer word holds the shorter ones, so what is lost stays lost.
    let (mut good, mut bad) = (checks + 1, n);
    if !keeps(good)? {
        return None;
    }
    while good + 1 < bad {
        let middle = good + (bad - good) / 2;
        if keeps(middle)? {
            good = middle;
        } else {
            bad = middle;
        }
    }
    Some(good)
}
