//! The seventh degree is not raised at a close, or is raised elsewhere.
//!
//! Why: in the modes on D, G and A, and in minor, the seventh lies a whole tone under the final and
//! does not lead to it; raised anywhere else it takes away the mode. On E the second degree leads.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | A4 A4 C5 D5 ||
//! //        ^^ raised seventh: S
//! C | D4 F4 E4 D4 ||
//! ```
//!
//! On E it stays as it is:
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | B4 C5 D#5 E5 ||
//! //        ^^^ raised seventh: S
//! C | E4 A4 F4  E4 ||
//! ```
//!
//! Long before the close it has nothing to lead to:
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | D4 C#4 A3 D4 C#4 D4 ||
//! //     ^^^ raised seventh: S
//! C | D4 E4  F4 F4 E4  D4 ||
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | A4 A4 C#5 D5 ||
//! C | D4 F4 E4  D4 ||
//! ```
//!
//! The close on E, where the second degree leads:
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | B4 C5 D5 E5 ||
//! C | E4 A4 F4 E4 ||
//! ```
//!
//! # Does not apply
//!
//! Where no key is stated and no cantus tells the mode, and where nothing closes:
//!
//! ```voices
//! style motet
//!
//! S | A4 A4 C5 D5 ||
//! T | D4 F4 E4 D4 ||
//! ```
//!
//! # What to do
//!
//! Raise the seventh before the last note, and only there; on E never.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Piece(check),
    cases: &[&ORDINARY, &PHRYGIAN, &EARLY],
    numbers: &[],
    sources: &[
        source::FUX,
        source::FUX_FIGURES.at("the raised degree before the last bar in every exercise on D, G and A; earlier in two parts only over the D in the mode on G (21, 41); never on E (11, 12)"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "at the close the seventh degree rises a whole tone to the final, and no other voice comes down to it by semitone",
    settings: &[
        weakness(Style::Free, "the leading note leads (common practice)"),
        fault(Style::Chorale, "the leading note leads (common practice)"),
        fault(
            Style::Motet,
            "a singer raises it unasked (Jeppesen, from memory)",
        ),
        fault(
            Style::Species1,
            "raised in every figure of Fux on D, G and A",
        ),
    ],
};

static PHRYGIAN: Case = Case {
    name: "on-e",
    when: "in a mode with a semitone over its final the seventh is raised at the close",
    settings: &[
        weakness(Style::Free, "the second degree leads"),
        fault(Style::Motet, "the second degree leads (Fux)"),
        fault(
            Style::Species1,
            "the second degree leads (Fux, figures 11 and 12)",
        ),
    ],
};

static EARLY: Case = Case {
    name: "early",
    when: "in the modes on D, G and A, before the last bar but one, a raised seventh that does not go up to the final and is no third over a voice with the fifth degree",
    settings: &[
        allow(Style::Free, "the dominant comes anywhere"),
        fault(Style::Species1, "nowhere earlier unless needed (Fux)"),
    ],
};

fn check(piece: &Piece<'_>, found: &mut Found<'_>) {
    let Some(close) = piece.close() else { return };
    let Some(mode) = piece.final_at(close.onset(), found.style()) else {
        return;
    };
    let moves = piece.moves_to_final(close);
    let led_from_above = moves.iter().any(|m| m.steps_down() && m.is_semitone());
    for last in moves.iter().filter(|m| m.steps_up()) {
        let (from, to) = last.step.ends();
        let name = piece.name(last.voice);
        let at = last.step.from.onset;
        if mode.is_phrygian() && last.is_semitone() {
            found.sonority(&PHRYGIAN, &[last.voice], at, || {
                format!("Raised seventh: {name} closes from {from} to {to}, where the second degree leads. Leave the seventh as the mode has it.")
            });
        } else if !mode.is_phrygian() && !last.is_semitone() && !led_from_above {
            found.sonority(&ORDINARY, &[last.voice], at, || {
                format!("Raised seventh: {name} closes from {from} to {to}, a whole tone. Raise the seventh before the final.")
            });
        }
    }
    if !found.style().is_species() || !mode.raises_its_seventh() {
        return;
    }
    for voice in 0..piece.score.voices.len() {
        for step in piece.idle_leading_notes(voice, mode) {
            found.sonority(&EARLY, &[voice], step.from.onset, || {
                let (from, to) = step.ends();
                format!(
                    "Raised seventh: {} has {from} before the last bar but one and goes on to {to}. Keep the mode's own seventh here.",
                    piece.name(voice)
                )
            });
        }
    }
}
