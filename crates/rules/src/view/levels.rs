//! Successions at a level of the bar: from downbeat to downbeat, from off-beat to off-beat, from
//! beat to beat, whatever stands between.

use std::iter::successors;

use partwright_score::{Interval, Pair, Time, ZERO};
use partwright_space::{Consecutive, Family, Leg, Motion};

use super::{PairMove, Piece, Sounding};

/// Further apart than so many sonorities, two moments are not heard together; it also keeps
/// every look back short.
const FAR: usize = 64;

/// Two moments of one pair of voices, with notes of theirs between.
#[derive(Clone, Copy)]
pub struct Succession<'a> {
    /// The step into the later moment.
    pub step: PairMove<'a>,
    /// What sounds at the earlier one.
    pub from: Sounding<'a>,
    leg: Leg,
}

/// Which moments are compared.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Level {
    /// Every note.
    Notes,
    /// The first beats of bars.
    Downbeats,
    /// The same place off the first beat in successive bars.
    OffBeats,
}

/// Parallel thirds (tenths) or sixths, one after another.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct ParallelRun {
    /// Sixths, else thirds.
    pub sixths: bool,
    /// How many there are.
    pub intervals: i32,
    /// How many of them begin on a beat.
    pub on_beats: i32,
    /// Where the first begins.
    pub from: Time,
    /// Where the last ends.
    pub until: Time,
}

impl<'a> PairMove<'a> {
    /// The same pair some sonorities earlier, if both sound all the way and end no phrase.
    fn since(&self, from: usize) -> Option<Succession<'a>> {
        let to = self.sounding;
        if to.index <= from || to.index - from > FAR {
            return None;
        }
        let joined = (from + 1..=to.index).all(|k| {
            let step = to.piece.texture.step(k, self.pair.upper, self.pair.lower);
            step.is_some_and(|s| s.motion().is_some() && !s.across_phrase())
        });
        let from = Sounding { index: from, ..to };
        let ends = |voice| Some((from.pitch(voice)?.place(), to.pitch(voice)?.place()));
        let leg = Leg {
            lower: ends(self.pair.lower)?,
            upper: ends(self.pair.upper)?,
        };
        let step = *self;
        joined.then_some(Succession { step, from, leg })
    }

    /// One of the two, or both, move into a sonority.
    fn moves_into(&self, sonority: usize) -> bool {
        let texture = self.sounding.piece.texture;
        let step = texture.step(sonority, self.pair.upper, self.pair.lower);
        step.is_some_and(|s| s.motion() != Some(Motion::Still))
    }

    /// Both voices strike a note at the arrival.
    #[must_use]
    pub fn both_strike(&self) -> bool {
        let both = 1 << self.pair.upper | 1 << self.pair.lower;
        self.sounding
            .sonority()
            .is_some_and(|s| s.struck & both == both)
    }

    /// How far the arrival is into its bar, and where the bar before begins; both bars whole.
    fn in_bar(&self) -> Option<(Time, Time)> {
        let (sonority, score) = (self.sounding.sonority()?, self.sounding.piece.score);
        let bar = sonority.bar as usize;
        let (this, before) = (score.bars.get(bar)?, score.bars.get(bar.checked_sub(1)?)?);
        let whole = this.lead == ZERO && before.lead == ZERO;
        whole.then_some((sonority.onset - this.onset, before.onset))
    }

    /// From the downbeat before to the downbeat this step arrives on.
    #[must_use]
    pub fn from_downbeat(&self) -> Option<Succession<'a>> {
        let (offset, before) = self.in_bar()?;
        let from = self.sounding.piece.texture.sounding_at(before)?;
        (offset == ZERO).then(|| self.since(from)).flatten()
    }

    /// From the same place in the bar before to this one off the first beat, a voice moving into
    /// both.
    #[must_use]
    pub fn from_off_beat(&self) -> Option<Succession<'a>> {
        let (offset, before) = self.in_bar()?;
        let from = self.sounding.piece.texture.at(before + offset)?;
        let moves = self.moves() && self.moves_into(from);
        (offset > ZERO && moves).then(|| self.since(from)).flatten()
    }

    /// From the beat before to the beat this step arrives on, with notes of the two between.
    #[must_use]
    pub fn from_beat(&self) -> Option<Succession<'a>> {
        if self.sounding.is_off_beat() {
            return None;
        }
        let back = |there: &Sounding<'a>| there.neighbour(-1);
        let from = successors(back(&self.sounding), back)
            .take(FAR)
            .find(|there| !there.is_off_beat())?;
        let succession = self.since(from.index)?;
        succession.has_notes_between().then_some(succession)
    }

    /// Into a downbeat on a perfect interval: the last place after the first beat of the bar
    /// before from which it comes in parallel, with a note of the two between.
    #[must_use]
    pub fn from_late_in_bar(&self) -> Option<Succession<'a>> {
        let (offset, before) = self.in_bar()?;
        self.sounding.family_of(self.pair)?;
        if offset != ZERO {
            return None;
        }
        let back = |there: &Sounding<'a>| there.neighbour(-1);
        let mut earlier = successors(back(&self.sounding), back)
            .take(FAR)
            .take_while(|there| there.onset() > before);
        let family = self.sounding.family_of(self.pair);
        let from = earlier.find(|there| {
            there.family_of(self.pair) == family
                && self
                    .leg_from(*there)
                    .is_some_and(|leg| matches!(leg.consecutive(), Some(Consecutive::Same(_))))
        })?;
        let succession = self.since(from.index)?;
        succession.has_notes_between().then_some(succession)
    }

    fn leg_from(&self, from: Sounding<'a>) -> Option<Leg> {
        let ends = |voice| {
            Some((
                from.pitch(voice)?.place(),
                self.sounding.pitch(voice)?.place(),
            ))
        };
        Some(Leg {
            lower: ends(self.pair.lower)?,
            upper: ends(self.pair.upper)?,
        })
    }

    /// One voice resolves by step downward a note held over a stronger moment, at which the other
    /// moved: from before that moment to the resolution.
    #[must_use]
    pub fn over_suspension(&self) -> Option<Succession<'a>> {
        if self.motion() != Some(Motion::Oblique) {
            return None;
        }
        let (held, other) = [
            (self.pair.upper, self.pair.lower),
            (self.pair.lower, self.pair.upper),
        ]
        .into_iter()
        .find(|&(held, _)| self.steps(held) && !self.rises(held))?;
        let here = self.sounding;
        let meeting = (here.index.saturating_sub(FAR)..here.index)
            .rev()
            .find(|&k| self.moves_into(k))?;
        let there = Sounding {
            index: meeting,
            ..here
        };
        let (strong, weak) = (there.sonority()?, here.sonority()?);
        let tied = strong.struck >> held & 1 == 0 && strong.struck >> other & 1 == 1;
        let suspended = tied && strong.level < weak.level;
        let from = meeting.checked_sub(1)?;
        suspended.then(|| self.since(from)).flatten()
    }
}

