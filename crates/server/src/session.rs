//! What the threads of the server share.

use std::future::Future;
use std::io::Write;
use std::sync::atomic::{AtomicBool, Ordering};
use std::sync::{Mutex, OnceLock, PoisonError};
use std::time::Duration;

use serde::Serialize;
use serde_json::Value;
use tokio::runtime::Handle;
use tower_lsp::Client;
use tower_lsp::lsp_types::{
    LogMessageParams, MessageType, ShowMessageParams,
    notification::{LogMessage, Notification, ShowMessage},
};

use crate::documents::Documents;
use crate::houses::Houses;
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
    /// The client asks for findings itself; they are not published then.
    pub(crate) pull: bool,
    /// The client asks again for hints when it is told to.
    pub(crate) refresh_hints: bool,
    /// Symbols may have symbols inside.
    pub(crate) symbol_trees: bool,
    /// Code actions may be more than commands.
    pub(crate) actions: bool,
    /// The edit of a code action may come when it is chosen.
    pub(crate) resolves_edits: bool,
    /// Edits may name the version of the document they are for.
    pub(crate) versioned_edits: bool,
    /// The client can be asked to watch files.
    pub(crate) watches: bool,
    /// The client can be asked for its configuration.
    pub(crate) configuration: bool,
    /// The client tells of changes of configuration only if asked to.
    pub(crate) registers_configuration: bool,
    /// The client can be asked to show a place.
    pub(crate) shows_documents: bool,
}

/// What the user set in the editor.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) struct Settings {
    /// The style, whatever a sheet says.
    pub(crate) style: Option<String>,
    /// Hints tell the numbers of bars.
    pub(crate) bar_numbers: bool,
    /// Hints tell the intervals over the bass.
    pub(crate) intervals: bool,
    /// Hints tell the names of chords.
    pub(crate) chords: bool,
}

impl Default for Settings {
    fn default() -> Settings {
        Settings {
            style: None,
            bar_numbers: true,
            intervals: false,
            chords: false,
        }
    }
}

/// The shared state.
#[derive(Default)]
pub(crate) struct Session {
    /// The open documents.
    pub(crate) documents: Documents,
    /// The house styles.
    pub(crate) houses: Houses,
    /// What waits to be written.
    pub(crate) outbox: Outbox,
    /// Where the conversation stands.
    pub(crate) lifecycle: Lifecycle,
    agreed: OnceLock<Agreed>,
    settings: Mutex<Settings>,
    /// What came with the first message: it holds where the client, asked later, has nothing to say.
    pub(crate) at_first: OnceLock<Value>,
    /// The client asks again for findings when it is told to.
    pub(crate) refresh_findings: AtomicBool,
    /// The line to the client, and what runs tasks that ask it something.
    line: OnceLock<(Client, Handle)>,
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

    /// What the user set.
    pub(crate) fn settings(&self) -> Settings {
        let settings = self.settings.lock();
        settings.unwrap_or_else(PoisonError::into_inner).clone()
    }

    /// Takes other settings over; tells whether they are others.
    pub(crate) fn set(&self, settings: Settings) -> bool {
        let mut now = self.settings.lock().unwrap_or_else(PoisonError::into_inner);
        let other = *now != settings;
        *now = settings;
        other
    }

    /// Keeps the line to the client.
    pub(crate) fn connect(&self, client: &Client, handle: Handle) {
        let _ = self.line.set((client.clone(), handle));
    }

    /// Asks the client something in a task of its own, which nobody waits for.
    pub(crate) fn ask<F>(&self, question: impl FnOnce(Client) -> F)
    where
        F: Future<Output = ()> + Send + 'static,
    {
        if let Some((client, handle)) = self.line.get() {
            handle.spawn(question(client.clone()));
        }
    }

    /// Has work done that takes a while, off the reader's thread.
    pub(crate) fn aside(&self, work: impl FnOnce() + Send + 'static) {
        if let Some((_, handle)) = self.line.get() {
            handle.spawn_blocking(work);
        }
    }

    /// Shows the user a message.
    pub(crate) fn show(&self, typ: MessageType, message: String) {
        self.outbox
            .message(notification::<ShowMessage>(ShowMessageParams {
                typ,
                message,
            }));
    }

    /// Tells a client that asks for findings itself that there may be others.
    pub(crate) fn findings_may_differ(&self) {
        if self.agreed().pull && self.refresh_findings.load(Ordering::SeqCst) {
            self.ask(|client| async move {
                let _ = client.workspace_diagnostic_refresh().await;
            });
        }
    }

    /// Looks at the files of the house styles; where one changed, every open document is checked
    /// again.
    pub(crate) fn look_at_houses(&self) {
        if self.houses.changed(&self.documents) {
            self.documents.check_again(None);
            self.findings_may_differ();
        }
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
