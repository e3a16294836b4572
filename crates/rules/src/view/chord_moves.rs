//! What moves from chord to chord: chords kept and left, and notes that contradict each other.

use partwright_analysis::harmony::Quality;
use partwright_score::{Note, Pitch, Time, ZERO};

use super::{Chord, PairMove, Sounding, Tone};

/// Two forms of one letter, in two voices one after the other.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct CrossRelation {
    /// The voice that has the first form, and that.
    pub first: (usize, Pitch),
    /// The voice that has the second form, and that.
    pub second: (usize, Pitch),
    /// When the first was struck.
    pub at: Time,
    /// The first has gone on to another note before the second is struck.
    pub between: bool,
}

impl<'a> Sounding<'a> {
    /// Whether the chord is the same as in the sonority before, a seventh added or left out
    /// apart; `None` where one of the two is not sure.
    #[must_use]
    pub fn unchanged_chord(self) -> Option<bool> {
        let (before, here) = (self.neighbour(-1)?.chord()?, self.chord()?);
        Some(before.has_triad_of(&here))
    }

    /// The chord is the same as in the sonority before, or but for what passes as on the beat before: as the harmony says where it is sure,
    /// else as far as letters and signs can tell. In fewer than four voices a chord on another
    /// root may be more of the one before, and is taken so.
    #[must_use]
    pub fn keeps_chord(self) -> bool {
        match self.unchanged_chord() {
            Some(true) => self.parts() > 1,
            Some(false) if self.parts() >= 4 => false,
            _ => self.may_only_change_position(),
        }
    }

    /// The same for a note that leaps while others stay, in so many parts at least.
    #[must_use]
    pub fn keeps_chord_under_leap(self, parts: usize) -> bool {
        let kept = match self.unchanged_chord() {
            Some(true) => true,
            Some(false) if self.parts() >= 4 => false,
            _ => self.fits_one_chord(4),
        };
        self.parts() >= parts && kept
    }

    /// The note a voice has here.
    pub(super) fn held_note(self, voice: usize) -> Option<(usize, &'a Note)> {
        let index = self.piece.texture.note(self.index, voice)?;
        let note = self.piece.score.voices.get(voice)?.notes.get(index)?;
        Some((index, note))
    }

    /// How a voice comes to its note here, and how it goes on, in scale steps with their sign;
    /// `None` where nothing is there.
    pub(super) fn steps_around(self, voice: usize) -> [Option<i32>; 2] {
        [self.step_of(voice, -1), self.step_of(voice, 0)]
    }

    /// One of a voice's moves, counted from the one out of its note here.
    fn step_of(self, voice: usize, by: isize) -> Option<i32> {
        let notes = &self.piece.score.voices.get(voice)?.notes;
        let from = self.held_note(voice)?.0.checked_add_signed(by)?;
        let pitch = |n: usize| notes.get(n)?.sound.pitch();
        Some(i32::from(pitch(from + 1)?.step - pitch(from)?.step))
    }
}

impl<'a> Chord<'a> {
    /// The same triad, with a seventh or without.
    #[must_use]
    pub fn has_triad_of(&self, other: &Chord<'_>) -> bool {
        let (a, b) = (self.segment.chord, other.segment.chord);
        a.root == b.root && a.quality.triad() == b.quality.triad()
    }

    /// Whether a pitch is one of its notes, or the seventh of which it is not certain.
    #[must_use]
    pub fn may_have(&self, pitch: Pitch) -> bool {
        let unsure = || {
            let seventh = self.segment.chord.root_letter() + 6;
            !self.seventh_is_sure() && seventh % 7 == pitch.letter()
        };
        self.tone(pitch).is_some() || unsure()
    }

    /// It stands on the note that a pitch is, and has a major third.
    #[must_use]
    pub fn is_dominant_on(&self, pitch: Pitch) -> bool {
        self.tone(pitch) == Some(Tone::Root)
            && matches!(self.quality(), Quality::Major | Quality::DominantSeventh)
    }

    /// It is a dominant by its sound, and the next sure chord its tonic.
    #[must_use]
    pub fn is_dominant_to(&self, next: &Chord<'_>) -> bool {
        self.leads_to() == Some(next.segment.chord.root)
    }

    /// A major triad a tritone from a major one that follows: the Neapolitan before the dominant.
    #[must_use]
    pub fn is_neapolitan_to(&self, next: &Chord<'_>) -> bool {
        let (a, b) = (self.segment.chord, next.segment.chord);
        a.quality == Quality::Major && b.quality.triad() == Quality::Major && b.root - a.root == 6
    }
}

