//! What a musician reads in a score before any rule is asked: which notes are dissonant, and what
//! each of those notes is.
//!
//! One module a reading, each with its own tests. Nothing here judges: a figure that one style
//! praises and another forbids is the same figure.

pub mod consonance;
pub mod figures;
pub mod harmony;
pub mod mode;

use std::ops::Range;
use std::sync::OnceLock;

use partwright_score::{Score, Texture};

use harmony::Harmony;

pub use figures::{Dissonance, Figure, Reading};
pub use mode::Final;

/// All that was read, computed once for all rules.
#[derive(Clone, Debug, Default)]
pub struct Analysis {
    dissonances: Vec<Dissonance>,
    /// Of an earlier state of the score.
    earlier: Option<Box<Harmony>>,
    /// Read when it is first asked for: many styles never do.
    harmony: OnceLock<Harmony>,
}

impl Analysis {
    /// Reads a score. Linear in sonorities times pairs of voices.
    #[must_use]
    pub fn of(score: &Score, texture: &Texture) -> Analysis {
        Analysis {
            dissonances: figures::dissonances(score, texture),
            earlier: None,
            harmony: OnceLock::new(),
        }
    }

    /// Reads a score of which an earlier state was read before: chords that an edit cannot reach
    /// are taken over.
    #[must_use]
    pub fn again(score: &Score, texture: &Texture, earlier: &Analysis) -> Analysis {
        let known = earlier.harmony.get().or(earlier.earlier.as_deref());
        Analysis {
            earlier: known.cloned().map(Box::new),
            ..Analysis::of(score, texture)
        }
    }

    /// The chords and keys of the score this was read from.
    #[must_use]
    pub fn harmony(&self, score: &Score, texture: &Texture) -> &Harmony {
        self.harmony.get_or_init(|| {
            let earlier = self.earlier.as_deref();
            Harmony::again(score, texture, &self.dissonances, earlier)
        })
    }

    /// The dissonances in order of time.
    #[must_use]
    pub fn dissonances(&self) -> &[Dissonance] {
        &self.dissonances
    }

    /// The dissonances that begin at a sonority.
    #[must_use]
    pub fn dissonances_at(&self, sonority: usize) -> &[Dissonance] {
        self.dissonances_within(sonority..sonority + 1)
    }

    /// The dissonances that begin in a range of sonorities.
    #[must_use]
    pub fn dissonances_within(&self, range: Range<usize>) -> &[Dissonance] {
        let first = self
            .dissonances
            .partition_point(|d| d.sonority < range.start);
        let end = self.dissonances.partition_point(|d| d.sonority < range.end);
        self.dissonances.get(first..end).unwrap_or_default()
    }
}
