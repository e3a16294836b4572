//! A document as the client keeps it.

use std::ops::Range;

use serde_json::{Value, json};

use crate::client::Client;

/// Two voices in parallel fifths: the finding stands on the soprano's E.
pub(crate) const FIFTHS: &str = "S | D5 E |\nB | G3 A |\n";

/// What columns count.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Columns {
    Utf8,
    Utf16,
}

impl Columns {
    pub(crate) fn name(self) -> &'static str {
        match self {
            Columns::Utf8 => "utf-8",
            Columns::Utf16 => "utf-16",
        }
    }

    pub(crate) fn count(self, text: &str) -> usize {
        match self {
            Columns::Utf8 => text.len(),
            Columns::Utf16 => text.encode_utf16().count(),
        }
    }
}

pub(crate) struct Document {
    pub(crate) uri: String,
    pub(crate) version: i64,
    pub(crate) text: String,
    pub(crate) columns: Columns,
}

impl Document {
    /// Opened.
    pub(crate) fn open(client: &mut Client, uri: &str, text: &str) -> Document {
        Document::open_in(client, uri, text, Columns::Utf16)
    }

    pub(crate) fn open_in(
        client: &mut Client,
        uri: &str,
        text: &str,
        columns: Columns,
    ) -> Document {
        let document = Document {
            uri: uri.to_owned(),
            version: 1,
            text: text.to_owned(),
            columns,
        };
        document.opened(client);
        document
    }

    pub(crate) fn opened(&self, client: &mut Client) {
        let Document {
            uri, version, text, ..
        } = self;
        let item =
            json!({ "uri": uri, "languageId": "voicesheet", "version": version, "text": text });
        client.notify("textDocument/didOpen", json!({ "textDocument": item }));
    }

    pub(crate) fn close(&self, client: &mut Client) {
        client.notify(
            "textDocument/didClose",
            json!({ "textDocument": { "uri": self.uri } }),
        );
    }

    /// The position of a byte offset, line ends as the protocol has them.
    pub(crate) fn position(&self, offset: usize) -> Value {
        let before = &self.text[..offset];
        let ends = before.replace("\r\n", "\n").replace('\r', "\n");
        let line = before.rfind(['\n', '\r']).map_or(0, |at| at + 1);
        json!({
            "line": ends.matches('\n').count(),
            "character": self.columns.count(&before[line..]),
        })
    }

    /// Where some words stand for the first time.
    pub(crate) fn at(&self, words: &str) -> Value {
        self.position(self.text.find(words).unwrap())
    }

    pub(crate) fn range(&self, range: Range<usize>) -> Value {
        json!({ "start": self.position(range.start), "end": self.position(range.end) })
    }

    /// One change here: gives its form for the server.
    pub(crate) fn change(&mut self, range: Range<usize>, new: &str) -> Value {
        let change = json!({ "range": self.range(range.clone()), "text": new });
        self.text.replace_range(range, new);
        change
    }

    /// The message that carries changes, as the next version.
    pub(crate) fn message(&mut self, changes: &[Value]) -> Value {
        self.version += 1;
        json!({ "jsonrpc": "2.0", "method": "textDocument/didChange", "params": {
            "textDocument": { "uri": self.uri, "version": self.version },
            "contentChanges": changes,
        }})
    }

    /// One change, here and there.
    pub(crate) fn edit(&mut self, client: &mut Client, range: Range<usize>, new: &str) {
        let change = self.change(range, new);
        let message = self.message(&[change]);
        client.send(&message);
    }

    /// Replaces the first place where some words stand.
    pub(crate) fn replace(&mut self, client: &mut Client, old: &str, new: &str) {
        let at = self.text.find(old).unwrap();
        self.edit(client, at..at + old.len(), new);
    }

    /// The findings of the version as it is now.
    pub(crate) fn findings(&self, client: &mut Client) -> Vec<Value> {
        client.findings(&self.uri, self.version)
    }

    /// The findings of one rule, for the version as it is now.
    pub(crate) fn findings_of(&self, client: &mut Client, rule: &str) -> Vec<Value> {
        let mut findings = self.findings(client);
        findings.retain(|finding| finding["code"] == rule);
        findings
    }

    /// What the two rules find that these tests go by, in short: `parallel-fifths 0:7-0:8`. Other
    /// rules may find something too.
    pub(crate) fn short(&self, client: &mut Client) -> Vec<String> {
        let place = |p: &Value| format!("{}:{}", p["line"], p["character"]);
        let short = |f: &Value| {
            let (start, end) = (place(&f["range"]["start"]), place(&f["range"]["end"]));
            format!("{} {start}-{end}", f["code"].as_str().unwrap_or("none"))
        };
        let ours = |f: &&Value| f["code"] == "parallel-fifths" || f["code"] == "reading";
        self.findings(client)
            .iter()
            .filter(ours)
            .map(short)
            .collect()
    }

