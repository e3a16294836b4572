//! Figures of two voices that rules name: what a step is part of.

use partwright_score::{Interval, Key, Mode, Pair};
use partwright_space::Motion;

use super::{PairMove, Piece, Sounding};

fn class(interval: Option<Interval>) -> Option<i32> {
    interval.map(|i| i.size() % 7)
}

fn is_major(interval: Interval) -> bool {
    !interval.is_minor() && !interval.is_augmented() && !interval.is_diminished()
}

impl<'a> PairMove<'a> {
    /// The size of the intervals of both ends without octaves, in scale steps, where it is one.
    #[must_use]
    pub fn parallel_class(&self) -> Option<i32> {
        let same = class(self.before()) == class(self.after());
        (same && self.motion() == Some(Motion::Parallel))
            .then(|| class(self.after()))
            .flatten()
    }

    /// Parallel perfect fourths.
    #[must_use]
    pub fn goes_in_perfect_fourths(&self) -> bool {
        let perfect =
            |i: Option<Interval>| i.is_some_and(|i| !i.is_augmented() && !i.is_diminished());
        self.parallel_class() == Some(3) && perfect(self.before()) && perfect(self.after())
    }

    /// The lower of the two had the lowest note of all before, and has it now.
    #[must_use]
    pub fn stays_with_bass(&self) -> bool {
        let before = self.sounding.neighbour(-1).and_then(Sounding::bass);
        before == Some(self.foot()) && self.is_with_bass() == Some(true)
    }

    /// Contrary motion from a tenth to an octave or the like: the upper voice falls a step, the
    /// lower one rises by a leap.
    #[must_use]
    pub fn closes_on_octave_by_leap(&self) -> bool {
        let (top, foot) = (self.top(), self.foot());
        self.motion() == Some(Motion::Contrary)
            && class(self.after()) == Some(0)
            && self.sounding.family_of(self.pair).is_some()
            && !self.is_in_unison_after()
            && self.steps(top)
            && !self.rises(top)
            && self.leaps(foot)
            && self.rises(foot)
    }

    /// Two perfect intervals of different families, both voices moving against each other.
    #[must_use]
    pub fn changes_perfect_family(&self) -> bool {
        let before = self.before().and_then(|i| i.0.family());
        let after = self.sounding.family_of(self.pair);
        self.motion() == Some(Motion::Contrary)
            && before.is_some()
            && after.is_some()
            && before != after
    }

    /// The voices leap against each other into a perfect interval.
    #[must_use]
    pub fn leaps_against_into_perfect(&self) -> bool {
        self.motion() == Some(Motion::Contrary)
            && self.sounding.family_of(self.pair).is_some()
            && self.leaps(self.pair.upper)
            && self.leaps(self.pair.lower)
    }

    /// Both voices go by a whole tone, in major thirds.
    #[must_use]
    pub fn goes_in_major_thirds_by_tone(&self) -> bool {
        let tone = |voice| {
            self.moved(voice)
                .is_some_and(|i| i.size() == 1 && is_major(i))
        };
        let major = |i: Option<Interval>| i.is_some_and(is_major);
        self.parallel_class() == Some(2)
            && major(self.before())
            && major(self.after())
            && tone(self.pair.upper)
            && tone(self.pair.lower)
    }

    /// How a voice moves.
    #[must_use]
    pub fn moved(&self, voice: usize) -> Option<Interval> {
        let piece = self.sounding.piece;
        let moved = piece
            .texture
            .displacement(piece.score, self.sounding.index, voice);
        moved.map(Interval)
    }

    /// Both voices step, over thirds, fifths and octaves only, and what one sounds first is a
    /// tritone from what the other sounds next: the voice that sounds first.
    #[must_use]
    pub fn tritone_across(&self) -> Option<usize> {
        let rooted = |i| matches!(class(i), Some(0 | 2 | 4));
        let Pair { upper, lower } = self.pair;
        if !rooted(self.before()) || !rooted(self.after()) {
            return None;
        }
        if !self.steps(upper) || !self.steps(lower) {
            return None;
        }
        let before = self.sounding.neighbour(-1)?;
        let tritone = |first: usize, next: usize| {
            let (Some(a), Some(b)) = (before.pitch(first), self.sounding.pitch(next)) else {
                return false;
            };
            let gap = Interval(a.place().up_to(b.place()));
            match gap.size() % 7 {
                3 => gap.is_augmented(),
                4 => gap.is_diminished(),
                _ => false,
            }
        };
        [(lower, upper), (upper, lower)]
            .into_iter()
            .find(|&(first, next)| tritone(first, next))
            .map(|(first, _)| first)
    }

