//! Real editors, driven by keys, against the real server.
//!
//! Neovim is taken from `PARTWRIGHT_NVIM`, Emacs from `PARTWRIGHT_EMACS`, and the npm that packages
//! the extension for VS Code from `PARTWRIGHT_NPM`; `cargo xtask test` installs them and sets these.

#![allow(clippy::unwrap_used, clippy::panic, clippy::print_stdout)]

#[path = "editors/desk.rs"]
mod desk;
#[path = "editors/emacs.rs"]
mod emacs;
#[path = "editors/neovim.rs"]
mod neovim;
#[path = "editors/said.rs"]
mod said;
#[path = "editors/vscode.rs"]
mod vscode;
