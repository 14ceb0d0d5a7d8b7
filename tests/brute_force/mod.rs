//! A second path, as plain as can be: fields by polynomial digits, codes as the set of all their
//! words. It shares no algebra with the compiler and is its judge.

#![allow(dead_code)]

pub mod compose;

use std::collections::{BTreeMap, BTreeSet, HashSet};
use std::sync::Arc;

pub type Word = Vec<u32>;

/// GF(p^m): an element is the integer whose digits in base p are its coefficients, lowest first.
#[derive(Debug, PartialEq, Eq)]
pub struct Field {
    pub p: u32,
    pub m: u32,
    /// a^m as an element.
    power: u32,
    /// Products and sums, row by row, so that each is worked out once.
    products: Vec<u32>,
    sums: Vec<u32>,
}

impl Field {
    /// GF(p^m) where a^m is the element `power`.
    pub fn new(p: u32, m: u32, power: u32) -> Arc<Field> {
        let mut field = Field {
            p,
            m,
            power,
            products: Vec::new(),
            sums: Vec::new(),
        };
        let pairs = |of: &dyn Fn(u32, u32) -> u32, q: u32| -> Vec<u32> {
            (0..q * q).map(|at| of(at / q, at % q)).collect()
        };
        field.sums = pairs(&|left, right| field.long_sum(left, right), field.q());
        field.products = pairs(&|left, right| field.long_product(left, right), field.q());
        Arc::new(field)
    }

    /// The fields of this test, each with the modulus that the specs state. The moduli are the
    /// Conway polynomials (Lübeck's table, from memory); each is verified to make a field below.
    pub fn of_order(q: u32) -> Arc<Field> {
        match q {
            4 => Field::new(2, 2, 3),
            8 => Field::new(2, 3, 3),
            16 => Field::new(2, 4, 3),
            9 => Field::new(3, 2, 4),
            27 => Field::new(3, 3, 5),
            prime => Field::new(prime, 1, 0),
        }
    }

    pub fn q(&self) -> u32 {
        self.p.pow(self.m)
    }

    pub fn digits(&self, element: u32) -> Vec<u32> {
        (0..self.m)
            .map(|at| element / self.p.pow(at) % self.p)
            .collect()
    }

    pub fn from_digits(&self, digits: &[u32]) -> u32 {
        digits
            .iter()
            .rev()
            .fold(0, |value, digit| value * self.p + digit)
    }

    pub fn add(&self, left: u32, right: u32) -> u32 {
        self.sums[(left * self.q() + right) as usize]
    }

    fn long_sum(&self, left: u32, right: u32) -> u32 {
        let sum: Vec<u32> = self
            .digits(left)
            .iter()
            .zip(self.digits(right))
            .map(|(one, other)| (one + other) % self.p)
            .collect();
        self.from_digits(&sum)
    }

    pub fn neg(&self, element: u32) -> u32 {
        let digits: Vec<u32> = self
            .digits(element)
            .iter()
            .map(|digit| (self.p - digit) % self.p)
            .collect();
        self.from_digits(&digits)
    }

    /// left · right by Horner in a: times a is a shift and a^m replaced.
    fn long_product(&self, left: u32, right: u32) -> u32 {
        if self.m == 1 {
            return left * right % self.p;
        }
        let mut product = 0;
        for digit in self.digits(right).into_iter().rev() {
            product = self.times_a(product);
            for _ in 0..digit {
                product = self.add(product, left);
            }
        }
        product
    }

    fn times_a(&self, element: u32) -> u32 {
        let mut digits = self.digits(element);
        let top = digits.pop().unwrap_or(0);
        digits.insert(0, 0);
        let mut shifted = self.from_digits(&digits);
        for _ in 0..top {
            shifted = self.add(shifted, self.power);
        }
        shifted
    }

    pub fn mul(&self, left: u32, right: u32) -> u32 {
        self.products[(left * self.q() + right) as usize]
    }

    pub fn inv(&self, element: u32) -> u32 {
        (1..self.q())
            .find(|&other| self.mul(element, other) == 1)
            .expect("a non-zero element has an inverse")
    }

