//! Numerals as notes, against what handbooks of common practice say.

#![allow(clippy::unwrap_used, clippy::panic)]

use partwright_score::fifths::named;
use partwright_score::{FigureSign, Mode, Score};
use partwright_sheet::{Heading, Sheet, write};
use proptest::prelude::*;

/// The score of a row of chords, one a beat, in a key.
fn row(head: &str, chords: &[&str]) -> Score {
    let notes = vec!["-"; chords.len() - 1].join(" ");
    let text = format!(
        "{head}\nS | G4 {notes} ||\nharmony | {} ||\n",
        chords.join(" ")
    );
    let reading = Sheet::read(&text).lower(&text);
    assert_eq!(reading.problems, [], "{text}");
    reading.score
}

/// The notes of one chord, and the one in its bass behind a stroke.
fn notes(head: &str, chord: &str) -> String {
    let score = row(head, &[chord]);
    let chord = &score.harmony[0];
    let bass = chord.bass.map(|b| format!(" / {}", named(b)));
    format!("{}{}", chord.notes(), bass.unwrap_or_default())
}

fn all(head: &str, wanted: &[(&str, &str)]) {
    for (chord, says) in wanted {
        assert_eq!(notes(head, chord), *says, "{head}: {chord}");
    }
}

#[test]
fn the_degrees_of_major() {
    all(
        "key D major",
        &[
            ("I", "D F# A"),
            ("ii", "E G B"),
            ("iii", "F# A C#"),
            ("IV", "G B D"),
            ("V", "A C# E"),
            ("vi", "B D F#"),
            ("viio", "C# E G"),
        ],
    );
    all("key Gb major", &[("IV", "Cb Eb Gb"), ("viio", "F Ab Cb")]);
    all("key B major", &[("V", "F# A# C#"), ("iii", "D# F# A#")]);
}

#[test]
fn the_degrees_of_minor() {
    all(
        "key A minor",
        &[
            ("i", "A C E"),
            ("iio", "B D F"),
            ("III", "C E G"),
            ("III+", "C E G#"),
            ("iv", "D F A"),
            ("IV", "D F# A"),
            ("v", "E G B"),
            ("V", "E G# B"),
            ("VI", "F A C"),
            ("vio", "F# A C"),
            ("VII", "G B D"),
            ("viio", "G# B D"),
        ],
    );
    all("key C minor", &[("V", "G B D"), ("viio7", "B D F Ab / B")]);
    all("key G# minor", &[("V", "D# F## A#")]);
    all("key Eb minor", &[("VI", "Cb Eb Gb"), ("iv", "Ab Cb Eb")]);
}

#[test]
fn sevenths_are_those_of_the_key() {
    all(
        "key F major",
        &[
            ("I7", "F A C E / F"),
            ("ii7", "G Bb D F / G"),
            ("IV7", "Bb D F A / Bb"),
            ("V7", "C E G Bb / C"),
            ("viiø7", "E G Bb D / E"),
            ("viio7", "E G Bb Db / E"),
            ("V9", "C E G Bb D / C"),
        ],
    );
    all(
        "key E minor",
        &[
            ("i7", "E G B D / E"),
            ("iiø7", "F# A C E / F#"),
            ("V7", "B D# F# A / B"),
            ("viio7", "D# F# A C / D#"),
            ("V9", "B D# F# A C / B"),
        ],
    );
}

#[test]
fn figures_tell_the_bass() {
    all(
        "key G major",
        &[
            ("I6", "G B D / B"),
            ("I6/4", "G B D / D"),
            ("I5/3", "G B D / G"),
            ("V65", "D F# A C / F#"),
            ("V4/3", "D F# A C / A"),
            ("V6/4/3", "D F# A C / A"),
            ("V2", "D F# A C / C"),
            ("V6/4/2", "D F# A C / C"),
            ("I", "G B D"),
        ],
    );
    let score = row("key G major", &["V4", "V"]);
    assert_eq!(score.harmony[0].notes(), "D F# A");
    assert_eq!(score.harmony[0].beside, [1]);
}

#[test]
fn signs_alter_the_root() {
    all(
        "key C major",
        &[
            ("bII6", "Db F Ab / F"),
            ("bVI", "Ab C Eb"),
            ("bVII", "Bb D F"),
            ("#ivo7", "F# A C Eb / F#"),
        ],
    );
    all(
        "key A minor",
        &[
            ("bII6", "Bb D F / D"),
            ("bVI", "F A C"),
            ("#viio", "G# B D"),
            ("#vio", "F# A C"),
        ],
    );
}

#[test]
fn chords_of_other_degrees_are_told_in_the_key_of_that_degree() {
    all(
        "key G major",
        &[
            ("V7/V", "A C# E G / A"),
            ("viio7/ii", "G# B D F / G#"),
            ("viiø7/V", "C# E G B / C#"),
            ("V/vi", "B D# F#"),
            ("V65/IV", "G B D F / B"),
        ],
    );
    all(
        "key D minor",
        &[("V/iv", "D F# A"), ("V7/III", "C E G Bb / C")],
    );
}

