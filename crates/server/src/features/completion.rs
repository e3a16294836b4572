//! `textDocument/completion`: the words of the notation, where each belongs.
//!
//! Answered from the text as it stands, without waiting for a check.

use std::ops::Range;

use partwright_rules::{FAMILIES, STYLES, catalogue};
use partwright_score::KINDS;
use partwright_sheet::Span;
use tower_lsp::lsp_types::{
    CompletionItem, CompletionItemKind, CompletionTextEdit, Position, TextEdit,
};

use crate::convert;
use crate::documents::Snapshot;
use crate::lines::{CHANGES, HEADERS, Kind, Line, line_at, lines, words};
use crate::names::declared;
use crate::session::Agreed;

/// Voice options, with what each means.
const OPTIONS: [(&str, &str); 7] = [
    ("easy", "where this singer is at ease: easy LOW..HIGH"),
    ("cantus", "the fixed voice"),
    ("species", "this voice's own species: species 1"),
    ("clef", "the clef: clef treble"),
    ("written", "a transposing part: written Bb"),
    ("doubles", "one voice with another: doubles LABEL"),
    ("sixteen-foot", "may sound an octave lower"),
];

const CLEFS: [&str; 7] = [
    "treble", "soprano", "mezzo", "alto", "tenor", "baritone", "bass",
];

const MODES: [&str; 9] = [
    "major",
    "minor",
    "ionian",
    "dorian",
    "phrygian",
    "lydian",
    "mixolydian",
    "aeolian",
    "locrian",
];

const METRES: [&str; 8] = ["2/2", "2/4", "3/2", "3/4", "4/4", "6/8", "9/8", "free"];

/// Characters behind which editors ask at once.
pub(crate) const TRIGGERS: [&str; 2] = ["*", "="];

/// A word that may stand at the cursor.
struct Word {
    text: String,
    detail: String,
    kind: CompletionItemKind,
}

fn word(text: impl Into<String>, detail: impl Into<String>, kind: CompletionItemKind) -> Word {
    Word {
        text: text.into(),
        detail: detail.into(),
        kind,
    }
}

/// The words for a position; `house` is the name of the house style.
pub(crate) fn complete(
    snapshot: &Snapshot,
    position: Position,
    house: impl FnOnce() -> Option<String>,
    agreed: Agreed,
) -> Vec<CompletionItem> {
    let text = snapshot.text.as_str();
    let offset = convert::offset(&snapshot.text, position, agreed.columns);
    let line = line_at(text, offset);
    if offset > line.comment || offset < line.span.start {
        return Vec::new();
    }
    let typed = typed(text, &line, offset);
    let found = candidates(text, &line, &typed, house);
    let range = convert::range(
        &snapshot.text,
        Span::new(typed.start, typed.end),
        agreed.columns,
    );
    let one = |(order, word): (usize, Word)| CompletionItem {
        label: word.text.clone(),
        kind: Some(word.kind),
        detail: Some(word.detail).filter(|detail| !detail.is_empty()),
        sort_text: Some(format!("{order:04}")),
        filter_text: Some(word.text.clone()),
        text_edit: Some(CompletionTextEdit::Edit(TextEdit {
            range,
            new_text: word.text,
        })),
        ..CompletionItem::default()
    };
    found.into_iter().enumerate().map(one).collect()
}

/// The word the cursor stands at the end of, as far as it is typed. In a row a mark or a copy
/// begins one.
fn typed(text: &str, line: &Line, offset: usize) -> Range<usize> {
    let before = text.get(line.span.start..offset).unwrap_or_default();
    let in_row = line.is_row() && before.contains('|');
    let begins = |(at, c): (usize, char)| match c {
        '*' | '=' if in_row => Some(at),
        '|' => Some(at + 1),
        c if c.is_whitespace() => Some(at + c.len_utf8()),
        _ => None,
    };
    let start = before.char_indices().rev().find_map(begins).unwrap_or(0);
    line.span.start + start..offset
}

