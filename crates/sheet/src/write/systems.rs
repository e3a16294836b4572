//! The systems: as many bars in a row as fit once beats stand in columns.

use unicode_width::UnicodeWidthStr;

use super::cells::{Carried, cells};
use super::heading::Stated;
use super::measures::Measure;
use super::music::Music;
use super::names::Label;
use super::words::Verse;

/// Columns a system fills at most, if it has more than one bar.
const COLUMNS: usize = 100;

/// A bar of every row, and the widths of its columns.
struct Column {
    /// By row: voices, then verses.
    rows: Vec<Vec<String>>,
    widths: Vec<usize>,
    closes: bool,
}

impl Column {
    fn of(rows: Vec<Vec<String>>, closes: bool) -> Column {
        let cells = rows.iter().map(Vec::len).max().unwrap_or(0);
        let widest = |i: usize| {
            let all = rows.iter().filter_map(|row| row.get(i));
            all.map(|cell| cell.width()).max().unwrap_or(0)
        };
        Column {
            widths: (0..cells).map(widest).collect(),
            rows,
            closes,
        }
    }

    /// Columns from its first cell to its last.
    fn width(&self) -> usize {
        let gaps = self.widths.len().saturating_sub(1);
        self.widths.iter().sum::<usize>() + gaps
    }

    /// The cells of a row.
    fn row(&self, row: usize) -> String {
        let cells = self.rows.get(row).map_or(&[][..], Vec::as_slice);
        let cells = cells.iter().filter(|cell| !cell.is_empty());
        cells.map(String::as_str).collect::<Vec<_>>().join(" ")
    }
}

/// What is written, from the first voice to the last verse.
struct Rows<'w> {
    music: &'w Music,
    /// Voices, each with its verses.
    order: Vec<Row<'w>>,
    heads: Vec<&'w str>,
}

enum Row<'w> {
    Voice(usize),
    Verse(&'w Verse),
}

impl Rows<'_> {
    fn column(&self, measure: &Measure, last: bool, carried: &mut [Carried]) -> Column {
        let mut rows: Vec<Vec<String>> = self
            .order
            .iter()
            .map(|row| match row {
                Row::Voice(voice) => {
                    let notes = self.music.voices.get(*voice);
                    let carried = carried.get_mut(*voice);
                    notes
                        .zip(carried)
                        .map_or_else(Vec::new, |(notes, carried)| cells(notes, measure, carried))
                }
                Row::Verse(verse) => verse.under(measure, self.music).unwrap_or_default(),
            })
            .collect();
        if measure.in_full() && measure.cells() == 1 {
            self.split_bare(&mut rows);
        }
        Column::of(rows, measure.closes || last)
    }

    /// A bar whose rows tell its length, and all hold or are silent through its one cell: one of
    /// them says so in two parts, for alone a part would stand for a bar of any length.
    fn split_bare(&self, rows: &mut [Vec<String>]) {
        let bare = |cells: &Vec<String>| matches!(cells.as_slice(), [only] if matches!(only.trim_end_matches(['^', ',']), "-" | "_" | "?"));
        let mut music = rows
            .iter_mut()
            .zip(&self.order)
            .filter(|(_, row)| matches!(row, Row::Voice(_)))
            .map(|(cells, _)| cells)
            .collect::<Vec<_>>();
        if music.iter().all(|cells| bare(cells))
            && let Some(only) = music.first_mut().and_then(|cells| cells.first_mut())
        {
            // A fermata stands on the first part, a breath on the last.
            let (mark, breath) = (only.contains('^'), only.contains(','));
            let part = only.get(..1).unwrap_or("_").to_owned();
            let (mark, breath) = (if mark { "^" } else { "" }, if breath { "," } else { "" });
            *only = format!("{part}{mark}.{part}{breath}");
        }
    }

    /// Writes a system.
    fn system(&self, out: &mut String, columns: &[Column]) {
        for (index, (row, head)) in self.order.iter().zip(&self.heads).enumerate() {
            let text = |column: &Column| {
                let cells = column.rows.get(index);
                cells.is_some_and(|cells| !cells.is_empty())
            };
            if matches!(row, Row::Verse(_)) && !columns.iter().any(text) {
                continue;
            }
            out.push_str(head);
            out.push_str(" |");
            for column in columns {
                out.push(' ');
                out.push_str(&column.row(index));
                out.push_str(if column.closes { " ||" } else { " |" });
            }
            out.push('\n');
        }
    }

    fn label_width(&self) -> usize {
        self.heads.iter().map(|head| head.len()).max().unwrap_or(0)
    }
}

