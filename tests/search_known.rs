//! Codes whose distance and weights are in the books, and inputs at the edge of what is possible.

use cosetta::algebra::{Element, Field, Matrix};
use cosetta::derive::search::*;
use num_bigint::BigUint;

fn binary() -> Field {
    Field::prime(2).unwrap()
}

/// GF(2^m) by a primitive polynomial (Lidl and Niederreiter, Finite Fields, 1997, table D).
fn extension(m: u32) -> Field {
    let exponents: &[u32] = match m {
        3 => &[1],
        4 => &[1],
        7 => &[1],
        8 => &[4, 3, 2],
        10 => &[3],
        12 => &[6, 4, 1],
        16 => &[5, 3, 2],
        _ => unreachable!("no polynomial for this degree"),
    };
    let mut modulus = vec![0; m as usize + 1];
    modulus[0] = 1;
    modulus[m as usize] = 1;
    for &exponent in exponents {
        modulus[exponent as usize] = 1;
    }
    Field::with_modulus(2, &modulus, true).unwrap()
}

/// The cyclic code of length n with this generator polynomial, coefficients lowest first.
fn cyclic(field: &Field, n: usize, polynomial: &[Element]) -> Matrix {
    let k = n + 1 - polynomial.len();
    Matrix::from_fn(field, k, n, |row, column| {
        column
            .checked_sub(row)
            .and_then(|at| polynomial.get(at).copied())
            .unwrap_or(0)
    })
}

fn product(field: &Field, left: &[Element], right: &[Element]) -> Vec<Element> {
    let mut product = vec![0; left.len() + right.len() - 1];
    for (i, &a) in left.iter().enumerate() {
        for (j, &b) in right.iter().enumerate() {
            product[i + j] = field.add(product[i + j], field.mul(a, b));
        }
    }
    product
}

/// The polynomial with these powers of a primitive n-th root of one as its roots.
fn with_roots(field: &Field, n: usize, exponents: &[usize]) -> Vec<Element> {
    let step = (field.order() - 1) / n as u64;
    exponents.iter().fold(vec![1], |all, &exponent| {
        let root = field.power_of_generator(step * exponent as u64);
        product(field, &all, &[field.neg(root), 1])
    })
}

/// The binary cyclic code of length 2^m − 1 whose generator has a, a², …, a^roots as roots.
fn bch(m: u32, roots: usize) -> Matrix {
    let n = (1usize << m) - 1;
    let mut exponents: Vec<usize> = (1..=roots)
        .flat_map(|root| (0..m).map(move |twice| (root << twice) % ((1 << m) - 1)))
        .collect();
    exponents.sort_unstable();
    exponents.dedup();
    cyclic(&binary(), n, &with_roots(&extension(m), n, &exponents))
}

fn extended(code: &Matrix) -> Matrix {
    let n = code.columns();
    Matrix::from_fn(code.field(), code.rows(), n + 1, |row, column| {
        if column < n {
            code.get(row, column)
        } else {
            code.row(row).iter().sum::<Element>() % 2
        }
    })
}

/// The binary cyclic code of length p spanned by the shifts of the squares modulo p.
fn squares(p: usize) -> Matrix {
    let squares: Vec<usize> = (1..p).map(|at| at * at % p).collect();
    Matrix::from_fn(&binary(), p, p, |row, column| {
        Element::from(squares.contains(&((column + p - row) % p)))
    })
    .reduced()
    .matrix
}

fn settled(generator: &Matrix) -> Settled {
    let n = generator.columns();
    let settled = settle(
        Some(generator),
        None,
        1,
        n,
        1,
        &Budget::seconds(20.0),
        &Quiet,
    );
    if let Some(word) = &settled.word {
        assert!(
            generator
                .null_space()
                .times(word)
                .iter()
                .all(|&entry| entry == 0)
        );
        assert_eq!(
            word.iter().filter(|&&entry| entry != 0).count(),
            settled.upper
        );
    }
    settled
}

fn counts(n: usize, pairs: &[(usize, u64)]) -> Counts {
    let mut counts = vec![BigUint::ZERO; n + 1];
    for &(weight, count) in pairs {
        counts[weight] = count.into();
    }
    counts
}

