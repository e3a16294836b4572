//! The voice leadings of the check values: least ones, how many there are, and all in order. The
//! values come from an independent exhaustive computation, done in two ways; those that are
//! published say so in their `source`.
#![allow(clippy::unwrap_used, clippy::panic)]

mod common;

use common::{NORMS, Report, check_values, chords, int, octave, rows, small, smalls};
use partwright_space::{
    Chord, Doubling, Leading, Norm, Octave, Pair, Place, count, crossing_free, in_order, least,
    least_size, turned,
};
use serde_json::Value;
use std::collections::BTreeSet;

/// `[least size, voice leadings that have it, crossing-free ones of them]`, each found in its own
/// way, and the two ways held against each other.
fn triple(a: &Chord, b: &Chord, doubling: Doubling, norm: Norm) -> [i64; 3] {
    let least = least(a, b, doubling, norm).unwrap();
    assert_eq!(least.size, least_size(a, b, doubling, norm).unwrap());
    let all: Vec<Leading> = in_order(a, b, doubling, norm)
        .unwrap()
        .take_while(|found| found.0 <= least.size)
        .map(|found| found.1)
        .collect();
    assert!(all.is_sorted());
    let free: Vec<Leading> = all.iter().filter(|l| l.crossing_free()).cloned().collect();
    assert_eq!(free, least.leadings, "{a:?} {b:?} {doubling:?} {norm:?}");
    [least.size, all.len() as i64, free.len() as i64]
}

fn triples(report: &mut Report, name: &str, a: &Chord, b: &Chord, doubling: Doubling, row: &Value) {
    for (key, norm) in NORMS {
        let got = triple(a, b, doubling, norm);
        let want: Vec<i64> = row[key].as_array().unwrap().iter().map(int).collect();
        report.same(name, key, &got.to_vec(), &want);
    }
}

fn name(section: &str, i: usize, row: &Value) -> String {
    format!("{section}, row {i} ({} to {})", row["A"], row["B"])
}

fn bijective(section: &str, octave_of: impl Fn(&Value) -> Octave) {
    let Some(values) = check_values() else { return };
    let mut report = Report::default();
    for (i, row) in rows(&values, section).iter().enumerate() {
        let (a, b) = chords(octave_of(row), row);
        triples(
            &mut report,
            &name(section, i, row),
            &a,
            &b,
            Doubling::None,
            row,
        );
    }
    report.done();
}

#[test]
fn triads() {
    bijective("triads_bijective", octave);
}

#[test]
fn sevenths() {
    bijective("sevenths_bijective", octave);
}

#[test]
fn neighbours_of_even_chords() {
    bijective("aug_dim_neighbours", octave);
}

#[test]
fn diatonic() {
    bijective("diatonic_triads", |_| Octave::STEPS);
    bijective("diatonic_sevenths", |_| Octave::STEPS);
}

#[test]
fn random_chords_of_one_size() {
    bijective("random_bijective", octave);
}

fn unequal(section: &str, octave_of: impl Fn(&Value) -> Octave) {
    let Some(values) = check_values() else { return };
    let mut report = Report::default();
    for (i, row) in rows(&values, section).iter().enumerate() {
        let (a, b) = chords(octave_of(row), row);
        let name = name(section, i, row);
        triples(&mut report, &name, &a, &b, Doubling::Smaller, &row["S"]);
        for (key, norm) in NORMS {
            let free = least(&a, &b, Doubling::Both, norm).unwrap();
            report.same(&name, &format!("R {key}"), &free.size, &int(&row["R"][key]));
            let size = least_size(&a, &b, Doubling::Both, norm).unwrap();
            report.same(&name, "R size alone", &size, &free.size);
            for leading in &free.leadings {
                report.same(&name, "R tie", &leading.size(norm), &free.size);
                report.same(
                    &name,
                    "R tie is free of crossings",
                    &leading.crossing_free(),
                    &true,
                );
            }
        }
        for voices in [4, 5] {
            let Some(want) = row.get(format!("V{voices}_L1")) else {
                continue;
            };
            let size = least_size(&a, &b, Doubling::Voices(voices), Norm::L1).unwrap();
            report.same(&name, &format!("V{voices}"), &size, &int(want));
            let got = triple(&a, &b, Doubling::Voices(voices), Norm::L1);
            report.same(&name, &format!("V{voices} in order"), &got[0], &int(want));
        }
    }
    report.done();
}

#[test]
fn sevenths_to_triads() {
    unequal("sevenths_to_triads", octave);
}

#[test]
fn diatonic_sevenths_to_triads() {
    unequal("diatonic_seventh_to_triad", |_| Octave::STEPS);
}

#[test]
fn random_chords_of_unequal_size() {
    unequal("random_unequal", octave);
}

fn pairs(leading: &Leading) -> Vec<Vec<i32>> {
    leading
        .pairs()
        .iter()
        .map(|pair| vec![pair.from, pair.by])
        .collect()
}

