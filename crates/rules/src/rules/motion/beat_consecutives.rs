//! The same perfect interval comes on two beats, over an ornament.
//!
//! Why: an ornament between two beats does not hide from the ear that the beats are consecutive
//! fifths or octaves; how much it matters depends on the style.
//!
//! # Fails
//!
//! ```voices
//! style species-5
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | F4 A4.C5 | B4 - |
//! //             ^^ beat consecutives (weakness): S and C
//! C | D4 - | E4 - |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-5
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | D5 A4.B4 | C5 - |
//! C | D4 - | E4 - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style chorale
//!
//! S | A4.C5 B4 |
//! B | D4    E4 |
//! ```
//!
//! # What to do
//!
//! Change the interval on one of the two beats. A house that teaches the stricter rule in
//! chorales sets both cases there.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&FIFTHS, &OCTAVES],
    numbers: &[],
    sources: &[
        source::AP_GUIDE.stricter("in chorales too"),
        source::BACH_CHORALES
            .looser("212 fifths and 83 octaves from quarter to quarter in the same direction"),
    ],
};

static FIFTHS: Case = Case {
    name: "fifths",
    when: "fifths on two beats, both voices moved the same way, a note between them on no beat",
    settings: &[
        allow(Style::Free, "the chorales have 212"),
        allow(Style::Species1, "nothing stands between two beats"),
        weakness(
            Style::Species5,
            "strict counterpoint looks from beat to beat",
        ),
    ],
};

static OCTAVES: Case = Case {
    name: "octaves",
    when: "octaves or unisons on two beats, likewise",
    settings: &[
        allow(Style::Free, "the chorales have 83"),
        allow(Style::Species1, "nothing stands between two beats"),
        weakness(
            Style::Species5,
            "strict counterpoint looks from beat to beat",
        ),
    ],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    let Some(family) = step.sounding.family_of(step.pair) else {
        return;
    };
    let case = match family {
        Family::Fifth => &FIFTHS,
        Family::Octave => &OCTAVES,
    };
    let Some(beat) = step.from_beat() else { return };
    if beat.same_perfect().is_none() {
        return;
    }
    found.succession(case, &beat, || {
        let noun = beat.noun();
        format!(
            "Consecutive {noun} from beat to beat: {}, over an ornament. Change the interval on one of the beats.",
            beat.story()
        )
    });
}
