//! A second path, written as plainly as can be: fields by polynomial digits, codes as lists of words.

#![allow(dead_code)]

use std::collections::{BTreeMap, BTreeSet};

pub type Word = Vec<u32>;
pub type Set = BTreeSet<Word>;

/// GF(p^m) by its modulus, coefficients lowest first; elements are numbers of digits in base p.
#[derive(Clone)]
pub struct PlainField {
    pub p: u32,
    pub degree: usize,
    pub order: u32,
    pub modulus: Vec<u32>,
    /// As a spec writes it.
    pub text: String,
}

impl PlainField {
    pub fn new(p: u32, modulus: &[u32]) -> PlainField {
        let degree = modulus.len() - 1;
        let order = p.pow(degree as u32);
        let text = match degree {
            1 => format!("GF({p})"),
            _ => {
                let terms: Vec<String> = modulus
                    .iter()
                    .enumerate()
                    .map(|(at, entry)| format!("{entry}*x^{at}"))
                    .collect();
                format!("GF({order}) modulus {}", terms.join(" + "))
            }
        };
        PlainField {
            p,
            degree,
            order,
            modulus: modulus.to_vec(),
            text,
        }
    }

    pub fn prime(&self) -> PlainField {
        PlainField::new(self.p, &[0, 1])
    }

    /// Whether the whole space of this length has at most so many words.
    pub fn lists(&self, length: usize, most: u64) -> bool {
        u64::from(self.order)
            .checked_pow(length as u32)
            .is_some_and(|count| count <= most)
    }

    pub fn digits(&self, element: u32) -> Vec<u32> {
        (0..self.degree as u32)
            .map(|at| element / self.p.pow(at) % self.p)
            .collect()
    }

    fn number(&self, digits: &[u32]) -> u32 {
        digits
            .iter()
            .rev()
            .fold(0, |sum, digit| sum * self.p + digit)
    }

    pub fn add(&self, one: u32, other: u32) -> u32 {
        let digits: Vec<u32> = self
            .digits(one)
            .iter()
            .zip(self.digits(other))
            .map(|(left, right)| (left + right) % self.p)
            .collect();
        self.number(&digits)
    }

    pub fn neg(&self, element: u32) -> u32 {
        let digits: Vec<u32> = self
            .digits(element)
            .iter()
            .map(|digit| (self.p - digit) % self.p)
            .collect();
        self.number(&digits)
    }

    pub fn mul(&self, one: u32, other: u32) -> u32 {
        let mut product = vec![0; 2 * self.degree];
        for (i, left) in self.digits(one).iter().enumerate() {
            for (j, right) in self.digits(other).iter().enumerate() {
                product[i + j] = (product[i + j] + left * right) % self.p;
            }
        }
        for top in (self.degree..product.len()).rev() {
            let factor = product[top];
            for at in 0..=self.degree {
                let place = &mut product[top - self.degree + at];
                *place = (*place + (self.p - factor) * self.modulus[at]) % self.p;
            }
        }
        self.number(&product[..self.degree])
    }

    pub fn sum(&self, word: &Word) -> u32 {
        word.iter().fold(0, |sum, &entry| self.add(sum, entry))
    }

    pub fn add_words(&self, one: &Word, other: &Word) -> Word {
        one.iter()
            .zip(other)
            .map(|(&left, &right)| self.add(left, right))
            .collect()
    }

    pub fn scale(&self, factor: u32, word: &Word) -> Word {
        word.iter().map(|&entry| self.mul(factor, entry)).collect()
    }

    pub fn dot(&self, one: &Word, other: &Word) -> u32 {
        one.iter().zip(other).fold(0, |sum, (&left, &right)| {
            self.add(sum, self.mul(left, right))
        })
    }
}

/// A code as the list of its words.
#[derive(Clone, Debug)]
pub struct Words {
    pub length: usize,
    pub list: Set,
}

/// All words of a length.
pub fn space(field: &PlainField, length: usize) -> Vec<Word> {
    let mut all: Vec<Word> = vec![Vec::new()];
    for _ in 0..length {
        all = all
            .into_iter()
            .flat_map(|word| {
                (0..field.order).map(move |entry| {
                    let mut longer = word.clone();
                    longer.push(entry);
                    longer
                })
            })
            .collect();
    }
    all
}

