//! Reading the input, handing it over, sending the answers off.
//!
//! The thread that reads also applies the changes and starts every request: it polls each
//! handler once on the spot, so that the handler sees the documents as they were when its
//! request came. What is answered from what is known already never changes threads; only what
//! has to wait for a check goes on elsewhere.

use std::convert::Infallible;
use std::panic::{AssertUnwindSafe, catch_unwind};
use std::process::ExitCode;
use std::sync::Arc;
use std::sync::mpsc::{self, Receiver, Sender};
use std::task::{Context, Poll, Waker};
use std::thread::Builder;
use std::time::Duration;

use futures::{FutureExt, SinkExt, StreamExt};
use serde_json::Value;
use tokio::runtime::{self, Runtime};
use tower::Service;
use tower_lsp::jsonrpc::{Error, Id, Request, Response};
use tower_lsp::lsp_types::MessageType;
use tower_lsp::{ClientSocket, Loopback};

use crate::frames::{Frame, Frames};
use crate::server::Server;
use crate::session::Session;
use crate::wire::{Over, Wire};
use crate::{checker, lifecycle};

/// How long requests that wait for a check may still take once the input has ended.
const LAST_ANSWERS: Duration = Duration::from_secs(1);

/// Where the client's replies to the server go.
type Replies = <ClientSocket as Loopback>::ResponseSink;

/// How the server runs.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Options {
    /// Offers requests that only tests need: a handler that panics, and the like.
    pub test_hooks: bool,
}

/// Serves on standard input and output until the client ends it, and gives the exit status: 0
/// after `shutdown`, else 1. `PARTWRIGHT_TEST=1` in the environment turns the test hooks on.
#[must_use]
pub fn serve() -> ExitCode {
    let test_hooks = std::env::var_os("PARTWRIGHT_TEST").is_some_and(|value| value == "1");
    serve_with(Options { test_hooks })
}

/// The same with options.
#[must_use]
pub fn serve_with(options: Options) -> ExitCode {
    let session = Arc::new(Session::default());
    // Where things broke off belongs where the client keeps its logs: the usual way, standard
    // error, may be a pipe that nobody empties.
    let telling = Arc::clone(&session);
    std::panic::set_hook(Box::new(move |info| {
        telling.log(MessageType::ERROR, info.to_string())
    }));
    match begin(&session, options) {
        Ok(mut reader) => {
            reader.read();
            reader.leave();
            ExitCode::from(session.end())
        }
        Err(error) => {
            session.log(
                MessageType::ERROR,
                format!("The server cannot start: {error}."),
            );
            ExitCode::FAILURE
        }
    }
}

/// Starts the threads.
fn begin(session: &Arc<Session>, options: Options) -> std::io::Result<Reader> {
    // One thread for what has to wait: checking and writing have their own.
    let runtime = runtime::Builder::new_multi_thread()
        .worker_threads(1)
        .thread_name("handlers")
        .enable_time()
        .build()?;
    let (service, socket) = Server::service(session, options.test_hooks);
    let replies = listen(session, &runtime, socket);
    let checking = Arc::clone(session);
    Builder::new()
        .name("checker".to_owned())
        .spawn(move || checker::run(&checking))?;
    let writing = Arc::clone(session);
    Builder::new().name("writer".to_owned()).spawn(move || {
        let current = |uri: &_, generation| writing.documents.is_current(uri, generation);
        if writing
            .outbox
            .write(std::io::stdout().lock(), current)
            .is_err()
        {
            // Nobody listens any more.
            writing.end_process();
        }
    })?;
    let wire = Wire::new(service, Arc::clone(session));
    let under_way = mpsc::channel();
    Ok(Reader {
        session: Arc::clone(session),
        wire,
        replies,
        runtime,
        under_way,
    })
}

/// Sends off what the server asks the client; gives the way back for the replies.
fn listen(session: &Arc<Session>, runtime: &Runtime, socket: ClientSocket) -> Replies {
    let (mut questions, replies) = socket.split();
    let session = Arc::clone(session);
    runtime.spawn(async move {
        while let Some(question) = questions.next().await {
            session.outbox.message(json(&question));
        }
    });
    replies
}

