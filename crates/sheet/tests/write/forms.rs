//! The forms that are chosen, and what is told where there is none.

use partwright_score::{
    Bar, Change, Key, Kind, Metre, Mode, Note, Pitch, Score, Sound, Time, Voice, ZERO,
};
use partwright_sheet::{Heading, Sheet, Sung, Tempo, Written, write};

fn time(n: i64, d: i64) -> Time {
    Time::new(n, d)
}

/// A voice from its notes: pitch (or `_`, `?`) and length, marks behind the pitch.
fn voice(name: &str, notes: &[(&str, Time)]) -> Voice {
    let mut voice = Voice::new(name, Kind::plain());
    let mut at = ZERO;
    for (text, length) in notes {
        let sound = match text.trim_end_matches(['^', ',']) {
            "_" => Sound::Rest,
            "?" => Sound::Unwritten,
            pitch => Sound::Pitch(pitch.parse().unwrap()),
        };
        voice.notes.push(Note {
            fermata: text.contains('^'),
            breath: text.contains(','),
            ..Note::new(at, *length, sound)
        });
        at += *length;
    }
    voice
}

/// Bars by number, length and lead in quavers; those of a negative number close a section.
fn score(metre: Metre, bars: &[(i32, i64, i64)], voices: Vec<Voice>) -> Score {
    let mut score = Score {
        voices,
        metres: vec![metre],
        ..Score::default()
    };
    let mut at = ZERO;
    for (number, length, lead) in bars {
        score.bars.push(Bar {
            number: number.unsigned_abs(),
            onset: at,
            length: time(*length, 8),
            lead: time(*lead, 8),
            metre: 0,
            section_end: *number < 0,
        });
        at += time(*length, 8);
    }
    score
}

fn metre(count: u16, unit: u16) -> Metre {
    Metre::new(count, unit, None, &[]).unwrap()
}

/// The sheet, after making sure that it reads back.
fn sheet(score: &Score) -> String {
    let Written { text, left_behind } = write(score, &Heading::default());
    assert_eq!(left_behind, [""; 0]);
    let read = Sheet::read(&text).lower(&text);
    assert!(read.problems.is_empty(), "{:?}\n{text}", read.problems);
    for (read, given) in read.score.voices.iter().zip(&score.voices) {
        assert_eq!(read.notes, given.notes, "{text}");
    }
    text
}

#[test]
fn a_hymn_begins_with_its_pickup() {
    let voices = vec![
        voice(
            "Soprano",
            &[
                ("G4", time(1, 4)),
                ("A4", time(1, 4)),
                ("B4", time(1, 4)),
                ("C5", time(3, 8)),
                ("B4", time(1, 8)),
                ("G5^,", time(3, 4)),
            ],
        ),
        voice(
            "Bass",
            &[("G3", time(1, 4)), ("_", time(1, 1)), ("G2,", time(3, 4))],
        ),
    ];
    let hymn = score(metre(4, 4), &[(0, 2, 6), (1, 8, 0), (2, 6, 0)], voices);
    assert_eq!(
        sheet(&hymn),
        "metre   4/4\n\
         \n\
         voice S soprano\n\
         voice B bass\n\
         \n\
         S | G4 | A B C5 -.B4 | G5^ - -, ||\n\
         B | G3 | _           | G2  - -, ||\n"
    );
}

#[test]
fn a_pickup_shorter_than_a_cell_has_finer_cells() {
    let line = voice(
        "V",
        &[("G4", time(1, 8)), ("A4", time(1, 4)), ("B4", time(3, 4))],
    );
    let one = score(metre(4, 4), &[(0, 1, 7), (1, 8, 0)], vec![line]);
    assert_eq!(
        sheet(&one),
        "metre   4/4 by 1/8\n\nvoice V\n\nV | G4 |\n\nmetre   4/4\n\nV | A4 B - - ||\n"
    );
}

