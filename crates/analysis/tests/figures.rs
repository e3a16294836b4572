//! Every figure: what fits it, and what just misses it, with the word for what is missing.

#![allow(clippy::unwrap_used, clippy::panic)]

use partwright_analysis::Figure;
use partwright_analysis::figures::{Near, near_suspension, tried};
use partwright_analysis::{Analysis, Dissonance};
use partwright_score::{Score, Texture, Time};
use partwright_sheet::Sheet;

struct Read {
    score: Score,
    texture: Texture,
    analysis: Analysis,
}

fn read(text: &str) -> Read {
    let score = Sheet::read(text).lower(text).score;
    let texture = Texture::of(&score);
    let analysis = Analysis::of(&score, &texture);
    Read {
        score,
        texture,
        analysis,
    }
}

/// A sheet of bars of four, a row a line, voices named from the top.
fn sheet(rows: &[&str]) -> Read {
    let labels = ["S", "A", "T", "B"];
    let mut text = String::from("metre 4/4\n\n");
    let skip = labels.len() - rows.len();
    for (i, row) in rows.iter().enumerate() {
        // The last row is the bass, the first the soprano.
        let label = match i {
            0 => "S",
            i if i + 1 == rows.len() => "B",
            i => labels[i.min(skip + i)],
        };
        text += &format!("{label} | {row} |\n");
    }
    read(&text)
}

impl Read {
    fn all(&self) -> &[Dissonance] {
        self.analysis.dissonances()
    }

    /// `bar 1 beat 2 S passing note`, or `none`.
    fn told(&self) -> Vec<String> {
        let told = |d: &Dissonance| {
            let place = self.score.place(d.at);
            let (bar, beat) = (place.bar, place.beat);
            match d.reading {
                Some(r) => format!(
                    "{bar}:{beat} {} {}",
                    self.score.voices[r.voice].label,
                    r.figure.name()
                ),
                None => format!("{bar}:{beat} none"),
            }
        };
        self.all().iter().map(told).collect()
    }

    /// What a figure missed, asked of the voice that was struck or held.
    fn missed(&self, figure: &str, voice: &str) -> Option<&'static str> {
        let dissonance = self.all().first()?;
        tried(&self.score, &self.texture, dissonance)
            .into_iter()
            .find(|t| t.figure == figure && self.score.voices[t.voice].label == voice)?
            .missing
    }

    fn only(&self) -> Figure {
        let [one] = self.all() else {
            panic!("{:?}", self.told())
        };
        one.reading.unwrap().figure
    }
}

/// Rows, the one dissonance told.
fn fits(rows: &[&str], told: &str) {
    assert_eq!(sheet(rows).told(), [told], "{rows:?}");
}

/// Rows, the one dissonance told, and what the figure asked for misses in the soprano.
fn misses(figure: &str, rows: &[&str], told: &str, why: &str) {
    let read = sheet(rows);
    assert_eq!(read.told(), [told], "{rows:?}");
    assert_eq!(read.missed(figure, "S"), Some(why), "{rows:?}");
}

#[test]
fn passing_notes() {
    fits(&["E5 D C -", "C4 - - -"], "1:2 S passing note");
    fits(&["C5 D E -", "C4 - - -"], "1:2 S passing note");
    fits(&["C5 - - -", "C4 B3 A -"], "1:2 B passing note");
    fits(&["E5 - D C", "C4 - - -"], "1:3 S accented passing note");
    let p = "passing note";
    let held = "C4 - - -";
    misses(
        p,
        &["E5 D E -", held],
        "1:2 S lower neighbour",
        "it turns back",
    );
    misses(p, &["_ D5 C -", held], "1:2 none", "nothing leads to it");
    misses(p, &["E5 D _ -", held], "1:2 none", "nothing follows it");
    misses(
        p,
        &["G5 D C -", held],
        "1:2 none",
        "it is not reached by step",
    );
    misses(p, &["C5 D G -", held], "1:2 none", "it is not left by step");
    misses(
        p,
        &["E5 - D C", held],
        "1:3 S accented passing note",
        "it does not stand on a weaker moment than its neighbours",
    );
}

#[test]
fn two_notes_pass_one_after_the_other() {
    // Across a fourth, over a held bass and a held third voice.
    let read = sheet(&["C5 B4 A G", "G4 - - -", "C4 - - -"]);
    assert_eq!(
        read.told(),
        ["1:2 S passing note", "1:3 S accented passing note"]
    );
}

