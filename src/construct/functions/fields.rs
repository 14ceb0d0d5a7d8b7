//! Vectors and field elements.

use super::Function;
use crate::finding::{Found, catalogue};
use crate::value::{Call, Value, needed, optional};
use num_bigint::BigInt;
use num_integer::Integer;
use num_traits::ToPrimitive;
use std::sync::Arc;

/// The register of this file.
pub const FUNCTIONS: &[Function] = &[
    Function {
        name: "weight",
        parameters: &[needed(
            "of",
            "a vector, a list of elements, or an integer",
            "",
        )],
        says: "The number of non-zero entries of a vector; of an integer, the ones of its binary digits.",
        theory: "",
        example: "field bit = GF(2)\nmatrix odd over bit = columns v of height 3 where weight(v) mod 2 = 1\ncode tide over bit = check(odd)\n  is [4, 1, 4]\n",
        run: weight,
    },
    Function {
        name: "leading",
        parameters: &[needed("of", "a vector", "")],
        says: "The first non-zero entry of a vector, 0 when there is none.",
        theory: "",
        example: "field trit = GF(3)\nmatrix lines over trit = columns v of height 2 where leading(v) = 1\ncode tide over trit = check(lines)\n  is [4, 2, 3]\n",
        run: leading,
    },
    Function {
        name: "dot",
        parameters: &[
            needed("first", "a vector", ""),
            needed("second", "a vector", "as long"),
        ],
        says: "The sum of the products of matching entries of two vectors.",
        theory: "",
        example: "field bit = GF(2)\nmatrix half over bit = columns v of height 3 where dot(v, v) = 1\ncode tide over bit = check(half)\n  is [4, 1, 4]\n",
        run: dot,
    },
    Function {
        name: "powers",
        parameters: &[needed(
            "exponents",
            "a set or list of integers",
            "in the order of the result",
        )],
        says: "The list of the generator's powers with the given exponents.",
        theory: "",
        example: "field octal = GF(8) where a^3 = a + 1\ncode tide over octal = span(vandermonde(points: powers(0..6), rows: 3))\n  is [7, 3, 5]\n",
        run: powers,
    },
    Function {
        name: "elements",
        parameters: &[optional(
            "of",
            "a field",
            "the field meant here, unless said",
        )],
        says: "All elements of a field, in the order of their numbers.",
        theory: "",
        example: "field octal = GF(8) where a^3 = a + 1\ncode tide over octal = span(vandermonde(points: elements, rows: 3))\n  is [8, 3, 6]\n",
        run: elements,
    },
    Function {
        name: "digits",
        parameters: &[
            needed("of", "an integer", "from 0 on"),
            needed("count", "an integer", "how many digits"),
            optional("base", "an integer", "2 unless said"),
        ],
        says: "The digits of an integer, most significant first.",
        theory: "",
        example: "field bit = GF(2)\nmatrix one over bit = columns v of height 3 where [v[0], v[1], v[2]] = digits(5, 3)\ncode tide over bit = check(one)\n  is [1, 0, _]\n",
        run: digits,
    },
    Function {
        name: "coset",
        parameters: &[
            needed("of", "an integer", "an exponent"),
            needed("length", "an integer", "exponents count modulo this"),
        ],
        says: "The cyclotomic coset of an exponent: its products with the powers of q.",
        theory: "Roots of a cyclic code over GF(q) come in these sets (MacWilliams and Sloane, 1977, ch. 7 §5).",
        example: "field bit = GF(2)\ncode tide over bit = cyclic(length: 7, roots: coset(1, 7))\n  is [7, 4, 3]\n",
        run: coset,
    },
];

fn weight(call: &Call) -> Found<Value> {
    let count = match call.value("of") {
        Value::Vector(_, entries) => entries.iter().filter(|&&entry| entry != 0).count(),
        Value::Integer(number) => {
            let (sign, digits) = number.to_u64_digits();
            if sign == num_bigint::Sign::Minus {
                return Err(call.wrong(
                    "of",
                    catalogue::BAD_ARGUMENT,
                    "a negative integer has no weight",
                ));
            }
            digits.iter().map(|digit| digit.count_ones() as usize).sum()
        }
        _ => {
            let zero = Value::integer(0);
            let mut count = 0;
            for item in call.items("of")? {
                count += usize::from(!call.at("of", crate::value::equal(&item, &zero))?);
            }
            count
        }
    };
    Ok(Value::integer(count))
}

