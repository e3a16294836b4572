//! Crossing-free voice leadings with doubled notes: monotone staircases.
//!
//! Both chords are continued by octaves in both directions. A strongly crossing-free voice
//! leading is a staircase through the table of distances that goes one period up in both: each
//! step goes on to the next note of the first chord, of the second, or of both. This is the table
//! of Tymoczko 2006, supporting text, figure S12, repeated for each choice of the first pair. With
//! a given number of voices the steps are counted and a pair may be repeated.

use crate::chord::Chord;
use crate::error::SpaceError;
use crate::leading::{Leading, Pair};
use crate::norm::Norm;
use crate::octave::Octave;
use std::cmp::Reverse;
use std::collections::BinaryHeap;

/// What a table holds at most, in cells: one table at a time, and where many are kept.
const MOST_CELLS: usize = 1 << 20;
const MOST_CELLS_KEPT: usize = 1 << 14;

/// The staircases between two chords in ascending order of their size.
#[derive(Clone, Debug)]
pub(crate) struct Staircases {
    octave: Octave,
    norm: Norm,
    /// The smaller chord and the larger one.
    small: Vec<i32>,
    large: Vec<i32>,
    /// Whether the smaller chord is the one the voices go to.
    swapped: bool,
    voices: Option<usize>,
    /// Where the first step may start: the next note of the small chord, counted through its
    /// octaves, above and below those opened.
    above: i64,
    below: i64,
    opened: Vec<Start>,
    trail: Vec<(usize, Pair)>,
    /// Size of the whole staircase at least and exactly, order of arrival, state.
    heap: BinaryHeap<Reverse<(i64, Reverse<usize>, State)>>,
    waiting: Vec<Leading>,
    size: i64,
}

/// A staircase begun, up to a cell and including it.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
struct State {
    start: usize,
    cell: Cell,
    size: i64,
    /// Its last pair in the trail.
    last: usize,
}

/// A pair of the table: voices before it (if they are counted), notes of each chord since the
/// first pair.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
struct Cell {
    voice: usize,
    i: usize,
    j: usize,
}

/// A first pair, and the size of the best way on from every cell, the cell included.
#[derive(Clone, Debug)]
struct Start {
    note: i64,
    rest: Vec<Option<i64>>,
}

impl Staircases {
    /// Staircases to be listed. `voices` is the number of voices, at least that of the larger
    /// chord, or `None` if open. Neither chord may be empty.
    pub(crate) fn new(
        a: &Chord,
        b: &Chord,
        voices: Option<usize>,
        norm: Norm,
    ) -> Result<Staircases, SpaceError> {
        let stairs = Staircases::unlisted(a, b, voices, norm);
        match stairs.cells() {
            Some(cells) if cells <= MOST_CELLS_KEPT => Ok(stairs),
            _ => Err(SpaceError::TooManyChoices),
        }
    }

    fn unlisted(a: &Chord, b: &Chord, voices: Option<usize>, norm: Norm) -> Staircases {
        let swapped = a.len() > b.len();
        let (small, large) = if swapped { (b, a) } else { (a, b) };
        Staircases {
            octave: a.octave(),
            norm,
            small: small.residues().to_vec(),
            large: large.residues().to_vec(),
            swapped,
            voices,
            above: 0,
            below: -1,
            opened: Vec::new(),
            trail: Vec::new(),
            heap: BinaryHeap::new(),
            waiting: Vec::new(),
            size: 0,
        }
    }

    /// The least size alone, one table after another.
    pub(crate) fn least_size(
        a: &Chord,
        b: &Chord,
        voices: Option<usize>,
        norm: Norm,
    ) -> Result<i64, SpaceError> {
        let mut stairs = Staircases::unlisted(a, b, voices, norm);
        if stairs.cells().is_none_or(|cells| cells > MOST_CELLS) {
            return Err(SpaceError::TooManyChoices);
        }
        let mut best = None;
        while let Some(note) = stairs.next_start(best) {
            let least = stairs.table(note).first().copied().flatten();
            best = best.into_iter().chain(least).min();
        }
        best.ok_or(SpaceError::OutOfRange)
    }

    /// The number of cells of a table.
    fn cells(&self) -> Option<usize> {
        let cells = self.voices.unwrap_or(1).checked_mul(self.small.len() + 1)?;
        cells.checked_mul(self.large.len())
    }

    /// All staircases of the next size, sorted, each voice leading once; more than `most` before
    /// equal ones are dropped is an error.
    pub(crate) fn next_size(
        &mut self,
        most: usize,
    ) -> Result<Option<(i64, Vec<Leading>)>, SpaceError> {
        while self.open_next() {}
        let Some(&Reverse((size, ..))) = self.heap.peek() else {
            return Ok(None);
        };
        let mut found = Vec::new();
        while let Some(&Reverse((least, _, state))) = self.heap.peek() {
            if least > size {
                // A first pair further out may still be as good.
                if self.open_next() {
                    continue;
                }
                break;
            }
            self.heap.pop();
            if self.closes(state.cell) {
                if found.len() >= most {
                    return Err(SpaceError::TooManyChoices);
                }
                found.push(self.leading(state));
            }
            self.step_on(state);
        }
        found.sort_unstable();
        found.dedup();
        Ok(Some((size, found)))
    }

    /// Whether a staircase may end in this cell: one step more would be the first pair again, an
    /// octave on.
    fn closes(&self, cell: Cell) -> bool {
        let (m, n) = (self.small.len(), self.large.len());
        cell.j + 1 == n
            && (cell.i == m || cell.i + 1 == m)
            && self.voices.is_none_or(|voices| cell.voice + 1 == voices)
    }

