//! One pair of voices and its step.

use partwright_score::{Interval, Time, ZERO};
use partwright_space::{Consecutive, Family, Motion, Way};

use super::{PairMove, Sounding};
use crate::rule::Case;

/// How a perfect interval reached in similar motion stands in the texture.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Direct {
    /// In two parts, the upper voice leaping.
    TwoParts,
    /// In two parts, the upper voice moving by step.
    TwoPartsStep,
    /// In three parts, between the outer voices, the upper one leaping.
    ThreeOuter,
    /// In three parts, between voices not both outer, the upper one leaping.
    ThreeInner,
    /// In four or more parts, between the outer voices, the upper one leaping.
    Outer,
    /// A step in the upper voice or the other voices cover it.
    Covered,
}

impl<'a> PairMove<'a> {
    /// How the pair moves.
    #[must_use]
    pub fn motion(&self) -> Option<Motion> {
        self.step.motion()
    }

    /// What the step does with the perfect intervals.
    #[must_use]
    pub fn consecutive(&self) -> Option<Consecutive> {
        self.step.consecutive()
    }

    /// The interval left.
    #[must_use]
    pub fn before(&self) -> Option<Interval> {
        self.step.before().map(Interval)
    }

    /// The interval reached.
    #[must_use]
    pub fn after(&self) -> Option<Interval> {
        self.step.after().map(Interval)
    }

    /// When the pair arrives.
    #[must_use]
    pub fn arrival(&self) -> Time {
        self.sounding.onset()
    }

    /// When a voice struck the note it leaves; of a repeated note, its first stroke.
    #[must_use]
    pub fn left_at(&self, voice: usize) -> Time {
        let piece = self.sounding.piece;
        let before = self.sounding.index.checked_sub(1);
        let mut note = before
            .and_then(|k| piece.texture.note(k, voice))
            .unwrap_or(0);
        let notes = piece.score.voices.get(voice).map_or(&[][..], |v| &v.notes);
        let sound = |i: usize| notes.get(i).map(|n| n.sound);
        while note > 0 && sound(note - 1) == sound(note) {
            note -= 1;
        }
        notes.get(note).map_or(ZERO, |n| n.onset)
    }

    /// The voice that sounds higher at the arrival; on a unison, the upper in the score.
    #[must_use]
    pub fn top(&self) -> usize {
        if self.step.is_crossed() {
            self.pair.lower
        } else {
            self.pair.upper
        }
    }

    /// The voice that sounds lower at the arrival.
    #[must_use]
    pub fn foot(&self) -> usize {
        if self.step.is_crossed() {
            self.pair.upper
        } else {
            self.pair.lower
        }
    }

    /// A voice moves by a step of the scale.
    #[must_use]
    pub fn steps(&self, voice: usize) -> bool {
        self.size_of_move(voice) == Some(1)
    }

    /// A voice leaps: a third or more.
    #[must_use]
    pub fn leaps(&self, voice: usize) -> bool {
        self.size_of_move(voice).is_some_and(|size| size >= 2)
    }

    /// Scale steps a voice moves, without direction.
    #[must_use]
    pub fn size_of_move(&self, voice: usize) -> Option<i32> {
        let piece = self.sounding.piece;
        let moved = piece
            .texture
            .displacement(piece.score, self.sounding.index, voice)?;
        Some(Interval(moved).size())
    }

    /// A voice moves up.
    #[must_use]
    pub fn rises(&self, voice: usize) -> bool {
        let piece = self.sounding.piece;
        let moved = piece
            .texture
            .displacement(piece.score, self.sounding.index, voice);
        moved.is_some_and(|gap| gap.semitones > 0)
    }

    /// The pair is the outermost that sounds: the highest and the lowest note, since voices cross
    /// and a fifth or sixth voice may stand anywhere in the score. Where a voice is not written
    /// yet, the outermost in the score.
    #[must_use]
    pub fn is_outer(&self) -> bool {
        let there = self.sounding;
        if there.sonority().is_none_or(|s| s.unknown != 0) {
            return there.outer() == Some(self.pair);
        }
        let height = |&v: &usize| there.pitch(v).map(|p| p.place().semitone);
        // Of voices in unison the one further out in the score.
        let voices = there.piece.texture.sounding(there.index);
        let highest = voices.max_by_key(|v| (height(v), std::cmp::Reverse(*v)));
        highest == Some(self.top()) && there.bass() == Some(self.foot())
    }

    /// The number of parts the step is written in: a voice that falls silent with it, or enters
    /// with it, still belongs to the texture.
    #[must_use]
    pub fn parts(&self) -> usize {
        let before = self.sounding.neighbour(-1).map_or(0, Sounding::parts);
        before.max(self.sounding.parts())
    }

