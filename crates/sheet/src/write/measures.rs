//! The bars as a sheet can say them: each under a metre that makes it as long as it is.

use partwright_score::{Metre, Score, Time, ZERO};

use super::beats;
use super::left::Left;
use super::music::Music;

/// A bar of the sheet.
#[derive(Clone, Debug)]
pub(super) struct Measure {
    /// Where it begins and ends, in 64ths of a whole note exactly.
    pub(super) from: Time,
    pub(super) to: Time,
    /// Its metre with the cell it is told in.
    pub(super) metre: Metre,
    /// A section ends with it.
    pub(super) closes: bool,
    /// Its metre is stated though it has not changed: the bar is no second half.
    pub(super) restated: bool,
    /// How it comes to its length.
    pub(super) shape: Shape,
}

/// How a bar comes to its length.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Shape {
    /// As long as its metre says.
    Full,
    /// In a free metre: as long as its rows.
    Free,
    /// Shorter: it begins a section.
    Pickup,
    /// Shorter: it ends one.
    Closing,
    /// The halves of a bar that the end of a section splits.
    FirstHalf,
    SecondHalf,
}

impl Measure {
    /// How long it is.
    pub(super) fn length(&self) -> Time {
        self.to - self.from
    }

    /// How many cells it has.
    pub(super) fn cells(&self) -> usize {
        usize::try_from((self.length() / self.metre.cell()).to_integer()).unwrap_or(0)
    }

    /// Whether its rows tell its length, so that each cell is written.
    pub(super) fn in_full(&self) -> bool {
        self.shape != Shape::Full
    }
}

/// A bar of the score before it is settled how it is written.
#[derive(Clone, Debug)]
struct Raw {
    from: Time,
    to: Time,
    lead: Time,
    /// Its metre, as an index.
    metre: usize,
    /// The number it has in the score; none where it is a piece of a bar.
    number: Option<u32>,
    closes: bool,
}

impl Raw {
    fn length(&self) -> Time {
        self.to - self.from
    }
}

/// The bars of a score from its beginning to the end of the music, which is made to last until the
/// last bar ends.
pub(super) fn measures(score: &Score, music: &mut Music, left: &mut Left<'_>) -> Vec<Measure> {
    let free = [Metre::free()];
    let metres: &[Metre] = if score.metres.is_empty() {
        &free
    } else {
        &score.metres
    };
    let raws = stated(score, metres, music.end);
    let raws = whole(joined(raws, metres), left);
    let raws = sayable(raws, metres, left);
    music.last_until(raws.last().map_or(ZERO, |raw| raw.to));
    let mut measures = shaped(&raws, metres);
    numbers(&raws, &measures, left);
    let of = raws.iter().map(|raw| raw.metre).collect::<Vec<_>>();
    beats::choose(&mut measures, &of, metres, music, left);
    measures
}

/// The bars as the score has them, without gaps, to the end of the music.
fn stated(score: &Score, metres: &[Metre], end: Time) -> Vec<Raw> {
    let mut raws: Vec<Raw> = Vec::with_capacity(score.bars.len());
    for bar in &score.bars {
        let from = bar.onset.max(ZERO);
        let raw = Raw {
            from,
            to: from + bar.length,
            lead: bar.lead,
            metre: (bar.metre as usize).min(metres.len() - 1),
            number: Some(bar.number),
            closes: bar.section_end,
        };
        match raws.last_mut() {
            // Every bar lasts until the next begins.
            Some(last) if last.from >= raw.from => continue,
            Some(last) => last.to = raw.from,
            None => {}
        }
        raws.push(raw);
    }
    if let Some(first) = raws.first_mut() {
        first.from = ZERO;
    }
    raws.retain(|raw| raw.to > raw.from);
    // Music beyond the last bar.
    let mut at = raws.last().map_or(ZERO, |raw| raw.to);
    let metre = raws.last().map_or(0, |raw| raw.metre);
    let full = metres.get(metre).and_then(Metre::bar_length);
    while at < end {
        // A free bar ends with a crotchet.
        let rest = ((end - at) * 4).ceil() / 4;
        let next = at + full.unwrap_or(rest);
        raws.push(Raw {
            from: at,
            to: next,
            lead: ZERO,
            metre,
            number: None,
            closes: false,
        });
        at = next;
    }
    raws
}

