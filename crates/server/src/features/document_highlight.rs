//! `textDocument/documentHighlight`: all that sounds with the note under the cursor, in every
//! voice; or every place of a name.

use partwright_sheet::Span;
use tower_lsp::lsp_types::{DocumentHighlight, DocumentHighlightKind, Position};

use crate::convert;
use crate::documents::Outcome;
use crate::names;
use crate::session::Agreed;

/// What belongs to a position.
pub(crate) fn highlight(
    outcome: &Outcome,
    position: Position,
    agreed: Agreed,
) -> Option<Vec<DocumentHighlight>> {
    let reading = &outcome.checked()?.reading;
    let text = &outcome.snapshot.text;
    let offset = convert::offset(text, position, agreed.columns);
    let spans: Vec<Span> = match reading.at_offset(offset) {
        Some((_, at)) => {
            let voices = 0..reading.score.voices.len();
            voices.filter_map(|v| reading.span_at(v, at)).collect()
        }
        None => {
            let (name, _) = names::at(text.as_str(), reading, offset)?;
            let places = names::places(text.as_str(), reading, &name);
            places
                .into_iter()
                .map(|p| Span::new(p.span.start, p.span.end))
                .collect()
        }
    };
    let one = |span| DocumentHighlight {
        range: convert::range(text, span, agreed.columns),
        kind: Some(DocumentHighlightKind::TEXT),
    };
    Some(spans.into_iter().map(one).collect())
}
