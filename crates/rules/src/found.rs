//! The list a rule writes its findings to.

use partwright_score::{Score, Time};

use crate::catalogue::Entry;
use crate::finding::{Finding, Role, Spot};
use crate::rule::{Case, NumberOf, Severity};
use crate::style::{Strictness, Style};
use crate::view::{Discord, Line, LineMove, Member, PairMove, Succession};

/// Collects the findings of one rule under one style.
pub struct Found<'a> {
    rule: &'static str,
    family: &'static str,
    strictness: &'a Strictness,
    score: &'a Score,
    list: &'a mut Vec<Finding>,
}

impl<'a> Found<'a> {
    /// A collector for a rule.
    pub fn new(
        entry: &'static Entry,
        strictness: &'a Strictness,
        score: &'a Score,
        list: &'a mut Vec<Finding>,
    ) -> Found<'a> {
        Found {
            rule: &entry.id,
            family: entry.family,
            strictness,
            score,
            list,
        }
    }

    /// A collector for another rule, under the same style and house; `None` where that rule takes
    /// no part.
    pub(crate) fn beside<'b>(
        &'b self,
        entry: &'static Entry,
        list: &'b mut Vec<Finding>,
    ) -> Option<Found<'b>> {
        let takes = self.strictness.takes(&entry.id, entry.family);
        takes.then(|| Found::new(entry, self.strictness, self.score, list))
    }

    /// The style in force.
    #[must_use]
    pub fn style(&self) -> Style {
        self.strictness.style
    }

    /// The style in force for some voices: in species counterpoint a voice may be in a species of
    /// its own, and of several the freest speaks.
    #[must_use]
    pub fn style_of(&self, voices: &[usize]) -> Style {
        let style = self.strictness.style;
        let own = voices
            .iter()
            .filter_map(|&v| self.score.voices.get(v)?.species)
            .max();
        match own.and_then(Style::of_species) {
            Some(own) if style.is_species() => own,
            _ => style,
        }
    }

    fn severity_of(&self, case: &'static Case, voices: &[usize]) -> Option<Severity> {
        let style = self.style_of(voices);
        self.strictness
            .severity_in(style, self.rule, self.family, case)
    }

    /// How much the style minds a case; `None` where it allows it.
    #[must_use]
    pub fn severity(&self, case: &'static Case) -> Option<Severity> {
        self.strictness.severity(self.rule, self.family, case)
    }

    /// The value of one of the rule's numbers.
    #[must_use]
    pub fn number(&self, number: &NumberOf) -> i32 {
        self.strictness.number(self.rule, number)
    }

    /// A finding about a pair's step: it stands at the arrival and names the notes it left.
    /// The message is only made where the style minds.
    pub fn pair(
        &mut self,
        case: &'static Case,
        step: &PairMove<'_>,
        message: impl FnOnce() -> String,
    ) {
        let Some(severity) = self.severity_of(case, &[step.pair.upper, step.pair.lower]) else {
            return;
        };
        let (upper, lower) = (step.pair.upper, step.pair.lower);
        let spot = |voice, at| Spot { voice, at };
        self.list.push(Finding {
            rule: self.rule,
            severity,
            message: message(),
            voices: vec![upper, lower],
            spot: spot(upper, step.arrival()),
            until: None,
            related: vec![
                (Role::From, spot(upper, step.left_at(upper))),
                (Role::From, spot(lower, step.left_at(lower))),
                (Role::With, spot(lower, step.arrival())),
            ],
        });
    }

    /// A finding about two moments with notes between: it stands at the later one and names the
    /// notes of the earlier one.
    pub fn succession(
        &mut self,
        case: &'static Case,
        succession: &Succession<'_>,
        message: impl FnOnce() -> String,
    ) {
        let before = self.list.len();
        self.pair(case, &succession.step, message);
        let Some(finding) = self.list.get_mut(before) else {
            return;
        };
        for (role, spot) in &mut finding.related {
            if *role == Role::From {
                spot.at = succession.struck_at(spot.voice);
            }
        }
    }

    /// A finding about one voice's move: it stands at the note reached.
    pub fn line(
        &mut self,
        case: &'static Case,
        line: &Line<'_>,
        step: &LineMove,
        message: impl FnOnce() -> String,
    ) {
        let Some(severity) = self.severity_of(case, &[line.voice]) else {
            return;
        };
        let spot = |at| Spot {
            voice: line.voice,
            at,
        };
        self.list.push(Finding {
            rule: self.rule,
            severity,
            message: message(),
            voices: vec![line.voice],
            spot: spot(step.to.onset),
            until: None,
            related: vec![(Role::From, spot(step.from.onset))],
        });
    }

    /// A finding about a dissonance: it stands at the dissonant note where that begins to disagree.
    pub fn dissonance(
        &mut self,
        case: &'static Case,
        discord: &Discord<'_>,
        message: impl FnOnce() -> String,
    ) {
        self.accused(case, discord, discord.dissonant(), message);
    }

    /// The same about one of the two notes that is not the struck one, or the held one.
    pub fn accused(
        &mut self,
        case: &'static Case,
        discord: &Discord<'_>,
        accused: (usize, usize),
        message: impl FnOnce() -> String,
    ) {
        let (voice, other) = (accused.0, discord.dissonance.other(accused.0).0);
        let Some(severity) = self.severity_of(case, &[voice]) else {
            return;
        };
        let at = discord.dissonance.at;
        let mut related = vec![(Role::With, Spot { voice: other, at })];
        let note = discord.note(accused);
        if let Some(note) = note.filter(|note| note.onset < at) {
            related.push((
                Role::Struck,
                Spot {
                    voice,
                    at: note.onset,
                },
            ));
        }
        self.list.push(Finding {
            rule: self.rule,
            severity,
            message: message(),
            voices: vec![voice.min(other), voice.max(other)],
            spot: Spot { voice, at },
            until: None,
            related,
        });
    }

    /// A finding about two ornaments that clash: it stands at the dissonant note and names the
    /// other of the two.
    pub fn clash(
        &mut self,
        case: &'static Case,
        discord: &Discord<'_>,
        other: usize,
        message: impl FnOnce() -> String,
    ) {
        let (voice, at) = (discord.dissonant().0, discord.dissonance.at);
        self.sonority(case, &[voice, other], at, message);
    }

    /// A finding about a sonority: it stands where it begins, in the first of the voices.
    pub fn sonority(
        &mut self,
        case: &'static Case,
        voices: &[usize],
        at: Time,
        message: impl FnOnce() -> String,
    ) {
        let before = self.list.len();
        self.passage(case, voices, (at, at), message);
        if let Some(finding) = self.list.get_mut(before) {
            finding.until = None;
        }
    }

    /// A finding about a note of one chord that goes to a note of the next: it stands at the
    /// note reached.
    pub fn member(
        &mut self,
        case: &'static Case,
        (from, to): (&Member, &Member),
        message: impl FnOnce() -> String,
    ) {
        let Some(severity) = self.severity_of(case, &[to.voice]) else {
            return;
        };
        let spot = |member: &Member| Spot {
            voice: member.voice,
            at: member.onset,
        };
        self.list.push(Finding {
            rule: self.rule,
            severity,
            message: message(),
            voices: vec![to.voice],
            spot: spot(to),
            until: None,
            related: vec![(Role::From, spot(from))],
        });
    }

    /// A finding about a passage: it stands at the beginning, once, with its extent.
    pub fn passage(
        &mut self,
        case: &'static Case,
        voices: &[usize],
        (at, until): (Time, Time),
        message: impl FnOnce() -> String,
    ) {
        let Some(severity) = self.severity_of(case, voices) else {
            return;
        };
        let Some((&first, others)) = voices.split_first() else {
            return;
        };
        self.list.push(Finding {
            rule: self.rule,
            severity,
            message: message(),
            voices: voices.to_vec(),
            spot: Spot { voice: first, at },
            until: Some(until),
            related: others
                .iter()
                .map(|&voice| (Role::With, Spot { voice, at }))
                .collect(),
        });
    }
}
