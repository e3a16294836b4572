//! Sheets nobody wrote: random ones, and those of the cases and the demo scores damaged.

use std::fmt::Write;
use std::fs;
use std::path::{Path, PathBuf};
use std::sync::LazyLock;

use partwright_sheet::{Sheet, Span, align, align_edits, apply};
use proptest::prelude::*;
use unicode_width::UnicodeWidthStr;

use crate::lawful::aligned;

fn files(folder: &str, ending: &str) -> Vec<PathBuf> {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR"))
        .join("../..")
        .join(folder);
    let mut files: Vec<PathBuf> = fs::read_dir(folder)
        .unwrap()
        .map(|entry| entry.unwrap().path())
        .filter(|path| path.extension().is_some_and(|end| end == ending))
        .collect();
    files.sort();
    files
}

/// The sheets of the cases, with what their names say about their bytes.
static CASES: LazyLock<Vec<String>> = LazyLock::new(|| {
    let mut sheets = Vec::new();
    for file in files("grammar/cases", "cases") {
        let text = format!("\n{}", fs::read_to_string(file).unwrap());
        for case in text.split("\n=== ").skip(1) {
            let (name, rest) = case.split_once('\n').unwrap();
            let end = match rest.find("\n--- ") {
                Some(end) if !rest.starts_with("--- ") => end + 1,
                _ => 0,
            };
            let mut sheet = rest[..end].to_owned();
            if name.contains("[no newline]") {
                sheet.pop();
            }
            if name.contains("[tabs]") {
                sheet = sheet.replace('→', "\t");
            }
            if name.contains("[crlf]") {
                sheet = sheet.replace('\n', "\r\n");
            }
            if name.contains("[bom]") {
                sheet.insert(0, '\u{feff}');
            }
            sheets.push(sheet);
        }
    }
    sheets
});

/// The demo scores; those under a house style stand in its folder.
static DEMOS: LazyLock<Vec<(PathBuf, String)>> = LazyLock::new(|| {
    let read = |path: PathBuf| {
        let text = fs::read_to_string(&path).unwrap();
        (path, text)
    };
    [
        "demo-scores",
        "demo-scores/breakwater-press",
        "demo-scores/pilot-quartet",
    ]
    .into_iter()
    .flat_map(|folder| files(folder, "voices"))
    .map(read)
    .collect()
});

#[test]
fn the_sheets_of_all_cases_are_read_the_same() {
    assert!(CASES.len() > 400, "only {} cases", CASES.len());
    let changed = CASES.iter().filter(|text| aligned(text) != **text).count();
    assert!(changed > 100, "only {changed} of them were not set");
}

#[test]
fn the_demo_scores_are_set_already() {
    assert!(DEMOS.len() >= 9);
    for (path, text) in DEMOS.iter() {
        assert_eq!(&aligned(text), text, "{}", path.display());
    }
}

/// Blanks between words, most of them one space.
fn gap() -> impl Strategy<Value = &'static str> {
    prop::sample::select(vec![
        " ",
        " ",
        " ",
        "  ",
        "\t",
        "\u{a0}",
        "\u{3000} ",
        "    ",
        " \r ",
    ])
}

/// Blanks where none are needed.
fn slack() -> impl Strategy<Value = &'static str> {
    prop::sample::select(vec!["", "", " ", " ", "  ", "\t", "\u{2003}"])
}

fn comment() -> impl Strategy<Value = &'static str> {
    prop::sample::select(vec![
        "",
        "",
        "",
        "",
        " // later",
        "  //",
        "\t// H4 | ^^ 港 ",
    ])
}

const NOTES: [&str; 20] = [
    "G4", "A4", "b4", "c5", "F#4", "f♯4", "B♭3", "B♮4", "Cx5", "C𝄪5", "ebb4", "E♭♭4", "A", "b",
    "g", "F♯", "D5^", "e5,*a", "A4*a*b^", "♮",
];
const CELLS: [&str; 12] = [
    "-", "-", "_", "?", "G4.A", "b4.-.c5", "_.F♯4", "H4", "G4.", "mf", "-^", "E4A4",
];

fn cell() -> impl Strategy<Value = &'static str> {
    let plain = &["G4", "A4", "B4", "F#4", "Bb3", "-", "_"][..];
    prop_oneof![
        4 => prop::sample::select(plain),
        4 => prop::sample::select(&NOTES[..]),
        2 => prop::sample::select(&CELLS[..]),
    ]
}

const SYLLABLES: [&str; 12] = [
    "la", "Glo-", "-", "~", "_", "the~eve-", "港の", "灯", "a\\ b", "\\|", "é", "lamp-",
];
const CHORDS: [&str; 12] = [
    "I", "V7", "-", "_", "ii65", "V7/V", "d: iv", "e♭: V", "B♭: I", "viio7", "X", "IV.V",
];
const FIGURES: [&str; 8] = ["6", "6/5", "-", "_", "#", "b.6", "65", "#6/4"];
const LABELS: [&str; 5] = ["S", "A", "Tenor", "B", "b2"];