#[test]
fn all_in_order() {
    let Some(values) = check_values() else { return };
    let mut report = Report::default();
    for (i, row) in rows(&values, "random_kbest").iter().enumerate() {
        let (a, b) = chords(octave(row), row);
        let name = name("random_kbest", i, row);
        for (key, norm) in &NORMS[..2] {
            let want = &row[key];
            let bound = int(&want["bound"]);
            let all: Vec<(i64, Leading)> = in_order(&a, &b, Doubling::None, *norm)
                .unwrap()
                .take_while(|found| found.0 <= bound)
                .collect();
            assert!(all.is_sorted(), "{name}");
            report.same(&name, "min", &all[0].0, &int(&want["min"]));
            report.same(
                &name,
                "count",
                &(all.len() as i64),
                &int(&want["count_within_bound"]),
            );
            for (size, times) in want["count_by_size"].as_object().unwrap() {
                let found = all
                    .iter()
                    .filter(|found| found.0.to_string() == *size)
                    .count();
                report.same(
                    &name,
                    &format!("count of {size}"),
                    &(found as i64),
                    &int(times),
                );
            }
            let first: Vec<i64> = want["first_sizes"]
                .as_array()
                .unwrap()
                .iter()
                .map(int)
                .collect();
            let sizes: Vec<i64> = all.iter().take(first.len()).map(|found| found.0).collect();
            report.same(&name, "first sizes", &sizes, &first);
            let ties: Vec<_> = all
                .iter()
                .filter(|f| f.0 == all[0].0)
                .map(|f| pairs(&f.1))
                .collect();
            let want_ties: Vec<Vec<Vec<i32>>> = want["ties_at_min"]
                .as_array()
                .unwrap()
                .iter()
                .map(|tie| tie.as_array().unwrap().iter().map(smalls).collect())
                .collect();
            report.same(&name, "ties", &ties, &want_ties);
            let free: Vec<(i64, Leading)> = crossing_free(&a, &b, Doubling::None, *norm)
                .unwrap()
                .take_while(|found| found.0 <= bound)
                .collect();
            let filtered: Vec<_> = all
                .iter()
                .filter(|f| f.1.crossing_free())
                .cloned()
                .collect();
            report.same(&name, "crossing-free, both ways", &free, &filtered);
            let wanted = int(&want["crossing_free_within_bound"]);
            report.same(&name, "crossing-free", &(free.len() as i64), &wanted);
        }
        let shifts = &row["crossing_free_L1_by_shift"];
        let sizes = shifts["sizes"].as_array().unwrap();
        for (k, size) in (int(&shifts["k_from"])..).zip(sizes) {
            let leading = turned(&a, &b, k).unwrap();
            report.same(
                &name,
                &format!("turn {k}"),
                &leading.size(Norm::L1),
                &int(size),
            );
        }
    }
    report.done();
}

#[test]
fn counts_below_a_bound() {
    let Some(values) = check_values() else { return };
    let mut report = Report::default();
    for row in rows(&values, "count_below_bound") {
        let (a, b) = chords(Octave::SEMITONES, row);
        for (key, want) in row.as_object().unwrap() {
            let Some(bound) = key.strip_prefix("L1<=") else {
                continue;
            };
            let bound: i64 = bound.parse().unwrap();
            let within: Vec<Leading> = in_order(&a, &b, Doubling::None, Norm::L1)
                .unwrap()
                .take_while(|found| found.0 <= bound)
                .map(|found| found.1)
                .collect();
            let free = within.iter().filter(|l| l.crossing_free()).count();
            let got = vec![within.len() as i32, free as i32];
            report.same(row["label"].as_str().unwrap(), key, &got, &smalls(want));
        }
    }
    report.done();
}

/// All least voice leadings in L1.
fn all_least(a: &Chord, b: &Chord) -> (i64, BTreeSet<Leading>) {
    let size = least_size(a, b, Doubling::None, Norm::L1).unwrap();
    let all = in_order(a, b, Doubling::None, Norm::L1).unwrap();
    (size, all.take_while(|f| f.0 == size).map(|f| f.1).collect())
}

