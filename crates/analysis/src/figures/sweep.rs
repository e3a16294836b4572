//! One sweep over the sonorities that finds every dissonance once.

use partwright_score::{Score, Texture};
use partwright_space::Gap;

use super::place::over;
use super::{Dissonance, Figure, Place, QUESTIONS, Reading, near_suspension};
use crate::consonance;

/// No note yet.
const NONE: usize = usize::MAX;

/// All dissonances, in order of time, each with the first figure that fits.
pub(crate) fn dissonances(score: &Score, texture: &Texture) -> Vec<Dissonance> {
    let voices = score.voices.len();
    let mut sweep = Sweep {
        score,
        texture,
        voices,
        found: Vec::new(),
        last: vec![(NONE, NONE); voices * voices],
        read: vec![NONE; voices],
        pedal: vec![NONE; voices],
    };
    for (k, sonority) in texture.sonorities().iter().enumerate() {
        if sonority.unknown == 0 {
            sweep.sonority(k, sonority.followers);
        }
    }
    sweep.found.sort_by_key(|d| d.sonority);
    sweep.found
}

struct Sweep<'a> {
    score: &'a Score,
    texture: &'a Texture,
    voices: usize,
    found: Vec<Dissonance>,
    /// The notes of each pair of voices that were last found to disagree.
    last: Vec<(usize, usize)>,
    /// Of each voice the last note that was accounted for, or reported as none.
    read: Vec<usize>,
    /// Of each voice the last note that is a pedal.
    pedal: Vec<usize>,
}

