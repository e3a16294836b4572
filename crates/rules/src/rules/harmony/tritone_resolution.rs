//! The tritone of a dominant does not resolve.
//!
//! Why: a diminished fifth wants to close and an augmented fourth to open; the two notes together tell where the tonic is.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | C5 - B4 - | C5 - - - |
//! //              ^^ tritone resolution (weakness): S and A
//! A | G4 - F4 - | C4 - - - |
//! T | E4 - D4 - | E4 - - - |
//! B | C3 - D3 - | C3 - - - |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | C5 - D5 - | E5 - - - |
//! A | G4 - F4 - | E4 - - - |
//! T | C4 - B3 - | C4 - - - |
//! B | E3 - D3 - | C3 - - - |
//! ```
//!
//! # Does not apply
//!
//! Where the upper note rises in tenths with the bass:
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | E5 - F5 - | G5 - - - |
//! A | C5 - B4 - | C5 - - - |
//! T | E4 - G4 - | G4 - - - |
//! B | C4 - D4 - | E4 - - - |
//! ```
//!
//! # What to do
//!
//! Let the leading note rise a semitone and the other note fall a step.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Chords(check),
    cases: &[&ORDINARY, &FOURTH],
    numbers: &[],
    sources: &[
        source::COLAROS,
        source::WIELAND,
        source::CHORALES_READ.at("of 85 augmented fourths in diminished triads 71 rise to a fourth; of 42 diminished fifths 39 close"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "a dominant goes to its tonic, and of the two voices that have the leading note and the note a tritone from it one goes otherwise than the one up a semitone, the other down a step; not where the leading note drops a third, which is judged for itself, nor where the dominant only passes between beats, nor where the other rises in tenths with the bass",
    settings: &[
        allow(Style::Free, "instruments change their register"),
        weakness(Style::Chorale, "it leads both ways (Wieland)"),
        fault(Style::Motet, "no tritone is left open"),
        allow(Style::Species1, "a tritone is told for itself"),
    ],
};

static FOURTH: Case = Case {
    name: "to-fourth",
    when: "an augmented fourth goes up by step to a perfect fourth",
    settings: &[allow(
        Style::Free,
        "71 of 85 in the diminished triads of 156 chorales",
    )],
};

fn check(chord: &Chord<'_>, found: &mut Found<'_>) {
    let leavings = match chord.resolves_to() {
        Some(_) if chord.is_on_beat() => chord.leavings(),
        _ => return,
    };
    let Some(leading) = leavings
        .iter()
        .find(|l| chord.is_leading_note(l.from.pitch))
    else {
        return;
    };
    let upward = leading.rises_semitone()
        || leading.stays()
        || leading.is_chromatic()
        || leading.passes_down();
    let drops = leading.falls_third();
    let closes = |other: &Leaving<'_>| {
        let falls = other.steps_down()
            || other.next_note_is_step(false)
            || other.stays()
            || other.rises_in_tenths();
        falls && (upward || drops)
    };
    let mut others: Vec<&Leaving<'_>> = leavings.iter().collect();
    others.retain(|other| other.is_tritone_from(leading));
    // Doubled, one of the two must go elsewhere.
    let Some(other) = others.first().filter(|_| !others.iter().any(|o| closes(o))) else {
        return;
    };
    let told = found.told_of_chord(&["leading-note-resolution", "seventh-resolution"], chord);
    let is_told = |l: &Leaving<'_>| told.contains(&l.voice());
    if is_told(leading) || is_told(other) {
        return;
    }
    let case = match (other.steps_up() && upward, other.is_under(leading)) {
        // Diminished to perfect: the fifths are judged for themselves.
        (true, false) => return,
        (true, true) => &FOURTH,
        (false, _) => &ORDINARY,
    };
    let voices = [leading.voice(), other.voice()];
    found.sonority(case, &voices, leading.arrival().onset(), || {
        format!(
            "Tritone resolution: {} goes from {} and {} from {}. Let the leading note rise a semitone and the other note fall a step.",
            leading.name(),
            leading.words(),
            other.name(),
            other.words(),
        )
    });
}
