//! Single lines at the edges of the rules: what lies just inside, and what just outside.

#![allow(clippy::unwrap_used)]

use std::path::Path;
use std::sync::Arc;

use partwright_check::{Checked, House, Wishes};
use partwright_rules::family_of;

/// The rules for lines and ranges that speak, in order.
fn speak(sheet: &str, wishes: &Wishes) -> Vec<&'static str> {
    let checked = Checked::text(sheet, wishes);
    let mine = checked
        .findings
        .iter()
        .filter(|f| matches!(family_of(f.rule), Some("line" | "range")));
    mine.map(|f| f.rule).collect()
}

#[test]
fn lines_are_judged_by_the_letter_of_the_rule() {
    let cases: &[(&str, &[&str])] = &[
        // The same fourth with and without a sequence around it.
        (
            "style chorale\n\nS | C5 F4 B4 C5 |",
            &["augmented-interval"],
        ),
        ("style chorale\n\nS | D5 G4 C5 F4 B4 E4 A4 |", &[]),
        (
            "style motet\n\nS | D5 G4 C5 F4 B4 E4 A4 |",
            &["augmented-interval"],
        ),
        // A bass that falls a seventh for a step up, and one that rises.
        ("S | A4 G4 |\nB | F3 G2 |", &[]),
        ("S | A4 G4 |\nB | G2 F3 |", &["seventh-leap"]),
        ("style chorale\n\nS | A4 G4 |\nB | F3 G2 |", &[]),
        (
            "style chorale\n\nS | A4 G4 |\nB | G2 F3 |",
            &["seventh-leap"],
        ),
        // In a chorale a sixth falls as it rises, a major one does not.
        ("style chorale\n\nS | C5 E4 F4 |", &[]),
        ("style chorale\n\nS | C5 Eb4 F4 |", &["sixth-leap"]),
        // After a fourth its line may go on; after a fifth it turns back.
        ("style chorale\n\nS | D4 G4 A4 B4 |", &[]),
        ("style chorale\n\nS | C4 G4 A4 B4 |", &["leap-unrecovered"]),
        // Octaves count in the bass of a chorale, sixths do not.
        (
            "style chorale\n\nS | D5 E5 F5 |\nB | D3 D4 E4 |",
            &["leap-unrecovered"],
        ),
        ("style chorale\n\nS | D5 C5 D5 |\nB | E3 C4 D4 |", &[]),
        // A diminished fifth that turns back by step, or by leap.
        ("style species-1\n\nS | C5 B4 C5 D5 | F5 E5 D5 |", &[]),
        (
            "style species-1\n\nS | C5 B4 C5 D5 | F5 D5 E5 |",
            &["tritone-outline"],
        ),
        // The line begins on one of the two: it does not turn there.
        ("style species-1\n\nS | F4 G4 A4 B4 | A4 G4 |", &[]),
        // Three leaps one way are no broken chord as well.
        ("style motet\n\nS | C4 E4 G4 C5 | B4 |", &["leaps-one-way"]),
        ("style motet\n\nS | C4 E4 G4 E4 | D4 |", &["broken-chord"]),
        (
            "style motet\n\nS | C4 G4 C4 G4 | F4 |",
            &["figure-repeated"],
        ),
        // To and fro, but in two rhythms.
        (
            "style motet\nmetre 4/2\n\nS | A4 - G4 A4.G4 | F4 - - - |",
            &[],
        ),
        (
            "style motet\nmetre 4/2\n\nS | F4 A4 G4 A4 | G4 - A4 - |",
            &[],
        ),
        (
            "style motet\nmetre 4/2\n\nS | F4 A4 G4 A4 | G4 A4 F4 - |",
            &["figure-repeated"],
        ),
        // Held over, but in leaps: no suspension comes and goes.
        (
            "style motet\nmetre 4/2\n\nS | B4 A4 G4 B4 | - G4 B4 - | A4 - - - |",
            &["figure-repeated"],
        ),
        // One wrong sign is told once: by the interval, or where it makes none by the sign.
        ("style motet\n\nS | A4 B#4 A4 B4 |", &["augmented-interval"]),
        ("style motet\n\nS | C5 B#4 C5 B4 |", &["foreign-accidental"]),
        (
            "style species-1\n\nS | A4 C5 B#4 C5 |",
            &["diminished-interval", "diminished-interval"],
        ),
        // Two bars of one figure are no monotony yet.
        (
            "style species-3\nmetre 4/4\n\nS | A4 B4 C5 D5 | G4 A4 B4 C5 | A4 G4 F4 E4 |",
            &["leap-across-bar", "leap-across-bar"],
        ),
        // A high point struck again at once, and a line that is not whole.
        ("style species-1\n\nS | D4 G4 G4 F4 | E4 D4 ||", &[]),
        (
            "style species-1\n\nS | D4 G4 F4 G4 | E4 D4 ||",
            &["high-point-repeated"],
        ),
        ("style species-4\n\nS | D4 G4 F4 G4 | E4 D4 ||", &[]),
        // An exact twelfth, and a semitone more.
        (
            "style species-1\n\nS | D4 E4 F4 A4 | C5 B4 D5 F5 | E5 G5 A5 G5 |",
            &[],
        ),
        (
            "style species-1\n\nS | D4 E4 F4 A4 | C5 B4 D5 F5 | E5 G5 Bb5 A5 |",
            &["wide-range"],
        ),
        // The natural seventh at a close over another bass is no close on the tonic.
        (
            "key A minor\n\nS | C5 B4 G4 | A4 ||\nB | A3 D3 E3 | F3 ||",
            &[],
        ),
        ("key A dorian\n\nS | E4 F#4 E4 | D4 C4 |", &[]),
    ];
    for (sheet, expected) in cases {
        assert_eq!(speak(sheet, &Wishes::default()), *expected, "{sheet}");
    }
}

#[test]
fn a_house_sets_the_numbers() {
    let with = |rule: &str, name: &str, value: i32| {
        let text = format!(
            "name = \"ours\"\nbase = \"species-1\"\n[[number]]\nrule = \"{rule}\"\nname = \"{name}\"\nvalue = {value}\nreason = \"ours\"\n"
        );
        let house = House::read(Path::new("house.toml"), &mut |_| Ok(text.clone())).unwrap();
        Wishes {
            house: Some(Arc::new(house)),
            ..Wishes::default()
        }
    };
    let repeated = "S | A4 A4 A4 G4 |";
    assert_eq!(
        speak(repeated, &with("repeated-note", "in-a-row", 3)),
        [""; 0]
    );
    assert_eq!(
        speak(repeated, &with("repeated-note", "in-a-row", 2)),
        ["repeated-note"]
    );
    let once = "S | A4 A4 G4 F4 |";
    assert_eq!(
        speak(once, &with("repeated-note", "in-a-row", 1)),
        ["repeated-note"]
    );
    let wide = "S | D4 E4 G4 A4 | C5 D5 C5 |";
    assert_eq!(speak(wide, &with("wide-range", "widest", 8)), [""; 0]);
    assert_eq!(
        speak(wide, &with("wide-range", "widest", 7)),
        ["wide-range"]
    );
}