/// Joins the halves of bars that no end of a section splits: they are one bar.
fn joined(raws: Vec<Raw>, metres: &[Metre]) -> Vec<Raw> {
    let mut out: Vec<Raw> = Vec::with_capacity(raws.len());
    for raw in raws {
        let full = metres.get(raw.metre).and_then(Metre::bar_length);
        match out.last_mut() {
            Some(last)
                if !last.closes
                    && last.metre == raw.metre
                    && last.number == raw.number
                    && raw.lead == last.lead + last.length()
                    && full.is_some_and(|full| raw.lead + raw.length() <= full) =>
            {
                last.to = raw.to;
                last.closes = raw.closes;
            }
            _ => out.push(raw),
        }
    }
    out
}

/// Bars begin on 64ths of a whole note: other bar lines are left out.
fn whole(raws: Vec<Raw>, left: &mut Left<'_>) -> Vec<Raw> {
    let mut out: Vec<Raw> = Vec::with_capacity(raws.len());
    let mut open = false;
    for raw in raws {
        match out.last_mut() {
            Some(last) if open => {
                last.to = raw.to;
                last.closes = raw.closes;
                left.at("Bar lines between beats are left out", None, raw.from);
            }
            _ => out.push(raw),
        }
        open = out.last().is_some_and(|r| !(r.to * 64).is_integer());
    }
    if let Some(last) = out.last_mut().filter(|_| open) {
        left.at("Silence fills the last beat", None, last.from);
        last.to = (last.to * 64).ceil() / 64;
    }
    out
}

/// Cuts bars that are too long for any metre.
fn sayable(raws: Vec<Raw>, metres: &[Metre], left: &mut Left<'_>) -> Vec<Raw> {
    let mut out = Vec::with_capacity(raws.len());
    for mut raw in raws {
        let Some(metre) = metres.get(raw.metre) else {
            continue;
        };
        let free = |raw: &Raw| metre.is_free() && (raw.length() * 4).is_integer();
        while raw.to > raw.from && !free(&raw) && own(raw.length(), metre).is_none() {
            left.at(
                "Bars too long for a metre have more bar lines",
                None,
                raw.from,
            );
            let piece = raw.length().floor().min(Time::from_integer(64));
            let cut = raw.from + piece.max(Time::new(1, 64));
            out.push(Raw {
                to: cut,
                closes: false,
                ..raw.clone()
            });
            raw = Raw {
                from: cut,
                lead: ZERO,
                number: None,
                ..raw
            };
        }
        if raw.to > raw.from {
            out.push(raw);
        }
    }
    out
}

/// The metre of a bar of that length which is nearest to another metre, if there is one.
pub(super) fn own(length: Time, near: &Metre) -> Option<Metre> {
    let unit = *near.unit().denom();
    let finer = (0..7)
        .map(|i| unit << i)
        .take_while(|unit: &i64| *unit <= 64);
    let longer = (1..7)
        .map(|i| unit >> i)
        .take_while(|unit: &i64| *unit >= 1);
    finer.chain(longer).find_map(|unit| {
        let count = length * unit;
        if !count.is_integer() {
            return None;
        }
        let count = u16::try_from(count.to_integer()).ok()?;
        Metre::new(count, u16::try_from(unit).ok()?, None, &[]).ok()
    })
}

