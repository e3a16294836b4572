//! A line leaps too much.
//!
//! Why: steps make a line, leaps set it off; where leaps prevail neither singer nor ear finds
//! the way.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//!
//! S | D4 F4 D4 A4 | F4 C5 A4 Bb4 | A4 D5 ||
//! //  ^^ too many leaps (weakness): S
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-1
//!
//! S | D4 E4 F4 A4 | G4 C5 Bb4 A4 | C#5 D5 ||
//! ```
//!
//! # Does not apply
//!
//! Where the line is not finished with `||`, and in the bass of a chorale:
//!
//! ```voices
//! style species-1
//!
//! S | D4 F4 D4 A4 | F4 C5 A4 Bb4 | A4 D5 |
//! ```
//!
//! # What to do
//!
//! Fill some of the leaps with steps.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&ORDINARY],
    numbers: &[&SHARE, &SECOND, &THIRD],
    sources: &[
        source::OPEN_MUSIC_THEORY,
        source::FUX_FIGURES
            .at("steps: 56, 56, 77, 61 and 75 per cent in the five species")
            .looser("more leaps in second species"),
    ],
};

static SHARE: NumberOf = NumberOf {
    name: "leaps",
    means: "the largest share of leaps among the moves of a line, in per cent",
    value: 50,
    bounds: (0, 100),
};

static SECOND: NumberOf = NumberOf {
    name: "second-species-leaps",
    means: "the same in second species, in per cent",
    value: 33,
    bounds: (0, 100),
};

static THIRD: NumberOf = NumberOf {
    name: "third-species-leaps",
    means: "the same in third species, in per cent",
    value: 25,
    bounds: (0, 100),
};

/// Fewer moves make no line.
const MOVES: usize = 8;

static ORDINARY: Case = Case {
    name: "",
    when: "more leaps than steps; in second species more than a third, in third species more than a quarter of all moves; in a chorale or motet not in the bass",
    settings: &[
        allow(
            Style::Free,
            "instruments and broken chords leap (common practice)",
        ),
        weakness(Style::Chorale, "steps make a line (Open Music Theory)"),
        weakness(Style::Motet, "steps make a line (Open Music Theory)"),
        weakness(Style::Species1, "steps make a line (Open Music Theory)"),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    let style = found.style();
    if line.is_given() || !line.piece.closes() || (line.is_bass() && !style.is_species()) {
        return;
    }
    // A voice in whole notes beside a quicker one is in the first species.
    let number = match line.piece.species_of(line.voice, style) {
        Some(2) => &SECOND,
        Some(3) => &THIRD,
        _ => &SHARE,
    };
    let (steps, leaps) = line.steps_and_leaps();
    let most = usize::try_from(found.number(number)).unwrap_or(0);
    let Some(first) = line.moves.first() else {
        return;
    };
    if steps + leaps < MOVES || leaps * 100 <= most * (steps + leaps) {
        return;
    }
    let until = line
        .moves
        .last()
        .map_or(first.to.end(), |last| last.to.end());
    found.passage(&ORDINARY, &[line.voice], (first.from.onset, until), || {
        format!(
            "Too many leaps: {} leaps {leaps} times and steps {steps}. Fill some of the leaps.",
            line.piece.name(line.voice)
        )
    });
}
