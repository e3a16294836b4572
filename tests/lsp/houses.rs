//! House styles: found upwards, read again when they change, told when they are broken.

use std::fs;
use std::path::Path;
use std::time::{Duration, SystemTime};

use serde_json::{Value, json};

use crate::client::{Client, Publication, capabilities_and};
use crate::document::{Document, FIFTHS};

const OFF: &str =
    "[[rule]]\nrule = \"parallel-fifths\"\nseverity = \"off\"\nreason = \"our horns\"\n";
const REMARK: &str =
    "[[rule]]\nrule = \"parallel-fifths\"\nseverity = \"remark\"\nreason = \"our horns\"\n";

fn uri(path: &Path) -> String {
    format!("file://{}", path.display())
}

/// Writes a file so that its time tells that it changed, however fast the test is.
fn save(path: &Path, text: &str, age: u64) {
    fs::write(path, text).unwrap();
    let file = fs::File::options().append(true).open(path).unwrap();
    let time = SystemTime::UNIX_EPOCH + Duration::from_secs(1_000_000 + age);
    file.set_modified(time).unwrap();
}

/// A folder with a house style, and a sheet in a folder inside.
fn folder(house: &str) -> (tempfile::TempDir, std::path::PathBuf, String) {
    let folder = tempfile::tempdir().unwrap();
    let root = folder.path().canonicalize().unwrap();
    fs::create_dir(root.join("hymns")).unwrap();
    let file = root.join("partwright.toml");
    if !house.is_empty() {
        save(&file, house, 0);
    }
    let sheet = uri(&root.join("hymns/evensong.voices"));
    (folder, file, sheet)
}

/// Waits until the newest word on a document fits.
fn until(client: &mut Client, uri: &str, fits: impl Fn(&[Value]) -> bool) {
    let last = |p: &[Publication]| {
        p.iter()
            .rfind(|p| p.uri == uri)
            .map(|p| p.diagnostics.clone())
    };
    client.until(|client| last(&client.published).is_some_and(|d| fits(&d)));
}

fn severities(diagnostics: &[Value]) -> Vec<i64> {
    let fifths = diagnostics
        .iter()
        .filter(|d| d["code"] == "parallel-fifths");
    fifths.map(|d| d["severity"].as_i64().unwrap()).collect()
}

#[test]
fn the_nearest_house_style_holds() {
    let (_folder, file, sheet) = folder(OFF);
    let mut client = Client::ready();
    let document = Document::open(&mut client, &sheet, FIFTHS);
    assert_eq!(document.short(&mut client), [""; 0]);
    // Elsewhere it does not.
    let other = Document::open(&mut client, "file:///elsewhere/a.voices", FIFTHS);
    assert_eq!(other.short(&mut client).len(), 1);
    let untitled = Document::open(&mut client, "untitled:a", FIFTHS);
    assert_eq!(untitled.short(&mut client).len(), 1);
    drop(file);
    client.goodbye();
}

#[test]
fn a_change_is_seen_when_the_client_tells_of_it() {
    let watches = (
        "/workspace/didChangeWatchedFiles/dynamicRegistration",
        json!(true),
    );
    let (_folder, file, sheet) = folder(REMARK);
    let mut client = Client::start().introduced(capabilities_and(&[watches]));
    let asked = client.reply("client/registerCapability", Value::Null);
    let registration = &asked["registrations"][0];
    assert_eq!(registration["method"], "workspace/didChangeWatchedFiles");
    assert_eq!(
        registration["registerOptions"]["watchers"][0]["globPattern"],
        "**/*.toml"
    );
    Document::open(&mut client, &sheet, FIFTHS);
    until(&mut client, &sheet, |d| severities(d) == [3]);
    save(&file, OFF, 1);
    let change = json!({ "changes": [{ "uri": uri(&file), "type": 2 }] });
    client.notify("workspace/didChangeWatchedFiles", change.clone());
    until(&mut client, &sheet, |d| severities(d).is_empty());
    fs::remove_file(&file).unwrap();
    client.notify("workspace/didChangeWatchedFiles", change.clone());
    until(&mut client, &sheet, |d| severities(d) == [1]);
    // A nearer one, and what it includes.
    let near = file.with_file_name("hymns").join("partwright.toml");
    save(&file.with_file_name("common.toml"), REMARK, 2);
    save(&near, "include = [\"../common.toml\"]\n", 3);
    client.notify("workspace/didChangeWatchedFiles", change.clone());
    until(&mut client, &sheet, |d| severities(d) == [3]);
    save(&file.with_file_name("common.toml"), OFF, 4);
    client.notify("workspace/didChangeWatchedFiles", change);
    until(&mut client, &sheet, |d| severities(d).is_empty());
    client.goodbye();
}

