//! Stated harmony against the notes: what is a disagreement, and what is none.

#![allow(clippy::unwrap_used, clippy::panic)]

use partwright_check::{Checked, Wishes};
use proptest::prelude::*;

/// What the rule says of a sheet.
fn says(text: &str) -> Vec<String> {
    let checked = Checked::text(text, &Wishes::default());
    let unreadable = checked.findings.iter().find(|f| f.rule == "reading");
    assert_eq!(unreadable.map(|f| &f.message), None, "{text}");
    let found = checked
        .findings
        .iter()
        .filter(|f| f.rule == "stated-harmony");
    found.map(|f| f.message.clone()).collect()
}

/// One sheet in C major with four voices and a row under them.
fn four(rows: [&str; 4], under: &str) -> Vec<String> {
    let [s, a, t, b] = rows;
    says(&format!(
        "key C major\nmetre 4/4\nS | {s} ||\nA | {a} ||\nT | {t} ||\nB | {b} ||\n{under} ||\n"
    ))
}

fn one(list: &[String], words: &[&str]) {
    assert_eq!(list.len(), 1, "{list:?}");
    for word in words {
        assert!(list[0].contains(word), "{word}: {}", list[0]);
    }
}

const TRIADS: [&str; 4] = ["C5 - B4 -", "G4 - G -", "E4 - D -", "C3 - G3 -"];

#[test]
fn notes_that_agree_are_not_spoken_of() {
    for row in ["I - V -", "I5/3 - V -", "_", "I - _ _"] {
        assert_eq!(four(TRIADS, &format!("harmony | {row}")), [""; 0], "{row}");
    }
    for row in ["_", "5/3 - 5 -", "3 - 8 -"] {
        assert_eq!(four(TRIADS, &format!("figures | {row}")), [""; 0], "{row}");
    }
}

#[test]
fn strange_notes_are_named_with_the_chord_and_its_key() {
    one(
        &four(TRIADS, "harmony | I - IV -"),
        &[
            "B4 in S",
            "G4 in voice A",
            "D4 in T",
            "IV in C major (F A C)",
            "no notes",
        ],
    );
    one(
        &four(TRIADS, "harmony | vi - V -"),
        &["G4 in voice A is no note of vi in C major (A C E)"],
    );
    one(
        &four(TRIADS, "harmony | i - V -"),
        &["E4 in T is no note of i in C major (C Eb G)"],
    );
    one(
        &four(TRIADS, "figures | 6 - 5 -"),
        &["G4 in voice A", "6 over C (A C E)"],
    );
}

#[test]
fn another_bass_is_told_only_where_figures_tell_one() {
    one(
        &four(TRIADS, "harmony | I6 - V -"),
        &["I6 in C major (C E G) has E in the bass", "C3 in voice B"],
    );
    one(
        &four(TRIADS, "harmony | I - V6/4 -"),
        &["has D in the bass"],
    );
    let inverted = ["C5 - B4 -", "G4 - G -", "C4 - D -", "E3 - G3 -"];
    assert_eq!(four(inverted, "harmony | I - V -"), [""; 0]);
    // A bass that reaches the stated note under the chord.
    let moving = ["C5 - B4 -", "G4 - G -", "E4 - D -", "C3 E G3 -"];
    assert_eq!(four(moving, "harmony | I6 - V -"), [""; 0]);
}

#[test]
fn a_six_four_before_the_dominant_may_be_named_by_either_degree() {
    let close = ["E5 D C -", "C5 B4 C5 -", "G4 G E -", "G3 G2 C3 -"];
    assert_eq!(four(close, "harmony | V6/4 V5/3 I -"), [""; 0]);
    assert_eq!(four(close, "harmony | I6/4 V I -"), [""; 0]);
    assert_eq!(four(close, "figures | 6/4 5/3 5 -"), [""; 0]);
}

