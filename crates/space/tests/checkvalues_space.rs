//! The places of the check values: strip, prism, alcove, how many chords there are, evenness.
#![allow(clippy::unwrap_used, clippy::panic)]

mod common;

use common::{Report, check_values, int, rows, small, smalls};
use num_rational::Ratio;
use partwright_space::{Chord, Norm, Octave, PrismPoint, StripPoint, count};
use serde_json::Value;
use std::collections::BTreeSet;

fn float(value: Ratio<i64>) -> f64 {
    *value.numer() as f64 / *value.denom() as f64
}

/// The values are given to nine places.
fn near(got: f64, want: &Value) -> bool {
    (got - want.as_f64().unwrap()).abs() < 1e-8
}

fn strip(section: &str, octave: Octave) {
    let Some(values) = check_values() else { return };
    let rows = rows(&values, section);
    let mut report = Report::default();
    report.same(
        section,
        "number of rows",
        &(rows.len() as u128),
        &count::chords(octave, 2).unwrap(),
    );
    for row in rows {
        let name = format!("{section}, {}", row["dyad"]);
        let [x, y] = smalls(&row["dyad"])[..] else {
            panic!("{name}")
        };
        let at = StripPoint::under(octave, x, y);
        let got = [at.u(), at.v(), at.height(), at.twice_from_centre()];
        report.same(
            &name,
            "u, v, h, w2",
            &got,
            &["u", "v", "h", "w2"].map(|key| small(&row[key])),
        );
        report.same(&name, "residues", &at.residues(), &[x, y]);
    }
    report.done();
}

#[test]
fn strip_of_semitones() {
    strip("mobius_12", Octave::SEMITONES);
}

#[test]
fn strip_of_steps() {
    strip("mobius_7", Octave::STEPS);
}

#[test]
fn prism() {
    let Some(values) = check_values() else { return };
    let mut report = Report::default();
    for row in rows(&values, "prism_12") {
        let name = format!("prism_12, {}", row["chord"]);
        let chord = Chord::new(Octave::SEMITONES, smalls(&row["chord"]));
        let at = PrismPoint::of(&chord).unwrap();
        report.same(&name, "layer", &at.layer(), &small(&row["layer"]));
        report.same(&name, "gaps", &at.gaps().to_vec(), &smalls(&row["gaps"]));
        report.same(
            &name,
            "mirrors",
            &(at.sides() as i64),
            &int(&row["mirrors"]),
        );
        report.same(
            &name,
            "coincidences",
            &(chord.coincidences() as i64),
            &int(&row["mirrors"]),
        );
        let zeta = chord.zeta();
        let want = row["zeta"].as_array().unwrap();
        report.same(
            &name,
            "zeta",
            &(near(zeta.re, &want[0]) && near(zeta.im, &want[1])),
            &true,
        );
        let boundary = chord.boundary_distance(Norm::L1).unwrap();
        report.same(
            &name,
            "boundary_L1",
            &boundary,
            &Ratio::from(int(&row["boundary_L1"])),
        );
        let core = float(chord.core_distance_squared().unwrap());
        report.same(&name, "core_L2sq", &near(core, &row["core_L2sq"]), &true);
    }
    report.done();
}

#[test]
fn alcove_of_steps() {
    let Some(values) = check_values() else { return };
    let mut report = Report::default();
    for row in rows(&values, "alcove_7_triples") {
        let name = format!("alcove_7_triples, {}", row["chord"]);
        let at = Chord::new(Octave::STEPS, smalls(&row["chord"])).canonical();
        report.same(&name, "layer", &at.layer(), &int(&row["layer"]));
        report.same(&name, "gaps", &at.gaps().to_vec(), &smalls(&row["gaps"]));
    }
    report.done();
}

/// Every count twice: by the closed formula, and by going through all the chords.
#[test]
fn counts() {
    let Some(values) = check_values() else { return };
    let mut report = Report::default();
    let sections = values["counts"].as_object().unwrap();
    assert!(!sections.is_empty());
    for (name, row) in sections {
        let (size, notes) = name.strip_prefix('N').unwrap().split_once("_n").unwrap();
        let octave = Octave::new(size.parse().unwrap()).unwrap();
        let notes: usize = notes.parse().unwrap();
        let n = notes as u64;
        let all: Vec<Chord> = Chord::all(octave, notes).collect();
        let distinct: BTreeSet<_> = all.iter().map(Chord::canonical).collect();
        report.same(name, "canonical forms", &distinct.len(), &all.len());
        let inner: Vec<&Chord> = all.iter().filter(|c| c.coincidences() == 0).collect();

        let mut both = |field: &str, listed: usize, formula: Option<u128>, want: &Value| {
            report.same(name, field, &(listed as i64), &int(want));
            report.same(
                name,
                &format!("{field}, formula"),
                &formula,
                &Some(int(want) as u128),
            );
        };
        both(
            "points",
            all.len(),
            count::chords(octave, n),
            &row["points"],
        );
        both(
            "interior",
            inner.len(),
            count::interior(octave, n),
            &row["interior"],
        );
        both(
            "boundary",
            all.len() - inner.len(),
            count::boundary(octave, n),
            &row["boundary"],
        );
        for (layer, want) in (0..octave.size()).zip(row["by_layer"].as_array().unwrap()) {
            let listed = all.iter().filter(|c| c.layer() == layer).count();
            both("by_layer", listed, count::on_layer(octave, n, layer), want);
        }
        for (mirrors, want) in row["mirrors"].as_object().unwrap() {
            let mirrors: usize = mirrors.parse().unwrap();
            let listed = all.iter().filter(|c| c.coincidences() == mirrors).count();
            both(
                "mirrors",
                listed,
                count::on_mirrors(octave, n, mirrors as u64),
                want,
            );
        }
        let mut types =
            |field: &str, of: fn(&Chord) -> Vec<i32>, every: Option<u128>, inside: Option<u128>| {
                let listed = all.iter().map(of).collect::<BTreeSet<_>>().len();
                let listed_inside = inner.iter().map(|c| of(c)).collect::<BTreeSet<_>>().len();
                let row = &row[field];
                both(&format!("{field} all"), listed, every, &row["all"]);
                both(
                    &format!("{field} interior"),
                    listed_inside,
                    inside,
                    &row["interior"],
                );
                let outside = every.zip(inside).map(|(every, inside)| every - inside);
                both(
                    &format!("{field} boundary"),
                    listed - listed_inside,
                    outside,
                    &row["boundary"],
                );
            };
        types(
            "Tn_classes",
            Chord::transposition_type,
            count::transposition_types(octave, n),
            count::interior_transposition_types(octave, n),
        );
        types(
            "TnI_classes",
            Chord::inversion_type,
            count::inversion_types(octave, n),
            count::interior_inversion_types(octave, n),
        );
    }
    report.done();
}

#[test]
fn evenness() {
    let Some(values) = check_values() else { return };
    let mut report = Report::default();
    for row in rows(&values, "evenness") {
        let name = format!("evenness, {}", row["name"]);
        let chord = Chord::new(Octave::SEMITONES, smalls(&row["chord"]));
        let core = float(chord.core_distance_squared().unwrap());
        report.same(&name, "core_L2sq", &near(core, &row["core_L2sq"]), &true);
        let rough = (core - row["numeric_check"].as_f64().unwrap()).abs() < 1e-3;
        report.same(&name, "numeric check", &rough, &true);
        report.same(
            &name,
            "min_gap",
            &chord.smallest_gap(),
            &Some(int(&row["min_gap"])),
        );
    }
    report.done();
}