    pub fn pow(&self, element: u32, exponent: u32) -> u32 {
        (0..exponent).fold(1, |power, _| self.mul(power, element))
    }

    /// The generator that the specs call a: for a prime field the least primitive root.
    pub fn generator(&self) -> u32 {
        let order = |element: u32| {
            let mut power = element;
            let mut order = 1;
            while power != 1 {
                power = self.mul(power, element);
                order += 1;
            }
            order
        };
        if self.m > 1 {
            assert_eq!(order(self.p), self.q() - 1, "a generates the field");
            return self.p;
        }
        (1..self.q())
            .find(|&element| order(element) == self.q() - 1)
            .expect("a primitive root")
    }

    pub fn dot(&self, left: &[u32], right: &[u32]) -> u32 {
        left.iter()
            .zip(right)
            .fold(0, |sum, (&one, &other)| self.add(sum, self.mul(one, other)))
    }

    pub fn scaled(&self, factor: u32, word: &[u32]) -> Word {
        word.iter().map(|&entry| self.mul(factor, entry)).collect()
    }

    pub fn sum(&self, left: &[u32], right: &[u32]) -> Word {
        left.iter()
            .zip(right)
            .map(|(&one, &other)| self.add(one, other))
            .collect()
    }

    /// All vectors of a length, in numeric order, first entry most significant.
    pub fn vectors(&self, length: usize) -> Vec<Word> {
        let mut all = vec![Vec::new()];
        for _ in 0..length {
            all = all
                .into_iter()
                .flat_map(|start| {
                    (0..self.q()).map(move |entry| {
                        let mut longer = start.clone();
                        longer.push(entry);
                        longer
                    })
                })
                .collect();
        }
        all
    }
}

pub fn weight(word: &[u32]) -> usize {
    word.iter().filter(|&&entry| entry != 0).count()
}

/// A code as the set of all its words.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Plain {
    pub field: Arc<Field>,
    pub n: usize,
    pub words: BTreeSet<Word>,
}

impl Plain {
    /// All combinations of rows.
    pub fn span(field: &Arc<Field>, n: usize, rows: &[Word]) -> Plain {
        let mut words = BTreeSet::from([vec![0; n]]);
        for row in rows {
            if words.contains(row) {
                continue;
            }
            let multiples: Vec<Word> = (0..field.q()).map(|by| field.scaled(by, row)).collect();
            words = words
                .iter()
                .flat_map(|word| multiples.iter().map(|more| field.sum(word, more)))
                .collect();
        }
        Plain {
            field: field.clone(),
            n,
            words,
        }
    }

    /// All words orthogonal to rows: by trying all, or, where these are too many, position by
    /// position, keeping the partial words for each partial syndrome apart.
    pub fn orthogonal(field: &Arc<Field>, n: usize, rows: &[Word]) -> Plain {
        let total = u64::from(field.q()).checked_pow(n as u32);
        if total.is_some_and(|total| total <= 4096) {
            let words = field
                .vectors(n)
                .into_iter()
                .filter(|word| rows.iter().all(|row| field.dot(row, word) == 0))
                .collect();
            return Plain {
                field: field.clone(),
                n,
                words,
            };
        }
        Plain::span(field, n, &solutions(field, n, rows))
    }

    /// The words of a set that is known to be linear.
    pub fn of_words(field: &Arc<Field>, n: usize, words: BTreeSet<Word>) -> Plain {
        Plain {
            field: field.clone(),
            n,
            words,
        }
    }

    pub fn k(&self) -> usize {
        let mut k = 0;
        let mut count = 1;
        while count < self.words.len() {
            count *= self.field.q() as usize;
            k += 1;
        }
        assert_eq!(count, self.words.len(), "the words are a subspace");
        k
    }

    pub fn basis(&self) -> Vec<Word> {
        basis(&self.field, self.words.iter().rev().cloned())
    }

    /// The least weight of a word but zero; `None` for the zero code.
    pub fn d(&self) -> Option<usize> {
        self.words
            .iter()
            .map(|word| weight(word))
            .filter(|&weight| weight > 0)
            .min()
    }