#[test]
fn a_bar_of_odd_length_stands_under_its_own_metre() {
    let line = voice(
        "V",
        &[("G4", time(1, 1)), ("A4", time(5, 4)), ("B4", time(1, 1))],
    );
    let one = score(metre(4, 4), &[(1, 8, 0), (2, 10, 0), (3, 8, 0)], vec![line]);
    assert_eq!(
        sheet(&one),
        "metre   4/4\n\nvoice V\n\nV | G4 - - - |\n\nmetre   5/4\n\nV | A4 - - - - |\n\n\
         metre   4/4\n\nV | B4 - - - ||\n"
    );
}

#[test]
fn a_held_closing_bar_of_one_cell_tells_its_length() {
    let line = voice("V", &[("G4,", time(5, 4))]);
    let one = score(metre(4, 4), &[(1, 8, 0), (2, 2, 0)], vec![line]);
    assert_eq!(
        sheet(&one),
        "metre   4/4\n\nvoice V\n\nV | G4 - - - | -.-, ||\n"
    );
    let line = voice("V", &[("G4", time(1, 1)), ("_^", time(1, 4))]);
    let one = score(metre(4, 4), &[(1, 8, 0), (2, 2, 0)], vec![line]);
    assert_eq!(
        sheet(&one),
        "metre   4/4\n\nvoice V\n\nV | G4 - - - | _^._ ||\n"
    );
}

#[test]
fn halves_are_parted_by_the_end_of_a_section_only() {
    let line = || {
        voice(
            "V",
            &[("G4", time(3, 4)), ("A4", time(1, 4)), ("B4", time(1, 1))],
        )
    };
    let parted = [(-1, 6, 0), (1, 2, 6), (2, 8, 0)];
    assert_eq!(
        sheet(&score(metre(4, 4), &parted, vec![line()])),
        "metre   4/4\n\nvoice V\n\nV | G4 - - || A | B - - - ||\n"
    );
    let joined = [(1, 6, 0), (1, 2, 6), (2, 8, 0)];
    assert_eq!(
        sheet(&score(metre(4, 4), &joined, vec![line()])),
        "metre   4/4\n\nvoice V\n\nV | G4 - - A | B - - - ||\n"
    );
    // A closing bar and a pickup are two bars, though they make one together.
    let two = [(1, 8, 0), (-2, 6, 0), (3, 2, 6), (4, 8, 0)];
    let line = voice(
        "V",
        &[("G4", time(7, 4)), ("A4", time(1, 4)), ("B4", time(1, 1))],
    );
    assert_eq!(
        sheet(&score(metre(4, 4), &two, vec![line])),
        "metre   4/4\n\nvoice V\n\nV | G4 - - - | - - - ||\n\nmetre   4/4\n\n\
         V | A4 | B - - - ||\n"
    );
}

#[test]
fn breves_are_told_in_the_beat_of_their_notes() {
    let minims = voice(
        "CANTVS.",
        &[
            ("D4", time(1, 1)),
            ("E4", time(1, 2)),
            ("F4", time(1, 1)),
            ("E4", time(1, 2)),
            ("G4", time(1, 1)),
        ],
    );
    let one = score(metre(2, 1), &[(1, 16, 0), (2, 16, 0)], vec![minims]);
    assert_eq!(
        sheet(&one),
        "metre   2/1 by 1/2\n\nvoice C // CANTVS.\n\nC | D4 - E F | - E G - ||\n"
    );
}

#[test]
fn carried_octave_figures_leave_no_doubt() {
    let line = voice(
        "V",
        &[
            ("C4", time(1, 4)),
            ("G4", time(1, 4)),
            ("B4", time(1, 4)),
            ("C4", time(1, 4)),
            ("A4", time(1, 4)),
            ("A3", time(1, 4)),
            ("B#3", time(1, 4)),
            ("Cb4", time(1, 4)),
        ],
    );
    let one = score(metre(4, 4), &[(1, 8, 0), (2, 8, 0)], vec![line]);
    assert_eq!(
        sheet(&one),
        "metre   4/4\n\nvoice V\n\nV | C4 G B C4 | A4 A3 B# Cb4 ||\n"
    );
}

