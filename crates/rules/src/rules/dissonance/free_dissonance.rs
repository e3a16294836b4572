//! A dissonance with the lowest voice that no figure accounts for.
//!
//! Why: a dissonance is borne by what leads to it and away from it; without that it is heard as a wrong note.
//!
//! # Fails
//!
//! ```voices
//! style species-1
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | A4 - - - | D5 - - - | G4 - - - |
//! C | D4 - - - | C4 - - - | E4 - - - |
//! //             ^ free dissonance: S and C
//! ```
//!
//! A leap into a weak dissonance:
//!
//! ```voices
//! style species-3
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | A4 F4 A4 C5 | A4 - - - |
//! C | D4 -  -  -  | F4 - - - |
//! //           ^ free dissonance: S and C
//! ```
//!
//! A fourth over the bass, left by leap:
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | C5 - F5 - | A4 - - - |
//! B | A3 - C4 - | F3 - - - |
//! //       ^ free dissonance: S and B
//! ```
//!
//! In the first species not even a note struck again that resolves:
//!
//! ```voices
//! style species-1
//!
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | A4 - - - | A4 - - - | G4 - - - |
//! //             ^ free dissonance: S and C
//! C | C4 - - - | B3 - - - | C4 - - - |
//! ```
//!
//! In a chorale, where not even a seventh chord holds the notes together:
//!
//! ```voices
//! style chorale
//!
//! S | C5 G5 C5 |
//! //     ^^ free dissonance: S and B
//! A | G4 A4 G4 |
//! T | E4 C4 E4 |
//! B | C3 F3 C3 |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style species-3
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | D5 C5 B4 A4 | G4 - - - |
//! C | D4 -  -  -  | B3 - - - |
//! ```
//!
//! # Does not apply
//!
//! In free writing, and in a chorale where the notes make a seventh chord:
//!
//! ```voices
//! style free
//!
//! S | C5 - F5 - | A4 - - - |
//! B | A3 - C4 - | F3 - - - |
//! ```
//!
//! ```voices
//! style chorale
//!
//! S | C5 E5 E5 |
//! A | G4 A4 G4 |
//! T | E4 C4 C4 |
//! B | C3 F3 C3 |
//! ```
//!
//! # What to do
//!
//! Reach the note by step and leave it by step, prepare and resolve it, or make it consonant.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&ORDINARY, &LEAP, &FOURTH, &FIRST, &NO_CHORD],
    numbers: &[],
    sources: &[
        source::FUX,
        source::GROVE.at("Strict Counterpoint"),
        source::CHORALES_READ
            .at("16 places in no chord, most of them suspensions struck again or left by leap"),
        source::LEHMANN.at("lesson I"),
        source::OPEN_MUSIC_THEORY,
        source::HUTCHINSON.at("sec. 28.2"),
        source::COLAROS,
        source::FUX_FIGURES.at("none in 75 figures"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "reached and left by step, but on a strong moment, or not at all; where chords are heard, in every case only a note strange to the sure chord",
    settings: &[
        weakness(
            Style::Free,
            "strange to the chord, and no ornament (Hutchinson, sec. 28.2)",
        ),
        fault(
            Style::Chorale,
            "strange to the chord, and no ornament (Hutchinson, sec. 28.2)",
        ),
        fault(
            Style::Motet,
            "every dissonance is passing or suspended (Jeppesen, from memory)",
        ),
        fault(
            Style::Species1,
            "every dissonance passes or is suspended (Fux; Grove)",
        ),
    ],
};

static LEAP: Case = Case {
    name: "leap",
    when: "reached or left by leap",
    settings: &[
        weakness(
            Style::Free,
            "strange to the chord, and no ornament leaps so (Grove)",
        ),
        fault(
            Style::Chorale,
            "strange to the chord, and no ornament leaps so (Grove)",
        ),
        fault(
            Style::Motet,
            "no leap to or from a dissonance (Grove; Open Music Theory)",
        ),
        fault(
            Style::Species1,
            "no leap to or from a dissonance (Grove; Open Music Theory)",
        ),
    ],
};

static FOURTH: Case = Case {
    name: "fourth",
    when: "a fourth over the lowest voice",
    settings: &[
        weakness(
            Style::Free,
            "strange to the chord (Open Music Theory; Colaros)",
        ),
        fault(
            Style::Chorale,
            "strange to the chord (Open Music Theory; Colaros)",
        ),
        fault(
            Style::Motet,
            "the fourth over the lowest voice is dissonant (Fux)",
        ),
        fault(
            Style::Species1,
            "the fourth over the lowest voice is dissonant (Fux)",
        ),
    ],
};

static FIRST: Case = Case {
    name: "first-species",
    when: "held or struck again like a suspension, in note against note",
    settings: &[
        allow(Style::Free, "a suspension"),
        fault(
            Style::Species1,
            "note against note has only consonances (Fux; Lehmann, lesson I)",
        ),
        allow(Style::Species2, "judged as a suspension"),
    ],
};

static NO_CHORD: Case = Case {
    name: "no-chord",
    when: "in a sonority that makes no triad or seventh chord, ornaments and suspensions left out; in strict styles as the other cases",
    settings: &[
        allow(
            Style::Free,
            "chords of the ninth and more are at home there",
        ),
        fault(
            Style::Chorale,
            "what is no figure is a fault, and this is no chord either (Grove; 16 places in 156 chorales)",
        ),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    let style = found.style_of(&[discord.dissonant().0]);
    if style == Style::Species1 && discord.is_over_bass() && discord.suspension().is_some() {
        found.dissonance(&FIRST, discord, || {
            format!(
                "Free dissonance: {}. Note against note, every interval is consonant.",
                discord.words()
            )
        });
        return;
    }
    // A held note that lacks something of a suspension is told by the rules of suspensions, a
    // clash among upper voices by a rule of its own.
    let (accused, is_strange) = match discord.accused(style) {
        Some((accused, None)) => (accused, true),
        None if discord.is_in_no_chord(style) => (discord.dissonant(), false),
        _ => return,
    };
    if !discord.is_over_bass() {
        return;
    }
    let leap = |steps: Option<i32>| steps.is_some_and(|steps| steps.abs() >= 2);
    let into = leap(discord.steps_into(accused));
    let out = leap(discord.steps_out(accused));
    let case = if !is_strange {
        &NO_CHORD
    } else if discord.is_fourth_over_bass() {
        &FOURTH
    } else if into || out {
        &LEAP
    } else {
        &ORDINARY
    };
    found.accused(case, discord, accused, || {
        let (how, advice) = match (into, out) {
            (true, true) => (", reached and left by leap", "Reach and leave it by step"),
            (true, false) => (", reached by leap", "Reach it by step"),
            (false, true) => (", left by leap", "Leave it by step"),
            (false, false) => ("", "Move it to a weaker moment"),
        };
        let chord = if std::ptr::eq(case, &NO_CHORD) {
            ", and no triad or seventh chord holds both"
        } else {
            ""
        };
        format!(
            "Free dissonance: {}{how}{chord}. {advice}, or make it consonant.",
            discord.words_of(accused)
        )
    });
}
