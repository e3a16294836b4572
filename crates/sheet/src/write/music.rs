//! The voices, each without gaps and overlaps from the beginning to the end.

use std::borrow::Cow;
use std::ops::Range;

use partwright_score::{Bar, Change, Key, MOST_VOICES, Note, Score, Sound, Time, ZERO};

use super::left::Left;

/// The finest division of a whole note that is told apart, and the longest score in whole notes:
/// far beyond any music, and small enough that sums of moments stay exact.
const FINEST: i64 = 1 << 20;
const LONGEST: i64 = 1 << 13;

/// What every voice does, and where the last ends.
pub(super) struct Music {
    pub(super) voices: Vec<Vec<Note>>,
    pub(super) end: Time,
}

/// A moment that can be reckoned with.
pub(super) fn tame(time: Time) -> Time {
    let (n, d) = (*time.numer(), *time.denom());
    if d <= 0 {
        return ZERO;
    }
    let most = i128::from(d) * i128::from(LONGEST);
    if d <= FINEST && i128::from(n).abs() <= most {
        // Sums and comparisons want lowest terms.
        return Time::new(n, d);
    }
    let fine = i128::from(n) * i128::from(FINEST) / i128::from(d);
    let most = LONGEST * FINEST;
    let fine = i64::try_from(fine).unwrap_or(if n < 0 { -most } else { most });
    Time::new(fine.clamp(-most, most), FINEST)
}

/// A score whose moments can all be reckoned with: nearly always the same.
pub(super) fn tamed(score: &Score) -> Cow<'_, Score> {
    let bad = |time: Time| {
        let tame = tame(time);
        (tame.numer(), tame.denom()) != (time.numer(), time.denom())
    };
    let bars = |bar: &Bar| bad(bar.onset) || bad(bar.length) || bad(bar.lead);
    let notes = |note: &Note| bad(note.onset) || bad(note.length);
    let all = score.voices.iter().flat_map(|voice| &voice.notes);
    let keys = |key: &Change<Key>| bad(key.from);
    if !score.bars.iter().any(bars) && !all.into_iter().any(notes) && !score.keys.iter().any(keys) {
        return Cow::Borrowed(score);
    }
    let mut score = score.clone();
    for bar in &mut score.bars {
        bar.onset = tame(bar.onset);
        bar.length = tame(bar.length);
        bar.lead = tame(bar.lead);
    }
    for note in score.voices.iter_mut().flat_map(|v| &mut v.notes) {
        note.onset = tame(note.onset);
        note.length = tame(note.length);
    }
    for key in &mut score.keys {
        key.from = tame(key.from);
    }
    Cow::Owned(score)
}

/// The voices that a sheet has room for.
pub(super) fn music(score: &Score, left: &mut Left<'_>) -> Music {
    let mut voices = Vec::new();
    let mut end = score.end().max(ZERO);
    for (voice, declared) in score.voices.iter().take(MOST_VOICES).enumerate() {
        let notes = line(voice, &declared.notes, left);
        end = notes.last().map_or(end, |note| note.end().max(end));
        voices.push(notes);
    }
    let mut music = Music { voices, end };
    music.last_until(end);
    music
}

/// One voice from the beginning on.
fn line(voice: usize, notes: &[Note], left: &mut Left<'_>) -> Vec<Note> {
    let mut out: Vec<Note> = Vec::with_capacity(notes.len());
    let mut at = ZERO;
    for given in notes {
        let mut note = Note {
            onset: given.onset.max(at),
            ..*given
        };
        note.length = given.end() - note.onset;
        if note.length <= ZERO {
            let what = "Notes without a length, or sounding while the voice sounds another, are \
                        left out";
            left.at(what, Some(voice), given.onset);
            continue;
        }
        if given.onset < at {
            let what = "A voice sounds one note at a time: notes begin where the one before ends";
            left.at(what, Some(voice), given.onset);
        }
        sayable(voice, &mut note, left);
        if note.onset > at {
            push(&mut out, Note::new(at, note.onset - at, Sound::Rest));
        }
        at = note.end();
        push(&mut out, note);
    }
    out
}

/// Leaves behind what a part cannot say.
fn sayable(voice: usize, note: &mut Note, left: &mut Left<'_>) {
    if let Sound::Pitch(pitch) = note.sound {
        if !(0..70).contains(&pitch.step) {
            let what = "Notes outside the octaves 0 to 9 are left to be written";
            left.at(what, Some(voice), note.onset);
            note.sound = Sound::Unwritten;
        } else if !(-2..=2).contains(&pitch.sign) {
            let what = "Notes with more than two signs are left to be written";
            left.at(what, Some(voice), note.onset);
            note.sound = Sound::Unwritten;
        }
    }
    if note.sound == Sound::Spoilt {
        let what = "What could not be read is left to be written";
        left.at(what, Some(voice), note.onset);
        note.sound = Sound::Unwritten;
    }
    if note.sound == Sound::Unwritten && (note.fermata || note.breath) {
        let what = "Fermatas and breaths need something written";
        left.at(what, Some(voice), note.onset);
        (note.fermata, note.breath) = (false, false);
    }
    if note.copies.is_some() && note.sound.pitch().is_some() {
        let what = "Bars copied from another voice are written out, and the two voices are two \
                    for every rule";
        left.at(what, Some(voice), note.onset);
    }
    note.copies = None;
}

/// Adds a note; silence after silence is one, unless a mark stands between.
fn push(notes: &mut Vec<Note>, note: Note) {
    match notes.last_mut() {
        Some(last)
            if last.sound == note.sound
                && note.sound.pitch().is_none()
                && !last.breath
                && !note.fermata =>
        {
            last.length += note.length;
            last.breath = note.breath;
        }
        _ => notes.push(note),
    }
}

impl Music {
    /// Voices that end sooner are silent to the end.
    pub(super) fn last_until(&mut self, end: Time) {
        self.end = end;
        for notes in &mut self.voices {
            let at = notes.last().map_or(ZERO, Note::end);
            if at < end {
                push(notes, Note::new(at, end - at, Sound::Rest));
            }
        }
    }

    /// Moves the moments at which the notes of a voice begin; notes left without a length go.
    pub(super) fn move_onsets(&mut self, voice: usize, mut to: impl FnMut(Time) -> Time) -> usize {
        let Some(notes) = self.voices.get_mut(voice) else {
            return 0;
        };
        let before = notes.len();
        let end = notes.last().map_or(ZERO, Note::end);
        for note in notes.iter_mut() {
            note.onset = to(note.onset);
        }
        let mut next = end;
        for note in notes.iter_mut().rev() {
            note.length = next - note.onset;
            next = note.onset;
        }
        notes.retain(|note| note.length > ZERO);
        before - notes.len()
    }
}

/// The notes that sound in a stretch of time, by index.
pub(super) fn during(notes: &[Note], from: Time, to: Time) -> Range<usize> {
    let first = notes.partition_point(|note| note.end() <= from);
    let after = notes.partition_point(|note| note.onset < to);
    first..after.max(first)
}