    /// A request about this document: its result.
    pub(crate) fn ask(&self, client: &mut Client, method: &str, more: Value) -> Value {
        let answer = client.request(&format!("textDocument/{method}"), self.about(more));
        assert!(answer.get("error").is_none(), "{method}: {answer}");
        answer["result"].clone()
    }

    /// The parameters of a request about this document.
    pub(crate) fn about(&self, mut more: Value) -> Value {
        more["textDocument"] = json!({ "uri": self.uri });
        more
    }

    /// The byte offset of a position of the server's, which must be one of this text.
    pub(crate) fn offset(&self, position: &Value) -> usize {
        let (line, column) = (position["line"].as_u64(), position["character"].as_u64());
        let bytes = self.text.as_bytes();
        let ends = (0..bytes.len()).filter(|&at| {
            bytes[at] == b'\n' || (bytes[at] == b'\r' && bytes.get(at + 1) != Some(&b'\n'))
        });
        let mut starts = std::iter::once(0).chain(ends.map(|at| at + 1));
        let start = starts.nth(usize::try_from(line.unwrap()).unwrap());
        let start = start.unwrap_or_else(|| panic!("{position} in {:?}", self.text));
        let rest = &self.text[start..];
        let length = rest.find(['\r', '\n']).unwrap_or(rest.len());
        let mut places = rest[..length]
            .char_indices()
            .map(|(at, _)| at)
            .chain([length]);
        let column = usize::try_from(column.unwrap()).unwrap();
        let at = places.find(|&at| self.columns.count(&rest[..at]) == column);
        start + at.unwrap_or_else(|| panic!("{position} in {:?}", self.text))
    }

    /// What stands in a range of the server's.
    pub(crate) fn words(&self, range: &Value) -> &str {
        &self.text[self.offset(&range["start"])..self.offset(&range["end"])]
    }

    /// The text with edits of the server's made.
    pub(crate) fn with(&self, edits: &[Value]) -> String {
        let mut edits: Vec<(usize, usize, &str)> = edits
            .iter()
            .map(|edit| {
                let range = &edit["range"];
                let (start, end) = (self.offset(&range["start"]), self.offset(&range["end"]));
                (start, end, edit["newText"].as_str().unwrap())
            })
            .collect();
        edits.sort_by_key(|edit| (edit.0, edit.1));
        let ends = edits.iter().skip(1).map(|edit| edit.0);
        assert!(
            edits.iter().zip(ends).all(|(edit, next)| edit.1 <= next),
            "edits overlap"
        );
        let mut text = self.text.clone();
        for (start, end, new) in edits.into_iter().rev() {
            text.replace_range(start..end, new);
        }
        text
    }

    /// The text with a workspace edit made, which must be about this document alone.
    pub(crate) fn with_workspace(&self, edit: &Value) -> String {
        let edits = match edit["documentChanges"].as_array() {
            Some(changes) => {
                assert_eq!(changes.len(), 1);
                let of = json!({ "uri": self.uri, "version": self.version });
                assert_eq!(changes[0]["textDocument"], of);
                &changes[0]["edits"]
            }
            None => {
                assert_eq!(edit["changes"].as_object().unwrap().len(), 1);
                &edit["changes"][&self.uri]
            }
        };
        self.with(edits.as_array().unwrap())
    }

    /// Becomes another text, here and there.
    pub(crate) fn become_text(&mut self, client: &mut Client, text: &str) {
        let all = 0..self.text.len();
        self.edit(client, all, text);
    }

    /// The code actions at the first place where some words stand.
    pub(crate) fn actions(&self, client: &mut Client, words: &str, context: Value) -> Vec<Value> {
        let at = self.text.find(words).unwrap();
        self.actions_in(client, at..at, context)
    }

    /// The code actions in a range.
    pub(crate) fn actions_in(
        &self,
        client: &mut Client,
        range: Range<usize>,
        mut context: Value,
    ) -> Vec<Value> {
        context["diagnostics"] = json!([]);
        let params = json!({ "range": self.range(range), "context": context });
        let result = self.ask(client, "codeAction", params);
        result.as_array().unwrap().clone()
    }

    pub(crate) fn hover(&self, client: &mut Client, position: &Value) -> Value {
        let params = json!({ "textDocument": { "uri": self.uri }, "position": position });
        client.request("textDocument/hover", params)
    }

    /// The text of a hover on the first place where some words stand.
    pub(crate) fn hover_text(&self, client: &mut Client, words: &str) -> String {
        let answer = self.hover(client, &self.at(words));
        let text = answer["result"]["contents"]["value"].as_str();
        text.unwrap_or_else(|| panic!("{words}: {answer}"))
            .to_owned()
    }
}

/// A long sheet without findings: that many lines.
pub(crate) fn long_sheet(lines: usize) -> String {
    "S | G4 A B G |\nB | G3 F E G |\n\n".repeat(lines / 3)
}
