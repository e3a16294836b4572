//! The ties of the fourth species break too often.
//!
//! Why: the fourth species is the study of ties; a bar or two may go without for the sake of the line, no more.
//!
//! # Fails
//!
//! ```voices
//! style species-4
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | _ A4 | G4 E4 | F4 A4 | G4 E4 | F4 A4 | - G4 | F4 - |
//! //                         ^^^^^ broken ties (weakness): S
//! C | D4 - | E4 -  | D4 -  | E4 -  | F4 -  | E4 - | D4 - |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-4
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | _ A4 | - G4 | A4 D5 | - C#5 | D5 - |
//! C | D4 - | C4 - | F4 -  | E4 -  | D4 - |
//! ```
//!
//! # Does not apply
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
//! # What to do
//!
//! Hold the second half over the bar line again: a consonance will do where no suspension can be had.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Piece(check),
    cases: &[&ORDINARY],
    numbers: &[&MOST],
    sources: &[
        source::OPEN_MUSIC_THEORY.at("fourth species"),
        source::FUX_FIGURES.at("figures 73, 75 and 151 break the ties"),
    ],
};

static MOST: NumberOf = NumberOf {
    name: "most",
    means: "how many bars may begin without a tie, the first and the last not counted",
    value: 2,
    bounds: (0, 64),
};

static ORDINARY: Case = Case {
    name: "",
    when: "more bars begin without a tie than may",
    settings: &[
        allow(Style::Free, "fourth species only"),
        weakness(Style::Species4, "once or twice (Open Music Theory)"),
    ],
};

fn check(piece: &Piece<'_>, found: &mut Found<'_>) {
    let Some(cantus) = piece.cantus_or_slowest() else {
        return;
    };
    let most = usize::try_from(found.number(&MOST)).unwrap_or(0);
    let voices = 0..piece.score.voices.len();
    for voice in voices.filter(|&v| v != cantus) {
        if piece.species_of(voice, found.style()) != Some(4) {
            continue;
        }
        let groups = piece.notes_over(cantus, voice);
        // Without any tie it is another species.
        if !groups.iter().any(|group| group.is_tied_in) {
            continue;
        }
        // The last note stands alone, in the species as in a fragment.
        let inner = groups.get(1..groups.len().saturating_sub(1));
        let breaks = inner
            .unwrap_or_default()
            .iter()
            .filter(|group| !group.is_tied_in && group.notes > 0 && !group.is_unknown);
        // Told once a voice.
        for group in breaks.skip(most).take(1) {
            found.passage(&ORDINARY, &[voice], (group.from, group.until), || {
                format!(
                    "Broken ties: {} begins a bar without a tie for more than the {most} times it may. Hold the note before over.",
                    piece.name(voice)
                )
            });
        }
    }
}
