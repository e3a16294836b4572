//! How the notes of a chord go on into the next one.

use partwright_analysis::harmony::Quality;
use partwright_analysis::mode::fifths;
use partwright_score::{Interval, Note, Pitch, Time};
use partwright_space::Gap;

use super::{Altered, Chord, Member, Piece, Sounding, Tone};

/// One voice going from its last note of a chord to its first of the next, ornaments between left
/// out; no rest and no end of a phrase lies between.
#[derive(Clone, Copy)]
pub struct Leaving<'a> {
    /// The chord left.
    pub chord: Chord<'a>,
    /// The chord reached.
    pub next: Chord<'a>,
    /// The note left.
    pub from: Member,
    /// The note reached.
    pub to: Member,
}

/// A note of a chord, reached from the note before it in its voice.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Reached {
    /// The note before.
    pub before: Member,
    /// The note of the chord.
    pub note: Member,
}

fn between(from: Pitch, to: Pitch) -> Gap {
    from.place().up_to(to.place())
}

impl<'a> Chord<'a> {
    /// Every voice that goes on into the next chord: both are sure, and it does not rest between.
    #[must_use]
    pub fn leavings(&self) -> Vec<Leaving<'a>> {
        let Some(next) = self.goes_to() else {
            return Vec::new();
        };
        let followers = self
            .piece
            .sounding(next.segment.first)
            .sonority()
            .map_or(0, |s| s.followers);
        (0..self.piece.score.voices.len())
            .filter(|voice| followers >> voice & 1 == 0)
            .filter_map(|voice| {
                let (from, to) = (self.last_of(voice)?, next.first_of(voice)?);
                let whole = self.piece.is_unbroken(&from, &to);
                whole.then_some(Leaving {
                    chord: *self,
                    next,
                    from,
                    to,
                })
            })
            .collect()
    }

    /// It lasts a quarter, or stands on a beat, or goes on from a chord on its root that does. What
    /// only passes between beats is no chord that wants to go anywhere.
    #[must_use]
    pub fn is_on_beat(&self) -> bool {
        let mut on_root = std::iter::successors(Some(*self), Chord::before)
            .take_while(|chord| chord.keeps_root(self));
        self.until() - self.onset() >= Time::new(1, 4)
            || on_root.any(|chord| chord.soundings().any(|there| !there.is_off_beat()))
    }

    /// It is a seventh chord beyond doubt: the third is heard as well.
    #[must_use]
    pub fn has_sure_seventh(&self) -> bool {
        let has = |tone| {
            let mut there = self.soundings().flat_map(|there| self.members(there));
            there.any(|member| member.tone == tone)
        };
        self.seventh_is_sure() && has(Tone::Third) && has(Tone::Seventh)
    }

    /// The root sounds beside another note of the chord, and one of the two was struck on a beat.
    #[must_use]
    pub fn has_root_beside(&self, member: &Member) -> bool {
        let members = self.members(self.piece.sounding(member.sonority));
        let mut others = members.iter().filter(|m| m.voice != member.voice);
        let struck_on_beat = |m: &Member| !self.piece.is_off_beat(m.onset);
        others.any(|m| m.tone == Tone::Root && (struck_on_beat(m) || struck_on_beat(member)))
    }

    /// The same root in the next chord: no change of harmony.
    #[must_use]
    pub fn keeps_root(&self, next: &Chord<'_>) -> bool {
        self.segment.chord.root == next.segment.chord.root
    }

    /// Its first sonority.
    #[must_use]
    pub fn first(&self) -> Sounding<'a> {
        self.piece.sounding(self.segment.first)
    }

    /// Each voice that strikes a note of the chord, and where it came from without a rest or the
    /// end of a phrase: the first note of this kind in the chord, whichever voice has it.
    #[must_use]
    pub fn reaches(&self, tone: Tone) -> Vec<Reached> {
        let mut there = self.soundings().map(|there| self.members(there));
        let first = there.find_map(|members| {
            let own: Vec<Member> = members.into_iter().filter(|m| m.tone == tone).collect();
            (!own.is_empty()).then_some(own)
        });
        let struck = first.unwrap_or_default().into_iter();
        struck
            .filter(|note| note.onset == self.piece.sounding(note.sonority).onset())
            .filter_map(|note| {
                let before = self.piece.note_before(&note)?;
                Some(Reached { before, note })
            })
            .collect()
    }
}