/// A message as JSON. (The library's own messages always have that form.)
fn json(message: &impl serde::Serialize) -> Vec<u8> {
    serde_json::to_vec(message).unwrap_or_default()
}

struct Reader {
    session: Arc<Session>,
    wire: Wire,
    replies: Replies,
    runtime: Runtime,
    /// Every request that waits for something holds a sender; the last one gone, all are done.
    under_way: (Sender<Infallible>, Receiver<Infallible>),
}

impl Reader {
    /// Reads until `exit` or the end of the input.
    fn read(&mut self) {
        let mut frames = Frames::new(std::io::stdin().lock());
        loop {
            match frames.next() {
                Frame::Body(body) => match decode(&body) {
                    Incoming::Request(request) => {
                        if self.request(request) == Err(Over) {
                            return;
                        }
                    }
                    Incoming::Reply(reply) => self.reply(reply),
                    Incoming::Broken(id, error) => {
                        let why = format!("A message was left out: {}.", error.message);
                        self.session.log(MessageType::WARNING, why);
                        self.refuse(id, error);
                    }
                },
                Frame::Broken(why) => {
                    self.session.log(
                        MessageType::WARNING,
                        format!("A message was left out: {why}."),
                    );
                    self.refuse(Id::Null, Error::parse_error());
                }
                Frame::End => return,
            }
        }
    }

    /// Lets requests that came before the end of the input be answered.
    fn leave(self) {
        let (sender, receiver) = self.under_way;
        drop(sender);
        if self.session.lifecycle.state() != lifecycle::State::Ended {
            let _ = receiver.recv_timeout(LAST_ANSWERS);
        }
        self.runtime.shutdown_background();
    }

    fn request(&mut self, request: Request) -> Result<(), Over> {
        let entered = self.runtime.enter();
        let mut cx = Context::from_waker(Waker::noop());
        match self.wire.poll_ready(&mut cx) {
            Poll::Ready(ready) => ready?,
            // The service is always ready while it lasts.
            Poll::Pending => return Ok(()),
        }
        let mut answer = self.wire.call(request);
        if self.session.lifecycle.state() == lifecycle::State::Ended {
            return Err(Over);
        }
        match answer.poll_unpin(&mut cx) {
            Poll::Ready(done) => self.session.answer(done),
            Poll::Pending => {
                let session = Arc::clone(&self.session);
                let under_way = self.under_way.0.clone();
                self.runtime.spawn(async move {
                    session.answer(answer.await);
                    drop(under_way);
                });
            }
        }
        drop(entered);
        Ok(())
    }

    fn reply(&mut self, reply: Response) {
        // The library panics where nobody waits for it any more.
        let replies = &mut self.replies;
        let hand_over = AssertUnwindSafe(|| replies.send(reply).now_or_never());
        if catch_unwind(hand_over).is_err() {
            self.session.log(
                MessageType::WARNING,
                "A reply came that nobody waits for.".to_owned(),
            );
        }
    }

    fn refuse(&self, id: Id, error: Error) {
        self.session
            .answer(Ok(Some(Response::from_error(id, error))));
    }
}

impl Session {
    fn answer(&self, answer: Result<Option<Response>, Over>) {
        if let Ok(Some(response)) = answer {
            self.outbox.message(json(&response));
        }
    }
}

enum Incoming {
    Request(Request),
    Reply(Response),
    Broken(Id, Error),
}

/// Reads a message. One with a `method` is a request or a notification, one with a `result` or an
/// `error` a reply (JSON-RPC 2.0).
fn decode(body: &[u8]) -> Incoming {
    let Ok(value) = serde_json::from_slice::<Value>(body) else {
        return Incoming::Broken(Id::Null, Error::parse_error());
    };
    let id = value
        .get("id")
        .and_then(|id| serde_json::from_value(id.clone()).ok());
    let is_reply = value.get("method").is_none()
        && (value.get("result").is_some() || value.get("error").is_some());
    let message = if is_reply {
        serde_json::from_value(value).map(Incoming::Reply)
    } else {
        serde_json::from_value(value).map(Incoming::Request)
    };
    message.unwrap_or_else(|_| Incoming::Broken(id.unwrap_or(Id::Null), Error::invalid_request()))
}
