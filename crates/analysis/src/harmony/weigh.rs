//! What a chord leaves out and lacks in one sonority.

use super::chord::{Chord, Quality};
use super::slices::{Cost, Slice};

/// How many notes of a sonority must be of the chord for it to be sure: two fit several chords.
const ENOUGH: usize = 3;

/// Places among the fifths that are told apart: what lies beyond is noise.
const REACH: i32 = 32;

/// The notes of a sonority by their places, so that a chord asks for its own and no others.
pub(super) struct Weights<'a> {
    slice: &'a Slice,
    /// What all of it costs set aside.
    all: Cost,
    /// What the notes at a place cost set aside.
    aside: [Cost; 2 * REACH as usize],
    /// The places that sound, a bit each.
    sounding: u64,
    /// The places of notes that stand for others, and of those others.
    stand_ins: Vec<(u64, u64)>,
    /// The place of the lowest note.
    bass: Option<i32>,
}

/// A place as a bit.
fn bit(place: i32) -> u64 {
    let index = u32::try_from(place + REACH).ok();
    index
        .and_then(|index| 1_u64.checked_shl(index))
        .unwrap_or(0)
}

/// The places of a chord, a bit each.
fn places(chord: Chord) -> u64 {
    let tones = chord.quality.tones().iter();
    tones.fold(0, |bits, tone| bits | bit(chord.root + tone))
}

/// What must be heard of a chord for it to be tried: root and third; or root and fifth, and the
/// seventh if it has one.
pub(super) fn bodies(chord: Chord) -> [u64; 2] {
    let tone = |index: usize| {
        let tone = chord.quality.tones().get(index);
        tone.map_or(0, |tone| bit(chord.root + tone))
    };
    [tone(0) | tone(1), tone(0) | tone(2) | tone(3)]
}

impl<'a> Weights<'a> {
    pub(super) fn of(slice: &'a Slice) -> Weights<'a> {
        let mut weights = Weights {
            slice,
            all: 0,
            aside: [0; 2 * REACH as usize],
            sounding: 0,
            stand_ins: Vec::new(),
            bass: None,
        };
        for tone in &slice.tones {
            weights.all += tone.aside;
            weights.sounding |= bit(tone.place);
            let slot = usize::try_from(tone.place + REACH).ok();
            if let Some(slot) = slot.and_then(|slot| weights.aside.get_mut(slot)) {
                *slot += tone.aside;
            }
            if tone.is_bass {
                weights.bass = Some(tone.place);
            }
            if let Some(other) = tone.stands_for {
                weights.stand_ins.push((bit(tone.place), bit(other)));
            }
        }
        weights
    }

    /// The chord's places that sound, or are meant by a note that is none of it.
    fn meant(&self, own: u64) -> u64 {
        let strange = self.stand_ins.iter().filter(|(from, _)| from & own == 0);
        strange.fold(self.sounding & own, |bits, (_, to)| bits | (to & own))
    }

    /// All that sounds or may be meant.
    pub(super) fn all_meant(&self) -> u64 {
        self.meant(u64::MAX) | self.stand_ins.iter().fold(0, |bits, (_, to)| bits | to)
    }

    /// What a chord lacks or leaves out.
    pub(super) fn cost(&self, chord: Chord) -> Cost {
        // Two voices leave a root out more easily than four.
        let root = if self.slice.tones.len() < ENOUGH {
            70
        } else {
            130
        };
        let missing = [root, 70, 10, 240];
        let bass = [0, 5, 45, 20];
        let present = self.meant(places(chord));
        let mut aside = self.all;
        let mut share = prior(chord.quality);
        let tones = chord.quality.tones().iter().zip(missing).zip(bass);
        for ((tone, missing), in_bass) in tones {
            let place = chord.root + tone;
            let slot = usize::try_from(place + REACH).ok();
            aside -= slot
                .and_then(|slot| self.aside.get(slot))
                .copied()
                .unwrap_or(0);
            if present & bit(place) == 0 {
                share += missing;
            }
            if self.bass == Some(place) {
                share += in_bass;
            }
        }
        aside + self.slice.length * share / 100
    }

    /// What of a chord is heard.
    pub(super) fn heard(&self, chord: Chord) -> Heard {
        let own = places(chord);
        let mut voices = self.slice.tones.iter();
        let enough = voices
            .by_ref()
            .filter(|tone| bit(tone.place) & own != 0)
            .count()
            >= ENOUGH;
        let meant = self.meant(own);
        let has = |tone: usize| {
            let tone = chord.quality.tones().get(tone);
            tone.is_some_and(|tone| meant & bit(chord.root + tone) != 0)
        };
        let root = enough && has(0);
        Heard {
            root,
            whole: root && has(1),
        }
    }
}

/// How rare a quality is, in hundredths of a sonority's length.
const fn prior(quality: Quality) -> Cost {
    match quality {
        Quality::Major | Quality::Minor => 0,
        Quality::DominantSeventh => 10,
        Quality::Diminished | Quality::MajorSeventh => 20,
        Quality::DiminishedSeventh => 25,
        Quality::HalfDiminishedSeventh => 45,
        Quality::ItalianSixth | Quality::GermanSixth | Quality::FrenchSixth => 45,
        Quality::MinorSeventh => 50,
        Quality::Augmented => 60,
    }
}

/// What of a chord is heard in a sonority.
pub(super) struct Heard {
    /// Three voices sound notes of the chord, and its root is among those or meant by others.
    pub root: bool,
    /// Its third too: an open fifth has no quality, whatever the key would make of it.
    pub whole: bool,
}
