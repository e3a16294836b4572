//! After any edits the server knows the text the client has: what it finds and shows is what it
//! finds and shows in the same text opened afresh.

use serde_json::{Value, json};

use crate::client::{Client, capabilities};
use crate::document::{Columns, Document};

/// Splitmix64 (Steele, Lea and Flood 2014): the same numbers for the same seed everywhere.
struct Random(u64);

impl Random {
    fn below(&mut self, bound: usize) -> usize {
        self.0 = self.0.wrapping_add(0x9e37_79b9_7f4a_7c15);
        let mut z = self.0;
        z = (z ^ (z >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
        z = (z ^ (z >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
        ((z ^ (z >> 31)) % bound as u64) as usize
    }

    fn of<'a>(&mut self, list: &[&'a str]) -> &'a str {
        list[self.below(list.len())]
    }
}

const PIECES: &[&str] = &[
    "S | D5 E |\n",
    "B | G3 A |\n",
    "A | B4 C5 |\r\n",
    "\n",
    "\r\n",
    "\r",
    " ",
    "|",
    "| ",
    "F♯4",
    "C𝄪5",
    "B♭",
    "H4",
    "-",
    "_",
    "?",
    ".",
    "^",
    "D5.E",
    "// Été 𝄪\n",
    "title Hafen 𝄞 é\n",
    "style chorale\n",
    "metre 3/4\n",
    "x",
    "é",
    "𝄪",
    "voice S soprano\n",
    "||",
    "=S",
    "*a",
    "*a licence parallel-fifths: so\n",
    "\u{feff}",
    "B4 C\r\n",
    "5",
    "G",
];

/// Somewhere a position can name: at the end of the text, or before a character that does not
/// end a `\r\n`.
fn somewhere(random: &mut Random, text: &str) -> usize {
    let mut places: Vec<usize> = text.char_indices().map(|(at, _)| at).collect();
    places.push(text.len());
    loop {
        let at = places[random.below(places.len())];
        if !(text[..at].ends_with('\r') && text[at..].starts_with('\n')) {
            return at;
        }
    }
}

fn some_change(random: &mut Random, document: &mut Document) -> Value {
    if random.below(40) == 0 {
        document.text = format!("{}{}", random.of(PIECES), random.of(PIECES));
        return serde_json::json!({ "text": document.text });
    }
    let from = somewhere(random, &document.text);
    let mut to = if random.below(3) == 0 {
        somewhere(random, &document.text)
    } else {
        from
    };
    if to.abs_diff(from) > 12 {
        to = from;
    }
    let new = if random.below(4) == 0 {
        ""
    } else {
        random.of(PIECES)
    };
    document.change(from.min(to)..from.max(to), new)
}

/// Findings without the name of the document.
fn seen(findings: &[Value], uri: &str) -> Vec<String> {
    findings
        .iter()
        .map(|f| f.to_string().replace(uri, ""))
        .collect()
}

/// The two documents are the same to every feature that tells of a whole document, and every edit
/// that is offered can be made.
fn same_in_all(client: &mut Client, edited: &Document, fresh: &Document, seed: u64) {
    let text = &edited.text;
    let more = json!({
        "range": edited.range(0..text.len()),
        "options": { "tabSize": 4, "insertSpaces": true },
        "context": { "diagnostics": [] },
    });
    let methods = [
        "documentSymbol",
        "foldingRange",
        "semanticTokens/full",
        "inlayHint",
        "formatting",
        "codeAction",
    ];
    for method in methods {
        let mut ask = |document: &Document| {
            let result = document.ask(client, method, more.clone());
            // Edits are taken apart here, where their document is known.
            for action in result
                .as_array()
                .filter(|_| method == "codeAction")
                .unwrap_or(&vec![])
            {
                assert_ne!(&document.with_workspace(&action["edit"]), text, "{action}");
            }
            result.to_string().replace(&document.uri, "")
        };
        assert_eq!(ask(edited), ask(fresh), "{method} {seed} {text:?}");
    }
    let edits = edited.ask(client, "formatting", more.clone());
    let aligned = edited.with(edits.as_array().unwrap());
    assert_eq!(aligned, partwright_sheet::align(text), "{seed} {text:?}");
}

#[test]
fn after_any_edits_all_is_as_in_the_text_opened_afresh() {
    for columns in [Columns::Utf16, Columns::Utf8] {
        let mut all = capabilities(&[columns.name()]);
        let kinds = json!({ "codeActionKind": { "valueSet": ["quickfix"] } });
        all["textDocument"]["codeAction"] = json!({ "codeActionLiteralSupport": kinds });
        let mut client = Client::start().introduced(all);
        for seed in 0..40 {
            let mut random = Random(seed);
            let uri = format!("file:///edited-{seed}.voices");
            let mut document =
                Document::open_in(&mut client, &uri, "S | D5 E |\nB | G3 A |\n", columns);
            for _ in 0..25 {
                let size = 1 + random.below(3) * random.below(3);
                let changes: Vec<Value> = (0..size)
                    .map(|_| some_change(&mut random, &mut document))
                    .collect();
                let message = document.message(&changes);
                client.send(&message);
                if random.below(5) == 0 {
                    document.findings(&mut client);
                }
            }
            let fresh = Document::open_in(
                &mut client,
                &format!("file:///fresh-{seed}.voices"),
                &document.text,
                columns,
            );
            let (edited, anew) = (document.findings(&mut client), fresh.findings(&mut client));
            let text = &document.text;
            assert_eq!(
                seen(&edited, &document.uri),
                seen(&anew, &fresh.uri),
                "{columns:?} {seed} {text:?}"
            );
            for _ in 0..10 {
                let at = document.position(somewhere(&mut random, text));
                let (here, there) = (
                    document.hover(&mut client, &at),
                    fresh.hover(&mut client, &at),
                );
                assert_eq!(
                    here["result"], there["result"],
                    "{columns:?} {seed} {at} {text:?}"
                );
            }
            same_in_all(&mut client, &document, &fresh, seed);
            document.close(&mut client);
            fresh.close(&mut client);
        }
        assert!(client.logged.is_empty(), "{:?}", client.logged);
        client.goodbye();
    }
}
