//! Symbols, folding, selection, highlights.

use serde_json::{Value, json};

use crate::client::{Client, capabilities_and};
use crate::document::{Document, FIFTHS};

const SHEET: &str = "\
title Harbour lights
metre 2/4

voice S soprano
voice B bass

S | G4 A.B | B4 - |
B | G3 F#3 | D3 - |
// a comment

S | G4 - |
B | G3 - |
";

fn tree_client() -> Client {
    let trees = "/textDocument/documentSymbol/hierarchicalDocumentSymbolSupport";
    Client::start().introduced(capabilities_and(&[(trees, json!(true))]))
}

#[test]
fn systems_hold_bars_and_voices() {
    let mut client = tree_client();
    let document = Document::open(&mut client, "file:///a.voices", SHEET);
    let symbols = document.ask(&mut client, "documentSymbol", json!({}));
    let symbols = symbols.as_array().unwrap();
    let names = |list: &[Value]| -> Vec<String> {
        list.iter()
            .map(|s| s["name"].as_str().unwrap().to_owned())
            .collect()
    };
    assert_eq!(names(symbols), ["Bars 1–2", "Bar 3"]);
    let inside = symbols[0]["children"].as_array().unwrap();
    assert_eq!(names(inside), ["Bar 1", "Bar 2", "S", "B"]);
    assert_eq!(document.words(&inside[0]["range"]), "G4 A.B");
    assert_eq!(document.words(&inside[1]["range"]), "B4 -");
    assert_eq!(inside[2]["detail"], "soprano");
    assert_eq!(document.words(&inside[3]["range"]), "B | G3 F#3 | D3 - |");
    assert_eq!(document.words(&inside[3]["selectionRange"]), "B");
    // A selection lies in its symbol, and a symbol in its parent (LSP 3.17, `DocumentSymbol`).
    for symbol in symbols {
        let span = |s: &Value, range: &str| {
            (
                document.offset(&s[range]["start"]),
                document.offset(&s[range]["end"]),
            )
        };
        let inside =
            |inner: (usize, usize), outer: (usize, usize)| outer.0 <= inner.0 && inner.1 <= outer.1;
        for child in symbol["children"].as_array().unwrap() {
            assert!(
                inside(span(child, "range"), span(symbol, "range")),
                "{child}"
            );
            assert!(
                inside(span(child, "selectionRange"), span(child, "range")),
                "{child}"
            );
        }
    }
    client.goodbye();
}

#[test]
fn a_client_without_trees_gets_a_list() {
    let mut client = Client::ready();
    let document = Document::open(&mut client, "file:///a.voices", FIFTHS);
    let symbols = document.ask(&mut client, "documentSymbol", json!({}));
    let told: Vec<(&str, Option<&str>)> = symbols
        .as_array()
        .unwrap()
        .iter()
        .map(|s| (s["name"].as_str().unwrap(), s["containerName"].as_str()))
        .collect();
    assert_eq!(
        told,
        [
            ("Bar 1", None),
            ("Bar 1", Some("Bar 1")),
            ("S", Some("Bar 1")),
            ("B", Some("Bar 1"))
        ]
    );
    client.goodbye();
}

#[test]
fn systems_and_the_head_fold() {
    let mut client = Client::ready();
    let document = Document::open(&mut client, "file:///a.voices", SHEET);
    let folds = document.ask(&mut client, "foldingRange", json!({}));
    let lines: Vec<(i64, i64)> = folds
        .as_array()
        .unwrap()
        .iter()
        .map(|f| {
            (
                f["startLine"].as_i64().unwrap(),
                f["endLine"].as_i64().unwrap(),
            )
        })
        .collect();
    assert_eq!(lines, [(0, 4), (6, 7), (10, 11)]);
    client.goodbye();
}

#[test]
fn selections_widen_from_the_part_to_the_sheet() {
    let mut client = Client::ready();
    let document = Document::open(&mut client, "file:///a.voices", SHEET);
    let widening = |client: &mut Client, offset: usize| {
        let more = json!({ "positions": [document.position(offset), document.position(0)] });
        let found = document.ask(client, "selectionRange", more);
        assert_eq!(found.as_array().unwrap().len(), 2, "one for each position");
        let (mut at, mut words) = (&found[0], Vec::new());
        loop {
            words.push(document.words(&at["range"]).to_owned());
            match at.get("parent") {
                Some(parent) => at = parent,
                None => return words,
            }
        }
    };
    let system = "S | G4 A.B | B4 - |\nB | G3 F#3 | D3 - |";
    let words = widening(&mut client, SHEET.find(".B |").unwrap() + 1);
    assert_eq!(
        words,
        ["B", "A.B", "G4 A.B", "S | G4 A.B | B4 - |", system, SHEET]
    );
    let words = widening(&mut client, SHEET.find("Harbour").unwrap());
    assert_eq!(words, ["Harbour", "title Harbour lights", SHEET]);
    client.goodbye();
}

#[test]
fn all_that_sounds_with_a_note_is_lit() {
    let mut client = Client::ready();
    let document = Document::open(&mut client, "file:///a.voices", SHEET);
    let lit = |client: &mut Client, offset: usize| -> Vec<String> {
        let more = json!({ "position": document.position(offset) });
        let found = document.ask(client, "documentHighlight", more);
        let words = |h: &Value| {
            let start = document.offset(&h["range"]["start"]);
            format!("{}@{start}", document.words(&h["range"]))
        };
        found.as_array().unwrap().iter().map(words).collect()
    };
    let (soprano, bass) = (SHEET.find(".B |").unwrap() + 1, SHEET.find("F#3").unwrap());
    assert_eq!(
        lit(&mut client, soprano),
        [format!("B@{soprano}"), format!("F#3@{bass}")]
    );
    let held = SHEET.find("- |\nB").unwrap();
    let under = SHEET.find("- |\n//").unwrap();
    assert_eq!(
        lit(&mut client, held),
        [format!("-@{held}"), format!("-@{under}")]
    );
    // On a label, every place of it.
    assert_eq!(lit(&mut client, SHEET.find("S soprano").unwrap()).len(), 3);
    client.goodbye();
}
