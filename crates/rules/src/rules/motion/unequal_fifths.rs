//! Two voices move in parallel fifths of which one is diminished.
//!
//! Why: a diminished fifth wants to close to a third. Rising to a perfect one, it goes the wrong
//! way, and the fifths are heard as consecutive; from a perfect fifth into a diminished one the
//! tension grows, which is better.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//!
//! S | F4 G |
//! B | B3 C4 |
//! //     ^ unequal fifths: S and B
//! ```
//!
//! ```voices
//! style species-1
//!
//! S | G4 F | G |
//! B | C4 B3 | E |
//! //     ^ unequal fifths (weakness): S and B
//! ```
//!
//! # Passes
//!
//! The diminished fifth closes to a third:
//!
//! ```voices
//! style chorale
//!
//! S | F4 E |
//! B | B3 C4 |
//! ```
//!
//! A perfect fifth becomes a diminished one that then closes:
//!
//! ```voices
//! style species-1
//!
//! S | G4 F  E |
//! B | C4 B3 C4 |
//! ```
//!
//! It closes too where the lower voice turns before the upper one falls:
//!
//! ```voices
//! style motet
//!
//! S | G4 F4    E4 |
//! A | C4 B3.A3 C4 |
//! B | C3 D3    C3 |
//! ```
//!
//! # Does not apply
//!
//! Both upper voices rise by step over a bass in tenths or sixths with one of them:
//!
//! ```voices
//! style chorale
//!
//! S | F4 G |
//! A | B3 C4 |
//! B | D3 E |
//! ```
//!
//! # What to do
//!
//! Let the diminished fifth close to a third.
//!
//! Lehmann forbids a diminished fifth before a perfect one with the bass, and finds it good where
//! upper voices rise by step; some examiners let both orders pass unless the bass takes part, or
//! falling; out of a perfect fifth most treatises are free.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[
        &INTO_WITH_BASS,
        &INTO_PERFECT,
        &OUT_OF_PERFECT,
        &OUT_WITH_BASS,
    ],
    numbers: &[],
    sources: &[
        source::LEHMANN.at("lesson XI, Fig. 92c"),
        source::BUTTERFIELD.at("ch. 10"),
        source::BACH_CHORALES
            .at("65 into a perfect fifth, none with the bass; 62 out of one, 13 with the bass"),
    ],
};

static INTO_WITH_BASS: Case = Case {
    name: "into-perfect-with-bass",
    when: "from a diminished to a perfect fifth, with the bass",
    settings: &[
        weakness(
            Style::Free,
            "instruments take it more lightly (common practice)",
        ),
        fault(Style::Chorale, "none in 370 chorales"),
        fault(Style::Motet, "as in strict counterpoint"),
        fault(
            Style::Species1,
            "the second fifth is reached in similar motion (Fux)",
        ),
    ],
};

static INTO_PERFECT: Case = Case {
    name: "into-perfect",
    when: "from a diminished to a perfect fifth, between upper voices",
    settings: &[
        weakness(
            Style::Free,
            "good only when rising by step over a bass in tenths or sixths (Lehmann)",
        ),
        fault(Style::Motet, "as in strict counterpoint"),
        fault(
            Style::Species1,
            "the second fifth is reached in similar motion (Fux)",
        ),
    ],
};

static OUT_OF_PERFECT: Case = Case {
    name: "out-of-perfect",
    when: "from a perfect to a diminished fifth that neither resolves nor passes on by step",
    settings: &[
        allow(Style::Free, "free in most treatises; 62 in 370 chorales"),
        weakness(Style::Motet, "the diminished fifth must resolve or pass"),
        weakness(Style::Species1, "the diminished fifth must resolve or pass"),
    ],
};

static OUT_WITH_BASS: Case = Case {
    name: "out-of-perfect-with-bass",
    when: "the same with the bass",
    settings: &[
        allow(
            Style::Free,
            "free in most treatises; a stricter house minds it (13 in 370 chorales)",
        ),
        weakness(Style::Motet, "the diminished fifth must resolve or pass"),
        weakness(Style::Species1, "the diminished fifth must resolve or pass"),
    ],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    let Some(Consecutive::Unequal(Family::Fifth, way)) = step.consecutive() else {
        return;
    };
    let is_diminished = |i: Option<Interval>| i.is_some_and(Interval::is_diminished);
    match way {
        Way::IntoPerfect => {
            let Some(with_bass) = step.is_with_bass() else {
                return;
            };
            if !is_diminished(step.before()) || (!with_bass && is_covered(step)) {
                return;
            }
            let case = if with_bass {
                &INTO_WITH_BASS
            } else {
                &INTO_PERFECT
            };
            found.pair(case, step, || {
                format!(
                    "Unequal fifths: {}, diminished to perfect. Close the diminished fifth to a third.",
                    step.story()
                )
            });
        }
        Way::OutOfPerfect => {
            if !is_diminished(step.after()) || goes_on_well(step) {
                return;
            }
            let case = if step.is_with_bass() == Some(true) {
                &OUT_WITH_BASS
            } else {
                &OUT_OF_PERFECT
            };
            found.pair(case, step, || {
                format!(
                    "Unequal fifths: {}, perfect to diminished, and the diminished fifth does not resolve. Close it to a third.",
                    step.story()
                )
            });
        }
    }
}

/// Two upper voices that fall, or that rise by step while the bass goes in tenths or sixths with
/// one of them.
fn is_covered(step: &PairMove<'_>) -> bool {
    if !step.rises(step.top()) {
        return true;
    }
    let voices = [step.pair.upper, step.pair.lower];
    voices.iter().all(|&v| step.steps(v))
        && voices
            .iter()
            .any(|&v| step.sounding.goes_in_thirds_or_sixths_with_bass(v))
}

/// The diminished fifth closes by step in at least one voice, though the other turn meanwhile, or
/// both voices pass on by step. Where the line goes no further, nothing is held against it.
fn goes_on_well(step: &PairMove<'_>) -> bool {
    let Some(next) = step.next() else { return true };
    let (top, foot) = (step.top(), step.foot());
    let steps_on = |voice, up| {
        step.next_of(voice)
            .is_some_and(|on| on.steps(voice) && on.rises(voice) == up)
    };
    let passes = [top, foot]
        .iter()
        .all(|&v| next.steps(v) && next.rises(v) == step.rises(v));
    steps_on(top, false) || steps_on(foot, true) || passes
}
