//! Chords and keys inferred, beside the analyses of human readers.

use std::collections::BTreeMap;

use partwright_check::Analysis;
use partwright_check::harmony::{LocalKey, SURE, Segment, segment_at, segments};
use partwright_score::{Pitch, Score, Texture, Time};
use serde_json::Value;

use crate::beats::each_piece;
use crate::invariance::transposed;
use crate::scores::{Piece, lines, set};

/// What an analyst says of a moment.
pub(crate) struct Event {
    pub(crate) at: Time,
    root: i32,
    pub(crate) classes: Vec<i32>,
    key: (i32, bool),
    pub(crate) words: String,
}

fn number(value: &Value) -> Option<i32> {
    i32::try_from(value.as_i64()?).ok()
}

/// `9/2`, `4`.
fn beat(text: &str) -> Time {
    let mut halves = text.split('/').map(|n| n.parse::<i64>().unwrap());
    Time::new(halves.next().unwrap(), halves.next().unwrap_or(1))
}

pub(crate) fn event(score: &Score, row: &Value) -> Option<Event> {
    let number_of_bar = row[0].as_u64()?;
    let bar = score
        .bars
        .iter()
        .find(|b| u64::from(b.number) == number_of_bar)?;
    let metre = &score.metres[bar.metre as usize];
    let at = bar.onset - bar.lead + (beat(row[1].as_str()?) - 1) * metre.unit();
    let name = row[2].as_str()?;
    let minor = name.chars().next()?.is_lowercase();
    let tonic: Pitch = format!("{}{}4", name[..1].to_uppercase(), &name[1..])
        .parse()
        .ok()?;
    Some(Event {
        at,
        root: number(&row[4])?,
        classes: row[5].as_array()?.iter().filter_map(number).collect(),
        key: (tonic.place().semitone.rem_euclid(12), minor),
        words: format!("{} {} in {name}", row[1].as_str()?, row[3].as_str()?),
    })
}

/// A place among the fifths as a pitch class.
pub(crate) fn class(place: i32) -> i32 {
    (place * 7).rem_euclid(12)
}

fn key_class(key: LocalKey) -> (i32, bool) {
    (class(key.tonic), key.minor)
}

/// Counts at a confidence: all, root, chord, key.
#[derive(Default, Clone, Copy)]
struct Agreement {
    all: usize,
    root: usize,
    chord: usize,
    key: usize,
}

#[test]
fn the_inferred_harmony_agrees_with_the_analysts() {
    let mut table: BTreeMap<i64, Agreement> = BTreeMap::new();
    let mut total = Agreement::default();
    let mut settled = 0;
    let show = std::env::var("PARTWRIGHT_SHOW").is_ok_and(|what| what == "harmony");
    for name in ["chorales-dcml", "chorales-nba"] {
        let (Some(scores), Some(analyses)) = (set(name), lines(&format!("harmony/{name}.jsonl")))
        else {
            return;
        };
        for analysis in analyses {
            let piece: &Piece = scores.iter().find(|p| p.id == analysis["id"]).unwrap();
            let texture = Texture::of(&piece.score);
            let read = Analysis::of(&piece.score, &texture);
            let found = segments(&piece.score, &texture, read.dissonances());
            let mut events: Vec<Event> = analysis["events"]
                .as_array()
                .unwrap()
                .iter()
                .filter_map(|row| event(&piece.score, row))
                .collect();
            events.sort_by_key(|event| event.at);
            for event in &events {
                let Some(k) = texture.sounding_at(event.at) else {
                    continue;
                };
                let Some(segment) = found.iter().find(|s: &&Segment| s.first <= k && k < s.end)
                else {
                    continue;
                };
                let mut classes: Vec<i32> = segment
                    .chord
                    .quality
                    .tones()
                    .iter()
                    .map(|t| class(segment.chord.root + t))
                    .collect();
                classes.sort_unstable();
                let mut theirs = event.classes.clone();
                theirs.sort_unstable();
                let near = segment_at(&piece.score, &texture, read.dissonances(), k).unwrap();
                settled += usize::from(near.chord == segment.chord && near.key == segment.key);
                let row = table.entry((segment.margin / 50).min(12)).or_default();
                for sum in [row, &mut total] {
                    sum.all += 1;
                    sum.root += usize::from(class(segment.chord.root) == event.root);
                    sum.chord += usize::from(classes == theirs);
                    sum.key += usize::from(segment.key.map(key_class) == Some(event.key));
                }
                if show && class(segment.chord.root) != event.root {
                    let bar = piece.score.place(event.at).bar;
                    println!(
                        "{} bar {bar} {}: ours {} {} margin {}",
                        piece.id,
                        event.words,
                        class(segment.chord.root),
                        segment.chord.quality.name(),
                        segment.margin
                    );
                }
            }
        }
    }
    println!("settled in its surroundings: {settled} of {}", total.all);
    let share = |n: usize, of: usize| 100.0 * n as f64 / of as f64;
    for (margin, a) in &table {
        println!(
            "margin {:4}: {:5} root {:.1} chord {:.1} key {:.1}",
            margin * 50,
            a.all,
            share(a.root, a.all),
            share(a.chord, a.all),
            share(a.key, a.all)
        );
    }
    println!(
        "outside: {} chords of analysts\nroot {:.1}, chord {:.1}, key {:.1} in a hundred",
        total.all,
        share(total.root, total.all),
        share(total.chord, total.all),
        share(total.key, total.all)
    );
    assert_eq!(settled, total.all, "what is far off changes a chord");
    // What was measured may only grow.
    assert_eq!(total.all, 2448);
    let least = [(total.root, 2259), (total.chord, 2026), (total.key, 1989)];
    assert!(least.iter().all(|(n, least)| n >= least), "{least:?}");
    let sure = table.iter().filter(|(margin, _)| **margin * 50 >= SURE);
    let sure = sure.fold((0, 0), |sum, (_, a)| (sum.0 + a.all, sum.1 + a.root));
    println!(
        "outside: {} of {} surer chords have the analyst's root",
        sure.1, sure.0
    );
    assert!(sure.1 * 100 >= sure.0 * 95);
}

