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
