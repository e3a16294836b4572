//! A cantus does not serve for counterpoint.
//!
//! Why: whatever is written over it leans on it: it must be short, quiet, and plain about its mode.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | E4 F4 G4 A4 C5 B4 B4 C5 ||
//! C | C4 D4 C4 F4 E4 D4 D4 C4 ||
//! //                    ^^ cantus (weakness): C
//! ```
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | E4 F4 G4 F4 B4 C5 B4 C5 ||
//! C | C4 D4 C4 A4 G4 E4 D4 C4 ||
//! //           ^^ cantus (weakness): C
//! ```
//!
//! Beginning elsewhere, and closing by leap:
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | A4 F4 G4 A4 B4 C5 B4 C5 ||
//! C | D4 D4 C4 F4 D4 E4 D4 C4 ||
//! //  ^^ cantus (weakness): C
//! //     ^^ cantus (weakness): C
//! ```
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | E4 F4 E4 F4 B4 C5 D5 C5 ||
//! C | C4 D4 C4 A3 G3 C4 G3 C4 ||
//! //                    ^^ cantus (weakness): C
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | A4 A4 G4 A4 B4 C5 C5 B4 D5 C#5 D5 ||
//! C | D4 F4 E4 D4 G4 F4 A4 G4 F4 E4  D4 ||
//! ```
//!
//! # Does not apply
//!
//! To a cantus that does not close yet:
//!
//! ```voices
//! style species-1
//! voice S
//! voice C cantus
//!
//! S | A4 A4 G4 A4 |
//! C | D4 F4 E4 C4 |
//! ```
//!
//! # What to do
//!
//! Choose eight to sixteen notes by step and small leap that begin and end on the final.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&LENGTH, &FINAL, &LAST_STEP, &LEAP, &REPEAT, &COMPASS],
    numbers: &[&LEAST, &MOST, &WIDEST],
    sources: &[
        source::OPEN_MUSIC_THEORY,
        source::FUX_FIGURES.at("his seven cantus firmi"),
    ],
};

static LEAST: NumberOf = NumberOf {
    name: "least",
    means: "notes a cantus has at least",
    value: 8,
    bounds: (2, 99),
};

static MOST: NumberOf = NumberOf {
    name: "most",
    means: "notes a cantus has at most",
    value: 16,
    bounds: (2, 99),
};

static WIDEST: NumberOf = NumberOf {
    name: "widest",
    means: "scale steps between the lowest and the highest note of a cantus: 9 is a tenth",
    value: 9,
    bounds: (1, 99),
};

static ADVICE: &[Setting] = &[
    allow(Style::Free, "species only"),
    weakness(
        Style::Species1,
        "so are the seven of Fux, and so Open Music Theory advises",
    ),
];

const fn advised(name: &'static str, when: &'static str) -> Case {
    Case {
        name,
        when,
        settings: ADVICE,
    }
}

static LENGTH: Case = advised("length", "fewer than 8 notes, or more than 16");
static FINAL: Case = advised("final", "it does not begin on the final with which it ends");
static LAST_STEP: Case = advised(
    "last-step",
    "it does not step to its last note, from the second degree or seldom the seventh",
);
static LEAP: Case = advised(
    "leap",
    "a leap beyond a fifth, but for a minor sixth up and an octave",
);
static REPEAT: Case = advised("repeat", "a note struck again at once");
static COMPASS: Case = advised(
    "compass",
    "more than a tenth from its lowest note to its highest",
);

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    let piece = &line.piece;
    if !piece.is_cantus(line.voice) || !found.style().is_species() || !piece.closes() {
        return;
    }
    let runs = line.runs(|_| Some(()));
    let (Some(whole), Some(last)) = (runs.first(), line.moves.last()) else {
        return;
    };
    let numbers = [&LEAST, &MOST, &WIDEST].map(|number| found.number(number));
    let [least, most, widest] = numbers;
    let name = piece.name(line.voice);
    let mut say = |case, at, what: &str| {
        found.sonority(case, &[line.voice], at, || {
            format!("Cantus: {name} {what}.")
        });
    };
    if !(least..=most).contains(&i32::try_from(whole.notes).unwrap_or(i32::MAX)) {
        let what = format!("has {} notes. Choose one of {least} to {most}", whole.notes);
        say(&LENGTH, whole.from, &what);
    }
    if whole.span() > widest {
        let what = format!(
            "spans {} to {}. Keep within {}",
            whole.lowest,
            whole.highest,
            Interval::noun(widest)
        );
        say(&COMPASS, whole.from, &what);
    }
    let opening = piece
        .texture
        .sounding_at(whole.from)
        .map(|k| piece.sounding(k));
    if opening.and_then(|there| piece.has_final(there, line.voice)) == Some(false) {
        say(
            &FINAL,
            whole.from,
            "does not begin on its final. Begin and end on one note",
        );
    }
    if last.size() != 1 {
        say(
            &LAST_STEP,
            last.from.onset,
            "does not step to its final. Close from the second degree",
        );
    }
    for step in line.moves {
        let allowed = step.size() <= 4 || step.size() == 7 || step.is_rising_minor_sixth();
        let (from, to) = step.ends();
        if !allowed {
            let what = format!("leaps from {from} to {to}. Keep leaps within a fifth");
            say(&LEAP, step.to.onset, &what);
        }
        if step.is_repeat() {
            say(
                &REPEAT,
                step.to.onset,
                &format!("strikes {to} again. Move to another note"),
            );
        }
    }
}