impl Sounding<'_> {
    /// A voice's note here is one of three that go by step one way.
    fn is_in_scale(self, voice: usize, way: i32) -> bool {
        let goes = |by| self.step_of(voice, by) == Some(way);
        (goes(-1) && (goes(0) || goes(-2))) || (goes(0) && goes(1))
    }

    fn contradicts(self, from: usize, to: usize) -> Option<CrossRelation> {
        let onset = self.onset();
        let (index, struck) = self.held_note(to)?;
        let second = struck.sound.pitch().filter(|_| struck.onset == onset)?;
        let letter = |note: &Note| note.sound.pitch().filter(|p| p.letter() == second.letter());
        let (now, sounding) = self.held_note(from)?;
        if letter(sounding).is_some() {
            return None;
        }
        let notes = &self.piece.score.voices.get(from)?.notes;
        let beat = self.cell().unwrap_or(ZERO);
        let is_near = |note: &&Note| note.end() == onset || note.onset + beat >= onset;
        let recent = notes.get(..now)?.iter().rev().take_while(is_near);
        let mut unbroken = recent.take_while(|n| n.sound.pitch().is_some() && !n.ends_phrase());
        let note = unbroken.find(|note| letter(note).is_some())?;
        let first = letter(note).filter(|p| p.sign != second.sign)?;
        let own = &self.piece.score.voices.get(to)?.notes;
        let has_it_too = has_letter(own.get(..index)?, note.onset, second);
        if has_it_too
            || self.is_ornament(from, note)
            || self.is_ornament(to, struck)
            || self.turns_back(to, struck)
        {
            return None;
        }
        Some(CrossRelation {
            first: (from, first),
            second: (to, second),
            at: note.onset,
            between: note.end() < onset,
        })
    }

    /// Between beats a voice steps to a note shorter than an eighth and back, as to F# E F#.
    fn turns_back(self, voice: usize, note: &Note) -> bool {
        let around = self.steps_around(voice);
        let is_short = note.length < Time::new(1, 8);
        self.is_off_beat()
            && is_short
            && matches!(around, [Some(-1), Some(1)] | [Some(1), Some(-1)])
    }

    /// A figure accounts for a note, or it is strange to the sure chord in which it is struck.
    fn is_ornament(self, voice: usize, note: &Note) -> bool {
        let piece = self.piece;
        let Some((k, pitch)) = piece.texture.at(note.onset).zip(note.sound.pitch()) else {
            return false;
        };
        let there = piece.sounding(k);
        let strange = there.chord().is_some_and(|chord| !chord.may_have(pitch));
        let index = piece.texture.note(k, voice);
        let mut here = piece.analysis.dissonances_at(k).iter();
        let is_read = here.any(|dissonance| {
            let reading = dissonance.reading;
            reading.is_some_and(|r| r.voice == voice && Some(r.note) == index)
        });
        strange || is_read
    }
}

/// A voice had that letter itself since a moment, or comes from it, or comes from nowhere.
fn has_letter(before: &[Note], since: Time, second: Pitch) -> bool {
    let letter = |n: &Note| {
        n.sound
            .pitch()
            .is_some_and(|p| p.letter() == second.letter())
    };
    let mut all = before.iter().rev();
    let last = all.next();
    last.is_none_or(|note| letter(note) || note.ends_phrase() || note.sound.pitch().is_none())
        || all.take_while(|note| note.end() > since).any(letter)
}

impl<'a> PairMove<'a> {
    /// A note struck here that another voice had just before in another form: up to here, or
    /// struck within the beat before. Of several voices that had it, the outermost is told.
    #[must_use]
    pub fn cross_relation(&self) -> Option<CrossRelation> {
        let (upper, lower) = (self.pair.upper, self.pair.lower);
        let mut ways = [(upper, lower), (lower, upper)].into_iter();
        ways.find_map(|(from, to)| {
            let relation = self.sounding.contradicts(from, to)?;
            let voices = self.sounding.piece.texture.sounding(self.sounding.index);
            let further = |v: &usize| if to < from { *v > from } else { *v < from };
            let mut others = voices.filter(further).filter(|&v| v != to);
            let first = !others.any(|v| self.sounding.contradicts(v, to).is_some());
            first.then_some(relation)
        })
    }

    /// One of the two forms lies in its melodic minor scale: three notes by step, up where it is
    /// the higher form, down where it is the lower.
    #[must_use]
    pub fn is_in_melodic_line(&self, relation: &CrossRelation) -> bool {
        let way = |of: Pitch, other: Pitch| i32::from((of.sign - other.sign).signum());
        let (first, second) = (relation.first, relation.second);
        let piece = self.sounding.piece;
        let before = piece.texture.at(relation.at).map(|k| piece.sounding(k));
        before.is_some_and(|there| there.is_in_scale(first.0, way(first.1, second.1)))
            || self.sounding.is_in_scale(second.0, way(second.1, first.1))
    }

    /// The note struck belongs to a sure diminished seventh chord.
    #[must_use]
    pub fn is_in_diminished_seventh(&self) -> bool {
        let chord = self.sounding.chord();
        chord.is_some_and(|chord| chord.quality() == Quality::DiminishedSeventh)
    }

    /// The Neapolitan goes to the dominant.
    #[must_use]
    pub fn leaves_neapolitan(&self) -> bool {
        let before = self.sounding.neighbour(-1).and_then(Sounding::chord);
        let pair = before.zip(self.sounding.chord());
        pair.is_some_and(|(before, here)| before.is_neapolitan_to(&here))
    }

    /// Where the harmony is sure: the figure of an anticipation at a close is over a dominant
    /// that goes to its tonic.
    #[must_use]
    pub fn may_be_over_dominant(&self) -> bool {
        let here = self.sounding.chord();
        let next = self.next().and_then(|next| next.sounding.chord());
        here.zip(next)
            .is_none_or(|(here, next)| here.is_dominant_to(&next))
    }

    /// Where the harmony is sure: the lower voice reaches the root of a major chord, or the fifth
    /// of a six-four before it.
    #[must_use]
    pub fn may_reach_dominant(&self) -> bool {
        let foot = self.sounding.pitch(self.foot());
        let chord = self.sounding.chord();
        chord.zip(foot).is_none_or(|(chord, pitch)| {
            chord.is_dominant_on(pitch) || chord.tone(pitch) == Some(Tone::Fifth)
        })
    }
}
