//! Figures that are held.

use partwright_analysis::figures::{Near, near_suspension};
use partwright_score::Time;

use crate::read::*;

#[test]
fn suspensions() {
    let s = "suspension";
    fits(
        &["D5 - - - | - - C -", "D4 - - - | E4 - - -"],
        "2:1 S suspension",
    );
    // Restruck: a new syllable on the held pitch.
    fits(
        &["D5 - - - | D - C -", "D4 - - - | E4 - - -"],
        "2:1 S suspension",
    );
    // In the lowest voice.
    fits(
        &["D5 - - - | E5 - - -", "D4 - - - | - - C -"],
        "2:1 B suspension",
    );
    misses(
        s,
        &["D5 - - - | - - E -", "D4 - - - | E4 - - -"],
        "2:1 S retardation",
        "it does not go down by step",
    );
    misses(
        s,
        &["D5 - - - | - - _ -", "D4 - - - | E4 - - -"],
        "2:1 none",
        "nothing follows it",
    );
}

#[test]
fn what_a_suspension_lacks() {
    let near = |rows: &[&str]| {
        let read = sheet(rows);
        let last = read.all().last().unwrap();
        near_suspension(&read.score, &read.texture, last).map(|(near, _)| near)
    };
    let leap = near(&["D5 - - - | - - A4 -", "D4 - - - | E4 - - -"]);
    assert_eq!(leap, Some(Near::Resolution));
    let weak = near(&["C5 - - - | B4 - - -", "F4 A3 D4 - | G4 - - -"]);
    assert_eq!(weak, Some(Near::Position));
    let struck = near(&["C5 - - - | F5 - A4 -", "A3 - - - | C4 - - -"]);
    assert_eq!(struck, None);
}

fn held(rows: &[&str]) -> (bool, Time, Time) {
    match sheet(rows).only() {
        Figure::Suspension(held) => (held.ornamented, held.struck, held.resolved),
        other => panic!("{other:?}"),
    }
}

#[test]
fn resolutions_with_an_ornament() {
    let bass = "D4 - - - | E4 - - -";
    let at = Time::new(3, 2);
    assert_eq!(
        held(&["D5 - - - | - - C -", bass]),
        (false, Time::from_integer(0), at)
    );
    // A leap to an agreeing note, and back to the resolution.
    assert!(held(&["D5 - - - | - B4 C5 -", bass]).0);
    // The note of resolution early: it is that note that counts.
    assert!(!held(&["D5 - - - | - C.C C -", bass]).0);
    // The ornament must agree.
    let read = sheet(&["D5 - - - | - A4 C5 -", "D4 - - - | E4 - - -"]);
    assert_eq!(read.told(), ["2:1 none"]);
}

#[test]
fn a_chain_in_three_parts() {
    let read = sheet(&[
        "C5 - - - | - - B4 - | - - A4 - | - - G4 -",
        "A4 - F - | - - - - | E4 - - - | D4 - - -",
        "A3 - - - | D3 - - - | C3 - - - | B2 - - -",
    ]);
    let told = read.told();
    let chain: Vec<_> = told
        .iter()
        .filter(|t| t.ends_with("S suspension"))
        .collect();
    assert_eq!(
        chain,
        ["2:1 S suspension", "3:1 S suspension", "4:1 S suspension"]
    );
}

#[test]
fn retardations() {
    fits(
        &["B4 - - - | - - C5 -", "G3 - - - | C4 - - -"],
        "2:1 S retardation",
    );
    let read = sheet(&["B4 - - - | - - D5 -", "G3 - - - | C4 - - -"]);
    assert_eq!(
        read.missed("retardation", "S"),
        Some("it does not go up by step")
    );
}

