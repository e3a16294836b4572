//! Figures that are struck where they begin to disagree.

use crate::read::*;

#[test]
fn passing_notes() {
    fits(&["E5 D C -", "C4 - - -"], "1:2 S passing note");
    fits(&["C5 D E -", "C4 - - -"], "1:2 S passing note");
    fits(&["C5 - - -", "C4 B3 A -"], "1:2 B passing note");
    fits(&["E5 - D C", "C4 - - -"], "1:3 S accented passing note");
    let p = "passing note";
    let held = "C4 - - -";
    misses(
        p,
        &["E5 D E -", held],
        "1:2 S lower neighbour",
        "it turns back",
    );
    misses(p, &["_ D5 C -", held], "1:2 none", "nothing leads to it");
    misses(p, &["E5 D _ -", held], "1:2 none", "nothing follows it");
    misses(
        p,
        &["G5 D C -", held],
        "1:2 none",
        "it is not reached by step",
    );
    misses(p, &["C5 D G -", held], "1:2 none", "it is not left by step");
    misses(
        p,
        &["E5 - D C", held],
        "1:3 S accented passing note",
        "it does not stand on a weaker moment than its neighbours",
    );
}

#[test]
fn two_notes_pass_one_after_the_other() {
    // Across a fourth, over a held bass and a held third voice.
    let read = sheet(&["C5 B4 A G", "G4 - - -", "C4 - - -"]);
    assert_eq!(
        read.told(),
        ["1:2 S passing note", "1:3 S accented passing note"]
    );
}

#[test]
fn a_struck_note_over_one_that_moves_away_is_no_accented_passing_note() {
    // The bass goes on first: it is the bass that passed.
    let read = sheet(&["C5 - B -", "E4 - C.B3 A"]);
    assert_eq!(
        read.missed("accented passing note", "S"),
        Some("the other note goes on first")
    );
}

#[test]
fn neighbours() {
    let held = "C4 - - -";
    fits(&["E5 F E -", held], "1:2 S upper neighbour");
    fits(&["E5 D E -", held], "1:2 S lower neighbour");
    let accented = sheet(&["E5 - D E", held]);
    assert_eq!(
        accented.only(),
        Figure::Neighbour {
            upper: false,
            accented: true
        }
    );
    // With another sign the main note still returns.
    fits(&["Eb5 D E -", held], "1:2 S lower neighbour");
    let n = "neighbour";
    misses(
        n,
        &["E5 F D -", "C4 - B3 -"],
        "1:2 S escape note",
        "it is not reached and left by step",
    );
}

#[test]
fn double_neighbours() {
    let told = sheet(&["D5 E C D", "D4 - - -"]).told();
    assert_eq!(told, ["1:2 S double neighbour", "1:3 S double neighbour"]);
    // Not back to the main note.
    let read = sheet(&["D5 E C B4", "D4 - - -"]);
    assert_eq!(
        read.missed("double neighbour", "S"),
        Some("the line does not go round a note and back to it")
    );
    // On the strong beat.
    let read = sheet(&["_ D5 E C | D5 - - -", "D4 - - - | D4 - - -"]);
    assert_eq!(
        read.missed("double neighbour", "S"),
        Some("it stands on a strong moment")
    );
}

#[test]
fn cambiatas() {
    let whole = |rows: &[&str]| sheet(rows).only();
    let five = whole(&["C5 B4 G A | B4 - - -", "C4 - - - | G4 - - -"]);
    assert_eq!(
        five,
        Figure::Cambiata {
            rising: false,
            whole: true
        }
    );
    let four = whole(&["C5 B4 G A | F4 - - -", "C4 - - - | F4 - - -"]);
    assert_eq!(
        four,
        Figure::Cambiata {
            rising: false,
            whole: false
        }
    );
    let c = "cambiata";
    misses(
        c,
        &["C5 B4 G E", "C4 - - -"],
        "1:2 none",
        "the line does not turn back by step after the third",
    );
    misses(
        c,
        &["C5 B4 E -", "C4 - - -"],
        "1:2 none",
        "it does not leap a third onward",
    );
    misses(
        c,
        &["_ B4 G A", "C4 - - -"],
        "1:2 none",
        "nothing leads to it",
    );
    misses(
        c,
        &["C5 - B4 G | A4 - - -", "C4 - - - | C4 - - -"],
        "1:3 none",
        "it does not stand on a weaker moment than its neighbours",
    );
    // The note after the third is dissonant.
    let read = sheet(&["C5 B4 G A", "C4 - A3 -"]);
    assert_eq!(
        read.missed(c, "S"),
        Some("the note after the third is dissonant")
    );
}

