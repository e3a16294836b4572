//! A passing note where the species has none, or on a strong moment.
//!
//! Why: a passing note is heard as motion between two consonances; on a strong moment, or where every
//! note stands alone, it is heard as a clash.
//!
//! # Fails
//!
//! ```voices
//! style species-4
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | D5 - C - | B4 - C5 - |
//! C | D4 - - - | G4 - - - |
//! //       ^ passing note: S and C
//! ```
//!
//! ```voices
//! style species-2
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | C5 - - - | B4 - A4 - |
//! C | E4 - - - | C4 - - - |
//! //             ^ passing note: S and C
//! ```
//!
//! # Passes
//!
//! Between two consonances, on the weak half:
//!
//! ```voices
//! style species-2
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | A4 - G4 - | F4 - A4 - |
//! C | D4 - -  - | D4 - -  - |
//! ```
//!
//! The third quarter of four, as Fux has it:
//!
//! ```voices
//! style species-3
//! metre 4/4
//! voice S
//! voice C cantus
//!
//! S | D5 C B4 A | G4 - - - |
//! C | G4 - -  - | E4 - - - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style chorale
//! metre 4/4
//!
//! S | C5 - B4 A4 |
//! B | C4 - - A3 |
//! ```
//!
//! # What to do
//!
//! Make the note consonant, or move it to a weaker moment.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&WEAK, &ACCENTED, &DOWNBEAT, &DESCENDING, &QUICK],
    numbers: &[],
    sources: &[
        source::FUX,
        source::FUX_FIGURES.at("28 third quarters of 93 passing notes in third species"),
        source::LEHMANN.at("lessons II and IV"),
        source::OPEN_MUSIC_THEORY,
        source::JEPPESEN,
    ],
};

static WEAK: Case = Case {
    name: "",
    when: "on a weak moment, in a species of single notes",
    settings: &[
        allow(Style::Free, "the commonest ornament"),
        fault(
            Style::Species1,
            "only consonances, note against note (Fux, Grove)",
        ),
        allow(Style::Species2, "the second half may pass"),
        allow(Style::Species3, "second to fourth quarter"),
        fault(
            Style::Species4,
            "the off-beat is consonant: it prepares the next suspension (Grove, fourth order)",
        ),
        allow(Style::Species5, "as in the second and third species"),
    ],
};

static ACCENTED: Case = Case {
    name: "accented",
    when: "on a stronger moment than a note beside it",
    settings: &[
        allow(Style::Free, "ordinary in instrumental lines"),
        weakness(
            Style::Motet,
            "the strong minim is for suspensions (Jeppesen, from memory)",
        ),
        fault(Style::Species1, "only consonances (Fux, Grove)"),
        fault(
            Style::Species2,
            "the first half is consonant (Lehmann, lesson II)",
        ),
        allow(
            Style::Species3,
            "the third quarter passes 28 times in the 75 figures of Fux, downbeats never",
        ),
        fault(Style::Species4, "the off-beat is consonant"),
        weakness(Style::Species5, "four times in the figures of Fux"),
    ],
};

static DOWNBEAT: Case = Case {
    name: "downbeat",
    when: "on the first beat of a bar of quarters",
    settings: &[
        allow(Style::Free, "ordinary in instrumental lines"),
        allow(Style::Motet, "as any other strong moment"),
        fault(Style::Species1, "only consonances"),
        fault(Style::Species2, "the first half is consonant"),
        fault(
            Style::Species3,
            "the first quarter is consonant (Fux, Lehmann, lesson IV)",
        ),
        fault(Style::Species4, "only suspensions"),
        fault(Style::Species5, "the first beat is consonant unless tied"),
    ],
};

static DESCENDING: Case = Case {
    name: "descending-quarters",
    when: "going down in notes shorter than a beat",
    settings: &[
        allow(Style::Free, "ordinary in instrumental lines"),
        allow(
            Style::Motet,
            "the quarters that go down on a weak minim, or after one (Jeppesen, from memory)",
        ),
    ],
};

static QUICK: Case = Case {
    name: "quick",
    when: "in notes shorter than a quarter",
    settings: &[
        allow(Style::Free, "ordinary in instrumental lines"),
        allow(
            Style::Motet,
            "pairs of eighths pass on either of the two (Jeppesen, from memory)",
        ),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    let Some(Figure::Passing { accented }) = discord.figure() else {
        return;
    };
    let strict = found.style_of(&[discord.dissonant().0]).is_species();
    let case = if !accented {
        &WEAK
    } else if strict && discord.is_on_downbeat() {
        &DOWNBEAT
    } else if !strict && discord.is_shorter_than_quarter() {
        &QUICK
    } else if !strict
        && discord.is_shorter_than_beat()
        && discord.steps_into(discord.dissonant()) == Some(-1)
    {
        &DESCENDING
    } else {
        &ACCENTED
    };
    // One that is too long is told as that, which weighs more.
    if found.is_told_of_dissonance("long-dissonance", discord) {
        return;
    }
    found.dissonance(case, discord, || {
        let advice = if accented {
            "Make it consonant, or move it to a weaker moment."
        } else {
            "Make it consonant."
        };
        format!("Passing note: {}. {advice}", discord.words())
    });
}
