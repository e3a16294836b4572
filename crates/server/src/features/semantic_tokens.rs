//! `textDocument/semanticTokens/full`: what every word of a sheet is.
//!
//! Told from the lines alone, so that colours are there before a check is done.

use std::ops::Range;

use tower_lsp::lsp_types::{
    SemanticToken, SemanticTokenType, SemanticTokens, SemanticTokensFullOptions,
    SemanticTokensLegend, SemanticTokensOptions, SemanticTokensServerCapabilities,
};

use crate::lines::{Kind, Line, lines, words};
use crate::text::Columns;

/// What a token is; the numbers are the places in the legend.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[repr(u32)]
enum Token {
    /// The word of a header or of a row that is no voice's.
    Keyword,
    /// A voice's label.
    Label,
    /// A note.
    Note,
    /// `-`, `?`
    Hold,
    /// `_`
    Rest,
    /// `^`, `,`, `*a`
    Mark,
    /// Free text and syllables.
    Words,
    /// A value: a key, a chord, a rule's name.
    Value,
    /// A comment.
    Comment,
}

/// The types of the protocol that stand for ours, in the order of [`Token`]: editors have colours
/// for these.
const LEGEND: [SemanticTokenType; 9] = [
    SemanticTokenType::KEYWORD,
    SemanticTokenType::VARIABLE,
    SemanticTokenType::NUMBER,
    SemanticTokenType::OPERATOR,
    SemanticTokenType::REGEXP,
    SemanticTokenType::DECORATOR,
    SemanticTokenType::STRING,
    SemanticTokenType::TYPE,
    SemanticTokenType::COMMENT,
];

/// What is offered.
pub(crate) fn offer() -> SemanticTokensServerCapabilities {
    SemanticTokensOptions {
        legend: SemanticTokensLegend {
            token_types: LEGEND.to_vec(),
            token_modifiers: Vec::new(),
        },
        range: Some(false),
        full: Some(SemanticTokensFullOptions::Bool(true)),
        ..SemanticTokensOptions::default()
    }
    .into()
}

/// The tokens of a text.
pub(crate) fn tokens(text: &str, columns: Columns) -> SemanticTokens {
    let mut writer = Writer {
        text,
        columns,
        data: Vec::new(),
        lines: 0,
        last: 0,
    };
    for line in lines(text) {
        // A carriage return alone ends a line for the editor, though not for the sheet.
        writer.line(&line);
        match line.kind {
            Kind::Empty => {}
            Kind::Music => {
                writer.put(line.word.clone(), Token::Label);
                for cell in words(text, line.value()) {
                    cell_tokens(text, cell, &mut writer);
                }
            }
            Kind::Words => under(&line, Token::Label, Token::Words, &mut writer),
            Kind::Under => under(&line, Token::Value, Token::Value, &mut writer),
            Kind::Footnote => {
                writer.put(line.word.clone(), Token::Mark);
                licence(&line, &mut writer);
            }
            Kind::Header => header(&line, &mut writer),
            Kind::Other => {}
        }
        writer.put(line.comment..line.span.end, Token::Comment);
    }
    SemanticTokens {
        result_id: None,
        data: writer.data,
    }
}

fn under(line: &Line, head: Token, rest: Token, writer: &mut Writer<'_>) {
    writer.put(line.word.clone(), Token::Keyword);
    let text = writer.text;
    let before = line.head(text);
    for word in words(text, before.clone()) {
        writer.put(word, head);
    }
    for word in words(text, before.end..line.comment.max(before.end)) {
        writer.put(word, rest);
    }
}

fn header(line: &Line, writer: &mut Writer<'_>) {
    let text = writer.text;
    writer.put(line.word.clone(), Token::Keyword);
    match text.get(line.word.clone()).unwrap_or_default() {
        "title" | "subtitle" | "by" => {
            let value = line.value();
            let written = text.get(value.clone()).unwrap_or_default();
            let start = value.end - written.trim_start().len();
            writer.put(start..start + written.trim().len(), Token::Words);
        }
        "voice" => {
            for (place, word) in words(text, line.value()).enumerate() {
                writer.put(
                    word,
                    if place == 0 {
                        Token::Label
                    } else {
                        Token::Value
                    },
                );
            }
        }
        "licence" | "license" => {
            let names = line.value();
            names_and_reason(names, writer);
        }
        _ => words(text, line.value()).for_each(|word| writer.put(word, Token::Value)),
    }
}

