//! `evaluate(monomials, at: points)`: all values of combinations of monomials at points.

use super::Construction;
use crate::algebra::{Element, Field, Matrix};
use crate::code::{Bound, Code, Knowledge, Made, Rules, Space, lower, upper, weight};
use crate::finding::{Found, catalogue};
use crate::value::{Call, MATRIX_ENTRIES, Monomials, Points, Value, needed, optional};
use std::sync::Arc;

/// The register's entry.
pub const ENTRY: Construction = Construction {
    name: "evaluate",
    parameters: &[
        needed(
            "monomials",
            "a set of monomials",
            "their combinations are evaluated",
        ),
        needed(
            "at",
            "a set of points",
            "where they are evaluated, in this order",
        ),
        optional(
            "scaled_by",
            "a list of non-zero elements",
            "a factor for each position",
        ),
    ],
    says: "The code of the values that all combinations of the monomials take at the points.",
    theory: "A polynomial with leading monomial x^e has at least the product of (q - e_i) non-zero \
             values on the whole space, by its footprint (Geil and Høholdt, 2000); at fewer points, \
             those less the points left out. The bound is met when the set of monomials holds all \
             divisors of its members: the distance of Reed–Muller codes over any field (Kasami, Lin \
             and Peterson, 1968; Delsarte, Goethals and MacWilliams, 1970), and with one variable \
             that of Reed–Solomon codes.",
    example: "\
field bit = GF(2)
code broadcast over bit
  = evaluate(monomials in 4 variables where degree <= 1, at: points in 4 variables)
  is [16, 5, 8]
",
    run,
};

fn run(call: &Call) -> Found<Made> {
    let (monomials, points) = match (call.value("monomials"), call.value("at")) {
        (Value::Monomials(monomials), Value::Points(points)) => (monomials.clone(), points.clone()),
        (Value::Monomials(_), other) => {
            let message = format!(
                "`at` takes points, as in `points in 2 variables`, not {}",
                other.kind()
            );
            return Err(call.wrong("at", catalogue::WRONG_TYPE, message));
        }
        (other, _) => {
            let message = format!(
                "`evaluate` takes monomials, as in `monomials in 2 variables where degree <= 1`, not {}",
                other.kind()
            );
            return Err(call.wrong("monomials", catalogue::WRONG_TYPE, message));
        }
    };
    if points.is_empty() {
        return Err(call.wrong(
            "at",
            catalogue::BAD_POINTS,
            "no point satisfies the condition, so the code would have no position",
        ));
    }
    if monomials.variables != points.variables {
        return Err(call.wrong(
            "at",
            catalogue::BAD_POINTS,
            format!(
                "the monomials are in {} variables, but the points have {} coordinates",
                monomials.variables, points.variables
            ),
        ));
    }
    let order = points.field.order();
    let most = monomials.exponents.iter().flatten().max();
    if let Some(exponent) = most.filter(|&&exponent| u64::from(exponent) >= order) {
        let message = format!(
            "the monomials have exponents up to {exponent}, but over {}, where the points lie, exponents stay below {order}",
            points.field
        );
        return Err(call.wrong("monomials", catalogue::FIELD_MISMATCH, message));
    }
    if monomials.len().saturating_mul(points.len()) > MATRIX_ENTRIES {
        return Err(call.trouble(
            catalogue::LIMIT,
            format!("the generator matrix would have more than {MATRIX_ENTRIES} entries"),
        ));
    }
    let scale = scale(call, &points)?;
    let field = &points.field;
    let matrix = Matrix::from_fn(field, monomials.len(), points.len(), |row, column| {
        let value = Monomials::evaluate(
            field,
            &monomials.exponents[row],
            &points.coordinates[column],
        );
        field.mul(scale[column], value)
    });
    let whole = points.is_whole_space();
    let independent = whole.then_some(monomials.len());
    let mut made = Made::new(field.clone(), points.len(), Space::Span(matrix)).rules(Footprint {
        monomials,
        points,
        scale,
    });
    made.dimension = independent;
    Ok(made)
}

