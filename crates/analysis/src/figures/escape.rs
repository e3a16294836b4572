//! The escape note: a step away, a leap back over the main note.

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
    if out_of.steps.abs() < 2 || out_of.steps.signum() == into.steps.signum() {
        return Err("it does not leap the other way");
    }
    if !place.is_weak() {
        return Err("it does not stand on a weaker moment than its neighbours");
    }
    Ok(Figure::Escape)
}
