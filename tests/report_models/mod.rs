//! Models filled in by hand, as the derivation would fill them.
#![allow(dead_code)]

use std::collections::BTreeMap;

use cosetta::algebra::{Field, Matrix};
use cosetta::report::model::*;
use num_bigint::{BigInt, BigUint};
use serde_json::json;

pub fn ground(bound: Side, value: u64, rule: &str, step: Option<usize>, says: &str) -> Ground {
    Ground {
        bound,
        value,
        rule: rule.into(),
        step,
        says: says.into(),
    }
}

pub fn property(verdict: Verdict, says: Option<&str>) -> PropertyReport {
    PropertyReport {
        verdict,
        says: says.map(str::to_string),
    }
}

pub fn step(text: &str, n: usize, k: usize, d: Interval) -> StepReport {
    StepReport {
        text: text.into(),
        n,
        k,
        d,
        says: None,
    }
}

pub fn asked(kind: Kind, text: &str, verdict: Verdict, says: &str) -> RequirementReport {
    RequirementReport {
        text: text.into(),
        kind,
        verdict,
        says: says.into(),
        witness: None,
    }
}

/// The check matrix of the [72, 64, 4] word: columns 56 to 127 in base two, and a row of ones.
fn sram_checks() -> Matrix {
    let bit = Field::prime(2).unwrap();
    Matrix::from_fn(&bit, 8, 72, |row, column| match row {
        7 => 1,
        _ => (column as u32 + 56) >> (6 - row) & 1,
    })
}

/// The weights of the row space of a binary matrix of few rows, by listing it.
fn row_space_weights(matrix: &Matrix) -> Weights {
    let mut weights = BTreeMap::new();
    for choice in 0u32..1 << matrix.rows() {
        let weight = (0..matrix.columns())
            .filter(|&column| {
                let ones = (0..matrix.rows()).filter(|&row| choice >> row & 1 == 1);
                ones.map(|row| matrix.get(row, column)).sum::<u32>() % 2 == 1
            })
            .count();
        *weights.entry(weight).or_insert_with(BigUint::default) += 1u32;
    }
    Weights(weights)
}

/// The dual's weights (MacWilliams, 1963), binary: the coefficients of
/// Σ A_w (1−z)^w (1+z)^(n−w) / |C|.
fn dual_weights(weights: &Weights, n: usize) -> Weights {
    let times = |polynomial: Vec<BigInt>, sign: i32| -> Vec<BigInt> {
        (0..=polynomial.len())
            .map(|at| {
                let same = polynomial.get(at).cloned().unwrap_or_default();
                let shifted = at.checked_sub(1).map(|at| polynomial[at].clone() * sign);
                same + shifted.unwrap_or_default()
            })
            .collect()
    };
    let mut sum = vec![BigInt::from(0); n + 1];
    let mut words = BigInt::from(0);
    for (&weight, count) in &weights.0 {
        let count = BigInt::from(count.clone());
        let polynomial = (0..n).fold(vec![count.clone()], |so_far, at| {
            times(so_far, if at < weight { -1 } else { 1 })
        });
        for (total, coefficient) in sum.iter_mut().zip(polynomial) {
            *total += coefficient;
        }
        words += count;
    }
    let counts = sum
        .into_iter()
        .map(|total| (total / &words).to_biguint().unwrap());
    Weights(
        counts
            .enumerate()
            .filter(|(_, count)| *count != BigUint::default())
            .collect(),
    )
}

pub fn sram_word() -> CodeReport {
    let bit = Field::prime(2).unwrap();
    let mut code = CodeReport::new("sram_word", &bit, 72, 64);
    code.documentation =
        Some("SRAM word of the tide gauge: correct any one bit, detect any two.".into());
    code.d = DistanceReport {
        lower: Some(4),
        upper: Some(4),
        grounds: vec![
            ground(
                Side::Lower,
                4,
                "extension",
                Some(1),
                "an overall check makes every weight even, and d was 3",
            ),
            ground(
                Side::Lower,
                4,
                "shortening",
                Some(2),
                "a subcode with zeros left out keeps d",
            ),
            ground(
                Side::Upper,
                4,
                "witness",
                None,
                "four columns of the check matrix sum to zero",
            ),
        ],
        witness: Some(Witness {
            positions: vec![0, 1, 2, 3],
            values: vec![1; 4],
        }),
    };
    let dual = row_space_weights(&sram_checks());
    code.weights = Some(dual_weights(&dual, 72));
    code.dual_weights = Some(dual);
    code.covering_radius = Some(Interval::between(2, 8));
    for (name, most) in [
        ("singleton", 9),
        ("hamming", 4),
        ("plotkin", 5),
        ("griesmer", 4),
        ("linear_programming", 4),
    ] {
        code.bounds.push(name, most);
    }
    code.gilbert_varshamov = Some(2);
    code.properties.push(
        "mds",
        property(Verdict::Fails, Some("d = 4 is below n − k + 1 = 9")),
    );
    code.properties
        .push("self_dual", property(Verdict::Fails, None));
    code.properties.push(
        "even",
        property(Verdict::Holds, Some("the all-one word lies in the dual")),
    );
    code.properties
        .push("projective", property(Verdict::Holds, None));
    code.properties
        .push("systematic", property(Verdict::Holds, None));
    code.properties.push(
        "perfect",
        property(Verdict::Undecided, Some("the covering radius lies in 2..8")),
    );
    code.measures.push(
        "row_weights",
        Measure {
            value: json!("36..72"),
            says: Some("of the check matrix as built".into()),
        },
    );
    code.measures.push(
        "girth",
        Measure {
            value: json!(4),
            says: None,
        },
    );
    code.steps = vec![
        step("hamming(7)", 127, 120, Interval::exact(3)),
        step("extend", 128, 120, Interval::exact(4)),
        step("shorten(first: n - 72)", 72, 64, Interval::exact(4)),
        step("arrange(data: first)", 72, 64, Interval::exact(4)),
    ];
    code.claims = vec![asked(
        Kind::Claim,
        "[72, 64, 4]",
        Verdict::Holds,
        "n, k and d are as derived",
    )];
    let mut pairs = asked(
        Kind::Require,
        "corrects adjacent 2",
        Verdict::Fails,
        "two different adjacent pairs have the same syndrome",
    );
    pairs.witness = Some(Witness {
        positions: vec![0, 1, 2, 3],
        values: vec![1; 4],
    });
    code.requirements = vec![
        asked(
            Kind::Require,
            "corrects 1 while detecting 2",
            Verdict::Holds,
            "1 + 2 + 1 = 4 ≤ d",
        ),
        pairs,
        asked(
            Kind::Prefer,
            "row_weight <= 36",
            Verdict::Undecided,
            "the form to be delivered is not stated",
        ),
    ];
    code.figures = vec![Figure {
        name: "undetected".into(),
        channel: "bsc(0.004)".into(),
        value: "6.1e-7".into(),
        nature: Nature::Exact,
        says: "from the weights".into(),
    }];
    code.assumptions = vec![
        "positions count from 0, in the order of the columns of the check matrix".into(),
        "the overall check stands last".into(),
    ];
    code.notes = vec!["The memory controller inverts the check bits; see mask.".into()];
    let data = (0..64).rev().map(|bit| format!("data[{bit}]"));
    let check = (0..8).rev().map(|bit| format!("check[{bit}]"));
    code.positions = Some(data.chain(check).collect());
    code
}

