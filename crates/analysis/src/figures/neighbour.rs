//! The neighbour: a step away and back.

use super::{Figure, Place};

/// On a weak moment.
pub(super) fn unaccented(place: &Place<'_>) -> Result<Figure, &'static str> {
    let upper = returns(place)?;
    if !place.is_weak() {
        return Err("it does not stand on a weaker moment than its neighbours");
    }
    if place.is_syncopated() {
        return Err("it is held over a stronger moment");
    }
    Ok(Figure::Neighbour {
        upper,
        accented: false,
    })
}

/// On a strong one.
pub(super) fn accented(place: &Place<'_>) -> Result<Figure, &'static str> {
    if place.is_outlasted() {
        return Err("the other note goes on first");
    }
    returns(place).map(|upper| Figure::Neighbour {
        upper,
        accented: true,
    })
}

/// Whether it is the upper neighbour.
fn returns(place: &Place<'_>) -> Result<bool, &'static str> {
    if !place.is_struck() {
        return Err("it was there before");
    }
    let into = place.into().ok_or("nothing leads to it")?;
    let out_of = place.out_of().ok_or("nothing follows it")?;
    if into.steps.abs() != 1 || out_of.steps.abs() != 1 {
        return Err("it is not reached and left by step");
    }
    // The main note may come back with another sign.
    if into.steps == out_of.steps {
        return Err("it does not return to the note before");
    }
    Ok(into.steps > 0)
}