    /// The lower of the two has the lowest note of all; `None` where that cannot be told, since
    /// a voice is not written yet.
    #[must_use]
    pub fn is_with_bass(&self) -> Option<bool> {
        let voices = self.sounding.piece.score.voices.len();
        if self.sounding.sonority().is_some_and(|s| s.unknown != 0) && self.foot() + 1 == voices {
            return Some(true);
        }
        self.sounding.bass().map(|bass| bass == self.foot())
    }

    /// The same pair's step into the next sonority in which either of them moves, if pair rules
    /// look at it.
    #[must_use]
    pub fn next(&self) -> Option<PairMove<'a>> {
        let mut there = self.sounding;
        loop {
            there = there.neighbour(1)?;
            let step = there
                .piece
                .texture
                .step(there.index, self.pair.upper, self.pair.lower)?;
            step.motion()?;
            if step.across_phrase() {
                return None;
            }
            if step.motion() != Some(Motion::Still) {
                return Some(PairMove {
                    sounding: there,
                    pair: self.pair,
                    step,
                });
            }
        }
    }

    /// The same pair's next step in which this voice moves, whatever the other does meanwhile.
    #[must_use]
    pub fn next_of(&self, voice: usize) -> Option<PairMove<'a>> {
        std::iter::successors(self.next(), Self::next)
            .find(|next| next.size_of_move(voice).is_some_and(|size| size > 0))
    }

    /// The two leave the same pitch.
    #[must_use]
    pub fn is_in_unison_before(&self) -> bool {
        self.step.before().is_some_and(|gap| gap.semitones == 0)
    }

    /// The pitch a voice reaches, as text.
    #[must_use]
    pub fn pitch_after(&self, voice: usize) -> String {
        self.sounding
            .pitch(voice)
            .map(|p| p.to_string())
            .unwrap_or_default()
    }

    /// The pitch a voice leaves, as text.
    #[must_use]
    pub fn pitch_before(&self, voice: usize) -> String {
        let before = self.sounding.neighbour(-1).and_then(|s| s.pitch(voice));
        before.map(|p| p.to_string()).unwrap_or_default()
    }

    /// An ornament may make one of the two intervals: it begins between beats, and a voice steps
    /// into or out of a note there.
    #[must_use]
    pub fn may_be_ornament(&self) -> bool {
        let piece = self.sounding.piece;
        let voices = [self.pair.upper, self.pair.lower];
        let left = voices.map(|v| self.left_at(v));
        let left_off = piece.is_off_beat(left[0].max(left[1]));
        let steps_here = voices.iter().any(|&v| self.steps(v));
        let stepped_before = voices.iter().zip(left).any(|(&v, at)| {
            let came = piece
                .texture
                .at(at)
                .and_then(|k| piece.texture.displacement(piece.score, k, v));
            came.is_some_and(|gap| Interval(gap).size() == 1)
        });
        let steps_next = || {
            self.next()
                .is_some_and(|next| voices.iter().any(|&v| next.steps(v)))
        };
        (left_off && (steps_here || stepped_before))
            || (self.sounding.is_off_beat() && (steps_here || steps_next()))
    }

    /// The piece closes, and neither voice strikes another note.
    #[must_use]
    pub fn is_close(&self) -> bool {
        let piece = self.sounding.piece;
        let closed = piece.score.bars.last().is_some_and(|bar| bar.section_end);
        let both = 1 << self.pair.upper | 1 << self.pair.lower;
        let mut later = piece
            .texture
            .sonorities()
            .iter()
            .skip(self.sounding.index + 1);
        closed && !later.any(|s| s.struck & both != 0)
    }

    /// The two arrive on the same pitch.
    #[must_use]
    pub fn is_in_unison_after(&self) -> bool {
        self.step.after().is_some_and(|gap| gap.semitones == 0)
    }

    /// In three parts or more, the upper voice rises by step into a unison with the bass, which leaps
    /// up a fourth or a fifth: the leading note at a close.
    #[must_use]
    pub fn closes_into_unison(&self) -> bool {
        self.parts() >= 3
            && self.is_in_unison_after()
            && self.steps(self.pair.upper)
            && self.rises(self.pair.upper)
            && self.rises(self.pair.lower)
            && self.is_with_bass() == Some(true)
            && self.bass_leaps_fourth_or_fifth()
    }

    /// The case that fits, of those for the last chord, for the outer voices, and for a pair
    /// with an inner voice.
    #[must_use]
    pub fn close_outer_or_inner(&self, [close, outer, inner]: [&'static Case; 3]) -> &'static Case {
        if self.is_close() {
            close
        } else if self.is_outer() {
            outer
        } else {
            inner
        }
    }

    /// How a direct perfect interval stands in the texture.
    #[must_use]
    pub fn direct(&self) -> Direct {
        match (self.parts(), self.leaps(self.top()), self.is_outer()) {
            (..=2, true, _) => Direct::TwoParts,
            (..=2, false, _) => Direct::TwoPartsStep,
            (3, true, true) => Direct::ThreeOuter,
            (3, true, false) => Direct::ThreeInner,
            (_, true, true) => Direct::Outer,
            _ => Direct::Covered,
        }
    }

    /// What a direct perfect interval does and what helps: the end of its message. A step in the
    /// upper voice helps, but not in two strict parts.
    #[must_use]
    pub fn direct_story(&self, a_step_helps: bool) -> String {
        let top = self.top();
        let way = if self.rises(top) { "up" } else { "down" };
        let help = if a_step_helps && self.leaps(top) {
            "Let the upper one step, or move one of them the other way."
        } else {
            "Move one of them the other way, or let it stay."
        };
        format!("{}, both {way}. {help}", self.story())
    }

    /// Arrival on a perfect interval of a family in similar motion from one that was neither of
    /// the family nor, for fifths, a diminished fifth.
    #[must_use]
    pub fn is_direct(&self, family: Family) -> bool {
        match self.consecutive() {
            Some(Consecutive::Direct(reached)) => reached == family,
            Some(Consecutive::Unequal(reached, Way::IntoPerfect)) => {
                reached == family
                    && !self
                        .before()
                        .is_some_and(|i| family == Family::Fifth && i.is_diminished())
            }
            _ => false,
        }
    }

    /// A change of position in one chord of three parts or more is no arrival, whatever passes
    /// between the beats.
    #[must_use]
    pub fn only_changes_position(&self) -> bool {
        self.parts() >= 3 && self.sounding.keeps_chord()
    }

    /// It arrives on a beat from a note between beats that one of the two reached by step, or by a
    /// chromatic semitone.
    #[must_use]
    pub fn leaves_ornament(&self) -> bool {
        let piece = self.sounding.piece;
        let between = std::iter::successors(self.sounding.neighbour(-1), |s| s.neighbour(-1))
            .take_while(|there| there.is_off_beat());
        let voices = [self.pair.upper, self.pair.lower];
        let mut moves = between.flat_map(|there| {
            let moved = move |v| piece.texture.displacement(piece.score, there.index, v);
            voices.map(moved).into_iter().flatten()
        });
        !self.sounding.is_off_beat()
            && moves.any(|gap| gap.semitones != 0 && Interval(gap).size() <= 1)
    }

    /// The fifth of a pair of horns: from a sixth or third by a step in the upper voice, and on
    /// to a third or sixth in the same direction.
    #[must_use]
    pub fn is_horn_fifth(&self) -> bool {
        let imperfect =
            |interval: Option<Interval>| interval.is_some_and(|i| matches!(i.size() % 7, 2 | 5));
        let goes_on = self.next().is_some_and(|next| {
            imperfect(next.after())
                && next.steps(next.top())
                && next.rises(next.top()) == self.rises(self.top())
        });
        imperfect(self.before()) && self.steps(self.top()) && goes_on
    }

    /// `soprano and bass`.
    #[must_use]
    pub fn names(&self) -> String {
        let piece = self.sounding.piece;
        format!(
            "{} and {}",
            piece.name(self.pair.upper),
            piece.name(self.pair.lower)
        )
    }

    /// `D5 over G3`, at the departure and at the arrival: the upper voice in the score first, as
    /// its name comes first; `under` where it sounds below the other, `D5 in unison` on one note.
    #[must_use]
    pub fn ends(&self) -> (String, String) {
        let (upper, lower) = (self.pair.upper, self.pair.lower);
        let text = |gap: Option<Interval>, above: String, below: String| match gap {
            Some(gap) if gap.0.semitones == 0 && gap.0.steps == 0 => format!("{above} in unison"),
            Some(gap) if gap.0.semitones < 0 => format!("{above} under {below}"),
            _ => format!("{above} over {below}"),
        };
        (
            text(
                self.before(),
                self.pitch_before(upper),
                self.pitch_before(lower),
            ),
            text(
                self.after(),
                self.pitch_after(upper),
                self.pitch_after(lower),
            ),
        )
    }

    /// `soprano and bass go from D5 over G3 to E5 over A3`.
    #[must_use]
    pub fn story(&self) -> String {
        let (from, to) = self.ends();
        format!("{} go from {from} to {to}", self.names())
    }
}
