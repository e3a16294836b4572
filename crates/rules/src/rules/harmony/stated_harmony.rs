//! The notes disagree with the chord or the figures that are stated.
//!
//! Why: a chord that is stated is what was meant; where other notes stand, one of the two is a slip.
//!
//! # Fails
//!
//! A note that does not belong, and is no ornament:
//!
//! ```voices
//! key C major
//! metre 2/4
//!
//! S       | C5 D | C5 - ||
//! A       | G4 F | G4 - ||
//! //           ^ stated harmony (weakness): A and T
//! T       | E4 A3 | E4 - ||
//! B       | C3 D | C3 - ||
//! harmony | I  V | I  - ||
//! ```
//!
//! Another note in the bass:
//!
//! ```voices
//! key C major
//! metre 2/4
//!
//! S       | C5 D  | C5 - ||
//! A       | G4 G  | G4 - ||
//! T       | E4 B3 | C4 - ||
//! B       | C3 G2 | E3 - ||
//! //           ^ stated harmony (weakness): B
//! harmony | I  V6 | I6 - ||
//! ```
//!
//! Figures ask for a raised third:
//!
//! ```voices
//! key A minor
//! metre 2/4
//!
//! S       | A4 B  | A4 - ||
//! A       | E4 G4 | E4 - ||
//! //           ^ stated harmony (weakness): A
//! B       | C3 E3 | A3 - ||
//! figures | 6  #  | _    ||
//! ```
//!
//! # Passes
//!
//! Passing notes and suspensions, and a fifth left out:
//!
//! ```voices
//! key C major
//! metre 4/4
//!
//! S       | E5 D.C D -    | C5 - - - ||
//! A       | G4 -   G  -.F | E4 - - - ||
//! T       | C4 -   -  B3  | C4 - - - ||
//! B       | C3 -   G3 -   | C3 - - - ||
//! harmony | I  -   V4 V7  | I  - - - ||
//! ```
//!
//! # Does not apply
//!
//! Where notes are not written yet, or the row states nothing:
//!
//! ```voices
//! key C major
//! metre 2/4
//!
//! S       | C5 D  | ?  - | A4 -  |
//! B       | C3 G2 | D3 - | F3 -  |
//! harmony | I  V  | V  - | _     |
//! ```
//!
//! # What to do
//!
//! Change the note, or the chord or figures stated.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Piece(check),
    cases: &[&ORDINARY, &BASS, &LACKING],
    numbers: &[],
    sources: &[source::COMMON_PRACTICE],
};

const SETTINGS: &[Setting] = &[weakness(
    Style::Free,
    "the composer says so: one of the two is a slip, and the design asks for a finding of its own",
)];

static ORDINARY: Case = Case {
    name: "",
    when: "a note under a stated chord is none of its notes, none its figures ask for, and no ornament",
    settings: SETTINGS,
};

static BASS: Case = Case {
    name: "bass",
    when: "the lowest note is another of the chord's than its figures tell",
    settings: SETTINGS,
};

static LACKING: Case = Case {
    name: "lacking",
    when: "three voices or more lack the third or the root; the fifth may be left out",
    settings: SETTINGS,
};

fn check(piece: &Piece<'_>, found: &mut Found<'_>) {
    for stated in piece.stated_harmony() {
        let strangers = stated.strangers();
        if let Some(first) = strangers.first() {
            let voices = stated.voices_of(&strangers);
            let (are, notes) = match strangers.len() {
                1 => ("is no note", "note"),
                _ => ("are no notes", "notes"),
            };
            found.sonority(&ORDINARY, &voices, first.at, || {
                format!(
                    "Stated harmony: {} {are} of {}, and no ornament. Change the {notes}, or the chord stated.",
                    stated.names(&strangers),
                    stated.words()
                )
            });
        } else if let Some((wanted, stands)) = stated.other_bass() {
            found.sonority(&BASS, &[stands.voice], stands.at, || {
                format!(
                    "Stated harmony: {} has {wanted} in the bass, and the lowest note is {}. Change the bass, or the figures of the chord stated.",
                    stated.words(),
                    stated.names(&[stands])
                )
            });
        } else if let Some((what, name)) = stated.lacking() {
            let told = |there| found.is_told_of_sonority("third-missing", &there);
            if what == "third" && stated.soundings().any(told) {
                continue;
            }
            found.sonority(&LACKING, &stated.voices(), stated.at(), || {
                format!(
                    "Stated harmony: {} lacks {name}, its {what}. Give it to a voice that doubles, or change the chord stated.",
                    stated.words()
                )
            });
        }
    }
}
