//! Rhythm: a voice's notes over one note of the cantus, and where the minims lie.

use partwright_score::{Note, Sound, Time, ZERO};

use super::{Line, LineMove, Piece};

/// One note or rest over a note of the cantus, in shares of it.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Stroke {
    /// How far into the cantus's note it begins: 0 with it, 1/2 in the middle.
    pub at: Time,
    /// How much of the cantus's note it takes.
    pub share: Time,
    /// A note, not a rest.
    pub sounds: bool,
    /// What of it lies before the cantus's note, in shares.
    pub before: Time,
    /// What of it lasts beyond the cantus's note, in shares.
    pub beyond: Time,
}

impl Stroke {
    /// A note struck here that ends here, and takes one part of so many.
    #[must_use]
    pub fn is_plain(&self, part: i64) -> bool {
        self.is_part(part) && !self.is_tied_in() && !self.is_tied_out()
    }

    /// A note that takes one part of so many, tied or not.
    #[must_use]
    pub fn is_part(&self, part: i64) -> bool {
        self.sounds && self.share == Time::new(1, part)
    }

    /// It was struck before.
    #[must_use]
    pub fn is_tied_in(&self) -> bool {
        *self.before.numer() > 0
    }

    /// It lasts on.
    #[must_use]
    pub fn is_tied_out(&self) -> bool {
        *self.beyond.numer() > 0
    }

    /// It lasts on for one part of so many.
    #[must_use]
    pub fn lasts_on(&self, part: i64) -> bool {
        self.beyond == Time::new(1, part)
    }

    /// It begins on the second quarter, and lasts over the middle.
    #[must_use]
    pub fn is_quarter_held(&self) -> bool {
        let (quarter, middle) = (Time::new(1, 4), Time::new(1, 2));
        self.at == quarter && self.at + self.share > middle
    }

    /// A rest of one part of so many.
    #[must_use]
    pub fn is_rest_of(&self, part: i64) -> bool {
        !self.sounds && self.share == Time::new(1, part)
    }
}

/// What one voice does over one note of the cantus.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Over {
    /// Where the cantus's note begins.
    pub from: Time,
    /// Where it ends.
    pub until: Time,
    /// Notes and rests in order.
    pub strokes: Vec<Stroke>,
    /// The cantus's note fills a bar in triple time.
    pub is_triple: bool,
    /// Something of it is not written yet, or not readable.
    pub is_unknown: bool,
    /// The voice has not entered yet: only in three parts and more, where one may wait.
    pub is_waiting: bool,
    /// The voice enters here.
    pub is_entry: bool,
    /// Notes of the cantus from here to the close, this one included: 1 for the last. `None`
    /// where the piece does not close.
    pub to_close: Option<usize>,
    /// Nothing is written after it.
    pub is_last_written: bool,
}

impl Over {
    /// One note struck with the cantus, and as long.
    #[must_use]
    pub fn is_one_whole(&self) -> bool {
        matches!(self.strokes[..], [only] if only.is_plain(1))
    }

    /// When a note or rest of it begins.
    #[must_use]
    pub fn moment(&self, stroke: &Stroke) -> Time {
        self.from + stroke.at * (self.until - self.from)
    }

    /// Nothing but rest.
    #[must_use]
    pub fn is_silent(&self) -> bool {
        self.strokes.iter().all(|stroke| !stroke.sounds)
    }

    /// Its first note was struck before.
    #[must_use]
    pub fn is_tied_in(&self) -> bool {
        self.strokes.first().is_some_and(Stroke::is_tied_in)
    }

    /// Its last note lasts on.
    #[must_use]
    pub fn is_tied_out(&self) -> bool {
        self.strokes.last().is_some_and(Stroke::is_tied_out)
    }

    /// A rest comes first.
    #[must_use]
    pub fn starts_with_a_rest(&self) -> bool {
        self.strokes.first().is_some_and(|stroke| !stroke.sounds)
    }

    /// One of the moves that leave its notes but the last is a step.
    #[must_use]
    pub fn goes_by_step(&self, moves: &[LineMove]) -> bool {
        let inside = |m: &&LineMove| self.from <= m.from.onset && m.to.onset < self.until;
        moves.iter().filter(inside).any(|m| m.size() == 1)
    }

