//! Eighth notes stand elsewhere than in a pair by step after a quarter.
//!
//! Why: eighths are an ornament of florid line: a pair fills the weak half of a beat; more of them,
//! or any that leap, turn the line into figuration.
//!
//! # Fails
//!
//! ```voices
//! style species-5
//! metre 2/2 by 1/8
//! voice S
//! voice C cantus
//!
//! S | A4 G4 F4 - G4 - A4 - |
//! //  ^^ eighth notes: S
//! C | D4 - - - - - - - |
//! ```
//!
//! In place, but by leap:
//!
//! ```voices
//! style species-5
//! metre 2/2 by 1/8
//! voice S
//! voice C cantus
//!
//! S | A4 - F4 A4 G4 - F4 - |
//! //       ^^ eighth notes: S
//! C | D4 - -  -  -  - -  - |
//! ```
//!
//! Again and again within a semibreve is one passage:
//!
//! ```voices
//! style motet
//! metre 4/2 by 1/8
//!
//! S | A4 - - G4 A4 - - B4 C5 - - - B4 - A4 - | A4 - - - - - - - G4 - - - - - - - |
//! //         ^^ eighth notes (weakness): S
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-5
//! metre 2/2 by 1/8
//! voice S
//! voice C cantus
//!
//! S | A4 - G4 F4 G4 - A4 - |
//! C | D4 - -  -  -  - -  - |
//! ```
//!
//! Three in the time of two quarters are another proportion:
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | A4 A4.G4.F4 G4 A4 | G4 - A4 - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style chorale
//! metre 4/4 by 1/8
//!
//! S | A4 G4 F4 - G4 - A4 - |
//! B | D3 -  D3 - E3 - F3 - |
//! ```
//!
//! # What to do
//!
//! Write two eighths in the place of the second or fourth quarter, and go on by step.

use crate::Quick;
use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&PLACE, &LEAP],
    numbers: &[],
    sources: &[
        source::LEHMANN
            .at("lesson IX")
            .looser("the first of the pair may be leapt to, as here"),
        source::FUX_FIGURES
            .at("five rhythms with eighths, all in pairs on the second or fourth quarter"),
        source::JEPPESEN,
        source::RENAISSANCE_WORKS.at("none otherwise in 1,016 bars of Palestrina, 2 passages in 100 bars of other sacred music and songs, 77 in madrigals of the next age"),
    ],
};

static PLACE: Case = Case {
    name: "",
    when: "not two of them, in the second half of a minim (the second or fourth quarter of the bar)",
    settings: &[
        allow(Style::Free, "eighths run freely"),
        weakness(
            Style::Motet,
            "pairs on the weak half (Jeppesen, from memory)",
        ),
        fault(Style::Species1, "no exception in Fux's figures"),
    ],
};

static LEAP: Case = Case {
    name: "by-leap",
    when: "a pair that does not go by step, inside or to the note after it",
    settings: &[
        allow(Style::Free, "eighths run freely"),
        weakness(Style::Motet, "both by step (Jeppesen, from memory)"),
        fault(Style::Species1, "both by step (Lehmann, lesson IX)"),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    let strict = found.style_of(&[line.voice]).species() == Some(5);
    if line.is_given() || !(strict || found.style() == Style::Motet) {
        return;
    }
    // What goes on within a semibreve is one passage.
    let mut passages: Vec<(&'static Case, Quick)> = Vec::new();
    for quick in line.quick_notes(strict) {
        let case = if quick.notes != 2 || !quick.is_in_place {
            &PLACE
        } else if !quick.is_by_step {
            &LEAP
        } else {
            continue;
        };
        let open = passages
            .last_mut()
            .filter(|open| std::ptr::eq(open.0, case));
        if !open.is_some_and(|(_, passage)| passage.join(quick)) {
            passages.push((case, quick));
        }
    }
    let name = line.piece.name(line.voice);
    for (case, passage) in passages {
        found.passage(case, &[line.voice], (passage.from, passage.until), || {
            let notes = match (passage.notes, passage.groups) {
                (1, _) => "one eighth".to_owned(),
                (2, 1) => "two eighths".to_owned(),
                (notes, 1) => format!("{notes} eighths"),
                (notes, groups) => format!("{notes} eighths in {groups} groups"),
            };
            let what = match (std::ptr::eq(case, &PLACE), passage.groups) {
                (true, 1) => "not a pair in the second half of a beat",
                (true, _) => "not pairs in the second half of a beat",
                (false, 1) => "a pair that does not go by step",
                (false, _) => "pairs that do not go by step",
            };
            format!(
                "Eighth notes: {name} has {notes} here, {what}. Write two by step after a quarter."
            )
        });
    }
}
