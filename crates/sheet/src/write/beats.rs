//! The cell each bar is told in.

use partwright_score::{Metre, Note, Time, ZERO};

use super::left::Left;
use super::measures::{Measure, Shape, own};
use super::music::{Music, during};

/// The most parts of a cell.
const MOST_PARTS: i64 = 64;

/// Chooses the cells of all bars; `of` tells whose metre each bar has in the score.
pub(super) fn choose(
    measures: &mut [Measure],
    of: &[usize],
    metres: &[Metre],
    music: &mut Music,
    left: &mut Left<'_>,
) {
    let long = |metre: &Metre| metre.unit() >= Time::new(1, 2);
    // A beat that the score states for one such metre is the beat of the others too.
    let stated = metres
        .iter()
        .filter(|metre| long(metre) && metre.cell() < metre.unit())
        .map(Metre::cell)
        .filter(|cell| *cell >= Time::new(1, 4));
    let beat = stated.max().unwrap_or_else(|| beat(measures, music));
    let usual = |metre: &Metre| {
        if long(metre) && metre.cell() == metre.unit() && !grouped(metre) {
            metre.unit().min(beat)
        } else {
            metre.cell()
        }
    };
    let usual: Vec<Time> = metres.iter().map(usual).collect();
    for (measure, of) in measures.iter_mut().zip(of) {
        let wished = usual.get(*of).copied().unwrap_or(ZERO);
        let mut cell = fitting(measure, wished, music);
        // The cells of a free metre are crotchets: finer ones need a metre with figures.
        if cell.is_none()
            && measure.shape == Shape::Free
            && let Some(metre) = own(measure.length(), &measure.metre)
        {
            measure.metre = metre;
            measure.shape = Shape::Full;
            cell = fitting(measure, wished, music);
        }
        let cell = cell.unwrap_or_else(|| settle(measure, wished, music, left));
        measure.metre = told_in(&measure.metre, cell);
    }
    // Halves of one bar are told in the same cells.
    for i in 1..measures.len() {
        if let Some([first, second]) = measures.get_mut(i - 1..=i)
            && second.shape == Shape::SecondHalf
        {
            let cell = shared(first.metre.cell(), second.metre.cell());
            first.metre = told_in(&first.metre, cell);
            second.metre = told_in(&second.metre, cell);
        }
    }
}

/// The beat in which metres of minims and longer are told: the semibreve, the minim or the
/// crotchet, the longest on which at least two notes in three begin.
fn beat(measures: &[Measure], music: &Music) -> Time {
    let mut counted = [1, 2, 4].map(|parts| (Time::new(1, parts), 0));
    let mut struck = 0;
    for measure in measures {
        for notes in &music.voices {
            let own = notes.get(during(notes, measure.from, measure.to));
            let begun = own
                .into_iter()
                .flatten()
                .filter(|note| note.sound.pitch().is_some() && note.onset >= measure.from);
            for note in begun {
                struck += 1;
                for (beat, on) in &mut counted {
                    let at = (note.onset - measure.from) / *beat;
                    *on += usize::from(at.is_integer());
                }
            }
        }
    }
    let enough = counted.iter().find(|(_, on)| on * 3 >= struck * 2);
    enough.map_or(Time::new(1, 4), |(beat, _)| *beat)
}

/// Whether the metre states its groups.
fn grouped(metre: &Metre) -> bool {
    figures(metre, metre.cell()).is_some_and(|plain| plain != *metre)
}

/// The same upper and lower figure told in that cell, without groups.
fn figures(metre: &Metre, cell: Time) -> Option<Metre> {
    let count = (metre.bar_length()? / metre.unit()).to_integer();
    let unit = u16::try_from(*metre.unit().denom()).ok()?;
    Metre::new(u16::try_from(count).ok()?, unit, Some(cell), &[]).ok()
}

/// The same metre told in another cell; groups are given up for one that is not the unit.
fn told_in(metre: &Metre, cell: Time) -> Metre {
    let other = figures(metre, cell).filter(|_| metre.cell() != cell);
    other.unwrap_or_else(|| metre.clone())
}

