//! Tables of logarithms, powers and sums for the fields small enough to have them.

use std::collections::HashMap;

use super::Element;
use super::residues::Residues;

/// Fields up to this order get tables of logarithms.
pub(super) const TABLE_LIMIT: u64 = 1 << 20;

const NONE: u32 = u32::MAX;

/// Logarithms to a generator, and its powers.
pub(super) struct Logarithms {
    /// g^e for e in 0..2(q − 1), so that a sum of two logarithms needs no reduction.
    exp: Vec<Element>,
    /// The exponent of every element but zero.
    log: Vec<u32>,
}

impl Logarithms {
    /// `times_generator` multiplies an element by the generator.
    pub(super) fn new(order: u64, times_generator: impl Fn(Element) -> Element) -> Logarithms {
        let count = order as usize - 1;
        let mut exp = vec![0; 2 * count];
        let mut log = vec![NONE; count + 1];
        let mut power: Element = 1;
        for exponent in 0..count {
            debug_assert_eq!(log[power as usize], NONE, "a generator has full order");
            exp[exponent] = power;
            exp[exponent + count] = power;
            log[power as usize] = exponent as u32;
            power = times_generator(power);
        }
        Logarithms { exp, log }
    }

    pub(super) fn exp(&self, exponent: usize) -> Element {
        self.exp[exponent]
    }

    /// The logarithm of an element other than zero.
    pub(super) fn log(&self, element: Element) -> u32 {
        self.log[element as usize]
    }

    pub(super) fn mul(&self, left: Element, right: Element) -> Element {
        if left == 0 || right == 0 {
            return 0;
        }
        self.exp[(self.log[left as usize] + self.log[right as usize]) as usize]
    }

    /// The logarithms of 1 + g^e, e in 0..q − 1 (Jacobi, 1846; Zech).
    pub(super) fn successors(&self, characteristic: u32) -> Vec<u32> {
        let p = characteristic;
        let count = self.exp.len() / 2;
        self.exp[..count]
            .iter()
            .map(|&power| {
                let next = power - power % p + (power % p + 1) % p;
                if next == 0 {
                    NONE
                } else {
                    self.log[next as usize]
                }
            })
            .collect()
    }

    /// The sum, by the table of [`Logarithms::successors`].
    pub(super) fn add(&self, successors: &[u32], left: Element, right: Element) -> Element {
        if left == 0 {
            return right;
        }
        if right == 0 {
            return left;
        }
        let (left, right) = (self.log[left as usize], self.log[right as usize]);
        let gap = if right >= left {
            right - left
        } else {
            right + successors.len() as u32 - left
        };
        match successors[gap as usize] {
            NONE => 0,
            next => self.exp[(left + next) as usize],
        }
    }
}

/// How elements are added.
pub(super) enum Sums {
    /// Characteristic 2.
    Xor,
    /// A prime field.
    Modular,
    /// q ≤ 256: all sums, row by row.
    Table(Vec<u8>),
    /// By the logarithms of successors.
    Successors(Vec<u32>),
    /// Digit by digit in base p.
    Digits,
}

/// How elements are multiplied.
pub(super) enum Products {
    /// A prime field.
    Modular,
    /// By logarithms.
    Logarithms(Logarithms),
    /// As residues of polynomials.
    Residues(Residues),
}

/// All products and sums of a field of at most 256 elements, for work on whole rows.
pub struct ByteTables {
    order: usize,
    products: Vec<u8>,
    sums: Vec<u8>,
}

impl ByteTables {
    pub(super) fn new(
        order: u64,
        mul: impl Fn(Element, Element) -> Element,
        add: impl Fn(Element, Element) -> Element,
    ) -> ByteTables {
        let order = order as usize;
        let table = |entry: &dyn Fn(Element, Element) -> Element| {
            let mut table = vec![0; order * 256];
            for left in 0..order {
                for right in 0..order {
                    table[left * 256 + right] = entry(left as u32, right as u32) as u8;
                }
            }
            table
        };
        ByteTables {
            order,
            products: table(&mul),
            sums: table(&add),
        }
    }

    /// The products of `factor` with every element, padded to 256.
    pub fn products(&self, factor: u8) -> &[u8; 256] {
        Self::line(&self.products, factor)
    }

    /// The sums of `summand` with every element, padded to 256.
    pub fn sums(&self, summand: u8) -> &[u8; 256] {
        Self::line(&self.sums, summand)
    }

    /// The sum of two elements.
    pub fn sum(&self, left: u8, right: u8) -> u8 {
        self.sums[usize::from(left) * 256 + usize::from(right)]
    }

    /// The order of the field.
    pub fn order(&self) -> usize {
        self.order
    }

    fn line(table: &[u8], at: u8) -> &[u8; 256] {
        let start = usize::from(at) * 256;
        table[start..start + 256]
            .try_into()
            .expect("a line has 256 entries")
    }
}

/// Logarithms in a large field by baby steps and giant steps (Shanks, 1971).
pub(super) struct Steps {
    baby: HashMap<Element, u32>,
    count: u64,
    giant: Element,
}

impl Steps {
    pub(super) fn new(
        order: u64,
        generator: Element,
        mul: impl Fn(Element, Element) -> Element,
        pow: impl Fn(Element, u64) -> Element,
    ) -> Steps {
        let count = order.isqrt() + 1;
        let mut baby = HashMap::with_capacity(count as usize);
        let mut power = 1;
        for exponent in 0..count {
            baby.entry(power).or_insert(exponent as u32);
            power = mul(power, generator);
        }
        let giant = pow(generator, order - 1 - count % (order - 1));
        Steps { baby, count, giant }
    }

    /// The logarithm of an element other than zero.
    pub(super) fn log(&self, element: Element, mul: impl Fn(Element, Element) -> Element) -> u64 {
        let mut rest = element;
        for step in 0..=self.count {
            if let Some(&exponent) = self.baby.get(&rest) {
                return step * self.count + u64::from(exponent);
            }
            rest = mul(rest, self.giant);
        }
        unreachable!("every element but zero is a power of the generator")
    }
}
