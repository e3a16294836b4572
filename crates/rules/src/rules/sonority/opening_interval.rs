//! A strict piece does not open on a perfect consonance over its final.
//!
//! Why: the opening states the mode; anything but unison, fifth or octave leaves it open, and a
//! fifth under the cantus states another one.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | F4 E4 F4 C#4 D4 |
//! //  ^^ opening interval: S and C
//! C | D4 A3 D4 E4 D4 |
//! ```
//!
//! Under the cantus a fifth will not do:
//!
//! ```voices
//! style species-1
//! voice C cantus
//! voice B
//!
//! C | D4 F4 E4 D4 |
//! //  ^^ opening interval: C and B
//! B | G3 A3 C4 D4 |
//! ```
//!
//! In three parts the third may stand above as well, but no sixth:
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//! voice B
//!
//! S | Bb4 A4 G4 F4 |
//! //  ^^^ opening interval: S and B
//! C | D4  F4 E4 D4 |
//! B | D3  D3 C3 D3 |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | A4 A4 C#5 D5 |
//! C | D4 F4 E4  D4 |
//! ```
//!
//! # Does not apply
//!
//! A fragment of less than four sonorities, and voices that enter one after another:
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | F4 G4 |
//! C | D4 E4 |
//! ```
//!
//! # What to do
//!
//! Open with a unison or octave, or above the cantus with a fifth.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Piece(check),
    cases: &[&TWO_PARTS, &MORE_PARTS, &LOWEST],
    numbers: &[],
    sources: &[
        source::FUX,
        source::GROVE.at("Strict Counterpoint"),
        source::FUX_FIGURES
            .at("above: 8 fifths, 12 unisons and octaves; below: 23 unisons and octaves of 23"),
        source::LEHMANN.looser("after a rest any consonance"),
    ],
};

static TWO_PARTS: Case = Case {
    name: "",
    when: "in two parts, not a unison, octave or (above the cantus) fifth",
    settings: &[
        allow(Style::Free, "opens as it likes"),
        weakness(Style::Motet, "the mode should be clear at once"),
        fault(Style::Species1, "no exception in 43 figures of Fux"),
    ],
};

static MORE_PARTS: Case = Case {
    name: "more-parts",
    when: "in three parts or more, over the lowest voice something else than octave, fifth and third",
    settings: &[
        allow(Style::Free, "opens as it likes"),
        fault(
            Style::Species1,
            "octave, fifth and third over the final (Fux's figures)",
        ),
    ],
};

static LOWEST: Case = Case {
    name: "lowest",
    when: "in three parts or more, where the lowest voice does not have the final",
    settings: &[
        allow(Style::Free, "opens as it likes"),
        weakness(Style::Motet, "the mode should be clear at once"),
        fault(
            Style::Species1,
            "the lowest voice has the final (Fux's figures)",
        ),
    ],
};

fn check(piece: &Piece<'_>, found: &mut Found<'_>) {
    let Some(there) = piece.opening() else { return };
    let voices: Vec<usize> = piece.texture.sounding(there.index).collect();
    let at = there.onset();
    if let [upper, lower] = voices[..] {
        let pair = Pair { upper, lower };
        let fifth = !piece.is_cantus(upper) && there.family_of(pair) == Some(Family::Fifth);
        if fifth || there.family_of(pair) == Some(Family::Octave) {
            return;
        }
        let Some(interval) = there.interval_of(pair) else {
            return;
        };
        found.sonority(&TWO_PARTS, &voices, at, || {
            format!(
                "Opening interval: {} and {} open with {}. Open with a unison or octave, or above the cantus with a fifth.",
                piece.name(upper),
                piece.name(lower),
                interval.spoken()
            )
        });
        return;
    }
    let Some(bass) = there.bass() else { return };
    if piece.has_final(there, bass) == Some(false) {
        found.sonority(&LOWEST, &[bass], at, || {
            format!(
                "Opening interval: {} has the lowest note and opens on {}, not on the final. Begin on the final.",
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
        let Some(interval) = there.interval_of(pair) else {
            continue;
        };
        let perfect = there.family_of(pair).is_some();
        if perfect || interval.size() % 7 == 2 {
            continue;
        }
        found.sonority(&MORE_PARTS, &[pair.upper, pair.lower], at, || {
            format!(
                "Opening interval: {} and {} open with {}. Open with octave, fifth and third over the final.",
                piece.name(pair.upper),
                piece.name(pair.lower),
                interval.with_article()
            )
        });
        return;
    }
}
