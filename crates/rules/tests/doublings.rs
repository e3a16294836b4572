//! Doublings, incomplete chords and closes: a clean passage, hurt in one note.

#![allow(clippy::unwrap_used)]

use std::path::Path;
use std::sync::Arc;

use partwright_check::{Checked, Choice, House, Wishes};

/// The findings of one rule, by its case's words or its message.
fn told(rule: &str, sheet: &str, changes: &str) -> Vec<String> {
    let text = format!("base = \"chorale\"\n{changes}");
    let house = House::read(Path::new("house.toml"), &mut |_| Ok(text.clone())).unwrap();
    let wishes = Wishes {
        style: Some(Choice::House),
        house: Some(Arc::new(house)),
        ..Wishes::default()
    };
    let findings = Checked::text(sheet, &wishes).findings;
    let of_rule = findings.into_iter().filter(|f| f.rule == rule);
    of_rule.map(|f| f.message).collect()
}

const CLOSE: &str = "\
key C major
metre 4/4

S | G4 - A4 - | B4 - C5 - ||
A | E4 - F4 - | G4 - G4 - ||
T | C4 - C4 - | F4 - E4 - ||
B | C3 - F3 - | G3 - C3 - ||
";

#[test]
fn a_clean_close_speaks_when_one_note_is_hurt() {
    for (rule, from, to) in [
        (
            "leading-note-doubled",
            "T | C4 - C4 - | F4",
            "T | C4 - C4 - | B3",
        ),
        (
            "seventh-doubled",
            "A | E4 - F4 - | G4",
            "A | E4 - F4 - | F4",
        ),
        (
            "incomplete-chord",
            "S | G4 - A4 - | B4",
            "S | G4 - A4 - | D5",
        ),
    ] {
        assert_eq!(told(rule, CLOSE, ""), Vec::<String>::new(), "{rule}");
        let hurt = CLOSE.replace(from, to);
        assert_ne!(hurt, CLOSE, "{from}");
        assert_eq!(told(rule, &hurt, "").len(), 1, "{rule}: {hurt}");
    }
}

#[test]
fn an_altered_note_is_doubled() {
    let plain = "\
key C minor
metre 4/4

S | C5 - Db5 - | B4 - C5 - ||
A | G4 - F4  - | F4 - Eb4 - ||
T | Eb4 - Ab3 - | D4 - C4 - ||
B | C3 - F3  - | G3 - C3 - ||
";
    assert_eq!(told("chord-doubling", plain, ""), Vec::<String>::new());
    let hurt = plain.replace("A | G4 - F4  -", "A | G4 - Db4 -");
    let found = told("chord-doubling", &hurt, "");
    assert_eq!(found.len(), 1, "{found:?}");
    assert!(
        found.iter().all(|m| m.contains("(altered note)")),
        "{found:?}"
    );
}

#[test]
fn a_house_may_mind_a_doubled_third() {
    let root_position = "\
key C major
metre 4/4

S | E4 - D4 - | C4 - - - |
A | C4 - B3 - | C4 - - - |
T | G3 - G3 - | E3 - - - |
B | C3 - G2 - | A2 - - - |
";
    let sixth_chord = "\
key C major
metre 4/4

S | E5 - E5 - | D5 - E5 - |
A | G4 - G4 - | B4 - C5 - |
T | C4 - C4 - | G4 - G4 - |
B | C3 - E3 - | G3 - C3 - |
";
    for (case, sheet) in [("third", root_position), ("sixth-chord", sixth_chord)] {
        let set = format!(
            "[[rule]]\nrule = \"chord-doubling\"\ncase = \"{case}\"\nseverity = \"weakness\"\nreason = \"a strict house\"\n"
        );
        assert_eq!(
            told("chord-doubling", sheet, ""),
            Vec::<String>::new(),
            "{case}"
        );
        assert_eq!(told("chord-doubling", sheet, &set).len(), 1, "{case}");
    }
}

#[test]
fn a_diminished_fifth_may_be_doubled_in_passing() {
    let passing = "\
key C major
metre 4/4

S | E5 - F5 - | G5 - - - |
A | G4 - F4 - | E4 - - - |
T | C4 - B3 - | C4 - - - |
B | C3 - D3 - | C3 - - - |
";
    assert_eq!(told("chord-doubling", passing, ""), Vec::<String>::new());
    let leaping = passing
        .replace("S | E5 - F5 - | G5", "S | C5 - F5 - | E5")
        .replace("A | G4 - F4 - | E4", "A | G4 - F4 - | G4");
    assert_eq!(told("chord-doubling", &leaping, "").len(), 1);
}

#[test]
fn three_parts_choose_their_doublings_and_two_have_none() {
    let four = "\
key C major
metre 4/4

S | E4 - F4 - | E4 - - - |
A | C4 - F4 - | C4 - - - |
T | G3 - B3 - | G3 - - - |
B | C3 - D3 - | C3 - - - |
";
    assert_eq!(told("chord-doubling", four, "").len(), 1);
    let three = four.replace("A | C4 - F4 - | C4 - - - |\n", "");
    let two = three.replace("T | G3 - B3 - | G3 - - - |\n", "");
    for sheet in [three, two] {
        for rule in ["chord-doubling", "seventh-doubled", "incomplete-chord"] {
            assert_eq!(told(rule, &sheet, ""), Vec::<String>::new(), "{sheet}");
        }
    }
}

#[test]
fn a_sequence_and_a_voice_that_comes_down_are_excused() {
    let sequence = "\
key C major
metre 4/4

S | E5 - D5 - | D5 - C5 - | C5 - B4 - | C5 - - - |
A | C4 - F4 - | B3 - E4 - | A3 - D4 - | C4 - - - |
T | G4 - A4 - | B4 - G4 - | A4 - F4 - | G4 - - - |
B | C3 - F3 - | B2 - E3 - | A2 - D3 - | C3 - - - |
";
    assert_eq!(
        told("leading-note-doubled", sequence, ""),
        Vec::<String>::new()
    );
}
