//! The operations of a field on its elements.

use super::residues::{add_digits, neg_digits};
use super::tables::{ByteTables, Logarithms, Products, Steps, Sums, TABLE_LIMIT};
use super::{Element, Field};
use crate::algebra::numbers::{pow_mod, reduce_order};

impl Field {
    /// The sum.
    #[inline]
    pub fn add(&self, left: Element, right: Element) -> Element {
        match &self.data.sums {
            Sums::Xor => left ^ right,
            Sums::Modular => {
                let sum = left + right;
                sum.min(sum.wrapping_sub(self.data.characteristic))
            }
            Sums::Table(table) => {
                u32::from(table[left as usize * self.data.order as usize + right as usize])
            }
            Sums::Successors(successors) => match &self.data.products {
                Products::Logarithms(logarithms) => logarithms.add(successors, left, right),
                _ => add_digits(self.data.characteristic, left, right),
            },
            Sums::Digits => add_digits(self.data.characteristic, left, right),
        }
    }

    /// The element that sums with this one to zero.
    #[inline]
    pub fn neg(&self, element: Element) -> Element {
        match (&self.data.sums, &self.data.products) {
            (Sums::Xor, _) => element,
            (_, _) if element == 0 => 0,
            (Sums::Modular, _) => self.data.characteristic - element,
            (_, Products::Logarithms(logarithms)) => {
                let half = (self.data.order as u32 - 1) / 2;
                logarithms.exp((logarithms.log(element) + half) as usize)
            }
            _ => neg_digits(self.data.characteristic, element),
        }
    }

    /// The difference.
    #[inline]
    pub fn sub(&self, left: Element, right: Element) -> Element {
        self.add(left, self.neg(right))
    }

    /// The product.
    #[inline]
    pub fn mul(&self, left: Element, right: Element) -> Element {
        match &self.data.products {
            Products::Modular if self.data.order == 2 => left & right,
            Products::Modular => {
                (u64::from(left) * u64::from(right) % u64::from(self.data.characteristic)) as u32
            }
            Products::Logarithms(logarithms) => logarithms.mul(left, right),
            Products::Residues(residues) => residues.mul(left, right),
        }
    }

    /// The inverse; `None` for zero.
    pub fn inv(&self, element: Element) -> Option<Element> {
        if element == 0 {
            return None;
        }
        Some(match &self.data.products {
            Products::Logarithms(logarithms) => {
                let full = self.data.order as u32 - 1;
                logarithms.exp((full - logarithms.log(element)) as usize)
            }
            _ => self.pow(element, self.data.order - 2),
        })
    }

    /// The power; 0^0 = 1.
    pub fn pow(&self, element: Element, exponent: u64) -> Element {
        if exponent == 0 {
            return 1;
        }
        if element == 0 {
            return 0;
        }
        let exponent = exponent % (self.data.order - 1);
        match &self.data.products {
            Products::Modular => {
                let p = u64::from(self.data.characteristic);
                pow_mod(u64::from(element), exponent, p) as u32
            }
            Products::Logarithms(logarithms) => {
                // Both factors are below 2^20.
                let log = u64::from(logarithms.log(element)) * exponent;
                logarithms.exp((log % (self.data.order - 1)) as usize)
            }
            Products::Residues(residues) => residues.pow(element, exponent),
        }
    }

    /// The element `generator^exponent`.
    pub fn power_of_generator(&self, exponent: u64) -> Element {
        self.pow(self.data.generator, exponent)
    }

    /// The exponent e in 0..q−1 with `generator^e = element`; `None` for zero. Up to 2^20 elements
    /// by table, above in about √q steps.
    pub fn log(&self, element: Element) -> Option<u64> {
        if element == 0 {
            return None;
        }
        if let Products::Logarithms(logarithms) = &self.data.products {
            return Some(u64::from(logarithms.log(element)));
        }
        let generator = self.data.generator;
        if self.data.order <= TABLE_LIMIT {
            let logarithms = self.data.logarithms.get_or_init(|| {
                Logarithms::new(self.data.order, |element| self.mul(generator, element))
            });
            return Some(u64::from(logarithms.log(element)));
        }
        let mul = |left, right| self.mul(left, right);
        let steps = self.data.steps.get_or_init(|| {
            Steps::new(self.data.order, generator, mul, |base, exponent| {
                self.pow(base, exponent)
            })
        });
        Some(steps.log(element, mul))
    }

    /// `row += factor · other`, over the shorter of the two.
    pub fn add_multiple(&self, row: &mut [Element], factor: Element, other: &[Element]) {
        match (factor, &self.data.sums, &self.data.products) {
            (0, _, _) => {}
            (1, Sums::Xor, _) => {
                for (entry, &summand) in row.iter_mut().zip(other) {
                    *entry ^= summand;
                }
            }
            (_, Sums::Xor, Products::Logarithms(logarithms)) => {
                let log = logarithms.log(factor);
                for (entry, &summand) in row.iter_mut().zip(other) {
                    if summand != 0 {
                        *entry ^= logarithms.exp((log + logarithms.log(summand)) as usize);
                    }
                }
            }
            _ => {
                for (entry, &summand) in row.iter_mut().zip(other) {
                    if summand != 0 {
                        *entry = self.add(*entry, self.mul(factor, summand));
                    }
                }
            }
        }
    }

    /// The least e ≥ 1 with `element^e = 1`; `None` for zero.
    pub fn multiplicative_order(&self, element: Element) -> Option<u64> {
        (element != 0).then(|| {
            reduce_order(self.data.order - 1, |exponent| {
                self.pow(element, exponent) == 1
            })
        })
    }

    /// All products and sums, for fields of at most 256 elements.
    pub fn byte_tables(&self) -> Option<&ByteTables> {
        (self.data.order <= 256).then(|| {
            self.data.bytes.get_or_init(|| {
                ByteTables::new(
                    self.data.order,
                    |left, right| self.mul(left, right),
                    |left, right| self.add(left, right),
                )
            })
        })
    }
}
