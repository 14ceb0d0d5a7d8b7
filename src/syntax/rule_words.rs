//! The words for each rule of the grammar, for messages that say what was expected.

use super::grammar::Rule;

/// Rank, words, and what to write.
pub type Words = (u8, &'static str, &'static str);

/// From this rank on, words are named only where there are no others.
pub const MINOR: u8 = 20;

/// Rank (likeliest first), words and help for a rule; `None` for what is not worth naming.
/// `before` is the last token before the place.
pub fn words(rule: Rule, before: &str) -> Option<Words> {
    words_after(rule, before).or_else(|| words_anywhere(rule))
}

/// The words for rules that mean something particular behind a certain token.
fn words_after(rule: Rule, before: &str) -> Option<Words> {
    use Rule::*;
    Some(match (rule, before) {
        (name | step, "then") => (
            1,
            "a step name such as `extend`",
            "write `then extend` or `then shorten(first: 3)`",
        ),
        (field_operand | field_literal | named | gf, "over") => {
            (1, "a field", "write a field's name or `GF(2^8)`")
        }
        (name, "as") => (
            1,
            "a format such as `mtx`",
            "write `check_matrix as mtx, npy`",
        ),
        (name, "\"") => (
            1,
            "an artefact such as `check_matrix as mtx`",
            "write what is delivered and in which formats: `check_matrix as mtx, npy`",
        ),
        (bounds | open_list, "is") => (
            1,
            "`[`",
            "a claim is written `is [n, k, d]`; two values are compared with `=`",
        ),
        _ => return None,
    })
}

