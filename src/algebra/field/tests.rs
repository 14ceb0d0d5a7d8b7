use super::residues::Residues;
use super::*;

fn conway_text(p: u64, m: u32) -> String {
    format_polynomial(Field::conway(p, m).unwrap().modulus(), "x")
}

#[test]
fn conway_polynomials_agree_with_published_tables() {
    // F. Lübeck, tables of Conway polynomials; from memory, confirmed with a general
    // number-theory library.
    let known = [
        (2, 1, "x + 1"),
        (2, 2, "x^2 + x + 1"),
        (2, 3, "x^3 + x + 1"),
        (2, 4, "x^4 + x + 1"),
        (2, 5, "x^5 + x^2 + 1"),
        (2, 6, "x^6 + x^4 + x^3 + x + 1"),
        (2, 7, "x^7 + x + 1"),
        (2, 8, "x^8 + x^4 + x^3 + x^2 + 1"),
        (2, 9, "x^9 + x^4 + 1"),
        (2, 10, "x^10 + x^6 + x^5 + x^3 + x^2 + x + 1"),
        (2, 11, "x^11 + x^2 + 1"),
        (2, 12, "x^12 + x^7 + x^6 + x^5 + x^3 + x + 1"),
        (2, 13, "x^13 + x^4 + x^3 + x + 1"),
        (2, 14, "x^14 + x^7 + x^5 + x^3 + 1"),
        (2, 15, "x^15 + x^5 + x^4 + x^2 + 1"),
        (2, 16, "x^16 + x^5 + x^3 + x^2 + 1"),
        (3, 1, "x + 1"),
        (3, 2, "x^2 + 2*x + 2"),
        (3, 3, "x^3 + 2*x + 1"),
        (3, 4, "x^4 + 2*x^3 + 2"),
        (3, 5, "x^5 + 2*x + 1"),
        (3, 6, "x^6 + 2*x^4 + x^2 + 2*x + 2"),
        (5, 2, "x^2 + 4*x + 2"),
        (5, 3, "x^3 + 3*x + 3"),
        (5, 4, "x^4 + 4*x^2 + 4*x + 2"),
        (7, 2, "x^2 + 6*x + 3"),
        (7, 3, "x^3 + 6*x^2 + 4"),
    ];
    for (p, m, text) in known {
        assert_eq!(conway_text(p, m), text, "{p}^{m}");
    }
}

/// One field of every kind of arithmetic.
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
        (65537, 1),
        (2_147_483_647, 1),
        (2, 21),
        (3, 13),
    ];
    orders
        .iter()
        .map(|&(p, m)| Field::conway(p, m).unwrap())
        .collect()
}

/// A fixed sample of elements, zero and one among them.
fn sample(field: &Field) -> Vec<Element> {
    let q = field.order();
    let mut state = 12345u64;
    let mut elements: Vec<Element> = vec![0, 1, (q - 1) as u32, field.generator()];
    elements.extend((0..16).map(|_| {
        state = state
            .wrapping_mul(6_364_136_223_846_793_005)
            .wrapping_add(1);
        ((state >> 32) % q) as u32
    }));
    elements
}

#[test]
fn every_field_is_one() {
    for field in fields() {
        for &a in &sample(&field) {
            assert_eq!(field.add(a, field.neg(a)), 0, "{field} {a}");
            assert_eq!(field.mul(a, 1), a);
            assert_eq!(field.add(a, 0), a);
            assert_eq!(field.pow(a, field.order()), a);
            if let Some(inverse) = field.inv(a) {
                assert_eq!(field.mul(a, inverse), 1, "{field} {a}");
                assert_eq!(field.power_of_generator(field.log(a).unwrap()), a);
            } else {
                assert_eq!(a, 0);
            }
            for &b in &sample(&field) {
                let sum = field.add(a, b);
                assert!(u64::from(sum) < field.order());
                assert_eq!(sum, field.add(b, a));
                assert_eq!(sum, add_digits(field.characteristic(), a, b));
                assert_eq!(field.sub(sum, b), a);
                assert_eq!(field.mul(a, b), field.mul(b, a));
                for &c in &sample(&field) {
                    let right = field.add(field.mul(a, c), field.mul(b, c));
                    assert_eq!(field.mul(sum, c), right, "{field}: ({a} + {b}) {c}");
                    assert_eq!(
                        field.mul(field.mul(a, b), c),
                        field.mul(a, field.mul(b, c)),
                        "{field}"
                    );
                }
            }
        }
    }
}

#[test]
fn products_agree_with_polynomials() {
    for (p, m) in [(2, 8), (3, 6), (5, 3), (2, 16)] {
        let field = Field::conway(p, m).unwrap();
        let residues = Residues::new(p as u32, field.modulus());
        for &a in &sample(&field) {
            for &b in &sample(&field) {
                assert_eq!(field.mul(a, b), residues.mul(a, b), "{field}: {a} {b}");
            }
        }
    }
}

