//! Repairs: shown, written, and never worse than what they repair.

use std::fs;
use std::io::Write;
use std::path::Path;
use std::process::{Command, Stdio};

use crate::support::{CLEAN, FLAWED, Folder, Ran};

/// Three things to write otherwise, and nothing that sounds.
const CARELESS: &str = "\
stlye free
metre 2/4

S | B4 C*a | D4 E ||
B | G3 A   | G3 E ||
*a licence crossing: the weir bell
";

/// The same, written with care.
const CAREFUL: &str = "\
style free
metre 2/4

S | B4 C4 | D4 E ||
B | G3 A  | G3 E ||
";

fn read(folder: &Folder, name: &str) -> String {
    fs::read_to_string(folder.path(name)).unwrap()
}

/// How many findings of each severity there are.
fn counts(folder: &Folder, name: &str) -> [usize; 3] {
    let ran = folder.run(&["check", "--report", "json", name]);
    let findings = ran.findings();
    ["fault", "weakness", "remark"]
        .map(|word| findings.iter().filter(|f| f["severity"] == word).count())
}

#[test]
fn the_writing_is_mended_and_every_note_sounds_as_before() {
    let folder = Folder::with(&[("a.voices", CARELESS), ("b.voices", CLEAN)]);
    let shown = folder.run(&["mend", "."]);
    let words = [
        "a.voices: line 1: Write style",
        "a.voices: line 4: Write C4",
        "a.voices: line 4: Remove the licence *a",
        "3 mends in 1 of 2 sheets; --write writes them.",
    ];
    assert_eq!(shown.said(&words), 1);
    assert_eq!(
        read(&folder, "a.voices"),
        CARELESS,
        "showing writes nothing"
    );
    let written = folder.run(&["mend", "--write", "."]);
    assert_eq!(written.said(&["3 mends written in 1 of 2 sheets."]), 0);
    assert_eq!(written.out, "");
    assert_eq!(read(&folder, "a.voices"), CAREFUL);
    // What is mended stays so.
    let again = folder.run(&["mend", "."]);
    assert_eq!(
        (again.said(&["Nothing to mend in 2 sheets."]), again.out),
        (0, String::new())
    );
}

#[test]
fn the_diff_is_one_that_patch_takes() {
    let folder = Folder::with(&[("a.voices", CARELESS)]);
    let diff = folder.run(&["mend", "--quiet", "a.voices"]);
    assert_eq!(diff.err, "");
    assert!(
        diff.out
            .starts_with("--- a.voices\n+++ a.voices\n@@ -1,6 +1,5 @@\n"),
        "{}",
        diff.out
    );
    let applied = Command::new("git")
        .args(["apply", "-p0", "-"])
        .current_dir(folder.path("."))
        .stdin(Stdio::piped())
        .spawn();
    let Ok(mut git) = applied else {
        println!("left out: no git to apply the diff with");
        return;
    };
    git.stdin
        .take()
        .unwrap()
        .write_all(diff.out.as_bytes())
        .unwrap();
    assert!(git.wait().unwrap().success());
    assert_eq!(read(&folder, "a.voices"), CAREFUL);
}

#[test]
fn notes_move_only_when_asked_and_no_fault_comes_of_it() {
    let folder = Folder::with(&[("a.voices", FLAWED)]);
    assert_eq!(
        folder.run(&["mend", "a.voices"]).said(&["Nothing to mend"]),
        0
    );
    let before = counts(&folder, "a.voices");
    assert_eq!(before[0], 2);
    let shown = folder.run(&["mend", "--notes", "a.voices"]);
    assert_eq!(shown.said(&["bar 1, beat 2, parallel-fifths: Move "]), 1);
    assert!(
        shown.out.contains("\n-S | D5 E | F E |\n") || shown.out.contains("\n-B | G3 A | F E |\n")
    );
    assert_eq!(
        folder
            .run(&["mend", "--notes", "--write", "a.voices"])
            .status,
        0
    );
    let after = counts(&folder, "a.voices");
    assert_eq!(after[0], 0, "both faults are gone");
    assert!(
        after.iter().sum::<usize>() < before.iter().sum(),
        "{before:?} {after:?}"
    );
    let again = folder.run(&["mend", "--notes", "a.voices"]);
    assert_eq!(again.said(&["Nothing to mend in 1 sheet."]), 0);
}

