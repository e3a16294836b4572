//! The sixth and seventh degrees of a minor key go against its melodic scale.
//!
//! Why: the raised sixth exists for the sake of the raised seventh, and that one for the tonic;
//! elsewhere both sound like slips of another key.
//!
//! # Fails
//!
//! The raised sixth does not go up:
//!
//! ```voices
//! key A minor
//!
//! S | E4 F#4 E4 | D4 C4 |
//! //     ^^^ melodic minor (weakness): S
//! ```
//!
//! The line closes without a leading note:
//!
//! ```voices
//! key A minor
//!
//! S | C5 B4 G4 | A4 ||
//! //             ^^ melodic minor (weakness): S
//! B | A3 D3 E3 | A2 ||
//! ```
//!
//! # Passes
//!
//! ```voices
//! key A minor
//!
//! S | E4 F#4 G#4 A4 | G4 F4 E4 |
//! ```
//!
//! Down from the raised seventh, inside the dominant:
//!
//! ```voices
//! key A minor
//!
//! S | A4 G#4 F#4 E4 |
//! ```
//!
//! # Does not apply
//!
//! Where it belongs to the dominant of the dominant, or the next key begins (state it):
//!
//! ```voices
//! key A minor
//!
//! S | A4 A4 | G#4 A4 |
//! A | E4 F#4 | E4 E4 |
//! B | C3 D#3 | E3 C3 |
//! ```
//!
//! Without a stated minor key:
//!
//! ```voices
//! S | E4 F#4 E4 | D4 C4 |
//! ```
//!
//! # What to do
//!
//! Raise the sixth only on the way to the raised seventh, and the seventh where it closes on
//! the tonic. The sixth left as it is before a raised seventh makes an `augmented-interval`.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&SIXTH, &SEVENTH],
    numbers: &[],
    sources: &[
        source::LEHMANN.at("lessons II and IV"),
        source::OPEN_MUSIC_THEORY,
    ],
};

static SIXTH: Case = Case {
    name: "raised-sixth",
    when: "the raised sixth goes elsewhere than to the raised seventh, and did not come from it",
    settings: &[weakness(
        Style::Free,
        "the melodic scale (Lehmann; Open Music Theory)",
    )],
};

static SEVENTH: Case = Case {
    name: "natural-seventh",
    when: "the seventh rises to the tonic unraised at the end of a phrase, the tonic in the bass",
    settings: &[weakness(
        Style::Free,
        "a close wants its leading note (Lehmann)",
    )],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    if line.is_given() {
        return;
    }
    let degree = |note: &Note| line.minor_degree(note);
    let mut closes = |step: &LineMove| {
        let natural = degree(&step.from) == Some(MinorDegree::Seventh);
        let tonic = degree(&step.to) == Some(MinorDegree::Tonic);
        if !(natural && tonic && step.size() == 1 && line.rests_on_tonic(step)) {
            return;
        }
        found.line(&SEVENTH, line, step, || {
            let (from, to) = step.ends();
            format!(
                "Melodic minor: {} closes on {to} from {from}. Raise the seventh degree at a close.",
                line.piece.name(line.voice)
            )
        });
    };
    line.moves.iter().for_each(&mut closes);
    for (i, step) in line.moves.iter().enumerate() {
        let from_above = degree(&step.from) == Some(MinorDegree::RaisedSeventh);
        if degree(&step.to) != Some(MinorDegree::RaisedSixth) || step.is_repeat() || from_above {
            continue;
        }
        let Some(next) = line.after(i) else { continue };
        // In harmony it may lead to the natural seventh as to a tonic for a while, or be the
        // fifth in a dominant of the dominant.
        let leads = degree(&next.to) == Some(MinorDegree::Seventh) && next.rises()
            || line.is_over_raised_fourth(&step.to);
        let harmony = matches!(found.style(), Style::Free | Style::Chorale);
        if degree(&next.to) == Some(MinorDegree::RaisedSeventh) || (harmony && leads) {
            continue;
        }
        found.line(&SIXTH, line, step, || {
            let (sixth, to) = next.ends();
            format!(
                "Melodic minor: {} takes the raised sixth {sixth} and goes to {to}. Go up to the raised seventh, or leave the sixth as it is.",
                line.piece.name(line.voice)
            )
        });
    }
}
