//! Computing the table.

use partwright_space::{Leg, Place};

use super::{NO_BASS, Pair, PairStep, Sonority, Texture};
use crate::{Note, Score, Sound, Time};

/// A voice while the table is swept from left to right.
struct Cursor<'a> {
    notes: &'a [Note],
    /// The note sounding, and the one before it while this sonority is being entered.
    index: usize,
    /// The place sounded at this sonority and at the one before.
    now: Option<Place>,
    was: Option<Place>,
    /// The note left at this moment ended its phrase.
    phrase_ended: bool,
    /// The voice copied by the note sounding now or just before.
    copies: [Option<u8>; 2],
}

impl Cursor<'_> {
    fn next_onset(&self) -> Option<Time> {
        self.notes.get(self.index + 1).map(|note| note.onset)
    }

    fn note(&self) -> Option<&Note> {
        self.notes.get(self.index)
    }

    fn enter(&mut self, first: bool, onset: Time) {
        self.was = self.now;
        self.phrase_ended = false;
        self.copies[1] = self.copies[0];
        if first || self.next_onset() == Some(onset) {
            if !first {
                self.phrase_ended = self.note().is_some_and(Note::ends_phrase);
                self.index += 1;
            }
            let note = self.note().copied();
            self.now = note.and_then(|n| n.sound.pitch()).map(|p| p.place());
            self.copies[0] = note.and_then(|n| n.copies);
        }
    }
}

pub(super) fn texture(score: &Score) -> Texture {
    let voices = score.voices.len();
    let pairs: Vec<Pair> = (0..voices)
        .flat_map(|upper| (upper + 1..voices).map(move |lower| Pair { upper, lower }))
        .collect();
    let leaders: Vec<usize> = (0..voices).map(|v| score.leader(v)).collect();
    let mut table = Texture {
        pairs,
        voices,
        ..Texture::default()
    };
    let mut cursors: Vec<Cursor<'_>> = score
        .voices
        .iter()
        .map(|voice| Cursor {
            notes: &voice.notes,
            index: 0,
            now: None,
            was: None,
            phrase_ended: false,
            copies: [None, None],
        })
        .collect();
    let mut next = score
        .voices
        .iter()
        .filter_map(|v| v.notes.first())
        .map(|n| n.onset)
        .min();
    let mut bar = 0;
    while let Some(onset) = next {
        let first = table.sonorities.is_empty();
        for cursor in &mut cursors {
            cursor.enter(first, onset);
        }
        let arrived = sonority(score, &cursors, onset, &mut bar);
        push(&mut table, arrived, &cursors, &leaders);
        next = cursors.iter().filter_map(Cursor::next_onset).min();
    }
    table
}

fn sonority(score: &Score, cursors: &[Cursor<'_>], onset: Time, bar: &mut usize) -> Sonority {
    while score
        .bars
        .get(*bar + 1)
        .is_some_and(|next| next.onset <= onset)
    {
        *bar += 1;
    }
    let (mut struck, mut sounding, mut unknown) = (0, 0, 0);
    for (v, cursor) in cursors.iter().enumerate() {
        match cursor.note() {
            Some(note) if note.sound.is_unknown() => unknown |= 1 << v,
            Some(note) if matches!(note.sound, Sound::Pitch(_)) => {
                sounding |= 1 << v;
                if note.onset == onset {
                    struck |= 1 << v;
                }
            }
            _ => {}
        }
    }
    let this = score.bars.get(*bar);
    let level = this.and_then(|b| {
        let metre = score.metres.get(b.metre as usize)?;
        Some(metre.level_at(b.lead, b.onset, onset))
    });
    let before = bar.checked_sub(1).and_then(|i| score.bars.get(i));
    Sonority {
        onset,
        bar: u32::try_from(*bar).unwrap_or(u32::MAX),
        level: level.unwrap_or(0),
        struck,
        sounding,
        unknown,
        new_section: before.is_some_and(|b| b.section_end)
            && this.is_some_and(|b| b.onset == onset),
        parts: 0,
        followers: 0,
        bass: bass(score, cursors, unknown),
    }
}

/// The voice with the lowest note, a sixteen-foot voice an octave down.
fn bass(score: &Score, cursors: &[Cursor<'_>], unknown: u64) -> u8 {
    if unknown != 0 {
        return NO_BASS;
    }
    let mut lowest: Option<(i32, usize)> = None;
    for (v, cursor) in cursors.iter().enumerate() {
        let Some(place) = cursor.now else { continue };
        let sixteen_foot = score.voices.get(v).is_some_and(|voice| voice.sixteen_foot);
        let semitone = place.semitone - if sixteen_foot { 12 } else { 0 };
        // Of two on one pitch the lower in the score counts.
        if lowest.is_none_or(|(low, _)| semitone <= low) {
            lowest = Some((semitone, v));
        }
    }
    lowest
        .and_then(|(_, v)| u8::try_from(v).ok())
        .unwrap_or(NO_BASS)
}

fn push(table: &mut Texture, mut sonority: Sonority, cursors: &[Cursor<'_>], leaders: &[usize]) {
    let row = table.steps.len();
    let mut doubled: u64 = 0;
    for p in 0..table.pairs.len() {
        let Pair { upper, lower } = table.pairs[p];
        let (u, l) = (&cursors[upper], &cursors[lower]);
        let last_side = row
            .checked_sub(table.pairs.len())
            .and_then(|start| table.steps.get(start + p))
            .map_or(0, PairStep::last_side);
        let mut step = match (l.was, u.was, l.now, u.now) {
            (Some(l0), Some(u0), Some(l1), Some(u1)) => PairStep::taken(
                Leg {
                    lower: (l0, l1),
                    upper: (u0, u1),
                },
                last_side,
            ),
            (_, _, Some(l1), Some(u1)) => PairStep::entry(l1.up_to(u1)),
            _ => PairStep::absent(),
        };
        if u.phrase_ended || l.phrase_ended || sonority.new_section {
            step = step.looking_across_phrase();
        }
        let copied = |from: &Cursor<'_>, to: usize| {
            from.copies.iter().any(|&c| c.map(usize::from) == Some(to))
        };
        if leaders[upper] == leaders[lower] || copied(u, lower) || copied(l, upper) {
            step = step.as_one_voice();
            // The leader of a doubling speaks for both, the source for its copy; otherwise the
            // upper one does.
            if step.after().is_some() {
                let upper_follows = leaders[upper] == lower || copied(u, lower);
                doubled |= 1 << if upper_follows { upper } else { lower };
            }
        }
        table.steps.push(step);
    }
    table.notes.extend(
        cursors
            .iter()
            .map(|c| u32::try_from(c.index).unwrap_or(u32::MAX)),
    );
    let present = (sonority.sounding | sonority.unknown) & !doubled;
    sonority.followers = doubled;
    sonority.parts = u8::try_from(present.count_ones()).unwrap_or(u8::MAX);
    table.sonorities.push(sonority);
}
