//! What rests on a doubtful octave is told with the doubt.

#![allow(clippy::unwrap_used)]

use partwright_check::{Checked, Severity, Wishes};

fn told(text: &str) -> Vec<(&'static str, Severity)> {
    let checked = Checked::text(text, &Wishes::default());
    checked.open().map(|f| (f.rule, f.severity)).collect()
}

#[test]
fn one_missing_figure_is_one_finding() {
    let text = "style chorale\nvoice S soprano\nvoice B bass\nS | B4 C D |\nB | G3 E F |\n";
    assert_eq!(told(text), [("octave-doubt", Severity::Fault)]);
    let checked = Checked::text(text, &Wishes::default());
    let message = &checked.findings[0].message;
    assert!(
        message.starts_with("The octave figure carried from B4 makes this C4, a falling seventh."),
        "{message}"
    );
    assert!(message.contains("Until then there wait: "), "{message}");
    assert!(message.contains("seventh leap"), "{message}");
}

#[test]
fn once_the_figure_is_written_each_finding_stands_alone() {
    let text = "style chorale\nvoice S soprano\nvoice B bass\nS | B4 C4 D |\nB | G3 E F |\n";
    let found = told(text);
    assert!(
        found.contains(&("seventh-leap", Severity::Fault)),
        "{found:?}"
    );
    assert!(
        found.iter().all(|(rule, _)| *rule != "octave-doubt"),
        "{found:?}"
    );
}

#[test]
fn what_rests_on_other_notes_is_told() {
    // The fifths at the end are others than those on the doubtful note.
    let text = "style chorale\nS | G4 E5 D C |\nA | C5 E B D |\nB | C3 E G F |\n";
    let without = "style chorale\nS | G4 E5 D C |\nA | C5 E B4 D |\nB | C3 E G F |\n";
    let at_the_end = |text: &str| {
        let checked = Checked::text(text, &Wishes::default());
        let last = checked.open().filter(|f| f.at == Some((3, 4).into()));
        last.map(|f| f.rule).collect::<Vec<_>>()
    };
    assert!(
        at_the_end(without).contains(&"parallel-fifths"),
        "{:?}",
        at_the_end(without)
    );
    assert!(
        at_the_end(text).contains(&"parallel-fifths"),
        "{:?}",
        at_the_end(text)
    );
}

#[test]
fn a_doubt_on_which_nothing_rests_stays_a_remark() {
    assert_eq!(told("S | B4 D |\n"), [("octave-doubt", Severity::Remark)]);
}

#[test]
fn a_doubt_that_is_licensed_takes_nothing() {
    let text = "style chorale\nS | B4 C*a |\n*a licence octave-doubt: the leap is the call\n";
    assert_eq!(told(text), [("seventh-leap", Severity::Fault)]);
}

#[test]
fn what_lies_in_the_doubtful_octave_waits_to_the_next_figure() {
    // The soprano stays an octave too high from the doubt on, and leaps back in the next row.
    let text = "style chorale\nmetre 2/4\nvoice S soprano\nvoice B bass\n\n\
                S | D5 B | A B |\nB | G3 G | F G |\n\nS | A4 G |\nB | F3 E |\n";
    let found = told(text);
    let on = |rule: &str| found.iter().any(|(found, _)| *found == rule);
    assert!(on("octave-doubt"), "{found:?}");
    for rule in ["compass", "leap-beyond-octave", "spacing", "seventh-leap"] {
        assert!(!on(rule), "{rule}: {found:?}");
    }
    let high = told(&text.replace("D5 B |", "D5 B5 |"));
    let compass = |found: &[(&str, Severity)]| found.iter().any(|(rule, _)| *rule == "compass");
    assert!(compass(&high), "{high:?}");
}
