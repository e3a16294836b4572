//! Writes a generated sheet of so many bars to standard output: for measuring the server.
//!
//! `cargo run --release --example generate -- 1000 > a.voices`

#[path = "../benches/generated.rs"]
mod generated;

use std::io::Write as _;

fn main() -> std::io::Result<()> {
    let bars = std::env::args()
        .nth(1)
        .and_then(|n| n.parse().ok())
        .unwrap_or(100);
    std::io::stdout().write_all(generated::sheet(bars, 1).as_bytes())
}
