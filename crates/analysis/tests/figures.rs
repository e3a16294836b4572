//! Every figure: what fits it, and what just misses it, with the word for what is missing.

#![allow(clippy::unwrap_used, clippy::panic)]

#[path = "figures/held.rs"]
mod held;
#[path = "figures/read.rs"]
mod read;
#[path = "figures/scores.rs"]
mod scores;
#[path = "figures/struck.rs"]
mod struck;
