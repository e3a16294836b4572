//! A voice does not keep the rhythm of its species.
//!
//! Why: the species is its rhythm: one note against one, two or four; what breaks it is
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
//! Quarters that only leap:
//!
//! ```voices
//! style species-3
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | F4 A4 D5 A4 | C5 A4 B4 C5 |
//! //  ^^ species rhythm (weakness): S
//! C | D4 -  -  -  | F4 -  -  -  |
//! ```
//!
//! The last note is as long as that of the cantus:
//!
//! ```voices
//! style species-2
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | D5 A4 | B4 C#5 | D5 A4 ||
//! //                   ^^ species rhythm: S
//! C | D4 -  | E4 -   | D4 -  ||
//! ```
//!
//! A voice that accompanies should not stir:
//!
//! ```voices
//! style species-2
//! metre 2/2
//! voice S
//! voice C cantus
//! voice B
//!
//! S | _ A4 | D5 A4 | C5 A4 | B4 C#5 | D5 - ||
//! C | D4 - | F4 -  | F4 -  | E4 -   | D4 - ||
//! B | D3 - | D3 F3 | A3 -  | G3 -   | D3 - ||
//! //         ^^ species rhythm (weakness): B
//! ```
//!
//! In third species Fux once closes from a whole note, in four parts:
//!
//! ```voices
//! style species-3
//! metre 4/4
//! voice S species 3
//! voice A species 1
//! voice C cantus
//!
//! S | A4 G4 F4 A4 | E4 - - - | F4 - - - ||
//! //                ^^ species rhythm (weakness): S
//! A | F4 -  -  -  | C#4 - - - | D4 - - - ||
//! C | D3 -  -  -  | E3 - - - | D3 - - - ||
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
//! Combined species, each voice in its own:
//!
//! ```voices
//! style species-3
//! metre 4/4
//! voice S species 3
//! voice A species 2
//! voice C cantus
//!
//! S | D4 E4 F4 G4 | A4 G4 F4 A4 |
//! A | A3 -  D4 -  | C4 -  A3 -  |
//! C | D3 -  -  -  | F3 -  -  -  |
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
    cases: &[&ORDINARY, &LAST, &LAST_BUT_ONE, &NO_STEP, &ACCOMPANYING],
    numbers: &[],
    sources: &[
        source::FUX,
        source::LEHMANN.at("lessons I, II and IV"),
        source::GROVE
            .at("Strict Counterpoint")
            .looser("three to one in triple time"),
        source::OPEN_MUSIC_THEORY,
        source::FUX_FIGURES.at("one voice enters a bar late (144); the last note is whole in all"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "first species: one note over each of the cantus; second: two (three in triple time), the first may be half a rest, the last but one whole; third: four, after a rest of one or three quarters to begin with",
    settings: &[
        allow(Style::Free, "species only"),
        fault(Style::Species1, "the species is its rhythm"),
    ],
};

static LAST: Case = Case {
    name: "last",
    when: "in second to fifth species, where the piece closes, not one note as long as the last of the cantus",
    settings: &[
        allow(Style::Free, "species only"),
        fault(
            Style::Species1,
            "the last note is whole in every figure of Fux",
        ),
    ],
};

static LAST_BUT_ONE: Case = Case {
    name: "last-but-one",
    when: "in third species in three parts and more, a whole note in the last bar but one",
    settings: &[
        allow(Style::Free, "species only"),
        weakness(
            Style::Species1,
            "Fux closes so once, in four parts (figure 181)",
        ),
    ],
};

static NO_STEP: Case = Case {
    name: "no-step",
    when: "third species: none of the first three quarters of a bar is left by step",
    settings: &[
        allow(Style::Free, "species only"),
        weakness(
            Style::Species1,
            "one of them goes by step (Lehmann, lesson IV; Open Music Theory), but Fux leaps through four bars of 100",
        ),
    ],
};

static ACCOMPANYING: Case = Case {
    name: "accompanying",
    when: "a voice that goes in whole notes with the cantus, beside one in another species, leaves them",
    settings: &[
        allow(Style::Free, "species only"),
        weakness(
            Style::Species1,
            "Fux does it in three figures in four parts (195, 202, 203)",
        ),
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
        let species = piece.species_of(voice, found.style());
        let beside = found.style() != Style::Species1 && piece.accompanies(voice);
        let moves = piece.line_moves(voice);
        for over in piece.over_cantus(cantus, voice) {
            if over.is_unknown || over.is_waiting || over.may_close() {
                continue;
            }
            let missed = match species {
                Some(1) if beside => missed(
                    over.is_one_whole(),
                    &ACCOMPANYING,
                    "one note of the same length",
                ),
                Some(1) => missed(
                    over.is_one_whole(),
                    &ORDINARY,
                    "one note of the same length",
                ),
                Some(2..) if over.to_close == Some(1) => {
                    missed(over.is_one_whole(), &LAST, "one note to close with")
                }
                Some(2) => second(&over, voices >= 3),
                Some(3) if !over.is_triple => third(&over, voices >= 3, over.goes_by_step(&moves)),
                _ => None,
            };
            let Some((case, wants)) = missed else {
                continue;
            };
            found.passage(case, &[voice], (over.from, over.until), || {
                format!(
                    "Species rhythm: over this note of {}, {} wants {wants}.",
                    piece.name(cantus),
                    piece.name(voice)
                )
            });
        }
    }
}

/// The case a bar falls under, and what it wants instead.
type Missed = Option<(&'static Case, &'static str)>;

fn missed(keeps: bool, case: &'static Case, wants: &'static str) -> Missed {
    (!keeps).then_some((case, wants))
}

fn second(over: &Over, many_parts: bool) -> Missed {
    let wants = if over.is_triple {
        "two or three equal notes, struck anew"
    } else {
        "two equal notes, struck anew"
    };
    missed(over.is_second_species(many_parts), &ORDINARY, wants)
}

fn third(over: &Over, many_parts: bool, by_step: bool) -> Missed {
    let quarters = |strokes: &[Stroke]| strokes.iter().all(|stroke| stroke.is_plain(4));
    match over.strokes[..] {
        [_, _, _, _] if quarters(&over.strokes) => missed(
            by_step,
            &NO_STEP,
            "a step after one of its first three quarters",
        ),
        [rest, ref notes @ ..]
            if over.is_entry && !rest.sounds && matches!(notes.len(), 1 | 3) && quarters(notes) =>
        {
            None
        }
        [_] if many_parts && over.to_close == Some(2) && over.is_one_whole() => {
            Some((&LAST_BUT_ONE, "four quarters, as before"))
        }
        _ => Some((&ORDINARY, "four quarters, struck anew")),
    }
}
