//! In strict lines nothing but the listed intervals: whatever two notes make, some rule speaks of
//! it or it is on the list.

#![allow(clippy::unwrap_used)]

use partwright_check::{Checked, Severity, Wishes};
use partwright_rules::{Style, family_of};
use partwright_score::Pitch;

/// Steps and semitones, upward: unison, seconds, thirds, fourth, fifth, minor sixth, octave. The
/// sixth only upward (Fux; Lehmann, lesson I).
const PERMITTED: [(i16, i32); 9] = [
    (0, 0),
    (1, 1),
    (1, 2),
    (2, 3),
    (2, 4),
    (3, 5),
    (4, 7),
    (5, 8),
    (7, 12),
];

fn is_permitted(from: Pitch, to: Pitch) -> bool {
    let steps = to.step - from.step;
    let semitones = to.place().semitone - from.place().semitone;
    let up = PERMITTED.contains(&(steps, semitones));
    up || PERMITTED.contains(&(-steps, -semitones)) && steps != -5
}

/// How the rules for lines judge a move in a style; a foreign accidental counts where no other
/// rule speaks: in motets a diminished second is left to it.
fn severities(style: Style, from: Pitch, to: Pitch) -> Vec<Severity> {
    let sheet = format!("style {}\n\nS | {from} {to} |\n", style.name());
    let checked = Checked::text(&sheet, &Wishes::default());
    let lines = checked
        .findings
        .iter()
        .filter(|f| family_of(f.rule) == Some("line"));
    let (foreign, moves): (Vec<_>, Vec<_>) = lines.partition(|f| f.rule == "foreign-accidental");
    let told = if moves.is_empty() { foreign } else { moves };
    told.iter().map(|f| f.severity).collect()
}

#[test]
fn strict_styles_take_the_listed_intervals_and_no_others() {
    let from: Pitch = "D5".parse().unwrap();
    let mut tried = 0;
    for step in from.step - 15..=from.step + 15 {
        for sign in -2..=2 {
            let to = Pitch { step, sign };
            for style in [Style::Species1, Style::Motet] {
                let found = severities(style, from, to);
                if is_permitted(from, to) {
                    assert!(
                        found.is_empty(),
                        "{from} {to} in {}: {found:?}",
                        style.name()
                    );
                } else {
                    assert_eq!(found, [Severity::Fault], "{from} {to} in {}", style.name());
                }
                tried += 1;
            }
        }
    }
    assert_eq!(tried, 31 * 5 * 2);
}

#[test]
fn the_falling_minor_sixth_is_a_weakness_in_quicker_species() {
    let (from, to) = ("C5".parse().unwrap(), "E4".parse().unwrap());
    for style in [
        Style::Species2,
        Style::Species3,
        Style::Species4,
        Style::Species5,
    ] {
        assert_eq!(
            severities(style, from, to),
            [Severity::Weakness],
            "{}",
            style.name()
        );
    }
}
