//! What is marked in the rows for a finding, and what the marks say.

use std::ops::Range;

use partwright_check::{Finding, Related, Role};
use partwright_score::{Score, Sound, Time};
use partwright_sheet::Span;

use super::Page;

/// A mark under the text.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) struct Mark {
    /// What it stands under, in bytes.
    pub(crate) span: Range<usize>,
    /// It is the place where the finding stands.
    pub(crate) primary: bool,
    /// What it says; may be empty.
    pub(crate) label: String,
}

/// The marks of a finding; the primary one is the first. None without a place in the text.
pub(crate) fn marks(page: &Page<'_>, finding: &Finding) -> Vec<Mark> {
    let Some(span) = finding.span else {
        return Vec::new();
    };
    let score = &page.checked.reading.score;
    let mut marks = vec![Mark {
        span: span.range(),
        primary: true,
        label: primary_label(score, finding),
    }];
    for related in &finding.related {
        let Some(span) = related.span else { continue };
        // Where the arrival stands in the same row, its label tells where the voice came from.
        let told = matches!(related.role, Role::From | Role::Struck)
            && arrival(finding, related.voice).is_some_and(|to| same_line(page.text, span, to));
        let label = if told {
            String::new()
        } else {
            related_label(score, finding, related)
        };
        marks.push(Mark {
            span: span.range(),
            primary: false,
            label,
        });
    }
    marks
}

/// Where a voice is at the moment of the finding.
fn arrival(finding: &Finding, voice: usize) -> Option<Span> {
    if primary_voice(finding) == Some(voice) {
        return finding.span;
    }
    finding
        .related
        .iter()
        .find(|r| r.role == Role::With && r.voice == voice)?
        .span
}

fn primary_voice(finding: &Finding) -> Option<usize> {
    let with = |voice: usize| {
        finding
            .related
            .iter()
            .any(|r| r.role == Role::With && r.voice == voice)
    };
    finding.voices.iter().copied().find(|voice| !with(*voice))
}

fn primary_label(score: &Score, finding: &Finding) -> String {
    // What is wrong with the writing, the message says.
    let (Some(voice), Some(at)) = (primary_voice(finding), finding.at) else {
        return String::new();
    };
    if partwright_rules::family_of(finding.rule) == Some("writing") {
        return String::new();
    }
    sounding(score, finding, voice, at).map_or_else(String::new, |words| {
        format!("{} {words}", score.voice_name(voice))
    })
}

pub(super) fn related_label(score: &Score, finding: &Finding, related: &Related) -> String {
    let name = score.voice_name(related.voice);
    match related.role {
        Role::With => match sounding(score, finding, related.voice, related.at) {
            Some(words) => format!("with {name} {words}"),
            None => format!("with {name}"),
        },
        Role::From => match pitch(score, related.voice, related.at) {
            Some(pitch) => format!("from {pitch}"),
            None => "from here".to_owned(),
        },
        Role::Resolves => "resolves here".to_owned(),
        Role::Struck => "struck here".to_owned(),
    }
}

/// What a voice does at a moment: `from D5 to E5`, `holds A4`, `on A4`.
fn sounding(score: &Score, finding: &Finding, voice: usize, at: Time) -> Option<String> {
    let to = pitch(score, voice, at)?;
    let from = finding
        .related
        .iter()
        .find(|r| r.role == Role::From && r.voice == voice);
    if let Some(from) = from.and_then(|from| pitch(score, voice, from.at)) {
        let stays = from == to;
        return Some(if stays {
            format!("stays on {to}")
        } else {
            format!("from {from} to {to}")
        });
    }
    let onset = score
        .note_at(voice, at)
        .and_then(|note| score.voices.get(voice)?.notes.get(note))?
        .onset;
    Some(if onset < at {
        format!("holds {to}")
    } else {
        format!("on {to}")
    })
}

fn pitch(score: &Score, voice: usize, at: Time) -> Option<String> {
    let note = score
        .voices
        .get(voice)?
        .notes
        .get(score.note_at(voice, at)?)?;
    match note.sound {
        Sound::Pitch(pitch) => Some(pitch.to_string()),
        Sound::Rest | Sound::Unwritten | Sound::Spoilt => None,
    }
}

fn same_line(text: &str, a: Span, b: Span) -> bool {
    let (first, last) = (a.start.min(b.start) as usize, a.start.max(b.start) as usize);
    text.get(first..last)
        .is_some_and(|between| !between.contains('\n'))
}
