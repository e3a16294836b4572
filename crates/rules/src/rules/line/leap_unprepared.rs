//! A large leap goes on in the direction the line came from.
//!
//! Why: a line that turns before a large leap stays within its register; going the same way
//! already, it overshoots.
//!
//! # Fails
//!
//! ```voices
//! style motet
//!
//! S | D4 E4 C5 B4 |
//! //        ^^ leap unprepared (weakness): S
//! ```
//!
//! # Passes
//!
//! ```voices
//! style motet
//!
//! S | F4 E4 C5 B4 |
//! ```
//!
//! # Does not apply
//!
//! In quicker species, and below the soprano of a chorale:
//!
//! ```voices
//! style species-2
//!
//! S | D4 E4 | C5 B4 |
//! ```
//!
//! # What to do
//!
//! Come to the leap from the other side, best by step.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[source::BUTTERFIELD.at("ch. 5"), source::JEPPESEN],
};

static ORDINARY: Case = Case {
    name: "",
    when: "a sixth or more after a move in the same direction; in a chorale in the soprano only",
    settings: &[
        allow(Style::Free, "a matter of taste"),
        weakness(Style::Chorale, "handbooks ask for it (Butterfield)"),
        weakness(Style::Motet, "the line turns first (Jeppesen, from memory)"),
        weakness(Style::Species1, "handbooks ask for it (Butterfield)"),
        allow(Style::Species2, "not asked of quicker notes"),
        allow(Style::Species3, "not asked of quicker notes"),
        allow(Style::Species4, "suspensions leave little choice"),
        weakness(Style::Species5, "handbooks ask for it (Butterfield)"),
    ],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    if line.is_given() || (found.style() == Style::Chorale && !line.is_top()) {
        return;
    }
    // A leap that is told for itself, or with the leap before it, or with what it leads to, which
    // weighs more than what led to it.
    let told = found.leaps_told(&["leaps-one-way", "leap-unrecovered"], line);
    for (i, step) in line.moves.iter().enumerate() {
        let Some(before) = line.before(i) else {
            continue;
        };
        let is_told = told.binary_search(&step.to.onset).is_ok();
        if step.size() < 5 || !step.goes_on_from(before) || is_told {
            continue;
        }
        found.line(&ORDINARY, line, step, || {
            let (from, to) = step.ends();
            let way = step.way();
            let side = if step.rises() { "above" } else { "below" };
            format!(
                "Leap unprepared: {} goes {way} from {} to {from} and leaps on {way} to {to}. Come to the leap from {side}.",
                line.piece.name(line.voice),
                before.ends().0
            )
        });
    }
}