    fn steps(&self, cell: Cell) -> impl Iterator<Item = Cell> + use<> {
        let (m, n) = (self.small.len(), self.large.len());
        let voices = self.voices;
        [(0, 0), (0, 1), (1, 0), (1, 1)]
            .into_iter()
            // Standing still makes a voice more, so it must be counted to come to an end.
            .filter(move |&step| voices.is_some() || step != (0, 0))
            .map(move |(i, j)| Cell {
                voice: cell.voice + usize::from(voices.is_some()),
                i: cell.i + i,
                j: cell.j + j,
            })
            .filter(move |next| {
                next.i <= m && next.j < n && voices.is_none_or(|voices| next.voice < voices)
            })
    }

    fn index(&self, cell: Cell) -> usize {
        let (m, n) = (self.small.len(), self.large.len());
        (cell.voice * (m + 1) + cell.i) * n + cell.j
    }

    /// Displacement from note `note` of the small chord to note `j` of the large one, both
    /// counted through the octaves.
    fn displacement(&self, note: i64, j: usize) -> i64 {
        let m = self.small.len() as i64;
        let octaves = note.div_euclid(m).saturating_mul(self.octave.wide());
        let from = i64::from(self.small[note.rem_euclid(m) as usize]).saturating_add(octaves);
        i64::from(self.large[j]).saturating_sub(from)
    }

    /// The note of the small chord whose first pair is next in distance, if it could begin
    /// something as small as the best that is known.
    fn next_start(&mut self, best: Option<i64>) -> Option<i64> {
        if self.small.is_empty() || self.large.is_empty() {
            return None;
        }
        let up = self.norm.of(self.displacement(self.above, 0));
        let down = self.norm.of(self.displacement(self.below, 0));
        let reach = self.norm.of(i64::from(i32::MAX));
        if best.is_some_and(|best| best < up.min(down)) || up.min(down) > reach {
            return None;
        }
        Some(if up <= down {
            self.above += 1;
            self.above - 1
        } else {
            self.below -= 1;
            self.below + 1
        })
    }

    /// Opens the next first pair, if it could begin something as small as the best staircase
    /// known; says whether it did.
    fn open_next(&mut self) -> bool {
        let best = self.heap.peek().map(|top| top.0.0);
        let Some(note) = self.next_start(best) else {
            return false;
        };
        let rest = self.table(note);
        self.opened.push(Start { note, rest });
        let state = State {
            start: self.opened.len() - 1,
            cell: Cell {
                voice: 0,
                i: 0,
                j: 0,
            },
            size: 0,
            last: usize::MAX,
        };
        self.push(state, 0, usize::MAX);
        true
    }

    /// The best way on from every cell, with that first pair; filled from the end, so that every
    /// cell comes after those its steps lead to.
    fn table(&self, note: i64) -> Vec<Option<i64>> {
        let mut table = vec![None; self.cells().unwrap_or(0)];
        for voice in (0..self.voices.unwrap_or(1)).rev() {
            for i in (0..=self.small.len()).rev() {
                for j in (0..self.large.len()).rev() {
                    let cell = Cell { voice, i, j };
                    let on = self.steps(cell).filter_map(|next| table[self.index(next)]);
                    let rest = on.chain(self.closes(cell).then_some(0)).min();
                    let own = self.norm.of(self.displacement(note + i as i64, j));
                    table[self.index(cell)] = rest.map(|rest| self.norm.join(own, rest));
                }
            }
        }
        table
    }

    /// Puts a staircase on the heap that goes on into a cell, if it can come to an end there.
    fn push(&mut self, state: State, before: i64, last: usize) {
        let State { start, cell, .. } = state;
        let Some(opened) = self.opened.get(start) else {
            return;
        };
        let Some(rest) = opened.rest[self.index(cell)] else {
            return;
        };
        let note = opened.note + cell.i as i64;
        let displacement = self.displacement(note, cell.j);
        let Ok(by) = i32::try_from(displacement) else {
            return;
        };
        let from = self.small[note.rem_euclid(self.small.len() as i64) as usize];
        self.trail.push((last, Pair { from, by }));
        let state = State {
            size: self.norm.join(before, self.norm.of(displacement)),
            last: self.trail.len() - 1,
            ..state
        };
        let key = self.norm.join(before, rest);
        self.heap
            .push(Reverse((key, Reverse(self.trail.len()), state)));
    }

    fn step_on(&mut self, state: State) {
        for cell in self.steps(state.cell) {
            self.push(State { cell, ..state }, state.size, state.last);
        }
    }

    fn leading(&self, state: State) -> Leading {
        let mut pairs = Vec::new();
        let mut at = state.last;
        while let Some(&(before, pair)) = self.trail.get(at) {
            pairs.push(pair);
            at = before;
        }
        let leading = Leading::new(self.octave, pairs);
        if self.swapped {
            leading.inverse()
        } else {
            leading
        }
    }
}

impl Iterator for Staircases {
    type Item = (i64, Leading);

    fn next(&mut self) -> Option<(i64, Leading)> {
        while self.waiting.is_empty() {
            let (size, mut leadings) = self.next_size(usize::MAX).ok()??;
            leadings.reverse();
            (self.size, self.waiting) = (size, leadings);
        }
        self.waiting.pop().map(|leading| (self.size, leading))
    }
}