/// The cells that divide a bar and its metre: the one wished for, the metre's own, their halves,
/// quarters and so on.
fn candidates(measure: &Measure, wished: Time) -> impl Iterator<Item = Time> + use<> {
    let length = measure.length();
    let full = measure.metre.bar_length();
    let free = measure.metre.is_free();
    let own = measure.metre.cell();
    let unit = measure.metre.unit();
    [wished, unit].into_iter().flat_map(move |cell| {
        let cells = (0..=6).map(move |i| cell / (1_i64 << i));
        cells.filter(move |cell| {
            let divides = |time: Time| (time / *cell).is_integer();
            // The reader places cells on 64ths.
            *cell > ZERO
                && (*cell * 64).is_integer()
                && divides(length)
                && full.is_none_or(divides)
                && (!free || *cell == own)
        })
    })
}

/// The longest cell in which every voice can be told, beginning with the one wished for.
fn fitting(measure: &Measure, wished: Time, music: &Music) -> Option<Time> {
    candidates(measure, wished).find(|cell| {
        let mut voices = music.voices.iter();
        voices.all(|notes| crowded(notes, measure, *cell).is_empty())
    })
}

/// Cells, by index, that would need more parts than they may have.
fn crowded(notes: &[Note], measure: &Measure, cell: Time) -> Vec<i64> {
    let mut crowded = Vec::new();
    let mut now = (-1, 1);
    let own = notes.get(during(notes, measure.from, measure.to));
    for note in own.into_iter().flatten() {
        if note.onset <= measure.from {
            continue;
        }
        let at = (note.onset - measure.from) / cell;
        let index = at.to_integer();
        let parts = if now.0 == index { now.1 } else { 1 };
        let parts = common(parts, *at.denom());
        if parts > MOST_PARTS && crowded.last() != Some(&index) {
            crowded.push(index);
        }
        now = (index, parts.min(MOST_PARTS + 1));
    }
    crowded
}

/// The least number that both divide.
fn common(a: i64, b: i64) -> i64 {
    (a / divisor(a, b)).saturating_mul(b)
}

/// The greatest number that divides both.
fn divisor(a: i64, b: i64) -> i64 {
    let (mut x, mut y) = (a, b);
    while y != 0 {
        (x, y) = (y, x % y);
    }
    x.max(1)
}

/// The longest cell that divides two cells.
fn shared(a: Time, b: Time) -> Time {
    let fine = |cell: Time| (cell * 64).to_integer();
    Time::new(divisor(fine(a), fine(b)), 64)
}

/// The fewest parts into which a cell divides so that each of these notes begins on one.
pub(super) fn parts(notes: &[Note], from: Time, cell: Time) -> i64 {
    let inside = notes
        .iter()
        .filter(|note| note.onset > from && note.onset < from + cell);
    let parts = inside.fold(1, |parts, note| {
        common(parts, *((note.onset - from) / cell).denom())
    });
    parts.min(MOST_PARTS)
}

/// Where no cell will do, moments are moved to the nearest 64th of one.
fn settle(measure: &Measure, wished: Time, music: &mut Music, left: &mut Left<'_>) -> Time {
    let mut all = candidates(measure, wished);
    let cell = all.next().unwrap_or(Time::new(1, 64));
    for voice in 0..music.voices.len() {
        let notes = music.voices.get(voice).map_or(&[][..], Vec::as_slice);
        let crowded = crowded(notes, measure, cell);
        if crowded.is_empty() {
            continue;
        }
        let what = "Notes begin at moments that no division of a beat into 64 parts or fewer \
                    reaches: they are moved to the nearest";
        left.at(what, Some(voice), measure.from);
        let gone = music.move_onsets(voice, |onset| {
            let at = (onset - measure.from) / cell;
            let inside = onset > measure.from && onset < measure.to;
            if !inside || crowded.binary_search(&at.to_integer()).is_err() {
                return onset;
            }
            measure.from + cell * (at * MOST_PARTS).round() / MOST_PARTS
        });
        if gone > 0 {
            let what = "Notes shorter than that are left out";
            left.at(what, Some(voice), measure.from);
        }
    }
    cell
}
