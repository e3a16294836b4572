//! Findings kept from an earlier check, stretch by stretch.
//!
//! What a rule of steps, sonorities, dissonances or chords says of a moment depends on the music
//! around it and on what holds for the whole score. A stretch whose surroundings are as they were
//! is not judged again. Rules about whole lines and about the piece are always asked.

use std::collections::HashMap;
use std::hash::{DefaultHasher, Hash, Hasher};
use std::ops::Range;
use std::sync::Arc;

use partwright_analysis::{harmony, mode};
use partwright_rules::{Finding, Piece, Strictness};
use partwright_score::{Bar, Score, Time, Voice};

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
        let one = |range: Range<usize>| {
            let mark = mark(piece, &range);
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

/// A hash of the music that the findings of a stretch depend on, with where it stands.
fn mark(piece: &Piece<'_>, range: &Range<usize>) -> u64 {
    let (score, sonorities) = (piece.score, piece.texture.sonorities());
    // A chord or a note that reaches further is followed to its end.
    let chords = piece.analysis.harmony(score, piece.texture);
    let last = chords
        .at(range.end.saturating_sub(1))
        .map_or(range.end, |chord| chord.end);
    let held = |k: usize| {
        let voices = piece.texture.sounding(k);
        voices.filter_map(move |voice| {
            let note = piece.texture.note(k, voice)?;
            score.voices.get(voice)?.notes.get(note)
        })
    };
    let until = held(range.end.saturating_sub(1))
        .map(|note| note.end())
        .max();
    let until = until.map_or(0, |until| sonorities.partition_point(|s| s.onset < until));
    let since = held(range.start).map(|note| note.onset).min();
    let since = since.map_or(usize::MAX, |since| {
        sonorities.partition_point(|s| s.onset < since)
    });
    let from = range.start.min(since).saturating_sub(AROUND);
    let end = range
        .end
        .max(last)
        .max(until)
        .saturating_add(AROUND)
        .min(sonorities.len());
    let mut hasher = DefaultHasher::new();
    (range.start - from, range.len(), end == sonorities.len()).hash(&mut hasher);
    let mut bar = None;
    for (k, sonority) in sonorities.iter().enumerate().take(end).skip(from) {
        if bar != Some(sonority.bar) {
            bar = Some(sonority.bar);
            if let Some(bar) = score.bars.get(sonority.bar as usize) {
                (
                    bar.onset,
                    bar.length,
                    bar.lead,
                    bar.number,
                    bar.metre,
                    bar.section_end,
                )
                    .hash(&mut hasher);
            }
        }
        sonority.onset.hash(&mut hasher);
        (sonority.struck, sonority.sounding, sonority.unknown).hash(&mut hasher);
        (sonority.followers, sonority.new_section).hash(&mut hasher);
        // A note is told where it is struck, and where the stretch begins inside it.
        for voice in 0..score.voices.len() {
            let is_struck = sonority.struck >> voice & 1 == 1;
            let Some(note) = piece
                .texture
                .note(k, voice)
                .filter(|_| is_struck || k == from)
            else {
                continue;
            };
            if let Some(note) = score.voices.get(voice).and_then(|v| v.notes.get(note)) {
                (
                    note.onset,
                    note.length,
                    note.sound,
                    note.fermata,
                    note.breath,
                    note.copies,
                )
                    .hash(&mut hasher);
            }
        }
    }
    if end == sonorities.len() {
        score.end().hash(&mut hasher);
    }
    hasher.finish()
}
