//! A small client: one server process, its messages, and what it has published.
//!
//! No test measures time. Waiting has an end only so that a server that hangs fails its test.

use std::collections::VecDeque;
use std::io::{BufRead, BufReader, Read, Write};
use std::process::{Child, ChildStdin, Command, Stdio};
use std::sync::mpsc::{self, Receiver, RecvTimeoutError, Sender};
use std::sync::{Arc, Condvar, Mutex};
use std::thread;
use std::time::{Duration, Instant};

use serde_json::{Value, json};

/// Longer than anything takes on a busy machine.
const GUARD: Duration = Duration::from_secs(120);

/// Where a test may stop the client from reading.
#[derive(Default)]
struct Gate {
    shut: Mutex<bool>,
    moved: Condvar,
}

/// A `publishDiagnostics` that came.
#[derive(Clone, Debug)]
pub(crate) struct Publication {
    pub(crate) uri: String,
    pub(crate) version: Option<i64>,
    pub(crate) diagnostics: Vec<Value>,
}

pub(crate) struct Client {
    child: Arc<Mutex<Child>>,
    input: Option<ChildStdin>,
    messages: Receiver<Value>,
    gate: Arc<Gate>,
    /// Dropped at the end, which calls the watchdog off.
    _watchdog: Sender<()>,
    next_id: i64,
    /// Answers that came while another was waited for.
    answers: VecDeque<Value>,
    pub(crate) published: Vec<Publication>,
    /// Log messages.
    pub(crate) logged: Vec<String>,
    /// Messages shown to the user.
    pub(crate) shown: Vec<String>,
    /// Requests of the server, which this client does not answer by itself.
    pub(crate) asked: Vec<Value>,
}

fn binary() -> std::ffi::OsString {
    std::env::var_os("PARTWRIGHT_BINARY").unwrap_or_else(|| env!("CARGO_BIN_EXE_partwright").into())
}

/// The capabilities of a client of today.
pub(crate) fn capabilities(encodings: &[&str]) -> Value {
    json!({
        "general": { "positionEncodings": encodings },
        "textDocument": {
            "publishDiagnostics": { "relatedInformation": true, "versionSupport": true },
            "hover": { "contentFormat": ["markdown", "plaintext"] },
        },
    })
}

/// Capabilities with some of their places filled otherwise: `/textDocument/diagnostic`.
pub(crate) fn capabilities_and(more: &[(&str, Value)]) -> Value {
    let mut all = capabilities(&["utf-16"]);
    for (path, value) in more {
        let mut at = &mut all;
        for step in path.split('/').skip(1) {
            if at.get(step).is_none() {
                at[step] = json!({});
            }
            at = &mut at[step];
        }
        *at = value.clone();
    }
    all
}

impl Client {
    /// Starts a server, and says nothing yet.
    pub(crate) fn start() -> Client {
        let mut command = Command::new(binary());
        command.arg("serve").env_remove("PARTWRIGHT_TEST");
        Client::of(command)
    }

    /// Starts a server that offers the requests tests need, and says nothing yet.
    pub(crate) fn with_hooks() -> Client {
        let mut command = Command::new(binary());
        command.arg("serve").env("PARTWRIGHT_TEST", "1");
        Client::of(command)
    }

    /// A server that is ready, counting columns in UTF-16.
    pub(crate) fn ready() -> Client {
        Client::start().introduced(capabilities(&["utf-16"]))
    }

    /// A server started by another program.
    #[cfg(target_os = "linux")]
    pub(crate) fn started_by(script: &str) -> Client {
        let mut command = Command::new("sh");
        command
            .arg("-c")
            .arg(script)
            .arg(binary())
            .env_remove("PARTWRIGHT_TEST");
        Client::of(command)
    }

    fn of(mut command: Command) -> Client {
        let command = command.stdin(Stdio::piped()).stdout(Stdio::piped());
        let mut child = command.spawn().unwrap();
        let input = child.stdin.take();
        let output = child.stdout.take().unwrap();
        let gate = Arc::new(Gate::default());
        let (sender, messages) = mpsc::channel();
        let at_gate = Arc::clone(&gate);
        thread::spawn(move || read(output, &at_gate, &sender));
        let child = Arc::new(Mutex::new(child));
        let (watchdog, called_off) = mpsc::channel::<()>();
        let watched = Arc::clone(&child);
        thread::spawn(move || {
            if called_off.recv_timeout(GUARD) == Err(RecvTimeoutError::Timeout) {
                let _ = watched.lock().unwrap().kill();
            }
        });
        Client {
            child,
            input,
            messages,
            gate,
            _watchdog: watchdog,
            next_id: 0,
            answers: VecDeque::new(),
            published: Vec::new(),
            logged: Vec::new(),
            shown: Vec::new(),
            asked: Vec::new(),
        }
    }

