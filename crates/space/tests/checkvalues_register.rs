//! The next voicings in register of the check values, in order, and the same through a passage.
#![allow(clippy::unwrap_used, clippy::panic)]

mod common;

use common::{NORMS, Report, check_values, int, rows, small, smalls};
use partwright_space::{Norm, Octave, Part, Passage, Placing, Tone};
use serde_json::Value;

fn question(row: &Value) -> Placing {
    let leap = u32::try_from(small(&row["max_leap"])).unwrap();
    let ranges = row["ranges"].as_array().unwrap();
    let parts = smalls(&row["src"]).into_iter().zip(ranges).enumerate();
    let (_, norm) = NORMS
        .into_iter()
        .find(|(key, _)| row["norm"] == *key)
        .unwrap();
    Placing {
        octave: Octave::SEMITONES,
        tones: smalls(&row["target_pcs"])
            .into_iter()
            .map(Tone::wanted)
            .collect(),
        parts: parts
            .map(|(voice, (from, range))| Part {
                from,
                low: small(&range[0]),
                high: small(&range[1]),
                leap,
                held: row["fixed"].get(voice.to_string()).map(small),
            })
            .collect(),
        norm,
        crossing: !row["no_crossing"].as_bool().unwrap(),
        overlap: !row["no_overlap"].as_bool().unwrap(),
    }
}

#[test]
fn next_voicings() {
    let Some(values) = check_values() else { return };
    let mut report = Report::default();
    for (i, row) in rows(&values, "random_register").iter().enumerate() {
        let name = format!("random_register, row {i}");
        let question = question(row);
        let all: Vec<(i64, Vec<i32>)> = question.in_order().unwrap().collect();
        assert!(all.is_sorted(), "{name}");
        report.same(
            &name,
            "feasible",
            &(all.len() as i64),
            &int(&row["feasible"]),
        );
        let least = question.least().unwrap();
        let size = least.as_ref().map(|least| least.0);
        report.same(&name, "min", &size, &row["min"].as_i64());
        let ties = least.map_or(0, |least| least.1.len());
        report.same(
            &name,
            "count_at_min",
            &(ties as i64),
            &int(&row["count_at_min"]),
        );
        let first = row["first"].as_array().unwrap();
        let first: Vec<_> = first.iter().map(|f| (int(&f[0]), smalls(&f[1]))).collect();
        report.same(
            &name,
            "first",
            &all[..first.len().min(all.len())].to_vec(),
            &first,
        );
        if question.norm != Norm::Linf && i < 40 {
            through_a_passage(&mut report, &name, &question, &all);
        }
    }
    report.done();
}

/// The same answers as the second layer of a passage with one start.
fn through_a_passage(report: &mut Report, name: &str, question: &Placing, all: &[(i64, Vec<i32>)]) {
    let start: Vec<i32> = question.parts.iter().map(|part| part.from).collect();
    let mut next: Vec<Vec<i32>> = all.iter().map(|(_, pitches)| pitches.clone()).collect();
    next.sort();
    let layers = [vec![start], next.clone()];
    let passage = Passage::new(
        &layers,
        |_, _| Some(0),
        |_, a, b| {
            Some(
                question
                    .norm
                    .size(a.iter().zip(b).map(|(a, b)| i64::from(b - a))),
            )
        },
    );
    let ways: Vec<_> = passage
        .in_order()
        .map(|(size, way)| (size, next[way[1]].clone()))
        .collect();
    report.same(name, "as a passage", &ways, &all.to_vec());
}
