//! The lines of a sheet as somebody sees them who only knows the notation's first words: enough
//! for what is asked while a line is half typed, when there is no tree of it yet.

use std::ops::Range;

/// The words of headers that a line may begin with.
pub(crate) const HEADERS: [(&str, &str); 11] = [
    ("sheet", "the version of the notation"),
    ("title", "the title"),
    ("subtitle", "the line under the title"),
    ("by", "who wrote it"),
    ("style", "which rules apply, and how strictly"),
    ("key", "tonic and mode, or none"),
    ("metre", "the metre, or free"),
    ("tempo", "cells a minute"),
    ("equal", "voices that may cross freely"),
    ("licence", "an exception for the whole sheet"),
    ("voice", "a voice: label, kind, options"),
];

/// Those that may also stand between systems.
pub(crate) const CHANGES: [&str; 3] = ["key", "metre", "tempo"];

/// What a line is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Kind {
    /// Blanks only, or a comment.
    Empty,
    /// `*a licence …`
    Footnote,
    /// `S | …`
    Music,
    /// `words S | …`
    Words,
    /// `harmony | …`, `figures | …`
    Under,
    /// A line that begins with the word of a header.
    Header,
    /// Anything else.
    Other,
}

/// A line, by offsets in the text.
#[derive(Clone, Debug)]
pub(crate) struct Line {
    /// All of it without its end and without a byte order mark.
    pub(crate) span: Range<usize>,
    /// Its first word.
    pub(crate) word: Range<usize>,
    /// Where the comment at its end begins; its end if there is none.
    pub(crate) comment: usize,
    /// What it is.
    pub(crate) kind: Kind,
}

impl Line {
    /// A row of any kind.
    pub(crate) fn is_row(&self) -> bool {
        matches!(self.kind, Kind::Music | Kind::Words | Kind::Under)
    }

    /// What stands behind the first word, up to the comment.
    pub(crate) fn value(&self) -> Range<usize> {
        self.word.end..self.comment.max(self.word.end)
    }

    /// The same up to a row's first bar line.
    pub(crate) fn head(&self, text: &str) -> Range<usize> {
        let value = self.value();
        let bar = text.get(value.clone()).and_then(|v| v.find('|'));
        value.start..bar.map_or(value.end, |at| value.start + at)
    }
}

/// The lines of a text, in order.
pub(crate) fn lines(text: &str) -> impl Iterator<Item = Line> + '_ {
    let mut at = usize::from(text.starts_with('\u{feff}')) * '\u{feff}'.len_utf8();
    std::iter::from_fn(move || {
        let rest = text.get(at..).filter(|rest| !rest.is_empty())?;
        let length = rest.find('\n').unwrap_or(rest.len());
        let start = at;
        at += length + 1;
        let content = rest.get(..length).unwrap_or_default();
        let content = content.strip_suffix('\r').unwrap_or(content);
        Some(line(text, start..start + content.len()))
    })
}

/// The line that holds an offset.
pub(crate) fn line_at(text: &str, offset: usize) -> Line {
    let mut start = offset.min(text.len());
    while !text.is_char_boundary(start) {
        start -= 1;
    }
    let before = text.get(..start).unwrap_or_default();
    let start = before.rfind('\n').map_or(0, |at| at + 1);
    lines(text.get(start..).unwrap_or_default())
        .next()
        .map_or(line(text, start..start), |found| {
            let moved = |r: Range<usize>| r.start + start..r.end + start;
            Line {
                span: moved(found.span),
                word: moved(found.word),
                comment: found.comment + start,
                kind: found.kind,
            }
        })
}

fn line(text: &str, span: Range<usize>) -> Line {
    let content = text.get(span.clone()).unwrap_or_default();
    let comment = comment(content);
    let body = content.get(..comment).unwrap_or_default();
    let first = body.len() - body.trim_start().len();
    let rest = body.get(first..).unwrap_or_default();
    let length = rest
        .find(|c: char| c == '|' || c.is_whitespace())
        .unwrap_or(rest.len());
    let word = rest.get(..length).unwrap_or_default();
    let behind = rest.get(length..).unwrap_or_default().trim_start();
    let kind = match word {
        "" if rest.is_empty() => Kind::Empty,
        "" => Kind::Other,
        "words" => Kind::Words,
        "harmony" | "figures" => Kind::Under,
        _ if word.starts_with('*') => Kind::Footnote,
        _ if behind.starts_with('|') => Kind::Music,
        "meter" | "license" => Kind::Header,
        _ if HEADERS.iter().any(|(name, _)| *name == word) => Kind::Header,
        _ => Kind::Other,
    };
    let word = span.start + first;
    Line {
        word: word..word + length,
        comment: span.start + comment,
        span,
        kind,
    }
}

/// Where the comment of a line begins: `//` at its start or behind a blank.
fn comment(content: &str) -> usize {
    let mut from = 0;
    while let Some(found) = content.get(from..).and_then(|rest| rest.find("//")) {
        let at = from + found;
        let before = content.get(..at).unwrap_or_default();
        if before.is_empty() || before.ends_with(char::is_whitespace) {
            return at;
        }
        from = at + 1;
    }
    content.len()
}

/// The words in a stretch of the text: runs without blanks and bar lines.
pub(crate) fn words(text: &str, within: Range<usize>) -> impl Iterator<Item = Range<usize>> + '_ {
    let mut at = within.start;
    std::iter::from_fn(move || {
        let divides = |c: char| c == '|' || c.is_whitespace();
        let rest = text.get(at..within.end)?;
        let start = at + rest.find(|c| !divides(c))?;
        let rest = text.get(start..within.end)?;
        at = start + rest.find(divides).unwrap_or(rest.len());
        Some(start..at)
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn lines_by_their_first_word() {
        let text =
            "\u{feff}title Quay // x\r\nS| G4 // é\n\n*a licence line: so\nwords S | la |\nx";
        let found: Vec<_> = lines(text).map(|l| (l.kind, &text[l.value()])).collect();
        assert_eq!(
            found,
            [
                (Kind::Header, " Quay "),
                (Kind::Music, "| G4 "),
                (Kind::Empty, ""),
                (Kind::Footnote, " licence line: so"),
                (Kind::Words, " S | la |"),
                (Kind::Other, ""),
            ]
        );
        for (offset, start) in [(0, 0), (5, 3), (20, 20), (text.len(), text.len() - 1)] {
            let line = line_at(text, offset);
            assert!(line.span.start == start || offset == 0, "{offset} {line:?}");
        }
        let all: Vec<_> = words("S | a.b  c|d", 1..12).collect();
        assert_eq!(all, [4..7, 9..10, 11..12]);
    }
}
