//! One voice's bar as cells.

use partwright_score::{Note, Pitch, Sound, Time};

use super::beats::parts;
use super::measures::Measure;
use super::music::during;

/// The last pitch written on a row: its octave figure carries on.
#[derive(Clone, Copy, Debug, Default)]
pub(super) struct Carried(Option<Pitch>);

/// The cells of a bar: one for a bar that is silent, held or unwritten throughout, unless the rows
/// tell the bar's length.
pub(super) fn cells(notes: &[Note], measure: &Measure, carried: &mut Carried) -> Vec<String> {
    let own = notes.get(during(notes, measure.from, measure.to));
    let own = own.unwrap_or_default();
    if let [only] = own
        && !measure.in_full()
        && let Some(whole) = throughout(only, measure)
    {
        return vec![whole.to_owned()];
    }
    let cell = measure.metre.cell();
    (0..measure.cells())
        .map(|index| {
            let from = measure.from + cell * i64::try_from(index).unwrap_or(0);
            let own = own.get(during(own, from, from + cell)).unwrap_or_default();
            one(own, from, cell, carried)
        })
        .collect()
}

/// The one part that says a whole bar.
fn throughout(note: &Note, measure: &Measure) -> Option<&'static str> {
    let begins = note.onset >= measure.from;
    let marked = (begins && note.fermata) || (note.breath && note.end() <= measure.to);
    if marked || note.end() < measure.to || note.onset > measure.from {
        return None;
    }
    match note.sound {
        Sound::Pitch(_) => (!begins).then_some("-"),
        other => Some(lasting(other)),
    }
}

/// The part that goes on.
fn lasting(sound: Sound) -> &'static str {
    match sound {
        Sound::Pitch(_) => "-",
        Sound::Rest => "_",
        Sound::Unwritten | Sound::Spoilt => "?",
    }
}

fn one(notes: &[Note], from: Time, cell: Time, carried: &mut Carried) -> String {
    let count = parts(notes, from, cell);
    let mut out = String::new();
    let mut index = 0;
    for part in 0..count {
        let at = from + cell * part / count;
        let next = from + cell * (part + 1) / count;
        if part > 0 {
            out.push('.');
        }
        while notes.get(index + 1).is_some_and(|note| note.onset <= at) {
            index += 1;
        }
        let Some(note) = notes.get(index) else {
            out.push('_');
            continue;
        };
        match note.sound {
            Sound::Pitch(pitch) if note.onset == at => out.push_str(&struck(pitch, carried)),
            other => out.push_str(lasting(other)),
        }
        if note.fermata && note.onset == at {
            out.push('^');
        }
        if note.breath && note.end() > at && note.end() <= next {
            out.push(',');
        }
    }
    out
}

/// A note with its octave figure where it does not carry, or where carrying it would make a sixth
/// or a seventh.
fn struck(pitch: Pitch, carried: &mut Carried) -> String {
    let carries = carried
        .0
        .is_some_and(|last| last.octave() == pitch.octave() && (last.step - pitch.step).abs() < 5);
    carried.0 = Some(pitch);
    if carries {
        pitch.class_name()
    } else {
        pitch.to_string()
    }
}
