//! Findings per hundred bars, by rule and severity, in music we did not write.
//!
//! The table stands in `tests/outside/findings.md`. A stale one is rewritten, and then fails.

use std::collections::BTreeMap;
use std::fmt::Write as _;
use std::path::Path;

use partwright_check::{Severity, Wishes, check_score};
use partwright_rules::Style;

use crate::scores::{Piece, chorales, set};

/// Counts by rule: faults, weaknesses, remarks.
type Counts = BTreeMap<&'static str, [usize; 3]>;

fn count(pieces: &[Piece], style: Style) -> (usize, Counts) {
    let (mut bars, mut counts) = (0, Counts::new());
    for piece in pieces {
        bars += piece.score.bars.len();
        for finding in check_score(&piece.score, &Wishes::of_style(style)) {
            let slot = match finding.severity {
                Severity::Fault => 0,
                Severity::Weakness => 1,
                Severity::Remark => 2,
            };
            counts.entry(finding.rule).or_default()[slot] += 1;
        }
    }
    (bars, counts)
}

fn section(title: &str, pieces: &[Piece], style: Style) -> String {
    let (bars, counts) = count(pieces, style);
    let per = |n: usize| format!("{:.2}", n as f64 * 100.0 / bars as f64);
    let mut text = format!(
        "## {title}, in `{}`: {} pieces, {bars} bars\n\n| rule | faults | weaknesses | remarks |\n| --- | --- | --- | --- |\n",
        style.name(),
        pieces.len()
    );
    let mut sums = [0; 3];
    for (rule, row) in &counts {
        let [f, w, r] = row.map(per);
        writeln!(text, "| {rule} | {f} | {w} | {r} |").unwrap();
        for (sum, n) in sums.iter_mut().zip(row) {
            *sum += n;
        }
    }
    let [f, w, r] = sums.map(per);
    writeln!(text, "| **all** | {f} | {w} | {r} |\n").unwrap();
    text
}

#[test]
fn the_table_of_findings_is_true() {
    let (Some(renaissance), Some(mut chorales)) = (set("renaissance"), chorales()) else {
        return;
    };
    let mut text = String::from(
        "# Findings per hundred bars\n\nCounted by `cargo test --test outside table`, which keeps this page true. The sets and their\norigins are named in `scores.rs`. Chorales are read over a sixteen-foot bass.\n\n",
    );
    text += &section(
        "Vocal polyphony of the 16th century",
        &renaissance,
        Style::Motet,
    );
    text += &section("Chorales of J. S. Bach", &chorales, Style::Chorale);
    text += &section("Chorales of J. S. Bach", &chorales, Style::Free);
    let marked = |piece: &Piece| {
        let mut notes = piece.score.voices.iter().flat_map(|voice| &voice.notes);
        notes.any(|note| note.fermata)
    };
    chorales.retain(marked);
    text += &section(
        "Those of them with fermatas at the ends of phrases",
        &chorales,
        Style::Chorale,
    );
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/outside/findings.md");
    let text = text.trim_end().to_owned() + "\n";
    if std::fs::read_to_string(&path).ok().as_deref() != Some(&text) {
        std::fs::write(&path, &text).unwrap();
        panic!("{} was stale; it is rewritten", path.display());
    }
    print!("outside: {text}");
}