#[test]
fn golay() {
    // x^11 + x^9 + x^7 + x^6 + x^5 + x + 1 (MacWilliams and Sloane, 1977, ch. 2 §6).
    let golay = cyclic(&binary(), 23, &[1, 1, 0, 0, 0, 1, 1, 1, 0, 1, 0, 1]);
    let weights = weight_counts(&golay, &Budget::unlimited(), &Quiet).unwrap();
    let known = [
        (0, 1),
        (7, 253),
        (8, 506),
        (11, 1288),
        (12, 1288),
        (15, 506),
        (16, 253),
        (23, 1),
    ];
    assert_eq!(weights, counts(23, &known));
    assert_eq!(
        covering_radius(&golay.null_space(), &Budget::unlimited()),
        Some(3)
    );
    let found = settled(&extended(&golay));
    assert_eq!((found.lower, found.upper), (8, 8));
}

#[test]
fn the_quadratic_residue_code_of_length_48() {
    let code = extended(&squares(47));
    assert_eq!((code.rows(), code.columns()), (24, 48));
    let found = settled(&code);
    assert_eq!((found.lower, found.upper), (12, 12));
    // MacWilliams and Sloane, 1977, ch. 19 §2.
    let weights = weight_counts(&code, &Budget::unlimited(), &Quiet).unwrap();
    assert_eq!(
        (&weights[12], &weights[16], &weights[24]),
        (&17296u32.into(), &535_095u32.into(), &7_681_680u32.into())
    );
    assert_eq!(macwilliams(&weights, 2, 48, 24), Some(weights));
    let raised = raise_lower_bound(&code, 1, 48, 4, &Budget::unlimited(), &Quiet);
    assert_eq!((raised.lower, raised.upper.unwrap().weight), (12, 12));
}

#[test]
fn reed_solomon_over_gf_8_and_16() {
    for m in [3, 4] {
        let field = extension(m);
        let n = field.order() as usize - 1;
        for k in 1..n {
            let code = cyclic(
                &field,
                n,
                &with_roots(&field, n, &(1..=n - k).collect::<Vec<_>>()),
            );
            let found = settled(&code);
            assert_eq!(
                (found.lower, found.upper),
                (n - k + 1, n - k + 1),
                "[{n}, {k}] {found:?}"
            );
            if k <= 4 {
                assert_eq!(
                    weight_counts(&code, &Budget::unlimited(), &Quiet),
                    mds_weights(n, k, field.order())
                );
            }
        }
    }
}

#[test]
fn light_words_of_long_binary_codes() {
    for (m, roots, k, weight) in [(8, 12, 207, 13), (7, 20, 64, 21)] {
        let code = bch(m, roots);
        assert_eq!(code.rows(), k);
        let light = light_word(&code, weight, 1, &Budget::seconds(10.0)).unwrap();
        assert_eq!(light.weight, weight);
    }
}

#[test]
fn a_light_word_of_the_plane_of_order_16() {
    // Lines of the projective plane as the shifts of a difference set modulo 273: the exponents
    // whose powers have trace zero (Singer, 1938). A minimum weight of 18 is stated by Lin and
    // Costello, Error Control Coding, 2004, §17.4.
    let field = extension(12);
    let trace = |element| {
        field.add(
            element,
            field.add(field.pow(element, 16), field.pow(element, 256)),
        )
    };
    let line: Vec<usize> = (0..273)
        .filter(|&at| trace(field.power_of_generator(at as u64)) == 0)
        .collect();
    assert_eq!(line.len(), 17);
    let check = Matrix::from_fn(&binary(), 273, 273, |row, column| {
        Element::from(line.contains(&((column + row) % 273)))
    });
    let code = check.null_space();
    assert_eq!(code.rows(), 191);
    let light = light_word(&code, 18, 1, &Budget::seconds(10.0)).unwrap();
    assert_eq!(light.weight, 18);
    assert!(check.times(&light.word).iter().all(|&entry| entry == 0));
}

#[test]
fn distances_of_high_rate_codes_by_columns() {
    for (m, roots, d) in [(7, 2, 3), (7, 4, 5), (7, 6, 7), (8, 6, 7)] {
        let found = settled(&bch(m, roots));
        assert_eq!((found.lower, found.upper), (d, d), "{:?}", found.says);
    }
}

