//! Arbitrary and mutated sheets: reading never fails, never looks outside the text, and reading
//! again after an edit gives the same as reading afresh.

#![allow(clippy::unwrap_used, clippy::panic)]

use std::fs;
use std::path::Path;
use std::sync::LazyLock;

use partwright_score::{Sound, ZERO};
use partwright_sheet::{Reading, Sheet};
use proptest::prelude::*;

/// The sheets of the cases, to be damaged.
static SHEETS: LazyLock<Vec<String>> = LazyLock::new(|| {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("../../grammar/cases");
    let mut files: Vec<_> = fs::read_dir(folder)
        .unwrap()
        .map(|entry| entry.unwrap().path())
        .filter(|path| path.extension().is_some_and(|end| end == "cases"))
        .collect();
    files.sort();
    let mut sheets = Vec::new();
    for file in files {
        let text = fs::read_to_string(file).unwrap();
        for case in text.split("\n=== ") {
            let sheet = case.split("\n--- ").next().unwrap_or_default();
            let sheet = sheet.split_once('\n').map_or("", |(_, sheet)| sheet);
            sheets.push(format!("{sheet}\n"));
        }
    }
    sheets
});

/// What sheets are made of, good and bad.
const PIECES: [&str; 78] = [
    "S",
    "A",
    "B",
    "S1",
    "|",
    "||",
    " | ",
    " | ",
    "\n",
    "\n",
    "\n\n",
    "\r\n",
    " ",
    " ",
    "\t",
    "\u{a0}",
    "G4",
    "A4 ",
    "F#",
    "Bb3",
    "B♭",
    "C𝄪5",
    "-",
    " - ",
    "_",
    " _ ",
    "?",
    ".",
    ".",
    "^",
    ",",
    "*a",
    "*",
    "=S",
    "=S-8",
    "=B+8",
    "=A",
    "H4",
    "Fis",
    "do",
    "BB2",
    "p",
    "mf",
    "(",
    ")",
    ":",
    "1.",
    "<",
    "~",
    "title ",
    "key G major\n",
    "metre 4/4\n",
    "metre 6/8 by 3/8\n",
    "metre free\n",
    "metre 3/5\n",
    "tempo 72\n",
    "voice S soprano\n",
    "voice B bass doubles S\n",
    "equal S B\n",
    "style chorale\n",
    "licence spacing: why\n",
    "*a licence line: why\n",
    "words S 1 | ",
    "words S B | ",
    "la- ",
    "\\",
    "harmony | ",
    "I ",
    "V7/V ",
    "D: ",
    "figures | ",
    "6/5 ",
    "// ",
    "\u{feff}",
    "é",
    "key none\n",
    "sheet 1\n",
    "𝄞",
];

fn made_of_pieces() -> impl Strategy<Value = String> {
    prop::collection::vec(prop::sample::select(&PIECES[..]), 0..120).prop_map(|p| p.concat())
}

/// An edit: where (as a share of the text), how much goes, what comes.
#[derive(Clone, Debug)]
struct Change {
    at: f64,
    gone: usize,
    comes: String,
}

fn change() -> impl Strategy<Value = Change> {
    let comes = prop_oneof![
        prop::collection::vec(prop::sample::select(&PIECES[..]), 0..4).prop_map(|p| p.concat()),
        ".{0,3}",
    ];
    (0.0..=1.0, 0usize..12, comes).prop_map(|(at, gone, comes)| Change { at, gone, comes })
}

fn edited(text: &str, change: &Change) -> String {
    let boundary = |mut at: usize| {
        while !text.is_char_boundary(at) {
            at -= 1;
        }
        at
    };
    let from = boundary((text.len() as f64 * change.at) as usize);
    let to = boundary((from + change.gone).min(text.len())).max(from);
    format!("{}{}{}", &text[..from], change.comes, &text[to..])
}

fn a_sheet() -> impl Strategy<Value = String> {
    let real = (any::<prop::sample::Index>(), any::<prop::sample::Index>())
        .prop_map(|(a, b)| format!("{}\n{}", a.get(&SHEETS), b.get(&SHEETS)));
    let one = any::<prop::sample::Index>().prop_map(|a| a.get(&SHEETS).clone());
    prop_oneof![3 => one, 2 => real, 2 => made_of_pieces(), 1 => "\\PC{0,200}", 1 => any::<String>()]
}

