//! One fact is told once: by the graver or more particular rule, and only while that speaks.

#![allow(clippy::unwrap_used)]

use std::path::Path;
use std::sync::Arc;

use partwright_check::{Checked, Choice, House, Wishes};

/// The rules with a word on music in a style, where a house switches one off.
fn told(style: &str, music: &str, off: Option<&str>) -> Vec<&'static str> {
    let change = off.map_or(String::new(), |rule| {
        format!("[[rule]]\nrule = \"{rule}\"\nseverity = \"off\"\nreason = \"a test\"\n")
    });
    let text = format!("base = \"{style}\"\n{change}");
    let house = House::read(Path::new("house.toml"), &mut |_| Ok(text.clone())).unwrap();
    let wishes = Wishes {
        style: Some(Choice::House),
        house: Some(Arc::new(house)),
        ..Wishes::default()
    };
    let checked = Checked::text(music, &wishes);
    checked.findings.iter().map(|f| f.rule).collect()
}

#[test]
fn one_fact_is_told_by_one_rule() {
    for (style, sheet, speaks, silent) in [
        (
            "species-1",
            "S | E5 A5 |\nB | B3 D4 |",
            "direct-fifths",
            "similar-leaps",
        ),
        (
            "species-1",
            "S | A4 C5 |\nB | D4 F4 |",
            "parallel-fifths",
            "similar-leaps",
        ),
        (
            "species-1",
            "S | E4 A4 |\nB | D4 F4 |",
            "overlap",
            "similar-leaps",
        ),
        (
            "chorale",
            "S | C5 E5 |\nA | A4 B4 |\nB | E4 G4 |",
            "all-one-way",
            "similar-leaps",
        ),
        (
            "chorale",
            "S | E5 E5 |\nA | C5 C5 |\nT | A3 D4 |\nB | F3 D4 |",
            "direct-unisons",
            "overlap",
        ),
        ("motet", "S | C4 A4 B4 |", "sixth-leap", "leap-unrecovered"),
        (
            "motet",
            "S | B3 C4 A4 G4 |",
            "sixth-leap",
            "leap-unprepared",
        ),
        (
            "motet",
            "S | D4 E4 C5 D5 |",
            "leap-unrecovered",
            "leap-unprepared",
        ),
        (
            "motet",
            "metre 4/2 by 1/4\n\nS | C5 - A4 F4 D4 - E4 - |",
            "leaps-one-way",
            "quarter-leaps",
        ),
        (
            "motet",
            "metre 4/2\n\nS | E5 - - - | D5 - E5 - |\nB | C4 - - - | C4 - A3 - |",
            "long-dissonance",
            "neighbour-note",
        ),
        (
            "chorale",
            "key C major\nmetre 4/4\n\nS | C5 - D5 - | C5 - - - |\nA | E4 - D4 - | E4 - - - |\nT | G3 - G3 - | G3 - - - |\nB | C3 - G2 - | C3 - - - |",
            "third-missing",
            "incomplete-chord",
        ),
        (
            "motet",
            "metre 4/4\n\nS | C5 - C5 - | D5 - B4 - | C5 - - - ||\nA | E4 - E4 - | F4 - G4 - | G4 - - - ||\nT | A3 - C4 - | A3 - D4 - | E4 - - - ||\nB | A2 - G3 - | D3 - G2 - | C3 - - - ||",
            "free-dissonance",
            "six-four",
        ),
        (
            "chorale",
            "key C major\nmetre 4/4\n\nS | C5 - B4 - | E5 - - - |\nA | G4 - F4 - | E4 - - - |\nT | E4 - D4 - | C4 - - - |\nB | C3 - G3 - | C3 - - - |",
            "leading-note-resolution",
            "tritone-resolution",
        ),
        (
            "chorale",
            "key C major\nmetre 4/4\n\nS | C5 - B4 - | C5 - - - |\nA | G4 - F4 - | C4 - - - |\nT | E4 - D4 - | E4 - - - |\nB | C3 - G3 - | C3 - - - |",
            "seventh-resolution",
            "tritone-resolution",
        ),
        (
            "chorale",
            "key C major\nmetre 4/4\n\nS | E5 - C5 - | C#5 - A4 - | A4 - B4 - | C5 - - - |\nA | G4 - E4 - | E4 - F4 - | F4 - D4 - | E4 - - - |\nT | C4 - A3 - | A3 - D4 - | C4 - G3 - | G3 - - - |\nB | C3 - A2 - | A2 - D3 - | F3 - G3 - | C3 - - - |",
            "leading-note-resolution",
            "altered-note-resolution",
        ),
    ] {
        let rules = told(style, sheet, None);
        assert!(rules.contains(&speaks), "{sheet}: {rules:?}");
        assert!(!rules.contains(&silent), "{sheet}: {rules:?}");
        let rules = told(style, sheet, Some(speaks));
        assert!(
            rules.contains(&silent),
            "without {speaks}: {sheet}: {rules:?}"
        );
    }
}
