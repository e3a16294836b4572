//! Consecutive fifths and octaves: every place that an independent count finds, and no other.
//!
//! The count (`consecutives.jsonl`) goes over all pairs of voices between successive sonorities
//! by a method of its own.

use std::collections::BTreeSet;

use partwright_check::{Wishes, check_score};
use partwright_rules::Style;
use partwright_score::{Texture, show_time};
use partwright_space::{Consecutive, Family};

use crate::scores::{Piece, lines, set};

/// Piece, `fifth` or `octave`, moment of arrival, the two voices.
type Place = (String, String, String, String);

/// Places that count, and that our rules let pass: both voices only change the octave or their
/// position in one chord, the same two pitch classes before and after. (The count takes the
/// fermata of any voice for the end of a phrase, our rules only that of either voice of the
/// pair; in these sets no place differs by that.)
const LAWFUL: [(&str, &str, &str, &str); 3] = [
    ("bcfb-BWV_137.05", "octave", "7/4", "Tenor/Bass"), // G3-G4 to G2-G3
    ("dcml-036", "fifth", "23/4", "Tenor/Bass"),        // A2-E3 to A3-E4
    ("bcfb-BWV_9.07", "fifth", "59/8", "Alto/Tenor"),
];

fn counted(direction: &str, ids: &BTreeSet<String>) -> Option<BTreeSet<Place>> {
    let word = |v: &serde_json::Value| v.as_str().unwrap().to_owned();
    let places = lines("scores/consecutives.jsonl")?;
    let wanted = places.iter().filter(|p| {
        p["dir"] == direction && p["fermata"] == false && ids.contains(p["id"].as_str().unwrap())
    });
    Some(
        wanted
            .map(|p| {
                (
                    word(&p["id"]),
                    word(&p["kind"]),
                    word(&p["t1"]),
                    word(&p["voices"]),
                )
            })
            .collect(),
    )
}

/// The places our rules report, under the style in which every one of them counts.
fn reported(pieces: &[Piece], rules: &[(&str, &str)]) -> BTreeSet<Place> {
    let mut places = BTreeSet::new();
    for piece in pieces {
        let style = if piece.id.starts_with("fux") {
            Style::Species1
        } else {
            Style::Chorale
        };
        let wishes = Wishes::of_style(style);
        for finding in check_score(&piece.score, &wishes) {
            let Some((_, kind)) = rules.iter().find(|(rule, _)| *rule == finding.rule) else {
                continue;
            };
            let names: Vec<&str> = finding
                .voices
                .iter()
                .map(|&v| piece.score.voices[v].label.as_str())
                .collect();
            let at = show_time(finding.at.unwrap());
            places.insert((piece.id.clone(), (*kind).to_owned(), at, names.join("/")));
        }
    }
    places
}

fn pieces() -> Option<Vec<Piece>> {
    let mut pieces = set("fux")?;
    pieces.extend(set("chorales-nba")?);
    pieces.extend(set("chorales-dcml")?);
    Some(pieces)
}

#[test]
fn parallels_of_treatise_and_chorales_are_found_and_none_more() {
    let Some(pieces) = pieces() else { return };
    let ids = pieces.iter().map(|p| p.id.clone()).collect();
    let counted = counted("similar", &ids).unwrap();
    let reported = reported(
        &pieces,
        &[
            ("parallel-fifths", "fifth"),
            ("parallel-octaves", "octave"),
            ("parallel-unisons", "octave"),
        ],
    );
    compare(&counted, &reported);
    println!(
        "outside: {} parallels in {} pieces",
        counted.len(),
        pieces.len()
    );
}

#[test]
fn contrary_consecutives_of_treatise_and_chorales_are_found_and_none_more() {
    let Some(pieces) = pieces() else { return };
    let ids = pieces.iter().map(|p| p.id.clone()).collect();
    let counted = counted("contrary", &ids).unwrap();
    let reported = reported(
        &pieces,
        &[("contrary-fifths", "fifth"), ("contrary-octaves", "octave")],
    );
    compare(&counted, &reported);
    println!(
        "outside: {} contrary consecutives in {} pieces",
        counted.len(),
        pieces.len()
    );
}

/// Every counted place but the lawful ones is reported, and none more.
fn compare(counted: &BTreeSet<Place>, reported: &BTreeSet<Place>) {
    let lawful: BTreeSet<Place> = LAWFUL
        .iter()
        .map(|&(id, kind, at, voices)| (id.into(), kind.into(), at.into(), voices.into()))
        .collect();
    let wanted: BTreeSet<Place> = counted.difference(&lawful).cloned().collect();
    let missed: Vec<&Place> = wanted.difference(reported).collect();
    let extra: Vec<&Place> = reported.difference(&wanted).collect();
    assert!(
        missed.is_empty() && extra.is_empty(),
        "missed {missed:#?}\nmore than counted {extra:#?}"
    );
}

#[test]
fn the_lawful_places_are_counted_ones() {
    let Some(places) = lines("scores/consecutives.jsonl") else {
        return;
    };
    for (id, kind, at, voices) in LAWFUL {
        assert!(
            places.iter().any(|p| p["id"] == id
                && p["kind"] == kind
                && p["t1"] == at
                && p["voices"] == voices),
            "{id} no longer stands in the count"
        );
    }
}

#[test]
fn the_table_of_steps_agrees_with_the_count_everywhere() {
    // The renaissance set as well, and every place whether or not a rule minds it.
    let Some(mut all) = pieces() else { return };
    all.extend(set("renaissance").unwrap());
    let word = |v: &serde_json::Value| v.as_str().unwrap().to_owned();
    let counted: BTreeSet<(Place, String)> = lines("scores/consecutives.jsonl")
        .unwrap()
        .iter()
        .map(|p| {
            (
                (
                    word(&p["id"]),
                    word(&p["kind"]),
                    word(&p["t1"]),
                    word(&p["voices"]),
                ),
                word(&p["dir"]),
            )
        })
        .collect();
    let mut found = BTreeSet::new();
    for piece in &all {
        let texture = Texture::of(&piece.score);
        for (k, sonority) in texture.sonorities().iter().enumerate() {
            for (pair, step) in texture.steps(k) {
                let (family, direction) = match step.consecutive() {
                    Some(Consecutive::Same(family)) => (family, "similar"),
                    Some(Consecutive::Contrary(family)) => (family, "contrary"),
                    _ => continue,
                };
                let kind = if family == Family::Fifth {
                    "fifth"
                } else {
                    "octave"
                };
                let label = |v: usize| piece.score.voices[v].label.clone();
                let voices = format!("{}/{}", label(pair.upper), label(pair.lower));
                let place = (
                    piece.id.clone(),
                    kind.to_owned(),
                    show_time(sonority.onset),
                    voices,
                );
                found.insert((place, direction.to_owned()));
            }
        }
    }
    let missed: Vec<_> = counted.difference(&found).take(20).collect();
    let extra: Vec<_> = found.difference(&counted).take(20).collect();
    assert!(
        missed.is_empty() && extra.is_empty(),
        "missed {missed:#?}\nmore than counted {extra:#?}"
    );
    println!(
        "outside: {} consecutives in {} pieces",
        counted.len(),
        all.len()
    );
}