#[test]
fn the_root_or_third_may_not_be_left_out_but_the_fifth_may() {
    let rootless = ["C5 - B4 -", "G4 - F -", "E4 - D -", "C3 - D3 -"];
    one(
        &four(rootless, "harmony | I - V43 -"),
        &["V4/3 in C major (G B D F) lacks G, its root"],
    );
    assert_eq!(four(rootless, "harmony | I - viio6 -"), [""; 0]);
    let no_fifth = ["C5 - B4 -", "C5 - G4 -", "E4 - F4 -", "C3 - G3 -"];
    assert_eq!(four(no_fifth, "harmony | I - V7 -"), [""; 0]);
    // A bare fifth on a strong beat is told by another rule already.
    let no_third = ["C5 - D5 - ", "G4 - D4 - ", "E4 - D4 -", "C3 - G3 -"];
    let free = Checked::text(
        &format!(
            "key C major\nmetre 4/4\nS | {} | C5 - - - ||\nA | {} | G4 - - - ||\nT | {} | E4 - - - ||\nB | {} | C3 - - - ||\nharmony | I - V - | I - - - ||\n",
            no_third[0], no_third[1], no_third[2], no_third[3]
        ),
        &Wishes::default(),
    );
    let count = |rule: &str| free.findings.iter().filter(|f| f.rule == rule).count();
    assert_eq!((count("third-missing"), count("stated-harmony")), (1, 0));
    // Two voices have no room for every note.
    let two =
        "key C major\nmetre 2/4\nS | C5 D | C5 - ||\nB | C3 G | C - ||\nharmony | I V | I - ||\n";
    assert_eq!(says(two), [""; 0]);
}

#[test]
fn a_chord_that_goes_on_in_another_form_keeps_its_notes() {
    let passing = ["D5 - C5 -", "B4 - C5 -", "G4.F4 - E4 -", "B3 - C4 -"];
    assert_eq!(four(passing, "harmony | V6.V65 - I -"), [""; 0]);
}

#[test]
fn a_melody_alone_has_no_bass_and_lacks_nothing() {
    let melody = |row| {
        says(&format!(
            "key C major\nmetre 2/4\nS | E5 G | C5 - ||\nharmony | {row} ||\n"
        ))
    };
    assert_eq!(melody("I6/4 V7 | I -"), [""; 0]);
    one(
        &melody("I ii | I -"),
        &["G5 in S is no note of ii in C major (D F A)"],
    );
}

#[test]
fn ornaments_are_no_disagreement() {
    let figured = ["E5 D.C D -", "C5 B4.A B -", "G4 - G -.F", "C3 - G3 -"];
    assert_eq!(four(figured, "harmony | I - V V7"), [""; 0]);
    // Prepared, held over the change of chord, and down by step.
    let held = ["C5 - - B4", "G4 - G -", "E4 - D -", "C3 - G3 -"];
    assert_eq!(four(held, "harmony | I - V -"), [""; 0]);
    assert_eq!(four(held, "figures | _ _ 4 3"), [""; 0]);
    // A sixth over the root that comes down under the same chord disagrees with no note.
    let sixth = ["C5 - A4 G4", "E4 - E -", "C4 - C -", "C3 - C -"];
    assert_eq!(four(sixth, "harmony | I - - -"), [""; 0]);
    // With the same chord stated anew it is the same.
    assert_eq!(four(sixth, "harmony | I - I I"), [""; 0]);
    // A suspension that resolves with the next chord.
    let under = "harmony | I - IV viio6";
    for soprano in ["G4 - - F4", "G4 - G4 F4"] {
        let rows = [soprano, "E4 - C4 D", "C4 - A3 B", "C3 - F3 D"];
        assert_eq!(four(rows, under), [""; 0]);
    }
    one(
        &four(["G4 - G4 B4", "E4 - C4 D", "C4 - A3 B", "C3 - F3 D"], under),
        &["G4 in S is no note of IV in C major (F A C)"],
    );
    // That stays to the end of the chord it does not belong to.
    one(
        &four(sixth, "harmony | I - I _"),
        &["A4 in S is no note of I in C major (C E G)"],
    );
}

#[test]
fn a_pedal_under_stated_chords_is_no_disagreement() {
    let pedal = ["G5 F G G", "E5 C D E", "C5 A4 B C5", "C3 - - -"];
    let text = four(pedal, "harmony | I IV V I");
    assert_eq!(text, [""; 0]);
    // A bass that moves on with the chord is none.
    let late = ["G5 F D G", "E5 C B4 E5", "C5 A4 G C5", "F3 C - E"];
    one(
        &four(late, "harmony | _ _ V I6"),
        &["C3 in voice B is no note of V in C major (G B D)"],
    );
}

