//! The seventh of a chord does not go down a step.
//!
//! Why: it is a dissonance, even where no one prepared it, and the ear waits for the note under it.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | C5 - B4 - | C5 - - - |
//! A | G4 - F4 - | G4 - - - |
//! //              ^^ seventh resolution: A
//! T | E4 - D4 - | E4 - - - |
//! B | C4 - G3 - | C4 - - - |
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
//! A | G4 - F4 - | E4 - - - |
//! T | E4 - D4 - | C4 - - - |
//! B | C4 - G3 - | C4 - - - |
//! ```
//!
//! # Does not apply
//!
//! Where it rises in tenths with the bass:
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | E5 - F5 - | G5 - - - |
//! A | C5 - B4 - | C5 - - - |
//! T | G4 - G4 - | G4 - - - |
//! B | C4 - D4 - | E4 - - - |
//! ```
//!
//! # What to do
//!
//! Take it down a step as the chord changes, or keep it until it can go; or give it to another
//! voice first, which takes it down.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Chords(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::OPEN_MUSIC_THEORY.at("tendency tones"),
        source::COLAROS,
        source::BACH_CHORALES.at("of 902 sevenths at cadences 883 fall"),
        source::CHORALES_READ.at("of 284 dominant sevenths that move 277 fall"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "the chord changes its root, and a voice leaves the seventh otherwise than by a step down, the root sounding beside it; not where the chord only passes between beats, where it is kept or altered, was reached by a step up between beats, rises in tenths with the bass, leads up from a major seventh, or where the bass or a second voice with the same note takes its resolution",
    settings: &[
        weakness(Style::Free, "instruments change their register"),
        fault(Style::Chorale, "883 of 902 fall in Bach's chorales"),
        allow(
            Style::Motet,
            "the sevenths there are suspensions and passing notes",
        ),
        allow(Style::Species1, "dissonance is told for itself"),
    ],
};

fn check(chord: &Chord<'_>, found: &mut Found<'_>) {
    let Some(next) = chord.goes_to() else { return };
    if !chord.has_sure_seventh() || chord.keeps_root(&next) || !chord.is_on_beat() {
        return;
    }
    let mut sevenths = chord.leavings();
    sevenths.retain(|leaving| leaving.from.tone == Tone::Seventh);
    let resolves = |leaving: &Leaving<'_>| leaving.steps_down() || leaving.next_note_is_step(false);
    // Where it is doubled, one of the two must go elsewhere.
    if sevenths.iter().any(resolves) {
        return;
    }
    let goes_on = |leaving: &&Leaving<'_>| {
        leaving.keeps_class()
            || leaving.is_chromatic()
            || leaving.is_reached_from_below_off_beat()
            || leaving.leads_up_from_major_seventh()
            || leaving.rises_in_tenths()
            || leaving.bass_takes_resolution()
            || !chord.has_root_beside(&leaving.from)
    };
    let Some(leaving) = sevenths.iter().find(|leaving| !goes_on(leaving)) else {
        return;
    };
    found.member(&ORDINARY, (&leaving.from, &leaving.to), || {
        format!(
            "Seventh resolution: {} goes from {} and leaves the seventh of {} open. Let it fall a step.",
            leaving.name(),
            leaving.words(),
            chord.name(),
        )
    });
}
