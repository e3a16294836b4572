//! What is read again after an edit is what is read from nothing: the chords and every finding.

#![allow(clippy::unwrap_used, clippy::panic)]

use partwright_check::{Checked, Wishes};
use proptest::prelude::*;
use proptest::sample::select;

/// Enough for several stretches of harmony.
const BARS: usize = 104;

/// Chords of C major and some beyond it, soprano first.
const CHORDS: [[&str; 4]; 8] = [
    ["C5", "G4", "E4", "C3"],
    ["B4", "G4", "D4", "G2"],
    ["C5", "A4", "F4", "F3"],
    ["A4", "F4", "D4", "D3"],
    ["C5", "A4", "E4", "A2"],
    ["D5", "A4", "F#4", "D3"],
    ["B4", "F4", "D4", "G3"],
    ["C#5", "A4", "E4", "A2"],
];

/// A bar: the chords of its four beats.
type Bar = [usize; 4];

fn sheet(head: &str, bars: &[Bar], changed: &[(usize, usize, usize, &str)]) -> String {
    let mut text = format!("style {head}\nmetre 4/4\n\n");
    for (system, bars) in bars.chunks(4).enumerate() {
        for (voice, name) in ["S", "A", "T", "B"].iter().enumerate() {
            text += name;
            for (b, bar) in bars.iter().enumerate() {
                text += " |";
                for (beat, chord) in bar.iter().enumerate() {
                    let here = (system * 4 + b, voice, beat);
                    let other = changed
                        .iter()
                        .rev()
                        .find(|(b, v, at, _)| (*b, *v, *at) == here);
                    let note = other.map_or(CHORDS[*chord][voice], |(_, _, _, note)| note);
                    text += &format!(" {note}");
                }
            }
            // Sections end now and then, and the piece where its length happens to be so.
            text += if system % 6 == 5 { " ||\n" } else { " |\n" };
        }
        text += "\n";
    }
    text
}

fn bar() -> impl Strategy<Value = Bar> {
    [
        0..CHORDS.len(),
        0..CHORDS.len(),
        0..CHORDS.len(),
        0..CHORDS.len(),
    ]
}

#[derive(Clone, Debug)]
enum Edit {
    Note(usize, usize, usize, &'static str),
    BarOut(usize),
    BarIn(usize, Bar),
}

fn edit() -> impl Strategy<Value = Edit> {
    let note = select(vec![
        "G4", "D4.E4", "F#4", "_", "-", "Bb3", "?", "H4", "C5^", "E4.F4.G4",
    ]);
    prop_oneof![
        6 => (0..BARS, 0..4_usize, 0..4_usize, note).prop_map(|(b, v, at, n)| Edit::Note(b, v, at, n)),
        1 => (0..BARS).prop_map(Edit::BarOut),
        1 => (0..BARS, bar()).prop_map(|(at, bar)| Edit::BarIn(at, bar)),
    ]
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(6))]

    #[test]
    fn checking_again_is_checking(
        head in select(vec!["chorale", "chorale\nkey C major", "free", "motet", "species-1"]),
        music in prop::collection::vec(bar(), BARS),
        edits in prop::collection::vec(edit(), 1..8),
    ) {
        let wishes = Wishes::default();
        let mut bars = music;
        let mut changed = Vec::new();
        let mut checked = Checked::text(&sheet(head, &bars, &changed), &wishes);
        for edit in edits {
            match edit {
                Edit::Note(bar, voice, beat, note) => changed.push((bar, voice, beat, note)),
                Edit::BarOut(at) => {
                    bars.remove(at % bars.len());
                }
                Edit::BarIn(at, bar) => bars.insert(at % bars.len(), bar),
            }
            let text = sheet(head, &bars, &changed);
            checked = checked.again(&text, &wishes);
            let fresh = Checked::text(&text, &wishes);
            let chords = |checked: &Checked| {
                let piece = checked.piece();
                checked.analysis.harmony(piece.score, piece.texture).segments().to_vec()
            };
            prop_assert_eq!(chords(&checked), chords(&fresh));
            prop_assert_eq!(&checked.findings, &fresh.findings);
        }
    }
}