fn candidates(
    text: &str,
    line: &Line,
    typed: &Range<usize>,
    house: impl FnOnce() -> Option<String>,
) -> Vec<Word> {
    let before = text.get(line.span.start..typed.start).unwrap_or_default();
    let so_far = text.get(typed.clone()).unwrap_or_default();
    if before.trim().is_empty() {
        return at_line_start(text, line, so_far);
    }
    let values: Vec<&str> = words(text, line.word.end..typed.start)
        .filter_map(|word| text.get(word))
        .collect();
    let last = values.last().copied();
    let plain = |list: &[&str], kind| list.iter().map(|w| word(*w, "", kind)).collect();
    let value = CompletionItemKind::VALUE;
    match (line.kind, text.get(line.word.clone()).unwrap_or_default()) {
        (Kind::Music, _) if so_far.starts_with('*') => marks(text, "footnote mark"),
        (Kind::Music, _) if so_far.starts_with('=') => labels(text, "=", "copy this voice's bar"),
        (Kind::Words, _) if !before.contains('|') => labels(text, "", "voice"),
        (Kind::Footnote, _) if values.is_empty() => {
            vec![word(
                "licence",
                "an exception, with its reason",
                CompletionItemKind::KEYWORD,
            )]
        }
        (Kind::Footnote, _) if !before.contains(':') => rules(),
        (Kind::Header, "licence" | "license") if !before.contains(':') => {
            let mut found = rules();
            found.extend(labels(text, "", "only this voice"));
            found
        }
        (Kind::Header, "style") if values.is_empty() => {
            let ours = STYLES.iter().map(|style| word(style.name(), "", value));
            let house = house().map(|name| word(name, "house style", value));
            ours.chain(house).collect()
        }
        (Kind::Header, "equal") => labels(text, "", "voice"),
        (Kind::Header, "metre" | "meter") if values.is_empty() => plain(&METRES, value),
        (Kind::Header, "key") if values.is_empty() => {
            vec![word(
                "none",
                "no key: rules that need one are silent",
                value,
            )]
        }
        (Kind::Header, "key") if values.len() == 1 => plain(&MODES, value),
        (Kind::Header, "voice") => match last {
            None => Vec::new(),
            Some("doubles") => labels(text, "", "voice"),
            Some("clef") => plain(&CLEFS, value),
            Some("species") => plain(&["1", "2", "3", "4", "5"], value),
            Some(_) => voice_words(&values),
        },
        _ => Vec::new(),
    }
}

fn at_line_start(text: &str, line: &Line, so_far: &str) -> Vec<Word> {
    if so_far.starts_with('*') {
        return marks(text, "footnote of this mark");
    }
    let keyword = CompletionItemKind::KEYWORD;
    let music = lines(text)
        .take_while(|other| other.span.start < line.span.start)
        .any(|other| other.is_row());
    let given = |name: &str| {
        let mut before = lines(text).take_while(|other| !other.is_row());
        before.any(|other| other.span != line.span && text.get(other.word) == Some(name))
    };
    let headers = HEADERS.iter().filter(|(name, _)| {
        if music {
            CHANGES.contains(name)
        } else {
            matches!(*name, "licence" | "voice") || !given(name)
        }
    });
    let headers = headers.map(|(name, what)| word(*name, *what, keyword));
    let under = [
        ("words", "text for a voice"),
        ("harmony", "the chords meant"),
        ("figures", "figured bass"),
    ];
    let under = under.map(|(name, what)| word(name, what, keyword));
    let labels = labels(text, "", "the next bars of this voice");
    labels.into_iter().chain(headers).chain(under).collect()
}

fn labels(text: &str, prefix: &str, detail: &str) -> Vec<Word> {
    let one = |label: &str| {
        word(
            format!("{prefix}{label}"),
            detail,
            CompletionItemKind::VARIABLE,
        )
    };
    declared(text).into_iter().map(one).collect()
}

/// The marks in the sheet, wherever they stand.
fn marks(text: &str, detail: &str) -> Vec<Word> {
    let mut found: Vec<&str> = Vec::new();
    let starts = text.match_indices('*').map(|(at, _)| at + 1);
    for letters in starts.filter_map(|at| text.get(at..)) {
        let length = letters
            .find(|c: char| !c.is_ascii_alphabetic())
            .unwrap_or(letters.len());
        let mark = letters.get(..length).filter(|mark| !mark.is_empty());
        if let Some(mark) = mark.filter(|mark| !found.contains(mark)) {
            found.push(mark);
        }
    }
    found.sort_unstable();
    let one = |mark: &str| word(format!("*{mark}"), detail, CompletionItemKind::REFERENCE);
    found.into_iter().map(one).collect()
}

/// The rules that can be licensed, and their families.
fn rules() -> Vec<Word> {
    let rules = catalogue().iter().filter(|entry| entry.id != "reading");
    let rules = rules.map(|e| {
        word(
            e.id.as_str(),
            e.page.title.as_str(),
            CompletionItemKind::VALUE,
        )
    });
    let families = FAMILIES
        .iter()
        .map(|name| word(*name, "a family of rules", CompletionItemKind::CLASS));
    rules.chain(families).collect()
}

/// Kinds directly behind the label, and the options that are not given yet.
fn voice_words(values: &[&str]) -> Vec<Word> {
    let kinds = KINDS.iter().filter(|_| values.len() == 1);
    let kinds = kinds.map(|kind| word(kind.name, "", CompletionItemKind::CLASS));
    let options = OPTIONS.iter().filter(|(name, _)| !values.contains(name));
    let options = options.map(|(name, what)| word(*name, *what, CompletionItemKind::KEYWORD));
    kinds.chain(options).collect()
}
