//! Builders of matrices.

use super::Function;
use crate::algebra::Matrix;
use crate::finding::{Found, catalogue};
use crate::value::{Call, MATRIX_ENTRIES, Value, needed, optional};
use num_integer::Integer;
use std::sync::Arc;

const SIZE: usize = 1 << 20;

/// The register of this file.
pub const FUNCTIONS: &[Function] = &[
    Function {
        name: "identity",
        parameters: &[needed("size", "an integer", "how many rows and columns")],
        says: "The identity matrix.",
        theory: "",
        example: "field bit = GF(2)\ncode tide over bit = span(blocks | identity(3) ones(3, 1) |)\n  is [4, 3, 2]\n",
        run: |call| {
            let size = call.size("size", 0, SIZE)?;
            build(call, size, size, |row, column| u32::from(row == column))
        },
    },
    Function {
        name: "zeros",
        parameters: &[
            needed("rows", "an integer", ""),
            needed("columns", "an integer", ""),
        ],
        says: "A matrix of zeros.",
        theory: "",
        example: "field bit = GF(2)\ncode tide over bit = check(blocks | identity(2) zeros(2, 1) ones(2, 1) |)\n  is [4, 2, 1]\n",
        run: |call| {
            let (rows, columns) = (call.size("rows", 0, SIZE)?, call.size("columns", 0, SIZE)?);
            build(call, rows, columns, |_, _| 0)
        },
    },
    Function {
        name: "ones",
        parameters: &[
            needed("rows", "an integer", ""),
            needed("columns", "an integer", ""),
        ],
        says: "A matrix of ones.",
        theory: "",
        example: "field bit = GF(2)\ncode tide over bit = check(ones(1, 5))\n  is [5, 4, 2]\n",
        run: |call| {
            let (rows, columns) = (call.size("rows", 0, SIZE)?, call.size("columns", 0, SIZE)?);
            build(call, rows, columns, |_, _| 1)
        },
    },
    Function {
        name: "vandermonde",
        parameters: &[
            needed("points", "a list of elements", "one a column"),
            needed("rows", "an integer", "row i holds the i-th powers, from 0"),
        ],
        says: "The matrix of the powers of points: row i, column j is the j-th point to the i.",
        theory: "Any as many columns as rows with different points are independent; an identity beside it is not in general a matrix with all minors non-zero.",
        example: "field octal = GF(8) where a^3 = a + 1\ncode tide over octal = check(vandermonde(points: powers(0..6), rows: 4))\n  is [7, 3, 5]\n",
        run: vandermonde,
    },
    Function {
        name: "cauchy",
        parameters: &[
            needed("rows", "a list of elements", "one a row"),
            needed(
                "columns",
                "a list of elements",
                "one a column, none among the rows",
            ),
        ],
        says: "The matrix with entry 1/(x - y) in the row of x and the column of y.",
        theory: "Every square submatrix is invertible (Cauchy, 1841), so an identity beside it spans an MDS code.",
        example: "field octal = GF(8) where a^3 = a + 1\ncode shards over octal = span(blocks | identity(4) cauchy(rows: powers(0..3), columns: powers(4..5)) |)\n  is [6, 4, 3]\n  require mds\n",
        run: cauchy,
    },
    Function {
        name: "circulant",
        parameters: &[
            needed("size", "an integer", "how many rows and columns"),
            optional("at", "a set of integers", "where row 0 has ones"),
            optional("row", "a list of elements", "row 0 itself"),
        ],
        says: "The square matrix whose row 0 is given, each further row one place to the right of the last.",
        theory: "",
        example: "field bit = GF(2)\ncode tide over bit = check(circulant(7, at: {0, 1, 3}))\n  is [7, 3, 4]\n",
        run: circulant,
    },
    Function {
        name: "toeplitz",
        parameters: &[
            needed("column", "a list of elements", "the first column"),
            needed(
                "row",
                "a list of elements",
                "the first row; its first entry is the column's",
            ),
        ],
        says: "The matrix that is constant along each diagonal.",
        theory: "",
        example: "field bit = GF(2)\ncode tide over bit = check(toeplitz(column: [1, 0], row: [1, 1, 0, 1]))\n  is [4, 2, 2]\n",
        run: toeplitz,
    },
    Function {
        name: "companion",
        parameters: &[needed(
            "polynomial",
            "a polynomial in x",
            "monic, of degree at least 1",
        )],
        says: "The companion matrix of a monic polynomial: multiplication by x on the basis 1, x, x², …, in columns.",
        theory: "",
        example: "field bit = GF(2)\ncode tide over bit = check(blocks | identity(3) companion(x^3 + x + 1) |)\n  is [6, 3, 2]\n",
        run: companion,
    },
    Function {
        name: "transpose",
        parameters: &[needed("matrix", "a matrix", "")],
        says: "The matrix with rows and columns exchanged.",
        theory: "",
        example: "field bit = GF(2)\ncode tide over bit = check(transpose(ones(5, 1)))\n  is [5, 4, 2]\n",
        run: |call| Ok(Value::Matrix(Arc::new(call.matrix("matrix")?.transpose()))),
    },
    Function {
        name: "kron",
        parameters: &[
            needed("first", "a matrix", ""),
            needed("second", "a matrix", ""),
        ],
        says: "The Kronecker product of two matrices.",
        theory: "",
        example: "field bit = GF(2)\ncode tide over bit = span(kron(| 1 1 |, | 1 1 1 |))\n  is [6, 1, 6]\n",
        run: kron,
    },
];

