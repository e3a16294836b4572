//! Successions at a level of the bar, against passages worked out by hand.

#![allow(clippy::unwrap_used, clippy::panic)]

use partwright_check::{Checked, Wishes};
use partwright_rules::{Level, PairMove, Piece, Succession};
use partwright_score::{Pair, Score, Texture, show_time};

fn score(rows: &[&str]) -> Score {
    let text = format!("metre 2/2\n\n{}\n", rows.join("\n"));
    let checked = Checked::text(&text, &Wishes::default());
    assert!(
        checked.findings.iter().all(|f| f.rule != "reading"),
        "{text}"
    );
    checked.reading.score
}

/// The moments (from, to) of the successions of the first two voices that repeat a perfect
/// interval.
fn repeated(rows: &[&str], look: fn(&PairMove<'_>) -> Option<(String, bool)>) -> Vec<String> {
    let score = score(rows);
    let texture = Texture::of(&score);
    let piece = Piece {
        score: &score,
        texture: &texture,
        analysis: &partwright_check::Analysis::default(),
    };
    let pair = Pair { upper: 0, lower: 1 };
    let mut found = Vec::new();
    for there in piece.soundings() {
        for step in there.moves(false).filter(|step| step.pair == pair) {
            if let Some((moments, true)) = look(&step) {
                found.push(moments);
            }
        }
    }
    found
}

fn told(succession: Option<Succession<'_>>) -> Option<(String, bool)> {
    succession.map(|s| {
        let moments = format!(
            "{} to {}",
            show_time(s.from.onset()),
            show_time(s.step.arrival())
        );
        (moments, s.same_perfect().is_some())
    })
}

fn downbeats(step: &PairMove<'_>) -> Option<(String, bool)> {
    told(step.from_downbeat())
}

fn off_beats(step: &PairMove<'_>) -> Option<(String, bool)> {
    told(step.from_off_beat())
}

fn late(step: &PairMove<'_>) -> Option<(String, bool)> {
    told(step.from_late_in_bar())
}

fn beats(step: &PairMove<'_>) -> Option<(String, bool)> {
    told(step.from_beat())
}

fn delayed(step: &PairMove<'_>) -> Option<(String, bool)> {
    told(step.over_suspension())
}

#[test]
fn downbeats_look_over_what_stands_between() {
    let passage = ["a | A4 F4 | B4 G4 | C5 - |", "b | D4 - | E4 - | F4 - |"];
    assert_eq!(repeated(&passage, downbeats), ["0 to 1", "1 to 2"]);
    // A fifth and a twelfth that the voices reach against each other are none.
    let contrary = ["a | A4 C5 | E5 - |", "b | D4 - | A3 - |"];
    assert!(repeated(&contrary, downbeats).is_empty());
    // The same two classes an octave higher are no succession.
    let octave = ["a | A3 - | A4 - |", "b | D3 - | D4 - |"];
    assert!(repeated(&octave, downbeats).is_empty());
}

#[test]
fn no_level_looks_across_a_rest_or_the_end_of_a_phrase() {
    let rest = ["a | A4 _ | B4 G4 |", "b | D4 - | E4 - |"];
    assert!(repeated(&rest, downbeats).is_empty());
    let phrase = ["a | A4 F4^ | B4 G4 |", "b | D4 - | E4 - |"];
    assert!(repeated(&phrase, downbeats).is_empty());
    let beat = ["a | A4._.C5 B4 |", "b | D4 E4 |"];
    assert!(repeated(&beat, beats).is_empty());
}

#[test]
fn off_beats_compare_the_same_place_in_successive_bars() {
    let passage = ["a | F4 A4 | G4 B4 |", "b | D4 - | E4 - |"];
    assert_eq!(repeated(&passage, off_beats), ["1/2 to 3/2"]);
    assert!(repeated(&passage, downbeats).is_empty());
    // Nothing moves at the half of the first bar.
    let still = ["a | A4 - | G4 B4 |", "b | D4 - | E4 - |"];
    assert!(repeated(&still, off_beats).is_empty());
}

#[test]
fn late_in_the_bar_is_after_its_first_beat_and_before_the_last_note() {
    let third = ["a | F4.G4 A4.C5 | B4 - |", "b | D4 - | E4 - |"];
    assert_eq!(repeated(&third, late), ["1/2 to 1"]);
    let second = ["a | F4.A4 D5.C5 | B4 - |", "b | D4 - | E4 - |"];
    assert_eq!(repeated(&second, late), ["1/4 to 1"]);
    // From the first beat it is a matter of downbeats, from the last note one of parallels.
    let first = ["a | A4.C5 D5.C5 | B4 - |", "b | D4 - | E4 - |"];
    assert!(repeated(&first, late).is_empty());
    let last = ["a | F4.G4 F4.A4 | B4 - |", "b | D4 - | E4 - |"];
    assert!(repeated(&last, late).is_empty());
}

#[test]
fn beats_look_over_ornaments_only() {
    let ornament = ["a | A4.C5 B4 |", "b | D4 E4 |"];
    assert_eq!(repeated(&ornament, beats), ["0 to 1/2"]);
    let plain = ["a | A4 B4 |", "b | D4 E4 |"];
    assert!(repeated(&plain, beats).is_empty());
}

#[test]
fn a_suspension_is_held_over_a_stronger_moment_and_falls() {
    let octaves = ["a | _ A4 | - G4 |", "b | A3 - | G3 - |"];
    assert_eq!(repeated(&octaves, delayed), ["1/2 to 3/2"]);
    // Held over a weaker moment: an anticipation in the other voice.
    let early = ["a | A4 - | G4 - |", "b | A3 G3 | - - |"];
    assert!(repeated(&early, delayed).is_empty());
    // Rising, or by leap.
    let leap = ["a | _ A4 | - F4 |", "b | A3 - | F3 - |"];
    assert!(repeated(&leap, delayed).is_empty());
}

#[test]
fn a_leap_between_and_a_turn_are_seen() {
    let seen = |rows: &[&str], look: fn(&PairMove<'_>) -> Option<(String, bool)>| {
        !repeated(rows, look).is_empty()
    };
    let third = ["a | A4 F4 | B4 G4 |", "b | D4 - | E4 - |"];
    let fourth = ["a | A4 D5 | B4 G4 |", "b | D4 - | E4 - |"];
    let leaps = |step: &PairMove<'_>| {
        let bar = step.from_downbeat()?;
        Some((String::new(), bar.leaps_between()))
    };
    assert!(!seen(&third, leaps) && seen(&fourth, leaps));
    let straight = ["a | F4 A4 | G4 B4 |", "b | D4 - | E4 - |"];
    let turned = ["a | F4 A4 | C5 B4 |", "b | D4 - | E4 - |"];
    let turns = |step: &PairMove<'_>| {
        let bar = step.from_off_beat()?;
        Some((String::new(), bar.turns()))
    };
    assert!(!seen(&straight, turns) && seen(&turned, turns));
}

