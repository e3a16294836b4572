//! Edits of the text: a note written anew, and edits applied.

use partwright_score::Pitch;

use crate::{Edit, Reading, Span};

/// The edits that give a note another pitch and change nothing else: an octave figure is written
/// where the row's carried one would say something else, or would leave a doubt, on the note
/// itself and on the next one of its row.
#[must_use]
pub fn note_edits(
    reading: &Reading,
    text: &str,
    voice: usize,
    note: usize,
    to: Pitch,
) -> Vec<Edit> {
    let Some(span) = reading.span_of_note(voice, note) else {
        return Vec::new();
    };
    let same_row = |other: Span| {
        let (first, last) = (span.start.min(other.start), span.start.max(other.start));
        text.get(first as usize..last as usize)
            .is_some_and(|between| !between.contains('\n'))
    };
    let notes = reading
        .score
        .voices
        .get(voice)
        .map_or(&[][..], |v| &v.notes);
    let neighbour = |index: usize| {
        let pitch = notes.get(index)?.sound.pitch()?;
        Some((
            pitch,
            reading
                .span_of_note(voice, index)
                .filter(|&s| same_row(s))?,
        ))
    };
    let sounds = |index: &usize| notes.get(*index).is_some_and(|n| n.sound.pitch().is_some());
    let before = (0..note).rev().find(sounds).and_then(neighbour);
    let after = (note + 1..notes.len()).find(sounds).and_then(neighbour);
    let written = text.get(span.range()).unwrap_or_default();
    let needs_figure = has_figure(written) || before.is_none_or(|(pitch, _)| !carries(pitch, to));
    let new = if needs_figure {
        to.to_string()
    } else {
        to.class_name()
    };
    let new = Signs::about(text, span).write(&new);
    let mut edits = vec![Edit { span, text: new }];
    if let Some((pitch, next)) = after {
        let bare = text.get(next.range()).is_some_and(|word| !has_figure(word));
        if bare && !carries(to, pitch) {
            let end = Span {
                start: next.end,
                end: next.end,
            };
            edits.push(Edit {
                span: end,
                text: pitch.octave().to_string(),
            });
        }
    }
    edits
}

/// How far about a note it is looked which signs the sheet writes, in bytes either way.
const AROUND: usize = 1 << 14;

/// The signs a sheet is written with.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Signs {
    /// `#` and `b`.
    Plain,
    /// `♯` and `♭`.
    Printed,
}

impl Signs {
    /// Those used about a place: where both are, the more frequent.
    fn about(text: &str, place: Span) -> Signs {
        let range = place.range();
        let mut start = range.start.saturating_sub(AROUND);
        let mut end = (range.end + AROUND).min(text.len());
        while !text.is_char_boundary(start) {
            start -= 1;
        }
        while !text.is_char_boundary(end) {
            end += 1;
        }
        let text = text.get(start..end).unwrap_or_default();
        let printed = text.matches(['♯', '♭', '𝄪', '𝄫']).count();
        if printed == 0 {
            return Signs::Plain;
        }
        // Labels, rules and words may hold a b, a sign stands behind a letter of a note.
        let plain = |pair: &[u8]| matches!(pair, [b'A'..=b'G', b'#' | b'b'] | [b'a'..=b'g', b'#']);
        let plain = text
            .as_bytes()
            .windows(2)
            .filter(|pair| plain(pair))
            .count();
        if printed >= plain {
            Signs::Printed
        } else {
            Signs::Plain
        }
    }

    /// A pitch in these signs.
    fn write(self, pitch: &str) -> String {
        match self {
            Signs::Plain => pitch.to_owned(),
            Signs::Printed => pitch.replace('#', "♯").replace('b', "♭"),
        }
    }
}

fn has_figure(word: &str) -> bool {
    word.ends_with(|c: char| c.is_ascii_digit())
}

/// A note without a figure after `before` is read as `note`, without a doubt.
fn carries(before: Pitch, note: Pitch) -> bool {
    let steps = (note.step - before.step).abs();
    before.octave() == note.octave() && !matches!(steps, 5 | 6)
}

/// A text with edits applied. They must not overlap; what does is left out.
#[must_use]
pub fn apply(text: &str, edits: &[Edit]) -> String {
    let mut sorted: Vec<&Edit> = edits.iter().collect();
    sorted.sort_by_key(|edit| (edit.span.start, edit.span.end));
    let mut new = String::with_capacity(text.len());
    let mut at = 0;
    for edit in sorted {
        let range = edit.span.range();
        let Some(kept) = text.get(at..range.start) else {
            continue;
        };
        if text.get(range.clone()).is_none() {
            continue;
        }
        new.push_str(kept);
        new.push_str(&edit.text);
        at = range.end;
    }
    new.push_str(text.get(at..).unwrap_or_default());
    new
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::Sheet;

    fn moved(text: &str, note: usize, to: &str) -> String {
        let reading = Sheet::read(text).lower(text);
        apply(
            text,
            &note_edits(&reading, text, 0, note, to.parse().unwrap()),
        )
    }

    #[test]
    fn octave_figures_are_kept_right() {
        // Nothing but the note changes where the figure carries.
        assert_eq!(moved("S | G4 A B |\n", 1, "F4"), "S | G4 F B |\n");
        // A new octave is written, and the next note keeps its own.
        assert_eq!(moved("S | G4 A B |\n", 1, "C5"), "S | G4 C5 B4 |\n");
        // A sixth or seventh would be a doubt.
        assert_eq!(moved("S | C4 D E |\n", 1, "B4"), "S | C4 B4 E |\n");
        assert_eq!(moved("S | C4 D C |\n", 1, "B4"), "S | C4 B4 C4 |\n");
        // A figure that stands stays; marks stay; the next row has its own figure.
        assert_eq!(
            moved("S | G4 A4^*a |\nB | C3 D |\n", 1, "F#4"),
            "S | G4 F#4^*a |\nB | C3 D |\n"
        );
    }

    #[test]
    fn signs_are_written_as_the_sheet_writes_them() {
        assert_eq!(moved("S | F♯4 G A |\n", 1, "G#4"), "S | F♯4 G♯ A |\n");
        assert_eq!(moved("S | F♯4 G A |\n", 1, "Gbb4"), "S | F♯4 G♭♭ A |\n");
        assert_eq!(moved("S | F#4 G A |\n", 1, "Gb4"), "S | F#4 Gb A |\n");
        // Where both stand, the more frequent; words hold no signs.
        let both = "title Crab pots ♯\nS | F#4 G# A |\n";
        assert_eq!(moved(both, 2, "Ab4"), both.replace("A |", "Ab |"));
        let words = "title Abbey crabs\nS | F♯4 G A |\n";
        assert_eq!(moved(words, 1, "G#4"), words.replace("G A", "G♯ A"));
    }
}