#[test]
fn words_stand_under_their_cells() {
    let line = voice(
        "Soprano",
        &[
            ("D4", time(1, 4)),
            ("G4", time(1, 8)),
            ("A4", time(1, 8)),
            ("B4", time(1, 2)),
        ],
    );
    let mut one = score(metre(4, 4), &[(1, 8, 0)], vec![line]);
    one.keys.push(Change {
        from: ZERO,
        value: Key::Of {
            tonic: Pitch::new(4, 0, 4),
            mode: Mode::Major,
            signature: None,
        },
    });
    let syllable = |n: i64, text: &str| (time(n, 8), text.to_owned());
    let heading = Heading {
        title: Some("Quay".to_owned()),
        words: vec![Sung {
            voice: 0,
            verse: Some(2),
            syllables: vec![
                syllable(0, "Har-"),
                syllable(2, "bour"),
                syllable(4, "lamp"),
            ],
        }],
        ..Heading::default()
    };
    let written = write(&one, &heading);
    assert_eq!(written.left_behind, [""; 0]);
    assert_eq!(
        written.text,
        "title   Quay\n\
         key     G major\n\
         metre   4/4\n\
         \n\
         voice S soprano\n\
         \n\
         S         | D4   G.A    B -  ||\n\
         words S 2 | Har- bour - lamp ||\n"
    );
}

#[test]
fn a_tempo_in_cells_names_its_unit_where_the_cells_are_others() {
    let minims = voice(
        "V",
        &[
            ("D4", time(1, 1)),
            ("E4", time(1, 2)),
            ("F4", time(1, 1)),
            ("E4", time(1, 2)),
            ("G4", time(1, 1)),
        ],
    );
    let tempo = |speed| Heading {
        tempos: vec![Change {
            from: ZERO,
            value: Tempo { unit: None, speed },
        }],
        ..Heading::default()
    };
    let breve = score(metre(2, 1), &[(1, 16, 0), (2, 16, 0)], vec![minims]);
    let written = write(&breve, &tempo(40));
    assert!(
        written.text.contains("\ntempo   1/1 40\n"),
        "{}",
        written.text
    );
    let crotchets = voice("V", &[("D4", time(1, 1))]);
    let common = score(metre(4, 4), &[(1, 8, 0)], vec![crotchets]);
    let written = write(&common, &tempo(72));
    assert!(written.text.contains("\ntempo   72\n"), "{}", written.text);
}

/// What is left behind of a bar of 4/4 that something is done to.
fn left(change: impl Fn(&mut Score, &mut Heading)) -> Vec<String> {
    let line = voice("Tenor", &[("C4", time(1, 2)), ("D4", time(1, 2))]);
    let mut score = score(metre(4, 4), &[(1, 8, 0)], vec![line]);
    let mut heading = Heading::default();
    change(&mut score, &mut heading);
    let written = write(&score, &heading);
    let read = Sheet::read(&written.text).lower(&written.text);
    let wrong: Vec<_> = read.problems.iter().map(|p| &p.message).collect();
    assert!(
        wrong.iter().all(|m| m.starts_with("Not written yet")),
        "{wrong:?}\n{}",
        written.text
    );
    written.left_behind
}

