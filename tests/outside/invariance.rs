//! The same music in another dress has the same findings.

use partwright_check::{Checked, Wishes, check_score};
use partwright_rules::Style;
use partwright_score::{Key, Score, Sound};
use partwright_sheet::{Heading, write};

use crate::scores::set;
use crate::treatise::figures;

/// Rules that mind where the music stands: the signs of the old style belong to its signatures,
/// and thirds crowd below a fixed pitch.
const BY_PITCH: [&str; 2] = ["foreign-accidental", "low-crowding"];

/// A finding without its words: rule, severity, place, voices.
type Bare = (&'static str, String, String, Vec<usize>);

fn bare(score: &Score, style: Style) -> Vec<Bare> {
    let findings = check_score(score, &Wishes::of_style(style));
    let kept = findings.into_iter().filter(|f| !BY_PITCH.contains(&f.rule));
    kept.map(|f| {
        let place = f.place.map(|p| format!("{} {}", p.bar, p.beat));
        (
            f.rule,
            f.severity.to_string(),
            place.unwrap_or_default(),
            f.voices,
        )
    })
    .collect()
}

/// Up by so many letters and semitones.
pub(crate) fn transposed(score: &Score, steps: i16, semitones: i32) -> Score {
    let moved = |pitch: partwright_score::Pitch| {
        let mut to = partwright_score::Pitch {
            step: pitch.step + steps,
            sign: 0,
        };
        let off = pitch.place().semitone + semitones - to.place().semitone;
        to.sign = i8::try_from(off).unwrap();
        to
    };
    let mut score = score.clone();
    for voice in &mut score.voices {
        for note in &mut voice.notes {
            if let Sound::Pitch(pitch) = note.sound {
                note.sound = Sound::Pitch(moved(pitch));
            }
        }
    }
    for change in &mut score.keys {
        if let Key::Of { tonic, .. } = &mut change.value {
            *tonic = moved(*tonic);
        }
    }
    // Letters and semitones tell how far that is among the fifths: a fifth is 4 and 7.
    let up = 7 * semitones - 12 * i32::from(steps);
    for chord in &mut score.harmony {
        let places = chord.tones.iter_mut().chain(&mut chord.beside);
        places.for_each(|place| *place += up);
        chord.root += up;
        chord.bass = chord.bass.map(|bass| bass + up);
        if let Some(key) = &mut chord.key {
            key.tonic += up;
        }
    }
    score
}

fn pieces() -> Option<Vec<(crate::scores::Piece, Style)>> {
    let renaissance = set("renaissance")?.into_iter().step_by(8);
    let motets = renaissance.map(|piece| (piece, Style::Motet));
    Some(figures()?.into_iter().chain(motets).collect())
}

#[test]
fn transposed_music_has_the_same_findings() {
    let Some(pieces) = pieces() else { return };
    for (piece, style) in &pieces {
        let as_it_is = bare(&piece.score, *style);
        for (steps, semitones) in [(2, 3), (-1, -2), (7, 12)] {
            let other = bare(&transposed(&piece.score, steps, semitones), *style);
            let only = |a: &[Bare], b: &[Bare]| -> Vec<Bare> {
                a.iter().filter(|f| !b.contains(f)).cloned().collect()
            };
            let unlike = (only(&as_it_is, &other), only(&other, &as_it_is));
            assert_eq!(unlike, (vec![], vec![]), "{} by {steps} steps", piece.id);
        }
    }
    println!(
        "outside: {} pieces transposed have the same findings",
        pieces.len()
    );
}

#[test]
fn voices_under_other_names_have_the_same_findings() {
    let Some(pieces) = pieces() else { return };
    for (piece, style) in &pieces {
        let mut other = piece.score.clone();
        for (i, voice) in other.voices.iter_mut().enumerate() {
            voice.label = format!("Lamp{i}");
        }
        assert_eq!(
            bare(&other, *style),
            bare(&piece.score, *style),
            "{}",
            piece.id
        );
    }
}

#[test]
fn written_out_and_aligned_music_has_the_same_findings() {
    let Some(pieces) = pieces() else { return };
    let mut told = 0;
    for (piece, style) in &pieces {
        let wishes = Wishes::of_style(*style);
        let text = write(&piece.score, &Heading::default()).text;
        let aligned = partwright_sheet::align(&text);
        let of = |text: &str| {
            let checked = Checked::text(text, &wishes);
            let findings = checked.findings.iter();
            findings
                .map(|f| {
                    (
                        f.rule,
                        f.severity,
                        f.place.map(|p| (p.bar, p.beat)),
                        f.voices.clone(),
                    )
                })
                .collect::<Vec<_>>()
        };
        let spread = aligned.replace(" | ", "   |  ");
        let (a, b) = (of(&aligned), of(&spread));
        assert_eq!(a, b, "{}", piece.id);
        told += a.len();
    }
    println!(
        "outside: {} sheets spread and aligned have the same {told} findings",
        pieces.len()
    );
}
