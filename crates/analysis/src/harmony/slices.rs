//! The notes of each sonority, weighed.

use std::hash::{Hash, Hasher};

use partwright_score::{Score, Sonority, Texture, Time};

use super::aside::{Around, aside};
use super::chord::Chord;
use super::keys::LocalKey;
use super::stated::said;
use crate::figures::{Dissonance, Figure};
use crate::mode::fifths;

/// Costs are whole numbers: hundredths of a quarter note left unexplained.
pub(super) type Cost = i64;

/// A quarter note's worth.
pub(super) const QUARTER: Cost = 100;

/// A longer sonority counts no more than this: one held chord is one piece of evidence.
const LONGEST: Cost = QUARTER * 2;

/// One note in a sonority.
#[derive(Clone, Copy)]
pub(super) struct Tone {
    /// Its place among the fifths.
    pub place: i32,
    /// What it costs to leave it out of the chord.
    pub aside: Cost,
    /// It is the lowest, a pedal apart.
    pub is_bass: bool,
    /// The note it stands for when it is left out: a suspension's resolution is the chord note.
    pub stands_for: Option<i32>,
}

/// In one word: many are hashed at each key.
impl Hash for Tone {
    fn hash<H: Hasher>(&self, state: &mut H) {
        let stands_for = self.stands_for.map_or(-128, i64::from);
        let word = self.aside << 24 ^ (i64::from(self.place) & 0xff) << 16;
        (word ^ (stands_for & 0xff) << 8 ^ i64::from(self.is_bass)).hash(state);
    }
}

/// One sonority as the search sees it.
pub(super) struct Slice {
    pub tones: Vec<Tone>,
    pub length: Cost,
    /// What it costs to change the chord here.
    pub change: Cost,
    /// What it costs to change no more than what stands over the root.
    pub same_root: Cost,
    /// A fermata stands on a note that sounds.
    pub fermata: bool,
    /// The chord that is stated here, and its key.
    pub said: Option<(Chord, Option<LocalKey>)>,
}

impl Hash for Slice {
    fn hash<H: Hasher>(&self, state: &mut H) {
        let costs = self.length << 40 ^ self.change << 20 ^ self.same_root << 1;
        (costs ^ i64::from(self.fermata)).hash(state);
        for tone in &self.tones {
            tone.hash(state);
        }
        self.said.hash(state);
        self.tones.len().hash(state);
    }
}

/// What the dissonances say of the notes, by voice and note.
struct Known {
    /// The first figure that a note is read as, and the sonority where it is that.
    figures: Vec<Vec<Option<(Figure, usize)>>>,
    /// The sonority where a note first disagrees with another.
    clashes: Vec<Vec<Option<usize>>>,
}

impl Known {
    fn of(score: &Score, found: &[Dissonance]) -> Known {
        let notes = || score.voices.iter().map(|voice| voice.notes.len());
        let mut known = Known {
            figures: notes().map(|n| vec![None; n]).collect(),
            clashes: notes().map(|n| vec![None; n]).collect(),
        };
        for dissonance in found {
            let at = dissonance.sonority;
            for (voice, note) in [dissonance.upper, dissonance.lower] {
                let slot = known.clashes.get_mut(voice).and_then(|v| v.get_mut(note));
                if let Some(slot) = slot {
                    slot.get_or_insert(at);
                }
            }
            let reading = dissonance.reading.into_iter();
            for reading in reading.filter(|r| r.figure != Figure::DiminishedFifth) {
                let voice = known.figures.get_mut(reading.voice);
                if let Some(slot) = voice.and_then(|v| v.get_mut(reading.note)) {
                    slot.get_or_insert((reading.figure, at));
                }
            }
        }
        known
    }

    /// A suspension is the chord's own note until the others move against it.
    fn figure(&self, voice: usize, note: usize, sonority: usize) -> Option<Figure> {
        let (figure, from) = (*self.figures.get(voice)?.get(note)?)?;
        (from <= sonority || !is_held(figure)).then_some(figure)
    }

    fn clashes(&self, voice: usize, note: usize, sonority: usize) -> bool {
        let first = self.clashes.get(voice).and_then(|v| *v.get(note)?);
        first.is_some_and(|first| first <= sonority)
    }
}

/// How strong the moments are on which a voice struck its note and the one before.
#[derive(Clone, Copy, Default)]
struct Struck {
    note: usize,
    level: u8,
    before: Option<u8>,
}

