//! Streams: colour, closed pipes, and the same bytes twice.

use std::io::{BufRead, BufReader, Read};
use std::process::Stdio;

use crate::support::{CLEAN, FLAWED, Folder, RULES};
use partwright_cli::{Stage, Terminal};

/// Ten thousand parts that cannot be read.
fn ten_thousand() -> String {
    (0..1000)
        .map(|_| format!("S |{}\n\n", " H4 |".repeat(10)))
        .collect()
}

#[test]
fn quiet_leaves_the_findings_alone() {
    let folder = Folder::with(&[("a.voices", FLAWED), ("b.voices", CLEAN), ("c.voices", "")]);
    let loud = folder.check(&["."]);
    let quiet = folder.check(&["--quiet", "."]);
    assert_eq!(quiet.err, "");
    assert_eq!(quiet.out, loud.out);
    assert_eq!((quiet.status, loud.status), (1, 1));
    assert_eq!(
        loud.said(&["c.voices: an empty sheet", "2 faults in 1 of 3 sheets."]),
        1
    );
}

#[test]
fn two_runs_give_the_same_bytes() {
    let folder = Folder::with(&[
        ("a.voices", FLAWED),
        ("b/c.voices", FLAWED),
        ("d.voices", &ten_thousand()),
    ]);
    for form in ["plain", "json"] {
        let run = || folder.check(&["--report", form, "."]);
        let (one, two) = (run(), run());
        assert!(one.out.len() > 1000, "{}", one.out);
        assert_eq!((one.out, one.err), (two.out, two.err));
    }
}

#[test]
fn many_sheets_at_once_are_reported_as_one_by_one() {
    let folder = Folder::new();
    // The long ones first, so that the short ones are done before them.
    let sheets = (0..24).map(|i| match i % 6 {
        0 => (format!("{i:02}.voices"), ten_thousand()),
        1 => (format!("{i:02}.voices"), CLEAN.to_owned()),
        _ => (format!("{i:02}.voices"), format!("// {i}\n{FLAWED}")),
    });
    let sheets: Vec<(String, String)> = sheets.collect();
    for (name, text) in &sheets {
        folder.write(name, text.as_bytes());
    }
    for form in ["plain", "json"] {
        let arguments = ["--quiet", "--drop", "reading", "--report", form];
        let all = folder.check(&[&arguments[..], &["."]].concat());
        let names = sheets.iter().map(|(name, _)| name.as_str());
        let single = |name| folder.check(&[&arguments[..], &[name]].concat()).out;
        let singles: Vec<String> = names.map(single).collect();
        assert!(all.out == singles.concat(), "{form}");
        assert_eq!(singles.iter().filter(|out| !out.is_empty()).count(), 16);
    }
}

#[test]
fn a_reader_that_goes_away_ends_nothing_but_the_report() {
    let folder = Folder::with(&[("a.voices", &ten_thousand())]);
    for form in ["plain", "json"] {
        let mut command = folder.program(&["check", "--pick", RULES, "--report", form, "a.voices"]);
        let mut child = command
            .stdout(Stdio::piped())
            .stderr(Stdio::piped())
            .spawn()
            .unwrap();
        let mut out = BufReader::new(child.stdout.take().unwrap());
        let mut line = String::new();
        out.read_line(&mut line).unwrap();
        drop(out);
        let mut err = String::new();
        child
            .stderr
            .take()
            .unwrap()
            .read_to_string(&mut err)
            .unwrap();
        assert_eq!(
            child.wait().unwrap().code(),
            Some(1),
            "the faults count all the same"
        );
        assert!(line.contains("reading"), "{line}");
        assert_eq!(err, "10000 faults in 1 sheet.\n");
    }
}

#[cfg(target_os = "linux")]
#[test]
fn results_that_cannot_be_written_are_trouble() {
    let folder = Folder::with(&[("a.voices", FLAWED)]);
    let full = std::fs::File::options()
        .write(true)
        .open("/dev/full")
        .unwrap();
    let output = folder
        .program(&["check", "a.voices"])
        .stdout(full)
        .output()
        .unwrap();
    assert_eq!(output.status.code(), Some(2));
    let err = String::from_utf8(output.stderr).unwrap();
    assert!(
        err.contains("could not be written: no space is left"),
        "{err}"
    );
}

/// What a run prints on a given terminal.
fn printed(arguments: &[&str], terminal: Terminal) -> (String, String) {
    let folder = Folder::with(&[("a.voices", FLAWED)]);
    let path = folder.path("a.voices");
    let (mut input, mut out, mut err) = (std::io::empty(), Vec::new(), Vec::new());
    let mut stage = Stage::new(&mut input, &mut out, &mut err, terminal);
    let words = ["partwright", "check", "--pick", RULES]
        .into_iter()
        .chain(arguments.iter().copied())
        .map(Into::into);
    let _ = partwright_cli::run(words.chain([path.into()]), &mut stage);
    (
        String::from_utf8(out).unwrap(),
        String::from_utf8(err).unwrap(),
    )
}

#[test]
fn colour_on_a_terminal_only_and_not_where_it_is_unwanted() {
    let terminal = Terminal {
        out: true,
        err: true,
        width: Some(80),
        colourless: false,
    };
    let coloured = |arguments: &[&str], terminal| printed(arguments, terminal).0.contains('\x1b');
    assert!(coloured(&[], terminal));
    assert!(!coloured(
        &[],
        Terminal {
            colourless: true,
            ..terminal
        }
    ));
    assert!(!coloured(
        &[],
        Terminal {
            out: false,
            ..terminal
        }
    ));
    assert!(!coloured(&["--colour", "never"], terminal));
    assert!(coloured(
        &["--color", "always"],
        Terminal {
            out: false,
            ..terminal
        }
    ));
    assert!(!coloured(
        &["--report", "json", "--colour", "always"],
        terminal
    ));
    // Short work shows no progress, even on a terminal.
    assert_eq!(printed(&[], terminal).1, "2 faults in 1 sheet.\n");
}

#[test]
fn no_colour_in_a_pipe() {
    let folder = Folder::with(&[("a.voices", FLAWED)]);
    let plain = folder.check(&["a.voices"]).out;
    assert!(!plain.contains('\x1b'));
    let coloured = folder.check(&["--colour", "always", "a.voices"]).out;
    assert!(coloured.contains('\x1b'));
    let mut bare = String::new();
    let mut inside = false;
    for c in coloured.chars() {
        match c {
            '\x1b' => inside = true,
            'm' if inside => inside = false,
            _ if !inside => bare.push(c),
            _ => {}
        }
    }
    assert_eq!(
        bare, plain,
        "colour adds nothing that is not there without it"
    );
}
