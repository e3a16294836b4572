//! Stated harmony is taken, and figures are read over their bass.

#![allow(clippy::unwrap_used, clippy::panic)]

use partwright_analysis::Analysis;
use partwright_analysis::harmony::{SURE, Segment, in_one_go, stated};
use partwright_score::fifths::named;
use partwright_score::{Score, StatedChord, Texture};
use partwright_sheet::Sheet;

fn score(text: &str) -> Score {
    let reading = Sheet::read(text).lower(text);
    assert_eq!(reading.problems, [], "{text}");
    reading.score
}

fn read(text: &str) -> Vec<Segment> {
    let score = score(text);
    let texture = Texture::of(&score);
    in_one_go(
        &score,
        &texture,
        Analysis::of(&score, &texture).dissonances(),
    )
}

/// Each chord by name, with its key where it is stated.
fn shown(text: &str) -> Vec<String> {
    let show = |s: &Segment| match s.key.filter(|_| s.stated) {
        Some(key) => format!("{} in {}", s.chord.name(), key.name()),
        None => s.chord.name(),
    };
    read(text).iter().map(show).collect()
}

const CHORDS: &str = "\
key G major
metre 4/4
S | D5 D E D | D - D - ||
A | B4 A G A | B - A - ||
T | G4 F# E F# | G - F# - ||
B | G3 D C D | G - D - ||
";

#[test]
fn nothing_stated_leaves_the_inference_alone() {
    let found = read(CHORDS);
    assert!(found.iter().all(|segment| !segment.stated));
    assert_eq!(stated(&score(CHORDS), &Texture::of(&score(CHORDS))), []);
}

#[test]
fn a_stated_chord_is_the_answer_whatever_the_notes_say() {
    let text = format!("{CHORDS}harmony | I ii _ V7 | I - D: IV - ||\n");
    let says = shown(&text);
    assert_eq!(
        says,
        [
            "G major in G major",
            "A minor in G major",
            "C major",
            "D dominant seventh in G major",
            "G major in G major",
            "G major in D major",
        ]
        .map(String::from)
    );
    for segment in read(&text).iter().filter(|s| s.stated) {
        assert!(segment.margin > SURE * 100);
    }
    let without = read(CHORDS);
    let unstated = read(&text).into_iter().find(|s| !s.stated).unwrap();
    assert_eq!(without[2].chord, unstated.chord);
}

#[test]
fn a_mode_has_no_local_key_but_its_chords_are_taken() {
    let text = "key D dorian\nmetre 2/2\nS | A4 B | A - ||\nA | F4 D | F - ||\nB | D3 G | D - ||\nharmony | i IV | i - ||\n";
    let found = read(text);
    let names: Vec<String> = found.iter().map(|s| s.chord.name()).collect();
    assert_eq!(names, ["D minor", "G major", "D minor"]);
    assert!(found.iter().all(|s| s.stated));
}

/// The chords that figures mean over a bass, each a beat.
fn over(key: &str, bass: &str, figures: &str) -> Vec<StatedChord> {
    let beats = bass.split(' ').count();
    let text = format!("key {key}\nmetre {beats}/4\nB | {bass} ||\nfigures | {figures} ||\n");
    let score = score(&text);
    stated(&score, &Texture::of(&score))
}

fn says(key: &str, bass: &str, figures: &str) -> String {
    let chords = over(key, bass, figures);
    let show = |chord: &StatedChord| {
        let beside: Vec<String> = chord.beside.iter().map(|p| named(*p)).collect();
        match beside.join(" ").as_str() {
            "" => chord.notes(),
            beside => format!("{} with {beside}", chord.notes()),
        }
    };
    let shown: Vec<String> = chords.iter().map(show).collect();
    shown.join(", ")
}

#[test]
fn figures_by_their_short_forms() {
    for (bass, figures, wanted) in [
        ("C3", "5/3", "C E G"),
        ("C3", "8", "C E G"),
        ("E3", "6", "C E G"),
        ("G3", "6/4", "C E G"),
        ("G3", "7", "G B D F"),
        ("B3", "6/5", "G B D F"),
        ("D3", "4/3", "G B D F"),
        ("D3", "6/4/3", "G B D F"),
        ("F3", "4/2", "G B D F"),
        ("F3", "2", "G B D F"),
        ("F3", "6/4/2", "G B D F"),
        ("F#3", "6/5", "D F# A C"),
        ("C3", "4", "C E G with F"),
        ("C3", "9", "C E G with D"),
        ("C3", "9/4", "C E G with D F"),
    ] {
        assert_eq!(
            says("C major", bass, figures),
            wanted,
            "{figures} over {bass}"
        );
    }
}

#[test]
fn signs_alter_what_the_signature_makes() {
    assert_eq!(says("A minor", "E3", "#"), "E G# B");
    assert_eq!(says("C minor", "G3", "n"), "G B D");
    assert_eq!(says("C minor", "G3", "#"), "G B D");
    assert_eq!(says("G# minor", "D#3", "#"), "D# F## A#");
    assert_eq!(says("D major", "E3", "7"), "E G B D");
    assert_eq!(says("D major", "E3", "7/#"), "E G# B D");
    assert_eq!(says("C major", "F3", "b6"), "Db F A");
    assert_eq!(says("C major", "C3", "b7"), "C E G Bb");
}

#[test]
fn suspensions_mean_the_chord_they_resolve_to() {
    assert_eq!(says("A minor", "E3 -", "4 #"), "E G# B with A, E G# B");
    assert_eq!(says("C major", "D3 -", "7 6"), "B D F with C, B D F");
    assert_eq!(says("C major", "D3 G", "7 7"), "D F A C, G B D F");
    assert_eq!(says("C major", "G3 -", "6/4 5/3"), "C E G, G B D");
}

#[test]
fn figures_that_are_no_chord_and_basses_that_are_silent_state_nothing() {
    assert_eq!(says("C major", "C3", "6/5/4"), "");
    assert_eq!(says("C major", "C3", "5/2"), "");
    assert_eq!(says("C major", "_ C3", "6 6"), "A C E");
}

#[test]
fn a_harmony_row_goes_before_figures() {
    let text = "key C major\nmetre 2/4\nS | C5 B4 | C5 - ||\nB | E3 D | C - ||\nfigures | 6 6 | _ ||\nharmony | I6 _ | _ ||\n";
    let score = score(text);
    let written: Vec<String> = stated(&score, &Texture::of(&score))
        .into_iter()
        .map(|chord| chord.written)
        .collect();
    assert_eq!(written, ["I6", "6"]);
}

#[test]
fn without_a_key_the_signature_is_the_one_the_notes_fit() {
    let text = "metre 4/4\nS | F#5 E C# D | D - - - ||\nB | A3 A A B | D3 - - - ||\nfigures | 5/3 _ _ _ | _ ||\n";
    let score = score(text);
    let notes: Vec<String> = stated(&score, &Texture::of(&score))
        .iter()
        .map(StatedChord::notes)
        .collect();
    assert_eq!(notes, ["A C# E"]);
}
