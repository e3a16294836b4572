//! The notes of each sonority, weighed.

use std::collections::BTreeMap;
use std::ops::Range;

use partwright_score::{Note, Pitch, Score, Texture, Time};

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
}

/// The slices of a stretch of sonorities; silence and what is not known yet have no tones.
pub(super) fn slices(
    score: &Score,
    texture: &Texture,
    found: &[Dissonance],
    stretch: Range<usize>,
) -> Vec<Slice> {
    // A figure may begin before the stretch.
    let first = found.partition_point(|d| d.sonority + BEFORE < stretch.start);
    let mut figures = BTreeMap::new();
    let near = found.iter().skip(first);
    for dissonance in near.take_while(|d| d.sonority < stretch.end) {
        let Some(reading) = dissonance.reading else {
            continue;
        };
        if reading.figure != Figure::DiminishedFifth {
            figures
                .entry((reading.voice, reading.note))
                .or_insert((reading.figure, dissonance.sonority));
        }
    }
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
            // A suspension is the chord's own note until the others move against it.
            let figure = figures
                .get(&(voice, note))
                .filter(|(figure, from)| *from <= k || !is_held(*figure))
                .map(|(figure, _)| *figure);
            let around = Around::of(score, voice, note);
            fermata |= around.is_some_and(|around| around.here.fermata);
            let is_bass = texture.bass(k) == Some(voice);
            if is_bass && figure == Some(Figure::Pedal) {
                pedal = Some(tones.len());
            }
            let (factor, stands_for) = aside(figure, around);
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
        });
    }
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
/// Tuned on half of the chorales that have been analysed; the other half agrees as well.
fn aside(figure: Option<Figure>, around: Option<Around<'_>>) -> (Cost, Option<i32>) {
    let resolution = around.and_then(Around::next_by_step);
    match figure {
        Some(Figure::Anticipation) => (80, None),
        Some(Figure::Pedal) => (100, None),
        Some(Figure::Passing { accented: false }) => (120, None),
        Some(Figure::Neighbour {
            accented: false, ..
        }) => (200, None),
        Some(Figure::Passing { accented: true }) => (250, resolution),
        Some(Figure::Suspension(_) | Figure::Retardation(_)) => (130, resolution),
        Some(_) => (200, resolution),
        None => match around {
            Some(around) if around.passes() => (220, None),
            Some(around) if around.is_struck_again_and_falls() => (150, resolution),
            Some(around) if around.is_brief_between_steps() => (400, resolution),
            _ => (600, None),
        },
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

    /// Prepared on its own pitch, then a step down: a suspension struck again.
    fn is_struck_again_and_falls(self) -> bool {
        let down = |after: Pitch| after.step - self.pitch.step == -1;
        self.before
            .is_some_and(|(_, before)| before.step == self.pitch.step)
            && self.after.is_some_and(down)
    }

    /// Reached and left by step, and no longer than the note before.
    fn is_brief_between_steps(self) -> bool {
        self.between_steps()
            .is_some_and(|before| self.here.length <= before.length)
    }
}