impl Piece<'_> {
    fn notes_of(&self, voice: usize) -> &[Note] {
        self.score.voices.get(voice).map_or(&[], |v| &v.notes)
    }

    /// From a note to a later one of the same voice there is no rest and no end of a phrase.
    fn is_unbroken(&self, from: &Member, to: &Member) -> bool {
        let index = |m: &Member| self.texture.note(m.sonority, m.voice);
        let (Some(first), Some(last)) = (index(from), index(to)) else {
            return false;
        };
        let notes = self.notes_of(from.voice);
        let sounds = |note: &Note| note.sound.pitch().is_some();
        let inside = notes.get(first..=last).unwrap_or_default();
        let left = notes.get(first..last).unwrap_or_default();
        inside.iter().all(sounds) && !left.iter().any(Note::ends_phrase)
    }

    /// The note right before one, in the same voice and phrase.
    fn note_before(&self, member: &Member) -> Option<Member> {
        let index = self.texture.note(member.sonority, member.voice)?;
        let before = self.notes_of(member.voice).get(index.checked_sub(1)?)?;
        let pitch = before.sound.pitch().filter(|_| !before.ends_phrase())?;
        Some(Member {
            pitch,
            onset: before.onset,
            sonority: self.texture.at(before.onset)?,
            ..*member
        })
    }

    /// The note right after one, in the same voice.
    fn pitch_after(&self, member: &Member) -> Option<Pitch> {
        let index = self.texture.note(member.sonority, member.voice)?;
        self.notes_of(member.voice).get(index + 1)?.sound.pitch()
    }
}

impl Reached {
    /// By a leap down.
    #[must_use]
    pub fn leaps_down(&self) -> bool {
        between(self.before.pitch, self.note.pitch).steps <= -2
    }

    /// The voice rises from its note by a semitone, which makes of a major seventh a leading note.
    #[must_use]
    pub fn leads_up(&self, chord: &Chord<'_>) -> bool {
        let goes = chord.piece.pitch_after(&self.note);
        let gap = goes.map(|to| between(self.note.pitch, to));
        chord.quality() == Quality::MajorSeventh
            && gap.is_some_and(|gap| gap.steps == 1 && gap.semitones == 1)
    }

    /// The interval leapt or stepped, with its article: `a fifth`.
    #[must_use]
    pub fn interval(&self) -> String {
        Interval(between(self.before.pitch, self.note.pitch)).with_article()
    }
}

impl<'a> Leaving<'a> {
    /// The voice.
    #[must_use]
    pub fn voice(&self) -> usize {
        self.from.voice
    }

    fn gap(&self) -> Gap {
        between(self.from.pitch, self.to.pitch)
    }

    /// Scale steps, without direction.
    #[must_use]
    pub fn size(&self) -> i32 {
        Interval(self.gap()).size()
    }

    /// It keeps its note.
    #[must_use]
    pub fn stays(&self) -> bool {
        self.from.pitch == self.to.pitch
    }

    /// It keeps its note, or puts it into another octave.
    #[must_use]
    pub fn keeps_class(&self) -> bool {
        fifths(self.from.pitch) == fifths(self.to.pitch)
    }

    /// To the same letter with another sign.
    #[must_use]
    pub fn is_chromatic(&self) -> bool {
        self.gap().steps == 0 && !self.stays()
    }

    /// Scale steps, up or down. A step put into another octave is a step: the leap it makes is
    /// told for itself.
    fn steps(&self) -> i32 {
        let gap = self.gap().steps;
        match gap.rem_euclid(7) {
            1 => 1,
            6 => -1,
            _ => gap,
        }
    }

    /// A step down.
    #[must_use]
    pub fn steps_down(&self) -> bool {
        self.steps() == -1
    }

    /// Its next note, ornament or not, is a step down, or up where `up`.
    #[must_use]
    pub fn next_note_is_step(&self, up: bool) -> bool {
        let goes = self.chord.piece.pitch_after(&self.from);
        let way = if up { 1 } else { -1 };
        goes.is_some_and(|to| between(self.from.pitch, to).steps == way)
    }

    /// It comes up to its note by a step between beats: an ornament, wherever it goes on.
    #[must_use]
    pub fn is_reached_from_below_off_beat(&self) -> bool {
        let piece = self.chord.piece;
        let came = piece.note_before(&self.from);
        came.is_some_and(|m| between(m.pitch, self.from.pitch).steps == 1)
            && piece.is_off_beat(self.from.onset)
    }

    /// The seventh of a major seventh chord, rising a semitone, is a leading note.
    #[must_use]
    pub fn leads_up_from_major_seventh(&self) -> bool {
        self.chord.quality() == Quality::MajorSeventh
            && self.from.tone == Tone::Seventh
            && self.rises_semitone()
    }

    /// A step up.
    #[must_use]
    pub fn steps_up(&self) -> bool {
        self.steps() == 1
    }

    /// A semitone up, to the next letter.
    #[must_use]
    pub fn rises_semitone(&self) -> bool {
        self.steps() == 1 && self.gap().semitones.rem_euclid(12) == 1
    }

    /// A third down.
    #[must_use]
    pub fn falls_third(&self) -> bool {
        self.gap().steps == -2
    }

    /// It leaps more than so many scale steps, but no octave.
    #[must_use]
    pub fn leaps_beyond(&self, steps: i32) -> bool {
        self.size() > steps && self.size() % 7 != 0
    }

    /// It goes on as an altered note wants to: raised up a step (a whole tone too, to another
    /// raised note, as in the melodic scale); lowered down a step, or a
    /// diminished third to the leading note.
    #[must_use]
    pub fn follows(&self, way: Altered) -> bool {
        match way {
            Altered::Raised => self.steps_up() || self.next_note_is_step(true),
            Altered::Lowered => {
                self.steps_down()
                    || self.next_note_is_step(false)
                    || (self.falls_third() && Interval(self.gap()).is_diminished())
            }
        }
    }

