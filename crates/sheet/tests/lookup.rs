//! From the text to the music and back.

#![allow(clippy::unwrap_used, clippy::panic)]

use partwright_score::Time;
use partwright_sheet::{ProblemKind, Reading, Sheet};

const HYMN: &str = "\
key     G major
metre   4/4

voice S soprano
voice A alto
voice B bass

// first line
S | G4 | A4  B4 - B4.A | B4^ - - ||
A | D4 | =S-8          | =S      ||
B | G3 | D3  ?         | -       ||

S | C5 | B4 A G - ||
B | C3 | G3 D G - ||
";

fn read(text: &str) -> Reading {
    Sheet::read(text).lower(text)
}

fn written(reading: &Reading, voice: usize, at: (i64, i64)) -> Option<(&'static str, usize)> {
    let span = reading.span_at(voice, Time::new(at.0, at.1))?;
    let text = &HYMN[span.range()];
    let line = HYMN[..span.start as usize].matches('\n').count() + 1;
    Some((text, line))
}

#[test]
fn the_part_written_at_a_moment() {
    let reading = read(HYMN);
    let at = |voice, n, d| written(&reading, voice, (n, d));
    assert_eq!(at(0, 0, 1), Some(("G4", 9)));
    assert_eq!(at(0, 1, 4), Some(("A4", 9)));
    assert_eq!(at(0, 3, 4), Some(("-", 9)), "a held note");
    assert_eq!(at(0, 5, 8), Some(("B4", 9)), "inside a beat");
    assert_eq!(at(0, 9, 8), Some(("A", 9)), "the second half of a beat");
    assert_eq!(at(0, 5, 4), Some(("B4", 9)), "without its mark");
    assert_eq!(at(1, 3, 4), Some(("=S-8", 10)), "a copied bar");
    assert_eq!(at(2, 1, 2), Some(("?", 11)));
    assert_eq!(at(2, 3, 4), None, "nothing is written there");
    assert_eq!(at(2, 7, 4), Some(("-", 11)), "a dash for the whole bar");
    assert_eq!(at(1, 9, 4), None, "silent in the second system");
    assert_eq!(at(0, 2, 1), Some(("C5", 13)));
    assert_eq!(at(0, 3, 1), Some(("-", 13)));
    assert_eq!(at(0, 13, 4), None, "past the end");
    assert_eq!(at(7, 0, 1), None, "no such voice");
}

#[test]
fn the_moment_under_an_offset() {
    let reading = read(HYMN);
    let line = |n: usize| HYMN.match_indices('\n').nth(n - 2).unwrap().0 + 1;
    let at = |l: usize, column: usize| reading.at_offset(line(l) + column - 1);
    let moment = |n, d| Time::new(n, d);
    assert_eq!(at(9, 5), Some((0, moment(0, 1))));
    assert_eq!(at(9, 7), Some((0, moment(0, 1))), "the end counts");
    assert_eq!(at(9, 8), None, "between two parts");
    assert_eq!(at(9, 23), Some((0, moment(9, 8))));
    assert_eq!(at(9, 29), Some((0, moment(5, 4))), "its mark is part of it");
    assert_eq!(at(10, 12), Some((1, moment(1, 4))));
    assert_eq!(at(2, 5), None, "a header");
    let system = reading.system_at(line(10)).unwrap();
    assert_eq!(system.range(), line(9)..line(12) - 1);
    assert_eq!(reading.system_at(line(12)), None, "the blank line");
}

#[test]
fn labels_and_declarations() {
    let reading = read(HYMN);
    let declared = reading.declaration(2).unwrap();
    assert_eq!(&HYMN[declared.start as usize - 6..][..12], "voice B bass");
    let label = reading.label_span(2, Time::new(5, 2)).unwrap();
    assert_eq!(&HYMN[label.start as usize..][..8], "B | C3 |");
    assert_eq!(reading.label_span(1, Time::new(5, 2)), None);
    let bare = read("X | C4 |\n");
    assert_eq!(bare.declaration(0).unwrap().range(), 0..1);
}

#[test]
fn beats_are_numbered_in_split_bars_and_pickups() {
    let reading = read(HYMN);
    let place = |n, d| {
        let place = reading.score.place(Time::new(n, d));
        (place.bar, place.beat_text())
    };
    assert_eq!(place(0, 1), (0, "4".to_owned()));
    assert_eq!(place(3, 4), (1, "3".to_owned()));
    assert_eq!(place(7, 4), (2, "3".to_owned()));
    assert_eq!(
        place(2, 1),
        (2, "4".to_owned()),
        "the second half of the split bar"
    );
    assert_eq!(place(9, 4), (3, "1".to_owned()));
}

