//! Numbers and sets.

use super::Function;
use crate::finding::{Found, catalogue};
use crate::value::{Call, SET_SIZE, Value, compare, needed, optional};
use num_bigint::BigInt;
use num_integer::Integer;
use num_traits::{One, Signed, ToPrimitive, Zero};
use std::cmp::Ordering;

/// The register of this file.
pub const FUNCTIONS: &[Function] = &[
    Function {
        name: "min",
        parameters: &[
            needed("values", "a set or list", "at least one"),
            optional("other", "a number", "a second value"),
        ],
        says: "The least member of a set or list, or the lesser of two values.",
        theory: "",
        example: "let shortest = min({3, 1, 2})\nlet lesser = min(4, 7)\nfield bit = GF(2)\ncode tide over bit = parity(shortest + lesser)\n  is [5, 4, 2]\n",
        run: |call| extreme(call, Ordering::Less),
    },
    Function {
        name: "max",
        parameters: &[
            needed("values", "a set or list", "at least one"),
            optional("other", "a number", "a second value"),
        ],
        says: "The greatest member of a set or list, or the greater of two values.",
        theory: "",
        example: "let longest = max({3, 1, 2})\nfield bit = GF(2)\ncode tide over bit = parity(longest)\n  is [3, 2, 2]\n",
        run: |call| extreme(call, Ordering::Greater),
    },
    Function {
        name: "abs",
        parameters: &[needed("value", "an integer", "")],
        says: "The size of an integer without its sign.",
        theory: "",
        example: "let size = abs(-4)\nfield bit = GF(2)\ncode tide over bit = parity(size)\n  is [4, 3, 2]\n",
        run: |call| Ok(Value::Integer(call.integer("value")?.abs())),
    },
    Function {
        name: "gcd",
        parameters: &[
            needed("first", "an integer", ""),
            needed("second", "an integer", ""),
        ],
        says: "The greatest common divisor of two integers.",
        theory: "",
        example: "let common = gcd(12, 18)\nfield bit = GF(2)\ncode tide over bit = parity(common)\n  is [6, 5, 2]\n",
        run: |call| {
            Ok(Value::Integer(
                call.integer("first")?.gcd(call.integer("second")?),
            ))
        },
    },
    Function {
        name: "lcm",
        parameters: &[
            needed("first", "an integer", ""),
            needed("second", "an integer", ""),
        ],
        says: "The least common multiple of two integers.",
        theory: "",
        example: "let common = lcm(4, 6)\nfield bit = GF(2)\ncode tide over bit = parity(common)\n  is [12, 11, 2]\n",
        run: |call| {
            Ok(Value::Integer(
                call.integer("first")?.lcm(call.integer("second")?),
            ))
        },
    },
    Function {
        name: "floor",
        parameters: &[needed("value", "a number", "")],
        says: "The greatest integer not above a number.",
        theory: "",
        example: "let whole = floor(7/2)\nfield bit = GF(2)\ncode tide over bit = parity(whole)\n  is [3, 2, 2]\n",
        run: |call| rounded(call, |value| value.floor()),
    },
    Function {
        name: "ceil",
        parameters: &[needed("value", "a number", "")],
        says: "The least integer not below a number.",
        theory: "",
        example: "let whole = ceil(7/2)\nfield bit = GF(2)\ncode tide over bit = parity(whole)\n  is [4, 3, 2]\n",
        run: |call| rounded(call, |value| value.ceil()),
    },
    Function {
        name: "binomial",
        parameters: &[
            needed("from", "an integer", "from 0 on, at most 100000"),
            needed("choose", "an integer", ""),
        ],
        says: "The number of ways to choose some of several things.",
        theory: "",
        example: "let ways = binomial(4, 2)\nfield bit = GF(2)\ncode tide over bit = parity(ways)\n  is [6, 5, 2]\n",
        run: binomial,
    },
    Function {
        name: "size",
        parameters: &[needed("of", "a set, list, vector or field", "")],
        says: "The number of members of a set, list or field, or the length of a vector.",
        theory: "",
        example: "let squares = { i^2 mod 7 for i in 1..6 }\nfield bit = GF(2)\ncode tide over bit = parity(size(squares))\n  is [3, 2, 2]\n",
        run: |call| match call.value("of") {
            Value::Vector(_, entries) => Ok(Value::integer(entries.len())),
            Value::Field(field) => Ok(Value::integer(field.order())),
            Value::Points(points) => Ok(Value::integer(points.len())),
            Value::Monomials(monomials) => Ok(Value::integer(monomials.len())),
            _ => Ok(Value::integer(call.items("of")?.len())),
        },
    },
    Function {
        name: "sum",
        parameters: &[needed("of", "a set, list or vector", "")],
        says: "The sum of the members of a set, list or vector.",
        theory: "",
        example: "let total = sum({1, 2, 3})\nfield bit = GF(2)\ncode tide over bit = parity(total)\n  is [6, 5, 2]\n",
        run: sum,
    },
    Function {
        name: "logarithm",
        parameters: &[
            needed("value", "an integer", "positive"),
            needed("base", "an integer", "at least 2"),
        ],
        says: "The greatest integer e with base^e at most the value.",
        theory: "",
        example: "let width = logarithm(1000, 2)\nfield bit = GF(2)\ncode tide over bit = parity(width)\n  is [9, 8, 2]\n",
        run: logarithm,
    },
    Function {
        name: "order_modulo",
        parameters: &[
            needed("value", "an integer", "prime to the modulus"),
            needed("modulus", "an integer", "from 1 to 2^31"),
        ],
        says: "The least e from 1 on with value^e = 1 modulo the modulus.",
        theory: "",
        example: "let period = order_modulo(2, 23)\nfield bit = GF(2)\ncode tide over bit = parity(period)\n  is [11, 10, 2]\n",
        run: order_modulo,
    },
];

