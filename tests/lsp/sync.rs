//! The text in the server is the text in the client.

use serde_json::json;

use crate::client::{Client, capabilities};
use crate::document::{Columns, Document, FIFTHS, long_sheet};

#[test]
fn edits_move_the_findings() {
    let mut client = Client::ready();
    let mut document = Document::open(&mut client, "file:///a.voices", FIFTHS);
    assert_eq!(document.short(&mut client), ["parallel-fifths 0:7-0:8"]);
    document.edit(&mut client, 0..0, "// first line\n");
    assert_eq!(document.short(&mut client), ["parallel-fifths 1:7-1:8"]);
    document.replace(&mut client, "D5 E", "D5  E");
    assert_eq!(document.short(&mut client), ["parallel-fifths 1:8-1:9"]);
    document.replace(&mut client, "G3 A", "G3 F");
    assert_eq!(document.short(&mut client), [""; 0], "contrary motion now");
    client.goodbye();
}

#[test]
fn a_batch_is_applied_in_its_order() {
    let mut client = Client::ready();
    let mut document = Document::open(&mut client, "file:///a.voices", "");
    let first = document.change(0..0, "S | D5 E |\n");
    let second = document.change(11..11, "B | G3 B |\n");
    let third = document.change(18..19, "A");
    let message = document.message(&[first, second, third]);
    client.send(&message);
    assert_eq!(document.text, FIFTHS);
    assert_eq!(document.short(&mut client), ["parallel-fifths 0:7-0:8"]);
    client.goodbye();
}

#[test]
fn the_whole_text_may_be_sent_again() {
    let mut client = Client::ready();
    let mut document = Document::open(&mut client, "file:///a.voices", "S | C4 |\n");
    document.text = FIFTHS.to_owned();
    let message = document.message(&[json!({ "text": FIFTHS })]);
    client.send(&message);
    assert_eq!(document.short(&mut client), ["parallel-fifths 0:7-0:8"]);
    // A whole text, and an edit of it, in one batch.
    document.text = "S | C4 |\n".to_owned();
    let change = document.change(9..9, "B | H3 |\n");
    let message = document.message(&[json!({ "text": "S | C4 |\n" }), change]);
    client.send(&message);
    assert_eq!(document.short(&mut client), ["reading 1:4-1:6"]);
    client.goodbye();
}

#[test]
fn an_empty_batch_is_a_version() {
    let mut client = Client::ready();
    let mut document = Document::open(&mut client, "file:///a.voices", FIFTHS);
    let message = document.message(&[]);
    client.send(&message);
    assert_eq!(document.short(&mut client), ["parallel-fifths 0:7-0:8"]);
    document.edit(&mut client, 5..5, "");
    assert_eq!(document.short(&mut client), ["parallel-fifths 0:7-0:8"]);
    client.goodbye();
}

#[test]
fn an_empty_document_has_nothing_to_say() {
    let mut client = Client::ready();
    let mut document = Document::open(&mut client, "file:///a.voices", "");
    assert!(document.findings(&mut client).is_empty());
    let answer = document.hover(&mut client, &json!({ "line": 0, "character": 0 }));
    assert!(answer["result"].is_null(), "{answer}");
    document.edit(&mut client, 0..0, FIFTHS);
    assert_eq!(document.short(&mut client), ["parallel-fifths 0:7-0:8"]);
    document.edit(&mut client, 0..FIFTHS.len(), "");
    assert!(document.findings(&mut client).is_empty());
    client.goodbye();
}

