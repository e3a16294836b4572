//! How a piece comes to its close.

use partwright_analysis::{Final, mode};
use partwright_score::{Interval, Time};

use super::{LineMove, Piece, Sounding};
use crate::style::Style;

/// A voice's last move, into the close.
#[derive(Clone, Copy, Debug)]
pub struct LastMove {
    /// The voice.
    pub voice: usize,
    /// Its move; it arrives where the last chord begins.
    pub step: LineMove,
}

impl LastMove {
    /// By step upward.
    #[must_use]
    pub fn steps_up(&self) -> bool {
        self.step.size() == 1 && self.step.rises()
    }

    /// By step downward.
    #[must_use]
    pub fn steps_down(&self) -> bool {
        self.step.size() == 1 && !self.step.rises()
    }

    /// By a semitone, letter to letter.
    #[must_use]
    pub fn is_semitone(&self) -> bool {
        self.step.size() == 1 && self.step.interval.is_minor()
    }
}

impl<'a> Piece<'a> {
    /// The final and its mode at a moment: as the key is stated; else, in strict counterpoint,
    /// as the cantus ends, if the piece does.
    #[must_use]
    pub fn final_at(self, at: Time, style: Style) -> Option<Final> {
        let stated = mode::stated(self.score, at);
        stated.or_else(|| {
            let whole = style.is_species() && self.closes();
            whole.then(|| mode::of_cantus(self.score)).flatten()
        })
    }

    /// The moves with which voices come to the final at the close.
    #[must_use]
    pub fn moves_to_final(self, close: Sounding<'a>) -> Vec<LastMove> {
        let arrival = self.arrival_of(close);
        let voices = self.texture.sounding(close.index);
        voices
            .filter(|&voice| self.has_final(close, voice) == Some(true))
            .filter_map(|voice| {
                let moves = self.line_moves(voice).into_iter();
                // A last note struck again has been reached before.
                let step = moves.rev().find(|step| !step.is_repeat())?;
                (step.to.onset == arrival).then_some(LastMove { voice, step })
            })
            .collect()
    }

    /// When the notes of a sonority were all there: those only struck again have come before.
    fn arrival_of(self, close: Sounding<'a>) -> Time {
        let stays = |index: usize| {
            let mut moved = self.texture.sounding(index).map(|voice| {
                self.texture
                    .displacement(self.score, index, voice)
                    .map(|gap| (gap.steps, gap.semitones))
            });
            index > 0 && moved.all(|gap| gap == Some((0, 0)))
        };
        let first = (0..=close.index).rev().find(|&index| !stays(index));
        first.map_or(close.onset(), |index| self.sounding(index).onset())
    }

    /// The moves that leave a leading note before the last bar but one, do not go up to the final,
    /// and leave it where no other voice has the fifth degree under it.
    #[must_use]
    pub fn idle_leading_notes(self, voice: usize, mode: Final) -> Vec<LineMove> {
        let cantus = self
            .cantus_or_slowest()
            .and_then(|v| self.score.voices.get(v));
        let notes = cantus.map_or(&[][..], |v| &v.notes);
        let pitched = notes.iter().rev().filter(|n| n.sound.pitch().is_some());
        let Some(last_but_one) = pitched.map(|n| n.onset).nth(1) else {
            return Vec::new();
        };
        let moves = self.line_moves(voice).into_iter();
        let idle = |step: &LineMove| {
            let (Some(from), Some(to)) = (step.from.sound.pitch(), step.to.sound.pitch()) else {
                return false;
            };
            let leads = mode.is(to) || step.is_repeat();
            step.from.onset < last_but_one
                && mode.is_leading_note(from)
                && !leads
                && !self.has_fifth_degree(step.from.onset, mode)
        };
        moves.filter(idle).collect()
    }

    fn has_fifth_degree(self, at: Time, mode: Final) -> bool {
        let Some(sonority) = self.texture.sounding_at(at) else {
            return false;
        };
        let there = self.sounding(sonority);
        let mut voices = self.texture.sounding(sonority);
        voices.any(|v| there.pitch(v).is_some_and(|p| mode.degree(p) == 4))
    }

    /// Scale steps between two voices at a moment, within the octave: 0 a unison or octave, 6 a
    /// seventh. `None` where one of them is silent.
    #[must_use]
    pub fn size_at(self, at: Time, pair: partwright_score::Pair) -> Option<i32> {
        let sonority = self.texture.sounding_at(at)?;
        let gap = self.texture.gap(sonority, pair.upper, pair.lower)?;
        Some(Interval(gap).size() % 7)
    }
}
