//! What stands between the client and the library's service.
//!
//! It changes documents at once and in the order of arrival, keeps to the letter of the
//! protocol's life cycle, and lets no panic through. The README lists the traps it closes.

use std::panic::{AssertUnwindSafe, catch_unwind};
use std::sync::Arc;
use std::sync::atomic::Ordering;
use std::task::{Context, Poll};

use futures::FutureExt;
use futures::future::{self, BoxFuture};
use serde::de::DeserializeOwned;
use serde_json::Value;
use tower::Service;
use tower_lsp::LspService;
use tower_lsp::jsonrpc::{Error, ErrorCode, Id, Request, Response};
use tower_lsp::lsp_types::{
    DidChangeTextDocumentParams, DidCloseTextDocumentParams, DidOpenTextDocumentParams, MessageType,
};

use crate::convert;
use crate::features::{did_change_watched_files, publish_diagnostics};
use crate::houses;
use crate::lifecycle::State;
use crate::server::Server;
use crate::session::Session;

/// The conversation is over: `exit` was seen.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) struct Over;

type Answer = BoxFuture<'static, Result<Option<Response>, Over>>;

/// The wrapper.
pub(crate) struct Wire {
    inner: LspService<Server>,
    session: Arc<Session>,
}

impl Wire {
    /// Around that service.
    pub(crate) fn new(inner: LspService<Server>, session: Arc<Session>) -> Wire {
        Wire { inner, session }
    }

    /// What is answered for a panic.
    fn broke_off(session: &Session, method: &str, id: Option<Id>) -> Option<Response> {
        let message = format!("{method} broke off");
        session.log(MessageType::ERROR, format!("{message}."));
        let error = Error {
            message: message.into(),
            ..Error::internal_error()
        };
        id.map(|id| Response::from_error(id, error))
    }

    fn forward(&mut self, id: Option<Id>, request: Request) -> Answer {
        let session = Arc::clone(&self.session);
        let method = request.method().to_owned();
        AssertUnwindSafe(self.inner.call(request))
            .catch_unwind()
            .map(move |answer| match answer {
                // The service never sees `exit`, so that it has no other error to give.
                Ok(answer) => answer.map_err(|_| Over),
                Err(_) => Ok(Wire::broke_off(&session, &method, id)),
            })
            .boxed()
    }

    fn dispatch(&mut self, request: Request) -> Answer {
        let (method, id, params) = request.into_parts();
        let params = params.filter(|params| !params.is_null());
        match (&*method, id) {
            ("exit", _) => {
                self.session.lifecycle.enter(State::Ended);
                answer(None)
            }
            (_, Some(id)) => self.request(method.into_owned(), id, params),
            (_, None) if self.session.lifecycle.state() == State::Running => {
                self.notification(method.into_owned(), params)
            }
            // Outside that span notifications are dropped.
            (_, None) => answer(None),
        }
    }

    fn request(&mut self, method: String, id: Id, params: Option<Value>) -> Answer {
        let session = Arc::clone(&self.session);
        if let Some(error) = refusal(&method, session.lifecycle.state()) {
            return answer(Some(Response::from_error(id, error)));
        }
        let begins = method == "initialize";
        let ends = method == "shutdown";
        // Some clients send null, some an empty object: `shutdown` has no parameters.
        if begins && let Some(params) = &params {
            // The library's type calls it by another name.
            let refresh = "/capabilities/workspace/diagnostics/refreshSupport";
            let refresh = params.pointer(refresh).and_then(Value::as_bool);
            let keep = &session.refresh_findings;
            keep.store(refresh == Some(true), Ordering::SeqCst);
        }
        let request = Request::build(method).id(id.clone());
        let request = match params.filter(|_| !ends) {
            Some(params) => request.params(params),
            None => request,
        };
        if ends {
            session.lifecycle.enter(State::ShutDown);
        }
        let answer = self.forward(Some(id), request.finish());
        if !begins {
            return answer;
        }
        let started = move |answer: Result<Option<Response>, Over>| {
            if matches!(&answer, Ok(Some(response)) if response.is_ok()) {
                session.lifecycle.enter(State::Running);
            }
            answer
        };
        answer.map(started).boxed()
    }

