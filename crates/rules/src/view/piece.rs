//! The piece as a whole: names, places in words, passages.

use std::borrow::Cow;

use partwright_score::{Pair, Time, ZERO};

use super::{Piece, Sounding};

/// A passage in which two voices are crossed.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Crossing {
    /// Where they cross.
    pub from: Time,
    /// Where they part again, or stop sounding.
    pub until: Time,
    /// Notes struck by either voice in between.
    pub notes: usize,
    /// They part again while both sound.
    pub returns: bool,
    /// It is the lower voice in the score that went beyond the other.
    pub lower_moved: bool,
}

/// A run of sonorities of which the same can be said.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Passage {
    /// Its first sonority.
    pub first: usize,
    /// One past its last sonority.
    pub end: usize,
    /// How many chords it holds: sonorities in which one of the voices strikes on a beat, but
    /// not more of a sure chord, at least one.
    pub chords: usize,
    /// Where it begins.
    pub from: Time,
    /// Where it ends.
    pub until: Time,
}

impl<'a> Piece<'a> {
    /// A sonority by its index.
    #[must_use]
    pub fn sounding(self, index: usize) -> Sounding<'a> {
        Sounding { piece: self, index }
    }

    /// The longest runs of sonorities of which `holds` is true.
    #[must_use]
    pub fn passages(self, pair: Pair, holds: impl Fn(Sounding<'a>) -> bool) -> Vec<Passage> {
        self.runs(pair, self.soundings().filter(|&there| holds(there)))
    }

    /// The same, looking only inside passages known already.
    #[must_use]
    pub fn within(
        self,
        pair: Pair,
        passages: &[Passage],
        holds: impl Fn(Sounding<'a>) -> bool,
    ) -> Vec<Passage> {
        let inside = passages
            .iter()
            .flat_map(|p| p.first..p.end)
            .map(|k| self.sounding(k));
        self.runs(pair, inside.filter(|&there| holds(there)))
    }

    fn runs(self, pair: Pair, soundings: impl Iterator<Item = Sounding<'a>>) -> Vec<Passage> {
        let mut passages: Vec<Passage> = Vec::new();
        for there in soundings {
            let (index, until) = (there.index, self.end_of(there.index));
            let struck = there.sonority().map_or(0, |s| s.struck);
            let is_chord =
                struck & (1 << pair.upper | 1 << pair.lower) != 0 && !there.is_off_beat();
            match passages.last_mut() {
                Some(last) if last.end == index => {
                    // Struck again, or in another position, a chord is the same.
                    let is_another = is_chord && there.unchanged_chord() != Some(true);
                    last.end = index + 1;
                    last.chords += usize::from(is_another);
                    last.until = until;
                }
                _ => passages.push(Passage {
                    first: index,
                    end: index + 1,
                    chords: usize::from(is_chord),
                    from: there.onset(),
                    until,
                }),
            }
        }
        passages
    }

    /// A passage takes in a beat, and does not lie between two.
    #[must_use]
    pub fn is_on_a_beat(self, passage: &Passage) -> bool {
        let lasts = passage.until - passage.from;
        (passage.first..passage.end).any(|k| !self.sounding(k).is_off_beat())
            || self.cell_at(passage.from).is_none_or(|cell| lasts >= cell)
    }

    /// The sonorities in order.
    pub fn soundings(self) -> impl Iterator<Item = Sounding<'a>> {
        (0..self.texture.sonorities().len()).map(move |index| Sounding { piece: self, index })
    }

    /// What a musician calls a voice: `soprano`, `S1`; `voice A` where the bare label would read
    /// as a note.
    #[must_use]
    pub fn name(self, voice: usize) -> Cow<'a, str> {
        self.score.spoken_name(voice)
    }

    /// Several voices in a row: `soprano, alto and bass`.
    #[must_use]
    pub fn names(self, voices: &[usize]) -> String {
        let names: Vec<_> = voices.iter().map(|&voice| self.name(voice)).collect();
        match names.split_last() {
            Some((last, others)) if !others.is_empty() => {
                format!("{} and {last}", others.join(", "))
            }
            _ => names.concat(),
        }
    }

    /// The length of a beat's cell where the piece is at a moment, in whole notes.
    #[must_use]
    pub fn cell_at(self, at: Time) -> Option<Time> {
        let bar = self.score.bar_at(at).and_then(|i| self.score.bars.get(i))?;
        let metre = self.score.metres.get(bar.metre as usize)?;
        Some(metre.cell())
    }

    /// Where the first bar begins.
    #[must_use]
    pub fn start(self) -> Time {
        self.score.bars.first().map_or(ZERO, |bar| bar.onset)
    }

    /// A moment lies between beats.
    #[must_use]
    pub fn is_off_beat(self, at: Time) -> bool {
        let bar = self.score.bar_at(at).and_then(|i| self.score.bars.get(i));
        let metre = bar.and_then(|bar| self.score.metres.get(bar.metre as usize));
        metre.is_some_and(|metre| self.score.level(at) > metre.beat_level())
    }

    /// Independent voices of the piece: those that only double another do not count.
    #[must_use]
    pub fn voices(self) -> usize {
        self.score
            .voices
            .iter()
            .filter(|v| v.doubles.is_none())
            .count()
    }

    /// Two voices of one declared kind, which may share a register; never with the bass.
    #[must_use]
    pub fn are_alike(self, pair: Pair) -> bool {
        let kind = |v: usize| self.score.voices.get(v).map(|voice| voice.kind.name);
        kind(pair.upper) == kind(pair.lower)
            && kind(pair.upper) != Some("voice")
            && pair.lower + 1 != self.score.voices.len()
    }

    /// A moment in words: `bar 3, beat 2`.
    #[must_use]
    pub fn place_text(self, at: Time) -> String {
        let place = self.score.place(at);
        format!("bar {}, beat {}", place.bar, beat_words(place.beat))
    }

    /// `in bar 3` or `from bar 3 to bar 5`.
    #[must_use]
    pub fn extent_text(self, from: Time, until: Time) -> String {
        let first = self.score.place(from).bar;
        let ends = self
            .texture
            .sonorities()
            .partition_point(|s| s.onset < until);
        let last = ends
            .checked_sub(1)
            .and_then(|i| self.texture.sonorities().get(i));
        let last = last.map_or(first, |s| self.score.place(s.onset).bar);
        if first == last {
            format!("in bar {first}")
        } else {
            format!("from bar {first} to bar {last}")
        }
    }

    /// The passages in which a pair is crossed.
    #[must_use]
    pub fn crossings(self, pair: Pair) -> Vec<Crossing> {
        let mut passages = Vec::new();
        let mut open: Option<Crossing> = None;
        for (k, sonority) in self.texture.sonorities().iter().enumerate() {
            let step = self.texture.step(k, pair.upper, pair.lower);
            let sounds = step.is_some_and(|s| s.after().is_some());
            let crossed = sounds && step.is_some_and(|s| s.is_crossed() && !s.is_one_voice());
            let struck_by = |voice: usize| sonority.struck >> voice & 1 == 1;
            let struck = struck_by(pair.upper) || struck_by(pair.lower);
            match &mut open {
                Some(passage) if crossed => {
                    passage.notes += usize::from(struck);
                    passage.until = self.end_of(k);
                }
                Some(passage) => {
                    passage.returns = sounds;
                    passages.extend(open.take());
                }
                None if crossed => {
                    let (from, until) = (sonority.onset, self.end_of(k));
                    let lower_moved = struck_by(pair.lower) && !struck_by(pair.upper);
                    open = Some(Crossing {
                        lower_moved,
                        from,
                        until,
                        notes: 1,
                        returns: false,
                    });
                }
                None => {}
            }
        }
        passages.extend(open);
        passages
    }

    /// Where the sonority ends, or the score.
    #[must_use]
    pub fn end_of(self, sonority: usize) -> Time {
        let next = self.texture.sonorities().get(sonority + 1);
        next.map_or_else(|| self.score.end(), |s| s.onset)
    }
}

/// A beat as it is said: `2`, `2½`, `3¼`, else the fraction.
#[must_use]
fn beat_words(beat: Time) -> String {
    let whole = beat.trunc().to_integer();
    let rest = beat.fract();
    match (*rest.numer(), *rest.denom()) {
        (0, _) => whole.to_string(),
        (1, 2) => format!("{whole}½"),
        (1, 4) => format!("{whole}¼"),
        (3, 4) => format!("{whole}¾"),
        (1, 3) => format!("{whole}⅓"),
        (2, 3) => format!("{whole}⅔"),
        (n, d) => format!("{whole} {n}/{d}"),
    }
}
