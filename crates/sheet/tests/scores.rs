//! Real scores typed as sheets and read back: the same spelling, octave, onset, length and
//! fermata as in the outside data (see its README for where each set comes from).
//!
//! The data stands beside the repository or where `PARTWRIGHT_SHARED` says; without it the test
//! says so and is left out. Bars are of four crotchets throughout, whatever the edition has: what
//! is tested is the reading of notes.

#![allow(clippy::unwrap_used, clippy::panic, clippy::print_stdout)]

use std::fmt::Write;
use std::fs;
use std::path::{Path, PathBuf};

use partwright_score::{Pitch, Sound, Time, ZERO};
use partwright_sheet::Sheet;
use serde_json::Value;

/// A note of the data with its ties merged: onset, end, pitch or silence, fermata.
#[derive(Clone, Debug, PartialEq)]
struct Given {
    onset: Time,
    end: Time,
    pitch: Option<Pitch>,
    fermata: bool,
}

fn folder() -> Option<PathBuf> {
    let beside = Path::new(env!("CARGO_MANIFEST_DIR")).join("../../../shared");
    let shared = std::env::var_os("PARTWRIGHT_SHARED").map_or(beside, PathBuf::from);
    let scores = shared.join("data/scores");
    scores.is_dir().then_some(scores)
}

fn voice(notes: &Value) -> Vec<Given> {
    let mut given: Vec<Given> = Vec::new();
    for note in notes.as_array().unwrap() {
        let whole = |i: usize| note[i].as_i64().unwrap();
        let onset = Time::new(whole(0), whole(1));
        let end = onset + Time::new(whole(2), whole(3));
        let pitch = note[4].as_str().map(|name| name.parse().unwrap());
        let tied = note[5].as_bool().unwrap();
        let fermata = note[6].as_bool().unwrap();
        match given.last_mut() {
            Some(last) if last.pitch == pitch && (tied || pitch.is_none()) => {
                last.end = end;
                last.fermata |= fermata;
            }
            _ => given.push(Given {
                onset,
                end,
                pitch,
                fermata,
            }),
        }
    }
    given
}

/// The parts of a cell: enough of them that every note begins on one.
fn cell(out: &mut String, notes: &[Given], from: Time, last: &mut Option<Pitch>) {
    let length = Time::new(1, 4);
    let inside = notes
        .iter()
        .filter(|n| n.onset > from && n.onset < from + length);
    let parts = inside.fold(1, |parts, note| {
        let needed = *((note.onset - from) / length).denom();
        (1..).map(|k| parts * k).find(|n| n % needed == 0).unwrap()
    });
    assert!(parts <= 64);
    for part in 0..parts {
        let at = from + length * part / parts;
        let _ = write!(out, "{}", if part == 0 { " " } else { "." });
        let index = notes.partition_point(|note| note.onset <= at) - 1;
        let note = &notes[index];
        match note.pitch {
            _ if at >= note.end => out.push('_'),
            None => out.push('_'),
            Some(_) if note.onset < at => out.push('-'),
            Some(pitch) => {
                let near = |before: Pitch| {
                    before.octave() == pitch.octave() && (before.step - pitch.step).abs() < 5
                };
                if last.is_some_and(near) {
                    out.push_str(&pitch.class_name());
                } else {
                    let _ = write!(out, "{pitch}");
                }
                *last = Some(pitch);
                if note.fermata {
                    out.push('^');
                }
            }
        }
    }
}

fn sheet(voices: &[Vec<Given>]) -> String {
    let end = voices
        .iter()
        .filter_map(|v| v.last())
        .map(|n| n.end)
        .max()
        .unwrap();
    let cells = usize::try_from((end * 4).ceil().to_integer()).unwrap();
    let mut out = String::from("metre free\n");
    for system in (0..cells).step_by(16) {
        out.push('\n');
        for (index, notes) in voices.iter().enumerate() {
            let _ = write!(out, "V{index} |");
            let mut last = None;
            for at in system..(system + 16).min(cells) {
                cell(&mut out, notes, Time::new(at as i64, 4), &mut last);
                if at % 4 == 3 || at + 1 == cells {
                    out.push_str(" |");
                }
            }
            out.push('\n');
        }
    }
    out
}

fn check(line: &str) {
    let score: Value = serde_json::from_str(line).unwrap();
    let id = score["id"].as_str().unwrap();
    let voices: Vec<Vec<Given>> = score["voices"]
        .as_array()
        .unwrap()
        .iter()
        .map(|of| voice(&of["notes"]))
        .collect();
    if voices.iter().any(Vec::is_empty) {
        return;
    }
    let text = sheet(&voices);
    let reading = Sheet::read(&text).lower(&text);
    assert!(
        reading.problems.is_empty(),
        "{id}: {:?}",
        reading.problems[0]
    );
    for (given, read) in voices.iter().zip(&reading.score.voices) {
        let mut found = read.notes.iter().map(|note| Given {
            onset: note.onset,
            end: note.end(),
            pitch: note.sound.pitch(),
            fermata: note.fermata && note.sound != Sound::Rest,
        });
        for note in given {
            let mut read = found.next().unwrap();
            if note.pitch.is_none() {
                // The sheet goes on in silence to the end of its last beat.
                read.end = read.end.min(note.end);
                read.fermata = note.fermata;
            }
            assert_eq!(&read, note, "{id}, {}", reading.score.voices.len());
        }
        assert!(found.all(|rest| rest.pitch.is_none() && rest.end > ZERO));
    }
}

#[test]
fn real_scores_are_read_back_note_for_note() {
    let Some(folder) = folder() else {
        println!("left out: no outside data here (set PARTWRIGHT_SHARED to its folder)");
        return;
    };
    let mut count = 0;
    for file in ["fux", "chorales-nba", "chorales-dcml", "renaissance"] {
        let text = fs::read_to_string(folder.join(file).with_extension("jsonl")).unwrap();
        for line in text.lines() {
            check(line);
            count += 1;
        }
    }
    println!("{count} scores");
    assert!(count > 500);
}
