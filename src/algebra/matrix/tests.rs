use rand::{Rng, SeedableRng};
use rand_chacha::ChaCha8Rng;

use super::*;

/// The plain elimination that every other is judged by.
fn textbook(matrix: &Matrix, order: &[usize]) -> (Vec<Vec<Element>>, Vec<usize>) {
    let field = &matrix.field;
    let mut rows: Vec<Vec<Element>> = (0..matrix.rows)
        .map(|row| {
            (0..matrix.columns)
                .map(|column| matrix.get(row, column))
                .collect()
        })
        .collect();
    let mut pivots = Vec::new();
    for &column in order {
        let rank = pivots.len();
        let Some(found) = (rank..matrix.rows).find(|&row| rows[row][column] != 0) else {
            continue;
        };
        rows.swap(rank, found);
        let scale = field.inv(rows[rank][column]).unwrap();
        let pivot: Vec<Element> = rows[rank]
            .iter()
            .map(|&entry| field.mul(entry, scale))
            .collect();
        rows[rank] = pivot.clone();
        for (at, row) in rows.iter_mut().enumerate() {
            let factor = row[column];
            if at != rank {
                for (entry, &take) in row.iter_mut().zip(&pivot) {
                    *entry = field.sub(*entry, field.mul(factor, take));
                }
            }
        }
        pivots.push(column);
    }
    rows.truncate(pivots.len());
    (rows, pivots)
}

fn fields() -> Vec<Field> {
    let orders = [
        (2, 1),
        (3, 1),
        (2, 2),
        (5, 1),
        (7, 1),
        (2, 3),
        (3, 2),
        (2, 4),
        (3, 3),
        (251, 1),
        (2, 8),
        (257, 1),
        (3, 6),
        (2, 16),
        (2_147_483_647, 1),
    ];
    orders
        .iter()
        .map(|&(p, m)| Field::conway(p, m).unwrap())
        .collect()
}

/// A matrix of the given density whose rank is often deficient: some rows and columns are copies.
fn random(
    rng: &mut ChaCha8Rng,
    field: &Field,
    rows: usize,
    columns: usize,
    density: f64,
) -> Matrix {
    let mut matrix = Matrix::from_fn(field, rows, columns, |_, _| {
        if rng.random_bool(density) {
            rng.random_range(0..field.order()) as u32
        } else {
            0
        }
    });
    if rows > 2 && columns > 2 {
        for _ in 0..rng.random_range(0..4) {
            let (from, to) = (rng.random_range(0..rows), rng.random_range(0..rows));
            let factor = rng.random_range(0..field.order()) as u32;
            for column in 0..columns {
                matrix.set(to, column, field.mul(factor, matrix.get(from, column)));
            }
            let column = rng.random_range(0..columns);
            for row in 0..rows {
                matrix.set(row, column, matrix.get(row, 0));
            }
        }
    }
    matrix
}

fn sparse_copy(matrix: &Matrix) -> Matrix {
    let entries = (0..matrix.rows)
        .map(|row| matrix.nonzero(row).collect())
        .collect();
    Matrix::from_sparse(&matrix.field, matrix.rows, matrix.columns, entries)
}

fn shuffled(rng: &mut ChaCha8Rng, count: usize) -> Vec<usize> {
    let mut order: Vec<usize> = (0..count).collect();
    for at in (1..count).rev() {
        order.swap(at, rng.random_range(0..=at));
    }
    order
}

fn agrees_with_textbook(matrix: &Matrix, order: &[usize]) {
    let (rows, pivots) = textbook(matrix, order);
    let expected = Matrix::from_rows(&matrix.field, matrix.columns, &rows);
    for kind in [matrix.clone(), sparse_copy(matrix)] {
        let echelon = kind.reduced_in(order);
        assert_eq!(
            echelon.pivots, pivots,
            "{} {}x{}",
            matrix.field, matrix.rows, matrix.columns
        );
        assert!(
            echelon.matrix == expected,
            "{} {}x{}",
            matrix.field,
            matrix.rows,
            matrix.columns
        );
        assert_eq!(kind.rank(), pivots.len());
        let basis = kind.null_space_in(order);
        assert_eq!(basis.rows(), matrix.columns - pivots.len());
        assert!(kind.multiply(&basis.transpose()).is_zero());
        let free: Vec<usize> = (0..matrix.columns)
            .filter(|c| !pivots.contains(c))
            .collect();
        assert!(basis.select_columns(&free) == Matrix::identity(&matrix.field, free.len()));
    }
}

