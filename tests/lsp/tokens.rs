//! Semantic tokens.

use serde_json::json;

use crate::client::{Client, capabilities};
use crate::document::{Columns, Document};

/// The tokens as `word type`, unpacked as the protocol says.
fn tokens(text: &str, columns: Columns) -> Vec<String> {
    let mut client = Client::start();
    let offer = client.initialize(capabilities(&[columns.name()]));
    let legend = &offer["capabilities"]["semanticTokensProvider"]["legend"]["tokenTypes"];
    let document = Document::open_in(&mut client, "file:///a.voices", text, columns);
    let found = document.ask(&mut client, "semanticTokens/full", json!({}));
    let data: Vec<u64> = found["data"]
        .as_array()
        .unwrap()
        .iter()
        .map(|n| n.as_u64().unwrap())
        .collect();
    let (mut line, mut column) = (0, 0);
    let told = data
        .chunks(5)
        .map(|token| {
            column = if token[0] == 0 {
                column + token[1]
            } else {
                token[1]
            };
            line += token[0];
            let place = |character: u64| json!({ "line": line, "character": character });
            let range = json!({ "start": place(column), "end": place(column + token[2]) });
            let kind = &legend[usize::try_from(token[3]).unwrap()];
            format!("{} {}", document.words(&range), kind.as_str().unwrap())
        })
        .collect();
    client.goodbye();
    told
}

#[test]
fn every_word_has_its_colour() {
    let text = "\
title Été 𝄪 // 𝄪 note
voice S soprano
licence spacing S: far out

S | G♯4*a C𝄪5.-  _ ? =B |
words S 1 | la |
harmony | V7 |
  *a licence motion: so // why
x y
";
    let expected = [
        "title keyword",
        "Été 𝄪 string",
        "// 𝄪 note comment",
        "voice keyword",
        "S variable",
        "soprano type",
        "licence keyword",
        "spacing type",
        "S type",
        "far out string",
        "S variable",
        "G♯4 number",
        "*a decorator",
        "C𝄪5 number",
        "- operator",
        "_ regexp",
        "? operator",
        "=B variable",
        "words keyword",
        "S variable",
        "1 variable",
        "la string",
        "harmony keyword",
        "V7 type",
        "*a decorator",
        "licence keyword",
        "motion type",
        "so string",
        "// why comment",
    ];
    for text in [
        text.to_owned(),
        format!("\u{feff}{text}"),
        text.replace('\n', "\r\n"),
        format!("\r\n\n{text}"),
    ] {
        for columns in [Columns::Utf16, Columns::Utf8] {
            assert_eq!(tokens(&text, columns), expected, "{text:?} {columns:?}");
        }
    }
    assert_eq!(tokens("", Columns::Utf16), [""; 0]);
}

#[test]
fn a_carriage_return_alone_does_not_shift_what_follows() {
    let text = "title a\rb\nS | G4 |\n";
    let told: Vec<String> = tokens(text, Columns::Utf16);
    assert_eq!(told, ["title keyword", "S variable", "G4 number"]);
}
