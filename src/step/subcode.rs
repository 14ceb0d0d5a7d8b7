//! `subcode`: some rows of the generator matrix.

use super::Step;
use crate::algebra::Matrix;
use crate::code::{Bound, Code, Knowledge, Made, Rules, upper, weight};
use crate::finding::{Found, catalogue};
use crate::value::{Call, optional};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "subcode",
    parameters: &[
        optional(
            "rows",
            "a set or list of integers",
            "the rows kept, counted from 0",
        ),
        optional(
            "dimension",
            "an integer",
            "keep so many rows from the first on",
        ),
    ],
    says: "The code of some rows of the generator matrix as built.",
    theory: "A subcode, so d does not fall (MacWilliams and Sloane, 1977, ch. 1 §9). A code that was \
             built from a check matrix has no rows to speak of; `systematic` gives it some.",
    example: "\
field bit = GF(2)
code gauge_word over bit
  = reed_muller(order: 2, variables: 3)
  then subcode(dimension: 4)
  is [8, 4, 4]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let Some(matrix) = code.generator_matrix_as_built() else {
        let mut finding = call.trouble(
            catalogue::BAD_ARGUMENT,
            "this code was built from a check matrix, so it does not follow which rows are meant",
        );
        finding.help = Some(format!("write `then systematic then {}(…)`", call.name));
        return Err(finding);
    };
    let rows = match (call.has("rows"), call.has("dimension")) {
        (true, false) => rows(call, matrix)?,
        (false, true) => leading(call, code, matrix)?,
        _ => {
            return Err(call.trouble(
                catalogue::BAD_ARGUMENT,
                "`subcode` takes either `rows:` or `dimension:`",
            ));
        }
    };
    Ok(Made::span(matrix.select_rows(&rows))
        .masked(code.offset().map(<[u32]>::to_vec))
        .rules(Subcode))
}

fn rows(call: &Call, matrix: &Matrix) -> Found<Vec<usize>> {
    let mut rows: Vec<usize> = Vec::new();
    for at in call.naturals("rows")? {
        let row = usize::try_from(at).ok().filter(|&row| row < matrix.rows());
        let wrong = |message| Err(call.wrong("rows", catalogue::BAD_ARGUMENT, message));
        match row {
            None if matrix.rows() == 0 => return wrong("the generator matrix has no rows".into()),
            None => {
                return wrong(format!(
                    "there is no row {at}; the generator matrix as built has rows 0..{}",
                    matrix.rows() - 1
                ));
            }
            Some(row) if rows.contains(&row) => return wrong(format!("row {at} is named twice")),
            Some(row) => rows.push(row),
        }
    }
    Ok(rows)
}

/// The first rows, as many as dimensions are asked for; dependent rows leave that open.
fn leading(call: &Call, code: &Code, matrix: &Matrix) -> Found<Vec<usize>> {
    let dimension = call.size("dimension", 0, code.dimension())?;
    let rows: Vec<usize> = (0..dimension).collect();
    if matrix.rows() != code.dimension() && matrix.select_rows(&rows).rank() != dimension {
        let mut finding = call.wrong(
            "dimension",
            catalogue::BAD_ARGUMENT,
            format!("the first {dimension} rows of the generator matrix as built are dependent"),
        );
        finding.help = Some("name the rows by `rows:`".into());
        return Err(finding);
    }
    Ok(rows)
}

struct Subcode;

impl Rules for Subcode {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let before = known.distance(&code.origin().parents[0]);
        if before.lower == 0 || code.dimension() == 0 {
            return Vec::new();
        }
        let mut bounds = Vec::from_iter(before.carried_lower("a subcode keeps it"));
        let matrix = code.generator_matrix();
        let lightest = (0..matrix.rows())
            .map(|row| matrix.row(row))
            .filter(|row| weight(row) > 0)
            .min_by_key(|row| weight(row));
        if let Some(row) = lightest {
            let says = format!("a row kept has weight {}", weight(&row));
            bounds.push(upper(weight(&row), "subcode", says, Some(row)));
        }
        bounds
    }
}