    #[cfg(target_os = "linux")]
    pub(crate) fn process_id(&self) -> u32 {
        self.child.lock().unwrap().id()
    }

    /// Has said `initialize` and `initialized`.
    pub(crate) fn introduced(mut self, capabilities: Value) -> Client {
        self.initialize(capabilities);
        self
    }

    pub(crate) fn initialize(&mut self, capabilities: Value) -> Value {
        let params = json!({ "processId": std::process::id(), "rootUri": null, "capabilities": capabilities });
        let result = self.request("initialize", params)["result"].clone();
        assert!(result.is_object(), "{result}");
        self.notify("initialized", json!({}));
        result
    }

    // -- writing ---------------------------------------------------------------------------------

    pub(crate) fn raw(&mut self, bytes: &[u8]) {
        let input = self.input.as_mut().expect("the input was closed");
        input.write_all(bytes).unwrap();
        input.flush().unwrap();
    }

    pub(crate) fn frame(message: &Value) -> Vec<u8> {
        let body = message.to_string();
        format!("Content-Length: {}\r\n\r\n{body}", body.len()).into_bytes()
    }

    pub(crate) fn send(&mut self, message: &Value) {
        self.raw(&Client::frame(message));
    }

    pub(crate) fn notify(&mut self, method: &str, params: Value) {
        self.send(&json!({ "jsonrpc": "2.0", "method": method, "params": params }));
    }

    /// Sends a request without waiting, and gives its id.
    pub(crate) fn ask(&mut self, method: &str, params: Value) -> i64 {
        self.next_id += 1;
        let id = self.next_id;
        self.send(&json!({ "jsonrpc": "2.0", "id": id, "method": method, "params": params }));
        id
    }

    /// Closes the server's input.
    pub(crate) fn hang_up(&mut self) {
        self.input = None;
    }

    // -- reading ---------------------------------------------------------------------------------

    /// Stops reading, or goes on.
    pub(crate) fn listen(&self, on: bool) {
        *self.gate.shut.lock().unwrap() = !on;
        self.gate.moved.notify_all();
    }

    /// Waits for the next message and keeps it where it belongs; false at the end of the output.
    fn take_in(&mut self) -> bool {
        let message = match self.messages.recv_timeout(GUARD) {
            Ok(message) => message,
            Err(RecvTimeoutError::Disconnected) => return false,
            Err(RecvTimeoutError::Timeout) => panic!("the server is silent"),
        };
        assert_eq!(message["jsonrpc"], "2.0", "{message}");
        match (message["method"].as_str(), message.get("id")) {
            (None, _) => self.answers.push_back(message),
            (Some("textDocument/publishDiagnostics"), None) => {
                let params = &message["params"];
                self.published.push(Publication {
                    uri: params["uri"].as_str().unwrap().to_owned(),
                    version: params["version"].as_i64(),
                    diagnostics: params["diagnostics"].as_array().unwrap().clone(),
                });
            }
            (Some("window/logMessage"), None) => {
                self.logged
                    .push(message["params"]["message"].as_str().unwrap().to_owned());
            }
            (Some("window/showMessage"), None) => {
                self.shown
                    .push(message["params"]["message"].as_str().unwrap().to_owned());
            }
            (Some(_), Some(_)) => self.asked.push(message),
            (Some(other), None) => panic!("{other} came unasked"),
        }
        true
    }

    /// Takes messages in until something holds.
    pub(crate) fn until(&mut self, holds: impl Fn(&Client) -> bool) {
        while !holds(self) {
            assert!(
                self.take_in(),
                "the server ended; it logged {:?}",
                self.logged
            );
        }
    }

    /// The answer to a request, by its id.
    pub(crate) fn answer(&mut self, id: impl Into<Value>) -> Value {
        let id = id.into();
        self.until(|client| client.answers.iter().any(|a| a["id"] == id));
        let at = self.answers.iter().position(|a| a["id"] == id).unwrap();
        self.answers.remove(at).unwrap()
    }