#[test]
fn bad_ranges_leave_the_text_as_it_was() {
    let mut client = Client::ready();
    let mut document = Document::open(&mut client, "file:///a.voices", &format!("// 𝄪\n{FIFTHS}"));
    document.findings(&mut client);
    let end = document.text.len();
    let good = json!({ "range": document.range(end..end), "text": "wibble\n" });
    let range = |a: [u32; 2], b: [u32; 2]| {
        let place = |[line, character]: [u32; 2]| json!({ "line": line, "character": character });
        json!({ "range": { "start": place(a), "end": place(b) }, "text": "H" })
    };
    let bad = [
        range([2, 3], [1, 0]),
        range([1, 5], [1, 2]),
        range([4_000_000_000, 0], [4_000_000_000, 4]),
        range([1, 0], [99, 0]),
        range([0, 4], [0, 5]),
    ];
    for bad in bad {
        for batch in [
            vec![bad.clone()],
            vec![good.clone(), bad.clone()],
            vec![bad.clone(), good.clone()],
        ] {
            let before = client.logged.len();
            let version = document.version;
            let message = document.message(&batch);
            client.send(&message);
            document.version = version;
            client.until(|client| client.logged.len() > before);
            let log = client.logged.last().unwrap();
            assert!(log.contains("file:///a.voices"), "{log}");
        }
    }
    document.version += 100;
    document.edit(&mut client, 0..0, "\n");
    assert_eq!(document.short(&mut client), ["parallel-fifths 2:7-2:8"]);
    let seen: Vec<_> = client
        .published
        .iter()
        .map(|p| p.version.unwrap())
        .collect();
    assert_eq!(
        seen,
        [1, document.version],
        "no version was published that was not taken over"
    );
    client.goodbye();
}

#[test]
fn places_past_the_end_of_a_line_or_just_past_the_text_are_those_ends() {
    let mut client = Client::ready();
    let mut document = Document::open(&mut client, "file:///a.voices", "S | D5 E |\r\nB | G3 A |");
    let far = json!({ "line": 0, "character": 4_000_000_000_u32 });
    let change = json!({ "range": { "start": far, "end": far }, "text": " H4 |" });
    let message = document.message(&[change]);
    client.send(&message);
    document.text.insert_str(10, " H4 |");
    let past = json!({ "line": 2, "character": 0 });
    let change = json!({ "range": { "start": past, "end": past }, "text": " H4" });
    let message = document.message(&[change]);
    client.send(&message);
    document.text.push_str(" H4");
    let fresh = Document::open(&mut client, "file:///b.voices", &document.text);
    let expected = fresh.short(&mut client);
    assert_eq!(document.short(&mut client), expected);
    client.goodbye();
}

#[test]
fn notifications_that_make_no_sense_are_logged_and_passed_over() {
    let mut client = Client::ready();
    let strange = "file:///strange.voices";
    let id = json!({ "uri": strange, "version": 2 });
    client.notify(
        "textDocument/didChange",
        json!({ "textDocument": id, "contentChanges": [] }),
    );
    client.notify(
        "textDocument/didClose",
        json!({ "textDocument": { "uri": strange } }),
    );
    client.notify("textDocument/didChange", json!({}));
    client.notify("textDocument/didOpen", json!(null));
    client.notify(
        "textDocument/didOpen",
        json!({ "textDocument": { "uri": "no uri", "languageId": "", "version": 1, "text": "" } }),
    );
    client.until(|client| client.logged.len() == 5);
    assert!(client.logged[0].contains(strange), "{:?}", client.logged);
    assert!(client.logged[1].contains(strange), "{:?}", client.logged);
    for method in [
        "textDocument/didOpen",
        "textDocument/didChange",
        "textDocument/didClose",
    ] {
        assert_eq!(
            client.error(method, json!({})),
            -32600,
            "{method} is no request"
        );
    }
    let answer = Document {
        uri: strange.to_owned(),
        version: 1,
        text: String::new(),
        columns: Columns::Utf16,
    }
    .hover(
        &mut client,
        &json!({ "line": 4_000_000_000_u32, "character": 0 }),
    );
    assert!(answer["result"].is_null(), "{answer}");
    assert!(client.published.is_empty());
    client.goodbye();
}

#[test]
fn two_documents_do_not_disturb_each_other() {
    let mut client = Client::ready();
    let mut one = Document::open(&mut client, "file:///one.voices", FIFTHS);
    let mut two = Document::open(&mut client, "untitled:Untitled-2", "S | H4 |\n");
    assert_eq!(one.short(&mut client), ["parallel-fifths 0:7-0:8"]);
    assert_eq!(two.short(&mut client), ["reading 0:4-0:6"]);
    for _ in 0..10 {
        one.edit(&mut client, 0..0, "\n");
        two.edit(&mut client, 0..0, "// two\n");
    }
    assert_eq!(one.short(&mut client), ["parallel-fifths 10:7-10:8"]);
    assert_eq!(two.short(&mut client), ["reading 10:4-10:6"]);
    one.close(&mut client);
    two.edit(&mut client, 0..0, "\n");
    assert_eq!(two.short(&mut client), ["reading 11:4-11:6"]);
    client.goodbye();
}

