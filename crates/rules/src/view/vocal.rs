//! A line as the old vocal style hears it: its mode, and its note values.

use partwright_analysis::{Final, mode};
use partwright_score::{Note, Pitch, Time};

use super::{Line, Minim, Piece, Run};

/// A note among its neighbours, in minims.
#[derive(Clone, Copy, Debug)]
pub struct Value {
    /// Where it begins.
    pub from: Time,
    /// Where it ends.
    pub until: Time,
    /// How long it is, in minims.
    length: Time,
    /// How long the note, and the rest or note, before it and after it are.
    before: Option<Time>,
    next: Option<Next>,
    minim: Minim,
    /// The parts on either side of the one bar line that it crosses, in minims.
    parts: Option<(Time, Time)>,
}

#[derive(Clone, Copy, Debug)]
struct Next {
    length: Time,
    sounds: bool,
    /// The length of the note after it, if one follows.
    then: Option<Time>,
}

fn part(n: i64, d: i64) -> Time {
    Time::new(n, d)
}

impl Value {
    fn is_on_minim(&self) -> bool {
        self.from == self.minim.from
    }

    /// A dotted half on a minim, or a dotted whole on a strong one, and what comes next is a note
    /// longer than its dot.
    #[must_use]
    pub fn is_dot_unanswered(&self) -> bool {
        let dot = match self.length {
            l if l == part(3, 2) && self.is_on_minim() => part(1, 2),
            l if l == part(3, 1) && self.is_on_minim() && self.minim.is_strong => part(1, 1),
            _ => return false,
        };
        self.next
            .is_some_and(|next| next.sounds && next.length > dot)
    }

    /// Two quarters on a strong minim between longer notes, the one after them a half that ends
    /// where the next strong minim comes.
    #[must_use]
    pub fn are_quarters_alone(&self) -> bool {
        let quarter = part(1, 2);
        let alone = self.length == quarter
            && self.is_on_minim()
            && self.minim.is_strong
            && self.before.is_some_and(|before| before >= part(1, 1));
        alone
            && self.next.is_some_and(|next| {
                next.sounds && next.length == quarter && next.then == Some(part(1, 1))
            })
    }

    /// It crosses one bar line, and the part before it is neither as long as the part after it
    /// nor twice as long. Notes of a breve and more are written as one, whatever the bars say.
    #[must_use]
    pub fn is_tied_short_to_long(&self) -> bool {
        let Some((before, after)) = self.parts else {
            return false;
        };
        self.length < part(4, 1) && before != after && before != after * 2
    }
}

impl Piece<'_> {
    /// The key stated at the beginning.
    #[must_use]
    pub fn stated_final(self) -> Option<Final> {
        mode::stated(self.score, self.score.bars.first()?.onset)
    }
}

