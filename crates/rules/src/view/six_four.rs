//! Chords in their second inversion: what accounts for them, and what they want.

use partwright_analysis::Figure;

use super::{Chord, Member, Piece, Sounding, Tone};

/// Why a chord in its second inversion stands where it stands.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum SixFourUse {
    /// Over the bass of the dominant that follows on it.
    Cadential,
    /// The bass comes and goes by step.
    Passing,
    /// The bass was there before, or stays.
    Pedal,
    /// The chord stands in another position beside it.
    Arpeggiated,
    /// A note of it is an ornament, or what follows is not certain.
    Excused,
    /// None of these.
    Bare,
}

/// A sure triad in its second inversion.
#[derive(Clone, Copy)]
pub struct SixFour<'a> {
    /// Where it begins.
    pub there: Sounding<'a>,
    /// The voice that has the bass.
    pub bass: usize,
    chord: Chord<'a>,
}

/// What is wrong with a cadential six-four.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum SixFourWant {
    /// The fourth goes by leap, in this voice.
    FourthLeaps(usize),
    /// The fourth does not go down by step, in this voice.
    FourthStrays(usize),
    /// The sixth does not go down by step, in this voice.
    SixthStrays(usize),
    /// The fourth is reached by leap, in this voice.
    FourthReached(usize),
    /// It is weaker than its dominant.
    Weak,
    /// It comes from the dominant it leads to.
    FromDominant,
}

impl<'a> Sounding<'a> {
    /// A triad in its second inversion that begins here: all its notes belong to it, and it has
    /// the fourth and the sixth over the bass.
    #[must_use]
    pub fn six_four(self) -> Option<SixFour<'a>> {
        let here = self.as_six_four()?;
        let before = self.neighbour(-1).and_then(Sounding::as_six_four);
        let goes_on = before.is_some_and(|before| {
            before.chord.index == here.chord.index && before.bass == here.bass
        });
        (!goes_on).then_some(here)
    }

    fn as_six_four(self) -> Option<SixFour<'a>> {
        let chord = self.chord()?;
        let bass = self.bass().filter(|_| self.parts() >= 3)?;
        let members = chord.members(self);
        let has = |tone| members.iter().any(|member| member.tone == tone);
        let is_triad = chord.quality() == chord.quality().triad();
        let whole = members.len() == self.parts() && has(Tone::Root) && has(Tone::Third);
        let inverted = chord.member(self.index, bass)?.tone == Tone::Fifth;
        (is_triad && whole && inverted).then_some(SixFour {
            there: self,
            bass,
            chord,
        })
    }
}

