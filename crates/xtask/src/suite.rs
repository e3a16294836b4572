//! `cargo xtask test`: every check and test there is, the heavy ones included.

use std::path::Path;
use std::process::{Command, Stdio};

use crate::{root, say, tools};

/// The outside cases, by what their tests print: how many must have run where the data is there.
const OUTSIDE: &[(&str, usize)] = &[
    ("first-species figures in two parts", 6),
    ("figures in their own species", 75),
    ("parallels in 231 pieces", 13),
    ("contrary consecutives in 231 pieces", 30),
    ("consecutives in 545 pieces", 1042),
    ("judged passages", 51),
    ("dissonances of the treatise are figures", 328),
    ("pieces transposed have the same findings", 115),
    ("moments of analysts", 2378),
    ("chords as analysts state them", 2379),
    ("scores written and read back", 545),
];

pub(crate) fn run() -> Result<(), String> {
    let cargo = |words: &[&str]| {
        let mut command = Command::new(env!("CARGO"));
        command.args(words).current_dir(root());
        command
    };
    step(
        "the code is formatted",
        &mut cargo(&["fmt", "--all", "--check"]),
    )?;
    step(
        "the lints are silent",
        &mut cargo(&[
            "clippy",
            "--workspace",
            "--all-targets",
            "--",
            "-D",
            "warnings",
        ]),
    )?;
    step(
        "the documentation is whole",
        cargo(&["doc", "--workspace", "--no-deps", "--quiet"]).env("RUSTDOCFLAGS", "-D warnings"),
    )?;
    step("the tests pass", &mut cargo(&["test", "--workspace"]))?;
    outside(&mut cargo(&[
        "test",
        "--test",
        "outside",
        "--",
        "--nocapture",
        "--test-threads=1",
    ]))?;
    step(
        "the main job runs as the README says",
        &mut cargo(&[
            "run",
            "--release",
            "--",
            "check",
            "--fail-on",
            "never",
            "demo-scores",
        ]),
    )?;
    step(
        "real editors show the findings, mend and grant licences",
        cargo(&["test", "--test", "editors", "--", "--nocapture"])
            .env("PARTWRIGHT_NVIM", tools::neovim()?)
            .env("PARTWRIGHT_EMACS", tools::emacs()?)
            .env("PARTWRIGHT_NPM", tools::vscode_extension()?),
    )?;
    hooks()?;
    if std::env::var_os("CI").is_some() {
        step(
            "nothing generated was stale",
            Command::new("git")
                .args(["diff", "--exit-code"])
                .current_dir(root()),
        )?;
    }
    say("All of it passed.");
    Ok(())
}

/// The git hooks under the real pre-commit framework, which builds the program anew.
pub(crate) fn hooks() -> Result<(), String> {
    let mut command = Command::new(env!("CARGO"));
    command
        .args(["test", "--test", "precommit", "--", "--nocapture"])
        .current_dir(root())
        .env("PARTWRIGHT_PRE_COMMIT", tools::pre_commit()?);
    step(
        "git hooks refuse, align and mend under pre-commit",
        &mut command,
    )
}

fn step(what: &str, command: &mut Command) -> Result<(), String> {
    say(&format!("\n== {what}"));
    let status = command.status().map_err(|e| format!("{what}: {e}"))?;
    if status.success() {
        Ok(())
    } else {
        Err(format!("Not so: {what}."))
    }
}

/// Runs the outside cases again with their words, and holds their number to what is known.
fn outside(command: &mut Command) -> Result<(), String> {
    say("\n== the outside cases ran");
    let output = command
        .stderr(Stdio::inherit())
        .output()
        .map_err(|e| e.to_string())?;
    if !output.status.success() {
        return Err("An outside case failed.".to_owned());
    }
    let text = String::from_utf8_lossy(&output.stdout);
    let ran: Vec<(usize, &str)> = text
        .lines()
        .filter_map(|line| line.split_once("outside: ").map(|(_, words)| words))
        .filter_map(|words| {
            let (number, what) = words.split_once(' ')?;
            Some((number.parse().ok()?, what.trim()))
        })
        .collect();
    for (number, what) in &ran {
        say(&format!("{number:>6} {what}"));
    }
    say(&format!(
        "{:>6} outside cases in all",
        ran.iter().map(|r| r.0).sum::<usize>()
    ));
    let data =
        std::env::var_os("PARTWRIGHT_SHARED").map_or_else(|| root().join("../shared"), Into::into);
    if !Path::new(&data).join("data").is_dir() {
        say("The outside data is not here: its cases were left out.");
        return Ok(());
    }
    for (what, number) in OUTSIDE {
        if !ran.contains(&(*number, *what)) {
            return Err(format!("Expected {number} {what}."));
        }
    }
    Ok(())
}
