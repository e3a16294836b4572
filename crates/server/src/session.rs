//! What the threads of the server share.

use std::io::Write;
use std::sync::OnceLock;
use std::sync::atomic::{AtomicBool, Ordering};
use std::time::Duration;

use serde::Serialize;
use tower_lsp::lsp_types::{
    LogMessageParams, MessageType,
    notification::{LogMessage, Notification},
};

use crate::documents::Documents;
use crate::lifecycle::{Lifecycle, State};
use crate::outbox::Outbox;
use crate::text::Columns;

/// How long the end waits for a client that reads slowly.
const LAST_WORDS: Duration = Duration::from_secs(1);

/// What client and server agreed on in `initialize`.
#[derive(Clone, Copy, Debug, Default)]
pub(crate) struct Agreed {
    /// What columns count.
    pub(crate) columns: Columns,
    /// The client shows Markdown in a hover.
    pub(crate) markdown: bool,
    /// The client shows the places that belong to a finding.
    pub(crate) related: bool,
}

/// The shared state.
#[derive(Default)]
pub(crate) struct Session {
    /// The open documents.
    pub(crate) documents: Documents,
    /// What waits to be written.
    pub(crate) outbox: Outbox,
    /// Where the conversation stands.
    pub(crate) lifecycle: Lifecycle,
    agreed: OnceLock<Agreed>,
    /// For tests: the next check breaks off.
    pub(crate) break_next_check: AtomicBool,
}

#[derive(Serialize)]
struct Message<P> {
    jsonrpc: &'static str,
    method: &'static str,
    params: P,
}

impl Session {
    /// What was agreed; before that, what the protocol takes for granted.
    pub(crate) fn agreed(&self) -> Agreed {
        self.agreed.get().copied().unwrap_or_default()
    }

    /// Keeps what was agreed, the first time.
    pub(crate) fn agree(&self, agreed: Agreed) {
        let _ = self.agreed.set(agreed);
    }

    /// Tells whoever reads the logs: the client once there is one, else standard error. (Later
    /// on not standard error: it may be a pipe that nobody empties.)
    pub(crate) fn log(&self, typ: MessageType, message: String) {
        if self.lifecycle.state() == State::Running {
            self.outbox
                .log(notification::<LogMessage>(LogMessageParams {
                    typ,
                    message,
                }));
        } else {
            let _ = writeln!(std::io::stderr(), "partwright: {message}");
        }
    }

    /// Ends the conversation: lets the output flush, and gives the exit status.
    pub(crate) fn end(&self) -> u8 {
        self.lifecycle.enter(State::Ended);
        self.outbox.drain(LAST_WORDS);
        self.lifecycle.exit_status()
    }

    /// Ends the process from a thread that is not the reader's, which may be waiting for input.
    pub(crate) fn end_process(&self) -> ! {
        std::process::exit(self.end().into())
    }

    /// The next check is to break off, or not any more: gives what was asked for before.
    pub(crate) fn take_break(&self) -> bool {
        self.break_next_check.swap(false, Ordering::SeqCst)
    }
}

/// A notification as JSON.
pub(crate) fn notification<N: Notification>(params: N::Params) -> Vec<u8> {
    let message = Message {
        jsonrpc: "2.0",
        method: N::METHOD,
        params,
    };
    // The library's own types always have a JSON form.
    serde_json::to_vec(&message).unwrap_or_default()
}
