#![allow(missing_docs)]
use super::{Element, Field};
use std::collections::BTreeSet;
pub fn format_polynomial(c: &[u32], symbol: &str) -> String {
    let mut t = vec![];
    for (i, &x) in c.iter().enumerate().rev() {
        if x == 0 {
            continue;
        }
        let co = if x == 1 && i > 0 {
            String::new()
        } else if i > 0 {
            format!("{x}*")
        } else {
            format!("{x}")
        };
        t.push(match i {
            0 => co,
            1 => format!("{co}{symbol}"),
            _ => format!("{co}{symbol}^{i}"),
        });
    }
    t.join(" + ")
}
pub fn prime_power(order: u64) -> Option<(u64, u32)> {
    let p = (2..=order).find(|d| order % d == 0)?;
    let mut r = order;
    let mut m = 0;
    while r % p == 0 {
        r /= p;
        m += 1;
    }
    (r == 1).then_some((p, m))
}
#[derive(Debug)]
pub enum RootError {
    CommonFactor { n: u64, q: u64 },
    Other,
}
impl std::fmt::Display for RootError {
    fn fmt(&self, f: &mut std::fmt::Formatter) -> std::fmt::Result {
        write!(f, "{self:?}")
    }
}
pub struct Poly(Vec<u32>);
impl Poly {
    pub fn coefficients(&self) -> &[u32] {
        &self.0
    }
}
pub struct CyclicRoots {
    pub generator: Poly,
    pub roots: BTreeSet<u64>,
    pub convention: String,
}
pub fn generator_from_roots(
    field: &Field,
    length: usize,
    exps: &BTreeSet<u64>,
    _r: Option<&Field>,
) -> Result<CyclicRoots, RootError> {
    let q = field.order();
    let n = length as u64;
    let mut m = 1;
    let mut t = q % n;
    while n > 1 && t != 1 {
        t = t * q % n;
        m += 1;
        if m > 64 {
            return Err(RootError::CommonFactor { n, q });
        }
    }
    let big = if m == 1 {
        field.clone()
    } else {
        if field.degree() != 1 {
            return Err(RootError::Other);
        }
        Field::conway(q, m).map_err(|_| RootError::Other)?
    };
    let mut roots = BTreeSet::new();
    for &e in exps {
        let mut x = e % n;
        while roots.insert(x) {
            x = x * q % n;
        }
    }
    let beta = big.power_of_generator((big.order() - 1) / n);
    let mut g: Vec<Element> = vec![1];
    for &e in &roots {
        let r = big.neg(big.pow(beta, e));
        let mut h = vec![0; g.len() + 1];
        for (i, &c) in g.iter().enumerate() {
            h[i + 1] = big.add(h[i + 1], c);
            h[i] = big.add(h[i], big.mul(c, r));
        }
        g = h;
    }
    Ok(CyclicRoots {
        generator: Poly(g),
        roots,
        convention: "shim".into(),
    })
}
