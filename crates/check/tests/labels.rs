//! No label is a word of the catalogue: `licence crossing: …` would be read two ways.

#![allow(clippy::unwrap_used, clippy::panic, clippy::print_stdout)]

use partwright_check::{Checked, Wishes};
use partwright_rules::{FAMILIES, catalogue};

#[test]
fn words_of_the_catalogue_are_no_labels() {
    let ids = catalogue().iter().map(|entry| entry.id.as_str());
    let short: Vec<&str> = ids
        .chain(FAMILIES)
        .filter(|word| word.len() <= 8 && word.chars().all(|c| c.is_ascii_alphabetic()))
        .collect();
    assert!(short.len() >= 10, "{short:?}");
    for word in short {
        let text = format!("voice {word} soprano\n\n{word} | G4 A |\n");
        let checked = Checked::text(&text, &Wishes::default());
        assert!(
            checked.findings.iter().any(|f| f.rule == "reading"),
            "{word} passes for a label"
        );
    }
}
