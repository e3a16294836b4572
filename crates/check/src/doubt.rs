//! What rests on an octave that is in doubt.
//!
//! A note whose octave figure is carried over a sixth or seventh may be meant an octave off. Leaps,
//! motions, spacing and compass there are judged on a guess, and one missing figure would be told
//! many times over: they are told with the doubt, in one finding, which is as grave as the gravest
//! of them. Nothing is lost: once the figure is written, each is told for itself.

use partwright_rules::family_of;
use partwright_score::Score;

use crate::finding::Finding;

/// Takes what rests on a doubtful octave into the doubt itself.
pub(crate) fn gather(findings: &mut Vec<Finding>, score: &Score) {
    let is_doubt = |f: &Finding| f.rule == "octave-doubt" && f.licence.is_none();
    // The doubtful notes, by voice and index, each with its doubt.
    let mut doubts: Vec<((usize, usize), Finding)> = Vec::new();
    findings.retain(|finding| {
        let note = (finding.voices.first().copied().zip(finding.at))
            .filter(|_| is_doubt(finding))
            .and_then(|(voice, at)| Some((voice, score.note_at(voice, at)?)));
        doubts.extend(note.map(|note| (note, finding.clone())));
        note.is_none()
    });
    if doubts.is_empty() {
        return;
    }
    doubts.sort_by_key(|(note, _)| *note);
    let mut kept: Vec<Vec<&'static str>> = vec![Vec::new(); doubts.len()];
    findings.retain(|finding| {
        let Some(doubt) = doubt_of(finding, &doubts, score) else {
            return true;
        };
        if let (Some((_, doubt)), Some(rules)) = (doubts.get_mut(doubt), kept.get_mut(doubt)) {
            doubt.severity = doubt.severity.max(finding.severity);
            doubt.held.push(finding.severity);
            if !rules.contains(&finding.rule) {
                rules.push(finding.rule);
            }
        }
        false
    });
    for ((_, mut doubt), mut rules) in doubts.into_iter().zip(kept) {
        if !rules.is_empty() {
            rules.sort_unstable();
            let names = rules.join(", ").replace('-', " ");
            doubt.message = format!("{} With it go: {names}.", doubt.message);
        }
        findings.push(doubt);
    }
}

/// The doubt on which a finding rests: where it stands first, then what belongs to it.
fn doubt_of(
    finding: &Finding,
    doubts: &[((usize, usize), Finding)],
    score: &Score,
) -> Option<usize> {
    let family = family_of(finding.rule);
    let rests = matches!(family, Some("line" | "motion" | "range")) || finding.rule == "spacing";
    if !rests || finding.licence.is_some() {
        return None;
    }
    let here = finding
        .voices
        .iter()
        .map(|&voice| Some((voice, finding.at?)));
    let there = finding.related.iter().map(|r| Some((r.voice, r.at)));
    here.chain(there).flatten().find_map(|(voice, at)| {
        let note = (voice, score.note_at(voice, at)?);
        doubts.binary_search_by_key(&note, |(note, _)| *note).ok()
    })
}