    pub fn weights(&self) -> BTreeMap<usize, String> {
        let mut counts: BTreeMap<usize, u64> = BTreeMap::new();
        for word in &self.words {
            *counts.entry(weight(word)).or_default() += 1;
        }
        counts
            .into_iter()
            .map(|(weight, count)| (weight, count.to_string()))
            .collect()
    }

    pub fn dual(&self) -> Plain {
        Plain::orthogonal(&self.field, self.n, &self.basis())
    }

    pub fn contains(&self, word: &[u32]) -> bool {
        self.words.contains(word)
    }

    fn map(&self, n: usize, change: impl Fn(&Word) -> Word) -> Plain {
        Plain {
            field: self.field.clone(),
            n,
            words: self.words.iter().map(change).collect(),
        }
    }

    pub fn puncture(&self, positions: &[usize]) -> Plain {
        self.map(self.n - positions.len(), |word| without(word, positions))
    }

    pub fn shorten(&self, positions: &[usize]) -> Plain {
        let words = self
            .words
            .iter()
            .filter(|word| positions.iter().all(|&at| word[at] == 0))
            .map(|word| without(word, positions))
            .collect();
        Plain::of_words(&self.field, self.n - positions.len(), words)
    }

    pub fn extend(&self) -> Plain {
        self.map(self.n + 1, |word| {
            let sum = word
                .iter()
                .fold(0, |sum, &entry| self.field.add(sum, entry));
            let mut longer = word.clone();
            longer.push(self.field.neg(sum));
            longer
        })
    }

    pub fn augment(&self, row: &Word) -> Plain {
        let mut rows = self.basis();
        rows.push(row.clone());
        Plain::span(&self.field, self.n, &rows)
    }

    pub fn expurgate(&self, row: &Word) -> Plain {
        let words = self
            .words
            .iter()
            .filter(|word| self.field.dot(row, word) == 0)
            .cloned()
            .collect();
        Plain::of_words(&self.field, self.n, words)
    }

    pub fn permute(&self, order: &[usize]) -> Plain {
        self.map(self.n, |word| order.iter().map(|&at| word[at]).collect())
    }

    /// The words whose symbols all lie in the prime field.
    pub fn subfield(&self) -> Plain {
        let prime = Field::of_order(self.field.p);
        let words = self
            .words
            .iter()
            .filter(|word| word.iter().all(|&entry| entry < prime.q()))
            .cloned()
            .collect();
        Plain::of_words(&prime, self.n, words)
    }

    /// Each symbol as its coordinates in a basis, found by trying all.
    pub fn image(&self, basis: &[u32]) -> Plain {
        let field = &self.field;
        let prime = Field::of_order(field.p);
        let mut coordinates = vec![Vec::new(); field.q() as usize];
        for digits in prime.vectors(basis.len()) {
            let element = digits.iter().zip(basis).fold(0, |sum, (&digit, &member)| {
                field.add(sum, field.mul(digit, member))
            });
            coordinates[element as usize] = digits;
        }
        let words = self
            .words
            .iter()
            .map(|word| {
                word.iter()
                    .flat_map(|&entry| coordinates[entry as usize].clone())
                    .collect()
            })
            .collect();
        Plain::of_words(&prime, self.n * basis.len(), words)
    }

    /// Each symbol's digits encoded by the rows of an inner generator matrix.
    pub fn concatenate(&self, inner: &[Word]) -> Plain {
        let prime = Field::of_order(self.field.p);
        let length = inner[0].len();
        let words = self
            .words
            .iter()
            .map(|word| {
                word.iter()
                    .flat_map(|&entry| {
                        self.field
                            .digits(entry)
                            .iter()
                            .zip(inner)
                            .fold(vec![0; length], |sum, (&digit, row)| {
                                prime.sum(&sum, &prime.scaled(digit, row))
                            })
                    })
                    .collect()
            })
            .collect();
        Plain::of_words(&prime, self.n * length, words)
    }

    pub fn plotkin(&self, other: &Plain) -> Plain {
        self.pairs(other, 2 * self.n, |u, v| {
            let mut word = u.clone();
            word.extend(self.field.sum(u, v));
            word
        })
    }

