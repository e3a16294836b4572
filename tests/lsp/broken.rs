//! Broken messages, and handlers that break.

use serde_json::{Value, json};

use crate::client::Client;
use crate::document::{Document, FIFTHS};

/// The error code of the next answer that could not be given to a request.
fn to_nobody(client: &mut Client) -> i64 {
    let answer = client.answer(Value::Null);
    answer["error"]["code"].as_i64().unwrap()
}

#[test]
fn a_message_that_is_no_json_is_answered_and_passed_over() {
    let mut client = Client::ready();
    let document = Document::open(&mut client, "file:///a.voices", FIFTHS);
    let deep = "[".repeat(100_000);
    for body in ["{", "", "nonsense", "\u{feff}{}", deep.as_str()] {
        client.raw(format!("Content-Length: {}\r\n\r\n{body}", body.len()).as_bytes());
        assert_eq!(to_nobody(&mut client), -32700, "{:.20}", body);
    }
    client.raw(b"Content-Length: 4\r\n\r\n{\"\xff\"");
    assert_eq!(to_nobody(&mut client), -32700);
    assert_eq!(document.short(&mut client), ["parallel-fifths 0:7-0:8"]);
    client.is_there();
    client.goodbye();
}

#[test]
fn json_that_is_no_message_is_answered_and_passed_over() {
    let mut client = Client::ready();
    for body in [
        json!([]),
        json!("exit"),
        json!(7),
        json!(null),
        json!([{ "jsonrpc": "2.0", "method": "exit" }]),
        json!({ "jsonrpc": "2.0", "id": {}, "method": "shutdown" }),
    ] {
        client.send(&body);
        assert_eq!(to_nobody(&mut client), -32600, "{body}");
    }
    for (id, body) in [
        (
            json!(70),
            json!({ "jsonrpc": "1.0", "id": 70, "method": "shutdown" }),
        ),
        (
            json!("seventy"),
            json!({ "id": "seventy", "method": "shutdown" }),
        ),
        (json!(71), json!({ "jsonrpc": "2.0", "id": 71 })),
        (
            json!(72),
            json!({ "jsonrpc": "2.0", "id": 72, "method": 7 }),
        ),
    ] {
        client.send(&body);
        assert_eq!(client.answer(id)["error"]["code"], -32600, "{body}");
    }
    client.is_there();
    client.goodbye();
}

#[test]
fn a_broken_header_is_answered_and_passed_over() {
    let mut client = Client::ready();
    for header in [
        "Content-Length: many\r\n\r\n",
        "X-Colour: blue\r\n\r\n",
        "no header at all\r\n\r\n",
    ] {
        client.raw(header.as_bytes());
        assert_eq!(to_nobody(&mut client), -32700, "{header}");
        client.is_there();
    }
    client.raw(b"Content-Type: text/plain; charset=latin1\r\nContent-Length: 2\r\n\r\n{}");
    assert_eq!(to_nobody(&mut client), -32700);
    client.raw(b"leftovers");
    client.is_there();
    client.goodbye();
}

#[test]
fn replies_to_nothing_are_passed_over() {
    let mut client = Client::ready();
    for reply in [
        json!({ "jsonrpc": "2.0", "id": 12345, "result": null }),
        json!({ "jsonrpc": "2.0", "id": "x", "error": { "code": 1, "message": "no" } }),
        json!({ "jsonrpc": "2.0", "id": null, "result": [] }),
    ] {
        client.send(&reply);
    }
    client.is_there();
    client.goodbye();
}

#[test]
fn an_id_may_be_used_again_once_it_is_answered() {
    let mut client = Client::ready();
    for _ in 0..3 {
        client.send(
            &json!({ "jsonrpc": "2.0", "id": 9, "method": "textDocument/hover", "params": {
            "textDocument": { "uri": "file:///a" }, "position": { "line": 0, "character": 0 } } }),
        );
        assert!(client.answer(9)["result"].is_null());
    }
    client.goodbye();
}

#[test]
fn a_panic_in_a_handler_is_an_answer() {
    let mut client = Client::with_hooks().introduced(json!({}));
    let mut document = Document::open(&mut client, "file:///a.voices", FIFTHS);
    for _ in 0..20 {
        assert_eq!(client.error("partwright/panic", Value::Null), -32603);
    }
    document.edit(&mut client, 0..0, "\n");
    assert_eq!(document.short(&mut client), ["parallel-fifths 1:7-1:8"]);
    assert!(
        client
            .logged
            .iter()
            .any(|log| log.contains("partwright/panic broke off")),
        "{:?}",
        client.logged
    );
    client.goodbye();
}

#[test]
fn a_panic_in_the_checker_is_a_finding_until_the_next_edit() {
    let mut client = Client::with_hooks().introduced(json!({}));
    let mut document = Document::open(&mut client, "file:///a.voices", FIFTHS);
    assert_eq!(document.short(&mut client), ["parallel-fifths 0:7-0:8"]);
    assert!(
        client
            .request("partwright/breakNextCheck", Value::Null)
            .get("error")
            .is_none()
    );
    document.edit(&mut client, 0..0, "\n");
    let findings = document.findings(&mut client);
    let [finding] = &findings[..] else {
        panic!("{findings:?}")
    };
    assert_eq!(finding["severity"], 1);
    assert!(finding["message"].as_str().unwrap().contains("broke off"));
    assert_eq!(
        document.hover(&mut client, &document.at("E"))["error"]["code"],
        -32603
    );
    document.edit(&mut client, 0..0, "\n");
    assert_eq!(document.short(&mut client), ["parallel-fifths 2:7-2:8"]);
    assert!(document.hover_text(&mut client, "E").contains("\nE5 · "));
    client.goodbye();
}
