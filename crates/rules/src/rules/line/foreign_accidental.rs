//! A note has an accidental that the modes do not know.
//!
//! Why: the old singers add B flat to soften a tritone and F, C and G sharp to close; with D sharp
//! or A flat the mode is lost.
//!
//! # Fails
//!
//! ```voices
//! style motet
//! key E phrygian
//!
//! S | E5 D#5 E5 |
//! //     ^^^ foreign accidental: S
//! T | C4 B3  C4 |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style motet
//! key D dorian
//!
//! S | D5 C#5 D5 Bb4 A4 G#4 A4 F#4 |
//! ```
//!
//! E flat belongs to a mode with one flat in its signature:
//!
//! ```voices
//! style motet
//! key G dorian
//!
//! S | G4 A4 Bb4 Eb5 D5 |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style free
//!
//! S | E5 D#5 E5 |
//! ```
//!
//! # What to do
//!
//! Keep to the notes of the mode, with B flat, and with F, C and G sharp where it closes.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[
        source::JEPPESEN,
        source::RENAISSANCE_WORKS.at(
            "39 in 314 pieces, most of them signs misread; 29 make an augmented or diminished leap",
        ),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "something else than B flat, F sharp, C sharp and G sharp, E flat where the signature has a flat or is not stated, and one more flat for each further flat of it (one more sharp for each sharp); not where an augmented or diminished interval tells of it",
    settings: &[
        allow(Style::Free, "all keys are open"),
        fault(Style::Motet, "outside the set (Jeppesen, from memory)"),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    if found.style() != Style::Motet {
        return;
    }
    let is_foreign = line.foreign();
    for run in line.runs(|pitch| is_foreign(pitch).then_some(pitch)) {
        // A sign that makes an augmented or diminished leap is told there: one slip, one finding.
        if line.jars(run.from, run.until) {
            continue;
        }
        found.passage(&ORDINARY, &[line.voice], (run.from, run.until), || {
            format!(
                "Foreign accidental: {} has {}, which the mode does not know. Keep to its own notes, B flat, and F, C and G sharp.",
                line.piece.name(line.voice),
                run.lowest
            )
        });
    }
}
