//! A line comes to its high point more than once.
//!
//! Why: one high point gives a line its goal; reached again, it is no longer an event.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//!
//! S | D4 F4 A4 G4 | A4 F4 E4 D4 ||
//! //        ^^ high point repeated (weakness): S
//! ```
//!
//! In a chorale it is the soprano's phrase that counts:
//!
//! ```voices
//! style chorale
//!
//! S | C5 A4 C5 G4^ | A4 B4 C5 C5^ ||
//! //  ^^ high point repeated (weakness): S
//! A | E4 F4 E4 D4  | C4 D4 E4 E4  ||
//! ```
//!
//! # Passes
//!
//! Struck again at once it is one high point:
//!
//! ```voices
//! style species-1
//!
//! S | D4 F4 A4 A4 | G4 F4 E4 D4 ||
//! ```
//!
//! # Does not apply
//!
//! Suspensions leave a line little choice, and without `||` it is not whole:
//!
//! ```voices
//! style species-1
//!
//! S | D4 F4 A4 G4 | A4 F4 E4 D4 |
//! ```
//!
//! # What to do
//!
//! Take one of the two lower, or lead the line a step beyond the first.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&WHOLE, &PHRASE],
    numbers: &[],
    sources: &[
        source::OPEN_MUSIC_THEORY,
        source::KOSTKA_PAYNE.at("focal point"),
        source::FUX_FIGURES
            .at("the top note returns in 17 of 44 figures")
            .looser("no reproach to a line otherwise good"),
    ],
};

static WHOLE: Case = Case {
    name: "",
    when: "the highest note of a whole line comes back later",
    settings: &[
        allow(Style::Free, "long lines have several high points"),
        weakness(Style::Species1, "Fux has it in 17 of 44 lines"),
        allow(
            Style::Species4,
            "suspensions leave little choice (Open Music Theory)",
        ),
    ],
};

static PHRASE: Case = Case {
    name: "phrase",
    when: "the highest note of a soprano's phrase comes back later in it",
    settings: &[
        allow(Style::Free, "long lines have several high points"),
        weakness(
            Style::Chorale,
            "the focal point of a phrase (Kostka and Payne)",
        ),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    if line.is_given() || !line.piece.closes() {
        return;
    }
    if found.style() == Style::Chorale {
        for (from, until) in line.marked_phrases().into_iter().filter(|_| line.is_top()) {
            report(line, found, &PHRASE, from, until);
        }
    } else {
        report(
            line,
            found,
            &WHOLE,
            line.piece.start(),
            line.piece.score.end(),
        );
    }
}

fn report(line: &Line<'_>, found: &mut Found<'_>, case: &'static Case, from: Time, until: Time) {
    let Some(top) = line.high_point(from, until) else {
        return;
    };
    let (Some(&first), [_, _, ..]) = (top.times.first(), &top.times[..]) else {
        return;
    };
    found.sonority(case, &[line.voice], first, || {
        let again: Vec<String> =
            top.times.iter().skip(1).take(3).map(|&at| line.piece.place_text(at)).collect();
        let more = if top.times.len() > 4 { " and later" } else { "" };
        let whose = if case.name.is_empty() { "" } else { " of the phrase" };
        format!(
            "High point repeated: {} comes to {}, the highest note{whose}, again in {}{more}. Take one of them lower, if you can.",
            line.piece.name(line.voice),
            top.pitch,
            again.join("; ")
        )
    });
}