/// What must hold of every reading.
fn lawful(reading: &Reading, text: &str) {
    let mut last = 0;
    for problem in &reading.problems {
        let edits = problem.offers.iter().flat_map(|offer| &offer.edits);
        for span in std::iter::once(problem.span).chain(edits.map(|edit| edit.span)) {
            let range = span.range();
            assert!(
                text.get(range.clone()).is_some(),
                "{range:?} of {problem:?}"
            );
        }
        assert!(last <= problem.span.start, "out of order: {problem:?}");
        last = problem.span.start;
        assert!(!problem.message.is_empty());
        assert!(problem.voice.is_none_or(|v| v < reading.score.voices.len()));
        assert!(problem.at.is_none_or(|at| at <= reading.score.end()));
    }
    let score = &reading.score;
    let mut onset = ZERO;
    for bar in &score.bars {
        assert_eq!(bar.onset, onset);
        assert!(bar.length > ZERO);
        onset += bar.length;
        assert!((bar.metre as usize) < score.metres.len());
    }
    for voice in &score.voices {
        let mut at = ZERO;
        for pair in voice.notes.windows(2) {
            let unknown = |note: &partwright_score::Note| note.sound.pitch().is_none();
            assert!(
                !(unknown(&pair[0]) && pair[0].sound == pair[1].sound),
                "{voice:?}"
            );
        }
        for note in &voice.notes {
            assert_eq!(note.onset, at, "a gap in {}", voice.label);
            assert!(note.length > ZERO);
            at = note.end();
        }
        assert_eq!(at, score.end(), "{} ends early", voice.label);
    }
    for mark in &reading.marks {
        assert_eq!(text[mark.span.range()], format!("*{}", mark.name));
    }
    there_and_back(reading, text);
}

/// Every note written in its own voice is found from its place, and its place from it.
fn there_and_back(reading: &Reading, text: &str) {
    for (voice, of) in reading.score.voices.iter().enumerate() {
        for (index, note) in of.notes.iter().enumerate() {
            let Some(span) = reading.span_of_note(voice, index) else {
                let silent = reading.label_span(voice, note.onset).is_none();
                let written = matches!(note.sound, Sound::Pitch(_));
                assert!(
                    !written || silent,
                    "{note:?} of {} stands nowhere",
                    of.label
                );
                continue;
            };
            let part = &text[span.range()];
            assert!(reading.system_at(span.start as usize).is_some());
            if note.copies.is_some() {
                assert!(part.starts_with('=') || part == "-", "{part}");
                continue;
            }
            assert_eq!(
                reading.at_offset(span.end as usize),
                Some((voice, note.onset)),
                "{part} of {}",
                of.label
            );
            if let Sound::Pitch(pitch) = note.sound {
                let letter = part.chars().next().map(|c| c.to_ascii_uppercase());
                assert_eq!(letter, pitch.class_name().chars().next());
            }
        }
    }
}

fn read(text: &str) -> (Sheet, Reading) {
    let sheet = Sheet::read(text);
    let reading = sheet.lower(text);
    (sheet, reading)
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(600))]

    #[test]
    fn reading_never_fails(text in a_sheet(), changes in prop::collection::vec(change(), 0..4)) {
        let text = changes.iter().fold(text, |text, change| edited(&text, change));
        let (_, reading) = read(&text);
        lawful(&reading, &text);
        for offset in 0..=text.len() + 1 {
            let _ = reading.at_offset(offset);
            let _ = reading.system_at(offset);
        }
        let _ = reading.describe();
    }

    #[test]
    fn reading_again_is_reading(
        text in a_sheet(),
        changes in prop::collection::vec(change(), 1..6),
    ) {
        let (mut sheet, _) = read(&text);
        let mut text = text;
        for change in &changes {
            text = edited(&text, change);
            sheet = Sheet::read_again(&text, &sheet);
            let (_, fresh) = read(&text);
            let again = sheet.lower(&text);
            prop_assert_eq!(again.describe(), fresh.describe());
            prop_assert_eq!(again.problems, fresh.problems);
        }
    }
}
