//! Which part of wide rows is shown.
//!
//! A system may be far wider than a terminal. Its rows are cut at the same bar lines, or where a
//! bar is itself too wide at the same cells, so that voices still stand under each other; and
//! they keep their labels.

use std::ops::Range;

use unicode_width::UnicodeWidthStr;

use super::marks::Mark;
use super::rows::{Drawn, Piece, Row};

/// A system with more rows is shown by its marked rows only.
const MOST_ROWS: usize = 6;
/// Bars of more bytes are not taken apart into cells.
const LONG_BAR: usize = 1 << 14;

/// A line that is shown.
pub(super) struct Shown {
    /// Its number.
    pub(super) number: usize,
    /// Where it ends in the text.
    pub(super) end: usize,
    /// What is shown of it.
    pub(super) text: String,
    /// Its marks, in bytes of what is shown.
    pub(super) marks: Vec<Mark>,
}

/// A row with the marks in it.
type Marked<'r> = (&'r Row, Vec<&'r Mark>);

/// The rows that hold marks, with `context` the others of their system too, in at most `room`
/// columns where that can be.
pub(super) fn cut(
    text: &str,
    rows: &[Row],
    marks: &[&Mark],
    context: bool,
    room: usize,
) -> Vec<Shown> {
    let in_row = |row: &Row| -> Vec<&Mark> {
        marks
            .iter()
            .copied()
            .filter(|m| (row.span.start..=row.span.end).contains(&m.span.start))
            .collect()
    };
    let all: Vec<Marked<'_>> = rows.iter().map(|row| (row, in_row(row))).collect();
    let context = context && rows.iter().filter(|row| row.music).count() <= MOST_ROWS;
    let wanted = |(row, marks): &&Marked<'_>| !marks.is_empty() || (context && row.music);
    let wanted: Vec<Marked<'_>> = all.iter().filter(wanted).cloned().collect();
    let marked: Vec<Marked<'_>> = all
        .into_iter()
        .filter(|(_, marks)| !marks.is_empty())
        .collect();
    whole(text, &wanted, room)
        .or_else(|| by_bars(text, &wanted, room))
        .or_else(|| by_cells(text, &wanted, room))
        .or_else(|| by_bars(text, &marked, room))
        .or_else(|| by_cells(text, &marked, room))
        .unwrap_or_else(|| marked.iter().map(|row| alone(text, row, room)).collect())
}

