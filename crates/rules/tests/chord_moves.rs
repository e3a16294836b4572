//! How the notes of a chord go on: hurt passages, and what a house asks for.

#![allow(clippy::unwrap_used)]

use std::path::Path;
use std::sync::Arc;

use partwright_check::{Checked, Choice, House, Wishes};

fn wishes(house: &str) -> Wishes {
    let text = format!("base = \"chorale\"\n{house}");
    let house = House::read(Path::new("house.toml"), &mut |_| Ok(text.clone())).unwrap();
    Wishes {
        style: Some(Choice::House),
        house: Some(Arc::new(house)),
        ..Wishes::default()
    }
}

fn told(music: &str, house: &str) -> Vec<&'static str> {
    let checked = Checked::text(music, &wishes(house));
    checked.findings.iter().map(|f| f.rule).collect()
}

const CLOSE: &str = "key C major\nmetre 4/4\n\nS | E5 - D5 - | E5 - - - |\nA | C5 - B4 - | C5 - - - |\nT | G4 - F4 - | E4 - - - |\nB | C3 - G3 - | C3 - - - |";

#[test]
fn one_note_moved_is_heard() {
    for (rule, from, to) in [
        // The soprano takes the leading note and falls with it.
        (
            "leading-note-resolution",
            "S | E5 - D5 - | E5",
            "S | C5 - B4 - | G4",
        ),
        ("seventh-resolution", "F4 - | E4", "F4 - | G4"),
        ("seventh-approach", "T | G4 -", "T | A4 -"),
    ] {
        assert!(!told(CLOSE, "").contains(&rule), "{rule} before");
        assert!(CLOSE.contains(from), "{rule}");
        let hurt = CLOSE.replace(from, to);
        assert!(told(&hurt, "").contains(&rule), "{rule}: {hurt}");
    }
}

/// A case that no style minds is silent until a house asks for it.
#[test]
fn a_house_may_ask_for_more() {
    let drop = CLOSE.replace("B4 - | C5", "B4 - | G4");
    let back = "key C major\nmetre 4/4\n\nS | G4 - - - | G4 - - - | A4 - - - |\nA | E4 - - - | D4 - - - | C4 - - - |\nT | C4 - - - | B3 - - - | C4 - - - |\nB | C3 - - - | G3 - - - | F3 - - - |";
    for (rule, case, music) in [
        (
            "leading-note-resolution",
            "case = \"inner-drop\"\n",
            drop.as_str(),
        ),
        ("retrogression", "", back),
    ] {
        assert!(!told(music, "").contains(&rule), "{rule}");
        let house = format!(
            "[[rule]]\nrule = \"{rule}\"\n{case}severity = \"weakness\"\nreason = \"a strict house\"\n"
        );
        assert!(told(music, &house).contains(&rule), "{rule}: {music}");
    }
}

