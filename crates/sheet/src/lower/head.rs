//! Headers, voice lines, changes and footnotes: the lines that are no rows.

use std::collections::HashSet;

use partwright_score::{Change, MOST_VOICES, Voice, ZERO};

use super::{Lowering, remark};
use crate::chars::{Word, free_text};
use crate::footnotes;
use crate::headers::{key, metre, tempo};
use crate::lines::{HEADERS, Header, LineKind, RowKind};
use crate::near::{near, short};
use crate::problem::ProblemKind;
use crate::reading::{Changed, Stated};
use crate::sheet::{Block, OtherLine, Placed, value_words};
use crate::span::Span;
use crate::voices::{Declared, declaration, label_fault};

/// The systems and what changes between them, in order, and the marks of the footnotes.
pub(super) struct Outline<'a> {
    pub(super) events: Vec<Event<'a>>,
    pub(super) marks: Vec<(String, Span)>,
}

/// A system, or a change in front of one.
pub(super) enum Event<'a> {
    System(&'a Placed),
    Change(Changed, Span),
}

/// Headers that wait until the voices are known.
#[derive(Default)]
struct Waiting<'a> {
    equal: Option<(Span, Vec<Word<'a>>)>,
    licences: Vec<OtherLine>,
    voices: Vec<Declared<'a>>,
    /// A voice line stood there, if only a bad one.
    first_system: Option<&'a Placed>,
}

/// Reads every line that is no row.
pub(super) fn head<'a>(lowering: &mut Lowering<'a>) -> Outline<'a> {
    let mut outline = Outline {
        events: Vec::new(),
        marks: Vec::new(),
    };
    let mut waiting = Waiting::default();
    // Headers given so far; changes given since the last system.
    let mut given: Vec<Header> = Vec::new();
    for block in &lowering.tree.blocks {
        match block {
            Block::System(placed) => {
                waiting.first_system.get_or_insert(placed);
                outline.events.push(Event::System(placed));
                given.clear();
            }
            Block::Line(line) => match line.kind {
                LineKind::Footnote => lowering.footnote_line(*line, &mut outline),
                LineKind::Begun => {
                    let message = "This line is begun and says nothing yet.";
                    let found = remark(ProblemKind::Unwritten, line.word, message);
                    lowering.reading.problems.push(found);
                }
                LineKind::Unlabelled => {
                    let message = "The label is missing: a row begins with its voice's label.";
                    lowering.wrong(line.word.first(), message, &[]);
                }
                LineKind::Word(header) => {
                    let change = lowering.header(*line, header, &mut given, &mut waiting);
                    outline.events.extend(change);
                }
                _ => {}
            },
        }
    }
    lowering.voices(&mut waiting);
    lowering.equal(waiting.equal.take());
    for line in waiting.licences {
        let labels = &lowering.labels;
        let found = footnotes::licence(
            &mut lowering.reading.problems,
            lowering.text,
            line.word,
            line.end as usize,
            |label| labels.get(label).copied(),
        );
        lowering.reading.licences.extend(found);
    }
    outline
}

impl<'a> Lowering<'a> {
    fn footnote_line(&mut self, line: OtherLine, outline: &mut Outline<'a>) {
        let problems = &mut self.reading.problems;
        let end = line.end as usize;
        let found = footnotes::footnote(problems, self.text, line.word, end);
        outline.marks.extend(found.mark);
        self.reading.footnotes.extend(found.footnote);
    }

