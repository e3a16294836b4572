//! A voice moves beyond the note that its neighbour has just left.
//!
//! Why: the ear takes the new note for a continuation of the other voice.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//!
//! S | E4 B |
//! A | C4 F |
//! //     ^ overlap (remark): S and A
//! B | C3 D |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//!
//! S | E4 B |
//! A | C4 D |
//! B | C3 G |
//! ```
//!
//! # Does not apply
//!
//! The chord may well be the same, only its notes change place; nor a leading note that meets the
//! bass at a close:
//!
//! ```voices
//! style chorale
//!
//! S | E4 C5 |
//! A | C4 G4 |
//! B | C3 E3 |
//! ```
//!
//! ```voices
//! style chorale
//!
//! S | D5 E5 |
//! T | B3 C4 |
//! B | G3 C4 |
//! ```
//!
//! # What to do
//!
//! Keep the voice inside the space its neighbour leaves it.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::OPEN_MUSIC_THEORY,
        source::KOSTKA_PAYNE.at("ch. 5"),
        source::BACH_CHORALES
            .at("some 1,536 between neighbours")
            .looser("common in inner voices"),
        source::CHORALES_READ.looser(
            "91 of 412 pairs of neighbours that leap the same way, outside one chord; had the leaps nothing to do with the room left, 119",
        ),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "between neighbouring voices, both ends uncrossed, not from a unison",
    settings: &[
        allow(Style::Free, "too common to be worth a word"),
        remark(
            Style::Chorale,
            "handbooks warn of it; the chorales take it nearly as often as chance would (91 places; 119)",
        ),
        weakness(Style::Species1, "handbooks warn of it (Open Music Theory)"),
    ],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    let strict = found.style().is_species();
    if !step.step.overlaps()
        || step.is_in_unison_before()
        || !step.sounding.are_neighbours(step.pair)
    {
        return;
    }
    let score = step.sounding.piece.score;
    let bass_changes_octave =
        step.is_with_bass() == Some(true) && step.size_of_move(step.foot()) == Some(7);
    if bass_changes_octave
        || score.are_equal(step.pair.upper, step.pair.lower)
        || step.sounding.keeps_chord()
        || (!strict && step.closes_into_unison())
    {
        return;
    }
    // Going to one note from the same side, one of them always passes the other's.
    if found.is_told_of_pair(&["direct-unisons"], step) {
        return;
    }
    found.pair(&ORDINARY, step, || {
        let piece = step.sounding.piece;
        let up = step.rises(step.pair.lower);
        let (mover, other) = if up {
            (step.pair.lower, step.pair.upper)
        } else {
            (step.pair.upper, step.pair.lower)
        };
        format!(
            "Overlap: {} moves to {}, {} the {} that {} has just left. Keep it {} that note.",
            piece.name(mover),
            step.pitch_after(mover),
            if up { "above" } else { "below" },
            step.pitch_before(other),
            piece.name(other),
            if up { "at or below" } else { "at or above" },
        )
    });
}