    /// One voice anticipates by a step down, off the beat, the note it strikes again on the beat;
    /// the other, no bass, passes by step downward.
    #[must_use]
    pub fn is_anticipation_at_cadence(&self) -> bool {
        let (top, foot) = (self.top(), self.foot());
        let step_down = |step: &PairMove<'_>, voice| step.steps(voice) && !step.rises(voice);
        let Some(next) = self.next() else {
            return false;
        };
        self.sounding.is_off_beat()
            && self.is_with_bass() == Some(false)
            && step_down(self, top)
            && step_down(self, foot)
            && !next.sounding.is_off_beat()
            && next
                .sounding
                .sonority()
                .is_some_and(|s| s.struck >> top & 1 == 1)
            && next.moved(top).is_some_and(|i| i.size() == 0)
            && step_down(&next, foot)
    }

    /// The fifths that an augmented sixth with a fifth makes as it opens: both voices fall a
    /// semitone, and another voice stood an augmented sixth over the lower.
    #[must_use]
    pub fn opens_augmented_sixth(&self) -> bool {
        let semitone = |voice| {
            !self.rises(voice)
                && self
                    .moved(voice)
                    .is_some_and(|i| i.size() == 1 && i.is_minor())
        };
        let Some(before) = self.sounding.neighbour(-1) else {
            return false;
        };
        let texture = self.sounding.piece.texture;
        let mut voices = texture.sounding(before.index);
        semitone(self.pair.upper)
            && semitone(self.pair.lower)
            && voices.any(|v| {
                let gap = texture.gap(before.index, v, self.foot()).map(Interval);
                gap.is_some_and(|i| i.size() % 7 == 5 && i.is_augmented())
            })
    }

    /// A second (or ninth) closes on a unison, a seventh on an octave, one voice staying: the
    /// voice that moves.
    #[must_use]
    pub fn closes_from_dissonance(&self) -> Option<usize> {
        let unison = self.is_in_unison_after() && self.before().is_some_and(|i| i.size() == 1);
        let octave = class(self.after()) == Some(0)
            && self.after().is_some_and(|i| i.size() > 0)
            && self.before().is_some_and(|i| i.size() % 7 == 6);
        let perfect = self.sounding.family_of(self.pair).is_some();
        if self.motion() != Some(Motion::Oblique) || !perfect || !(unison || octave) {
            return None;
        }
        let mut voices = [self.pair.upper, self.pair.lower].into_iter();
        voices.find(|&v| self.steps(v))
    }

    /// The note a voice leaves was struck on a beat, and no other voice of the pair struck since:
    /// neither held over nor between beats.
    #[must_use]
    pub fn leaves_struck_beat(&self, voice: usize) -> bool {
        let Some(before) = self.sounding.neighbour(-1) else {
            return false;
        };
        let struck = before
            .sonority()
            .is_some_and(|s| s.struck >> voice & 1 == 1);
        struck && !before.is_off_beat()
    }

    /// The voice came to the note it leaves by a step, and goes on the same way.
    #[must_use]
    pub fn passes_on(&self, voice: usize) -> bool {
        let Some(before) = self.sounding.neighbour(-1) else {
            return false;
        };
        let piece = self.sounding.piece;
        let came = piece.texture.displacement(piece.score, before.index, voice);
        came.is_some_and(|gap| {
            Interval(gap).size() == 1 && (gap.semitones > 0) == self.rises(voice)
        })
    }

    /// The lowest voice leaps a fourth or a fifth: the root changes, and the chord leaps with it.
    /// Where the lowest voice is not known it may.
    #[must_use]
    pub fn bass_leaps_fourth_or_fifth(&self) -> bool {
        let bass = self.sounding.bass();
        bass.is_none_or(|bass| matches!(self.size_of_move(bass), Some(3 | 4)))
    }

    /// The interval left, or the one reached, comes of a note that a figure explains: held or
    /// struck again, or passing by step.
    #[must_use]
    pub fn is_explained(&self) -> bool {
        let voices = [self.pair.upper, self.pair.lower];
        let prepared = |voice| {
            let piece = self.sounding.piece;
            let before = self.sounding.neighbour(-1);
            let came = before
                .and_then(|there| piece.texture.displacement(piece.score, there.index, voice));
            came.is_some_and(|gap| gap.semitones == 0)
        };
        let goes_on = self.next().is_some_and(|next| {
            voices
                .iter()
                .any(|&v| self.steps(v) && next.steps(v) && next.rises(v) == self.rises(v))
        });
        goes_on
            || voices
                .iter()
                .any(|&v| prepared(v) || (self.steps(v) && self.passes_on(v)))
    }

