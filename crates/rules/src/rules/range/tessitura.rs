//! A line lies high or low in its voice for much of the time.
//!
//! Why: a voice may touch the ends of its compass, but long writing there tires it, and young
//! or ageing voices first. No number knows a singer: ask, and believe what you are told.
//!
//! # Fails
//!
//! ```voices
//! voice S soprano
//!
//! S | E5 F5 E5 D5 | E5 F5 G5 E5 | C5 D5 E5 F5 | E5 D5 E5 E5 ||
//! //  ^^ tessitura (weakness): S
//! ```
//!
//! # Passes
//!
//! ```voices
//! voice S soprano
//!
//! S | G4 A4 B4 C5 | D5 C5 B4 A4 | G4 A4 B4 C5 | B4 A4 G4 G4 ||
//! ```
//!
//! # Does not apply
//!
//! A few notes make no tessitura, a plain voice has no compass, and an instrument does not
//! tire of its lower strings:
//!
//! ```voices
//! voice S soprano
//!
//! S | E5 F5 E5 D5 | C5 B4 C5 ||
//! ```
//!
//! # What to do
//!
//! Give the voice rest, exchange notes with a neighbour, or transpose; and ask the singers.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&HIGH, &LOW],
    numbers: &[&SHARE, &NOTES],
    sources: &[
        source::CHORAL_HANDBOOKS,
        source::BACH_CHORALES
            .at("12 of 624 voices in 156 chorales lie so; 222 by a measure of 25 per cent"),
    ],
};

static SHARE: NumberOf = NumberOf {
    name: "share",
    means: "the largest share of a voice's notes in the top or bottom third of its compass, in per cent",
    value: 50,
    bounds: (0, 100),
};

static NOTES: NumberOf = NumberOf {
    name: "notes",
    means: "notes a voice must have before its tessitura is spoken of",
    value: 16,
    bounds: (2, 1000),
};

static HIGH: Case = Case {
    name: "high",
    when: "more than half of the notes in the top third of the singer's limit, or else of the extreme compass",
    settings: &[weakness(
        Style::Free,
        "tiring for the voice (common practice)",
    )],
};

static LOW: Case = Case {
    name: "low",
    when: "more than half of the notes in the bottom third of the singer's limit, or else of the extreme compass",
    settings: &[weakness(
        Style::Free,
        "weak and tiring for the voice (common practice)",
    )],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    // A violin lies low by its compass most of the time, and nobody tires.
    let Some(voice) = line.declared().filter(|v| v.kind.is_sung()) else {
        return;
    };
    let Some(compass) = voice.limit.or(voice.kind.extreme) else {
        return;
    };
    let Some(lie) = line.tessitura(compass) else {
        return;
    };
    let number = |n| usize::try_from(found.number(n)).unwrap_or(0);
    let (share, least) = (number(&SHARE), number(&NOTES));
    let cases = [
        (&HIGH, lie.high, "high", "top"),
        (&LOW, lie.low, "low", "bottom"),
    ];
    for (case, count, where_to, third) in cases {
        if lie.notes < least || count * 100 <= share * lie.notes {
            continue;
        }
        found.passage(case, &[line.voice], (lie.from, lie.until), || {
            format!(
                "Tessitura: {} lies {where_to}: {count} of {} notes in the {third} third of {} to {}. Give it relief, and ask the singers.",
                line.piece.name(line.voice),
                lie.notes,
                compass.low,
                compass.high
            )
        });
    }
}