#[test]
fn transposed_music_has_the_same_harmony() {
    let Some(pieces) = set("chorales-dcml") else {
        return;
    };
    let read = |score: &Score| {
        let texture = Texture::of(score);
        let analysis = Analysis::of(score, &texture);
        segments(score, &texture, analysis.dissonances())
    };
    for piece in pieces.iter().step_by(6) {
        let here = read(&piece.score);
        // Up by a second, a third and so on, and what each adds among the fifths.
        for (steps, semitones, fifths) in [(1, 2, 2), (2, 3, -3), (-1, -1, 5), (3, 5, -1)] {
            let there = read(&transposed(&piece.score, steps, semitones));
            assert_eq!(here.len(), there.len(), "{}", piece.id);
            for (a, b) in here.iter().zip(&there) {
                assert_eq!(a.chord.root + fifths, b.chord.root, "{}", piece.id);
                assert_eq!((a.chord.quality, a.margin), (b.chord.quality, b.margin));
                let tonic = |key: Option<LocalKey>| key.map(|key| (key.tonic, key.minor));
                let moved = tonic(a.key).map(|(tonic, minor)| (tonic + fifths, minor));
                assert_eq!(moved, tonic(b.key), "{}", piece.id);
            }
        }
    }
}

/// The root and quality a reader names, or one of the others that are right too.
fn is_right(beat: &Value, root: &str, quality: &str) -> bool {
    let named = |of: &Value, what: &Value| of == root && (what == quality || what == "open-fifth");
    let also = beat["also"].as_array().unwrap();
    named(&beat["root"], &beat["quality"]) || also.iter().any(|other| named(&other[0], &other[1]))
}

#[test]
fn the_hundred_beats_are_read_as_they_were_judged() {
    let (mut asked, mut right, mut sure, mut sure_right) = (0, 0, 0, 0);
    let show = std::env::var("PARTWRIGHT_SHOW").is_ok_and(|what| what == "beats");
    each_piece(|score, placed, _| {
        let texture = Texture::of(score);
        let analysis = Analysis::of(score, &texture);
        for (beat, at) in placed.iter().filter(|(beat, _)| beat["root"].is_string()) {
            let k = texture.sounding_at(*at).unwrap();
            let found = segment_at(score, &texture, analysis.dissonances(), k);
            let Some(segment) = found else { continue };
            let quality = segment
                .chord
                .quality
                .name()
                .replacen(" seventh", "-seventh", 1);
            let name = segment.chord.name();
            let root = name.split(' ').next().unwrap();
            let agrees = is_right(beat, root, &quality);
            asked += 1;
            right += usize::from(agrees);
            if segment.margin >= SURE {
                sure += 1;
                sure_right += usize::from(agrees);
            }
            if show && !agrees {
                println!(
                    "{} {}: {} {} margin {}",
                    beat["bar"], beat["beat"], beat["root"], beat["quality"], segment.margin
                );
                println!("    ours {root} {quality}, also {}", beat["also"]);
            }
        }
    });
    println!(
        "outside: {right} of {asked} beats judged before are read so; of the surer {sure_right} of {sure}"
    );
    // What was measured may only grow.
    assert!(right >= RIGHT, "{right} of {asked}");
}

/// Of the hundred beats.
const RIGHT: usize = 96;