pub fn shards() -> CodeReport {
    let byte = Field::with_modulus(2, &[1, 0, 1, 1, 1, 0, 0, 0, 1], true).unwrap();
    let mut code = CodeReport::new("shards", &byte, 14, 10);
    code.documentation = Some("Shards on shore: any four may be lost.".into());
    code.d = DistanceReport {
        lower: Some(5),
        upper: Some(5),
        grounds: vec![
            ground(
                Side::Lower,
                5,
                "cauchy",
                Some(0),
                "every minor of a Cauchy matrix is non-zero",
            ),
            ground(Side::Upper, 5, "singleton", None, "n − k + 1"),
        ],
        witness: Some(Witness {
            positions: vec![0, 10, 11, 12, 13],
            values: vec![1, 71, 167, 2, 255],
        }),
    };
    // Weights of an MDS code (MacWilliams and Sloane, 1977, ch. 11, Theorem 6).
    let mut weights = BTreeMap::from([(0usize, BigUint::from(1u32))]);
    let choose = |n: u32, k: u32| -> BigInt {
        (0..k).fold(BigInt::from(1), |sum, at| sum * (n - at) / (at + 1))
    };
    for weight in 5..=14u32 {
        let inner: BigInt = (0..=weight - 5)
            .map(|at| {
                let term: BigInt =
                    choose(weight, at) * (BigInt::from(256).pow(weight - 4 - at) - 1);
                if at % 2 == 0 { term } else { -term }
            })
            .sum();
        weights.insert(
            weight as usize,
            (choose(14, weight) * inner).to_biguint().unwrap(),
        );
    }
    code.weights = Some(Weights(weights));
    for (name, most) in [("singleton", 5), ("griesmer", 5)] {
        code.bounds.push(name, most);
    }
    code.properties
        .push("mds", property(Verdict::Holds, Some("d = n − k + 1")));
    code.steps = vec![step(
        "span(blocks | identity(10) cauchy(rows: powers(0..9), columns: powers(10..13)) |)",
        14,
        10,
        Interval::exact(5),
    )];
    code.claims = vec![asked(Kind::Claim, "[14, 10, 5]", Verdict::Holds, "")];
    code.requirements = vec![
        asked(Kind::Require, "mds", Verdict::Holds, ""),
        asked(
            Kind::Require,
            "recovers 4 losses",
            Verdict::Holds,
            "4 + 1 = 5 ≤ d",
        ),
    ];
    code
}

/// A long code of which d is not settled.
pub fn link() -> CodeReport {
    let bit = Field::prime(2).unwrap();
    let mut code = CodeReport::new("link", &bit, 1296, 649);
    code.arguments.insert("size".into(), json!(54));
    code.arguments.insert("shift".into(), json!("a^5"));
    code.d = DistanceReport {
        lower: Some(6),
        upper: Some(23),
        grounds: vec![
            ground(
                Side::Lower,
                6,
                "tree_bound",
                None,
                "girth 6 and column weight 3",
            ),
            ground(Side::Upper, 23, "witness", None, "found by search"),
        ],
        witness: Some(Witness {
            positions: (0..23).map(|at| 31 * at).collect(),
            values: vec![1; 23],
        }),
    };
    code.bounds.push("singleton", 648);
    code.bounds.push("griesmer", 310);
    code.steps = vec![step(
        "check(circulants of size 54)",
        1296,
        649,
        Interval::between(6, 23),
    )];
    code.steps[0].says = Some("one of 648 check rows is a combination of the others".into());
    code.claims = vec![asked(
        Kind::Claim,
        "[1296, _, >= 12]",
        Verdict::Undecided,
        "6 ≤ d ≤ 23 within the budget of 60s",
    )];
    code
}

/// Nothing but the zero word.
pub fn silent() -> CodeReport {
    let field = Field::prime(3).unwrap();
    let mut code = CodeReport::new("silent", &field, 7, 0);
    code.weights = Some(Weights(BTreeMap::from([(0, BigUint::from(1u32))])));
    code.steps = vec![step("check(identity(7))", 7, 0, Interval::default())];
    code
}