    /// Its note stands under that of another voice, as they leave, by an augmented fourth; not,
    /// then, over it by a diminished fifth.
    #[must_use]
    pub fn is_under(&self, other: &Leaving<'_>) -> bool {
        between(self.from.pitch, other.from.pitch).semitones > 0
    }

    /// Its note and that of another voice, as they leave, make a tritone.
    #[must_use]
    pub fn is_tritone_from(&self, other: &Leaving<'_>) -> bool {
        let gap = Interval(between(self.from.pitch, other.from.pitch));
        match gap.size() % 7 {
            3 => gap.is_augmented(),
            4 => gap.is_diminished(),
            _ => false,
        }
    }

    /// Where it leaves: the sonority of its last note.
    #[must_use]
    pub fn departure(&self) -> Sounding<'a> {
        self.chord.piece.sounding(self.from.sonority)
    }

    /// Where it arrives: the sonority of its first note of the next chord.
    #[must_use]
    pub fn arrival(&self) -> Sounding<'a> {
        self.chord.piece.sounding(self.to.sonority)
    }

    /// It has the highest or the lowest note of all where it leaves.
    #[must_use]
    pub fn is_outer(&self) -> bool {
        let there = self.departure();
        there.bass() == Some(self.voice()) || there.has_top(self.voice())
    }

    /// It has neither the highest nor the lowest note, where it leaves and where it arrives.
    #[must_use]
    pub fn is_inner(&self) -> bool {
        let inner = |there: Sounding<'_>| {
            there.bass().is_some_and(|bass| bass != self.voice()) && !there.has_top(self.voice())
        };
        inner(self.departure()) && inner(self.arrival())
    }

    /// It comes down to its note by a step and goes on down by a step: 1-7-6 of a scale.
    #[must_use]
    pub fn passes_down(&self) -> bool {
        let piece = self.chord.piece;
        let came = piece.note_before(&self.from);
        let goes = piece.pitch_after(&self.from);
        came.is_some_and(|m| between(m.pitch, self.from.pitch).steps == -1)
            && goes.is_some_and(|to| between(self.from.pitch, to).steps == -1)
    }

    /// It comes to its note, or goes on from it, by a chromatic semitone: it passes.
    #[must_use]
    pub fn passes_chromatically(&self) -> bool {
        let piece = self.chord.piece;
        let chromatic = |from: Pitch, to: Pitch| {
            let gap = between(from, to);
            gap.steps == 0 && gap.semitones != 0
        };
        let goes = piece.pitch_after(&self.from);
        self.is_chromatic() || goes.is_some_and(|to| chromatic(self.from.pitch, to))
    }

    /// The lowest voice goes to the note a step under the one this voice leaves.
    #[must_use]
    pub fn bass_takes_resolution(&self) -> bool {
        let bass = self.arrival().bass().filter(|&bass| bass != self.voice());
        let taken = bass.and_then(|bass| self.next.first_of(bass));
        taken.is_some_and(|m| between(m.pitch, self.from.pitch).steps.rem_euclid(7) == 1)
    }

    /// It rises by step over the lowest voice, which does too, both times a third or tenth apart.
    #[must_use]
    pub fn rises_in_tenths(&self) -> bool {
        let over = |there: Sounding<'a>, own: Member| {
            let bass = there.bass()?;
            let low = there.pitch(bass)?;
            let third = between(low, own.pitch).steps.rem_euclid(7) == 2;
            third.then_some(low)
        };
        let Some(before) = over(self.departure(), self.from) else {
            return false;
        };
        let Some(after) = over(self.arrival(), self.to) else {
            return false;
        };
        self.steps_up() && between(before, after).steps == 1
    }

    /// The note it leaves belongs to the next chord as well.
    #[must_use]
    pub fn could_stay(&self) -> bool {
        self.next.tone(self.from.pitch).is_some()
    }

    /// Its note is kept by another voice, at its own height or in another octave.
    #[must_use]
    pub fn is_kept_elsewhere(&self) -> bool {
        let own = fifths(self.from.pitch);
        let others = self.chord.leavings();
        let mut others = others.iter().filter(|o| o.voice() != self.voice());
        others.any(|o| o.stays() && fifths(o.from.pitch) == own)
    }

    /// `B4 to G4`.
    #[must_use]
    pub fn words(&self) -> String {
        format!("{} to {}", self.from.pitch, self.to.pitch)
    }

    /// What a musician calls its voice.
    #[must_use]
    pub fn name(&self) -> std::borrow::Cow<'a, str> {
        self.chord.piece.name(self.voice())
    }
}

impl Sounding<'_> {
    /// A voice has the highest note, alone or with others.
    #[must_use]
    pub fn has_top(self, voice: usize) -> bool {
        let height = |v: usize| self.pitch(v).map(|p| p.place().semitone);
        let voices = self.piece.texture.sounding(self.index);
        let top = voices.filter_map(height).max();
        top.is_some() && top == height(voice)
    }
}
