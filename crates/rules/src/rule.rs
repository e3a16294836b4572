//! What a rule is.

use std::fmt;

use crate::found::Found;
use crate::source::Source;
use crate::style::{Setting, Style};
use crate::view::{Chord, Discord, Line, PairMove, Piece, Sounding};

/// How much a style minds.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Severity {
    /// Worth knowing.
    Remark,
    /// The style discourages it.
    Weakness,
    /// The style forbids it.
    Fault,
}

impl Severity {
    /// The word reports use.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Severity::Remark => "remark",
            Severity::Weakness => "weakness",
            Severity::Fault => "fault",
        }
    }
}

impl fmt::Display for Severity {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.word())
    }
}

/// The families of rules: the folders of the catalogue, in the order of lists.
pub const FAMILIES: [&str; 9] = [
    "line",
    "motion",
    "sonority",
    "dissonance",
    "cadence",
    "harmony",
    "species",
    "range",
    "writing",
];

/// Where a rule looks.
#[derive(Clone, Copy)]
pub enum Looks {
    /// Every step of every pair of voices that sound on both sides, are two voices, and do not
    /// end a phrase between.
    Pairs(fn(&PairMove<'_>, &mut Found<'_>)),
    /// Every sonority.
    Sonorities(fn(&Sounding<'_>, &mut Found<'_>)),
    /// Every dissonance.
    Dissonances(fn(&Discord<'_>, &mut Found<'_>)),
    /// Every chord of which root and triad are sure.
    Chords(fn(&Chord<'_>, &mut Found<'_>)),
    /// Every voice as a line.
    Lines(fn(&Line<'_>, &mut Found<'_>)),
    /// The piece as a whole: passages.
    Piece(fn(&Piece<'_>, &mut Found<'_>)),
    /// Nowhere: the reading of the text itself reports it.
    Text,
}

/// One prohibition. Its id is its file's name, its family its folder, its title the first line
/// of its page.
pub struct Rule {
    /// Where it looks, and the function that does.
    pub looks: Looks,
    /// Its cases; the first is the ordinary one.
    pub cases: &'static [&'static Case],
    /// The numbers in its conditions that a house style may set anew.
    pub numbers: &'static [&'static NumberOf],
    /// Who says so.
    pub sources: &'static [Source],
}

/// A number in a rule's conditions.
#[derive(Debug)]
pub struct NumberOf {
    /// Its name in a house style.
    pub name: &'static str,
    /// What it means, in words, with its unit.
    pub means: &'static str,
    /// Its ordinary value.
    pub value: i32,
    /// The least and the most it may be.
    pub bounds: (i32, i32),
}

/// A case of a rule, with its severity by style.
pub struct Case {
    /// A short name, usable in a house style; empty for a rule's only case.
    pub name: &'static str,
    /// When it applies, in words.
    pub when: &'static str,
    /// How strictly each style takes it. A style not named takes its base's setting.
    pub settings: &'static [Setting],
}

impl Case {
    /// The setting that holds in a style: its own, or its base's. `None` where no style on the
    /// way says anything, which allows.
    #[must_use]
    pub fn setting(&self, style: Style) -> Option<&'static Setting> {
        style
            .with_bases()
            .find_map(|s| self.settings.iter().find(|setting| setting.style == s))
    }
}
