//! Two upper voices clash over a bass they both agree with.
//!
//! Why: each agrees with the lowest voice, and still the second or the seventh between them needs a reason:
//! a step through it, or a preparation.
//!
//! # Fails
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | E5 - - - | A5 - - - | E5 - - - |
//! //             ^ upper clash: S and A
//! A | B4 - - - | G5 - - - | C5 - - - |
//! B | E3 - - - | C4 - - - | A3 - - - |
//! ```
//!
//! In a chorale, where no seventh chord holds the notes together:
//!
//! ```voices
//! style chorale
//!
//! S | C5 Eb5 C5 |
//! //     ^^^ upper clash (weakness): S and A
//! A | G4 E4  G4 |
//! T | C4 C4  C4 |
//! B | C3 C3  C3 |
//! ```
//!
//! # Passes
//!
//! The fifth is held and goes down to make room for the sixth:
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | B4 - - - | A4 - -  - |
//! A | G4 - - - | -  - F4 - |
//! B | G3 - - - | C3 - F3 - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style chorale
//!
//! S | E5 - | A5 - |
//! A | C5 - | G5 - |
//! B | A3 - | C4 - |
//! ```
//!
//! # What to do
//!
//! Prepare one of the two and let it go down by step, or give them notes that agree.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&ORDINARY, &NO_CHORD],
    numbers: &[],
    sources: &[source::LEHMANN.at("lesson XIII")],
};

static ORDINARY: Case = Case {
    name: "",
    when: "a second or a seventh among upper voices, and no figure accounts for it; where chords are heard, only a note strange to the sure chord that comes or goes by leap",
    settings: &[
        weakness(
            Style::Free,
            "where one of the two is strange to the chord (Lehmann, lesson XIII)",
        ),
        fault(Style::Motet, "upper voices agree with each other"),
        fault(
            Style::Species1,
            "upper voices agree with each other (Lehmann, lesson XIII)",
        ),
    ],
};

static NO_CHORD: Case = Case {
    name: "no-chord",
    when: "the same in a sonority that makes no triad or seventh chord, ornaments and suspensions left out; in strict styles as elsewhere",
    settings: &[
        allow(
            Style::Free,
            "chords of the ninth and more are at home there",
        ),
        weakness(
            Style::Chorale,
            "upper voices agree, or are notes of one chord",
        ),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    let (accused, is_strange) = match discord.accused(found.style()) {
        Some((accused, None)) => (accused, true),
        None if discord.is_in_no_chord(found.style()) => (discord.dissonant(), false),
        _ => return,
    };
    // With chords, a note that comes and goes by step over a bass it agrees with is an ornament.
    let steps = discord.comes_and_goes_by_step(accused);
    if discord.is_over_bass() || (is_strange && found.style().has_chords() && steps) {
        return;
    }
    let case = if is_strange { &ORDINARY } else { &NO_CHORD };
    found.accused(case, discord, accused, || {
        format!(
            "Upper clash: {}. Prepare one of them, or let them agree.",
            discord.words_of(accused)
        )
    });
}
