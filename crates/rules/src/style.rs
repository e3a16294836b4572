//! Styles: a base plus overrides, each with its reason.
//!
//! The overrides stand in the rule files, beside the cases they set, so that a rule is added in
//! one file; the shape of a style (its base and what it is for) stands here.

use std::iter::{once, successors};

use partwright_score::Score;

use crate::catalogue::Entry;
use crate::rule::{Case, NumberOf, Severity};

/// Which rules apply, and how strictly. The order is the order of every list.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Style {
    /// Free common practice.
    Free,
    /// The four-part chorale of the 18th century.
    Chorale,
    /// 16th-century vocal polyphony.
    Motet,
    /// Strict counterpoint, note against note.
    Species1,
    /// Two notes against one.
    Species2,
    /// Four notes against one.
    Species3,
    /// Suspensions.
    Species4,
    /// Florid.
    Species5,
}

/// Every style, in the order of lists.
pub const STYLES: [Style; 8] = [
    Style::Free,
    Style::Chorale,
    Style::Motet,
    Style::Species1,
    Style::Species2,
    Style::Species3,
    Style::Species4,
    Style::Species5,
];

impl Style {
    /// The name a sheet uses.
    #[must_use]
    pub const fn name(self) -> &'static str {
        match self {
            Style::Free => "free",
            Style::Chorale => "chorale",
            Style::Motet => "motet",
            Style::Species1 => "species-1",
            Style::Species2 => "species-2",
            Style::Species3 => "species-3",
            Style::Species4 => "species-4",
            Style::Species5 => "species-5",
        }
    }

    /// The style of that name.
    #[must_use]
    pub fn named(name: &str) -> Option<Style> {
        STYLES.into_iter().find(|style| style.name() == name)
    }

    /// What it stands for, in a line.
    #[must_use]
    pub const fn summary(self) -> &'static str {
        match self {
            Style::Free => "free common practice",
            Style::Chorale => "the four-part chorale of the 18th century",
            Style::Motet => "16th-century vocal polyphony",
            Style::Species1 => "strict counterpoint, note against note",
            Style::Species2 => "strict counterpoint, two notes against one",
            Style::Species3 => "strict counterpoint, four notes against one",
            Style::Species4 => "strict counterpoint, suspensions",
            Style::Species5 => "strict counterpoint, florid",
        }
    }

    /// The style it starts from.
    #[must_use]
    pub const fn base(self) -> Option<Style> {
        match self {
            Style::Free => None,
            Style::Chorale | Style::Motet | Style::Species1 => Some(Style::Free),
            Style::Species2 | Style::Species3 | Style::Species4 | Style::Species5 => {
                Some(Style::Species1)
            }
        }
    }

    /// Itself, its base, and so on.
    pub fn with_bases(self) -> impl Iterator<Item = Style> {
        successors(Some(self), |style| style.base())
    }

    /// The species, 1 to 5.
    #[must_use]
    pub const fn species(self) -> Option<u8> {
        match self {
            Style::Species1 => Some(1),
            Style::Species2 => Some(2),
            Style::Species3 => Some(3),
            Style::Species4 => Some(4),
            Style::Species5 => Some(5),
            Style::Free | Style::Chorale | Style::Motet => None,
        }
    }

    /// The style of a species, 1 to 5.
    #[must_use]
    pub fn of_species(species: u8) -> Option<Style> {
        STYLES
            .into_iter()
            .find(|style| style.species() == Some(species))
    }

    /// Its dissonances are judged by the chord they stand in.
    #[must_use]
    pub const fn has_chords(self) -> bool {
        matches!(self, Style::Free | Style::Chorale)
    }

    /// Whether it is one of the five species.
    #[must_use]
    pub const fn is_species(self) -> bool {
        matches!(
            self,
            Style::Species1 | Style::Species2 | Style::Species3 | Style::Species4 | Style::Species5
        )
    }
}

/// One override: how strictly a style takes a case, and why.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Setting {
    /// The style.
    pub style: Style,
    /// Its severity; `None` allows.
    pub severity: Option<Severity>,
    /// The reason, with its source where it is not among the rule's own.
    pub because: &'static str,
}

const fn setting(style: Style, severity: Option<Severity>, because: &'static str) -> Setting {
    Setting {
        style,
        severity,
        because,
    }
}

