//! Hamming codes and their nearest relatives, judged by all their words.

mod brute_force;
mod common;

use brute_force::{Field, Plain, Word, hamming_checks};
use std::sync::Arc;

/// How a field is declared, with the modulus that the second path uses.
fn declared(q: u32) -> String {
    let field = match q {
        4 => "GF(4) where a^2 = a + 1".to_string(),
        8 => "GF(8) where a^3 = a + 1".to_string(),
        9 => "GF(9) where a^2 = a + 1".to_string(),
        prime => format!("GF({prime})"),
    };
    format!("field f = {field}\n")
}

fn agree(q: u32, body: &str, plain: &Plain) {
    let text = format!("{}code subject over f = {body}\n", declared(q));
    let known = common::examine(&text, "subject");
    assert_eq!((known.n, known.k), (plain.n, plain.k()), "{text}");
    let d = plain.d().unwrap_or(0);
    assert_eq!(known.d, (d, d), "{text}");
    assert_eq!(known.weights, Some(plain.weights()), "{text}");
}

fn relatives(q: u32, r: usize) {
    let field = Field::of_order(q);
    let checks = hamming_checks(&field, r);
    let n = checks[0].len();
    let hamming = Plain::orthogonal(&field, n, &checks);
    let simplex = Plain::span(&field, n, &checks);
    assert_eq!(hamming.dual(), simplex);
    agree(q, &format!("hamming({r})"), &hamming);
    agree(q, &format!("hamming({r}) then dual"), &simplex);
    agree(q, &format!("simplex({r})"), &simplex);
    agree(q, &format!("hamming({r}) then extend"), &hamming.extend());
    agree(q, &format!("simplex({r}) then extend"), &simplex.extend());
    if n > 1 {
        agree(
            q,
            &format!("hamming({r}) then puncture(last: 1)"),
            &hamming.puncture(&[n - 1]),
        );
        agree(
            q,
            &format!("hamming({r}) then shorten(first: 1)"),
            &hamming.shorten(&[0]),
        );
    }
    agree(
        q,
        &format!("hamming({r}) then extend then dual"),
        &hamming.extend().dual(),
    );
    let forms = linear_forms(&field, r);
    agree(
        q,
        &format!(
            "evaluate(monomials in {r} variables where degree = 1, at: points in {r} variables)"
        ),
        &forms,
    );
}

/// The values of all linear forms on the whole space.
fn linear_forms(field: &Arc<Field>, r: usize) -> Plain {
    let points = field.vectors(r);
    let words = points
        .iter()
        .map(|form| {
            points
                .iter()
                .map(|point| field.dot(form, point))
                .collect::<Word>()
        })
        .collect();
    Plain::of_words(field, points.len(), words)
}

#[test]
fn hamming_codes_over_every_small_field_agree_with_all_their_words() {
    for q in [2, 3, 4, 5, 7] {
        relatives(q, 2);
    }
    relatives(2, 3);
    relatives(2, 4);
    relatives(3, 1);
    relatives(2, 1);
}

#[test]
fn long_hamming_codes_agree_by_their_duals_words() {
    // Too many words of their own, so the small duals judge.
    for (q, r) in [(8, 2), (9, 2), (3, 3), (4, 3), (5, 3), (2, 8)] {
        let field = Field::of_order(q);
        let checks = hamming_checks(&field, r);
        let simplex = Plain::span(&field, checks[0].len(), &checks);
        agree(q, &format!("hamming({r}) then dual"), &simplex);
        agree(
            q,
            &format!("simplex({r}) then puncture(at: {{1, 3}})"),
            &simplex.puncture(&[1, 3]),
        );
        agree(
            q,
            &format!("simplex({r}) then shorten(at: {{0}})"),
            &simplex.shorten(&[0]),
        );
        agree(q, &format!("simplex({r}) then extend"), &simplex.extend());
        if q.pow(r as u32) <= 729 {
            agree(
                q,
                &format!(
                    "evaluate(monomials in {r} variables where degree = 1, at: points in {r} variables)"
                ),
                &linear_forms(&field, r),
            );
        }
    }
}

#[test]
fn a_syndrome_of_a_single_error_reads_its_position_plus_one() {
    for r in 3..=12usize {
        let text = format!("field bit = GF(2)\ncode subject over bit = hamming({r})\n");
        common::with_spec(&text, |view| {
            let code = &view.codes[0].compiled.code;
            let check = code.check_matrix_as_built().expect("built from checks");
            let n = code.length();
            assert_eq!((n, check.rows()), ((1 << r) - 1, r));
            let generator = code.generator_matrix();
            // A word that is not zero: the sum of two rows, or the only one.
            let mut word = generator.row(0);
            if generator.rows() > 1 {
                let other = generator.row(generator.rows() - 1);
                word = word.iter().zip(other).map(|(one, two)| one ^ two).collect();
            }
            for at in 0..n {
                word[at] ^= 1;
                let syndrome = check.times(&word);
                word[at] ^= 1;
                let number = syndrome
                    .iter()
                    .fold(0, |number, &bit| 2 * number + bit as usize);
                assert_eq!(number, at + 1, "r = {r}");
            }
        });
    }
}
