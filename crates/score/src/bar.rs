//! Bars and places in them, as a conductor counts.

use crate::{Metre, Time, show_time};

/// A bar, or one half of a bar that a section end splits.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Bar {
    /// The number a conductor calls: a pickup is 0; both halves of a split bar have one number.
    pub number: u32,
    /// Where it begins, in whole notes from the start.
    pub onset: Time,
    /// How long it lasts.
    pub length: Time,
    /// How far into the full bar it begins: a pickup, or the second half of a split bar.
    pub lead: Time,
    /// Its metre, as an index into the score's metres.
    pub metre: u32,
    /// A section ends with it (`||`): the phrase of every voice.
    pub section_end: bool,
}

/// A moment as a musician says it.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Place {
    /// Bar number.
    pub bar: u32,
    /// Beat, counted from 1 in units of the metre's lower figure; may be a fraction.
    pub beat: Time,
}

impl Bar {
    /// The beat at a moment inside this bar.
    #[must_use]
    pub fn beat(&self, metre: &Metre, at: Time) -> Time {
        (self.lead + at - self.onset) / metre.unit() + 1
    }
}

impl Place {
    /// The beat as text: `3`, `5/2`.
    #[must_use]
    pub fn beat_text(&self) -> String {
        show_time(self.beat)
    }
}
