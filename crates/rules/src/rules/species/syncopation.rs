//! A voice in fourth species does not tie its halves over the bar.
//!
//! Why: fourth species is a chain of syncopations; each tie prepares the suspension to come, and
//! where the chain breaks it is second species.
//!
//! # Fails
//!
//! ```voices
//! style species-4
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | A4 A4 | - D5 | - C#5 | D5 - ||
//! //  ^^ syncopation: S
//! C | D4 -  | F4 - | E4 -  | D4 - ||
//! ```
//!
//! Two bars running without a tie:
//!
//! ```voices
//! style species-4
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | _ C5 | - A4 | B4 C5 | D5 C5 | - B4 | C5 - ||
//! //                        ^^ syncopation (weakness): S
//! C | C4 - | F4 - | G4 -  | F4 -  | D4 - | C4 - ||
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-4
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | _ A4 | - D5 | - C#5 | D5 - ||
//! C | D4 - | F4 - | E4 -  | D4 - ||
//! ```
//!
//! One bar without a tie lets the line out of a corner:
//!
//! ```voices
//! style species-4
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | _ C5 | - A4 | B4 E5 | - D5 | - C5 | - B4 | C5 - ||
//! C | C4 - | F4 - | G4 -  | F4 - | E4 - | D4 - | C4 - ||
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style species-2
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | D4 A4 | D5 A4 | B4 C#5 | D5 - ||
//! C | D4 -  | F4 -  | E4 -   | D4 - ||
//! ```
//!
//! # What to do
//!
//! Begin with half a rest, and hold every half into the next bar up to the last.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Piece(check),
    cases: &[&ORDINARY, &BROKEN],
    numbers: &[&BREAKS],
    sources: &[
        source::LEHMANN.at("lesson VI"),
        source::OPEN_MUSIC_THEORY,
        source::GROVE.at("Strict Counterpoint"),
        source::FUX_FIGURES.at("figures 73, 75 and 151 break their ties"),
    ],
};

static BREAKS: NumberOf = NumberOf {
    name: "breaks",
    means: "bars of fourth species that may be free of a tie, one at a time",
    value: 2,
    bounds: (0, 99),
};

static ORDINARY: Case = Case {
    name: "",
    when: "not half a rest and half a note to begin with, then halves, and a tied half in the last bar but one",
    settings: &[
        allow(Style::Free, "fourth species only"),
        fault(
            Style::Species1,
            "the species is its rhythm (Lehmann, lesson VI)",
        ),
    ],
};

static BROKEN: Case = Case {
    name: "broken-ties",
    when: "two bars running without a tie into them, or more single ones than are let pass",
    settings: &[
        allow(Style::Free, "fourth species only"),
        weakness(
            Style::Species1,
            "once or twice is let pass; Fux does it in three figures",
        ),
    ],
};

fn check(piece: &Piece<'_>, found: &mut Found<'_>) {
    for (voice, cantus) in piece.in_species(4, found.style()) {
        let (mut breaks, mut before) = (0, false);
        for over in piece.over_cantus(cantus, voice) {
            let skip = over.is_unknown || over.is_waiting || over.is_triple;
            if skip || over.to_close == Some(1) || over.may_close() {
                continue;
            }
            let missed = wanted(&over);
            let breaks_here = !over.is_entry && !over.is_tied_in();
            breaks += i32::from(breaks_here);
            let too_often = breaks_here && (before || breaks > found.number(&BREAKS));
            before = breaks_here;
            let (case, wants) = match missed {
                Some(wants) => (&ORDINARY, wants),
                None if too_often => (&BROKEN, "a half tied in from before"),
                None => continue,
            };
            found.passage(case, &[voice], (over.from, over.until), || {
                format!(
                    "Syncopation: over this note of {}, {} wants {wants}.",
                    piece.name(cantus),
                    piece.name(voice)
                )
            });
        }
    }
}

/// What a bar should hold and does not, ties apart.
fn wanted(over: &Over) -> Option<&'static str> {
    let (begins, goes_on) = match over.strokes[..] {
        [begins, goes_on] if goes_on.is_part(2) => (begins, goes_on),
        // What is being written may end with a half that waits for its bar.
        [only] if only.is_part(2) && over.is_last_written && over.to_close.is_none() => {
            return None;
        }
        _ => return Some("two halves, the first tied in from before"),
    };
    if over.is_entry && !begins.is_rest_of(2) {
        return Some("half a rest and half a note");
    }
    let closes = over.to_close == Some(2);
    (closes && (!begins.is_tied_in() || goes_on.is_tied_out()))
        .then_some("a half tied in from before, and another half")
}
