//! A chord as rules see it: as long as it lasts, with what each voice has of it.

use std::ops::Range;

use partwright_analysis::harmony::{LocalKey, Quality};
use partwright_analysis::mode::{fifths, named};
use partwright_score::{Pitch, Time};

use super::{Chord, Piece, Sounding};

/// Which note of its chord a note is.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Tone {
    /// The root.
    Root,
    /// The third.
    Third,
    /// The fifth.
    Fifth,
    /// The seventh.
    Seventh,
}

impl Tone {
    /// What a musician calls it.
    #[must_use]
    pub const fn name(self) -> &'static str {
        match self {
            Tone::Root => "root",
            Tone::Third => "third",
            Tone::Fifth => "fifth",
            Tone::Seventh => "seventh",
        }
    }
}

/// A note of a chord in one voice.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Member {
    /// The voice.
    pub voice: usize,
    /// The sonority in which it was asked for.
    pub sonority: usize,
    /// When it was struck.
    pub onset: Time,
    /// The note itself.
    pub pitch: Pitch,
    /// Which note of the chord it is.
    pub tone: Tone,
}

impl<'a> Piece<'a> {
    /// The chords in order of time, sure or not.
    pub fn chords(self) -> impl DoubleEndedIterator<Item = Chord<'a>> {
        let segments = self.analysis.harmony(self.score, self.texture).segments();
        let chord = move |(index, segment)| Chord {
            piece: self,
            index,
            segment,
        };
        segments.iter().enumerate().map(chord)
    }

    /// The chords that begin in a range of sonorities, sure or not.
    pub fn chords_within(self, range: Range<usize>) -> impl Iterator<Item = Chord<'a>> {
        let harmony = self.analysis.harmony(self.score, self.texture);
        let first = harmony
            .segments()
            .partition_point(|s| s.first < range.start);
        let chords = (first..).map_while(move |index| self.chord(index));
        chords.take_while(move |chord| chord.segment.first < range.end)
    }

    fn chord(self, index: usize) -> Option<Chord<'a>> {
        let harmony = self.analysis.harmony(self.score, self.texture);
        let segment = harmony.segments().get(index)?;
        Some(Chord {
            piece: self,
            index,
            segment,
        })
    }
}

impl<'a> Sounding<'a> {
    /// The chord here, where it is sure; or where its root is, and it goes on from a sure chord on
    /// that root; or where it lies between two such, as under ornaments, the chord itself.
    #[must_use]
    pub fn chord(self) -> Option<Chord<'a>> {
        let piece = self.piece;
        let harmony = piece.analysis.harmony(piece.score, piece.texture);
        let here = piece.chord(harmony.index_at(self.index)?)?;
        if here.is_sure() {
            return Some(here);
        }
        let root = here.segment.chord.root;
        let on_root = |chord: &Chord<'_>| chord.is_sure() && chord.segment.chord.root == root;
        let before = here.before().filter(on_root)?;
        if here.segment.root_is_sure() {
            return Some(here);
        }
        here.next()
            .is_some_and(|next| on_root(&next))
            .then_some(before)
    }
}

impl<'a> Chord<'a> {
    /// Root and triad are certain enough to act on.
    #[must_use]
    pub fn is_sure(&self) -> bool {
        self.segment.is_sure()
    }

    /// That it has a seventh, or none, is certain enough to act on.
    #[must_use]
    pub fn seventh_is_sure(&self) -> bool {
        self.segment.seventh_is_sure()
    }

    /// The local key, where it is certain enough to act on.
    #[must_use]
    pub fn key(&self) -> Option<LocalKey> {
        self.segment.key.filter(|_| self.segment.key_is_sure())
    }

    /// `G dominant seventh`.
    #[must_use]
    pub fn name(&self) -> String {
        self.segment.chord.name()
    }

    /// Its quality.
    #[must_use]
    pub fn quality(&self) -> Quality {
        self.segment.chord.quality
    }