impl Line<'_> {
    fn notes(&self) -> &[Note] {
        self.declared().map_or(&[][..], |v| &v.notes)
    }

    /// A note that is half a minim long, where it is known what a minim is.
    #[must_use]
    pub fn is_quarter(&self, note: &Note) -> bool {
        let minim = self.piece.minim_at(note.onset, false);
        minim.is_some_and(|minim| note.length * 2 == minim.length)
    }

    /// The notes of the line with their neighbours, where it is known what a minim is.
    #[must_use]
    pub fn values(&self) -> Vec<Value> {
        let notes = self.notes();
        let value = |i: usize| {
            let note = notes.get(i).filter(|note| note.sound.pitch().is_some())?;
            let minim = self.piece.minim_at(note.onset, false)?;
            let length = |note: &Note| note.length / minim.length;
            let sounding = |i: usize| notes.get(i).filter(|n| n.sound.pitch().is_some());
            let next = notes.get(i + 1).filter(|n| !n.sound.is_unknown());
            Some(Value {
                from: note.onset,
                until: note.end(),
                length: length(note),
                before: i.checked_sub(1).and_then(sounding).map(length),
                next: next.map(|next| Next {
                    length: length(next),
                    sounds: next.sound.pitch().is_some(),
                    then: sounding(i + 2).map(length),
                }),
                minim,
                parts: self.parts_of(note, minim.length),
            })
        };
        (0..notes.len()).filter_map(value).collect()
    }

    /// In a stretch that goes by step, one of its notes but the last is held over a stronger
    /// minim, or a stronger half of one: a suspension comes and goes.
    #[must_use]
    pub fn suspends(&self, (from, until): (Time, Time)) -> bool {
        let inside = |at: Time| from <= at && at < until;
        let mut moves = self
            .moves
            .iter()
            .filter(|m| inside(m.to.onset) && m.to.onset > from);
        let is_held = |note: &Note| {
            self.piece.minim_at(note.onset, false).is_some_and(|minim| {
                let weak = if note.onset == minim.from {
                    !minim.is_strong && note.length > minim.length
                } else {
                    note.end() > minim.from + minim.length
                };
                weak && note.end() < until
            })
        };
        moves.all(|m| m.size() <= 1)
            && self
                .notes()
                .iter()
                .any(|note| inside(note.onset) && is_held(note))
    }

    /// The parts of a note on either side of the bar line, in minims, if it crosses one only and
    /// does not close the line.
    fn parts_of(&self, note: &Note, minim: Time) -> Option<(Time, Time)> {
        let bars = &self.piece.score.bars;
        let index = self.piece.score.bar_at(note.onset)?;
        let line = bars.get(index + 1)?.onset;
        let crosses = note.onset < line && line < note.end();
        let once = bars
            .get(index + 2)
            .is_none_or(|bar| note.end() <= bar.onset);
        let closes = self
            .notes()
            .iter()
            .rev()
            .find(|n| n.sound.pitch().is_some())
            == Some(note);
        (crosses && once && !closes)
            .then(|| ((line - note.onset) / minim, (note.end() - line) / minim))
    }

    /// Tells whether a pitch is outside the notes of the modes with their usual accidentals, under
    /// the key stated at the beginning, else the signature that most notes fit: B flat to G sharp;
    /// E flat with a flat in the signature or without a key; a further flat, or sharp, for each
    /// further one of the signature.
    pub fn foreign(&self) -> impl Fn(Pitch) -> bool + use<> {
        let piece = self.piece;
        let flats = piece.stated_final().map_or_else(
            || match mode::likely_flats(piece.score) {
                0 => 1,
                flats => flats,
            },
            |key| key.flats,
        );
        let known = -2 - flats.max(0)..=8 - flats.min(0);
        move |pitch| !known.contains(&mode::fifths(pitch))
    }

    /// Some move to or from a stretch of time is augmented, or a diminished leap: the rules for
    /// those tell of the note.
    #[must_use]
    pub fn jars(&self, from: Time, until: Time) -> bool {
        let inside = |note: &Note| from <= note.onset && note.onset < until;
        let mut moves = self.moves.iter();
        !self.is_given()
            && moves.any(|m| {
                (inside(&m.from) || inside(&m.to))
                    && (m.is_augmented() || (m.is_diminished() && m.is_leap()))
            })
    }

    /// The notes of a run keep within the authentic or the plagal octave of a final, and so many
    /// steps beyond either end.
    #[must_use]
    pub fn keeps_ambitus<K>(&self, run: &Run<K>, mode: Final, beyond: i32) -> bool {
        let low = i32::from(mode.degree(run.lowest));
        let high = low + run.span();
        // Octaves over a final from two below the lowest note to one above it; the plagal ones
        // begin a fourth lower.
        let starts = [-7, 0, 7]
            .into_iter()
            .flat_map(|octave| [octave, octave - 3]);
        let mut starts = starts.filter(|start| start - beyond <= low);
        starts.any(|start| high <= start + 7 + beyond)
    }
}
