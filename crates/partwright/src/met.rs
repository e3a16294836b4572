//! What the sheets of a call hold of what its filters name.

use std::collections::BTreeSet;

use partwright_score::Score;

use crate::arguments::Scope;
use crate::names::near;
use crate::prose::list;

/// The voices and bars met in a call.
#[derive(Debug, Default)]
pub(crate) struct Met {
    /// The labels of all voices.
    labels: BTreeSet<String>,
    /// The highest bar number; `None` without a bar.
    last_bar: Option<u32>,
}

impl Met {
    /// Those of a score.
    pub(crate) fn of(score: &Score) -> Met {
        let labels = score.voices.iter().map(|voice| voice.label.clone());
        Met {
            labels: labels.collect(),
            last_bar: score.bars.last().map(|bar| bar.number),
        }
    }

    /// Adds those of another.
    pub(crate) fn add(&mut self, other: Met) {
        self.labels.extend(other.labels);
        self.last_bar = self.last_bar.max(other.last_bar);
    }

    /// What is said of voices and bars that no sheet has: a clean score would not be told from a
    /// wrong call.
    pub(crate) fn missing(&self, scope: &Scope) -> Vec<String> {
        let known: Vec<&str> = self.labels.iter().map(String::as_str).collect();
        let voice = |label: &String| {
            let advice = match near(label, known.iter().copied()).first() {
                Some(near) => format!("did you mean {near}?"),
                None if known.len() <= 12 => format!("there is {}", list(&known)),
                None => "give the label of its rows".to_owned(),
            };
            format!("--voices: no voice has the label {label}; {advice}")
        };
        let lost = |label: &&String| !known.is_empty() && !self.labels.contains(*label);
        let mut missing: Vec<String> = scope.voices.iter().filter(lost).map(voice).collect();
        if let (Some(bars), Some(last)) = (scope.bars, self.last_bar)
            && bars.first > last
        {
            let first = bars.first;
            missing.push(format!(
                "--bars: there is no bar {first}; the last is bar {last}"
            ));
        }
        missing
    }
}
