//! A subfield inside a field: the way up and back, trace and norm.
//!
//! The subfield's elements go up by sending the root of its modulus to a root of that modulus in
//! the larger field: of its roots g^e, g the larger field's generator, the one with the least e.
//! Between Conway fields that is the generator's power e = (Q − 1)/(q − 1), by compatibility. The
//! prime field's elements keep their names, and a field embeds into itself by the identity.

use super::{Element, Field};

/// An embedding of GF(q) into GF(Q) = GF(q^m).
#[derive(Clone, Debug)]
pub struct Embedding {
    field: Field,
    sub: Field,
    /// The image of every element of the subfield; empty when names are kept.
    images: Vec<Element>,
    /// (image, element), ascending.
    preimages: Vec<(Element, Element)>,
}

impl Field {
    /// The embedding of `sub` into this field by the rule of [`crate::algebra::field::embedding`];
    /// `None` when it is no subfield.
    pub fn embedding_of(&self, sub: &Field) -> Option<Embedding> {
        if self.characteristic() != sub.characteristic()
            || !self.degree().is_multiple_of(sub.degree())
        {
            return None;
        }
        let keeps_names = sub.degree() == 1 || sub == self;
        Some(if keeps_names {
            Embedding {
                field: self.clone(),
                sub: sub.clone(),
                images: Vec::new(),
                preimages: Vec::new(),
            }
        } else {
            self.embedding_by_root(sub)
        })
    }

    fn embedding_by_root(&self, sub: &Field) -> Embedding {
        let step = self.power_of_generator((self.order() - 1) / (sub.order() - 1));
        let value = |point| {
            sub.modulus().iter().rev().fold(0, |value, &coefficient| {
                self.add(self.mul(value, point), coefficient)
            })
        };
        let mut root = 1;
        while value(root) != 0 {
            root = self.mul(root, step);
        }
        let p = sub.characteristic();
        let mut images: Vec<Element> = Vec::with_capacity(sub.order() as usize);
        images.extend(0..p);
        let mut power = root;
        while (images.len() as u64) < sub.order() {
            let lower = images.len();
            for digit in 1..p {
                let top = self.mul(digit, power);
                for low in 0..lower {
                    images.push(self.add(top, images[low]));
                }
            }
            power = self.mul(power, root);
        }
        let mut preimages: Vec<(Element, Element)> = images.iter().copied().zip(0..).collect();
        preimages.sort_unstable();
        Embedding {
            field: self.clone(),
            sub: sub.clone(),
            images,
            preimages,
        }
    }
}

impl Embedding {
    /// The larger field, GF(Q).
    pub fn field(&self) -> &Field {
        &self.field
    }

    /// The subfield, GF(q).
    pub fn sub(&self) -> &Field {
        &self.sub
    }

    /// m with Q = q^m.
    pub fn degree(&self) -> u32 {
        self.field.degree() / self.sub.degree()
    }

    /// An element of the subfield as one of the field.
    pub fn up(&self, element: Element) -> Element {
        if self.images.is_empty() {
            element
        } else {
            self.images[element as usize]
        }
    }

    /// An element of the field as one of the subfield; `None` when it lies outside.
    pub fn down(&self, element: Element) -> Option<Element> {
        if self.images.is_empty() {
            return (u64::from(element) < self.sub.order()).then_some(element);
        }
        self.preimages
            .binary_search_by_key(&element, |&(image, _)| image)
            .ok()
            .map(|at| self.preimages[at].1)
    }

    /// The trace e + e^q + e^(q²) + … to the subfield.
    pub fn trace(&self, element: Element) -> Element {
        self.over_conjugates(element, 0, Field::add)
    }

    /// The norm e · e^q · e^(q²) · … to the subfield.
    pub fn norm(&self, element: Element) -> Element {
        self.over_conjugates(element, 1, Field::mul)
    }

    fn over_conjugates(
        &self,
        element: Element,
        start: Element,
        combine: impl Fn(&Field, Element, Element) -> Element,
    ) -> Element {
        let mut conjugate = element;
        let mut total = start;
        for _ in 0..self.degree() {
            total = combine(&self.field, total, conjugate);
            conjugate = self.field.pow(conjugate, self.sub.order());
        }
        self.down(total)
            .expect("traces and norms lie in the subfield")
    }
}
