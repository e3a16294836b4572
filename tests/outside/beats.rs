//! A hundred beats outside chorales, judged from the score alone before any chord is inferred.
//!
//! The places are drawn by lot, so that nobody chose the easy ones: every half note of two works of
//! the 16th century and every quarter of `quartet.voices`, where two voices or more sound. Each
//! line of `beats.jsonl` says what a reader names there: `root` and `quality`, the sounding `bass`,
//! the notes that are none of the chord (`set_aside`), and the other readings that are right too
//! (`also`). No chord is named where an analyst would name none: a lone pitch class.

use std::collections::BTreeSet;
use std::fs;
use std::path::PathBuf;

use partwright_check::{Checked, Wishes};
use partwright_score::{Pitch, Score, Time, show_time};
use serde_json::Value;

use crate::scores::{folder, set};

const SEED: u64 = 1725;

/// Set, piece, how many beats, and the length a place is drawn in: the denominator of a whole note.
const DRAWN: [(&str, &str, usize, i64); 3] = [
    (
        "renaissance",
        "d-mbs--4-mus-pr-11-beibd-4_waclaw-z-szamotul--ego-sum-pastor-bonus",
        35,
        2,
    ),
    (
        "renaissance",
        "pl-gd--ee-1638--003-020_marenzio-luca--madrigali-a-quatro-voci-tutto-il-di-piango",
        35,
        2,
    ),
    ("quartet", "quartet", 30, 4),
];

/// The qualities that may be named, as letters and semitones above the root.
const QUALITIES: [(&str, &[(i32, i32)]); 10] = [
    ("major", &[(0, 0), (2, 4), (4, 7)]),
    ("minor", &[(0, 0), (2, 3), (4, 7)]),
    ("diminished", &[(0, 0), (2, 3), (4, 6)]),
    ("augmented", &[(0, 0), (2, 4), (4, 8)]),
    ("dominant-seventh", &[(0, 0), (2, 4), (4, 7), (6, 10)]),
    ("major-seventh", &[(0, 0), (2, 4), (4, 7), (6, 11)]),
    ("minor-seventh", &[(0, 0), (2, 3), (4, 7), (6, 10)]),
    (
        "half-diminished-seventh",
        &[(0, 0), (2, 3), (4, 6), (6, 10)],
    ),
    ("diminished-seventh", &[(0, 0), (2, 3), (4, 6), (6, 9)]),
    ("open-fifth", &[(0, 0), (4, 7)]),
];

fn file(name: &str) -> String {
    let folder = PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("tests/outside");
    fs::read_to_string(folder.join(name)).unwrap()
}

fn beats() -> Vec<Value> {
    let text = file("beats.jsonl");
    text.lines()
        .map(|line| serde_json::from_str(line).unwrap())
        .collect()
}

/// The score of a drawn piece, where it can be had.
fn score(group: &str, piece: &str) -> Option<Score> {
    if group == "quartet" {
        let checked = Checked::text(&file("quartet.voices"), &Wishes::default());
        return Some(checked.reading.score.clone());
    }
    let found = set(group)?.into_iter().find(|p| p.id == piece);
    Some(found.unwrap().score)
}

/// What sounds at a moment: the label of the voice and its pitch, top voice first.
fn sounding(score: &Score, at: Time) -> Vec<(&str, Pitch)> {
    let sounds = score.voices.iter().enumerate().filter_map(|(v, voice)| {
        let note = &voice.notes[score.note_at(v, at)?];
        Some((voice.label.as_str(), note.sound.pitch()?))
    });
    sounds.collect()
}

/// Every moment that may be drawn.
fn moments(score: &Score, grid: i64) -> Vec<Time> {
    let ticks = (0..).map(|n| Time::new(n, grid));
    ticks
        .take_while(|&at| at < score.end())
        .filter(|&at| sounding(score, at).len() >= 2)
        .collect()
}

/// So many of them, by lot, none twice: a linear congruential generator (multiplier and increment
/// as in Knuth's MMIX), its upper bits.
fn draw(mut left: Vec<Time>, count: usize) -> Vec<Time> {
    let mut state = SEED;
    let mut drawn: Vec<Time> = (0..count)
        .map(|_| {
            state = state
                .wrapping_mul(6_364_136_223_846_793_005)
                .wrapping_add(1_442_695_040_888_963_407);
            let lot = (state >> 33) % u64::try_from(left.len()).unwrap();
            left.remove(usize::try_from(lot).unwrap())
        })
        .collect();
    drawn.sort_unstable();
    drawn
}

/// The lines of one piece, each with the moment its bar and beat name.
fn placed(score: &Score, piece: &str, grid: i64) -> Vec<(Value, Time)> {
    let all = moments(score, grid);
    let moment = |line: &Value| {
        let at = all.iter().copied().find(|&at| {
            let place = score.place(at);
            line["bar"] == place.bar && line["beat"] == place.beat_text()
        });
        at.unwrap_or_else(|| panic!("no such place: {line}"))
    };
    let lines = beats().into_iter().filter(|line| line["piece"] == piece);
    lines
        .map(|line| {
            let at = moment(&line);
            (line, at)
        })
        .collect()
}