    pub fn direct_sum(&self, other: &Plain) -> Plain {
        self.pairs(other, self.n + other.n, |u, v| {
            let mut word = u.clone();
            word.extend(v);
            word
        })
    }

    fn pairs(&self, other: &Plain, n: usize, join: impl Fn(&Word, &Word) -> Word) -> Plain {
        let words = self
            .words
            .iter()
            .flat_map(|u| other.words.iter().map(|v| join(u, v)).collect::<Vec<_>>())
            .collect();
        Plain::of_words(&self.field, n, words)
    }

    /// The rectangles, row by row, with columns here and rows in the other: spanned by products of
    /// a column and a row; that columns and rows lie where they must is verified on all words.
    pub fn product(&self, other: &Plain) -> Plain {
        let mut rows = Vec::new();
        for column in self.basis() {
            for row in other.basis() {
                rows.push(
                    column
                        .iter()
                        .flat_map(|&by| self.field.scaled(by, &row))
                        .collect(),
                );
            }
        }
        let made = Plain::span(&self.field, self.n * other.n, &rows);
        for word in &made.words {
            assert!(word.chunks(other.n).all(|row| other.contains(row)));
            for at in 0..other.n {
                let column: Word = word.iter().skip(at).step_by(other.n).copied().collect();
                assert!(self.contains(&column));
            }
        }
        made
    }

    /// Whether the data can stand unchanged in these positions.
    pub fn informative(&self, positions: &[usize]) -> bool {
        let seen: HashSet<Word> = self
            .words
            .iter()
            .map(|word| positions.iter().map(|&at| word[at]).collect())
            .collect();
        seen.len() == self.words.len()
    }

    /// The verdict on a property, straight from its meaning.
    pub fn property(&self, name: &str, dual: &Plain) -> Option<bool> {
        let (n, k) = (self.n, self.k());
        let weights = || self.words.iter().map(|word| weight(word));
        Some(match name {
            "mds" => self.d()? == n - k + 1,
            "perfect" => {
                let radius = (self.d()? - 1) / 2;
                let ball = ball(self.field.q(), n, radius);
                ball * self.words.len() as u128 == u128::from(self.field.q()).pow(n as u32)
            }
            "self_dual" => self.words == dual.words,
            "self_orthogonal" => self.words.is_subset(&dual.words),
            "dual_containing" => dual.words.is_subset(&self.words),
            "complementary_dual" => self.words.intersection(&dual.words).count() == 1,
            "cyclic" => self.basis().iter().all(|word| {
                let mut shifted = word.clone();
                shifted.rotate_right(1);
                self.contains(&shifted)
            }),
            "even" => weights().all(|weight| weight % 2 == 0),
            "doubly_even" => weights().all(|weight| weight % 4 == 0),
            "systematic" => {
                self.informative(&(0..k).collect::<Vec<_>>())
                    || self.informative(&(n - k..n).collect::<Vec<_>>())
            }
            "equidistant" => {
                let seen: HashSet<usize> = weights().filter(|&weight| weight > 0).collect();
                seen.len() <= 1
            }
            "projective" => dual.d().is_none_or(|d| d >= 3),
            _ => return None,
        })
    }

    /// The greatest distance of a word of the space from the code, by trying all words.
    pub fn covering_radius(&self) -> usize {
        self.field
            .vectors(self.n)
            .iter()
            .map(|word| {
                self.words
                    .iter()
                    .map(|code| {
                        code.iter()
                            .zip(word)
                            .filter(|(one, other)| one != other)
                            .count()
                    })
                    .min()
                    .expect("the zero word")
            })
            .max()
            .expect("a word")
    }
}

/// The words of a ball, counted one radius at a time.
pub fn ball(q: u32, n: usize, radius: usize) -> u128 {
    let choose = |many: usize| {
        (0..many).fold(1u128, |value, at| {
            value * (n - at) as u128 / (at + 1) as u128
        })
    };
    (0..=radius.min(n))
        .map(|weight| choose(weight) * u128::from(q - 1).pow(weight as u32))
        .sum()
}

