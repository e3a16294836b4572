//! Completion: the words of the notation where they belong.

use std::fs;

use serde_json::{Value, json};

use crate::client::Client;
use crate::document::Document;

/// The words offered at `¶` in a text, and the text with one of them taken.
fn offered(text: &str) -> Vec<(String, String)> {
    let mut client = Client::ready();
    let found = offered_by(&mut client, "file:///a.voices", text);
    client.goodbye();
    found
}

fn offered_by(client: &mut Client, uri: &str, text: &str) -> Vec<(String, String)> {
    let at = text.find('¶').unwrap();
    let document = Document::open(client, uri, &text.replace('¶', ""));
    let more = json!({ "position": document.position(at) });
    let found = document.ask(client, "completion", more);
    let one = |item: &Value| {
        let taken = document.with(&[item["textEdit"].clone()]);
        (item["label"].as_str().unwrap().to_owned(), taken)
    };
    found.as_array().unwrap().iter().map(one).collect()
}

fn words(text: &str) -> Vec<String> {
    offered(text).into_iter().map(|(word, _)| word).collect()
}

fn has(text: &str, wanted: &[&str], unwanted: &[&str]) {
    let found = words(text);
    for word in wanted {
        assert!(
            found.iter().any(|w| w == word),
            "{word} in {text:?}: {found:?}"
        );
    }
    for word in unwanted {
        assert!(
            !found.iter().any(|w| w == word),
            "no {word} in {text:?}: {found:?}"
        );
    }
}

const VOICES: &str = "title x\nvoice S soprano\nvoice B bass\n\n";

#[test]
fn a_line_begins_with_a_header_or_a_label() {
    has(
        "title x\n¶",
        &["style", "key", "metre", "voice", "licence", "words"],
        &["title", "meter"],
    );
    let music = format!("{VOICES}S | G4 |\nB | G3 |\n\n¶");
    has(
        &music,
        &["S", "B", "key", "metre", "tempo", "words"],
        &["title", "style", "voice", "licence"],
    );
    assert_eq!(words(&music)[0], "S", "labels come first, in score order");
    has("S | G4 |\nB | G3 |\n\n¶\n", &["S", "B"], &[]);
    has("S | G4*horn |\n*¶\n", &["*horn"], &["S", "key"]);
}

#[test]
fn values_where_they_belong() {
    has("style ¶", &["free", "chorale", "species-5"], &["soprano"]);
    has("key G ¶", &["major", "dorian"], &["none"]);
    has("key ¶", &["none"], &["major"]);
    has("metre ¶", &["4/4", "free"], &[]);
    has("voice S ¶", &["soprano", "cello", "cantus"], &["treble"]);
    has(
        "voice S alto cantus ¶",
        &["easy", "doubles"],
        &["soprano", "cantus"],
    );
    has("voice S alto clef ¶", &["treble"], &["easy"]);
    has(
        &format!("{VOICES}voice T doubles ¶"),
        &["S", "B"],
        &["easy"],
    );
    has(&format!("{VOICES}equal ¶"), &["S", "B"], &["free"]);
    has(
        &format!("{VOICES}S | G4*a |\nwords ¶"),
        &["S", "B"],
        &["*a"],
    );
    has("title ¶", &[], &["title", "free"]);
    has("S | G4 ¶", &[], &["S"]);
    has("style free // ¶", &[], &["free"]);
}

#[test]
fn licences_name_rules_and_families() {
    for text in ["licence ¶", "licence spacing ¶", "S | G4*a |\n*a licence ¶"] {
        has(
            text,
            &["parallel-fifths", "motion", "spacing"],
            &["reading"],
        );
    }
    has(&format!("{VOICES}licence spacing ¶"), &["S"], &[]);
    has("*a ¶", &["licence"], &["spacing"]);
    has("licence spacing: ¶", &[], &["spacing"]);
    has("licence spacing: so parallel-¶", &[], &["parallel-fifths"]);
}

#[test]
fn what_is_typed_is_replaced() {
    let at = |text: &str, word: &str| {
        let found = offered(text);
        let one = found.into_iter().find(|(label, _)| label == word);
        one.unwrap_or_else(|| panic!("{word} in {text:?}")).1
    };
    assert_eq!(at("// 𝄪\r\nsty¶\r\n", "style"), "// 𝄪\r\nstyle\r\n");
    assert_eq!(
        at("licence parallel-f¶", "parallel-fifths"),
        "licence parallel-fifths"
    );
    assert_eq!(
        at("S | G4*ho¶ |\n*horn licence line: so", "*horn"),
        "S | G4*horn |\n*horn licence line: so"
    );
    assert_eq!(at("S | G4 |\nB | =¶", "=S"), "S | G4 |\nB | =S");
}

#[test]
fn the_house_style_is_among_the_styles() {
    let folder = tempfile::tempdir().unwrap();
    fs::write(
        folder.path().join("partwright.toml"),
        "name = \"quayside\"\n",
    )
    .unwrap();
    let uri = format!("file://{}/a.voices", folder.path().display());
    let mut client = Client::ready();
    let found = offered_by(&mut client, &uri, "style ¶\n");
    assert!(
        found.iter().any(|(_, new)| new == "style quayside\n"),
        "{found:?}"
    );
    client.goodbye();
}

#[test]
fn a_long_sheet_has_its_labels_at_its_end() {
    let mut client = Client::ready();
    let text = format!("{}\n¶", "S | D5 E |\nB | G3 A |\n\n".repeat(3000));
    let found = offered_by(&mut client, "file:///a.voices", &text);
    assert_eq!((found[0].0.as_str(), found[1].0.as_str()), ("S", "B"));
    client.goodbye();
}
