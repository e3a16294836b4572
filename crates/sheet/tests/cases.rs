//! The cases in `grammar/cases`: what the notation means, held to the reader of sheets.

#![allow(clippy::unwrap_used, clippy::panic)]

use std::fmt::Write;
use std::fs;
use std::path::{Path, PathBuf};

use partwright_sheet::{Lines, ProblemKind, Reading, Sheet};

struct Case {
    file: String,
    line: usize,
    name: String,
    sheet: String,
    reading: Option<String>,
    problems: Option<Vec<String>>,
}

#[derive(PartialEq)]
enum In {
    Sheet,
    Reading,
    Problems,
}

fn folder() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("../../grammar/cases")
}

/// The name of a case and the notes on its bytes.
fn header(text: &str) -> (String, Vec<&str>) {
    let mut name = text.trim_end();
    let mut notes = Vec::new();
    while let Some(open) = name.rfind(" [").filter(|_| name.ends_with(']')) {
        notes.push(&name[open + 2..name.len() - 1]);
        name = name[..open].trim_end();
    }
    (name.to_owned(), notes)
}

fn finish(case: &mut Case, notes: &[&str]) {
    for note in notes {
        match *note {
            "no newline" => {
                case.sheet.pop();
            }
            "tabs" => case.sheet = case.sheet.replace('→', "\t"),
            "crlf" | "bom" => {}
            other => panic!("{}: unknown note [{other}]", case.name),
        }
    }
    if notes.contains(&"crlf") {
        case.sheet = case.sheet.replace('\n', "\r\n");
    }
    if notes.contains(&"bom") {
        case.sheet.insert(0, '\u{feff}');
    }
    if let Some(reading) = &mut case.reading {
        *reading = reading.trim_end().to_owned();
    }
}

fn read_file(path: &Path) -> Vec<Case> {
    let file = path.file_name().unwrap().to_string_lossy().into_owned();
    let text = fs::read_to_string(path).unwrap();
    let mut cases: Vec<Case> = Vec::new();
    let mut place = In::Sheet;
    let mut notes = Vec::new();
    for (number, line) in text.lines().enumerate() {
        if let Some(rest) = line.strip_prefix("=== ") {
            if let Some(case) = cases.last_mut() {
                finish(case, &notes);
            }
            let (name, given) = header(rest);
            notes = given;
            cases.push(Case {
                file: file.clone(),
                line: number + 1,
                name,
                sheet: String::new(),
                reading: None,
                problems: None,
            });
            place = In::Sheet;
            continue;
        }
        let Some(case) = cases.last_mut() else {
            assert!(line.is_empty(), "{file}: text before the first case");
            continue;
        };
        match line {
            "--- reading" => {
                place = In::Reading;
                case.reading = Some(String::new());
            }
            "--- problems" => {
                place = In::Problems;
                case.problems = Some(Vec::new());
            }
            _ => match place {
                In::Sheet => {
                    case.sheet.push_str(line);
                    case.sheet.push('\n');
                }
                In::Reading => {
                    let reading = case.reading.as_mut().unwrap();
                    reading.push_str(line);
                    reading.push('\n');
                }
                In::Problems if line.trim().is_empty() => {}
                In::Problems => case.problems.as_mut().unwrap().push(line.to_owned()),
            },
        }
    }
    if let Some(case) = cases.last_mut() {
        finish(case, &notes);
    }
    cases
}

fn all_cases() -> Vec<Case> {
    let mut files: Vec<PathBuf> = fs::read_dir(folder())
        .unwrap()
        .map(|entry| entry.unwrap().path())
        .filter(|path| path.extension().is_some_and(|end| end == "cases"))
        .collect();
    files.sort();
    files.iter().flat_map(|path| read_file(path)).collect()
}

fn kind(kind: ProblemKind) -> &'static str {
    match kind {
        ProblemKind::Reading => "reading",
        ProblemKind::OctaveDoubt => "octave-doubt",
        ProblemKind::Unwritten => "unwritten",
        ProblemKind::VoiceSilent => "voice-silent",
    }
}