#[test]
fn a_struck_note_over_one_that_moves_away_is_no_accented_passing_note() {
    // The bass goes on first: it is the bass that passed.
    let read = sheet(&["C5 - B -", "E4 - C.B3 A"]);
    assert_eq!(
        read.missed("accented passing note", "S"),
        Some("the other note goes on first")
    );
}

#[test]
fn neighbours() {
    let held = "C4 - - -";
    fits(&["E5 F E -", held], "1:2 S upper neighbour");
    fits(&["E5 D E -", held], "1:2 S lower neighbour");
    let accented = sheet(&["E5 - D E", held]);
    assert_eq!(
        accented.only(),
        Figure::Neighbour {
            upper: false,
            accented: true
        }
    );
    // With another sign the main note still returns.
    fits(&["Eb5 D E -", held], "1:2 S lower neighbour");
    let n = "neighbour";
    misses(
        n,
        &["E5 F D -", "C4 - B3 -"],
        "1:2 S escape note",
        "it is not reached and left by step",
    );
}

#[test]
fn double_neighbours() {
    let told = sheet(&["D5 E C D", "D4 - - -"]).told();
    assert_eq!(told, ["1:2 S double neighbour", "1:3 S double neighbour"]);
    // Not back to the main note.
    let read = sheet(&["D5 E C B4", "D4 - - -"]);
    assert_eq!(
        read.missed("double neighbour", "S"),
        Some("the line does not go round a note and back to it")
    );
    // On the strong beat.
    let read = sheet(&["_ D5 E C | D5 - - -", "D4 - - - | D4 - - -"]);
    assert_eq!(
        read.missed("double neighbour", "S"),
        Some("it stands on a strong moment")
    );
}

#[test]
fn cambiatas() {
    let whole = |rows: &[&str]| sheet(rows).only();
    let five = whole(&["C5 B4 G A | B4 - - -", "C4 - - - | G4 - - -"]);
    assert_eq!(
        five,
        Figure::Cambiata {
            rising: false,
            whole: true
        }
    );
    let four = whole(&["C5 B4 G A | F4 - - -", "C4 - - - | F4 - - -"]);
    assert_eq!(
        four,
        Figure::Cambiata {
            rising: false,
            whole: false
        }
    );
    let c = "cambiata";
    misses(
        c,
        &["C5 B4 G E", "C4 - - -"],
        "1:2 none",
        "the line does not turn back by step after the third",
    );
    misses(
        c,
        &["C5 B4 E -", "C4 - - -"],
        "1:2 none",
        "it does not leap a third onward",
    );
    misses(
        c,
        &["_ B4 G A", "C4 - - -"],
        "1:2 none",
        "nothing leads to it",
    );
    misses(
        c,
        &["C5 - B4 G | A4 - - -", "C4 - - - | C4 - - -"],
        "1:3 none",
        "it does not stand on a weaker moment than its neighbours",
    );
    // The note after the third is dissonant.
    let read = sheet(&["C5 B4 G A", "C4 - A3 -"]);
    assert_eq!(
        read.missed(c, "S"),
        Some("the note after the third is dissonant")
    );
}

#[test]
fn escape_notes() {
    let e = "escape note";
    let held = "A3 - - -";
    fits(&["C5 D A4 -", held], "1:2 S escape note");
    misses(
        e,
        &["C5 D F -", held],
        "1:2 none",
        "it does not leap the other way",
    );
    misses(
        e,
        &["E4 D5 A4 -", held],
        "1:2 none",
        "it is not reached by step",
    );
    misses(
        e,
        &["C5 - D A4", held],
        "1:3 none",
        "it does not stand on a weaker moment than its neighbours",
    );
}

#[test]
fn anticipations() {
    let a = "anticipation";
    let bass = "A3 - - - | C4 - - -";
    fits(&["A4 C5 A4 G | G4 - - -", bass], "1:4 S anticipation");
    misses(
        a,
        &["C5 - A4 G | C5 - - -", bass],
        "1:4 S escape note",
        "the same note does not follow",
    );
    misses(
        a,
        &["A4 - G G", "A3 - - -"],
        "1:3 none",
        "the note that follows is no stronger",
    );
    misses(
        a,
        &["A4 - E G | G4 - - -", bass],
        "1:4 none",
        "it is not reached by step",
    );
}

