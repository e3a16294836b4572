//! The sheet: its lines gathered into systems and the lines between them.

use std::borrow::Cow;
use std::collections::{HashMap, HashSet};
use std::sync::Arc;

use crate::chars::words;
use crate::lines::{Header, Line, LineKind, RowKind, lines};
use crate::system::read_system;
use crate::tree::{Draft, System};
use crate::{LARGEST, Reading, Span, lower};

/// A sheet, taken apart: a tree with the text it was read from. Cheap to clone.
#[derive(Clone, Debug)]
pub struct Sheet {
    tree: Arc<Tree>,
}

/// What a sheet is made of.
#[derive(Debug)]
pub(crate) struct Tree {
    /// The text; empty if it is too large to be read.
    pub(crate) text: String,
    /// Systems and the lines between and in them, in order.
    pub(crate) blocks: Vec<Block>,
    /// The text was larger than [`LARGEST`].
    pub(crate) too_large: bool,
}

/// A system, or a line that is no row.
#[derive(Clone, Debug)]
pub(crate) enum Block {
    Line(OtherLine),
    System(Placed),
}

/// A line that is no row, by offsets in the whole text.
#[derive(Clone, Copy, Debug)]
pub(crate) struct OtherLine {
    pub(crate) kind: LineKind,
    /// Its first word.
    pub(crate) word: Span,
    /// Where the line ends.
    pub(crate) end: u32,
}

/// A system where it stands.
#[derive(Clone, Debug)]
pub(crate) struct Placed {
    pub(crate) system: Arc<System>,
    /// The whole lines from its first row to its last.
    pub(crate) span: Span,
    /// The label that began it though no blank line stands before.
    pub(crate) unseparated: bool,
    /// A line among its rows could not be read: a voice without a row need not be silent.
    pub(crate) flawed: bool,
}

impl Sheet {
    /// Takes a text apart. Never fails: what cannot be read becomes a problem of its [`Reading`].
    #[must_use]
    pub fn read(text: &str) -> Sheet {
        build(text, None)
    }

    /// The same, sharing with the sheet before an edit every system whose text is unchanged.
    #[must_use]
    pub fn read_again(text: &str, before: &Sheet) -> Sheet {
        build(text, Some(&before.tree))
    }

    /// Lowers the tree to a score. `text` is what the tree was read from; another text is read
    /// afresh.
    #[must_use]
    pub fn lower(&self, text: &str) -> Reading {
        if self.tree.text == text || (self.tree.too_large && text.len() > LARGEST) {
            lower::lower(&self.tree)
        } else {
            lower::lower(&Sheet::read(text).tree)
        }
    }

    /// What it was taken apart into.
    pub(crate) fn tree(&self) -> &Tree {
        &self.tree
    }

    /// Bytes of memory the tree takes, the text it keeps included.
    #[must_use]
    pub fn bytes(&self) -> usize {
        let systems = self.tree.blocks.iter().map(|block| match block {
            Block::System(placed) => placed.system.bytes(),
            Block::Line(_) => 0,
        });
        self.tree.text.capacity()
            + self.tree.blocks.capacity() * size_of::<Block>()
            + systems.sum::<usize>()
    }
}

/// The length of a byte order mark in front of a text.
fn mark_length(text: &str) -> usize {
    if text.starts_with('\u{feff}') { 3 } else { 0 }
}

fn build(text: &str, before: Option<&Tree>) -> Sheet {
    let mut tree = Tree {
        text: String::new(),
        blocks: Vec::new(),
        too_large: text.len() > LARGEST,
    };
    if !tree.too_large {
        let mut gather = Gather {
            text,
            blocks: Vec::new(),
            current: None,
            labels: HashSet::new(),
            known: before.map(Known::of),
            voices: Vec::new(),
            draft: Draft::default(),
        };
        let mut lines = lines(text, mark_length(text)).peekable();
        while let Some(line) = lines.next() {
            gather.line(line, lines.peek());
        }
        gather.close();
        tree.blocks = gather.blocks;
        tree.blocks.shrink_to_fit();
        tree.text = text.to_owned();
    }
    Sheet {
        tree: Arc::new(tree),
    }
}

/// Gathers lines into systems.
struct Gather<'a> {
    text: &'a str,
    blocks: Vec<Block>,
    current: Option<Gathered>,
    /// What the rows of the current system are called.
    labels: HashSet<Cow<'a, str>>,
    known: Option<Known<'a>>,
    /// The labels of the voices, as they are declared or as the first system has them.
    voices: Vec<&'a str>,
    draft: Draft,
}

