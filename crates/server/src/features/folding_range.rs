//! `textDocument/foldingRange`: systems, and the lines before the music.

use tower_lsp::lsp_types::{FoldingRange, FoldingRangeKind};

use crate::lines::{Kind, lines};

/// What can be folded, whole lines each. Told from the text alone, so that it is there at once.
pub(crate) fn folds(text: &str) -> Vec<FoldingRange> {
    let mut found = Vec::new();
    let mut head: Option<(u32, u32)> = None;
    let mut system: Option<(u32, u32)> = None;
    let mut music = false;
    for (number, line) in (0u32..).zip(lines(text)) {
        let blank = line.kind == Kind::Empty && line.comment == line.span.end;
        if line.is_row() {
            music = true;
            system = Some((system.map_or(number, |(first, _)| first), number));
        } else if blank || line.kind == Kind::Header {
            found.extend(system.take().map(|lines| (lines, FoldingRangeKind::Region)));
        }
        if !music && line.kind == Kind::Header {
            head = Some((head.map_or(number, |(first, _)| first), number));
        }
    }
    found.extend(system.map(|lines| (lines, FoldingRangeKind::Region)));
    let head = head.map(|lines| (lines, FoldingRangeKind::Imports));
    let all = head.into_iter().chain(found);
    all.filter(|((first, last), _)| first < last)
        .map(|((start_line, end_line), kind)| FoldingRange {
            start_line,
            end_line,
            kind: Some(kind),
            ..FoldingRange::default()
        })
        .collect()
}
