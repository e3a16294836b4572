//! What another rule tells already: one fact is told once, by the graver or more particular rule.
//!
//! The asking goes one way: no rule that is asked asks back.

use partwright_score::Time;

use crate::catalogue::entry;
use crate::finding::Finding;
use crate::found::Found;
use crate::rule::Looks;
use crate::view::{Chord, Discord, Line, PairMove, Sounding};

/// The rules that tell of a leap for itself.
const LEAPS: [&str; 5] = [
    "sixth-leap",
    "seventh-leap",
    "leap-beyond-octave",
    "augmented-interval",
    "diminished-interval",
];

impl Found<'_> {
    /// What a rule finds, asked under the same style and house.
    fn ask(&self, rule: &str, look: impl FnOnce(&Looks, &mut Found<'_>)) -> Vec<Finding> {
        let mut list = Vec::new();
        if let Some(entry) = entry(rule)
            && let Some(mut found) = self.beside(entry, &mut list)
        {
            look(&entry.rule.looks, &mut found);
        }
        list
    }

    /// One of the rules has a word on this step of a pair.
    #[must_use]
    pub fn is_told_of_pair(&self, rules: &[&str], step: &PairMove<'_>) -> bool {
        let tells = |rule: &&str| {
            let found = self.ask(rule, |looks, found| {
                if let Looks::Pairs(check) = looks {
                    check(step, found);
                }
            });
            !found.is_empty()
        };
        rules.iter().any(tells)
    }

    /// A rule has a word on this sonority.
    #[must_use]
    pub fn is_told_of_sonority(&self, rule: &str, there: &Sounding<'_>) -> bool {
        let found = self.ask(rule, |looks, found| {
            if let Looks::Sonorities(check) = looks {
                check(there, found);
            }
        });
        !found.is_empty()
    }

    /// A rule has a word on this dissonance.
    #[must_use]
    pub fn is_told_of_dissonance(&self, rule: &str, discord: &Discord<'_>) -> bool {
        let found = self.ask(rule, |looks, found| {
            if let Looks::Dissonances(check) = looks {
                check(discord, found);
            }
        });
        !found.is_empty()
    }

    /// One of the rules has a word on a fourth over the lowest voice that begins here.
    #[must_use]
    pub fn is_told_of_fourth(&self, there: &Sounding<'_>, rules: &[&str]) -> bool {
        let piece = there.piece;
        let mut all = piece.analysis.dissonances_at(there.index).iter();
        all.any(|dissonance| {
            let discord = Discord { piece, dissonance };
            let tells = |rule: &&str| self.is_told_of_dissonance(rule, &discord);
            discord.is_fourth_over_bass() && rules.iter().any(tells)
        })
    }

    /// The voices of which one of the rules has a word as they leave a chord.
    #[must_use]
    pub fn told_of_chord(&self, rules: &[&str], chord: &Chord<'_>) -> Vec<usize> {
        let on_chord = |rule: &&str| {
            self.ask(rule, |looks, found| {
                if let Looks::Chords(check) = looks {
                    check(chord, found);
                }
            })
        };
        let told = rules.iter().flat_map(on_chord);
        told.flat_map(|finding| finding.voices).collect()
    }

    /// The notes of a line on which one of the rules has a word, by their onsets, sorted.
    #[must_use]
    pub fn told_on_line(&self, rules: &[&str], line: &Line<'_>) -> Vec<Time> {
        let on_line = |rule: &&str| {
            self.ask(rule, |looks, found| {
                if let Looks::Lines(check) = looks {
                    check(line, found);
                }
            })
        };
        let mut told: Vec<Time> = rules.iter().flat_map(on_line).map(|f| f.spot.at).collect();
        told.sort_unstable();
        told
    }

    /// The leaps of a line that should not be there at all, or of which these rules have a word:
    /// by the onsets of the notes reached, sorted.
    #[must_use]
    pub fn leaps_told(&self, also: &[&str], line: &Line<'_>) -> Vec<Time> {
        self.told_on_line(&[&LEAPS, also].concat(), line)
    }
}
