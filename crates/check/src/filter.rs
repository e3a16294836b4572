//! Showing only some of the findings: bars and voices.

use std::fmt;
use std::str::FromStr;

use partwright_score::Score;

use crate::Finding;

/// A run of bars by their numbers, both ends included: `12..20`, `12..`, `..20`, `12`.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct BarRange {
    /// The first bar.
    pub first: u32,
    /// The last bar.
    pub last: u32,
}

impl BarRange {
    /// Whether a bar number lies inside.
    #[must_use]
    pub fn holds(self, bar: u32) -> bool {
        (self.first..=self.last).contains(&bar)
    }
}

/// Why a filter makes no sense.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum FilterError {
    /// The text is no run of bars.
    Bars(String),
}

impl fmt::Display for FilterError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let FilterError::Bars(text) = self;
        write!(
            f,
            "{text} is no run of bars: expected bar numbers such as 12..20, 12.. or 12"
        )
    }
}

impl std::error::Error for FilterError {}

impl FromStr for BarRange {
    type Err = FilterError;

    fn from_str(text: &str) -> Result<BarRange, FilterError> {
        let wrong = || FilterError::Bars(text.to_owned());
        let number = |part: &str, default| match part {
            "" => Ok(default),
            digits => digits.parse().map_err(|_| wrong()),
        };
        let (first, last) = match text.split_once("..") {
            Some((first, last)) => (number(first, 0)?, number(last, u32::MAX)?),
            None => {
                let bar = text.parse().map_err(|_| wrong())?;
                (bar, bar)
            }
        };
        if text == ".." || first > last {
            Err(wrong())
        } else {
            Ok(BarRange { first, last })
        }
    }
}

/// Which findings are shown.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Filter {
    /// Only those that stand in these bars; a passage counts where it begins.
    pub bars: Option<BarRange>,
    /// Only those in which one of these voices, by label, takes part; empty for all.
    pub voices: Vec<String>,
}

impl Filter {
    /// Whether a finding is shown. One without a place, in the lines before the music, is shown
    /// unless voices are named.
    #[must_use]
    pub fn shows(&self, finding: &Finding, score: &Score) -> bool {
        let in_bars = match (self.bars, finding.place) {
            (Some(range), Some(place)) => range.holds(place.bar),
            _ => true,
        };
        let label = |v: &usize| score.voices.get(*v).map(|voice| voice.label.as_str());
        let in_voices = self.voices.is_empty()
            || finding
                .voices
                .iter()
                .any(|v| label(v).is_some_and(|l| self.voices.iter().any(|w| w == l)));
        in_bars && in_voices
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn bar_ranges() {
        let range = |text: &str| text.parse::<BarRange>().map(|r| (r.first, r.last));
        assert_eq!(range("12..20"), Ok((12, 20)));
        assert_eq!(range("12.."), Ok((12, u32::MAX)));
        assert_eq!(range("..3"), Ok((0, 3)));
        assert_eq!(range("7"), Ok((7, 7)));
        for text in ["", "..", "a", "5..2", "1..2..3", "-1"] {
            assert!(range(text).is_err(), "{text}");
        }
    }
}
