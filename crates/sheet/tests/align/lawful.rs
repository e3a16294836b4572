//! What holds of every sheet that is set in columns.

use partwright_sheet::{Problem, ProblemKind, Reading, Sheet, align, align_edits, apply};

fn read(text: &str) -> Reading {
    Sheet::read(text).lower(text)
}

/// What a problem is about, whatever its place in the text.
fn about(problem: &Problem) -> (ProblemKind, Option<usize>, Option<partwright_score::Time>) {
    (problem.kind, problem.voice, problem.at)
}

/// The same of all, in an order that does not hang on columns.
fn troubles(reading: &Reading) -> Vec<String> {
    // Such a return is a blank to whoever sets columns, and goes with the blanks.
    let lone = |p: &&Problem| p.message.starts_with("A carriage return alone");
    let problems = reading.problems.iter().filter(|p| !lone(p)).map(about);
    let mut all: Vec<String> = problems.map(|about| format!("{about:?}")).collect();
    all.sort();
    all
}

/// A line's end, and whether it is to stay as it is to the byte.
fn frame(line: &str) -> (&str, &str) {
    let body = line.trim_end_matches('\n');
    let body = body.strip_suffix('\r').unwrap_or(body);
    (body, &line[body.len()..])
}

/// The comment of a line that holds nothing else.
fn comment(body: &str) -> Option<&str> {
    let start = body.trim_start_matches([' ', '\t', '\u{a0}', '\u{3000}', '\r']);
    start.starts_with("//").then_some(start)
}

/// Sets a sheet in columns, and holds the result to everything that must be the same.
#[track_caller]
pub(crate) fn aligned(text: &str) -> String {
    let aligned = align(text);
    assert_eq!(align(&aligned), aligned, "twice, of\n{text}");
    let edits = align_edits(text);
    assert_eq!(apply(text, &edits), aligned);
    let mut last = 0;
    for edit in &edits {
        assert!(edit.span.start >= last, "in order: {edits:?}");
        last = edit.span.end;
        let old = &text[edit.span.range()];
        assert!(!old.contains('\n') && !edit.text.contains('\n'), "{edit:?}");
        assert_ne!(old, edit.text);
    }
    let (before, after) = (read(text), read(&aligned));
    assert_eq!(
        before.describe(),
        after.describe(),
        "read otherwise:\n{text}\n{aligned}"
    );
    assert_eq!(
        troubles(&before),
        troubles(&after),
        "other problems:\n{text}\n{aligned}"
    );
    let lines = |text: &str| {
        text.split_inclusive('\n')
            .map(String::from)
            .collect::<Vec<_>>()
    };
    let unmarked = |text: &str| lines(text.strip_prefix('\u{feff}').unwrap_or(text));
    assert_eq!(
        text.starts_with('\u{feff}'),
        aligned.starts_with('\u{feff}')
    );
    let (old, new) = (unmarked(text), unmarked(&aligned));
    assert_eq!(old.len(), new.len());
    for (old, new) in old.iter().zip(&new) {
        let ((old, end), (new, new_end)) = (frame(old), frame(new));
        assert_eq!(end, new_end);
        if old.trim().is_empty() {
            assert_eq!(old, new, "a blank line");
        } else if let Some(words) = comment(old) {
            let bare = |text: &str| text.replace(char::is_whitespace, "");
            let drawn = bare(words).starts_with("//^");
            assert!(
                old == new || drawn && bare(old) == bare(new),
                "{old}\n{new}"
            );
        }
    }
    aligned
}
