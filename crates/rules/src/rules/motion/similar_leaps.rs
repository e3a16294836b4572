//! Two voices leap at once in the same direction.
//!
//! Why: while both leap, neither holds the other; together they sound like one clumsy voice.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//!
//! S | C5 F5 |
//! B | E4 G4 |
//! //     ^^ similar leaps (weakness): S and B
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-1
//!
//! S | C5 D5 |
//! B | E4 B4 |
//! ```
//!
//! # Does not apply
//!
//! In a motet or a chorale, where an inner voice takes part:
//!
//! ```voices
//! style motet
//!
//! S | C5 B4 |
//! A | G4 E4 |
//! T | C4 G3 |
//! B | E3 E3 |
//! ```
//!
//! The bass leaps a fourth or a fifth, or the chord may be the same:
//!
//! ```voices
//! style chorale
//!
//! S | D5 F5 |
//! A | B4 A4 |
//! B | G3 D4 |
//! ```
//!
//! ```voices
//! style chorale
//!
//! S | C5 E5 |
//! A | E4 G4 |
//! B | C3 C3 |
//! ```
//!
//! # What to do
//!
//! Let one of the two step, stay, or move the other way.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&ORDINARY, &INNER],
    numbers: &[],
    sources: &[
        source::OPEN_MUSIC_THEORY,
        source::SALZER_SCHACHTER,
        source::RENAISSANCE_WORKS.looser(
            "with an inner voice, in three parts or more, 1,467 pairs leap the same way and 1,366 apart",
        ),
        source::CHORALES_READ.looser(
            "with an inner voice, outside one chord and the bass's fourths and fifths, 441 pairs leap the same way and 233 apart; the outer voices 33 and 26",
        ),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "both a third or more, in two parts or between the outer voices, outside one chord; not where the bass leaps a fourth or fifth",
    settings: &[
        allow(Style::Free, "a matter of taste"),
        weakness(Style::Chorale, "handbooks warn of it"),
        weakness(Style::Motet, "handbooks warn of it"),
        weakness(Style::Species1, "handbooks warn of it (Open Music Theory)"),
    ],
};

static INNER: Case = Case {
    name: "inner",
    when: "the same where an inner voice takes part",
    settings: &[
        allow(Style::Free, "a matter of taste"),
        allow(
            Style::Chorale,
            "inner voices that leap go the same way oftener than not: 441 pairs against 233 (156 chorales)",
        ),
        allow(
            Style::Motet,
            "inner voices that leap go the same way as often as not (314 works)",
        ),
        weakness(Style::Species1, "handbooks warn of it (Open Music Theory)"),
    ],
};

/// The rules that tell the same leaps more closely.
const MORE: [&str; 7] = [
    "parallel-fifths",
    "parallel-octaves",
    "parallel-unisons",
    "direct-fifths",
    "direct-octaves",
    "direct-unisons",
    "overlap",
];

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    let (top, foot) = (step.top(), step.foot());
    let same_way = matches!(step.motion(), Some(Motion::Parallel | Motion::Similar));
    if !same_way || !step.leaps(top) || !step.leaps(foot) || step.sounding.keeps_chord() {
        return;
    }
    // The perfect interval they leap into says more, and so does one voice leaping beyond the
    // other's note; where all the voices go one way, the leaps are part of that.
    if step.bass_leaps_fourth_or_fifth()
        || found.is_told_of_pair(&MORE, step)
        || found.is_told_of_sonority("all-one-way", &step.sounding)
    {
        return;
    }
    let case = if step.is_outer() { &ORDINARY } else { &INNER };
    found.pair(case, step, || {
        let way = if step.rises(top) { "up" } else { "down" };
        format!(
            "Similar leaps: {}, both leaping {way}. Let one of them step or stay.",
            step.story()
        )
    });
}