#[test]
fn suspensions() {
    let s = "suspension";
    fits(
        &["D5 - - - | - - C -", "D4 - - - | E4 - - -"],
        "2:1 S suspension",
    );
    // Restruck: a new syllable on the held pitch.
    fits(
        &["D5 - - - | D - C -", "D4 - - - | E4 - - -"],
        "2:1 S suspension",
    );
    // In the lowest voice.
    fits(
        &["D5 - - - | E5 - - -", "D4 - - - | - - C -"],
        "2:1 B suspension",
    );
    misses(
        s,
        &["D5 - - - | - - E -", "D4 - - - | E4 - - -"],
        "2:1 S retardation",
        "it does not go down by step",
    );
    misses(
        s,
        &["D5 - - - | - - _ -", "D4 - - - | E4 - - -"],
        "2:1 none",
        "nothing follows it",
    );
}

#[test]
fn what_a_suspension_lacks() {
    let near = |rows: &[&str]| {
        let read = sheet(rows);
        let last = read.all().last().unwrap();
        near_suspension(&read.score, &read.texture, last).map(|(near, _)| near)
    };
    let leap = near(&["D5 - - - | - - A4 -", "D4 - - - | E4 - - -"]);
    assert_eq!(leap, Some(Near::Resolution));
    let weak = near(&["C5 - - - | B4 - - -", "F4 A3 D4 - | G4 - - -"]);
    assert_eq!(weak, Some(Near::Position));
    let struck = near(&["C5 - - - | F5 - A4 -", "A3 - - - | C4 - - -"]);
    assert_eq!(struck, None);
}

fn held(rows: &[&str]) -> (bool, Time, Time) {
    match sheet(rows).only() {
        Figure::Suspension(held) => (held.ornamented, held.struck, held.resolved),
        other => panic!("{other:?}"),
    }
}

#[test]
fn resolutions_with_an_ornament() {
    let bass = "D4 - - - | E4 - - -";
    let at = Time::new(3, 2);
    assert_eq!(
        held(&["D5 - - - | - - C -", bass]),
        (false, Time::from_integer(0), at)
    );
    // A leap to an agreeing note, and back to the resolution.
    assert!(held(&["D5 - - - | - B4 C5 -", bass]).0);
    // The note of resolution early: it is that note that counts.
    assert!(!held(&["D5 - - - | - C.C C -", bass]).0);
    // The ornament must agree.
    let read = sheet(&["D5 - - - | - A4 C5 -", "D4 - - - | E4 - - -"]);
    assert_eq!(read.told(), ["2:1 none"]);
}

#[test]
fn a_chain_in_three_parts() {
    let read = sheet(&[
        "C5 - - - | - - B4 - | - - A4 - | - - G4 -",
        "A4 - F - | - - - - | E4 - - - | D4 - - -",
        "A3 - - - | D3 - - - | C3 - - - | B2 - - -",
    ]);
    let told = read.told();
    let chain: Vec<_> = told
        .iter()
        .filter(|t| t.ends_with("S suspension"))
        .collect();
    assert_eq!(
        chain,
        ["2:1 S suspension", "3:1 S suspension", "4:1 S suspension"]
    );
}

#[test]
fn retardations() {
    fits(
        &["B4 - - - | - - C5 -", "G3 - - - | C4 - - -"],
        "2:1 S retardation",
    );
    let read = sheet(&["B4 - - - | - - D5 -", "G3 - - - | C4 - - -"]);
    assert_eq!(
        read.missed("retardation", "S"),
        Some("it does not go up by step")
    );
}

#[test]
fn appoggiaturas() {
    let a = "appoggiatura";
    let bass = "A3 - - - | C4 - - -";
    fits(&["C5 - - - | F5 - E -", bass], "2:1 S appoggiatura");
    misses(
        a,
        &["C5 - - - | F5 - A4 -", bass],
        "2:1 none",
        "it is not left by step",
    );
    misses(
        a,
        &["C5 F - E", "C4 - - -"],
        "1:2 none",
        "it stands on a weak moment",
    );
    misses(
        a,
        &["_ - - - | F5 - E -", bass],
        "2:1 none",
        "it is not reached by leap",
    );
}

#[test]
fn consonant_fourths() {
    let c = "consonant fourth";
    fits(
        &["C5 - D - | - - C# -", "A3 - - - | - - - -"],
        "1:3 S consonant fourth",
    );
    let bass = "A3 - - - | - - E3 -";
    misses(
        c,
        &["A4 - D5 - | - - C# -", bass],
        "1:3 none",
        "it is not reached by step",
    );
    misses(
        c,
        &["C5 - D - | C5 - - -", bass],
        "1:3 S upper neighbour",
        "it is not held into a stronger moment",
    );
    let read = sheet(&["C5 - D - | - - C -", "G3 - A3 - | - - - -"]);
    assert_eq!(
        read.missed(c, "S"),
        Some("the lowest voice does not hold its note")
    );
}