    /// Reads one header or change; returns a change between systems.
    fn header(
        &mut self,
        line: OtherLine,
        header: Header,
        given: &mut Vec<Header>,
        waiting: &mut Waiting<'a>,
    ) -> Option<Event<'a>> {
        let name = self.at(line.word);
        let started = waiting.first_system.is_some();
        if header == Header::Unknown {
            self.unknown(line.word, name);
            return None;
        }
        if started && !header.is_change() {
            let message = format!("{name} belongs among the headers, before the first system.");
            self.wrong(line.word, &message, &[]);
            return None;
        }
        let several = matches!(header, Header::Licence | Header::Voice);
        if !several && given.contains(&header) {
            let place = if started { " at this place" } else { "" };
            let message = format!(
                "{} is given twice{place}; the first stands.",
                canonical(header)
            );
            self.wrong(line.word, &message, &[]);
            return None;
        }
        given.push(header);
        let words = value_words(self.text, line);
        let value = Span {
            start: words.first().map_or(line.word.end, |w| w.span.start),
            end: words.last().map_or(line.word.end, |w| w.span.end),
        };
        let problems = &mut self.reading.problems;
        let changed = match header {
            Header::Key => key(problems, line.word, &words).map(Changed::Key),
            Header::Metre => metre(problems, line.word, &words).map(Changed::Metre),
            Header::Tempo => tempo(problems, line.word, &words).map(Changed::Tempo),
            Header::Voice => {
                waiting
                    .voices
                    .extend(declaration(problems, line.word, &words));
                None
            }
            Header::Equal => {
                waiting.equal = Some((line.word, words));
                None
            }
            Header::Licence => {
                waiting.licences.push(line);
                None
            }
            Header::Sheet => {
                self.version(line, &words);
                None
            }
            Header::Style => {
                self.style(line.word, &words);
                None
            }
            Header::Title | Header::Subtitle | Header::By => {
                self.free_text(line, header, name);
                None
            }
            Header::Unknown => None,
        };
        let changed = changed?;
        if started {
            return Some(Event::Change(changed, value));
        }
        let head = &mut self.reading.head;
        match changed {
            Changed::Key(value_of) => {
                self.reading.score.keys.push(Change {
                    from: ZERO,
                    value: value_of,
                });
                head.key = Some(stated(value_of, value));
            }
            Changed::Metre(metre) => head.metre = Some(stated(metre, value)),
            Changed::Tempo(tempo) => head.tempo = Some(stated(tempo, value)),
        }
        None
    }

    fn unknown(&mut self, span: Span, name: &str) {
        let words = HEADERS.iter().map(|(word, _)| *word);
        let rows = ["words", "harmony", "figures"].into_iter();
        let bare = name.trim_end_matches(':').to_lowercase();
        let guess = self.guess();
        let other = near(name, words.chain(rows).filter(|_| guess));
        let message = match other {
            Some(other) if bare == other => {
                format!("Headers are small words without a colon: {other}.")
            }
            Some(other) => format!("{} begins no line. Is {other} meant?", short(name)),
            None => format!(
                "{} begins no line. A row is its label, a bar line and the notes: S | G4.",
                short(name)
            ),
        };
        let instead: Vec<&str> = other.into_iter().collect();
        self.wrong(span, &message, &instead);
    }

    fn version(&mut self, line: OtherLine, words: &[Word<'_>]) {
        let begin = if self.text.starts_with('\u{feff}') {
            3
        } else {
            0
        };
        let before = self.text.get(begin..line.word.start as usize);
        if before.is_some_and(|text| text.contains('\n')) {
            let message = "The version stands in the first line of the sheet.";
            self.wrong(line.word, message, &[]);
        } else {
            match words {
                [one] if one.text == "1" => {}
                [] => self.wrong(line.word, "The version is missing: sheet 1.", &["sheet 1"]),
                [first, ..] => {
                    let message = "This version of the notation is not known: expected 1.";
                    self.wrong(first.span, message, &["1"]);
                }
            }
        }
    }

    fn style(&mut self, header: Span, words: &[Word<'_>]) {
        let lawful = |name: &str| {
            name.starts_with(|c: char| c.is_ascii_alphabetic())
                && name.bytes().all(|b| b.is_ascii_alphanumeric() || b == b'-')
        };
        match words {
            [] => self.wrong(
                header,
                "The style is missing: style chorale, for instance.",
                &[],
            ),
            [name] if lawful(name.text) => {
                self.reading.score.style = Some(name.text.to_owned());
                self.reading.head.style = Some(stated(name.text.to_owned(), name.span));
            }
            [first, .., last] | [first @ last] => {
                let span = Span {
                    start: first.span.start,
                    end: last.span.end,
                };
                let message = "A style's name is one word of letters, digits and hyphens, as in \
                               chorale or species-1.";
                self.wrong(span, message, &[]);
            }
        }
    }

    fn free_text(&mut self, line: OtherLine, header: Header, name: &str) {
        let span = free_text(self.text, line.word.end as usize, line.end as usize);
        if span.start == span.end {
            let message = format!("The {name} is missing: its words follow on the line.");
            return self.wrong(line.word, &message, &[]);
        }
        let text = footnotes::written_text(&mut self.reading.problems, self.text, span);
        let head = &mut self.reading.head;
        let place = match header {
            Header::Title => &mut head.title,
            Header::Subtitle => &mut head.subtitle,
            _ => &mut head.by,
        };
        *place = Some(stated(text, span));
    }

    /// The voices: as declared, or as the first system has them.
    fn voices(&mut self, waiting: &mut Waiting<'a>) {
        let mut declared = std::mem::take(&mut waiting.voices);
        if declared.is_empty()
            && let Some(first) = waiting.first_system
        {
            declared = self.voices_of(first);
        }
        let mut doubles = Vec::new();
        for voice in declared {
            let label = self.at(voice.label);
            if self.refused.contains(label) || self.labels.contains_key(label) {
                let message = format!("The label {label} is declared twice; the first stands.");
                self.wrong(voice.label, &message, &[]);
            } else if self.labels.len() >= MOST_VOICES {
                if self.refused.is_empty() {
                    let message = format!("A sheet has at most {MOST_VOICES} voices.");
                    self.wrong(voice.label, &message, &[]);
                }
                self.refused.insert(label);
            } else {
                let index = self.labels.len();
                self.labels.insert(label, index);
                self.declared.push(voice.label);
                self.reading.score.voices.push(voice.voice);
                doubles.push((index, voice.doubles));
            }
        }
        for (index, label) in doubles {
            if let Some(label) = label {
                self.double(index, label);
            }
        }
    }

    fn voices_of(&mut self, first: &Placed) -> Vec<Declared<'a>> {
        let mut found = Vec::new();
        for row in &first.system.rows {
            if row.kind != RowKind::Music {
                continue;
            }
            let span = row.label.moved(first.span.start);
            let label = self.at(span);
            // A bad label is reported with the row.
            // A second row of one name is reported there too.
            let known = found.iter().any(|d: &Declared<'_>| d.voice.label == label);
            if label_fault(label).is_none() && !known {
                found.push(Declared {
                    voice: Voice::new(label, partwright_score::Kind::plain()),
                    label: span,
                    doubles: None,
                });
            }
        }
        found
    }

    fn double(&mut self, index: usize, label: Word<'_>) {
        let voices = &mut self.reading.score.voices;
        let Some(&other) = self.labels.get(label.text) else {
            return self.unknown_voice(label);
        };
        // Following the doublings from the other voice must not lead back here.
        let mut at = other;
        for _ in 0..voices.len() {
            if at == index {
                break;
            }
            match voices.get(at).and_then(|voice| voice.doubles) {
                Some(next) => at = next,
                None => break,
            }
        }
        if at == index {
            let message = if other == index {
                "A voice does not double itself."
            } else {
                "These voices would double each other in a ring."
            };
            self.wrong(label.span, message, &[]);
        } else if let Some(voice) = voices.get_mut(index) {
            voice.doubles = Some(other);
        }
    }

    /// Reports a label that no voice has.
    pub(super) fn unknown_voice(&mut self, label: Word<'_>) {
        let guess = self.guess();
        let voices = self.reading.score.voices.iter().filter(|_| guess);
        let other = near(label.text, voices.map(|v| v.label.as_str())).map(str::to_owned);
        let message = match &other {
            Some(other) => format!("No voice is labelled {}. Is {other} meant?", label.text),
            None => format!("No voice is labelled {}.", short(label.text)),
        };
        let instead: Vec<&str> = other.as_deref().into_iter().collect();
        self.wrong(label.span, &message, &instead);
    }

    fn equal(&mut self, line: Option<(Span, Vec<Word<'_>>)>) {
        let Some((header, words)) = line else { return };
        let (Some(first), Some(last)) = (words.first(), words.last()) else {
            let message = "The voices are missing: equal S1 S2, for instance.";
            return self.wrong(header, message, &[]);
        };
        let value = Span {
            start: first.span.start,
            end: last.span.end,
        };
        if words.len() == 1 {
            let message = "It takes two voices or more to be equal.";
            return self.wrong(first.span, message, &[]);
        }
        let mut group = Vec::new();
        let mut seen = HashSet::new();
        for word in words {
            if !seen.insert(word.text) {
                let message = format!("{} stands here twice.", short(word.text));
                self.wrong(word.span, &message, &[]);
            } else if let Some(&index) = self.labels.get(word.text) {
                group.push(index);
            } else if !self.refused.contains(word.text) {
                self.unknown_voice(word);
            }
        }
        if group.len() > 1 {
            self.reading.score.equal.push(group.clone());
            self.reading.head.equal = Some(stated(group, value));
        }
    }
}

fn stated<T>(value: T, span: Span) -> Stated<T> {
    Stated { value, span }
}

fn canonical(header: Header) -> &'static str {
    let found = HEADERS.iter().find(|(_, other)| *other == header);
    found.map_or("", |(name, _)| name)
}

/// The words in front of the first bar line of a words row: its labels and its verse.
pub(super) fn words_head<'a>(text: &'a str, label: Span, opening: Span) -> Vec<Word<'a>> {
    crate::chars::words(text, label.end as usize, opening.start as usize).collect()
}
