//! Suspensions and passing pairs as rules see them.

use partwright_analysis::Figure;
use partwright_analysis::figures::Held;
use partwright_score::{Interval, Note, Pair, Sonority, Time, ZERO};
use partwright_space::Motion;

use super::{Discord, Piece};

/// A suspension by its numbers against the lowest voice.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Numbers {
    /// A seventh that becomes a sixth.
    SevenSix,
    /// A fourth that becomes a third.
    FourThree,
    /// A ninth that becomes an octave.
    NineEight,
    /// A second that becomes a unison.
    TwoOne,
    /// The lowest voice is held under a second, or a ninth, and goes to a third.
    TwoThree,
    /// The lowest voice is held under a fourth and goes to a fifth.
    FourFive,
    /// The lowest voice is held under a seventh and goes to an octave.
    SevenEight,
}

impl Numbers {
    /// `7-6`.
    #[must_use]
    pub const fn text(self) -> &'static str {
        match self {
            Numbers::SevenSix => "7-6",
            Numbers::FourThree => "4-3",
            Numbers::NineEight => "9-8",
            Numbers::TwoOne => "2-1",
            Numbers::TwoThree => "2-3",
            Numbers::FourFive => "4-5",
            Numbers::SevenEight => "7-8",
        }
    }
}

/// Two notes struck together, both foreign to what is held.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Together {
    /// The other of them, by voice.
    pub voice: usize,
    /// Their interval.
    pub interval: Interval,
    /// A fourth or a tritone rather than a second or a seventh.
    pub is_fourth: bool,
    /// A fourth reached in contrary motion, or a tritone that resolves.
    pub is_lawful_fourth: bool,
}

