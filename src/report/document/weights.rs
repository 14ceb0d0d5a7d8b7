//! Weight distributions in prose: bars, totals, short lists.

use num_bigint::BigUint;
use num_traits::{ToPrimitive, Zero};

use super::{Bar, Block};
use crate::report::model::{CodeReport, Weights, abbreviated};

/// Weight lists longer than this are shortened in the middle.
const MOST_BARS: usize = 24;

pub(super) fn bars(blocks: &mut Vec<Block>, found: &Weights, code: &CodeReport) {
    blocks.push(Block::Heading("Weights".to_string()));
    let largest = found.0.values().max().cloned().unwrap_or_default();
    let least = found.0.values().filter(|count| !count.is_zero()).min();
    let logarithmic = least.is_some_and(|least| &largest / least > BigUint::from(1000u32));
    let scale = if logarithmic { "logarithmic" } else { "linear" };
    blocks.push(Block::Paragraph(format!(
        "Words of each weight; bars on a {scale} scale, the longest for {}.",
        number(&largest)
    )));
    let share = |count: &BigUint| match (logarithmic, count.is_zero()) {
        (_, true) => 0.0,
        // One word more than none, so that a single word still has a bar.
        (true, _) => (log2(count) + 1.0) / (log2(&largest) + 1.0),
        (false, _) => 2f64.powf(log2(count) - log2(&largest)),
    };
    let all: Vec<Bar> = found
        .0
        .iter()
        .map(|(weight, count)| Bar {
            label: weight.to_string(),
            share: share(count),
            value: number(count),
        })
        .collect();
    let bars = if all.len() <= MOST_BARS {
        all
    } else {
        let half = MOST_BARS / 2;
        let mut bars = all[..half].to_vec();
        bars.push(Bar {
            label: String::new(),
            share: 0.0,
            value: format!("{} more weights", all.len() - 2 * half),
        });
        bars.extend_from_slice(&all[all.len() - half..]);
        bars
    };
    blocks.push(Block::Bars(bars));
    blocks.push(Block::Paragraph(total(found, code)));
}

/// The number of words counted, held against q^k.
fn total(found: &Weights, code: &CodeReport) -> String {
    let sum: BigUint = found.0.values().sum();
    let (q, k) = (code.field.order, code.k);
    let weights = match found.0.len() {
        1 => "1 weight occurs".to_string(),
        count => format!("{count} weights occur"),
    };
    // q^k has at most this many digits in base two; larger ones are not worth the power.
    if (k as f64) * (q as f64).log2() > 1e6 {
        return format!("{weights}; {} words in all.", number(&sum));
    }
    if sum == BigUint::from(q).pow(k as u32) {
        format!("{weights}; {q}^{k} = {} words in all.", number(&sum))
    } else {
        format!(
            "{weights}; {} words are counted, but there are {q}^{k}.",
            number(&sum)
        )
    }
}

pub(super) fn short(found: &Weights) -> String {
    let items: Vec<String> = found
        .0
        .iter()
        .map(|(weight, count)| format!("{weight}: {}", number(count)))
        .collect();
    abbreviated(&items, 12).join(", ")
}

/// A count in full, or with seven digits and an exponent when it is very long.
fn number(count: &BigUint) -> String {
    let digits = count.to_string();
    if digits.len() <= 30 {
        return digits;
    }
    format!("{}.{}…e{}", &digits[..1], &digits[1..7], digits.len() - 1)
}

/// The logarithm to base two of a positive count.
fn log2(count: &BigUint) -> f64 {
    let beyond = count.bits().saturating_sub(64);
    let leading = (count >> beyond).to_f64().unwrap_or(1.0).max(1.0);
    leading.log2() + beyond as f64
}
