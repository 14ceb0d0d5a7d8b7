//! The codes of all findings, one line each: name, class, and what it means at length.
//!
//! The rule that raises a finding lives beside its cause; only its code stands here, so that
//! `explain`, the editors and the documentation can list them all.

use super::{Class, Severity};

/// The kind of a finding, as machines read it (`claim-distance`).
#[derive(Clone, Copy, Debug)]
pub struct Code {
    /// The stable name.
    pub name: &'static str,
    /// The severity a finding of this kind has unless it is lowered.
    pub severity: Severity,
    /// What it means for the run.
    pub class: Class,
    /// What it means at length.
    pub says: &'static str,
}

impl PartialEq for Code {
    fn eq(&self, other: &Code) -> bool {
        self.name == other.name
    }
}

impl Eq for Code {}

macro_rules! catalogue {
    ($($constant:ident = $name:literal, $severity:ident, $class:ident, $says:literal;)*) => {
        $(
            #[doc = $says]
            pub const $constant: Code = Code {
                name: $name,
                severity: Severity::$severity,
                class: Class::$class,
                says: $says,
            };
        )*
        /// Every code, in the order of this page.
        pub const ALL: &[Code] = &[$($constant),*];
    };
}

catalogue! {
    // Text that cannot be read.
    SYNTAX = "syntax", Error, Malformed, "The text does not follow the grammar here. The message names what could stand at this place.";
    UNREADABLE_FILE = "unreadable-file", Error, Malformed, "A file that the spec names cannot be read, or lies outside the project's root.";
    BAD_TEXT = "bad-text", Error, Malformed, "A file is not UTF-8 text, or its brackets nest too deep to be read.";
    RESERVED_WORD = "reserved-word", Error, Malformed, "A word of the language is used as a name. Choose another name.";

    // Names and dependencies.
    UNKNOWN_NAME = "unknown-name", Error, Malformed, "Nothing of this name is declared, imported, or in the library.";
    DUPLICATE_NAME = "duplicate-name", Error, Malformed, "Two declarations of one file, or two imports, share a name.";
    CYCLE = "cycle", Error, Malformed, "Declarations depend on each other in a circle, so none of them has a value.";
    UNUSED = "unused-declaration", Advice, Remark, "Nothing uses this declaration. It may be a leftover, or a misspelt use may stand elsewhere.";
    SHADOWED_LIBRARY = "shadowed-library", Advice, Remark, "A declaration takes the name of one in the language's library; this file now means its own.";
    UNKNOWN_IMPORT = "unknown-import", Error, Malformed, "The imported file declares nothing of this name.";

    // Values and types.
    WRONG_TYPE = "wrong-type", Error, Malformed, "A value of another kind is needed here.";
    BAD_ARGUMENT = "bad-argument", Error, Malformed, "An argument is missing, given twice, of no parameter, or outside its domain.";
    BAD_NUMBER = "bad-number", Error, Malformed, "An operation has no value here: a division by zero, an inverse of zero, a negative power.";
    LIMIT = "limit", Error, Malformed, "Evaluating this would pass a stated limit of size; the message names the limit.";
    EMPTY_CHOICE = "empty-choice", Error, Malformed, "No candidate is left to choose from.";

    // Fields.
    BAD_FIELD_ORDER = "bad-field-order", Error, Malformed, "A finite field has a prime power as its order.";
    REDUCIBLE_MODULUS = "reducible-modulus", Error, Malformed, "The stated modulus is a product of smaller polynomials, so it makes no field.";
    MODULUS_NOT_PRIMITIVE = "modulus-not-primitive", Error, Malformed, "The modulus is irreducible, but its root does not generate the field.";
    MODULUS_DEGREE = "modulus-degree", Error, Malformed, "The modulus has another degree than the field.";
    NOT_AN_ELEMENT = "not-an-element", Error, Malformed, "An integer names a field element only when it lies in 0 … q−1.";
    FIELD_MISMATCH = "field-mismatch", Error, Malformed, "Two things that must share a field do not.";
    FIELD_UNSTATED = "field-unstated", Error, Malformed, "It does not follow from the spec which field is meant here.";
    UNSTATED_MODULUS = "unstated-modulus", Advice, Remark, "The field's modulus is not stated; the Conway polynomial is assumed. Another choice gives other matrices.";
    UNSTATED_ROOT_FIELD = "unstated-root-field", Advice, Remark, "The field in which the roots of a cyclic code are named is not stated; another choice may give another code.";

    // Constructions and steps.
    SHAPE = "shape", Error, Malformed, "Matrices, positions or lengths do not fit together.";
    BAD_POSITIONS = "bad-positions", Error, Malformed, "A position does not exist in this code, or is named twice.";
    BAD_ROOTS = "bad-roots", Error, Malformed, "The stated roots or generator do not define a cyclic code of this length over this field.";
    BAD_POINTS = "bad-points", Error, Malformed, "Evaluation points or monomials are missing, repeated or do not fit together.";
    MASK_LOST = "mask-lost", Error, Malformed, "A step does not say what becomes of the word that an earlier step adds on the wire.";
    SYMBOL_WIDTH = "symbol-width", Error, Malformed, "The inner code's dimension is not the number of digits of an outer symbol.";
    REDUNDANT_CHECKS = "redundant-checks", Advice, Remark, "The given check matrix has rows that are combinations of others, so k is larger than n minus the number of rows.";
    BAD_FILE_CONTENT = "bad-file-content", Error, Malformed, "A matrix file does not follow its format.";
    BAD_BITS = "bad-bits", Error, Malformed, "The named bits do not match the code's positions.";

    // Claims and requirements.
    CLAIM_LENGTH = "claim-length", Error, Refuted, "The code has another length than claimed.";
    CLAIM_DIMENSION = "claim-dimension", Error, Refuted, "The code has another dimension than claimed.";
    CLAIM_DISTANCE = "claim-distance", Error, Refuted, "The code's minimum distance is not the claimed one.";
    CLAIM_WEIGHTS = "claim-weights", Error, Refuted, "The code's weight distribution is not the claimed one.";
    CLAIM_UNDECIDED = "claim-undecided", Error, Undecided, "The claim was neither proven nor refuted within the budget.";
    REQUIREMENT_FAILS = "requirement-fails", Error, Refuted, "The code does not do what is required.";
    REQUIREMENT_UNDECIDED = "requirement-undecided", Error, Undecided, "The requirement was neither proven nor refuted within the budget.";
    PREFERENCE_FAILS = "preference-fails", Warning, Remark, "The code does not do what is preferred.";
    PREFERENCE_UNDECIDED = "preference-undecided", Warning, Remark, "The preference was neither proven nor refuted within the budget.";
    NOT_AT_ONCE = "not-at-once", Advice, Remark, "Two requirements hold each alone, but no one decoder gives both: what is corrected takes distance away from what is detected.";
    UNKNOWN_REQUIREMENT = "unknown-requirement", Error, Malformed, "No requirement reads like this.";

    // Files handed over.
    UNKNOWN_ARTEFACT = "unknown-artefact", Error, Malformed, "There is no artefact or format of this name, or it cannot be written for this code.";
}
