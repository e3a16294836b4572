//! Inlay hints, and the settings that switch them.

use serde_json::{Value, json};

use crate::client::{Client, capabilities, capabilities_and};
use crate::document::Document;

const SHEET: &str = "\
metre 2/4

S | G4 A.B | B4 - |
A | D4 D   | D4 - |
B | G3 F#3 | G3 - |

S | G4 - |
A | G5 D |
B | G2 - |
";

fn hints(client: &mut Client, document: &Document) -> Vec<String> {
    let more = json!({ "range": document.range(0..document.text.len()) });
    let found = document.ask(client, "inlayHint", more);
    let one = |hint: &Value| {
        let at = document.offset(&hint["position"]);
        let line = document.text[..at].matches('\n').count();
        format!("{line} {}", hint["label"].as_str().unwrap())
    };
    found.as_array().unwrap().iter().map(one).collect()
}

fn set(client: &mut Client, hints: Value) {
    let settings = json!({ "settings": { "partwright": { "inlayHints": hints } } });
    client.notify("workspace/didChangeConfiguration", settings);
}

const NUMBERS: [&str; 2] = ["2 bars 1–2", "6 bar 3"];

#[test]
fn bar_numbers_stand_behind_the_first_rows() {
    let mut client = Client::ready();
    let document = Document::open(&mut client, "file:///a.voices", SHEET);
    assert_eq!(hints(&mut client, &document), NUMBERS);
    // Only those in the range.
    let end = SHEET.find("A | D4").unwrap();
    let more = json!({ "range": document.range(0..end) });
    let found = document.ask(&mut client, "inlayHint", more);
    assert_eq!(found.as_array().unwrap().len(), 1);
    let first = SHEET.find("- |\nA").unwrap() + 3;
    assert_eq!(
        document.offset(&found[0]["position"]),
        first,
        "no column moves"
    );
    client.goodbye();
}

#[test]
fn intervals_over_the_bass_stand_behind_the_notes() {
    let mut client = Client::ready();
    let document = Document::open(&mut client, "file:///a.voices", SHEET);
    set(
        &mut client,
        json!({ "barNumbers": false, "intervals": true }),
    );
    // G3 under G4 and D4; F#3 under A, B and D; G3 under B4 and D4; G2 under G4, G5 and D5.
    let expected = [
        "2 8", "2 10", "2 4", "2 10", "3 5", "3 6", "3 5", "6 8", "7 8", "7 5",
    ];
    assert_eq!(hints(&mut client, &document), expected);
    set(&mut client, json!({ "barNumbers": false }));
    assert_eq!(hints(&mut client, &document), [""; 0]);
    set(&mut client, json!({}));
    assert_eq!(hints(&mut client, &document), NUMBERS);
    client.goodbye();
}

#[test]
fn chords_stand_in_the_lowest_row_where_they_begin() {
    let text = "style chorale\nkey C major\nmetre 4/4\n\n\
        S | G4 A4 G4 - | G4^ - - - |\n\
        A | E4 F4 F4 D | E4^ - - - |\n\
        T | C4 C4 D4 B3 | C4^ - - - |\n\
        B | C3 F3 B2 G2 | C3^ - - - |\n";
    let mut client = Client::ready();
    let document = Document::open(&mut client, "file:///a.voices", text);
    assert_eq!(hints(&mut client, &document), ["4 bars 1–2"]);
    set(&mut client, json!({ "barNumbers": false, "chords": true }));
    assert_eq!(
        hints(&mut client, &document),
        ["7 C", "7 F", "7 G7/B", "7 G", "7 C"]
    );
    let whole = json!({ "range": document.range(0..text.len()) });
    let found = document.ask(&mut client, "inlayHint", whole);
    assert_eq!(found[2]["tooltip"], "G dominant seventh, in C major");
    set(&mut client, json!({ "barNumbers": false }));
    assert_eq!(hints(&mut client, &document), [""; 0]);
    client.goodbye();
}

