//! Real editors, driven by keys, against the real server.
//!
//! Neovim is taken from `PARTWRIGHT_NVIM`; `cargo xtask test` installs it and sets that.

#![allow(clippy::unwrap_used, clippy::panic, clippy::print_stdout)]

use std::fs::{self, File};
use std::path::{Path, PathBuf};
use std::process::{Command, Stdio};
use std::thread::sleep;
use std::time::{Duration, Instant};

/// For the whole of a run, which takes two or three seconds: a hung editor must not hang the test.
const LIMIT: Duration = Duration::from_secs(120);

/// A sign of three bytes stands before the fault, so that columns in other units would show.
const SHEET: &str = "\
title   The quay lamps at dusk
key     D major
metre   4/4

// the lamps are lit from the harbour wall inwards
S | F♯4 - G -  | A4 B A   G  | F♯4 - E  - | D4 - - - ||
B | D3  - E -  | D3 E F♯ B2  | D3  - C♯ - | D3 - - - ||
";

#[test]
fn a_composer_at_neovim() {
    let Some(nvim) = std::env::var_os("PARTWRIGHT_NVIM") else {
        println!("left out: no Neovim; `cargo xtask test` installs it");
        return;
    };
    let desk = tempfile::tempdir().unwrap();
    let sheet = desk.path().join("quay-lamps.voices");
    fs::write(&sheet, SHEET).unwrap();

    let mut said = Said(run(nvim.as_ref(), desk.path()).into_iter());

    said.exactly("typed :edit");
    said.exactly("filetype voicesheet, comment // %s");
    said.exactly("attached to partwright");
    said.exactly("server processes 1");
    let first = said.after("server ");
    said.parallel_fifths();

    said.exactly("typed gg]d");
    said.exactly("cursor 6 \"B\"");
    said.exactly("typed <C-W>d");
    let shown = said.all("shown ").join(" ");
    assert!(shown.contains("Parallel fifths"), "{shown}");
    assert!(shown.contains("[parallel-fifths]"), "{shown}");
    said.exactly("typed K");
    let hover = said.all("hover ").join("\n");
    assert!(
        hover.contains("B4") && hover.contains("parallel"),
        "{hover}"
    );

    said.exactly("typed cwG<Esc>");
    said.exactly("findings 0");
    said.exactly("typed u");
    said.parallel_fifths();
    said.exactly("typed cwH<Esc>");
    said.exactly("findings 1");
    said.exactly("finding 6:21 \"H\" error partwright reading");
    let message = said.after("message ");
    assert!(message.contains("German"), "{message}");
    said.exactly("typed ucwG<Esc>");
    said.exactly("findings 0");

    said.exactly("typed :write");
    said.exactly("ended with status 0, signal 0");
    said.exactly("findings 0");

    said.exactly("server processes 1");
    let second = said.after("server ");
    assert_ne!(first, second);
    said.exactly("findings 0");
    said.exactly("typed :quit");
    said.end();

    gone(&second);
    let written = fs::read_to_string(&sheet).unwrap();
    assert_eq!(written, SHEET.replace("A4 B A", "A4 G A"));
}