/// The style forbids it.
#[must_use]
pub const fn fault(style: Style, because: &'static str) -> Setting {
    setting(style, Some(Severity::Fault), because)
}

/// The style discourages it.
#[must_use]
pub const fn weakness(style: Style, because: &'static str) -> Setting {
    setting(style, Some(Severity::Weakness), because)
}

/// The style only remarks on it.
#[must_use]
pub const fn remark(style: Style, because: &'static str) -> Setting {
    setting(style, Some(Severity::Remark), because)
}

/// The style allows it.
#[must_use]
pub const fn allow(style: Style, because: &'static str) -> Setting {
    setting(style, None, because)
}

/// A change of severity that a house style makes.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Override {
    /// A rule's id or a family's name.
    pub rule: String,
    /// The case it is about, by name; all cases where it is `None`.
    pub case: Option<String>,
    /// The severity; `None` switches the rule off.
    pub severity: Option<Severity>,
}

/// A number of a rule that a house style sets anew.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Number {
    /// The rule's id.
    pub rule: String,
    /// The number's name.
    pub name: String,
    /// Its value.
    pub value: i32,
}

/// How strictly a check is done: a style, what a house changes in it, and which rules take part.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Strictness {
    /// The style.
    pub style: Style,
    /// Changes of severity; a later one goes before an earlier one.
    pub overrides: Vec<Override>,
    /// Numbers set anew; a later one goes before an earlier one.
    pub numbers: Vec<Number>,
    /// Pair rules look across the ends of phrases too.
    pub across_phrases: bool,
    /// Only these rules and families; empty for all.
    pub pick: Vec<String>,
    /// Not these rules and families.
    pub drop: Vec<String>,
}

impl Strictness {
    /// A style with nothing changed.
    #[must_use]
    pub const fn plain(style: Style) -> Strictness {
        Strictness {
            style,
            overrides: Vec::new(),
            numbers: Vec::new(),
            across_phrases: false,
            pick: Vec::new(),
            drop: Vec::new(),
        }
    }

    /// The same with every rule taking part.
    #[must_use]
    pub fn with_all_rules(&self) -> Strictness {
        Strictness {
            pick: Vec::new(),
            drop: Vec::new(),
            ..self.clone()
        }
    }

    /// Whether a rule takes part; dropping comes after picking.
    #[must_use]
    pub fn takes(&self, id: &str, family: &str) -> bool {
        let named = |list: &[String]| list.iter().any(|name| name == id || name == family);
        (self.pick.is_empty() || named(&self.pick)) && !named(&self.drop)
    }

    /// How much a case of a rule is minded: the house's word, else the style's. `None` allows.
    #[must_use]
    pub fn severity(&self, id: &str, family: &str, case: &Case) -> Option<Severity> {
        self.severity_in(self.style, id, family, case)
    }

    /// The same for a voice in a species of its own.
    #[must_use]
    pub fn severity_in(
        &self,
        style: Style,
        id: &str,
        family: &str,
        case: &Case,
    ) -> Option<Severity> {
        let about = |o: &&Override| {
            (o.rule == id || o.rule == family)
                && o.case.as_deref().is_none_or(|name| name == case.name)
        };
        match self.overrides.iter().rev().find(about) {
            Some(change) => change.severity,
            None => case.setting(style)?.severity,
        }
    }

    /// Whether any case of a rule can be minded in a score: a rule that the style allows
    /// throughout need not be asked.
    #[must_use]
    pub fn minds(&self, entry: &Entry, score: &Score) -> bool {
        let own = score.voices.iter().filter_map(|voice| voice.species);
        let own = own
            .filter_map(Style::of_species)
            .filter(|_| self.style.is_species());
        let mut styles = once(self.style).chain(own);
        styles.any(|style| {
            let severity = |case| self.severity_in(style, &entry.id, entry.family, case);
            entry.rule.cases.iter().any(|case| severity(case).is_some())
        })
    }

    /// The value of a rule's number: the house's, else the rule's own.
    #[must_use]
    pub fn number(&self, id: &str, number: &NumberOf) -> i32 {
        let set = self
            .numbers
            .iter()
            .rev()
            .find(|n| n.rule == id && n.name == number.name);
        set.map_or(number.value, |n| n.value)
    }
}