#[test]
fn a_reducible_modulus_shows_its_factor() {
    // x^4 + x^2 + 1 = (x^2 + x + 1)^2 over GF(2).
    assert_eq!(
        Field::with_modulus(2, &[1, 0, 1, 0, 1], true).unwrap_err(),
        FieldError::Reducible {
            factor: vec![1, 1, 1]
        }
    );
    // x^2 + 2 = (x + 1)(x + 2) over GF(3).
    assert_eq!(
        Field::with_modulus(3, &[2, 0, 1], true).unwrap_err(),
        FieldError::Reducible { factor: vec![1, 1] }
    );
}

#[test]
fn a_modulus_that_is_not_primitive_shows_the_order_of_its_root() {
    // The AES modulus x^8 + x^4 + x^3 + x + 1 (FIPS 197, section 4.2): its root has order 51, and
    // x + 1 = 3 generates.
    let modulus = [1, 1, 0, 1, 1, 0, 0, 0, 1];
    assert_eq!(
        Field::with_modulus(2, &modulus, true).unwrap_err(),
        FieldError::NotPrimitive { order: 51 }
    );
    let field = Field::with_modulus(2, &modulus, false).unwrap();
    assert_eq!(field.generator(), 3);
    assert_eq!(field.mul(0x57, 0x83), 0xc1); // FIPS 197, section 4.2
    assert_eq!(field.multiplicative_order(2), Some(51));
    assert_eq!(field.multiplicative_order(3), Some(255));
    assert_eq!(field.multiplicative_order(0), None);
}

#[test]
fn silly_moduli_are_refused() {
    let wrong = |stated| FieldError::WrongDegree { stated };
    assert_eq!(Field::with_modulus(2, &[], true).unwrap_err(), wrong(0));
    assert_eq!(Field::with_modulus(2, &[1], true).unwrap_err(), wrong(0));
    assert_eq!(
        Field::with_modulus(3, &[1, 1, 2], true).unwrap_err(),
        wrong(2)
    );
    assert_eq!(
        Field::with_modulus(2, &[1, 1, 0, 0], false)
            .unwrap()
            .degree(),
        1
    );
    assert_eq!(Field::with_modulus(2, &[3, 5, 7], true).unwrap().order(), 4);
    assert_eq!(
        Field::with_modulus(4, &[1, 1, 1], true).unwrap_err(),
        FieldError::NotPrimePower
    );
    assert_eq!(
        Field::with_modulus(0, &[1], true).unwrap_err(),
        FieldError::NotPrimePower
    );
    let long = vec![1; 40];
    assert_eq!(
        Field::with_modulus(2, &long, true).unwrap_err(),
        FieldError::TooLarge
    );
    assert_eq!(
        Field::with_modulus(5, &[0, 1], true).unwrap_err(),
        FieldError::NotPrimitive { order: 0 }
    );
    assert_eq!(
        Field::prime(1 << 40).unwrap_err(),
        FieldError::NotPrimePower
    );
    assert_eq!(
        Field::prime(2_147_483_659).unwrap_err(),
        FieldError::TooLarge
    );
    assert_eq!(Field::conway(2, 25).unwrap_err(), FieldError::TooLarge);
    assert_eq!(Field::conway(2, 0).unwrap_err(), FieldError::NotPrimePower);
}

#[test]
fn elements_are_written_as_powers() {
    let field = Field::conway(2, 4).unwrap().with_symbol("b");
    assert_eq!(field.format_as_power(0), "0");
    assert_eq!(field.format_as_power(1), "1");
    assert_eq!(field.format_as_power(2), "b");
    assert_eq!(field.format_as_power(3), "b^4");
    assert_eq!(field.format_element(3), "3");
    assert_eq!(field, Field::conway(2, 4).unwrap());
    assert_eq!(format_polynomial(&[], "x"), "0");
    assert_eq!(format_polynomial(&[2, 1, 0, 3], "x"), "3*x^3 + x + 2");
}