    /// It arrives on the first beat of a bar.
    #[must_use]
    pub fn is_on_downbeat(&self) -> bool {
        self.sounding.sonority().is_some_and(|s| s.level == 0)
    }

    /// It arrives in the last bar.
    #[must_use]
    pub fn is_in_last_bar(&self) -> bool {
        let bar = self.sounding.sonority().map_or(0, |s| s.bar as usize);
        bar + 1 == self.sounding.piece.score.bars.len()
    }

    /// One of the two moves, or both.
    #[must_use]
    pub fn moves(&self) -> bool {
        self.motion() != Some(Motion::Still)
    }

    /// Nothing comes after it, or nothing of the two.
    #[must_use]
    pub fn is_at_an_end(&self) -> bool {
        self.sounding.neighbour(1).is_none() || self.is_close()
    }
}

impl Sounding<'_> {
    /// One of the two is the lowest, in the score or as it sounds.
    #[must_use]
    pub fn stands_on_bass(self, pair: Pair) -> bool {
        let bass = self.bass();
        self.is_lowest_present(pair.lower) || bass == Some(pair.upper) || bass == Some(pair.lower)
    }

    /// A third voice sounds between the two, wherever it stands in the score.
    #[must_use]
    pub fn is_filled(self, pair: Pair) -> bool {
        let texture = self.piece.texture;
        // An interval is told from the lower voice in the score up.
        let over = |high: usize, low: usize| {
            let gap = texture.gap(self.index, high, low);
            gap.is_some_and(|gap| gap.semitones != 0 && (gap.semitones > 0) == (high < low))
        };
        // In score order, or crossed: of two choirs, a bass stands over the other's soprano.
        let within = |high, low, v| over(high, v) && over(v, low);
        let between =
            |v: usize| within(pair.upper, pair.lower, v) || within(pair.lower, pair.upper, v);
        let mut voices = texture.sounding(self.index);
        voices.any(|v| v != pair.upper && v != pair.lower && between(v))
    }

    /// The two have the lowest notes, a third or a second apart, the upper of them below the C
    /// that begins an octave (4 for middle C).
    #[must_use]
    pub fn crowds_below(self, pair: Pair, octave: i32) -> bool {
        let close = self.interval_of(pair).map(Interval::size);
        if !matches!(close, Some(1 | 2)) {
            return false;
        }
        let heights = [pair.upper, pair.lower].map(|v| self.pitch(v).map(|p| p.place()));
        let [Some(a), Some(b)] = heights else {
            return false;
        };
        let highest = a.semitone.max(b.semitone);
        let others = self.piece.texture.sounding(self.index);
        let lowest = others
            .filter(|&v| v != pair.upper && v != pair.lower)
            .filter_map(|v| self.pitch(v))
            .all(|p| p.place().semitone > highest);
        lowest && a.step.max(b.step) < octave * 7
    }
}

impl Piece<'_> {
    /// Voices have species of their own.
    #[must_use]
    pub fn has_species_of_voices(self) -> bool {
        self.score.voices.iter().any(|v| v.species.is_some())
    }

    /// The key stated is minor, or a mode with a minor third.
    #[must_use]
    pub fn is_minor_at(self, there: Sounding<'_>) -> bool {
        let mut keys = self.score.keys.iter().rev();
        let stated = keys.find(|change| change.from <= there.onset());
        stated.is_some_and(|change| match change.value {
            Key::Of { mode, .. } => matches!(
                mode,
                Mode::Minor | Mode::Dorian | Mode::Phrygian | Mode::Aeolian | Mode::Locrian
            ),
            Key::None => false,
        })
    }

    /// Of the downbeats inside a piece in two parts, between its first bar and its last, how many
    /// are perfect intervals, and how many there are.
    #[must_use]
    pub fn perfect_downbeats(self, pair: Pair) -> (usize, usize) {
        let last = self.score.bars.len().saturating_sub(1);
        let inside = self.soundings().filter(|there| {
            there
                .sonority()
                .is_some_and(|s| s.level == 0 && s.bar > 0 && (s.bar as usize) < last)
                && there.interval_of(pair).is_some()
        });
        inside.fold((0, 0), |(perfect, all), there| {
            (
                perfect + usize::from(there.family_of(pair).is_some()),
                all + 1,
            )
        })
    }
}