/// Runs the script in Neovim; its lines. The editor has no home but `desk`.
fn run(nvim: &Path, desk: &Path) -> Vec<String> {
    let root = Path::new(env!("CARGO_MANIFEST_DIR"));
    let program = Path::new(env!("CARGO_BIN_EXE_partwright"));
    let old = std::env::var_os("PATH").unwrap_or_default();
    let folders =
        std::iter::once(program.parent().unwrap().to_owned()).chain(std::env::split_paths(&old));
    let out = desk.join("out");
    let mut command = Command::new(nvim);
    command
        .args(["--headless", "--clean"])
        .args([
            "--cmd",
            "lua vim.opt.runtimepath:prepend(vim.env.EDITOR_FOLDER)",
        ])
        .arg("-S")
        .arg(root.join("tests/editors/neovim.lua"))
        .env("EDITOR_FOLDER", root.join("editors/neovim"))
        .env("PATH", std::env::join_paths(folders).unwrap())
        .current_dir(desk)
        .stdin(Stdio::null())
        .stdout(File::create(&out).unwrap())
        .stderr(File::create(desk.join("err")).unwrap());
    for folder in ["CONFIG", "DATA", "STATE", "CACHE"] {
        command.env(format!("XDG_{folder}_HOME"), desk.join("home"));
    }
    for variable in ["NVIM_APPNAME", "NVIM_LOG_FILE", "VIMINIT"] {
        command.env_remove(variable);
    }
    let mut editor = command.spawn().unwrap();
    let start = Instant::now();
    let status = loop {
        if let Some(status) = editor.try_wait().unwrap() {
            break Some(status);
        }
        if start.elapsed() > LIMIT {
            editor.kill().unwrap();
            editor.wait().unwrap();
            break None;
        }
        sleep(Duration::from_millis(10));
    };
    let read =
        |path: PathBuf| String::from_utf8_lossy(&fs::read(path).unwrap_or_default()).into_owned();
    let lines: Vec<String> = read(out).lines().map(ToOwned::to_owned).collect();
    assert!(
        status.is_some_and(|status| status.success()),
        "Neovim ended with {status:?}.\n{}\n-- standard error\n{}\n-- its log\n{}",
        lines.join("\n"),
        read(desk.join("err")),
        read(desk.join("home/nvim/lsp.log")),
    );
    lines
}

/// What the script said, taken line by line.
struct Said(std::vec::IntoIter<String>);

impl Said {
    fn next(&mut self) -> String {
        self.0.next().unwrap_or_else(|| "(nothing more)".to_owned())
    }

    #[track_caller]
    fn exactly(&mut self, wanted: &str) {
        let line = self.next();
        assert_eq!(line, wanted, "\nand then\n{}", self.rest());
    }

    #[track_caller]
    fn after(&mut self, start: &str) -> String {
        let line = self.next();
        let Some(rest) = line.strip_prefix(start) else {
            panic!(
                "{line}\nwhere \"{start}\" was expected, and then\n{}",
                self.rest()
            );
        };
        rest.to_owned()
    }

    /// All the next lines with this start.
    fn all(&mut self, start: &str) -> Vec<String> {
        let mut taken = Vec::new();
        while let Some(rest) = self
            .0
            .as_slice()
            .first()
            .and_then(|line| line.strip_prefix(start))
        {
            taken.push(rest.to_owned());
            self.0.next();
        }
        taken
    }

    /// The one finding of the sheet as it was: at the arrival, with its three other notes.
    #[track_caller]
    fn parallel_fifths(&mut self) {
        self.exactly("findings 1");
        self.exactly("finding 6:21 \"B\" error partwright parallel-fifths");
        self.exactly(
            "message Parallel fifths: S and B go from D3–A4 to E3–B4. Move one voice the other way.",
        );
        self.exactly("related 6 \"A4\" from here: S A4");
        self.exactly("related 7 \"D3\" from here: B D3");
        self.exactly("related 7 \"E\" with: B E3");
    }

    #[track_caller]
    fn end(&mut self) {
        assert_eq!(self.rest(), "");
    }

    fn rest(&self) -> String {
        self.0.as_slice().join("\n")
    }
}

/// The editor waits for no server when it leaves: this one must go by itself.
#[track_caller]
fn gone(process: &str) {
    if !Path::new("/proc/self/stat").exists() {
        println!("left out: no process table to look for the server in");
        return;
    }
    let state = || {
        let stat = fs::read_to_string(format!("/proc/{process}/stat")).ok()?;
        stat.rsplit_once(") ")?.1.chars().next()
    };
    let start = Instant::now();
    // Ended and not yet collected by the system's first process, which has inherited it.
    while state().is_some_and(|state| state != 'Z') {
        assert!(start.elapsed() < LIMIT, "the server outlived the editor");
        sleep(Duration::from_millis(10));
    }
}
