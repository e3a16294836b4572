//! The least voice leadings between two chords, and all of them in ascending order.

use crate::bijective::{Outwards, Turns};
use crate::chord::Chord;
use crate::error::SpaceError;
use crate::leading::Leading;
use crate::norm::Norm;
use crate::ordered::InOrder;
use crate::staircase::Staircases;

/// How far the notes of the chords may be doubled in a voice leading.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Doubling {
    /// One voice for each note: the chords must have the same number of notes.
    None,
    /// As many voices as the larger chord has notes, each note of it in exactly one: the case of
    /// part-writing, where the voices are given and the other chord has notes to be doubled.
    Smaller,
    /// Any number of voices, both chords doubled at will: the relation of Tymoczko 2006.
    Both,
    /// Exactly this many voices, both chords doubled at will. More voices may cost more.
    Voices(usize),
}

/// The least voice leadings between two chords.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Least {
    /// The size that is least.
    pub norm: Norm,
    /// The least size over all voice leadings, crossing or not (squared in [`Norm::L2`]).
    pub size: i64,
    /// All strongly crossing-free voice leadings of that size, in ascending order; never none.
    /// In L1 and Linf there can be crossing ones as well: [`in_order`] gives them all.
    pub leadings: Vec<Leading>,
}

/// What [`least`] holds at most, so that a chord of many equal notes cannot fill the memory.
const MOST_TIES: usize = 1 << 16;

/// The number of voices, or `None` where it is left open.
pub(crate) fn voices(
    a: &Chord,
    b: &Chord,
    doubling: Doubling,
) -> Result<Option<usize>, SpaceError> {
    if a.octave() != b.octave() {
        return Err(SpaceError::DifferentOctaves(
            a.octave().size(),
            b.octave().size(),
        ));
    }
    if a.is_empty() != b.is_empty() {
        return Err(SpaceError::EmptyChord);
    }
    let notes = a.len().max(b.len());
    match doubling {
        // Nothing can be doubled in an empty chord.
        _ if notes == 0 => Ok(Some(0)),
        Doubling::None if a.len() != b.len() => Err(SpaceError::DifferentSizes(a.len(), b.len())),
        Doubling::None | Doubling::Smaller => Ok(Some(notes)),
        Doubling::Both => Ok(None),
        Doubling::Voices(voices) if voices < notes => {
            Err(SpaceError::TooFewVoices { voices, notes })
        }
        Doubling::Voices(voices) => Ok(Some(voices)),
    }
}

fn turns(a: &Chord, b: &Chord, doubling: Doubling) -> Result<Option<Turns>, SpaceError> {
    let voices = voices(a, b, doubling)?;
    if a.len() == b.len() && voices == Some(a.len()) {
        Turns::new(a, b).map(Some)
    } else {
        Ok(None)
    }
}

/// The least size of any voice leading from `a` to `b` (squared in [`Norm::L2`]). For `n` notes
/// O(n) walks of the sorted notes without doubling, a few as a rule; O(m^2 n) for `m <= n` notes
/// with doubling, times the number of voices if that is given. Two empty chords are 0 apart.
///
/// # Errors
/// Different octaves; one chord empty; sizes or a number of voices the doubling does not allow;
/// [`SpaceError::TooManyChoices`] with doubling for chords of hundreds of notes.
pub fn least_size(a: &Chord, b: &Chord, doubling: Doubling, norm: Norm) -> Result<i64, SpaceError> {
    match turns(a, b, doubling)? {
        Some(turns) => Ok(turns.least(norm).0),
        None => Staircases::least_size(a, b, voices(a, b, doubling)?, norm),
    }
}

