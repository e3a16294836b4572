//! A diminished fifth over the lowest voice that closes to a third.

use super::place::over;
use super::{Figure, Place};
use crate::consonance;

/// Both notes are struck together.
pub(super) fn together(place: &Place<'_>) -> Result<Figure, &'static str> {
    if !place.is_struck() || place.other().is_none_or(|note| note.onset != place.at) {
        return Err("the two notes are not struck together");
    }
    ask(place)
}

/// Either of them.
pub(super) fn ask(place: &Place<'_>) -> Result<Figure, &'static str> {
    if !place.over_bass || !consonance::is_diminished_fifth(place.gap) {
        return Err("it is no diminished fifth over the lowest voice");
    }
    // The two may close one after the other: what counts is the next sonority in which neither
    // of the two notes sounds any more.
    let (voice, against) = (place.voice, place.against);
    let here = |k: usize| (place.texture.note(k, voice), place.texture.note(k, against));
    let (a, b) = here(place.sonority);
    let next = (place.sonority + 1..place.texture.sonorities().len()).find(|&k| {
        let (x, y) = here(k);
        x != a && y != b
    });
    let closes = next.is_some_and(|k| {
        let now = over(place.texture, k, voice, against);
        let was = over(place.texture, place.sonority, voice, against);
        matches!((was, now), (Some(was), Some(now)) if now.steps.abs() + 2 == was.steps.abs())
    });
    if !closes {
        return Err("it does not close to a third");
    }
    Ok(Figure::DiminishedFifth)
}
