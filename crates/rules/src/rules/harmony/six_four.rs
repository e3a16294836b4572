//! A chord in its second inversion without a reason.
//!
//! Why: its bass carries a fourth; the ear takes it only as part of a dominant, or in passing.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | F4 - E4 - | F4 - - - |
//! //       ^ six four: S and A and T and B
//! A | D4 - C4 - | C4 - - - |
//! T | A3 - G3 - | A3 - - - |
//! B | D3 - G2 - | F2 - - - |
//! ```
//!
//! # Passes
//!
//! The bass goes through it by step:
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | E4 - D4 - | C4 - - - |
//! A | C4 - B3 - | C4 - - - |
//! T | G3 - G3 - | G3 - - - |
//! B | C3 - D3 - | E3 - - - |
//! ```
//!
//! # Does not apply
//!
//! To the six-four before the dominant that goes down by step:
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | C5 - A4 - | G4 - G4 - | G4 - - - ||
//! A | E4 - F4 - | E4 - D4 - | C4 - - - ||
//! T | A3 - C4 - | C4 - B3 - | C4 - - - ||
//! B | A2 - F3 - | G3 - G2 - | C3 - - - ||
//! ```
//!
//! # What to do
//!
//! Put the chord in another position, or let the bass come and go by step.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Sonorities(check),
    cases: &[&ORDINARY, &CADENTIAL, &REACHED, &LEAPS],
    numbers: &[],
    sources: &[
        source::KOSTKA_PAYNE.at("ch. 9"),
        source::COLAROS,
        source::OPEN_MUSIC_THEORY.at("the cadential six-four"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "a sure triad over its fifth, neither before its dominant nor passing, over a held bass, or beside another position of itself",
    settings: &[
        fault(
            Style::Free,
            "cadential, passing, pedal and arpeggiated are the four (Kostka & Payne)",
        ),
        weakness(
            Style::Motet,
            "the fourth over the lowest voice is a dissonance",
        ),
        allow(Style::Species1, "told as a dissonance"),
    ],
};

static CADENTIAL: Case = Case {
    name: "cadential",
    when: "before the dominant on its bass: weaker than that, or after it; the fourth or the sixth not going down by step (its doubling is told of by itself)",
    settings: &[
        weakness(Style::Free, "the cadential six-four (Open Music Theory)"),
        allow(Style::Motet, "the style has no such chord"),
        allow(Style::Species1, "told as a dissonance"),
    ],
};

static REACHED: Case = Case {
    name: "cadential-reached",
    when: "the same, and its fourth is reached by leap",
    settings: &[
        allow(Style::Free, "an appoggiatura, which is free there"),
        weakness(
            Style::Chorale,
            "a common tone or a step leads to it (Colaros)",
        ),
        allow(Style::Motet, "the style has no such chord"),
        allow(Style::Species1, "told as a dissonance"),
    ],
};

static LEAPS: Case = Case {
    name: "cadential-leap",
    when: "the same, and its fourth goes by leap",
    settings: &[
        weakness(
            Style::Free,
            "the fourth goes down by step (Open Music Theory)",
        ),
        fault(
            Style::Chorale,
            "the fourth goes down by step (Open Music Theory)",
        ),
        allow(Style::Motet, "the style has no such chord"),
        allow(Style::Species1, "told as a dissonance"),
    ],
};

/// The rules that tell of a fourth that no figure explains, where a style has no chords.
const FOURTHS: [&str; 4] = [
    "free-dissonance",
    "suspension-preparation",
    "suspension-position",
    "suspension-resolution",
];

fn check(there: &Sounding<'_>, found: &mut Found<'_>) {
    let Some(chord) = there.six_four() else {
        return;
    };
    let piece = there.piece;
    let voices: Vec<usize> = piece.texture.sounding(there.index).collect();
    match chord.use_of() {
        SixFourUse::Bare
            if found.style().has_chords() || !found.is_told_of_fourth(there, &FOURTHS) =>
        {
            found.sonority(&ORDINARY, &voices, there.onset(), || {
                format!(
                    "Six-four: {} stands over its fifth, {} in {}, neither cadential nor passing, nor over a held bass, nor broken. Put the chord in another position, or let the bass come and go by step.",
                    chord.name(),
                    chord.bass_text(),
                    piece.name(chord.bass)
                )
            });
        }
        SixFourUse::Cadential => {
            let Some(want) = chord.want() else {
                return;
            };
            let reached = matches!(want, SixFourWant::FourthReached(_));
            if reached && found.is_told_of_fourth(there, &["appoggiatura"]) {
                return;
            }
            let case = match want {
                SixFourWant::FourthLeaps(_) => &LEAPS,
                SixFourWant::FourthReached(_) => &REACHED,
                _ => &CADENTIAL,
            };
            found.sonority(case, &voices, there.onset(), || {
                format!("Six-four before the dominant: {}.", want.text(piece))
            });
        }
        _ => {}
    }
}
