//! The consonant fourth: over a held bass, reached by step on a weak moment and held into a strong
//! one, on which it is dissonant and then resolves (Jeppesen, from memory).

use super::{Figure, Place};
use crate::consonance;

pub(super) fn ask(place: &Place<'_>) -> Result<Figure, &'static str> {
    if !place.is_struck() {
        return Err("it was there before");
    }
    if !place.over_bass || !consonance::is_fourth(place.gap) {
        return Err("it is no fourth over the lowest voice");
    }
    if place.other().is_none_or(|note| note.onset >= place.at) {
        return Err("the lowest voice does not hold its note");
    }
    // It may have been sounded early.
    let before = if place.held_from().is_some() { -2 } else { -1 };
    if place.step(before).is_none_or(|into| into.steps.abs() != 1) {
        return Err("it is not reached by step");
    }
    if !place.is_syncopated() {
        return Err("it is not held into a stronger moment");
    }
    if place.out_of().is_none_or(|out| out.steps != -1) {
        return Err("it does not go down by step");
    }
    Ok(Figure::ConsonantFourth)
}