#[test]
fn elimination_agrees_with_the_textbook_over_every_kind_of_field() {
    let mut rng = ChaCha8Rng::seed_from_u64(1);
    for field in fields() {
        let shapes = [
            (0, 0),
            (0, 5),
            (5, 0),
            (1, 1),
            (7, 12),
            (12, 7),
            (40, 60),
            (60, 110),
            (110, 60),
        ];
        for (rows, columns) in shapes {
            for density in [0.05, 0.5, 1.0] {
                let matrix = random(&mut rng, &field, rows, columns, density);
                agrees_with_textbook(&matrix, &(0..columns).collect::<Vec<_>>());
                agrees_with_textbook(&matrix, &shuffled(&mut rng, columns));
            }
        }
    }
}

#[test]
fn large_binary_elimination_agrees_with_the_textbook() {
    let mut rng = ChaCha8Rng::seed_from_u64(2);
    let bits = Field::prime(2).unwrap();
    for (rows, columns) in [
        (96, 64),
        (130, 700),
        (300, 290),
        (700, 130),
        (257, 600),
        (600, 530),
    ] {
        for density in [0.004, 0.03, 0.9] {
            let matrix = random(&mut rng, &bits, rows, columns, density);
            agrees_with_textbook(&matrix, &(0..columns).collect::<Vec<_>>());
            agrees_with_textbook(&matrix, &shuffled(&mut rng, columns));
        }
    }
}

#[test]
fn pivots_stay_within_a_partial_order() {
    let mut rng = ChaCha8Rng::seed_from_u64(3);
    for field in fields() {
        for rows in [10, 120] {
            let matrix = random(&mut rng, &field, rows, 30, 0.5);
            let order = &shuffled(&mut rng, 30)[..8];
            let (rows, pivots) = textbook(&matrix, order);
            let echelon = matrix.reduced_in(order);
            assert_eq!(echelon.pivots, pivots);
            assert!(echelon.matrix == Matrix::from_rows(&field, 30, &rows));
        }
    }
}

#[test]
fn triangular_sparse_matrices_need_no_elimination() {
    let mut rng = ChaCha8Rng::seed_from_u64(4);
    let bits = Field::prime(2).unwrap();
    for size in [1, 5, 60, 300] {
        let (rows, columns) = (shuffled(&mut rng, size), shuffled(&mut rng, size));
        let mut entries = vec![Vec::new(); size];
        for at in 0..size {
            entries[rows[at]].push((columns[at], 1));
            for _ in 0..at.min(3) {
                let earlier = rng.random_range(0..at);
                entries[rows[at]].push((columns[earlier], 1));
            }
            entries[rows[at]].push((size + rng.random_range(0..size), 1));
        }
        let matrix = Matrix::from_sparse(&bits, size, 2 * size, entries);
        assert_eq!(matrix.rank(), size);
        agrees_with_textbook(&matrix, &(0..2 * size).collect::<Vec<_>>());
        let order: Vec<usize> = shuffled(&mut rng, size)
            .into_iter()
            .chain(size..2 * size)
            .collect();
        agrees_with_textbook(&matrix, &order);
    }
}

#[test]
fn solutions_inverses_and_determinants_hold() {
    let mut rng = ChaCha8Rng::seed_from_u64(5);
    for field in fields() {
        for size in [0, 1, 2, 5, 20] {
            for density in [0.4, 1.0] {
                let matrix = random(&mut rng, &field, size, size, density);
                let singular = matrix.rank() < size;
                assert_eq!(matrix.determinant() == 0, singular);
                match matrix.inverse() {
                    Some(inverse) => {
                        assert!(!singular);
                        assert_eq!(matrix.multiply(&inverse), Matrix::identity(&field, size));
                        let product = field.mul(matrix.determinant(), inverse.determinant());
                        assert_eq!(product, 1);
                    }
                    None => assert!(singular),
                }
                let vector: Vec<Element> = (0..size)
                    .map(|_| rng.random_range(0..field.order()) as u32)
                    .collect();
                let target = matrix.times(&vector);
                let solution = matrix.solve(&target).expect("there is one");
                assert_eq!(matrix.times(&solution), target);
                let widened = matrix.above(&Matrix::zero(&field, 1, size));
                let mut off = target.clone();
                off.push(1);
                assert_eq!(widened.solve(&off), None);
            }
        }
    }
    let sevens = Field::prime(7).unwrap();
    let matrix = Matrix::from_rows(&sevens, 2, &[vec![0, 2], vec![3, 5]]);
    assert_eq!(matrix.determinant(), 1); // 0·5 − 2·3 = −6
}