fn build(
    call: &Call,
    rows: usize,
    columns: usize,
    entry: impl FnMut(usize, usize) -> u32,
) -> Found<Value> {
    let field = call.field()?;
    capped(call, rows, columns)?;
    Ok(Value::Matrix(Arc::new(Matrix::from_fn(
        field, rows, columns, entry,
    ))))
}

fn capped(call: &Call, rows: usize, columns: usize) -> Found<()> {
    if rows.saturating_mul(columns) > MATRIX_ENTRIES {
        let message = format!(
            "a {rows} x {columns} matrix has more than the {MATRIX_ENTRIES} entries allowed"
        );
        return Err(call.trouble(catalogue::LIMIT, message));
    }
    Ok(())
}

fn vandermonde(call: &Call) -> Found<Value> {
    let field = call.field()?.clone();
    let points = call.elements("points", &field)?;
    let rows = call.size("rows", 0, SIZE)?;
    build(call, rows, points.len(), |row, column| {
        field.pow(points[column], row as u64)
    })
}

fn cauchy(call: &Call) -> Found<Value> {
    let field = call.field()?.clone();
    let rows = call.elements("rows", &field)?;
    let columns = call.elements("columns", &field)?;
    for (at, element) in columns.iter().enumerate() {
        if rows.contains(element) {
            let message = format!(
                "{element} stands among the rows and the columns, so 1/(x - y) divides by zero there"
            );
            return Err(call.wrong("columns", catalogue::BAD_ARGUMENT, message));
        }
        if columns[..at].contains(element) {
            return Err(call.wrong(
                "columns",
                catalogue::BAD_ARGUMENT,
                format!("{element} stands twice among the columns"),
            ));
        }
    }
    for (at, element) in rows.iter().enumerate() {
        if rows[..at].contains(element) {
            return Err(call.wrong(
                "rows",
                catalogue::BAD_ARGUMENT,
                format!("{element} stands twice among the rows"),
            ));
        }
    }
    build(call, rows.len(), columns.len(), |row, column| {
        field
            .inv(field.sub(rows[row], columns[column]))
            .expect("rows and columns are different elements")
    })
}

fn circulant(call: &Call) -> Found<Value> {
    let size = call.size("size", 1, SIZE)?;
    let field = call.field()?.clone();
    let mut first = vec![0; size];
    match (call.has("at"), call.has("row")) {
        (true, false) => {
            for place in call.naturals("at")? {
                let Some(entry) = usize::try_from(place).ok().and_then(|at| first.get_mut(at))
                else {
                    let message =
                        format!("row 0 has no place {place}; its places are 0..{}", size - 1);
                    return Err(call.wrong("at", catalogue::BAD_POSITIONS, message));
                };
                *entry = 1;
            }
        }
        (false, true) => {
            let row = call.elements("row", &field)?;
            if row.len() != size {
                let message = format!("row 0 has {} entries, but the size is {size}", row.len());
                return Err(call.wrong("row", catalogue::SHAPE, message));
            }
            first = row;
        }
        _ => {
            return Err(call.trouble(
                catalogue::BAD_ARGUMENT,
                "`circulant` takes its first row by `at:` (where the ones are) or by `row:` (all entries)",
            ));
        }
    }
    build(call, size, size, |row, column| {
        first[(column + size - row).mod_floor(&size)]
    })
}

fn toeplitz(call: &Call) -> Found<Value> {
    let field = call.field()?.clone();
    let column = call.elements("column", &field)?;
    let row = call.elements("row", &field)?;
    if column.is_empty() || row.first() != column.first() {
        return Err(call.trouble(
            catalogue::SHAPE,
            "the first row and the first column of a Toeplitz matrix begin with the same entry",
        ));
    }
    build(call, column.len(), row.len(), |at, place| {
        if place >= at {
            row[place - at]
        } else {
            column[at - place]
        }
    })
}

fn companion(call: &Call) -> Found<Value> {
    let field = call.field()?.clone();
    let Value::Polynomial(polynomial) = call.value("polynomial") else {
        return Err(call.wrong(
            "polynomial",
            catalogue::WRONG_TYPE,
            "`companion` takes a polynomial in x",
        ));
    };
    let coefficients = call.at("polynomial", polynomial.coefficients(&field, SIZE))?;
    if coefficients.len() < 2 || coefficients.last() != Some(&1) {
        return Err(call.wrong(
            "polynomial",
            catalogue::BAD_ARGUMENT,
            "the polynomial must be monic of degree at least 1",
        ));
    }
    let degree = coefficients.len() - 1;
    build(call, degree, degree, |row, column| {
        if column + 1 == degree {
            field.neg(coefficients[row])
        } else {
            u32::from(row == column + 1)
        }
    })
}

fn kron(call: &Call) -> Found<Value> {
    let (first, second) = (call.matrix("first")?, call.matrix("second")?);
    if first.field() != second.field() {
        return Err(call.wrong(
            "second",
            catalogue::FIELD_MISMATCH,
            format!(
                "the matrices are over {} and {}",
                first.field(),
                second.field()
            ),
        ));
    }
    let rows = first.rows().saturating_mul(second.rows());
    capped(call, rows, first.columns().saturating_mul(second.columns()))?;
    Ok(Value::Matrix(Arc::new(first.kronecker(&second))))
}
