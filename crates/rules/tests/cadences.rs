//! Closes by their names.

#![allow(clippy::unwrap_used)]

use partwright_check::{Checked, Wishes};
use partwright_rules::Cadence;

/// The closes of a sheet, in order.
fn closes(key: &str, rows: [&str; 4]) -> Vec<Cadence> {
    let [s, a, t, b] = rows;
    let sheet =
        format!("style chorale\nkey {key}\nmetre 4/4\n\nS | {s}\nA | {a}\nT | {t}\nB | {b}\n");
    let checked = Checked::text(&sheet, &Wishes::default());
    assert!(
        checked.findings.iter().all(|f| f.rule != "reading"),
        "{sheet}"
    );
    let piece = checked.piece();
    piece.chords().filter_map(|chord| chord.cadence()).collect()
}

#[test]
fn each_close_has_its_name() {
    for (key, rows, name) in [
        (
            "C major",
            [
                "E5 - D5 - | C5 - - - ||",
                "G4 - F4 - | E4 - - - ||",
                "C4 - B3 - | G3 - - - ||",
                "C3 - G3 - | C3 - - - ||",
            ],
            Cadence::PerfectAuthentic,
        ),
        (
            "C major",
            [
                "G4 - G4 - | E4 - - - ||",
                "E4 - D4 - | C4 - - - ||",
                "C4 - B3 - | C4 - - - ||",
                "C3 - G3 - | C3 - - - ||",
            ],
            Cadence::ImperfectAuthentic,
        ),
        (
            "C major",
            [
                "E5 - F5 - | D5 - - - ||",
                "C5 - C5 - | B4 - - - ||",
                "G4 - A4 - | G4 - - - ||",
                "C3 - F3 - | G3 - - - ||",
            ],
            Cadence::Half,
        ),
        (
            "C major",
            [
                "E5 - D5 - | C5 - - - ||",
                "C5 - B4 - | C5 - - - ||",
                "G4 - G4 - | E4 - - - ||",
                "C3 - G3 - | A3 - - - ||",
            ],
            Cadence::Deceptive,
        ),
        (
            "C major",
            [
                "C5 - C5 - | C5 - - - ||",
                "G4 - A4 - | G4 - - - ||",
                "E4 - F4 - | E4 - - - ||",
                "C3 - F3 - | C3 - - - ||",
            ],
            Cadence::Plagal,
        ),
        (
            "A minor",
            [
                "C5 - D5 - | E5 - - - ||",
                "A4 - A4 - | B4 - - - ||",
                "E4 - D4 - | G#4 - - - ||",
                "A3 - F3 - | E3 - - - ||",
            ],
            Cadence::PhrygianHalf,
        ),
    ] {
        assert_eq!(closes(key, rows), [name], "{rows:?}");
    }
}

#[test]
fn inside_a_phrase_there_is_no_close() {
    let rows = [
        "E5 - D5 - | C5 - D5 - | E5 - - - |",
        "G4 - F4 - | E4 - G4 - | G4 - - - |",
        "C4 - B3 - | G3 - B3 - | C4 - - - |",
        "C3 - G3 - | C3 - G2 - | C3 - - - |",
    ];
    assert_eq!(closes("C major", rows), []);
}
