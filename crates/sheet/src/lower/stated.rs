//! The rows of harmony and figures as the score has them: numerals become notes.

use partwright_score::fifths::fifths;
use partwright_score::{
    FigureSign, Key, Mode, StatedChord, StatedFigure, StatedFigures, StatedKey, Time,
};

use super::Lowering;
use crate::harmony::{Figure, key_prefix};
use crate::numerals::{cadential, resolve};
use crate::reading::Harmony;
use crate::span::Span;

/// Puts what the rows state into the score.
pub(super) fn stated(lowering: &mut Lowering<'_>, keys: &[(Time, Span)]) {
    harmony(lowering, keys);
    let figures = &lowering.reading.figures;
    let figures = figures.iter().filter(|f| !f.stack.is_empty());
    let figures = figures.map(|figures| {
        let written: Vec<String> = figures.stack.iter().map(Figure::to_string).collect();
        StatedFigures {
            from: figures.at,
            until: figures.at + figures.length,
            written: written.join("/"),
            stack: figures.stack.iter().map(figure).collect(),
        }
    });
    lowering.reading.score.figures = figures.collect();
}

fn figure(figure: &Figure) -> StatedFigure {
    StatedFigure {
        number: figure.number.unwrap_or(3),
        sign: figure.sign.map(|sign| match sign {
            '#' => FigureSign::Raised,
            'b' => FigureSign::Lowered,
            _ => FigureSign::Natural,
        }),
    }
}

/// The key in force: in the row, or the sheet's where that changed since.
#[derive(Clone, Copy)]
enum Told {
    In(StatedKey),
    /// `key none`, or nothing is stated.
    Nowhere,
    /// It is written, and could not be read.
    Unread,
}

/// The keys from moment to moment, those of the sheet before those of the row at the same time.
fn told(lowering: &Lowering<'_>, row: &[(Time, Span)]) -> Vec<(Time, Told)> {
    let keys = lowering.reading.score.keys.iter().map(|change| {
        let told = match change.value {
            Key::Of { tonic, mode, .. } => Told::In(StatedKey {
                tonic: fifths(tonic),
                mode,
            }),
            Key::None => Told::Nowhere,
        };
        (change.from, told)
    });
    let row = row.iter().map(|(at, span)| {
        let told = match key_prefix(lowering.at(*span).as_bytes()) {
            Some((tonic, minor)) => Told::In(StatedKey {
                tonic: fifths(tonic),
                mode: if minor { Mode::Minor } else { Mode::Major },
            }),
            None => Told::Unread,
        };
        (*at, told)
    });
    let mut told: Vec<(Time, Told)> = keys.chain(row).collect();
    told.sort_by_key(|(at, _)| *at);
    told
}

fn harmony(lowering: &mut Lowering<'_>, keys: &[(Time, Span)]) {
    let reading = &lowering.reading;
    let told = told(lowering, keys);
    let mut lost = None;
    let mut list = Vec::new();
    for (index, item) in reading.harmony.iter().enumerate() {
        let Some(chord) = &item.chord else { continue };
        let until = item.at + item.length;
        let since = told.partition_point(|(at, _)| *at <= item.at);
        let before = since.checked_sub(1).and_then(|last| told.get(last));
        let key = match before.map_or(Told::Nowhere, |(_, told)| *told) {
            Told::In(key) => key,
            Told::Unread => continue,
            Told::Nowhere => {
                lost.get_or_insert((item.span, chord.to_string()));
                continue;
            }
        };
        let next = reading.harmony.get(index + 1).filter(|n| n.key.is_none());
        let next = next.and_then(|next: &Harmony| next.chord.as_ref());
        let notes = cadential(chord, next, key).unwrap_or_else(|| resolve(chord, key));
        list.push(StatedChord {
            from: item.at,
            until,
            written: chord.to_string(),
            root: notes.root,
            tones: notes.tones,
            beside: notes.beside,
            bass: notes.bass,
            key: Some(key),
        });
    }
    lowering.reading.score.harmony = list;
    if let Some((span, chord)) = lost {
        let message = format!(
            "No key is stated here, so {chord} names no notes. Write the key among the headers, as \
             in key G major, or in front of the chord, as in G: {chord}."
        );
        lowering.wrong(span, &message, &[]);
    }
}
