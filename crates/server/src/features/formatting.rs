//! `textDocument/formatting`, `rangeFormatting`, `onTypeFormatting`: beats in columns.

use partwright_sheet::Span;
use tower_lsp::lsp_types::{Position, Range, TextEdit};

use crate::convert;
use crate::documents::Outcome;
use crate::session::Agreed;

/// The whole sheet.
pub(crate) fn whole(outcome: &Outcome, agreed: Agreed) -> Option<Vec<TextEdit>> {
    let edits = outcome.checked()?.sheet.align_edits();
    let text = &outcome.snapshot.text;
    Some(convert::edits(text, &edits, agreed.columns))
}

/// The systems and lines that a range touches.
pub(crate) fn range(outcome: &Outcome, range: Range, agreed: Agreed) -> Option<Vec<TextEdit>> {
    let text = &outcome.snapshot.text;
    let start = convert::offset(text, range.start, agreed.columns);
    let end = convert::offset(text, range.end, agreed.columns);
    within(outcome, Span::new(start.min(end), end.max(start)), agreed)
}

/// The system in which a bar line has just been typed.
pub(crate) fn on_type(outcome: &Outcome, at: Position, agreed: Agreed) -> Option<Vec<TextEdit>> {
    let offset = convert::offset(&outcome.snapshot.text, at, agreed.columns);
    let system = outcome.checked()?.reading.system_at(offset)?;
    within(outcome, system, agreed)
}

fn within(outcome: &Outcome, span: Span, agreed: Agreed) -> Option<Vec<TextEdit>> {
    let edits = outcome.checked()?.sheet.align_edits_in(span);
    let text = &outcome.snapshot.text;
    Some(convert::edits(text, &edits, agreed.columns))
}
