//! A note of the chord is doubled that does better alone.
//!
//! Why: the notes that carry the chord bear doubling; a note that is altered, or that wants to move on, stands out when two voices have it.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | E4 - F4 - | E4 - - - |
//! //       ^ chord doubling (weakness): S and A
//! A | C4 - F4 - | C4 - - - |
//! T | G3 - B3 - | G3 - - - |
//! B | C3 - D3 - | C3 - - - |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | C5 - B4 - | C5 - - - |
//! A | G4 - F4 - | G4 - - - |
//! T | E4 - D4 - | C4 - - - |
//! B | C3 - D3 - | E3 - - - |
//! ```
//!
//! # Does not apply
//!
//! In three parts the lines decide. And the third of a chord may be doubled where it is no leading
//! note, as in the chord that a dominant turns aside to:
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | E4 - D4 - | C4 - - - |
//! A | C4 - B3 - | C4 - - - |
//! T | G3 - G3 - | E3 - - - |
//! B | C3 - G2 - | A2 - - - |
//! ```
//!
//! # What to do
//!
//! Let one of the two take the note in the bass, or the root.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Chords(check),
    cases: &[&DIMINISHED, &ALTERED, &THIRD, &SIXTH_CHORD],
    numbers: &[],
    sources: &[
        source::BUTTERFIELD.stricter("it would have no third doubled"),
        source::OPEN_MUSIC_THEORY,
        source::LEHMANN.at("lesson XI"),
        source::NAVY,
        source::FEEZELL,
        source::CHORALES_READ.at("the counts of doublings, where four voices are plain"),
    ],
};

static DIMINISHED: Case = Case {
    name: "",
    when: "in four parts, a diminished triad in sixth position of which another note than the bass is doubled, for a beat; not a fifth through which one of the two goes by step, and a leading note is told of by its own rule",
    settings: &[
        allow(Style::Free, "instruments may cover it"),
        weakness(
            Style::Chorale,
            "the bass alone is at rest: 135 of 159 in the chorales double it, 21 the fifth",
        ),
        weakness(Style::Motet, "its fifth and its root both want to move on"),
        allow(
            Style::Species1,
            "the species know no doublings to choose from",
        ),
    ],
};

static ALTERED: Case = Case {
    name: "altered",
    when: "in four parts, an altered note doubled for a beat in a chord that is not in root position",
    settings: &[
        allow(Style::Free, "instruments may cover it"),
        weakness(Style::Chorale, "both would go on the same way"),
        allow(
            Style::Motet,
            "the modes change their signs: the one place in 314 works is a note of the mode",
        ),
        allow(
            Style::Species1,
            "the species know no doublings to choose from",
        ),
    ],
};

static THIRD: Case = Case {
    name: "third",
    when: "in four parts, the third of a triad in root position doubled for a beat, where it is no leading note",
    settings: &[
        allow(Style::Free, "only a leading note may not be doubled"),
        allow(
            Style::Chorale,
            "only a leading note may not be doubled: in the chorales 226 of 2,918 triads in root position double another third, 26 of 40 on the sixth degree after a dominant",
        ),
    ],
};

static SIXTH_CHORD: Case = Case {
    name: "sixth-chord",
    when: "in four parts, the bass of a major or minor sixth chord doubled for a beat, where it is the third or the sixth degree",
    settings: &[
        allow(Style::Free, "only a leading note may not be doubled"),
        allow(
            Style::Chorale,
            "only a leading note may not be doubled: in the chorales 117 of 250 on the third degree of major and 70 of 109 on the sixth double the bass",
        ),
    ],
};

fn check(chord: &Chord<'_>, found: &mut Found<'_>) {
    let Some(doubling) = chord.doubling() else {
        return;
    };
    let (case, name) = match doubling.what {
        Doubling::DiminishedUpper => (&DIMINISHED, "diminished sixth chord"),
        Doubling::Altered => (&ALTERED, "altered note"),
        Doubling::ThirdOfRootPosition => (&THIRD, "third"),
        Doubling::BassOfSixthChord => (&SIXTH_CHORD, "bass of a sixth chord"),
    };
    let voices: Vec<usize> = doubling.members.iter().map(|m| m.voice).collect();
    let note = doubling.members.first().map(|m| m.pitch.class_name());
    found.sonority(case, &voices, doubling.there.onset(), || {
        format!(
            "Chord doubling: {} have {} of {} ({name}). Give one of them another note of the chord{}.",
            doubling.there.piece.names(&voices),
            note.unwrap_or_default(),
            chord.name(),
            if doubling.what == Doubling::DiminishedUpper { ", best the bass note" } else { "" },
        )
    });
}
