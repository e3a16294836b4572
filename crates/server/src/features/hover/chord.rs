//! What a hover says of the chord: its name, the local key, how certain both are, and the notes set
//! aside with what they are.

use std::fmt::Write;

use partwright_rules::Sounding;

use super::Page;

/// The chord as it is inferred, and what does not belong to it; nothing where that is a guess.
pub(super) fn chord(page: &mut Page, sounding: Sounding<'_>) {
    let Sounding { piece, index } = sounding;
    let harmony = piece.analysis.harmony(piece.score, piece.texture);
    let Some(segment) = harmony.at(index).filter(|s| s.is_likely()) else {
        return;
    };
    let mut line = format!("Chord: {}", page.strong(&segment.chord.name()));
    if segment.stated {
        line.push_str(" (stated)");
    } else if !segment.is_sure() {
        line.push_str(", likely but not certain");
    }
    if let Some(key) = segment.key.filter(|_| segment.key_is_likely()) {
        let doubt = if segment.key_is_sure() {
            ""
        } else {
            " (likely)"
        };
        let _ = write!(line, "; key: {}{doubt}", key.name());
    }
    if let Some(cadence) = sounding.chord().and_then(|chord| chord.cadence()) {
        let _ = write!(line, "; {}", cadence.name());
    }
    let beside = piece.texture.sounding(index).filter_map(|voice| {
        let pitch = sounding.pitch(voice)?;
        let belongs = segment.chord.tone(pitch).is_some();
        (!belongs).then(|| aside(sounding, voice))?
    });
    let beside: Vec<String> = beside.collect();
    page.paragraph(&format!("{line}."));
    if !beside.is_empty() {
        page.paragraph(&format!("Set aside: {}.", beside.join("; ")));
    }
}

/// `E4 in alto, a passing note from F4 to D4`.
fn aside(sounding: Sounding<'_>, voice: usize) -> Option<String> {
    let Sounding { piece, index } = sounding;
    let note = piece.texture.note(index, voice)?;
    let notes = &piece.score.voices.get(voice)?.notes;
    let pitch = |note: Option<usize>| notes.get(note?)?.sound.pitch();
    let here = pitch(Some(note))?;
    let mut said = format!("{here} in {}", piece.name(voice));
    let struck = piece.texture.at(notes.get(note)?.onset).unwrap_or(index);
    let mut found = (struck..=index).flat_map(|k| piece.analysis.dissonances_at(k));
    let reading = found.find_map(|d| d.reading.filter(|r| (r.voice, r.note) == (voice, note)));
    if let Some(reading) = reading {
        let name = reading.figure.name();
        let article = if name.starts_with(['a', 'e', 'i', 'o', 'u']) {
            "an"
        } else {
            "a"
        };
        let _ = write!(said, ", {article} {name}");
        if let Some(from) = pitch(note.checked_sub(1)) {
            let _ = write!(said, " from {from}");
        }
        if let Some(to) = pitch(note.checked_add(1)) {
            let _ = write!(said, " to {to}");
        }
    }
    Some(said)
}
