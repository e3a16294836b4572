//! Code actions: mends, right forms, licences.

use serde_json::{Value, json};

use crate::client::{Client, capabilities_and};
use crate::document::{Document, FIFTHS};

/// A client that shows actions; with more capabilities.
pub(crate) fn client(more: &[(&str, Value)]) -> Client {
    let mut all = vec![(
        "/textDocument/codeAction/codeActionLiteralSupport",
        json!({ "codeActionKind": { "valueSet": ["quickfix", "source"] } }),
    )];
    all.extend_from_slice(more);
    Client::start().introduced(capabilities_and(&all))
}

fn titles(actions: &[Value]) -> Vec<&str> {
    actions
        .iter()
        .map(|action| action["title"].as_str().unwrap())
        .collect()
}

fn of_kind<'a>(actions: &'a [Value], start: &str) -> Vec<&'a Value> {
    let title = |action: &Value| action["title"].as_str().unwrap().starts_with(start);
    actions.iter().filter(|action| title(action)).collect()
}

#[test]
fn the_best_mend_is_preferred_and_removes_its_finding() {
    let mut client = client(&[]);
    let mut document = Document::open(&mut client, "file:///a.voices", FIFTHS);
    let actions = document.actions(&mut client, "E |", json!({}));
    let mends = of_kind(&actions, "Move ");
    assert!(!mends.is_empty(), "{actions:?}");
    for (order, mend) in mends.iter().enumerate() {
        assert_eq!(mend["kind"], "quickfix");
        assert_eq!(mend["isPreferred"] == true, order == 0, "{mend}");
        assert_eq!(mend["diagnostics"][0]["code"], "parallel-fifths");
        assert_eq!(mend["diagnostics"][0]["range"], document.range(7..8));
    }
    // The client takes no versions of edits.
    assert!(mends[0]["edit"]["changes"].is_object());
    let new = document.with_workspace(&mends[0]["edit"]);
    document.become_text(&mut client, &new);
    assert_eq!(document.short(&mut client), [""; 0]);
    client.goodbye();
}

#[test]
fn nothing_is_offered_away_from_a_finding() {
    let mut client = client(&[]);
    let document = Document::open(&mut client, "file:///a.voices", FIFTHS);
    let at = FIFTHS.find("G3").unwrap();
    assert_eq!(
        titles(&document.actions_in(&mut client, at..at + 1, json!({}))),
        [""; 0]
    );
    let all = document.actions_in(&mut client, 0..FIFTHS.len(), json!({}));
    assert!(!of_kind(&all, "Move ").is_empty());
    client.goodbye();
}

#[test]
fn only_the_kinds_asked_for() {
    let mut client = client(&[]);
    let text = "licence spacing: so\n\nS | D5 E |\nB | G3 A |\n";
    let document = Document::open(&mut client, "file:///a.voices", text);
    let whole = 0..text.len();
    let kinds = |client: &mut Client, only: Value| -> Vec<String> {
        let found = document.actions_in(client, whole.clone(), json!({ "only": only }));
        let mut kinds: Vec<String> = found
            .iter()
            .map(|a| a["kind"].as_str().unwrap().to_owned())
            .collect();
        kinds.dedup();
        kinds
    };
    assert_eq!(kinds(&mut client, json!(["quickfix"])), ["quickfix"]);
    assert_eq!(kinds(&mut client, json!(["source"])), ["source.fixAll"]);
    assert_eq!(
        kinds(&mut client, json!(["source.fixAll"])),
        ["source.fixAll"]
    );
    assert_eq!(
        kinds(&mut client, json!([""])),
        ["quickfix", "source.fixAll"]
    );
    assert_eq!(kinds(&mut client, json!(["refactor", "quick"])), [""; 0]);
    // Fixing all is about the whole sheet: it is there only where it is asked for.
    let unasked = document.actions_in(&mut client, whole.clone(), json!({}));
    assert!(unasked.len() > 1 && unasked.iter().all(|a| a["kind"] == "quickfix"));
    client.goodbye();
}

