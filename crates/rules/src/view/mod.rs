//! What a rule sees: a pair's step, a sonority, a line, the piece.
//!
//! These views only read what `partwright_score` laid out, and put it into a musician's words.

mod account;
mod altered;
mod cadence;
mod chord;
mod chord_moves;
mod close;
mod degree;
mod discord;
mod doubling;
mod ending;
mod figure;
mod held;
mod levels;
mod line;
mod pair;
mod piece;
mod rhythm;
mod shape;
mod six_four;
mod sounding;
mod stated;
mod tendency;
mod vocal;

use partwright_analysis::harmony::Segment;
use partwright_analysis::{Analysis, Dissonance};
use partwright_score::{Pair, PairStep, Score, Texture};

pub use altered::Altered;
pub use cadence::Cadence;
pub use chord::{Member, Tone};
pub use chord_moves::CrossRelation;
pub use degree::{MinorDegree, Tessitura};
pub use doubling::{Doubled, Doubling};
pub use ending::LastMove;
pub use held::{Numbers, SixFive, Together};
pub use levels::{Level, ParallelRun, Succession};
pub use line::{LineMove, Run};
pub use pair::Direct;
pub use piece::{Crossing, Passage};
pub use rhythm::{Minim, Over, Quick, Stroke};
pub use shape::{HighPoint, Passing, Stretch};
pub use six_four::{SixFour, SixFourUse, SixFourWant};
pub use stated::{StatedHarmony, Stranger};
pub use tendency::{Leaving, Reached};
pub use vocal::Value;

/// A score with its texture, and what was read in it.
#[derive(Clone, Copy, Debug)]
pub struct Piece<'a> {
    /// The score.
    pub score: &'a Score,
    /// Its sonorities and steps.
    pub texture: &'a Texture,
    /// Dissonances and their figures.
    pub analysis: &'a Analysis,
}

/// One sonority, and the step into it.
#[derive(Clone, Copy)]
pub struct Sounding<'a> {
    /// The piece.
    pub piece: Piece<'a>,
    /// Which sonority, from 0.
    pub index: usize,
}

/// One pair of voices and its step into a sonority.
#[derive(Clone, Copy)]
pub struct PairMove<'a> {
    /// The sonority it arrives at.
    pub sounding: Sounding<'a>,
    /// The two voices.
    pub pair: Pair,
    /// What they do.
    pub step: &'a PairStep,
}

/// Two notes that disagree.
#[derive(Clone, Copy)]
pub struct Discord<'a> {
    /// The piece.
    pub piece: Piece<'a>,
    /// What was read of it.
    pub dissonance: &'a Dissonance,
}

/// One chord, as long as it lasts.
#[derive(Clone, Copy)]
pub struct Chord<'a> {
    /// The piece.
    pub piece: Piece<'a>,
    /// Which chord, from 0.
    pub index: usize,
    /// What was inferred.
    pub segment: &'a Segment,
}

/// One voice as a line.
#[derive(Clone, Copy)]
pub struct Line<'a> {
    /// The piece.
    pub piece: Piece<'a>,
    /// The voice, by index.
    pub voice: usize,
    /// Its moves from note to note.
    pub moves: &'a [LineMove],
}