#[test]
fn runs_are_counted_at_each_level() {
    let runs = |rows: &[&str], level| -> Vec<(bool, i32)> {
        let score = score(rows);
        let texture = Texture::of(&score);
        let piece = Piece {
            score: &score,
            texture: &texture,
            analysis: &partwright_check::Analysis::default(),
        };
        let runs = piece.parallel_runs(Pair { upper: 0, lower: 1 }, level);
        runs.iter().map(|run| (run.sixths, run.intervals)).collect()
    };
    let thirds = ["a | E4 F4 | G4 A4 | B4 - |", "b | C4 D4 | E4 F4 | D4 - |"];
    assert_eq!(runs(&thirds, Level::Notes), [(false, 4)]);
    assert_eq!(runs(&thirds, Level::Downbeats), [(false, 2)]);
    // A repeated third holds the run up, and does not count.
    let repeated = ["a | E4 F4 | F4 G4 |", "b | C4 D4 | D4 E4 |"];
    assert_eq!(runs(&repeated, Level::Notes), [(false, 3)]);
    // Oblique motion ends it; tenths are thirds.
    let broken = ["a | E5 F5 | G5 G5 | A5 - |", "b | C4 D4 | E4 B4 | C5 - |"];
    assert_eq!(runs(&broken, Level::Notes), [(false, 3), (true, 2)]);
    let chain = [
        "a | _ C5 | - B4 | - A4 | - G4 |",
        "b | A3 - | G3 - | F3 - | E3 - |",
    ];
    assert_eq!(runs(&chain, Level::OffBeats), [(false, 4)]);
}
