//! The next voicing in register: ranges, leaps, held notes, whole chords and doublings.
//!
//! Here the voices have their places, and the rotation of the sorted order is no longer valid. A
//! crossing-free least voicing still exists if the ranges rise from the bottom voice to the top
//! and all voices share one limit to their leaps; with a held note, ranges that fall or unequal
//! limits it need not. So the question is answered in layers, voice by voice from the bottom up,
//! without that shortcut.

use crate::error::SpaceError;
use crate::norm::Norm;
use crate::octave::Octave;
use std::cmp::Reverse;
use std::collections::{BTreeMap, BTreeSet, BinaryHeap};

/// What a voice may sing, and what the search holds, at most.
const MOST_PITCHES: usize = 1 << 12;
const MOST_STATES: usize = 1 << 20;

/// A voice: where it is and where it may go. Pitches are lattice points.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub struct Part {
    /// Where it is.
    pub from: i32,
    /// The lowest pitch of its range.
    pub low: i32,
    /// The highest pitch of its range.
    pub high: i32,
    /// The widest leap it may take, either way.
    pub leap: u32,
    /// The pitch it must take, whatever its range, its leap and the chord: a suspension, a pedal
    /// or a note already written.
    pub held: Option<i32>,
}

/// A note of the chord to be voiced.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub struct Tone {
    /// Its pitch class (taken modulo the octave).
    pub class: i32,
    /// In how many voices it must stand.
    pub at_least: u32,
    /// In how many voices it may stand.
    pub at_most: u32,
}

impl Tone {
    /// A note that must be there and may be doubled at will.
    #[must_use]
    pub const fn wanted(class: i32) -> Tone {
        Tone {
            class,
            at_least: 1,
            at_most: u32::MAX,
        }
    }
}

/// A question for the next voicing.
///
/// ```
/// use partwright_space::{Norm, Octave, Part, Placing, Tone};
///
/// // A C major chord from C3 G3 E4 C5 to F major, nobody leaping more than a fourth.
/// let part = |from, low, high| Part { from, low, high, leap: 5, held: None };
/// let question = Placing {
///     octave: Octave::SEMITONES,
///     tones: [5, 9, 0].map(Tone::wanted).to_vec(),
///     parts: vec![part(48, 40, 60), part(55, 48, 67), part(64, 55, 74), part(72, 60, 81)],
///     norm: Norm::L1,
///     crossing: false,
///     overlap: false,
/// };
/// let (size, voicings) = question.least()?.unwrap_or_default();
/// assert_eq!((size, voicings), (3, vec![vec![48, 57, 65, 72]]));
/// # Ok::<(), partwright_space::SpaceError>(())
/// ```
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Placing {
    /// The octave of the lattice.
    pub octave: Octave,
    /// The notes of the chord; a class given twice keeps both its limits.
    pub tones: Vec<Tone>,
    /// The voices from the bottom up.
    pub parts: Vec<Part>,
    /// The size that orders the answers.
    pub norm: Norm,
    /// Whether a voice may end above the next one up.
    pub crossing: bool,
    /// Whether a voice may go beyond where its neighbour just was.
    pub overlap: bool,
}

/// The pitches of all voices, from the bottom up.
pub type Voicing = Vec<i32>;

/// A state between two voices: the pitch of the last one, where it matters, and how often each
/// tone has been sung, as far as it matters.
type State = (Option<i32>, Vec<u32>);

impl Placing {
    /// The least voicings, all of them, with their size; `None` where there is no lawful one.
    ///
    /// # Errors
    /// [`SpaceError::TooManyChoices`] where a voice may go to thousands of pitches.
    pub fn least(&self) -> Result<Option<(i64, Vec<Voicing>)>, SpaceError> {
        let mut order = self.in_order()?.peekable();
        let Some(&(size, _)) = order.peek() else {
            return Ok(None);
        };
        let ties = order
            .take_while(|&(next, _)| next == size)
            .map(|(_, pitches)| pitches);
        Ok(Some((size, ties.collect())))
    }