impl<'a> Succession<'a> {
    /// What the two moments do with the perfect intervals, as if nothing stood between; a mere
    /// change of octave does nothing.
    #[must_use]
    pub fn same_perfect(&self) -> Option<Family> {
        match self.leg.consecutive() {
            Some(Consecutive::Same(family)) if !self.leg.keeps_classes() => Some(family),
            _ => None,
        }
    }

    /// One of the two strikes a note between the two moments, and moves to it.
    #[must_use]
    pub fn has_notes_between(&self) -> bool {
        (self.from.index + 1..self.step.sounding.index).any(|k| self.step.moves_into(k))
    }

    /// One of the two leaps a fourth or more on its way, before the later moment.
    #[must_use]
    pub fn leaps_between(&self) -> bool {
        let piece = self.from.piece;
        let voices = [self.step.pair.upper, self.step.pair.lower];
        (self.from.index + 1..self.step.sounding.index).any(|k| {
            voices.iter().any(|&voice| {
                let moved = piece.texture.displacement(piece.score, k, voice);
                moved.is_some_and(|gap| Interval(gap).size() >= 3)
            })
        })
    }

    /// The voice that moves into the later moment came to the earlier one from the other side.
    #[must_use]
    pub fn turns(&self) -> bool {
        let piece = self.from.piece;
        let voices = [self.step.pair.upper, self.step.pair.lower];
        let moved = |there: Sounding<'_>, voice| {
            let moved = piece.texture.displacement(piece.score, there.index, voice);
            moved
                .map(|gap| gap.semitones.signum())
                .filter(|&way| way != 0)
        };
        voices.iter().any(|&voice| {
            match (moved(self.from, voice), moved(self.step.sounding, voice)) {
                (Some(first), Some(second)) => first != second,
                _ => false,
            }
        })
    }

    /// The earlier moment lies in the first half of its bar.
    #[must_use]
    pub fn starts_early_in_bar(&self) -> bool {
        let (at, score) = (self.from.onset(), self.from.piece.score);
        let bar = score.bar_at(at).and_then(|i| score.bars.get(i));
        bar.is_some_and(|bar| (at - bar.onset) * 2 < bar.length)
    }

    /// `fifths` or `octaves`; `unisons` where the two end on one pitch.
    #[must_use]
    pub fn noun(&self) -> &'static str {
        match self.same_perfect() {
            Some(Family::Fifth) => "fifths",
            _ if self.step.is_in_unison_after() => "unisons",
            _ => "octaves",
        }
    }

    /// `soprano and bass go from D5 over G3 to E5 over A3`, with what stands between left out.
    #[must_use]
    pub fn story(&self) -> String {
        let Pair { upper, lower } = self.step.pair;
        let under = self.leg.before().semitones < 0;
        format!(
            "{} go from {} {} {} to {}",
            self.step.names(),
            self.from.pitch_text(upper),
            if under { "under" } else { "over" },
            self.from.pitch_text(lower),
            self.step.ends().1
        )
    }

    /// When the note a voice sounds at the earlier moment was struck.
    #[must_use]
    pub fn struck_at(&self, voice: usize) -> Time {
        let piece = self.from.piece;
        let note = piece.texture.note(self.from.index, voice);
        let note = note.and_then(|n| piece.score.voices.get(voice)?.notes.get(n));
        note.map_or(self.from.onset(), |n| n.onset)
    }

    /// Both voices move in parallel from a third or sixth to another: whether sixths.
    fn parallel_imperfect(&self) -> Option<bool> {
        let (before, after) = (Interval(self.leg.before()), Interval(self.leg.after()));
        if self.leg.motion() != Motion::Parallel || before.size() % 7 != after.size() % 7 {
            return None;
        }
        match after.size() % 7 {
            2 => Some(false),
            5 => Some(true),
            _ => None,
        }
    }
}

