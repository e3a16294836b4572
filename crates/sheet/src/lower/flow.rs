//! What one voice does, note by note, while it is written.

use partwright_score::{Note, Pitch, Sound, Time};

/// A moment or a length in whole notes, `n / d`, not necessarily in lowest terms: cheap to step
/// on, reduced only where it goes into the score.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) struct Moment {
    pub(super) n: i64,
    pub(super) d: i64,
}

/// Bars and cells begin on 64ths of a whole note: that is the smallest lower figure.
pub(super) const GRID: i64 = 64;

impl Moment {
    /// So many 64ths.
    pub(super) const fn of(sixty_fourths: i64) -> Moment {
        Moment {
            n: sixty_fourths,
            d: GRID,
        }
    }

    /// In lowest terms. Most divisions are by powers of two, which need no search.
    pub(crate) fn time(self) -> Time {
        if self.d.count_ones() == 1 {
            let shift = self.n.trailing_zeros().min(self.d.trailing_zeros());
            Time::new_raw(self.n >> shift, self.d >> shift)
        } else {
            Time::new(self.n, self.d)
        }
    }

    /// The time from this moment to a later one.
    pub(super) fn until(self, later: Moment) -> Time {
        if self.d == later.d {
            let n = later.n - self.n;
            Moment { n, d: self.d }.time()
        } else if self.d.count_ones() == 1 && later.d.count_ones() == 1 {
            let d = self.d.max(later.d);
            let n = later.n * (d / later.d) - self.n * (d / self.d);
            Moment { n, d }.time()
        } else {
            later.time() - self.time()
        }
    }
}

impl From<Time> for Moment {
    fn from(time: Time) -> Moment {
        Moment {
            n: *time.numer(),
            d: *time.denom(),
        }
    }
}

/// A voice as it flows: the notes that have ended, and the one that has not.
#[derive(Debug)]
pub(super) struct Flow {
    pub(super) notes: Vec<Note>,
    /// The note sounding: its onset, and what is known of it.
    onset: Moment,
    pub(super) now: Option<Note>,
    /// The last pitch struck, for the octave nearest to it.
    pub(super) last: Option<Pitch>,
}

impl Flow {
    /// A voice that has done nothing yet, with room for so many notes.
    pub(super) fn with_room(notes: usize) -> Flow {
        Flow {
            notes: Vec::with_capacity(notes),
            onset: Moment::of(0),
            now: None,
            last: None,
        }
    }

    /// What sounds now.
    pub(super) fn sound(&self) -> Option<Sound> {
        self.now.map(|note| note.sound)
    }

    /// Something begins. Silence after silence goes on, and so does time of which nothing is
    /// known.
    pub(super) fn turn(&mut self, at: Moment, sound: Sound, copies: Option<u8>) {
        if let Some(now) = &self.now
            && now.sound == sound
            && sound.pitch().is_none()
        {
            return;
        }
        self.end(at);
        if let Sound::Pitch(pitch) = sound {
            self.last = Some(pitch);
        }
        self.onset = at;
        self.now = Some(Note {
            copies,
            ..Note::new(at.time(), partwright_score::ZERO, sound)
        });
    }

    /// The note sounding ends.
    pub(super) fn end(&mut self, at: Moment) {
        if let Some(mut note) = self.now.take() {
            note.length = self.onset.until(at);
            if *note.length.numer() > 0 {
                self.notes.push(note);
            }
        }
    }

    /// Marks on the note sounding.
    pub(super) fn mark(&mut self, fermata: bool, breath: bool) {
        if let Some(note) = &mut self.now {
            note.fermata |= fermata;
            note.breath |= breath;
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use partwright_score::ZERO;

    #[test]
    fn moments_are_exact() {
        let third = Moment { n: 64, d: 192 };
        assert_eq!(third.time(), Time::new(1, 3));
        assert_eq!(Moment::of(0).time(), ZERO);
        assert_eq!(Moment::of(48).time(), Time::new(3, 4));
        assert_eq!(Moment { n: 3, d: 512 }.time(), Time::new(3, 512));
        assert_eq!(third.until(Moment::of(48)), Time::new(5, 12));
        assert_eq!(
            Moment::of(16).until(Moment { n: 40, d: 128 }),
            Time::new(1, 16)
        );
    }

    #[test]
    fn silence_goes_on_and_notes_are_struck_again() {
        let mut flow = Flow::with_room(0);
        let pitch: Pitch = "G4".parse().unwrap();
        flow.turn(Moment::of(0), Sound::Rest, None);
        flow.turn(Moment::of(16), Sound::Rest, None);
        flow.turn(Moment::of(32), Sound::Pitch(pitch), None);
        flow.turn(Moment::of(48), Sound::Pitch(pitch), None);
        flow.end(Moment::of(64));
        let lengths: Vec<Time> = flow.notes.iter().map(|note| note.length).collect();
        assert_eq!(lengths, [Time::new(1, 2), Time::new(1, 4), Time::new(1, 4)]);
    }
}