fn licence(line: &Line, writer: &mut Writer<'_>) {
    let Some(word) = words(writer.text, line.value()).next() else {
        return;
    };
    writer.put(word.clone(), Token::Keyword);
    names_and_reason(word.end..line.comment.max(word.end), writer);
}

fn names_and_reason(value: Range<usize>, writer: &mut Writer<'_>) {
    let text = writer.text;
    let written = text.get(value.clone()).unwrap_or_default();
    let names = written.find(':').map_or(value.end, |at| value.start + at);
    for word in words(text, value.start..names) {
        writer.put(word, Token::Value);
    }
    let reason = text.get(names..value.end).unwrap_or_default();
    let reason = reason.strip_prefix(':').unwrap_or(reason);
    let start = value.end - reason.trim_start().len();
    writer.put(start..start + reason.trim().len(), Token::Words);
}

/// The parts of a cell, and the marks on them.
fn cell_tokens(text: &str, cell: Range<usize>, writer: &mut Writer<'_>) {
    let mut at = cell.start;
    for part in text.get(cell).unwrap_or_default().split('.') {
        let mark = part
            .char_indices()
            .skip(1)
            .find(|(_, c)| "^,*".contains(*c));
        let body = mark.map_or(part.len(), |(at, _)| at);
        let token = match part.get(..body).unwrap_or_default() {
            "-" | "?" => Token::Hold,
            "_" => Token::Rest,
            copy if copy.starts_with('=') => Token::Label,
            _ => Token::Note,
        };
        writer.put(at..at + body, token);
        writer.put(at + body..at + part.len(), Token::Mark);
        at += part.len() + 1;
    }
}

/// Writes tokens as the protocol packs them: each by its distance from the one before.
struct Writer<'a> {
    text: &'a str,
    columns: Columns,
    data: Vec<SemanticToken>,
    /// Lines begun since the last token.
    lines: u32,
    /// Where the last token, or the line, begins.
    last: usize,
}

impl Writer<'_> {
    fn line(&mut self, line: &Line) {
        let before = self
            .text
            .get(self.last..line.span.start)
            .unwrap_or_default();
        let ends = before.bytes().zip(before.bytes().skip(1).chain([b'\n']));
        // `\n`, and `\r` without one behind it.
        let ends = ends.filter(|(byte, next)| *byte == b'\n' || (*byte == b'\r' && *next != b'\n'));
        let count = u32::try_from(ends.count()).unwrap_or(u32::MAX);
        self.lines = self.lines.saturating_add(count);
        self.last = line.span.start;
        if self.lines == 0 && self.data.is_empty() {
            // A byte order mark is a character of the first line.
            self.last = 0;
        }
    }

    fn put(&mut self, span: Range<usize>, token: Token) {
        let (Some(between), Some(written)) = (
            self.text.get(self.last..span.start),
            self.text.get(span.clone()),
        ) else {
            return;
        };
        if written.is_empty() || written.contains('\r') || between.contains('\r') {
            return;
        }
        self.data.push(SemanticToken {
            delta_line: self.lines,
            delta_start: self.count(between),
            length: self.count(written),
            token_type: token as u32,
            token_modifiers_bitset: 0,
        });
        self.lines = 0;
        self.last = span.start;
    }

    fn count(&self, words: &str) -> u32 {
        let units = match self.columns {
            Columns::Utf8 => words.len(),
            Columns::Utf16 if words.is_ascii() => words.len(),
            Columns::Utf16 => words.encode_utf16().count(),
        };
        u32::try_from(units).unwrap_or(u32::MAX)
    }
}
