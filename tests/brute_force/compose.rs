//! Random specs as text, and beside each the set of words that its lines mean.

use super::{Dice, Field, Plain, Word, hamming_checks};
use std::sync::Arc;

/// The most words of a code that is judged, and of its dual; of most codes fewer, to judge more.
const MOST_WORDS: usize = 20_000;
const FEW_WORDS: usize = 1_500;

/// A spec and what its code `subject` must be.
pub struct Composed {
    pub text: String,
    pub plain: Plain,
    /// The code before the last step, when that was `arrange`: the order is the compiler's choice.
    pub arranged: Option<Plain>,
}

/// How a field is declared under a name.
pub fn declared(name: &str, q: u32) -> String {
    let field = match q {
        4 => "GF(4) where a^2 = a + 1".to_string(),
        8 => "GF(8) where a^3 = a + 1".to_string(),
        9 => "GF(9) where a^2 = a + 1".to_string(),
        prime => format!("GF({prime})"),
    };
    format!("field {name} = {field}\n")
}

pub fn list(entries: &[u32]) -> String {
    let entries: Vec<String> = entries.iter().map(u32::to_string).collect();
    format!("[{}]", entries.join(", "))
}

fn set(entries: &[usize]) -> String {
    let entries: Vec<String> = entries.iter().map(usize::to_string).collect();
    format!("{{{}}}", entries.join(", "))
}

pub fn matrix(rows: &[Word]) -> String {
    let rows: Vec<String> = rows
        .iter()
        .map(|row| {
            let entries: Vec<String> = row.iter().map(u32::to_string).collect();
            format!("| {} |", entries.join(" "))
        })
        .collect();
    rows.join("\n    ")
}

fn count(q: u32, k: usize) -> usize {
    (q as usize).saturating_pow(k as u32)
}

/// The most dimensions with few enough words.
fn most_dimensions(q: u32) -> usize {
    (0..)
        .take_while(|&k| count(q, k) <= 2048)
        .last()
        .unwrap_or(0)
}

/// A random code by a random construction.
pub fn base(dice: &mut Dice, field: &Arc<Field>) -> (String, Plain) {
    let q = field.q();
    let most = most_dimensions(q);
    match dice.below(9) {
        0 => {
            let (n, k) = (dice.within(1, 9), dice.within(1, most.min(5)));
            let rows = rows(dice, q, k, n);
            (
                format!("span({})", matrix(&rows)),
                Plain::span(field, n, &rows),
            )
        }
        1 => {
            let n = dice.within(1, most.min(9));
            let rows_wanted = dice.within(1, n.min(5));
            let rows = rows(dice, q, rows_wanted, n);
            (
                format!("check({})", matrix(&rows)),
                Plain::orthogonal(field, n, &rows),
            )
        }
        2 => {
            let r = if q == 2 { dice.within(1, 3) } else { 2 };
            let r = if q > 5 { 1 } else { r };
            let checks = hamming_checks(field, r);
            (
                format!("hamming({r})"),
                Plain::orthogonal(field, checks[0].len(), &checks),
            )
        }
        3 => {
            let n = dice.within(1, 8);
            (
                format!("repetition({n})"),
                Plain::span(field, n, &[vec![1; n]]),
            )
        }
        4 => {
            let n = dice.within(2, most.min(8) + 1);
            (
                format!("parity({n})"),
                Plain::orthogonal(field, n, &[vec![1; n]]),
            )
        }
        5 | 6 => by_roots(dice, field),
        _ => by_points(dice, field),
    }
}

/// Random rows, now and then sparse, repeated or zero.
fn rows(dice: &mut Dice, q: u32, many: usize, n: usize) -> Vec<Word> {
    let mut rows: Vec<Word> = (0..many).map(|_| dice.word(q, n)).collect();
    match dice.below(6) {
        0 => rows.push(rows[0].clone()),
        1 => rows.push(vec![0; n]),
        2 => {
            for row in &mut rows {
                for entry in row.iter_mut() {
                    if dice.below(3) > 0 {
                        *entry = 0;
                    }
                }
            }
        }
        3 => {
            for row in &mut rows {
                row[0] = 0;
            }
        }
        _ => {}
    }
    rows
}

/// The splitting fields used: length, and the field in which a primitive root of unity lies.
fn root_fields(q: u32) -> &'static [(u32, u32)] {
    match q {
        2 => &[(7, 8), (5, 16), (15, 16), (3, 4)],
        3 => &[(8, 9), (4, 9), (2, 3), (13, 27)],
        4 => &[(3, 4), (5, 16), (15, 16)],
        5 => &[(4, 5), (2, 5)],
        7 => &[(6, 7), (3, 7)],
        8 => &[(7, 8)],
        _ => &[(8, 9), (4, 9)],
    }
}

