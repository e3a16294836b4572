//! Where voices strike notes: the cells under which syllables stand.

use std::collections::HashMap;

use partwright_score::MOST_VOICES;

use crate::lines::RowKind;
use crate::lower::bars::bar_of;
use crate::parts::label;
use crate::system::is_copied;
use crate::tree::{PartKind, Row, System};

/// The notes that the voices of a system strike.
pub(super) struct Strikes<'a> {
    text: &'a str,
    system: &'a System,
    /// The music rows by their labels, by index.
    rows: HashMap<&'a str, usize>,
    /// What was counted already.
    known: HashMap<usize, Struck>,
}

/// The notes of a row.
#[derive(Default)]
struct Struck {
    /// For each, its cell in its bar.
    cells: Vec<u32>,
    /// The first of each bar, and how many there are.
    bars: Vec<usize>,
}

impl<'a> Strikes<'a> {
    pub(super) fn new(text: &'a str, system: &'a System) -> Strikes<'a> {
        let mut rows = HashMap::new();
        for (index, row) in system.rows.iter().enumerate() {
            if row.kind == RowKind::Music {
                let label = text.get(row.label.range()).unwrap_or_default();
                rows.entry(label).or_insert(index);
            }
        }
        Strikes {
            text,
            system,
            rows,
            known: HashMap::new(),
        }
    }

    /// The music row of a voice, by index.
    pub(super) fn row(&self, label: &str) -> Option<usize> {
        self.rows.get(label).copied()
    }

    /// The cell of each note struck in a bar of a row; in a copied bar, of the row it copies.
    pub(super) fn in_bar(&mut self, row: usize, bar: usize) -> &[u32] {
        let row = self.sounding(row, bar);
        let system = self.system;
        let struck = self.known.entry(row).or_insert_with(|| {
            let row = system.rows.get(row);
            row.map_or_else(Struck::default, |row| struck(system, row))
        });
        let at = |bar: usize| struck.bars.get(bar).copied();
        let range = at(bar).zip(at(bar + 1)).map_or(0..0, |(from, to)| from..to);
        struck.cells.get(range).unwrap_or_default()
    }

    /// The row that sounds in a bar of a row: its own, or the one it copies there.
    fn sounding(&self, mut row: usize, bar: usize) -> usize {
        // Copies of copies; a ring has no end.
        for _ in 0..MOST_VOICES {
            match self.copied(row, bar) {
                Some(source) => row = source,
                None => break,
            }
        }
        row
    }

    fn copied(&self, row: usize, bar: usize) -> Option<usize> {
        let bar = bar_of(self.system.rows.get(row)?, bar)?;
        let flags = self.system.bars.get(bar as usize)?.flags;
        let part = self.system.parts_of(self.system.cells_of(bar).start).start;
        let part = self.system.parts.get(part).filter(|_| is_copied(flags))?;
        let after = self.text.as_bytes().get(part.start as usize + 1..)?;
        self.row(label(after).ok()?.1)
    }
}

fn struck(system: &System, row: &Row) -> Struck {
    let mut struck = Struck::default();
    for bar in row.bars.clone() {
        struck.bars.push(struck.cells.len());
        for (number, cell) in (0..).zip(system.cells_of(bar)) {
            let parts = system.parts.get(system.parts_of(cell)).unwrap_or_default();
            let note = |part: &&crate::tree::Part| {
                matches!(part.kind(), PartKind::Note | PartKind::Unplaced)
            };
            let notes = parts.iter().filter(note).map(|_| number);
            struck.cells.extend(notes);
        }
    }
    struck.bars.push(struck.cells.len());
    struck
}