    pub(crate) fn request(&mut self, method: &str, params: Value) -> Value {
        let id = self.ask(method, params);
        self.answer(id)
    }

    /// The error code of the answer to a request.
    pub(crate) fn error(&mut self, method: &str, params: Value) -> i64 {
        let answer = self.request(method, params);
        answer["error"]["code"]
            .as_i64()
            .unwrap_or_else(|| panic!("{method}: {answer}"))
    }

    /// The findings of that version of a document, once they are published.
    pub(crate) fn findings(&mut self, uri: &str, version: i64) -> Vec<Value> {
        let fits = move |p: &Publication, uri: &str| p.uri == uri && p.version == Some(version);
        self.until(|client| client.published.iter().any(|p| fits(p, uri)));
        self.published
            .iter()
            .rfind(|p| fits(p, uri))
            .unwrap()
            .diagnostics
            .clone()
    }

    /// The next request of the server of that kind, answered with `result`.
    pub(crate) fn reply(&mut self, method: &str, result: Value) -> Value {
        self.until(|client| client.asked.iter().any(|a| a["method"] == method));
        let at = self.asked.iter().position(|a| a["method"] == method);
        let question = self.asked.remove(at.unwrap());
        self.send(&json!({ "jsonrpc": "2.0", "id": question["id"], "result": result }));
        question["params"].clone()
    }

    /// Refuses a request of the server.
    pub(crate) fn refuse(&mut self, question: &Value) {
        let error = json!({ "code": -32601, "message": "not here" });
        self.send(&json!({ "jsonrpc": "2.0", "id": question["id"], "error": error }));
    }

    /// Asks something trivial: its answer shows that the server is there, and that whatever was
    /// sent before has been read.
    pub(crate) fn is_there(&mut self) {
        assert_eq!(self.error("partwright/no-such-thing", json!({})), -32601);
    }

    // -- the end ---------------------------------------------------------------------------------

    /// Waits for the end of the output.
    pub(crate) fn drained(&mut self) {
        while self.take_in() {}
    }

    /// Waits for the end of the process; every answer is taken in before. Gives its exit status.
    pub(crate) fn ended(&mut self) -> i32 {
        self.drained();
        let start = Instant::now();
        loop {
            if let Some(status) = self.child.lock().unwrap().try_wait().unwrap() {
                return status.code().expect("the server was killed");
            }
            assert!(start.elapsed() < GUARD, "the server does not end");
            thread::sleep(Duration::from_millis(1));
        }
    }

    /// Waits for the end of the process without reading any more.
    pub(crate) fn exits_unheard(&mut self) {
        let start = Instant::now();
        while self.child.lock().unwrap().try_wait().unwrap().is_none() {
            assert!(start.elapsed() < GUARD, "the server does not end");
            thread::sleep(Duration::from_millis(1));
        }
    }

    /// Ends the conversation in order, and holds the server to that.
    pub(crate) fn goodbye(mut self) {
        let answer = self.request("shutdown", Value::Null);
        assert!(
            answer["result"].is_null() && answer.get("error").is_none(),
            "{answer}"
        );
        self.notify("exit", Value::Null);
        assert_eq!(self.ended(), 0);
    }
}

impl Drop for Client {
    fn drop(&mut self) {
        self.listen(true);
        let mut child = self.child.lock().unwrap();
        let _ = child.kill();
        let _ = child.wait();
    }
}

/// Reads messages until the output ends.
fn read(output: impl Read, gate: &Gate, to: &Sender<Value>) {
    let mut output = BufReader::new(output);
    loop {
        let mut shut = gate.shut.lock().unwrap();
        while *shut {
            shut = gate.moved.wait(shut).unwrap();
        }
        drop(shut);
        let mut length = 0;
        loop {
            let mut line = String::new();
            if !matches!(output.read_line(&mut line), Ok(1..)) {
                return;
            }
            match line.trim_end() {
                "" => break,
                line => {
                    let (name, value) = line.split_once(": ").unwrap();
                    assert_eq!(name, "Content-Length");
                    length = value.parse().unwrap();
                }
            }
        }
        let mut body = vec![0; length];
        if output.read_exact(&mut body).is_err() {
            return;
        }
        if to.send(serde_json::from_slice(&body).unwrap()).is_err() {
            return;
        }
    }
}