#[test]
fn every_storage_moves_entries_alike() {
    let mut rng = ChaCha8Rng::seed_from_u64(6);
    for field in fields() {
        for (rows, columns) in [(3, 5), (70, 130), (130, 65), (0, 4), (4, 0)] {
            let dense = random(&mut rng, &field, rows, columns, 0.3);
            let sparse = sparse_copy(&dense);
            let other = random(&mut rng, &field, rows, 9, 0.5);
            let below = random(&mut rng, &field, 3, columns, 0.5);
            let plain = |rows, columns, entry: &dyn Fn(usize, usize) -> Element| {
                Matrix::from_fn(&field, rows, columns, entry)
            };
            for kind in [&dense, &sparse] {
                for (left, right) in [(kind, &dense), (&dense, kind), (&kind.to_dense(), &dense)] {
                    assert_eq!(left, right);
                }
                assert_eq!(
                    kind.transpose(),
                    plain(columns, rows, &|r, c| dense.get(c, r))
                );
                assert_eq!(kind.transpose().is_sparse(), kind.is_sparse());
                for right in [other.clone(), sparse_copy(&other)] {
                    let expected = plain(rows, columns + 9, &|r, c| {
                        if c < columns {
                            dense.get(r, c)
                        } else {
                            other.get(r, c - columns)
                        }
                    });
                    assert_eq!(kind.beside(&right), expected);
                    let product = kind.transpose().multiply(&right);
                    let expected = plain(columns, 9, &|r, c| {
                        (0..rows).fold(0, |sum, at| {
                            field.add(sum, field.mul(dense.get(at, r), other.get(at, c)))
                        })
                    });
                    assert_eq!(product, expected);
                }
                for lower in [below.clone(), sparse_copy(&below)] {
                    let expected = plain(rows + 3, columns, &|r, c| {
                        if r < rows {
                            dense.get(r, c)
                        } else {
                            below.get(r - rows, c)
                        }
                    });
                    assert_eq!(kind.above(&lower), expected);
                }
                for row in 0..rows {
                    assert_eq!(kind.row(row), dense.row(row));
                    assert_eq!(
                        kind.row_weight(row),
                        dense.row(row).iter().filter(|&&e| e != 0).count()
                    );
                }
                for column in 0..columns {
                    let entries = kind.column(column);
                    let support: Vec<usize> = (0..rows).filter(|&row| entries[row] != 0).collect();
                    assert_eq!(kind.column_weight(column), support.len());
                    assert_eq!(kind.column_support(column), support);
                }
                if columns > 0 && rows > 0 {
                    let positions: Vec<usize> =
                        (0..20).map(|_| rng.random_range(0..columns)).collect();
                    let expected = plain(rows, 20, &|r, c| dense.get(r, positions[c]));
                    assert_eq!(kind.select_columns(&positions), expected);
                    let picked: Vec<usize> = (0..20).map(|_| rng.random_range(0..rows)).collect();
                    let expected = plain(20, columns, &|r, c| dense.get(picked[r], c));
                    assert_eq!(kind.select_rows(&picked), expected);
                    let small = below.select_columns(&[0, columns - 1]);
                    let expected = plain(rows * 3, columns * 2, &|r, c| {
                        field.mul(dense.get(r / 3, c / 2), small.get(r % 3, c % 2))
                    });
                    assert_eq!(kind.kronecker(&small), expected);
                    let mut changed = (*kind).clone();
                    changed.set(0, 0, u32::from(dense.get(0, 0) == 0));
                    assert!(changed != dense);
                    assert_eq!(
                        changed.column_weight(0),
                        changed.column(0).iter().filter(|&&e| e != 0).count()
                    );
                }
            }
        }
    }
}

#[test]
fn sparse_entries_at_one_place_are_summed() {
    let bits = Field::prime(2).unwrap();
    let matrix = Matrix::from_sparse(&bits, 1, 3, vec![vec![(2, 1), (0, 1), (2, 1)]]);
    assert_eq!(matrix.row(0), [1, 0, 0]);
    assert_eq!(matrix.row_weight(0), 1);
}
