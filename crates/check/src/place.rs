//! From voices and moments to places in the music and in the text.

use partwright_rules::{Finding as Bare, Role, Spot};
use partwright_score::Score;
use partwright_sheet::Reading;

use crate::finding::{Finding, Related};

/// A finding on a sheet: every place with its span.
pub(crate) fn in_text(bare: Bare, reading: &Reading) -> Finding {
    let mut finding = in_score(bare.clone(), &reading.score);
    finding.span = reading.span_at(bare.spot.voice, bare.spot.at);
    for related in &mut finding.related {
        related.span = reading.span_at(related.voice, related.at);
    }
    finding.related.extend(struck(bare.spot, reading));
    finding
}

/// Where the note that sounds at a spot was struck, if that was earlier.
fn struck(spot: Spot, reading: &Reading) -> Option<Related> {
    let note = reading.score.note_at(spot.voice, spot.at)?;
    let onset = reading.score.voices.get(spot.voice)?.notes.get(note)?.onset;
    (onset < spot.at).then(|| Related {
        role: Role::Struck,
        voice: spot.voice,
        at: onset,
        place: reading.score.place(onset),
        span: reading.span_of_note(spot.voice, note),
    })
}

/// A finding on a bare score.
pub(crate) fn in_score(bare: Bare, score: &Score) -> Finding {
    let related = bare.related.iter().map(|&(role, spot)| Related {
        role,
        voice: spot.voice,
        at: spot.at,
        place: score.place(spot.at),
        span: None,
    });
    Finding {
        rule: bare.rule,
        severity: bare.severity,
        related: related.collect(),
        message: bare.message,
        voices: bare.voices,
        at: Some(bare.spot.at),
        place: Some(score.place(bare.spot.at)),
        until: bare.until,
        span: None,
        offers: Vec::new(),
        licence: None,
        held: Vec::new(),
    }
}
