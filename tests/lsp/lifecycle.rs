//! From `initialize` to `exit` (LSP 3.17, "Lifecycle Messages").

use serde_json::{Value, json};

use crate::client::{Client, capabilities};
use crate::document::{Document, FIFTHS, long_sheet};

#[test]
fn the_server_says_what_it_is_and_offers() {
    let mut client = Client::start();
    let result = client.initialize(capabilities(&["utf-32", "utf-8", "utf-16"]));
    assert_eq!(result["serverInfo"]["name"], "partwright");
    assert_eq!(result["serverInfo"]["version"], env!("CARGO_PKG_VERSION"));
    let offers = &result["capabilities"];
    assert_eq!(offers["positionEncoding"], "utf-8");
    assert_eq!(offers["textDocumentSync"]["openClose"], true);
    assert_eq!(offers["textDocumentSync"]["change"], 2);
    assert_eq!(offers["hoverProvider"], true);
    assert_eq!(offers["workspace"]["workspaceFolders"]["supported"], true);
    client.goodbye();
}

#[test]
fn columns_are_utf_16_unless_bytes_are_offered() {
    for offered in [
        capabilities(&["utf-16"]),
        capabilities(&["utf-32"]),
        json!({}),
    ] {
        let mut client = Client::start();
        let result = client.initialize(offered);
        assert_eq!(result["capabilities"]["positionEncoding"], "utf-16");
        client.goodbye();
    }
}

#[test]
fn workspace_folders_are_taken() {
    let mut client = Client::start();
    let folders = json!([{ "uri": "file:///harbour", "name": "harbour" }]);
    let params = json!({ "processId": null, "rootUri": "file:///harbour", "workspaceFolders": folders, "capabilities": {} });
    assert!(client.request("initialize", params)["result"].is_object());
    client.goodbye();
}

#[test]
fn before_initialize_requests_are_refused_and_notifications_dropped() {
    let mut client = Client::start();
    for method in [
        "textDocument/hover",
        "shutdown",
        "partwright/no-such-thing",
        "$/thing",
    ] {
        assert_eq!(client.error(method, json!({})), -32002, "{method}");
    }
    let early = Document::open(&mut client, "file:///early.voices", FIFTHS);
    client.notify("partwright/no-such-thing", json!({}));
    let mut client = client.introduced(capabilities(&["utf-16"]));
    let late = Document::open(&mut client, "file:///late.voices", FIFTHS);
    assert_eq!(late.short(&mut client), ["parallel-fifths 0:7-0:8"]);
    assert!(client.published.iter().all(|p| p.uri != early.uri));
    client.goodbye();
}

#[test]
fn initialize_comes_once_and_whole() {
    let mut client = Client::start();
    assert_eq!(client.error("initialize", Value::Null), -32602);
    assert_eq!(
        client.error("initialize", json!({ "capabilities": 7 })),
        -32602
    );
    assert_eq!(client.error("textDocument/hover", json!({})), -32002);
    client.initialize(json!({}));
    assert_eq!(
        client.error("initialize", json!({ "capabilities": {} })),
        -32600
    );
    client.is_there();
    client.goodbye();
}

#[test]
fn shutdown_is_answered_however_its_parameters_are_written() {
    for params in [Some(Value::Null), None, Some(json!({})), Some(json!([]))] {
        let mut client = Client::ready();
        let mut request = json!({ "jsonrpc": "2.0", "id": "last", "method": "shutdown" });
        if let Some(params) = &params {
            request["params"] = params.clone();
        }
        client.send(&request);
        let answer = client.answer("last");
        assert_eq!(
            answer.get("result"),
            Some(&Value::Null),
            "{params:?}: {answer}"
        );
        client.send(&json!({ "jsonrpc": "2.0", "method": "exit" }));
        assert_eq!(client.ended(), 0, "{params:?}");
    }
}

