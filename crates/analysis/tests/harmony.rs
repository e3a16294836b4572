//! Chords and keys where the music is plain, and where there is none to be sure of.

#![allow(clippy::unwrap_used, clippy::panic)]

use partwright_analysis::Analysis;
use partwright_analysis::harmony::{Segment, in_one_go};
use partwright_score::{Pitch, Score, Texture};
use partwright_sheet::Sheet;

fn score(text: &str) -> Score {
    let reading = Sheet::read(text).lower(text);
    assert_eq!(reading.problems, [], "{text}");
    reading.score
}

/// The chords of voices written from the top down, each a string of bars.
fn read(head: &str, voices: &[&str]) -> Vec<Segment> {
    let rows = voices.iter().zip('S'..);
    let rows: String = rows
        .map(|(row, name)| format!("{name} | {row} |\n"))
        .collect();
    let score = score(&format!("{head}metre 4/4\n\n{rows}"));
    let texture = Texture::of(&score);
    let analysis = Analysis::of(&score, &texture);
    in_one_go(&score, &texture, analysis.dissonances())
}

fn names(found: &[Segment]) -> Vec<String> {
    found.iter().map(|segment| segment.chord.name()).collect()
}

/// Nothing is called sure: neither a chord nor its seventh.
fn nothing_is_sure(found: &[Segment]) {
    let sure = found.iter().find(|s| s.is_sure() || s.seventh_is_sure());
    assert_eq!(sure.map(|s| (s, s.chord.name())), None);
}

const CADENCE: [&str; 4] = [
    "E5 D5 D5 C5 | E5 D5 D5 C5",
    "G4 A4 G4 G4 | G4 A4 G4 G4",
    "C4 D4 B3 E4 | C4 D4 B3 E4",
    "C3 F3 G3 C3 | C3 F3 G3 C3",
];

#[test]
fn a_plain_cadence_is_sure_without_a_key() {
    let found = read("", &CADENCE);
    let once = ["C major", "D minor", "G major", "C major"];
    assert_eq!(names(&found[..4]), once);
    for segment in found.iter().filter(|s| s.chord.root != 2) {
        assert!(segment.is_sure(), "{segment:?}");
        assert_eq!(segment.key.unwrap().name(), "C major");
    }
}

#[test]
fn a_stated_key_that_the_notes_contradict_is_left() {
    let found = read("key F# major\n", &CADENCE);
    assert_eq!(names(&found), names(&read("", &CADENCE)));
    assert_eq!(found.last().unwrap().key.unwrap().name(), "C major");
}

#[test]
fn a_stated_key_decides_where_the_notes_do_not() {
    let voices = ["E5 - - -", "C5 - - -", "A4 - - -", "A3 - - -"];
    for (head, key) in [
        ("key A minor\n", "A minor"),
        ("key C major\n", "C major"),
        ("key A aeolian\n", "A minor"),
        ("key D dorian\n", "D minor"),
        ("key E phrygian\n", "E minor"),
        ("key G mixolydian\n", "G major"),
    ] {
        assert_eq!(read(head, &voices)[0].key.unwrap().name(), key, "{head}");
    }
}

#[test]
fn a_suspension_stands_for_its_resolution() {
    let found = read(
        "key C major\n",
        &[
            "C5 - B4 - | C5 - - -",
            "E4 D4 - - | E4 - - -",
            "G3 - - - | G3 - - -",
            "C3 G3 - - | C3 - - -",
        ],
    );
    assert_eq!(names(&found), ["C major", "G major", "C major"]);
    // In the bass as well, where a fourth above it is no chord on it.
    let found = read(
        "key C major\n",
        &[
            "E5 D5 - - | C5 - - -",
            "G4 - - - | G4 - - -",
            "G4 - - - | E4 - - -",
            "C4 - B3 - | C4 - - -",
        ],
    );
    assert_eq!(names(&found), ["C major", "G major", "C major"]);
}

#[test]
fn a_seventh_that_passes_is_a_chord_of_the_same_root() {
    let found = read(
        "key C major\n",
        &[
            "C5 - B4 - | C5 - - -",
            "E4 - G4 -.F4 | E4 - - -",
            "G3 - D4 - | G3 - - -",
            "C3 - G3 - | C3 - - -",
        ],
    );
    let dominants: Vec<i32> = found[1..found.len() - 1]
        .iter()
        .map(|segment| segment.chord.root)
        .collect();
    assert!(
        !dominants.is_empty() && dominants.iter().all(|root| *root == 1),
        "{dominants:?}"
    );
    assert!(!found[1].chord.quality.has_seventh());
}

