//! The suspension and its rarer twin that rises.
//!
//! Preparation, dissonance, resolution: the note is there before, agreeing; another voice moves
//! against it on a stronger moment; it goes on by step on a weaker one. The resolution may be
//! decorated: a leap to an agreeing note and back, or the note of resolution early, once or with
//! its lower neighbour (Lehmann, A Treatise on Simple Counterpoint, lesson IX).

use partwright_score::{Note, Score, Texture, Time};
use partwright_space::Gap;

use super::place::agrees;
use super::{Dissonance, Figure, Place};

/// The parts of a suspension.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Held {
    /// When the note was struck.
    pub struck: Time,
    /// When it becomes dissonant.
    pub at: Time,
    /// When its voice leaves it.
    pub left: Time,
    /// When the note of resolution comes.
    pub resolved: Time,
    /// Scale steps and semitones of the dissonance, from the lower voice up.
    pub gap: Gap,
    /// A decorating note stands between.
    pub ornamented: bool,
}

impl Held {
    /// It is held for a shorter time as a preparation than as a dissonance.
    #[must_use]
    pub fn is_short(&self) -> bool {
        self.preparation() < self.left.min(self.resolved) - self.at
    }

    /// How long the preparation is, in whole notes.
    #[must_use]
    pub fn preparation(&self) -> Time {
        self.at - self.struck
    }
}

/// Downward.
pub(super) fn ask(place: &Place<'_>) -> Result<Figure, &'static str> {
    if place.is_relieved() {
        return Err("the other note goes on first, to one that agrees");
    }
    held(place, -1).map(Figure::Suspension)
}

/// Downward, although the other note goes on first: it is no ornament either.
pub(super) fn ask_relieved(place: &Place<'_>) -> Result<Figure, &'static str> {
    held(place, -1).map(Figure::Suspension)
}

/// Upward.
pub(super) fn ask_upward(place: &Place<'_>) -> Result<Figure, &'static str> {
    if place.is_relieved() {
        return Err("the other note goes on first, to one that agrees");
    }
    held(place, 1).map(Figure::Retardation)
}

/// What a held dissonance lacks to be a suspension.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Near {
    /// The held note was dissonant before.
    Preparation,
    /// It becomes dissonant on a weaker moment than it resolves.
    Position,
    /// It does not go down by step, or goes nowhere.
    Resolution,
}

/// Asks the held note of a dissonance against which the other one is struck what it lacks to be
/// a suspension, and names it; `None` where no note is held, or on a weak moment, where the struck
/// note is the one to explain.
#[must_use]
pub fn near_suspension(
    score: &Score,
    texture: &Texture,
    of: &Dissonance,
) -> Option<(Near, (usize, usize))> {
    let [first, second] = Place::both(score, texture, of);
    let new = |place: &Place<'_>| place.is_struck() && place.held_from().is_none();
    let (struck, kept) = match (new(&first), new(&second)) {
        (true, false) => (first, second),
        (false, true) => (second, first),
        _ => return None,
    };
    let from = kept.held_from()?;
    if struck.is_weak() || kept.is_outlasted() || kept.is_relieved() {
        return None;
    }
    let near = if !is_prepared(&kept, from) {
        Near::Preparation
    } else if resolution(&kept, -1).is_err() {
        Near::Resolution
    } else {
        Near::Position
    };
    Some((near, (kept.voice, kept.note)))
}

fn is_prepared(place: &Place<'_>, from: Time) -> bool {
    // A passing note under its end does not spoil a preparation.
    let before = place
        .sonority
        .checked_sub(1)
        .is_some_and(|k| agrees(place.texture, k, place.voice) != Some(false));
    before || place.agrees_at(from) != Some(false)
}

fn held(place: &Place<'_>, way: i32) -> Result<Held, &'static str> {
    let from = place.held_from().ok_or("it is struck, not held")?;
    if !is_prepared(place, from) {
        return Err("its preparation is dissonant");
    }
    let (resolved, ornamented) = resolution(place, way)?;
    // In groups of three the second and third beats are equally weak; elsewhere between equally
    // weak moments there is a stronger one.
    let levels = (place.score.level(place.at), place.score.level(resolved));
    if levels.0 > levels.1 || (levels.0 == levels.1 && place.is_stronger_before(resolved)) {
        return Err("it becomes dissonant on a weaker moment than it resolves");
    }
    Ok(Held {
        struck: from,
        at: place.at,
        left: place.held_to().unwrap_or(resolved),
        resolved,
        gap: place.gap,
        ornamented,
    })
}

/// When the note a step beside comes, and whether another note stands between.
fn resolution(place: &Place<'_>, way: i32) -> Result<(Time, bool), &'static str> {
    let from = place.this().and_then(|n| n.sound.pitch());
    // Struck again, it is still the held note.
    let last = place.repeats();
    let reaches = |by: isize| -> Option<(&Note, i32)> {
        let note = place.neighbour(by)?;
        let gap = from?.place().up_to(note.sound.pitch()?.place());
        Some((note, gap.steps))
    };
    match reaches(last + 1) {
        Some((note, steps)) if steps == way => return Ok((note.onset, false)),
        Some(_) => {}
        None => return Err("nothing follows it"),
    }
    // One decorating note, or two, that agree; then the resolution, which goes down.
    let decorations = if way < 0 { 2 } else { 0 };
    for by in (last + 2..).take(decorations) {
        let between = (last + 1..by).all(|b| {
            place.neighbour(b).is_some_and(|note| {
                place.agrees_at(note.onset) != Some(false)
                    && note.length <= place.at_most()
                    && place.score.level(note.onset) > place.score.level(place.at)
            })
        });
        if let (true, Some((note, steps))) = (between, reaches(by))
            && steps == way
        {
            return Ok((note.onset, true));
        }
    }
    Err(if way < 0 {
        "it does not go down by step"
    } else {
        "it does not go up by step"
    })
}

impl Place<'_> {
    /// The longest a decorating note may be: as long as the dissonance holds.
    fn at_most(&self) -> Time {
        self.held_to()
            .map_or_else(|| Time::from_integer(0), |end| end - self.at)
    }
}
