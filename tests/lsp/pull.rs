//! Findings for a client that asks for them itself: it is never sent them as well.

use serde_json::{Value, json};

use crate::client::{Client, capabilities_and};
use crate::document::{Document, FIFTHS};

fn client(refresh: bool) -> Client {
    Client::start().introduced(capabilities_and(&[
        (
            "/textDocument/diagnostic",
            json!({ "relatedDocumentSupport": false }),
        ),
        ("/workspace/diagnostics/refreshSupport", json!(refresh)),
    ]))
}

fn pull(client: &mut Client, document: &Document, known: Option<&str>) -> Value {
    document.ask(client, "diagnostic", json!({ "previousResultId": known }))
}

fn rules(report: &Value) -> Vec<&str> {
    let items = report["items"].as_array().unwrap();
    items
        .iter()
        .map(|item| item["code"].as_str().unwrap())
        .collect()
}

#[test]
fn each_way_is_offered_to_whom_it_serves() {
    let pulling = capabilities_and(&[("/textDocument/diagnostic", json!({}))]);
    let result = Client::start().initialize(pulling);
    assert_eq!(
        result["capabilities"]["diagnosticProvider"]["workspaceDiagnostics"],
        false
    );
    let result = Client::start().initialize(capabilities_and(&[]));
    assert!(result["capabilities"].get("diagnosticProvider").is_none());
}

#[test]
fn findings_are_given_where_they_are_asked_for_and_never_published() {
    let mut client = client(false);
    let mut document = Document::open(&mut client, "file:///a.voices", FIFTHS);
    let report = pull(&mut client, &document, None);
    assert_eq!(report["kind"], "full");
    assert_eq!(rules(&report), ["parallel-fifths"]);
    let id = report["resultId"].as_str().unwrap().to_owned();
    let again = pull(&mut client, &document, Some(&id));
    assert_eq!(again, json!({ "kind": "unchanged", "resultId": id }));
    document.replace(&mut client, "G3 A", "G3 F");
    let after = pull(&mut client, &document, Some(&id));
    assert_eq!(
        (rules(&after).len(), after["kind"].as_str()),
        (0, Some("full"))
    );
    document.close(&mut client);
    assert_eq!(pull(&mut client, &document, Some(&id))["items"], json!([]));
    client.is_there();
    assert!(client.published.is_empty(), "{:?}", client.published);
    client.goodbye();
}

#[test]
fn who_asks_about_a_text_that_changed_is_told_to_ask_again() {
    let mut client = client(false);
    let text = "S | D5 E |\nB | G3 A |\n\n".repeat(2000);
    let mut document = Document::open(&mut client, "file:///a.voices", &text);
    let early = client.ask("textDocument/diagnostic", document.about(json!({})));
    document.edit(&mut client, 0..0, "\n");
    let late = client.ask("textDocument/diagnostic", document.about(json!({})));
    let (early, late) = (client.answer(early), client.answer(late));
    // The first may have been in time.
    if let Some(error) = early.get("error") {
        assert_eq!(error["code"], -32802);
        assert_eq!(error["data"], json!({ "retriggerRequest": true }));
    }
    assert_eq!(rules(&late["result"]).len(), 2000 + 1999);
    assert_eq!(late["result"]["items"][0]["range"]["start"]["line"], 1);
    client.goodbye();
}

#[test]
fn a_setting_that_changes_findings_has_them_asked_for_again() {
    let mut client = client(true);
    let document = Document::open(
        &mut client,
        "file:///a.voices",
        "S | D5 - |\nA | C5 - |\nB | C3 - |\n",
    );
    let before = pull(&mut client, &document, None);
    let settings = json!({ "settings": { "partwright": { "style": "chorale" } } });
    client.notify("workspace/didChangeConfiguration", settings);
    client.reply("workspace/diagnostic/refresh", Value::Null);
    let id = before["resultId"].as_str().unwrap();
    assert_eq!(pull(&mut client, &document, Some(id))["kind"], "full");
    client.goodbye();
}
