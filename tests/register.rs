//! Every construction, step and function is documented by an example that runs, and whose claims
//! hold; the library's own claims hold for its members.

mod common;

use common::with_spec;
use cosetta::construct::{self, functions};
use cosetta::derive::{Verdict, properties::PROPERTIES};
use cosetta::evaluate::LIBRARY;
use cosetta::finding::{Class, catalogue};
use cosetta::require::phrases;
use cosetta::step;

/// Runs an example; all its claims must hold, and there must be one.
fn holds(name: &str, example: &str) {
    with_spec(example, |view| {
        let grave: Vec<&String> = view
            .findings
            .iter()
            .filter(|finding| finding.code.class != Class::Remark)
            .map(|finding| &finding.message)
            .collect();
        assert!(
            grave.is_empty(),
            "the example of `{name}`: {grave:?}\n{example}"
        );
        let clauses: Vec<_> = view
            .codes
            .iter()
            .flat_map(|checked| &checked.verdicts.clauses)
            .collect();
        assert!(
            !clauses.is_empty(),
            "the example of `{name}` claims nothing"
        );
        for clause in clauses {
            assert_eq!(
                clause.judgement.verdict,
                Verdict::Holds,
                "`{name}`: {}: {}",
                clause.text,
                clause.judgement.says
            );
        }
    });
}

fn documented(name: &str, says: &str, example: &str) {
    assert!(
        says.ends_with('.'),
        "`{name}` is said to be {says:?}, which is no sentence"
    );
    assert!(
        example.contains(name),
        "the example of `{name}` does not use it"
    );
    holds(name, example);
}

#[test]
fn the_example_of_every_construction_holds() {
    for entry in construct::CONSTRUCTIONS {
        documented(entry.name, entry.says, entry.example);
    }
}

#[test]
fn the_example_of_every_step_holds() {
    for entry in step::STEPS {
        documented(entry.name, entry.says, entry.example);
    }
}

#[test]
fn the_example_of_every_function_holds() {
    for entry in functions::all() {
        documented(entry.name, entry.says, entry.example);
    }
}

#[test]
fn names_in_the_registers_are_unique_and_documented() {
    let mut names: Vec<&str> = construct::CONSTRUCTIONS
        .iter()
        .map(|entry| entry.name)
        .collect();
    names.extend(functions::all().map(|entry| entry.name));
    let count = names.len();
    names.sort_unstable();
    names.dedup();
    assert_eq!(
        names.len(),
        count,
        "a construction and a function share a name"
    );
    assert!(phrases().all(|phrase| phrase.says.ends_with('.')));
    assert!(PROPERTIES.iter().all(|property| !property.says.is_empty()));
    assert!(catalogue::ALL.iter().all(|code| code.says.ends_with('.')));
}

#[test]
fn the_library_holds_what_it_claims() {
    let members = "\
field bit = GF(2)
field trit = GF(3)
field byte = GF(2^8) where a^8 = a^4 + a^3 + a^2 + 1
code one over bit = repetition(9)
  is [9, 1, 9]
code two over trit = parity(7)
  is [7, 6, 2]
code three over trit = hamming(3)
  is [13, 10, 3]
code four over bit = simplex(5)
  is [31, 5, 16]
code five over trit = hadamard(2)
  is [9, 2, 6]
code six over trit = reed_muller(order: 3, variables: 3)
  is [27, 17, 6]
code seven over bit = bch(length: 31, distance: 7)
  is [31, 16, 7]
code eight over byte = reed_solomon(length: 60, dimension: 44, first_root: 0)
  is [60, 44, 17]
code nine over bit = quadratic_residue(17)
  is [17, 9, 5]
code ten = binary_golay
  is [23, 12, 7]
code eleven = ternary_golay
  is [11, 6, 5]
code twelve = hexacode
  is [6, 3, 4]
code thirteen = secded(64)
  is [72, 64, 4]
  require corrects 1 while detecting 2
code fourteen = ethernet_528_514
  is [528, 514, 15]
code fifteen = ethernet_544_514
  is [544, 514, 31]
code sixteen = broadcast_204_188
  is [204, 188, 17]
code seventeen = telemetry_255_223
  is [255, 223, 33]
code eighteen = telemetry_255_239
  is [255, 239, 17]
code nineteen = barcode_26_19
  is [26, 19, 8]
code twenty = disc_c1
  is [32, 28, 5]
code twenty_one = disc_c2
  is [28, 24, 5]
code twenty_two = crc_8_atm(40)
  is [40, 32, 4]
code twenty_three = crc_32_ethernet(512)
  is [512, 480, >= 4]
";
    holds("the library", members);
}

#[test]
fn every_text_of_the_library_can_be_read() {
    for (name, text) in LIBRARY {
        let parsed = cosetta::syntax::parse(cosetta::source::SourceId(0), text);
        assert!(parsed.findings.is_empty(), "{name}: {:?}", parsed.findings);
        assert!(!parsed.file.declarations.is_empty(), "{name} is empty");
    }
}
