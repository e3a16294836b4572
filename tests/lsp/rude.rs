//! Clients that keep to nothing.

use serde_json::{Value, json};

use crate::client::Client;
use crate::document::{Columns, Document, FIFTHS};

/// Every request about a document and a place in it.
const REQUESTS: [&str; 15] = [
    "hover",
    "completion",
    "definition",
    "references",
    "prepareRename",
    "rename",
    "documentHighlight",
    "codeAction",
    "formatting",
    "rangeFormatting",
    "onTypeFormatting",
    "documentSymbol",
    "foldingRange",
    "inlayHint",
    "semanticTokens/full",
];

fn everything(uri: &str, position: Value) -> Value {
    json!({
        "textDocument": { "uri": uri },
        "position": position,
        "positions": [position],
        "range": { "start": position, "end": position },
        "context": { "diagnostics": [], "includeDeclaration": true, "triggerKind": 1 },
        "newName": "X",
        "ch": "|",
        "options": { "tabSize": 4, "insertSpaces": true },
    })
}

#[test]
fn every_request_is_answered_about_a_document_that_is_not_open() {
    let mut client = Client::ready();
    let document = Document::open(&mut client, "file:///a.voices", FIFTHS);
    document.close(&mut client);
    let nowhere = json!({ "line": 0, "character": 0 });
    for uri in ["file:///never.voices", "file:///a.voices", "untitled:x"] {
        for method in REQUESTS {
            let params = everything(uri, nowhere.clone());
            let answer = client.request(&format!("textDocument/{method}"), params);
            assert!(
                answer["result"].is_null() && answer.get("error").is_none(),
                "{method}: {answer}"
            );
        }
    }
    client.goodbye();
}

#[test]
fn every_request_is_answered_wherever_it_points() {
    let mut client = crate::actions::client(&[]);
    let texts = [
        "",
        "\n",
        FIFTHS,
        "S | D5",
        "\u{feff}",
        "title x\n\n\n",
        "S | 𝄪 |\r\n*a",
        "| |",
        "S | =",
        "*",
    ];
    for (number, text) in texts.iter().enumerate() {
        let document = Document::open(&mut client, &format!("file:///{number}.voices"), text);
        for (line, character) in [
            (0, 0),
            (0, 5),
            (0, 4_000_000_000_u32),
            (1, 0),
            (2, 0),
            (3, 1),
            (4_000_000_000_u32, 7),
        ] {
            let position = json!({ "line": line, "character": character });
            for method in REQUESTS.into_iter().chain(["selectionRange"]) {
                let params = everything(&document.uri, position.clone());
                let answer = client.request(&format!("textDocument/{method}"), params);
                // Refusing to rename nothing is the only error.
                let refused = method == "rename" && answer["error"]["code"] == -32602;
                assert!(
                    answer.get("error").is_none() || refused,
                    "{text:?} {position} {method}: {answer}"
                );
            }
        }
    }
    assert!(client.logged.is_empty(), "{:?}", client.logged);
    client.goodbye();
}

#[test]
fn reversed_and_stale_ranges_are_answered() {
    let mut client = Client::ready();
    let mut document = Document::open(&mut client, "file:///a.voices", FIFTHS);
    let stale = document.range(0..FIFTHS.len());
    document.become_text(&mut client, "S | G4 |\n");
    let reversed = json!({ "start": stale["end"], "end": stale["start"] });
    for range in [stale, reversed] {
        for method in ["codeAction", "rangeFormatting", "inlayHint"] {
            let mut params = everything(&document.uri, json!({ "line": 0, "character": 0 }));
            params["range"] = range.clone();
            let answer = client.request(&format!("textDocument/{method}"), params);
            assert!(answer.get("error").is_none(), "{method}: {answer}");
        }
    }
    client.goodbye();
}

#[test]
fn what_the_client_says_about_findings_is_not_relied_on() {
    let mut client = crate::actions::client(&[]);
    let document = Document::open(&mut client, "file:///a.voices", FIFTHS);
    let range = document.range(7..8);
    let invented = json!({ "range": range, "message": "x", "code": "compass", "severity": 1 });
    let params =
        document.about(json!({ "range": range, "context": { "diagnostics": [invented] } }));
    let answer = client.request("textDocument/codeAction", params);
    let actions = answer["result"].as_array().unwrap();
    assert!(!actions.is_empty());
    for action in actions {
        for diagnostic in action["diagnostics"].as_array().unwrap() {
            assert_eq!(diagnostic["code"], "parallel-fifths", "{action}");
        }
    }
    client.goodbye();
}

#[test]
fn reopening_begins_anew_and_old_actions_are_refused() {
    let mut client = crate::actions::client(&[
        ("/textDocument/codeAction/dataSupport", json!(true)),
        (
            "/textDocument/codeAction/resolveSupport",
            json!({ "properties": ["edit"] }),
        ),
    ]);
    let document = Document::open(&mut client, "file:///a.voices", FIFTHS);
    let actions = document.actions(&mut client, "E |", json!({}));
    document.close(&mut client);
    document.opened(&mut client);
    let mend = actions.iter().find(|a| a.get("data").is_some()).unwrap();
    assert_eq!(client.error("codeAction/resolve", mend.clone()), -32801);
    let again = document.actions(&mut client, "E |", json!({}));
    assert_eq!(again.len(), actions.len());
    client.goodbye();
}

#[test]
fn a_sheet_saved_by_another_program_is_what_the_editor_says_it_is() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("a.voices");
    std::fs::write(&path, FIFTHS).unwrap();
    let uri = format!("file://{}", path.display());
    let mut client = Client::ready();
    let mut document = Document::open(&mut client, &uri, FIFTHS);
    assert_eq!(document.short(&mut client).len(), 1);
    std::fs::write(&path, "S | H4 |\n").unwrap();
    let change = json!({ "changes": [{ "uri": uri, "type": 2 }] });
    client.notify("workspace/didChangeWatchedFiles", change);
    document.edit(&mut client, 0..0, "\n");
    assert_eq!(document.short(&mut client), ["parallel-fifths 1:7-1:8"]);
    client.goodbye();
}

#[test]
fn cancelled_requests_are_answered_all_the_same() {
    let mut client = Client::start().introduced(json!({}));
    let text = "S | D5 E |\nB | G3 A |\n\n".repeat(500);
    let document = Document::open_in(&mut client, "file:///a.voices", &text, Columns::Utf16);
    let ids: Vec<i64> = REQUESTS
        .iter()
        .map(|method| {
            let params = everything(&document.uri, json!({ "line": 0, "character": 7 }));
            let id = client.ask(&format!("textDocument/{method}"), params);
            client.notify("$/cancelRequest", json!({ "id": id }));
            id
        })
        .collect();
    for id in ids {
        let answer = client.answer(id);
        let cancelled = answer["error"]["code"] == -32800;
        assert!(cancelled || answer.get("error").is_none(), "{answer}");
    }
    client.goodbye();
}