/// Each problem as `LINE:COLUMN-COLUMN kind message`.
fn problems(reading: &Reading, text: &str) -> Vec<String> {
    let lines = Lines::of(text);
    let shown = reading.problems.iter().map(|problem| {
        let (line, from) = lines.position(problem.span.start as usize);
        let (last, to) = lines.position(problem.span.end as usize);
        assert_eq!(line, last, "a problem stays on its line: {problem:?}");
        format!(
            "{line}:{from}-{to} {} {}",
            kind(problem.kind),
            problem.message
        )
    });
    shown.collect()
}

/// Whether a problem is what a line of a case asks for.
fn fits(expected: &str, found: &str) -> bool {
    let split = |text: &str| -> Option<(String, String)> {
        let mut fields = text.splitn(3, ' ');
        let head = format!("{} {}", fields.next()?, fields.next()?);
        Some((head, fields.next().unwrap_or_default().to_lowercase()))
    };
    let (Some((place, words)), Some((at, message))) = (split(expected), split(found)) else {
        return false;
    };
    let mut rest = message.as_str();
    place == at
        && words.split('…').map(str::trim).all(|piece| {
            rest.find(piece).is_some_and(|found| {
                rest = &rest[found + piece.len()..];
                true
            })
        })
}

/// What is wrong with the reading of a case, if anything is.
fn check(case: &Case) -> Option<String> {
    let sheet = Sheet::read(&case.sheet);
    let reading = sheet.lower(&case.sheet);
    let mut wrong = String::new();
    let found = problems(&reading, &case.sheet);
    let expected = case.problems.clone().unwrap_or_default();
    let same = found.len() == expected.len()
        && expected
            .iter()
            .zip(&found)
            .all(|(expected, found)| fits(expected, found));
    if !same {
        let _ = writeln!(
            wrong,
            "  problems wanted:\n    {}\n  problems found:\n    {}",
            expected.join("\n    "),
            found.join("\n    ")
        );
    }
    if let Some(expected) = &case.reading {
        let found = reading.describe();
        if found.trim_end() != expected {
            let _ = writeln!(
                wrong,
                "  reading wanted:\n    {}\n  reading found:\n    {}",
                expected.replace('\n', "\n    "),
                found.trim_end().replace('\n', "\n    ")
            );
        }
    }
    (!wrong.is_empty()).then(|| {
        format!(
            "{}:{}: {}\n{}{wrong}",
            case.file, case.line, case.name, case.sheet
        )
    })
}

#[test]
fn every_case_is_read_as_it_says() {
    let cases = all_cases();
    assert!(cases.len() > 200, "only {} cases found", cases.len());
    let mut names: Vec<&str> = cases.iter().map(|case| case.name.as_str()).collect();
    names.sort_unstable();
    names.dedup();
    assert_eq!(names.len(), cases.len(), "a name is used twice");
    let wrong: Vec<String> = cases.iter().filter_map(check).collect();
    assert!(
        wrong.is_empty(),
        "{} of {} cases are read otherwise:\n\n{}",
        wrong.len(),
        cases.len(),
        wrong.join("\n")
    );
}

#[test]
fn a_case_read_otherwise_is_found() {
    let case = |problems: &[&str], reading: &str| Case {
        file: String::new(),
        line: 1,
        name: String::new(),
        sheet: "S | G4 H4 |\n".to_owned(),
        reading: Some(reading.to_owned()),
        problems: Some(problems.iter().map(|&line| line.to_owned()).collect()),
    };
    let reading = "voice S voice\nbars 1:1/2\nS: G4 1/4, ~ 1/4";
    let problem = "1:8-10 reading german … b4";
    assert_eq!(check(&case(&[problem], reading)), None);
    for wrong in [
        case(&[], reading),
        case(&[problem, problem], reading),
        case(&["1:8-9 reading German"], reading),
        case(&["1:8-10 unwritten German"], reading),
        case(&["1:8-10 reading B4 … German"], reading),
        case(&[problem], "voice S voice\nbars 1:1/2\nS: G4 1/2"),
    ] {
        assert!(check(&wrong).is_some());
    }
}