impl Discord<'_> {
    fn size_over(&self, voice: usize, low: usize) -> Option<i32> {
        let gap = self
            .piece
            .texture
            .gap(self.dissonance.sonority, voice, low)?;
        Some(Interval(gap).size())
    }

    /// The numbers of the suspension it is; `None` where it is none, or not against the lowest
    /// voice.
    #[must_use]
    pub fn numbers(&self) -> Option<Numbers> {
        self.suspension()?;
        if !self.dissonance.over_bass {
            return None;
        }
        let (held, against) = (self.dissonant().0, self.other().0);
        let sounding = self.sounding();
        if sounding.bass() == Some(held) {
            let texture = self.piece.texture;
            let over = |class: i32| {
                let mut others = texture.sounding(sounding.index).filter(|&v| v != held);
                others.any(|v| self.size_over(v, held).is_some_and(|s| s % 7 == class))
            };
            let all = [
                (1, Numbers::TwoThree),
                (3, Numbers::FourFive),
                (6, Numbers::SevenEight),
            ];
            return all.into_iter().find(|&(class, _)| over(class)).map(|k| k.1);
        }
        match self.size_over(held, against)? {
            1 => Some(Numbers::TwoOne),
            size => match size % 7 {
                1 => Some(Numbers::NineEight),
                3 => Some(Numbers::FourThree),
                6 => Some(Numbers::SevenSix),
                _ => None,
            },
        }
    }

    /// A major seventh over the lowest voice that goes up a semitone.
    #[must_use]
    pub fn is_leading_seventh(&self) -> bool {
        let gap = self.dissonance.gap;
        let (voice, note) = self.dissonant();
        let pitch = |note| Some(self.note((voice, note))?.sound.pitch()?.place());
        let rise = pitch(note).zip(pitch(note + 1)).map(|(a, b)| a.up_to(b));
        self.dissonance.over_bass
            && self.sounding().bass() != Some(voice)
            && (gap.steps.rem_euclid(7), gap.semitones.rem_euclid(12)) == (6, 11)
            && rise.is_some_and(|gap| (gap.steps, gap.semitones) == (1, 1))
    }

    /// So many voices sound, doublings counted once.
    #[must_use]
    pub fn parts(&self) -> usize {
        self.sounding().parts()
    }

    /// The lowest voice carries one of these intervals, by its number within the octave.
    #[must_use]
    pub fn has_over_bass(&self, numbers: &[i32]) -> bool {
        let there = self.sounding();
        let Some(bass) = there.bass() else {
            return false;
        };
        self.piece
            .texture
            .sounding(there.index)
            .filter(|&v| v != bass && v != self.dissonant().0)
            .filter_map(|v| self.size_over(v, bass))
            .any(|size| numbers.contains(&(size % 7 + 1)))
    }

    /// How many suspensions of the same numbers run up to this one, each prepared by the
    /// resolution of the one before; 0 where it is none.
    #[must_use]
    pub fn running(&self) -> usize {
        let mut at = *self;
        let Some(numbers) = at.numbers() else {
            return 0;
        };
        let mut count = 1;
        while let Some(before) = at.link_before()
            && before.numbers() == Some(numbers)
        {
            count += 1;
            at = before;
        }
        count
    }

    /// The suspension whose resolution prepares this one.
    fn link_before(&self) -> Option<Self> {
        let held = self.suspension()?;
        let piece = self.piece;
        let bar = |sonority: usize| piece.texture.sonorities().get(sonority).map(|s| s.bar);
        let here = bar(self.dissonance.sonority)?;
        let list = piece.analysis.dissonances();
        let first = list.partition_point(|d| d.at < held.struck);
        // No suspension that resolves here began much earlier.
        list.get(..first)?
            .iter()
            .rev()
            .take_while(|d| bar(d.sonority).is_some_and(|b| b + 3 > here))
            .find_map(|dissonance| {
                let before = Discord { piece, dissonance };
                let links = before
                    .suspension()
                    .is_some_and(|b| b.resolved == held.struck)
                    && before.dissonant().0 == self.dissonant().0;
                links.then_some(before)
            })
    }

    /// A voice, other than the one it disagrees with, that sounds the note of resolution while
    /// that is still awaited, and whether right beside the held note.
    #[must_use]
    pub fn resolution_in(&self) -> Option<(usize, bool)> {
        let held = self.suspension()?;
        let (voice, against) = (self.dissonant().0, self.other().0);
        let sounding = self.sounding();
        let awaited = self.note_starting(voice, held)?.sound.pitch()?;
        let is_ninth = self.numbers() == Some(Numbers::NineEight);
        let sounds = |v: usize| {
            let pitch = sounding.pitch(v)?;
            let same = pitch.letter() == awaited.letter() && pitch.sign == awaited.sign;
            let beside = self.size_over(voice, v) == Some(1);
            // A ninth goes to the octave of the lowest note, which others may double, but not
            // right beside it.
            let counts = v != voice && v != against && !self.follows(v) && (beside || !is_ninth);
            (same && counts).then_some((v, beside))
        };
        let voices = self.piece.texture.sounding(sounding.index);
        voices.filter_map(sounds).max_by_key(|&(_, beside)| beside)
    }

    fn follows(&self, voice: usize) -> bool {
        let followers = self.sounding().sonority().map_or(0, |s| s.followers);
        followers >> voice & 1 == 1
    }

    fn note_starting(&self, voice: usize, held: Held) -> Option<&Note> {
        let note = self.piece.score.note_at(voice, held.resolved)?;
        self.note((voice, note))
    }

    /// The two notes disagree for longer than so many quarters.
    #[must_use]
    pub fn is_longer_than(&self, quarters: i32) -> bool {
        self.lasts() > Time::new(quarters.into(), 4)
    }

    /// The two notes disagree for longer than a beat, and neither is held through more than that.
    #[must_use]
    pub fn is_longer_than_beat(&self) -> bool {
        let beat = self.piece.cell_at(self.dissonance.at);
        let other = self.note(self.other()).map_or(ZERO, |note| note.length);
        let bar = Time::new(1, 1);
        beat.is_some_and(|beat| self.lasts() > beat) && other <= bar
    }

    fn lasts(&self) -> Time {
        let end = |of| self.note(of).map_or(ZERO, Note::end);
        end(self.dissonant()).min(end(self.other())) - self.dissonance.at
    }

    /// It is an ornament struck where it begins to disagree: neither held over nor a pedal.
    #[must_use]
    pub fn is_struck_ornament(&self) -> bool {
        let struck = self
            .note(self.dissonant())
            .is_some_and(|note| note.onset == self.dissonance.at);
        struck
            && matches!(
                self.figure(),
                Some(
                    Figure::Passing { .. }
                        | Figure::Neighbour { .. }
                        | Figure::DoubleNeighbour
                        | Figure::Cambiata { .. }
                        | Figure::Escape
                        | Figure::Anticipation
                        | Figure::Appoggiatura
                )
            )
    }

    /// It is an ornament against a note that is held.
    fn leaves_what_is_held(&self) -> bool {
        let other = self.note(self.other());
        self.is_struck_ornament() && other.is_some_and(|note| note.onset < self.dissonance.at)
    }

    /// Another ornament struck with it, in a voice further down the score, with which it
    /// disagrees; both disagree with what is held.
    #[must_use]
    pub fn together(&self) -> Option<Together> {
        if !self.leaves_what_is_held() {
            return None;
        }
        let piece = self.piece;
        let (voice, k) = (self.dissonant().0, self.dissonance.sonority);
        piece
            .analysis
            .dissonances_at(k)
            .iter()
            .find_map(|dissonance| {
                let other = Discord { piece, dissonance };
                let low = other.dissonant().0;
                if low <= voice || !other.leaves_what_is_held() {
                    return None;
                }
                self.clash(Pair {
                    upper: voice,
                    lower: low,
                })
            })
    }

    /// The chord is sure, and neither the dissonant note nor what another voice has here belongs
    /// to it.
    #[must_use]
    pub fn leaves_sure_chord(&self, other: usize) -> bool {
        let there = self.sounding();
        let strange = |voice| {
            let chord = there.chord().zip(there.pitch(voice));
            chord.is_some_and(|(chord, pitch)| !chord.may_have(pitch))
        };
        strange(self.dissonant().0) && strange(other)
    }

    fn clash(&self, pair: Pair) -> Option<Together> {
        let (texture, k) = (self.piece.texture, self.dissonance.sonority);
        let step = texture.step(k, pair.upper, pair.lower)?;
        let gap = step.after()?;
        if partwright_analysis::consonance::over_bass(gap) {
            return None;
        }
        let is_fourth = partwright_analysis::consonance::among_upper(gap);
        let tritone = partwright_analysis::consonance::is_tritone(gap);
        let lawful = if tritone {
            self.closes_or_opens(pair)
        } else {
            step.motion() == Some(Motion::Contrary)
        };
        Some(Together {
            voice: pair.lower,
            interval: Interval(gap),
            is_fourth,
            is_lawful_fourth: is_fourth && lawful,
        })
    }

    /// A tritone goes on to a third, where it is a fifth, or to a sixth.
    fn closes_or_opens(&self, pair: Pair) -> bool {
        let (texture, k) = (self.piece.texture, self.dissonance.sonority);
        let notes = |k| [pair.upper, pair.lower].map(|v| texture.note(k, v));
        let [a, b] = notes(k);
        let next = (k + 1..texture.sonorities().len()).find(|&k| {
            let [x, y] = notes(k);
            x != a && y != b
        });
        let size = |k| {
            texture
                .gap(k, pair.upper, pair.lower)
                .map(|g| Interval(g).size())
        };
        match (size(k), next.and_then(size)) {
            (Some(4), Some(after)) => after == 2,
            (Some(3), Some(after)) => after == 5,
            (Some(before), Some(after)) => (before - after).abs() == 2,
            _ => false,
        }
    }
}

