//! A florid voice stays in one species, or stops where it should go on.
//!
//! Why: fifth species lives on the change between the others; and some rhythms stop the line where
//! it should go on: a short note held longer, two quarters that run into a half and rest there.
//!
//! # Fails
//!
//! ```voices
//! style species-5
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | D5 C5 B4 A4 | A4 G4 F4 G4 | A4 B4 C5 D5 |
//! //                              ^^ florid rhythm (weakness): S
//! C | D4 -  -  -  | F4 -  -  -  | A4 -  -  -  |
//! ```
//!
//! Two quarters and a half that ends with the bar:
//!
//! ```voices
//! style species-5
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | F4 G4 A4 - | A4 - C5 - |
//! //  ^^ florid rhythm (weakness): S
//! C | D4 -  -  - | F4 - -  - |
//! ```
//!
//! A quarter held over the bar:
//!
//! ```voices
//! style species-5
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | D5 C5 B4 A4 | - - F4 - |
//! //           ^^ florid rhythm (weakness): S
//! C | D4 -  -  -  | F4 - - - |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-5
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | A4 G4 A4 - | - B4 C5 - |
//! C | D4 -  -  - | F4 - -  - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style species-3
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | D5 C5 B4 A4 | C5 A4 B4 C5 | D5 B4 C5 D5 |
//! C | D4 -  -  -  | A3 -  -  -  | G3 -  -  -  |
//! ```
//!
//! # What to do
//!
//! Change the species after two bars at the most; tie halves, to halves or quarters.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Piece(check),
    cases: &[&SAME, &STOPS, &TIE],
    numbers: &[&BARS],
    sources: &[
        source::LEHMANN.at("lesson IX"),
        source::OPEN_MUSIC_THEORY,
        source::FUX_FIGURES.at("rhythms of the bar in fifth species: two quarters and a half 22 times, the half tied on"),
    ],
};

static BARS: NumberOf = NumberOf {
    name: "bars",
    means: "bars of one species that may follow each other in fifth species",
    value: 2,
    bounds: (1, 99),
};

static SAME: Case = Case {
    name: "one-species",
    when: "more than two bars running in quarters, in halves, in tied halves or in whole notes",
    settings: &[
        allow(Style::Free, "species only"),
        weakness(
            Style::Species1,
            "a bar and a half, or two (Lehmann, lesson IX)",
        ),
    ],
};

static STOPS: Case = Case {
    name: "quarters-and-half",
    when: "a bar of two quarters and a half that is not tied on",
    settings: &[
        allow(Style::Free, "species only"),
        weakness(Style::Species1, "Fux ties the half on"),
    ],
};

static TIE: Case = Case {
    name: "tie",
    when: "a tie from something else than a half, or to something else than a half or quarter; a quarter held over the middle of the bar",
    settings: &[
        allow(Style::Free, "species only"),
        weakness(
            Style::Species1,
            "a half is tied, to a half or quarter (Lehmann, lesson IX)",
        ),
    ],
};

fn check(piece: &Piece<'_>, found: &mut Found<'_>) {
    for (voice, cantus) in piece.in_species(5, found.style()) {
        voice_of_fifth(piece, found, cantus, voice);
    }
}

fn voice_of_fifth(piece: &Piece<'_>, found: &mut Found<'_>, cantus: usize, voice: usize) {
    let (mut running, mut before) = (0, None);
    for over in piece.over_cantus(cantus, voice) {
        if over.is_unknown || over.is_triple {
            before = None;
            continue;
        }
        let species = plain_species(&over);
        running = match species {
            Some(_) if species == before => running + 1,
            _ => i32::from(species.is_some()),
        };
        before = species;
        if running > found.number(&BARS) {
            found.passage(&SAME, &[voice], (over.from, over.until), || {
                let name = piece.name(voice);
                format!("Florid rhythm: {name} is in one species for {running} bars. Change the note values.")
            });
        }
        let half_stays = matches!(over.strokes[..], [a, b, c]
            if a.is_plain(4) && b.is_plain(4) && c.is_plain(2));
        if half_stays {
            found.passage(&STOPS, &[voice], (over.from, over.until), || {
                let name = piece.name(voice);
                format!("Florid rhythm: {name} runs into a half that stops with the bar. Tie it on, or go on in quarters.")
            });
        }
        for stroke in &over.strokes {
            let Some(what) = bad_tie(stroke) else {
                continue;
            };
            found.sonority(&TIE, &[voice], over.moment(stroke), || {
                let name = piece.name(voice);
                format!(
                    "Florid rhythm: {name} has {what}. Tie only halves, to a half or a quarter."
                )
            });
        }
    }
}

/// The species a bar is in, where it is in one.
fn plain_species(over: &Over) -> Option<u8> {
    let all = |part| over.strokes.iter().all(|stroke| stroke.is_part(part));
    match over.strokes.len() {
        1 if all(1) => Some(1),
        2 if all(2) && over.is_tied_in() => Some(4),
        2 if all(2) => Some(2),
        4 if all(4) => Some(3),
        _ => None,
    }
}

fn bad_tie(stroke: &Stroke) -> Option<&'static str> {
    if !stroke.sounds || stroke.is_tied_in() {
        return None;
    }
    if stroke.is_tied_out() {
        let lawful = stroke.is_part(2) && (stroke.lasts_on(2) || stroke.lasts_on(4));
        return (!lawful)
            .then_some("a tie over the bar that is not from a half to a half or quarter");
    }
    stroke
        .is_quarter_held()
        .then_some("a quarter held over the middle of the bar")
}
