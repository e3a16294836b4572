//! Findings as diagnostics.

use serde_json::{Value, json};

use crate::client::{Client, capabilities};
use crate::document::{Columns, Document, FIFTHS};

fn range(line: u32, from: u32, to: u32) -> Value {
    json!({ "start": { "line": line, "character": from }, "end": { "line": line, "character": to } })
}

#[test]
fn a_finding_with_all_that_belongs_to_it() {
    let mut client = Client::ready();
    let text = format!("voice S soprano\nvoice B bass\n\n{FIFTHS}");
    let document = Document::open(&mut client, "file:///evensong%20one.voices", &text);
    let findings = document.findings_of(&mut client, "parallel-fifths");
    let [finding] = &findings[..] else {
        panic!("{findings:?}")
    };
    assert_eq!(finding["range"], range(3, 7, 8));
    assert_eq!(finding["severity"], 1);
    assert_eq!(finding["source"], "partwright");
    assert_eq!(finding["code"], "parallel-fifths");
    assert!(
        finding.get("codeDescription").is_none(),
        "the project has no home yet"
    );
    let message = finding["message"].as_str().unwrap();
    for words in ["soprano and bass", "D5", "G3", "E5", "A3"] {
        assert!(message.contains(words), "{message}");
    }
    let related = finding["relatedInformation"].as_array().unwrap();
    let related: Vec<_> = related
        .iter()
        .map(|r| {
            assert_eq!(r["location"]["uri"], "file:///evensong%20one.voices");
            (
                r["message"].as_str().unwrap(),
                r["location"]["range"].clone(),
            )
        })
        .collect();
    assert_eq!(
        related,
        [
            ("from here: soprano D5", range(3, 4, 6)),
            ("from here: bass G3", range(4, 4, 6)),
            ("with: bass A3", range(4, 7, 8)),
        ]
    );
    client.goodbye();
}

#[test]
fn the_three_severities() {
    let mut client = Client::ready();
    let text = "voice S soprano\nvoice A alto\n\nS | D6 G5 A5 ? |\n";
    let document = Document::open(&mut client, "file:///a.voices", text);
    let findings = document.findings(&mut client);
    let severity = |rule: &str| -> Vec<i64> {
        let of = findings.iter().filter(|f| f["code"] == rule);
        of.map(|f| f["severity"].as_i64().unwrap()).collect()
    };
    assert_eq!(
        severity("compass"),
        [1, 2],
        "extreme, then ordinary: {findings:?}"
    );
    assert_eq!(severity("unwritten"), [3], "{findings:?}");
    client.goodbye();
}

#[test]
fn a_client_that_shows_no_related_places_gets_none() {
    let mut client = Client::start().introduced(json!({}));
    let document = Document::open(&mut client, "file:///a.voices", FIFTHS);
    let findings = document.findings_of(&mut client, "parallel-fifths");
    assert_eq!(findings.len(), 1);
    assert!(findings[0].get("relatedInformation").is_none());
    client.goodbye();
}

/// The same finding behind signs of two, three and four bytes, in both ways of counting. The
/// figures are counted by hand: ♯ is 3 bytes and 1 unit, 𝄪 is 4 bytes and 2 units, a no-break
/// blank is 2 bytes and 1 unit, a byte order mark 3 bytes and 1 unit (Unicode 15).
#[test]
fn columns_behind_other_than_ascii() {
    let cases = [
        ("S | D♯5 E♯ |\nB | G♯3 A♯ |\n", [(0, 8, 10), (0, 10, 14)]),
        ("S | C𝄪5 D♯ |\nB | F𝄪3 G♯ |\n", [(0, 9, 11), (0, 11, 15)]),
        ("S |\u{a0}D5 E |\nB | G3 A |\n", [(0, 7, 8), (0, 8, 9)]),
        ("\u{feff}S | D5 E |\nB | G3 A |\n", [(0, 8, 9), (0, 10, 11)]),
        (
            "title Été 𝄪\n\nS | D5 E |\nB | G3 A |\n",
            [(2, 7, 8), (2, 7, 8)],
        ),
        (
            "// 𝄪𝄪\r\nS | D5 E |\r\nB | G3 A |\r\n",
            [(1, 7, 8), (1, 7, 8)],
        ),
    ];
    for (text, expected) in cases {
        for (columns, (line, from, to)) in [Columns::Utf16, Columns::Utf8].into_iter().zip(expected)
        {
            let mut client = Client::start().introduced(capabilities(&[columns.name()]));
            let document = Document::open_in(&mut client, "file:///a.voices", text, columns);
            let findings = document.findings(&mut client);
            let found = findings.iter().find(|f| f["code"] == "parallel-fifths");
            let found = found.unwrap_or_else(|| panic!("{text}: {findings:?}"));
            assert_eq!(found["range"], range(line, from, to), "{text} {columns:?}");
            client.goodbye();
        }
    }
}

#[test]
fn what_cannot_be_read_is_a_finding_too() {
    let mut client = Client::ready();
    let document = Document::open(&mut client, "file:///a.voices", "S | G4 H4 | A |\n");
    assert_eq!(document.short(&mut client), ["reading 0:7-0:9"]);
    let findings = document.findings_of(&mut client, "reading");
    assert_eq!(findings[0]["severity"], 1);
    client.goodbye();
}

#[test]
fn a_document_too_large_for_a_sheet_is_told_so_once() {
    let mut client = Client::ready();
    let text = "S | G4 H4 |\n\n".repeat((partwright_sheet::LARGEST / 13) + 1);
    let mut document = Document::open(&mut client, "file:///large.voices", &text);
    let findings = document.findings(&mut client);
    assert_eq!(findings.len(), 1, "{:?}", findings.first());
    let message = findings[0]["message"].as_str().unwrap();
    assert!(message.contains("8 MiB"), "{message}");
    assert!(document.hover(&mut client, &json!({ "line": 9, "character": 4 }))["result"].is_null());
    // It is still kept in step, and read as soon as it is small enough.
    let end = document.text.len() - 13;
    document.edit(&mut client, 13..end, "");
    assert_eq!(document.short(&mut client).len(), 2);
    client.goodbye();
}