/// A held sixth that goes to a fifth over one note of the lowest voice.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct SixFive {
    /// The lowest voice.
    pub bass: usize,
    /// When the sixth is reached.
    pub at: Time,
    /// When the fifth ends.
    pub until: Time,
    note: usize,
}

impl SixFive {
    /// The fifth of the one before is held and becomes the sixth.
    #[must_use]
    pub fn follows(&self, before: &SixFive) -> bool {
        self.note == before.note + 1
    }
}

impl Piece<'_> {
    /// A voice's exchanges of six and five, in order.
    #[must_use]
    pub fn six_five_exchanges(self, voice: usize) -> Vec<SixFive> {
        let sonorities = self.texture.sonorities().iter().enumerate();
        let exchange = |(k, sonority): (usize, &Sonority)| {
            let bass = self.texture.bass(k).filter(|&bass| bass != voice)?;
            let note = self.texture.note(k, voice)?;
            let notes = &self.score.voices.get(voice)?.notes;
            let (held, next) = (notes.get(note)?, notes.get(note + 1)?);
            if held.onset >= sonority.onset || sonority.struck >> bass & 1 == 0 {
                return None;
            }
            let after = self.texture.at(next.onset)?;
            let same = self.texture.note(k, bass) == self.texture.note(after, bass)
                && self.texture.bass(after) == Some(bass);
            let size = |k| Some(Interval(self.texture.gap(k, voice, bass)?).size() % 7);
            (same && size(k) == Some(5) && size(after) == Some(4)).then_some(SixFive {
                bass,
                at: sonority.onset,
                until: next.end(),
                note,
            })
        };
        sonorities.filter_map(exchange).collect()
    }
}
