//! A dissonant note and what surrounds it.

use std::cmp::Ordering;

use partwright_score::{Note, Score, Texture, Time};
use partwright_space::Gap;

use super::Dissonance;
use crate::consonance;

/// One of the two notes of a dissonance.
#[derive(Clone, Copy)]
pub struct Place<'a> {
    /// The score.
    pub score: &'a Score,
    /// Its sonorities.
    pub texture: &'a Texture,
    /// The sonority in which the dissonance begins.
    pub sonority: usize,
    /// When that is.
    pub at: Time,
    /// The note's voice.
    pub voice: usize,
    /// The note, by index in its voice.
    pub note: usize,
    /// The voice it disagrees with.
    pub against: usize,
    /// The note disagreed with is the lowest, or the lowest above a pedal.
    pub over_bass: bool,
    /// The interval between the two.
    pub gap: Gap,
}

impl<'a> Place<'a> {
    /// Both notes of a dissonance: one struck at its moment first.
    pub(super) fn both(score: &'a Score, texture: &'a Texture, of: &Dissonance) -> [Place<'a>; 2] {
        let place = |(voice, note): (usize, usize), against: usize| Place {
            score,
            texture,
            sonority: of.sonority,
            at: of.at,
            voice,
            note,
            against,
            over_bass: of.over_bass,
            gap: of.gap,
        };
        let mut both = [place(of.upper, of.lower.0), place(of.lower, of.upper.0)];
        if both.first().is_some_and(|p| !p.is_struck()) {
            both.reverse();
        }
        both
    }