/// `cyclic` and `reed_solomon`: the words that vanish at powers of a root of unity.
fn by_roots(dice: &mut Dice, field: &Arc<Field>) -> (String, Plain) {
    let q = field.q();
    let most = most_dimensions(q);
    if q > 3 && dice.below(2) == 0 {
        let length = dice.within(1, q as usize - 1);
        let dimension = dice.within(0, length.min(most));
        let (first, step) = (dice.below(q), dice.within(1, q as usize) as u32);
        let checks: Vec<u32> = (0..(length - dimension) as u32)
            .map(|check| step * (first + check))
            .collect();
        let plain = vanishing(field, field, length, field.generator(), &checks);
        if plain.words.len() <= FEW_WORDS {
            return (
                format!(
                    "reed_solomon(length: {length}, dimension: {dimension}, first_root: {first}, root_step: {step})"
                ),
                plain,
            );
        }
    }
    let choices = root_fields(q);
    loop {
        let (length, order) = choices[dice.below(choices.len() as u32) as usize];
        let large = Field::of_order(order);
        let root = large.pow(large.generator(), (order - 1) / length);
        let many = dice.within(0, length as usize / 2 + 1);
        let roots: Vec<u32> = (0..many).map(|_| dice.below(length)).collect();
        let conjugates: std::collections::BTreeSet<u32> = roots
            .iter()
            .flat_map(|&root| (0..6).map(move |times| root * q.pow(times) % length))
            .collect();
        if count(q, length as usize - conjugates.len()) > 4096 {
            continue;
        }
        let roots: Vec<usize> = roots.into_iter().map(|root| root as usize).collect();
        let exponents: Vec<u32> = conjugates.into_iter().collect();
        let plain = vanishing(field, &large, length as usize, root, &exponents);
        return (
            format!("cyclic(length: {length}, roots: {})", set(&roots)),
            plain,
        );
    }
}

/// The words over a field whose polynomial, highest power first, vanishes at powers of an element
/// of a larger one.
fn vanishing(
    field: &Arc<Field>,
    large: &Arc<Field>,
    length: usize,
    root: u32,
    exponents: &[u32],
) -> Plain {
    let mut rows: Vec<Word> = Vec::new();
    for &exponent in exponents {
        let at = large.pow(root, exponent);
        let row: Word = (0..length)
            .map(|position| large.pow(at, (length - 1 - position) as u32))
            .collect();
        if field == large {
            rows.push(row);
        } else if field.m == 1 {
            for digit in 0..large.m as usize {
                rows.push(
                    row.iter()
                        .map(|&entry| large.digits(entry)[digit])
                        .collect(),
                );
            }
        } else {
            // GF(4) in GF(16), whose a is sent to a^5: digit j of the sum of row entries times
            // 1 or a^5 is linear over GF(2), so 1 and a^5 are tried for each basis of functionals.
            rows.extend(functionals(field, large, &row));
        }
    }
    Plain::orthogonal(field, length, &rows)
}

/// Rows over GF(4) that vanish on a word when a row over GF(16) does: the coordinates of its
/// entries in the basis 1, a over the copy of GF(4).
fn functionals(field: &Arc<Field>, large: &Arc<Field>, row: &Word) -> Vec<Word> {
    let lift = |element: u32| match element {
        0 | 1 => element,
        other => large.pow(large.generator(), 5 * (other - 1)),
    };
    let mut rows = vec![Vec::new(), Vec::new()];
    for &entry in row {
        let (one, other) = (0..field.q())
            .flat_map(|one| (0..field.q()).map(move |other| (one, other)))
            .find(|&(one, other)| {
                large.add(lift(one), large.mul(lift(other), large.generator())) == entry
            })
            .expect("1 and a are a basis");
        rows[0].push(one);
        rows[1].push(other);
    }
    rows
}