/// How each bar comes to its length: as the reader of sheets will take it.
fn shaped(raws: &[Raw], metres: &[Metre]) -> Vec<Measure> {
    let free = Metre::free();
    let mut out: Vec<Measure> = Vec::with_capacity(raws.len());
    for (i, raw) in raws.iter().enumerate() {
        let base = metres.get(raw.metre).unwrap_or(&free);
        let before = i.checked_sub(1).and_then(|i| raws.get(i));
        let shape_before = out.last().map(|measure| measure.shape);
        let shape = shape(raw, before, shape_before, raws.get(i + 1), base);
        let metre = match shape {
            Some(_) => base.clone(),
            None => own(raw.length(), base).unwrap_or_else(|| base.clone()),
        };
        let shape = shape.unwrap_or(Shape::Full);
        // Two short bars about the end of a section that make a full one are its halves, unless
        // something is stated between.
        let short = |shape| matches!(shape, Shape::Pickup | Shape::Closing | Shape::FirstHalf);
        let restated = short(shape)
            && before.zip(shape_before).is_some_and(|(before, shape)| {
                short(shape)
                    && shape != Shape::FirstHalf
                    && before.closes
                    && Some(before.length() + raw.length()) == base.bar_length()
            });
        out.push(Measure {
            from: raw.from,
            to: raw.to,
            metre,
            closes: raw.closes,
            restated,
            shape,
        });
    }
    out
}

/// How a bar comes to its length under its metre, or nothing if it needs one of its own.
fn shape(
    raw: &Raw,
    before: Option<&Raw>,
    shape_before: Option<Shape>,
    next: Option<&Raw>,
    metre: &Metre,
) -> Option<Shape> {
    let length = raw.length();
    let Some(full) = metre.bar_length() else {
        return (length * 4).is_integer().then_some(Shape::Free);
    };
    if length == full {
        return Some(Shape::Full);
    }
    if length > full {
        return None;
    }
    if shape_before == Some(Shape::FirstHalf) {
        return Some(Shape::SecondHalf);
    }
    let begins = before.is_none_or(|before| before.closes);
    let half = |next: &&Raw| {
        raw.lead == ZERO
            && next.lead == length
            && next.number == raw.number
            && next.metre == raw.metre
            && length + next.length() == full
    };
    if raw.closes && next.is_some_and(|next| half(&next)) {
        return Some(Shape::FirstHalf);
    }
    if begins && next.is_some() {
        return (raw.lead == full - length).then_some(Shape::Pickup);
    }
    let last = raw.closes || next.is_none();
    (last && raw.lead == ZERO).then_some(Shape::Closing)
}

/// Tells where the bars are counted otherwise than in the score.
fn numbers(raws: &[Raw], measures: &[Measure], left: &mut Left<'_>) {
    let mut number = 0;
    for (i, (raw, measure)) in raws.iter().zip(measures).enumerate() {
        let counts = match measure.shape {
            Shape::Pickup => i > 0,
            Shape::SecondHalf => false,
            _ => true,
        };
        number += u32::from(counts);
        if let Some(was) = raw.number.filter(|was| *was != number) {
            left.tell(format!(
                "Bars are numbered as a conductor counts them, a pickup as 0: bar {was} is bar \
                 {number} here."
            ));
            return;
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_bar_of_odd_length_has_a_metre_of_its_own() {
        let metre = |count, unit| Metre::new(count, unit, None, &[]).unwrap();
        for (length, near, expected) in [
            ((5, 4), metre(4, 4), Some("5/4")),
            ((9, 8), metre(4, 4), Some("9/8")),
            ((11, 4), metre(2, 1), Some("11/4")),
            ((3, 1), metre(2, 1), Some("3/1")),
            ((3, 8), metre(6, 8), Some("3/8")),
            ((1, 4), metre(6, 8), Some("2/8")),
            ((40, 1), metre(4, 4), Some("80/2")),
            ((1, 64), metre(4, 4), Some("1/64")),
            ((401, 64), metre(4, 4), None),
            ((1, 3), metre(4, 4), None),
        ] {
            let found = own(Time::new(length.0, length.1), &near);
            let found = found.map(|metre| metre.to_string());
            assert_eq!(found.as_deref(), expected, "{length:?}");
        }
    }
}
