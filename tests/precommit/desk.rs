//! A musician's desk: a repository of sheets, one of the program, and the framework between them.

use std::ffi::OsString;
use std::fs;
use std::path::{Path, PathBuf};
use std::process::{Command, Stdio};

use tempfile::TempDir;

/// The framework, where it is installed.
pub(crate) fn pre_commit() -> Option<PathBuf> {
    let path = std::env::var_os("PARTWRIGHT_PRE_COMMIT")?;
    Some(std::path::absolute(path).unwrap())
}

/// A desk of its own for each test.
pub(crate) struct Desk {
    folder: TempDir,
    framework: PathBuf,
}

impl Desk {
    /// An empty repository of sheets, and a repository with the program as it stands here.
    pub(crate) fn new(framework: PathBuf) -> Desk {
        let folder = tempfile::tempdir().unwrap();
        let desk = Desk { folder, framework };
        copy_program(&desk.source());
        for repository in [desk.source(), desk.sheets()] {
            fs::create_dir_all(&repository).unwrap();
            desk.git(&repository, &["init", "--quiet"]);
            desk.git(&repository, &["add", "--all"]);
            desk.git(
                &repository,
                &["commit", "--quiet", "--allow-empty", "--message", "First"],
            );
        }
        desk
    }

    /// The repository of the program.
    pub(crate) fn source(&self) -> PathBuf {
        self.folder.path().join("partwright")
    }

    fn sheets(&self) -> PathBuf {
        self.folder.path().join("sheets")
    }

    /// Configures these hooks, in order.
    pub(crate) fn hooks(&self, ids: &[&str]) {
        let (source, rev) = (
            self.source(),
            self.git(&self.source(), &["rev-parse", "HEAD"]),
        );
        let ids: String = ids.iter().map(|id| format!("      - id: {id}\n")).collect();
        let text = format!(
            "repos:\n  - repo: {}\n    rev: {}\n    hooks:\n{ids}",
            source.display(),
            rev.trim()
        );
        self.write(".pre-commit-config.yaml", &text);
    }

    /// Writes a file among the sheets and stages it.
    pub(crate) fn write(&self, name: &str, text: &str) {
        let path = self.sheets().join(name);
        fs::create_dir_all(path.parent().unwrap()).unwrap();
        fs::write(path, text).unwrap();
        self.git(&self.sheets(), &["add", "--all"]);
    }

    /// A file among the sheets.
    pub(crate) fn read(&self, name: &str) -> String {
        fs::read_to_string(self.sheets().join(name)).unwrap()
    }

    /// Runs the framework: its status and all it says.
    pub(crate) fn run(&self, arguments: &[&str]) -> (i32, String) {
        let mut command = self.command(&self.framework, &self.sheets(), true);
        self.said(command.args(arguments))
    }

    /// The same where no `partwright` is installed, and the framework must build its own.
    pub(crate) fn run_without_program(&self, arguments: &[&str]) -> (i32, String) {
        // The libraries are built once for all runs of this test, and quickly: it is not measured.
        let mut command = self.command(&self.framework, &self.sheets(), false);
        command
            .args(arguments)
            .env("CARGO_TARGET_DIR", built())
            .env("CARGO_PROFILE_RELEASE_OPT_LEVEL", "0")
            .env("CARGO_PROFILE_RELEASE_DEBUG", "0")
            .env("CARGO_PROFILE_RELEASE_LTO", "off")
            .env("CARGO_PROFILE_RELEASE_CODEGEN_UNITS", "16");
        self.said(&mut command)
    }

    /// Commits what is staged: whether that was let through, and what was said.
    pub(crate) fn commit(&self) -> (bool, String) {
        let mut command = self.command(Path::new("git"), &self.sheets(), true);
        let (status, said) = self.said(command.args(["commit", "--message", "Sheets"]));
        (status == 0, said)
    }

    fn said(&self, command: &mut Command) -> (i32, String) {
        let output = command.stdin(Stdio::null()).output().unwrap();
        let mut said = String::from_utf8_lossy(&output.stdout).into_owned();
        said.push_str(&String::from_utf8_lossy(&output.stderr));
        (output.status.code().unwrap_or(-1), said)
    }

    fn git(&self, repository: &Path, arguments: &[&str]) -> String {
        let mut command = self.command(Path::new("git"), repository, true);
        let (status, said) = self.said(command.args(arguments));
        assert_eq!(status, 0, "git {arguments:?}: {said}");
        said
    }

    /// A program that sees nothing of whoever runs the test: no configuration, no hooks, no store.
    fn command(&self, program: &Path, folder: &Path, ours: bool) -> Command {
        let mut command = Command::new(program);
        let here = self.folder.path();
        command.current_dir(folder);
        // A test inside a git hook would take that hook's repository for its own.
        for (name, _) in std::env::vars_os().filter(|(name, _)| foreign(name)) {
            command.env_remove(name);
        }
        let bin = Path::new(env!("CARGO_BIN_EXE_partwright"))
            .parent()
            .unwrap();
        let path = std::env::var_os("PATH").unwrap_or_default();
        let first = ours.then(|| bin.to_owned()).into_iter();
        let path = std::env::join_paths(first.chain(std::env::split_paths(&path))).unwrap();
        command
            .env("PATH", path)
            .env("PRE_COMMIT_HOME", here.join("store"))
            .env("GIT_CONFIG_GLOBAL", here.join("no-such-file"))
            .env("GIT_CONFIG_NOSYSTEM", "1")
            .env("GIT_TERMINAL_PROMPT", "0")
            // Clones by path are for tests.
            .env("GIT_CONFIG_COUNT", "1")
            .env("GIT_CONFIG_KEY_0", "protocol.file.allow")
            .env("GIT_CONFIG_VALUE_0", "always");
        for who in ["AUTHOR", "COMMITTER"] {
            command
                .env(format!("GIT_{who}_NAME"), "The lamplighter")
                .env(format!("GIT_{who}_EMAIL"), "lamplighter@harbour.example");
        }
        command
    }
}

/// Where the framework builds.
fn built() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("target/pre-commit")
}

/// Removes what earlier runs built of our own: each run clones to another folder, and nothing of
/// theirs is used again.
pub(crate) fn forget_earlier_builds() {
    for folder in ["deps", ".fingerprint", "build"] {
        let entries = fs::read_dir(built().join("release").join(folder));
        for entry in entries.into_iter().flatten().flatten() {
            if entry.file_name().to_string_lossy().contains("partwright") {
                let path = entry.path();
                let gone = fs::remove_file(&path).or_else(|_| fs::remove_dir_all(&path));
                gone.unwrap();
            }
        }
    }
}

fn foreign(name: &OsString) -> bool {
    let name = name.to_string_lossy();
    name.starts_with("GIT_") || name.starts_with("PRE_COMMIT")
}

/// The repository as it stands, without what git ignores.
fn copy_program(to: &Path) {
    let root = Path::new(env!("CARGO_MANIFEST_DIR"));
    let walk = ignore::WalkBuilder::new(root)
        .hidden(false)
        .require_git(false)
        .filter_entry(|entry| entry.file_name() != ".git")
        .build();
    for entry in walk.flatten() {
        if entry.file_type().is_some_and(|kind| kind.is_file()) {
            let path = to.join(entry.path().strip_prefix(root).unwrap());
            fs::create_dir_all(path.parent().unwrap()).unwrap();
            fs::copy(entry.path(), path).unwrap();
        }
    }
}
