//! Harmony that is stated, against the notes that stand there.

use partwright_analysis::{Figure, harmony};
use partwright_score::fifths::{fifths, letter_at, named};
use partwright_score::{Note, StatedChord, Time};

use super::{Piece, Sounding};

/// A chord that is stated, or asked for by figures, and the sonorities under it.
#[derive(Clone, Debug)]
pub struct StatedHarmony<'a> {
    piece: Piece<'a>,
    chord: StatedChord,
    /// Its first sonority that sounds with it, and one past its last.
    first: usize,
    end: usize,
    /// The sonorities under it and its neighbours on the same root: V goes on in V7.
    run: (usize, usize),
    /// When these begin and end.
    lasts: (Time, Time),
}

/// A note in the way of a stated chord.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Stranger {
    /// Its voice.
    pub voice: usize,
    /// Its index in the voice.
    pub note: usize,
    /// Where it first sounds with the chord.
    pub at: Time,
}

fn is_same(a: &StatedChord, b: &StatedChord) -> bool {
    (&a.tones, &a.beside, a.bass, a.key) == (&b.tones, &b.beside, b.bass, b.key)
}

impl<'a> Piece<'a> {
    /// Every chord that the composer states, over notes that are all written.
    #[must_use]
    pub fn stated_harmony(self) -> Vec<StatedHarmony<'a>> {
        let sonorities = self.texture.sonorities();
        let mut chords: Vec<StatedChord> = Vec::new();
        for chord in harmony::stated(self.score, self.texture) {
            match chords.last_mut() {
                // The same chord again goes on.
                Some(last) if last.until == chord.from && is_same(last, &chord) => {
                    last.until = chord.until;
                }
                _ => chords.push(chord),
            }
        }
        let list = chords.into_iter().filter_map(|chord| {
            let first = self.texture.sounding_at(chord.from).unwrap_or(0);
            let end = sonorities.partition_point(|s| s.onset < chord.until);
            let over = sonorities.get(first..end)?;
            let is_written = over.iter().all(|s| s.unknown == 0);
            let sounds = over.iter().any(|s| s.sounding != 0);
            (is_written && sounds).then_some(StatedHarmony {
                piece: self,
                lasts: (chord.from, chord.until),
                chord,
                first,
                end,
                run: (first, end),
            })
        });
        let mut list: Vec<StatedHarmony<'_>> = list.collect();
        for k in 1..list.len() {
            let (before, after) = list.split_at_mut(k);
            if let (Some(last), Some(of)) = (before.last(), after.first_mut())
                && last.goes_on_in(of)
            {
                of.run.0 = last.run.0;
                of.lasts.0 = last.lasts.0;
            }
        }
        for k in (1..list.len()).rev() {
            let (before, after) = list.split_at_mut(k);
            if let (Some(of), Some(next)) = (before.last_mut(), after.first())
                && of.goes_on_in(next)
            {
                of.run.1 = next.run.1;
                of.lasts.1 = next.lasts.1;
            }
        }
        list
    }
}

impl<'a> StatedHarmony<'a> {
    /// The next chord follows at once on the same root.
    fn goes_on_in(&self, next: &StatedHarmony<'_>) -> bool {
        (self.chord.root, self.chord.until) == (next.chord.root, next.chord.from)
    }

    /// As it is written, with its key and notes: `V7 in G major (D F# A C)`.
    #[must_use]
    pub fn words(&self) -> String {
        let StatedChord { written, key, .. } = &self.chord;
        let notes = self.chord.notes();
        match (key, self.chord.bass) {
            (Some(key), _) => {
                let (tonic, mode) = (named(key.tonic), key.mode.name());
                format!("{written} in {tonic} {mode} ({notes})")
            }
            (None, Some(bass)) => format!("{written} over {} ({notes})", named(bass)),
            (None, None) => format!("{written} ({notes})"),
        }
    }

    /// Where it begins, or the first notes with it.
    #[must_use]
    pub fn at(&self) -> Time {
        self.piece.sounding(self.first).onset().max(self.chord.from)
    }

    /// The sonorities under it.
    pub fn soundings(&self) -> impl Iterator<Item = Sounding<'a>> + use<'a> {
        let piece = self.piece;
        (self.first..self.end).map(move |index| piece.sounding(index))
    }

