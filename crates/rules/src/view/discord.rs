//! A dissonance as rules see it.

use partwright_analysis::consonance::over_bass;
use partwright_analysis::figures::{Held, Near, near_suspension};
use partwright_analysis::{Dissonance, Figure};
use partwright_score::{Interval, Note, Pitch, Time, ZERO};

use super::{Discord, Sounding};
use crate::style::Style;

impl<'a> Discord<'a> {
    /// What the note is, if a figure explains it.
    #[must_use]
    pub fn figure(&self) -> Option<Figure> {
        self.dissonance.reading.map(|reading| reading.figure)
    }

    /// The voice and the note that are dissonant: the figure, the held note that lacks something
    /// of a suspension, the one struck last, or the upper.
    #[must_use]
    pub fn dissonant(&self) -> (usize, usize) {
        if let Some(reading) = self.dissonance.reading {
            return (reading.voice, reading.note);
        }
        let Dissonance {
            upper, lower, at, ..
        } = *self.dissonance;
        let is_struck = |of| self.note(of).is_some_and(|note| note.onset == at);
        if let Some((_, held)) = self.near() {
            return held;
        }
        if is_struck(lower) && !is_struck(upper) {
            lower
        } else {
            upper
        }
    }

    /// The note it disagrees with.
    #[must_use]
    pub fn other(&self) -> (usize, usize) {
        self.dissonance.other(self.dissonant().0)
    }

