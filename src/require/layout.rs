//! Groups of positions: bytes, symbols, chips, lanes, as a requirement names them.

use super::Asked;
use crate::evaluate::{CompiledCode, Evaluator, Outcome, Stop};
use crate::finding::{Finding, catalogue, near_names};
use crate::source::Span;
use crate::syntax::tree::{Argument, Expression, ExpressionKind};
use crate::value::Value;
use num_traits::ToPrimitive;
use std::collections::BTreeMap;
use std::sync::Arc;

/// Groups of positions with their names.
pub struct Groups {
    /// What each is called in messages.
    pub names: Vec<String>,
    /// Its positions.
    pub sets: Vec<Vec<usize>>,
}

/// The positions of each named group of bits, in the order of the layout.
fn layout(compiled: &CompiledCode) -> Vec<(String, Vec<usize>)> {
    let mut groups: Vec<(String, Vec<usize>)> = Vec::new();
    let mut place: BTreeMap<String, usize> = BTreeMap::new();
    for (at, name) in compiled.position_names.iter().flatten().enumerate() {
        let group = name.split('[').next().unwrap_or(name).to_string();
        let index = *place.entry(group.clone()).or_insert_with(|| {
            groups.push((group, Vec::new()));
            groups.len() - 1
        });
        groups[index].1.push(at);
    }
    groups
}

/// `bits(data, check[3..0])` or `groups(…)` as an operand: a list of lists of positions.
pub(super) fn operand(
    evaluator: &Evaluator,
    compiled: &CompiledCode,
    expression: &Expression,
) -> Option<Outcome<Value>> {
    let ExpressionKind::Call {
        function,
        arguments,
    } = &expression.kind
    else {
        return None;
    };
    if !matches!(function.text.as_str(), "bits" | "groups") {
        return None;
    }
    let sets: Outcome<Vec<Value>> = arguments
        .iter()
        .map(|argument| {
            let positions = positions_of(evaluator, compiled, argument)?;
            let listed = positions.into_iter().map(Value::integer).collect();
            Ok(Value::List(Arc::new(listed)))
        })
        .collect();
    Some(sets.map(|sets| Value::List(Arc::new(sets))))
}

fn positions_of(
    evaluator: &Evaluator,
    compiled: &CompiledCode,
    argument: &Argument,
) -> Outcome<Vec<usize>> {
    let layout = layout(compiled);
    let (name, index) = match &argument.value.kind {
        ExpressionKind::Name(name) => (name, None),
        ExpressionKind::Index(base, index) => match &base.kind {
            ExpressionKind::Name(name) => (name, Some(index)),
            _ => return Err(no_group(argument.value.span, "this", &layout)),
        },
        _ => return Err(no_group(argument.value.span, "this", &layout)),
    };
    let Some((_, positions)) = layout.iter().find(|(known, _)| known == name) else {
        return Err(no_group(argument.value.span, &format!("`{name}`"), &layout));
    };
    let Some(index) = index else {
        return Ok(positions.clone());
    };
    let scope = compiled.scope.inside(&compiled.code);
    let wanted = match evaluator.evaluate(index, &scope)? {
        Value::Set(members) => members.to_vec(),
        Value::Integer(number) => vec![Value::Integer(number)],
        other => {
            let message = format!(
                "bits are picked by an index or a range, not {}",
                other.kind()
            );
            return Err(wrong(catalogue::WRONG_TYPE, index.span, message));
        }
    };
    let names = compiled.position_names.as_deref().unwrap_or(&[]);
    wanted
        .iter()
        .map(|number| {
            let full = format!("{name}[{number}]");
            names
                .iter()
                .position(|known| *known == full)
                .ok_or_else(|| {
                    let message = format!("no bit is called {full}");
                    wrong(catalogue::BAD_BITS, index.span, message)
                })
        })
        .collect()
}

fn wrong(code: crate::finding::Code, span: Span, message: String) -> Stop {
    Stop::Finding(Box::new(Finding::new(code, span, message)))
}

fn no_group(span: Span, what: &str, layout: &[(String, Vec<usize>)]) -> Stop {
    let finding = Finding::new(
        catalogue::BAD_BITS,
        span,
        format!("{what} is no group of bits of this code"),
    );
    let known: Vec<&str> = layout.iter().map(|(name, _)| name.as_str()).collect();
    let help = match near_names(what.trim_matches('`'), known.iter().copied()).first() {
        Some(near) => format!("did you mean `{near}`?"),
        None if known.is_empty() => {
            "name the positions first, as in `bits chip0[7..0], chip1[7..0]`".to_string()
        }
        None => format!("the groups are {}", known.join(", ")),
    };
    Stop::Finding(Box::new(finding.help(help)))
}

/// The groups that an operand gives: named ones, or all runs of so many neighbouring positions;
/// without an operand, those of the layout.
pub(super) fn groups(asked: &Asked, operand: Option<usize>) -> Result<Groups, Stop> {
    let Some(at) = operand else {
        return of_layout(asked);
    };
    let (value, span) = &asked.operands[at];
    if let Value::List(sets) = value {
        return listed(asked, sets, *span);
    }
    let (size, n) = (asked.number(at)?, asked.code().length());
    if size == 0 || n % size != 0 {
        let message = format!("{n} positions do not fall into groups of {size}");
        let finding = Finding::new(catalogue::BAD_ARGUMENT, *span, message).help(
            "name the groups: `bits chip0[7..0], chip1[7..0]`, then `… groups of bits(chip0, chip1)`",
        );
        return Err(Stop::Finding(Box::new(finding)));
    }
    Ok(Groups {
        names: (0..n / size)
            .map(|group| format!("positions {}..{}", group * size, (group + 1) * size - 1))
            .collect(),
        sets: (0..n / size)
            .map(|group| (group * size..(group + 1) * size).collect())
            .collect(),
    })
}

fn of_layout(asked: &Asked) -> Result<Groups, Stop> {
    let (names, sets): (Vec<_>, Vec<_>) = layout(asked.compiled).into_iter().unzip();
    if names.is_empty() {
        let finding = Finding::new(
            catalogue::BAD_ARGUMENT,
            asked.span,
            "the code names no groups of bits",
        )
        .help("name them, as in `bits chip0[7..0], chip1[7..0]`, or write `… groups of 8`");
        return Err(Stop::Finding(Box::new(finding)));
    }
    Ok(Groups { names, sets })
}

fn listed(asked: &Asked, sets: &[Value], span: Span) -> Result<Groups, Stop> {
    let n = asked.code().length();
    let mut taken = vec![false; n];
    let mut groups = Groups {
        names: Vec::new(),
        sets: Vec::new(),
    };
    for set in sets {
        let mut positions = Vec::new();
        let Value::List(members) = set else {
            let message = "groups are named: `bits(chip0, chip1)`".to_string();
            return Err(wrong(catalogue::WRONG_TYPE, span, message));
        };
        for member in members.iter() {
            let position = match member {
                Value::Integer(number) => number.to_usize().filter(|&at| at < n),
                _ => None,
            };
            let Some(position) = position else {
                let message = format!("{member} is no position of this code");
                return Err(wrong(catalogue::BAD_POSITIONS, span, message));
            };
            if std::mem::replace(&mut taken[position], true) {
                let message = format!("two groups share {}", asked.named(&[position]));
                return Err(wrong(catalogue::BAD_BITS, span, message));
            }
            positions.push(position);
        }
        groups.names.push(asked.named(&positions));
        groups.sets.push(positions);
    }
    Ok(groups)
}
