//! The anticipation: the next strong note, early.

use super::{Figure, Place};

pub(super) fn ask(place: &Place<'_>) -> Result<Figure, &'static str> {
    if !place.is_struck() {
        return Err("it was there before");
    }
    let into = place.into().ok_or("nothing leads to it")?;
    let out_of = place.out_of().ok_or("nothing follows it")?;
    if into.steps.abs() != 1 {
        return Err("it is not reached by step");
    }
    if out_of.steps != 0 || out_of.semitones != 0 {
        return Err("the same note does not follow");
    }
    if place.level(0) <= place.level(1) {
        return Err("the note that follows is no stronger");
    }
    Ok(Figure::Anticipation)
}