fn vector<'v>(call: &'v Call, name: &str) -> Found<(&'v crate::algebra::Field, &'v [u32])> {
    match call.value(name) {
        Value::Vector(field, entries) => Ok((field, entries)),
        other => Err(call.wrong(
            name,
            catalogue::WRONG_TYPE,
            format!("`{}` takes a vector, not {}", call.name, other.kind()),
        )),
    }
}

fn leading(call: &Call) -> Found<Value> {
    let (field, entries) = vector(call, "of")?;
    let first = entries.iter().copied().find(|&entry| entry != 0);
    Ok(Value::Element(field.clone(), first.unwrap_or(0)))
}

fn dot(call: &Call) -> Found<Value> {
    let (field, first) = vector(call, "first")?;
    let (_, second) = vector(call, "second")?;
    if first.len() != second.len() {
        return Err(call.wrong(
            "second",
            catalogue::SHAPE,
            "the vectors have different lengths",
        ));
    }
    let sum = first.iter().zip(second).fold(0, |sum, (&left, &right)| {
        field.add(sum, field.mul(left, right))
    });
    Ok(Value::Element(field.clone(), sum))
}

fn powers(call: &Call) -> Found<Value> {
    let field = call.field()?;
    let group = BigInt::from(field.order() - 1);
    let mut list = Vec::new();
    for item in call.items("exponents")? {
        let exponent = call.at("exponents", crate::value::integer_of(&item).cloned())?;
        let exponent = exponent.mod_floor(&group).to_u64().unwrap_or(0);
        list.push(Value::Element(
            field.clone(),
            field.power_of_generator(exponent),
        ));
    }
    Ok(Value::List(Arc::new(list)))
}

fn elements(call: &Call) -> Found<Value> {
    let field = if call.has("of") {
        call.field_argument("of")?
    } else {
        call.field()?
    };
    if field.order() > crate::value::SET_SIZE as u64 {
        return Err(call.trouble(
            catalogue::LIMIT,
            format!("{field} has too many elements to list"),
        ));
    }
    let all = (0..field.order() as u32).map(|element| Value::Element(field.clone(), element));
    Ok(Value::List(Arc::new(all.collect())))
}

fn digits(call: &Call) -> Found<Value> {
    let count = call.size("count", 0, 1 << 16)?;
    let base = if call.has("base") {
        call.size("base", 2, 1 << 31)?
    } else {
        2
    };
    let mut rest = call.integer("of")?.clone();
    if rest < BigInt::from(0) {
        return Err(call.wrong(
            "of",
            catalogue::BAD_ARGUMENT,
            "a negative integer has no digits",
        ));
    }
    let base = BigInt::from(base);
    let mut list = Vec::with_capacity(count);
    for _ in 0..count {
        let (quotient, digit) = rest.div_rem(&base);
        list.push(Value::Integer(digit));
        rest = quotient;
    }
    if rest > BigInt::from(0) {
        return Err(call.wrong(
            "of",
            catalogue::BAD_ARGUMENT,
            format!("{} has more than {count} digits", call.value("of")),
        ));
    }
    list.reverse();
    Ok(Value::List(Arc::new(list)))
}

fn coset(call: &Call) -> Found<Value> {
    let field = call.field()?;
    let length = call.size("length", 1, crate::value::CODE_LENGTH)? as u64;
    if length.gcd(&field.order()) != 1 {
        return Err(call.wrong(
            "length",
            catalogue::BAD_ROOTS,
            format!(
                "the length {length} and q = {} have a common divisor",
                field.order()
            ),
        ));
    }
    let start = call.integer("of")?.mod_floor(&BigInt::from(length));
    let start = start.to_u64().expect("below the length");
    let mut members = vec![Value::integer(start)];
    let step = |exponent: u64| {
        (u128::from(exponent) * u128::from(field.order()) % u128::from(length)) as u64
    };
    let mut next = step(start);
    while next != start {
        members.push(Value::integer(next));
        next = step(next);
    }
    call.at("of", Value::set(members))
}