/// A system whose rows are still coming.
struct Gathered {
    lines: Vec<Line>,
    unseparated: bool,
    flawed: bool,
}

impl<'a> Gather<'a> {
    fn line(&mut self, line: Line, next: Option<&Line>) {
        match line.kind {
            LineKind::Blank => self.close(),
            LineKind::Comment => {}
            LineKind::Row(kind) => self.row(line, kind, next),
            LineKind::Footnote => self.other(line),
            LineKind::Word(Header::Unknown) | LineKind::Unlabelled | LineKind::Begun => {
                // It may have been meant for a row or a comment: the system goes on.
                if let Some(current) = &mut self.current {
                    current.flawed = true;
                }
                self.other(line);
            }
            LineKind::Word(header) => {
                self.close();
                self.other(line);
                if header == Header::Voice {
                    let label = words(self.text, line.word_end, line.end).next();
                    self.voices.extend(label.map(|word| word.text));
                }
            }
        }
    }

    fn other(&mut self, line: Line) {
        self.blocks.push(Block::Line(OtherLine {
            kind: line.kind,
            word: Span::new(line.word, line.word_end),
            end: crate::system::small(line.end),
        }));
    }

    /// What a row is called.
    fn name(&self, line: &Line, kind: RowKind) -> Cow<'a, str> {
        let text = self.text;
        match kind {
            // Labels and verse are its name: two verses are two rows.
            RowKind::Words => {
                let row = text.get(line.word..line.end).unwrap_or_default();
                let head = row.find('|').unwrap_or(row.len());
                let names: Vec<&str> = words(row, 0, head).map(|word| word.text).collect();
                Cow::Owned(names.join(" "))
            }
            _ => Cow::Borrowed(text.get(line.word..line.word_end).unwrap_or_default()),
        }
    }

    fn row(&mut self, line: Line, kind: RowKind, next: Option<&Line>) {
        let name = self.name(&line, kind);
        let mut unseparated = false;
        let again = self.current.is_some() && self.labels.contains(&name);
        if again && !(kind == RowKind::Music && self.is_mislabelled(&name, next)) {
            // Behind a line that could not be read the blank line is the lesser trouble.
            unseparated = self.current.as_ref().is_some_and(|c| !c.flawed);
            self.close();
        }
        let current = self.current.get_or_insert_with(|| Gathered {
            lines: Vec::new(),
            unseparated,
            flawed: false,
        });
        current.lines.push(line);
        self.labels.insert(name);
    }

    /// Whether a second row of one name is likelier to have the wrong name than to begin a system
    /// for which the blank line was forgotten: voices are still missing here, and what follows is
    /// no repetition of the rows so far.
    fn is_mislabelled(&self, name: &str, next: Option<&Line>) -> bool {
        let has = |voice: &str| self.labels.contains(voice);
        if !self.voices.is_empty() && self.voices.iter().all(|voice| has(voice)) {
            return false;
        }
        let next = next.and_then(|line| match line.kind {
            LineKind::Row(kind) => Some((kind, self.name(line, kind))),
            _ => None,
        });
        let first = self.current.as_ref().and_then(|current| {
            let music = |line: &&Line| line.kind == LineKind::Row(RowKind::Music);
            let line = current.lines.iter().find(music)?;
            Some(self.name(line, RowKind::Music))
        });
        match next {
            Some((_, next)) if self.labels.contains(&next) => first.is_none_or(|f| f != name),
            Some((RowKind::Music, _)) => true,
            _ => first.is_none_or(|first| first != name) || !self.voices.is_empty(),
        }
    }

    fn close(&mut self) {
        let Some(mut current) = self.current.take() else {
            return;
        };
        if self.voices.is_empty() {
            let rows = current.lines.iter();
            let music = rows.filter(|line| line.kind == LineKind::Row(RowKind::Music));
            let label = |line: &Line| self.text.get(line.word..line.word_end);
            self.voices = music.filter_map(label).collect();
        }
        self.labels.clear();
        let start = current.lines.first().map_or(0, |line| line.start);
        let end = current.lines.last().map_or(start, |line| line.end);
        let text = self.text.get(start..end).unwrap_or_default();
        let known = self.known.as_mut().and_then(|known| known.find(text));
        let system = known.unwrap_or_else(|| {
            for line in &mut current.lines {
                line.start -= start;
                line.end -= start;
                line.word -= start;
                line.word_end -= start;
            }
            Arc::new(read_system(text, &current.lines, &mut self.draft))
        });
        self.blocks.push(Block::System(Placed {
            system,
            span: Span::new(start, end),
            unseparated: current.unseparated,
            flawed: current.flawed,
        }));
    }
}