#[test]
fn the_demo_scores_are_mended_to_the_end() {
    let root = Path::new(concat!(env!("CARGO_MANIFEST_DIR"), "/demo-scores"));
    let folder = Folder::new();
    let mut sheets = Vec::new();
    for below in ["", "breakwater-press", "pilot-quartet"] {
        for entry in fs::read_dir(root.join(below)).unwrap() {
            let path = entry.unwrap().path();
            if path.is_file() {
                let name = path.strip_prefix(root).unwrap().to_str().unwrap();
                folder.write(name, &fs::read(&path).unwrap());
                sheets.extend(name.ends_with(".voices").then(|| name.to_owned()));
            }
        }
    }
    assert!(sheets.len() >= 9);
    for name in &sheets {
        let before = counts(&folder, name);
        let ran = folder.run(&["mend", "--notes", "--write", name]);
        assert_eq!(ran.status, 0);
        let after = counts(&folder, name);
        let sums = |counts: [usize; 3]| [counts[0], counts[0] + counts[1], counts.iter().sum()];
        let worse = sums(after)
            .iter()
            .zip(sums(before))
            .any(|(after, before)| *after > before);
        assert!(!worse, "{name}: {before:?} {after:?}");
        assert_eq!(
            folder.run(&["mend", "--notes", name]).out,
            "",
            "{name} has settled"
        );
    }
    // In the first draft that the publisher sends back there is a bar to write, two voices have to
    // change places for longer than a note, and two chords to be written anew.
    let left = folder.run(&["check", "--report", "json", "."]).findings();
    let left: Vec<&str> = left
        .iter()
        .filter(|finding| finding["severity"] == "fault")
        .map(|finding| finding["rule"].as_str().unwrap())
        .collect();
    assert_eq!(left, ["crossing", "spacing", "unwritten"]);
}

#[test]
fn only_what_is_asked_for_is_mended() {
    let mended = |arguments: &[&str]| {
        let folder = Folder::with(&[("a.voices", FLAWED)]);
        let all = [&["mend", "--notes", "--write", "a.voices"], arguments].concat();
        let ran = folder.run(&all);
        let faults = folder.check(&["--report", "json", "a.voices"]).findings();
        let left: Vec<String> = faults
            .iter()
            .map(|f| f["rule"].as_str().unwrap().to_owned())
            .collect();
        (ran.status, left)
    };
    let of = |status, left: &[&str]| {
        (
            status,
            left.iter().map(|w| (*w).to_owned()).collect::<Vec<_>>(),
        )
    };
    assert_eq!(
        mended(&["--pick", "parallel-octaves"]),
        of(0, &["parallel-fifths"])
    );
    assert_eq!(
        mended(&["--drop", "parallel-octaves"]),
        of(0, &["parallel-octaves"])
    );
    assert_eq!(mended(&["--bars", "1"]), of(0, &["parallel-octaves"]));
    let nobody = mended(&["--voices", "A"]);
    assert_eq!(nobody, of(2, &["parallel-fifths", "parallel-octaves"]));
}

