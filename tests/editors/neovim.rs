//! Neovim.

use std::fs::{self, File};
use std::path::Path;
use std::process::{Command, Stdio};

use crate::desk::{self, Desk, LICENCE, LICENSED, MEND, MENDED, PARALLEL_FIFTHS, SHEET};
use crate::said::Said;

#[test]
fn a_composer_at_neovim() {
    let Some(nvim) = std::env::var_os("PARTWRIGHT_NVIM") else {
        println!("left out: no Neovim; `cargo xtask test` installs it");
        return;
    };
    let desk = Desk::new();
    let mut said = run(nvim.as_ref(), &desk);

    said.exactly("typed :edit");
    said.exactly("filetype voicesheet, comment // %s");
    said.exactly("attached to partwright");
    said.exactly("server processes 1");
    let first = said.after("server ");
    parallel_fifths(&mut said);

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

    said.exactly("typed gg]dgra, took Move");
    let choices = said.all("choice ");
    assert_eq!(choices.first().unwrap(), MEND);
    assert_eq!(choices.last().unwrap(), LICENCE);
    said.exactly(&format!("changed {MENDED}"));
    said.exactly("findings 0");
    said.exactly("typed u");
    parallel_fifths(&mut said);
    said.exactly("typed gg]dgra, took Grant");
    assert_eq!(said.all("choice "), choices);
    for line in LICENSED {
        said.exactly(&format!("changed {line}"));
    }
    said.exactly("findings 0");
    said.exactly("cursor at why");
    said.exactly("typed u");
    parallel_fifths(&mut said);

    said.exactly("typed cwG<Esc>");
    said.exactly("findings 0");
    said.exactly("typed u");
    parallel_fifths(&mut said);
    said.exactly("typed cwH<Esc>");
    said.exactly("findings 1");
    said.exactly("finding 6:21 \"H\" error partwright reading");
    let message = said.after("message ");
    assert!(message.contains("German"), "{message}");
    said.exactly("typed ucwG<Esc>");
    said.exactly("findings 0");

    said.exactly("typed gggqG");
    let aligned = said.all("changed ");
    said.exactly("findings 0");
    said.exactly("typed :write");
    // It is asked for its findings; pushed as well they would stand there twice.
    said.exactly("pushed 0");
    said.exactly("ended with status 0, signal 0");
    said.exactly("findings 0");

    said.exactly("server processes 1");
    let second = said.after("server ");
    assert_ne!(first, second);
    said.exactly("findings 0");
    said.exactly("typed :quit");
    said.end();

    desk::gone(&second);
    let written = fs::read_to_string(desk.sheet()).unwrap();
    let music = SHEET.find("S |").unwrap();
    let rows = [
        "S | F#4 - G - | A4 G A  G  | F#4 - E  - | D4 - - - ||",
        "B | D3  - E - | D3 E F# B2 | D3  - C# - | D3 - - - ||",
    ];
    assert_eq!(aligned, rows);
    let wanted = format!("{}{}\n", &SHEET[..music], rows.join("\n"));
    assert_eq!(written, wanted);
}

/// Runs the script in Neovim. The editor has no home but the desk.
fn run(nvim: &Path, desk: &Desk) -> Said {
    let mut command = Command::new(nvim);
    command
        .args(["--headless", "--clean"])
        .args([
            "--cmd",
            "lua vim.opt.runtimepath:prepend(vim.env.EDITOR_FOLDER)",
        ])
        .arg("-S")
        .arg(desk::root().join("tests/editors/neovim.lua"))
        .env("EDITOR_FOLDER", desk::root().join("editors/neovim"))
        .env("PATH", desk::path_with_program())
        .current_dir(desk.path())
        .stdin(Stdio::null())
        .stdout(File::create(desk.path().join("out")).unwrap())
        .stderr(File::create(desk.path().join("err")).unwrap());
    for folder in ["CONFIG", "DATA", "STATE", "CACHE"] {
        command.env(format!("XDG_{folder}_HOME"), desk.path().join("home"));
    }
    for variable in ["NVIM_APPNAME", "NVIM_LOG_FILE", "VIMINIT"] {
        command.env_remove(variable);
    }
    let status = desk::end(command.spawn().unwrap());
    let out = desk.read("out");
    assert!(
        status.is_some_and(|status| status.success()),
        "Neovim ended with {status:?}.\n{out}\n-- standard error\n{}\n-- its log\n{}",
        desk.read("err"),
        desk.read("home/nvim/lsp.log"),
    );
    Said::new(&out)
}

/// The one finding of the sheet as it was: at the arrival, with its three other notes.
#[track_caller]
fn parallel_fifths(said: &mut Said) {
    said.exactly("findings 1");
    said.exactly("finding 6:21 \"B\" error partwright parallel-fifths");
    said.exactly(&format!("message {PARALLEL_FIFTHS}"));
    said.exactly("related 6 \"A4\" from here: S A4");
    said.exactly("related 7 \"D3\" from here: voice B D3");
    said.exactly("related 7 \"E\" with: voice B E3");
}
