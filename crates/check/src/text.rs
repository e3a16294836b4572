//! Findings about the text itself.

use partwright_rules::{Strictness, Style, entry};
use partwright_sheet::{Edit, Offer, Problem, ProblemKind, Reading};

use crate::Wishes;
use crate::finding::Finding;

/// The findings about the text that reading it gave.
pub(crate) fn findings(
    reading: &Reading,
    wishes: &Wishes,
    strictness: &Strictness,
) -> Vec<Finding> {
    let told = reading.problems.iter().cloned().map(|problem| {
        let id = match problem.kind {
            ProblemKind::Reading => "reading",
            ProblemKind::OctaveDoubt => "octave-doubt",
            ProblemKind::Unwritten => "unwritten",
            ProblemKind::VoiceSilent => "voice-silent",
        };
        (id, problem)
    });
    let style = unknown_style(reading, wishes).map(|problem| ("reading", problem));
    told.chain(style)
        .filter_map(|(id, problem)| finding(id, problem, reading, strictness))
        .collect()
}

/// A problem as a finding of a rule of the `writing` family.
pub(crate) fn finding(
    id: &str,
    problem: Problem,
    reading: &Reading,
    strictness: &Strictness,
) -> Option<Finding> {
    let entry = entry(id)?;
    if !strictness.takes(&entry.id, entry.family) {
        return None;
    }
    let case = entry.rule.cases.first()?;
    let severity = strictness.severity(&entry.id, entry.family, case)?;
    Some(Finding {
        rule: &entry.id,
        severity,
        message: problem.message,
        voices: problem.voice.into_iter().collect(),
        at: problem.at,
        place: problem.at.map(|at| reading.score.place(at)),
        until: None,
        span: Some(problem.span),
        related: Vec::new(),
        offers: problem.offers,
        licence: None,
        held: Vec::new(),
    })
}

/// The sheet knows no styles; the catalogue does.
fn unknown_style(reading: &Reading, wishes: &Wishes) -> Option<Problem> {
    let named = reading.head.style.as_ref()?;
    if Style::named(&named.value).is_some() || wishes.house_is_called(&named.value) {
        return None;
    }
    let house = wishes
        .house
        .as_ref()
        .and_then(|house| house.name.as_deref());
    let names: Vec<&str> = partwright_rules::STYLES
        .iter()
        .map(|s| s.name())
        .chain(house)
        .collect();
    let near = names
        .iter()
        .find(|name| strsim::damerau_levenshtein(name, &named.value) <= 2);
    Some(Problem {
        kind: ProblemKind::Reading,
        span: named.span,
        message: format!(
            "No style is called {}. Expected one of {}.",
            named.value,
            names.join(", ")
        ),
        offers: near
            .map(|name| Offer {
                title: format!("Write {name}"),
                edits: vec![Edit {
                    span: named.span,
                    text: (*name).to_owned(),
                }],
            })
            .into_iter()
            .collect(),
        voice: None,
        at: None,
    })
}