#[test]
fn licensed_notes_and_findings_stay() {
    // The licence speaks of E and A. Without it, one of them would move.
    let sheet = "metre 2/4\n\nS | D5 E*a | C5 B4 |\nB | G3 A   | E3 G  |\n*a licence parallel-fifths: horns\n";
    let folder = Folder::with(&[("a.voices", sheet)]);
    let moved = |text: &str| {
        folder.write("a.voices", text.as_bytes());
        folder.run(&[
            "mend",
            "--notes",
            "--pick",
            "motion,sonority",
            "--write",
            "a.voices",
        ]);
        read(&folder, "a.voices")
    };
    assert_eq!(moved(sheet), sheet);
    let open = sheet.replace("*a licence", "// ").replace("E*a", "E  ");
    assert_ne!(moved(&open), open);
    // A mark holds its note against the mend of something else, too.
    let crossing = "metre 2/4\n\nS | D5 E5*a |\nA | C5 F5   |\nB | G3 A3*a |\n*a licence parallel-fifths: horns\n";
    let after = moved(crossing);
    assert!(!after.contains("C5 F5"), "the alto goes below: {after}");
    assert!(
        after.contains("D5 E5*a") && after.contains("G3 A3*a"),
        "{after}"
    );
    // And a house's licence by the path.
    folder.write(
        "partwright.toml",
        b"[[licence]]\npath = \"*.voices\"\nrule = [\"parallel-fifths\"]\nreason = \"horns\"\n",
    );
    assert_eq!(moved(&open), open);
}

#[test]
fn a_cantus_and_a_copied_bar_stay() {
    let sheet = "style species-1\nvoice S\nvoice C cantus\n\nS | D5 | E |\nC | G3 | A |\n";
    let folder = Folder::with(&[("a.voices", sheet)]);
    folder.run(&["mend", "--notes", "--pick", "motion", "--write", "a.voices"]);
    let after = read(&folder, "a.voices");
    assert!(after != sheet && after.contains("C | G3 | A |"), "{after}");
}

#[test]
fn a_mend_that_brings_as_much_as_it_removes_is_left_out() {
    // By the first species, note against note, more is wrong with it than a mistyped word.
    let sheet = "style specis-1\n\nS | C5 D.E F G |\nB | C4 -   - - |\n";
    let folder = Folder::with(&[("a.voices", sheet)]);
    let ran = folder.run(&["mend", "--write", "a.voices"]);
    assert_eq!(ran.said(&["Nothing to mend in 1 sheet."]), 0);
    assert_eq!(read(&folder, "a.voices"), sheet);
    // One bad change among good ones costs the others nothing.
    let with_doubts = format!("{sheet}\nS | B4 C |\n\nS | B4 C |\n");
    folder.write("a.voices", with_doubts.as_bytes());
    let ran = folder.run(&["mend", "--write", "a.voices"]);
    assert_eq!(ran.said(&["2 mends written"]), 0);
    let after = read(&folder, "a.voices");
    assert!(
        after.starts_with("style specis-1") && after.matches("B4 C4").count() == 2,
        "{after}"
    );
}

#[test]
fn columns_are_kept_where_there_were_any() {
    let aligned = "S | B4 C  | D4 E*a ||\nB | G3 A3 | G3 E3  ||\n*a licence crossing: weir\n";
    let ragged = "S | B4   C | D4 E*a ||\nB | G3 A3 | G3 E3  ||\n*a licence crossing: weir\n";
    let folder = Folder::with(&[("a.voices", aligned), ("b.voices", ragged)]);
    assert_eq!(folder.run(&["mend", "--write", "."]).status, 0);
    assert_eq!(
        read(&folder, "a.voices"),
        "S | B4 C4 | D4 E  ||\nB | G3 A3 | G3 E3 ||\n"
    );
    assert_eq!(
        read(&folder, "b.voices"),
        "S | B4   C4 | D4 E ||\nB | G3 A3 | G3 E3  ||\n"
    );
}