#[test]
fn two_lattices() {
    let Some(values) = check_values() else { return };
    let mut report = Report::default();
    for (i, row) in rows(&values, "two_lattices").iter().enumerate() {
        let thirds = if row["kind"] == "triad" { 3 } else { 4 };
        let notes = |root: i32| (0..thirds).map(move |third| root + 2 * third);
        let (from, to) = (small(&row["from"]), small(&row["to"]));
        let semitone = |step: i32| Place::white_key(step).semitone;
        let steps = |root| Chord::new(Octave::STEPS, notes(root));
        let semitones = |root| Chord::new(Octave::SEMITONES, notes(root).map(semitone));
        let (size_in_steps, in_steps) = all_least(&steps(from), &steps(to));
        let (size_in_semitones, in_semitones) = all_least(&semitones(from), &semitones(to));
        let carried: BTreeSet<Leading> = in_steps
            .iter()
            .map(|leading| {
                let pairs = leading.pairs().iter().map(|pair| Pair {
                    from: semitone(pair.from),
                    by: semitone(pair.from + pair.by) - semitone(pair.from),
                });
                Leading::new(Octave::SEMITONES, pairs)
            })
            .collect();
        let relation = if carried == in_semitones {
            "same"
        } else if carried.is_subset(&in_semitones) {
            "subset"
        } else {
            "other"
        };
        let name = format!("two_lattices, row {i}");
        report.same(&name, "steps_L1", &size_in_steps, &int(&row["steps_L1"]));
        report.same(
            &name,
            "semis_L1",
            &size_in_semitones,
            &int(&row["semis_L1"]),
        );
        report.same(
            &name,
            "n_steps",
            &(in_steps.len() as i64),
            &int(&row["n_steps"]),
        );
        report.same(
            &name,
            "n_semis",
            &(in_semitones.len() as i64),
            &int(&row["n_semis"]),
        );
        report.same(
            &name,
            "relation",
            &Some(relation),
            &row["relation"].as_str(),
        );
    }
    report.done();
}

/// The published numbers. They are few and stand in the text of the check values, so each is
/// worked out here by what it says it is.
#[test]
fn published_numbers() {
    let Some(values) = check_values() else { return };
    let chord = |notes: &[i32]| Chord::new(Octave::SEMITONES, notes.iter().copied());
    let size = |a: &[i32], b: &[i32], doubling| {
        least_size(&chord(a), &chord(b), doubling, Norm::L1).unwrap()
    };
    let (c7, e7, g7) = ([0, 4, 7, 11], [4, 8, 11, 3], [7, 11, 2, 6]);
    let mut report = Report::default();
    for row in rows(&values, "key") {
        let what = row["what"].as_str().unwrap();
        let got = match what {
            // Tymoczko 2008; OEIS A048291(6).
            "relations between two 6-note chords" => count::relations(6, 6).unwrap() as i64,
            "bijective pc voice leadings, half-diminished to 12 dominant sevenths" => (0..12)
                .map(|root| {
                    pairings(
                        &chord(&[0, 3, 6, 10]),
                        &chord(&[0, 4, 7, 10]).transposed(root),
                    )
                })
                .sum(),
            "Cmaj7 -> Emaj7, free doubling (R), L1" => size(&c7, &e7, Doubling::Both),
            "Cmaj7 -> Emaj7, bijective, L1" => size(&c7, &e7, Doubling::None),
            "Cmaj7 -> Gmaj7, bijective L1, (C,E,G,B)->(D,F#,G,B)" => {
                named(&[0, 4, 7, 11], &[2, 6, 7, 11], &g7)
            }
            "C pentatonic -> G pentatonic L1, (C,D,E,G,A)->(B,D,E,G,A)" => {
                named(&[0, 2, 4, 7, 9], &[-1, 2, 4, 7, 9], &[7, 9, 11, 2, 4])
            }
            "C diatonic -> G diatonic L1 (F->F#)" => named(
                &[0, 2, 4, 5, 7, 9, 11],
                &[0, 2, 4, 6, 7, 9, 11],
                &[7, 9, 11, 0, 2, 4, 6],
            ),
            "C -> G major, C->B, E->D" => named(&[0, 4, 7], &[-1, 2, 7], &[7, 11, 2]),
            other => panic!("unknown key value: {other}"),
        };
        report.same("key", what, &got, &int(&row["value"]));
    }
    report.done();
}

/// The least L1 size, once the voice leading named in the text is found to be among the least.
fn named(before: &[i32], after: &[i32], to: &[i32]) -> i64 {
    let octave = Octave::SEMITONES;
    let leading = Leading::between(octave, before, after).unwrap();
    let target = Chord::new(octave, to.iter().copied());
    assert_eq!(leading.target(), target);
    let least = least(&leading.source(), &target, Doubling::None, Norm::L1).unwrap();
    assert!(least.leadings.contains(&leading), "{leading:?}");
    least.size
}

/// How many ways the stream of voice leadings pairs the pitch classes of two chords one to one:
/// listed until the paths are long enough to have met every pairing.
fn pairings(a: &Chord, b: &Chord) -> i64 {
    let found: BTreeSet<Vec<(i32, i32)>> = in_order(a, b, Doubling::None, Norm::Linf)
        .unwrap()
        .take_while(|found| found.0 <= 6)
        .map(|(_, leading)| {
            let ends = leading
                .pairs()
                .iter()
                .map(|pair| (pair.from, pair.to(leading.octave())));
            ends.collect()
        })
        .collect();
    assert_eq!(count::bijections(4), Some(24));
    found.len() as i64
}
