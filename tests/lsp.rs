//! The language server as a client sees it: `partwright serve`, driven over pipes.
//!
//! `PARTWRIGHT_BINARY` names another build to drive, a release build for instance.
#![allow(
    clippy::unwrap_used,
    clippy::expect_used,
    clippy::panic,
    reason = "a helper of tests fails as a test does"
)]

#[path = "lsp/actions.rs"]
mod actions;
#[path = "lsp/broken.rs"]
mod broken;
#[path = "lsp/client.rs"]
mod client;
#[path = "lsp/completion.rs"]
mod completion;
#[path = "lsp/document.rs"]
mod document;
#[path = "lsp/findings.rs"]
mod findings;
#[path = "lsp/formatting.rs"]
mod formatting;
#[path = "lsp/hints.rs"]
mod hints;
#[path = "lsp/houses.rs"]
mod houses;
#[path = "lsp/hover.rs"]
mod hover;
#[path = "lsp/lifecycle.rs"]
mod lifecycle;
#[path = "lsp/names.rs"]
mod names;
#[path = "lsp/outline.rs"]
mod outline;
#[path = "lsp/properties.rs"]
mod properties;
#[path = "lsp/pull.rs"]
mod pull;
#[path = "lsp/random.rs"]
mod random;
#[path = "lsp/registration.rs"]
mod registration;
#[path = "lsp/rude.rs"]
mod rude;
#[path = "lsp/slow.rs"]
mod slow;
#[path = "lsp/sync.rs"]
mod sync;
#[path = "lsp/tokens.rs"]
mod tokens;
