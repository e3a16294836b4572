//! The cells of a music row.

use std::fmt::Write;

use partwright_score::Pitch;

use crate::chars::{after_blanks, word_end};
use crate::explain::{beatless, explain};
use crate::near::short;
use crate::parts::{Written, bare_part, copy, letter, marks, part, sign, text};
use crate::problem::{Edit, Offer, Problem, ProblemKind};
use crate::span::Span;
use crate::system::{Cell, Cells, Reader, problem};
use crate::tree::{
    AFTER_COPY, COPIED, Part, PartKind, THROUGHOUT, part_end, part_ends_at, unmarked_end,
};

/// The most parts a cell has.
pub(crate) const MOST_PARTS: usize = 64;

/// What is known of the octave figure along a row.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
enum Figure {
    /// No note yet: the first writes its figure.
    #[default]
    None,
    /// The last note: its letter position and its sign.
    Of(i16, i8),
    /// A copied bar came between: the next note writes its figure.
    Copied,
    /// A spoilt part came between: notes without a figure are spoilt too, without a word.
    Lost,
}

/// A music row while it is read.
#[derive(Debug, Default)]
pub(crate) struct Music {
    figure: Figure,
    /// A copy stands in this bar.
    copy: bool,
}

impl Cells for Music {
    const UNCLOSED: ProblemKind = ProblemKind::Unwritten;

    fn cell(&mut self, reader: &mut Reader<'_>, row: &[u8], start: usize) -> Cell {
        let first = reader.system.parts.len();
        let slips = reader.system.slips.len();
        let mut empty = None;
        let mut at = start;
        loop {
            match part(row.get(at..).unwrap_or_default()) {
                Ok((rest, written)) if part_ends_at(rest, 0) => {
                    self.push(reader, at, written);
                    at = row.len() - rest.len();
                }
                _ if part_ends_at(row, at) => {
                    empty.get_or_insert(reader.system.parts.len());
                    self.spoil(reader, at, 0);
                }
                _ => match self.refused(reader, row, start, at) {
                    Cell::Timed(end) => at = end,
                    Cell::Timeless(end) => return Cell::Timeless(end),
                },
            }
            if row.get(at) != Some(&b'.') {
                break;
            }
            at += 1;
        }
        let parts = reader.system.parts.len() - first;
        if parts > MOST_PARTS {
            reader.system.parts.truncate(first);
            reader.system.slips.truncate(slips);
            reader.slip(Span::new(start, at), too_many(parts));
            self.spoil(reader, start, 0);
        } else if let Some(part) = empty {
            reader.slip_at(part, empty_part(row, start, at, parts));
        }
        Cell::Timed(at)
    }

    fn bar(&mut self, reader: &mut Reader<'_>, first: usize) -> u8 {
        if !std::mem::take(&mut self.copy) {
            return 0;
        }
        let system = &mut reader.system;
        let from = system.cells.get(first).map_or(0, |&p| p as usize);
        let parts = system.parts.get_mut(from..).unwrap_or_default();
        if let [only] = parts
            && only.kind() == PartKind::Copy
        {
            return COPIED;
        }
        let mut crowded = Vec::new();
        for (index, part) in parts.iter_mut().enumerate() {
            if part.kind() == PartKind::Copy {
                let start = part.start as usize;
                crowded.push((from + index, start));
                *part = Part::new(start, PartKind::Spoilt, 0, 0, 0);
            }
        }
        for (index, start) in crowded {
            let span = Span::new(start, part_end(reader.text, start));
            let message = "A copy is alone in its bar: it stands for the whole of it.";
            reader.slip_at(index, problem(span, message.to_owned(), &[]));
        }
        0
    }
}

impl Music {
    fn push(&mut self, reader: &mut Reader<'_>, start: usize, written: Written) {
        let parts = &mut reader.system.parts;
        if written.kind != PartKind::Note {
            parts.push(Part::new(start, written.kind, 0, 0, written.flags));
            return;
        }
        let at = |octave: i16| octave * 7 + i16::from(written.letter);
        let (kind, step, hint) = match (written.octave, self.figure) {
            (Some(octave), _) => (PartKind::Note, at(i16::from(octave)), 0),
            (None, Figure::Of(last, sign)) => {
                let step = at(last.div_euclid(7));
                if (step - last).abs() >= 5 {
                    let span = Span::new(start, unmarked_end(reader.text, start));
                    let before = Pitch { step: last, sign };
                    let index = parts.len();
                    let own = text(reader.text.get(span.range()).unwrap_or_default());
                    reader.slip_at(index, doubt(written.sign, before, step, span, own));
                }
                (PartKind::Note, step, 0)
            }
            (None, Figure::Lost) => (PartKind::Spoilt, 0, 0),
            (None, Figure::None) => (PartKind::Unplaced, at(0), 0),
            (None, Figure::Copied) => (PartKind::Unplaced, at(0), AFTER_COPY),
        };
        self.figure = match kind {
            PartKind::Note => Figure::Of(step, written.sign),
            _ => Figure::Lost,
        };
        let flags = written.flags | hint;
        let part = Part::new(start, kind, step, written.sign, flags);
        reader.system.parts.push(part);
    }