    /// The voices that sound where it begins.
    #[must_use]
    pub fn voices(&self) -> Vec<usize> {
        self.piece.texture.sounding(self.first).collect()
    }

    /// The notes that do not belong to it and are no ornaments, in order of time.
    #[must_use]
    pub fn strangers(&self) -> Vec<Stranger> {
        let mut list: Vec<Stranger> = Vec::new();
        for there in self.soundings() {
            let outside = self.outside(there);
            // Where most of a chord is beside it on the beat, steps alone do not make ornaments.
            let few = there.is_off_beat() || outside.len() * 2 <= there.parts();
            for of in outside {
                let known = list
                    .iter()
                    .any(|s| (s.voice, s.note) == (of.voice, of.note));
                let steps = few && self.goes_by_step(of);
                let excused = steps || self.has_figure(of) || self.is_pedal(of, there);
                if !known && !excused {
                    list.push(of);
                }
            }
        }
        list
    }

    /// The voices of some notes, that of the first in front.
    #[must_use]
    pub fn voices_of(&self, notes: &[Stranger]) -> Vec<usize> {
        let mut voices: Vec<usize> = notes.iter().map(|of| of.voice).collect();
        voices.sort_unstable();
        voices.dedup();
        voices.sort_by_key(|voice| notes.first().is_none_or(|first| first.voice != *voice));
        voices
    }

    /// Notes by name, each with its voice.
    #[must_use]
    pub fn names(&self, notes: &[Stranger]) -> String {
        let mut names: Vec<String> = Vec::new();
        for of in notes {
            let pitch = self.note(of.voice, of.note).and_then(|n| n.sound.pitch());
            let pitch = pitch.map(|p| p.to_string()).unwrap_or_default();
            let name = format!("{pitch} in {}", self.piece.name(of.voice));
            if !names.contains(&name) {
                names.push(name);
            }
        }
        match names.split_last() {
            Some((last, others)) if !others.is_empty() => {
                format!("{} and {last}", others.join(", "))
            }
            _ => names.concat(),
        }
    }

    /// The bass under it from beginning to end is another of its notes than the one its figures
    /// tell: that one by name, and the note that stands there. One voice alone has no bass.
    #[must_use]
    pub fn other_bass(&self) -> Option<(String, Stranger)> {
        let wanted = self.chord.bass?;
        let basses = self.soundings().filter_map(|there| {
            let voice = there.bass().filter(|_| there.parts() >= 2)?;
            let note = self.piece.texture.note(there.index, voice)?;
            let at = there.onset().max(self.chord.from);
            let place = fifths(there.pitch(voice)?);
            Some((place, Stranger { voice, note, at }))
        });
        let basses: Vec<(i32, Stranger)> = basses.collect();
        let (place, first) = *basses.first()?;
        let other = basses.iter().all(|(place, _)| *place != wanted);
        (other && self.chord.tones.contains(&place)).then(|| (named(wanted), first))
    }

    /// The root or third that three voices or more never sound under it, nor under its neighbours
    /// on the same root, and that no ornament stands for: what it is, and its name.
    #[must_use]
    pub fn lacking(&self) -> Option<(&'static str, String)> {
        if !self.soundings().any(|there| there.parts() >= 3) {
            return None;
        }
        let sounded = |place: i32| {
            let mut run = (self.run.0..self.run.1).map(|index| self.piece.sounding(index));
            run.any(|there| {
                let mut voices = self.piece.texture.sounding(there.index);
                voices.any(|v| there.pitch(v).is_some_and(|pitch| fifths(pitch) == place))
            })
        };
        let stood_for = |place: i32| {
            let near = |other: i32| {
                let apart = (letter_at(place) + 7 - letter_at(other)) % 7;
                matches!(apart, 1 | 6)
            };
            let outside = |there| {
                let notes = self.outside(there).into_iter();
                let pitch = |of: Stranger| self.note(of.voice, of.note)?.sound.pitch();
                notes.filter_map(pitch).any(|pitch| near(fifths(pitch)))
            };
            self.chord.beside.iter().any(|other| near(*other)) || self.soundings().any(outside)
        };
        let of = ["third", "root"].into_iter().zip([1, 0]);
        of.filter_map(|(what, tone)| Some((what, *self.chord.tones.get(tone)?)))
            .find(|(_, place)| !sounded(*place) && !stood_for(*place))
            .map(|(what, place)| (what, named(place)))
    }

