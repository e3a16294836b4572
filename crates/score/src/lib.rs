//! The score: spelled pitches, exact time, bars, voices; sonorities as points and steps as
//! vectors, computed once and laid out for scanning.
//!
//! A [`Score`] is what the notation or an interchange file says. A [`Texture`] is what follows
//! from it: every moment at which something begins ([`Sonority`]), and for every pair of voices
//! how it got there ([`PairStep`]).

mod bar;
pub mod fifths;
mod interval;
mod key;
mod kind;
mod metre;
mod pitch;
mod score;
mod stated;
mod texture;
mod time;
mod voice;

pub use bar::{Bar, Place as BarPlace};
pub use interval::Interval;
pub use key::{Key, Mode};
pub use kind::{Compass, KINDS, Kind};
pub use metre::{Metre, MetreError};
pub use pitch::{Pitch, PitchError};
pub use score::{Change, Note, Score, Sound};
pub use stated::{FigureSign, StatedChord, StatedFigure, StatedFigures, StatedKey};
pub use texture::{Pair, PairStep, Sonority, Texture};
pub use time::{Time, ZERO, show_time};
pub use voice::Voice;

/// The most voices a score may have: a set of voices is one machine word.
pub const MOST_VOICES: usize = 64;