/// What only passes between beats, or goes on over its bass, is no dominant that goes to its tonic;
/// a note that falls a step at once has resolved; a suspension in one voice leaves the others their
/// chord.
#[test]
fn what_a_musician_lets_pass_is_silent() {
    let places = [
        (
            "leading-note-resolution",
            "key F major\nmetre 4/4\n\nS | D5 D5 C5 - | C5 - - - |\nA | A4 G4 G4 F4.E4 | F4 - - - |\nT | A4.A3 Bb3 Bb3 A3.G3 | A3 - - - |\nB | F#3 G3 E3 C3 | F3 - - - |",
        ),
        (
            "leading-note-resolution",
            "key F major\nmetre 4/4\n\nS | G4 F4 E4 E4 | A4 A4 G4 - |\nA | D4 C4 C4 C4 | C4 F4 E4 - |\nT | Bb3 A3 G3 C4.Bb3 | A3.G3 F3 C4 - |\nB | Bb2 F3 C3 A3.G3 | F3.E3 D3 C3 - |",
        ),
        (
            "seventh-resolution",
            "key C major\nmetre 4/4\n\nS | E5 E5 E5.D5 E5 | E5 D5 C5 - |\nA | G4 G4 G4.A4 B4 | A4 B4 C5 - |\nT | C4 C4.D4 E4.F4 E4.D4 | C4 G4 E4 - |\nB | C3 C3 C4 G#3 | A3 G3 C3 - |",
        ),
        (
            "tritone-resolution",
            "key D major\nmetre 3/4\n\nS | D5 - D5 | D5 E5 F#5 | E5 - F#5 |\nA | A4 - A4 | B4 A4 A4 | A4.B4 A4.G4 F#4 |\nT | D4 - D4 | G4 C#4 D4 | D4 C#4 C#4 |\nB | F#3 - F#3 | G3.A3 G3.F#3 E3.D3 | A3 - A#3 |",
        ),
        (
            "free-dissonance",
            "key D major\nmetre 4/4\n\nS | B4 B4 B4 A4 | D5 E5 D5 - |\nA | D4 D4 D4.G4 E4.C#4 | A4.-.G4.F#4 G4.E4 F#4 - |\nT | B3 B3 B3.E4 C#4.E4 | A3.D4 -.C#4 A3 - |\nB | G3 - - -.-.F#3.E3 | F#3.D3 A3.A2 D3 - |",
        ),
        (
            "free-dissonance",
            "key C major\nmetre 4/4\n\nS | Eb4 F4 Eb4 D4 | C4 - - - |\nA | C4 D4.C4 B3.C4 C4.B3 | G3 - - - |\nT | C4.Bb3 Ab3 G3 G3.F3 | E3 - - - |\nB | Ab3.G3 F3 G3 G2 | C3 - - - |",
        ),
        (
            "appoggiatura",
            "key B major\nmetre 4/4\n\nS | F#5 F#5 E5 D#5 | C#5 D#5.E5 C#5 - |\nA | A#4 A#4.B4 C#5.A#4 F#4.G#4 | A#4 B4 B4 A#4 |\nT | F#4 E4.D#4 C#4 D#4.E4 | F#4 F#4 G#4 F#4.E4 |\nB | F#3 F#3.G#3 A#3.F#3 B3 | E3.D#3 C#3.B2 E3.C#3 F#3 |",
        ),
        (
            "resolution-sounding",
            "key C major\nmetre 4/4\n\nS | A4 - A4 B4 | C5 B4 C5 A4 | B4 - - - |\nA | E4 - E4 G4 | G4 G4 G4 -.-.F4.E4 | D4 - - - |\nT | C4 - C4 D4 | E4 F4.D4 C4 C4.-.D4.C4 | B3 - - - |\nB | A2 - A2 G3.F3 | E3.C3 D3.F3 E3.C3 F3.D3 | G3 - - - |",
        ),
        (
            "consonant-fourth",
            "key Eb major\nmetre 4/4\n\nS | G4 F4 Bb4 -.Ab4 | G4 Eb5.D5 B4 - |\nA | Eb4 D4 E4 F4 | D4 G4 F4 - |\nT | Bb3 Bb3 Bb3 C4 | B3 C4 D4 - |\nB | Eb3 Bb3.Ab3 G3 F3 | - Eb3 D3 - |",
        ),
        (
            "cross-relation",
            "key G minor\nmetre 4/4\n\nS | Bb4 C5 Bb4 - | A4 - G4 - |\nA | G4 -.A4 -.G4 - | G4.-.F#4.E4 F#4 D4 - |\nT | B3 C4.Eb4 D4 - | Eb4.C4 A3.-.D4.C4 Bb3 - |\nB | D3 Eb3.C3 G2 Bb2 | C3.A2 D3 G2 - |",
        ),
    ];
    let loud = places.map(|(rule, music)| told(music, "").contains(&rule).then_some(rule));
    assert_eq!(loud, [None; 10]);
}

/// Where no key is sure, the key of the chord it goes to tells the leading note.
#[test]
fn the_chord_it_goes_to_tells_the_leading_note() {
    let music = "key C major\nmetre 3/4\n\nS | G4 G4 A4 | B4 G4 - | A4 A4 - |\nA | E4 E4 F#4 | G4.F4 E4 - | F4 - - |\nT | B3 B3 D4 | D4 C4 - | C4 - - |\nB | E3 E3 D3 | G2 C3 - | F3 - - |";
    assert!(told(music, "").contains(&"leading-note-resolution"));
}
