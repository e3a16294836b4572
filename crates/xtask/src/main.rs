//! Chores of the repository. `cargo xtask` lists them.

mod list;
mod scaffold;
mod suite;
mod tools;

use std::path::PathBuf;
use std::process::ExitCode;

const HELP: &str = "\
cargo xtask test          every check and test there is; installs what they need
cargo xtask hooks         of these, the git hooks under the real pre-commit framework alone
cargo xtask list          write the generated list of rules anew
cargo xtask rule NAME     start a rule: NAME is FAMILY/ID, as in motion/parallel-fifths
";

fn main() -> ExitCode {
    let arguments: Vec<String> = std::env::args().skip(1).collect();
    let words: Vec<&str> = arguments.iter().map(String::as_str).collect();
    let done = match words.as_slice() {
        ["test"] => suite::run(),
        ["hooks"] => suite::hooks(),
        ["list"] => list::write().map(|_| ()),
        ["rule", name] => scaffold::rule(name),
        _ => Err(HELP.to_owned()),
    };
    match done {
        Ok(()) => ExitCode::SUCCESS,
        Err(message) => {
            say(&message);
            ExitCode::FAILURE
        }
    }
}

/// The root of the repository.
fn root() -> PathBuf {
    PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("../..")
}

#[allow(clippy::print_stderr)]
fn say(message: &str) {
    eprintln!("{}", message.trim_end());
}
