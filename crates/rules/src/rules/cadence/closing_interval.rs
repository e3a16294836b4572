//! A piece does not close on its final in a consonance that closes.
//!
//! Why: only unison and octave, and over the final the major third and fifth, come to rest.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | A4 E4 F4 C#4 A4 ||
//! //               ^^ closing interval: S and C
//! C | D4 A3 D4 E4  D4 ||
//! ```
//!
//! Over the wrong bass:
//!
//! ```voices
//! style chorale
//! key C major
//!
//! S | G4 F4 E4 ||
//! A | E4 C4 C4 ||
//! B | C4 A3 A3 ||
//! //        ^^ closing interval: B
//! ```
//!
//! A minor third, in the strict styles:
//!
//! ```voices
//! style motet
//!
//! S | B4 C#5 D5 ||
//! T | D4 E4  F4 ||
//! //         ^^ closing interval (weakness): T and B
//! B | G3 A3  D3 ||
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
//! # Does not apply
//!
//! Without a final `||` nothing closes:
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | A4 A4 G4 F4 |
//! C | D4 F4 E4 D4 |
//! ```
//!
//! # What to do
//!
//! Close on the final: two voices in unison or octave, more with the final lowest.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Piece(check),
    cases: &[&TWO_PARTS, &MORE_PARTS, &MINOR_THIRD, &LOWEST],
    numbers: &[],
    sources: &[
        source::FUX,
        source::FUX_FIGURES.at("two parts: 43 of 43; three parts: 20 unisons and octaves, 17 with a major third, 4 with a fifth"),
        source::FUX_FIGURES.at("one of 43 in three parts closes with a minor third"),
        source::GROVE.at("Strict Counterpoint"),
        source::OPEN_MUSIC_THEORY,
    ],
};

static TWO_PARTS: Case = Case {
    name: "",
    when: "in two parts, not a unison or octave",
    settings: &[
        allow(Style::Free, "the tonic in the lower voice is enough"),
        weakness(
            Style::Motet,
            "unison and octave close (Jeppesen, from memory)",
        ),
        fault(Style::Species1, "no exception in 43 figures of Fux"),
    ],
};

static MORE_PARTS: Case = Case {
    name: "more-parts",
    when: "in three parts or more, over the lowest voice something else than octave, fifth and third",
    settings: &[
        weakness(Style::Free, "an open ending may be meant"),
        fault(
            Style::Chorale,
            "the close is a triad in root position (common practice)",
        ),
        weakness(
            Style::Motet,
            "the close is the final with its third and fifth",
        ),
        fault(
            Style::Species1,
            "only final, third and fifth (Fux's figures)",
        ),
    ],
};

static MINOR_THIRD: Case = Case {
    name: "minor-third",
    when: "in three parts or more, a minor third over the lowest voice",
    settings: &[
        allow(Style::Free, "the minor triad closes (common practice)"),
        allow(
            Style::Chorale,
            "it closes, though the older chorale makes it major (Grove)",
        ),
        weakness(
            Style::Motet,
            "the last third is major, or left out (Grove, Strict Counterpoint)",
        ),
        weakness(
            Style::Species1,
            "one of 43 figures of Fux in three parts closes so (143)",
        ),
    ],
};

static LOWEST: Case = Case {
    name: "lowest",
    when: "where the lowest voice does not have the final or the tonic",
    settings: &[
        weakness(Style::Free, "an open ending may be meant"),
        fault(
            Style::Chorale,
            "the close stands on the tonic (common practice)",
        ),
        weakness(
            Style::Motet,
            "the final in the lowest voice (Jeppesen, from memory)",
        ),
        fault(Style::Species1, "the lowest voice has the final (Fux)"),
    ],
};

fn check(piece: &Piece<'_>, found: &mut Found<'_>) {
    let Some(there) = piece.close() else { return };
    let voices: Vec<usize> = piece.texture.sounding(there.index).collect();
    let at = there.onset();
    let Some(bass) = there.bass().filter(|_| voices.len() >= 2) else {
        return;
    };
    if piece.has_final(there, bass) == Some(false) {
        found.sonority(&LOWEST, &[bass], at, || {
            format!(
                "Closing interval: {} has the lowest note and closes on {}, not on the final. Close on the final.",
                piece.name(bass),
                there.pitch_text(bass)
            )
        });
        return;
    }
    for &voice in voices.iter().filter(|&&v| v != bass) {
        let pair = Pair {
            upper: voice.min(bass),
            lower: voice.max(bass),
        };
        let (Some(interval), family) = (there.interval_of(pair), there.family_of(pair)) else {
            continue;
        };
        let third_size = interval.size() % 7 == 2;
        let third = voices.len() >= 3 && third_size;
        let rests = family == Some(Family::Octave)
            || (voices.len() >= 3 && family == Some(Family::Fifth))
            || (third && !interval.is_minor());
        if rests {
            continue;
        }
        let case = match voices.len() {
            2 => &TWO_PARTS,
            _ if third => &MINOR_THIRD,
            _ => &MORE_PARTS,
        };
        let help = match voices.len() {
            2 => "Close in unison or octave.",
            _ if third => "Raise the third, or leave it out.",
            _ => "Close with octave, fifth and third over the final.",
        };
        if found.severity(case).is_none() {
            continue;
        }
        found.sonority(case, &[pair.upper, pair.lower], at, || {
            format!(
                "Closing interval: {} and {} close with {}. {help}",
                piece.name(pair.upper),
                piece.name(pair.lower),
                interval.spoken()
            )
        });
        return;
    }
}