impl Struck {
    /// Goes on to the note of a sonority; what was not seen to be struck is asked of the score.
    fn goes_on(&mut self, score: &Score, voice: usize, note: usize, here: &Sonority) {
        if self.note == note && self.before.is_some() {
            return;
        }
        let notes = score.voices.get(voice).map_or(&[][..], |v| &v.notes);
        let asked = |note: Option<usize>| {
            let note = note.and_then(|note| notes.get(note));
            note.map_or(0, |note| score.level(note.onset))
        };
        let follows = self.before.is_some() && self.note + 1 == note;
        let before = if follows {
            self.level
        } else {
            asked(note.checked_sub(1))
        };
        let level = if here.struck >> voice & 1 == 1 {
            here.level
        } else {
            asked(Some(note))
        };
        *self = Struck {
            note,
            level,
            before: Some(before),
        };
    }

    fn is_weaker(&self) -> bool {
        self.before.is_some_and(|before| self.level > before)
    }
}

/// The slices of a score; silence and what is not known yet have no tones.
pub(super) fn slices(score: &Score, texture: &Texture, found: &[Dissonance]) -> Vec<Slice> {
    let known = Known::of(score, found);
    let mut struck = vec![Struck::default(); score.voices.len()];
    let sonorities = texture.sonorities();
    let mut slices = Vec::with_capacity(sonorities.len());
    for (k, sonority) in sonorities.iter().enumerate() {
        let end = sonorities
            .get(k + 1)
            .map_or_else(|| score.end(), |next| next.onset);
        let length = in_cost(end - sonority.onset);
        let mut fermata = false;
        let mut pedal = None;
        let mut tones: Vec<(i32, Tone)> = Vec::new();
        for voice in texture.sounding(k) {
            if sonority.followers >> voice & 1 == 1 {
                continue;
            }
            let (Some(note), Some(pitch)) =
                (texture.note(k, voice), texture.pitch(score, k, voice))
            else {
                continue;
            };
            let figure = known.figure(voice, note, k);
            let is_weaker = struck.get_mut(voice).is_some_and(|struck| {
                struck.goes_on(score, voice, note, sonority);
                struck.is_weaker()
            });
            let notes = score.voices.get(voice).map_or(&[][..], |v| &v.notes);
            let around = Around::of(notes, note, is_weaker);
            fermata |= around.is_some_and(|around| around.here.fermata);
            let is_bass = texture.bass(k) == Some(voice);
            if is_bass && figure == Some(Figure::Pedal) {
                pedal = Some(tones.len());
            }
            let is_held = sonority.struck >> voice & 1 == 0;
            let clash = known.clashes(voice, note, k).then_some(is_held);
            let (factor, stands_for) = aside(figure, clash, around);
            tones.push((
                pitch.place().semitone,
                Tone {
                    place: fifths(pitch),
                    aside: length * factor / 100,
                    is_bass,
                    stands_for,
                },
            ));
        }
        if let Some(pedal) = pedal {
            over_a_pedal(&mut tones, pedal);
        }
        // Off the beat a chord may change, and all the sooner where its root stays: a seventh
        // that passes, a seventh that comes late.
        let (change, same_root) = match sonority.level {
            0 | 1 => (30, 30),
            2 => (70, 70),
            _ => (85, 15),
        };
        slices.push(Slice {
            tones: tones.into_iter().map(|(_, tone)| tone).collect(),
            length,
            change,
            same_root,
            fermata,
            said: None,
        });
    }
    said(score, texture, &mut slices);
    slices
}

fn in_cost(length: Time) -> Cost {
    let quarters = length * 4 * QUARTER;
    quarters.to_integer().clamp(1, LONGEST)
}

const fn is_held(figure: Figure) -> bool {
    matches!(
        figure,
        Figure::Suspension(_) | Figure::Retardation(_) | Figure::ConsonantFourth | Figure::Pedal
    )
}

/// The bass over a pedal is the next voice up.
fn over_a_pedal(tones: &mut [(i32, Tone)], pedal: usize) {
    let others = tones.iter().enumerate().filter(|(i, _)| *i != pedal);
    let next = others
        .min_by_key(|(_, (height, _))| *height)
        .map(|(i, _)| i);
    for (index, (_, tone)) in tones.iter_mut().enumerate() {
        tone.is_bass = Some(index) == next;
    }
}