/// The systems of a sheet before an edit.
struct Known<'a> {
    systems: Vec<(&'a str, &'a Arc<System>)>,
    /// Where the next one is expected.
    next: usize,
    /// How many in a row were not where they were expected.
    missed: usize,
    /// All of them by their text, once looking around was not enough.
    all: Option<HashMap<&'a str, usize>>,
}

impl<'a> Known<'a> {
    fn of(tree: &'a Tree) -> Known<'a> {
        let systems = tree.blocks.iter().filter_map(|block| match block {
            Block::System(placed) => {
                let text = tree.text.get(placed.span.range())?;
                Some((text, &placed.system))
            }
            Block::Line(_) => None,
        });
        Known {
            systems: systems.collect(),
            next: 0,
            missed: 0,
            all: None,
        }
    }

    /// The system of that text: an edit leaves most where they were, or moves them a little.
    fn find(&mut self, text: &str) -> Option<Arc<System>> {
        let around = self.next.saturating_sub(2)..self.next + 3;
        let near = std::iter::once(self.next).chain(around);
        let same = |i: &usize| {
            self.systems
                .get(*i)
                .is_some_and(|(known, _)| *known == text)
        };
        let mut found = near.clone().find(same);
        if found.is_none() && (self.missed > 2 || self.all.is_some()) {
            let systems = &self.systems;
            let all = self.all.get_or_insert_with(|| {
                systems
                    .iter()
                    .enumerate()
                    .map(|(i, (text, _))| (*text, i))
                    .collect()
            });
            found = all.get(text).copied();
        }
        self.missed = if found.is_some() { 0 } else { self.missed + 1 };
        self.next = found.unwrap_or(self.next) + 1;
        found
            .and_then(|i| self.systems.get(i))
            .map(|(_, system)| Arc::clone(system))
    }
}

/// The words of a line behind its first, up to a comment.
pub(crate) fn value_words(text: &str, line: OtherLine) -> Vec<crate::chars::Word<'_>> {
    words(text, line.word.end as usize, line.end as usize).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    fn systems(sheet: &Sheet) -> Vec<&Arc<System>> {
        let blocks = sheet.tree.blocks.iter().filter_map(|block| match block {
            Block::System(placed) => Some(&placed.system),
            Block::Line(_) => None,
        });
        blocks.collect()
    }

    /// How many systems of the sheet after an edit are the very ones of the sheet before.
    fn shared(before: &str, after: &str) -> (usize, usize) {
        let before = Sheet::read(before);
        let after = Sheet::read_again(after, &before);
        let old = systems(&before);
        let new = systems(&after);
        let same = |s: &&&Arc<System>| old.iter().any(|o| Arc::ptr_eq(o, s));
        (new.iter().filter(same).count(), new.len())
    }

    fn sheet(notes: &[&str]) -> String {
        let systems = notes.iter().map(|note| format!("S | {note} |\nB | C3 |\n"));
        systems.collect::<Vec<_>>().join("\n")
    }

    #[test]
    fn only_the_edited_system_is_read_again() {
        let before = sheet(&["C4", "D4", "E4", "F4", "G4", "A4"]);
        for (after, expected) in [
            (before.clone(), (6, 6)),
            (sheet(&["C4", "D4", "E5", "F4", "G4", "A4"]), (5, 6)),
            (sheet(&["C4", "D4", "F4", "G4", "A4"]), (5, 5)),
            (sheet(&["C4", "D4", "B4", "E4", "F4", "G4", "A4"]), (6, 7)),
            (sheet(&["A4", "C4", "D4", "E4", "F4", "G4"]), (5, 6)),
            (format!("title Quay lanterns\n\n{before}"), (6, 6)),
            (before.replace('\n', "\r\n"), (0, 6)),
        ] {
            assert_eq!(shared(&before, &after), expected, "{after}");
        }
        let far = sheet(&["B4", "B5", "B6", "B7", "B8", "B9", "G4", "F4", "C4"]);
        assert_eq!(shared(&before, &far), (3, 9));
    }

    #[test]
    fn another_text_is_read_afresh() {
        let one = Sheet::read("S | C4 |\n");
        assert!(one.lower("S | D4 |\n").describe().contains("D4"));
    }
}
