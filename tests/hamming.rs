//! Hamming's codes over every field up to GF(9), their relatives, and the syndromes that name
//! positions, by a plainly written second path.

mod common;
mod plain;

use common::{examine, with_spec};
use plain::{PlainField, Word, Words, dual, span, weights};

fn fields() -> Vec<PlainField> {
    vec![
        PlainField::new(2, &[0, 1]),
        PlainField::new(3, &[1, 1]),
        PlainField::new(2, &[1, 1, 1]),
        PlainField::new(5, &[3, 1]),
        PlainField::new(7, &[4, 1]),
        PlainField::new(2, &[1, 1, 0, 1]),
        PlainField::new(3, &[2, 2, 1]),
    ]
}

/// The columns of Hamming's check matrix: first non-zero entry 1, in numeric order.
fn columns(field: &PlainField, r: usize) -> Vec<Word> {
    let mut all = plain::space(field, r);
    all.retain(|column| column.iter().find(|&&entry| entry != 0) == Some(&1));
    all
}

fn transposed(columns: &[Word]) -> Vec<Word> {
    (0..columns[0].len())
        .map(|row| columns.iter().map(|column| column[row]).collect())
        .collect()
}

/// Compares a body with words; the words may be the code's or, marked so, its dual's.
fn compare(field: &PlainField, body: &str, words: &Words) {
    let (start, steps) = body
        .split_once(" then ")
        .map_or((body, String::new()), |(start, steps)| {
            (start, format!(" then {steps}"))
        });
    let known = examine(
        &format!("code subject = {start} over {}{steps}\n", field.text),
        "subject",
    );
    let counts = weights(words);
    assert_eq!(known.n, words.length, "n of {body} over {}", field.text);
    assert_eq!(
        u64::from(field.order).pow(known.k as u32),
        words.list.len() as u64,
        "k of {body}"
    );
    let least = counts
        .keys()
        .copied()
        .find(|&weight| weight > 0)
        .unwrap_or(0);
    assert_eq!(known.d, (least, least), "d of {body} over {}", field.text);
    let listed = counts
        .into_iter()
        .map(|(weight, count)| (weight, count.to_string()))
        .collect();
    assert_eq!(
        known.weights,
        Some(listed),
        "weights of {body} over {}",
        field.text
    );
}

#[test]
fn hamming_codes_and_their_relatives_agree_with_brute_force() {
    for field in fields() {
        for r in 1..=4 {
            let columns = columns(&field, r);
            let n = columns.len();
            let rows = transposed(&columns);
            let simplex = span(&field, n, &rows);
            if n > 1 {
                compare(&field, &format!("hamming({r}) then dual"), &simplex);
                compare(&field, &format!("simplex({r})"), &simplex);
            }
            if !field.lists(n, 300_000) {
                continue;
            }
            let hamming = dual(&field, n, &rows);
            compare(&field, &format!("hamming({r})"), &hamming);
            let extended = Words {
                length: n + 1,
                list: hamming
                    .list
                    .iter()
                    .map(|word| [word.clone(), vec![field.neg(field.sum(word))]].concat())
                    .collect(),
            };
            compare(&field, &format!("hamming({r}) then extend"), &extended);
            if n > 1 {
                let punctured = Words {
                    length: n - 1,
                    list: hamming
                        .list
                        .iter()
                        .map(|word| word[..n - 1].to_vec())
                        .collect(),
                };
                compare(
                    &field,
                    &format!("hamming({r}) then puncture(last: 1)"),
                    &punctured,
                );
            }
        }
    }
}

#[test]
fn evaluated_linear_forms_agree_with_brute_force() {
    for field in fields() {
        for r in 1..=3 {
            let points = plain::space(&field, r);
            if points.len() > 600 {
                continue;
            }
            let forms: Vec<Word> = (0..r)
                .map(|at| points.iter().map(|point| point[at]).collect())
                .collect();
            let n = points.len();
            compare(&field, &format!("hadamard({r})"), &span(&field, n, &forms));
            let affine = [forms, vec![vec![1; n]]].concat();
            compare(
                &field,
                &format!("reed_muller(order: 1, variables: {r})"),
                &span(&field, n, &affine),
            );
        }
    }
}

#[test]
fn a_flipped_bit_is_named_by_its_syndrome() {
    for r in 3..=12usize {
        let spec = format!("field bit = GF(2)\ncode word over bit = hamming({r})\n");
        with_spec(&spec, |view| {
            let code = &view.codes[0].compiled.code;
            let check = code
                .check_matrix_as_built()
                .expect("built from a check matrix");
            assert_eq!(check.rows(), r);
            for position in 0..code.length() {
                let mut received = vec![0; code.length()];
                received[position] = 1;
                let syndrome = check.times(&received);
                let number = syndrome
                    .iter()
                    .fold(0, |number, &digit| 2 * number + digit as usize);
                assert_eq!(number, position + 1, "r = {r}");
            }
        });
    }
}
