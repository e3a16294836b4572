//! Labels and marks: definition, references, rename.

use serde_json::{Value, json};

use crate::client::Client;
use crate::document::Document;

const SHEET: &str = "\
title Sopranos // S
equal S A
licence spacing S: S sings far out
voice S soprano
voice A alto doubles S
voice B bass

S | D5 E*horn | D5 |
A | =S-8      | D4 |
B | G3 A*horn | G3 |
words S 1 | la la | S |
*horn licence motion: S leads
";

fn places(found: &Value, document: &Document) -> Vec<usize> {
    let one = |location: &Value| {
        assert_eq!(location["uri"], document.uri);
        document.offset(&location["range"]["start"])
    };
    found.as_array().unwrap().iter().map(one).collect()
}

fn position(document: &Document, offset: usize) -> Value {
    json!({ "position": document.position(offset) })
}

#[test]
fn a_label_leads_to_its_declaration() {
    let mut client = Client::ready();
    let document = Document::open(&mut client, "file:///a.voices", SHEET);
    let declared = SHEET.find("S soprano").unwrap();
    for words in [
        "S A\n",
        "S: S",
        "S soprano",
        "S\nvoice B",
        "S | D5",
        "S-8",
        "S 1",
    ] {
        let at = SHEET.find(words).unwrap();
        let found = document.ask(&mut client, "definition", position(&document, at));
        assert_eq!(places(&found, &document), [declared], "{words}");
    }
    // The title's S, the reason's and the syllable are no labels.
    for words in ["Sopranos", "S sings", "S |\n", "S leads"] {
        let at = SHEET.find(words).unwrap();
        let found = document.ask(&mut client, "definition", position(&document, at));
        assert!(found.is_null(), "{words}: {found}");
    }
    client.goodbye();
}

#[test]
fn a_mark_leads_to_its_footnote_and_back() {
    let mut client = Client::ready();
    let document = Document::open(&mut client, "file:///a.voices", SHEET);
    let mark = SHEET.find("*horn |").unwrap();
    let second = SHEET.rfind("*horn |").unwrap();
    let footnote = SHEET.find("*horn licence").unwrap();
    let found = document.ask(&mut client, "definition", position(&document, mark + 2));
    assert_eq!(places(&found, &document), [footnote + 1]);
    let back = document.ask(&mut client, "definition", position(&document, footnote));
    assert_eq!(places(&back, &document), [mark + 1, second + 1]);
    client.goodbye();
}

#[test]
fn references_with_and_without_the_declaration() {
    let mut client = Client::ready();
    let document = Document::open(&mut client, "file:///a.voices", SHEET);
    let mut count = |words: &str, declaration: bool| {
        let mut more = position(&document, SHEET.find(words).unwrap());
        more["context"] = json!({ "includeDeclaration": declaration });
        let found = document.ask(&mut client, "references", more);
        let range = |l: &Value| document.words(&l["range"]).to_owned();
        let mut found: Vec<String> = found.as_array().unwrap().iter().map(range).collect();
        let all = found.len();
        found.dedup();
        assert_eq!(found.len(), 1, "{found:?}");
        all
    };
    assert_eq!((count("S-8", true), count("S-8", false)), (7, 6));
    assert_eq!((count("*horn |", true), count("*horn |", false)), (3, 2));
    client.goodbye();
}

fn rename(client: &mut Client, document: &Document, offset: usize, new: &str) -> Value {
    let mut more = document.about(position(document, offset));
    more["newName"] = json!(new);
    client.request("textDocument/rename", more)
}

#[test]
fn rename_changes_every_place_and_nothing_else() {
    let mut client = Client::ready();
    let document = Document::open(&mut client, "file:///a.voices", SHEET);
    let at = SHEET.find("S-8").unwrap();
    let prepared = document.ask(&mut client, "prepareRename", position(&document, at));
    assert_eq!(prepared["placeholder"], "S");
    assert_eq!(document.words(&prepared["range"]), "S");
    let answer = rename(&mut client, &document, at, "Cantor1");
    let new = document.with_workspace(&answer["result"]);
    let expected = SHEET
        .replace("equal S A", "equal Cantor1 A")
        .replace("spacing S:", "spacing Cantor1:")
        .replace("voice S", "voice Cantor1")
        .replace("doubles S", "doubles Cantor1")
        .replace("S | D5", "Cantor1 | D5")
        .replace("=S", "=Cantor1")
        .replace("words S 1", "words Cantor1 1");
    assert_eq!(new, expected);
    let mark = SHEET.find("*horn |").unwrap();
    for name in ["brass", "*brass"] {
        let answer = rename(&mut client, &document, mark, name);
        let new = document.with_workspace(&answer["result"]);
        assert_eq!(new, SHEET.replace("*horn", "*brass"));
    }
    client.goodbye();
}

#[test]
fn names_that_cannot_stand_are_refused() {
    let mut client = Client::ready();
    let document = Document::open(&mut client, "file:///a.voices", SHEET);
    let label = SHEET.find("S | D5").unwrap();
    for (new, words) in [
        ("A", "taken"),
        ("words", "cannot stand"),
        ("title", "cannot stand"),
        ("motion", "cannot stand"),
        ("1S", "letter"),
        ("Lamplighters", "eight"),
        ("S T", "letter"),
        ("", "letter"),
        ("É", "letter"),
    ] {
        let answer = rename(&mut client, &document, label, new);
        let message = answer["error"]["message"]
            .as_str()
            .unwrap_or_else(|| panic!("{new}: {answer}"));
        assert!(message.contains(words), "{new}: {message}");
    }
    let mark = SHEET.find("*horn |").unwrap();
    for new in ["h2", "", "*", "a b"] {
        assert!(
            rename(&mut client, &document, mark, new)["error"].is_object(),
            "{new}"
        );
    }
    let note = SHEET.find("D5 |").unwrap();
    assert!(rename(&mut client, &document, note, "X")["error"].is_object());
    assert!(
        document
            .ask(&mut client, "prepareRename", position(&document, note))
            .is_null()
    );
    assert!(rename(&mut client, &document, label, "S")["result"].is_null());
    client.goodbye();
}