#[test]
fn embeddings_respect_sums_and_products() {
    let odd_modulus = Field::with_modulus(2, &[1, 1, 1, 1, 1], false).unwrap();
    let reciprocal = Field::with_modulus(2, &[1, 0, 0, 1, 1], true).unwrap();
    let pairs = [
        (Field::conway(2, 8).unwrap(), Field::conway(2, 4).unwrap()),
        (Field::conway(2, 8).unwrap(), odd_modulus.clone()),
        (Field::conway(2, 4).unwrap(), reciprocal.clone()),
        (odd_modulus.clone(), odd_modulus.clone()),
        (reciprocal, Field::conway(2, 2).unwrap()),
        (Field::conway(3, 6).unwrap(), Field::conway(3, 3).unwrap()),
        (Field::conway(5, 2).unwrap(), Field::prime(5).unwrap()),
        (Field::conway(2, 22).unwrap(), Field::conway(2, 11).unwrap()),
    ];
    for (field, sub) in &pairs {
        let embedding = field.embedding_of(sub).unwrap();
        for &a in &sample(sub) {
            assert_eq!(embedding.down(embedding.up(a)), Some(a));
            for &b in &sample(sub) {
                let (up_a, up_b) = (embedding.up(a), embedding.up(b));
                assert_eq!(embedding.up(sub.add(a, b)), field.add(up_a, up_b));
                assert_eq!(embedding.up(sub.mul(a, b)), field.mul(up_a, up_b));
            }
        }
        let m = u64::from(embedding.degree());
        for &a in &sample(sub) {
            let scaled = (0..m).fold(0, |sum, _| sub.add(sum, a));
            assert_eq!(embedding.trace(embedding.up(a)), scaled);
            assert_eq!(embedding.norm(embedding.up(a)), sub.pow(a, m));
        }
    }
    let outside = pairs[0].0.embedding_of(&pairs[0].1).unwrap();
    assert_eq!(outside.down(2), None);
    assert!(
        pairs[0]
            .0
            .embedding_of(&Field::conway(2, 3).unwrap())
            .is_none()
    );
    assert!(pairs[0].0.embedding_of(&Field::prime(3).unwrap()).is_none());
}

#[test]
fn conway_generators_are_compatible() {
    for (p, m, d) in [(2, 12, 4), (2, 12, 6), (3, 6, 2), (5, 4, 2), (2, 16, 8)] {
        let (field, sub) = (Field::conway(p, m).unwrap(), Field::conway(p, d).unwrap());
        let exponent = (field.order() - 1) / (sub.order() - 1);
        let embedding = field.embedding_of(&sub).unwrap();
        assert_eq!(
            embedding.up(sub.generator()),
            field.power_of_generator(exponent)
        );
    }
}

#[test]
fn coordinates_combine_to_the_element() {
    for (p, m, d) in [
        (2, 8, 1),
        (2, 8, 4),
        (2, 6, 3),
        (3, 4, 2),
        (5, 3, 1),
        (2, 4, 4),
    ] {
        let (field, sub) = (Field::conway(p, m).unwrap(), Field::conway(p, d).unwrap());
        let embedding = field.embedding_of(&sub).unwrap();
        let normal = (1..field.order() as u32)
            .find_map(|e| embedding.normal_basis(e))
            .unwrap();
        for basis in [embedding.polynomial_basis(), normal] {
            for (basis, dual) in [(&basis, basis.dual()), (&basis.dual(), basis.clone())] {
                for (i, &left) in basis.elements().iter().enumerate() {
                    for (j, &right) in dual.elements().iter().enumerate() {
                        let trace = embedding.trace(field.mul(left, right));
                        assert_eq!(trace, u32::from(i == j));
                    }
                }
                for element in sample(&field) {
                    let coordinates = basis.coordinates(element);
                    assert!(coordinates.iter().all(|&c| u64::from(c) < sub.order()));
                    assert_eq!(basis.combine(&coordinates), element);
                }
            }
        }
    }
    let bytes = Field::conway(2, 8).unwrap();
    let bits = bytes.embedding_of(&Field::prime(2).unwrap()).unwrap();
    // In the polynomial basis over GF(2) the coordinates are the bits of the integer.
    assert_eq!(
        bits.polynomial_basis().coordinates(0x1d),
        [1, 0, 1, 1, 1, 0, 0, 0]
    );
    let other = Field::with_modulus(2, &[1, 1, 0, 1, 1, 0, 0, 0, 1], false).unwrap();
    let digits = other
        .embedding_of(&Field::prime(2).unwrap())
        .unwrap()
        .polynomial_basis();
    assert_eq!(digits.elements(), [1, 2, 4, 8, 16, 32, 64, 128]);
    let alone = Field::prime(7).unwrap();
    assert_eq!(
        alone
            .embedding_of(&alone)
            .unwrap()
            .polynomial_basis()
            .elements(),
        [1]
    );
    assert!(bits.basis(&[1, 2, 4, 8, 16, 32, 64, 127]).is_none());
    assert!(bits.basis(&[1, 2]).is_none());
    assert!(bits.basis(&[1, 2, 4, 8, 16, 32, 64, 256]).is_none());
    // Over a subfield, independence over GF(2) is not enough.
    let nibbles = bytes.embedding_of(&Field::conway(2, 4).unwrap()).unwrap();
    assert!(nibbles.basis(&[1, nibbles.up(2)]).is_none());
}
