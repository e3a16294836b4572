//! Findings kept from an earlier check, stretch by stretch.
//!
//! What a rule of steps, sonorities, dissonances or chords says of a moment depends on the music
//! around it and on what holds for the whole score. A stretch whose surroundings are as they were
//! is not judged again. Rules about whole lines and about the piece are always asked.

use std::collections::HashMap;
use std::hash::{Hash, Hasher};
use std::ops::Range;
use std::sync::Arc;

use partwright_analysis::{harmony, mode};
use partwright_rules::{Finding, Piece, Strictness};
use partwright_score::{Bar, Note, Score, Sonority, Time, Voice};
use rustc_hash::FxHasher;

/// How many sonorities to either side of a stretch its findings depend on: twice what settles a
/// chord, for a rule looks on from a chord as far as a phrase goes.
const AROUND: usize = 2 * harmony::SURROUNDINGS;

/// The findings of one stretch.
#[derive(Debug)]
struct Stretch {
    mark: u64,
    findings: Vec<Finding>,
}

/// What holds for every stretch of a score.
#[derive(Clone, Debug, PartialEq)]
struct Whole {
    /// The score without its music.
    head: Score,
    flats: i32,
    strictness: Strictness,
}

/// The findings of a score by stretches.
#[derive(Clone, Debug)]
pub(crate) struct Kept {
    whole: Whole,
    stretches: Vec<Arc<Stretch>>,
}

impl Kept {
    /// Judges a score, taking over what is the same.
    pub(crate) fn of(
        piece: &Piece<'_>,
        strictness: &Strictness,
        earlier: Option<&Kept>,
        judge: &dyn Fn(Range<usize>, &mut Vec<Finding>),
    ) -> Kept {
        let whole = Whole {
            head: head(piece.score),
            flats: mode::likely_flats(piece.score),
            strictness: strictness.clone(),
        };
        let earlier = earlier.filter(|earlier| earlier.whole == whole);
        let known = earlier.map_or(&[][..], |earlier| &earlier.stretches);
        let known: HashMap<u64, &Arc<Stretch>> = known.iter().map(|s| (s.mark, s)).collect();
        let marks = marks(piece);
        let one = |range: Range<usize>| {
            let mark = mark(piece, &range, &marks);
            if let Some(same) = known.get(&mark) {
                return Arc::clone(same);
            }
            let mut findings = Vec::new();
            judge(range, &mut findings);
            Arc::new(Stretch { mark, findings })
        };
        let bounds = harmony::bounds(piece.score, piece.texture);
        Kept {
            stretches: bounds.into_iter().map(one).collect(),
            whole,
        }
    }

    /// All of them.
    pub(crate) fn findings(&self) -> impl Iterator<Item = &Finding> {
        self.stretches.iter().flat_map(|stretch| &stretch.findings)
    }
}

/// What a score says of all its music: voices without notes, and of the bars how the last one ends.
fn head(score: &Score) -> Score {
    let bare = |voice: &Voice| Voice {
        label: voice.label.clone(),
        clef: voice.clef.clone(),
        written: voice.written.clone(),
        notes: Vec::new(),
        ..*voice
    };
    let end = |bar: &Bar| Bar {
        number: 0,
        onset: Time::default(),
        length: Time::default(),
        lead: Time::default(),
        ..bar.clone()
    };
    Score {
        voices: score.voices.iter().map(bare).collect(),
        equal: score.equal.clone(),
        metres: score.metres.clone(),
        bars: score.bars.last().map(end).into_iter().collect(),
        keys: score.keys.clone(),
        style: score.style.clone(),
        harmony: score.harmony.clone(),
        figures: score.figures.clone(),
    }
}