#[test]
fn edits_come_with_the_version_where_the_client_takes_it() {
    let mut client = client(&[("/workspace/workspaceEdit/documentChanges", json!(true))]);
    let mut document = Document::open(&mut client, "file:///a.voices", FIFTHS);
    document.edit(&mut client, 0..0, "\n");
    let actions = document.actions(&mut client, "E |", json!({}));
    let edit = &of_kind(&actions, "Move ")[0]["edit"];
    assert_eq!(edit["documentChanges"][0]["textDocument"]["version"], 2);
    assert!(edit.get("changes").is_none());
    assert_ne!(document.with_workspace(edit), document.text);
    client.goodbye();
}

fn resolving() -> Client {
    client(&[
        ("/textDocument/codeAction/dataSupport", json!(true)),
        (
            "/textDocument/codeAction/resolveSupport",
            json!({ "properties": ["edit"] }),
        ),
    ])
}

#[test]
fn an_edit_comes_when_its_action_is_chosen() {
    let mut client = resolving();
    let mut document = Document::open(&mut client, "file:///a.voices", FIFTHS);
    let actions = document.actions(&mut client, "E |", json!({}));
    let mend = of_kind(&actions, "Move ")[0].clone();
    assert!(mend.get("edit").is_none(), "{mend}");
    let answer = client.request("codeAction/resolve", mend.clone());
    let resolved = &answer["result"];
    assert_eq!(resolved["title"], mend["title"]);
    let new = document.with_workspace(&resolved["edit"]);
    document.become_text(&mut client, &new);
    assert_eq!(document.short(&mut client), [""; 0]);
    // What was offered for a text that is no more is refused.
    assert_eq!(client.error("codeAction/resolve", mend), -32801);
    let foreign = json!({ "title": "x", "data": { "any": 1 } });
    assert_eq!(client.error("codeAction/resolve", foreign), -32602);
    client.goodbye();
}

#[test]
fn a_licence_lifts_its_finding() {
    for text in [
        FIFTHS,
        "S | D5 E^ |\r\nB | G3 A |\r\n\r\nS | G4 |",
        "S | D5*a E |\nB | G3 A |\n*a licence line: so",
    ] {
        let mut client = client(&[]);
        let mut document = Document::open(&mut client, "file:///a.voices", text);
        let actions = document.actions(&mut client, "E", json!({}));
        let grants = of_kind(&actions, "Grant a licence for parallel-fifths");
        assert_eq!(grants.len(), 1, "{actions:?}");
        assert!(grants[0].get("isPreferred").is_none());
        assert!(
            grants[0].get("command").is_none(),
            "the client shows no documents"
        );
        let new = document.with_workspace(&grants[0]["edit"]);
        assert!(new.contains(" licence parallel-fifths: why"), "{new}");
        assert_eq!(new.contains("\r\n"), text.contains("\r\n"));
        document.become_text(&mut client, &new);
        assert_eq!(document.short(&mut client), [""; 0], "{new}");
        client.goodbye();
    }
}

#[test]
fn the_reason_of_a_new_licence_is_selected() {
    let mut client = client(&[("/window/showDocument/support", json!(true))]);
    let text = "title Été 𝄪\n\nS | D5 E |\nB | G3 A |\n// 𝄪\n\nS | G4 |\n";
    let mut document = Document::open(&mut client, "file:///a.voices", text);
    let actions = document.actions(&mut client, "E |", json!({}));
    let grant = of_kind(&actions, "Grant ")[0].clone();
    let new = document.with_workspace(&grant["edit"]);
    document.become_text(&mut client, &new);
    let command = &grant["command"];
    let params = json!({ "command": command["command"], "arguments": command["arguments"] });
    let answer = client.request("workspace/executeCommand", params);
    assert!(
        answer["result"].is_null() && answer.get("error").is_none(),
        "{answer}"
    );
    let shown = client.reply("window/showDocument", json!({ "success": true }));
    assert_eq!(shown["uri"], document.uri);
    assert_eq!(shown["takeFocus"], true);
    assert_eq!(document.words(&shown["selection"]), "why");
    let unknown = json!({ "command": "partwright.none" });
    assert_eq!(client.error("workspace/executeCommand", unknown), -32602);
    client.goodbye();
}

