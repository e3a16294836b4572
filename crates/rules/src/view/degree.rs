//! What a voice's notes are in a stated minor key, and in its compass.

use partwright_score::{Compass, Key, Mode, Note, Pitch, Time};

use super::{Line, LineMove, Piece};

/// A degree of a minor key that its melodic scale treats apart.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum MinorDegree {
    /// The first.
    Tonic,
    /// The sixth as the signature has it.
    Sixth,
    /// The sixth a semitone higher.
    RaisedSixth,
    /// The seventh as the signature has it.
    Seventh,
    /// The seventh a semitone higher: the leading note.
    RaisedSeventh,
}

/// How a line lies in a compass.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Tessitura {
    /// Where its first note begins.
    pub from: Time,
    /// Where its last note ends.
    pub until: Time,
    /// How many notes it has.
    pub notes: usize,
    /// How many of them lie in the top third of the compass, or above.
    pub high: usize,
    /// How many of them lie in the bottom third of the compass, or below.
    pub low: usize,
}

impl Piece<'_> {
    /// The key stated at a moment.
    #[must_use]
    pub fn key_at(self, at: Time) -> Option<Key> {
        let stated = self
            .score
            .keys
            .iter()
            .rev()
            .find(|change| change.from <= at);
        stated.map(|change| change.value)
    }
}

impl Line<'_> {
    /// What a note is in the minor key stated there; `None` for another degree or key.
    #[must_use]
    pub fn minor_degree(&self, note: &Note) -> Option<MinorDegree> {
        let Some(Key::Of {
            tonic,
            mode: Mode::Minor | Mode::Aeolian,
            ..
        }) = self.piece.key_at(note.onset)
        else {
            return None;
        };
        let up = tonic.place().up_to(note.sound.pitch()?.place());
        match (up.steps.rem_euclid(7), up.semitones.rem_euclid(12)) {
            (0, 0) => Some(MinorDegree::Tonic),
            (5, 8) => Some(MinorDegree::Sixth),
            (5, 9) => Some(MinorDegree::RaisedSixth),
            (6, 10) => Some(MinorDegree::Seventh),
            (6, 11) => Some(MinorDegree::RaisedSeventh),
            _ => None,
        }
    }

    /// The raised fourth degree of the minor key stated there sounds somewhere while a note
    /// lasts: the dominant of the dominant.
    #[must_use]
    pub fn is_over_raised_fourth(&self, note: &Note) -> bool {
        let Some(Key::Of { tonic, .. }) = self.piece.key_at(note.onset) else {
            return false;
        };
        let raised_fourth = |pitch: Pitch| {
            let up = tonic.place().up_to(pitch.place());
            (up.steps.rem_euclid(7), up.semitones.rem_euclid(12)) == (3, 6)
        };
        let first = self.piece.texture.at(note.onset).unwrap_or(usize::MAX);
        let mut there = (first..).map_while(|k| {
            let sounding = self.piece.sounding(k);
            sounding.sonority().filter(|s| s.onset < note.end())?;
            Some(sounding)
        });
        there.any(|sounding| {
            let mut voices = self.piece.texture.sounding(sounding.index);
            voices.any(|voice| sounding.pitch(voice).is_some_and(raised_fourth))
        })
    }

    /// A move reaches the end of a phrase or of the piece, over the tonic in the lowest voice of
    /// at least two.
    #[must_use]
    pub fn rests_on_tonic(&self, step: &LineMove) -> bool {
        let ends = step.to.ends_phrase() || step.to.end() >= self.piece.score.end();
        let Some(there) = self.sounding_at(step).filter(|s| ends && s.parts() >= 2) else {
            return false;
        };
        let Some(bass) = there.bass().and_then(|v| there.pitch(v)) else {
            return false;
        };
        let note = Note::new(
            there.onset(),
            step.to.length,
            partwright_score::Sound::Pitch(bass),
        );
        self.minor_degree(&note) == Some(MinorDegree::Tonic)
    }

    /// How the line lies in a compass.
    #[must_use]
    pub fn tessitura(&self, compass: Compass) -> Option<Tessitura> {
        let notes = &self.declared()?.notes;
        let heights = || notes.iter().filter_map(|n| n.sound.pitch());
        let (low, high) = (compass.low.place().semitone, compass.high.place().semitone);
        let count = |third: &dyn Fn(i32) -> bool| {
            heights()
                .filter(|pitch| third(pitch.place().semitone))
                .count()
        };
        Some(Tessitura {
            from: notes.first()?.onset,
            until: notes.last()?.end(),
            notes: heights().count(),
            high: count(&|at| 3 * (at - low) > 2 * (high - low)),
            low: count(&|at| 3 * (at - low) < high - low),
        })
    }

    /// A quarter on the beat, in a metre that counts halves or wholes.
    #[must_use]
    pub fn is_accented_quarter(&self, note: &Note) -> bool {
        let half = Time::new(1, 2);
        let score = self.piece.score;
        let bar = score.bar_at(note.onset).and_then(|i| score.bars.get(i));
        let Some(bar) = bar else { return false };
        let metre = score.metres.get(bar.metre as usize);
        let offset = bar.lead + note.onset - bar.onset;
        metre.is_some_and(|m| !m.is_free() && m.unit() >= half)
            && note.length == half / 2
            && (offset / half).is_integer()
    }

    /// Bars of four equal notes with one figure, two running or more: how many, and their extent.
    #[must_use]
    pub fn alike_bars(&self) -> Vec<(usize, (Time, Time))> {
        let score = self.piece.score;
        let mut found: Vec<(usize, (Time, Time))> = Vec::new();
        let mut before: Option<Vec<i32>> = None;
        for bar in &score.bars {
            let end = bar.onset + bar.length;
            let from = self.moves.partition_point(|m| m.from.onset < bar.onset);
            let inside: Vec<i32> = self
                .moves
                .iter()
                .skip(from)
                .take_while(|m| m.to.end() <= end)
                .map(|m| m.interval.0.steps)
                .collect();
            let figure = (inside.len() >= 3).then_some(inside);
            match (figure.is_some() && figure == before, found.last_mut()) {
                (true, Some((bars, (_, until)))) if *until == bar.onset => {
                    *bars += 1;
                    *until = end;
                }
                _ if figure.is_some() => found.push((1, (bar.onset, end))),
                _ => {}
            }
            before = figure;
        }
        found.retain(|(bars, _)| *bars >= 2);
        found
    }
}
