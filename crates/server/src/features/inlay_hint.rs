//! `textDocument/inlayHint`: the numbers of bars at the end of each system's first row, where no
//! column moves; and, where the user wants them, the intervals over the bass behind the notes, and
//! the names of chords in the lowest row.

use partwright_check::{Checked, fifths};
use partwright_score::Time;
use partwright_sheet::Span;
use tower_lsp::lsp_types::{InlayHint, InlayHintLabel, InlayHintTooltip, Range};

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
    let mut found: Vec<Hint> = Vec::new();
    for system in systems(checked).iter().filter(|system| within(system.span)) {
        if settings.bar_numbers
            && let Some((_, label)) = system.rows.first()
        {
            let line = text.line_from(label.start as usize);
            found.push(Hint::plain(line.end, system.name(checked).to_lowercase()));
        }
        if settings.intervals {
            intervals(system, checked, &mut found);
        }
        if settings.chords {
            chords(system, checked, &mut found);
        }
    }
    found.retain(|hint| range.start <= hint.at && hint.at <= range.end);
    found.sort_by_key(|hint| hint.at);
    let one = |hint: Hint| InlayHint {
        position: convert::range(text, Span::new(hint.at, hint.at), agreed.columns).start,
        label: InlayHintLabel::String(hint.label),
        kind: None,
        text_edits: None,
        tooltip: hint.more.map(InlayHintTooltip::String),
        padding_left: Some(true),
        padding_right: None,
        data: None,
    };
    Some(found.into_iter().map(one).collect())
}

/// One hint: where in the text, what it says, and what it says to the mouse.
struct Hint {
    at: usize,
    label: String,
    more: Option<String>,
}

impl Hint {
    fn plain(at: usize, label: String) -> Hint {
        Hint {
            at,
            label,
            more: None,
        }
    }
}

/// The stretch of time a system covers.
fn extent(system: &System, checked: &Checked) -> Option<(Time, Time)> {
    let score = &checked.reading.score;
    let bars = system.bars.clone().filter_map(|bar| score.bars.get(bar));
    bars.map(|bar| (bar.onset, bar.onset + bar.length))
        .reduce(|(from, until), (onset, end)| (from.min(onset), until.max(end)))
}

/// In the lowest row, behind what stands where a chord begins: its name as on a lead sheet, a
/// question mark where it is likely and no more, nothing where it would be a guess.
fn chords(system: &System, checked: &Checked, found: &mut Vec<Hint>) {
    let Some((from, until)) = extent(system, checked) else {
        return;
    };
    let Some(&(row, _)) = system.rows.last() else {
        return;
    };
    let piece = checked.piece();
    for chord in piece.chords().skip_while(|chord| chord.until() <= from) {
        let onset = chord.onset().max(from);
        if onset >= until {
            break;
        }
        let segment = chord.segment;
        let Some(span) = checked
            .reading
            .span_at(row, onset)
            .filter(|_| segment.is_likely())
        else {
            continue;
        };
        let bass = piece.texture.bass(segment.first).and_then(|bass| {
            let pitch = piece.texture.pitch(piece.score, segment.first, bass)?;
            segment.chord.tone(pitch).map(|_| fifths(pitch))
        });
        let doubt = if segment.is_sure() { "" } else { "?" };
        let key = segment
            .key
            .filter(|_| segment.key_is_likely())
            .map_or(String::new(), |key| format!(", in {}", key.name()));
        found.push(Hint {
            at: span.end as usize,
            label: format!("{}{doubt}", segment.chord.symbol(bass)),
            more: Some(format!("{}{key}", segment.chord.name())),
        });
    }
}

/// Behind every note that is struck over another bass note: the size of the interval between,
/// octaves taken away down to a tenth, as in figures.
fn intervals(system: &System, checked: &Checked, found: &mut Vec<Hint>) {
    let (reading, texture) = (&checked.reading, &checked.texture);
    let score = &reading.score;
    let Some((from, until)) = extent(system, checked) else {
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
            found.push(Hint::plain(span.end as usize, size.to_string()));
        }
    }
}
