//! What it costs to leave a note out of the chord.

use partwright_score::{Note, Pitch};

use super::slices::Cost;
use crate::figures::Figure;
use crate::mode::fifths;

/// What it costs to leave a note out, in hundredths of its length, and what it then stands for.
/// A dissonance is read as one note's figure; here the other may be the one that moves, so `clash`
/// tells whether there is one, and whether the note is held into it.
/// Tuned on half of the chorales that have been analysed; the other half agrees as well.
pub(super) fn aside(
    figure: Option<Figure>,
    clash: Option<bool>,
    around: Option<Around<'_>>,
) -> (Cost, Option<i32>) {
    let resolution = around.and_then(Around::next_by_step);
    match figure {
        Some(Figure::Anticipation) => return (80, None),
        Some(Figure::Pedal) => return (100, None),
        Some(Figure::Passing { accented: false }) => return (120, None),
        Some(Figure::Neighbour {
            accented: false, ..
        }) => return (200, None),
        Some(Figure::Passing { accented: true }) => return (250, resolution),
        Some(Figure::Suspension(_) | Figure::Retardation(_)) => return (130, resolution),
        Some(_) => return (200, resolution),
        None => {}
    }
    match (around, clash) {
        (Some(around), _) if around.passes() => (220, None),
        (Some(around), _) if around.is_struck_again() && around.falls() => (150, resolution),
        (Some(around), Some(true)) if around.falls() => (150, resolution),
        (Some(around), Some(_)) if around.is_brief_between_steps() => (200, resolution),
        (Some(around), None) if around.is_brief_between_steps() => (400, resolution),
        _ => (600, None),
    }
}

/// A note between its neighbours in its voice.
#[derive(Clone, Copy)]
pub(super) struct Around<'a> {
    /// It stands on a weaker moment than the note before.
    is_weaker: bool,
    before: Option<(&'a Note, Pitch)>,
    pub here: &'a Note,
    pitch: Pitch,
    after: Option<Pitch>,
}

impl<'a> Around<'a> {
    pub(super) fn of(notes: &'a [Note], note: usize, is_weaker: bool) -> Option<Around<'a>> {
        let here = notes.get(note)?;
        let before = note.checked_sub(1).and_then(|i| notes.get(i));
        Some(Around {
            is_weaker,
            before: before.and_then(|note| Some((note, note.sound.pitch()?))),
            here,
            pitch: here.sound.pitch()?,
            after: notes.get(note + 1).and_then(|note| note.sound.pitch()),
        })
    }

    /// Where the next note lies, if that is a step away.
    fn next_by_step(self) -> Option<i32> {
        self.after
            .filter(|after| (after.step - self.pitch.step).abs() == 1)
            .map(fifths)
    }

    /// The note before, where this one is reached and left by step.
    fn between_steps(self) -> Option<&'a Note> {
        let (note, before) = self.before?;
        self.next_by_step()?;
        ((before.step - self.pitch.step).abs() == 1).then_some(note)
    }

    /// Reached and left by step on a moment weaker than that of the note before.
    fn passes(self) -> bool {
        self.is_weaker && self.between_steps().is_some()
    }

    /// Prepared on its own pitch, as a suspension struck again is.
    fn is_struck_again(self) -> bool {
        self.before
            .is_some_and(|(_, before)| before.step == self.pitch.step)
    }

    /// The next note is a step lower.
    fn falls(self) -> bool {
        self.after
            .is_some_and(|after| after.step - self.pitch.step == -1)
    }

    /// Reached and left by step, and no longer than the note before.
    fn is_brief_between_steps(self) -> bool {
        self.between_steps()
            .is_some_and(|before| self.here.length <= before.length)
    }
}