    /// Two equal notes, or three in triple time, struck anew; half a rest first where the voice
    /// enters, one whole note in the last bar but one. In three parts and more that bar may hold
    /// a suspension.
    #[must_use]
    pub fn is_second_species(&self, many_parts: bool) -> bool {
        let last_but_one = self.to_close == Some(2);
        let may_tie_out = many_parts && self.to_close == Some(3);
        let count = self.strokes.len();
        let equal = (count == 2 && self.is_shared_by(2))
            || (count == 3 && self.is_triple && self.is_shared_by(3));
        let rests = self.strokes.iter().filter(|stroke| !stroke.sounds).count();
        let rests_well = rests == 0 || (rests == 1 && self.is_entry && self.starts_with_a_rest());
        let tied_well = (!self.is_tied_in() || (many_parts && last_but_one))
            && (!self.is_tied_out() || may_tie_out);
        (equal && rests_well && tied_well) || (last_but_one && self.is_one_whole())
    }

    /// One whole note at the end of what is written, where no `||` stands yet: it may be the last.
    #[must_use]
    pub fn may_close(&self) -> bool {
        self.to_close.is_none() && self.is_last_written && self.is_one_whole()
    }

    /// Notes and rests of equal length, so many to the cantus's note.
    #[must_use]
    pub fn is_shared_by(&self, parts: i64) -> bool {
        let equal = |stroke: &Stroke| stroke.is_part(parts) || stroke.is_rest_of(parts);
        self.strokes.iter().all(equal)
    }
}

/// A half of a semibreve, the beat of strict counterpoint and of old vocal music.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Minim {
    /// Where it begins.
    pub from: Time,
    /// How long it lasts.
    pub length: Time,
    /// It is the first of its semibreve.
    pub is_strong: bool,
}

/// Notes in a row, shorter than half a minim.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Quick {
    /// Where the first begins.
    pub from: Time,
    /// Where the last ends.
    pub until: Time,
    /// How many they are.
    pub notes: usize,
    /// They fill the second half of a minim.
    pub is_in_place: bool,
    /// From the first on to the note after the last, every move is a step.
    pub is_by_step: bool,
    /// How many groups of such notes it joins.
    pub groups: usize,
    /// A semibreve where it ends.
    semibreve: Time,
}

impl Quick {
    /// Joins it to a passage it goes on from: less than a semibreve lies between.
    pub fn join(&mut self, next: Quick) -> bool {
        let near = next.from - self.until < self.semibreve;
        if near {
            self.until = next.until;
            self.notes += next.notes;
            self.groups += next.groups;
            self.semibreve = next.semibreve;
        }
        near
    }
}

