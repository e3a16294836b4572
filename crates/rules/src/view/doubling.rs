//! Which notes of a chord two voices have, and which none has.

use partwright_analysis::harmony::Quality;
use partwright_analysis::mode::fifths;
use partwright_score::{Interval, Pitch};

use super::chord::degree;
use super::{Chord, Member, Piece, Sounding, Tone};

/// The notes of a voice to either side that a sequence is looked for in.
const AROUND: usize = 8;

/// What of a chord is doubled, where that can be minded; leading notes and sevenths apart.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Doubling {
    /// Another note than the bass of a diminished sixth chord.
    DiminishedUpper,
    /// A note strange to the key, in an inverted chord.
    Altered,
    /// The third of a triad in root position.
    ThirdOfRootPosition,
    /// The bass of a sixth chord, on the third or the sixth degree.
    BassOfSixthChord,
}

/// A doubling with its place.
#[derive(Clone)]
pub struct Doubled<'a> {
    /// What is doubled.
    pub what: Doubling,
    /// Where.
    pub there: Sounding<'a>,
    /// In which voices.
    pub members: Vec<Member>,
}

impl<'a> Chord<'a> {
    /// What it doubles in four parts or more, if that can be minded and is no leading note.
    #[must_use]
    pub fn doubling(&self) -> Option<Doubled<'a>> {
        self.settled().filter(|there| there.parts() >= 4)?;
        let judge = |there: Sounding<'a>, members: &[Member]| {
            let first = members.first()?;
            let (tone, pitch) = (first.tone, first.pitch);
            let bass = there.bass()?;
            let lowest = self.member(there.index, bass)?.tone;
            let in_bass = members.iter().any(|m| m.voice == bass);
            if self.is_leading_note(pitch) {
                return None;
            }
            match (self.quality(), lowest) {
                (Quality::Diminished, Tone::Third) => {
                    let passing =
                        tone == Tone::Fifth && members.iter().any(|member| self.passes(member));
                    (tone != Tone::Third && !passing).then_some(Doubling::DiminishedUpper)
                }
                (_, Tone::Third | Tone::Fifth) if self.is_strange_to_key(pitch) => {
                    Some(Doubling::Altered)
                }
                (Quality::Major | Quality::Minor, Tone::Root) if tone == Tone::Third => {
                    Some(Doubling::ThirdOfRootPosition)
                }
                (Quality::Major | Quality::Minor, Tone::Third) if in_bass => {
                    let restless = matches!(self.degree_of(pitch), Some(3 | 6));
                    restless.then_some(Doubling::BassOfSixthChord)
                }
                _ => None,
            }
        };
        [Tone::Root, Tone::Third, Tone::Fifth]
            .into_iter()
            .filter_map(|tone| self.doubled(tone))
            .find_map(|(there, members)| {
                let what = judge(there, &members)?;
                Some(Doubled {
                    what,
                    there,
                    members,
                })
            })
    }

    /// The first sonority on a beat in which the chord is plain and from which it lasts a beat
    /// at least: where its notes settle. What comes between beats is ornament.
    #[must_use]
    pub fn settled(&self) -> Option<Sounding<'a>> {
        let most = self.soundings().map(Sounding::parts).max()?;
        self.soundings().find(|there| {
            let voices = self.piece.texture.sounding(there.index);
            let mut members = voices.map(|voice| self.member(there.index, voice));
            !there.is_off_beat()
                && there.parts() == most
                && self.lasts_a_beat_from(*there)
                && members.all(|member| member.is_some())
        })
    }

    /// A beat and more of it is left, and no voice is unknown.
    fn lasts_a_beat_from(&self, there: Sounding<'_>) -> bool {
        let known = there.sonority().is_some_and(|s| s.unknown == 0);
        let cell = there.cell();
        known && cell.is_some_and(|cell| there.onset() + cell <= self.until())
    }

    /// Where two independent voices or more have one of its notes together for a whole beat, on
    /// the beat, and which voices those are: what meets in passing is not doubled, and voices
    /// that go in octaves throughout are one.
    #[must_use]
    pub fn doubled(&self, tone: Tone) -> Option<(Sounding<'a>, Vec<Member>)> {
        self.soundings()
            .filter(|there| !there.is_off_beat())
            .find_map(|there| {
                let mut members = self.members(there);
                members.retain(|member| member.tone == tone);
                if members.len() < 2 || !self.lasts_a_beat_from(there) {
                    return None;
                }
                members.retain(|member| self.is_held_a_beat(member));
                (members.len() >= 2 && !there.is_in_octave_passage(2)).then_some((there, members))
            })
    }

    /// Where two independent voices or more have its leading note together, three parts sounding;
    /// not in a sequence, nor where but one is left when those that come down through it are
    /// taken away, nor on a tonic that does not go on as a dominant.
    #[must_use]
    pub fn leading_note_doubled(&self) -> Option<(Sounding<'a>, Vec<Member>)> {
        // A tonic with its third raised is at rest, unless it goes on as a dominant does.
        if self.degree() == Some(1) && self.resolves_to().is_none() {
            return None;
        }
        let leading = |members: &[Member]| {
            let first = members.first();
            first.is_some_and(|first| self.is_leading_note(first.pitch))
        };
        let (there, mut members) = [Tone::Root, Tone::Third]
            .into_iter()
            .filter_map(|tone| self.doubled(tone))
            .find(|(there, members)| there.parts() >= 3 && leading(members))?;
        members.retain(|member| !self.passes_down(member));
        (members.len() >= 2 && !self.is_in_sequence(there, &members)).then_some((there, members))
    }

    /// It goes to its tonic, and one of these voices closes there with another into an octave or
    /// a unison, by steps in contrary motion; it is no such close itself, nor does one of them enter with
    /// it after silence.
    #[must_use]
    pub fn closes_with(&self, members: &[Member]) -> bool {
        let first = self.soundings().next();
        let closed = first.is_some_and(Sounding::closes_by_steps);
        if closed || members.iter().any(|member| self.enters(member)) {
            return false;
        }
        let close = self.resolves_to().and_then(|next| next.soundings().next());
        let closing = |voice| close.is_some_and(|close| close.closes_by_steps_in(voice));
        members.iter().any(|member| closing(member.voice))
    }

    /// The voice comes to its note from silence.
    fn enters(&self, member: &Member) -> bool {
        let notes = self.piece.score.voices.get(member.voice).map(|v| &v.notes);
        let own = self.piece.texture.note(member.sonority, member.voice);
        let before = own.and_then(|own| notes?.get(own.checked_sub(1)?));
        before.is_none_or(|note| note.sound.pitch().is_none())
    }

    /// The voice keeps to this note of the chord for a beat, in whatever octave.
    fn is_held_a_beat(&self, member: &Member) -> bool {
        let there = self.piece.sounding(member.sonority);
        let from = there.onset();
        let Some(cell) = there.cell() else {
            return false;
        };
        let over = (member.sonority..self.segment.end).map(|k| self.piece.sounding(k));
        over.take_while(|s| s.onset() < from + cell).all(|s| {
            self.member(s.index, member.voice)
                .is_some_and(|there| there.tone == member.tone)
        })
    }

    /// Where two independent voices or more have its seventh together over or under its root,
    /// three parts sounding; not where all of them pass through by step, and a voice that has
    /// the note from before the chord until after it stands apart.
    #[must_use]
    pub fn seventh_doubled(&self) -> Option<(Sounding<'a>, Vec<Member>)> {
        let (there, mut members) = self.doubled(Tone::Seventh)?;
        let has_root = self.members(there).iter().any(|m| m.tone == Tone::Root);
        members.retain(|member| !self.is_held_through(member));
        let passing = members.iter().all(|member| self.passes(member));
        (has_root && there.parts() >= 3 && members.len() >= 2 && !passing)
            .then_some((there, members))
    }

    /// The voice has the note from before the chord until after it.
    fn is_held_through(&self, member: &Member) -> bool {
        let notes = self.piece.score.voices.get(member.voice).map(|v| &v.notes);
        let own = self.piece.texture.note(member.sonority, member.voice);
        let note = notes.zip(own).and_then(|(notes, own)| notes.get(own));
        note.is_some_and(|note| note.onset < self.onset() && self.until() < note.end())
    }

    /// As long as it lasts no voice has this note of it, nor right before or after in another
    /// chord on its root; it settles, so that nothing stands in for the note.
    #[must_use]
    pub fn lacks(&self, tone: Tone) -> bool {
        let on_root = |other: &Chord<'a>| other.segment.chord.root == self.segment.chord.root;
        let known = |there: Sounding<'a>| there.sonority().is_some_and(|s| s.unknown == 0);
        let beside = [self.before(), self.next()];
        let mut beside = beside.into_iter().flatten().filter(on_root);
        self.settled().is_some()
            && self.soundings().all(known)
            && !self.has(tone)
            && !beside.any(|other| other.has(tone))
    }

    /// The next chord, or the one after another on the same root, is the sure one it leads to.
    #[must_use]
    pub fn falls_to_its_tonic(&self) -> bool {
        let root = self.segment.chord.root;
        let mut after = std::iter::successors(self.next(), Chord::next);
        let next = after.find(|next| next.segment.chord.root != root);
        next.is_some_and(|next| next.is_sure() && self.leads_to() == Some(next.segment.chord.root))
    }

    /// A voice has this note of it at some time.
    fn has(&self, tone: Tone) -> bool {
        self.soundings().any(|there| {
            let mut voices = self.piece.texture.sounding(there.index);
            voices.any(|voice| {
                self.member(there.index, voice)
                    .is_some_and(|member| member.tone == tone)
            })
        })
    }

    /// It is inverted from beginning to end.
    #[must_use]
    pub fn stays_inverted(&self) -> bool {
        self.soundings().all(|there| {
            let bass = there.bass().and_then(|bass| self.member(there.index, bass));
            bass.is_none_or(|bass| bass.tone != Tone::Root)
        })
    }

    /// Only a chord of the seventh has one.
    #[must_use]
    pub fn has_seventh(&self) -> bool {
        self.quality().tones().len() == 4
    }

    /// A note of it that the scale has not, of the key to both sides of it where that is the
    /// same, else of its own; in minor the raised seventh belongs to the scale. `false` where the
    /// key is not sure.
    #[must_use]
    pub fn is_strange_to_key(&self, pitch: Pitch) -> bool {
        let before = self.before().and_then(|chord| chord.key());
        let after = self.next().and_then(|chord| chord.key());
        let around = before.filter(|_| before == after);
        let key = around.or_else(|| self.key());
        key.is_some_and(|key| degree(key, fifths(pitch)).is_none())
    }

    /// The voice goes through a note by step, the same way in and out.
    #[must_use]
    pub fn passes(&self, member: &Member) -> bool {
        self.piece
            .steps_around(member.sonority, member.voice)
            .is_some_and(|(before, after)| before == after)
    }

    /// The voice comes down through a note by step.
    #[must_use]
    pub fn passes_down(&self, member: &Member) -> bool {
        self.piece.steps_around(member.sonority, member.voice) == Some((-1, -1))
    }

    /// The bass and one of these voices go in a sequence here: a figure comes again at once on
    /// another step.
    #[must_use]
    pub fn is_in_sequence(&self, there: Sounding<'_>, members: &[Member]) -> bool {
        let sequence = |voice| self.goes_in_sequence(there, voice);
        there.bass().is_some_and(sequence)
            && members
                .iter()
                .any(|member| Some(member.voice) != there.bass() && sequence(member.voice))
    }

    fn goes_in_sequence(&self, there: Sounding<'_>, voice: usize) -> bool {
        let texture = self.piece.texture;
        let notes = self.piece.score.voices.get(voice).map(|v| &v.notes);
        let (Some(notes), Some(own)) = (notes, texture.note(there.index, voice)) else {
            return false;
        };
        let from = own.saturating_sub(AROUND);
        let until = notes.len().min(own + AROUND);
        let around = notes.get(from..until).unwrap_or_default();
        let moves: Vec<Option<i32>> = around
            .windows(2)
            .map(|pair| match pair {
                [a, b] if !a.ends_phrase() => {
                    let (a, b) = (a.sound.pitch()?.place(), b.sound.pitch()?.place());
                    Some(a.up_to(b).steps)
                }
                _ => None,
            })
            .collect();
        let own = own - from;
        (2..=4).any(|n| {
            moves.windows(2 * n).enumerate().any(|(at, both)| {
                let (model, again) = both.split_at(n);
                let whole: Option<Vec<i32>> = model.iter().copied().collect();
                let drifts = whole.is_some_and(|sizes| sizes.iter().sum::<i32>() != 0);
                (at..=at + 2 * n).contains(&own) && model == again && drifts
            })
        })
    }
}

