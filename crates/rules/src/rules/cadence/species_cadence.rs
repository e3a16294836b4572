//! A species does not close with the formula it closes with.
//!
//! Why: each species has its own way into the last sixth or third; above all the fourth, whose last
//! suspension makes the cadence.
//!
//! # Fails
//!
//! ```voices
//! style species-4
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | _ D5 | - E5 | - C#5 | D5 - ||
//! //                ^ species cadence: S and C
//! C | D4 - | G4 - | E4 -  | D4 - ||
//! ```
//!
//! ```voices
//! style species-2
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | _ A4 | A4 D5 | G4 C#5 | D5 - ||
//! //                 ^^ species cadence (weakness): S and C
//! C | D4 - | F4 -  | E4 -   | D4 - ||
//! ```
//!
//! In fifth species the suspension is advice:
//!
//! ```voices
//! style species-5
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | _ _ A4 - | D5 C5 A4 - | A4 B4 C#5 - | D5 - - - ||
//! //                          ^^ species cadence (weakness): S and C
//! C | D4 - - - | F4 -  -  - | E4 -  -  -  | D4 - - - ||
//! ```
//!
//! # Passes
//!
//! Seven, six, eight:
//!
//! ```voices
//! style species-4
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | _ A4 | - D5 | - C#5 | D5 - ||
//! C | D4 - | F4 - | E4 -  | D4 - ||
//! ```
//!
//! Five, six, eight:
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
//! Where the cantus does not close with a step down, and where nothing closes:
//!
//! ```voices
//! style species-4
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | _ D5 | - E5 | - C#5 |
//! C | D4 - | G4 - | E4 -  |
//! ```
//!
//! # What to do
//!
//! Above the cantus go from fifth to sixth in second species, from seventh to sixth in fourth and
//! fifth; below it from fifth or second to third.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Piece(check),
    cases: &[&SECOND, &FOURTH, &FIFTH],
    numbers: &[],
    sources: &[
        source::OPEN_MUSIC_THEORY,
        source::FUX,
        source::FUX_FIGURES
            .at("all six figures of fourth species in two parts close 7-6-8 or 2-3-1"),
    ],
};

static SECOND: Case = Case {
    name: "second-species",
    when: "second species in two parts, the last bar but one not a fifth and then the sixth or third; on E a sixth before the third below",
    settings: &[
        allow(Style::Free, "species only"),
        weakness(
            Style::Species1,
            "advice (Fux): 5-6 above the cantus, 5-3 below",
        ),
    ],
};

static FOURTH: Case = Case {
    name: "fourth-species",
    when: "fourth species in two parts, the last bar but one not a suspension of seventh to sixth, or of second to third",
    settings: &[
        allow(Style::Free, "species only"),
        fault(Style::Species1, "all six figures of Fux close so"),
    ],
};

static FIFTH: Case = Case {
    name: "fifth-species",
    when: "the same in fifth species",
    settings: &[
        allow(Style::Free, "species only"),
        weakness(Style::Species1, "Fux's florid figures close so as a rule"),
    ],
};

fn check(piece: &Piece<'_>, found: &mut Found<'_>) {
    let (Some(close), Some(cantus)) = (piece.close(), piece.cantus_or_slowest()) else {
        return;
    };
    if piece.score.voices.len() != 2 || !found.style().is_species() {
        return;
    }
    let voice = 1 - cantus.min(1);
    let moves = piece.moves_to_final(close);
    let steps_down = moves.iter().find(|m| m.voice == cantus && m.steps_down());
    let (Some(fall), Some(species)) = (steps_down, piece.species_of(voice, found.style())) else {
        return;
    };
    let bars = piece.over_cantus(cantus, voice);
    let Some(over) = bars.iter().find(|over| over.to_close == Some(2)) else {
        return;
    };
    let pair = Pair { upper: 0, lower: 1 };
    let (Some(first), above) = (piece.size_at(over.from, pair), voice == 0) else {
        return;
    };
    let (case, keeps, wants) = match (species, above) {
        _ if over.is_triple => return,
        // What does not share the bar by two has been said by the rhythm.
        (2, _) if over.strokes.len() != 2 => return,
        (2, true) => (&SECOND, first == 4, "a fifth and then the sixth"),
        // On E the fifth below the second degree is diminished.
        (2, false) if fall.is_semitone() => (
            &SECOND,
            matches!(first, 4 | 5),
            "a sixth and then the third",
        ),
        (2, false) => (&SECOND, first == 4, "a fifth and then the third"),
        (4 | 5, _) => {
            let case = if species == 4 { &FOURTH } else { &FIFTH };
            let held = if above { first == 6 } else { first == 1 };
            let wants = if above {
                "a seventh held from before, resolved to the sixth"
            } else {
                "a second held from before, resolved to the third"
            };
            (case, held && over.is_tied_in(), wants)
        }
        _ => return,
    };
    if keeps {
        return;
    }
    found.passage(case, &[voice, cantus], (over.from, over.until), || {
        format!(
            "Species cadence: over the last note but one of {}, {} wants {wants}.",
            piece.name(cantus),
            piece.name(voice)
        )
    });
}
