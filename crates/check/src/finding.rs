//! A finding as the shells see it: in the music and in the text.

use partwright_rules::{Role, Severity};
use partwright_score::{BarPlace, Time};
use partwright_sheet::{Offer, Span};

/// A place where a rule is broken.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Finding {
    /// The rule's id.
    pub rule: &'static str,
    /// How much the style minds.
    pub severity: Severity,
    /// What, where and what to do, in a musician's words.
    pub message: String,
    /// The voices involved, by index, in score order.
    pub voices: Vec<usize>,
    /// When, in whole notes from the start; `None` for the lines before the music.
    pub at: Option<Time>,
    /// The same as bar and beat.
    pub place: Option<BarPlace>,
    /// Where a passage ends.
    pub until: Option<Time>,
    /// Where in the text; `None` for a bare score.
    pub span: Option<Span>,
    /// The other notes involved.
    pub related: Vec<Related>,
    /// Right forms to choose from, where the text is at fault.
    pub offers: Vec<Offer>,
    /// The licence that lifts it.
    pub licence: Option<Lifted>,
    /// How grave the findings are that wait for this one to be settled: they rest on an octave that
    /// is in doubt.
    pub held: Vec<Severity>,
}

/// The licence that lifts a finding.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Lifted {
    /// The mark's letters; `None` for a licence of the whole sheet or of the house.
    pub mark: Option<String>,
    /// Why.
    pub reason: String,
}

/// Another place that belongs to a finding.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Related {
    /// What it has to do with the finding.
    pub role: Role,
    /// The voice, by index.
    pub voice: usize,
    /// When.
    pub at: Time,
    /// The same as bar and beat.
    pub place: BarPlace,
    /// Where in the text; `None` for a bare score.
    pub span: Option<Span>,
}

/// Sorts by place in the score (the lines before the music first), then by rule, then by voices
/// and place in the text: two runs give the same order.
pub(crate) fn sort(findings: &mut [Finding]) {
    findings
        .sort_by(|a, b| (a.at, a.rule, &a.voices, a.span).cmp(&(b.at, b.rule, &b.voices, b.span)));
}