#[test]
fn a_client_that_watches_nothing_has_it_seen_at_a_save() {
    let (_folder, file, sheet) = folder("");
    let mut client = Client::ready();
    let document = Document::open(&mut client, &sheet, FIFTHS);
    until(&mut client, &sheet, |d| severities(d) == [1]);
    save(&file, OFF, 1);
    client.notify("textDocument/didSave", document.about(json!({})));
    until(&mut client, &sheet, |d| severities(d).is_empty());
    assert!(client.asked.is_empty(), "{:?}", client.asked);
    client.goodbye();
}

#[test]
fn a_house_style_that_is_open_counts_as_it_stands_there() {
    let (_folder, file, sheet) = folder(REMARK);
    let mut client = Client::ready();
    Document::open(&mut client, &sheet, FIFTHS);
    until(&mut client, &sheet, |d| severities(d) == [3]);
    let mut house = Document::open(&mut client, &uri(&file), REMARK);
    house.replace(&mut client, "remark", "weakness");
    until(&mut client, &sheet, |d| severities(d) == [2]);
    assert!(house.findings(&mut client).is_empty());
    house.close(&mut client);
    until(&mut client, &sheet, |d| severities(d) == [3]);
    client.goodbye();
}

#[test]
fn a_broken_one_is_told_once_for_each_change() {
    let (_folder, file, sheet) = folder("base = \"choral\"\n");
    let mut client = Client::ready();
    let mut document = Document::open(&mut client, &sheet, FIFTHS);
    assert_eq!(document.short(&mut client).len(), 1, "its own style holds");
    client.until(|client| client.shown.len() == 1);
    let message = client.shown[0].clone();
    for words in ["partwright.toml:1:8", "choral", "chorale"] {
        assert!(message.contains(words), "{message}");
    }
    for _ in 0..5 {
        document.edit(&mut client, 0..0, "\n");
        document.findings(&mut client);
    }
    client.notify("textDocument/didSave", document.about(json!({})));
    client.is_there();
    assert_eq!(client.shown.len(), 1);
    save(&file, "base = \"motets\"\n", 1);
    client.notify("textDocument/didSave", document.about(json!({})));
    client.until(|client| client.shown.len() == 2);
    assert!(client.shown[1].contains("motets"), "{}", client.shown[1]);
    client.goodbye();
}

#[test]
fn a_broken_one_that_is_open_has_its_finding_there() {
    let (_folder, file, sheet) = folder(OFF);
    let mut client = Client::ready();
    Document::open(&mut client, &sheet, FIFTHS);
    until(&mut client, &sheet, |d| severities(d).is_empty());
    let text = format!("name = \"quay\" # é 𝄪\nbase = \"choral\"\n{OFF}");
    let mut house = Document::open(&mut client, &uri(&file), &text);
    let found = house.findings(&mut client);
    assert_eq!(found.len(), 1, "{found:?}");
    assert_eq!(house.words(&found[0]["range"]), "\"choral\"");
    assert_eq!(
        (found[0]["severity"].as_i64(), found[0]["source"].as_str()),
        (Some(1), Some("partwright"))
    );
    until(&mut client, &sheet, |d| severities(d) == [1]);
    house.replace(&mut client, "choral", "chorale");
    assert!(house.findings(&mut client).is_empty());
    until(&mut client, &sheet, |d| severities(d).is_empty());
    assert!(client.shown.is_empty(), "{:?}", client.shown);
    // Another program's TOML is none of ours.
    let foreign = Document::open(
        &mut client,
        &uri(&file.with_file_name("Cargo.toml")),
        "[package\n",
    );
    assert!(foreign.findings(&mut client).is_empty());
    client.goodbye();
}

#[test]
fn a_house_style_is_no_sheet() {
    let (_folder, file, _) = folder(OFF);
    let mut client = Client::ready();
    let house = Document::open(&mut client, &uri(&file), OFF);
    for method in [
        "foldingRange",
        "semanticTokens/full",
        "documentSymbol",
        "formatting",
    ] {
        let more = json!({ "options": { "tabSize": 4, "insertSpaces": true } });
        assert!(house.ask(&mut client, method, more).is_null(), "{method}");
    }
    client.goodbye();
}
