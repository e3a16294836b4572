//! Emacs, in a terminal of tmux, through which the keys come.

use std::fs;
use std::path::Path;
use std::process::{Command, Stdio};

use crate::desk::{self, Desk, LICENCE, LICENSED, MEND, MENDED, PARALLEL_FIFTHS, SHEET};
use crate::said::Said;

#[test]
fn a_composer_at_emacs() {
    let Some(emacs) = std::env::var_os("PARTWRIGHT_EMACS") else {
        println!("left out: no Emacs; `cargo xtask test` installs it");
        return;
    };
    let desk = Desk::new();
    let mut said = run(emacs.as_ref(), &desk);

    said.exactly("mode voicesheet-mode, comment // ");
    said.exactly("server partwright serve");
    said.exactly("language voicesheet");
    parallel_fifths(&mut said);

    said.exactly("typed M-x flymake-goto-next-error Enter");
    said.exactly("typed M-x eglot-code-actions Enter");
    let choices = said.all("choice ");
    assert_eq!(choices.first().unwrap(), MEND);
    assert_eq!(choices.last().unwrap(), LICENCE);
    // What the editor offers first is the best mend.
    said.exactly("typed Enter");
    said.exactly(&format!("changed {MENDED}"));
    said.exactly("findings 0");

    said.exactly("typed C-_");
    said.exactly("typed M-x flymake-goto-next-error Enter");
    said.exactly("typed M-x eglot-code-actions Enter");
    said.exactly("typed Grant Tab Enter");
    for line in LICENSED {
        said.exactly(&format!("changed {line}"));
    }
    said.exactly("findings 0");
    said.exactly("comments t");

    said.exactly("typed M-x eglot-format-buffer Enter");
    let aligned = [
        "S | F#4 - G - | A4 B*a A  G  | F#4 - E  - | D4 - - - ||",
        "B | D3  - E - | D3 E   F# B2 | D3  - C# - | D3 - - - ||",
    ];
    for row in aligned {
        said.exactly(&format!("changed {row}"));
    }

    let first = said.after("process ");
    said.exactly("typed C-x C-s");
    said.exactly("typed M-x eglot-shutdown Enter");
    said.exactly("shutdown answered with nil");
    said.exactly("findings 0");
    said.exactly("typed M-x eglot Enter");
    let second = said.after("process ");
    assert_ne!(first, second);
    said.exactly("typed C-x C-c");
    said.end();

    desk::gone(&first);
    desk::gone(&second);
    let written = fs::read_to_string(desk.sheet()).unwrap();
    let music = SHEET.find("S |").unwrap();
    let [_, licence] = LICENSED;
    let wanted = format!(
        "{}{}\n{}\n{licence}\n",
        &SHEET[..music],
        aligned[0],
        aligned[1]
    );
    assert_eq!(written, wanted);
}

/// Runs the script in Emacs, set up as its own page says. The editor has no home but the desk.
fn run(emacs: &Path, desk: &Desk) -> Said {
    let home = desk.path().join(".emacs.d");
    fs::create_dir(&home).unwrap();
    fs::write(home.join("init.el"), init()).unwrap();
    // Compiling to machine code in the background is of no use to one run.
    fs::write(
        home.join("early-init.el"),
        "(setq native-comp-deferred-compilation nil native-comp-jit-compilation nil)",
    )
    .unwrap();
    let tmux = || {
        let mut command = Command::new("tmux");
        command
            .args(["-u", "-L", "partwright", "-f", "/dev/null"])
            .env_remove("TMUX")
            .env("TMUX_TMPDIR", desk.path())
            .current_dir(desk.path())
            .stdin(Stdio::null())
            .stdout(Stdio::null())
            .stderr(Stdio::null());
        command
    };
    let started = tmux()
        .args(["new-session", "-d", "-x", "120", "-y", "40"])
        .arg(emacs)
        .args(["--no-window-system", "--load"])
        .arg(desk::root().join("tests/editors/emacs.el"))
        .arg(desk.sheet())
        .env("HOME", desk.path())
        .env("PATH", desk::path_with_program())
        .env("WORDS", desk.path().join("words"))
        .env("LC_ALL", "C.UTF-8")
        .status();
    assert!(
        started.is_ok_and(|status| status.success()),
        "tmux did not start."
    );
    // The terminal goes with the program in it.
    let ended = desk::in_time(|| !tmux().arg("has-session").status().unwrap().success());
    let _ = tmux().arg("kill-server").status();
    let words = desk.read("words");
    assert!(ended, "Emacs did not end.\n{words}");
    assert!(!words.contains("FAILED"), "{words}");
    Said::new(&words)
}

/// The lines for the init file that the page gives.
fn init() -> String {
    let folder = desk::root().join("editors/emacs");
    let page = fs::read_to_string(folder.join("README.md")).unwrap();
    let block = page.split("```").nth(1).unwrap();
    let lines = block.strip_prefix("elisp").unwrap();
    let placed = lines.replace(
        "/path/to/partwright/editors/emacs",
        folder.to_str().unwrap(),
    );
    assert_ne!(placed, lines);
    placed
}

#[track_caller]
fn parallel_fifths(said: &mut Said) {
    said.exactly("findings 1");
    said.exactly("finding 6:21 \"B\" eglot-error");
    said.exactly(&format!(
        "message partwright [parallel-fifths]: {PARALLEL_FIFTHS}"
    ));
}
