//! The whole way, piece by piece, on sheets of 100, 1,000 and 10,000 bars.
//!
//! `cargo bench --bench whole`. Bytes a second are of sheet text.

#![allow(clippy::print_stdout)]

#[path = "generated.rs"]
mod generated;

use divan::Bencher;
use divan::counter::BytesCount;
use partwright_check::harmony::Harmony;
use partwright_check::{Analysis, Checked, Wishes};
use partwright_rules::{FAMILIES, Strictness, Style};
use partwright_score::Texture;
use partwright_sheet::Sheet;

#[global_allocator]
static ALLOCATIONS: divan::AllocProfiler = divan::AllocProfiler::system();

const BARS: [usize; 3] = [100, 1_000, 10_000];

fn main() {
    for bars in BARS {
        let text = generated::sheet(bars, 1);
        let checked = Checked::text(&text, &Wishes::default());
        let steps = checked.texture.sonorities().len();
        println!(
            "{bars} bars: {} bytes, {steps} sonorities, {} findings",
            text.len(),
            checked.findings.len()
        );
    }
    divan::main();
}

#[divan::bench(args = BARS)]
fn parse(bencher: Bencher<'_, '_>, bars: usize) {
    let text = generated::sheet(bars, 1);
    bencher
        .counter(BytesCount::of_str(&text))
        .bench(|| Sheet::read(&text));
}

#[divan::bench(args = BARS)]
fn lower(bencher: Bencher<'_, '_>, bars: usize) {
    let text = generated::sheet(bars, 1);
    let sheet = Sheet::read(&text);
    bencher
        .counter(BytesCount::of_str(&text))
        .bench(|| sheet.lower(&text));
}

#[divan::bench(args = BARS)]
fn score(bencher: Bencher<'_, '_>, bars: usize) {
    let text = generated::sheet(bars, 1);
    let reading = Sheet::read(&text).lower(&text);
    bencher
        .counter(BytesCount::of_str(&text))
        .bench(|| Texture::of(&reading.score));
}

#[divan::bench(args = BARS)]
fn analysis(bencher: Bencher<'_, '_>, bars: usize) {
    let text = generated::sheet(bars, 1);
    let checked = Checked::text(&text, &Wishes::default());
    let (score, texture) = (&checked.reading.score, &checked.texture);
    bencher
        .counter(BytesCount::of_str(&text))
        .bench(|| Analysis::of(score, texture));
}

/// Chords and keys, read from nothing.
#[divan::bench(args = BARS)]
fn harmony(bencher: Bencher<'_, '_>, bars: usize) {
    let text = generated::sheet(bars, 1);
    let checked = Checked::text(&text, &Wishes::default());
    let (score, texture) = (&checked.reading.score, &checked.texture);
    let dissonances = checked.analysis.dissonances();
    bencher
        .counter(BytesCount::of_str(&text))
        .bench(|| Harmony::of(score, texture, dissonances));
}

/// The same where one note was changed, and the rest is known.
#[divan::bench(args = BARS)]
fn harmony_again(bencher: Bencher<'_, '_>, bars: usize) {
    let text = generated::sheet(bars, 1);
    let checked = Checked::text(&text, &Wishes::default());
    let place = text.len() / 2 + text[text.len() / 2..].find(" G").unwrap_or(0) + 1;
    let mut typed = text.clone();
    typed.replace_range(place..=place, "A");
    let after = checked.again(&typed, &Wishes::default());
    let harmony = checked
        .analysis
        .harmony(&checked.reading.score, &checked.texture);
    let (score, texture) = (&after.reading.score, &after.texture);
    let dissonances = after.analysis.dissonances();
    bencher
        .counter(BytesCount::of_str(&text))
        .bench(|| Harmony::again(score, texture, dissonances, Some(harmony)));
}

#[divan::bench(args = BARS)]
fn rules(bencher: Bencher<'_, '_>, bars: usize) {
    let text = generated::sheet(bars, 1);
    let checked = Checked::text(&text, &Wishes::default());
    let strictness = Strictness::plain(Style::Chorale);
    bencher
        .counter(BytesCount::of_str(&text))
        .bench(|| partwright_check::notes_findings(&checked.piece(), &strictness));
}

/// What each family costs by itself, on a thousand bars.
#[divan::bench(args = FAMILIES)]
fn family(bencher: Bencher<'_, '_>, family: &str) {
    let text = generated::sheet(1_000, 1);
    let checked = Checked::text(&text, &Wishes::default());
    let mut strictness = Strictness::plain(Style::Chorale);
    strictness.pick = vec![family.to_owned()];
    bencher
        .counter(BytesCount::of_str(&text))
        .bench(|| partwright_check::notes_findings(&checked.piece(), &strictness));
}

#[divan::bench(args = BARS)]
fn check(bencher: Bencher<'_, '_>, bars: usize) {
    let text = generated::sheet(bars, 1);
    bencher
        .counter(BytesCount::of_str(&text))
        .bench(|| Checked::text(&text, &Wishes::default()));
}

#[divan::bench(args = BARS)]
fn check_again_after_a_keystroke(bencher: Bencher<'_, '_>, bars: usize) {
    let text = generated::sheet(bars, 1);
    let checked = Checked::text(&text, &Wishes::default());
    let place = text.len() / 2 + text[text.len() / 2..].find(" G").unwrap_or(0) + 1;
    let mut typed = text.clone();
    typed.replace_range(place..=place, "A");
    bencher
        .counter(BytesCount::of_str(&text))
        .bench(|| checked.again(&typed, &Wishes::default()));
}