impl<'a> SixFour<'a> {
    /// The sonority in which the bass or the chord is another one.
    fn after(&self) -> Option<Sounding<'a>> {
        let bass_note = self.there.held_note(self.bass)?.0;
        let index = self.chord.index;
        let mut later = (1..).map_while(|by| self.there.neighbour(by));
        later.find(|next| {
            let same_bass = next.held_note(self.bass).is_some_and(|n| n.0 == bass_note);
            let same_chord = next.chord().is_some_and(|chord| chord.index == index);
            !(same_bass && same_chord)
        })
    }

    /// The dominant it leads to, over the same note of the bass or its octave.
    #[must_use]
    pub fn dominant(&self) -> Option<Chord<'a>> {
        let next = self.after()?;
        let chord = next
            .chord()
            .filter(|chord| chord.index > self.chord.index)?;
        let (bass, now) = (self.there.pitch(self.bass)?, next.pitch(self.bass)?);
        let same = bass.class_name() == now.class_name();
        (same && chord.is_dominant_on(bass)).then_some(chord)
    }

    /// `C major`.
    #[must_use]
    pub fn name(&self) -> String {
        self.chord.name()
    }

    /// Its lowest note: `G3`.
    #[must_use]
    pub fn bass_text(&self) -> String {
        let pitch = self.there.pitch(self.bass);
        pitch.map(|p| p.to_string()).unwrap_or_default()
    }

    /// What accounts for it.
    #[must_use]
    pub fn use_of(&self) -> SixFourUse {
        let [into, out] = self.there.steps_around(self.bass);
        if into == Some(0) {
            return SixFourUse::Pedal;
        }
        if self.bass_is_held() {
            return SixFourUse::Pedal;
        }
        if into.map(i32::abs) == Some(1) && out.map(i32::abs) == Some(1) {
            return SixFourUse::Passing;
        }
        if self.dominant().is_some() {
            return SixFourUse::Cadential;
        }
        if self.bass_stays() {
            return SixFourUse::Pedal;
        }
        if self.stands_otherwise() {
            return SixFourUse::Arpeggiated;
        }
        if self.is_explained() || !self.is_certain_after() {
            return SixFourUse::Excused;
        }
        SixFourUse::Bare
    }

    /// The bass note was struck before the chord came.
    fn bass_is_held(&self) -> bool {
        let note = self.there.held_note(self.bass);
        note.is_some_and(|(_, note)| note.onset < self.there.onset())
    }

    /// The chord goes on to another over the same note of the bass.
    fn bass_stays(&self) -> bool {
        let next = self.after().and_then(|next| next.pitch(self.bass));
        next.is_some() && next == self.there.pitch(self.bass)
    }

    /// Beside it, before or after, the bass has another note of the same triad.
    fn stands_otherwise(&self) -> bool {
        let other = |there: Sounding<'a>| {
            let chord = there.chord()?;
            let bass = chord.member(there.index, there.bass()?)?;
            Some(chord.has_triad_of(&self.chord) && bass.tone != Tone::Fifth)
        };
        let before = self.there.neighbour(-1).and_then(other);
        let after = self.after().and_then(other);
        before == Some(true) || after == Some(true)
    }

    /// A figure accounts for a dissonance that begins with it; that a whole chord comes early, or
    /// is left by leap, accounts for nothing.
    fn is_explained(&self) -> bool {
        let there = self.there;
        let all = there.piece.analysis.dissonances_at(there.index);
        all.iter().any(|dissonance| {
            dissonance.reading.is_some_and(|reading| {
                !matches!(reading.figure, Figure::Anticipation | Figure::Escape)
            })
        })
    }

    /// What follows is sure, and no phrase ends with it.
    fn is_certain_after(&self) -> bool {
        let ends = |voice| {
            let note = self.there.held_note(voice);
            note.is_some_and(|(_, note)| note.ends_phrase())
        };
        let mut voices = self.there.piece.texture.sounding(self.there.index);
        !voices.any(ends) && self.after().is_some_and(|next| next.chord().is_some())
    }

    /// What is wrong with it, if it leads to a dominant; the worst first.
    #[must_use]
    pub fn want(&self) -> Option<SixFourWant> {
        let dominant = self.dominant()?;
        let members = self.chord.members(self.there);
        let with = |tone: Tone| {
            let mut list: Vec<Member> = members.clone();
            list.retain(|m| m.tone == tone && m.voice != self.bass);
            list
        };
        let (fourths, sixths) = (with(Tone::Root), with(Tone::Third));
        let goes = |member: &Member| {
            let next = dominant.first_of(member.voice)?;
            Some(i32::from(next.pitch.step - member.pitch.step))
        };
        // Where one voice leads the fourth down, another that doubles it is free.
        let led = |list: &[Member]| list.iter().any(|m| goes(m).is_none_or(|steps| steps == -1));
        if !led(&fourths) {
            let leap = |m: &&Member| goes(m).is_some_and(|steps| steps.abs() > 1);
            if let Some(member) = fourths.iter().find(leap) {
                return Some(SixFourWant::FourthLeaps(member.voice));
            }
            return fourths.first().map(|m| SixFourWant::FourthStrays(m.voice));
        }
        let reached_by_leap = |m: &Member| {
            let into = self.there.steps_around(m.voice)[0];
            m.onset == self.there.onset() && into.is_some_and(|steps| steps.abs() > 1)
        };
        let level = |there: Sounding<'_>| there.sonority().map(|s| s.level);
        let onset = dominant.soundings().next().and_then(level);
        // A chord that stood in another position before comes from itself.
        let begins = self.chord.segment.first == self.there.index;
        let plain = |chord: &Chord<'_>| {
            let there = chord.plain()?;
            let full = chord.members(there).iter().any(|m| m.tone == Tone::Third);
            Some(full && !there.is_off_beat())
        };
        let before = self
            .chord
            .before()
            .filter(|chord| begins && chord.is_sure() && plain(chord) == Some(true));
        if level(self.there) > onset {
            Some(SixFourWant::Weak)
        } else if before.is_some_and(|before| before.has_triad_of(&dominant)) {
            Some(SixFourWant::FromDominant)
        } else if !led(&sixths) {
            sixths.first().map(|m| SixFourWant::SixthStrays(m.voice))
        } else if fourths.iter().all(reached_by_leap) {
            fourths.first().map(|m| SixFourWant::FourthReached(m.voice))
        } else {
            None
        }
    }
}

impl SixFourWant {
    /// What is wrong, and what helps.
    #[must_use]
    pub fn text(self, piece: Piece<'_>) -> String {
        let of = |what: &str, voice, wrong: &str| {
            format!("its {what}, in {}, {wrong}", piece.name(voice))
        };
        match self {
            SixFourWant::FourthLeaps(v) => of("fourth", v, "leaps. Let it go down by step"),
            SixFourWant::FourthStrays(v) => {
                of("fourth", v, "does not go down. Let it go down by step")
            }
            SixFourWant::SixthStrays(v) => of(
                "sixth",
                v,
                "does not go down by step. Let it go down by step",
            ),
            SixFourWant::FourthReached(v) => of(
                "fourth",
                v,
                "is reached by leap. Prepare it, or reach it by step",
            ),
            SixFourWant::Weak => {
                "it is weaker than its dominant. Move it to a stronger beat".to_owned()
            }
            SixFourWant::FromDominant => {
                "it comes from the dominant it leads to. Put another chord before it".to_owned()
            }
        }
    }
}
