//! Lines that are no rows: headers, changes, voice lines and footnotes.

use std::borrow::Cow;

use partwright_score::Kind;

use super::SetLine;
use super::display::{blanks, width};
use super::spelling::{ascii_signs, spelt};
use crate::Span;
use crate::chars::{Word, after_blanks, comment_at, free_text, plain};
use crate::footnotes::{footnote, licence};
use crate::headers::{key, metre, tempo};
use crate::lines::{HEADERS, Header, LineKind, is_label};
use crate::problem::Problem;
use crate::sheet::{Block, OtherLine, Tree, value_words};
use crate::voices::declaration;

/// The column of values behind short headers: most of them are.
const VALUES: usize = 8;

/// What a line says, in canonical spelling.
enum Line<'a> {
    Header(&'static str, String),
    Voice {
        label: &'a str,
        kind: Option<&'a str>,
        options: String,
    },
    Footnote(String),
}

/// A line that can be set, and where its words end.
struct Found<'a> {
    place: OtherLine,
    line: Line<'a>,
    end: usize,
}

/// The lines of a sheet that are no rows and can be read by themselves, as they are to stand but
/// for their comments.
pub(super) fn lines(tree: &Tree) -> Vec<SetLine> {
    let mut reader = Values {
        text: &tree.text,
        problems: Vec::new(),
    };
    let blocks = tree.blocks.iter().filter_map(|block| match block {
        Block::Line(line) => reader.line(*line),
        Block::System(_) => None,
    });
    let found: Vec<Found<'_>> = blocks.collect();
    let columns = Columns::of(&found);
    found
        .iter()
        .map(|found| columns.set(&tree.text, found))
        .collect()
}

/// The columns of the sheet's lines.
struct Columns {
    values: usize,
    kinds: usize,
    options: usize,
}

impl Columns {
    fn of(found: &[Found<'_>]) -> Columns {
        let (mut values, mut labels, mut kinds) = (VALUES, 0, 0);
        for found in found {
            match &found.line {
                Line::Header(name, _) => values = values.max(name.len() + 1),
                Line::Voice {
                    label,
                    kind,
                    options,
                } => {
                    labels = labels.max(width(label));
                    // Options stand behind the kinds that have some.
                    let kind = kind.filter(|_| !options.is_empty());
                    kinds = kinds.max(kind.map_or(0, str::len));
                }
                Line::Footnote(_) => {}
            }
        }
        let labels_end = "voice ".len() + labels;
        Columns {
            values,
            kinds: labels_end + 1,
            options: labels_end + 1 + kinds + 2,
        }
    }

    fn set(&self, text: &str, found: &Found<'_>) -> SetLine {
        let mut out = String::new();
        let to = |out: &mut String, column: usize| {
            let end = width(out);
            blanks(out, column.saturating_sub(end));
        };
        match &found.line {
            Line::Header(name, value) => {
                out.push_str(name);
                to(&mut out, self.values);
                out.push_str(value);
            }
            Line::Voice {
                label,
                kind,
                options,
            } => {
                out.push_str("voice ");
                out.push_str(label);
                if let Some(kind) = kind {
                    to(&mut out, self.kinds);
                    out.push_str(kind);
                }
                if !options.is_empty() {
                    let column = kind.map_or(self.kinds, |_| self.options);
                    to(&mut out, column);
                    out.push_str(options);
                }
            }
            Line::Footnote(line) => out.push_str(line),
        }
        let end = found.place.end as usize;
        let bytes = text.as_bytes().get(..end).unwrap_or_default();
        let comment = after_blanks(bytes, found.end);
        SetLine {
            line: Span::new(line_start(text, found.place.word.start as usize), end),
            text: out,
            comment: comment_at(bytes, comment).then(|| Span::new(comment, end)),
        }
    }
}

/// Where the line around an offset begins, behind a byte order mark.
fn line_start(text: &str, at: usize) -> usize {
    let before = text.get(..at).unwrap_or_default();
    let mark = if before.starts_with('\u{feff}') { 3 } else { 0 };
    before.rfind('\n').map_or(mark, |end| end + 1)
}

/// Reads lines one by one.
struct Values<'a> {
    text: &'a str,
    /// What was wrong with lines so far: they stay as they are.
    problems: Vec<Problem>,
}

