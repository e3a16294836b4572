//! A line repeats a figure at once.
//!
//! Why: a line that says the same twice stands still.
//!
//! # Fails
//!
//! ```voices
//! style species-3
//!
//! S | D4 E4 F4 D4 | E4 F4 A4 G4 |
//! //  ^^ figure repeated (weakness): S
//! ```
//!
//! Two notes to and fro:
//!
//! ```voices
//! style species-1
//!
//! S | A4 G4 A4 G4 | F4 E4 D4 |
//! //  ^^ figure repeated (weakness): S
//! ```
//!
//! The figure of a bar, three bars running:
//!
//! ```voices
//! style species-3
//! metre 4/4
//!
//! S | A4 B4 C5 D5 | G4 A4 B4 C5 | F4 G4 A4 B4 |
//! //  ^^ figure repeated (weakness): S
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-3
//! metre 4/4
//!
//! S | D4 E4 F4 D4 | G4 F4 E4 D4 | F4 A4 G4 F4 |
//! ```
//!
//! About a suspension, in motets:
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | G4 A4 B4 C5 | - B4 C5 - | A4 - - - ||
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! S | A4 G4 A4 G4 | F4 E4 D4 |
//! ```
//!
//! # What to do
//!
//! Lead the repetition elsewhere: another direction, or another leap.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&FIGURE, &TWO_NOTES, &BARS],
    numbers: &[&RUNNING],
    sources: &[
        source::LEHMANN.at("lesson IV, Fig. 49"),
        source::OPEN_MUSIC_THEORY,
        source::BUTTERFIELD.at("ch. 5"),
        source::JEPPESEN,
        source::RENAISSANCE_WORKS
            .at("two notes to and fro: 3 in 100 bars of Palestrina, and 4 more about a suspension; figures 2")
            .looser("no rarity"),
    ],
};

static RUNNING: NumberOf = NumberOf {
    name: "bars",
    means: "bars of one figure that are too many, in third species",
    value: 3,
    bounds: (2, 20),
};

static FIGURE: Case = Case {
    name: "figure",
    when: "three notes or more that come again at once on the same notes, in the same rhythm",
    settings: &[
        allow(Style::Free, "planned repetition is common in free writing"),
        weakness(
            Style::Motet,
            "the line stands still (Jeppesen, from memory)",
        ),
        weakness(
            Style::Species1,
            "the line stands still (Lehmann, lesson IV)",
        ),
    ],
};

static TWO_NOTES: Case = Case {
    name: "two-notes",
    when: "two notes to and fro in one rhythm, each struck twice; in motets not where one is held over as a suspension",
    settings: &[
        allow(Style::Free, "common in accompaniment"),
        weakness(Style::Motet, "the line stands still (Butterfield)"),
        weakness(Style::Species1, "the line stands still (Butterfield)"),
        allow(Style::Species4, "suspensions leave little choice"),
    ],
};

static BARS: Case = Case {
    name: "bars",
    when: "the figure of a bar in three bars running, in third species",
    settings: &[
        allow(Style::Free, "a sequence, in free writing"),
        weakness(Style::Species3, "Lehmann, lesson IV, Fig. 49"),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    if line.is_given() || RULE.cases.iter().all(|c| found.severity(c).is_none()) {
        return;
    }
    let name = line.piece.name(line.voice);
    for passage in line.repeated_figures() {
        found.passage(&FIGURE, &[line.voice], passage.extent(), || {
            let [first, _, last] = passage.pitches();
            format!(
                "Figure repeated: {name} sings the same {} notes again at once, {first} to {last}. Lead the repetition elsewhere.",
                passage.figure
            )
        });
    }
    let motet = found.style() == Style::Motet;
    for passage in line.alternations() {
        // The closes of the style suspend and resolve: to and fro, and no standing still.
        if motet && line.suspends(passage.extent()) {
            continue;
        }
        found.passage(&TWO_NOTES, &[line.voice], passage.extent(), || {
            let [first, second, _] = passage.pitches();
            format!(
                "Figure repeated: {name} goes to and fro between {first} and {second}, {} notes running. Lead it on.",
                passage.notes
            )
        });
    }
    if found.severity(&BARS).is_none() {
        return;
    }
    let most = usize::try_from(found.number(&RUNNING)).unwrap_or(usize::MAX);
    for (bars, extent) in line
        .alike_bars()
        .into_iter()
        .filter(|(bars, _)| *bars >= most)
    {
        found.passage(&BARS, &[line.voice], extent, || {
            format!("Figure repeated: {name} has one figure in {bars} bars running. Lead one of them elsewhere.")
        });
    }
}