fn extreme(call: &Call, wanted: Ordering) -> Found<Value> {
    let members = if call.has("other") {
        vec![call.value("values").clone(), call.value("other").clone()]
    } else {
        call.items("values")?
    };
    let mut members = members.into_iter();
    let Some(mut best) = members.next() else {
        return Err(call.wrong(
            "values",
            catalogue::BAD_ARGUMENT,
            format!("`{}` of nothing has no value", call.name),
        ));
    };
    for member in members {
        if call.at("values", compare(&member, &best))? == wanted {
            best = member;
        }
    }
    Ok(best)
}

fn rounded(
    call: &Call,
    round: impl Fn(&num_rational::BigRational) -> num_rational::BigRational,
) -> Found<Value> {
    match call.value("value") {
        Value::Rational(value) => Ok(Value::Integer(round(value).to_integer())),
        _ => Ok(Value::Integer(call.integer("value")?.clone())),
    }
}

fn binomial(call: &Call) -> Found<Value> {
    let from = call.size("from", 0, 100_000)?;
    let choose = call.integer("choose")?;
    let Some(choose) = choose.to_usize().filter(|&choose| choose <= from) else {
        return Ok(Value::Integer(BigInt::zero()));
    };
    let mut ways = BigInt::one();
    for at in 0..choose.min(from - choose) {
        ways = ways * (from - at) / (at + 1);
    }
    Ok(Value::Integer(ways))
}

fn sum(call: &Call) -> Found<Value> {
    let members = call.items("of")?;
    if members.len() > SET_SIZE {
        return Err(call.wrong("of", catalogue::LIMIT, "too many members"));
    }
    let mut members = members.into_iter();
    let Some(mut total) = members.next() else {
        return Ok(Value::Integer(BigInt::zero()));
    };
    for member in members {
        total = call.at(
            "of",
            crate::value::binary(crate::syntax::tree::BinaryOperator::Add, &total, &member),
        )?;
    }
    Ok(total)
}

fn logarithm(call: &Call) -> Found<Value> {
    let value = call.integer("value")?;
    let base = call.integer("base")?;
    if !value.is_positive() {
        return Err(call.wrong(
            "value",
            catalogue::BAD_ARGUMENT,
            format!("{value} has no logarithm; a positive integer is needed"),
        ));
    }
    if *base < BigInt::from(2) {
        return Err(call.wrong(
            "base",
            catalogue::BAD_ARGUMENT,
            format!("{base} is no base; an integer from 2 on is needed"),
        ));
    }
    let mut exponent = 0u64;
    let mut power = base.clone();
    while power <= *value {
        power *= base;
        exponent += 1;
    }
    Ok(Value::integer(exponent))
}

fn order_modulo(call: &Call) -> Found<Value> {
    let modulus = call.size("modulus", 1, 1 << 31)? as u64;
    let value = call.integer("value")?.mod_floor(&BigInt::from(modulus));
    let value = value.to_u64().expect("below the modulus");
    if modulus > 1 && value.gcd(&modulus) != 1 {
        return Err(call.wrong(
            "value",
            catalogue::BAD_ARGUMENT,
            format!("{value} and {modulus} have a common divisor, so no power is 1"),
        ));
    }
    let mut power = value % modulus;
    let mut exponent = 1u64;
    while power != 1 % modulus {
        power = power * value % modulus;
        exponent += 1;
    }
    Ok(Value::integer(exponent))
}
