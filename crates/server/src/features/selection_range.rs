//! `textDocument/selectionRange`: from the part to its cell, bar, row, system and the sheet.

use std::ops::Range;

use partwright_sheet::Span;
use tower_lsp::lsp_types::{Position, SelectionRange};

use crate::convert;
use crate::documents::Outcome;
use crate::lines::{Kind, line_at, words};
use crate::session::Agreed;

/// The ranges around each position.
pub(crate) fn ranges(outcome: &Outcome, at: &[Position], agreed: Agreed) -> Vec<SelectionRange> {
    at.iter()
        .map(|&position| around(outcome, position, agreed))
        .collect()
}

fn around(outcome: &Outcome, position: Position, agreed: Agreed) -> SelectionRange {
    let text = &outcome.snapshot.text;
    let offset = convert::offset(text, position, agreed.columns);
    let whole = 0..text.as_str().len();
    let mut chain = SelectionRange {
        range: convert::range(text, Span::new(whole.start, whole.end), agreed.columns),
        parent: None,
    };
    let mut last = whole;
    for span in wider(outcome, offset).into_iter().rev() {
        // Each lies in the next, and is smaller.
        let inside = last.start <= span.start && span.end <= last.end && last != span;
        if inside && span.start <= offset && offset <= span.end {
            chain = SelectionRange {
                range: convert::range(text, Span::new(span.start, span.end), agreed.columns),
                parent: Some(Box::new(chain)),
            };
            last = span;
        }
    }
    chain
}

/// What stands around an offset, from the smallest to the system.
fn wider(outcome: &Outcome, offset: usize) -> Vec<Range<usize>> {
    let text = outcome.snapshot.text.as_str();
    let reading = outcome.checked().map(|checked| &checked.reading);
    let system = reading.and_then(|reading| reading.system_at(offset));
    let line = line_at(text, offset);
    let mut found = Vec::new();
    let holds = |span: &Range<usize>| span.start <= offset && offset <= span.end;
    if let Some(cell) = words(text, line.span.start..line.comment).find(holds) {
        if line.kind == Kind::Music {
            found.extend(part(text, &cell, offset));
        }
        found.push(cell);
    }
    if line.is_row() {
        found.extend(bar(text, line.word.end..line.comment, offset));
    }
    found.push(line.span);
    found.extend(system.map(Span::range));
    found
}

/// The part of a cell at an offset: what stands between its dots.
fn part(text: &str, cell: &Range<usize>, offset: usize) -> Option<Range<usize>> {
    let before = text.get(cell.start..offset)?;
    let start = before
        .rfind('.')
        .map_or(cell.start, |at| cell.start + at + 1);
    let behind = text.get(offset..cell.end)?;
    let end = behind.find('.').map_or(cell.end, |at| offset + at);
    Some(start..end)
}

/// The bar of a row at an offset: what stands between its lines, without the blanks around.
fn bar(text: &str, row: Range<usize>, offset: usize) -> Option<Range<usize>> {
    let before = text.get(row.start..offset)?;
    let start = row.start + before.rfind('|')? + 1;
    let behind = text.get(offset..row.end)?;
    let end = behind.find('|').map_or(row.end, |at| offset + at);
    let written = text.get(start..end)?;
    let lead = written.len() - written.trim_start().len();
    let span = start + lead..start + written.trim_end().len();
    (span.start < span.end).then_some(span)
}