#[test]
fn problems_know_their_voice_and_moment() {
    let text = "metre 2/4\nS | G4 A | B B ||\nB | G3 H4 | A4.X G ||\n";
    let reading = read(text);
    let known: Vec<_> = reading.problems.iter().map(|p| (p.voice, p.at)).collect();
    let at = |n, d| Some(Time::new(n, d));
    assert_eq!(known, [(Some(1), at(1, 4)), (Some(1), at(5, 8))]);
}

#[test]
fn a_missing_figure_is_offered_near_the_note_before() {
    let offered = |text: &str| {
        let reading = read(text);
        let problem = &reading.problems[0];
        problem.offers[0].edits[0].text.clone()
    };
    assert_eq!(
        offered("S | G5 |\n\nS | F# |\n"),
        "F#5",
        "near the note before"
    );
    assert_eq!(offered("S | A B3 |\n"), "A3", "near the next note");
    assert_eq!(
        offered("voice T tenor\nT | A |\n"),
        "A3",
        "in the middle of the compass"
    );
    assert_eq!(
        offered("voice B bass E4..E5\nB | A |\n"),
        "A4",
        "of this singer"
    );
    assert_eq!(offered("S | C |\n"), "C5");
}

#[test]
fn what_is_offered_mends_the_sheet() {
    let sheets = [
        "S | G4 H4 |\n",
        "S | A4 B | C D |\n",
        "S | G4. A8 B4 C5 |\n",
        "S | G4 -- A4 |\n",
        "S | D5,E,F |\n",
        "S | G4 ^E |\n",
        "S | G4 A\n",
        "S G4 | A4 |\n",
        "S | G4 A ||\nB | G3 A ||\nA | G3 A |\n",
        "S | G4 |\r\nS | G4 |\r\n",
        "titel Quay\nS | G4 |\n",
        "metre C\nS | G4 A B C5 |\n",
        "voice S soparno E2-D4\nS | C4 |\n",
        "S | _ - |\n",
        "S | G4 |\nA | =S-15 |\n",
    ];
    for sheet in sheets {
        let mut text = sheet.to_owned();
        for _ in 0..4 {
            let reading = read(&text);
            let Some(problem) = reading.problems.first() else {
                break;
            };
            let offer = problem.offers.last();
            let offer = offer.unwrap_or_else(|| panic!("nothing offered: {problem:?}"));
            for edit in offer.edits.iter().rev() {
                text.replace_range(edit.span.range(), &edit.text);
            }
        }
        let left = read(&text).problems;
        assert!(left.is_empty(), "{sheet} became {text}: {left:?}");
    }
}

#[test]
fn one_trouble_is_told_once() {
    for (text, words) in [
        ("S | G4 ?*a |\n*a licence line: the bell\n", "no mark"),
        ("S | G4 *a A |\n*a licence line: the bell\n", "right behind"),
        ("S | G4 H4*a |\n*a licence line: the bell\n", "German"),
        (
            "S | G4 |\nB | =S*a |\n*a licence line: the bell\n",
            "no marks",
        ),
        (
            "metre 2/4\nS | G4 A B*a ||\n*a licence line: the bell\n",
            "too long",
        ),
        (
            "S | G4 |\nS-1 | G4*a |\n*a licence line: the bell\n",
            "cannot be a label",
        ),
        (
            "voice S soprano\nvoice B bass\n\nS | G4 |\n| C3 |\n",
            "label is missing",
        ),
        (
            "voice S soprano\nvoice B bass\n\nS | G4 |\nBx | C3 |\n",
            "labelled Bx",
        ),
        (
            "S | G4 |\nwhat is this\nB | C3 |\nS | A4 |\nB | D3 |\n",
            "begins no line",
        ),
        ("S | A B C |\n", "octave figure"),
    ] {
        let mut problems = read(text).problems;
        problems.retain(|problem| problem.kind != ProblemKind::Unwritten);
        assert_eq!(problems.len(), 1, "{text}{problems:?}");
        assert!(problems[0].message.contains(words), "{problems:?}");
    }
}
