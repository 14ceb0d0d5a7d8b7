//! The parser that pest makes of `grammar/cosetta.pest`.

#![allow(missing_docs)]

/// The generated parser; its rules are those of the grammar file.
#[derive(pest_derive::Parser)]
#[grammar = "../grammar/cosetta.pest"]
pub struct Grammar;

/// Whether a rule is a bare mark or keyword, of no interest once its place is read.
pub fn is_mark(rule: Rule) -> bool {
    use Rule::*;
    matches!(
        rule,
        equals
            | comma
            | colon
            | dot
            | bar
            | caret
            | times
            | open
            | close
            | open_list
            | close_list
            | open_set
            | close_set
            | kw_use
            | kw_field
            | kw_let
            | kw_matrix
            | kw_code
            | kw_channel
            | kw_deliver
            | kw_over
            | kw_then
            | kw_is
            | kw_require
            | kw_prefer
            | kw_note
            | kw_where
            | kw_as
            | kw_to
            | kw_if
            | kw_else
            | kw_for
            | kw_in
            | kw_pick
            | kw_from
            | gf
            | word_modulus
            | word_with
            | word_weights
            | word_form
            | word_columns
            | word_of
            | word_height
            | word_sorted
            | word_by
            | word_take
            | word_monomials
            | word_variables
            | word_points
            | word_circulants
            | word_size
            | word_blocks
            | EOI
    )
}
