//! The lines around a finding, cut so that they can be read at the width of a page.
//!
//! Each line is cut by [`super::window`]; here the lines are chosen and put together.

use std::ops::Range;

use super::Page;
use super::marks::Mark;
use super::rows::{Drawn, Piece, Row, line_around, rows};
use super::window::{Shown, cut};

/// Marks further away than this many lines are left out: the labels name their notes all the same.
const FAR: usize = 60;

/// Lines to show, with marks that point into them.
#[derive(Debug)]
pub(crate) struct Excerpt {
    /// The number of the first line.
    pub(crate) first: usize,
    /// The number of the last line.
    pub(crate) last: usize,
    /// The lines.
    pub(crate) source: String,
    /// Marks, their spans in bytes of `source`.
    pub(crate) marks: Vec<Mark>,
    /// Lines without a mark that are shown, in bytes of `source`.
    pub(crate) shown: Vec<Range<usize>>,
}

/// Cuts excerpts from one text. The system looked at last is kept, since findings come in order.
pub(crate) struct Cutter<'a> {
    page: &'a Page<'a>,
    width: usize,
    kept: Option<(Range<usize>, Vec<Row>)>,
}

impl<'a> Cutter<'a> {
    /// A cutter for lines of that many columns, their numbers included.
    pub(crate) fn new(page: &'a Page<'a>, width: usize) -> Cutter<'a> {
        Cutter {
            page,
            width,
            kept: None,
        }
    }

    /// The lines around some marks, of which the first is the primary one. With `context` the
    /// other rows of its system are shown too. `None` without a mark.
    pub(crate) fn cut(&mut self, marks: &[Mark], context: bool) -> Option<Excerpt> {
        let text = self.page.text;
        let home = self.page.lines.position(marks.first()?.span.start).0;
        let mut shown: Vec<Shown> = Vec::new();
        let mut left: Vec<&Mark> = marks.iter().collect();
        while let Some(start) = left.first().map(|mark| mark.span.start) {
            let width = self.width;
            let rows = self.rows_around(start);
            let (Some(top), Some(bottom)) = (rows.first(), rows.last()) else {
                break;
            };
            let here = top.span.start..=bottom.span.end;
            let (inside, outside): (Vec<&Mark>, _) =
                left.iter().partition(|m| here.contains(&m.span.start));
            let digits = bottom.number.max(home).to_string().len();
            let room = width.saturating_sub(digits + 3).max(20);
            let context = context && shown.is_empty();
            shown.extend(cut(text, rows, &inside, context, room));
            // The mark that was asked for is always inside; should it not be, the rest is lost.
            left = if inside.is_empty() {
                Vec::new()
            } else {
                outside
            };
        }
        shown.retain(|line| line.number.abs_diff(home) <= FAR);
        shown.sort_by_key(|line| line.number);
        Some(join(text, &shown, self.width))
    }

    /// The rows of the system around an offset, or the one line there.
    fn rows_around(&mut self, offset: usize) -> &[Row] {
        let kept = self
            .kept
            .as_ref()
            .is_some_and(|(span, _)| (span.start..=span.end).contains(&offset));
        if !kept {
            let system = self
                .page
                .checked
                .reading
                .system_at(offset)
                .map(partwright_sheet::Span::range);
            let span = system.filter(|s| (s.start..=s.end).contains(&offset));
            let span = span.unwrap_or_else(|| line_around(self.page.text, offset));
            let first = self.page.lines.position(span.start).0;
            self.kept = Some((span.clone(), rows(self.page.text, span, first)));
        }
        self.kept.as_ref().map_or(&[], |(_, rows)| rows)
    }
}

/// Puts lines together, in order. A line between two that are shown is shown as well, as far as
/// there is room for it; longer stretches are left empty, and drawn as a gap.
fn join(text: &str, lines: &[Shown], room: usize) -> Excerpt {
    let first = lines.first().map_or(1, |line| line.number);
    let last = lines.last().map_or(1, |line| line.number);
    let mut excerpt = Excerpt {
        first,
        last,
        source: String::new(),
        marks: Vec::new(),
        shown: Vec::new(),
    };
    let mut before: Option<&Shown> = None;
    for line in lines {
        if let Some(before) = before {
            let gap = line.number - before.number;
            excerpt.source.push('\n');
            if gap == 2 {
                let between = text.get(before.end..).and_then(|after| after.find('\n'));
                let line =
                    line_around(text, between.map_or(text.len(), |end| before.end + end + 1));
                let drawn = Drawn::of(text, &[Piece::Text(line)], room);
                excerpt
                    .source
                    .push_str(drawn.as_ref().map_or("…", |drawn| drawn.text.trim_end()));
            }
            excerpt
                .source
                .extend(std::iter::repeat_n('\n', gap.saturating_sub(1)));
        }
        let start = excerpt.source.len();
        excerpt.source.push_str(&line.text);
        if line.marks.is_empty() {
            excerpt.shown.push(start..excerpt.source.len());
        }
        excerpt.marks.extend(line.marks.iter().map(|mark| Mark {
            span: start + mark.span.start..start + mark.span.end,
            ..mark.clone()
        }));
        before = Some(line);
    }
    excerpt
}
