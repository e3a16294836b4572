//! Every outside score written as a sheet and read back the same.

use std::thread;

use partwright_score::{Change, Key, Mode, Note, Pitch, Score, Sound, Time, ZERO, show_time};
use partwright_sheet::{Heading, ProblemKind, Sheet, write};
use serde_json::Value;

use crate::scores::{Piece, set};

const SETS: [&str; 4] = ["fux", "chorales-nba", "chorales-dcml", "renaissance"];

/// The key as the renaissance set states it: `F:`, `g:dor`, `e-:`; small letters are minor.
fn key(about: &Value) -> Option<Key> {
    let (tonic, mode) = about["key"].as_str()?.split_once(':')?;
    let letter = tonic.get(..1)?;
    let sign = match tonic.get(1..)? {
        "-" => "b",
        sign => sign,
    };
    let mode = match mode {
        "" if letter.to_uppercase() == letter => Mode::Major,
        "" => Mode::Minor,
        short => Mode::ALL
            .into_iter()
            .find(|mode| mode.name().starts_with(short))?,
    };
    let tonic: Pitch = format!("{}{sign}4", letter.to_uppercase()).parse().ok()?;
    Some(Key::Of {
        tonic,
        mode,
        signature: None,
    })
}

/// A note as it must come back; silence is one from its beginning to its end.
fn notes(notes: &[Note]) -> Vec<(Time, Time, Sound, bool)> {
    let mut out: Vec<(Time, Time, Sound, bool)> = Vec::new();
    for note in notes {
        match out.last_mut() {
            Some(last) if note.sound == Sound::Rest && last.2 == Sound::Rest => {
                last.1 += note.length;
                last.3 |= note.fermata;
            }
            _ => out.push((note.onset, note.length, note.sound, note.fermata)),
        }
    }
    out
}

/// The bars by which a conductor counts: number, beginning and length, halves joined.
fn counted(score: &Score) -> Vec<(u32, Time, Time)> {
    let mut out: Vec<(u32, Time, Time)> = Vec::new();
    for bar in &score.bars {
        match out.last_mut() {
            Some(last) if last.0 == bar.number => last.2 += bar.length,
            _ => out.push((bar.number, bar.onset, bar.length)),
        }
    }
    out
}

/// Writes and reads back; panics where anything has become another. Returns the sheet.
fn rewrite(piece: &Piece, score: &Score) -> String {
    let id = &piece.id;
    let text = |name: &str| piece.about[name].as_str().map(str::to_owned);
    let heading = Heading {
        title: text("title"),
        by: text("composer"),
        ..Heading::default()
    };
    let written = write(score, &heading);
    assert_eq!(written.left_behind, [""; 0], "{id}");
    let reading = Sheet::read(&written.text).lower(&written.text);
    let wrong = reading
        .problems
        .iter()
        .find(|problem| problem.kind == ProblemKind::Reading);
    assert!(wrong.is_none(), "{id}: {wrong:?}\n{}", written.text);
    // Nothing doubtful, silent or unwritten either.
    assert!(reading.problems.is_empty(), "{id}: {:?}", reading.problems);

    let read = &reading.score;
    assert_eq!(read.voices.len(), score.voices.len(), "{id}");
    for (given, found) in score.voices.iter().zip(&read.voices) {
        let (given, found) = (notes(&given.notes), notes(&found.notes));
        if given != found {
            let same = given.iter().zip(&found).take_while(|(a, b)| a == b).count();
            panic!(
                "{id}: at {} {:?} became {:?}\n{}",
                show_time(given[same.min(given.len() - 1)].0),
                given.get(same),
                found.get(same),
                written.text
            );
        }
    }
    assert_eq!(counted(read), counted(score), "{id}\n{}", written.text);
    assert_eq!(read.keys, score.keys, "{id}");
    let cantus = |score: &Score| score.voices.iter().map(|v| v.cantus).collect::<Vec<_>>();
    assert_eq!(cantus(read), cantus(score), "{id}");
    // Written again, what was read is the same sheet but for names in comments. (A fermata in the
    // middle of a silence stands at its beginning then: silence is one when it is read.)
    let odd = |note: &Note| note.fermata && note.sound == Sound::Rest;
    if !score.voices.iter().flat_map(|v| &v.notes).any(odd) {
        let again = write(read, &heading).text;
        let line = |line: &str| line.split(" //").next().unwrap().trim_end().to_owned();
        let lines = |text: &str| text.lines().map(line).collect::<Vec<_>>();
        assert_eq!(lines(&again), lines(&written.text), "{id}");
    }
    written.text
}

fn pieces(name: &str) -> Option<Vec<Piece>> {
    let mut pieces = set(name)?;
    for piece in &mut pieces {
        let stated = key(&piece.about).map(|value| Change { from: ZERO, value });
        piece.score.keys = stated.into_iter().collect();
    }
    Some(pieces)
}

#[test]
fn every_score_is_written_and_read_back() {
    let sets = SETS.map(|name| {
        thread::spawn(move || {
            let pieces = pieces(name)?;
            for piece in &pieces {
                rewrite(piece, &piece.score);
            }
            Some(pieces.len())
        })
    });
    let counts = sets.map(|set| set.join().unwrap());
    let Some(counts) = counts.into_iter().collect::<Option<Vec<_>>>() else {
        return;
    };
    let count: usize = counts.iter().sum();
    println!("outside: {count} scores written and read back");
    assert_eq!(count, 545);
}

#[test]
fn bars_split_by_the_end_of_a_section_stay_split() {
    let mut split = 0;
    for name in ["chorales-nba", "chorales-dcml"] {
        let Some(pieces) = pieces(name) else { return };
        for piece in pieces {
            let mut score = piece.score.clone();
            for i in 1..score.bars.len() {
                // The repeat of the first lines ends inside a bar.
                if score.bars[i].lead > ZERO && score.bars[i - 1].number == score.bars[i].number {
                    score.bars[i - 1].section_end = true;
                    split += 1;
                }
            }
            let text = rewrite(&piece, &score);
            let read = Sheet::read(&text).lower(&text).score;
            assert_eq!(read.bars, score.bars, "{}", piece.id);
        }
    }
    assert!(split > 40, "{split} bars are split");
}
