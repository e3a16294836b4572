//! What the server asks to be told of: files and settings, each by itself.

use std::fs;

use serde_json::{Value, json};

use crate::client::{Client, capabilities_and};
use crate::document::{Document, FIFTHS};

const FILES: &str = "workspace/didChangeWatchedFiles";
const SETTINGS: &str = "workspace/didChangeConfiguration";

/// A client that can be asked for both, and both questions, unanswered.
fn asked_for_both() -> (Client, Value, Value) {
    let mut client = Client::start().introduced(capabilities_and(&[
        (
            "/workspace/didChangeWatchedFiles/dynamicRegistration",
            json!(true),
        ),
        (
            "/workspace/didChangeConfiguration/dynamicRegistration",
            json!(true),
        ),
    ]));
    client.until(|client| client.asked.len() == 2);
    let mut take = |wanted: &str| {
        let is_it = |question: &Value| {
            let all = question["params"]["registrations"].as_array().unwrap();
            question["method"] == "client/registerCapability"
                && all.len() == 1
                && all[0]["method"] == wanted
        };
        let at = client.asked.iter().position(is_it);
        let at = at.unwrap_or_else(|| panic!("{wanted}: {:?}", client.asked));
        client.asked.remove(at)
    };
    let (files, settings) = (take(FILES), take(SETTINGS));
    let id = |question: &Value| question["params"]["registrations"][0]["id"].clone();
    assert_ne!(id(&files), id(&settings));
    (client, files, settings)
}

fn grant(client: &mut Client, question: &Value) {
    client.send(&json!({ "jsonrpc": "2.0", "id": question["id"], "result": null }));
}

/// Waits until so many findings were published last.
fn until(client: &mut Client, findings: usize) {
    client.until(|client| {
        let last = client.published.last();
        last.is_some_and(|p| p.diagnostics.len() == findings)
    });
}

#[test]
fn a_client_that_refuses_to_watch_files_keeps_the_settings() {
    let (mut client, files, settings) = asked_for_both();
    client.refuse(&files);
    grant(&mut client, &settings);
    // Alto and tenor lie too far apart for a chorale, and for no other style.
    let text = "S | G5 F |\nA | B4 C5 |\nT | G3 A3 |\nB | E3 F3 |\n";
    Document::open(&mut client, "file:///a.voices", text);
    until(&mut client, 1);
    let style = json!({ "settings": { "partwright": { "style": "chorale" } } });
    client.notify(SETTINGS, style);
    until(&mut client, 2);
    assert!(client.asked.is_empty(), "{:?}", client.asked);
    client.goodbye();
}

#[test]
fn a_client_that_refuses_to_tell_of_settings_still_watches_files() {
    let folder = tempfile::tempdir().unwrap();
    let root = folder.path().canonicalize().unwrap();
    let (mut client, files, settings) = asked_for_both();
    client.refuse(&settings);
    grant(&mut client, &files);
    let sheet = format!("file://{}", root.join("quay.voices").display());
    Document::open(&mut client, &sheet, FIFTHS);
    until(&mut client, 1);
    let house = root.join("partwright.toml");
    let off = "[[rule]]\nrule = \"parallel-fifths\"\nseverity = \"off\"\nreason = \"horns\"\n";
    fs::write(&house, off).unwrap();
    let change = json!({ "uri": format!("file://{}", house.display()), "type": 1 });
    client.notify(FILES, json!({ "changes": [change] }));
    until(&mut client, 0);
    assert!(client.asked.is_empty(), "{:?}", client.asked);
    client.goodbye();
}
