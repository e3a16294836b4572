//! The shape of a line: its turning points, high points, figures and broken chords.

use std::collections::BTreeSet;

use partwright_score::{Interval, Note, Pitch, Time};

use super::{Line, LineMove};

/// A stretch of a line between two points where it turns.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Stretch<'a> {
    /// Its first note.
    pub from: Note,
    /// Its last note.
    pub to: Note,
    /// The interval between them.
    pub interval: Interval,
    /// The move that reaches the last note.
    pub into: &'a LineMove,
    /// The move the line turns back with; `None` where it ends.
    pub turn: Option<&'a LineMove>,
    /// The line came the other way before; otherwise it begins here.
    pub is_inside: bool,
}

/// Notes of a line that make a passage.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Passing {
    /// The first note.
    pub first: Note,
    /// The second note.
    pub second: Note,
    /// The last note.
    pub last: Note,
    /// How many notes they are, repeated ones counted once.
    pub notes: usize,
    /// How many notes the figure in it has, where it is one.
    pub figure: usize,
}

impl Stretch<'_> {
    /// It is a single move.
    #[must_use]
    pub fn is_one_move(&self) -> bool {
        self.into.from.onset == self.from.onset
    }

    /// It as one move from the first note to the last.
    #[must_use]
    pub fn whole(&self) -> LineMove {
        LineMove {
            from: self.from,
            ..*self.into
        }
    }
}

impl Passing {
    fn of(notes: &[Note], figure: usize) -> Option<Passing> {
        Some(Passing {
            first: *notes.first()?,
            second: *notes.get(1)?,
            last: *notes.last()?,
            notes: notes.len(),
            figure,
        })
    }

    /// Where it begins and where it ends.
    #[must_use]
    pub fn extent(&self) -> (Time, Time) {
        (self.first.onset, self.last.end())
    }

    /// Its first, second and last pitch as text.
    #[must_use]
    pub fn pitches(&self) -> [String; 3] {
        [self.first, self.second, self.last].map(|note| LineMove::text(&note))
    }
}

/// The highest note of a stretch of a line, and how often the line comes to it.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct HighPoint {
    /// The pitch.
    pub pitch: Pitch,
    /// When the line comes to it: repetitions at once count as one.
    pub times: Vec<Time>,
}

fn height(note: &Note) -> Option<i32> {
    note.sound.pitch().map(|p| p.place().semitone)
}

/// The longest figure that is looked for, in notes.
const LONGEST_FIGURE: usize = 12;

