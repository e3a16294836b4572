//! One sonority, and the step into it.

use partwright_score::{Interval, Pair, PairStep, Pitch, Sonority, Time, ZERO};
use partwright_space::{Family, Motion};

use super::{PairMove, Sounding};

impl<'a> Sounding<'a> {
    /// The sonority itself.
    #[must_use]
    pub fn sonority(self) -> Option<&'a Sonority> {
        self.piece.texture.sonorities().get(self.index)
    }

    /// The steps of all pairs into it that pair rules look at: both voices sound on both sides,
    /// are two voices, and end no phrase between.
    pub fn moves(self) -> impl Iterator<Item = PairMove<'a>> {
        self.piece
            .texture
            .steps(self.index)
            .filter(|(_, step)| {
                step.motion().is_some() && !step.is_one_voice() && !step.across_phrase()
            })
            .map(move |(pair, step)| PairMove {
                sounding: self,
                pair,
                step,
            })
    }

    /// The number of independent voices that sound: doublings count once.
    #[must_use]
    pub fn parts(self) -> usize {
        let texture = self.piece.texture;
        let voices = texture.sounding(self.index);
        voices
            .filter(|&v| {
                let above = texture.sounding(self.index).take_while(|&u| u < v);
                let mut doubled = above.filter_map(|u| texture.step(self.index, u, v));
                !doubled.any(PairStep::is_one_voice)
            })
            .count()
    }

    /// The highest and the lowest voice in the score that sound.
    #[must_use]
    pub fn outer(self) -> Option<Pair> {
        let mut sounding = self.piece.texture.sounding(self.index);
        let upper = sounding.next()?;
        let lower = sounding.last()?;
        Some(Pair { upper, lower })
    }

    /// The voice with the lowest note; `None` where a voice is not known.
    #[must_use]
    pub fn bass(self) -> Option<usize> {
        self.piece.texture.bass(self.piece.score, self.index)
    }

    /// Whether something is not known here: not written yet, or not readable.
    #[must_use]
    pub fn has_unknown(self) -> bool {
        self.sonority().is_some_and(|s| s.unknown != 0)
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

    /// The letters and signs of this sonority and of the one before fit into one triad or
    /// seventh chord: the chord may be the same. (Without the harmony no more can be said.)
    #[must_use]
    pub fn may_keep_chord(self) -> bool {
        let Some(before) = self.neighbour(-1) else {
            return false;
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
            let chord = [root, root + 2, root + 4, root + 6].map(|l| l % 7);
            (0..7).all(|letter| !used(letter) || chord.contains(&letter))
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
