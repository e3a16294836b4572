//! The leading note does not rise to the tonic.
//!
//! Why: it stands a semitone under its goal, and in the highest or the lowest voice everyone hears whether it gets there.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | E5 - B4 - | G4 - - - |
//! //              ^^ leading note resolution: S
//! A | G4 - D4 - | E4 - - - |
//! T | C4 - G3 - | G3 - - - |
//! B | C3 - G3 - | C3 - - - |
//! ```
//!
//! # Passes
//!
//! Inside, covered by the voices above, it may fall a third and leave the chord whole:
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | E5 - D5 - | C5 - - - |
//! A | G4 - B4 - | G4 - - - |
//! T | C4 - D4 - | E4 - - - |
//! B | C3 - G3 - | C3 - - - |
//! ```
//!
//! # Does not apply
//!
//! Where it passes down the scale from the tonic:
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | E5 C5 B4 A4 | G4 - - - |
//! A | G4 G4 F4 F4 | E4 - - - |
//! T | C4 E4 D4 D4 | E4 - - - |
//! B | C3 C3 G3 G2 | C3 - - - |
//! ```
//!
//! # What to do
//!
//! Let it rise a semitone; or give it to a voice inside, and let that one rise or fall a third. A
//! house that wants every leading note to rise sets `inner-drop`.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Chords(check),
    cases: &[&OUTER, &RAISED, &DROP],
    numbers: &[],
    sources: &[
        source::OPEN_MUSIC_THEORY.at("tendency tones"),
        source::BUTTERFIELD,
        source::COLAROS,
        source::FEEZELL,
        source::BACH_CHORALES.at(
            "of 245 in the soprano at cadences 226 rise; inside at fermatas 747 fall and 271 rise",
        ),
        source::CHORALES_READ
            .at("of 147 in the soprano 135 rise; inside at fermatas 143 fall a third and 54 rise"),
    ],
};

static OUTER: Case = Case {
    name: "",
    when: "a dominant goes to its tonic, and the highest or the lowest voice leaves the leading note for another note than the one a semitone above; not down the scale 8-7-6, nor by a chromatic semitone, nor where the dominant only passes between beats or the tonic stands over its fifth",
    settings: &[
        weakness(Style::Free, "instruments may cover it"),
        fault(Style::Chorale, "the outer voices are heard"),
        allow(
            Style::Motet,
            "a third that no one raised leads nowhere: 131 places in 314 works",
        ),
    ],
};

static RAISED: Case = Case {
    name: "raised",
    when: "the same, and the leading note is the raised seventh of minor, or one applied to another degree",
    settings: &[
        weakness(Style::Free, "instruments may cover it"),
        fault(Style::Chorale, "the outer voices are heard"),
        weakness(Style::Motet, "it was raised in order to rise"),
    ],
};

static DROP: Case = Case {
    name: "inner-drop",
    when: "a voice inside leaves the leading note of such a dominant by a third down",
    settings: &[allow(
        Style::Free,
        "covered by another voice: 747 of 1,018 in Bach's chorales at fermatas; some examiners forbid it",
    )],
};

fn check(chord: &Chord<'_>, found: &mut Found<'_>) {
    let Some(tonic) = chord.resolves_to().filter(|_| chord.is_on_beat()) else {
        return;
    };
    // Over its fifth the tonic only delays: the dominant goes on in the bass.
    if tonic.bass_tone() == Some(Tone::Fifth) {
        return;
    }
    for leaving in chord.leavings() {
        let resolves = leaving.rises_semitone() || leaving.stays() || leaving.is_chromatic();
        if resolves || !chord.is_leading_note(leaving.from.pitch) || leaving.passes_down() {
            continue;
        }
        let case = match leaving.is_outer() {
            true if chord.has_raised_leading_note() => &RAISED,
            true => &OUTER,
            false if leaving.falls_third() => &DROP,
            false => continue,
        };
        found.member(case, (&leaving.from, &leaving.to), || {
            format!(
                "Leading note resolution: {} goes from {} as {} goes to {}. Let the leading note rise a semitone.",
                leaving.name(),
                leaving.words(),
                chord.name(),
                tonic.name(),
            )
        });
    }
}
