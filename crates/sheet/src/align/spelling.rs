//! Canonical spelling of pitches: capitals, ASCII signs, no natural.

use std::borrow::Cow;
use std::fmt::Write;

use crate::parts::{LETTERS, pitch};

/// The signs by their semitones, from two flats up.
const SIGNS: [&str; 5] = ["bb", "b", "", "#", "##"];

/// The pitch a text begins with, where it is not spelt in the canonical way: how many bytes it
/// takes, and how it is spelt.
pub(super) fn respelt(text: &str) -> Option<(usize, String)> {
    let (rest, (letter, sign, octave)) = pitch(text.as_bytes()).ok()?;
    let written = text.get(..text.len() - rest.len())?;
    let mut canonical = String::with_capacity(4);
    canonical.push(*LETTERS.get(usize::from(letter.unsigned_abs()))?);
    canonical.push_str(SIGNS.get(usize::try_from(sign + 2).ok()?)?);
    if let Some(octave) = octave {
        // Writing to a string does not fail.
        let _ = write!(canonical, "{octave}");
    }
    (canonical != written).then_some((written.len(), canonical))
}

/// A pitch, a pitch class or two pitches with dots between in canonical spelling.
pub(super) fn spelt(word: &str) -> String {
    let ends = word.split("..").map(|end| match respelt(end) {
        Some((written, canonical)) => canonical + end.get(written..).unwrap_or_default(),
        None => end.to_owned(),
    });
    ends.collect::<Vec<_>>().join("..")
}

/// A sign written as on paper in ASCII: `1♭` as `1b`.
pub(super) fn ascii_signs(word: &str) -> Cow<'_, str> {
    if word.is_ascii() {
        return Cow::Borrowed(word);
    }
    Cow::Owned(word.replace('♯', "#").replace('♭', "b"))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn pitches_are_respelt_where_they_need_it() {
        for (text, expected) in [
            ("g4", Some((2, "G4"))),
            ("F♯4.A", Some((5, "F#4"))),
            ("Fx", Some((2, "F##"))),
            ("F𝄪5", Some((6, "F##5"))),
            ("b♭♭3", Some((8, "Bbb3"))),
            ("bb", Some((2, "Bb"))),
            ("B♮4^", Some((5, "B4"))),
            ("Bb", None),
            ("F##4", None),
            ("H4", None),
            ("", None),
        ] {
            let found = respelt(text);
            let found = found.as_ref().map(|(n, text)| (*n, text.as_str()));
            assert_eq!(found, expected, "{text}");
        }
    }

    #[test]
    fn compasses_are_respelt_at_both_ends() {
        for (word, expected) in [
            ("e2..d♯4", "E2..D#4"),
            ("E2..d4", "E2..D4"),
            ("a♭5..b5", "Ab5..B5"),
            ("e♭", "Eb"),
            ("E2..D4", "E2..D4"),
        ] {
            assert_eq!(spelt(word), expected, "{word}");
        }
        assert_eq!(ascii_signs("2♭"), "2b");
    }
}