    fn notification(&mut self, method: String, params: Option<Value>) -> Answer {
        match &*method {
            "textDocument/didOpen" => self.did_open(params),
            "textDocument/didChange" => self.did_change(params),
            "textDocument/didClose" => self.did_close(params),
            // These two are requests; others in `$/` may be ignored.
            "initialize" | "shutdown" => {}
            other if other.starts_with("$/") && other != "$/cancelRequest" => {}
            _ => {
                let request = Request::build(method);
                let request = match params {
                    Some(params) => request.params(params),
                    None => request,
                };
                return self.forward(None, request.finish());
            }
        }
        answer(None)
    }

    fn did_open(&self, params: Option<Value>) {
        if let Some(params) = self.parameters::<DidOpenTextDocumentParams>("didOpen", params) {
            let document = params.text_document;
            self.session
                .documents
                .open(&document.uri, document.version, document.text);
            did_change_watched_files::look(&self.session);
        }
    }

    fn did_change(&self, params: Option<Value>) {
        let Some(params) = self.parameters::<DidChangeTextDocumentParams>("didChange", params)
        else {
            return;
        };
        let (uri, version) = (params.text_document.uri, params.text_document.version);
        let changes: Vec<_> = params
            .content_changes
            .into_iter()
            .map(convert::change)
            .collect();
        let columns = self.session.agreed().columns;
        if let Err(why) = self
            .session
            .documents
            .change(&uri, version, &changes, columns)
        {
            self.warn(format!(
                "Version {version} of {uri} was not taken over, its text stays as it was: {why}."
            ));
        } else if houses::is_house(&uri) {
            did_change_watched_files::look(&self.session);
        }
    }

    fn did_close(&self, params: Option<Value>) {
        let Some(params) = self.parameters::<DidCloseTextDocumentParams>("didClose", params) else {
            return;
        };
        let uri = params.text_document.uri;
        let session = &self.session;
        let clear = || {
            if !session.agreed().pull {
                let none = publish_diagnostics::clear(&uri);
                session.outbox.findings(&uri, None, none);
            }
        };
        if !session.documents.close(&uri, clear) {
            self.warn(format!("{uri} cannot be closed: it is not open."));
        } else if houses::is_house(&uri) {
            did_change_watched_files::look(session);
        }
    }

    fn parameters<P: DeserializeOwned>(&self, of: &str, params: Option<Value>) -> Option<P> {
        match serde_json::from_value(params.unwrap_or_default()) {
            Ok(params) => Some(params),
            Err(why) => {
                self.warn(format!(
                    "A {of} notification was left out, as it cannot be read: {why}."
                ));
                None
            }
        }
    }

    fn warn(&self, message: String) {
        self.session.log(MessageType::WARNING, message);
    }
}

/// Why a request is refused before it comes to the library, if it is.
fn refusal(method: &str, state: State) -> Option<Error> {
    match (state, method) {
        (_, "") => Some(Error::invalid_request()),
        (State::Waiting, "initialize") => None,
        (State::Waiting, _) => Some(Error {
            code: ErrorCode::ServerError(-32002),
            message: "the server waits for initialize".into(),
            data: None,
        }),
        (State::ShutDown | State::Ended, _) | (State::Running, "initialize") => {
            Some(Error::invalid_request())
        }
        (
            State::Running,
            "textDocument/didOpen" | "textDocument/didChange" | "textDocument/didClose",
        ) => Some(Error::invalid_request()),
        // The library would leave it without an answer.
        (State::Running, _) if method.starts_with("$/") => Some(Error::method_not_found()),
        (State::Running, _) => None,
    }
}

fn answer(response: Option<Response>) -> Answer {
    future::ready(Ok(response)).boxed()
}

impl Service<Request> for Wire {
    type Response = Option<Response>;
    type Error = Over;
    type Future = Answer;

    fn poll_ready(&mut self, cx: &mut Context<'_>) -> Poll<Result<(), Over>> {
        match self.session.lifecycle.state() {
            State::Ended => Poll::Ready(Err(Over)),
            _ => self.inner.poll_ready(cx).map_err(|_| Over),
        }
    }

    fn call(&mut self, request: Request) -> Answer {
        let (method, id) = (request.method().to_owned(), request.id().cloned());
        match catch_unwind(AssertUnwindSafe(|| self.dispatch(request))) {
            Ok(answer) => answer,
            Err(_) => answer(Wire::broke_off(&self.session, &method, id)),
        }
    }
}