#[test]
fn after_shutdown_requests_are_refused_and_nothing_is_published() {
    let mut client = Client::ready();
    let document = Document::open(&mut client, "file:///a.voices", FIFTHS);
    document.findings(&mut client);
    client.request("shutdown", Value::Null);
    for method in [
        "textDocument/hover",
        "shutdown",
        "initialize",
        "partwright/no-such-thing",
    ] {
        assert_eq!(client.error(method, json!({})), -32600, "{method}");
    }
    let before = client.published.len();
    Document::open(&mut client, "file:///b.voices", FIFTHS);
    client.error("textDocument/hover", json!({}));
    client.notify("exit", Value::Null);
    assert_eq!(client.ended(), 0);
    assert_eq!(client.published.len(), before);
}

#[test]
fn exit_ends_the_process_though_its_input_stays_open() {
    let mut rude = Client::ready();
    rude.notify("exit", Value::Null);
    assert_eq!(rude.ended(), 1);

    let mut early = Client::start();
    early.send(&json!({ "jsonrpc": "2.0", "method": "exit" }));
    assert_eq!(early.ended(), 1);

    let mut polite = Client::ready();
    let answer = polite.ask("shutdown", Value::Null);
    polite.notify("exit", Value::Null);
    polite.answer(answer);
    assert_eq!(polite.ended(), 0);
}

#[test]
fn the_end_of_the_input_ends_the_process() {
    let mut at_once = Client::start();
    at_once.hang_up();
    assert_eq!(at_once.ended(), 1);

    let mut rude = Client::ready();
    rude.hang_up();
    assert_eq!(rude.ended(), 1);

    let mut polite = Client::ready();
    polite.request("shutdown", Value::Null);
    polite.hang_up();
    assert_eq!(polite.ended(), 0);

    let mut broken_off = Client::ready();
    broken_off.raw(b"Content-Length: 100\r\n\r\n{\"jsonrpc\"");
    broken_off.hang_up();
    assert_eq!(broken_off.ended(), 1);
}

#[test]
fn what_was_asked_before_the_end_of_the_input_is_answered() {
    let mut client = Client::ready();
    // Long enough for its check to take longer than the rest of the input.
    let text = format!("{FIFTHS}\n{}", long_sheet(3000));
    let document = Document::open(&mut client, "file:///a.voices", &text);
    let params = json!({ "textDocument": { "uri": document.uri }, "position": document.at("E") });
    let ids: Vec<i64> = (0..20)
        .map(|_| client.ask("textDocument/hover", params.clone()))
        .collect();
    client.hang_up();
    for id in ids {
        let answer = client.answer(id);
        assert!(answer["result"]["contents"].is_object(), "{answer}");
    }
    assert_eq!(client.ended(), 1);
}

#[test]
fn unknown_requests_are_answered_and_unknown_notifications_ignored() {
    let mut client = Client::ready();
    let at = json!({ "textDocument": { "uri": "file:///a" }, "position": { "line": 0, "character": 0 } });
    assert_eq!(
        client.error("textDocument/linkedEditingRange", at),
        -32601,
        "not offered"
    );
    assert_eq!(client.error("textDocument/hover", json!({})), -32602);
    assert_eq!(
        client.error("partwright/panic", json!({})),
        -32601,
        "only tests get this one"
    );
    assert_eq!(client.error("$/no-such-thing", json!({})), -32601);
    client.notify("$/no-such-thing", json!({ "a": 1 }));
    client.notify("$/setTrace", json!({ "value": "off" }));
    client.notify("$/cancelRequest", json!({ "id": 999_999 }));
    client.notify("partwright/no-such-thing", json!(null));
    client.notify(
        "textDocument/didSave",
        json!({ "textDocument": { "uri": "file:///a" } }),
    );
    client.is_there();
    client.goodbye();
}

/// The server's parent is a shell; the test holds the other end of the pipe open.
#[cfg(target_os = "linux")]
#[test]
fn without_the_client_the_server_ends() {
    let mut client = Client::started_by(r#"exec 3<&0; "$0" serve <&3 3<&- & wait"#);
    let shell = client.process_id();
    let params = json!({ "processId": shell, "rootUri": null, "capabilities": {} });
    assert!(client.request("initialize", params)["result"].is_object());
    let kill = std::process::Command::new("kill")
        .args(["-9", &shell.to_string()])
        .status();
    assert!(kill.unwrap().success());
    // The shell is gone at once; the output ends when the server is gone too.
    client.drained();
}