impl<'a> Line<'a> {
    /// The stretches without a rest or the end of a phrase, as moves from pitch to pitch;
    /// repeated notes count as one.
    #[must_use]
    pub fn joined(&self) -> Vec<Vec<&'a LineMove>> {
        let mut joined: Vec<Vec<&LineMove>> = Vec::new();
        for step in self.moves {
            if step.starts || joined.is_empty() {
                joined.push(Vec::new());
            }
            if let Some(last) = joined.last_mut().filter(|_| !step.is_repeat()) {
                last.push(step);
            }
        }
        joined
    }

    /// The same as notes, each as long as its repetitions together.
    fn joined_notes(&self) -> Vec<Vec<Note>> {
        let mut joined: Vec<Vec<Note>> = Vec::new();
        for step in self.moves {
            if step.starts || joined.is_empty() {
                joined.push(vec![step.from]);
            }
            let Some(notes) = joined.last_mut() else {
                continue;
            };
            match notes.last_mut() {
                Some(last) if step.is_repeat() => last.length = step.to.end() - last.onset,
                _ => notes.push(step.to),
            }
        }
        joined
    }

    /// The stretches from one turning point to the next, the first and last note of a phrase
    /// among the turning points.
    #[must_use]
    pub fn stretches(&self) -> Vec<Stretch<'a>> {
        let mut stretches: Vec<Stretch<'_>> = Vec::new();
        for moves in self.joined() {
            let mut open: Option<Stretch<'_>> = None;
            for step in moves {
                match &mut open {
                    Some(stretch) if stretch.into.rises() == step.rises() => {
                        stretch.to = step.to;
                        stretch.into = step;
                    }
                    _ => {
                        let is_inside = open.is_some();
                        if let Some(mut stretch) = open.take() {
                            stretch.turn = Some(step);
                            stretches.push(stretch);
                        }
                        open = Some(Stretch {
                            from: step.from,
                            to: step.to,
                            interval: step.interval,
                            into: step,
                            turn: None,
                            is_inside,
                        });
                    }
                }
            }
            stretches.extend(open);
        }
        for stretch in &mut stretches {
            if let (Some(from), Some(to)) = (stretch.from.sound.pitch(), stretch.to.sound.pitch()) {
                stretch.interval = Interval(from.place().up_to(to.place()));
            }
        }
        stretches
    }

    /// Steps and leaps from note to note; repeated notes count as neither.
    #[must_use]
    pub fn steps_and_leaps(&self) -> (usize, usize) {
        let moving = || self.moves.iter().filter(|step| !step.is_repeat());
        let leaps = moving().filter(|step| step.is_leap()).count();
        (moving().count() - leaps, leaps)
    }

    /// The interval from the lowest note to the highest, and the two.
    #[must_use]
    pub fn extremes(&self) -> Option<(Interval, Note, Note)> {
        let notes = &self.declared()?.notes;
        let sounding = || notes.iter().filter(|note| height(note).is_some());
        let low = *sounding().min_by_key(|note| height(note))?;
        let high = *sounding().rev().max_by_key(|note| height(note))?;
        let interval = low
            .sound
            .pitch()?
            .place()
            .up_to(high.sound.pitch()?.place());
        Some((Interval(interval), low, high))
    }

    /// The high point of the notes that begin in a stretch of time.
    #[must_use]
    pub fn high_point(&self, from: Time, until: Time) -> Option<HighPoint> {
        let notes = &self.declared()?.notes;
        let inside = || {
            notes
                .iter()
                .filter(|note| from <= note.onset && note.onset < until)
        };
        let top = *inside().max_by_key(|note| height(note))?;
        let (mut times, mut there) = (Vec::new(), false);
        for note in inside() {
            let now = height(note).is_some() && height(note) == height(&top);
            if now && !there {
                times.push(note.onset);
            }
            there = now;
        }
        Some(HighPoint {
            pitch: top.sound.pitch()?,
            times,
        })
    }

    /// The phrases that end with a fermata or a breath of this voice: where each begins and ends.
    /// What a rest cuts off without a mark is left out.
    #[must_use]
    pub fn marked_phrases(&self) -> Vec<(Time, Time)> {
        let notes = self.declared().map_or(&[][..], |v| &v.notes);
        let mut from = notes.first().map(|note| note.onset);
        let mut phrases = Vec::new();
        for note in notes {
            // A rest ends a phrase too; one without a mark may be no phrase at all.
            if note.ends_phrase() {
                phrases.extend(from.map(|from| (from, note.end())));
            }
            if note.ends_phrase() || note.sound.pitch().is_none() {
                from = Some(note.end());
            }
        }
        phrases
    }

    /// Passages in which two notes alternate, each struck twice at least and each time as long;
    /// the last of the passage may last longer or shorter.
    #[must_use]
    pub fn alternations(&self) -> Vec<Passing> {
        let mut found = Vec::new();
        for notes in self.joined_notes() {
            let same = |i: usize, j: usize| {
                let pitch = |k: usize| notes.get(k).and_then(|n| n.sound.pitch());
                pitch(i) == pitch(j)
            };
            let mut from = 0;
            while from + 3 < notes.len() {
                let mut end = from + 2;
                while end < notes.len() && same(end, end - 2) {
                    end += 1;
                }
                let passage = notes.get(from..end).unwrap_or_default();
                let last = passage.len().saturating_sub(4);
                let mut fours = passage.windows(4).enumerate();
                if fours.any(|(i, four)| same_rhythm(four, i == last)) {
                    found.extend(Passing::of(passage, 2));
                }
                from = (end - 1).max(from + 1);
            }
        }
        found
    }

    /// Passages in which a figure of three notes or more, not all of them on two pitches, comes
    /// twice at once on the same notes and in the same rhythm.
    #[must_use]
    pub fn repeated_figures(&self) -> Vec<Passing> {
        let mut found = Vec::new();
        for notes in self.joined_notes() {
            let mut from = 0;
            while from + 6 <= notes.len() {
                let figure = (3..=LONGEST_FIGURE).find(|&p| repeats(&notes, from, p, p));
                let Some(p) = figure else {
                    from += 1;
                    continue;
                };
                let more = (2 * p..).take_while(|&n| repeats(&notes, from, p, n));
                let end = from + p + more.last().unwrap_or(p);
                found.extend(Passing::of(notes.get(from..end).unwrap_or_default(), p));
                from = end;
            }
        }
        found
    }

    /// Passages of four notes or more that all belong to one major, minor or diminished triad,
    /// each of its three notes among them, and that turn at least once.
    #[must_use]
    pub fn broken_chords(&self) -> Vec<Passing> {
        let mut found = Vec::new();
        for notes in self.joined_notes() {
            let mut from = 0;
            while from + 3 < notes.len() {
                let mut classes = BTreeSet::new();
                let fits = |note: &&Note| {
                    classes.extend(height(note).map(|h| h.rem_euclid(12)));
                    classes.len() < 3 || is_triad(&classes)
                };
                let count = notes.iter().skip(from).take_while(fits).count();
                let passage = notes.get(from..from + count).unwrap_or_default();
                let whole: BTreeSet<i32> = passage
                    .iter()
                    .filter_map(height)
                    .map(|h| h.rem_euclid(12))
                    .collect();
                let turns = passage.windows(3).any(|w| match w {
                    [a, b, c] => (height(a) < height(b)) != (height(b) < height(c)),
                    _ => false,
                });
                if count >= 4 && turns && is_triad(&whole) {
                    found.extend(Passing::of(passage, 0));
                    from += count - 1;
                } else {
                    from += 1;
                }
            }
        }
        found
    }

    /// The move stands in a sequence: the moves around it come again at once, the same sizes
    /// in the same directions, from another note.
    #[must_use]
    pub fn is_in_sequence(&self, index: usize) -> bool {
        let sizes = |from: usize, n: usize| {
            let moves = self.moves.get(from..from + n)?;
            let whole = moves.iter().skip(1).all(|step| !step.starts);
            whole.then(|| moves.iter().map(|step| step.interval.0.steps))
        };
        let joined = |from: usize| self.moves.get(from).is_some_and(|step| !step.starts);
        (2..=LONGEST_FIGURE / 2).any(|n| {
            (0..n)
                .filter_map(|back| index.checked_sub(back))
                .any(|from| {
                    let Some(here) = sizes(from, n) else {
                        return false;
                    };
                    let drift: i32 = here.clone().sum();
                    let again = |other: Option<usize>, seam: usize| {
                        other
                            .and_then(|o| sizes(o, n))
                            .is_some_and(|there| joined(seam) && there.eq(here.clone()))
                    };
                    drift != 0
                        && (again(Some(from + n), from + n) || again(from.checked_sub(n), from))
                })
        })
    }
}

