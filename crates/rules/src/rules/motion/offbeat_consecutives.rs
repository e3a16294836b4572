//! Off the first beat of successive bars stands the same perfect interval.
//!
//! Why: the same place in the bar draws the two together, if less than two downbeats do.
//!
//! # Fails
//!
//! ```voices
//! style species-2
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | F4 A4 | G4 B4 |
//! //             ^^ offbeat consecutives (weakness): S and C
//! C | D4 -  | E4 -  |
//! ```
//!
//! # Passes
//!
//! Coming to the second one from the other side:
//!
//! ```voices
//! style species-2
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | A4 E4 | F4 A4 | C5 B4 |
//! C | A3 -  | D4 -  | E4 -  |
//! ```
//!
//! # Does not apply
//!
//! Outside the second species:
//!
//! ```voices
//! style chorale
//! metre 2/2
//!
//! S | F4 A4 | G4 B4 |
//! B | D4 -  | E4 -  |
//! ```
//!
//! # What to do
//!
//! Let one of the two be an imperfect interval.
//!
//! Grove tolerates them; Lehmann lets them pass where the second is reached from the other side.
//! The fourth species, where the Open Music Theory forbids them, has them only over suspensions:
//! see `delayed-consecutives`.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&ORDINARY, &TURNED],
    numbers: &[],
    sources: &[
        source::GROVE
            .at("Strict Counterpoint, second order")
            .looser("tolerated between weak beats"),
        source::LEHMANN.at("lesson II, Fig. 28"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "both voices moved the same way since the same place in the bar before",
    settings: &[
        allow(Style::Free, "a matter of the second species"),
        weakness(Style::Species2, "tolerated at best (Grove; Lehmann)"),
        allow(Style::Species3, "judged into the downbeat"),
        allow(Style::Species4, "judged over the suspension"),
        allow(Style::Species5, "judged from beat to beat"),
    ],
};

static TURNED: Case = Case {
    name: "turned",
    when: "the same, the second one reached from the other side than the first",
    settings: &[allow(Style::Free, "let pass (Lehmann, Fig. 28)")],
};

fn check(step: &PairMove<'_>, found: &mut Found<'_>) {
    if step.sounding.family_of(step.pair).is_none() {
        return;
    }
    let Some(bar) = step.from_off_beat() else {
        return;
    };
    if bar.same_perfect().is_none() || !bar.has_notes_between() {
        return;
    }
    let case = if bar.turns() { &TURNED } else { &ORDINARY };
    found.succession(case, &bar, || {
        let noun = bar.noun();
        format!(
            "Consecutive {noun} off the beat in successive bars: {}. Let one of the two be a third or a sixth.",
            bar.story()
        )
    });
}