#[test]
fn an_idle_licence_is_removed() {
    let mut client = client(&[]);
    let text = "S | G4*a A |\n*a licence parallel-fifths: so\n\nS | G4 A |\n";
    let mut document = Document::open(&mut client, "file:///a.voices", text);
    assert_eq!(document.findings_of(&mut client, "licence-idle").len(), 1);
    let actions = document.actions(&mut client, "*a A", json!({}));
    let [remove] = &of_kind(&actions, "Remove this licence")[..] else {
        panic!("{actions:?}")
    };
    assert_eq!(remove["isPreferred"], true);
    let new = document.with_workspace(&remove["edit"]);
    assert_eq!(new, "S | G4 A |\n\nS | G4 A |\n");
    document.become_text(&mut client, &new);
    assert!(
        document
            .findings(&mut client)
            .iter()
            .all(|f| f["code"] != "licence-idle" && f["code"] != "reading")
    );
    client.goodbye();
}

#[test]
fn a_doubtful_octave_has_two_readings_and_none_is_preferred() {
    let mut client = client(&[]);
    let text = "S | B4 C |\n";
    let document = Document::open(&mut client, "file:///a.voices", text);
    let actions = document.actions(&mut client, "C |", json!({ "only": ["quickfix"] }));
    let new: Vec<String> = of_kind(&actions, "Write ")
        .iter()
        .map(|action| {
            assert!(action.get("isPreferred").is_none(), "{action}");
            document.with_workspace(&action["edit"])
        })
        .collect();
    assert_eq!(new, ["S | B4 C4 |\n", "S | B4 C5 |\n"]);
    client.goodbye();
}

#[test]
fn what_cannot_be_read_has_its_right_form() {
    let mut client = client(&[]);
    let document = Document::open(&mut client, "file:///a.voices", "S | G4 H4 |\n");
    let actions = document.actions(&mut client, "H4", json!({}));
    assert_eq!(titles(&actions), ["Write B4"]);
    assert_eq!(
        document.with_workspace(&actions[0]["edit"]),
        "S | G4 B4 |\n"
    );
    assert_eq!(actions[0]["isPreferred"], true);
    client.goodbye();
}

#[test]
fn fix_all_changes_writing_only() {
    let mut client = client(&[]);
    let text =
        "titel Quay\nlicence spacing: so\n\nS | B4 C H4 |\nB | G3*a A |\n*a licence line: so\n";
    let document = Document::open(&mut client, "file:///a.voices", text);
    let actions = document.actions_in(&mut client, 0..0, json!({ "only": ["source.fixAll"] }));
    let [fix] = &actions[..] else {
        panic!("{actions:?}")
    };
    // H4 sounds or it does not: that is no matter of writing alone.
    assert_eq!(
        document.with_workspace(&fix["edit"]),
        "title Quay\n\nS | B4 C4 H4 |\nB | G3 A |\n"
    );
    client.goodbye();
}

#[test]
fn a_licensed_finding_is_not_published_and_has_no_actions() {
    let mut client = client(&[]);
    let text = "S | D5 E*a |\nB | G3 A |\n*a licence parallel-fifths: the horns\n";
    let document = Document::open(&mut client, "file:///a.voices", text);
    assert_eq!(document.short(&mut client), [""; 0]);
    let actions = document.actions(&mut client, "E*a", json!({}));
    assert_eq!(
        of_kind(&actions, "Move ").len()
            + of_kind(&actions, "Grant a licence for parallel-fifths").len(),
        0
    );
    client.goodbye();
}

#[test]
fn a_client_that_knows_only_commands_gets_no_actions() {
    let mut client = Client::start().introduced(json!({}));
    let document = Document::open(&mut client, "file:///a.voices", FIFTHS);
    assert_eq!(
        titles(&document.actions(&mut client, "E |", json!({}))),
        [""; 0]
    );
    client.goodbye();
}
