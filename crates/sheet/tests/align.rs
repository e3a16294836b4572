//! Sheets set in columns: what they look like, and what must never change.

#![allow(clippy::unwrap_used, clippy::panic)]

#[path = "align/forms.rs"]
mod forms;
#[path = "align/lawful.rs"]
mod lawful;