#[test]
fn standard_input_is_mended_to_standard_output() {
    let folder = Folder::new();
    let shown = folder.feed(&["mend", "--as", "a.voices", "-"], CARELESS.as_bytes());
    assert_eq!(shown.said(&["a.voices: line 4: Write C4"]), 1);
    assert!(shown.out.starts_with("--- a.voices\n"), "{}", shown.out);
    let written = folder.feed(&["mend", "--write", "-"], CARELESS.as_bytes());
    assert_eq!((written.status, written.out.as_str()), (0, CAREFUL));
    // What needs no mend comes through as it is.
    let same = folder.feed(&["mend", "--write", "-"], CLEAN.as_bytes());
    assert_eq!((same.status, same.out.as_str()), (0, CLEAN));
    assert!(!folder.path("a.voices").exists());
}

#[test]
fn line_ends_and_the_byte_order_mark_stay() {
    let windows = format!("\u{feff}{}", CARELESS.replace('\n', "\r\n"));
    let folder = Folder::with(&[("a.voices", &windows)]);
    assert_eq!(folder.run(&["mend", "--write", "a.voices"]).status, 0);
    let expected = format!("\u{feff}{}", CAREFUL.replace('\n', "\r\n"));
    assert_eq!(read(&folder, "a.voices"), expected);
}

#[cfg(unix)]
#[test]
fn files_are_replaced_with_care() {
    use std::os::unix::fs::{MetadataExt, PermissionsExt, symlink};
    let folder = Folder::with(&[
        ("a.voices", CARELESS),
        ("b.voices", CARELESS),
        ("c.voices", CLEAN),
    ]);
    let mode = |name: &str, mode| {
        fs::set_permissions(folder.path(name), fs::Permissions::from_mode(mode)).unwrap();
    };
    mode("a.voices", 0o444);
    mode("b.voices", 0o640);
    let unchanged = fs::metadata(folder.path("c.voices")).unwrap().ino();
    symlink("b.voices", folder.path("link.voices")).unwrap();
    let ran = folder.run(&["mend", "--write", "a.voices", "c.voices", "link.voices"]);
    let words = [
        "a.voices: it is read-only; nothing was written",
        "3 mends written in 1 of 3 sheets.",
    ];
    assert_eq!(ran.said(&words), 2);
    assert_eq!(read(&folder, "a.voices"), CARELESS);
    assert_eq!(read(&folder, "b.voices"), CAREFUL);
    assert!(
        fs::symlink_metadata(folder.path("link.voices"))
            .unwrap()
            .is_symlink()
    );
    let kept = fs::metadata(folder.path("b.voices"))
        .unwrap()
        .permissions()
        .mode();
    assert_eq!(kept & 0o777, 0o640);
    assert_eq!(
        fs::metadata(folder.path("c.voices")).unwrap().ino(),
        unchanged,
        "not touched"
    );
    let mut names: Vec<String> = fs::read_dir(folder.path("."))
        .unwrap()
        .map(|entry| entry.unwrap().file_name().into_string().unwrap())
        .collect();
    names.sort();
    assert_eq!(names, ["a.voices", "b.voices", "c.voices", "link.voices"]);
    mode("a.voices", 0o644);
}

#[test]
fn what_is_no_sheet_is_trouble_and_the_rest_is_mended() {
    let folder = Folder::with(&[("a.voices", CARELESS), ("b.mid", "")]);
    let ran = folder.run(&["mend", "--write", "lost.voices", "b.mid", "a.voices"]);
    let words = [
        "lost.voices: there is no such file",
        "b.mid",
        "3 mends written in 1 sheet.",
    ];
    assert_eq!(ran.said(&words), 2);
    assert_eq!(read(&folder, "a.voices"), CAREFUL);
    let wrong = folder.run(&["mend", "--voices", "X", "a.voices"]);
    assert_eq!(wrong.said(&["no voice has the label X"]), 2);
}

#[test]
fn colour_is_only_colour() {
    let folder = Folder::with(&[("a.voices", CARELESS)]);
    let coloured: Ran = folder.run(&["mend", "--colour", "always", "a.voices"]);
    let plain = folder.run(&["mend", "a.voices"]);
    assert!(coloured.out.contains('\x1b') && !plain.out.contains('\x1b'));
    let mut bare = String::new();
    for (i, piece) in coloured.out.split('\x1b').enumerate() {
        let shown = if i == 0 {
            piece
        } else {
            piece.split_once('m').unwrap().1
        };
        bare.push_str(shown);
    }
    assert_eq!(bare, plain.out);
}

