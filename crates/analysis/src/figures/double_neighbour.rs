//! The double neighbour: both notes beside the main note, one after the other, before it returns.

use super::{Figure, Place};

pub(super) fn ask(place: &Place<'_>) -> Result<Figure, &'static str> {
    if !place.is_struck() {
        return Err("it was there before");
    }
    // The dissonant note is the first or the second of the two.
    let turns = |first: isize| {
        let moves = [first - 1, first, first + 1].map(|from| place.step(from));
        let [Some(away), Some(across), Some(back)] = moves else {
            return false;
        };
        away.steps.abs() == 1 && across.steps == -2 * away.steps && back.steps == away.steps
    };
    let Some(first) = [0, -1].into_iter().find(|&first| turns(first)) else {
        return Err("the line does not go round a note and back to it");
    };
    // A longer second note is no ornament: the first was left by leap.
    let length = |by| place.neighbour(by).map(|note| note.length);
    if length(first) != length(first + 1) {
        return Err("the two notes are not equally long");
    }
    // The second of the two may be stronger than the first, never than the main note.
    if place.level(first) <= place.level(first - 1) || place.level(0) <= place.level(first - 1) {
        return Err("it stands on a strong moment");
    }
    Ok(Figure::DoubleNeighbour)
}
