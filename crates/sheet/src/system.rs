//! Reading a system: its rows one after another, each from its own line.

use crate::chars::{after_blanks, comment_at};
use crate::lines::{Line, LineKind, RowKind};
use crate::near::short;
use crate::problem::{Edit, Offer, Problem, ProblemKind};
use crate::tree::{
    COPIED, DOUBLE, Draft, OPEN, Part, PartKind, Row, RowBar, Slip, System, part_end, syllable_end,
};
use crate::{Span, explain};

/// Reads a system from its own text; the lines count from the start of that text.
pub(crate) fn read_system(text: &str, lines: &[Line], draft: &mut Draft) -> System {
    let mut reader = Reader {
        text: text.as_bytes(),
        source: text,
        system: draft,
    };
    for line in lines {
        if let LineKind::Row(kind) = line.kind {
            reader.row(line, kind);
        }
    }
    draft.finish()
}

/// A count or an offset as the tree keeps it; a sheet has fewer than 2³² bytes.
pub(crate) fn small(n: usize) -> u32 {
    u32::try_from(n).unwrap_or(u32::MAX)
}

/// A system while it is read.
pub(crate) struct Reader<'a> {
    /// Its text; a row is read from a slice that ends with its line.
    pub(crate) text: &'a [u8],
    pub(crate) source: &'a str,
    pub(crate) system: &'a mut Draft,
}

/// What a cell turned out to be.
pub(crate) enum Cell {
    /// It takes its time; the next thing stands at the offset.
    Timed(usize),
    /// It takes none (a dynamic, a volta), and a problem says so.
    Timeless(usize),
}

/// Reads one cell from an offset of a row; `first` tells that it is the first of its bar.
pub(crate) trait Cells {
    /// What an unclosed last bar is: a mistake, or in music, where every row goes through it while
    /// it is typed, only unfinished.
    const UNCLOSED: ProblemKind = ProblemKind::Reading;
    /// Reads the cell.
    fn cell(&mut self, reader: &mut Reader<'_>, row: &[u8], at: usize) -> Cell;
    /// A bar line was reached: the cells from `first` on make a bar. Returns its flags.
    fn bar(&mut self, _reader: &mut Reader<'_>, _first: usize) -> u8 {
        0
    }
}

impl Reader<'_> {
    fn row(&mut self, line: &Line, kind: RowKind) {
        let row = self.text.get(..line.end).unwrap_or_default();
        let label = Span::new(line.word, line.word_end);
        let first = small(self.system.bars.len());
        let mut at = after_blanks(row, line.word_end);
        let mut head = label;
        if kind == RowKind::Words {
            // The labels and the verse: they are read when the tree is lowered.
            while at < row.len() && row.get(at) != Some(&b'|') && !comment_at(row, at) {
                let end = part_end(row, at).max(at + 1);
                head = Span::new(line.word, end);
                at = after_blanks(row, end);
            }
        }
        let mut opening = Span::new(at, at);
        if row.get(at) == Some(&b'|') {
            opening = Span::new(at, at + 1);
            let strokes = strokes(row, at);
            if strokes > 1 {
                let span = Span::new(at, at + strokes);
                self.slip_with(span, "A row begins with one stroke: |.".into(), &["|"]);
            }
            at = self.repeat(row, at, at + strokes);
        } else {
            let name = self.source.get(head.range()).unwrap_or_default();
            let what = match kind {
                RowKind::Music => "label and the music",
                RowKind::Words => "labels and the words",
                RowKind::Harmony | RowKind::Figures => "name of a row and what it says",
            };
            let message = format!("A bar line stands between the {what}: {} |.", short(name));
            let instead = format!("{name} |");
            // The name is marked; what is offered replaces all in front of the bar line.
            let found = Problem {
                span: label,
                ..problem(head, message, &[&instead])
            };
            self.slip_at(self.system.parts.len(), found);
        }
        match kind {
            RowKind::Music => self.bars(row, at, &mut crate::music::Music::default()),
            RowKind::Words => self.bars(row, at, &mut Syllables),
            RowKind::Harmony => self.bars(row, at, &mut crate::under::Chords),
            RowKind::Figures => self.bars(row, at, &mut crate::under::Stacks),
        }
        self.system.rows.push(Row {
            kind,
            line: Span::new(line.start, line.end),
            label,
            opening,
            bars: first..small(self.system.bars.len()),
        });
    }

    /// The bars of a row, from behind its first bar line to the end of the line.
    fn bars(&mut self, row: &[u8], from: usize, cells: &mut impl Cells) {
        let mut at = from;
        let mut first = self.system.cells.len();
        loop {
            let start = at;
            at = after_blanks(row, at);
            match row.get(at) {
                None => break,
                Some(b'/') if at > start && comment_at(row, at) => break,
                Some(b'|') => {
                    let line = at;
                    let strokes = strokes(row, at);
                    if strokes > 2 {
                        let span = Span::new(at, at + strokes);
                        let message = "A bar line is |, and || closes a section.";
                        self.slip_with(span, message.into(), &["||"]);
                    }
                    at = self.repeat(row, line, at + strokes);
                    let flags = if strokes > 1 { DOUBLE } else { 0 };
                    self.close(first, line, flags, cells);
                    first = self.system.cells.len();
                }
                Some(_) => {
                    let parts = self.system.parts.len();
                    at = match cells.cell(self, row, at) {
                        Cell::Timed(end) => {
                            self.system.cells.push(small(parts));
                            end
                        }
                        Cell::Timeless(end) => end,
                    };
                }
            }
        }
        if self.system.cells.len() > first {
            self.unclosed(row, first, cells);
        }
    }

