//! Steps: from one code to the next.
//!
//! One file a step, one line in the register. A step keeps the presentation as built where it
//! can, and says which theorems carry what was known of the code to what it makes of it.

mod arrange;
mod augment;
mod carried;
mod concatenate;
mod construction_x;
mod direct_sum;
mod dual;
mod expurgate;
mod extend;
mod generalized_concatenate;
mod hull;
mod image;
mod interleave;
mod join;
mod lengthen;
mod lift;
mod mask;
mod meet;
mod permute;
mod plotkin;
mod positions;
mod presentation;
mod product;
mod puncture;
mod repeat;
mod residue;
mod scale;
mod shorten;
mod subcode;
mod subfield;
mod systematic;
mod tensor;
mod trace;
mod truncate;

use crate::code::{Code, Made};
use crate::finding::{Found, catalogue};
use crate::value::{Call, Entry};

/// A step: the code so far and arguments in, a code out.
pub type Step = Entry<fn(&Code, &Call) -> Found<Made>>;

/// All steps.
pub const STEPS: &[&Step] = &[
    &arrange::ENTRY,
    &augment::ENTRY,
    &concatenate::ENTRY,
    &construction_x::ENTRY,
    &direct_sum::ENTRY,
    &dual::ENTRY,
    &expurgate::ENTRY,
    &extend::ENTRY,
    &generalized_concatenate::ENTRY,
    &hull::ENTRY,
    &image::ENTRY,
    &interleave::ENTRY,
    &join::ENTRY,
    &lengthen::ENTRY,
    &lift::ENTRY,
    &mask::ENTRY,
    &meet::ENTRY,
    &permute::ENTRY,
    &plotkin::ENTRY,
    &product::ENTRY,
    &puncture::ENTRY,
    &repeat::ENTRY,
    &residue::ENTRY,
    &scale::ENTRY,
    &shorten::ENTRY,
    &subcode::ENTRY,
    &subfield::ENTRY,
    &systematic::ENTRY,
    &tensor::ENTRY,
    &trace::ENTRY,
    &truncate::ENTRY,
];

/// The step of this name.
pub fn step(name: &str) -> Option<&'static Step> {
    STEPS.iter().copied().find(|entry| entry.name == name)
}

/// What a step makes of a code, the code so far its first parent.
///
/// # Errors
/// When the step refuses its arguments, or does not know what becomes of a mask.
pub fn apply(step: &Step, code: &Code, call: &Call) -> Found<Made> {
    let mut made = (step.run)(code, call)?;
    made.parents.insert(0, code.clone());
    let masked = made.parents.iter().any(|parent| parent.offset().is_some());
    if masked && made.offset.is_none() {
        let mut finding = call.trouble(
            catalogue::MASK_LOST,
            format!(
                "`{}` has no meaning for words with a mask added on the wire",
                step.name
            ),
        );
        finding.help = Some(format!("write `mask` after `{}`", step.name));
        return Err(finding);
    }
    Ok(made)
}
