//! Aligning.

use serde_json::{Value, json};

use crate::client::{Client, capabilities};
use crate::document::{Columns, Document};

const ODD: &str = "\
title   Harbour lights
key G major

S | G4 A | B4 |
B | G3 F#3.E | D3 |

S|G4|
B|G3|
";

fn options() -> Value {
    json!({ "options": { "tabSize": 4, "insertSpaces": true } })
}

fn edits(client: &mut Client, document: &Document, method: &str, mut more: Value) -> Vec<Value> {
    more["options"] = options()["options"].clone();
    document
        .ask(client, method, more)
        .as_array()
        .unwrap()
        .clone()
}

#[test]
fn the_whole_sheet_is_aligned_once_for_all() {
    for columns in [Columns::Utf16, Columns::Utf8] {
        let mut client = Client::start().introduced(capabilities(&[columns.name()]));
        let text = format!("// Été 𝄪\r\n{}S | G♯4 𝄪|\n", ODD.replace('\n', "\r\n"));
        let mut document = Document::open_in(&mut client, "file:///a.voices", &text, columns);
        let found = edits(&mut client, &document, "formatting", json!({}));
        let new = document.with(&found);
        assert_eq!(new, partwright_sheet::align(&text));
        assert_ne!(new, text);
        document.become_text(&mut client, &new);
        assert!(edits(&mut client, &document, "formatting", json!({})).is_empty());
        client.goodbye();
    }
}

#[test]
fn a_range_aligns_the_systems_it_touches() {
    let mut client = Client::ready();
    let document = Document::open(&mut client, "file:///a.voices", ODD);
    let at = ODD.find("S|G4").unwrap();
    let range = json!({ "range": document.range(at..at + 1) });
    let found = edits(&mut client, &document, "rangeFormatting", range);
    let new = document.with(&found);
    assert_eq!(new, ODD.replace("S|G4|\nB|G3|", "S | G4 |\nB | G3 |"));
    client.goodbye();
}

#[test]
fn typing_a_bar_line_aligns_its_own_system_only() {
    let mut client = Client::ready();
    let mut document = Document::open(&mut client, "file:///a.voices", &ODD.replace("B4 |", "B4 "));
    let at = document.text.find("B4 ").unwrap() + 3;
    document.edit(&mut client, at..at, "|");
    assert_eq!(document.text, ODD);
    let more = json!({ "position": document.position(at + 1), "ch": "|" });
    let found = edits(&mut client, &document, "onTypeFormatting", more);
    let aligned = "S | G4 A     | B4 |\nB | G3 F#3.E | D3 |\n";
    let new = document.with(&found);
    assert!(new.contains(aligned), "{new}");
    assert!(
        new.starts_with("title   Harbour lights\nkey G major\n") && new.ends_with("S|G4|\nB|G3|\n")
    );
    // Outside a system there is nothing to align.
    let more =
        json!({ "position": document.position(0), "ch": "|", "options": options()["options"] });
    assert!(
        document
            .ask(&mut client, "onTypeFormatting", more)
            .is_null()
    );
    client.goodbye();
}
