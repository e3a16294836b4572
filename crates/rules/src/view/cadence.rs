//! How a phrase closes, told by its last two chords.

use super::{Chord, Tone};

/// A close by its name.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Cadence {
    /// Dominant to tonic, both in root position, the tonic on top.
    PerfectAuthentic,
    /// Dominant to tonic, but one of them inverted, or another note on top.
    ImperfectAuthentic,
    /// The phrase stops on the dominant.
    Half,
    /// The same in minor, the bass coming down a semitone from a sixth chord on the fourth degree.
    PhrygianHalf,
    /// The dominant goes to the sixth degree instead of the tonic.
    Deceptive,
    /// From the fourth degree to the tonic.
    Plagal,
}

impl Cadence {
    /// What a musician calls it.
    #[must_use]
    pub const fn name(self) -> &'static str {
        match self {
            Cadence::PerfectAuthentic => "perfect authentic cadence",
            Cadence::ImperfectAuthentic => "imperfect authentic cadence",
            Cadence::Half => "half cadence",
            Cadence::PhrygianHalf => "Phrygian half cadence",
            Cadence::Deceptive => "deceptive cadence",
            Cadence::Plagal => "plagal cadence",
        }
    }
}

impl Chord<'_> {
    /// A phrase ends with it: under a fermata or a breath in one of its voices, with a section, or
    /// with the piece.
    #[must_use]
    pub fn ends_phrase(&self) -> bool {
        let texture = self.piece.texture;
        let last = self.segment.end.saturating_sub(1);
        let next = texture.sonorities().get(self.segment.end);
        let Some(next) = next else {
            return self.piece.closes();
        };
        let ends = |voice: usize| {
            let note = texture.note(last, voice);
            let notes = self.piece.score.voices.get(voice).map(|v| &v.notes);
            let note = note.zip(notes).and_then(|(n, notes)| notes.get(n));
            note.is_some_and(|note| note.ends_phrase() && note.end() == self.until())
        };
        next.sounding == 0 || next.new_section || texture.sounding(last).any(ends)
    }

    /// The close that it makes with the chord before, where a phrase ends with it and both chords
    /// and their key are sure.
    #[must_use]
    pub fn cadence(&self) -> Option<Cadence> {
        if !self.is_sure() || !self.ends_phrase() {
            return None;
        }
        let before = self.before().filter(|before| before.is_sure());
        let key = self.key()?;
        let from = before.filter(|before| before.goes_to().is_some() && before.key() == Some(key));
        let last = self.piece.sounding(self.segment.end.saturating_sub(1));
        let in_root = |chord: &Chord<'_>| {
            let there = chord.piece.sounding(chord.segment.end.saturating_sub(1));
            let bass = there.bass().and_then(|bass| chord.last_of(bass));
            bass.is_some_and(|bass| bass.tone == Tone::Root)
        };
        let on_top = || {
            let top = self.piece.texture.sounding(last.index).next()?;
            Some(self.last_of(top)?.tone)
        };
        let degrees = (from.and_then(|from| from.degree()), self.degree()?);
        let leads = from.is_some_and(|from| from.leads_to() == Some(key.tonic));
        match degrees {
            (Some(5 | 7), 1) if leads => {
                let perfect = degrees.0 == Some(5)
                    && from.as_ref().is_some_and(in_root)
                    && in_root(self)
                    && on_top() == Some(Tone::Root);
                Some(if perfect {
                    Cadence::PerfectAuthentic
                } else {
                    Cadence::ImperfectAuthentic
                })
            }
            (Some(5), 6) if leads && in_root(self) => Some(Cadence::Deceptive),
            (Some(4), 1) if in_root(self) => Some(Cadence::Plagal),
            (from_degree, 5) if self.leads_to() == Some(key.tonic) && !self.has_seventh() => {
                if !in_root(self) {
                    return None;
                }
                let sixth = from.and_then(|from| from.bass_tone()) == Some(Tone::Third);
                Some(if key.minor && from_degree == Some(4) && sixth {
                    Cadence::PhrygianHalf
                } else {
                    Cadence::Half
                })
            }
            _ => None,
        }
    }
}
