//! Where a piece opens and closes, its cantus and its final.

use partwright_score::{Interval, Key, Pair};
use partwright_space::Family;

use super::{Piece, Sounding};
use crate::style::Style;

impl<'a> Piece<'a> {
    /// The first sonority in which all the voices sound, if it comes at once or after rests in
    /// the first bar only, and the piece has at least four sonorities.
    #[must_use]
    pub fn opening(self) -> Option<Sounding<'a>> {
        if self.texture.sonorities().len() < 4 || self.score.voices.len() < 2 {
            return None;
        }
        let all = (1_u128 << self.score.voices.len()) - 1;
        let first_bar = self.texture.sonorities().first()?.bar;
        let index = self
            .texture
            .sonorities()
            .iter()
            .position(|s| u128::from(s.sounding) == all)?;
        let there = self.sounding(index);
        let in_first_bar = there.sonority()?.bar == first_bar;
        let nothing_moved = self
            .texture
            .sonorities()
            .iter()
            .take(index)
            .skip(1)
            .all(|s| s.struck == 0);
        (in_first_bar && nothing_moved).then_some(there)
    }

    /// The last sonority in which something sounds, if the piece ends with `||` and is more than
    /// a fragment.
    #[must_use]
    pub fn close(self) -> Option<Sounding<'a>> {
        let mut sonorities = self.texture.sonorities().iter();
        let last = sonorities.rposition(|s| s.sounding != 0)?;
        (self.closes() && last >= 2).then_some(self.sounding(last))
    }

    /// Whether a voice is the cantus.
    #[must_use]
    pub fn is_cantus(self, voice: usize) -> bool {
        self.score.voices.get(voice).is_some_and(|v| v.cantus)
    }

    /// The cantus, or where none is declared the voice with the fewest notes. `None` with less
    /// than two voices.
    #[must_use]
    pub fn cantus_or_slowest(self) -> Option<usize> {
        let voices = &self.score.voices;
        let slowest = || {
            let notes = |v: usize| voices.get(v).map_or(0, |voice| voice.notes.len());
            (0..voices.len()).min_by_key(|&v| (notes(v), voices.len() - v))
        };
        let declared = voices.iter().position(|v| v.cantus);
        if voices.len() < 2 {
            None
        } else {
            declared.or_else(slowest)
        }
    }

    /// The species a voice is in under a style: its own, else the style's; a voice that
    /// accompanies is in the first. `None` for the cantus and outside species.
    #[must_use]
    pub fn species_of(self, voice: usize, style: Style) -> Option<u8> {
        let declared = self.score.voices.get(voice)?;
        let species = declared.species.or(style.species())?;
        if declared.cantus {
            return None;
        }
        Some(if self.accompanies(voice) { 1 } else { species })
    }

    /// The voices of one species against the cantus, and the cantus; none outside the species.
    #[must_use]
    pub fn in_species(self, species: u8, style: Style) -> Vec<(usize, usize)> {
        let Some(cantus) = self.cantus_or_slowest().filter(|_| style.is_species()) else {
            return Vec::new();
        };
        (0..self.score.voices.len())
            .filter(|&v| v != cantus && self.species_of(v, style) == Some(species))
            .map(|voice| (voice, cantus))
            .collect()
    }

    /// A voice without a species of its own that, in three parts and more, goes mostly in whole
    /// notes with the cantus.
    #[must_use]
    pub fn accompanies(self, voice: usize) -> bool {
        let declared = self.score.voices.get(voice);
        declared.is_some_and(|v| v.species.is_none())
            && self.score.voices.len() >= 3
            && self.cantus_or_slowest().is_some_and(|cantus| {
                let over = self.over_cantus(cantus, voice);
                let known = over.iter().filter(|o| !o.is_unknown && !o.is_silent());
                let whole = known.clone().filter(|o| o.is_one_whole()).count();
                whole * 2 > known.count()
            })
    }

    /// Whether a voice has the final at a sonority: the last note of a cantus that is whole, else
    /// the tonic of the key stated there. `None` where neither is known.
    #[must_use]
    pub fn has_final(self, there: Sounding<'_>, voice: usize) -> Option<bool> {
        let whole = self.closes();
        let cantus = self.score.voices.iter().find(|v| v.cantus && whole);
        let last = cantus.and_then(|v| v.notes.iter().rev().find_map(|n| n.sound.pitch()));
        let stated = self
            .score
            .keys
            .iter()
            .rev()
            .find(|change| change.from <= there.onset());
        let tonic = stated.and_then(|change| match change.value {
            Key::Of { tonic, .. } => Some(tonic),
            Key::None => None,
        });
        let last = last.or(tonic)?;
        let pitch = there.pitch(voice)?;
        Some(pitch.letter() == last.letter() && pitch.sign == last.sign)
    }

    /// The piece ends with `||`, and everything up to there is known.
    #[must_use]
    pub fn closes(self) -> bool {
        let closed = self.score.bars.last().is_some_and(|bar| bar.section_end);
        let last = self
            .texture
            .sonorities()
            .iter()
            .rposition(|s| s.sounding != 0)
            .unwrap_or(0);
        closed
            && self
                .texture
                .sonorities()
                .iter()
                .skip(last)
                .all(|s| s.unknown == 0)
    }
}

impl Sounding<'_> {
    /// The interval of two voices.
    #[must_use]
    pub fn interval_of(self, pair: Pair) -> Option<Interval> {
        self.piece
            .texture
            .gap(self.index, pair.upper, pair.lower)
            .map(Interval)
    }

    /// The perfect family of the interval of two voices.
    #[must_use]
    pub fn family_of(self, pair: Pair) -> Option<Family> {
        self.piece
            .texture
            .gap(self.index, pair.upper, pair.lower)?
            .family()
    }

    /// The pitch of a voice as text.
    #[must_use]
    pub fn pitch_text(self, voice: usize) -> String {
        self.pitch(voice).map(|p| p.to_string()).unwrap_or_default()
    }
}