    fn spoil(&mut self, reader: &mut Reader<'_>, start: usize, flags: u8) {
        self.figure = Figure::Lost;
        let part = Part::new(start, PartKind::Spoilt, 0, 0, flags);
        reader.system.parts.push(part);
    }

    /// A part the grammar refuses: a copy, a bad mark, or a bad part.
    fn refused(&mut self, reader: &mut Reader<'_>, row: &[u8], cell: usize, at: usize) -> Cell {
        let from = row.get(at..).unwrap_or_default();
        if at == cell {
            let end = cell_end(row, at);
            let whole = text(row.get(at..end).unwrap_or_default());
            if let Some(message) = beatless(whole) {
                // A colon in front of a bar line is one sign with it.
                let close = whole == ":" && row.get(end) == Some(&b'|');
                let end = if close { end + 1 } else { end };
                reader.slip(Span::new(at, end), message.to_owned());
                return Cell::Timeless(end - usize::from(close));
            }
            if let Ok((rest, written)) = copy(from)
                && rest.first() != Some(&b'.')
                && let Ok((after, _)) = marks(rest)
                && part_ends_at(after, 0)
            {
                let octaves = i16::from(written.letter);
                let part = Part::new(at, PartKind::Copy, octaves, 0, 0);
                if after.len() < rest.len() {
                    let span = Span::new(row.len() - rest.len(), row.len() - after.len());
                    let message = "A copy takes no marks: they stand in the voice that is copied.";
                    reader.slip(span, message.to_owned());
                }
                reader.system.parts.push(part);
                self.figure = Figure::Copied;
                self.copy = true;
                return Cell::Timed(row.len() - after.len());
            }
        }
        let end = part_end(row, at);
        if let Some(flags) = self.mended_marks(reader, row, at, end) {
            if let Ok((_, written)) = bare_part(from) {
                self.push(reader, at, Written { flags, ..written });
            }
            return Cell::Timed(end);
        }
        self.bad(reader, row, at, end);
        Cell::Timed(end)
    }

    /// A good part with a bad mark: reports the marks that are none and returns the others.
    fn mended_marks(
        &self,
        reader: &mut Reader<'_>,
        row: &[u8],
        at: usize,
        end: usize,
    ) -> Option<u8> {
        let within = row.get(..end).unwrap_or_default();
        let (rest, written) = bare_part(within.get(at..).unwrap_or_default()).ok()?;
        let mut place = end - rest.len();
        if written.kind == PartKind::Unwritten {
            let (rest, _) = marks(rest).ok()?;
            let message = "A ? takes no mark: nothing is written there yet.";
            return rest.is_empty().then(|| {
                reader.slip(Span::new(place, end), message.to_owned());
                0
            });
        }
        let mut flags = 0;
        let mut bad = Vec::new();
        while place < end {
            let (rest, more) = marks(within.get(place..).unwrap_or_default()).ok()?;
            flags |= more;
            place = end - rest.len();
            if rest.first() != Some(&b'*') {
                break;
            }
            let tail = rest.iter().skip(1);
            let length = 1 + tail.take_while(|b| b.is_ascii_alphanumeric()).count();
            bad.push(Span::new(place, place + length));
            place += length;
        }
        if place < end || bad.is_empty() {
            return None;
        }
        for span in bad {
            let message = "A footnote mark is an asterisk and letters: *a.";
            reader.slip(span, message.to_owned());
        }
        Some(flags)
    }

    fn bad(&mut self, reader: &mut Reader<'_>, row: &[u8], at: usize, end: usize) {
        let body_end = unmarked_end(row, at);
        let after = row.get(body_end..end).unwrap_or_default();
        let (after, flags) = marks(after).unwrap_or((after, 0));
        let body = text(row.get(at..body_end).unwrap_or_default());
        let whole = text(row.get(at..end).unwrap_or_default());
        if let Some(instead) = mark_first(whole) {
            let message = format!("A mark stands behind its part: {instead}.");
            reader.slip_with(Span::new(at, end), message, &[&instead]);
            return self.spoil(reader, at, 0);
        }
        if !after.is_empty() {
            let spaced = whole.replace(',', " ");
            let good =
                |word: &str| bare_part(word.as_bytes()).is_ok_and(|(rest, _)| rest.is_empty());
            if spaced.split(' ').all(good) {
                let message = format!("Beats are parted by a blank: {}.", short(&spaced));
                reader.slip_with(Span::new(at, end), message, &[&spaced]);
            } else {
                let message = format!(
                    "{} is no part. Expected a note, -, _ or ?, and behind it at most the \
                     marks ^ , and *a.",
                    short(whole)
                );
                reader.slip(Span::new(at, end), message);
            }
            return self.spoil(reader, at, 0);
        }
        let found = explain(body);
        let instead: Vec<&str> = found.instead.iter().map(String::as_str).collect();
        reader.slip_with(Span::new(at, body_end), found.message, &instead);
        let throughout = if found.throughout { THROUGHOUT } else { 0 };
        self.spoil(reader, at, flags | throughout);
    }
}