/// The least voice leadings from `a` to `b`: the size and every crossing-free one that has it.
///
/// ```
/// use partwright_space::{Chord, Doubling, Norm, Octave, least};
///
/// // G7 to C in four voices: two ways, both of four semitones.
/// let g7 = Chord::new(Octave::SEMITONES, [7, 11, 2, 5]);
/// let c = Chord::new(Octave::SEMITONES, [0, 4, 7]);
/// let least = least(&g7, &c, Doubling::Smaller, Norm::L1)?;
/// assert_eq!((least.size, least.leadings.len()), (4, 2));
/// # Ok::<(), partwright_space::SpaceError>(())
/// ```
///
/// # Errors
/// As [`least_size`]; and [`SpaceError::TooManyChoices`] where very many are equally small,
/// or the chords too large to list them: a hundred notes, or very many equal ones.
pub fn least(a: &Chord, b: &Chord, doubling: Doubling, norm: Norm) -> Result<Least, SpaceError> {
    let (size, leadings) = match turns(a, b, doubling)? {
        Some(turns) => {
            let (size, first, last) = turns.least(norm);
            let mut leadings = (first..=last)
                .map(|k| turns.leading(k))
                .collect::<Result<Vec<_>, _>>()?;
            leadings.sort_unstable();
            (size, leadings)
        }
        None => Staircases::new(a, b, voices(a, b, doubling)?, norm)?
            .next_size(MOST_TIES)?
            .ok_or(SpaceError::OutOfRange)?,
    };
    Ok(Least {
        norm,
        size,
        leadings,
    })
}

/// The strongly crossing-free voice leadings from `a` to `b` with their sizes, in ascending order
/// of size, then of their voices; computed as they are asked for, without end. Take as many as
/// are wanted, or up to a size. A voice that would be displaced beyond `i32` ends the list.
///
/// Voice leadings of one size are held in memory together.
///
/// # Errors
/// As [`least_size`].
pub fn crossing_free(
    a: &Chord,
    b: &Chord,
    doubling: Doubling,
    norm: Norm,
) -> Result<CrossingFree, SpaceError> {
    Ok(CrossingFree(match turns(a, b, doubling)? {
        Some(turns) => Inner::Turns(Outwards::new(turns, norm)),
        None => Inner::Stairs(Staircases::new(a, b, voices(a, b, doubling)?, norm)?),
    }))
}

/// The iterator of [`crossing_free`].
#[derive(Clone, Debug)]
pub struct CrossingFree(Inner);

#[derive(Clone, Debug)]
enum Inner {
    Turns(Outwards),
    Stairs(Staircases),
}

impl Iterator for CrossingFree {
    type Item = (i64, Leading);

    fn next(&mut self) -> Option<(i64, Leading)> {
        match &mut self.0 {
            Inner::Turns(turns) => turns.next(),
            Inner::Stairs(stairs) => stairs.next(),
        }
    }
}

/// All voice leadings from `a` to `b`, crossing ones too, with their sizes, in ascending order of
/// size, then of their voices; computed as they are asked for, without end. Meant for chords of
/// up to six notes or so: see [`InOrder`].
///
/// ```
/// use partwright_space::{Chord, Doubling, Norm, Octave, in_order};
///
/// let c = Chord::new(Octave::SEMITONES, [0, 4, 7]);
/// let f = Chord::new(Octave::SEMITONES, [5, 9, 0]);
/// let all = in_order(&c, &f, Doubling::None, Norm::L1)?;
/// let sizes: Vec<i64> = all.map(|(size, _)| size).take_while(|&size| size <= 10).collect();
/// assert_eq!(sizes, [3, 7, 9, 9, 9]);
/// # Ok::<(), partwright_space::SpaceError>(())
/// ```
///
/// # Errors
/// As [`least_size`]; [`SpaceError::EndlessVoices`] for [`Doubling::Both`];
/// [`SpaceError::TooManyChoices`] where there are too many voices or ways to double.
pub fn in_order(
    a: &Chord,
    b: &Chord,
    doubling: Doubling,
    norm: Norm,
) -> Result<InOrder, SpaceError> {
    let voices = voices(a, b, doubling)?.ok_or(SpaceError::EndlessVoices)?;
    InOrder::new(a, b, voices, norm)
}
