//! Findings about the text itself.

use partwright_rules::{Strictness, Style, entry};
use partwright_sheet::{Edit, Offer, Problem, ProblemKind, Reading};

use crate::finding::Finding;

/// The findings of the `writing` family.
pub(crate) fn findings(reading: &Reading, strictness: &Strictness) -> Vec<Finding> {
    let mut problems = reading.problems.clone();
    problems.extend(unknown_style(reading));
    problems
        .into_iter()
        .filter_map(|problem| finding(problem, reading, strictness))
        .collect()
}

fn finding(problem: Problem, reading: &Reading, strictness: &Strictness) -> Option<Finding> {
    let id = match problem.kind {
        ProblemKind::Reading => "reading",
        ProblemKind::OctaveDoubt => "octave-doubt",
        ProblemKind::Unwritten => "unwritten",
        ProblemKind::VoiceSilent => "voice-silent",
    };
    let entry = entry(id)?;
    if !strictness.takes(&entry.id, entry.family) {
        return None;
    }
    let severity = entry
        .rule
        .cases
        .first()?
        .setting(strictness.style)?
        .severity?;
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
    })
}

/// The sheet knows no styles; the catalogue does.
fn unknown_style(reading: &Reading) -> Option<Problem> {
    let named = reading.head.style.as_ref()?;
    if Style::named(&named.value).is_some() {
        return None;
    }
    let names: Vec<&str> = partwright_rules::STYLES.iter().map(|s| s.name()).collect();
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
