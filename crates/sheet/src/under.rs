//! The cells of harmony and figures rows.

use crate::chars::{after_blanks, comment_at, word_end};
use crate::harmony::{Figure, chord, key_prefix, stack};
use crate::music::{MOST_PARTS, cell_end, too_many};
use crate::near::short;
use crate::parts::text;
use crate::span::Span;
use crate::system::{Cell, Cells, Reader};
use crate::tree::{PartKind, part_end};

/// The cells of a harmony row.
pub(crate) struct Chords;
/// The cells of a figures row.
pub(crate) struct Stacks;

impl Cells for Chords {
    fn cell(&mut self, reader: &mut Reader<'_>, row: &[u8], start: usize) -> Cell {
        let end = word_end(row, start).min(part_end(row, start));
        let word = row.get(start..end).unwrap_or_default();
        let mut at = start;
        if word.ends_with(b":") {
            let next = after_blanks(row, end);
            let alone = matches!(row.get(next), None | Some(b'|')) || comment_at(row, next);
            if key_prefix(word).is_none() || alone {
                let message = "A change of key is a letter and a colon in front of a numeral: \
                               D: ii6.";
                reader.slip(Span::new(start, end), message.to_owned());
            }
            if alone {
                reader.push(start, PartKind::Spoilt);
                return Cell::Timed(end);
            }
            reader.push(start, PartKind::Key);
            at = next;
        }
        parts(reader, row, at, |part| chord(part).is_some(), no_chord)
    }
}

impl Cells for Stacks {
    fn cell(&mut self, reader: &mut Reader<'_>, row: &[u8], start: usize) -> Cell {
        parts(reader, row, start, ordered, no_stack)
    }
}

/// A stack of figures, the highest first; a sign alone stands for the third.
fn ordered(part: &[u8]) -> bool {
    let height = |figure: &Figure| figure.number.unwrap_or(3);
    stack(part).is_some_and(|stack| stack.is_sorted_by(|a, b| height(a) > height(b)))
}

fn no_stack(part: &str) -> (String, Vec<String>) {
    let show = |stack: &[Figure]| {
        let figures: Vec<String> = stack.iter().map(Figure::to_string).collect();
        figures.join("/")
    };
    if let Some(mut figures) = stack(part.as_bytes()) {
        figures.sort_by_key(|figure| std::cmp::Reverse(figure.number.unwrap_or(3)));
        let sorted = show(&figures);
        if ordered(sorted.as_bytes()) {
            let message = format!("Figures stand the highest first: {sorted}.");
            return (message, vec![sorted]);
        }
    }
    // `6#` for `#6`, `65` for `6/5`.
    let turned = part
        .strip_suffix(['#', 'b', 'n'])
        .map(|figure| format!("{}{figure}", &part[figure.len()..]));
    let digits: Vec<String> = part.chars().map(String::from).collect();
    let parted = Some(digits.join("/")).filter(|_| part.len() > 1);
    let right = |text: &String| ordered(text.as_bytes());
    if let Some(sign_first) = turned.filter(right) {
        let message = format!("The sign stands before its figure: {sign_first}.");
        return (message, vec![sign_first]);
    }
    if let Some(parted) = parted.filter(right) {
        let message = format!("A stroke stands between two figures: {parted}.");
        return (message, vec![parted]);
    }
    let message = format!(
        "{} is no figure. Expected figures 2 to 9 and the signs #, b and n, the highest first, \
         with / between: 6/5; - to go on or _ for none.",
        short(part)
    );
    (message, Vec::new())
}

fn no_chord(part: &str) -> (String, Vec<String>) {
    let message = format!(
        "{} is no chord. Expected a Roman numeral such as ii6, V7 or viio, - to go on or _ for \
         none.",
        short(part)
    );
    (message, Vec::new())
}

fn parts(
    reader: &mut Reader<'_>,
    row: &[u8],
    start: usize,
    good: fn(&[u8]) -> bool,
    explain: fn(&str) -> (String, Vec<String>),
) -> Cell {
    let first = reader.system.parts.len();
    let slips = reader.system.slips.len();
    let mut at = start;
    loop {
        let end = part_end(row, at);
        let part = row.get(at..end).unwrap_or_default();
        let kind = match part {
            b"-" => PartKind::Hold,
            b"_" => PartKind::Rest,
            _ if good(part) => PartKind::Text,
            _ => PartKind::Spoilt,
        };
        if kind == PartKind::Spoilt {
            if part.is_empty() {
                let span = Span::new(start, cell_end(row, start));
                let message = "An empty part: a dot joins two parts of one beat.";
                reader.slip(span, message.to_owned());
            } else {
                let (message, instead) = explain(text(part));
                let instead: Vec<&str> = instead.iter().map(String::as_str).collect();
                reader.slip_with(Span::new(at, end), message, &instead);
            }
        }
        reader.push(at, kind);
        at = end;
        if row.get(at) != Some(&b'.') {
            break;
        }
        at += 1;
    }
    let parts = reader.system.parts.len() - first;
    if parts > MOST_PARTS {
        reader.system.parts.truncate(first);
        reader.system.slips.truncate(slips);
        let span = Span::new(start, at);
        reader.slip(span, too_many(parts));
        reader.push(start, PartKind::Spoilt);
    }
    Cell::Timed(at)
}