    /// The notes of a sonority that are none of the chord's and none its figures ask for.
    fn outside(&self, there: Sounding<'a>) -> Vec<Stranger> {
        let followers = there.sonority().map_or(0, |s| s.followers);
        let voices = self.piece.texture.sounding(there.index);
        let outside = voices.filter(|v| followers >> v & 1 == 0).filter_map(|v| {
            let place = fifths(there.pitch(v)?);
            let note = self.piece.texture.note(there.index, v)?;
            let at = there.onset().max(self.chord.from);
            let belongs = self.belongs(place) || self.chord.beside.contains(&place);
            (!belongs).then_some(Stranger { voice: v, note, at })
        });
        outside.collect()
    }

    fn belongs(&self, place: i32) -> bool {
        self.chord.tones.contains(&place)
    }

    fn note(&self, voice: usize, note: usize) -> Option<&'a Note> {
        self.piece.score.voices.get(voice)?.notes.get(note)
    }

    /// The note was read as a figure of a dissonance.
    fn has_figure(&self, of: Stranger) -> bool {
        let Some(note) = self.note(of.voice, of.note) else {
            return false;
        };
        let list = self.piece.analysis.dissonances();
        let first = list.partition_point(|d| d.at < note.onset);
        let mut found = list.iter().skip(first).take_while(|d| d.at < note.end());
        found.any(|d| {
            d.reading.is_some_and(|reading| {
                (reading.voice, reading.note) == (of.voice, of.note)
                    && reading.figure != Figure::DiminishedFifth
            })
        })
    }

    /// The lowest note, held on from before the chord until after it: a pedal, whichever note of
    /// its dissonances was read as the figure.
    fn is_pedal(&self, of: Stranger, there: Sounding<'a>) -> bool {
        let note = self.note(of.voice, of.note);
        there.bass() == Some(of.voice)
            && note.is_some_and(|n| n.onset < self.chord.from && n.end() > self.chord.until)
    }

    /// An ornament, whatever it disagrees with: weak between two steps, held over and left by step,
    /// on its way by step to a note of the chord, an anticipation, or short and left or reached by
    /// step.
    fn goes_by_step(&self, of: Stranger) -> bool {
        let at = |index: Option<usize>| self.note(of.voice, index?);
        let Some(here) = at(Some(of.note)) else {
            return false;
        };
        let (before, after) = (at(of.note.checked_sub(1)), at(of.note.checked_add(1)));
        // A chromatic semitone is a step too.
        let step = |other: Option<&Note>| {
            let (a, b) = (other?.sound.pitch()?, here.sound.pitch()?);
            let letters = (a.step - b.step).abs();
            Some(letters.max(i16::from(a.sign != b.sign && letters == 0)))
        };
        let (came, went) = (step(before), step(after));
        let held = here.onset < self.chord.from;
        // Prepared and down by step: a suspension, wherever it is resolved.
        let falls = after.and_then(|after| after.sound.pitch()?.step.checked_add(1));
        let falls = falls.is_some() && falls == here.sound.pitch().map(|pitch| pitch.step);
        if falls && (held || came == Some(0)) {
            return true;
        }
        // What lasts as long as the chord leaves it no room.
        let (from, until) = self.lasts;
        if here.onset <= from && here.end() >= until {
            return false;
        }
        let level = |note: &Note| self.piece.score.level(note.onset);
        let is_weak = before.is_some_and(|before| level(here) > level(before));
        let settles = after.is_some_and(|after| {
            let place = after.sound.pitch().map(fifths);
            after.onset < until && place.is_some_and(|place| self.belongs(place))
        });
        let cell = self.piece.cell_at(here.onset);
        let is_short = cell.is_some_and(|cell| here.length < cell);
        match (came, went) {
            (Some(1), Some(1)) if is_weak => true,
            (_, Some(1)) => held || settles || (is_weak && is_short),
            (_, Some(0)) => is_weak && is_short,
            (Some(1), _) => is_weak && is_short,
            _ => false,
        }
    }
}
