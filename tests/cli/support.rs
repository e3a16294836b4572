//! A folder of sheets, and the program run in it.

use std::fs;
use std::io::Write;
use std::path::PathBuf;
use std::process::{Command, Output, Stdio};

use tempfile::TempDir;

/// Two faults: parallel fifths in bar 1, parallel octaves in bar 2.
pub(crate) const FLAWED: &str = "\
title   The lamps of Quay Street
metre   2/4

S | D5 E | F E |
B | G3 A | F E |
";

/// Neither.
pub(crate) const CLEAN: &str = "\
metre   2/4

S | D5 C | D - ||
B | G3 A | G - ||
";

/// The rules that most tests look for: the catalogue may grow without touching them.
pub(crate) const RULES: &str = "parallel-fifths,parallel-octaves,reading,octave-doubt";

/// A temporary folder.
pub(crate) struct Folder(TempDir);

/// How a run ended.
pub(crate) struct Ran {
    /// The exit status; -1 where a signal ended it.
    pub(crate) status: i32,
    /// Standard output.
    pub(crate) out: String,
    /// Standard error.
    pub(crate) err: String,
}

impl Folder {
    /// An empty folder.
    pub(crate) fn new() -> Folder {
        Folder(tempfile::tempdir().unwrap())
    }

    /// A folder with these files; folders in their names are made.
    pub(crate) fn with(files: &[(&str, &str)]) -> Folder {
        let folder = Folder::new();
        for (name, text) in files {
            folder.write(name, text.as_bytes());
        }
        folder
    }

    /// A path in the folder.
    pub(crate) fn path(&self, name: &str) -> PathBuf {
        self.0.path().join(name)
    }

    /// Writes a file.
    pub(crate) fn write(&self, name: &str, bytes: &[u8]) {
        let path = self.path(name);
        fs::create_dir_all(path.parent().unwrap()).unwrap();
        fs::write(path, bytes).unwrap();
    }

    /// The program, to be run in the folder.
    pub(crate) fn program(&self, arguments: &[&str]) -> Command {
        let mut command = Command::new(env!("CARGO_BIN_EXE_partwright"));
        command
            .args(arguments)
            .current_dir(self.0.path())
            .env_remove("NO_COLOR");
        command
    }

    /// Runs the program.
    pub(crate) fn run(&self, arguments: &[&str]) -> Ran {
        Ran::of(
            self.program(arguments)
                .stdin(Stdio::null())
                .output()
                .unwrap(),
        )
    }

    /// Checks for a few rules.
    pub(crate) fn check(&self, arguments: &[&str]) -> Ran {
        self.run(&[&["check", "--pick", RULES], arguments].concat())
    }

    /// Runs the program on a standard input.
    pub(crate) fn feed(&self, arguments: &[&str], input: &[u8]) -> Ran {
        let mut command = self.program(arguments);
        let mut child = command
            .stdin(Stdio::piped())
            .stdout(Stdio::piped())
            .stderr(Stdio::piped())
            .spawn()
            .unwrap();
        let mut stdin = child.stdin.take().unwrap();
        let input = input.to_vec();
        // The program may stop reading before the end.
        let writer = std::thread::spawn(move || stdin.write_all(&input));
        let output = child.wait_with_output().unwrap();
        let _ = writer.join().unwrap();
        Ran::of(output)
    }
}

impl Ran {
    /// What a run of the program came to.
    pub(crate) fn of(output: Output) -> Ran {
        Ran {
            status: output.status.code().unwrap_or(-1),
            out: String::from_utf8(output.stdout).unwrap(),
            err: String::from_utf8(output.stderr).unwrap(),
        }
    }

    /// The status, once it is sure that standard error says all of this.
    #[track_caller]
    pub(crate) fn said(&self, words: &[&str]) -> i32 {
        for word in words {
            assert!(
                self.err.contains(word),
                "expected {word:?} on standard error: {}",
                self.err
            );
        }
        self.status
    }

    /// The findings of a JSON report.
    pub(crate) fn findings(&self) -> Vec<serde_json::Value> {
        self.out
            .lines()
            .map(|line| serde_json::from_str(line).unwrap())
            .collect()
    }
}
