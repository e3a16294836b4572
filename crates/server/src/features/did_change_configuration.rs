//! `workspace/didChangeConfiguration`: what the user sets in the editor.
//!
//! ```json
//! { "partwright": { "style": "chorale",
//!     "inlayHints": { "barNumbers": true, "intervals": false, "chords": true } } }
//! ```

use std::sync::Arc;
use std::time::Duration;

use partwright_check::Style;
use serde_json::Value;
use tower_lsp::Client;
use tower_lsp::lsp_types::{ConfigurationItem, MessageType};

use crate::asks;
use crate::session::{Session, Settings};

/// Where ours stands among the client's settings.
pub(crate) const SECTION: &str = "partwright";

/// How long the client may take to answer.
const PATIENCE: Duration = Duration::from_secs(10);

/// What is set; what is left out, or is no such thing, is as by default.
fn settings(value: &Value) -> Settings {
    let usual = Settings::default();
    let hint = |name: &str| value.get("inlayHints").and_then(|h| h.get(name)?.as_bool());
    let style = value.get("style").and_then(Value::as_str).map(str::trim);
    Settings {
        style: style.filter(|name| !name.is_empty()).map(str::to_owned),
        bar_numbers: hint("barNumbers").unwrap_or(usual.bar_numbers),
        intervals: hint("intervals").unwrap_or(usual.intervals),
        chords: hint("chords").unwrap_or(usual.chords),
    }
}

/// Takes over what came with the first message. Nothing is open yet, so nobody is told.
pub(crate) fn begin(session: &Session, value: Value) {
    adopt(session, &value);
    let _ = session.at_first.set(value);
}

/// Takes settings over that the client sent along.
pub(crate) fn take(session: &Session, value: &Value) {
    let Some(restyled) = adopt(session, value) else {
        return;
    };
    if restyled {
        session.documents.check_again(None);
        session.findings_may_differ();
    }
    if session.agreed().refresh_hints {
        session.ask(|client| async move {
            let _ = client.inlay_hint_refresh().await;
        });
    }
}

/// Makes them the session's; whether the style is another, and nothing where all is as it was.
fn adopt(session: &Session, value: &Value) -> Option<bool> {
    let before = session.settings();
    let now = settings(value.get(SECTION).unwrap_or(value));
    if !session.set(now.clone()) {
        return None;
    }
    let restyled = before.style != now.style;
    if let Some(name) = now.style.as_deref()
        && restyled
        && Style::named(name).is_none()
    {
        let words = format!(
            "No style of ours is called {name}: it holds for sheets whose house style is called \
             so."
        );
        session.log(MessageType::INFO, words);
    }
    Some(restyled)
}

/// Asks the client for them, where it can be asked.
pub(crate) fn fetch(session: &Arc<Session>) {
    let of = Arc::clone(session);
    session.ask(|client: Client| async move {
        let item = ConfigurationItem {
            scope_uri: None,
            section: Some(SECTION.to_owned()),
        };
        let question = async move { client.configuration(vec![item]).await };
        if let Some(Ok(values)) = asks::ask(PATIENCE, question).await
            && let Some(value) = values.first()
        {
            let set = (!value.is_null()).then_some(value);
            take(&of, set.or(of.at_first.get()).unwrap_or(value));
        }
    });
}