/// Writes all systems.
pub(super) fn systems(
    out: &mut String,
    labels: &[Label],
    music: &Music,
    measures: &[Measure],
    changes: &[Stated],
    words: &[Verse],
) {
    if music.voices.is_empty() {
        return;
    }
    let mut rows = Rows {
        music,
        order: Vec::new(),
        heads: Vec::new(),
    };
    for voice in 0..music.voices.len() {
        rows.order.push(Row::Voice(voice));
        rows.heads.push(labels.get(voice).map_or("", |l| &l.label));
        for verse in words.iter().filter(|verse| verse.voice == voice) {
            rows.order.push(Row::Verse(verse));
            rows.heads.push(&verse.head);
        }
    }
    let width = COLUMNS.saturating_sub(rows.label_width() + 2);
    let fresh = vec![Carried::default(); music.voices.len()];
    let mut carried = fresh.clone();
    // A bar is widest where it begins a system: every row writes its octave figure.
    let widths = measures.iter().map(|measure| {
        carried.clone_from(&fresh);
        let column = rows.column(measure, false, &mut carried);
        // A blank on either side and a bar line, which may be double.
        column.width() + 4
    });
    let widths: Vec<usize> = widths.collect();
    let stated = |i: usize| changes.get(i).filter(|s| i > 0 && !s.is_nothing());
    let mut from = 0;
    while from < measures.len() {
        let mut to = from + 1;
        while to < measures.len() && stated(to).is_none() {
            to += 1;
        }
        if let Some(stated) = stated(from) {
            out.push('\n');
            stated.lines(out);
        }
        for count in evenly(widths.get(from..to).unwrap_or_default(), width) {
            let own = measures.iter().enumerate().skip(from).take(count);
            carried.clone_from(&fresh);
            let columns = own.map(|(i, measure)| {
                let last = i + 1 == measures.len();
                rows.column(measure, last, &mut carried)
            });
            let columns: Vec<Column> = columns.collect();
            out.push('\n');
            rows.system(out, &columns);
            from += count;
        }
    }
}

/// How many bars each system has: as few systems as there must be, and as even as can be.
fn evenly(widths: &[usize], most: usize) -> Vec<usize> {
    let fewest = filled(widths, most, usize::MAX).len();
    let mut bars = widths.len().div_ceil(fewest.max(1));
    loop {
        let found = filled(widths, most, bars);
        if found.len() <= fewest || bars >= widths.len() {
            return found;
        }
        bars += 1;
    }
}

/// Fills systems one after another.
fn filled(widths: &[usize], most: usize, bars: usize) -> Vec<usize> {
    let mut counts = Vec::new();
    let mut taken = 0;
    for width in widths {
        match counts.last_mut() {
            Some(count) if *count < bars && taken + width <= most => {
                *count += 1;
                taken += width;
            }
            _ => {
                counts.push(1);
                taken = *width;
            }
        }
    }
    counts
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn systems_are_few_and_even() {
        assert_eq!(evenly(&[20; 9], 100), [5, 4]);
        assert_eq!(evenly(&[20; 6], 100), [3, 3]);
        assert_eq!(evenly(&[60, 60, 30, 30, 30], 100), [1, 2, 2]);
        assert_eq!(evenly(&[120, 20], 100), [1, 1]);
        assert_eq!(evenly(&[10, 10, 10, 10, 95, 95], 100), [4, 1, 1]);
        assert_eq!(evenly(&[], 100), [0; 0]);
    }
}