    fn close(&mut self, first: usize, line: usize, flags: u8, cells: &mut impl Cells) {
        let flags = flags | cells.bar(self, first);
        self.system.bars.push(RowBar {
            cells: small(first),
            line: small(line),
            flags,
        });
    }

    /// The row ended without a bar line behind its last cells.
    fn unclosed<C: Cells>(&mut self, row: &[u8], first: usize, cells: &mut C) {
        let start = self.system.parts.last().map_or(0, |p| p.start as usize);
        let span = Span::new(start, part_end(row, start));
        self.close(first, start, OPEN, cells);
        let text = self.source.get(span.range()).unwrap_or_default().to_owned();
        let instead = format!("{text} |");
        let message = "This bar is not closed yet: a row ends with a bar line, |.".to_owned();
        let last = self.system.parts.len().saturating_sub(1);
        let unfinished = Problem {
            kind: C::UNCLOSED,
            ..problem(span, message, &[&instead])
        };
        self.slip_at(last, unfinished);
    }

    /// A colon at a bar line is a repeat sign: it is reported and passed over.
    fn repeat(&mut self, row: &[u8], line: usize, after: usize) -> usize {
        let mut at = after;
        while row.get(at) == Some(&b':') {
            at += 1;
        }
        if at > after {
            self.slip(Span::new(line, at), explain::REPEAT.to_owned());
        }
        at
    }

    /// Reports something about the next part.
    pub(crate) fn slip(&mut self, span: Span, message: String) {
        self.slip_with(span, message, &[]);
    }

    /// The same, with what could stand in its place.
    pub(crate) fn slip_with(&mut self, span: Span, message: String, instead: &[&str]) {
        self.slip_at(self.system.parts.len(), problem(span, message, instead));
    }

    /// Reports something about a part by index.
    pub(crate) fn slip_at(&mut self, part: usize, problem: Problem) {
        self.system.slips.push(Slip {
            part: small(part),
            problem,
        });
    }

    /// Adds a part without a pitch.
    pub(crate) fn push(&mut self, start: usize, kind: PartKind) {
        self.system.parts.push(Part::new(start, kind, 0, 0, 0));
    }
}

/// Strokes in a row from an offset on.
fn strokes(row: &[u8], at: usize) -> usize {
    let from = row.get(at..).unwrap_or_default();
    from.iter().take_while(|b| **b == b'|').count()
}

/// A problem of reading with the texts that could stand in place of its span.
pub(crate) fn problem(span: Span, message: String, instead: &[&str]) -> Problem {
    let offer = |text: &&str| Offer {
        title: format!("Write {text}"),
        edits: vec![Edit {
            span,
            text: (*text).to_owned(),
        }],
    };
    Problem {
        kind: ProblemKind::Reading,
        span,
        message,
        offers: instead.iter().map(offer).collect(),
        voice: None,
        at: None,
    }
}

/// The syllables of a words row: each is a cell of its own.
struct Syllables;

impl Cells for Syllables {
    fn cell(&mut self, reader: &mut Reader<'_>, row: &[u8], at: usize) -> Cell {
        let end = syllable_end(row, at);
        let text = row.get(at..end).unwrap_or_default();
        let kind = match text {
            b"-" => PartKind::Hold,
            b"_" => PartKind::Rest,
            _ => PartKind::Text,
        };
        if joins_nothing(text) {
            let message = "~ joins two words on one note, as in of~the; a word is missing here.";
            reader.slip(Span::new(at, end), message.to_owned());
        }
        if text.ends_with(b"\\") && crate::chars::plain(crate::parts::text(text)).1 {
            let message = "A backslash (\\) makes the next character plain; none follows it.";
            reader.slip(Span::new(end - 1, end), message.to_owned());
        }
        reader.push(at, kind);
        Cell::Timed(end)
    }
}

/// A `~` at an end of a syllable or beside another; behind a backslash it is a plain character.
fn joins_nothing(syllable: &[u8]) -> bool {
    let mut bytes = syllable.iter();
    let mut open = true;
    while let Some(byte) = bytes.next() {
        match byte {
            b'~' if open => return true,
            b'~' => open = true,
            b'\\' => {
                bytes.next();
                open = false;
            }
            _ => open = false,
        }
    }
    open
}

/// Whether a bar is a copy of another voice's.
pub(crate) fn is_copied(flags: u8) -> bool {
    flags & COPIED != 0
}