/// Of four notes the third is as long as the first, and the fourth as the second, unless it is
/// the last of a passage.
fn same_rhythm(four: &[Note], is_last: bool) -> bool {
    matches!(four, [a, b, c, d] if a.length == c.length && (is_last || b.length == d.length))
}

/// So many notes from a note on, and the first `n` of them again after `by` notes.
fn repeats(notes: &[Note], from: usize, n: usize, by: usize) -> bool {
    let figure = |at: usize| notes.get(at..at + n);
    let (Some(here), Some(there)) = (figure(from), figure(from + by)) else {
        return false;
    };
    let pitches: BTreeSet<_> = here.iter().map(|note| note.sound.pitch()).collect();
    let inside = here.len() - 1;
    let same = here.iter().zip(there).enumerate();
    pitches.len() >= 3
        && same
            .into_iter()
            .all(|(i, (a, b))| a.sound == b.sound && (i == inside || a.length == b.length))
}

/// Three pitch classes that make a major, minor or diminished triad.
pub(super) fn is_triad(classes: &BTreeSet<i32>) -> bool {
    let mut sorted = classes.iter().copied();
    let (Some(x), Some(y), Some(z), None) =
        (sorted.next(), sorted.next(), sorted.next(), sorted.next())
    else {
        return false;
    };
    let gaps = [y - x, z - y, 12 - (z - x)];
    // The triads by their cycles of gaps.
    let shapes = [[4, 3, 5], [3, 4, 5], [3, 3, 6]];
    (0..3).any(|turn| {
        let turned = [0, 1, 2].map(|i| gaps.get((i + turn) % 3).copied().unwrap_or(0));
        shapes.contains(&turned)
    })
}
