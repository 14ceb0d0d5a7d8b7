//! Bases of a field over a subfield: coordinates and dual bases.
//!
//! Elements b₁ … b_m are a basis exactly when the matrix of traces Tr(bᵢ·bⱼ) is invertible; its
//! inverse gives the dual basis d with Tr(bᵢ·dⱼ) = [i = j], and an element e has the coordinates
//! Tr(e·dᵢ) (R. Lidl and H. Niederreiter, Finite Fields, 1997, §2.3).

use super::{Element, Embedding};
use crate::algebra::Matrix;

/// A basis of a field over a subfield, with its dual.
#[derive(Clone, Debug)]
pub struct Basis {
    embedding: Embedding,
    elements: Vec<Element>,
    dual: Vec<Element>,
}

impl Embedding {
    /// The basis of the field over the subfield made of these elements; `None` when they are none:
    /// not as many as the degree, dependent, or no elements of the field.
    pub fn basis(&self, elements: &[Element]) -> Option<Basis> {
        let (field, sub) = (self.field(), self.sub());
        let m = self.degree() as usize;
        if elements.len() != m || elements.iter().any(|&e| u64::from(e) >= field.order()) {
            return None;
        }
        let inverse = Matrix::from_fn(sub, m, m, |row, column| {
            self.trace(field.mul(elements[row], elements[column]))
        })
        .inverse()?;
        let dual = (0..m)
            .map(|row| {
                elements.iter().enumerate().fold(0, |sum, (at, &element)| {
                    field.add(sum, field.mul(self.up(inverse.get(row, at)), element))
                })
            })
            .collect();
        Some(Basis {
            embedding: self.clone(),
            elements: elements.to_vec(),
            dual,
        })
    }

    /// The basis 1, x, x², … of powers of the root x of the field's modulus. Over the prime field,
    /// coordinates in it are the base-p digits of the element.
    pub fn polynomial_basis(&self) -> Basis {
        // The root is the integer p, but in a prime field, where the basis is 1 alone.
        let root = self.field().characteristic();
        let powers: Vec<Element> = (0..u64::from(self.degree()))
            .map(|exponent| self.field().pow(root, exponent))
            .collect();
        self.basis(&powers)
            .expect("the root of an irreducible modulus has full degree over every subfield")
    }

    /// The basis e, e^q, e^(q²), … of an element's conjugates; `None` when they are dependent.
    pub fn normal_basis(&self, element: Element) -> Option<Basis> {
        let mut conjugates = vec![element];
        for at in 1..self.degree() as usize {
            conjugates.push(self.field().pow(conjugates[at - 1], self.sub().order()));
        }
        self.basis(&conjugates)
    }
}

impl Basis {
    /// The embedding of the subfield it belongs to.
    pub fn embedding(&self) -> &Embedding {
        &self.embedding
    }

    /// Its elements, in the field.
    pub fn elements(&self) -> &[Element] {
        &self.elements
    }

    /// The coordinates of an element in the subfield, in the order of the basis.
    pub fn coordinates(&self, element: Element) -> Vec<Element> {
        let field = self.embedding.field();
        self.dual
            .iter()
            .map(|&dual| self.embedding.trace(field.mul(element, dual)))
            .collect()
    }

    /// The element with the given coordinates in the subfield.
    pub fn combine(&self, coordinates: &[Element]) -> Element {
        let field = self.embedding.field();
        self.elements
            .iter()
            .zip(coordinates)
            .fold(0, |sum, (&element, &coordinate)| {
                field.add(sum, field.mul(element, self.embedding.up(coordinate)))
            })
    }

    /// The dual (complementary) basis.
    pub fn dual(&self) -> Basis {
        Basis {
            embedding: self.embedding.clone(),
            elements: self.dual.clone(),
            dual: self.elements.clone(),
        }
    }
}
