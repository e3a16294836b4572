//! A voice does not keep the rhythm of its species.
//!
//! Why: the species is its rhythm: one note against one, two against one; what breaks it is
//! another exercise.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | A4 - | E4 F4 | F4 - | C#4 - | D4 - ||
//! //         ^^ species rhythm: S
//! C | D4 - | A3 -  | D4 - | E4  - | D4 - ||
//! ```
//!
//! ```voices
//! style species-2
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | _ A4 | C5 B4 | A4 - | B4 C#5 | D5 - ||
//! //                 ^^ species rhythm: S
//! C | D4 - | F4 -  | A4 - | E4  -  | D4 - ||
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-2
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | _ A4 | D5 A4 | B4 C#5 | D5 - ||
//! C | D4 - | F4 -  | E4 -   | D4 - ||
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style chorale
//!
//! S | A4 - G4  F4 |
//! B | D4 - Bb3 -  |
//! ```
//!
//! # What to do
//!
//! Write as many notes over each note of the cantus as the species has.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Piece(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::FUX,
        source::LEHMANN.at("lessons I and II"),
        source::GROVE
            .at("Strict Counterpoint")
            .looser("three to one in triple time"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "first species: one note over each of the cantus, no rest; second: two (three in triple time), where the first may be half a rest, the last but one whole, and the last is whole",
    settings: &[
        allow(Style::Free, "species only"),
        fault(Style::Species1, "the species is its rhythm"),
    ],
};

fn check(piece: &Piece<'_>, found: &mut Found<'_>) {
    if !found.style().is_species() {
        return;
    }
    let Some(cantus) = piece.cantus_or_slowest() else {
        return;
    };
    let voices = piece.score.voices.len();
    for voice in (0..voices).filter(|&v| v != cantus) {
        let Some(species) = piece.species_of(voice, found.style()).filter(|&n| n <= 2) else {
            continue;
        };
        let groups = piece.notes_over(cantus, voice);
        for (i, group) in groups.iter().enumerate() {
            // Endings are asked for only where the piece ends.
            let to_end = if piece.closes() {
                groups.len() - i
            } else {
                usize::MAX
            };
            let keeps = match species {
                1 => group.is_one_whole(),
                _ => keeps_second(group, i == 0, to_end, voices >= 3),
            };
            if group.is_unknown || keeps {
                continue;
            }
            let wants = match (species, to_end == 1) {
                (1, _) => "one note, as long",
                (_, true) => "one note to close with",
                _ if group.is_triple => "two or three equal notes, struck anew",
                _ => "two equal notes, struck anew",
            };
            found.passage(&ORDINARY, &[voice], (group.from, group.until), || {
                format!(
                    "Species rhythm: over this note of {} {} wants {wants}.",
                    piece.name(cantus),
                    piece.name(voice)
                )
            });
        }
    }
}

/// `to_end` counts the notes of the cantus from this one to the last: 1 for the last.
fn keeps_second(group: &NotesOver, first: bool, to_end: usize, many_parts: bool) -> bool {
    if to_end == 1 {
        return group.is_one_whole();
    }
    // In three parts and more the last bar but one may hold a suspension.
    let (may_tie_in, may_tie_out) = (many_parts && to_end == 2, many_parts && to_end == 3);
    let equal = group.is_equal && (group.notes == 2 || (group.notes == 3 && group.is_triple));
    let lawful = equal
        && !group.rests
        && (!group.is_tied_in || may_tie_in)
        && (!group.is_tied_out || may_tie_out);
    lawful
        || (first
            && group.starts_with_a_rest
            && (group.notes == 1 || (group.notes == 2 && group.is_triple))
            && !group.is_tied_out)
        || (to_end == 2 && group.is_one_whole())
}
