//! A line covers more room than one voice has in strict writing.
//!
//! Why: a line that roams over two registers has no place of its own, and none of its
//! neighbours has one either.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | D4 A4 D5 F5 | G5 Bb5 F5 D5 | A4 D4 ||
//! //                   ^^^ wide range (weakness): S
//! C | D3 F3 D3 A3 | Bb3 G3 A3 G3 | F3 D3 ||
//! ```
//!
//! A cantus keeps within a tenth:
//!
//! ```voices
//! style species-1
//! voice C cantus
//!
//! C | D3 A3 D4 E4 | G4 E4 D4 E4 | D4 ||
//! //                ^^ wide range (weakness): C
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-1
//!
//! S | D4 A4 D5 E5 | F5 G5 E5 D5 | C#5 D5 ||
//! ```
//!
//! # Does not apply
//!
//! Elsewhere the compass of the voice decides (the rule `compass`):
//!
//! ```voices
//! S | D4 A4 D5 F5 | G5 Bb5 F5 D5 | A4 D4 ||
//! ```
//!
//! # What to do
//!
//! Take a turn of the line an octave lower or higher, so that it keeps within a twelfth.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&COMPOSED, &CANTUS],
    numbers: &[&WIDEST, &CANTUS_WIDEST],
    sources: &[
        source::OPEN_MUSIC_THEORY.at("a cantus keeps within a tenth"),
        source::FUX_FIGURES.at("no composed line goes beyond a perfect twelfth"),
    ],
};

static WIDEST: NumberOf = NumberOf {
    name: "widest",
    means: "the widest range of a composed line, as an interval: 12 is a perfect twelfth",
    value: 12,
    bounds: (5, 29),
};

static CANTUS_WIDEST: NumberOf = NumberOf {
    name: "cantus-widest",
    means: "the widest range of a cantus, as an interval: 10 is a major tenth",
    value: 10,
    bounds: (5, 29),
};

static COMPOSED: Case = Case {
    name: "",
    when: "more than a perfect twelfth between the lowest note of a composed line and its highest",
    settings: &[
        allow(Style::Free, "the compass of the voice decides"),
        weakness(Style::Species1, "none of Fux's lines goes further"),
    ],
};

static CANTUS: Case = Case {
    name: "cantus",
    when: "more than a major tenth in a cantus",
    settings: &[
        allow(Style::Free, "the compass of the voice decides"),
        weakness(
            Style::Species1,
            "a cantus keeps within a tenth (Open Music Theory)",
        ),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    let Some(voice) = line.declared().filter(|v| v.doubles.is_none()) else {
        return;
    };
    let (case, number) = if voice.cantus {
        (&CANTUS, &CANTUS_WIDEST)
    } else {
        (&COMPOSED, &WIDEST)
    };
    let Some((range, low, high)) = line.extremes() else {
        return;
    };
    let widest = found.number(number);
    let over = range.size() >= widest || (range.size() + 1 == widest && range.is_augmented());
    if !over {
        return;
    }
    let later = if low.onset < high.onset { high } else { low };
    found.sonority(case, &[line.voice], later.onset, || {
        format!(
            "Wide range: {} covers {} to {}, {}. Keep within {}.",
            line.piece.name(line.voice),
            LineMove::text(&low),
            LineMove::text(&high),
            range.with_article(),
            Interval::noun(widest - 1)
        )
    });
}