    /// All lawful voicings with their sizes, in ascending order of size, then of the pitches from
    /// the bottom up; computed as they are asked for.
    ///
    /// # Errors
    /// As [`Placing::least`].
    pub fn in_order(&self) -> Result<Placings<AllowAll>, SpaceError> {
        self.in_order_where(allow_all as AllowAll)
    }

    /// The same, without the voicings in which two voices form what `allow` refuses. It is asked
    /// once both voices of a pair are set: `allow(lower voice, its pitch, upper voice, its
    /// pitch)`, voices counted from 0 at the bottom. Such bans between voices that are not
    /// neighbours (consecutives) cannot be foreseen, so this may look further for each answer.
    ///
    /// # Errors
    /// As [`Placing::least`].
    pub fn in_order_where<F>(&self, allow: F) -> Result<Placings<F>, SpaceError>
    where
        F: Fn(usize, i32, usize, i32) -> bool,
    {
        let choices = (0..self.parts.len())
            .map(|voice| self.choices(voice))
            .collect::<Result<Vec<_>, _>>()?;
        let mut placings = Placings {
            tones: self.tones(),
            choices,
            crossing: self.crossing,
            norm: self.norm,
            rest: Vec::new(),
            heap: BinaryHeap::new(),
            allow,
        };
        placings.fill()?;
        Ok(placings)
    }

    /// The tones by class, each once.
    fn tones(&self) -> Vec<Tone> {
        let mut tones: Vec<Tone> = Vec::new();
        for tone in &self.tones {
            let class = self.octave.residue(tone.class);
            match tones.iter_mut().find(|known| known.class == class) {
                Some(known) => {
                    known.at_least = known.at_least.max(tone.at_least);
                    known.at_most = known.at_most.min(tone.at_most);
                }
                None => tones.push(Tone { class, ..*tone }),
            }
        }
        tones
    }

    /// What a voice may sing, ascending, with the place of its tone and the size of its move.
    fn choices(&self, voice: usize) -> Result<Vec<Choice>, SpaceError> {
        let Some(part) = self.parts.get(voice) else {
            return Ok(Vec::new());
        };
        let from = i64::from(part.from);
        let (mut low, mut high) = match part.held {
            Some(held) => (i64::from(held), i64::from(held)),
            None => (
                i64::from(part.low).max(from - i64::from(part.leap)),
                i64::from(part.high).min(from + i64::from(part.leap)),
            ),
        };
        if !self.overlap {
            // Not beyond where the neighbours were.
            if let Some(below) = voice.checked_sub(1).and_then(|v| self.parts.get(v)) {
                low = low.max(i64::from(below.from));
            }
            if let Some(above) = self.parts.get(voice + 1) {
                high = high.min(i64::from(above.from));
            }
        }
        let tones = self.tones();
        let choice = |pitch: i64, tone| Choice {
            pitch: pitch as i32,
            tone,
            size: self.norm.of(pitch - from),
        };
        if let Some(held) = part.held {
            let class = self.octave.residue(held);
            let tone = tones.iter().position(|tone| tone.class == class);
            let lawful = low <= high;
            return Ok(lawful
                .then(|| choice(i64::from(held), tone))
                .into_iter()
                .collect());
        }
        let n = self.octave.wide();
        let mut found = Vec::new();
        for (at, tone) in tones.iter().enumerate() {
            let mut pitch = low + (i64::from(tone.class) - low).rem_euclid(n);
            while pitch <= high {
                if found.len() == MOST_PITCHES {
                    return Err(SpaceError::TooManyChoices);
                }
                found.push(choice(pitch, Some(at)));
                pitch += n;
            }
        }
        found.sort_unstable_by_key(|choice| choice.pitch);
        Ok(found)
    }
}

/// What [`Placing::in_order`] refuses: nothing.
pub type AllowAll = fn(usize, i32, usize, i32) -> bool;

const fn allow_all(_: usize, _: i32, _: usize, _: i32) -> bool {
    true
}

#[derive(Clone, Copy, Debug)]
struct Choice {
    pitch: i32,
    tone: Option<usize>,
    size: i64,
}

