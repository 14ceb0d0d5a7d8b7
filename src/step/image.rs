//! `image`: each symbol written as digits over the prime field.

use super::Step;
use crate::algebra::{Element, Field, Matrix};
use crate::code::{Bound, Code, Knowledge, Made, Rules};
use crate::finding::{Found, catalogue};
use crate::value::{Call, MATRIX_ENTRIES, optional};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "image",
    parameters: &[optional(
        "basis",
        "a list of m elements",
        "the basis in which a symbol is written, 1, a, a², … unless said; its first coordinate is sent first",
    )],
    says: "Writes each symbol as its coordinates over the prime field: n and k grow by the field's degree.",
    theory: "A non-zero symbol has a non-zero coordinate, so d does not fall (MacWilliams and Sloane, 1977, ch. 10 §5).",
    example: "\
field octal = GF(8) where a^3 = a + 1
code gauge_word
  = reed_solomon(length: 7, dimension: 3) over octal
  then image
  is [21, 9, 6]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let field = code.field();
    let degree = field.degree() as usize;
    let prime = Field::prime(u64::from(field.characteristic()))
        .map_err(|_| call.trouble(catalogue::BAD_FIELD_ORDER, "the prime field cannot be made"))?;
    let entries = (code.dimension() * degree).saturating_mul(code.length() * degree);
    if entries > MATRIX_ENTRIES {
        return Err(call.trouble(
            catalogue::LIMIT,
            "the image's generator matrix would be too large to build",
        ));
    }
    let basis = if call.has("basis") {
        call.elements("basis", field)?
    } else {
        (0..degree as u32)
            .map(|at| field.characteristic().pow(at))
            .collect()
    };
    let coordinates = Coordinates::new(field, &prime, &basis).ok_or_else(|| {
        call.wrong("basis", catalogue::BAD_ARGUMENT, format!("these elements are no basis of {field} over {prime}; {degree} independent ones are needed"))
    })?;
    let generator = code.generator_matrix();
    let mut rows = Vec::new();
    for row in 0..generator.rows() {
        for &scale in &basis {
            rows.push(
                generator
                    .row(row)
                    .iter()
                    .flat_map(|&entry| coordinates.of(field.mul(scale, entry)))
                    .collect(),
            );
        }
    }
    let matrix = Matrix::from_rows(&prime, code.length() * degree, &rows);
    let named = if call.has("basis") {
        "the stated basis"
    } else {
        "the basis 1, a, a^2, …"
    };
    Ok(Made::span(matrix)
        .dimension(code.dimension() * degree)
        .rules(Image)
        .assuming(format!(
            "symbols of {field} are written over {prime} in {named}, first coordinate first"
        )))
}

/// Coordinates over the prime field in a basis.
struct Coordinates {
    change: Matrix,
    characteristic: u32,
    degree: usize,
}

impl Coordinates {
    fn new(field: &Field, prime: &Field, basis: &[Element]) -> Option<Coordinates> {
        let degree = field.degree() as usize;
        if basis.len() != degree {
            return None;
        }
        // Columns: the digits of the basis elements; its inverse turns digits into coordinates.
        let digits = Matrix::from_fn(prime, degree, degree, |row, column| {
            digit(basis[column], row, field.characteristic())
        });
        let echelon = digits.beside(&Matrix::identity(prime, degree)).reduced();
        if echelon.pivots != (0..degree).collect::<Vec<usize>>() {
            return None;
        }
        let inverse: Vec<usize> = (degree..2 * degree).collect();
        Some(Coordinates {
            change: echelon.matrix.select_columns(&inverse),
            characteristic: field.characteristic(),
            degree,
        })
    }

    fn of(&self, element: Element) -> Vec<Element> {
        let digits: Vec<Element> = (0..self.degree)
            .map(|at| digit(element, at, self.characteristic))
            .collect();
        self.change.times(&digits)
    }
}

/// The coefficient of a^at in an element.
pub(super) fn digit(element: Element, at: usize, characteristic: u32) -> Element {
    element / characteristic.pow(at as u32) % characteristic
}

struct Image;

impl Rules for Image {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let before = known.distance(&code.origin().parents[0]);
        if before.lower == 0 {
            return Vec::new();
        }
        before
            .carried_lower("a non-zero symbol has a non-zero coordinate")
            .into_iter()
            .collect()
    }
}