#[test]
fn diminished_fifths() {
    let d = "diminished fifth that closes";
    fits(
        &["F4 - - - | E4 - - -", "B3 - - - | C4 - - -"],
        &format!("1:1 S {d}"),
    );
    misses(
        d,
        &["F4 - - - | G4 - - -", "B3 - - - | C4 - - -"],
        "1:1 none",
        "it does not close to a third",
    );
    misses(
        d,
        &["E4 - - - | D4 - - -", "B3 - - - | B3 - - -"],
        "1:1 none",
        "it is no diminished fifth over the lowest voice",
    );
    // One closes after the other.
    fits(
        &["F4 - - - | E4 - - -", "B3 - C4 - | - - - -"],
        &format!("1:1 S {d}"),
    );
}

#[test]
fn pedals() {
    let rows = [
        "E5 - F - | D5 - F - | E5 - - -",
        "C3 - - - | - - - - | - - - -",
    ];
    let pedal = sheet(&rows);
    assert!(
        pedal.told().iter().any(|t| t.ends_with("B pedal")),
        "{:?}",
        pedal.told()
    );
    // Above it the next voice up is the lowest for all else.
    let read = sheet(&[
        "E5 - D - | C5 - D - | E5 - - -",
        "G4 - B - | A4 - G - | G4 - - -",
        "C3 - - - | - - - - | - - - -",
    ]);
    assert!(
        read.told().iter().filter(|t| t.ends_with("none")).count() == 0,
        "{:?}",
        read.told()
    );
    // Too short, or dissonant at its end.
    for rows in [
        ["E5 - F - | A4 - - -", "C3 - - - | D3 - - -"],
        [
            "E5 - F - | D5 - F - | F5 - D -",
            "C3 - - - | - - - - | - - - -",
        ],
    ] {
        let read = sheet(&rows);
        assert!(
            !read.told().iter().any(|t| t.ends_with("pedal")),
            "{:?}",
            read.told()
        );
    }
}

#[test]
fn a_sixteen_foot_bass_stays_the_lowest() {
    let music = "T | A3 - - - |\nB | D4 - - - |\n";
    let plain = read(&format!(
        "metre 4/4\nvoice T tenor\nvoice B bass\n\n{music}"
    ));
    let organ = read(&format!(
        "metre 4/4\nvoice T tenor\nvoice B bass sixteen-foot\n\n{music}"
    ));
    // A fourth with the tenor lowest; a fifth over the octave below.
    assert_eq!(plain.all().len(), 1);
    assert!(organ.all().is_empty(), "{:?}", organ.told());
}

#[test]
fn a_voice_that_doubles_another_is_told_once() {
    let text = "metre 4/4\nvoice V violin doubles S\nvoice S\nvoice B\n\nV | E6 D C - |\nS | E5 D C - |\nB | C4 - - - |\n";
    assert_eq!(read(text).told(), ["1:2 S passing note"]);
}

#[test]
fn nothing_is_told_where_a_voice_is_not_written_yet() {
    assert!(sheet(&["E5 D C -", "? - - -", "C4 - - -"]).all().is_empty());
    // Before and after it the rest is told.
    let read = sheet(&[
        "E5 D C - | E5 D C -",
        "? - - - | G4 - - -",
        "C4 - - - | - - - -",
    ]);
    assert!(
        read.told().iter().all(|t| t.starts_with("2:")),
        "{:?}",
        read.told()
    );
}

#[test]
fn empty_scores_have_no_dissonances() {
    for text in [
        "",
        "S | |",
        "S | _ |\nB | _ |",
        "S | C5 |",
        "metre 4/4\n\nS | ? |\nB | ? |",
    ] {
        assert!(read(text).all().is_empty(), "{text:?}");
    }
    assert!(
        Analysis::of(&Score::default(), &Texture::default())
            .dissonances()
            .is_empty()
    );
}

#[test]
fn a_clash_of_upper_voices_is_read_where_it_began() {
    // D passes under C; the bass, which C did not agree with, then passes as well.
    let read = sheet(&[
        "C5 - - - | B4 - - -",
        "C4 - D E | D4 - - -",
        "A3 - G.F E | G3 - - -",
    ]);
    assert!(
        read.told().iter().all(|t| !t.ends_with("none")),
        "{:?}",
        read.told()
    );
    let order: Vec<_> = read.all().iter().map(|d| d.sonority).collect();
    assert!(order.is_sorted());
}
