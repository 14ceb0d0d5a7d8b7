//! Every form the language has can be read, with exact spans.

mod syntax_support;

use syntax_support::{findings, shape};

#[test]
fn memory_word_is_read() {
    let text = r##"## SRAM word of the tide gauge: correct any one bit, detect any two.
field bit = GF(2)

code sram_word over bit
  = hamming(7)
  then extend
  then shorten(first: n - 72)
  then arrange(data: first)
  is [72, 64, 4]
  require corrects 1 while detecting 2
  prefer  row_weight <= 36
  bits data[63..0], check[7..0]
"##;
    assert_eq!(findings(text), "");
    insta::assert_snapshot!(shape(text));
}

#[test]
fn a_family_and_a_choice_is_read() {
    let text = r##"## One definition, a whole family; a member of it chosen by search.
code guarded(r in 4..9) over bit
  = hamming(r - 1)
  then extend
  is [2^(r-1), 2^(r-1) - r, 4]

code bus_word over bit
  = pick r in 4..9 minimizing n
      from guarded(r) then shorten(first: k - 32)
  is [39, 32, 4]
"##;
    assert_eq!(findings(text), "");
    insta::assert_snapshot!(shape(text));
}

#[test]
fn columns_and_rows_is_read() {
    let text = r##"## A check matrix given as a family of columns.
matrix odd_columns over bit
  = columns v of height 8
      where weight(v) mod 2 = 1
      sorted by weight(v), v
      take 72

code cache_line over bit = check(odd_columns)
  is [72, 64, 4]
  require column_weight odd

matrix small over bit
  = | 1 0 1 0 1 0 1 |
    | 0 1 1 0 0 1 1 |
    | 0 0 0 1 1 1 1 |
"##;
    assert_eq!(findings(text), "");
    insta::assert_snapshot!(shape(text));
}

#[test]
fn evaluations_is_read() {
    let text = r##"## Evaluations of low-degree polynomials, on a whole space or on a curve.
field hex = GF(16) where a^4 = a + 1

code broadcast(m in 1..16) over bit
  = evaluate(monomials in m variables where degree <= 1, at: points in m variables)
  is [2^m, m + 1, _]

code curve over hex
  = evaluate(monomials x^i * y^j where 4*i + 5*j <= 21 and j < 4,
             at: points (x, y) where y^4 + y = x^5)
  is [64, _, >= 43]
"##;
    assert_eq!(findings(text), "");
    insta::assert_snapshot!(shape(text));
}

#[test]
fn a_concatenated_frame_is_read() {
    let text = r##"## A concatenated frame: byte symbols outside, bits inside.
field byte = GF(2^8) where a^8 = a^4 + a^3 + a^2 + 1
channel sea = bsc(0.004)

code outer over byte = reed_solomon(length: 60, dimension: 44, first_root: 0)
code inner over bit  = reed_muller(order: 1, variables: 7)
code frame           = outer then concatenate(inner)
  is [7680, 352, >= 1088]
  require corrects 500
  require failure(sea) <= 1e-12
"##;
    assert_eq!(findings(text), "");
    insta::assert_snapshot!(shape(text));
}

#[test]
fn storage_shards_is_read() {
    let text = r##"## Shards on shore: any four may be lost.
code shards over byte
  = span(blocks | identity(10)  cauchy(rows: powers(0..9), columns: powers(10..13)) |)
  is [14, 10, 5]
  require mds
  require recovers 4 losses
"##;
    assert_eq!(findings(text), "");
    insta::assert_snapshot!(shape(text));
}

#[test]
fn shifts_is_read() {
    let text = r##"## A quasi-cyclic sparse check matrix: shifts, `-` for the zero block.
code link over bit
  = check(circulants of size 27
      |  0  -  5  0  0  - |
      | 22  0  -  -  0  0 |
      |  6  -  0 10  -  0 |)
  require girth >= 6
"##;
    assert_eq!(findings(text), "");
    insta::assert_snapshot!(shape(text));
}

#[test]
fn a_delivery_is_read() {
    let text = r##"## What is handed over, each file whole or not at all.
deliver sram_word to "out"
  check_matrix as mtx, npy
  corrector    as sv
  vectors      as json
"##;
    assert_eq!(findings(text), "");
    insta::assert_snapshot!(shape(text));
}
#[test]
fn every_form_is_read() {
    let text = include_str!("specs/syntax_every_form.coset");
    assert_eq!(findings(text), "");
    insta::assert_snapshot!(shape(text));
}
