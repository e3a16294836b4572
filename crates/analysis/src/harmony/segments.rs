//! The notes of each sonority, weighed.

use std::collections::BTreeMap;
use std::ops::Range;

use partwright_score::{Note, Pitch, Score, Texture, Time};

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

/// How many sonorities before a stretch a figure may begin that goes on into it.
const BEFORE: usize = 16;

/// One note in a sonority.
#[derive(Clone, Copy, Hash)]
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

/// One sonority as the search sees it.
#[derive(Hash)]
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

/// What the dissonances of a stretch say of its notes, by voice and note.
struct Known {
    /// The first figure that a note is read as, and the sonority where it is that.
    figures: BTreeMap<(usize, usize), (Figure, usize)>,
    /// The sonority where a note first disagrees with another.
    clashes: BTreeMap<(usize, usize), usize>,
}

impl Known {
    fn of(found: &[Dissonance], stretch: &Range<usize>) -> Known {
        let mut known = Known {
            figures: BTreeMap::new(),
            clashes: BTreeMap::new(),
        };
        // A figure may begin before the stretch.
        let first = found.partition_point(|d| d.sonority + BEFORE < stretch.start);
        let near = found.iter().skip(first);
        for dissonance in near.take_while(|d| d.sonority < stretch.end) {
            let at = dissonance.sonority;
            for note in [dissonance.upper, dissonance.lower] {
                known.clashes.entry(note).or_insert(at);
            }
            let readings = dissonance.reading.into_iter();
            for reading in readings.filter(|r| r.figure != Figure::DiminishedFifth) {
                let note = (reading.voice, reading.note);
                known.figures.entry(note).or_insert((reading.figure, at));
            }
        }
        known
    }

    /// A suspension is the chord's own note until the others move against it.
    fn figure(&self, voice: usize, note: usize, sonority: usize) -> Option<Figure> {
        let (figure, from) = self.figures.get(&(voice, note))?;
        (*from <= sonority || !is_held(*figure)).then_some(*figure)
    }

    fn clashes(&self, voice: usize, note: usize, sonority: usize) -> bool {
        let first = self.clashes.get(&(voice, note));
        first.is_some_and(|first| *first <= sonority)
    }
}

/// The slices of a stretch of sonorities; silence and what is not known yet have no tones.
pub(super) fn slices(
    score: &Score,
    texture: &Texture,
    found: &[Dissonance],
    stretch: Range<usize>,
) -> Vec<Slice> {
    let known = Known::of(found, &stretch);
    let from = stretch.start;
    let sonorities = texture.sonorities();
    let mut slices = Vec::with_capacity(stretch.len());
    for k in stretch {
        let Some(sonority) = sonorities.get(k) else {
            break;
        };
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
            let around = Around::of(score, voice, note);
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
    said(score, texture, from, &mut slices);
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

/// What it costs to leave a note out, in hundredths of its length, and what it then stands for.
/// A dissonance is read as one note's figure; here the other may be the one that moves, so `clash`
/// tells whether there is one, and whether the note is held into it.
/// Tuned on half of the chorales that have been analysed; the other half agrees as well.
fn aside(
    figure: Option<Figure>,
    clash: Option<bool>,
    around: Option<Around<'_>>,
) -> (Cost, Option<i32>) {
    let resolution = around.and_then(Around::next_by_step);
    match figure {
        Some(Figure::Anticipation) => return (80, None),
        Some(Figure::Pedal) => return (100, None),
        Some(Figure::Passing { accented: false }) => return (120, None),
        Some(Figure::Neighbour {
            accented: false, ..
        }) => return (200, None),
        Some(Figure::Passing { accented: true }) => return (250, resolution),
        Some(Figure::Suspension(_) | Figure::Retardation(_)) => return (130, resolution),
        Some(_) => return (200, resolution),
        None => {}
    }
    match (around, clash) {
        (Some(around), _) if around.passes() => (220, None),
        (Some(around), _) if around.is_struck_again() && around.falls() => (150, resolution),
        (Some(around), Some(true)) if around.falls() => (150, resolution),
        (Some(around), Some(_)) if around.is_brief_between_steps() => (200, resolution),
        (Some(around), None) if around.is_brief_between_steps() => (400, resolution),
        _ => (600, None),
    }
}

/// A note between its neighbours in its voice.
#[derive(Clone, Copy)]
struct Around<'a> {
    score: &'a Score,
    before: Option<(&'a Note, Pitch)>,
    here: &'a Note,
    pitch: Pitch,
    after: Option<Pitch>,
}

impl<'a> Around<'a> {
    fn of(score: &'a Score, voice: usize, note: usize) -> Option<Around<'a>> {
        let notes = &score.voices.get(voice)?.notes;
        let here = notes.get(note)?;
        let before = note.checked_sub(1).and_then(|i| notes.get(i));
        Some(Around {
            score,
            before: before.and_then(|note| Some((note, note.sound.pitch()?))),
            here,
            pitch: here.sound.pitch()?,
            after: notes.get(note + 1).and_then(|note| note.sound.pitch()),
        })
    }

    /// Where the next note lies, if that is a step away.
    fn next_by_step(self) -> Option<i32> {
        self.after
            .filter(|after| (after.step - self.pitch.step).abs() == 1)
            .map(fifths)
    }

    /// The note before, where this one is reached and left by step.
    fn between_steps(self) -> Option<&'a Note> {
        let (note, before) = self.before?;
        self.next_by_step()?;
        ((before.step - self.pitch.step).abs() == 1).then_some(note)
    }

    /// Reached and left by step on a moment weaker than that of the note before.
    fn passes(self) -> bool {
        let level = |note: &Note| self.score.level(note.onset);
        self.between_steps()
            .is_some_and(|before| level(self.here) > level(before))
    }

    /// Prepared on its own pitch, as a suspension struck again is.
    fn is_struck_again(self) -> bool {
        self.before
            .is_some_and(|(_, before)| before.step == self.pitch.step)
    }

    /// The next note is a step lower.
    fn falls(self) -> bool {
        self.after
            .is_some_and(|after| after.step - self.pitch.step == -1)
    }

    /// Reached and left by step, and no longer than the note before.
    fn is_brief_between_steps(self) -> bool {
        self.between_steps()
            .is_some_and(|before| self.here.length <= before.length)
    }
}
