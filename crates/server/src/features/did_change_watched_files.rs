//! `workspace/didChangeWatchedFiles`: house styles that another program saves.

use std::sync::Arc;

use serde_json::{Value, json};
use tower_lsp::lsp_types::Registration;

use crate::session::Session;

/// What is asked for once the client is ready: to be told of files, and of settings. Each by itself,
/// since a client grants or refuses a request whole.
pub(crate) fn register(session: &Arc<Session>) {
    let agreed = session.agreed();
    if agreed.watches {
        ask_for(
            session,
            "house-styles",
            "workspace/didChangeWatchedFiles",
            json!({ "watchers": [{ "globPattern": "**/*.toml" }] }),
        );
    }
    if agreed.registers_configuration {
        ask_for(
            session,
            "settings",
            "workspace/didChangeConfiguration",
            json!({ "section": "partwright" }),
        );
    }
}

fn ask_for(session: &Arc<Session>, id: &str, method: &str, options: Value) {
    let wanted = Registration {
        id: id.to_owned(),
        method: method.to_owned(),
        register_options: Some(options),
    };
    session.ask(|client| async move {
        let _ = client.register_capability(vec![wanted]).await;
    });
}

/// Looks at the house styles again.
pub(crate) fn look(session: &Arc<Session>) {
    let of = Arc::clone(session);
    session.aside(move || of.look_at_houses());
}
