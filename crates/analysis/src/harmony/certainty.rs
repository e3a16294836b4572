//! When a reading is sure enough to act on.

use super::Segment;

/// From this margin on 49 answers in 50 are an analyst's, about root and triad, a seventh and the
/// key: measured on 2,378 moments of 44 chorales, and no worse on the half that nothing was tuned on.
pub const SURE: i64 = 80;

impl Segment {
    /// Root and triad are certain enough to act on. Holds for four chords in five of the chorales;
    /// of those 98.9 in a hundred have the analyst's root and triad.
    #[must_use]
    pub const fn is_sure(&self) -> bool {
        self.margin >= SURE
    }

    /// The root is certain enough to act on, though the third may be missing.
    #[must_use]
    pub const fn root_is_sure(&self) -> bool {
        self.root_margin >= SURE
    }

    /// Not certain enough to act on, yet worth telling to whoever asks: nine in ten agree.
    #[must_use]
    pub const fn is_likely(&self) -> bool {
        self.margin * 2 >= SURE
    }

    /// That the chord has a seventh, or none, is certain enough to act on, and the chord itself.
    /// Holds for seven chords in ten; of those 98.5 in a hundred are the analyst's in all three.
    #[must_use]
    pub const fn seventh_is_sure(&self) -> bool {
        self.is_sure() && self.seventh_margin >= SURE
    }

    /// The local key is certain enough to act on. Holds for two chords in three; of those 98.4 in a
    /// hundred are in the analyst's key.
    #[must_use]
    pub const fn key_is_sure(&self) -> bool {
        self.key.is_some() && self.key_margin >= SURE
    }

    /// The local key is not certain enough to act on, yet worth telling: three in four agree.
    #[must_use]
    pub const fn key_is_likely(&self) -> bool {
        self.key.is_some() && self.key_margin * 2 >= SURE
    }
}
