//! The language server as a client sees it: `partwright serve`, driven over pipes.
//!
//! `PARTWRIGHT_BINARY` names another build to drive, a release build for instance.
#![allow(
    clippy::unwrap_used,
    clippy::expect_used,
    clippy::panic,
    reason = "a helper of tests fails as a test does"
)]

#[path = "lsp/broken.rs"]
mod broken;
#[path = "lsp/client.rs"]
mod client;
#[path = "lsp/document.rs"]
mod document;
#[path = "lsp/findings.rs"]
mod findings;
#[path = "lsp/hover.rs"]
mod hover;
#[path = "lsp/lifecycle.rs"]
mod lifecycle;
#[path = "lsp/random.rs"]
mod random;
#[path = "lsp/slow.rs"]
mod slow;
#[path = "lsp/sync.rs"]
mod sync;
