//! Sheets set in columns: what they look like, and what must never change.

#![allow(clippy::unwrap_used, clippy::panic)]

#[allow(dead_code)]
#[path = "grammar/derive.rs"]
mod derive;
#[path = "align/derived.rs"]
mod derived;
#[allow(dead_code)]
#[path = "grammar/ebnf.rs"]
mod ebnf;
#[path = "align/forms.rs"]
mod forms;
#[path = "align/large.rs"]
mod large;
#[path = "align/lawful.rs"]
mod lawful;
#[path = "align/random.rs"]
mod random;
#[allow(dead_code)]
#[path = "grammar/recognise.rs"]
mod recognise;
#[allow(dead_code)]
#[path = "grammar/steer.rs"]
mod steer;