/// Rows as they stand, where there is room for them.
fn whole(text: &str, rows: &[Marked<'_>], room: usize) -> Option<Vec<Shown>> {
    rows.iter()
        .map(|row| piece_together(text, row, &[Piece::Text(row.0.span.clone())], room))
        .collect()
}

/// Rows cut at the same bar lines: the bars with marks, and as many around them as there is
/// room for.
fn by_bars(text: &str, rows: &[Marked<'_>], room: usize) -> Option<Vec<Shown>> {
    let (first, last) = marked_bars(rows)?;
    let bars = rows.iter().map(|(row, _)| row.bars.len()).max()?;
    widen(first, last, bars, |first, last| {
        let stretch = |row: &Row| {
            let start = row.bars.get(first).map_or(row.end(), |bar| bar.start);
            start..row.bars.get(last).map_or(row.end(), |bar| bar.end)
        };
        rows.iter()
            .map(|row| piece_together(text, row, &window(row.0, stretch(row.0)), room))
            .collect()
    })
}

/// Rows cut at the same cells of the bar (or of the few bars) that hold the marks.
fn by_cells(text: &str, rows: &[Marked<'_>], room: usize) -> Option<Vec<Shown>> {
    let (first, last) = marked_bars(rows)?;
    let stretch = |row: &Row| {
        let start = row.bars.get(first).map_or(row.end(), |bar| bar.start);
        start..row.bars.get(last).map_or(row.end(), |bar| bar.end)
    };
    let cells = |row: &Row| {
        let stretch = stretch(row);
        (stretch.len() <= LONG_BAR).then(|| cells(text, &stretch))
    };
    let cells: Vec<Vec<Range<usize>>> = rows
        .iter()
        .map(|(row, _)| cells(row))
        .collect::<Option<_>>()?;
    let holds = |cells: &[Range<usize>], at: usize| {
        cells
            .partition_point(|cell| cell.start <= at)
            .saturating_sub(1)
    };
    let marked = rows.iter().zip(&cells).flat_map(|((_, marks), cells)| {
        marks.iter().map(move |mark| holds(cells, mark.span.start))
    });
    let (low, high) = marked.fold((usize::MAX, 0), |(low, high), cell| {
        (low.min(cell), high.max(cell))
    });
    let most = cells.iter().map(Vec::len).max()?;
    widen(low, high, most, |low, high| {
        let piece = |(row, cells): (&Marked<'_>, &Vec<Range<usize>>)| {
            let whole = stretch(row.0);
            let start = if low == 0 {
                whole.start
            } else {
                cells.get(low).map_or(whole.end, |cell| cell.start)
            };
            let end = if high + 1 >= cells.len() {
                whole.end
            } else {
                cells.get(high).map_or(whole.end, |c| c.end)
            };
            piece_together(text, row, &window(row.0, start..end.max(start)), room)
        };
        rows.iter().zip(&cells).map(piece).collect()
    })
}

/// The first and the last bar with a mark, by index.
fn marked_bars(rows: &[Marked<'_>]) -> Option<(usize, usize)> {
    let bar = |row: &Row, mark: &Mark| {
        row.bars
            .partition_point(|bar| bar.start <= mark.span.start)
            .checked_sub(1)
    };
    let marked = rows
        .iter()
        .flat_map(|(row, marks)| marks.iter().filter_map(|mark| bar(row, mark)));
    marked.fold(None, |range, bar| match range {
        None => Some((bar, bar)),
        Some((first, last)) => Some((bar.min(first), bar.max(last))),
    })
}

/// Draws from `first` to `last` and then, step by step, as far beyond both below `end` as it can
/// be drawn. `None` where not even the beginning can.
fn widen<T>(
    mut first: usize,
    mut last: usize,
    end: usize,
    draw: impl Fn(usize, usize) -> Option<T>,
) -> Option<T> {
    let mut best = draw(first, last)?;
    loop {
        let before = (first, last);
        if let Some(wider) = first.checked_sub(1).and_then(|earlier| draw(earlier, last)) {
            (best, first) = (wider, first - 1);
        }
        if let Some(wider) = (last + 1 < end).then(|| draw(first, last + 1)).flatten() {
            (best, last) = (wider, last + 1);
        }
        if before == (first, last) {
            return Some(best);
        }
    }
}

/// A row's label, the stretch of its bars, and dots for what is left out.
fn window(row: &Row, stretch: Range<usize>) -> Vec<Piece> {
    let mut pieces = vec![Piece::Text(row.span.start..row.prefix)];
    if stretch.start > row.prefix {
        let at_bar = row
            .bars
            .binary_search_by_key(&stretch.start, |bar| bar.start)
            .is_ok();
        pieces.push(Piece::Ours(if at_bar { " … |" } else { " … " }));
    }
    let end = stretch.end;
    pieces.push(Piece::Text(stretch));
    if end < row.end() {
        pieces.push(Piece::Ours(" …"));
    }
    pieces
}

/// The cells of some bars: what stands between blanks and bar lines.
fn cells(text: &str, stretch: &Range<usize>) -> Vec<Range<usize>> {
    let mut found = Vec::new();
    let mut start = None;
    for (i, c) in text.get(stretch.clone()).unwrap_or_default().char_indices() {
        let outside = c.is_whitespace() || c == '|';
        match (start, outside) {
            (None, false) => start = Some(stretch.start + i),
            (Some(begun), true) => {
                found.push(begun..stretch.start + i);
                start = None;
            }
            _ => {}
        }
    }
    found.extend(start.map(|begun| begun..stretch.end));
    found
}

/// One row for itself: from its first mark to its last, and as many words around them as there
/// is room for; only the main mark where even that is too wide.
fn alone(text: &str, row: &Marked<'_>, room: usize) -> Shown {
    let (line, marks) = row;
    // What stands in front of the first bar line may be far more than a label.
    let label = text.get(line.span.start..line.prefix).unwrap_or_default();
    let narrow = label.width() <= room / 2;
    let base = if narrow && marks.iter().all(|mark| mark.span.start >= line.prefix) {
        line.prefix
    } else {
        line.span.start
    };
    let within = |at: usize| at.clamp(base, line.span.end);
    let pieces = |start: usize, end: usize| {
        let mut pieces = vec![Piece::Text(line.span.start..base)];
        if start > base {
            pieces.push(Piece::Ours(" … "));
        }
        pieces.push(Piece::Text(start..end));
        if end < line.span.end {
            pieces.push(Piece::Ours(" …"));
        }
        pieces
    };
    let fits = |start: usize, end: usize| piece_together(text, row, &pieces(start, end), room);
    let mut start = marks
        .iter()
        .map(|mark| within(mark.span.start))
        .min()
        .unwrap_or(base);
    let mut end = marks
        .iter()
        .map(|mark| within(mark.span.end))
        .max()
        .unwrap_or(base);
    let mut best = fits(start, end);
    if let (None, Some(main)) = (
        &best,
        marks.iter().find(|mark| mark.primary).or(marks.last()),
    ) {
        (start, end) = (within(main.span.start), within(main.span.end));
        best = fits(start, end);
    }
    // One word as wide as the page: its beginning.
    let Some(mut best) = best else {
        let beginning = text.get(start..end).unwrap_or_default();
        let end = beginning
            .char_indices()
            .nth(room / 3)
            .map_or(end, |(i, _)| start + i);
        return shown(
            row,
            Drawn::of(text, &pieces(start, end), usize::MAX).unwrap_or_default(),
        );
    };
    loop {
        let before = (start, end);
        let earlier = text
            .get(base..start)
            .map_or(base, |t| base + word_before(t));
        if let Some(wider) = (earlier < start).then(|| fits(earlier, end)).flatten() {
            (best, start) = (wider, earlier);
        }
        let later = text
            .get(end..line.span.end)
            .map_or(end, |t| end + word_after(t));
        if let Some(wider) = (later > end).then(|| fits(start, later)).flatten() {
            (best, end) = (wider, later);
        }
        if before == (start, end) {
            return best;
        }
    }
}

/// Where the last word of a text begins.
fn word_before(text: &str) -> usize {
    let text = text.trim_end();
    text.char_indices()
        .rev()
        .find(|(_, c)| c.is_whitespace())
        .map_or(0, |(i, c)| i + c.len_utf8())
}

/// Where the first word of a text ends.
fn word_after(text: &str) -> usize {
    let blanks = text.len() - text.trim_start().len();
    text.get(blanks..)
        .and_then(|word| word.find(char::is_whitespace))
        .map_or(text.len(), |end| blanks + end)
}

/// Puts a row's pieces together; `None` where they or the label behind the last mark are wider
/// than the room.
fn piece_together(text: &str, row: &Marked<'_>, pieces: &[Piece], room: usize) -> Option<Shown> {
    let drawn = Drawn::of(text, pieces, room)?;
    let ends = row
        .1
        .iter()
        .filter_map(|mark| Some((drawn.place(&mark.span)?.1, mark)));
    let last = ends.max_by_key(|(end, _)| *end);
    let reach = last.map_or(0, |(end, mark)| end + 1 + mark.label.width());
    (reach <= room).then(|| shown(row, drawn))
}

fn shown((row, marks): &Marked<'_>, drawn: Drawn) -> Shown {
    let marks = marks.iter().filter_map(|mark| {
        let (span, _) = drawn.place(&mark.span)?;
        Some(Mark {
            span,
            ..(*mark).clone()
        })
    });
    Shown {
        number: row.number,
        end: row.span.end,
        marks: marks.collect(),
        text: drawn.text,
    }
}
