//! A short stretch of a score, so that trying a change costs the same in a long piece as in a
//! short one.

use partwright_score::{Note, Score, Texture, Time, Voice};

/// Sonorities kept on either side of a finding: enough for what any rule looks at around a step.
const MARGIN: usize = 12;

/// A stretch of a score that holds a moment or passage with a margin around it.
pub(crate) struct Window {
    /// The stretch; its voices are those of the score.
    pub(crate) score: Score,
    /// The first and last moment at which a change could bring something new.
    pub(crate) inner: (Time, Time),
}

impl Window {
    pub(crate) fn around(score: &Score, texture: &Texture, from: Time, until: Time) -> Window {
        let sonorities = texture.sonorities();
        let first = texture.sounding_at(from).unwrap_or(0);
        let last = texture.sounding_at(until).unwrap_or(first).max(first);
        let onset = |index: usize| {
            sonorities
                .get(index)
                .map_or_else(|| score.end(), |s| s.onset)
        };
        let (start, end) = (onset(first.saturating_sub(MARGIN)), onset(last + MARGIN));
        Window {
            score: cut(score, start, end),
            inner: (
                onset(first.saturating_sub(MARGIN / 2)),
                onset(last + MARGIN / 2),
            ),
        }
    }
}

/// The notes that sound from `start` up to `end`, the bars whole.
fn cut(score: &Score, start: Time, end: Time) -> Score {
    let voices = score.voices.iter().map(|voice| {
        let notes = voice
            .notes
            .iter()
            .filter(|note| note.end() > start && note.onset < end);
        let notes = notes.map(|note| Note {
            onset: note.onset.max(start),
            length: note.end() - note.onset.max(start),
            ..*note
        });
        Voice {
            notes: notes.collect(),
            ..voice.clone()
        }
    });
    let bars = score
        .bars
        .iter()
        .filter(|bar| bar.onset + bar.length > start && bar.onset < end);
    // What is stated over a part of the stretch only would miss the notes that were cut off.
    let within = |from: Time, until: Time| from >= start && until <= end;
    let harmony = score.harmony.iter().filter(|c| within(c.from, c.until));
    let figures = score.figures.iter().filter(|f| within(f.from, f.until));
    let mut bars: Vec<_> = bars.cloned().collect();
    // Rules about whole phrases wait for the end of a piece: what closes is cut so that it closes.
    let closes = score.bars.last().is_some_and(|bar| bar.section_end);
    if let Some(last) = bars.last_mut().filter(|_| closes) {
        last.section_end = true;
    }
    Score {
        voices: voices.collect(),
        harmony: harmony.cloned().collect(),
        figures: figures.cloned().collect(),
        bars,
        equal: score.equal.clone(),
        metres: score.metres.clone(),
        keys: score.keys.clone(),
        style: score.style.clone(),
    }
}
