//! The language server (Language Server Protocol 3.17): findings and what belongs to them, in
//! any editor that speaks it.
//!
//! The README beside this crate tells how it is built and which traps it closes. No other crate
//! knows the protocol's types.
#![deny(clippy::print_stdout, clippy::print_stderr, clippy::dbg_macro)]

mod asks;
mod checker;
mod convert;
mod documents;
mod features;
mod frames;
mod hooks;
mod houses;
mod lifecycle;
mod lines;
mod names;
mod outbox;
mod parent;
mod serve;
mod server;
mod session;
mod systems;
mod text;
mod wire;

pub use serve::{Options, serve, serve_with};
