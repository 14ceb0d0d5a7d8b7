//! `residue`: the code outside the support of a word.

use super::{Step, mask, positions};
use crate::code::{Bound, Code, Knowledge, Made, Rules, lower, upper, weight};
use crate::finding::{Found, catalogue};
use crate::source::Span;
use crate::value::{Call, optional};

/// The register's entry.
pub const ENTRY: Step = Step {
    name: "residue",
    parameters: &[
        optional("word", "a list of n elements", "a word of the code"),
        positions::PARAMETERS[0],
        positions::PARAMETERS[1],
        positions::PARAMETERS[2],
    ],
    says: "Leaves the positions out where a word of the code is not zero; the word is given, or the positions where it is not zero.",
    theory: "For a word of weight w, d is at least d - w + w/q of the code before, rounded up, and k falls \
             by one when w(q - 1) < qd (Hill and Newton, 1992; for w = d: MacWilliams and Sloane, 1977, ch. 17 §5).",
    example: "\
field bit = GF(2)
code gauge_word over bit
  = simplex(4)
  then residue(at: {7..14})
  is [7, 3, 4]
",
    run,
};

fn run(code: &Code, call: &Call) -> Found<Made> {
    let support = if call.has("word") {
        stated(code, call)?
    } else {
        let positions = positions::positions(code, call)?;
        carries_a_word(code, call, &positions)?;
        positions
    };
    let kept = positions::others(code.length(), &support);
    Ok(Made::new(
        code.field().clone(),
        kept.len(),
        positions::punctured(code, &support),
    )
    .rules(Residue { kept }))
}

/// The support of the word given.
fn stated(code: &Code, call: &Call) -> Found<Vec<usize>> {
    if ["first", "last", "at"].iter().any(|name| call.has(name)) {
        return Err(call.trouble(
            catalogue::BAD_ARGUMENT,
            "`residue` takes either a word or positions",
        ));
    }
    let word = mask::word(call, "word", code.field(), code.length())?;
    let wrong = |message: &str| Err(call.wrong("word", catalogue::BAD_ARGUMENT, message));
    if !code.contains(&word) {
        return wrong("this is no word of the code");
    }
    match weight(&word) {
        0 => wrong("the zero word leaves nothing out"),
        full if full == code.length() => wrong("this word has no zero, so no position is left"),
        _ => Ok((0..word.len()).filter(|&at| word[at] != 0).collect()),
    }
}

/// That the code has a word that is not zero just at these positions.
fn carries_a_word(code: &Code, call: &Call, positions: &[usize]) -> Found<()> {
    let outside = positions::others(code.length(), positions);
    let inside = Code::new(
        Made::new(
            code.field().clone(),
            positions.len(),
            positions::shortened(code, &outside),
        ),
        call.name,
        Span::default(),
        crate::code::OriginKind::Start,
    );
    let (message, help) = match inside.dimension() {
        1 if weight(&inside.generator_matrix().row(0)) == positions.len() => return Ok(()),
        0 | 1 => (
            "no word of the code is non-zero at just these positions",
            "to leave them out nevertheless, write `puncture`",
        ),
        _ => (
            "several words of the code live on these positions, so it does not follow which is meant",
            "write `residue(word: …)` with the word itself",
        ),
    };
    let mut finding = call.trouble(catalogue::BAD_POSITIONS, message);
    finding.help = Some(help.into());
    Err(finding)
}

struct Residue {
    kept: Vec<usize>,
}

impl Rules for Residue {
    fn distance(&self, code: &Code, known: &dyn Knowledge) -> Vec<Bound> {
        let parent = &code.origin().parents[0];
        let before = known.distance(parent);
        if before.lower == 0 || code.dimension() == 0 {
            return Vec::new();
        }
        // Over all factors f, the words c − f·w have q·wt(rest) + (q − 1)·w non-zero entries
        // together, and none of these words is zero where the rest is not.
        let w = parent.length() - self.kept.len();
        let q = code.field().order() as usize;
        let lost = w * (q - 1) / q;
        let mut bounds = Vec::new();
        if before.lower > lost + 1 {
            bounds.push(lower(
                before.lower - lost,
                "residual-code",
                format!(
                    "outside a word of weight {w}, of words of weight at least {} at most {lost} is lost on average",
                    before.lower
                ),
            ));
        }
        if let Some(word) = before.witness {
            let rest = mask::at(&word, &self.kept);
            if weight(&rest) > 0 {
                let says = format!("a word of weight {} before, cut down", before.upper);
                bounds.push(upper(weight(&rest), "residual-code", says, Some(rest)));
            }
        }
        bounds
    }
}
