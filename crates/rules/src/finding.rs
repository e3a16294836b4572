//! Findings, in terms of voices and moments.

use partwright_score::Time;

use crate::rule::Severity;

/// A voice at a moment.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub struct Spot {
    /// The voice, by index.
    pub voice: usize,
    /// The moment, in whole notes from the start.
    pub at: Time,
}

/// What a related place has to do with a finding.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Role {
    /// Where a voice comes from.
    From,
    /// Another voice's note at the same moment.
    With,
    /// The note that resolves it, or would have.
    Resolves,
    /// Where the note that still sounds was struck.
    Struck,
}

impl Role {
    /// The word reports use.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Role::From => "from",
            Role::With => "with",
            Role::Resolves => "resolves",
            Role::Struck => "struck",
        }
    }
}

/// A place where a rule is broken.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Finding {
    /// The rule's id.
    pub rule: &'static str,
    /// How much the style minds.
    pub severity: Severity,
    /// What, where and what to do, in a musician's words.
    pub message: String,
    /// The voices involved, in score order.
    pub voices: Vec<usize>,
    /// Where it stands: a step at its arrival, a passage at its beginning.
    pub spot: Spot,
    /// Where a passage ends.
    pub until: Option<Time>,
    /// The other notes involved.
    pub related: Vec<(Role, Spot)>,
}