#[test]
fn escape_notes() {
    let e = "escape note";
    let held = "A3 - - -";
    fits(&["C5 D A4 -", held], "1:2 S escape note");
    misses(
        e,
        &["C5 D F -", held],
        "1:2 none",
        "it does not leap the other way",
    );
    misses(
        e,
        &["E4 D5 A4 -", held],
        "1:2 none",
        "it is not reached by step",
    );
    misses(
        e,
        &["C5 - D A4", held],
        "1:3 none",
        "it does not stand on a weaker moment than its neighbours",
    );
}

#[test]
fn anticipations() {
    let a = "anticipation";
    let bass = "A3 - - - | C4 - - -";
    fits(&["A4 C5 A4 G | G4 - - -", bass], "1:4 S anticipation");
    misses(
        a,
        &["C5 - A4 G | C5 - - -", bass],
        "1:4 S escape note",
        "the same note does not follow",
    );
    misses(
        a,
        &["A4 - G G", "A3 - - -"],
        "1:3 none",
        "the note that follows is no stronger",
    );
    misses(
        a,
        &["A4 - E G | G4 - - -", bass],
        "1:4 none",
        "it is not reached by step",
    );
}

#[test]
fn appoggiaturas() {
    let a = "appoggiatura";
    let bass = "A3 - - - | C4 - - -";
    fits(&["C5 - - - | F5 - E -", bass], "2:1 S appoggiatura");
    misses(
        a,
        &["C5 - - - | F5 - A4 -", bass],
        "2:1 none",
        "it is not left by step",
    );
    misses(
        a,
        &["C5 F - E", "C4 - - -"],
        "1:2 none",
        "it stands on a weak moment",
    );
    misses(
        a,
        &["_ - - - | F5 - E -", bass],
        "2:1 none",
        "it is not reached by leap",
    );
}

#[test]
fn diminished_fifths() {
    let d = "diminished fifth that closes";
    fits(
        &["F4 - - - | E4 - - -", "B3 - - - | C4 - - -"],
        &format!("1:1 S {d}"),
    );
    misses(
        d,
        &["F4 - - - | G4 - - -", "B3 - - - | C4 - - -"],
        "1:1 none",
        "it does not close to a third",
    );
    misses(
        d,
        &["E4 - - - | D4 - - -", "B3 - - - | B3 - - -"],
        "1:1 none",
        "it is no diminished fifth over the lowest voice",
    );
    // One closes after the other.
    fits(
        &["F4 - - - | E4 - - -", "B3 - C4 - | - - - -"],
        &format!("1:1 S {d}"),
    );
}

#[test]
fn chromatic_steps_pass() {
    fits(&["B4 C5 C#5 - ", "G4 - A4 -"], "1:2 S passing note");
    // Two chromatic forms on either side of a note are no passing.
    misses(
        "passing note",
        &["Db5 D5 D#5 -", "C4 - - -"],
        "1:1 none",
        "nothing leads to it",
    );
}

#[test]
fn a_longer_second_note_makes_no_double_neighbour() {
    let read = sheet(&["F4 E G - | F4 - - -", "D4 - - - | D4 - - -"]);
    assert_eq!(read.told().first().unwrap(), "1:2 S escape note");
    assert_eq!(
        read.missed("double neighbour", "S"),
        Some("the two notes are not equally long")
    );
}

#[test]
fn a_shorter_note_before_does_not_make_a_passing_note_accented() {
    // The quarter after two eighths stands on a weak beat.
    let read = sheet(&["E5 - F.E D | C5 - - -", "C4 - - - | A3 - - -"]);
    assert!(
        read.told().contains(&"1:4 S passing note".to_owned()),
        "{:?}",
        read.told()
    );
}
