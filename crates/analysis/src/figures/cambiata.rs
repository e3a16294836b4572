//! The cambiata: left by a third in the direction of the step before, then turned back by step.
//!
//! J. J. Fux, Gradus ad Parnassum (1725), Book II, third species: figures 55, 56 and 87.

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
    if out_of.steps != 2 * into.steps {
        return Err("it does not leap a third onward");
    }
    if !place.is_weak() {
        return Err("it does not stand on a weaker moment than its neighbours");
    }
    let back = |from| place.step(from).is_some_and(|g| g.steps == -into.steps);
    if !back(1) {
        return Err("the line does not turn back by step after the third");
    }
    if place
        .neighbour(1)
        .is_some_and(|n| place.agrees_at(n.onset) == Some(false))
    {
        return Err("the note after the third is dissonant");
    }
    Ok(Figure::Cambiata {
        rising: into.steps > 0,
        whole: back(2),
    })
}