#[test]
fn a_client_that_can_be_asked_is_asked() {
    let mut client = Client::start().introduced(capabilities_and(&[
        ("/workspace/configuration", json!(true)),
        (
            "/workspace/didChangeConfiguration/dynamicRegistration",
            json!(true),
        ),
        ("/workspace/inlayHint/refreshSupport", json!(true)),
    ]));
    let asked = client.reply("client/registerCapability", Value::Null);
    let registration = &asked["registrations"][0];
    assert_eq!(registration["method"], "workspace/didChangeConfiguration");
    let question = client.reply("workspace/configuration", json!([null]));
    assert_eq!(question["items"], json!([{ "section": "partwright" }]));
    let document = Document::open(&mut client, "file:///a.voices", SHEET);
    assert_eq!(hints(&mut client, &document), NUMBERS);
    client.notify(
        "workspace/didChangeConfiguration",
        json!({ "settings": null }),
    );
    let answer = json!([{ "inlayHints": { "barNumbers": false } }]);
    client.reply("workspace/configuration", answer);
    client.reply("workspace/inlayHint/refresh", Value::Null);
    assert_eq!(hints(&mut client, &document), [""; 0]);
    client.goodbye();
}

#[test]
fn the_style_that_is_set_goes_before_the_sheets_own() {
    let text = "style chorale\n\nS | G5 F |\nA | B4 C5 |\nT | B3 D4 |\nB | B2 C3 |\n";
    let mut client = Client::ready();
    let document = Document::open(&mut client, "file:///a.voices", text);
    let chorale = document.findings(&mut client);
    let settings = json!({ "settings": { "partwright": { "style": "free" } } });
    client.notify("workspace/didChangeConfiguration", settings);
    client.until(|client| client.published.len() > 1);
    let free = client.published.last().unwrap().diagnostics.clone();
    let plain = Document::open(
        &mut client,
        "file:///b.voices",
        &text.replace("style chorale", "style free"),
    );
    let strip = |found: &[Value]| -> Vec<(Value, Value)> {
        found
            .iter()
            .map(|f| (f["code"].clone(), f["severity"].clone()))
            .collect()
    };
    assert_eq!(strip(&free), strip(&plain.findings(&mut client)));
    assert_ne!(strip(&free), strip(&chorale), "the two styles differ here");
    client.goodbye();
}

#[test]
fn settings_may_come_with_the_first_message() {
    let mut client = Client::start();
    let params = json!({
        "processId": null,
        "capabilities": capabilities(&["utf-16"]),
        "initializationOptions": { "inlayHints": { "barNumbers": false } },
    });
    client.request("initialize", params);
    client.notify("initialized", json!({}));
    let document = Document::open(&mut client, "file:///a.voices", SHEET);
    assert_eq!(hints(&mut client, &document), [""; 0]);
    client.goodbye();
}

#[test]
fn what_came_with_the_first_message_holds_where_nothing_else_is_set() {
    let mut client = Client::start();
    let can = [
        ("/workspace/configuration", json!(true)),
        ("/workspace/inlayHint/refreshSupport", json!(true)),
    ];
    let params = json!({
        "processId": null,
        "capabilities": capabilities_and(&can),
        "initializationOptions": { "inlayHints": { "barNumbers": false } },
    });
    client.request("initialize", params);
    client.notify("initialized", json!({}));
    let document = Document::open(&mut client, "file:///a.voices", SHEET);
    // Something else is set, and then nothing; the server tells of each change, and of no other.
    let other = json!([{ "inlayHints": { "barNumbers": true } }]);
    client.reply("workspace/configuration", other);
    client.reply("workspace/inlayHint/refresh", Value::Null);
    assert_eq!(hints(&mut client, &document), NUMBERS);
    let unset = json!({ "settings": null });
    client.notify("workspace/didChangeConfiguration", unset);
    client.reply("workspace/configuration", json!([null]));
    client.reply("workspace/inlayHint/refresh", Value::Null);
    assert_eq!(hints(&mut client, &document), [""; 0]);
    assert!(client.asked.is_empty(), "{:?}", client.asked);
    client.goodbye();
}
