//! A voice leaps down to the seventh of a chord.
//!
//! Why: a seventh that has to fall should come from its own note, by step or from below; a leap down to it goes the same way twice.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | C5 - B4 - | C5 - - - |
//! A | A4 - F4 - | E4 - - - |
//! //       ^^ seventh approach (weakness): A
//! T | F4 - D4 - | C4 - - - |
//! B | F3 - G3 - | C3 - - - |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | C5 - B4 - | C5 - - - |
//! A | F4 - F4 - | E4 - - - |
//! T | A3 - D4 - | C4 - - - |
//! B | F3 - G3 - | C3 - - - |
//! ```
//!
//! # Does not apply
//!
//! Where the seventh was there before, in another voice:
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | C5 - B4 B4 | C5 - - - |
//! A | F4 - F4 D4 | C4 - - - |
//! T | A3 - D4 F3 | E3 - - - |
//! B | F3 - G3 G2 | C3 - - - |
//! ```
//!
//! # What to do
//!
//! Come to it by step, from below, or keep the note from the chord before.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Chords(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::WIELAND,
        source::OPEN_MUSIC_THEORY.at("tendency tones"),
        source::LEHMANN.at("lesson XII"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "the first seventh of a chord is struck after a leap down in its voice, the root sounding beside it",
    settings: &[
        allow(Style::Free, "instruments change their register"),
        weakness(Style::Chorale, "singers find it by step (Wieland)"),
    ],
};

fn check(chord: &Chord<'_>, found: &mut Found<'_>) {
    if !chord.has_sure_seventh() {
        return;
    }
    for reached in chord.reaches(Tone::Seventh) {
        let sounds = chord.has_root_beside(&reached.note);
        if !reached.leaps_down() || !sounds || reached.leads_up(chord) {
            continue;
        }
        let Reached { before, note } = &reached;
        found.member(&ORDINARY, (before, note), || {
            format!(
                "Seventh approach: {} falls {} from {} to {}, the seventh of {}. Come to it by step or from below.",
                chord.piece.name(note.voice),
                reached.interval(),
                before.pitch,
                note.pitch,
                chord.name(),
            )
        });
    }
}
