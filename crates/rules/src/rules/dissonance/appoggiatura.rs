//! A strong dissonance is reached by leap.
//!
//! Why: on a strong moment a dissonance wants to be there before the beat: a leap to it comes unprepared.
//!
//! # Fails
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | C5 - - - | F5 - E5 - |
//! B | A3 - - - | C4 - -  - |
//! //             ^ appoggiatura: S and B
//! ```
//!
//! ```voices
//! style chorale
//!
//! S | C5 - | F5 E5 |
//! B | A3 - | C4 -  |
//! //         ^ appoggiatura (weakness): S and B
//! ```
//!
//! # Passes
//!
//! Prepared:
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | A4 - F5 - | - - E5 - |
//! B | A3 - D4 - | C4 - -  - |
//! ```
//!
//! # Does not apply
//!
//! In free writing, and in a chorale by an octave, which only moves the note before to another
//! register:
//!
//! ```voices
//! style free
//!
//! S | C5 - | F5 E5 |
//! B | A3 - | C4 -  |
//! ```
//!
//! ```voices
//! style chorale
//!
//! S | E5 - | F#5 - |
//! A | A4 - | A4  - |
//! T | E4 - | D4  - |
//! B | C3 - | C4 B3 |
//! ```
//!
//! # What to do
//!
//! Prepare the note as a suspension, or reach it by step on a weaker moment.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[source::OPEN_MUSIC_THEORY, source::GROVE, source::JEPPESEN],
};

static ORDINARY: Case = Case {
    name: "",
    when: "a leap to a dissonance on a strong moment, left by step",
    settings: &[
        allow(Style::Free, "the strongest of ornaments"),
        weakness(Style::Chorale, "outside the style of plain chorales"),
        fault(
            Style::Motet,
            "strong dissonances are suspensions (Jeppesen, from memory)",
        ),
        fault(
            Style::Species1,
            "a dissonance is not reached by leap (Grove; Open Music Theory)",
        ),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    let Some(Figure::Appoggiatura) = discord.figure() else {
        return;
    };
    let style = found.style();
    // A note of the chord is no ornament, however it came; an octave is the same note again.
    let into = discord.steps_into(discord.dissonant());
    let is_octave = into.is_some_and(|steps| steps.abs() == 7);
    if style.has_chords() && (is_octave || discord.is_of_chord()) {
        return;
    }
    let case = &ORDINARY;
    found.dissonance(case, discord, || {
        format!(
            "Appoggiatura: {}. Prepare it, or reach it by step on a weaker moment.",
            discord.words()
        )
    });
}