/// `evaluate` with random conditions.
fn by_points(dice: &mut Dice, field: &Arc<Field>) -> (String, Plain) {
    let q = field.q();
    loop {
        let variables = match q {
            2 => dice.within(1, 3),
            3 | 4 => dice.within(1, 2),
            _ => 1,
        };
        let degree = dice.below(4);
        let (relation, wanted): (&str, fn(u32, u32) -> bool) = match dice.below(3) {
            0 => ("=", |degree, limit| degree == limit),
            1 => ("<=", |degree, limit| degree <= limit),
            _ => (">=", |degree, limit| degree >= limit),
        };
        let monomials: Vec<Word> = field
            .vectors(variables)
            .into_iter()
            .filter(|exponents| wanted(exponents.iter().sum(), degree))
            .collect();
        let names = ["x", "y", "z"];
        let (condition, holds): (String, Box<dyn Fn(&Word) -> bool>) = match dice.below(5) {
            0 => {
                let to = dice.below(q);
                (
                    format!("where x != {to}"),
                    Box::new(move |point: &Word| point[0] != to),
                )
            }
            1 if variables > 1 => {
                let to = dice.below(q);
                let field = field.clone();
                (
                    format!("where x + y = {to}"),
                    Box::new(move |point: &Word| field.add(point[0], point[1]) == to),
                )
            }
            2 if variables > 1 => {
                let field = field.clone();
                (
                    "where x * y != 1".to_string(),
                    Box::new(move |point: &Word| field.mul(point[0], point[1]) != 1),
                )
            }
            3 => {
                let field = field.clone();
                (
                    "where x^2 = x".to_string(),
                    Box::new(move |point: &Word| field.mul(point[0], point[0]) == point[0]),
                )
            }
            _ => (String::new(), Box::new(|_: &Word| true)),
        };
        let points: Vec<Word> = field
            .vectors(variables)
            .into_iter()
            .filter(|point| holds(point))
            .collect();
        if points.is_empty() || count(q, monomials.len().min(points.len())) > 4096 {
            continue;
        }
        let (scaled, scale) = if dice.below(3) == 0 {
            let scale: Word = points.iter().map(|_| 1 + dice.below(q - 1)).collect();
            (format!(", scaled_by: {}", list(&scale)), scale)
        } else {
            (String::new(), vec![1; points.len()])
        };
        let rows: Vec<Word> = monomials
            .iter()
            .map(|exponents| {
                points
                    .iter()
                    .zip(&scale)
                    .map(|(point, &scale)| {
                        point
                            .iter()
                            .zip(exponents)
                            .fold(scale, |value, (&at, &exponent)| {
                                field.mul(value, field.pow(at, exponent))
                            })
                    })
                    .collect()
            })
            .collect();
        return (
            format!(
                "evaluate(monomials in {variables} variables where degree {relation} {degree}, at: points ({}) {condition}{scaled})",
                names[..variables].join(", ")
            ),
            Plain::span(field, points.len(), &rows),
        );
    }
}

/// A random spec: a base and one to four steps.
pub fn composed(seed: u64) -> Composed {
    let mut dice = Dice(seed);
    let q = [2, 2, 2, 3, 3, 4, 5, 7, 8, 9][dice.below(10) as usize];
    let field = Field::of_order(q);
    let mut declarations = declared("f", q);
    if field.m > 1 {
        declarations += &declared("small", field.p);
    }
    let most = if dice.below(12) == 0 {
        MOST_WORDS
    } else {
        FEW_WORDS
    };
    let small = |plain: &Plain| {
        plain.words.len() <= most && count(plain.field.q(), plain.n - plain.k()) <= most
    };
    let (body, mut plain) = loop {
        let (body, plain) = base(&mut dice, &field);
        if small(&plain) {
            break (body, plain);
        }
    };
    let mut lines = vec![body];
    let mut arranged = None;
    let wanted = dice.within(1, 4);
    let mut others = 0;
    for _ in 0..60 {
        if lines.len() > wanted {
            break;
        }
        let over = if plain.field == field { "f" } else { "small" };
        let mut other = |dice: &mut Dice, field: &Arc<Field>| {
            let (text, plain) = base(dice, field);
            others += 1;
            (
                format!("code other{others} over {over} = {text}\n"),
                format!("other{others}"),
                plain,
            )
        };
        let Some((step, next, declaration)) = step(&mut dice, &plain, &mut other) else {
            continue;
        };
        if !small(&next) || next.n > 40 {
            continue;
        }
        arranged = step.starts_with("arrange").then(|| plain.clone());
        declarations += &declaration;
        plain = next;
        lines.push(step);
        if arranged.is_some() {
            break;
        }
    }
    let header = if plain.field == field {
        "code subject over f"
    } else {
        declarations += &format!("code start over f = {}\n", lines[0]);
        lines[0] = "start".to_string();
        "code subject"
    };
    Composed {
        text: format!("{declarations}{header}\n  = {}\n", lines.join("\n  then ")),
        plain,
        arranged,
    }
}

type Other<'a> = dyn FnMut(&mut Dice, &Arc<Field>) -> (String, String, Plain) + 'a;

