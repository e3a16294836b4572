//! The program as a whole: what a call prints, where, and how it ends.

// The helpers of tests are no tests to the linter.
#![allow(clippy::unwrap_used, clippy::panic)]

#[path = "cli/align.rs"]
mod align;
#[path = "cli/arguments.rs"]
mod arguments;
#[path = "cli/files.rs"]
mod files;
#[path = "cli/house.rs"]
mod house;
#[path = "cli/json.rs"]
mod json;
#[path = "cli/known.rs"]
mod known;
#[path = "cli/licensed.rs"]
mod licensed;
#[path = "cli/mend.rs"]
mod mend;
#[path = "cli/plain.rs"]
mod plain;
#[path = "cli/rules.rs"]
mod rules;
#[path = "cli/sarif.rs"]
mod sarif;
#[path = "cli/schema.rs"]
mod schema;
#[path = "cli/streams.rs"]
mod streams;
#[path = "cli/support.rs"]
mod support;