#[test]
fn modes_have_their_own_degrees() {
    all(
        "key D dorian",
        &[
            ("IV", "G B D"),
            ("VII", "C E G"),
            ("viio", "C# E G"),
            ("ii", "E G B"),
        ],
    );
    all("key E phrygian", &[("II", "F A C"), ("vii", "D F A")]);
    all("key F lydian", &[("II", "G B D"), ("viio", "E G Bb")]);
    all(
        "key G mixolydian",
        &[("VII", "F A C"), ("v", "D F A"), ("I7", "G B D F / G")],
    );
    all("key E aeolian", &[("VI", "C E G"), ("V", "B D# F#")]);
}

#[test]
fn a_six_four_before_the_dominant_is_the_tonic_over_its_fifth() {
    let says = |head, chords: &[&str]| {
        let chord = row(head, chords).harmony[0].clone();
        (chord.notes(), chord.bass.map(named))
    };
    let over = |notes: &str, bass: &str| (notes.to_owned(), Some(bass.to_owned()));
    assert_eq!(says("key C major", &["V6/4", "V5/3"]), over("C E G", "G"));
    assert_eq!(says("key C minor", &["V6/4", "V7"]), over("C Eb G", "G"));
    // Passing between two tonics it is the dominant.
    assert_eq!(says("key C major", &["V6/4", "I6"]), over("G B D", "D"));
}

#[test]
fn the_last_key_named_is_in_force() {
    let text = "\
key G major
metre 2/4
S       | G4 A        | B  -    |
harmony | I  D: I     | V  _    |

key C major
S       | G4   A      | B  -    |
harmony | I    a: _.V | i H: i  ||
";
    let reading = Sheet::read(text).lower(text);
    let says: Vec<(String, i32)> = reading
        .score
        .harmony
        .iter()
        .map(|chord| (chord.notes(), chord.key.unwrap().tonic))
        .collect();
    let wanted = [
        ("G B D", 1),
        ("D F# A", 2),
        ("A C# E", 2),
        ("C E G", 0),
        ("E G# B", 3),
        ("A C E", 3),
    ];
    let wanted: Vec<(String, i32)> = wanted.map(|(n, k)| (n.to_owned(), k)).into();
    // What follows a key that could not be read is not guessed.
    assert_eq!(says, wanted);
    assert_eq!(reading.score.harmony[4].key.unwrap().mode, Mode::Minor);
}

#[test]
fn figures_stand_in_the_score_as_they_are_written() {
    let text = "metre 2/4\nB | A3 - | D - ||\nfigures | 6/4 7/n | _ # ||\n";
    let score = Sheet::read(text).lower(text).score;
    let shown: Vec<&str> = score.figures.iter().map(|f| f.written.as_str()).collect();
    assert_eq!(shown, ["6/4", "7/n", "#"]);
    let last = score.figures[2].stack[0];
    assert_eq!((last.number, last.sign), (3, Some(FigureSign::Raised)));
}

proptest! {
    /// A chord stands a third above a third, in every key, and the transposed key has it
    /// transposed.
    #[test]
    fn chords_are_the_same_in_every_key(
        degree in 0_usize..7,
        capital in any::<bool>(),
        rest in prop::sample::select(vec!["", "6", "7", "65", "43", "o7", "ø65", "+6", "9", "4"]),
        sign in prop::sample::select(vec!["", "b", "#"]),
        mode in prop::sample::select(vec!["major", "minor", "dorian", "phrygian", "lydian"]),
        applied in prop::sample::select(vec!["", "/V", "/ii", "/vi"]),
    ) {
        let names = ["I", "II", "III", "IV", "V", "VI", "VII"];
        let name = if capital { names[degree].to_owned() } else { names[degree].to_lowercase() };
        let chord = format!("{sign}{name}{rest}{applied}");
        let here = row(&format!("key C {mode}"), &[&chord]).harmony[0].clone();
        for (two, one) in here.tones.iter().zip(here.tones.iter().skip(1)) {
            prop_assert_eq!((one - two).rem_euclid(7), 4, "a third up by letter");
        }
        prop_assert_eq!(here.tones[0], here.root);
        for (tonic, up) in [("G", 1), ("Eb", -3), ("F#", 6)] {
            let there = row(&format!("key {tonic} {mode}"), &[&chord]).harmony[0].clone();
            let moved: Vec<i32> = here.tones.iter().map(|tone| tone + up).collect();
            prop_assert_eq!(&there.tones, &moved);
            prop_assert_eq!(there.bass, here.bass.map(|bass| bass + up));
        }
    }
}

#[test]
fn a_score_written_out_says_that_its_chords_stay_behind() {
    let score = row("key C major", &["I", "V7"]);
    let written = write(&score, &Heading::default());
    let says = written.left_behind.concat();
    assert!(says.contains("Stated chords"), "{says}");
    let again = Sheet::read(&written.text).lower(&written.text).score;
    assert_eq!(again.voices, score.voices);
}