fn scale(call: &Call, points: &Points) -> Found<Vec<Element>> {
    if !call.has("scaled_by") {
        return Ok(vec![1; points.len()]);
    }
    let scale = call.elements("scaled_by", &points.field)?;
    if scale.len() != points.len() {
        let message = format!(
            "there are {} factors for {} points",
            scale.len(),
            points.len()
        );
        return Err(call.wrong("scaled_by", catalogue::SHAPE, message));
    }
    if scale.contains(&0) {
        return Err(call.wrong(
            "scaled_by",
            catalogue::BAD_ARGUMENT,
            "a factor is zero, so its position would carry nothing",
        ));
    }
    Ok(scale)
}

/// The footprint bound for values of polynomials at points of a space.
struct Footprint {
    monomials: Arc<Monomials>,
    points: Arc<Points>,
    scale: Vec<Element>,
}

impl Footprint {
    /// Non-zero values that a leading monomial forces on the whole space, at least.
    fn forced(&self, exponents: &[u32]) -> u128 {
        let order = u128::from(self.points.field.order());
        exponents
            .iter()
            .map(|&exponent| order - u128::from(exponent))
            .product()
    }

    /// The monomial that forces the fewest.
    fn worst(&self) -> Option<&Vec<u32>> {
        self.monomials
            .exponents
            .iter()
            .min_by_key(|exponents| self.forced(exponents))
    }

    /// A word of the forced weight when all divisors of the monomial are in the set: the product
    /// over the variables of (x_i − s) for e_i different s.
    fn lightest(&self, exponents: &[u32]) -> Vec<Element> {
        let field: &Field = &self.points.field;
        self.points
            .coordinates
            .iter()
            .zip(&self.scale)
            .map(|(point, &scale)| {
                let vanishes = point
                    .iter()
                    .zip(exponents)
                    .any(|(&coordinate, &exponent)| coordinate < exponent);
                if vanishes {
                    return 0;
                }
                let mut value = scale;
                for (&coordinate, &exponent) in point.iter().zip(exponents) {
                    for root in 0..exponent {
                        value = field.mul(value, field.sub(coordinate, root));
                    }
                }
                value
            })
            .collect()
    }

    /// One variable: any n distinct points are a grid of their own, so the count is exact there.
    fn one_variable(&self) -> Option<Bound> {
        if self.points.variables != 1 {
            return None;
        }
        let degree = self
            .monomials
            .exponents
            .iter()
            .map(|exponents| exponents[0])
            .max()?;
        let zeros = degree as usize;
        let length = self.points.len();
        (zeros < length).then(|| {
            lower(
                length - zeros,
                "roots",
                format!("a polynomial of degree at most {zeros} has at most {zeros} roots among the {length} points"),
            )
        })
    }
}

impl Rules for Footprint {
    fn distance(&self, code: &Code, _known: &dyn Knowledge) -> Vec<Bound> {
        let mut bounds: Vec<Bound> = self.one_variable().into_iter().collect();
        let Some(worst) = self.worst() else {
            return bounds;
        };
        let forced = self.forced(worst);
        let order = u128::from(self.points.field.order());
        let Some(space) = order.checked_pow(self.points.variables as u32) else {
            return bounds;
        };
        let missing = space - self.points.len() as u128;
        if forced <= missing {
            return bounds;
        }
        let value = (forced - missing) as usize;
        let says = if missing == 0 {
            format!(
                "a polynomial led by {} has at least {value} non-zero values (footprint)",
                written(worst)
            )
        } else {
            format!(
                "a polynomial led by {} has at least {forced} non-zero values on the whole space, {missing} points are left out (footprint)",
                written(worst)
            )
        };
        bounds.push(lower(value, "footprint", says));
        if missing == 0 && self.monomials.is_divisor_closed() && code.dimension() > 0 {
            let word = self.lightest(worst);
            debug_assert_eq!(weight(&word), value, "the product of linear factors");
            bounds.push(upper(
                value,
                "footprint",
                format!(
                    "a product of linear factors led by {} has just {value} non-zero values",
                    written(worst)
                ),
                Some(word),
            ));
        }
        bounds
    }
}

fn written(exponents: &[u32]) -> String {
    let factors: Vec<String> = exponents
        .iter()
        .enumerate()
        .filter(|&(_, &exponent)| exponent > 0)
        .map(|(index, &exponent)| match exponent {
            1 => format!("x{}", index + 1),
            _ => format!("x{}^{exponent}", index + 1),
        })
        .collect();
    if factors.is_empty() {
        "1".to_string()
    } else {
        factors.join(" ")
    }
}
