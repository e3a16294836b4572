//! `workspace/executeCommand`.

use serde_json::Value;
use tower_lsp::jsonrpc::{Error, Result};
use tower_lsp::lsp_types::{Range, ShowDocumentParams, Url};

use crate::session::Session;

/// Selects the reason of a licence that was just granted, so that the user types over it: a
/// document and a range.
pub(crate) const SELECT: &str = "partwright.selectReason";

/// Does what a command asks.
///
/// # Errors
/// Where there is no such command, or its arguments are others.
pub(crate) fn run(session: &Session, command: &str, arguments: &[Value]) -> Result<()> {
    if command != SELECT {
        return Err(Error::invalid_params(format!(
            "there is no command {command}"
        )));
    }
    let [uri, range] = arguments else {
        return Err(Error::invalid_params("a document and a range are needed"));
    };
    let wrong = |_| Error::invalid_params("a document and a range are needed");
    let uri: Url = serde_json::from_value(uri.clone()).map_err(wrong)?;
    let selection: Range = serde_json::from_value(range.clone()).map_err(wrong)?;
    session.ask(|client| async move {
        let params = ShowDocumentParams {
            uri,
            external: None,
            take_focus: Some(true),
            selection: Some(selection),
        };
        let _ = client.show_document(params).await;
    });
    Ok(())
}