impl Sweep<'_> {
    fn sonority(&mut self, k: usize, followers: u64) {
        let mut here: Vec<usize> = self
            .texture
            .sounding(k)
            .filter(|v| followers >> v & 1 == 0)
            .collect();
        // Above a pedal the next voice up is the lowest for all that follows.
        let mut under = None;
        while let Some(bass) = self.lowest(k, &here) {
            if !self.against_bass(k, bass, &here, under) {
                self.among_upper(k, bass, &here);
                return;
            }
            here.retain(|&v| v != bass);
            under = Some(bass);
        }
    }

    /// The voice with the lowest note.
    fn lowest(&self, k: usize, here: &[usize]) -> Option<usize> {
        if here.len() < 2 {
            return None;
        }
        let bass = self.texture.bass(k)?;
        if here.contains(&bass) {
            return Some(bass);
        }
        let (&first, others) = here.split_first()?;
        let lower = |low: usize, &v: &usize| {
            let below = over(self.texture, k, v, low).is_some_and(|gap| gap.semitones <= 0);
            if below { v } else { low }
        };
        Some(others.iter().fold(first, lower))
    }

    /// Finds what disagrees with the lowest voice; tells whether that is a pedal.
    fn against_bass(
        &mut self,
        k: usize,
        bass: usize,
        here: &[usize],
        under: Option<usize>,
    ) -> bool {
        let note = self.texture.note(k, bass).unwrap_or(NONE);
        let is_pedal = |sweep: &Self| sweep.pedal.get(bass) == Some(&note);
        for &voice in here.iter().filter(|&&v| v != bass) {
            if is_pedal(self) {
                return true;
            }
            // Above a pedal, voices that agree with it are upper ones.
            let consonant = match under {
                Some(pedal) if self.agree_with(k, pedal, [voice, bass]) => consonance::among_upper,
                _ => consonance::over_bass,
            };
            if let Some(gap) = over(self.texture, k, voice, bass)
                && !consonant(gap)
            {
                self.disagree(k, (voice, bass), true, gap);
            }
        }
        is_pedal(self)
    }

    fn agree_with(&self, k: usize, pedal: usize, voices: [usize; 2]) -> bool {
        voices
            .iter()
            .all(|&v| over(self.texture, k, v, pedal).is_some_and(consonance::over_bass))
    }

    /// Finds what disagrees among voices that agree with the lowest.
    fn among_upper(&mut self, k: usize, bass: usize, here: &[usize]) {
        let agrees = |v: usize| over(self.texture, k, v, bass).is_some_and(consonance::over_bass);
        let good: Vec<usize> = here
            .iter()
            .copied()
            .filter(|&v| v != bass && agrees(v))
            .collect();
        for (i, &upper) in good.iter().enumerate() {
            for &lower in good.get(i + 1..).unwrap_or_default() {
                if let Some(gap) = self.texture.gap(k, upper, lower)
                    && !consonance::among_upper(gap)
                {
                    self.disagree(k, (upper, lower), false, gap);
                }
            }
        }
    }

    fn disagree(&mut self, k: usize, (a, b): (usize, usize), over_bass: bool, gap: Gap) {
        let (upper, lower) = (a.min(b), a.max(b));
        let note = |v| self.texture.note(k, v);
        let (Some(high), Some(low)) = (note(upper), note(lower)) else {
            return;
        };
        let Some(last) = self.last.get_mut(upper * self.voices + lower) else {
            return;
        };
        // Struck again, they are still the same two.
        let first = (
            first_of(self.score, upper, high),
            first_of(self.score, lower, low),
        );
        if std::mem::replace(last, first) == first {
            return;
        }
        // A note that is a figure already may disagree with others too.
        let known = |voice: usize, note: usize| self.read.get(voice) == Some(&note);
        if known(upper, high) || known(lower, low) {
            return;
        }
        // Among upper voices a disagreement older than the lowest note began before it.
        let k = if over_bass {
            k
        } else {
            self.began(k, [(upper, high), (lower, low)])
        };
        let Some(sonority) = self.texture.sonorities().get(k) else {
            return;
        };
        let mut dissonance = Dissonance {
            sonority: k,
            at: sonority.onset,
            upper: (upper, high),
            lower: (lower, low),
            over_bass,
            gap,
            reading: None,
        };
        dissonance.reading = self.ask(&dissonance);
        let near = dissonance.reading.is_none()
            && near_suspension(self.score, self.texture, &dissonance).is_some();
        let mut mark = |list: fn(&mut Self) -> &mut Vec<usize>, voice: usize, note: usize| {
            if let Some(slot) = list(self).get_mut(voice) {
                *slot = note;
            }
        };
        match dissonance.reading {
            Some(Reading {
                voice,
                note,
                figure: Figure::Pedal,
            }) => mark(|s| &mut s.pedal, voice, note),
            Some(Reading { voice, note, .. }) => mark(|s| &mut s.read, voice, note),
            // What no figure explains is told once: of the notes struck here, and of one held
            // that lacks something of a suspension.
            None => {
                for (voice, note) in dissonance.notes() {
                    if near || sonority.struck >> voice & 1 == 1 {
                        mark(|s| &mut s.read, voice, note);
                    }
                }
            }
        }
        self.found.push(dissonance);
    }

    /// The sonority in which the later of two notes is struck.
    fn began(&self, k: usize, notes: [(usize, usize); 2]) -> usize {
        let note = |(v, n): (usize, usize)| self.score.voices.get(v)?.notes.get(n);
        let later = notes.into_iter().filter_map(note).map(|n| n.onset).max();
        later.and_then(|at| self.texture.at(at)).unwrap_or(k).min(k)
    }

    fn ask(&self, dissonance: &Dissonance) -> Option<Reading> {
        let both = Place::both(self.score, self.texture, dissonance);
        QUESTIONS.iter().find_map(|(_, question)| {
            both.iter().find_map(|place| {
                let figure = question(place).ok()?;
                let (voice, note) = (place.voice, place.note);
                Some(Reading {
                    voice,
                    note,
                    figure,
                })
            })
        })
    }
}

/// The first of the notes that only strike a pitch again.
fn first_of(score: &Score, voice: usize, note: usize) -> usize {
    let notes = score.voices.get(voice).map_or(&[][..], |v| &v.notes);
    let sound = notes.get(note).map(|n| n.sound);
    let before = notes.get(..note).unwrap_or_default();
    let again = before.iter().rev().take_while(|n| Some(n.sound) == sound);
    note - again.count()
}
