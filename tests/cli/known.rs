//! Known findings: an old collection takes up the checker.

use serde_json::Value;

use crate::support::{CLEAN, FLAWED, Folder, Ran};

/// A folder with two old sheets, and the list of what is known of them.
fn adopted() -> Folder {
    let folder = Folder::with(&[("hymns/a.voices", FLAWED), ("hymns/b.voices", FLAWED)]);
    let ran = folder.check(&["--write-known", "known.jsonl", "."]);
    let words = [
        "known.jsonl: 4 known findings written",
        "Nothing found in 2 sheets; 4 known.",
    ];
    assert_eq!(ran.said(&words), 0);
    assert_eq!(ran.out, "");
    folder
}

fn check(folder: &Folder) -> Ran {
    folder.check(&["--known", "known.jsonl", "."])
}

fn list(folder: &Folder) -> String {
    std::fs::read_to_string(folder.path("known.jsonl")).unwrap()
}

#[test]
fn what_is_known_neither_shows_nor_counts() {
    let folder = adopted();
    let ran = check(&folder);
    assert_eq!(ran.said(&["Nothing found in 2 sheets; 4 known."]), 0);
    assert_eq!(ran.out, "");
    assert!(!ran.err.contains("not found any more"), "{}", ran.err);
    // A new sheet is judged in full.
    folder.write("hymns/c.voices", FLAWED.as_bytes());
    let ran = check(&folder);
    assert_eq!(ran.said(&["2 faults in 1 of 3 sheets; 4 known."]), 1);
    assert!(ran.out.contains("hymns/c.voices") && !ran.out.contains("hymns/a.voices"));
}

#[test]
fn the_list_is_readable_sorted_and_the_same_every_time() {
    let folder = adopted();
    let first = list(&folder);
    let lines: Vec<&str> = first.lines().collect();
    assert_eq!(lines.len(), 5, "{first}");
    let entry: Value = serde_json::from_str(lines[1]).unwrap();
    let expected = serde_json::json!({
        "path": "hymns/a.voices",
        "rule": "parallel-fifths",
        "voices": ["S", "B"],
        "beat": "2",
        "notes": "S D5 E5, B G3 A3",
        "bar": 1,
    });
    assert_eq!(entry, expected);
    assert!(lines[1..].is_sorted(), "{first}");
    // Written anew, in another order of paths: the same bytes.
    let again = ["--write-known", "known.jsonl", "hymns/b.voices", "hymns"];
    assert_eq!(folder.check(&again).status, 0);
    assert_eq!(list(&folder), first);
}

#[test]
fn lines_and_bars_may_move_and_notes_may_not() {
    let folder = adopted();
    let moved = FLAWED
        .replace("S | D5 E |", "// the lamps are lit\n\nS | D5 C | D5 E |")
        .replace("B | G3 A |", "B | G3 A | G3 A |");
    assert_ne!(moved, FLAWED);
    folder.write("hymns/a.voices", moved.as_bytes());
    let ran = check(&folder);
    assert_eq!(ran.said(&["; 4 known."]), 0);
    // The same fault twice where one was known: one is new.
    let twice = FLAWED
        .replace("| D5 E |", "| D5 E | C5 C | D5 E |")
        .replace("| G3 A |", "| G3 A | E3 E | G3 A |");
    folder.write("hymns/a.voices", twice.as_bytes());
    let ran = check(&folder);
    assert_eq!(ran.said(&["1 fault in 1 of 2 sheets; 4 known."]), 1);
    assert!(
        ran.out.contains("bar 3, beat 2"),
        "the bar that is right goes first: {}",
        ran.out
    );
    // Other notes: a new fault, and an old one is gone.
    let higher = FLAWED
        .replace("D5 E |", "E5 F |")
        .replace("G3 A |", "A3 Bb |");
    folder.write("hymns/a.voices", higher.as_bytes());
    let ran = check(&folder);
    let words = [
        "1 fault in 1 of 2 sheets; 3 known.",
        "not found any more: hymns/a.voices: parallel-fifths, bar 1, S and B",
        "--write-known writes the list anew",
    ];
    assert_eq!(ran.said(&words), 1);
}