/// The lawful voicings of a [`Placing`] in ascending order.
#[derive(Clone, Debug)]
pub struct Placings<F> {
    tones: Vec<Tone>,
    choices: Vec<Vec<Choice>>,
    crossing: bool,
    norm: Norm,
    /// For each voice, the size of the best way on from each state before it that has one.
    rest: Vec<BTreeMap<State, i64>>,
    heap: BinaryHeap<Reverse<Beginning>>,
    allow: F,
}

/// Bound, pitches, size of them, counts of the tones. In this order ties come out sorted.
type Beginning = (i64, Vec<i32>, i64, Vec<u32>);

impl<F> Placings<F> {
    /// The state after one more voice, or `None` if it is not lawful.
    fn step(&self, (last, counts): &State, choice: Choice) -> Option<State> {
        if last.is_some_and(|last| choice.pitch < last) {
            return None;
        }
        let mut counts = counts.clone();
        if let Some(at) = choice.tone {
            let (tone, count) = (self.tones.get(at)?, counts.get_mut(at)?);
            if *count >= tone.at_most {
                return None;
            }
            // Beyond both limits the exact number does not matter.
            let unlimited = tone.at_most as usize >= self.choices.len();
            if !unlimited || *count < tone.at_least {
                *count += 1;
            }
        }
        Some(((!self.crossing).then_some(choice.pitch), counts))
    }

    fn fill(&mut self) -> Result<(), SpaceError> {
        let first: State = (None, vec![0; self.tones.len()]);
        let mut layers = vec![BTreeSet::from([first.clone()])];
        let mut states = 0;
        for choices in &self.choices {
            let mut next = BTreeSet::new();
            for state in layers.last().into_iter().flatten() {
                next.extend(
                    choices
                        .iter()
                        .filter_map(|&choice| self.step(state, choice)),
                );
                if states + next.len() > MOST_STATES {
                    return Err(SpaceError::TooManyChoices);
                }
            }
            states += next.len();
            layers.push(next);
        }
        let whole = |counts: &[u32]| {
            let tones = self.tones.iter().zip(counts);
            tones
                .into_iter()
                .all(|(tone, &count)| count >= tone.at_least)
        };
        let last = layers.pop().unwrap_or_default();
        let ends = last.into_iter().filter(|(_, counts)| whole(counts));
        let mut rest = vec![ends.map(|state| (state, 0)).collect::<BTreeMap<_, _>>()];
        for (choices, layer) in self.choices.iter().zip(layers).rev() {
            let mut here = BTreeMap::new();
            for state in layer {
                let best = choices.iter().filter_map(|&choice| {
                    let on = rest.last()?.get(&self.step(&state, choice)?)?;
                    Some(self.norm.join(choice.size, *on))
                });
                if let Some(best) = best.min() {
                    here.insert(state, best);
                }
            }
            rest.push(here);
        }
        rest.reverse();
        if let Some(&bound) = rest.first().and_then(|layer| layer.get(&first)) {
            self.heap.push(Reverse((bound, Vec::new(), 0, first.1)));
        }
        self.rest = rest;
        Ok(())
    }
}

impl<F> Iterator for Placings<F>
where
    F: Fn(usize, i32, usize, i32) -> bool,
{
    type Item = (i64, Voicing);

    fn next(&mut self) -> Option<(i64, Voicing)> {
        loop {
            let Reverse((_, pitches, size, counts)) = self.heap.pop()?;
            let voice = pitches.len();
            let Some(choices) = self.choices.get(voice) else {
                return Some((size, pitches));
            };
            let last = pitches.last().copied().filter(|_| !self.crossing);
            let state = (last, counts);
            let mut longer = Vec::new();
            for &choice in choices {
                let Some(next) = self.step(&state, choice) else {
                    continue;
                };
                let Some(&rest) = self.rest.get(voice + 1).and_then(|layer| layer.get(&next))
                else {
                    continue;
                };
                let mut below = pitches.iter().enumerate();
                if below.all(|(lower, &pitch)| (self.allow)(lower, pitch, voice, choice.pitch)) {
                    let mut pitches = pitches.clone();
                    pitches.push(choice.pitch);
                    let size = self.norm.join(size, choice.size);
                    longer.push(Reverse((self.norm.join(size, rest), pitches, size, next.1)));
                }
            }
            self.heap.extend(longer);
        }
    }
}