    /// A note by voice and index.
    #[must_use]
    pub fn note(&self, (voice, note): (usize, usize)) -> Option<&'a Note> {
        self.piece.score.voices.get(voice)?.notes.get(note)
    }

    /// The move into a note, in scale steps; `None` where nothing leads to it.
    #[must_use]
    pub fn steps_into(&self, (voice, note): (usize, usize)) -> Option<i32> {
        self.steps((voice, note.checked_sub(1)?), (voice, note))
    }

    /// The move out of it.
    #[must_use]
    pub fn steps_out(&self, (voice, note): (usize, usize)) -> Option<i32> {
        self.steps((voice, note), (voice, note + 1))
    }

    /// A note is reached and left by step.
    #[must_use]
    pub fn comes_and_goes_by_step(&self, of: (usize, usize)) -> bool {
        let step = |steps: Option<i32>| steps.map(i32::abs) == Some(1);
        step(self.steps_into(of)) && step(self.steps_out(of))
    }

    fn steps(&self, from: (usize, usize), to: (usize, usize)) -> Option<i32> {
        let (from, to) = (
            self.note(from)?.sound.pitch()?,
            self.note(to)?.sound.pitch()?,
        );
        Some(i32::from(to.step - from.step))
    }

    /// The dissonant note was there before, and its voice is asked for a suspension: what that
    /// lacks.
    #[must_use]
    pub fn near_suspension(&self) -> Option<Near> {
        if self.dissonance.reading.is_some() {
            return None;
        }
        self.near().map(|(near, _)| near)
    }

    fn near(&self) -> Option<(Near, (usize, usize))> {
        near_suspension(self.piece.score, self.piece.texture, self.dissonance)
    }

    /// The note that the harmony accuses: the chord is sure, the other note belongs to it and this
    /// one does not, and no figure accounts for it, here or against another voice.
    #[must_use]
    pub fn foreign(&self) -> Option<(usize, usize)> {
        if self.dissonance.reading.is_some() {
            return None;
        }
        let chord = self.sounding().chord()?;
        let strange = |of: &(usize, usize)| {
            let pitch = self.note(*of).and_then(|note| note.sound.pitch());
            pitch.is_some_and(|pitch| !chord.may_have(pitch))
        };
        let [a, b] = self.dissonance.notes();
        let accused = match (strange(&a), strange(&b)) {
            (true, false) => a,
            (false, true) => b,
            _ => return None,
        };
        (!self.is_figure_elsewhere(accused)).then_some(accused)
    }

    /// A figure accounts for a note in one of the dissonances that it makes.
    fn is_figure_elsewhere(&self, (voice, note): (usize, usize)) -> bool {
        let Some(end) = self.note((voice, note)).map(Note::end) else {
            return false;
        };
        let from = self.note((voice, note)).map_or(ZERO, |note| note.onset);
        let all = self.piece.analysis.dissonances();
        let first = all.partition_point(|d| d.at < from);
        let during = all.iter().skip(first).take_while(|d| d.at < end);
        let mut readings = during.filter_map(|d| d.reading);
        readings.any(|reading| (reading.voice, reading.note) == (voice, note))
    }

    /// The note that no figure accounts for, and what a held one lacks of a suspension; in styles
    /// with chords only one that the sure chord does not have.
    #[must_use]
    pub fn accused(&self, style: Style) -> Option<((usize, usize), Option<Near>)> {
        if !style.has_chords() {
            let unexplained = self.dissonance.reading.is_none();
            return unexplained.then(|| (self.dissonant(), self.near_suspension()));
        }
        let accused = self.foreign()?;
        let near = self.near().filter(|(_, held)| *held == accused);
        let near = near.map(|(near, _)| near);
        let excused = match near {
            Some(Near::Preparation) => self.belonged_before(accused),
            Some(Near::Resolution) => self.resolves_round(accused),
            _ => false,
        };
        (!excused).then_some((accused, near))
    }

    /// A held note was one of the chord before, or may have been: what prepares it.
    fn belonged_before(&self, of: (usize, usize)) -> bool {
        let pitch = self.note(of).and_then(|note| note.sound.pitch());
        let before = self.sounding().neighbour(-1).and_then(Sounding::chord);
        before
            .zip(pitch)
            .is_none_or(|(chord, pitch)| chord.may_have(pitch))
    }

    /// It goes to its resolution by way of a few short notes, as far round as it may be.
    fn resolves_round(&self, (voice, note): (usize, usize)) -> bool {
        let beat = self.piece.cell_at(self.dissonance.at).unwrap_or(ZERO);
        let short = |n: usize| {
            let between = self.note((voice, n));
            between.is_some_and(|note| note.length < beat)
        };
        let resolves = |n: usize| self.steps((voice, note), (voice, n)) == Some(-1);
        (note + 1..note + 6)
            .take_while(|&n| n == note + 1 || short(n - 1))
            .any(resolves)
    }

    /// No figure accounts for it, and no note is held that lacks something of a suspension.
    #[must_use]
    pub fn is_unexplained(&self) -> bool {
        self.dissonance.reading.is_none() && self.near_suspension().is_none()
    }

    /// The dissonant note is one of the sure chord; or, where none is, what sounds is a whole triad
    /// or seventh chord, or part of one over its root.
    #[must_use]
    pub fn is_of_chord(&self) -> bool {
        let there = self.sounding();
        let voice = self.dissonant().0;
        match there.chord() {
            Some(chord) => chord.member(there.index, voice).is_some(),
            None => {
                let bass = there.bass().and_then(|bass| there.pitch(bass));
                makes_chord(&self.unexplained_pitches(Some(voice)), bass)
            }
        }
    }

    /// The dissonant note is one of the sure chord.
    #[must_use]
    pub fn is_of_sure_chord(&self) -> bool {
        self.sounding().chord().is_some() && self.is_of_chord()
    }

    /// No figure accounts for it, the chord is not sure, and can be none.
    #[must_use]
    pub fn is_in_no_chord(&self, style: Style) -> bool {
        style.has_chords()
            && self.is_unexplained()
            && self.sounding().chord().is_none()
            && self.fits_no_chord()
    }

    /// No chord of thirds, up to a seventh chord, holds the two notes together with what else sounds
    /// and is no ornament or suspension: neither can belong to the harmony.
    fn fits_no_chord(&self) -> bool {
        self.sounding().sonority().is_some() && !fits_thirds(&self.unexplained_pitches(None))
    }

    /// What sounds here and is neither an ornament nor a suspension; and the note of one voice,
    /// whatever it is.
    fn unexplained_pitches(&self, with: Option<usize>) -> Vec<Pitch> {
        let there = self.sounding();
        let texture = self.piece.texture;
        let at = there.onset();
        let list = self.piece.analysis.dissonances();
        let first = list.partition_point(|d| d.at < at - Time::new(2, 1));
        let explained = |voice: usize| {
            let Some(note) = texture.note(there.index, voice) else {
                return false;
            };
            let near = list.iter().skip(first);
            let mut near = near.take_while(|d| d.at <= at + Time::new(1, 1));
            self.is_suspended((voice, note))
                || near.any(|d| {
                    d.reading
                        .is_some_and(|r| (r.voice, r.note) == (voice, note))
                })
        };
        texture
            .sounding(there.index)
            .filter(|&voice| with == Some(voice) || !explained(voice))
            .filter_map(|voice| there.pitch(voice))
            .collect()
    }

    /// The upper note was there before and comes down to its resolution, and is not the one read.
    #[must_use]
    pub fn upper_resolves(&self) -> bool {
        let upper = self.dissonance.upper;
        upper == self.other()
            && self
                .note(upper)
                .is_some_and(|note| note.onset < self.dissonance.at)
            && self.resolves_round(upper)
    }

    /// On a beat, it was there before or is struck again, disagrees with the lowest note, and comes
    /// down to its resolution: a suspension, though another may fall in with it.
    fn is_suspended(&self, of: (usize, usize)) -> bool {
        let there = self.sounding();
        let held = self.note(of).is_some_and(|note| note.onset < there.onset());
        let disagrees = there.bass().is_some_and(|bass| {
            let gap = self.piece.texture.gap(there.index, of.0, bass);
            gap.is_some_and(|gap| !over_bass(gap))
        });
        (held || self.steps_into(of) == Some(0))
            && !there.is_off_beat()
            && disagrees
            && self.resolves_round(of)
    }

    /// Both notes are struck where they begin to disagree.
    #[must_use]
    pub fn is_struck_together(&self) -> bool {
        let at = self.dissonance.at;
        let notes = self.dissonance.notes();
        notes
            .into_iter()
            .all(|of| self.note(of).is_some_and(|note| note.onset == at))
    }

    /// One of the two notes is the lowest.
    #[must_use]
    pub fn is_over_bass(&self) -> bool {
        self.dissonance.over_bass
    }

    /// The parts of the suspension it is.
    #[must_use]
    pub fn suspension(&self) -> Option<Held> {
        match self.figure() {
            Some(Figure::Suspension(held)) => Some(held),
            _ => None,
        }
    }

    /// The sonority in which it begins.
    #[must_use]
    pub fn sounding(&self) -> Sounding<'a> {
        self.piece.sounding(self.dissonance.sonority)
    }

    /// It is a fourth over the lowest voice.
    #[must_use]
    pub fn is_fourth_over_bass(&self) -> bool {
        self.dissonance.over_bass && partwright_analysis::consonance::is_fourth(self.dissonance.gap)
    }

    /// It begins on the first beat of a bar.
    #[must_use]
    pub fn is_on_downbeat(&self) -> bool {
        self.sounding().sonority().is_some_and(|s| s.level == 0)
    }

    /// The dissonant note is shorter than a beat.
    #[must_use]
    pub fn is_shorter_than_beat(&self) -> bool {
        let length = self.note(self.dissonant()).map_or(ZERO, |note| note.length);
        let cell = self.piece.cell_at(self.dissonance.at);
        cell.is_some_and(|cell| length < cell)
    }

    /// The dissonant note is shorter than a quarter.
    #[must_use]
    pub fn is_shorter_than_quarter(&self) -> bool {
        let note = self.note(self.dissonant());
        note.is_some_and(|note| note.length < Time::new(1, 4))
    }

    /// `D5 in soprano makes a major ninth with C4 in bass`.
    #[must_use]
    pub fn words(&self) -> String {
        self.words_of(self.dissonant())
    }

    /// The same, told of one of the two notes.
    #[must_use]
    pub fn words_of(&self, accused: (usize, usize)) -> String {
        let text = |of: (usize, usize)| {
            let pitch = self.note(of).and_then(|note| note.sound.pitch());
            let pitch = pitch.map(|p| p.to_string()).unwrap_or_default();
            format!("{pitch} in {}", self.piece.name(of.0))
        };
        format!(
            "{} makes {} with {}",
            text(accused),
            Interval(self.dissonance.gap).spoken(),
            text(self.dissonance.other(accused.0))
        )
    }
}