impl<'a> Piece<'a> {
    /// Runs of parallel thirds or sixths of a pair, at a level.
    #[must_use]
    pub fn parallel_runs(self, pair: Pair, level: Level) -> Vec<ParallelRun> {
        let mut runs: Vec<ParallelRun> = Vec::new();
        // The sonority at which the last run stands, as long as it may go on.
        let mut open: Option<usize> = None;
        for there in self.soundings() {
            let step = self.texture.step(there.index, pair.upper, pair.lower);
            let Some(step) = step.filter(|s| s.motion().is_some() && !s.is_one_voice()) else {
                continue;
            };
            let step = PairMove {
                sounding: there,
                pair,
                step,
            };
            let succession = match level {
                Level::Notes if step.motion() == Some(Motion::Still) => {
                    if let (Some(run), Some(at)) = (runs.last_mut(), &mut open)
                        && *at + 1 == there.index
                        && !step.step.across_phrase()
                    {
                        (run.until, *at) = (self.end_of(there.index), there.index);
                    }
                    continue;
                }
                Level::Notes => there.index.checked_sub(1).and_then(|k| step.since(k)),
                Level::Downbeats => step.from_downbeat(),
                Level::OffBeats => step.from_off_beat(),
            };
            let Some(succession) = succession else {
                continue;
            };
            let Some(sixths) = succession.parallel_imperfect() else {
                continue;
            };
            let until = self.end_of(there.index);
            let on_beat = |there: Sounding<'_>| i32::from(!there.is_off_beat());
            match runs.last_mut() {
                Some(run) if open == Some(succession.from.index) && run.sixths == sixths => {
                    run.intervals += 1;
                    run.on_beats += on_beat(there);
                    run.until = until;
                }
                _ => runs.push(ParallelRun {
                    sixths,
                    intervals: 2,
                    on_beats: on_beat(succession.from) + on_beat(there),
                    from: succession.from.onset(),
                    until,
                }),
            }
            open = Some(there.index);
        }
        runs
    }
}