    /// A note of the voice, so many further on.
    pub(super) fn neighbour(&self, by: isize) -> Option<&'a Note> {
        let notes = &self.score.voices.get(self.voice)?.notes;
        notes.get(self.note.checked_add_signed(by)?)
    }

    /// The note itself.
    pub(super) fn this(&self) -> Option<&'a Note> {
        self.neighbour(0)
    }

    /// The note is struck where the dissonance begins.
    pub(super) fn is_struck(&self) -> bool {
        self.this().is_some_and(|note| note.onset == self.at)
    }

    /// When the pitch that sounds was first struck: before the dissonance where it is held over
    /// it, or struck again (a new syllable); `None` where it is new.
    pub(super) fn held_from(&self) -> Option<Time> {
        let this = self.this()?;
        let same = |by: &isize| self.neighbour(-by).map(|note| note.sound) == Some(this.sound);
        let before = isize::try_from((1..).take_while(same).count()).unwrap_or(0);
        let first = self.neighbour(-before)?;
        (first.onset < self.at).then_some(first.onset)
    }

    /// The move of the voice from one neighbour to the next; `None` at a rest or an end.
    pub(super) fn step(&self, from: isize) -> Option<Gap> {
        let left = self.neighbour(from)?.sound.pitch()?;
        let reached = self.neighbour(from + 1)?.sound.pitch()?;
        Some(left.place().up_to(reached.place()))
    }

    /// Whether a step leads up; a chromatic semitone is one. `None` for a leap and a repetition.
    pub(super) fn way(gap: Gap) -> Option<bool> {
        (gap.steps.abs() <= 1 && gap.semitones != 0).then_some(gap.semitones > 0)
    }

    /// The move into the note.
    pub(super) fn into(&self) -> Option<Gap> {
        self.step(-1)
    }

    /// The move out of it.
    pub(super) fn out_of(&self) -> Option<Gap> {
        self.step(0)
    }

    /// How many notes further on the voice still sounds the same pitch, struck again.
    pub(super) fn repeats(&self) -> isize {
        let this = self.this().map(|note| note.sound);
        let same = |by: &isize| self.neighbour(*by).map(|note| note.sound) == this;
        let again = (1..).take_while(same).count();
        isize::try_from(again).unwrap_or(0)
    }

    /// Where the pitch ends, struck again or not.
    pub(super) fn held_to(&self) -> Option<Time> {
        self.neighbour(self.repeats()).map(Note::end)
    }

    /// Where the other note's pitch ends, struck again or not.
    fn other_held_to(&self) -> Option<Time> {
        Place {
            voice: self.against,
            note: self.texture.note(self.sonority, self.against)?,
            against: self.voice,
            ..*self
        }
        .held_to()
    }

    /// A stronger moment than the note's own comes before a time. Where nothing is struck on it,
    /// it halves the while or begins a bar.
    pub(super) fn is_stronger_before(&self, end: Time) -> bool {
        let here = self.score.level(self.at);
        let is_stronger = |at: Time| at > self.at && at < end && self.score.level(at) < here;
        let later = self.texture.sonorities().get(self.sonority + 1..);
        let mut struck = later.unwrap_or_default().iter().map(|s| s.onset);
        let next_bar = self.score.bar_at(self.at).map_or(0, |bar| bar + 1);
        let next_bar = self.score.bars.get(next_bar).map(|bar| bar.onset);
        is_stronger(self.at + (end - self.at) / 2)
            || next_bar.is_some_and(is_stronger)
            || struck.by_ref().take_while(|&at| at < end).any(is_stronger)
    }

    /// It is struck on a weak moment and held over a stronger one.
    pub(super) fn is_syncopated(&self) -> bool {
        self.this()
            .is_some_and(|note| self.is_stronger_before(note.end()))
    }

    /// How strong the onset of a neighbour is: 0 strongest.
    pub(super) fn level(&self, by: isize) -> Option<u8> {
        self.neighbour(by).map(|note| self.score.level(note.onset))
    }

    /// The note stands on a weaker moment than a note beside it, and on a stronger than none. A
    /// shorter note a step before it is an ornament of its own and no measure.
    pub(super) fn is_weak(&self) -> bool {
        let here = self.score.level(self.at);
        let compare = |by| self.level(by).map(|there| here.cmp(&there));
        let (before, after) = (compare(-1), compare(1));
        let is_shorter = match (self.neighbour(-1), self.this()) {
            (Some(before), Some(this)) => {
                before.length < this.length && self.into().is_some_and(|g| g.steps.abs() == 1)
            }
            _ => false,
        };
        let weaker = |side| side == Some(Ordering::Greater);
        let stronger = |side| side == Some(Ordering::Less);
        let is_stronger = stronger(after) || (stronger(before) && !is_shorter);
        !is_stronger && (weaker(before) || weaker(after))
    }

    /// The other note.
    pub(super) fn other(&self) -> Option<&'a Note> {
        let note = self.texture.note(self.sonority, self.against)?;
        self.score.voices.get(self.against)?.notes.get(note)
    }

    /// The other note goes on while this one stays, and this one then agrees: the other was the
    /// ornament.
    pub(super) fn is_relieved(&self) -> bool {
        match (self.held_to(), self.other_held_to()) {
            (Some(this), Some(other)) => other < this && self.agrees_at(other) == Some(true),
            _ => false,
        }
    }

    /// The other note goes on before this one does: it is the other that resolves.
    pub(super) fn is_outlasted(&self) -> bool {
        match (self.held_to(), self.other_held_to()) {
            (Some(this), Some(other)) => other < this,
            _ => false,
        }
    }

    /// At a moment, the voice agrees with the lowest voice and with every other; `None` in silence
    /// and where something is not known.
    pub(super) fn agrees_at(&self, at: Time) -> Option<bool> {
        let sonority = self.texture.sounding_at(at)?;
        agrees(self.texture, sonority, self.voice)
    }
}

/// The gap of a voice over another, measured from the latter up.
pub(super) fn over(texture: &Texture, sonority: usize, voice: usize, low: usize) -> Option<Gap> {
    let gap = texture.gap(sonority, voice, low)?;
    // The table measures from the voice lower in the score.
    Some(if low > voice {
        gap
    } else {
        Gap {
            steps: -gap.steps,
            semitones: -gap.semitones,
        }
    })
}

/// A voice agrees with the lowest one, and with every upper one that does.
pub(super) fn agrees(texture: &Texture, sonority: usize, voice: usize) -> Option<bool> {
    let bass = texture.bass(sonority)?;
    let good =
        |v: usize| v == bass || over(texture, sonority, v, bass).is_some_and(consonance::over_bass);
    let among = |v: usize| {
        texture
            .gap(sonority, voice, v)
            .is_some_and(consonance::among_upper)
    };
    let mut others = texture.sounding(sonority).filter(|&v| v != voice);
    Some(if voice == bass {
        others.all(good)
    } else {
        good(voice) && others.all(|v| v == bass || !good(v) || among(v))
    })
}
