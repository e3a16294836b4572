//! The consonant fourth: over a held bass, reached by step on a weak moment and held into a strong
//! one, on which it is dissonant and then resolves (Jeppesen, from memory).

use partwright_score::Time;

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
    let this = place.this().ok_or("it was there before")?;
    // Where nothing is struck on the strong moment, it halves the note or begins a bar.
    let here = place.score.level(place.at);
    let is_stronger = |at: Time| at > place.at && at < this.end() && place.score.level(at) < here;
    let later = place.texture.sonorities().get(place.sonority + 1..);
    let struck = later.unwrap_or_default().iter().map(|s| s.onset);
    let bars = place.score.bars.iter().map(|bar| bar.onset);
    let held_into_stronger = is_stronger(place.at + this.length / 2)
        || struck.take_while(|&at| at < this.end()).any(is_stronger)
        || bars
            .skip_while(|&at| at <= place.at)
            .take(1)
            .any(is_stronger);
    if !held_into_stronger {
        return Err("it is not held into a stronger moment");
    }
    if place.out_of().is_none_or(|out| out.steps != -1) {
        return Err("it does not go down by step");
    }
    Ok(Figure::ConsonantFourth)
}
