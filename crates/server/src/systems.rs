//! The systems of a sheet, with their bars and rows.

use std::ops::Range;

use partwright_check::Checked;
use partwright_sheet::Span;

/// A system.
pub(crate) struct System {
    /// Its whole lines, from the first row to the last.
    pub(crate) span: Span,
    /// Its bars, by index in the score.
    pub(crate) bars: Range<usize>,
    /// The labels of its rows of music, by voice, from the top.
    pub(crate) rows: Vec<(usize, Span)>,
}

/// The systems that hold bars, in order.
pub(crate) fn systems(checked: &Checked) -> Vec<System> {
    let reading = &checked.reading;
    let score = &reading.score;
    let mut found: Vec<System> = Vec::new();
    for (index, bar) in score.bars.iter().enumerate() {
        let row = |voice| Some((voice, reading.label_span(voice, bar.onset)?));
        if let Some(last) = found.last_mut()
            && let Some(&(voice, label)) = last.rows.first()
            && reading.label_span(voice, bar.onset) == Some(label)
        {
            last.bars.end = index + 1;
            continue;
        }
        let mut rows: Vec<(usize, Span)> = (0..score.voices.len()).filter_map(row).collect();
        rows.sort_by_key(|(_, label)| label.start);
        let span = rows
            .first()
            .and_then(|(_, label)| reading.system_at(label.start as usize));
        if let Some(span) = span {
            found.push(System {
                span,
                bars: index..index + 1,
                rows,
            });
        }
    }
    found
}

impl System {
    /// `Bar 3`, `Bars 3–6`, by the numbers a conductor calls.
    pub(crate) fn name(&self, checked: &Checked) -> String {
        let bars = &checked.reading.score.bars;
        let number = |index: usize| bars.get(index).map_or(0, |bar| bar.number);
        let (first, last) = (
            number(self.bars.start),
            number(self.bars.end.saturating_sub(1)),
        );
        if first == last {
            format!("Bar {first}")
        } else {
            format!("Bars {first}–{last}")
        }
    }
}