impl Sounding<'_> {
    /// A six-four on a beat and lasting one, in four parts or more: the bass with nothing over it
    /// but fourths, sixths and octaves, both of the first there. The voices that double the
    /// fourth or the sixth, none where the bass is doubled.
    #[must_use]
    pub fn six_four_doubles(self) -> Option<Vec<usize>> {
        let bass = self.bass().filter(|_| self.parts() >= 4)?;
        let cell = self.cell()?;
        if self.is_off_beat() || self.piece.end_of(self.index) - self.onset() < cell {
            return None;
        }
        let texture = self.piece.texture;
        let followers = self.sonority()?.followers;
        let (mut fourths, mut sixths) = (Vec::new(), Vec::new());
        for voice in texture.sounding(self.index) {
            if voice == bass || followers >> voice & 1 == 1 {
                continue;
            }
            let gap = Interval(texture.gap(self.index, voice, bass)?);
            match (gap.size() % 7, gap.0.semitones.abs() % 12) {
                (0, 0) => {}
                (3, 5) => fourths.push(voice),
                (5, 8 | 9) => sixths.push(voice),
                _ => return None,
            }
        }
        if fourths.is_empty() || sixths.is_empty() {
            return None;
        }
        let doubled = [fourths, sixths]
            .into_iter()
            .find(|voices| voices.len() > 1);
        Some(doubled.unwrap_or_default())
    }

    /// With it one chord in root position goes to another, whose root is a step away.
    #[must_use]
    pub fn steps_between_roots(self) -> bool {
        let root = |there: Sounding<'_>| {
            let chord = there.chord()?;
            let bass = there.bass()?;
            let member = chord.member(there.index, bass)?;
            (member.tone == Tone::Root).then_some(member.pitch)
        };
        let from = self.neighbour(-1).and_then(root);
        let both = from.zip(root(self));
        both.is_some_and(|(from, to)| from.place().up_to(to.place()).steps.abs() == 1)
    }

    /// The bass goes on by step the way it came.
    #[must_use]
    pub fn bass_passes(self) -> bool {
        let around = self
            .bass()
            .and_then(|bass| self.piece.steps_around(self.index, bass));
        around.is_some_and(|(before, after)| before == after)
    }
}

impl Piece<'_> {
    /// The steps by which a voice comes to its note and goes on, -1 down and 1 up; `None` where
    /// either is a leap, a repetition or silence.
    fn steps_around(self, sonority: usize, voice: usize) -> Option<(i32, i32)> {
        let notes = &self.score.voices.get(voice)?.notes;
        let own = self.texture.note(sonority, voice)?;
        let place = |n: usize| Some(notes.get(n)?.sound.pitch()?.place());
        let [from, over, to] = [place(own.checked_sub(1)?)?, place(own)?, place(own + 1)?];
        let (before, after) = (from.up_to(over).steps, over.up_to(to).steps);
        (before.abs() == 1 && after.abs() == 1).then_some((before, after))
    }
}