pub fn without(word: &[u32], positions: &[usize]) -> Word {
    (0..word.len())
        .filter(|at| !positions.contains(at))
        .map(|at| word[at])
        .collect()
}

/// A basis of what some words span: each word is reduced by those before it.
pub fn basis(field: &Field, words: impl IntoIterator<Item = Word>) -> Vec<Word> {
    let mut kept: Vec<Word> = Vec::new();
    let mut reduced: Vec<(usize, Word)> = Vec::new();
    for word in words {
        let mut rest = word.clone();
        for (pivot, row) in &reduced {
            let factor = field.neg(rest[*pivot]);
            rest = field.sum(&rest, &field.scaled(factor, row));
        }
        if let Some(pivot) = rest.iter().position(|&entry| entry != 0) {
            let scale = field.inv(rest[pivot]);
            reduced.push((pivot, field.scaled(scale, &rest)));
            kept.push(word);
            if kept.len() == kept[0].len() {
                break;
            }
        }
    }
    kept
}

pub fn rank(field: &Field, rows: &[Word]) -> usize {
    basis(field, rows.iter().cloned()).len()
}

/// A basis of the words orthogonal to rows, by clearing column after column.
fn solutions(field: &Field, n: usize, rows: &[Word]) -> Vec<Word> {
    let mut echelon: Vec<(usize, Word)> = Vec::new();
    for row in rows {
        let mut rest = row.clone();
        for (pivot, known) in &echelon {
            let factor = field.neg(rest[*pivot]);
            rest = field.sum(&rest, &field.scaled(factor, known));
        }
        let Some(pivot) = rest.iter().position(|&entry| entry != 0) else {
            continue;
        };
        let rest = field.scaled(field.inv(rest[pivot]), &rest);
        for (_, known) in &mut echelon {
            let factor = field.neg(known[pivot]);
            *known = field.sum(known, &field.scaled(factor, &rest));
        }
        echelon.push((pivot, rest));
    }
    (0..n)
        .filter(|at| echelon.iter().all(|(pivot, _)| pivot != at))
        .map(|free| {
            let mut word = vec![0; n];
            word[free] = 1;
            for (pivot, row) in &echelon {
                word[*pivot] = field.neg(row[free]);
            }
            word
        })
        .collect()
}

/// The columns of height r whose first non-zero entry is 1, in numeric order, as rows of a matrix.
pub fn hamming_checks(field: &Field, r: usize) -> Vec<Word> {
    let columns: Vec<Word> = field
        .vectors(r)
        .into_iter()
        .filter(|column| column.iter().find(|&&entry| entry != 0) == Some(&1))
        .collect();
    (0..r)
        .map(|row| columns.iter().map(|column| column[row]).collect())
        .collect()
}

/// A small generator of numbers, the same on every machine (splitmix64; Steele, Lea and Flood, 2014).
pub struct Dice(pub u64);

impl Dice {
    pub fn below(&mut self, bound: u32) -> u32 {
        self.0 = self.0.wrapping_add(0x9e37_79b9_7f4a_7c15);
        let mut mixed = self.0;
        mixed = (mixed ^ (mixed >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
        mixed = (mixed ^ (mixed >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
        ((mixed ^ (mixed >> 31)) % u64::from(bound)) as u32
    }

    pub fn within(&mut self, least: usize, most: usize) -> usize {
        least + self.below((most - least + 1) as u32) as usize
    }

    pub fn word(&mut self, q: u32, length: usize) -> Word {
        (0..length).map(|_| self.below(q)).collect()
    }

    /// So many different numbers below a bound, ascending.
    pub fn some(&mut self, many: usize, bound: usize) -> Vec<usize> {
        let mut order = self.order(bound);
        order.truncate(many);
        order.sort_unstable();
        order
    }

    pub fn order(&mut self, bound: usize) -> Vec<usize> {
        let mut order: Vec<usize> = (0..bound).collect();
        for at in (1..bound).rev() {
            order.swap(at, self.within(0, at));
        }
        order
    }
}
