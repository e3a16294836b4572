//! Where the composer states the harmony, that is taken.
//!
//! Chords of a harmony row come resolved; the figures of a bass are resolved here, since the bass
//! is known only with the notes. Where both stand, the row is taken.

use partwright_score::fifths::{fifths, in_signature, letter_at, of_letter};
use partwright_score::{
    FigureSign, Mode, Score, StatedChord, StatedFigure, StatedFigures, StatedKey, Texture,
};

use super::chord::{Chord, Quality};
use super::keys::LocalKey;
use super::slices::Slice;
use crate::mode;

/// Every chord that is stated, in order of time.
#[must_use]
pub fn stated(score: &Score, texture: &Texture) -> Vec<StatedChord> {
    let mut list = score.harmony.clone();
    let mut likely = None;
    for (index, figures) in score.figures.iter().enumerate() {
        let after = score
            .harmony
            .partition_point(|chord| chord.until <= figures.from);
        let next = score.harmony.get(after);
        if next.is_some_and(|chord| chord.from < figures.until) {
            continue;
        }
        let flats = mode::stated(score, figures.from)
            .map(|found| found.flats)
            .unwrap_or_else(|| *likely.get_or_insert_with(|| mode::likely_flats(score)));
        let next = score.figures.get(index + 1);
        let next = next.filter(|next| next.from == figures.until);
        list.extend(over_bass(score, texture, figures, next, flats));
    }
    list.sort_by_key(|chord| chord.from);
    list
}

/// The lowest note at a moment, by its place among the fifths.
fn bass_at(score: &Score, texture: &Texture, figures: &StatedFigures) -> Option<i32> {
    let sonority = texture.sounding_at(figures.from)?;
    let bass = texture.bass(sonority)?;
    texture.pitch(score, sonority, bass).map(fifths)
}

/// The chord that figures ask for over the bass where they begin; `None` where that is not known
/// or they are no chord of thirds.
fn over_bass(
    score: &Score,
    texture: &Texture,
    figures: &StatedFigures,
    next: Option<&StatedFigures>,
    flats: i32,
) -> Option<StatedChord> {
    let bass = bass_at(score, texture, figures)?;
    let next = next.filter(|next| bass_at(score, texture, next) == Some(bass));
    let next: &[StatedFigure] = next.map_or(&[], |next| &next.stack);
    let (chord, ornaments) = meant(&figures.stack, next)?;
    let place = |of: &StatedFigure| {
        let plain = in_signature(-1 - flats, bass, i32::from(of.number) - 1);
        match of.sign {
            None => plain,
            Some(FigureSign::Raised) => plain + 7,
            Some(FigureSign::Lowered) => plain - 7,
            Some(FigureSign::Natural) => of_letter(letter_at(plain)),
        }
    };
    let mut steps: Vec<(i32, i32)> = vec![(0, bass)];
    for figure in &chord {
        let step = (i32::from(figure.number) - 1).rem_euclid(7);
        if !steps.iter().any(|(known, _)| *known == step) {
            steps.push((step, place(figure)));
        }
    }
    // The root is the note over which all others stand in thirds.
    let height = |root: i32| move |(step, _): &(i32, i32)| (step - root).rem_euclid(7);
    let in_thirds = |root: &i32| steps.iter().all(|of| height(*root)(of) % 2 == 0);
    let roots = steps.iter().map(|(step, _)| *step).filter(in_thirds);
    let root = roots.min_by_key(|root| steps.iter().map(height(*root)).sum::<i32>())?;
    steps.sort_by_key(|of| height(root)(of));
    let tones: Vec<i32> = steps.iter().map(|(_, place)| *place).collect();
    Some(StatedChord {
        from: figures.from,
        until: figures.until,
        written: figures.written.clone(),
        root: *tones.first()?,
        tones,
        beside: ornaments.iter().map(place).collect(),
        bass: Some(bass),
        key: None,
    })
}

/// The figures of the chord that is meant, those that a short form leaves out among them, and apart
/// the suspended ones: 4 is 4-3, 9 is 9-8, and 7 before 6 over the same bass is 7-6.
fn meant(
    stack: &[StatedFigure],
    next: &[StatedFigure],
) -> Option<(Vec<StatedFigure>, Vec<StatedFigure>)> {
    let has = |number| stack.iter().any(|figure| figure.number == number);
    let goes_on = |number| next.iter().any(|figure| figure.number == number);
    let suspended = |number| match number {
        9 => true,
        7 => goes_on(6) && !goes_on(7) && !has(5) && !has(3),
        4 => !has(6) && !has(2) && !has(3),
        _ => false,
    };
    let (ornaments, mut chord): (Vec<StatedFigure>, Vec<StatedFigure>) =
        stack.iter().partition(|figure| suspended(figure.number));
    let held = |number| ornaments.iter().any(|figure| figure.number == number);
    let implied: &[u8] = if has(2) {
        // The bass itself is suspended in 5/2 and 7/2: no chord stands over it.
        if has(5) || has(7) {
            return None;
        }
        &[6, 4, 2]
    } else if held(7) {
        &[6, 3]
    } else if has(4) && has(3) {
        &[6, 4, 3]
    } else if has(4) && has(6) {
        &[6, 4]
    } else if has(6) {
        &[6, 3]
    } else {
        &[5, 3]
    };
    for number in implied {
        if !chord.iter().any(|figure| figure.number == *number) {
            // A suspension resolves to the note as the next figures have it.
            let sign = next.iter().find(|figure| figure.number == *number);
            let sign = sign.filter(|_| !ornaments.is_empty()).and_then(|f| f.sign);
            chord.push(StatedFigure {
                number: *number,
                sign,
            });
        }
    }
    Some((chord, ornaments))
}

/// The chord by its quality; `None` where it is none of the known ones.
fn known(chord: &StatedChord) -> Option<Chord> {
    // A ninth stands on a seventh chord.
    let tones: Vec<i32> = chord.tones.iter().take(4).map(|t| t - chord.root).collect();
    let quality = Quality::ALL
        .into_iter()
        .find(|quality| quality.tones() == tones)?;
    Some(Chord {
        root: chord.root,
        quality,
    })
}

/// The key as a local one; the old modes have none.
fn local(key: StatedKey) -> Option<LocalKey> {
    let minor = match key.mode {
        Mode::Major | Mode::Ionian => false,
        Mode::Minor | Mode::Aeolian => true,
        _ => return None,
    };
    Some(LocalKey {
        tonic: key.tonic,
        minor,
    })
}

/// Sets down in each slice what is stated there.
pub(super) fn said(score: &Score, texture: &Texture, slices: &mut [Slice]) {
    let stated = stated(score, texture);
    if stated.is_empty() {
        return;
    }
    for (slice, sonority) in slices.iter_mut().zip(texture.sonorities()) {
        let before = stated.partition_point(|chord| chord.from <= sonority.onset);
        let chord = before.checked_sub(1).and_then(|i| stated.get(i));
        let chord = chord.filter(|chord| sonority.onset < chord.until);
        slice.said = chord.and_then(|chord| Some((known(chord)?, chord.key.and_then(local))));
    }
}