#[test]
fn closing_clears_and_opening_begins_anew() {
    let mut client = Client::ready();
    let mut document = Document::open(&mut client, "file:///a.voices", FIFTHS);
    document.findings(&mut client);
    document.close(&mut client);
    client.until(|client| client.published.len() == 2);
    assert!(client.published[1].diagnostics.is_empty());
    assert!(document.hover(&mut client, &document.at("E"))["result"].is_null());
    // Many editors begin at version 1 again.
    document.text = format!("\n{FIFTHS}");
    client.published.clear();
    document.opened(&mut client);
    assert_eq!(document.short(&mut client), ["parallel-fifths 1:7-1:8"]);
    // Opened twice is opened anew too.
    document.text = "S | H4 |\n".to_owned();
    document.version = 7;
    document.opened(&mut client);
    assert_eq!(document.short(&mut client), ["reading 0:4-0:6"]);
    client.goodbye();
}

#[test]
fn closing_amid_a_check_leaves_nothing_behind() {
    let mut client = Client::ready();
    let text = format!("{}S | H4 |\n", long_sheet(3000));
    for round in 0..5 {
        let document = Document::open(&mut client, "file:///a.voices", &text);
        if round > 2 {
            document.findings(&mut client);
        }
        document.close(&mut client);
    }
    let other = Document::open(&mut client, "file:///b.voices", FIFTHS);
    other.findings(&mut client);
    let last = client
        .published
        .iter()
        .rfind(|p| p.uri == "file:///a.voices")
        .unwrap();
    assert!(last.diagnostics.is_empty());
    client.goodbye();
}

#[test]
fn typing_publishes_the_right_version_each_time() {
    for columns in [Columns::Utf16, Columns::Utf8] {
        let mut client = Client::start().introduced(capabilities(&[columns.name()]));
        let mut document = Document::open_in(&mut client, "file:///a.voices", "", columns);
        for c in format!("title Été 𝄪\n\n{FIFTHS}").chars() {
            let end = document.text.len();
            document.edit(&mut client, end..end, &c.to_string());
            document.findings(&mut client);
        }
        assert_eq!(document.short(&mut client), ["parallel-fifths 2:7-2:8"]);
        let versions: Vec<_> = client
            .published
            .iter()
            .map(|p| p.version.unwrap())
            .collect();
        assert!(versions.is_sorted_by(|a, b| a < b), "{versions:?}");
        assert_eq!(versions.last(), Some(&document.version));
        client.goodbye();
    }
}

#[test]
fn a_burst_of_edits_is_published_as_one() {
    let mut client = Client::ready();
    let text = format!("{}{FIFTHS}", long_sheet(6000));
    let mut document = Document::open(&mut client, "file:///a.voices", &text);
    document.findings(&mut client);
    client.published.clear();
    let mut burst = Vec::new();
    for i in 0..50 {
        let change = document.change(0..0, if i % 2 == 0 { "//" } else { "\n" });
        burst.extend(Client::frame(&document.message(&[change])));
    }
    client.raw(&burst);
    let findings = document.findings(&mut client);
    client.is_there();
    let versions: Vec<_> = client
        .published
        .iter()
        .map(|p| p.version.unwrap())
        .collect();
    assert_eq!(versions.last(), Some(&document.version), "{versions:?}");
    assert!(versions.len() <= 5, "{versions:?}");
    let fresh = Document::open(&mut client, "file:///b.voices", &document.text);
    let ranges =
        |list: &[serde_json::Value]| list.iter().map(|f| f["range"].clone()).collect::<Vec<_>>();
    assert_eq!(ranges(&findings), ranges(&fresh.findings(&mut client)));
    client.goodbye();
}