/// A row: its head and, bar for bar, its words with the blanks before them.
fn row(head: &'static str, words: &'static [&'static str]) -> BoxedStrategy<String> {
    let word = match words {
        [] => cell().boxed(),
        words => prop::sample::select(words).boxed(),
    };
    let bar = prop_oneof![
        6 => prop::collection::vec((gap(), word), 0..6),
        1 => Just(vec![(" ", "_")]),
        1 => Just(vec![(" ", "=S")]),
    ];
    let line = prop::sample::select(vec!["|", "|", "|", "|", "||", "|||", "|:", ":|"]);
    let bars = prop::collection::vec((bar, gap(), line), 1..5);
    let ends = (slack(), slack(), slack(), comment(), any::<u8>());
    (ends, bars)
        .prop_map(move |((indent, before, after, comment, open), bars)| {
            let mut text = format!("{indent}{head}{before}|");
            for (cells, gap, line) in &bars {
                for (gap, word) in cells {
                    text.push_str(gap);
                    text.push_str(word);
                }
                text.push_str(gap);
                text.push_str(line);
            }
            if open < 20 {
                text.push_str(" G4");
            }
            text + after + comment
        })
        .boxed()
}

fn any_row() -> BoxedStrategy<String> {
    prop_oneof![
        3 => row("S", &[]),
        3 => row("A", &[]),
        3 => row("Tenor", &[]),
        3 => row("B", &[]),
        1 => row("b2", &[]),
        2 => row("words S", &SYLLABLES),
        1 => row("words\tA  Tenor \u{3000} 2", &SYLLABLES),
        1 => row("words X", &SYLLABLES),
        1 => row("harmony", &CHORDS),
        1 => row("figures", &FIGURES),
        1 => row("title", &[]),
    ]
    .boxed()
}

fn other_line() -> impl Strategy<Value = String> {
    let line = prop::sample::select(vec![
        "title Éclats — 港の灯",
        "title   Lamps \\// lanterns",
        "by\tÅse  Ødegård\\",
        "key g minor",
        "key   e♭  major signature 2♭",
        "meter  3/4",
        "metre 6/8 by 3/8",
        "metre free",
        "tempo  3/8   72",
        "equal S  A",
        "license  spacing  :  for  the organ",
        "licence parallel-octaves Tenor  B: drums",
        "voice  S  soprano",
        "voice A alto  e3..d♭5   easy f3..c5",
        "voice Tenor cantus written  b♭",
        "voice B   bass doubles  S",
        "style  chorale",
        "sheet  1",
        "*a  license  line : why  not",
        "*b licence motion: so",
        "*a",
        "lamps of the quay",
        "| G4 |",
        "S G4 |",
        "// a comment  of its own",
        "  //   ^^   ^ some words",
        "//        ^",
        "//^^^",
        "",
        "",
        " \t ",
    ]);
    (slack(), line, comment()).prop_map(|(slack, line, comment)| format!("{slack}{line}{comment}"))
}

/// A whole sheet: headers, systems, what stands between them.
fn sheet() -> impl Strategy<Value = String> {
    let lines = prop::collection::vec(prop_oneof![2 => any_row(), 1 => other_line()], 0..24);
    let head = prop::collection::vec(other_line(), 0..8);
    let ends = prop::sample::select(vec!["\n", "\n", "\r\n"]);
    (any::<bool>(), head, lines, ends, any::<bool>()).prop_map(|(mark, head, lines, end, last)| {
        let mut text = String::from(if mark { "\u{feff}" } else { "" });
        text.push_str(&head.join(end));
        text.push_str(end);
        text.push_str(end);
        text.push_str(&lines.join(end));
        if last {
            text.push_str(end);
        }
        text
    })
}

/// Well-written music only: rows of the same number of bars, for looking at columns.
fn music() -> impl Strategy<Value = Vec<Vec<Vec<&'static str>>>> {
    let words = vec!["G4", "A4", "F♯4", "B♭3.A3", "C𝄪5", "-", "B4.-.C5.D5", "E5^"];
    (1usize..5, 1usize..5).prop_flat_map(move |(rows, bars)| {
        let bar = prop::collection::vec(prop::sample::select(words.clone()), 2..5);
        let row = prop::collection::vec(bar, bars);
        prop::collection::vec(row, rows)
    })
}

