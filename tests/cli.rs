//! The program as a whole: what a call prints, where, and how it ends.

// The helpers of tests are no tests to the linter.
#![allow(clippy::unwrap_used, clippy::panic)]

#[path = "cli/arguments.rs"]
mod arguments;
#[path = "cli/files.rs"]
mod files;
#[path = "cli/json.rs"]
mod json;
#[path = "cli/plain.rs"]
mod plain;
#[path = "cli/rules.rs"]
mod rules;
#[path = "cli/streams.rs"]
mod streams;
#[path = "cli/support.rs"]
mod support;
