//! What a musician reads in a score before any rule is asked: which notes are dissonant, and what
//! each of those notes is.
//!
//! One module a reading, each with its own tests. Nothing here judges: a figure that one style
//! praises and another forbids is the same figure.

pub mod consonance;
pub mod figures;
pub mod harmony;
pub mod mode;

use partwright_score::{Score, Texture};

pub use figures::{Dissonance, Figure, Reading};
pub use mode::Final;

/// All that was read, computed once for all rules.
#[derive(Clone, Debug, Default)]
pub struct Analysis {
    dissonances: Vec<Dissonance>,
}

impl Analysis {
    /// Reads a score. Linear in sonorities times pairs of voices.
    #[must_use]
    pub fn of(score: &Score, texture: &Texture) -> Analysis {
        Analysis {
            dissonances: figures::dissonances(score, texture),
        }
    }

    /// The dissonances in order of time.
    #[must_use]
    pub fn dissonances(&self) -> &[Dissonance] {
        &self.dissonances
    }

    /// The dissonances that begin at a sonority.
    #[must_use]
    pub fn dissonances_at(&self, sonority: usize) -> &[Dissonance] {
        let first = self.dissonances.partition_point(|d| d.sonority < sonority);
        let end = self.dissonances.partition_point(|d| d.sonority <= sonority);
        self.dissonances.get(first..end).unwrap_or_default()
    }
}
