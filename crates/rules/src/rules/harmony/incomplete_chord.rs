//! A chord lacks a note that it cannot do without.
//!
//! Why: the fifth of a chord in root position may go; without the third the chord is neither major nor minor, and an inverted chord lacks body.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | C5 - D5 - | C5 - - - |
//! //       ^ incomplete chord: S and A and T and B
//! A | E4 - F4 - | E4 - - - |
//! T | G3 - G3 - | G3 - - - |
//! B | C3 - G2 - | C3 - - - |
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
//! A | E4 - F4 - | E4 - - - |
//! T | G3 - G3 - | G3 - - - |
//! B | C3 - G2 - | C3 - - - |
//! ```
//!
//! # Does not apply
//!
//! At a close the root may be there three times, and the fifth not at all:
//!
//! ```voices
//! style chorale
//! key C major
//! metre 4/4
//!
//! S | C5 - B4 - | C5 - - - |
//! A | E4 - D4 - | C4 - - - |
//! T | G3 - F3 - | E3 - - - |
//! B | C3 - G2 - | C3 - - - |
//! ```
//!
//! # What to do
//!
//! Let one of the voices that double take the note that is missing.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Piece(look),
    cases: &[&THIRD, &INVERTED],
    numbers: &[],
    sources: &[
        source::ADVANCED_PLACEMENT.at("question 6"),
        source::OPEN_MUSIC_THEORY,
        source::CHORALES_READ.at("what chords lack where four voices are plain"),
    ],
};

static THIRD: Case = Case {
    name: "",
    when: "in four parts or more, a tonic, or a dominant that goes to its tonic, without its third as long as it lasts, a beat at least, and its bass does not pass through by step; not where the missing third is told of by itself, nor where a voice enters or ends its phrase",
    settings: &[
        fault(Style::Free, "only the fifth may go"),
        fault(
            Style::Chorale,
            "only the fifth may go: of 124 dominant sevenths in root position in the chorales 42 lack it, 10 the third",
        ),
        allow(Style::Motet, "the missing third is told of by itself"),
        allow(Style::Species1, "the missing third is told of by itself"),
    ],
};

static INVERTED: Case = Case {
    name: "inverted",
    when: "in four parts or more, a triad that stays inverted and lacks its root or its fifth as long as it lasts, and its bass does not pass through by step",
    settings: &[
        weakness(Style::Free, "only in root position may the fifth go"),
        weakness(
            Style::Chorale,
            "only in root position may the fifth go: 8 of 935 sixth chords in the chorales are incomplete",
        ),
        allow(Style::Motet, "the style counts intervals, not chords"),
        allow(Style::Species1, "the style counts intervals, not chords"),
    ],
};

/// A chord without its third is never sure but in its root.
fn look(piece: &Piece<'_>, found: &mut Found<'_>) {
    for chord in piece.chords().filter(|chord| chord.segment.root_is_sure()) {
        check(&chord, found);
    }
}

fn check(chord: &Chord<'_>, found: &mut Found<'_>) {
    let Some(there) = chord.settled().filter(|there| there.parts() >= 4) else {
        return;
    };
    if there.bass_passes() {
        return;
    }
    let is_pillar = chord.degree() == Some(1) || chord.falls_to_its_tonic();
    let (case, tone) = if is_pillar && chord.lacks(Tone::Third) {
        (&THIRD, Tone::Third)
    } else if !chord.is_sure() || chord.has_seventh() || !chord.stays_inverted() {
        return;
    } else if chord.lacks(Tone::Fifth) {
        (&INVERTED, Tone::Fifth)
    } else if chord.lacks(Tone::Root) {
        (&INVERTED, Tone::Root)
    } else {
        return;
    };
    let told = |s: Sounding<'_>| found.is_told_of_sonority("third-missing", &s);
    let ends = chord.soundings().any(Sounding::opens_or_closes);
    if tone == Tone::Third && (ends || chord.soundings().any(told)) {
        return;
    }
    let voices: Vec<usize> = there.piece.texture.sounding(there.index).collect();
    let Some(bass) = there.bass() else { return };
    found.sonority(case, &voices, there.onset(), || {
        format!(
            "Incomplete chord: {} over {} in {} is without its {}, {}. Give it to a voice that doubles.",
            chord.name(),
            there.pitch_text(bass),
            there.piece.name(bass),
            tone.name(),
            chord.note_name(tone).unwrap_or_default(),
        )
    });
}
