//! `textDocument/diagnostic`: findings for a client that asks for them itself.

use tower_lsp::jsonrpc::{Error, ErrorCode};
use tower_lsp::lsp_types::{
    DocumentDiagnosticReport, DocumentDiagnosticReportResult, FullDocumentDiagnosticReport,
    RelatedFullDocumentDiagnosticReport, RelatedUnchangedDocumentDiagnosticReport,
    UnchangedDocumentDiagnosticReport,
};

use crate::documents::Outcome;
use crate::features::publish_diagnostics;
use crate::session::Agreed;

/// The report; a short one where the client has these findings already.
pub(crate) fn report(
    outcome: &Outcome,
    known: Option<&str>,
    agreed: Agreed,
) -> DocumentDiagnosticReportResult {
    let result_id = outcome.snapshot.generation.to_string();
    let report = if known == Some(&result_id) {
        let unchanged_document_diagnostic_report = UnchangedDocumentDiagnosticReport { result_id };
        DocumentDiagnosticReport::Unchanged(RelatedUnchangedDocumentDiagnosticReport {
            related_documents: None,
            unchanged_document_diagnostic_report,
        })
    } else {
        full(Some(result_id), outcome, agreed)
    };
    report.into()
}

fn full(result_id: Option<String>, outcome: &Outcome, agreed: Agreed) -> DocumentDiagnosticReport {
    let items = publish_diagnostics::diagnostics(outcome, agreed);
    DocumentDiagnosticReport::Full(RelatedFullDocumentDiagnosticReport {
        related_documents: None,
        full_document_diagnostic_report: FullDocumentDiagnosticReport { result_id, items },
    })
}

/// The report on a document that is not open.
pub(crate) fn nothing() -> DocumentDiagnosticReportResult {
    DocumentDiagnosticReport::Full(RelatedFullDocumentDiagnosticReport::default()).into()
}

/// The document changed before it was checked (LSP 3.17, `ServerCancelled`): the client is to ask
/// again.
pub(crate) fn overtaken() -> Error {
    Error {
        code: ErrorCode::ServerError(-32802),
        message: "the document changed before it was checked".into(),
        data: Some(serde_json::json!({ "retriggerRequest": true })),
    }
}
