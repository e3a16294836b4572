//! Clients that do not answer, or do not read for a while.

use serde_json::{Value, json};

use crate::client::{Client, capabilities};
use crate::document::{Document, FIFTHS, long_sheet};

#[test]
fn a_client_that_never_answers_holds_nothing_up() {
    let mut client = Client::with_hooks().introduced(capabilities(&["utf-16"]));
    let mut document = Document::open(&mut client, "file:///a.voices", FIFTHS);
    for round in 1..=150 {
        client.request("partwright/ask", Value::Null);
        document.edit(&mut client, 0..0, "\n");
        assert_eq!(
            document.short(&mut client),
            [format!("parallel-fifths {round}:7-{round}:8")]
        );
    }
    client.until(|client| client.asked.len() == 150);
    let late = |log: &&String| log.contains("did not answer in time");
    client.until(|client| client.logged.iter().filter(late).count() == 150);
    // Answers that come when nobody waits for them any more do no harm.
    let ids: Vec<Value> = client
        .asked
        .iter()
        .map(|asked| asked["id"].clone())
        .collect();
    for id in ids {
        client.send(&json!({ "jsonrpc": "2.0", "id": id, "result": [null] }));
    }
    client.is_there();
    assert!(
        document
            .hover_text(&mut client, "E")
            .contains("\n**E5** · ")
    );
    client.goodbye();
}

#[test]
fn an_answer_of_the_client_arrives() {
    let mut client = Client::with_hooks().introduced(capabilities(&["utf-16"]));
    client.request("partwright/ask", Value::Null);
    client.until(|client| !client.asked.is_empty());
    assert_eq!(client.asked[0]["method"], "workspace/configuration");
    let id = client.asked[0]["id"].clone();
    client.send(&json!({ "jsonrpc": "2.0", "id": id, "result": [null] }));
    client.until(|client| !client.logged.is_empty());
    // On a machine that stood still in between it came too late: that is said too.
    let log = &client.logged[0];
    assert!(
        log == "The client answered 1." || log.contains("in time"),
        "{log}"
    );
    client.goodbye();
}

#[test]
fn a_client_that_stops_reading_is_served_when_it_goes_on() {
    let mut client = Client::ready();
    let text = format!("{}{FIFTHS}", long_sheet(300));
    let mut document = Document::open(&mut client, "file:///a.voices", &text);
    document.findings(&mut client);
    client.published.clear();
    client.listen(false);
    // Far more than pipes hold, in both directions: sending would block for ever if the server
    // waited for the client to read.
    let line = format!(
        "// {}\n",
        "the lamps along the quay are lit one by one ".repeat(90)
    );
    // The answer to an unknown method repeats its name: this fills the way back.
    let unknown = format!("partwright/no-such-thing/{}", "x".repeat(500));
    let mut asked = Vec::new();
    let mut note = document.at("G4");
    for _ in 0..1000 {
        let change = document.change(0..0, &line);
        let message = document.message(&[change]);
        client.send(&message);
        note["line"] = (note["line"].as_u64().unwrap() + 1).into();
        let params = json!({ "textDocument": { "uri": document.uri }, "position": note });
        let hover = client.ask("textDocument/hover", params);
        asked.push((hover, client.ask(&unknown, json!({}))));
    }
    client.listen(true);
    for (hover, unknown) in asked {
        let answer = client.answer(hover);
        assert!(answer.get("error").is_none(), "{answer}");
        assert_eq!(client.answer(unknown)["error"]["code"], -32601);
    }
    assert_eq!(document.short(&mut client).len(), 1);
    let versions: Vec<_> = client
        .published
        .iter()
        .map(|p| p.version.unwrap())
        .collect();
    assert!(versions.is_sorted_by(|a, b| a < b), "{versions:?}");
    assert!(document.hover_text(&mut client, "G4").starts_with("**G4**"));
    client.goodbye();
}

#[test]
fn a_client_that_has_gone_deaf_does_not_keep_the_server_alive() {
    let mut client = Client::ready();
    client.listen(false);
    for _ in 0..20_000 {
        client.ask("partwright/no-such-thing", json!({}));
    }
    client.notify("exit", Value::Null);
    client.exits_unheard();
}

#[test]
fn requests_that_wait_hold_nothing_up_and_can_be_cancelled() {
    let mut client = Client::with_hooks().introduced(json!({}));
    let waiting: Vec<i64> = (0..150)
        .map(|_| client.ask("partwright/wait", Value::Null))
        .collect();
    let mut document = Document::open(&mut client, "file:///a.voices", FIFTHS);
    document.edit(&mut client, 0..0, "\n");
    assert_eq!(document.short(&mut client), ["parallel-fifths 1:7-1:8"]);
    client.is_there();
    for id in &waiting[..100] {
        client.notify("$/cancelRequest", json!({ "id": id }));
        assert_eq!(client.answer(*id)["error"]["code"], -32800);
    }
    // Those that still wait do not keep the server from ending.
    client.goodbye();
}

#[test]
fn a_request_that_never_ends_does_not_outlive_the_input() {
    let mut client = Client::with_hooks().introduced(json!({}));
    client.ask("partwright/wait", Value::Null);
    client.hang_up();
    assert_eq!(client.ended(), 1);
}
