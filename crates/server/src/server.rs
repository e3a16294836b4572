//! The requests: each hands over to its feature.

use std::sync::Arc;

use tower_lsp::jsonrpc::{Error, Result};
use tower_lsp::lsp_types::{Hover, HoverParams, InitializeParams, InitializeResult};
use tower_lsp::{Client, LanguageServer, LspService, async_trait};

use crate::documents::{Outcome, Verdict};
use crate::features::{hover, initialize};
use crate::session::Session;
use crate::{hooks, parent};

/// The server as the library routes requests to it.
pub(crate) struct Server {
    pub(crate) session: Arc<Session>,
    pub(crate) client: Client,
}

impl Server {
    /// The service with its line to the client; with the requests tests need, if they are wanted.
    pub(crate) fn service(
        session: &Arc<Session>,
        test_hooks: bool,
    ) -> (LspService<Server>, tower_lsp::ClientSocket) {
        let session = Arc::clone(session);
        let mut builder = LspService::build(|client| Server { session, client });
        if test_hooks {
            builder = hooks::add(builder);
        }
        builder.finish()
    }
}

/// The outcome where the check was done.
///
/// # Errors
/// Where the checker broke off.
fn done(outcome: &Outcome) -> Result<()> {
    match outcome.verdict {
        Verdict::Done(_) => Ok(()),
        Verdict::BrokeOff => Err(Error {
            message: "the check of this sheet broke off".into(),
            ..Error::internal_error()
        }),
    }
}

#[async_trait]
impl LanguageServer for Server {
    async fn initialize(&self, params: InitializeParams) -> Result<InitializeResult> {
        let agreed = initialize::agree(&params.capabilities);
        self.session.agree(agreed);
        if let Some(id) = params.process_id {
            parent::watch(id, &self.session);
        }
        Ok(initialize::answer(agreed))
    }

    async fn shutdown(&self) -> Result<()> {
        Ok(())
    }

    async fn hover(&self, params: HoverParams) -> Result<Option<Hover>> {
        let at = params.text_document_position_params;
        let Some(outcome) = self.session.documents.outcome(&at.text_document.uri).await else {
            return Ok(None);
        };
        done(&outcome)?;
        Ok(hover::hover(&outcome, at.position, self.session.agreed()))
    }
}
