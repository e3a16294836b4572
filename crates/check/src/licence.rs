//! Licences: exceptions granted on purpose.

use partwright_rules::{catalogue, entry, is_family};
use partwright_score::{Score, Time};
use partwright_sheet::{Edit, Offer, Problem, ProblemKind, Reading, Span};

use crate::finding::{Finding, Lifted};
use crate::house::HouseLicence;

/// A licence, with where it holds.
struct Grant<'a> {
    rules: &'a [(String, Span)],
    reason: &'a str,
    holds: Holds<'a>,
    /// Where it is told that it is idle.
    span: Span,
    used: bool,
}

enum Holds<'a> {
    /// At the places of a mark.
    Mark(&'a str),
    /// In the whole sheet, for these voices; empty for all.
    Sheet(&'a [usize]),
}

/// Lifts the findings that a licence of the sheet names, and tells of licences that lift nothing
/// and of rules nobody knows.
pub(crate) fn apply(reading: &Reading, findings: &mut [Finding]) -> Vec<(&'static str, Problem)> {
    let mut grants: Vec<Grant<'_>> = Vec::new();
    for note in &reading.footnotes {
        let first = reading.marks.iter().find(|mark| mark.name == note.mark);
        grants.push(Grant {
            rules: &note.rules,
            reason: &note.reason,
            holds: Holds::Mark(&note.mark),
            span: first.map_or(note.mark_span, |mark| mark.span),
            used: first.is_none(),
        });
    }
    for licence in &reading.licences {
        let span = licence
            .rules
            .first()
            .map_or(licence.span, |(_, span)| *span);
        let holds = Holds::Sheet(&licence.voices);
        grants.push(Grant {
            rules: &licence.rules,
            reason: &licence.reason,
            holds,
            span,
            used: false,
        });
    }
    if grants.is_empty() {
        return Vec::new();
    }
    for finding in findings.iter_mut().filter(|f| f.rule != "reading") {
        for grant in &mut grants {
            let names = grant
                .rules
                .iter()
                .any(|(name, _)| covers(name, finding.rule));
            if names && holds(&grant.holds, finding, reading) {
                grant.used = true;
                let mark = match grant.holds {
                    Holds::Mark(mark) => Some(mark.to_owned()),
                    Holds::Sheet(_) => None,
                };
                finding.licence.get_or_insert(Lifted {
                    mark,
                    reason: grant.reason.to_owned(),
                });
            }
        }
    }
    let mut problems: Vec<(&'static str, Problem)> = Vec::new();
    for grant in &grants {
        let unknown: Vec<&(String, Span)> = grant
            .rules
            .iter()
            .filter(|(name, _)| !is_known(name))
            .collect();
        problems.extend(
            unknown
                .iter()
                .map(|(name, span)| ("reading", unknown_rule(name, *span))),
        );
        if !grant.used && unknown.len() < grant.rules.len() {
            problems.push(("licence-idle", idle(grant)));
        }
    }
    problems
}

/// A rule's own name, or its family's.
fn covers(name: &str, rule: &str) -> bool {
    name == rule || entry(rule).is_some_and(|entry| entry.family == name)
}

fn is_known(name: &str) -> bool {
    entry(name).is_some() || is_family(name)
}

fn holds(holds: &Holds<'_>, finding: &Finding, reading: &Reading) -> bool {
    match holds {
        Holds::Sheet(voices) => {
            voices.is_empty()
                || (!finding.voices.is_empty() && finding.voices.iter().all(|v| voices.contains(v)))
        }
        Holds::Mark(name) => {
            let mut marks = reading.marks.iter().filter(|mark| mark.name == *name);
            marks.any(|mark| {
                finding.voices.contains(&mark.voice)
                    && stands_at(finding, mark.voice, mark.at, reading)
            })
        }
    }
}

/// A mark stands at a finding if its part is the one written at that moment; at a passage, if it
/// stands on any of its notes.
fn stands_at(finding: &Finding, voice: usize, marked: Time, reading: &Reading) -> bool {
    let Some(at) = finding.at else { return false };
    let within = finding
        .until
        .is_some_and(|until| (at..until).contains(&marked));
    let same_part = || {
        let part = reading.span_at(voice, at);
        part.is_some() && part == reading.span_at(voice, marked)
    };
    within || marked == at || same_part()
}

fn idle(grant: &Grant<'_>) -> Problem {
    let names: Vec<&str> = grant.rules.iter().map(|(name, _)| name.as_str()).collect();
    let what = match grant.holds {
        Holds::Mark(mark) => format!("The licence *{mark}"),
        Holds::Sheet(_) => "This licence".to_owned(),
    };
    Problem {
        kind: ProblemKind::Reading,
        span: grant.span,
        message: format!(
            "{what} lifts nothing: no finding of {} stands where it points. Remove it.",
            names.join(" or ")
        ),
        offers: Vec::new(),
        voice: None,
        at: None,
    }
}

fn unknown_rule(name: &str, span: Span) -> Problem {
    let ids = catalogue().iter().map(|entry| entry.id.as_str());
    let names = ids.chain(partwright_rules::FAMILIES);
    let near = names.min_by_key(|id| strsim::damerau_levenshtein(id, name));
    let near = near.filter(|id| strsim::damerau_levenshtein(id, name) <= 1 + name.len() / 4);
    let help = near.map_or_else(
        || "See `partwright rules`.".to_owned(),
        |id| format!("Did you mean {id}?"),
    );
    Problem {
        kind: ProblemKind::Reading,
        span,
        message: format!("No rule is called {name}. {help}"),
        offers: near
            .map(|id| Offer {
                title: format!("Write {id}"),
                edits: vec![Edit {
                    span,
                    text: id.to_owned(),
                }],
            })
            .into_iter()
            .collect(),
        voice: None,
        at: None,
    }
}

/// Lifts the findings of a bare score that a house style's licences name.
pub(crate) fn apply_house(licences: &[HouseLicence], score: &Score, findings: &mut [Finding]) {
    for finding in findings.iter_mut().filter(|f| f.rule != "reading") {
        let label = |v: &usize| score.voices.get(*v).map(|voice| voice.label.as_str());
        let lifting = licences.iter().find(|licence| {
            let in_bars = licence
                .bars
                .is_none_or(|bars| finding.place.is_some_and(|p| bars.holds(p.bar)));
            let named = |v: &usize| label(v).is_some_and(|l| licence.voices.iter().any(|w| w == l));
            let in_voices = licence.voices.is_empty()
                || (!finding.voices.is_empty() && finding.voices.iter().all(named));
            licence.rules.iter().any(|name| covers(name, finding.rule)) && in_bars && in_voices
        });
        if let Some(licence) = lifting {
            finding.licence.get_or_insert(Lifted {
                mark: None,
                reason: licence.reason.clone(),
            });
        }
    }
}
