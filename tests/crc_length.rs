//! How far a CRC's promise reaches: the order of x modulo the generator ends it.

mod common;

/// Orders of x: a primitive polynomial of degree m has 2^m - 1 (Peterson and Weldon,
/// Error-Correcting Codes, 1972, ch. 6); with the factor x + 1 beside it, the same.
#[test]
fn the_distance_falls_to_two_one_position_beyond_the_order() {
    for (order, degree, d, generator) in [
        (7, 3, 3, "x^3 + x + 1"),
        (7, 4, 4, "x^4 + x^3 + x^2 + 1"),
        (15, 4, 3, "x^4 + x + 1"),
        (127, 8, 4, "x^8 + x^2 + x + 1"),
        (511, 9, 3, "x^9 + x^4 + 1"),
    ] {
        let spec = |length: usize, d: usize| {
            format!(
                "field bit = GF(2)\ncode frame over bit = crc(length: {length}, generator: {generator})\n  is [{length}, {}, {d}]\n",
                length - degree
            )
        };
        for text in [spec(order, d), spec(order + 1, 2), spec(2 * order + 3, 2)] {
            let found = common::findings(&text);
            assert!(found.is_empty(), "{text}{found:#?}");
        }
    }
}

#[test]
fn the_order_counts_over_other_fields_and_for_a_single_check() {
    for text in [
        // x^4 = -1 modulo a primitive polynomial of degree 2 over GF(3): d is 2 from length 5 on.
        "field trit = GF(3)\ncode frame over trit = crc(length: 4, generator: x^2 + x + 2)\n  is [4, 2, 3]\n",
        "field trit = GF(3)\ncode frame over trit = crc(length: 5, generator: x^2 + x + 2)\n  is [5, 3, 2]\n",
        "field trit = GF(3)\ncode frame over trit = crc(length: 11, generator: x^2 + x + 2)\n  is [11, 9, 2]\n",
        "field bit = GF(2)\ncode frame over bit = crc(length: 5, generator: x + 1)\n  is [5, 4, 2]\n",
        "field trit = GF(3)\ncode frame over trit = crc(length: 5, generator: x + 1)\n  is [5, 4, 2]\n",
    ] {
        let found = common::findings(text);
        assert!(found.is_empty(), "{text}{found:#?}");
    }
}

#[test]
fn a_telegram_that_is_too_long_is_told_how_long_it_may_be() {
    let text = "field bit = GF(2)\ncode telegram over bit = crc(length: 168, generator: x^8 + x^2 + x + 1)\n  require detects 3\n";
    let found = common::findings(text);
    assert_eq!(found.len(), 1, "{found:#?}");
    let help = found[0].help.as_deref().unwrap_or("");
    assert!(help.contains("no length up to 127"), "{help}");
}
