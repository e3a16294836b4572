//! Between our types and those of the protocol: the only place that does.

use partwright_check::Severity;
use partwright_sheet::{Edit, Span};
use tower_lsp::lsp_types::{
    DiagnosticSeverity, DocumentChanges, OneOf, OptionalVersionedTextDocumentIdentifier, Position,
    PositionEncodingKind, Range, TextDocumentContentChangeEvent, TextDocumentEdit, TextEdit,
    WorkspaceEdit,
};

use crate::documents::{Change, Snapshot};
use crate::session::Agreed;
use crate::text::{Columns, Place, Text};

fn wide(figure: u32) -> usize {
    usize::try_from(figure).unwrap_or(usize::MAX)
}

fn narrow(figure: usize) -> u32 {
    u32::try_from(figure).unwrap_or(u32::MAX)
}

/// A place as the protocol says it.
pub(crate) fn position(place: Place) -> Position {
    Position {
        line: narrow(place.line),
        character: narrow(place.column),
    }
}

/// A place the client names.
pub(crate) fn place(position: Position) -> Place {
    Place {
        line: wide(position.line),
        column: wide(position.character),
    }
}

/// Where a span stands.
pub(crate) fn range(text: &Text, span: Span, columns: Columns) -> Range {
    let at = |offset: u32| position(text.place(wide(offset), columns));
    Range {
        start: at(span.start),
        end: at(span.end),
    }
}

/// Edits of a document as the protocol says them.
pub(crate) fn edits(text: &Text, edits: &[Edit], columns: Columns) -> Vec<TextEdit> {
    let one = |edit: &Edit| TextEdit {
        range: range(text, edit.span, columns),
        new_text: edit.text.clone(),
    };
    edits.iter().map(one).collect()
}

/// Edits of one document as a change of the workspace, with its version where the client takes
/// that: it can refuse what comes too late then.
pub(crate) fn workspace_edit(of: &Snapshot, changes: &[Edit], agreed: Agreed) -> WorkspaceEdit {
    let edits = edits(&of.text, changes, agreed.columns);
    if agreed.versioned_edits {
        let edits = edits.into_iter().map(OneOf::Left).collect();
        let text_document = OptionalVersionedTextDocumentIdentifier {
            uri: of.uri.clone(),
            version: Some(of.version),
        };
        WorkspaceEdit {
            document_changes: Some(DocumentChanges::Edits(vec![TextDocumentEdit {
                text_document,
                edits,
            }])),
            ..WorkspaceEdit::default()
        }
    } else {
        WorkspaceEdit {
            changes: Some([(of.uri.clone(), edits)].into()),
            ..WorkspaceEdit::default()
        }
    }
}

/// The byte offset of a position the client names, as near as can be.
pub(crate) fn offset(text: &Text, at: Position, columns: Columns) -> usize {
    text.offset_near(place(at), columns)
}

/// A change of a document.
pub(crate) fn change(event: TextDocumentContentChangeEvent) -> Change {
    Change {
        range: event.range.map(|r| (place(r.start), place(r.end))),
        text: event.text,
    }
}

/// How bad a finding is.
pub(crate) fn severity(severity: Severity) -> DiagnosticSeverity {
    match severity {
        Severity::Fault => DiagnosticSeverity::ERROR,
        Severity::Weakness => DiagnosticSeverity::WARNING,
        Severity::Remark => DiagnosticSeverity::INFORMATION,
    }
}

/// What columns are to count, of what the client offers: bytes if they are among it.
pub(crate) fn columns(offered: Option<&[PositionEncodingKind]>) -> Columns {
    let offers_bytes = offered.is_some_and(|kinds| kinds.contains(&PositionEncodingKind::UTF8));
    if offers_bytes {
        Columns::Utf8
    } else {
        Columns::Utf16
    }
}

/// What columns count, as the protocol names it.
pub(crate) fn encoding(columns: Columns) -> PositionEncodingKind {
    match columns {
        Columns::Utf8 => PositionEncodingKind::UTF8,
        Columns::Utf16 => PositionEncodingKind::UTF16,
    }
}
