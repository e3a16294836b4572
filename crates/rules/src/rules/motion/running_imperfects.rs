//! Two voices run on in parallel thirds or sixths.
//!
//! Why: thirds and sixths are sweet, but voices that keep to them have given up their
//! independence.
//!
//! # Fails
//!
//! More than three in the first species:
//!
//! ```voices
//! style species-1
//!
//! S | E4 F4 G4 A4 |
//! //  ^^ running imperfects (weakness): S and B
//! B | C4 D4 E4 F4 |
//! ```
//!
//! More than four in a motet or a chorale:
//!
//! ```voices
//! style motet
//!
//! S | E4 F4 G4 A4 B4 |
//! //  ^^ running imperfects (weakness): S and B
//! B | C4 D4 E4 F4 G4 |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-1
//!
//! S | G4 A4 B4 C5 E5 |
//! B | C4 F4 G4 A4 G4 |
//! ```
//!
//! # Does not apply
//!
//! In free style; and in others between beats, where only ornaments run:
//!
//! ```voices
//! style chorale
//!
//! S | C5.B4 A4.G4 A4.B4 C5 |
//! B | A4.G4 F4.E4 F4.G4 A4 |
//! ```
//!
//! ```voices
//! S | E4 F4 G4 A4 B4 |
//! B | C4 D4 E4 F4 G4 |
//! ```
//!
//! # What to do
//!
//! After three, let the voices move against each other.
//!
//! Lehmann and the Open Music Theory stop at three, some at four; free writing has no limit.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Piece(check),
    cases: &[&NOTES, &LONG, &DOWNBEATS, &OFF_BEATS],
    numbers: &[&MOST, &MOST_LONG],
    sources: &[
        source::LEHMANN.at("lesson I"),
        source::OPEN_MUSIC_THEORY.at("first species"),
        source::CHORALES_READ
            .at("runs as long as seven")
            .looser("a run of four goes on as often as one of two"),
        source::FUX_FIGURES
            .at("at most three in the first species; up to six on downbeats in the second"),
    ],
};

static MOST: NumberOf = NumberOf {
    name: "most",
    means: "how many thirds or sixths may follow one another in the first species",
    value: 3,
    bounds: (2, 64),
};
static MOST_LONG: NumberOf = NumberOf {
    name: "most-elsewhere",
    means: "how many may follow one another elsewhere, and on the downbeats of the second species",
    value: 4,
    bounds: (2, 64),
};

static NOTES: Case = Case {
    name: "",
    when: "more than three running, note by note",
    settings: &[
        allow(Style::Free, "free writing has no limit"),
        weakness(Style::Species1, "three at most (Lehmann, lesson I)"),
        allow(Style::Species2, "two notes against one cannot run so"),
    ],
};

static LONG: Case = Case {
    name: "long",
    when: "more than four running, those between beats not counted",
    settings: &[
        allow(Style::Free, "free writing has no limit"),
        allow(
            Style::Chorale,
            "not avoided: of runs of two a quarter go on (575 of 2,348), of runs of four as many (49 of 176; 156 chorales)",
        ),
        weakness(Style::Motet, "from the fifth running"),
        allow(Style::Species1, "three at most already"),
    ],
};

static DOWNBEATS: Case = Case {
    name: "downbeats",
    when: "more than four running on successive downbeats",
    settings: &[
        allow(Style::Free, "free writing has no limit"),
        weakness(
            Style::Species2,
            "from the fifth running (Fux has six downbeats of thirds)",
        ),
        allow(Style::Species3, "the notes between vary it"),
    ],
};

static OFF_BEATS: Case = Case {
    name: "off-beats",
    when: "more than four running off the beat in successive bars",
    settings: &[
        allow(Style::Free, "free writing has no limit"),
        weakness(Style::Species4, "from the fifth running"),
    ],
};

fn check(piece: &Piece<'_>, found: &mut Found<'_>) {
    let (most, long) = (found.number(&MOST), found.number(&MOST_LONG));
    for &pair in piece.texture.pairs() {
        for (level, limit, case) in [
            (Level::Notes, most, &NOTES),
            (Level::Notes, long, &LONG),
            (Level::Downbeats, long, &DOWNBEATS),
            (Level::OffBeats, long, &OFF_BEATS),
        ] {
            if found.severity(case).is_none() && !piece.has_species_of_voices() {
                continue;
            }
            let runs = piece.parallel_runs(pair, level);
            // Between beats, what runs is an ornament.
            let count = |run: &ParallelRun| match std::ptr::eq(case, &LONG) {
                true => run.on_beats,
                false => run.intervals,
            };
            for run in runs.iter().filter(|run| count(run) > limit) {
                let voices = [pair.upper, pair.lower];
                found.passage(case, &voices, (run.from, run.until), || {
                    format!(
                        "Running {}: {} and {} have {} in a row {}. After {limit}, let them move against each other.",
                        if run.sixths { "sixths" } else { "thirds" },
                        piece.name(pair.upper),
                        piece.name(pair.lower),
                        count(run),
                        piece.extent_text(run.from, run.until)
                    )
                });
            }
        }
    }
}
