//! The catalogue on the command line.

use crate::support::Folder;

fn rules(arguments: &[&str]) -> String {
    let ran = Folder::new().run(&[&["rules"], arguments].concat());
    assert_eq!((ran.status, ran.err.as_str()), (0, ""));
    ran.out
}

#[test]
fn every_rule_stands_in_the_table_at_80_columns() {
    let table = rules(&[]);
    for entry in partwright_rules::catalogue() {
        assert!(table.contains(&format!("  {} ", entry.id)), "{}", entry.id);
        assert!(rules(&[&entry.id]).starts_with(&entry.id));
    }
    for family in ["motion", "range", "writing"] {
        assert!(table.contains(&format!("\n{family}\n")), "{family}");
    }
    for text in [
        table,
        rules(&["--style", "motet"]),
        rules(&["direct-fifths"]),
    ] {
        let widest = text.lines().map(|line| line.chars().count()).max();
        assert!(widest <= Some(80), "{widest:?}: {text}");
    }
}

#[test]
fn the_letter_under_a_style_is_its_severity() {
    let table = rules(&["motion"]);
    // Crossing: allowed in a motet, a fault in a chorale (under the bass).
    let row = table
        .lines()
        .find(|line| line.trim_start().starts_with("crossing"))
        .unwrap();
    assert_eq!(
        row.split_whitespace().collect::<Vec<_>>(),
        ["crossing", "W", "F", "-", "W", "W", "W", "W", "W"]
    );
    assert!(!table.contains("compass"), "only the family's rules");
}

#[test]
fn a_style_narrows_the_table_and_the_page() {
    let motet = rules(&["--style", "motet"]);
    assert!(!motet.contains("  crossing"), "{motet}");
    assert!(rules(&["--style", "chorale"]).contains("  crossing"));
    let page = rules(&["crossing", "--style", "motet"]);
    assert!(
        page.contains("allowed in motet") && !page.contains("weakness in"),
        "{page}"
    );
}

#[test]
fn a_page_is_whole() {
    let page = rules(&["direct-fifths"]);
    let places: Vec<Option<usize>> = [
        "Two voices reach a perfect fifth in similar motion.",
        "Why: ",
        "When, and how strictly",
        "weakness in motet: lighter in many voices",
        "Fails",
        "    S | E4 A |\n    B | C4 D |\n    //     ^ direct fifths: S and B",
        "Passes",
        "Does not apply",
        "What to do",
        "Sources",
        "Gradus ad Parnassum (1725)",
    ]
    .iter()
    .map(|words| page.find(words))
    .collect();
    assert!(
        places.iter().all(Option::is_some) && places.is_sorted(),
        "{places:?}\n{page}"
    );
    assert!(
        page.contains("[read; looser:"),
        "how a source is known and stands: {page}"
    );
}
