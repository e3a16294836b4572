//! What a sheet says badly, doubtfully or not yet.

use partwright_score::Time;

use crate::Span;

/// The rule of the catalogue that reports a problem.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum ProblemKind {
    /// `reading`: it could not be read.
    Reading,
    /// `octave-doubt`: a carried octave figure makes a sixth or seventh.
    OctaveDoubt,
    /// `unwritten`: time that is not written yet.
    Unwritten,
    /// `voice-silent`: a declared voice has no row in a system.
    VoiceSilent,
}

/// One replacement in the text.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Edit {
    /// What goes.
    pub span: Span,
    /// What comes.
    pub text: String,
}

/// A right form near the wrong one, ready to apply.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Offer {
    /// What applying it does: `Write Bb4`.
    pub title: String,
    /// The replacements, in order, not overlapping.
    pub edits: Vec<Edit>,
}

/// Something to report about the text.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Problem {
    /// Which rule reports it.
    pub kind: ProblemKind,
    /// Where.
    pub span: Span,
    /// What was expected, in musical words, and the nearest right form where there is one.
    pub message: String,
    /// Right forms to choose from, the likeliest first.
    pub offers: Vec<Offer>,
    /// The voice it concerns, by index, where there is one.
    pub voice: Option<usize>,
    /// The moment it concerns, where it can be told.
    pub at: Option<Time>,
}
