//! Steps: from one code to the next.
//!
//! One file a step, one line in the register. A step keeps the presentation as built where it
//! can, and says which theorems carry what was known of the code to what it makes of it.

mod arrange;
mod augment;
mod concatenate;
mod direct_sum;
mod dual;
mod expurgate;
mod extend;
mod image;
mod permute;
mod plotkin;
mod positions;
mod product;
mod puncture;
mod shorten;
mod subfield;

use crate::code::{Code, Made};
use crate::finding::Found;
use crate::value::{Call, Entry};

/// A step: the code so far and arguments in, a code out.
pub type Step = Entry<fn(&Code, &Call) -> Found<Made>>;

/// All steps.
pub const STEPS: &[&Step] = &[
    &arrange::ENTRY,
    &augment::ENTRY,
    &concatenate::ENTRY,
    &direct_sum::ENTRY,
    &dual::ENTRY,
    &expurgate::ENTRY,
    &extend::ENTRY,
    &image::ENTRY,
    &permute::ENTRY,
    &plotkin::ENTRY,
    &product::ENTRY,
    &puncture::ENTRY,
    &shorten::ENTRY,
    &subfield::ENTRY,
];

/// The step of this name.
pub fn step(name: &str) -> Option<&'static Step> {
    STEPS.iter().copied().find(|entry| entry.name == name)
}
