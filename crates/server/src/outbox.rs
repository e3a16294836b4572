//! What is to be written to the client, and the thread that writes it.
//!
//! Writing never holds up reading or checking: a client that stops reading only makes the queue
//! wait. The queue stays small meanwhile: of the findings of one document only the latest wait
//! in it, log messages are dropped beyond a number, and an answer needs a request.

use std::collections::VecDeque;
use std::io::{self, Write};
use std::sync::{Condvar, Mutex, MutexGuard, PoisonError};
use std::time::Duration;

use tower_lsp::lsp_types::Url;

/// Log messages that may wait.
const MOST_LOGS: usize = 100;

enum Item {
    Message(Vec<u8>),
    Log(Vec<u8>),
    Findings {
        uri: Url,
        /// Of which state of the document; `None` for one that was closed.
        generation: Option<u64>,
        body: Vec<u8>,
    },
}

#[derive(Default)]
struct State {
    queue: VecDeque<Item>,
    /// A message is on its way out.
    writing: bool,
    /// Nothing more is taken in: the process ends, or the client is gone.
    closed: bool,
}

/// The messages that wait to be written.
#[derive(Default)]
pub(crate) struct Outbox {
    state: Mutex<State>,
    changed: Condvar,
}

impl Outbox {
    fn lock(&self) -> MutexGuard<'_, State> {
        self.state.lock().unwrap_or_else(PoisonError::into_inner)
    }

    fn push(&self, mut state: MutexGuard<'_, State>, item: Item) {
        if !state.closed {
            state.queue.push_back(item);
            self.changed.notify_all();
        }
    }

    /// An answer, a request or a notification, as JSON.
    pub(crate) fn message(&self, body: Vec<u8>) {
        self.push(self.lock(), Item::Message(body));
    }

    /// A log message; the oldest that waits goes where too many wait.
    pub(crate) fn log(&self, body: Vec<u8>) {
        let mut state = self.lock();
        let is_log = |item: &Item| matches!(item, Item::Log(_));
        if state.queue.iter().filter(|item| is_log(item)).count() >= MOST_LOGS
            && let Some(oldest) = state.queue.iter().position(is_log)
        {
            state.queue.remove(oldest);
        }
        self.push(state, Item::Log(body));
    }

    /// The findings of a document, in the place of those that still wait.
    pub(crate) fn findings(&self, uri: &Url, generation: Option<u64>, body: Vec<u8>) {
        let mut state = self.lock();
        state
            .queue
            .retain(|item| !matches!(item, Item::Findings { uri: other, .. } if other == uri));
        self.push(
            state,
            Item::Findings {
                uri: uri.clone(),
                generation,
                body,
            },
        );
    }

    /// Writes what comes until the outbox is closed and empty. Findings of a state of a document
    /// that is no longer current, by what `current` says, are left out.
    ///
    /// # Errors
    /// Where the client no longer takes anything; the outbox is closed then.
    pub(crate) fn write(
        &self,
        mut to: impl Write,
        current: impl Fn(&Url, u64) -> bool,
    ) -> io::Result<()> {
        loop {
            let mut state = self.lock();
            state.writing = false;
            self.changed.notify_all();
            let item = loop {
                match state.queue.pop_front() {
                    Some(item) => break item,
                    None if state.closed => return Ok(()),
                    None => {
                        state = self
                            .changed
                            .wait(state)
                            .unwrap_or_else(PoisonError::into_inner);
                    }
                }
            };
            state.writing = true;
            drop(state);
            let body = match item {
                Item::Message(body) | Item::Log(body) => body,
                Item::Findings {
                    uri,
                    generation: Some(of),
                    ..
                } if !current(&uri, of) => continue,
                Item::Findings { body, .. } => body,
            };
            if let Err(error) = put(&mut to, &body) {
                let mut state = self.lock();
                *state = State {
                    closed: true,
                    ..State::default()
                };
                self.changed.notify_all();
                return Err(error);
            }
        }
    }

    /// Takes nothing more in, and waits until all is written, but no longer than `limit`.
    pub(crate) fn drain(&self, limit: Duration) {
        let mut state = self.lock();
        state.closed = true;
        self.changed.notify_all();
        let busy = |state: &mut State| state.writing || !state.queue.is_empty();
        let left = self.changed.wait_timeout_while(state, limit, busy);
        drop(left.unwrap_or_else(PoisonError::into_inner));
    }
}

/// One message with its header, in one write.
fn put(to: &mut impl Write, body: &[u8]) -> io::Result<()> {
    let mut message = format!("Content-Length: {}\r\n\r\n", body.len()).into_bytes();
    message.extend_from_slice(body);
    to.write_all(&message)?;
    to.flush()
}

#[cfg(test)]
mod tests {
    use super::*;

    fn written(outbox: &Outbox, current: impl Fn(&Url, u64) -> bool) -> String {
        outbox.lock().closed = true;
        let mut out = Vec::new();
        outbox.write(&mut out, current).unwrap();
        String::from_utf8(out).unwrap()
    }

    #[test]
    fn only_the_latest_findings_of_a_document_wait() {
        let outbox = Outbox::default();
        let (a, b): (Url, Url) = ("file:///a".parse().unwrap(), "file:///b".parse().unwrap());
        outbox.findings(&a, Some(1), b"1".to_vec());
        outbox.findings(&b, Some(1), b"b".to_vec());
        outbox.message(b"{}".to_vec());
        outbox.findings(&a, Some(2), b"22".to_vec());
        let out = written(&outbox, |_, _| true);
        assert_eq!(
            out,
            "Content-Length: 1\r\n\r\nbContent-Length: 2\r\n\r\n{}Content-Length: 2\r\n\r\n22"
        );
    }

    #[test]
    fn findings_of_an_earlier_state_are_not_written() {
        let outbox = Outbox::default();
        let a: Url = "file:///a".parse().unwrap();
        outbox.findings(&a, Some(1), b"1".to_vec());
        assert_eq!(written(&outbox, |_, generation| generation == 2), "");
    }

    #[test]
    fn logs_do_not_pile_up() {
        let outbox = Outbox::default();
        for i in 0..MOST_LOGS + 5 {
            outbox.log(vec![b'0' + u8::try_from(i % 10).unwrap()]);
        }
        let out = written(&outbox, |_, _| true);
        assert_eq!(out.matches("Content-Length").count(), MOST_LOGS);
        assert!(
            out.starts_with("Content-Length: 1\r\n\r\n5"),
            "the oldest went"
        );
    }
}