#[test]
fn what_is_left_behind_is_told() {
    let whole = |sentence: &str| vec![sentence.to_owned()];
    assert_eq!(left(|_, _| {}), Vec::<String>::new());
    assert_eq!(
        left(|score, _| score.voices[0].notes[1].sound = Sound::Pitch(Pitch::new(0, 0, 10))),
        whole("Notes outside the octaves 0 to 9 are left to be written: Tenor bar 1.")
    );
    assert_eq!(
        left(|score, _| score.voices[0].notes[1].sound = Sound::Pitch(Pitch::new(0, 3, 4))),
        whole("Notes with more than two signs are left to be written: Tenor bar 1.")
    );
    assert_eq!(
        left(|score, _| score.voices[0].notes[0].sound = Sound::Spoilt),
        whole("What could not be read is left to be written: Tenor bar 1.")
    );
    assert_eq!(
        left(|score, _| score.voices[0].notes[1].onset = time(1, 4)),
        whole(
            "A voice sounds one note at a time: notes begin where the one before ends: Tenor bar \
             1."
        )
    );
    assert_eq!(
        left(|score, _| score.voices[0].notes[1].copies = Some(3)),
        whole(
            "Bars copied from another voice are written out, and the two voices are two for every \
             rule: Tenor bar 1."
        )
    );
    assert_eq!(
        left(|score, _| {
            score.voices[0].notes[1].onset = time(1001, 2003);
            score.voices[0].notes[0].length = time(1001, 2003);
            score.voices[0].notes[1].length = time(1002, 2003);
        }),
        whole(
            "Notes begin at moments that no division of a beat into 64 parts or fewer reaches: \
             they are moved to the nearest: Tenor bar 1."
        )
    );
    assert_eq!(
        left(|score, _| score.bars[0].number = 12),
        whole("Bars are numbered as a conductor counts them, a pickup as 0: bar 12 is bar 1 here.")
    );
    assert_eq!(
        left(|score, _| score.style = Some("à la mole".to_owned())),
        whole("The style \"à la mole\" has no lawful name.")
    );
    assert_eq!(
        left(|score, _| score.voices[0].clef = Some("quay".to_owned())),
        whole("The voice T is not clef quay.")
    );
    assert_eq!(
        left(|score, _| score.keys.push(Change {
            from: time(1, 2),
            value: Key::None
        })),
        whole("Keys that change at the end are left out: bar 1.")
    );
    assert_eq!(
        left(|_, heading| heading.words.push(Sung {
            voice: 0,
            verse: None,
            syllables: vec![(time(1, 4), "lamp".to_owned())]
        })),
        whole(
            "Syllables stand under notes as they are struck, and under none behind unwritten time \
             in a bar: others are left out: Tenor bar 1."
        )
    );
    let many = left(|score, _| {
        for _ in 0..64 {
            score.voices.push(Voice::new("Tenor", Kind::plain()));
        }
    });
    assert_eq!(
        many,
        whole("A sheet has at most 64 voices: those from Tenor on are left out.")
    );
}

#[test]
fn halves_are_told_in_the_same_cells() {
    // Five and seven in one crotchet would be seventy parts: the second half wants quavers.
    let mut notes = vec![("G4", time(3, 4))];
    notes.extend([("A4", time(1, 40)); 5]);
    notes.extend([("B4", time(1, 56)); 7]);
    let parted = [(-1, 6, 0), (1, 2, 6)];
    let text = sheet(&score(metre(4, 4), &parted, vec![voice("V", &notes)]));
    assert!(text.starts_with("metre   4/4 by 1/8\n"), "{text}");
    assert!(
        text.ends_with("\nV | G4 - - - - - || A.A.A.A.A B.B.B.B.B.B.B ||\n"),
        "{text}"
    );
}

#[test]
fn a_bar_line_between_beats_is_left_out() {
    let line = voice("V", &[("G4", time(1, 3)), ("A4", time(2, 3))]);
    let mut one = score(metre(4, 4), &[(1, 8, 0)], vec![line]);
    let first = one.bars[0].clone();
    one.bars[0].length = time(1, 3);
    one.bars.push(Bar {
        onset: time(1, 3),
        length: time(2, 3),
        number: 2,
        section_end: true,
        ..first
    });
    let written = write(&one, &Heading::default());
    assert_eq!(
        written.left_behind,
        ["Bar lines between beats are left out: bar 2."]
    );
    assert_eq!(
        written.text,
        "metre   4/4\n\nvoice V\n\nV | G4 -.A.- - - ||\n"
    );
}
