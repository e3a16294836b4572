//! What the check-value tests share: where the values are, and how to read them.
#![allow(
    dead_code,
    unreachable_pub,
    clippy::unwrap_used,
    clippy::panic,
    clippy::print_stderr
)]

use partwright_space::{Chord, Norm, Octave};
use serde_json::Value;
use std::path::PathBuf;

/// The check values, or `None` with a word where they are absent. Set `PARTWRIGHT_SHARED`, or
/// put the folder `shared` beside the repository.
pub fn check_values() -> Option<Value> {
    let folder = std::env::var_os("PARTWRIGHT_SHARED").map_or_else(
        || PathBuf::from(concat!(env!("CARGO_MANIFEST_DIR"), "/../../../shared")),
        PathBuf::from,
    );
    let path = folder.join("data/geometry-checkvalues.json");
    let Ok(text) = std::fs::read_to_string(&path) else {
        eprintln!("left out: no check values at {}", path.display());
        return None;
    };
    Some(serde_json::from_str(&text).unwrap())
}

/// The rows of a section; a missing or empty section is a failure.
pub fn rows<'a>(values: &'a Value, section: &str) -> &'a Vec<Value> {
    let rows = values[section]
        .as_array()
        .unwrap_or_else(|| panic!("no section {section}"));
    assert!(!rows.is_empty(), "{section} is empty");
    rows
}

pub fn int(value: &Value) -> i64 {
    value
        .as_i64()
        .unwrap_or_else(|| panic!("not a whole number: {value}"))
}

pub fn small(value: &Value) -> i32 {
    i32::try_from(int(value)).unwrap()
}

pub fn smalls(value: &Value) -> Vec<i32> {
    value.as_array().unwrap().iter().map(small).collect()
}

/// The three sizes under the names they have in the check values.
pub const NORMS: [(&str, Norm); 3] = [("L1", Norm::L1), ("L2", Norm::L2), ("Li", Norm::Linf)];

/// The octave of a row: twelve unless it says otherwise.
pub fn octave(row: &Value) -> Octave {
    let size = row.get("N").map_or(12, small);
    Octave::new(size).unwrap()
}

/// The two chords of a row.
pub fn chords(octave: Octave, row: &Value) -> (Chord, Chord) {
    let chord = |key: &str| Chord::new(octave, smalls(&row[key]));
    (chord("A"), chord("B"))
}

/// Collects what differs, so that one run names every wrong row.
#[derive(Default)]
pub struct Report {
    wrong: Vec<String>,
    compared: usize,
}

impl Report {
    pub fn same<T: PartialEq + std::fmt::Debug>(
        &mut self,
        row: &str,
        field: &str,
        got: &T,
        want: &T,
    ) {
        self.compared += 1;
        if got != want {
            self.wrong
                .push(format!("{row}: {field} is {got:?}, should be {want:?}"));
        }
    }

    pub fn done(self) {
        let Report { wrong, compared } = self;
        assert!(compared > 0, "nothing was compared");
        assert!(
            wrong.is_empty(),
            "{} of {compared} values differ\n{}",
            wrong.len(),
            wrong[..wrong.len().min(40)].join("\n")
        );
    }
}
