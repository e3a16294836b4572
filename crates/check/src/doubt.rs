//! What rests on an octave that is in doubt.
//!
//! A note whose octave figure is carried over a sixth or seventh may be meant an octave off. Leaps,
//! motions, spacing and compass there are judged on a guess, and one missing figure would be told
//! many times over: they are told with the doubt, in one finding, which is as grave as the gravest
//! of them. Nothing is lost: once the figure is written, each is told for itself.
//!
//! The notes behind it that carry its octave on would be moved with it. How they move is known, but
//! not where they lie: of them, what is judged by place waits too.

use std::collections::BTreeMap;

use partwright_rules::family_of;
use partwright_sheet::Reading;

use crate::finding::Finding;

/// A note, by voice and index.
type Place = (usize, usize);

/// The notes whose octave is in doubt.
struct Doubtful<'a> {
    reading: &'a Reading,
    /// The doubts, in order of their notes.
    heads: Vec<(Place, Finding)>,
    /// The notes that carry a doubtful octave on, each with its doubt.
    tails: BTreeMap<Place, usize>,
}

/// Takes what rests on a doubtful octave into the doubt itself.
pub(crate) fn gather(findings: &mut Vec<Finding>, reading: &Reading, text: &str) {
    let is_doubt = |f: &Finding| f.rule == "octave-doubt" && f.licence.is_none();
    let mut heads: Vec<(Place, Finding)> = Vec::new();
    findings.retain(|finding| {
        let note = (finding.voices.first().copied().zip(finding.at))
            .filter(|_| is_doubt(finding))
            .and_then(|(voice, at)| Some((voice, reading.score.note_at(voice, at)?)));
        heads.extend(note.map(|note| (note, finding.clone())));
        note.is_none()
    });
    if heads.is_empty() {
        return;
    }
    heads.sort_by_key(|(note, _)| *note);
    let tails = tails(&heads, reading, text);
    let mut doubtful = Doubtful {
        reading,
        heads,
        tails,
    };
    let mut waiting: Vec<Vec<&'static str>> = vec![Vec::new(); doubtful.heads.len()];
    findings.retain(|finding| {
        let Some(doubt) = doubtful.under(finding) else {
            return true;
        };
        if let (Some((_, doubt)), Some(rules)) =
            (doubtful.heads.get_mut(doubt), waiting.get_mut(doubt))
        {
            doubt.severity = doubt.severity.max(finding.severity);
            doubt.held.push(finding.severity);
            if !rules.contains(&finding.rule) {
                rules.push(finding.rule);
            }
        }
        false
    });
    for ((_, mut doubt), mut rules) in doubtful.heads.into_iter().zip(waiting) {
        if !rules.is_empty() {
            rules.sort_unstable();
            let names = rules.join(", ").replace('-', " ");
            doubt.message = format!("{} Until then there wait: {names}.", doubt.message);
        }
        findings.push(doubt);
    }
}

/// The notes behind doubtful ones, to the next that writes its figure.
fn tails(heads: &[(Place, Finding)], reading: &Reading, text: &str) -> BTreeMap<Place, usize> {
    let mut tails = BTreeMap::new();
    for (index, ((voice, head), _)) in heads.iter().enumerate() {
        let notes = reading
            .score
            .voices
            .get(*voice)
            .map_or(0, |v| v.notes.len());
        let Some(mut before) = reading.span_of_note(*voice, *head) else {
            continue;
        };
        for note in head + 1..notes {
            let Some(span) = reading.span_of_note(*voice, note) else {
                continue;
            };
            let gap = text.get(before.end as usize..span.start as usize);
            let written = text.get(span.range()).unwrap_or_default();
            let is_head = heads
                .binary_search_by_key(&(*voice, note), |(n, _)| *n)
                .is_ok();
            let same_row = gap.is_some_and(|gap| !gap.contains('\n'));
            if is_head || !same_row || written.ends_with(|c: char| c.is_ascii_digit()) {
                break;
            }
            tails.insert((*voice, note), index);
            before = span;
        }
    }
    tails
}

impl Doubtful<'_> {
    /// The doubt on which a finding rests.
    fn under(&self, finding: &Finding) -> Option<usize> {
        let family = family_of(finding.rule)?;
        let rests = matches!(family, "line" | "motion" | "range") || finding.rule == "spacing";
        if !rests || finding.licence.is_some() {
            return None;
        }
        let here = finding
            .voices
            .iter()
            .map(|&voice| Some((voice, finding.at?)));
        let there = finding.related.iter().map(|r| Some((r.voice, r.at)));
        let score = &self.reading.score;
        let notes: Vec<Place> = here
            .chain(there)
            .flatten()
            .filter_map(|(voice, at)| Some((voice, score.note_at(voice, at)?)))
            .collect();
        let head = |note: &Place| self.heads.binary_search_by_key(note, |(n, _)| *n).ok();
        let tail = |note: &Place| self.tails.get(note).copied();
        let by_place =
            family == "range" || matches!(finding.rule, "spacing" | "crossing" | "overlap");
        // A leap out of the stretch is as doubtful as the one into it.
        let leaves = family == "line" && notes.iter().any(|note| tail(note).is_none());
        let moved = || notes.iter().find_map(tail).filter(|_| by_place || leaves);
        notes.iter().find_map(head).or_else(moved)
    }
}
