//! Wrong calls, and options that choose among findings.

use crate::support::{FLAWED, Folder};

#[test]
fn a_wrong_call_is_2_and_says_what_is_near() {
    let folder = Folder::with(&[("a.voices", FLAWED)]);
    let wrong = |arguments: &[&str], words: &[&str]| {
        let ran = folder.run(arguments);
        assert_eq!(ran.said(words), 2, "{arguments:?}");
        assert_eq!(ran.out, "", "{arguments:?}");
    };
    wrong(&[], &["Usage: partwright"]);
    wrong(&["chek", "a.voices"], &["chek", "check"]);
    wrong(&["check"], &["<PATH>"]);
    wrong(
        &["check", "--styel", "motet", "a.voices"],
        &["--styel", "--style"],
    );
    wrong(
        &["check", "--style", "chorle", "a.voices"],
        &["chorle", "chorale"],
    );
    wrong(
        &["check", "--report", "pdf", "a.voices"],
        &["pdf", "plain", "json"],
    );
    wrong(
        &["check", "--pick", "paralel-fifths", "a.voices"],
        &["did you mean parallel-fifths?"],
    );
    wrong(
        &["check", "--drop", "crossing,motoin", "a.voices"],
        &["did you mean motion?"],
    );
    wrong(
        &["check", "--bars", "20..12", "a.voices"],
        &["20..12", "12..20"],
    );
    wrong(&["check", "--voices", "S,,B", "a.voices"], &["--voices"]);
    wrong(&["rules", "fifths"], &["parallel-fifths"]);
    wrong(&["serve", "--port", "1"], &["--port"]);
}

#[test]
fn the_server_is_told_of_its_streams_for_form_only() {
    for arguments in [["serve"].as_slice(), &["serve", "--stdio"]] {
        // Without a word from an editor it ends, and says nothing that an editor would misread.
        let ran = Folder::new().run(arguments);
        assert_ne!(ran.status, 2, "{}", ran.err);
        assert_eq!(ran.out, "");
    }
}

#[test]
fn help_and_version_are_results() {
    let folder = Folder::new();
    for arguments in [
        ["--help"].as_slice(),
        &["check", "--help"],
        &["rules", "--help"],
        &["--version"],
    ] {
        let ran = folder.run(arguments);
        assert_eq!((ran.status, ran.err.as_str()), (0, ""), "{arguments:?}");
        assert!(
            ran.out.lines().all(|line| line.chars().count() <= 80),
            "{}",
            ran.out
        );
    }
    let check = folder.run(&["check", "--help"]).out;
    for option in [
        "--style",
        "--pick",
        "--drop",
        "--bars",
        "--voices",
        "--fail-on",
        "--as",
        "--quiet",
        "--colour",
    ] {
        assert!(check.contains(option), "{option}");
    }
    for coming in ["convert", "--strict"] {
        assert!(
            !check.contains(coming),
            "{coming} is offered, but is not there"
        );
    }
}

/// The rules of the findings.
fn rules(arguments: &[&str]) -> (i32, Vec<String>) {
    let folder = Folder::with(&[("a.voices", FLAWED)]);
    let all = [&["check", "--report", "json", "a.voices"], arguments].concat();
    let ran = folder.run(&all);
    let rule = |finding: &serde_json::Value| finding["rule"].as_str().unwrap().to_owned();
    (ran.status, ran.findings().iter().map(rule).collect())
}

#[test]
fn rules_are_picked_and_then_dropped() {
    let of = |status, names: &[&str]| {
        (
            status,
            names
                .iter()
                .map(|name| (*name).to_owned())
                .collect::<Vec<_>>(),
        )
    };
    let both = "parallel-fifths,parallel-octaves";
    assert_eq!(
        rules(&["--pick", both]),
        of(1, &["parallel-fifths", "parallel-octaves"])
    );
    let all = rules(&[]).1;
    assert!(
        all.contains(&"parallel-fifths".to_owned()) && all.contains(&"parallel-octaves".to_owned())
    );
    assert_eq!(
        rules(&["--pick", "parallel-octaves"]),
        of(1, &["parallel-octaves"])
    );
    assert_eq!(
        rules(&["--pick", "crossing", "--pick", "parallel-fifths"]),
        of(1, &["parallel-fifths"])
    );
    assert_eq!(
        rules(&["--pick", both, "--drop", "parallel-fifths"]),
        of(1, &["parallel-octaves"])
    );
    assert_eq!(rules(&["--pick", both, "--drop", "motion"]), of(0, &[]));
    assert_eq!(rules(&["--pick", "writing"]), of(0, &[]));
    let without = rules(&["--drop", "parallel-octaves"]).1;
    assert!(
        !without.contains(&"parallel-octaves".to_owned())
            && without.contains(&"parallel-fifths".to_owned())
    );
}

#[test]
fn findings_are_chosen_by_bar_and_voice() {
    let both = "parallel-fifths,parallel-octaves";
    assert_eq!(
        rules(&["--pick", both, "--bars", "2.."]).1,
        ["parallel-octaves"]
    );
    assert_eq!(
        rules(&["--pick", both, "--bars", "1"]).1,
        ["parallel-fifths"]
    );
    assert_eq!(rules(&["--pick", both, "--voices", "S"]).1.len(), 2);
    let three = "S | D5 E |\nA | G4 G |\nB | G3 A |\n";
    let of_alto = Folder::with(&[("a.voices", three)]).check(&["--voices", "A", "a.voices"]);
    assert_eq!((of_alto.status, of_alto.out.as_str()), (0, ""));
    let folder = Folder::with(&[("a.voices", FLAWED)]);
    let voice = folder.check(&["--voices", "b", "a.voices"]);
    assert_eq!(
        voice.said(&["no voice has the label b", "did you mean B?"]),
        2
    );
    let bars = folder.check(&["--bars", "7..", "a.voices"]);
    assert_eq!(bars.said(&["there is no bar 7", "the last is bar 2"]), 2);
}

#[test]
fn the_level_that_fails() {
    // A sixth by a carried octave figure: a remark.
    let doubtful = "S | C4 A |\n";
    let folder = Folder::with(&[("a.voices", FLAWED), ("b.voices", doubtful)]);
    let status = |level: &str, name: &str| folder.check(&["--fail-on", level, name]).status;
    assert_eq!(
        ["fault", "weakness", "remark", "never"].map(|level| status(level, "a.voices")),
        [1, 1, 1, 0]
    );
    assert_eq!(
        ["fault", "weakness", "remark", "never"].map(|level| status(level, "b.voices")),
        [0, 0, 1, 0]
    );
}

#[test]
fn a_style_named_in_the_call_wins_over_the_sheets() {
    // A diminished fifth that opens is a fault in a motet and a weakness in free writing.
    let sheet = "style motet\n\nS | F4 G4 |\nB | B3 C4 |\n";
    let folder = Folder::with(&[("a.voices", sheet)]);
    let severity = |arguments: &[&str]| {
        let all = [
            &[
                "check",
                "--report",
                "json",
                "--pick",
                "unequal-fifths",
                "a.voices",
            ],
            arguments,
        ]
        .concat();
        folder.run(&all).findings()[0]["severity"].clone()
    };
    assert_eq!(severity(&[]), "fault");
    assert_eq!(severity(&["--style", "free"]), "weakness");
}
