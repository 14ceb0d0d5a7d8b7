//! Field arithmetic in tables for small fields, and a code's generator in systematic form.

use crate::algebra::{Element, Field, Matrix};

/// Up to this order sums and products are looked up, and an element fits a byte.
pub(super) const TABLE_ORDER: u64 = 256;

/// The operations of a field, tabulated when it is small.
pub(super) struct Arithmetic {
    pub(super) field: Field,
    /// q.
    pub(super) order: u64,
    sums: Vec<u8>,
    products: Vec<u8>,
}

impl Arithmetic {
    pub(super) fn new(field: &Field) -> Arithmetic {
        let order = field.order();
        let small = if order <= TABLE_ORDER {
            order as Element
        } else {
            0
        };
        let table = |operation: &dyn Fn(Element, Element) -> Element| {
            (0..small)
                .flat_map(|left| (0..small).map(move |right| (left, right)))
                .map(|(left, right)| operation(left, right) as u8)
                .collect::<Vec<u8>>()
        };
        Arithmetic {
            order,
            sums: table(&|left, right| field.add(left, right)),
            products: table(&|left, right| field.mul(left, right)),
            field: field.clone(),
        }
    }

    pub(super) fn add(&self, left: Element, right: Element) -> Element {
        if self.sums.is_empty() {
            return self.field.add(left, right);
        }
        Element::from(self.sums[left as usize * self.order as usize + right as usize])
    }

    pub(super) fn mul(&self, left: Element, right: Element) -> Element {
        if self.products.is_empty() {
            return self.field.mul(left, right);
        }
        Element::from(self.products[left as usize * self.order as usize + right as usize])
    }

    /// `into += scale · row`.
    pub(super) fn add_scaled(&self, into: &mut [Element], scale: Element, row: &[Element]) {
        if scale == 0 {
            return;
        }
        for (entry, &add) in into.iter_mut().zip(row) {
            if add != 0 {
                *entry = self.add(*entry, self.mul(scale, add));
            }
        }
    }

    /// `scale · row`.
    pub(super) fn scaled(&self, scale: Element, row: &[Element]) -> Vec<Element> {
        row.iter().map(|&entry| self.mul(scale, entry)).collect()
    }
}

/// A generator brought to systematic form: row i is a unit vector on the information positions.
pub(super) struct Systematic {
    /// n.
    pub(super) length: usize,
    /// The information positions; row i has its 1 in `pivots[i]`.
    pub(super) pivots: Vec<usize>,
    /// The other positions, ascending.
    pub(super) free: Vec<usize>,
    /// Each row on the positions of `free`.
    pub(super) rows: Vec<Vec<Element>>,
}

impl Systematic {
    /// From any matrix that spans the code, information positions as far left as possible.
    pub(super) fn new(generator: &Matrix) -> Systematic {
        let order: Vec<usize> = (0..generator.columns()).collect();
        Systematic::in_order(generator, &order)
    }

    /// From any matrix that spans the code, information positions taken greedily in the given
    /// order, which names every position once.
    pub(super) fn in_order(generator: &Matrix, order: &[usize]) -> Systematic {
        let echelon = generator.reduced_in(order);
        let mut is_pivot = vec![false; generator.columns()];
        for &pivot in &echelon.pivots {
            is_pivot[pivot] = true;
        }
        let free: Vec<usize> = (0..generator.columns())
            .filter(|&at| !is_pivot[at])
            .collect();
        let rows = (0..echelon.pivots.len())
            .map(|row| free.iter().map(|&at| echelon.matrix.get(row, at)).collect())
            .collect();
        Systematic {
            length: generator.columns(),
            pivots: echelon.pivots,
            free,
            rows,
        }
    }

    /// k, the dimension.
    pub(super) fn dimension(&self) -> usize {
        self.pivots.len()
    }

    /// The word whose information part has the given entries in the given rows' positions.
    pub(super) fn word(&self, field: &Field, message: &[(usize, Element)]) -> Vec<Element> {
        let mut word = vec![0; self.length];
        for &(row, scale) in message {
            let pivot = self.pivots[row];
            word[pivot] = field.add(word[pivot], scale);
            for (&at, &entry) in self.free.iter().zip(&self.rows[row]) {
                word[at] = field.add(word[at], field.mul(scale, entry));
            }
        }
        word
    }
}

/// A product of work counts that stops at the largest number instead of wrapping.
pub(super) fn product(factors: &[u64]) -> u64 {
    factors
        .iter()
        .fold(1u64, |all, &factor| all.saturating_mul(factor))
}

/// `base`^`exponent`, or the largest number.
pub(super) fn power(base: u64, exponent: usize) -> u64 {
    u32::try_from(exponent).map_or(u64::MAX, |exponent| base.saturating_pow(exponent))
}

/// n over w, or the largest number.
pub(super) fn choose(n: usize, w: usize) -> u64 {
    if w > n {
        return 0;
    }
    let w = w.min(n - w);
    let mut ways: u128 = 1;
    for at in 0..w {
        ways = ways * (n - at) as u128 / (at as u128 + 1);
        if ways > u128::from(u64::MAX) {
            return u64::MAX;
        }
    }
    ways as u64
}
