//! Every rule's page is its test: the examples run, and every claim about form is checked.

#![allow(clippy::unwrap_used, clippy::panic, clippy::print_stdout)]

use std::path::Path;
use std::sync::Arc;

use partwright_check::{Checked, Choice, House, Wishes, unlike_drawn};
use partwright_rules::{Case, Entry, FAMILIES, Looks, STYLES, Severity, Style, catalogue};
use partwright_sheet::drawn_marks;

/// Where an example stands, for a message.
fn place(id: &str, family: &str, line: usize) -> String {
    format!("{family}/{}.rs, line {line}", id.replace('-', "_"))
}

/// Some style minds the rule by itself.
fn some_style_minds(entry: &Entry) -> bool {
    let minds = |case: &&Case, style| case.setting(style).is_some_and(|s| s.severity.is_some());
    let cases = entry.rule.cases;
    STYLES
        .iter()
        .any(|&style| cases.iter().any(|case| minds(case, style)))
}

/// How a page is checked: a rule that every style allows waits for a house to ask for it.
fn wishes(entry: &Entry) -> Wishes {
    if some_style_minds(entry) {
        return Wishes::default();
    }
    let text = format!(
        "base = \"chorale\"\n[[rule]]\nrule = \"{}\"\nseverity = \"remark\"\nreason = \"its page\"\n",
        entry.id
    );
    let house = House::read(Path::new("house.toml"), &mut |_| Ok(text.clone())).unwrap();
    Wishes {
        style: Some(Choice::House),
        house: Some(Arc::new(house)),
        ..Wishes::default()
    }
}

#[test]
fn examples_do_what_their_headings_say() {
    let mut wrong = Vec::new();
    for entry in catalogue() {
        for example in &entry.page.examples {
            let checked = Checked::text(&example.sheet, &wishes(entry));
            let here = place(&entry.id, entry.family, example.line);
            for difference in unlike_drawn(&example.sheet, &checked, Some(&entry.id)) {
                wrong.push(format!("{here}: {difference}"));
            }
            // What is held up as good is good by every other rule as well.
            let faults = checked.open().filter(|f| f.severity == Severity::Fault);
            for finding in faults.filter(|_| example.heading != "Fails") {
                wrong.push(format!("{here}: {}", finding.message));
            }
            let drawn = !drawn_marks(&example.sheet).is_empty();
            if drawn != (example.heading == "Fails") {
                wrong.push(format!("{here}: marks belong under Fails, and only there"));
            }
            // What the page says must be readable, except where unreadable text is its subject.
            let unreadable = checked.findings.iter().find(|f| f.rule == "reading");
            if let Some(finding) = unreadable.filter(|_| entry.id != "reading") {
                wrong.push(format!("{here}: {}", finding.message));
            }
        }
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

#[test]
fn every_page_is_whole() {
    for entry in catalogue() {
        let id = &entry.id;
        assert!(
            entry.page.title.ends_with('.'),
            "{id}: the title is a sentence"
        );
        assert!(entry.page.title.len() <= 80, "{id}: the title fits a line");
        assert!(
            entry
                .page
                .section("")
                .is_some_and(|s| s.starts_with("Why: ")),
            "{id}: why"
        );
        for heading in ["Fails", "Passes", "Does not apply"] {
            assert!(
                entry.page.examples.iter().any(|e| e.heading == heading),
                "{id}: an example under {heading}"
            );
        }
        assert!(
            entry
                .page
                .section("What to do")
                .is_some_and(|s| s.len() > 20),
            "{id}: what to do"
        );
        assert!(!entry.rule.sources.is_empty(), "{id}: a source");
    }
}

#[test]
fn ids_are_unique_and_lawful_and_no_families() {
    let mut seen = std::collections::BTreeSet::new();
    for entry in catalogue() {
        let id = &entry.id;
        assert!(seen.insert(id.clone()), "{id} twice");
        assert!(
            id.chars()
                .all(|c| c.is_ascii_lowercase() || c.is_ascii_digit() || c == '-'),
            "{id}"
        );
        assert!(
            id.chars().any(|c| c.is_ascii_alphabetic()) && !id.ends_with('-'),
            "{id}"
        );
        assert!(
            FAMILIES.contains(&entry.family),
            "{id}: family {}",
            entry.family
        );
        assert!(!FAMILIES.contains(&id.as_str()), "{id} is a family's name");
    }
}

#[test]
fn every_case_has_a_severity_in_every_style_and_a_reason() {
    for entry in catalogue() {
        let cases = entry.rule.cases;
        assert!(!cases.is_empty(), "{}: a case", entry.id);
        for case in cases {
            let name = format!("{} {}", entry.id, case.name);
            assert!(!case.when.is_empty(), "{name}: when");
            assert!(
                !case.name.is_empty() || std::ptr::eq(*case, cases[0]),
                "{name}: a name"
            );
            assert!(
                case.settings.iter().any(|s| s.style == Style::Free),
                "{name}: a setting in the base style"
            );
            for style in STYLES {
                assert!(case.setting(style).is_some(), "{name}: {}", style.name());
                assert!(
                    case.settings.iter().filter(|s| s.style == style).count() <= 1,
                    "{name}: twice"
                );
            }
            for setting in case.settings {
                assert!(setting.because.len() >= 10, "{name}: a reason");
            }
        }
        let waits = entry
            .page
            .text
            .contains("No style minds by itself; a house style");
        assert_eq!(
            waits,
            !some_style_minds(entry),
            "{}: the page says so where only a house minds",
            entry.id
        );
    }
}

#[test]
fn messages_follow_the_house_style() {
    let mut seen = 0;
    for entry in catalogue() {
        for example in entry.page.examples.iter().filter(|e| e.heading == "Fails") {
            let checked = Checked::text(&example.sheet, &wishes(entry));
            for finding in checked.findings.iter().filter(|f| f.rule == entry.id) {
                let message = &finding.message;
                seen += 1;
                assert!(message.starts_with(char::is_uppercase), "{message}");
                assert!(message.ends_with(['.', '?']), "{message}");
                assert!(
                    !message.contains("  ") && !message.contains('\n'),
                    "{message}"
                );
                assert!(message.len() <= 240, "too long to be read: {message}");
                let words: Vec<&str> = message
                    .split(|c: char| !c.is_alphanumeric() && c != '#')
                    .collect();
                let names_a_voice = finding
                    .voices
                    .iter()
                    .any(|&v| words.contains(&checked.reading.score.voice_name(v)));
                assert!(
                    names_a_voice || matches!(entry.rule.looks, Looks::Text),
                    "{message}"
                );
            }
        }
    }
    assert!(seen >= catalogue().len(), "every rule was heard");
}

#[test]
fn severities_are_ordered_as_they_weigh() {
    assert!(Severity::Remark < Severity::Weakness && Severity::Weakness < Severity::Fault);
}
