//! All the voices move in the same direction.
//!
//! Why: the texture slides as a block, and no voice balances another.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//!
//! S | C5 D5 |
//! //     ^^ all one way (weakness): S and A and B
//! A | E4 A4 |
//! B | C3 F3 |
//! ```
//!
//! Worst of all between two chords in root position a step apart:
//!
//! ```voices
//! style chorale
//! key C major
//!
//! S | C4 F4 |
//! //     ^^ all one way (weakness): S and A and T and B
//! A | G3 D4 |
//! T | E3 A3 |
//! B | C3 D3 |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//!
//! S | C5 D5 |
//! A | F4 A4 |
//! B | A3 F3 |
//! ```
//!
//! # Does not apply
//!
//! A chain of sixth chords, a chord that may be the same, and in a chorale a bass that leaps a
//! fifth under a step in the highest voice, as at every close:
//!
//! ```voices
//! style chorale
//!
//! S | C5 D5 |
//! A | G4 A4 |
//! B | E4 F4 |
//! ```
//!
//! ```voices
//! style chorale
//!
//! S | C5 E5 |
//! A | E4 G4 |
//! B | C3 G3 |
//! ```
//!
//! ```voices
//! style chorale
//!
//! S | D5 C5 |
//! A | B4 G4 |
//! T | G4 E4 |
//! B | G3 C3 |
//! ```
//!
//! # What to do
//!
//! Let one voice stay or move the other way; most often the bass.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Sonorities(check),
    cases: &[&ORDINARY, &BASS, &ROOT_STEP],
    numbers: &[],
    sources: &[
        source::KOSTKA_PAYNE,
        source::PROUT_HARMONY,
        source::CHORALES_READ.at(
            "where the upper voices go one way outside one chord, a bass that steps goes with them 33 times and against them 465",
        ),
        source::OPEN_MUSIC_THEORY,
        source::BUTTERFIELD,
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "in three parts or more, all of them sounding and moving, not in a chain of sixth chords nor inside one chord",
    settings: &[
        allow(Style::Free, "a matter of taste"),
        weakness(Style::Chorale, "handbooks warn of it (Prout, from memory)"),
        weakness(Style::Motet, "handbooks warn of it"),
        weakness(Style::Species1, "handbooks warn of it"),
    ],
};

static BASS: Case = Case {
    name: "bass",
    when: "the same where the bass leaps a fifth, or an octave, and the highest voice moves by step",
    settings: &[
        allow(Style::Free, "a matter of taste"),
        allow(
            Style::Chorale,
            "the close (direct octaves allow it): over a bass that leaps a fifth the three upper voices, going one way, go with it 210 times and against it 6 (156 chorales); an octave, 23 and 7",
        ),
        weakness(Style::Motet, "as over any other bass"),
        weakness(Style::Species1, "as over any other bass"),
    ],
};

static ROOT_STEP: Case = Case {
    name: "root-step",
    when: "the same between two chords in root position whose roots are a step apart, and no parallels are told of",
    settings: &[
        weakness(Style::Free, "the upper parts should go against the bass"),
        weakness(Style::Chorale, "the upper parts should go against the bass"),
        weakness(Style::Motet, "handbooks warn of it"),
        weakness(Style::Species1, "handbooks warn of it"),
    ],
};

fn check(there: &Sounding<'_>, found: &mut Found<'_>) {
    if there.parts() < 3 || there.keeps_chord() {
        return;
    }
    let Some(rising) = there.all_move_one_way() else {
        return;
    };
    if there.goes_in_sixth_chords() {
        return;
    }
    let voices: Vec<usize> = there.piece.texture.sounding(there.index).collect();
    // Parallels with it are told by themselves.
    let parallels = ["parallel-fifths", "parallel-octaves", "parallel-unisons"];
    let by_root_step = there.steps_between_roots()
        && !there
            .moves(false)
            .any(|step| found.is_told_of_pair(&parallels, &step));
    let case = if by_root_step {
        &ROOT_STEP
    } else if there.bass_leaps_under_step() {
        &BASS
    } else {
        &ORDINARY
    };
    found.sonority(case, &voices, there.onset(), || {
        let way = if rising { "up" } else { "down" };
        let mend = if by_root_step {
            "Two chords in root position a step apart: let the upper voices go against the bass."
        } else {
            "Let one of them stay or move the other way."
        };
        format!(
            "All one way: {} all move {way} together. {mend}",
            there.piece.names(&voices)
        )
    });
}