/// Mends a text to the end, by way of the whole program.
fn mended(text: &str) -> String {
    through(&["mend", "--quiet", "--notes", "--write", "-"], text)
}

/// What the program makes of a standard input.
fn through(arguments: &[&str], text: &str) -> String {
    let (mut input, mut out, mut err) = (text.as_bytes(), Vec::new(), Vec::new());
    let terminal = partwright_cli::Terminal::default();
    let mut stage = partwright_cli::Stage::new(&mut input, &mut out, &mut err, terminal);
    let words = ["partwright"].iter().chain(arguments).map(Into::into);
    let _ = partwright_cli::run(words, &mut stage);
    String::from_utf8(out).unwrap()
}

/// The open findings of a text: faults, with weaknesses, with remarks.
fn levels(text: &str) -> [usize; 3] {
    let report = through(&["check", "--quiet", "--report", "json", "-"], text);
    let of = |word: &str| report.matches(&format!("\"severity\":\"{word}\"")).count();
    let (faults, weaknesses, remarks) = (of("fault"), of("weakness"), of("remark"));
    [faults, faults + weaknesses, faults + weaknesses + remarks]
}

/// Mending ends, brings nothing, and mending again changes nothing. Tells whether it did anything.
fn settles(text: &str) -> bool {
    let once = mended(text);
    assert_eq!(mended(&once), once, "{text}");
    let (before, after) = (levels(text), levels(&once));
    let worse = before
        .iter()
        .zip(after)
        .any(|(before, after)| after > *before);
    assert!(!worse, "{before:?} {after:?}\n{text}\n{once}");
    once != text
}

proptest::proptest! {
    #![proptest_config(proptest::prelude::ProptestConfig::with_cases(64))]
    #[test]
    fn any_text_settles(
        words in proptest::collection::vec(
            proptest::sample::select(&[
                "S", "B", "|", "||", "C4", "F♯5", "B3", "D5", "E", "A", "G3", "H4", "-", "_", "?", "^", "*a", "\n",
                "\n\n", "\r\n", "*a licence crossing: x\n", "licence overlap: y\n", "metre 3/4\n", "stlye motet\n",
                "style chorale\n", "voice S soprano\n", "voice B bas\n", "// x\n", "C4*a", "key G majr\n", "=S",
            ][..]),
            0..80,
        ),
    ) {
        settles(&words.join(" "));
    }

    #[test]
    fn any_notes_settle(
        style in proptest::sample::select(&["free", "chorale", "motet", "species-1", "species-3"][..]),
        rows in proptest::collection::vec(
            proptest::collection::vec(
                proptest::sample::select(&[
                    "A", "B", "C", "D", "E", "F", "G", "F#", "Bb", "C5", "D5", "G4", "A4", "E4", "C4", "B3", "-", "_",
                    "E4.F", "D*a", "G^",
                ][..]),
                12,
            ),
            2..5,
        ),
        licensed in proptest::bool::ANY,
    ) {
        let mut text = format!("style {style}\nmetre 4/4\n\n");
        for (row, label) in rows.iter().zip(["S", "A", "T", "B"]) {
            let first = [["D5"], ["G4"], ["C4"], ["G3"]]["SATB".find(label).unwrap()];
            let cells: Vec<&str> = first.iter().chain(&row[1..]).copied().collect();
            let bars: Vec<String> = cells.chunks(4).map(|bar| bar.join(" ")).collect();
            text.push_str(&format!("{label} | {} ||\n", bars.join(" | ")));
        }
        if licensed {
            text.push_str("*a licence motion line: the horns\n");
        }
        settles(&text);
    }
}
