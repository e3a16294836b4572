//! The voice sheet, our notation: text to a tree with spans, never failing; the tree to a score.
//!
//! [`Sheet::read`] takes text apart system by system; a bad part spoils that part only.
//! [`Sheet::lower`] turns the tree into a [`Reading`]: the score, what could not be read, and
//! where everything stands in the text.

mod problem;
mod span;

pub use problem::{Edit, Offer, Problem, ProblemKind};
pub use span::Span;

/// The largest sheet that is read, in bytes; a larger one is refused with that reason.
pub const LARGEST: usize = 8 << 20;
