//! The hooks of `.pre-commit-hooks.yaml` under the real framework, in real repositories.
//!
//! pre-commit is taken from `PARTWRIGHT_PRE_COMMIT`; `cargo xtask test` installs it and sets that.

#![allow(clippy::unwrap_used, clippy::panic, clippy::print_stdout)]

#[path = "precommit/desk.rs"]
mod desk;

use desk::{Desk, pre_commit};

/// Parallel fifths.
const FLAWED: &str = "metre 2/4\n\nS | D5 E | F E ||\nB | G3 A | A B ||\n";
/// None, and in columns.
const CLEAN: &str = "metre   2/4\n\nS | D5 C | D - ||\nB | G3 A | G - ||\n";
/// Out of columns.
const RAGGED: &str = "metre   2/4\n\nS | D5   C | D - ||\nB | G3 A | G - ||\n";
/// An octave figure in doubt.
const CARELESS: &str = "metre   2/4\n\nS | B4 C | D4 - ||\nB | G3 A | G3 - ||\n";

macro_rules! framework {
    () => {
        match pre_commit() {
            Some(path) => path,
            None => {
                println!("left out: no pre-commit; `cargo xtask test` installs it");
                return;
            }
        }
    };
}

#[test]
fn a_fault_is_refused_and_what_is_mended_passes() {
    let desk = Desk::new(framework!());
    desk.hooks(&["partwright-check-system"]);
    desk.write("hymns/evensong.voices", FLAWED);
    desk.write("notes.txt", "no sheet");
    let (status, said) = desk.run(&["run", "--all-files"]);
    assert_eq!(status, 1, "{said}");
    assert!(
        said.contains("parallel-fifths") && said.contains("hymns/evensong.voices:3:8"),
        "{said}"
    );
    // A commit is refused, and one without the fault is made.
    assert_eq!(desk.run(&["install"]).0, 0);
    let (made, said) = desk.commit();
    assert!(!made && said.contains("parallel-fifths"), "{said}");
    desk.write("hymns/evensong.voices", CLEAN);
    let (made, said) = desk.commit();
    assert!(made && said.contains("Passed"), "{said}");
    // A sheet under a house style of its own.
    desk.write("quay/watch.voices", FLAWED);
    let house = "[[rule]]\nrule = \"parallel-fifths\"\nseverity = \"remark\"\nreason = \"horns\"\n";
    desk.write("quay/partwright.toml", house);
    let (made, said) = desk.commit();
    assert!(made, "{said}");
    // Something else alone needs no check.
    desk.write("notes.txt", "still no sheet");
    let (made, said) = desk.commit();
    assert!(made && said.contains("Skipped"), "{said}");
}

#[test]
fn sheets_are_aligned_and_mended_and_the_second_time_passes() {
    let desk = Desk::new(framework!());
    desk.hooks(&["partwright-mend-system", "partwright-align-system"]);
    desk.write("ragged.voices", RAGGED);
    desk.write("careless.voices", CARELESS);
    desk.write("clean.voices", CLEAN);
    let (status, said) = desk.run(&["run", "--all-files"]);
    assert_eq!(status, 1, "{said}");
    assert_eq!(
        said.matches("files were modified by this hook").count(),
        2,
        "{said}"
    );
    assert_eq!(desk.read("ragged.voices"), CLEAN);
    assert_eq!(
        desk.read("careless.voices"),
        "metre   2/4\n\nS | B4 C4 | D4 - ||\nB | G3 A  | G3 - ||\n"
    );
    let (status, said) = desk.run(&["run", "--all-files"]);
    assert_eq!(status, 0, "{said}");
}

#[test]
fn the_hooks_can_be_tried_without_configuration() {
    let desk = Desk::new(framework!());
    desk.write("evensong.voices", FLAWED);
    desk.write("careless.voices", CARELESS);
    let source = desk.source().to_str().unwrap().to_owned();
    let try_one = |hook: &str, sheet: &str| {
        let (status, said) = desk.run(&["try-repo", &source, hook, "--files", sheet]);
        // What is tried is the commit, not a copy the framework makes of changes beside it.
        assert!(!said.contains("uncommitted"), "{said}");
        (status, said)
    };
    let (status, said) = try_one("partwright-check-system", "evensong.voices");
    assert!(status == 1 && said.contains("parallel-fifths"), "{said}");
    let (status, said) = try_one("partwright-mend-system", "careless.voices");
    assert!(status == 1 && said.contains("modified"), "{said}");
    assert!(desk.read("careless.voices").contains("| B4 C4 |"), "{said}");
    // Where every octave is plain the writing needs no mend, however faulty the music is.
    let (status, said) = try_one("partwright-mend-system", "evensong.voices");
    assert!(status == 0 && said.contains("Passed"), "{said}");
    assert_eq!(desk.read("evensong.voices"), FLAWED);
    let (status, said) = try_one("partwright-no-such-hook", "evensong.voices");
    assert!(
        status != 0 && said.contains("partwright-no-such-hook"),
        "{said}"
    );
}

/// The framework builds the program from the repository, as it would on a musician's machine.
#[test]
fn the_program_is_built_by_the_hook_itself() {
    let desk = Desk::new(framework!());
    desk::forget_earlier_builds();
    desk.hooks(&["partwright-check"]);
    desk.write("evensong.voices", FLAWED);
    let (status, said) = desk.run_without_program(&["run", "--all-files"]);
    assert_eq!(status, 1, "{said}");
    assert!(said.contains("parallel-fifths"), "{said}");
    desk.write("evensong.voices", CLEAN);
    let (status, said) = desk.run_without_program(&["run", "--all-files"]);
    assert_eq!(status, 0, "{said}");
}
