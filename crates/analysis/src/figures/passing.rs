//! The passing note.

use super::{Figure, Place};

/// On a weak moment.
pub(super) fn unaccented(place: &Place<'_>) -> Result<Figure, &'static str> {
    passes(place)?;
    if !place.is_weak() {
        return Err("it does not stand on a weaker moment than its neighbours");
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
    if into.steps.abs() != 1 {
        return Err("it is not reached by step");
    }
    if out_of.steps.abs() != 1 {
        return Err("it is not left by step");
    }
    if into.steps != out_of.steps {
        return Err("it turns back");
    }
    Ok(())
}
