//! The demo scores: each states its expected findings in place, and is held to them.

#![allow(clippy::unwrap_used, clippy::panic, clippy::print_stdout)]

use std::fs;
use std::path::PathBuf;

use partwright_check::{Checked, Wishes, unlike_drawn};

#[test]
fn demo_scores_give_what_they_state() {
    let folder = PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("demo-scores");
    let mut paths: Vec<PathBuf> = fs::read_dir(folder)
        .unwrap()
        .map(|e| e.unwrap().path())
        .collect();
    paths.sort();
    assert!(paths.len() >= 5);
    let mut wrong = Vec::new();
    for path in paths {
        let text = fs::read_to_string(&path).unwrap();
        let checked = Checked::text(&text, &Wishes::default());
        let name = path.file_name().unwrap().to_string_lossy().into_owned();
        assert!(checked.reading.score.voices.len() >= 2, "{name} has voices");
        for difference in unlike_drawn(&text, &checked, None) {
            wrong.push(format!("{name}: {difference}"));
        }
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}