/// The letters are part of a stack of four thirds, and no letter has two signs.
fn fits_thirds(pitches: &[Pitch]) -> bool {
    stacked(pitches).next().is_some()
}

/// Such a part that has root, third and fifth, or its root in the bass.
fn makes_chord(pitches: &[Pitch], bass: Option<Pitch>) -> bool {
    let letters = letters_of(pitches);
    stacked(pitches).any(|root| {
        let triad: u8 = (0..3).map(|third| 1 << ((root + 2 * third) % 7)).sum();
        letters & triad == triad || bass.is_some_and(|bass| usize::from(bass.letter()) == root)
    })
}

fn letters_of(pitches: &[Pitch]) -> u8 {
    pitches.iter().fold(0, |set, p| set | 1 << p.letter())
}

/// The roots, as letters, of the stacks of four thirds that hold all of the notes.
fn stacked(pitches: &[Pitch]) -> impl Iterator<Item = usize> + use<> {
    let consistent = pitches.iter().all(|a| {
        pitches
            .iter()
            .all(|b| a.letter() != b.letter() || a.sign == b.sign)
    });
    let letters = letters_of(pitches);
    let chord = |root: usize| -> u8 { (0..4).map(|third| 1 << ((root + 2 * third) % 7)).sum() };
    (0..7).filter(move |&root| consistent && letters & !chord(root) == 0)
}