    /// The chord that follows at once.
    #[must_use]
    pub fn next(&self) -> Option<Chord<'a>> {
        let next = self.piece.chord(self.index + 1)?;
        (next.segment.first == self.segment.end).then_some(next)
    }

    /// The chord that it follows at once.
    #[must_use]
    pub fn before(&self) -> Option<Chord<'a>> {
        let before = self.piece.chord(self.index.checked_sub(1)?)?;
        (before.segment.end == self.segment.first).then_some(before)
    }

    /// One past the last sonority over its root: what stands over the root may become doubtful
    /// before the chord is left.
    pub(super) fn end_on_root(&self) -> usize {
        let root = self.segment.chord.root;
        let mut end = self.segment.end;
        let mut after = self.next();
        while let Some(next) = after.filter(|n| n.segment.chord.root == root && !n.is_sure()) {
            end = next.segment.end;
            after = next.next();
        }
        end
    }

    /// The next chord, if it is on another root, both are sure and no voice ends its phrase
    /// between.
    #[must_use]
    pub fn goes_to(&self) -> Option<Chord<'a>> {
        let end = self.end_on_root();
        let after = std::iter::successors(self.next(), Chord::next);
        let next = after
            .take_while(|next| next.segment.first <= end)
            .find(|next| next.segment.first == end)
            .filter(|next| self.is_sure() && next.is_sure())
            .filter(|next| next.segment.chord.root != self.segment.chord.root)?;
        let mut steps = self.piece.texture.steps(next.segment.first);
        (!steps.any(|(_, step)| step.across_phrase())).then_some(next)
    }

    /// When it begins.
    #[must_use]
    pub fn onset(&self) -> Time {
        self.piece.sounding(self.segment.first).onset()
    }

    /// When it ends.
    #[must_use]
    pub fn until(&self) -> Time {
        self.piece.end_of(self.segment.end.saturating_sub(1))
    }

    /// Its sonorities.
    pub fn soundings(&self) -> impl DoubleEndedIterator<Item = Sounding<'a>> + use<'a> {
        let piece = self.piece;
        (self.segment.first..self.segment.end).map(move |k| piece.sounding(k))
    }

    /// Which of its notes a pitch is.
    #[must_use]
    pub fn tone(&self, pitch: Pitch) -> Option<Tone> {
        Some(match self.segment.chord.tone(pitch)? {
            0 => Tone::Root,
            1 => Tone::Third,
            2 => Tone::Fifth,
            _ => Tone::Seventh,
        })
    }

    /// The name of one of its notes: `F#`.
    #[must_use]
    pub fn note_name(&self, tone: Tone) -> Option<String> {
        let tones = self.quality().tones();
        let place = tones.get(tone as usize)?;
        Some(named(self.segment.chord.root + place))
    }

    /// What a voice has of it in a sonority; `None` for an ornament or silence.
    #[must_use]
    pub fn member(&self, sonority: usize, voice: usize) -> Option<Member> {
        let (score, texture) = (self.piece.score, self.piece.texture);
        let note = score
            .voices
            .get(voice)?
            .notes
            .get(texture.note(sonority, voice)?)?;
        let pitch = note.sound.pitch()?;
        let tone = self.tone(pitch)?;
        Some(Member {
            voice,
            sonority,
            onset: note.onset,
            pitch,
            tone,
        })
    }

    /// The first note of it that a voice has.
    #[must_use]
    pub fn first_of(&self, voice: usize) -> Option<Member> {
        let mut all = self.segment.first..self.segment.end;
        all.find_map(|k| self.member(k, voice))
    }

    /// The last note of it that a voice has.
    #[must_use]
    pub fn last_of(&self, voice: usize) -> Option<Member> {
        let mut all = (self.segment.first..self.end_on_root()).rev();
        all.find_map(|k| self.member(k, voice))
    }

    /// The first sonority in which every independent voice that sounds has a note of it, all are
    /// known, and as many sound as ever in this chord: where it can be weighed.
    #[must_use]
    pub fn plain(&self) -> Option<Sounding<'a>> {
        let most = self.soundings().map(Sounding::parts).max()?;
        self.soundings().find(|there| {
            let texture = self.piece.texture;
            let known = there.sonority().is_some_and(|s| s.unknown == 0);
            let mut voices = texture.sounding(there.index);
            known
                && there.parts() == most
                && voices.all(|voice| self.member(there.index, voice).is_some())
        })
    }

    /// The independent voices that have a note of it, doublings left out, in a sonority.
    #[must_use]
    pub fn members(&self, there: Sounding<'_>) -> Vec<Member> {
        let followers = there.sonority().map_or(0, |s| s.followers);
        let voices = self.piece.texture.sounding(there.index);
        voices
            .filter(|voice| followers >> voice & 1 == 0)
            .filter_map(|voice| self.member(there.index, voice))
            .collect()
    }

    /// How a voice leaves it for the chord that follows: its last note of this one and its first
    /// of that one, ornaments between left out.
    #[must_use]
    pub fn leaves(&self, voice: usize) -> Option<(Member, Member)> {
        let next = self.goes_to()?;
        Some((self.last_of(voice)?, next.first_of(voice)?))
    }

    /// The note in the lowest voice where it is plain: the root in root position, the third in
    /// the first inversion.
    #[must_use]
    pub fn bass_tone(&self) -> Option<Tone> {
        let there = self.plain()?;
        let bass = there.bass()?;
        Some(self.member(there.index, bass)?.tone)
    }

    /// The degree of its root in the local key, 1 to 7, if it is the scale's own note there; the
    /// seventh of minor is the natural one, and the raised one too.
    #[must_use]
    pub fn degree(&self) -> Option<u8> {
        degree(self.key()?, self.segment.chord.root)
    }

    /// The degree of a note in the local key, as [`Chord::degree`] tells the root's.
    #[must_use]
    pub fn degree_of(&self, pitch: Pitch) -> Option<u8> {
        degree(self.key()?, fifths(pitch))
    }

    /// The tonic it leads to: a fifth below a major triad or dominant seventh, a semitone above
    /// the root of a diminished chord.
    #[must_use]
    pub fn leads_to(&self) -> Option<i32> {
        let root = self.segment.chord.root;
        match self.quality() {
            Quality::Major | Quality::DominantSeventh => Some(root - 1),
            Quality::Diminished | Quality::HalfDiminishedSeventh | Quality::DiminishedSeventh => {
                Some(root - 5)
            }
            _ => None,
        }
    }

    /// It is a dominant that goes to its tonic: the next chord is on the root it leads to.
    #[must_use]
    pub fn resolves_to(&self) -> Option<Chord<'a>> {
        let next = self.goes_to()?;
        (self.leads_to() == Some(next.segment.chord.root)).then_some(next)
    }

    /// Whether a pitch is the leading note of the chord: the third of a dominant, or the root of a
    /// diminished chord, in the local key; or of one applied to another degree, which a dominant
    /// seventh or a note strange to the key tells, or, where no key is sure, that it goes to a
    /// minor tonic or to the tonic of a sure key.
    #[must_use]
    pub fn is_leading_note(&self, pitch: Pitch) -> bool {
        let Some(tonic) = self.leads_to().filter(|tonic| fifths(pitch) == tonic + 5) else {
            return false;
        };
        let has_seventh = self.quality() == Quality::DominantSeventh;
        let Some(key) = self.key() else {
            let tells = |next: Chord<'_>| {
                next.quality().triad() == Quality::Minor
                    || next.key().is_some_and(|key| key.tonic == tonic)
            };
            return (has_seventh && self.seventh_is_sure())
                || self.resolves_to().is_some_and(tells);
        };
        // A seventh strange to the key makes a dominant even in passing: E flat over F in F major.
        let strange = degree(key, self.segment.chord.root - 2).is_none();
        let lasts = self.until() - self.onset() >= Time::new(1, 8);
        let is_dominant = has_seventh && (self.seventh_is_sure() || (strange && lasts));
        key.tonic == tonic || is_dominant || degree(key, fifths(pitch)).is_none()
    }
}

pub(super) fn degree(key: LocalKey, place: i32) -> Option<u8> {
    let major = [0, 2, 4, -1, 1, 3, 5];
    let minor = [0, 2, -3, -1, 1, -4, -2];
    let scale = if key.minor { minor } else { major };
    let own = scale.iter().position(|p| *p == place - key.tonic);
    let raised = (key.minor && place - key.tonic == 5).then_some(6);
    u8::try_from(own.or(raised)? + 1).ok()
}