#[test]
fn what_was_not_looked_for_is_not_called_gone() {
    let folder = adopted();
    folder.write("hymns/a.voices", CLEAN.as_bytes());
    let gone = |arguments: &[&str]| {
        let all = [&["check", "--known", "known.jsonl"], arguments].concat();
        let ran = folder.run(&all);
        ran.err.matches("not found any more").count()
    };
    assert_eq!(gone(&["hymns"]), 2);
    assert_eq!(gone(&["hymns/a.voices"]), 2);
    assert_eq!(gone(&["hymns/b.voices"]), 0);
    assert_eq!(gone(&["--pick", "parallel-octaves", "hymns"]), 1);
    assert_eq!(gone(&["--drop", "motion", "hymns"]), 0);
    assert_eq!(gone(&["--bars", "1", "hymns"]), 0);
    assert_eq!(gone(&["--quiet", "hymns"]), 0);
}

#[test]
fn the_list_holds_wherever_the_program_is_run() {
    let folder = adopted();
    let inside = folder
        .program(&["check", "--known", "../known.jsonl", "a.voices"])
        .current_dir(folder.path("hymns"))
        .output()
        .unwrap();
    let ran = Ran::of(inside);
    assert!(ran.err.contains("2 known"), "{}", ran.err);
    let input = folder.feed(
        &[
            "check",
            "--pick",
            "motion",
            "--known",
            "known.jsonl",
            "--as",
            "hymns/a.voices",
            "-",
        ],
        FLAWED.as_bytes(),
    );
    assert_eq!(input.said(&["2 known"]), 0);
}

#[test]
fn licensed_findings_are_not_listed() {
    let licensed = FLAWED.replace("D5 E |", "D5 E*a |") + "*a licence parallel-fifths: horns\n";
    let folder = Folder::with(&[("a.voices", &licensed)]);
    let ran = folder.check(&["--write-known", "known.jsonl", "."]);
    assert_eq!(
        ran.said(&["1 known finding written", "; 1 licensed and 1 known."]),
        0
    );
    let shown = folder.check(&["--known", "known.jsonl", "--licensed", "."]);
    assert_eq!(shown.said(&["; 1 licensed and 1 known."]), 0);
    assert!(
        shown.out.starts_with("licensed fault: parallel-fifths"),
        "{}",
        shown.out
    );
}

#[test]
fn a_list_that_is_none_is_refused_and_never_overwritten() {
    let folder = Folder::with(&[("a.voices", FLAWED)]);
    for (file, words) in [
        ("lost.jsonl", "there is no such file"),
        ("a.voices", "no list of known findings"),
        (".", "a folder"),
    ] {
        let ran = folder.check(&["--known", file, "a.voices"]);
        assert_eq!(ran.said(&[file, words]), 2);
        assert_eq!(ran.out, "");
    }
    let ran = folder.check(&["--write-known", "a.voices", "a.voices"]);
    assert_eq!(ran.said(&["a.voices: no list of known findings"]), 2);
    assert_eq!(
        std::fs::read_to_string(folder.path("a.voices")).unwrap(),
        FLAWED
    );
    let ran = folder.check(&["--write-known", "no/known.jsonl", "a.voices"]);
    assert_eq!(ran.said(&["no/known.jsonl: there is no such folder"]), 2);
    // Half a list is none.
    let ran = folder.check(&["--write-known", "known.jsonl", "a.voices", "lost.voices"]);
    assert_eq!(ran.said(&["known.jsonl: not written"]), 2);
    assert!(!folder.path("known.jsonl").exists());
    // A broken line is named.
    assert_eq!(
        folder.check(&["--write-known", "known.jsonl", "."]).status,
        0
    );
    let broken = list(&folder).replace("\"rule\"", "\"ruel\"");
    folder.write("known.jsonl", broken.as_bytes());
    assert_eq!(
        check(&folder).said(&["known.jsonl: line 2 is no known finding"]),
        2
    );
    let both = folder.check(&["--known", "a", "--write-known", "b", "."]);
    assert_eq!(both.said(&["cannot be used with"]), 2);
}
