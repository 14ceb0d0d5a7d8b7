//! Comparisons of numbers that are only known to lie between two.

use crate::derive::Verdict;
use crate::syntax::tree::BinaryOperator;
use num_rational::BigRational;

/// The two numbers that one lies between, both included.
pub(super) type Ends = (BigRational, BigRational);

/// Whether a comparison holds for all, none, or only some of the numbers; `None` when the operator
/// compares nothing.
pub(super) fn compared(operator: BinaryOperator, left: &Ends, right: &Ends) -> Option<Verdict> {
    use BinaryOperator as Op;
    let apart = left.1 < right.0 || left.0 > right.1;
    let one_point = left.0 == left.1 && right.0 == right.1 && left.0 == right.0;
    let (all, none) = match operator {
        Op::Equal => (one_point, apart),
        Op::Unequal => (apart, one_point),
        Op::Less => (left.1 < right.0, left.0 >= right.1),
        Op::AtMost => (left.1 <= right.0, left.0 > right.1),
        Op::Greater => (left.0 > right.1, left.1 <= right.0),
        Op::AtLeast => (left.0 >= right.1, left.1 < right.0),
        _ => return None,
    };
    Some(match (all, none) {
        (true, _) => Verdict::Holds,
        (_, true) => Verdict::Fails,
        _ => Verdict::Undecided,
    })
}