impl Piece<'_> {
    /// What a voice does over each note of the cantus, in order.
    #[must_use]
    pub fn over_cantus(self, cantus: usize, voice: usize) -> Vec<Over> {
        let notes = |v: usize| {
            let declared = self.score.voices.get(v);
            declared.map_or(&[][..], |voice| &voice.notes)
        };
        let mut bars: Vec<Over> = notes(cantus)
            .iter()
            .filter(|note| matches!(note.sound, Sound::Pitch(_)))
            .map(|under| self.strokes_over(under, notes(voice)))
            .collect();
        let may_wait = self.score.voices.len() >= 3;
        let entry = bars.iter().position(|over| !may_wait || !over.is_silent());
        let (count, closes) = (bars.len(), self.closes());
        for (i, over) in bars.iter_mut().enumerate() {
            over.is_waiting = entry.is_none_or(|entry| i < entry);
            over.is_entry = entry == Some(i);
            over.to_close = closes.then_some(count - i);
            over.is_last_written = i + 1 == count;
        }
        bars
    }

    fn strokes_over(self, under: &Note, line: &[Note]) -> Over {
        let (from, until) = (under.onset, under.end());
        let first = line.partition_point(|note| note.end() <= from);
        let above = line
            .iter()
            .skip(first)
            .take_while(|note| note.onset < until);
        let stroke = |note: &Note| {
            let (begins, ends) = (note.onset.max(from), note.end().min(until));
            Stroke {
                at: (begins - from) / under.length,
                share: (ends - begins) / under.length,
                sounds: note.sound.pitch().is_some(),
                before: (begins - note.onset) / under.length,
                beyond: (note.end() - ends) / under.length,
            }
        };
        Over {
            from,
            until,
            strokes: above.clone().map(stroke).collect(),
            is_triple: self.is_triple_at(from),
            is_unknown: above.clone().any(|note| note.sound.is_unknown()),
            is_waiting: false,
            is_entry: false,
            to_close: None,
            is_last_written: false,
        }
    }

    /// The bar at a moment has three or more groups of three cells.
    fn is_triple_at(self, at: Time) -> bool {
        let bar = self.score.bar_at(at).and_then(|i| self.score.bars.get(i));
        let metre = bar.and_then(|bar| self.score.metres.get(bar.metre as usize));
        metre.is_some_and(|m| m.cells().is_some_and(|cells| cells % 3 == 0))
    }

    /// The minim at a moment. Over a cantus it is half of the cantus's note; else the bar tells
    /// it, if it is counted in semibreves or minims and goes by twos. `None` where that is not
    /// so: in triple time, and where the values may have been halved in print.
    #[must_use]
    pub fn minim_at(self, at: Time, strict: bool) -> Option<Minim> {
        if self.is_triple_at(at) {
            return None;
        }
        let (start, length) = if strict {
            let cantus = self.score.voices.get(self.cantus_or_slowest()?)?;
            let note = cantus
                .notes
                .get(self.score.note_at(self.cantus_or_slowest()?, at)?)?;
            (note.onset, note.length / 2)
        } else {
            let bar = self.score.bars.get(self.score.bar_at(at)?)?;
            let metre = self.score.metres.get(bar.metre as usize)?;
            let half = Time::new(1, 2);
            // A bar that does not fill its metre may be in a proportion of its own.
            if metre.bar_length() != Some(bar.length) {
                return None;
            }
            if metre.is_free() || metre.unit() < half || metre.bar_length()? < half * 2 {
                return None;
            }
            (bar.onset, half)
        };
        let count = ((at - start) / length).floor();
        Some(Minim {
            from: start + count * length,
            length,
            is_strong: count.to_integer() % 2 == 0,
        })
    }
}

impl Line<'_> {
    /// The runs of notes shorter than half a minim, where it is known what a minim is. Three in
    /// the time of two are another proportion, and no eighths.
    #[must_use]
    pub fn quick_notes(&self, strict: bool) -> Vec<Quick> {
        let notes = self.declared().map_or(&[][..], |v| &v.notes);
        let minim = |note: &Note| self.piece.minim_at(note.onset, strict);
        let is_quick = |note: &Note| {
            let short = |m: Minim| {
                let share = note.length / m.length;
                share * 2 < Time::new(1, 1) && share.denom().count_ones() == 1
            };
            note.sound.pitch().is_some() && minim(note).is_some_and(short)
        };
        let mut runs: Vec<Quick> = Vec::new();
        for note in notes.iter().filter(|note| is_quick(note)) {
            match runs.last_mut() {
                Some(run) if run.until == note.onset => {
                    run.until = note.end();
                    run.notes += 1;
                }
                _ => runs.push(Quick {
                    from: note.onset,
                    until: note.end(),
                    notes: 1,
                    is_in_place: true,
                    is_by_step: true,
                    groups: 1,
                    semibreve: ZERO,
                }),
            }
        }
        for run in &mut runs {
            let place = self.piece.minim_at(run.from, strict);
            run.semibreve = place.map_or(ZERO, |m| m.length * 2);
            run.is_in_place = place.is_some_and(|m| {
                run.from == m.from + m.length / 2 && run.until == m.from + m.length
            });
            let inside = |at: Time| run.from <= at && at < run.until;
            let mut moves = self.moves.iter().filter(|m| inside(m.from.onset));
            run.is_by_step = moves.all(|m| m.size() == 1);
        }
        runs
    }
}
