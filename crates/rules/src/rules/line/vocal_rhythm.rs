//! A voice has a rhythm that old vocal music does not sing.
//!
//! Why: the lines of the style flow: a dot is answered by the note it took from, a tie goes from the
//! longer note to the shorter, and two quarters on the strong beat do not run into a full stop.
//!
//! # Fails
//!
//! A dotted half wants its quarter:
//!
//! ```voices
//! style motet
//! metre 4/2 by 1/4
//!
//! S | C5 - - B4 C5 - - - | D5 - - C5 - - B4 - |
//! //                       ^^ vocal rhythm (weakness): S
//! ```
//!
//! Two quarters alone on a strong half:
//!
//! ```voices
//! style motet
//! metre 4/2 by 1/4
//!
//! S | C5 - - - B4 A4 G4 - | A4 - - - G4 - - - |
//! //           ^^ vocal rhythm (weakness): S
//! ```
//!
//! A short note tied to a longer one:
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | C5 - B4 A4 | - - G4 A4 |
//! //          ^^ vocal rhythm: S
//! ```
//!
//! # Passes
//!
//! ```voices
//! style motet
//! metre 4/2 by 1/4
//!
//! S | C5 - - B4 A4 - - - | B4 A4 G4 - - - A4 - | G4 - - - - - - - ||
//! ```
//!
//! # Does not apply
//!
//! In triple time, and where the printed values may have been halved:
//!
//! ```voices
//! style motet
//! metre 4/4
//!
//! S | C5 B4 A4 G4 | - - - A4 |
//! ```
//!
//! # What to do
//!
//! Follow a dotted note with the value of its dot, tie long to short, and hold the half on.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&DOT, &ISOLATED, &TIE],
    numbers: &[],
    sources: &[
        source::JEPPESEN,
        source::RENAISSANCE_WORKS
            .at("a dotted half has its quarter in 7,846 of 7,907 places, a dotted whole its half or less in 1,730 of 1,832"),
    ],
};

static DOT: Case = Case {
    name: "dotted",
    when: "a dotted half without a quarter (or two eighths) after it, or a dotted whole on a strong half without a half or its parts",
    settings: &[
        allow(Style::Free, "any rhythm"),
        weakness(
            Style::Motet,
            "dotted half and quarter, dotted whole and half (Jeppesen, from memory)",
        ),
    ],
};

static ISOLATED: Case = Case {
    name: "quarters-alone",
    when: "two quarters alone on a strong half, the note after them not held over the next strong one",
    settings: &[
        allow(Style::Free, "any rhythm"),
        weakness(Style::Motet, "avoided (Jeppesen, from memory)"),
    ],
};

static TIE: Case = Case {
    name: "tie",
    when: "a note shorter than a breve, tied over the bar line in another proportion than two to one or one to one, the longer part first",
    settings: &[
        allow(Style::Free, "any rhythm"),
        fault(
            Style::Motet,
            "longer to shorter, or alike (Jeppesen, from memory)",
        ),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    if found.style() != Style::Motet {
        return;
    }
    let name = line.piece.name(line.voice);
    for value in line.values() {
        let (case, what) = if value.is_dot_unanswered() {
            (
                &DOT,
                "a dotted note without the short note that completes it. Follow it with that note",
            )
        } else if value.are_quarters_alone() {
            (
                &ISOLATED,
                "two quarters alone on a strong half. Hold the next note on, or go on in quarters",
            )
        } else if value.is_tied_short_to_long() {
            (
                &TIE,
                "a tie over the bar to a note neither as long nor half as long. Strike the note again, or shorten it",
            )
        } else {
            continue;
        };
        found.passage(case, &[line.voice], (value.from, value.until), || {
            format!("Vocal rhythm: {name} has {what}.")
        });
    }
}
