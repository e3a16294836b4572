//! Whole scores: doublings, organs, and what is not written.

use partwright_analysis::Analysis;
use partwright_score::{Score, Texture};

use crate::read::*;

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