#[test]
fn a_row_that_fits_nothing_says_nothing() {
    for text in [
        "key C major\nmetre 2/4\nS | _ | _ ||\nB | _ | _ ||\nharmony | I V | I - ||\n",
        "key C major\nmetre 2/4\nS | ? ? | ? |\nB | C3 D | E - |\nharmony | V V | V - |\n",
        "key C major\nmetre 2/4\nS | C5 D | E - ||\nA | G4 | C5 - ||\nharmony | I I | I - ||\n",
    ] {
        let checked = Checked::text(text, &Wishes::default());
        let found: Vec<&str> = checked
            .findings
            .iter()
            .filter(|f| f.rule == "stated-harmony")
            .map(|f| f.message.as_str())
            .collect();
        assert_eq!(found, [""; 0], "{text}");
    }
}

#[test]
fn a_licence_lifts_it() {
    let text = "key C major\nmetre 2/4\nlicence stated-harmony: the chords are the guitarist's\nS | A4 - | C5 - ||\nharmony | V - | I - ||\n";
    let checked = Checked::text(text, &Wishes::default());
    let found = checked
        .findings
        .iter()
        .filter(|f| f.rule == "stated-harmony");
    assert!(found.map(|f| f.licence.is_some()).eq([true]));
}

fn chord() -> impl Strategy<Value = String> {
    let sign = prop::sample::select(vec!["", "", "#", "b"]);
    let numeral = prop::sample::select(vec!["I", "ii", "III", "iv", "V", "vi", "vii", "VII"]);
    let quality = prop::sample::select(vec!["", "", "o", "+", "ø"]);
    let figures = prop::collection::vec(2_u8..=9, 0..4);
    let applied = prop::sample::select(vec!["", "", "/V", "/ii", "/VII"]);
    (sign, numeral, quality, figures, applied).prop_map(|(s, n, q, f, a)| {
        let figures: Vec<String> = f.iter().map(u8::to_string).collect();
        format!("{s}{n}{q}{}{a}", figures.concat())
    })
}

fn cell() -> impl Strategy<Value = String> {
    prop_oneof![
        4 => chord(),
        1 => Just("-".to_owned()),
        1 => Just("_".to_owned()),
        1 => (prop::sample::select(vec!["D:", "eb:", "F#:", "H:", "Cb:"]), chord())
            .prop_map(|(key, chord)| format!("{key} {chord}")),
        1 => (chord(), chord()).prop_map(|(a, b)| format!("{a}.{b}")),
    ]
}

fn stack() -> impl Strategy<Value = String> {
    let figure = (prop::sample::select(vec!["", "#", "b", "n"]), 2_u8..=9);
    prop::collection::btree_map(2_u8..=9, figure, 1..4).prop_map(|stack| {
        let stack: Vec<String> = stack
            .iter()
            .rev()
            .map(|(number, (sign, _))| format!("{sign}{number}"))
            .collect();
        stack.join("/")
    })
}

fn note() -> impl Strategy<Value = String> {
    prop::sample::select(vec![
        "C4", "D4", "Eb4", "E4", "F#4", "G4.A4", "Bb4", "B4", "-", "_", "?", "C##4", "Dbb4",
    ])
    .prop_map(str::to_owned)
}

fn joined(cells: &[String]) -> String {
    let bars: Vec<String> = cells.chunks(2).map(|bar| bar.join(" ")).collect();
    bars.join(" | ")
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(400))]

    #[test]
    fn any_row_is_checked(
        key in prop::sample::select(vec!["", "key C major\n", "key Ab minor\n", "key E phrygian\n", "key none\n"]),
        rows in prop::collection::vec(prop::collection::vec(note(), 1..9), 1..5),
        harmony in prop::collection::vec(cell(), 0..12),
        figures in prop::collection::vec(stack(), 0..12),
    ) {
        let mut text = format!("{key}metre 2/4\n");
        for (row, label) in rows.iter().zip(["S", "A", "T", "B"]) {
            text.push_str(&format!("{label} | {} |\n", joined(row)));
        }
        text.push_str(&format!("harmony | {} |\nfigures | {} |\n", joined(&harmony), joined(&figures)));
        let checked = Checked::text(&text, &Wishes::default());
        for finding in checked.findings.iter().filter(|f| f.rule == "stated-harmony") {
            prop_assert!(finding.span.is_some() && !finding.voices.is_empty(), "{text}");
            prop_assert!(finding.message.ends_with('.') && !finding.message.contains("  "));
        }
    }
}
