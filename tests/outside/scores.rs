//! Reading the outside scores: one JSON object a line, exact onsets in whole notes.

use std::fs;
use std::path::PathBuf;

use partwright_score::{Bar, Kind, Metre, Note, Pitch, Score, Sound, Time, Voice, ZERO};
use serde_json::Value;

/// A score with what the collection says about it.
pub(crate) struct Piece {
    pub(crate) id: String,
    pub(crate) score: Score,
    pub(crate) about: Value,
}

/// The folder of outside data, or `None` (after a word) where there is none.
pub(crate) fn folder() -> Option<PathBuf> {
    let named = std::env::var_os("PARTWRIGHT_SHARED").map(PathBuf::from);
    let beside = PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("../shared");
    let folder = named.unwrap_or(beside).join("data");
    if folder.is_dir() {
        return Some(folder);
    }
    println!("left out: no outside data here (set PARTWRIGHT_SHARED to its folder)");
    None
}

/// The lines of a JSON Lines file under the outside data.
pub(crate) fn lines(name: &str) -> Option<Vec<Value>> {
    let text = fs::read_to_string(folder()?.join(name)).unwrap();
    Some(
        text.lines()
            .map(|line| serde_json::from_str(line).unwrap())
            .collect(),
    )
}

/// The pieces of one set: `fux`, `chorales-nba`, `chorales-dcml`, `renaissance`.
pub(crate) fn set(name: &str) -> Option<Vec<Piece>> {
    Some(
        lines(&format!("scores/{name}.jsonl"))?
            .into_iter()
            .map(piece)
            .collect(),
    )
}

/// The chorales of both sets, over the sixteen-foot bass they were sung with.
pub(crate) fn chorales() -> Option<Vec<Piece>> {
    let (nba, dcml) = (set("chorales-nba")?, set("chorales-dcml")?);
    let mut chorales: Vec<Piece> = nba.into_iter().chain(dcml).collect();
    for piece in &mut chorales {
        if let Some(bass) = piece.score.voices.last_mut() {
            bass.sixteen_foot = true;
        }
    }
    Some(chorales)
}

fn time(numerator: &Value, denominator: &Value) -> Time {
    Time::new(numerator.as_i64().unwrap(), denominator.as_i64().unwrap())
}

fn piece(about: Value) -> Piece {
    let mut score = Score::default();
    for voice in about["voices"].as_array().unwrap() {
        let mut read = Voice::new(voice["name"].as_str().unwrap(), Kind::plain());
        for note in voice["notes"].as_array().unwrap() {
            let onset = time(&note[0], &note[1]);
            let length = time(&note[2], &note[3]);
            let fermata = note[6].as_bool().unwrap();
            if note[5].as_bool().unwrap() {
                let last = read.notes.last_mut().unwrap();
                last.length += length;
                last.fermata |= fermata;
                continue;
            }
            let sound = note[4]
                .as_str()
                .map_or(Sound::Rest, |p| Sound::Pitch(p.parse::<Pitch>().unwrap()));
            read.notes.push(Note {
                fermata,
                ..Note::new(onset, length, sound)
            });
        }
        score.voices.push(read);
    }
    // The treatise set says which voice is the cantus, counted from the top.
    let cantus = about["cf_voice"]
        .as_u64()
        .and_then(|n| usize::try_from(n).ok()?.checked_sub(1));
    if let Some(voice) = cantus.and_then(|v| score.voices.get_mut(v)) {
        voice.cantus = true;
    }
    bars(&mut score, &about);
    let id = about["id"].as_str().unwrap().to_owned();
    Piece { id, score, about }
}

/// The metre from each labelled bar on.
fn metres(about: &Value) -> Vec<(Option<String>, Metre)> {
    let metre = |n: &Value, d: &Value| {
        let figure = |v: &Value| u16::try_from(v.as_u64().unwrap()).unwrap();
        Metre::new(figure(n), figure(d), None, &[]).unwrap()
    };
    let stated = about["meter"].as_array().unwrap();
    if stated[0].is_array() {
        let change = |m: &Value| (m[0].as_str().map(str::to_owned), metre(&m[1], &m[2]));
        stated.iter().map(change).collect()
    } else {
        vec![(None, metre(&stated[0], &stated[1]))]
    }
}

fn bars(score: &mut Score, about: &Value) {
    let end = score
        .voices
        .iter()
        .filter_map(|v| v.notes.last())
        .map(Note::end)
        .max()
        .unwrap_or(ZERO);
    let stated: Vec<(String, Time)> = about["bars"]
        .as_array()
        .unwrap()
        .iter()
        .map(|bar| {
            (
                bar[0].as_str().unwrap_or_default().to_owned(),
                time(&bar[1], &bar[2]),
            )
        })
        .collect();
    let metres = metres(about);
    score.metres = metres.iter().map(|m| m.1.clone()).collect();
    let mut metre = 0;
    let mut number = 0;
    // What of its full length the first half of a split bar has taken.
    let mut taken = ZERO;
    for (i, (label, onset)) in stated.iter().enumerate() {
        if let Some(change) = metres
            .iter()
            .position(|(from, _)| from.as_deref() == Some(label))
        {
            metre = change;
            taken = ZERO;
        }
        let end_of = |i: usize| stated.get(i + 1).map_or(end, |bar| bar.1);
        let length = end_of(i) - onset;
        let full = score.metres[metre].bar_length().unwrap();
        // A first bar short of its metre is a pickup: it takes the last beats of bar 0.
        let pickup = i == 0 && length < full && stated.len() > 1;
        let second = taken > ZERO;
        // The collections name a second half in several ways; a conductor does not count it.
        number += u32::from(!pickup && !second);
        let lead = if pickup { full - length } else { taken };
        let halved = !pickup && !second && length < full && i + 1 < stated.len();
        taken = if halved && end_of(i + 1) - onset == full {
            length
        } else {
            ZERO
        };
        score.bars.push(Bar {
            number,
            onset: *onset,
            length,
            lead,
            metre: u32::try_from(metre).unwrap(),
            section_end: i + 1 == stated.len(),
        });
    }
}