fn words_anywhere(rule: Rule) -> Option<Words> {
    use Rule::*;
    Some(match rule {
        equals => (1, "`=`", "write `=` before the value"),
        name | label => (
            2,
            "a name",
            "a name begins with a letter and has letters, digits and `_`",
        ),
        string => (1, "a text in quotes", "write it between quotes: `\"…\"`"),
        expression | conditional | logic | range | sum | primary | prefix | named | row_named
        | condition | field_operand | phrase_operand | number | integer | decimal | hexadecimal
        | binary | bracketed | boolean | set | list | field_literal | plain_field | gf
        | phrase_part => (
            3,
            "a value",
            "a value is a number, a name, a call such as `hamming(3)`, a set `{ }` or a list `[ ]`",
        ),
        bound | compared => (
            2,
            "a value, a bound such as `>= 4`, or `_`",
            "`_` leaves an entry of a claim open",
        ),
        blank => (4, "`_`", ""),
        bounds | open_list => (MINOR, "`[`", ""),
        parameters => (MINOR, "parameters in `( )`", ""),
        parameter => (
            2,
            "a parameter such as `r in 4..9`",
            "write `NAME in DOMAIN`, with `= VALUE` for a default",
        ),
        domain => (3, "`in` and a set", "write `r in 4..9` or `s in {0, 4, 8}`"),
        default => (4, "a default after `=`", ""),
        arguments => (MINOR, "arguments in `( )`", ""),
        argument => (3, "an argument", "write `f(3)` or `f(length: 7)`"),
        comma => (5, "`,`", "two items of a list are separated by `,`"),
        colon => (
            5,
            "`:`",
            "write each weight with its count: `{0: 1, 8: 759}`",
        ),
        open => (MINOR, "`(`", ""),
        close => (6, "`)`", ""),
        close_list => (6, "`]`", ""),
        open_set => (6, "`{`", ""),
        close_set => (6, "`}`", ""),
        bar => (4, "`|`", "a row begins and ends with `|`: `| 1 0 1 |`"),
        row | rows | shifts => (
            3,
            "a row `| … |`",
            "a row begins and ends with `|`: `| 1 0 1 |`",
        ),
        row_entry | row_exponent => (
            5,
            "an entry",
            "entries are numbers, names or powers, separated by blanks; sums stand in `( )`",
        ),
        zero_block => (6, "`-`", ""),
        minus | index | member | dot => return None,
        caret => (4, "`^`", ""),
        times => (6, "`*`", ""),
        operator | range_operator | sum_operator | logic_operator => (
            7,
            "an operator",
            "put an operator between two values; a declaration begins with its keyword",
        ),
        comparison => (7, "an operator", ""),
        phrase_bound => return None,
        then | kw_then => (8, "`then`", "a step begins with `then`: `then extend`"),
        over | kw_over => (9, "`over`", ""),
        kw_if => return None,
        kw_else => (1, "`else`", "write `A if CONDITION else B`"),
        claim | require | prefer | bits | note | kw_is | kw_require | kw_prefer | kw_bits
        | kw_note => (10, "a clause such as `is` or `require`", ""),
        clause => (
            3,
            "a clause",
            "clauses are `is`, `require`, `prefer`, `bits` and `note`",
        ),
        kw_to => (1, "`to` and a folder", "write `deliver NAME to \"folder\"`"),
        kw_as | form => (
            2,
            "`as` and formats",
            "write `check_matrix as mtx` or `check_matrix in systematic form as mtx`",
        ),
        word_form => (
            1,
            "`form`",
            "write `check_matrix in systematic form as mtx`",
        ),
        artefact => (
            3,
            "an artefact",
            "write what is delivered such as `check_matrix as mtx, npy`",
        ),
        kw_in => (2, "`in`", "write `NAME in SET`, such as `r in 4..9`"),
        kw_for => (8, "`for`", ""),
        comprehension => (8, "`for`", ""),
        binder => (1, "a variable such as `x in S`", "write `NAME in SET`"),
        r#where | kw_where => (9, "`where`", ""),
        kw_from => (
            2,
            "`from` and the candidates",
            "write `pick r in 4..9 minimizing n from CODE`",
        ),
        aim => (
            2,
            "`minimizing` or `maximizing`",
            "write `pick r in 4..9 minimizing n from CODE`",
        ),
        relation => (4, "`where` and the generator's equation", ""),
        modulus | word_modulus => (9, "`modulus`", ""),
        weights | word_with => (9, "`with weights`", ""),
        word_weights => (1, "`weights`", "write `with weights {0: 1, 8: 759}`"),
        weight_table => (1, "`{`", "write `with weights {0: 1, 8: 759}`"),
        weight => (
            1,
            "a weight and its count such as `8: 759`",
            "write `with weights {0: 1, 8: 759}`",
        ),
        group => (
            2,
            "a group of bits such as `data[63..0]`",
            "write `bits data[63..0], check[7..0]`",
        ),
        group_range => (6, "an index range such as `[63..0]`", ""),
        use_names => (
            4,
            "names in `( )`",
            "write `use \"file.coset\" (a, b)` to take only some names",
        ),
        word_of => (
            1,
            "`of`",
            "write `columns v of height 8` or `circulants of size 27`",
        ),
        word_height => (1, "`height`", "write `columns v of height 8`"),
        word_size => (1, "`size`", "write `circulants of size 27`"),
        word_variables => (1, "`variables`", "write `in 4 variables`"),
        variables => (2, "`in m variables`", ""),
        coordinates => (
            3,
            "coordinates such as `(x, y)`",
            "write `points (x, y) where …` or `points in 4 variables`",
        ),
        monomial | power => (
            3,
            "a monomial such as `x^i`",
            "write `monomials x^i * y^j where …` or `monomials in 4 variables where degree <= 2`",
        ),
        sorted | word_sorted => (9, "`sorted by`", ""),
        word_by => (1, "`by`", "write `sorted by weight(v), v`"),
        take | word_take => (9, "`take`", ""),
        sort_key => (3, "a value to sort by", ""),
        direction => (9, "`descending`", ""),
        use_declaration | kw_use | field_declaration | kw_field | let_declaration | kw_let
        | matrix_declaration | kw_matrix | code_declaration | kw_code | channel_declaration
        | kw_channel | deliver_declaration | kw_deliver | EOI => (11, "the next declaration", ""),
        _ => return None,
    })
}