/// The display column of every cell (bar, number in it) and bar line of a row that is set.
fn columns(row: &str) -> Vec<((usize, usize), usize)> {
    let mut found = Vec::new();
    let (mut bar, mut cell) = (0, 1);
    let mut column = 0;
    for word in row.split(' ') {
        match word {
            "" => {}
            "|" => {
                found.push(((bar, 0), column));
                (bar, cell) = (bar + 1, 1);
            }
            _ => {
                found.push(((bar, cell), column));
                cell += 1;
            }
        }
        column += word.width() + 1;
    }
    found
}

fn edited(text: &str, at: f64, gone: usize, comes: &str) -> String {
    let boundary = |mut at: usize| {
        while !text.is_char_boundary(at) {
            at -= 1;
        }
        at
    };
    let from = boundary((text.len() as f64 * at) as usize);
    let to = boundary((from + gone).min(text.len())).max(from);
    format!("{}{comes}{}", &text[..from], &text[to..])
}

fn damage() -> impl Strategy<Value = Vec<(f64, usize, String)>> {
    let piece = prop::sample::select(vec![
        "|",
        "||",
        " ",
        "\n",
        "\n\n",
        "//",
        " // ",
        "\\",
        "^",
        ".",
        "-",
        "H4 ",
        "♯",
        ":",
        "words S |",
        "\r",
        "\t",
        "*a",
        "=S ",
        "D: ",
        "\u{feff}",
        "title ",
        "voice ",
        "é",
    ]);
    let comes = prop_oneof![3 => piece.prop_map(str::to_owned), 1 => ".{0,3}"];
    prop::collection::vec((0.0..=1.0, 0usize..10, comes), 0..6)
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 1_500, failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn random_sheets_are_read_the_same(text in sheet()) {
        aligned(&text);
    }

    #[test]
    fn damaged_sheets_are_read_the_same(
        one in any::<prop::sample::Index>(),
        other in any::<prop::sample::Index>(),
        demo in any::<bool>(),
        damage in damage(),
    ) {
        let text = if demo {
            one.get(&DEMOS).1.clone()
        } else {
            format!("{}\n{}", one.get(&CASES), other.get(&CASES))
        };
        let text = damage
            .iter()
            .fold(text, |text, (at, gone, comes)| edited(&text, *at, *gone, comes));
        aligned(&text);
    }

    #[test]
    fn any_text_is_read_the_same(text in prop_oneof![any::<String>(), "[S|A4 \\\\./:^*\n\t-]{0,80}"]) {
        aligned(&text);
    }

    #[test]
    fn the_beats_of_a_system_are_in_columns(rows in music(), gaps in prop::collection::vec(slack(), 9)) {
        let mut text = String::new();
        let mut gaps = gaps.iter().cycle();
        for (label, row) in LABELS.iter().zip(&rows) {
            let _ = write!(text, "{label}{}|", gaps.next().unwrap());
            for bar in row {
                for cell in bar {
                    let _ = write!(text, " {}{cell}", gaps.next().unwrap());
                }
                let _ = write!(text, "{}|", gaps.next().unwrap());
            }
            text.push('\n');
        }
        let aligned = aligned(&text);
        let mut known = std::collections::HashMap::new();
        let mut cells = 0;
        for row in aligned.lines() {
            for (place, column) in columns(row) {
                prop_assert_eq!(*known.entry(place).or_insert(column), column, "{}", &aligned);
                cells += 1;
            }
        }
        let wanted: usize = rows.iter().flatten().map(|bar| bar.len() + 1).sum();
        prop_assert_eq!(cells, wanted + 2 * rows.len());
    }

    #[test]
    fn a_part_of_a_sheet_is_set_as_in_the_whole(text in sheet(), from in 0.0..=1.0, to in 0.0..=1.0) {
        let sheet = Sheet::read(&text);
        let all = sheet.align_edits();
        let place = |share: f64| (text.len() as f64 * share) as usize;
        let span = Span::new(place(from).min(place(to)), place(from).max(place(to)));
        let some = sheet.align_edits_in(span);
        for edit in &some {
            prop_assert!(all.contains(edit), "{edit:?}");
        }
        let inside = all.iter().filter(|e| span.start <= e.span.start && e.span.end <= span.end);
        for edit in inside.filter(|edit| !edit.text.contains("//") && !is_comment(&text, edit.span)) {
            prop_assert!(some.contains(edit), "{edit:?}");
        }
        prop_assert_eq!(sheet.align_edits_in(Span::new(0, text.len())), align_edits(&text));
        let once = apply(&text, &some);
        prop_assert_eq!(align(&once), align(&text));
    }
}

/// Whether a place stands in a line that is a comment: it is set with the system above it.
fn is_comment(text: &str, span: Span) -> bool {
    let start = text[..span.range().start]
        .rfind('\n')
        .map_or(0, |end| end + 1);
    text[start..].trim_start().starts_with("//")
}
