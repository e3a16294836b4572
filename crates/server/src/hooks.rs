//! Requests that only tests get, so that what should never happen can be made to happen.

use std::sync::Arc;
use std::sync::atomic::Ordering;
use std::time::Duration;

use tower_lsp::LspServiceBuilder;
use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::{ConfigurationItem, MessageType};

use crate::asks;
use crate::server::Server;

/// How long a test waits for an answer of the client.
const PATIENCE: Duration = Duration::from_millis(200);

/// Adds them.
pub(crate) fn add(builder: LspServiceBuilder<Server>) -> LspServiceBuilder<Server> {
    builder
        .custom_method("partwright/panic", Server::panic)
        .custom_method("partwright/breakNextCheck", Server::break_next_check)
        .custom_method("partwright/wait", Server::wait)
        .custom_method("partwright/ask", Server::ask)
}

impl Server {
    /// A handler that panics.
    #[expect(clippy::panic, reason = "a test asked for it")]
    async fn panic(&self) -> Result<()> {
        panic!("asked to panic")
    }

    /// The next check panics.
    async fn break_next_check(&self) -> Result<()> {
        self.session.break_next_check.store(true, Ordering::SeqCst);
        Ok(())
    }

    /// A handler that never comes to an end.
    async fn wait(&self) -> Result<()> {
        std::future::pending().await
    }

    /// Asks the client something, and logs how that went.
    async fn ask(&self) -> Result<()> {
        let (client, session) = (self.client.clone(), Arc::clone(&self.session));
        tokio::spawn(async move {
            let item = ConfigurationItem {
                scope_uri: None,
                section: Some("partwright".to_owned()),
            };
            let question = async move { client.configuration(vec![item]).await };
            let story = match asks::ask(PATIENCE, question).await {
                Some(Ok(values)) => format!("The client answered {}.", values.len()),
                Some(Err(error)) => format!("The client refused: {}.", error.message),
                None => "The client did not answer in time.".to_owned(),
            };
            session.log(MessageType::INFO, story);
        });
        Ok(())
    }
}
