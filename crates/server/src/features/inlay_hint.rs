//! `textDocument/inlayHint`: the numbers of bars at the end of each system's first row, where no
//! column moves; and, where the user wants them, the intervals over the bass behind the notes.

use partwright_check::Checked;
use partwright_sheet::Span;
use tower_lsp::lsp_types::{InlayHint, InlayHintLabel, Range};

use crate::convert;
use crate::documents::Outcome;
use crate::features::code_action::bytes;
use crate::session::{Agreed, Settings};
use crate::systems::{System, systems};

/// The hints in a range.
pub(crate) fn hints(
    outcome: &Outcome,
    range: Range,
    settings: &Settings,
    agreed: Agreed,
) -> Option<Vec<InlayHint>> {
    let checked = outcome.checked()?;
    let text = &outcome.snapshot.text;
    let range = bytes(text, range, agreed);
    let within = |span: Span| {
        let span = span.range();
        span.start <= range.end && range.start <= span.end
    };
    let mut found: Vec<(usize, String)> = Vec::new();
    for system in systems(checked).iter().filter(|system| within(system.span)) {
        if settings.bar_numbers
            && let Some((_, label)) = system.rows.first()
        {
            let line = text.line_from(label.start as usize);
            found.push((line.end, system.name(checked).to_lowercase()));
        }
        if settings.intervals {
            intervals(system, checked, &mut found);
        }
    }
    found.retain(|(at, _)| range.start <= *at && *at <= range.end);
    found.sort_by_key(|(at, _)| *at);
    let one = |(at, label)| InlayHint {
        position: convert::range(text, Span::new(at, at), agreed.columns).start,
        label: InlayHintLabel::String(label),
        kind: None,
        text_edits: None,
        tooltip: None,
        padding_left: Some(true),
        padding_right: None,
        data: None,
    };
    Some(found.into_iter().map(one).collect())
}

/// Behind every note that is struck over another bass note: the size of the interval between,
/// octaves taken away down to a tenth, as in figures.
fn intervals(system: &System, checked: &Checked, found: &mut Vec<(usize, String)>) {
    let (reading, texture) = (&checked.reading, &checked.texture);
    let score = &reading.score;
    let bars = system.bars.clone().filter_map(|bar| score.bars.get(bar));
    let ends =
        |(from, until), (onset, end)| (std::cmp::min(from, onset), std::cmp::max(until, end));
    let Some((from, until)) = bars
        .map(|bar| (bar.onset, bar.onset + bar.length))
        .reduce(ends)
    else {
        return;
    };
    for &(voice, _) in &system.rows {
        let notes = score.voices.get(voice).map_or(&[][..], |v| &v.notes);
        let first = notes.partition_point(|note| note.onset < from);
        for note in notes.iter().skip(first).take_while(|n| n.onset < until) {
            let Some(pitch) = note.sound.pitch() else {
                continue;
            };
            let bass = texture.sounding_at(note.onset).and_then(|k| {
                let bass = texture.bass(k).filter(|&bass| bass != voice)?;
                let under = score.note_at(bass, note.onset)?;
                score.voices.get(bass)?.notes.get(under)?.sound.pitch()
            });
            let (Some(bass), Some(span)) = (bass, reading.span_at(voice, note.onset)) else {
                continue;
            };
            let size = (pitch.step - bass.step).abs() + 1;
            // 8 stays 8, 10 stays 10; 11 and up are told within the octave.
            let size = if size > 10 { (size - 2) % 7 + 2 } else { size };
            found.push((span.end as usize, size.to_string()));
        }
    }
}