#[test]
fn long_codes_from_few_checks() {
    // All odd columns of height 16: no three depend on each other, four do.
    let check = Matrix::from_fn(&binary(), 16, 32768, |row, column| {
        if row == 15 {
            1
        } else {
            (column >> row) as Element & 1
        }
    });
    let found = settle(
        None,
        Some(&check),
        1,
        32768,
        1,
        &Budget::seconds(10.0),
        &Quiet,
    );
    assert_eq!((found.lower, found.upper), (4, 4));
    let says: Vec<&str> = found
        .says
        .iter()
        .map(|ground| ground.says.as_str())
        .collect();
    let expected = [
        "no three columns of the check matrix are dependent",
        "columns 0, 1, 2 and 3 of the check matrix sum to zero",
    ];
    assert_eq!(says, expected);
    // Distinct columns of any kind: three of them depend on each other.
    let check = Matrix::from_fn(&binary(), 15, 32767, |row, column| {
        ((column + 1) >> row) as Element & 1
    });
    let found = settle(
        None,
        Some(&check),
        1,
        32767,
        1,
        &Budget::seconds(10.0),
        &Quiet,
    );
    assert_eq!((found.lower, found.upper), (3, 3));
}

#[test]
fn distances_over_large_fields() {
    for (m, length) in [(8, 255), (10, 60), (16, 40)] {
        let field = extension(m);
        for redundancy in 1..4 {
            let check = Matrix::from_fn(&field, redundancy, length, |row, column| {
                field.power_of_generator((row * column) as u64)
            });
            let found = settle(
                None,
                Some(&check),
                1,
                length,
                1,
                &Budget::seconds(5.0),
                &Quiet,
            );
            assert_eq!(
                (found.lower, found.upper),
                (redundancy + 1, redundancy + 1),
                "{:?}",
                found.says
            );
            assert!(found.word.is_some());
        }
        let generator = Matrix::from_fn(&field, 2, length, |row, column| {
            field.power_of_generator((row * column) as u64)
        });
        assert_eq!(
            weight_counts(&generator, &Budget::unlimited(), &Quiet),
            mds_weights(length, 2, field.order())
        );
    }
}

#[test]
fn degenerate_matrices_have_an_answer() {
    for field in [
        binary(),
        Field::prime(3).unwrap(),
        extension(4),
        extension(10),
    ] {
        for (rows, columns) in [
            (0, 0),
            (0, 1),
            (1, 0),
            (0, 5),
            (3, 0),
            (1, 1),
            (3, 3),
            (4, 2),
        ] {
            for fill in [0, 1] {
                let matrix = Matrix::from_fn(&field, rows, columns, |_, _| fill);
                let budget = Budget::seconds(0.1);
                let _ = weight_counts(&matrix, &budget, &Quiet);
                let _ = minimum_by_words(&matrix, &budget);
                let _ = dependent_columns(&matrix, columns + 2, &budget);
                let _ = light_word(&matrix, 0, 1, &budget.limited_to(100_000));
                let _ = covering_radius(&matrix, &budget);
                let _ = raise_lower_bound(&matrix, 0, columns + 1, 0, &budget, &Quiet);
                for upper in [0, 1, columns + 3] {
                    let one = settle(Some(&matrix), None, 0, upper, 0, &budget, &Quiet);
                    let two = settle(None, Some(&matrix), 0, upper, 1, &budget, &Quiet);
                    assert!(one.lower <= one.upper && two.lower <= two.upper || upper == 0);
                }
            }
        }
    }
    assert_eq!(
        settle(None, None, 2, 5, 1, &Budget::seconds(1.0), &Quiet).lower,
        2
    );
}

#[test]
fn the_answer_does_not_depend_on_the_number_of_threads() {
    let code = bch(7, 28);
    let run = |threads: usize| {
        let pool = rayon::ThreadPoolBuilder::new()
            .num_threads(threads)
            .build()
            .unwrap();
        pool.install(|| settle(Some(&code), None, 1, 127, 1, &Budget::seconds(0.3), &Quiet))
    };
    assert_eq!(run(1), run(3));
}
