//! What the house style in force changes, and why.

use std::sync::Arc;

use partwright_check::{Checked, Choice, House, Wishes};
use partwright_rules::{Case, Entry, NumberOf, Severity, Strictness, Style};

use crate::houses::Houses;
use crate::prose::block;
use crate::report::{Plain, heading};

/// The house style of the current folder.
pub(super) struct InForce {
    house: Arc<House>,
    /// Its file, as messages call it.
    file: String,
    strictness: Strictness,
}

impl InForce {
    pub(super) fn of(house: &Arc<House>, houses: &Houses) -> InForce {
        let wishes = Wishes {
            style: Some(Choice::House),
            house: Some(Arc::clone(house)),
            ..Wishes::default()
        };
        InForce {
            file: house
                .files
                .first()
                .map_or(String::new(), |f| houses.shown(f)),
            // What a check would go by.
            strictness: Checked::text("", &wishes).strictness,
            house: Arc::clone(house),
        }
    }

    pub(super) fn is_called(&self, name: &str) -> bool {
        self.house.name.as_deref() == Some(name)
    }

    /// `quayside (partwright.toml), from chorale`.
    pub(super) fn title(&self) -> String {
        let base = self.strictness.style;
        match &self.house.name {
            Some(name) => format!("{name} ({}), from {}", self.file, base.name()),
            None => format!("{}, from {}", self.file, base.name()),
        }
    }

    /// The name, or what stands for one.
    pub(super) fn name(&self) -> &str {
        self.house.name.as_deref().unwrap_or("the house style")
    }

    /// The style it starts from.
    pub(super) fn base(&self) -> Style {
        self.strictness.style
    }

    /// How strictly it takes a case.
    pub(super) fn severity(&self, entry: &Entry, case: &Case) -> Option<Severity> {
        self.strictness.severity(&entry.id, entry.family, case)
    }

    /// The value it goes by for a number of a rule.
    pub(super) fn number(&self, entry: &Entry, number: &NumberOf) -> i32 {
        self.strictness.number(&entry.id, number)
    }

    /// How strictly it takes a rule: as its strictest case.
    pub(super) fn strictest(&self, entry: &Entry) -> Option<Severity> {
        let cases = entry.rule.cases.iter();
        cases.filter_map(|case| self.severity(entry, case)).max()
    }

    /// What it changes in some rules, each with its reason; `all` tells that they are the whole
    /// catalogue.
    pub(super) fn changes(&self, entries: &[&Entry], all: bool, look: Plain) -> String {
        let mut text = format!(
            "{}\n",
            look.paint(heading(), &format!("House style {}", self.title()))
        );
        let before = text.len();
        for name in self.names() {
            if entries.iter().any(|e| e.id == name || e.family == name) {
                let words = format!("{name}: {}", self.change(name).join("; "));
                text.push_str(&block(&words, look.width, 2));
                for reason in self.reasons(name) {
                    text.push_str(&block(reason, look.width, 6));
                }
            }
        }
        if all && self.house.across_phrases {
            let words = "Across the ends of phrases too, steps are looked at.";
            text.push_str(&block(words, look.width, 2));
        }
        if all && !self.house.licences.is_empty() {
            let words = crate::prose::count(self.house.licences.len(), "licence", "licences");
            text.push_str(&block(
                &format!("{words} for files by their paths."),
                look.width,
                2,
            ));
        }
        if text.len() == before {
            let base = self.base().name();
            text.push_str(&block(
                &format!("Nothing here differs from {base}."),
                look.width,
                2,
            ));
        }
        text
    }

    /// The rules and families it names, each once, in the order of the file.
    fn names(&self) -> Vec<&str> {
        let overrides = self.house.overrides.iter().map(|o| o.rule.as_str());
        let numbers = self.house.numbers.iter().map(|n| n.rule.as_str());
        let mut names: Vec<&str> = Vec::new();
        for name in overrides.chain(numbers) {
            if !names.contains(&name) {
                names.push(name);
            }
        }
        names
    }

    /// What it does to a rule or family: `weakness (outer)`, `bass 24`. A later word goes before
    /// an earlier one.
    fn change(&self, name: &str) -> Vec<String> {
        let mut words = Vec::new();
        for (i, change) in self.house.overrides.iter().enumerate() {
            if change.rule != name || self.is_overruled(i) {
                continue;
            }
            let severity = change.severity.map_or("off", Severity::word);
            let case = change.case.as_deref().filter(|case| !case.is_empty());
            words.push(match case {
                Some(case) => format!("{severity} ({case})"),
                None => severity.to_owned(),
            });
        }
        for (i, number) in self.house.numbers.iter().enumerate() {
            let mut later = self.house.numbers.iter().skip(i + 1);
            let last = !later.any(|n| (&n.rule, &n.name) == (&number.rule, &number.name));
            if number.rule == name && last {
                words.push(format!("{} {}", number.name, number.value));
            }
        }
        words
    }

    /// Whether a later change speaks of the same, or of all of the rule.
    fn is_overruled(&self, index: usize) -> bool {
        let overrides = &self.house.overrides;
        let Some(change) = overrides.get(index) else {
            return false;
        };
        let mut later = overrides.iter().skip(index + 1);
        later.any(|o| o.rule == change.rule && (o.case.is_none() || o.case == change.case))
    }

    /// Why. The reasons of one rule's severities stand in the order of its changes; where numbers
    /// are set too, all of them are told.
    fn reasons(&self, name: &str) -> Vec<&str> {
        let reasons = self.house.reasons.iter().filter(|(rule, _)| rule == name);
        let reasons: Vec<&str> = reasons.map(|(_, reason)| reason.as_str()).collect();
        let overrides = self.house.overrides.iter().enumerate();
        let overrides: Vec<usize> = overrides
            .filter(|(_, o)| o.rule == name)
            .map(|(i, _)| i)
            .collect();
        let mut told: Vec<&str> = Vec::new();
        for (i, reason) in reasons.iter().enumerate() {
            let overruled = overrides.len() == reasons.len()
                && overrides.get(i).is_some_and(|&i| self.is_overruled(i));
            if !overruled && !told.contains(reason) {
                told.push(reason);
            }
        }
        told
    }
}
