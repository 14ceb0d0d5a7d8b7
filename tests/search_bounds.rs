//! The classical bounds: known values, and no code that exists is excluded.

use cosetta::derive::search::bounds::*;
use cosetta::derive::search::linear_programming;

#[test]
fn values_that_can_be_counted_by_hand() {
    // Griesmer for [72, 64]: 6 + 3 + 2 + 61 · 1 = 72, while 7 + 4 + 2 + 61 = 74.
    assert_eq!(singleton(2, 72, 64), 9);
    assert_eq!(hamming(2, 72, 64), 4);
    assert_eq!(griesmer(2, 72, 64), 6);
    assert_eq!(johnson(2, 72, 64), Some(4));
    assert_eq!(linear_programming(2, 72, 64), Some(4));
    // The perfect codes (MacWilliams and Sloane, 1977, ch. 6 §10).
    assert_eq!(hamming(2, 23, 12), 7);
    assert_eq!(hamming(3, 11, 6), 5);
    assert_eq!(hamming(2, 7, 4), 3);
    assert_eq!(hamming(2, 127, 120), 3);
    // The simplex codes meet Plotkin's and Griesmer's bounds.
    assert_eq!((plotkin(2, 15, 4), griesmer(2, 15, 4)), (8, 8));
    assert_eq!((plotkin(3, 13, 3), griesmer(3, 13, 3)), (9, 9));
    assert_eq!(linear_programming(2, 24, 12), Some(8));
    assert_eq!(linear_programming(2, 23, 12), Some(7));
    assert_eq!(linear_programming(3, 12, 6), Some(6));
    assert_eq!(gilbert_varshamov(2, 7, 4), 3);
}

#[test]
fn the_best_binary_codes_pass_every_bound() {
    // Largest d of a binary linear [n, k] code (MacWilliams and Sloane, 1977, appendix A, from memory).
    for (n, k, d) in [
        (8, 4, 4),
        (15, 7, 5),
        (15, 11, 3),
        (16, 5, 8),
        (24, 12, 8),
        (31, 16, 7),
        (32, 16, 8),
        (32, 6, 16),
        (48, 24, 12),
        (63, 51, 5),
        (64, 7, 32),
        (20, 5, 9),
        (18, 9, 6),
    ] {
        let all = [
            singleton(2, n, k),
            hamming(2, n, k),
            plotkin(2, n, k),
            griesmer(2, n, k),
            johnson(2, n, k).unwrap(),
            elias(2, n, k).unwrap(),
            linear_programming(2, n, k).unwrap(),
        ];
        assert!(
            all.iter().all(|&bound| bound >= d),
            "[{n}, {k}, {d}]: {all:?}"
        );
        assert!(gilbert_varshamov(2, n, k) <= d, "[{n}, {k}, {d}]");
        assert!(all[6] <= all[1] && all[6] <= all[0]);
    }
}

#[test]
fn reed_solomon_codes_pass_every_bound() {
    for (q, n) in [(4, 4), (5, 4), (7, 6), (8, 7), (9, 8), (16, 15)] {
        for k in 1..=n {
            let d = n - k + 1;
            for bound in [
                singleton(q, n, k),
                hamming(q, n, k),
                plotkin(q, n, k),
                griesmer(q, n, k),
                elias(q, n, k).unwrap(),
                linear_programming(q, n, k).unwrap(),
            ] {
                assert!(
                    bound >= d && bound <= n,
                    "[{n}, {k}, {d}] over GF({q}): {bound}"
                );
            }
        }
    }
}

#[test]
fn unusual_parameters_have_an_answer() {
    for q in [2, 3, 65536, 2_147_483_647] {
        for (n, k) in [(0, 0), (1, 0), (1, 1), (2, 1), (5, 5), (9, 4)] {
            for bound in [
                singleton(q, n, k),
                hamming(q, n, k),
                plotkin(q, n, k),
                griesmer(q, n, k),
                gilbert_varshamov(q, n, k),
            ] {
                assert!(bound <= n, "[{n}, {k}] over GF({q}): {bound}");
            }
            let _ = (
                johnson(q, n, k),
                elias(q, n, k),
                linear_programming(q, n, k),
            );
        }
    }
    let long = [
        hamming(2, 32768, 32752),
        griesmer(2, 32768, 32752),
        plotkin(2, 32768, 32752),
    ];
    assert_eq!(long[0], 4);
    assert_eq!(hamming(2, 4096, 64).min(4096), hamming(2, 4096, 64));
}