/// `^E` as `E^`.
fn mark_first(whole: &str) -> Option<String> {
    let rest = whole.strip_prefix(['^', ','])?;
    let mark = whole.get(..whole.len() - rest.len())?;
    let (after, _) = part(rest.as_bytes()).ok()?;
    after.is_empty().then(|| format!("{rest}{mark}"))
}

/// What is said about a cell of so many parts.
pub(crate) fn too_many(parts: usize) -> String {
    format!("A beat has at most {MOST_PARTS} parts; these are {parts}.")
}

/// Where the cell that begins at `start` ends.
pub(crate) fn cell_end(row: &[u8], start: usize) -> usize {
    let mut at = start;
    while row.get(at) == Some(&b'.') || !part_ends_at(row, at) {
        at += 1;
    }
    at
}

/// A cell with an empty part; the dot of a printed score has an answer of its own.
fn empty_part(row: &[u8], start: usize, end: usize, parts: usize) -> Problem {
    let span = Span::new(start, end);
    let cell = text(row.get(start..end).unwrap_or_default());
    let dotted = cell.strip_suffix('.').filter(|_| parts == 2);
    let next = after_blanks(row, end);
    let following = row.get(next..word_end(row, next)).unwrap_or_default();
    if let Some(note) = dotted
        && letter(note.as_bytes()).is_ok()
        && let Ok((after, _)) = letter(following).and_then(|(rest, _)| sign(rest))
    {
        let name = text(
            following
                .get(..following.len() - after.len())
                .unwrap_or_default(),
        );
        // A figure 1, 8 or 16 there is a note value of other writings, no octave.
        let figure = match after {
            [b'2'..=b'7'] => text(after),
            _ => "",
        };
        let instead = format!("{note} -.{name}{figure}");
        let length = name.len() + after.iter().take_while(|b| b.is_ascii_digit()).count();
        let offer = Offer {
            title: format!("Write {instead}"),
            edits: vec![Edit {
                span: Span::new(start, next + length),
                text: instead.clone(),
            }],
        };
        return Problem {
            offers: vec![offer],
            ..problem(
                span,
                format!(
                    "A dot joins notes of one beat and lengthens none; a dotted note and a short \
                     one are {instead}."
                ),
                &[],
            )
        };
    }
    let pieces: Vec<&str> = cell.split('.').filter(|piece| !piece.is_empty()).collect();
    let joined = pieces.join(".");
    let instead = if joined.is_empty() {
        vec![]
    } else {
        vec![joined.as_str()]
    };
    problem(
        span,
        "An empty part: a dot joins two parts of one beat, with a note, -, _ or ? on either side."
            .to_owned(),
        &instead,
    )
}

const SIZES: [&str; 7] = [
    "unison", "second", "third", "fourth", "fifth", "sixth", "seventh",
];

/// The carried octave figure makes a sixth or a seventh: both readings are shown.
fn doubt(sign: i8, before: Pitch, step: i16, span: Span, own: &str) -> Problem {
    let size = |step: i16| {
        let index = usize::from((step - before.step).unsigned_abs());
        SIZES.get(index).copied().unwrap_or("seventh")
    };
    let way = |step: i16| {
        if step > before.step {
            "rising"
        } else {
            "falling"
        }
    };
    let reading = |step: i16| {
        let pitch = Pitch { step, sign };
        (pitch, way(step), size(step))
    };
    let carried = reading(step);
    let mut message = format!(
        "The octave figure carried from {before} makes this {}, a {} {}.",
        carried.0, carried.1, carried.2
    );
    let other = if step > before.step {
        step - 7
    } else {
        step + 7
    };
    let mut readings = vec![carried];
    if (0..70).contains(&other) {
        let near = reading(other);
        let _ = write!(
            message,
            " Write {} if that is meant, or {} (a {} {}).",
            carried.0, near.0, near.1, near.2
        );
        readings.push(near);
    }
    // The note stays as it is written, letter and sign; the figure is added.
    let offer = |(pitch, way, size): (Pitch, &str, &str)| Offer {
        title: format!("Write {pitch} ({way} {size})"),
        edits: vec![Edit {
            span,
            text: format!("{own}{}", pitch.octave()),
        }],
    };
    Problem {
        kind: ProblemKind::OctaveDoubt,
        offers: readings.into_iter().map(offer).collect(),
        ..problem(span, message, &[])
    }
}
