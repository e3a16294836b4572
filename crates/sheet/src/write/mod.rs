//! A score written as a sheet.
//!
//! In order: the voices without gaps or overlaps (`music`), the bars as a sheet can say them
//! (`measures`) and the cells they are told in (`beats`), then the text: headers and voices
//! (`names`, `heading`), and the systems (`cells`, `words`, `systems`). It comes out aligned. What
//! finds no place in a sheet is gathered on the way (`left`).

mod beats;
mod cells;
mod heading;
mod left;
mod measures;
mod music;
mod names;
mod systems;
mod words;

use std::borrow::Cow;

use partwright_score::{Change, MOST_VOICES, Score, Time};

use crate::reading::Tempo;
use left::Left;

/// What a sheet says besides the score.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Heading {
    /// `title`
    pub title: Option<String>,
    /// `subtitle`
    pub subtitle: Option<String>,
    /// `by`
    pub by: Option<String>,
    /// Tempos, each from a moment on.
    pub tempos: Vec<Change<Tempo>>,
    /// The text under the notes.
    pub words: Vec<Sung>,
}

/// The text a voice sings, in one verse.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Sung {
    /// The voice, by index.
    pub voice: usize,
    /// The verse, where there are several, 1 to 99.
    pub verse: Option<u8>,
    /// Syllables, each with the moment at which its note is struck. One that is joined to the next
    /// ends in a hyphen; blanks stand between words on one note.
    pub syllables: Vec<(Time, String)>,
}

/// A score as a sheet.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Written {
    /// The sheet.
    pub text: String,
    /// What could not be said in it, a sentence each.
    pub left_behind: Vec<String>,
}

/// Writes a score as a sheet that reads back the same: spelling, octave, onset, length, notes
/// struck again, fermatas, breaths and words. Bars of a length that their metre cannot say get a
/// metre of their own. What a sheet has no place for is listed.
#[must_use]
pub fn write(score: &Score, heading: &Heading) -> Written {
    let tamed = music::tamed(score);
    let score = tamed.as_ref();
    let mut left = Left::of(score);
    if matches!(tamed, Cow::Owned(_)) {
        left.tell("Moments beyond all measure are rounded.".to_owned());
    }
    if score.voices.len() > MOST_VOICES {
        left.tell(format!(
            "A sheet has at most {MOST_VOICES} voices: those from {} on are left out.",
            score.voices.get(MOST_VOICES).map_or("", |v| &v.label)
        ));
    }
    if !score.harmony.is_empty() || !score.figures.is_empty() {
        left.tell("Stated chords and figures have no rows here.".to_owned());
    }
    let mut music = music::music(score, &mut left);
    let measures = measures::measures(score, &mut music, &mut left);
    let labels = names::labels(&score.voices);
    let words = words::words(&heading.words, &music, &measures, &labels, &mut left);
    let changes = heading::changes(score, heading, &measures, &mut left);
    let mut text = heading::headers(score, heading, &labels, &changes, &mut left);
    systems::systems(&mut text, &labels, &music, &measures, &changes, &words);
    if text.len() > crate::LARGEST {
        let most = crate::LARGEST >> 20;
        left.tell(format!(
            "The sheet has become larger than the {most} MiB that are read."
        ));
    }
    Written {
        text: crate::align(&text),
        left_behind: left.sentences(),
    }
}