/// A step as text, the words after it, and what must be declared for it; `None` when it does not
/// apply here.
fn step(dice: &mut Dice, plain: &Plain, other: &mut Other) -> Option<(String, Plain, String)> {
    let (n, q) = (plain.n, plain.field.q());
    let nothing = String::new;
    Some(match dice.below(16) {
        0 if count(q, n - plain.k()) <= MOST_WORDS => ("dual".to_string(), plain.dual(), nothing()),
        1 => ("extend".to_string(), plain.extend(), nothing()),
        kind @ 2..=4 if n > 1 => {
            let many = dice.within(0, (n - 1).min(3));
            let (text, positions): (String, Vec<usize>) = match dice.below(3) {
                0 => (format!("first: {many}"), (0..many).collect()),
                1 => (format!("last: {many}"), (n - many..n).collect()),
                _ => {
                    let some = dice.some(many, n);
                    (format!("at: {}", set(&some)), some)
                }
            };
            if kind == 2 {
                (
                    format!("puncture({text})"),
                    plain.puncture(&positions),
                    nothing(),
                )
            } else {
                (
                    format!("shorten({text})"),
                    plain.shorten(&positions),
                    nothing(),
                )
            }
        }
        5 => ("augment".to_string(), plain.augment(&vec![1; n]), nothing()),
        6 => {
            let row = dice.word(q, n);
            (
                format!("augment(with: {})", list(&row)),
                plain.augment(&row),
                nothing(),
            )
        }
        7 => (
            "expurgate".to_string(),
            plain.expurgate(&vec![1; n]),
            nothing(),
        ),
        8 => {
            let row = dice.word(q, n);
            (
                format!("expurgate(with: {})", list(&row)),
                plain.expurgate(&row),
                nothing(),
            )
        }
        9 => {
            let order = dice.order(n);
            let entries: Vec<u32> = order.iter().map(|&at| at as u32).collect();
            (
                format!("permute({})", list(&entries)),
                plain.permute(&order),
                nothing(),
            )
        }
        10 if plain.field.m > 1 => ("subfield(small)".to_string(), plain.subfield(), nothing()),
        11 if plain.field.m > 1 => digits(dice, plain)?,
        12 => {
            let (declaration, name, with) = other(dice, &plain.field);
            if plain.words.len() * with.words.len() > MOST_WORDS {
                return None;
            }
            if with.n == n {
                (
                    format!("plotkin({name})"),
                    plain.plotkin(&with),
                    declaration,
                )
            } else {
                (
                    format!("direct_sum({name})"),
                    plain.direct_sum(&with),
                    declaration,
                )
            }
        }
        13 => {
            // (u | u + v) with a code of the right length.
            let rows = rows(dice, q, 2, n);
            let with = Plain::span(&plain.field, n, &rows);
            if plain.words.len() * with.words.len() > MOST_WORDS {
                return None;
            }
            let (declaration, name, _) = other(dice, &plain.field);
            let head = declaration.split('=').next()?.to_string();
            (
                format!("plotkin({name})"),
                plain.plotkin(&with),
                format!("{head}= span({})\n", matrix(&rows)),
            )
        }
        14 => {
            let (declaration, name, with) = other(dice, &plain.field);
            if count(q, plain.k() * with.k()) > MOST_WORDS || n * with.n > 40 {
                return None;
            }
            (
                format!("product({name})"),
                plain.product(&with),
                declaration,
            )
        }
        15 => {
            let end = if dice.below(2) == 0 { "first" } else { "last" };
            (format!("arrange(data: {end})"), plain.clone(), nothing())
        }
        _ => return None,
    })
}

/// To the prime field: by `image`, or by `concatenate` with a random inner code.
fn digits(dice: &mut Dice, plain: &Plain) -> Option<(String, Plain, String)> {
    let field = &plain.field;
    let degree = field.m as usize;
    let prime = Field::of_order(field.p);
    match dice.below(3) {
        0 => {
            let powers: Vec<u32> = (0..field.m).map(|at| field.p.pow(at)).collect();
            Some(("image".to_string(), plain.image(&powers), String::new()))
        }
        1 => {
            let basis: Vec<u32> = (0..degree).map(|_| dice.below(field.q())).collect();
            let digits: Vec<Word> = basis.iter().map(|&member| field.digits(member)).collect();
            if super::rank(&prime, &digits) < degree {
                return None;
            }
            Some((
                format!("image(basis: {})", list(&basis)),
                plain.image(&basis),
                String::new(),
            ))
        }
        _ => {
            let length = dice.within(degree, degree + 2);
            let inner: Vec<Word> = (0..degree).map(|_| dice.word(field.p, length)).collect();
            if super::rank(&prime, &inner) < degree {
                return None;
            }
            Some((
                "concatenate(inner)".to_string(),
                plain.concatenate(&inner),
                format!("code inner over small = span({})\n", matrix(&inner)),
            ))
        }
    }
}
