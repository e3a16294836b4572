//! A note lies outside the compass of its voice.
//!
//! Why: what lies beyond a voice's compass does not sound as written, or not at all; long
//! writing at its edge strains a singer, children and changing voices most of all. The built-in
//! compasses are handbook values for trained adults, no limit for a given person: ask the
//! singers, and whoever trains them.
//!
//! # Fails
//!
//! ```voices
//! voice S soprano
//!
//! S | G5 A | G D6 |
//! //     ^ compass (weakness): S
//! //           ^^ compass: S
//! ```
//!
//! This singer's own limit:
//!
//! ```voices
//! voice B bass E2..D4
//!
//! B | D4 E | C |
//! //     ^ compass: B
//! ```
//!
//! Where this singer is at ease:
//!
//! ```voices
//! voice A alto easy A3..B4
//!
//! A | A4 C5 | B4 |
//! //     ^^ compass (weakness): A
//! ```
//!
//! # Passes
//!
//! ```voices
//! voice S soprano
//!
//! S | C4 G5 | E |
//! ```
//!
//! # Does not apply
//!
//! A plain voice has no compass:
//!
//! ```voices
//! voice X
//!
//! X | C1 C2 | C8 |
//! ```
//!
//! # What to do
//!
//! Move the note, or the voice by an octave; or write the singer's own compass into the `voice`
//! line, once you have asked.

use crate::prelude::*;
use partwright_score::Compass;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Lines(check),
    cases: &[&EXTREME, &ORDINARY, &LIMIT, &EASY],
    numbers: &[],
    sources: &[
        source::CHORAL_HANDBOOKS,
        source::BACH_CHORALES.at("extremes: A3-A5, E3-D5, C3-A4, C2-E4"),
        source::ORCHESTRATION_HANDBOOKS,
    ],
};

static EXTREME: Case = Case {
    name: "extreme",
    when: "outside the extreme compass of the voice's kind",
    settings: &[fault(Style::Free, "no handbook goes further")],
};

static ORDINARY: Case = Case {
    name: "ordinary",
    when: "outside the ordinary compass of the voice's kind",
    settings: &[weakness(Style::Free, "the common ground of the handbooks")],
};

static LIMIT: Case = Case {
    name: "limit",
    when: "outside the limit that the voice line gives, which then stands for both of the kind's",
    settings: &[fault(Style::Free, "the composer's own statement")],
};

static EASY: Case = Case {
    name: "easy",
    when: "outside the compass that the voice line calls easy",
    settings: &[weakness(Style::Free, "the composer's own statement")],
};

fn check(line: &Line<'_>, found: &mut Found<'_>) {
    let Some(voice) = line.piece.score.voices.get(line.voice) else {
        return;
    };
    let given = voice.limit.is_some();
    let extreme = voice.kind.extreme.filter(|_| !given);
    let ordinary = voice
        .kind
        .ordinary
        .filter(|_| !given && voice.easy.is_none());
    let bounds = [
        (voice.limit, &LIMIT, "the limit given for"),
        (extreme, &EXTREME, "the extreme compass of"),
        (voice.easy, &EASY, "the easy compass of"),
        (ordinary, &ORDINARY, "the ordinary compass of"),
    ];
    for (i, (compass, case, words)) in bounds.into_iter().enumerate() {
        let Some(compass) = compass else { continue };
        // A note that breaks a stricter bound is that one's finding.
        let stricter: Vec<Compass> = bounds.iter().take(i).filter_map(|b| b.0).collect();
        let side = |pitch| {
            let side = compass.side(pitch);
            (side != 0 && stricter.iter().all(|s| s.side(pitch) == 0)).then_some(side)
        };
        for run in line.runs(side) {
            found.passage(case, &[line.voice], (run.from, run.until), || {
                let (reach, way, beyond) = match run.kind {
                    1.. => (run.highest, "up", "above"),
                    _ => (run.lowest, "down", "below"),
                };
                let ask = if voice.kind.is_sung() {
                    "ask the singers and whoever trains them"
                } else {
                    "ask the player"
                };
                let running = if run.notes > 1 { format!(", {} notes running", run.notes) } else { String::new() };
                format!(
                    "Compass: {} goes {way} to {reach}, {beyond} {words} this voice ({} to {}){running}. Move it, or {ask} first.",
                    line.piece.name(line.voice),
                    compass.low,
                    compass.high,
                )
            });
        }
    }
}
