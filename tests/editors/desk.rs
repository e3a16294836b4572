//! Where a composer sits: a folder with a sheet in it, the program on the path, and no other home.

use std::ffi::OsString;
use std::fs;
use std::path::{Path, PathBuf};
use std::process::{Child, ExitStatus};
use std::thread::sleep;
use std::time::{Duration, Instant};

/// For the whole of a run, which takes a few seconds: a hung editor must not hang the test.
pub(crate) const LIMIT: Duration = Duration::from_secs(120);

/// A sign of three bytes stands before the fault, so that columns in other units would show.
pub(crate) const SHEET: &str = "\
title   The quay lamps at dusk
key     D major
metre   4/4

// the lamps are lit from the harbour wall inwards
S | F♯4 - G -  | A4 B A   G  | F♯4 - E  - | D4 - - - ||
B | D3  - E -  | D3 E F♯ B2  | D3  - C♯ - | D3 - - - ||
";

/// What is found in it.
pub(crate) const PARALLEL_FIFTHS: &str = "Parallel fifths: S and voice B go from A4 over D3 to B4 \
                                          over E3. Move one voice the other way.";

/// The best mend of it, and the row that this makes.
pub(crate) const MEND: &str = "Move voice B to F#3: similar to S";
pub(crate) const MENDED: &str = "B | D3  - E -  | D3 F♯ F♯ B2  | D3  - C♯ - | D3 - - - ||";

/// A licence for it, and what that makes: a mark at the note, and the reason to be written over.
pub(crate) const LICENCE: &str = "Grant a licence for parallel-fifths";
pub(crate) const LICENSED: [&str; 2] = [
    "S | F♯4 - G -  | A4 B*a A   G  | F♯4 - E  - | D4 - - - ||",
    "*a licence parallel-fifths: why",
];

pub(crate) struct Desk {
    folder: tempfile::TempDir,
}

impl Desk {
    pub(crate) fn new() -> Self {
        let folder = tempfile::tempdir().unwrap();
        fs::write(folder.path().join("quay-lamps.voices"), SHEET).unwrap();
        Self { folder }
    }

    pub(crate) fn path(&self) -> &Path {
        self.folder.path()
    }

    pub(crate) fn sheet(&self) -> PathBuf {
        self.path().join("quay-lamps.voices")
    }

    pub(crate) fn read(&self, name: &str) -> String {
        String::from_utf8_lossy(&fs::read(self.path().join(name)).unwrap_or_default()).into_owned()
    }
}

/// The root of the repository.
pub(crate) fn root() -> &'static Path {
    Path::new(env!("CARGO_MANIFEST_DIR"))
}

/// The program under test.
pub(crate) fn program() -> &'static Path {
    Path::new(env!("CARGO_BIN_EXE_partwright"))
}

/// A `PATH` with the program under test on it, before all others.
pub(crate) fn path_with_program() -> OsString {
    let old = std::env::var_os("PATH").unwrap_or_default();
    let own = program().parent().unwrap().to_owned();
    std::env::join_paths(std::iter::once(own).chain(std::env::split_paths(&old))).unwrap()
}

/// How it ended; killed, and nothing, where it did not in time.
pub(crate) fn end(mut child: Child) -> Option<ExitStatus> {
    let mut status = None;
    let ended = in_time(|| {
        status = child.try_wait().unwrap();
        status.is_some()
    });
    if !ended {
        child.kill().unwrap();
        child.wait().unwrap();
    }
    status
}

/// Waits until it is so; whether it came to be.
pub(crate) fn in_time(mut so: impl FnMut() -> bool) -> bool {
    let start = Instant::now();
    while !so() {
        if start.elapsed() > LIMIT {
            return false;
        }
        sleep(Duration::from_millis(10));
    }
    true
}

/// An editor waits for no server when it leaves: this one must go by itself.
#[track_caller]
pub(crate) fn gone(process: &str) {
    if !Path::new("/proc/self/stat").exists() {
        println!("left out: no process table to look for the server in");
        return;
    }
    let state = || {
        let stat = fs::read_to_string(format!("/proc/{process}/stat")).ok()?;
        stat.rsplit_once(") ")?.1.chars().next()
    };
    // Ended and not yet collected by the system's first process, which has inherited it.
    let ended = in_time(|| state().is_none_or(|state| state == 'Z'));
    assert!(ended, "the server outlived the editor");
}