#[test]
fn consonant_fourths() {
    let c = "consonant fourth";
    fits(
        &["C5 - D - | - - C# -", "A3 - - - | - - - -"],
        "1:3 S consonant fourth",
    );
    let bass = "A3 - - - | - - E3 -";
    misses(
        c,
        &["A4 - D5 - | - - C# -", bass],
        "1:3 none",
        "it is not reached by step",
    );
    misses(
        c,
        &["C5 - D - | C5 - - -", bass],
        "1:3 S upper neighbour",
        "it is not held into a stronger moment",
    );
    let read = sheet(&["C5 - D - | - - C -", "G3 - A3 - | - - - -"]);
    assert_eq!(
        read.missed(c, "S"),
        Some("the lowest voice does not hold its note")
    );
}

#[test]
fn pedals() {
    let rows = [
        "E5 - F - | D5 - F - | E5 - - -",
        "C3 - - - | - - - - | - - - -",
    ];
    let pedal = sheet(&rows);
    assert!(
        pedal.told().iter().any(|t| t.ends_with("B pedal")),
        "{:?}",
        pedal.told()
    );
    // Above it the next voice up is the lowest for all else.
    let read = sheet(&[
        "E5 - D - | C5 - D - | E5 - - -",
        "G4 - B - | A4 - G - | G4 - - -",
        "C3 - - - | - - - - | - - - -",
    ]);
    assert!(
        read.told().iter().filter(|t| t.ends_with("none")).count() == 0,
        "{:?}",
        read.told()
    );
    // Too short, or dissonant at its end.
    for rows in [
        ["E5 - F - | A4 - - -", "C3 - - - | D3 - - -"],
        [
            "E5 - F - | D5 - F - | F5 - D -",
            "C3 - - - | - - - - | - - - -",
        ],
    ] {
        let read = sheet(&rows);
        assert!(
            !read.told().iter().any(|t| t.ends_with("pedal")),
            "{:?}",
            read.told()
        );
    }
}

#[test]
fn a_clash_of_upper_voices_is_read_where_it_began() {
    // D passes under C; the bass, which C did not agree with, then passes as well.
    let read = sheet(&[
        "C5 - - - | B4 - - -",
        "C4 - D E | D4 - - -",
        "A3 - G.F E | G3 - - -",
    ]);
    assert!(
        read.told().iter().all(|t| !t.ends_with("none")),
        "{:?}",
        read.told()
    );
    let order: Vec<_> = read.all().iter().map(|d| d.sonority).collect();
    assert!(order.is_sorted());
}

#[test]
fn a_note_held_over_a_stronger_moment_does_not_pass_unaccented() {
    let read = sheet(&["E5 D - C", "C4 - - -"]);
    assert_eq!(read.told(), ["1:2 S accented passing note"]);
    assert_eq!(
        read.missed("passing note", "S"),
        Some("it is held over a stronger moment")
    );
}

#[test]
fn a_suspension_struck_again_before_it_resolves() {
    let bass = "D4 - - - | E4 - - -";
    fits(&["D5 - - - | - D C -", bass], "2:1 S suspension");
    let (ornamented, struck, resolved) = held(&["D5 - D - | D D C -", bass]);
    assert!(!ornamented);
    assert_eq!(struck, Time::from_integer(0));
    assert_eq!(resolved, Time::new(3, 2));
}

#[test]
fn a_suspension_outlasts_the_leap_against_it() {
    // The bass leaps under the held note and goes on; the note still resolves down.
    fits(
        &["G4 - - - | - - F4 -", "G3 - - - | D3 E3 F3 -"],
        "2:1 S suspension",
    );
    // A step under it is an ornament of the bass, and the held note stays.
    let read = sheet(&["C5 - - - | - - - -", "E4 - - - | D4 E4 - -"]);
    assert_eq!(read.told(), ["2:1 B lower neighbour"]);
}

#[test]
fn a_short_note_over_a_pedal_is_an_ornament_and_a_long_one_makes_the_pedal() {
    let bass = "C3 - - - | - - - - | - - - -";
    let short = sheet(&["E5 - D C | E5 - - - | E5 - - -", bass]);
    assert_eq!(short.told(), ["1:3 S accented passing note"]);
    let long = sheet(&["E5 - F - | D5 - G - | E5 - - -", bass]);
    assert_eq!(long.told(), ["1:3 B pedal"]);
}