pub(crate) fn each_piece(mut look: impl FnMut(&Score, &[(Value, Time)], i64)) {
    for (group, piece, count, grid) in DRAWN {
        let Some(score) = score(group, piece) else {
            continue;
        };
        let placed = placed(&score, piece, grid);
        assert_eq!(placed.len(), count, "{piece}");
        look(&score, &placed, grid);
    }
}

/// A root as spelled, in some octave.
fn root(name: &str) -> Pitch {
    let pitch: Pitch = format!("{name}4").parse().unwrap();
    assert_eq!(pitch.class_name(), name);
    pitch
}

/// Whether a reading is lawful, and whether a pitch belongs to it.
fn belongs(root_name: &Value, quality: &Value, pitch: Pitch) -> bool {
    let Some(name) = root_name.as_str() else {
        assert!(root_name.is_null() && quality == "none");
        return false;
    };
    let chord = QUALITIES.iter().find(|(q, _)| quality == q);
    let (_, chord) = chord.unwrap_or_else(|| panic!("no such quality: {quality}"));
    let (from, to) = (root(name).place(), pitch.place());
    let letters = (to.step - from.step).rem_euclid(7);
    let semitones = (to.semitone - from.semitone).rem_euclid(12);
    chord.contains(&(letters, semitones))
}

#[test]
fn there_are_a_hundred_and_each_says_all() {
    let beats = beats();
    assert_eq!(beats.len(), 100);
    let mut places = BTreeSet::new();
    for line in &beats {
        let keys: BTreeSet<&str> = line
            .as_object()
            .unwrap()
            .keys()
            .map(String::as_str)
            .collect();
        let wanted = "also bar bass beat piece quality root set set_aside";
        assert_eq!(keys, wanted.split(' ').collect(), "{line}");
        let home = |(group, piece, ..): &(&str, &str, usize, i64)| {
            line["set"] == *group && line["piece"] == *piece
        };
        assert!(DRAWN.iter().any(home), "{line}");
        let place = (&line["piece"], &line["bar"], &line["beat"]);
        assert!(places.insert(format!("{place:?}")), "twice: {line}");
    }
}

#[test]
fn readings_are_lawful_and_no_reading_stands_twice() {
    let any = root("C");
    for line in beats() {
        let mut readings = vec![(line["root"].clone(), line["quality"].clone())];
        for other in line["also"].as_array().unwrap() {
            assert_eq!(other.as_array().unwrap().len(), 2, "{line}");
            readings.push((other[0].clone(), other[1].clone()));
        }
        let mut seen = BTreeSet::new();
        for (root, quality) in readings {
            belongs(&root, &quality, any);
            assert!(seen.insert(format!("{root} {quality}")), "twice: {line}");
        }
    }
}

#[test]
fn the_places_are_those_that_the_seed_draws() {
    each_piece(|score, placed, grid| {
        let judged: Vec<Time> = placed.iter().map(|(_, at)| *at).collect();
        let drawn = draw(moments(score, grid), placed.len());
        let said = |times: &[Time]| times.iter().map(|&t| show_time(t)).collect::<Vec<_>>();
        assert_eq!(said(&judged), said(&drawn));
    });
}

#[test]
fn the_bass_is_the_lowest_note_sounding() {
    each_piece(|score, placed, _| {
        for (line, at) in placed {
            let notes = sounding(score, *at);
            let lowest = notes.iter().map(|(_, p)| *p);
            let lowest = lowest.min_by_key(|p| p.place().semitone).unwrap();
            assert_eq!(line["bass"], lowest.class_name(), "{line}");
        }
    });
}

#[test]
fn a_note_is_of_the_chord_or_set_aside() {
    each_piece(|score, placed, _| {
        for (line, at) in placed {
            let aside: BTreeSet<&str> = line["set_aside"]
                .as_array()
                .unwrap()
                .iter()
                .map(|said| said.as_str().unwrap().split_once(": ").unwrap().0)
                .collect();
            let mut strangers = BTreeSet::new();
            for (voice, pitch) in sounding(score, *at) {
                if !line["root"].is_null() && !belongs(&line["root"], &line["quality"], pitch) {
                    strangers.insert(format!("{pitch} in {voice}"));
                }
            }
            let strangers: BTreeSet<&str> = strangers.iter().map(String::as_str).collect();
            assert_eq!(strangers, aside, "{line}");
        }
    });
}

#[test]
fn a_piece_left_out_is_left_out_for_want_of_data_only() {
    for (group, piece, ..) in DRAWN {
        let wanted = group == "quartet" || folder().is_some();
        assert_eq!(score(group, piece).is_some(), wanted, "{piece}");
    }
}

#[test]
fn nothing_is_found_in_the_quartet() {
    let checked = Checked::text(&file("quartet.voices"), &Wishes::default());
    assert!(checked.reading.score.bars.len() >= 24);
    let found: Vec<_> = checked.findings.iter().map(|f| f.rule).collect();
    assert!(found.is_empty(), "{found:?}");
}
