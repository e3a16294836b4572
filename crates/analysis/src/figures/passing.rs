//! The passing note.

use partwright_space::Gap;

use super::{Figure, Place};

/// On a weak moment.
pub(super) fn unaccented(place: &Place<'_>) -> Result<Figure, &'static str> {
    passes(place)?;
    if !place.is_weak() {
        return Err("it does not stand on a weaker moment than its neighbours");
    }
    if place.is_syncopated() {
        return Err("it is held over a stronger moment");
    }
    Ok(Figure::Passing { accented: false })
}

/// On a strong one.
pub(super) fn accented(place: &Place<'_>) -> Result<Figure, &'static str> {
    if place.is_outlasted() {
        return Err("the other note goes on first");
    }
    passes(place)?;
    Ok(Figure::Passing { accented: true })
}

fn passes(place: &Place<'_>) -> Result<(), &'static str> {
    if !place.is_struck() {
        return Err("it was there before");
    }
    let into = place.into().ok_or("nothing leads to it")?;
    let out_of = place.out_of().ok_or("nothing follows it")?;
    // A note that passes through its own chromatic form has a whole step on one side.
    let by_step = |gap: Gap| gap.steps.abs() == 1;
    let reached = Place::way(into).ok_or("it is not reached by step")?;
    let left = Place::way(out_of).ok_or("it is not left by step")?;
    if !by_step(into) && !by_step(out_of) {
        return Err("it is not reached by step");
    }
    if reached != left {
        return Err("it turns back");
    }
    Ok(())
}
