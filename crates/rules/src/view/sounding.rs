//! One sonority, and the step into it.

use partwright_score::{Interval, Pair, Pitch, Sonority, Time, ZERO};
use partwright_space::{Family, Motion};

use super::{PairMove, Sounding};

/// The voices above one in the score, a bit each.
const fn above(voice: usize) -> u64 {
    if voice >= 64 {
        u64::MAX
    } else {
        (1 << voice) - 1
    }
}

impl<'a> Sounding<'a> {
    /// The sonority itself.
    #[must_use]
    pub fn sonority(self) -> Option<&'a Sonority> {
        self.piece.texture.sonorities().get(self.index)
    }

    /// The steps of all pairs into it that pair rules look at: both voices sound on both sides,
    /// are two voices, and end no phrase between, unless a house style looks across phrases.
    pub fn moves(self, across_phrases: bool) -> impl Iterator<Item = PairMove<'a>> {
        self.piece
            .texture
            .steps(self.index)
            .filter(move |(_, step)| {
                step.motion().is_some()
                    && !step.is_one_voice()
                    && (across_phrases || !step.across_phrase())
            })
            .map(move |(pair, step)| PairMove {
                sounding: self,
                pair,
                step,
            })
    }

    /// The voices that sound or of which nothing is known, a bit each: a voice not written yet
    /// may turn out to sound.
    fn present(self) -> u64 {
        self.sonority().map_or(0, |s| s.sounding | s.unknown)
    }

    /// The number of independent voices: doublings count once, voices not written yet count.
    #[must_use]
    pub fn parts(self) -> usize {
        self.sonority().map_or(0, |s| usize::from(s.parts))
    }

    /// The highest and the lowest voice in the score that sound, or may.
    #[must_use]
    pub fn outer(self) -> Option<Pair> {
        let present = self.present();
        let upper = present.trailing_zeros() as usize;
        let lower = 63_usize.checked_sub(present.leading_zeros() as usize)?;
        (upper < lower).then_some(Pair { upper, lower })
    }

    /// No voice that sounds, or may, stands between the two in the score.
    #[must_use]
    pub fn are_neighbours(self, pair: Pair) -> bool {
        self.present() & above(pair.lower) & !above(pair.upper + 1) == 0
    }

    /// No voice that sounds, or may, stands below this one in the score.
    #[must_use]
    pub fn is_lowest_present(self, voice: usize) -> bool {
        self.outer().is_some_and(|outer| outer.lower == voice)
    }

    /// The pair is the first and the third of the voices in the score that sound, or may.
    #[must_use]
    pub fn are_first_and_third(self, pair: Pair) -> bool {
        let present = self.present();
        let over = |voice| (present & above(voice)).count_ones();
        over(pair.upper) == 0 && over(pair.lower) == 2
    }

    /// Two voices stand further apart than a number of scale steps.
    #[must_use]
    pub fn is_wider_than(self, pair: Pair, steps: i32) -> bool {
        let gap = self.piece.texture.gap(self.index, pair.upper, pair.lower);
        gap.is_some_and(|gap| Interval(gap).size() > steps)
    }

    /// Every voice sounds on both sides of the step, moves, and all move the same way: whether
    /// upward. `None` otherwise, and across the end of a phrase.
    #[must_use]
    pub fn all_move_one_way(self) -> Option<bool> {
        let texture = self.piece.texture;
        if self.sonority()?.unknown != 0
            || texture
                .steps(self.index)
                .any(|(_, step)| step.across_phrase())
        {
            return None;
        }
        let mut ways = texture.sounding(self.index).map(|voice| {
            let moved = texture.displacement(self.piece.score, self.index, voice)?;
            (moved.semitones != 0).then_some(moved.semitones > 0)
        });
        let first = ways.next()??;
        ways.all(|way| way == Some(first)).then_some(first)
    }

    /// The voices go in sixth chords: over the lowest a third and a sixth, before and after.
    #[must_use]
    pub fn goes_in_sixth_chords(self) -> bool {
        let sixth_chord = |there: Sounding<'_>| {
            let Some(bass) = there.bass() else {
                return false;
            };
            let texture = there.piece.texture;
            let sizes: Vec<Option<i32>> = texture
                .sounding(there.index)
                .filter(|&v| v != bass)
                .map(|v| {
                    texture
                        .gap(there.index, v, bass)
                        .map(|gap| Interval(gap).size() % 7)
                })
                .collect();
            sizes.contains(&Some(2))
                && sizes.contains(&Some(5))
                && sizes.iter().all(|size| matches!(size, Some(0 | 2 | 5)))
        };
        sixth_chord(self) && self.neighbour(-1).is_some_and(sixth_chord)
    }

    /// The voice with the lowest note; `None` where a voice is not known.
    #[must_use]
    pub fn bass(self) -> Option<usize> {
        self.piece.texture.bass(self.index)
    }

    /// At least three voices sound, all of them in unisons and octaves.
    #[must_use]
    pub fn is_all_in_octaves(self) -> bool {
        let texture = self.piece.texture;
        let voices: Vec<usize> = texture.sounding(self.index).collect();
        let Some((&first, others)) = voices.split_first() else {
            return false;
        };
        let octave = |&v: &usize| {
            let gap = texture.gap(self.index, first, v);
            gap.and_then(|g| g.family()) == Some(Family::Octave)
        };
        others.len() >= 2 && others.iter().all(octave)
    }

    /// It belongs to a passage of at least three sonorities that are all in octaves.
    #[must_use]
    pub fn is_in_octave_passage(self) -> bool {
        let octaves = |by| self.neighbour(by).is_some_and(Sounding::is_all_in_octaves);
        self.is_all_in_octaves() && octaves(-1) && (octaves(-2) || octaves(1))
    }

    /// A voice goes in parallel thirds or sixths (or tenths, thirteenths) with the bass.
    #[must_use]
    pub fn goes_in_thirds_or_sixths_with_bass(self, voice: usize) -> bool {
        let step = self
            .bass()
            .and_then(|bass| self.piece.texture.step(self.index, voice, bass));
        step.is_some_and(|step| {
            step.motion() == Some(Motion::Parallel)
                && step
                    .after()
                    .is_some_and(|gap| matches!(Interval(gap).size() % 7, 2 | 5))
        })
    }

    /// The sonority before, or after.
    #[must_use]
    pub fn neighbour(self, by: isize) -> Option<Sounding<'a>> {
        let index = self.index.checked_add_signed(by)?;
        let there = Sounding { index, ..self };
        there.sonority().map(|_| there)
    }

    /// It is the last new sonority before a final `||`.
    #[must_use]
    pub fn is_close(self) -> bool {
        let closed = self
            .piece
            .score
            .bars
            .last()
            .is_some_and(|bar| bar.section_end);
        let strikes_later = || {
            let later = self.piece.texture.sonorities().iter().skip(self.index + 1);
            later.into_iter().any(|s| s.struck != 0)
        };
        closed && !strikes_later()
    }

    /// The letters and signs of this sonority and of the one before fit into one chord, so that
    /// the chord may be the same: a seventh chord in three parts and more, a triad in two. One
    /// voice alone makes none. (Without the harmony no more can be said.)
    #[must_use]
    pub fn may_keep_chord(self) -> bool {
        let Some(before) = self.neighbour(-1) else {
            return false;
        };
        let thirds = match self.parts() {
            ..=1 => return false,
            2 => 3,
            _ => 4,
        };
        let mut signs: [Option<i8>; 7] = [None; 7];
        for there in [before, self] {
            for voice in there.piece.texture.sounding(there.index) {
                let Some(pitch) = there.pitch(voice) else {
                    continue;
                };
                let Some(slot) = signs.get_mut(usize::from(pitch.letter())) else {
                    continue;
                };
                if slot
                    .replace(pitch.sign)
                    .is_some_and(|sign| sign != pitch.sign)
                {
                    return false;
                }
            }
        }
        let used = |letter: usize| signs.get(letter % 7).is_some_and(Option::is_some);
        (0..7).any(|root| {
            let of_chord = |letter| (0..thirds).any(|third| (root + 2 * third) % 7 == letter);
            (0..7).all(|letter| !used(letter) || of_chord(letter))
        })
    }

    /// The pitch a voice sounds here.
    #[must_use]
    pub fn pitch(self, voice: usize) -> Option<Pitch> {
        self.piece
            .texture
            .pitch(self.piece.score, self.index, voice)
    }

    /// When it begins.
    #[must_use]
    pub fn onset(self) -> Time {
        self.sonority().map_or(ZERO, |s| s.onset)
    }

    /// It begins between beats.
    #[must_use]
    pub fn is_off_beat(self) -> bool {
        let score = self.piece.score;
        let beat = |s: &Sonority| {
            let metre = score
                .metres
                .get(score.bars.get(s.bar as usize)?.metre as usize)?;
            Some(metre.beat_level())
        };
        self.sonority()
            .is_some_and(|s| beat(s).is_some_and(|level| s.level > level))
    }
}