impl<'a> Values<'a> {
    fn line(&mut self, place: OtherLine) -> Option<Found<'a>> {
        let words = value_words(self.text, place);
        let before = self.problems.len();
        let line = match place.kind {
            LineKind::Word(Header::Voice) => self.voice(place, &words),
            LineKind::Word(header) => self.header(place, header, &words),
            LineKind::Footnote => self.footnote(place, &words),
            _ => None,
        };
        let read = self.problems.len() == before;
        let reason = || words.iter().find(|word| word.text.ends_with(':'));
        let free_from = match place.kind {
            LineKind::Word(Header::Title | Header::Subtitle | Header::By) => Some(place.word.end),
            LineKind::Word(Header::Licence) | LineKind::Footnote => reason().map(|w| w.span.end),
            _ => None,
        };
        let end = match free_from {
            Some(from) => self.free(place, from).end,
            None => words.last().map_or(place.word.end, |word| word.span.end),
        };
        line.filter(|_| read).map(|line| Found {
            place,
            line,
            end: end as usize,
        })
    }

    fn header(&mut self, place: OtherLine, header: Header, words: &[Word<'a>]) -> Option<Line<'a>> {
        let problems = &mut self.problems;
        let value = match header {
            Header::Title | Header::Subtitle | Header::By => {
                let value = self.text.get(self.free(place, place.word.end).range())?;
                (!value.is_empty() && !plain(value).1).then(|| value.to_owned())?
            }
            Header::Key => {
                key(problems, place.word, words)?;
                let (tonic, rest) = words.split_first()?;
                let rest = rest.iter().map(|word| ascii_signs(word.text));
                let tonic = match tonic.text {
                    "none" => "none".into(),
                    tonic => spelt(tonic).into(),
                };
                std::iter::once(tonic)
                    .chain(rest)
                    .collect::<Vec<_>>()
                    .join(" ")
            }
            Header::Metre => {
                metre(problems, place.word, words)?;
                joined(words)
            }
            Header::Tempo => {
                tempo(problems, place.word, words)?;
                joined(words)
            }
            Header::Sheet | Header::Style => (words.len() == 1).then(|| joined(words))?,
            Header::Equal => (words.len() > 1).then(|| joined(words))?,
            Header::Licence => {
                // Whether a label is a voice's is not asked here.
                let voice = |word: &str| {
                    let rule = word.bytes().all(|b| b.is_ascii_lowercase());
                    (is_label(word) && !rule).then_some(0)
                };
                licence(problems, self.text, place.word, place.end as usize, voice)?;
                self.licence(place, words)?
            }
            Header::Voice | Header::Unknown => return None,
        };
        let (name, _) = HEADERS.iter().find(|(_, other)| *other == header)?;
        Some(Line::Header(name, value))
    }

    /// What a licence says: its words up to the colon, and its reason as it is written.
    fn licence(&self, place: OtherLine, words: &[Word<'a>]) -> Option<String> {
        let colon = words.iter().position(|word| word.text.ends_with(':'))?;
        let names = joined(words.get(..=colon)?);
        let reason = self.free(place, words.get(colon)?.span.end);
        let names = names.trim_end_matches(':').trim_end_matches(' ');
        Some(format!("{names}: {}", self.text.get(reason.range())?))
    }

    /// The free text of a line from a place on.
    fn free(&self, place: OtherLine, from: u32) -> Span {
        free_text(self.text, from as usize, place.end as usize)
    }

    fn footnote(&mut self, place: OtherLine, words: &[Word<'a>]) -> Option<Line<'a>> {
        let end = place.end as usize;
        footnote(&mut self.problems, self.text, place.word, end).footnote?;
        let mark = self.text.get(place.word.range())?;
        let licence = self.licence(place, words.get(1..)?)?;
        Some(Line::Footnote(format!("{mark} licence {licence}")))
    }

    fn voice(&mut self, place: OtherLine, words: &[Word<'a>]) -> Option<Line<'a>> {
        declaration(&mut self.problems, place.word, words)?;
        let (label, rest) = words.split_first()?;
        let kind = rest.first().filter(|word| Kind::named(word.text).is_some());
        let options = rest.get(usize::from(kind.is_some())..)?;
        let mut before = "";
        let options: Vec<_> = options
            .iter()
            .map(|word| {
                let pitches = before == "written" || word.text.contains("..");
                before = word.text;
                if pitches {
                    Cow::from(spelt(word.text))
                } else {
                    word.text.into()
                }
            })
            .collect();
        Some(Line::Voice {
            label: label.text,
            kind: kind.map(|word| word.text),
            options: options.join(" "),
        })
    }
}

fn joined(words: &[Word<'_>]) -> String {
    let words: Vec<&str> = words.iter().map(|word| word.text).collect();
    words.join(" ")
}
