//! `workspace/didChangeWatchedFiles`: house styles that another program saves.

use std::sync::Arc;

use serde_json::json;
use tower_lsp::lsp_types::Registration;

use crate::session::Session;

/// What is asked for once the client is ready: to be told of files, and of settings.
pub(crate) fn register(session: &Arc<Session>) {
    let agreed = session.agreed();
    let mut wanted = Vec::new();
    if agreed.watches {
        wanted.push(Registration {
            id: "house-styles".to_owned(),
            method: "workspace/didChangeWatchedFiles".to_owned(),
            register_options: Some(json!({ "watchers": [{ "globPattern": "**/*.toml" }] })),
        });
    }
    if agreed.registers_configuration {
        wanted.push(Registration {
            id: "settings".to_owned(),
            method: "workspace/didChangeConfiguration".to_owned(),
            register_options: Some(json!({ "section": "partwright" })),
        });
    }
    if !wanted.is_empty() {
        session.ask(|client| async move {
            let _ = client.register_capability(wanted).await;
        });
    }
}

/// Looks at the house styles again.
pub(crate) fn look(session: &Arc<Session>) {
    let of = Arc::clone(session);
    session.aside(move || of.look_at_houses());
}
