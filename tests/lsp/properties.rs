//! What must hold for any sheet, through the protocol.

use std::collections::BTreeMap;
use std::fs;
use std::path::Path;

use serde_json::{Value, json};

use crate::client::Client;
use crate::document::Document;

/// The demo scores, and the examples of the rules' pages.
fn sheets() -> Vec<String> {
    let root = Path::new(env!("CARGO_MANIFEST_DIR")).join("demo-scores");
    let mut files: Vec<_> = fs::read_dir(root)
        .into_iter()
        .flatten()
        .filter_map(|entry| Some(entry.ok()?.path()))
        .filter(|path| path.extension().is_some_and(|e| e == "voices"))
        .collect();
    files.sort();
    let scores = files.iter().map(|path| fs::read_to_string(path).unwrap());
    let examples = partwright_rules::catalogue().iter().flat_map(|entry| {
        let fails = entry.page.examples.iter().filter(|e| e.heading == "Fails");
        fails.map(|example| example.sheet.clone())
    });
    scores.chain(examples).collect()
}

/// Findings at or above weakness, counted, by rule and place in the music as the message has it:
/// places in the text move when a figure is written.
fn counted(findings: &[Value]) -> BTreeMap<String, usize> {
    let mut counts = BTreeMap::new();
    for finding in findings.iter().filter(|f| f["severity"].as_i64() < Some(3)) {
        let line = &finding["range"]["start"]["line"];
        *counts
            .entry(format!("{} {line}", finding["code"]))
            .or_default() += 1;
    }
    counts
}

#[test]
fn every_mend_removes_its_finding_and_brings_none() {
    let mut client = crate::actions::client(&[]);
    let (mut tried, mut with) = (0, 0);
    for (number, text) in sheets().iter().enumerate() {
        let mut document = Document::open(&mut client, &format!("file:///{number}.voices"), text);
        let findings = document.findings(&mut client);
        let before = counted(&findings);
        for finding in &findings {
            let at = document.offset(&finding["range"]["start"]);
            let context = json!({ "only": ["quickfix"] });
            let actions = document.actions_in(&mut client, at..at, context);
            let mends = actions.iter().filter(|action| {
                let title = action["title"].as_str().unwrap();
                let about = action["diagnostics"].as_array().unwrap();
                title.starts_with("Move ") && about.contains(finding)
            });
            let edits: Vec<Value> = mends.map(|mend| mend["edit"].clone()).collect();
            with += usize::from(!edits.is_empty());
            for edit in edits.iter().take(2) {
                let new = document.with_workspace(edit);
                document.become_text(&mut client, &new);
                let after = counted(&document.findings(&mut client));
                let key = format!("{} {}", finding["code"], finding["range"]["start"]["line"]);
                if finding["severity"].as_i64() < Some(3) {
                    let left = after.get(&key).copied().unwrap_or(0);
                    assert!(left < before[&key], "{key} stays in {new}");
                }
                for (key, count) in &after {
                    let known = before.get(key).copied().unwrap_or(0);
                    assert!(*count <= known, "{key} is new in {new}");
                }
                document.become_text(&mut client, text);
                tried += 1;
            }
        }
        document.close(&mut client);
    }
    assert!(
        with > 20 && tried > 20,
        "{with} findings had mends, {tried} were tried"
    );
    client.goodbye();
}

#[test]
fn every_licence_lifts_its_finding() {
    let mut client = crate::actions::client(&[]);
    let mut tried = 0;
    for (number, text) in sheets().iter().enumerate() {
        let mut document = Document::open(&mut client, &format!("file:///{number}.voices"), text);
        let findings = document.findings(&mut client);
        let count = |findings: &[Value], code: &Value| {
            findings.iter().filter(|f| f["code"] == *code).count()
        };
        for finding in &findings {
            let at = document.offset(&finding["range"]["start"]);
            let actions = document.actions_in(&mut client, at..at, json!({}));
            let title = format!("Grant a licence for {}", finding["code"].as_str().unwrap());
            let grant = actions.iter().find(|a| {
                a["title"] == title.as_str() && a["diagnostics"][0]["range"] == finding["range"]
            });
            let Some(grant) = grant else { continue };
            let new = document.with_workspace(&grant["edit"]);
            document.become_text(&mut client, &new);
            let after = document.findings(&mut client);
            let code = &finding["code"];
            assert!(
                count(&after, code) < count(&findings, code),
                "{code} stays in {new}"
            );
            for code in ["reading", "licence-idle"].map(|code| json!(code)) {
                assert!(
                    count(&after, &code) <= count(&findings, &code),
                    "{code} in {new}"
                );
            }
            document.become_text(&mut client, text);
            tried += 1;
        }
        document.close(&mut client);
    }
    assert!(tried > 20, "{tried} were tried");
    client.goodbye();
}

#[test]
fn a_rename_and_the_rename_back_leave_the_sheet_as_it_was() {
    let mut client = Client::ready();
    let mut tried = 0;
    for (number, text) in sheets().iter().enumerate() {
        let mut document = Document::open(&mut client, &format!("file:///{number}.voices"), text);
        let rows = text.match_indices(" |").map(|(at, _)| at);
        let rows: Vec<usize> = rows
            .filter(|&at| {
                text[..at]
                    .rfind('\n')
                    .is_none_or(|n| !text[n..at].contains('|'))
            })
            .collect();
        for &at in rows.iter().take(6) {
            let ask = |client: &mut Client, document: &Document, new: &str| {
                let more = json!({ "position": document.position(at), "newName": new });
                client.request("textDocument/rename", document.about(more))
            };
            let more = json!({ "position": document.position(at) });
            let old = document.ask(&mut client, "prepareRename", more);
            let Some(old) = old["placeholder"].as_str().map(str::to_owned) else {
                continue;
            };
            // As long as the old one, so that the place is the same afterwards.
            let new = "Q".repeat(old.len());
            let there = ask(&mut client, &document, &new);
            let renamed = document.with_workspace(&there["result"]);
            assert_ne!(&renamed, text);
            document.become_text(&mut client, &renamed);
            let back = ask(&mut client, &document, &old);
            assert_eq!(&document.with_workspace(&back["result"]), text);
            document.become_text(&mut client, text);
            tried += 1;
        }
        document.close(&mut client);
    }
    assert!(tried > 20, "{tried} were tried");
    client.goodbye();
}
