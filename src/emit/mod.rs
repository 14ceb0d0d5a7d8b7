//! Matrices as files for other tools: one file a format, one line in the register.
//!
//! In: a [`Delivery`], a matrix with everything its reader must know about it. Out: bytes, and
//! with [`write_whole`] a file that is there whole or not at all. A format that has no place for
//! what a delivery says (CSV, say) carries the bare matrix; the JSON form carries all of it.

mod alist;
mod csv;
mod json;
mod matrices;
mod mem;
mod mtx;
mod npy;
mod png;
mod tex;
mod txt;
mod write;

pub use matrices::delivery;
pub use write::write_whole;

use crate::algebra::formats::modulus_text;
use crate::algebra::{Field, Matrix};

/// Which matrix of a code it is.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
pub enum What {
    /// A check matrix: its null space is the code.
    CheckMatrix,
    /// A generator matrix: its row space is the code.
    GeneratorMatrix,
}

impl What {
    /// As written in a spec.
    pub fn name(self) -> &'static str {
        match self {
            What::CheckMatrix => "check_matrix",
            What::GeneratorMatrix => "generator_matrix",
        }
    }
}

/// In which form it is handed over.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
pub enum Form {
    /// As the spec builds it.
    AsBuilt,
    /// With an identity in the information positions (in the others, for a check matrix).
    Systematic,
    /// In reduced row echelon form.
    Reduced,
}

impl Form {
    /// As written on the command line.
    pub fn name(self) -> &'static str {
        match self {
            Form::AsBuilt => "as-built",
            Form::Systematic => "systematic",
            Form::Reduced => "reduced",
        }
    }
}

/// A matrix on its way out, with all that its reader must know.
#[derive(Clone, Debug)]
pub struct Delivery {
    /// The code's name, arguments included.
    pub name: String,
    /// Which matrix of the code.
    pub what: What,
    /// In which form.
    pub form: Form,
    /// The field of the entries.
    pub field: Field,
    /// The code's length.
    pub n: usize,
    /// The code's dimension.
    pub k: usize,
    /// The matrix; n columns.
    pub matrix: Matrix,
    /// Where the information symbols stand, in their order, from 0, when that is defined.
    pub information_positions: Option<Vec<usize>>,
    /// The n names of the positions, when the spec gives them.
    pub position_names: Option<Vec<String>>,
    /// Conventions and remarks, one line each.
    pub notes: Vec<String>,
}

impl Delivery {
    /// What a comment at the head of a file says, one line each, without line feeds within.
    fn head(&self) -> Vec<String> {
        let mut lines = vec![
            format!(
                "{} of {}, {}",
                self.what.name(),
                self.name,
                self.form.name()
            ),
            format!("n = {}, k = {}", self.n, self.k),
            match modulus_text(&self.field) {
                Some(modulus) => format!(
                    "over GF({}) with modulus {modulus}; an entry's digits in base {} are its \
                     coefficients of 1, x, x^2, ..., lowest first",
                    self.field.order(),
                    self.field.characteristic()
                ),
                None => format!("over GF({})", self.field.order()),
            },
        ];
        if let Some(positions) = &self.information_positions {
            let positions: Vec<String> = positions.iter().map(usize::to_string).collect();
            lines.push(format!(
                "information positions (from 0): {}",
                positions.join(" ")
            ));
        }
        if let Some(names) = &self.position_names {
            lines.push(format!("positions: {}", names.join(" ")));
        }
        lines.extend(self.notes.iter().cloned());
        for line in &mut lines {
            *line = line.replace(['\n', '\r'], " ");
        }
        lines
    }

    /// The rows, entries written out.
    fn rows(&self) -> impl Iterator<Item = Vec<String>> + '_ {
        (0..self.matrix.rows()).map(|row| {
            let entries = self.matrix.row(row);
            entries.iter().map(|entry| entry.to_string()).collect()
        })
    }
}

/// A format that matrices are written in.
#[derive(Clone, Copy, Debug)]
pub struct Format {
    /// As written in a spec and on the command line.
    pub name: &'static str,
    /// The file name extension, without a dot.
    pub extension: &'static str,
    /// What it is.
    pub says: &'static str,
    /// The writer; its error says why this matrix cannot be written so, and what to take instead.
    pub write: fn(&Delivery) -> Result<Vec<u8>, String>,
}

/// Every matrix format, in the order they are named to the user.
pub const FORMATS: &[Format] = &[
    mtx::FORMAT,
    alist::FORMAT,
    npy::FORMAT,
    csv::FORMAT,
    txt::FORMAT,
    json::FORMAT,
    png::FORMAT,
    tex::FORMAT,
    mem::FORMAT,
];

/// The format of this name.
pub fn format(name: &str) -> Option<&'static Format> {
    FORMATS.iter().find(|format| format.name == name)
}

/// Why a format that is nothing but rows cannot carry this matrix.
fn needs_rows(delivery: &Delivery, format: &str) -> Result<(), String> {
    let matrix = &delivery.matrix;
    if matrix.rows() == 0 || matrix.columns() == 0 {
        return Err(format!(
            "a matrix of {} rows and {} columns leaves no trace in {format}; take json, npy or mtx",
            matrix.rows(),
            matrix.columns()
        ));
    }
    Ok(())
}
