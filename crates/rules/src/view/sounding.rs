//! One sonority, and the step into it.

use partwright_score::{Interval, Metre, Note, Pair, Pitch, Sonority, Time, ZERO};
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
    /// are two voices of which none only doubles another, and end no phrase between, unless a
    /// house style looks across phrases.
    pub fn moves(self, across_phrases: bool) -> impl Iterator<Item = PairMove<'a>> {
        let followers = self.sonority().map_or(0, |s| s.followers);
        self.piece
            .texture
            .steps(self.index)
            .filter(move |(pair, step)| {
                followers >> pair.upper & 1 == 0
                    && followers >> pair.lower & 1 == 0
                    && step.motion().is_some()
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
        self.sonority()
            .map_or(0, |s| (s.sounding | s.unknown) & !s.followers)
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

    /// Two neighbours above the lowest voice in the score stand further apart than a number of
    /// scale steps.
    #[must_use]
    pub fn has_wide_neighbours(self, steps: i32) -> bool {
        let pairs = self.piece.texture.pairs().iter();
        let lowest = self.outer().map(|outer| outer.lower);
        pairs
            .filter(|&&pair| Some(pair.lower) != lowest && self.are_neighbours(pair))
            .any(|&pair| self.is_wider_than(pair, steps))
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

    /// The lowest voice leaps a fifth or an octave into it, and the highest in the score moves by
    /// step.
    #[must_use]
    pub fn bass_leaps_under_step(self) -> bool {
        let moved = |voice| {
            let gap = self
                .piece
                .texture
                .displacement(self.piece.score, self.index, voice)?;
            Some(Interval(gap).size())
        };
        let top = self.outer().and_then(|outer| moved(outer.upper));
        top == Some(1) && matches!(self.bass().and_then(moved), Some(4 | 7))
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

    /// So many voices sound at least, all of them in unisons and octaves.
    #[must_use]
    pub fn is_all_in_octaves(self, voices: usize) -> bool {
        let texture = self.piece.texture;
        let sounding: Vec<usize> = texture.sounding(self.index).collect();
        let Some((&first, others)) = sounding.split_first() else {
            return false;
        };
        let octave = |&v: &usize| {
            let gap = texture.gap(self.index, first, v);
            gap.and_then(|g| g.family()) == Some(Family::Octave)
        };
        sounding.len() >= voices && others.iter().all(octave)
    }

    /// It belongs to a passage of at least three sonorities in which all that sound, so many
    /// voices at least, go in octaves.
    #[must_use]
    pub fn is_in_octave_passage(self, voices: usize) -> bool {
        let octaves = |by| {
            self.neighbour(by)
                .is_some_and(|there| there.is_all_in_octaves(voices))
        };
        self.is_all_in_octaves(voices) && octaves(-1) && (octaves(-2) || octaves(1))
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

    /// The letters and signs of this sonority and of the one before fit into one chord, so that
    /// the chord may be the same: a seventh chord in three parts and more, a triad in two. One
    /// voice alone makes none. (Without the harmony no more can be said.)
    #[must_use]
    pub fn may_keep_chord(self) -> bool {
        match self.parts() {
            ..=1 => false,
            2 => self.fits_one_chord(3),
            _ => self.fits_one_chord(4),
        }
    }

    /// The chord may be the one before, or but for what passes between the beats the one of the beat
    /// before.
    #[must_use]
    pub fn may_only_change_position(self) -> bool {
        self.may_keep_chord() || self.may_keep_chord_since_beat()
    }

    /// It comes on a beat after ornaments between beats, each reached by step, and the chord may be
    /// the one of the beat before.
    fn may_keep_chord_since_beat(self) -> bool {
        if self.is_off_beat() || self.parts() < 3 {
            return false;
        }
        let texture = self.piece.texture;
        let ornamental = |there: &Sounding<'_>| {
            texture.sounding(there.index).all(|voice| {
                let moved = texture.displacement(self.piece.score, there.index, voice);
                moved.is_some_and(|gap| Interval(gap).size() <= 1)
            })
        };
        let mut there = self;
        while let Some(before) = there.neighbour(-1) {
            if !before.is_off_beat() {
                return there.index < self.index && self.fits_one_chord_with(before, 4);
            }
            if !ornamental(&before) {
                return false;
            }
            there = before;
        }
        false
    }

    /// This sonority and the one before fit into one chord of so many notes, a third apart; two
    /// whole major or minor triads on different roots never do.
    #[must_use]
    pub fn fits_one_chord(self, notes: usize) -> bool {
        self.neighbour(-1)
            .is_some_and(|before| self.fits_one_chord_with(before, notes))
    }

    /// The same with another sonority.
    fn fits_one_chord_with(self, before: Sounding<'_>, notes: usize) -> bool {
        let (mut signs, mut letters) = ([None; 7], [0_u8; 2]);
        for (there, letters) in [before, self].into_iter().zip(&mut letters) {
            for voice in there.piece.texture.sounding(there.index) {
                let Some(pitch) = there.pitch(voice) else {
                    continue;
                };
                *letters |= 1 << pitch.letter();
                let Some(slot) = signs.get_mut(usize::from(pitch.letter())) else {
                    continue;
                };
                if slot
                    .replace(pitch.sign)
                    .is_some_and(|sign: i8| sign != pitch.sign)
                {
                    return false;
                }
            }
        }
        let chord = |root: usize, notes: usize| -> u8 {
            (0..notes).map(|third| 1 << ((root + 2 * third) % 7)).sum()
        };
        // A diminished triad may be the upper part of a dominant seventh: it tells nothing.
        let is_diminished = |root: usize| {
            let class = |letter: usize| {
                let sign = signs.get(letter % 7).copied().flatten().unwrap_or(0);
                let step = i16::try_from(letter).unwrap_or(0);
                Pitch { step, sign }.place().semitone
            };
            (class((root + 4) % 7) - class(root)).rem_euclid(12) == 6
        };
        let triad_of =
            |letters: u8| (0..7).find(|&root| chord(root, 3) == letters && !is_diminished(root));
        let [left, reached] = letters;
        if let (Some(a), Some(b)) = (triad_of(left), triad_of(reached)) {
            return a == b;
        }
        (0..7).any(|root| (left | reached) & !chord(root, notes) == 0)
    }

    /// The pitch a voice sounds here.
    #[must_use]
    pub fn pitch(self, voice: usize) -> Option<Pitch> {
        self.piece
            .texture
            .pitch(self.piece.score, self.index, voice)
    }

    /// Three voices or more sound nothing but perfect fifths and octaves over the lowest, for a
    /// beat at least.
    #[must_use]
    pub fn lacks_third(self) -> bool {
        let Some(bass) = self.bass().filter(|_| self.parts() >= 3) else {
            return false;
        };
        let texture = self.piece.texture;
        let is_perfect = |v| {
            let family = texture
                .gap(self.index, v, bass)
                .and_then(|gap| gap.family());
            v == bass || family.is_some()
        };
        let lasts = self.piece.end_of(self.index) - self.onset();
        texture.sounding(self.index).all(is_perfect)
            && self.cell().is_some_and(|cell| lasts >= cell)
    }

    /// Two voices arrive by steps in contrary motion on an octave or a unison, as at a close.
    #[must_use]
    pub fn closes_by_steps(self) -> bool {
        self.moves(false).any(|step| step.closes_by_steps())
    }

    /// The same, this voice one of the two.
    #[must_use]
    pub fn closes_by_steps_in(self, voice: usize) -> bool {
        let own = |step: &PairMove<'_>| step.pair.upper == voice || step.pair.lower == voice;
        self.moves(false)
            .any(|step| own(&step) && step.closes_by_steps())
    }

    /// It begins a bar or a half of one.
    #[must_use]
    pub fn is_strong(self) -> bool {
        self.sonority().is_some_and(|s| s.level <= 1)
    }

    /// A voice enters with it after silence, or ends its phrase or falls silent after it.
    #[must_use]
    pub fn opens_or_closes(self) -> bool {
        let texture = self.piece.texture;
        let next = texture.sonorities().get(self.index + 1);
        let is_last = next.is_none_or(|s| s.sounding == 0 || s.new_section);
        is_last
            || texture.sounding(self.index).any(|v| {
                let notes = self.piece.score.voices.get(v).map(|voice| &voice.notes);
                let (Some(notes), Some(n)) = (notes, texture.note(self.index, v)) else {
                    return false;
                };
                let sounds = |n: Option<usize>| {
                    let note = n.and_then(|n| notes.get(n));
                    note.is_some_and(|note| note.sound.pitch().is_some())
                };
                let ends = notes.get(n).is_some_and(Note::ends_phrase);
                ends || !sounds(n.checked_sub(1)) || !sounds(Some(n + 1))
            })
    }

    /// When it begins.
    #[must_use]
    pub fn onset(self) -> Time {
        self.sonority().map_or(ZERO, |s| s.onset)
    }

    fn metre(self) -> Option<&'a Metre> {
        let score = self.piece.score;
        let bar = score.bars.get(self.sonority()?.bar as usize)?;
        score.metres.get(bar.metre as usize)
    }

    /// The length of a beat's cell, in whole notes.
    #[must_use]
    pub fn cell(self) -> Option<Time> {
        Some(self.metre()?.cell())
    }

    /// It begins between beats.
    #[must_use]
    pub fn is_off_beat(self) -> bool {
        let metre = self.sonority().zip(self.metre());
        metre.is_some_and(|(sonority, metre)| sonority.level > metre.beat_level())
    }
}

impl PairMove<'_> {
    /// By steps in contrary motion into an octave or a unison.
    fn closes_by_steps(&self) -> bool {
        self.motion() == Some(Motion::Contrary)
            && self.after().and_then(|i| i.0.family()) == Some(Family::Octave)
            && self.steps(self.pair.upper)
            && self.steps(self.pair.lower)
    }
}
