//! The matrices of a code in the form asked for.

use super::{Delivery, Form, What};
use crate::code::{Code, check_positions, information_positions};
use crate::evaluate::CompiledCode;

/// A matrix of a code, ready to be written. Without a form, as built where the code was built
/// from such a matrix, otherwise reduced.
///
/// # Errors
/// When the form does not exist: in words, with what to ask for instead.
pub fn delivery(
    compiled: &CompiledCode,
    what: What,
    form: Option<Form>,
) -> Result<Delivery, String> {
    let code = &compiled.code;
    let as_built = match what {
        What::CheckMatrix => code.check_matrix_as_built(),
        What::GeneratorMatrix => code.generator_matrix_as_built(),
    };
    let form = form.unwrap_or(if as_built.is_some() {
        Form::AsBuilt
    } else {
        Form::Reduced
    });
    let information = information_positions(code);
    let matrix = match (form, what) {
        (Form::AsBuilt, _) => as_built.cloned().ok_or_else(|| {
            format!(
                "{} was not built from a {}, so there is none as built; ask for it in reduced or systematic form",
                compiled.title(),
                what.name().replace('_', " ")
            )
        })?,
        (Form::Reduced, What::CheckMatrix) => code.check_matrix().reduced().matrix,
        (Form::Reduced, What::GeneratorMatrix) => code.generator_matrix().reduced().matrix,
        (Form::Systematic, What::CheckMatrix) => {
            let order = leading(check_positions(code), code);
            code.check_matrix().reduced_in(&order).matrix
        }
        (Form::Systematic, What::GeneratorMatrix) => {
            let order = leading(information.clone(), code);
            code.generator_matrix().reduced_in(&order).matrix
        }
    };
    Ok(Delivery {
        name: compiled.title(),
        what,
        form,
        field: code.field().clone(),
        n: code.length(),
        k: code.dimension(),
        matrix,
        information_positions: Some(information),
        position_names: compiled.position_names.clone(),
        notes: code.assumptions(),
    })
}

/// All positions, those given first.
fn leading(mut first: Vec<usize>, code: &Code) -> Vec<usize> {
    let rest: Vec<usize> = (0..code.length())
        .filter(|at| !first.contains(at))
        .collect();
    first.extend(rest);
    first
}
