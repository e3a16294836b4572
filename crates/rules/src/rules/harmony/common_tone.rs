//! A voice inside leaps away from a note that the next chord has too.
//!
//! Why: what two chords share binds them when it stays where it is; a leap past it sounds like another singer entering.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | E5 - - - | D5 - - - |
//! A | C5 - - - | B4 - - - |
//! T | G3 - - - | D4 - - - |
//! //             ^^ common tone (weakness): T
//! B | C3 - - - | G3 - - - |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | E5 - - - | D5 - - - |
//! A | C5 - - - | B4 - - - |
//! T | G3 - - - | G3 - - - |
//! B | C3 - - - | G2 - - - |
//! ```
//!
//! # Does not apply
//!
//! Where another voice keeps the note:
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | E5 - - - | D5 - - - |
//! A | G4 - - - | G4 - - - |
//! T | G3 - - - | D4 - - - |
//! B | C3 - - - | B2 - - - |
//! ```
//!
//! # What to do
//!
//! Keep the note in its voice, and move the others by the shortest way.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Chords(check),
    cases: &[&ORDINARY],
    numbers: &[&LEAP],
    sources: &[
        source::OPEN_MUSIC_THEORY,
        source::HURON.at("common tones and nearest notes, D10 and D11"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "a voice inside leaps further than a fourth, no octave, from a note that the next chord has too and no other voice keeps",
    settings: &[
        allow(Style::Free, "instruments change their register"),
        weakness(Style::Chorale, "the shortest way (Huron)"),
    ],
};

static LEAP: NumberOf = NumberOf {
    name: "leap",
    means: "the widest leap that passes, in scale steps (3 for a fourth)",
    value: 3,
    bounds: (1, 6),
};

fn check(chord: &Chord<'_>, found: &mut Found<'_>) {
    let widest = found.number(&LEAP);
    for leaving in chord.leavings() {
        if !leaving.leaps_beyond(widest)
            || !leaving.could_stay()
            || !leaving.is_inner()
            || leaving.is_kept_elsewhere()
        {
            continue;
        }
        found.member(&ORDINARY, (&leaving.from, &leaving.to), || {
            format!(
                "Common tone: {} leaps from {}, though {} has {} too. Keep the note, or go to the nearest one.",
                leaving.name(),
                leaving.words(),
                leaving.next.name(),
                leaving.from.pitch.class_name(),
            )
        });
    }
}
