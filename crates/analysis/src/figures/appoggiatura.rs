//! The appoggiatura: a leap to a strong dissonance, left by step.

use super::{Figure, Place};

pub(super) fn ask(place: &Place<'_>) -> Result<Figure, &'static str> {
    if !place.is_struck() {
        return Err("it was there before");
    }
    let out_of = place.out_of().ok_or("nothing follows it")?;
    if place.into().is_none_or(|into| into.steps.abs() < 2) {
        return Err("it is not reached by leap");
    }
    if out_of.steps.abs() != 1 {
        return Err("it is not left by step");
    }
    if place.is_weak() {
        return Err("it stands on a weak moment");
    }
    if place.is_outlasted() {
        return Err("the other note goes on first");
    }
    Ok(Figure::Appoggiatura)
}