#[test]
fn augmented_sixths_are_told_by_their_spelling() {
    for (inner, name) in [
        ("C4", "Ab Italian sixth"),
        ("Eb4", "Ab German sixth"),
        ("D4", "Ab French sixth"),
    ] {
        let alto = format!("Eb4 - {inner} - | D4 - - -");
        let found = read(
            "key C minor\n",
            &[
                "C5 - F#5 - | G5 - - -",
                &alto,
                "G3 - C4 - | B3 - - -",
                "C3 - Ab2 - | G2 - - -",
            ],
        );
        assert_eq!(names(&found), ["C minor", name, "G major"]);
        assert!(found[1].is_sure(), "{:?}", found[1]);
    }
}

#[test]
fn rows_and_clusters_are_never_sure() {
    let row = [
        "C", "F#", "B", "F", "Bb", "E", "Eb", "A", "Ab", "D", "C#", "G",
    ];
    // Four forms of a row against each other, a note a beat.
    let voice = |shift: usize, step: usize, octave: usize| {
        let notes = (0..12).map(|i| format!("{}{octave}", row[(i * step + shift) % 12]));
        let notes: Vec<String> = notes.collect();
        let bars: Vec<String> = notes.chunks(4).map(|bar| bar.join(" ")).collect();
        bars.join(" | ")
    };
    for shift in 0..12 {
        let voices: Vec<String> = [
            (0, 1, 5),
            (shift, 5, 4),
            (2 * shift + 3, 7, 4),
            (shift + 6, 11, 3),
        ]
        .map(|(shift, step, octave)| voice(shift, step, octave))
        .into();
        let voices: Vec<&str> = voices.iter().map(String::as_str).collect();
        let found = read("", &voices);
        // Four notes drawn so are a chord by chance now and then: then all of them are of it.
        for segment in found.iter().filter(|s| s.is_sure()) {
            let whole = (segment.first..segment.end).any(|k| {
                let sounding = voices.iter().map(|voice| {
                    let notes = voice.split(' ').filter(|word| *word != "|");
                    notes.clone().nth(k).unwrap().parse::<Pitch>().unwrap()
                });
                sounding
                    .into_iter()
                    .all(|pitch| segment.chord.tone(pitch).is_some())
            });
            assert!(whole, "{segment:?} in {voices:?}");
        }
    }
    let found = read(
        "",
        &[
            "F4 F#4 G4 Ab4 | A4 - - -",
            "E4 F4 F#4 G4 | G#4 - - -",
            "D#4 E4 F4 F#4 | G4 - - -",
            "D4 Eb4 E4 F4 | F#4 - - -",
        ],
    );
    nothing_is_sure(&found);
}

#[test]
fn two_voices_and_unisons_are_never_sure() {
    nothing_is_sure(&read(
        "key C major\n",
        &["E5 F5 G5 E5 | D5 C5 B4 C5", "C4 D4 E4 C4 | F4 E4 D4 C4"],
    ));
    let line = "C4 D4 E4 F4 | G4 A4 B4 C5";
    nothing_is_sure(&read("key C major\n", &[line; 4]));
    nothing_is_sure(&read(
        "key C major\n",
        &["G5 - - -", "G4 - - -", "D4 - - -", "G3 - - -"],
    ));
}

#[test]
fn silence_and_a_single_note_have_no_chord() {
    assert!(read("", &["_ _ _ _", "_ _ _ _"]).is_empty());
    assert!(read("", &["C4 _ _ _", "_ _ _ _"]).is_empty());
    let empty = Score::default();
    assert!(in_one_go(&empty, &Texture::of(&empty), &[]).is_empty());
}

#[test]
fn the_harmony_over_a_long_pedal_is_read() {
    let bars = |bar: [&str; 2]| {
        let all: Vec<&str> = bar.iter().cycle().take(40).copied().collect();
        all.join(" | ")
    };
    let pedal = format!("C3 - - - | {}", ["- - - -"; 39].join(" | "));
    let found = read(
        "key C major\n",
        &[
            &bars(["G4 - A4 -", "B4 - C5 -"]),
            &bars(["E4 - F4 -", "F4 - E4 -"]),
            &bars(["C4 - C4 -", "D4 - C4 -"]),
            &pedal,
        ],
    );
    // The same four chords in every pair of bars, however long the pedal has been there.
    let names = names(&found);
    let dominants = found
        .iter()
        .filter(|s| s.chord.name() == "B diminished" || s.chord.root == 1);
    assert_eq!(dominants.count(), 20, "{names:?}");
    assert!(names.iter().any(|name| name == "F major"), "{names:?}");
}
