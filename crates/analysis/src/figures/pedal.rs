//! The pedal: the lowest voice holds its note through at least two bars, and agrees with the
//! others where it begins and where it ends.

use partwright_score::Time;

use super::place::agrees;
use super::{Figure, Place};

/// Under a half at least.
pub(super) fn under_long(place: &Place<'_>) -> Result<Figure, &'static str> {
    if place.other().is_none_or(|o| o.length < Time::new(1, 2)) {
        return Err("the note above it is an ornament");
    }
    ask(place)
}

pub(super) fn ask(place: &Place<'_>) -> Result<Figure, &'static str> {
    if !place.over_bass || place.texture.bass(place.sonority) != Some(place.voice) {
        return Err("it is not the lowest voice");
    }
    let this = place.this().ok_or("it is not the lowest voice")?;
    let bar = place
        .score
        .bar_at(this.onset)
        .and_then(|i| place.score.bars.get(i));
    if bar.is_none_or(|bar| this.length < bar.length + bar.length) {
        return Err("it is not held for two bars");
    }
    let first = place.texture.at(this.onset);
    let last = place
        .texture
        .sonorities()
        .partition_point(|s| s.onset < this.end())
        .checked_sub(1);
    let whole = |sonority: Option<usize>| {
        let Some(sonority) = sonority else {
            return false;
        };
        place
            .texture
            .sounding(sonority)
            .all(|v| agrees(place.texture, sonority, v) != Some(false))
    };
    if !whole(first) || !whole(last) {
        return Err("it does not agree with the others where it begins and ends");
    }
    Ok(Figure::Pedal)
}
