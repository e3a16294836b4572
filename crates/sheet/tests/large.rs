//! Sheets of a size and a shape that nobody writes: read in one piece, every mistake told.

#![allow(clippy::unwrap_used, clippy::panic)]

use std::fmt::Write;

use partwright_score::MOST_VOICES;
use partwright_sheet::{LARGEST, Lines, ProblemKind, Reading, Sheet};

fn read(text: &str) -> Reading {
    Sheet::read(text).lower(text)
}

#[test]
fn a_sheet_too_large_is_refused_with_that_reason() {
    let text = "S | G4 |\n".repeat(LARGEST / 9 + 1);
    let reading = read(&text);
    assert_eq!(reading.problems.len(), 1);
    assert!(reading.problems[0].message.contains("8 MiB"));
    assert!(reading.score.voices.is_empty());
    assert_eq!(reading.describe(), "bars\n");
    let most = "// ".repeat(LARGEST / 3);
    assert!(read(&most).problems.is_empty());
}

#[test]
fn ten_thousand_mistakes_on_one_line_are_all_told() {
    let text = format!("S | {}|\n", "G4 H4 ".repeat(10_000));
    let reading = read(&text);
    assert_eq!(reading.problems.len(), 10_000);
    let lines = Lines::of(&text);
    let last = reading.problems.last().unwrap();
    let column = 5 + 6 * 9_999 + 3;
    assert_eq!(lines.position(last.span.start as usize), (1, column));
}

#[test]
fn a_line_of_a_megabyte_is_read() {
    let text = format!("metre 4/4\nS |{}\n", " G4 A.B C5 B4 |".repeat(70_000));
    let reading = read(&text);
    assert!(reading.problems.is_empty());
    assert_eq!(reading.score.bars.len(), 70_000);
    assert_eq!(reading.score.voices[0].notes.len(), 350_000);
}

#[test]
fn a_cell_of_a_megabyte_is_one_mistake() {
    let reading = read(&format!("S | {}G4 |\n", "H4.".repeat(350_000)));
    assert_eq!(reading.problems.len(), 1);
    assert!(reading.problems[0].message.contains("350001"));
}

#[test]
fn voices_beyond_the_most_there_can_be_are_told_once() {
    let mut text = String::new();
    for voice in 0..MOST_VOICES + 9 {
        let _ = writeln!(text, "V{voice} | C4 |");
    }
    let reading = read(&text);
    assert_eq!(reading.score.voices.len(), MOST_VOICES);
    assert_eq!(reading.problems.len(), 1);
    assert!(reading.problems[0].message.contains("64"));
}

#[test]
fn silence_of_many_voices_in_many_systems_is_summed_up() {
    let mut text = String::new();
    for voice in 0..MOST_VOICES {
        let _ = writeln!(text, "voice V{voice}");
    }
    // In the last, which is at work, they may still come.
    text.push_str(&"\nV1 | G4 |\n".repeat(10_004));
    let reading = read(&text);
    let silent = |p: &&partwright_sheet::Problem| p.kind == ProblemKind::VoiceSilent;
    assert_eq!(reading.problems.iter().filter(silent).count(), 10_001);
    let last = &reading.problems.last().unwrap().message;
    assert!(last.contains("3 more"), "{last}");
}

#[test]
fn copies_of_copies_without_measure_are_refused() {
    let bar = "C5.".repeat(63) + "C5 ";
    let mut system = format!("V0 | {}|\n", bar.repeat(64));
    for voice in 1..MOST_VOICES {
        let _ = writeln!(system, "V{voice} | =V{} |", voice - 1);
    }
    let reading = read(&format!("{system}\n").repeat(20));
    let notes: usize = reading.score.voices.iter().map(|v| v.notes.len()).sum();
    assert!(notes < 3_000_000, "{notes}");
    assert!(!reading.problems.is_empty());
    assert!(
        reading
            .problems
            .iter()
            .all(|p| p.message.contains("more notes"))
    );
}

#[test]
fn binary_noise_is_read_to_its_end() {
    let noise: String = (0..300_000u32)
        .map(|i| char::from_u32(i.wrapping_mul(2_654_435_761) >> 17).unwrap_or('\n'))
        .collect();
    let reading = read(&noise);
    assert!(!reading.problems.is_empty());
}
