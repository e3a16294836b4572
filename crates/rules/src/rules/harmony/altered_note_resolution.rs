//! An altered note does not go on in its direction.
//!
//! Why: a note raised leads up and a note lowered leads down; turned the other way it sounds like a slip.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | E5 - F5 - | E5 - D5  - | C5 - B4 - | C5 - - - |
//! A | G4 - A4 - | G4 - F#4 - | E4 - F4 - | E4 - - - |
//! //                           ^^ altered note resolution (weakness): A
//! T | C4 - C4 - | C4 - A3  - | G3 - G3 - | G3 - - - |
//! B | C3 - F3 - | C3 - D3  - | E3 - G3 - | C3 - - - |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | C5 - A4 - | C5 - A4 - | C5 - - - |
//! A | G4 - F4 - | G4 - F#4 - | G4 - - - |
//! T | E4 - C4 - | E4 - D4 - | C4 - - - |
//! B | C3 - F3 - | C3 - D3 - | E3 - - - |
//! ```
//!
//! # Does not apply
//!
//! Where it passes by chromatic semitones:
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | C5 - C5 - | B4 - C5 - |
//! A | G4 - F#4 - | F4 - E4 - |
//! T | E4 - D4 - | D4 - C4 - |
//! B | C4 - A3 - | G3 - C3 - |
//! ```
//!
//! # What to do
//!
//! Take a raised note up a semitone and a lowered one down a step, or leave the sign out.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Chords(check),
    cases: &[&RAISED, &LOWERED],
    numbers: &[],
    sources: &[source::FEEZELL, source::COLAROS],
};

static RAISED: Case = Case {
    name: "",
    when: "as the harmony changes, a raised note that leads (the third of a major chord, the root of a diminished one), strange to the scale of this chord's key and the next one's, its plain form heard shortly before, goes neither up a step nor on by a chromatic semitone; not the leading note that drops a third inside, nor in a motet what the neighbouring modes have",
    settings: &[
        allow(Style::Free, "instruments change their register"),
        weakness(Style::Chorale, "it leads (Feezell)"),
        fault(Style::Motet, "a sign is sung for the sake of the next note"),
        allow(Style::Species1, "a sign is told for itself"),
    ],
};

static LOWERED: Case = Case {
    name: "lowered",
    when: "the same of a lowered note that does not go down a step, or a diminished third",
    settings: &[
        allow(Style::Free, "instruments change their register"),
        weakness(Style::Chorale, "it leads (Feezell)"),
        allow(Style::Motet, "the flats belong to the modes"),
        allow(Style::Species1, "a sign is told for itself"),
    ],
};

fn check(chord: &Chord<'_>, found: &mut Found<'_>) {
    let motet = found.style() == Style::Motet;
    let strays = |leaving: &Leaving<'_>| {
        let way = chord.is_altered(&leaving.from)?;
        let modal = motet && chord.has_in_modes(leaving.from.pitch);
        let goes_on = leaving.follows(way) || leaving.stays() || leaving.passes_chromatically();
        // A leading note may drop inside, as it may in the key itself.
        let drops = leaving.falls_third() && leaving.is_inner() && chord.resolves_to().is_some();
        let at_home = leaving.next.has_in_key(leaving.from.pitch) || leaving.could_stay();
        (!goes_on && !modal && !drops && !at_home && !chord.keeps_root(&leaving.next))
            .then_some(way)
    };
    let mut open = chord.leavings();
    open.retain(|leaving| strays(leaving).is_some());
    if open.is_empty() {
        return;
    }
    let told = found.told_of_chord(&["leading-note-resolution", "seventh-resolution"], chord);
    open.retain(|leaving| !told.contains(&leaving.voice()));
    for leaving in &open {
        let Some(way) = strays(leaving) else { continue };
        let case = match way {
            Altered::Raised => &RAISED,
            Altered::Lowered => &LOWERED,
        };
        found.member(case, (&leaving.from, &leaving.to), || {
            format!(
                "Altered note resolution: {} goes from {}, though {} is {} in {}. Let it go {}, or leave the sign out.",
                leaving.name(),
                leaving.words(),
                leaving.from.pitch.class_name(),
                way.name(),
                chord.key_name(),
                way.goal(),
            )
        });
    }
}