/// A hash of each sonority: what begins in it, and where it stands.
fn marks(piece: &Piece<'_>) -> Vec<u64> {
    let score = piece.score;
    let mut bar = None;
    let sonorities = piece.texture.sonorities().iter().enumerate();
    let one = |(k, sonority): (usize, &Sonority)| {
        let mut hasher = FxHasher::default();
        if bar != Some(sonority.bar) {
            bar = Some(sonority.bar);
            if let Some(bar) = score.bars.get(sonority.bar as usize) {
                let times = (bar.onset, bar.length, bar.lead);
                (times, bar.number, bar.metre, bar.section_end).hash(&mut hasher);
            }
        }
        sonority.onset.hash(&mut hasher);
        (sonority.struck, sonority.sounding, sonority.unknown).hash(&mut hasher);
        (sonority.followers, sonority.new_section).hash(&mut hasher);
        for voice in 0..score.voices.len() {
            if sonority.struck >> voice & 1 == 1 {
                note_at(piece, k, voice).hash(&mut hasher);
            }
        }
        hasher.finish()
    };
    sonorities.map(one).collect()
}

fn note_at<'a>(piece: &Piece<'a>, sonority: usize, voice: usize) -> Option<&'a Note> {
    let note = piece.texture.note(sonority, voice)?;
    piece.score.voices.get(voice)?.notes.get(note)
}

/// A hash of the music that the findings of a stretch depend on.
fn mark(piece: &Piece<'_>, range: &Range<usize>, marks: &[u64]) -> u64 {
    let (score, sonorities) = (piece.score, piece.texture.sonorities());
    // A chord or a note that reaches further is followed to its end.
    let chords = piece.analysis.harmony(score, piece.texture);
    let last = chords
        .at(range.end.saturating_sub(1))
        .map_or(range.end, |chord| chord.end);
    let held = |k: usize| {
        let voices = piece.texture.sounding(k);
        voices.filter_map(move |voice| note_at(piece, k, voice))
    };
    let until = held(range.end.saturating_sub(1)).map(Note::end).max();
    let until = until.map_or(0, |until| sonorities.partition_point(|s| s.onset < until));
    let since = held(range.start).map(|note| note.onset).min();
    let since = since.map_or(usize::MAX, |since| {
        sonorities.partition_point(|s| s.onset < since)
    });
    let from = range.start.min(since).saturating_sub(AROUND);
    let end = range.end.max(last).max(until).saturating_add(AROUND);
    let end = end.min(sonorities.len());
    let mut hasher = FxHasher::default();
    (range.start - from, range.len()).hash(&mut hasher);
    marks.get(from..end).unwrap_or_default().hash(&mut hasher);
    // What sounds on from before the stretch, and where the score ends.
    for note in held(from) {
        note.hash(&mut hasher);
    }
    (end == sonorities.len())
        .then(|| score.end())
        .hash(&mut hasher);
    hasher.finish()
}

#[cfg(test)]
mod tests {
    use std::fmt::Write as _;
    use std::sync::Arc;

    use crate::{Checked, Wishes};

    /// A long sheet in systems of four bars, with one note of its own.
    fn sheet(systems: usize, note: &str) -> String {
        let mut text = "style chorale\nkey C major\nmetre 4/4\n".to_owned();
        for system in 0..systems {
            let own = if system == systems / 2 { note } else { "G4" };
            let bars = "C5 B4 C5 D5 |".repeat(3);
            let _ = write!(text, "\nS | {own} A4 B4 C5 |{bars}\n");
            let _ = writeln!(text, "A |{}", " G4 G4 A4 G4 |".repeat(4));
            let _ = writeln!(text, "T |{}", " E4 D4 E4 B3 |".repeat(4));
            let _ = writeln!(text, "B |{}", " C3 G3 A3 G3 |".repeat(4));
        }
        text
    }

    #[test]
    fn one_note_reaches_few_stretches() {
        let wishes = Wishes::default();
        let before = Checked::text(&sheet(160, "G4"), &wishes);
        let after = before.again(&sheet(160, "E4"), &wishes);
        let all = after.kept.stretches.len();
        let same = |stretch: &Arc<super::Stretch>| {
            let mut known = before.kept.stretches.iter();
            known.any(|before| Arc::ptr_eq(before, stretch))
        };
        let anew = after
            .kept
            .stretches
            .iter()
            .filter(|stretch| !same(stretch))
            .count();
        assert!(all >= 18, "{all}");
        assert!((1..=5).contains(&anew), "{anew} of {all}");
    }
}