/// All words orthogonal to the rows.
pub fn dual(field: &PlainField, length: usize, rows: &[Word]) -> Words {
    let list = space(field, length)
        .into_iter()
        .filter(|word| rows.iter().all(|row| field.dot(row, word) == 0))
        .collect();
    Words { length, list }
}

/// All sums of multiples of the rows.
pub fn span(field: &PlainField, length: usize, rows: &[Word]) -> Words {
    let mut words = Words {
        length,
        list: Set::from([vec![0; length]]),
    };
    for row in rows {
        words = closure(field, length, &words, row);
    }
    words
}

/// All sums of a word of the code and a multiple of a further word.
pub fn closure(field: &PlainField, length: usize, words: &Words, further: &Word) -> Words {
    let mut list = Set::new();
    for factor in 0..field.order {
        let multiple = field.scale(factor, further);
        list.extend(
            words
                .list
                .iter()
                .map(|word| field.add_words(word, &multiple)),
        );
    }
    Words { length, list }
}

pub fn weight(word: &Word) -> usize {
    word.iter().filter(|&&entry| entry != 0).count()
}

pub fn weights(words: &Words) -> BTreeMap<usize, u64> {
    let mut counts = BTreeMap::new();
    for word in &words.list {
        *counts.entry(weight(word)).or_insert(0) += 1;
    }
    counts
}

/// Whether a property holds, by its definition; `None` where it is not decided here.
pub fn property(field: &PlainField, words: &Words, name: &str) -> Option<bool> {
    let counts = weights(words);
    let least = counts.keys().copied().find(|&weight| weight > 0);
    let n = words.length;
    let k = (0..).find(|&k| u64::from(field.order).pow(k) >= words.list.len() as u64)? as usize;
    let orthogonal = || {
        let all: Vec<&Word> = words.list.iter().take(400).collect();
        all.iter()
            .all(|one| all.iter().all(|other| field.dot(one, other) == 0))
    };
    let listable = words.list.len() <= 400;
    match name {
        "mds" => Some(least? == n - k + 1),
        "even" => Some(counts.keys().all(|weight| weight % 2 == 0)),
        "doubly_even" => Some(counts.keys().all(|weight| weight % 4 == 0)),
        "equidistant" => Some(counts.len() <= 2),
        "cyclic" => Some(words.list.iter().all(|word| {
            let mut shifted = word.clone();
            shifted.rotate_right(1);
            words.list.contains(&shifted)
        })),
        "self_orthogonal" if listable => Some(orthogonal()),
        "self_dual" if listable => Some(2 * k == n && orthogonal()),
        "perfect" => {
            let radius = (least? - 1) / 2;
            let (mut ball, mut term) = (0u128, 1u128);
            for at in 0..=radius {
                ball += term;
                term = term * (n - at) as u128 * u128::from(field.order - 1) / (at as u128 + 1);
            }
            Some(ball * words.list.len() as u128 == u128::from(field.order).checked_pow(n as u32)?)
        }
        "systematic" => {
            let distinct = |from: usize, to: usize| {
                let parts: BTreeSet<&[u32]> =
                    words.list.iter().map(|word| &word[from..to]).collect();
                parts.len() == words.list.len()
            };
            Some(distinct(0, k) || distinct(n - k, n))
        }
        "dual_containing" | "complementary_dual" if field.lists(n, 20_000) => {
            let rows: Vec<Word> = words.list.iter().cloned().collect();
            let orthogonal = dual(field, n, &rows);
            let shared = orthogonal.list.intersection(&words.list).count();
            Some(match name {
                "dual_containing" => shared == orthogonal.list.len(),
                _ => shared == 1,
            })
        }
        "projective" => {
            let zero = |at: usize| words.list.iter().all(|word| word[at] == 0);
            let multiple = |one: usize, other: usize| {
                (1..field.order).any(|factor| {
                    words
                        .list
                        .iter()
                        .all(|word| word[one] == field.mul(factor, word[other]))
                })
            };
            Some(
                (0..n).all(|at| !zero(at))
                    && (0..n).all(|one| (0..one).all(|other| !multiple(one, other))),
            )
        }
        _ => None,
    }
}
