//! Letters with their signs as places on the line of fifths: 0 for C, 1 for G, -1 for F, 6 for F#.
//!
//! On that line a chord, a scale and an interval are the same shape in every key, spelling kept.

use crate::Pitch;

/// A letter and sign by its place among the fifths; the octave means nothing.
#[must_use]
pub fn fifths(pitch: Pitch) -> i32 {
    of_letter(pitch.letter()) + 7 * i32::from(pitch.sign)
}

/// The place of a letter without a sign, 0 for C to 6 for B.
#[must_use]
pub const fn of_letter(letter: u8) -> i32 {
    match letter {
        0 => 0,
        1 => 2,
        2 => 4,
        3 => -1,
        4 => 1,
        5 => 3,
        _ => 5,
    }
}

/// The letter at a place, 0 for C to 6 for B.
#[must_use]
pub fn letter_at(place: i32) -> u8 {
    u8::try_from((place.rem_euclid(7) * 4).rem_euclid(7)).unwrap_or(0)
}

/// The name of a letter and sign at a place: `C`, `F#`, `Bb`.
#[must_use]
pub fn named(place: i32) -> String {
    let letters = ["F", "C", "G", "D", "A", "E", "B"];
    let letter = usize::try_from((place + 1).rem_euclid(7)).unwrap_or(0);
    let signs = (place + 1).div_euclid(7);
    let sign = if signs < 0 { "b" } else { "#" };
    let count = usize::try_from(signs.abs()).unwrap_or(0);
    let letter = letters.get(letter).copied().unwrap_or_default();
    format!("{letter}{}", sign.repeat(count))
}

/// The place of a letter, so many steps above another, among the seven places from `first` on:
/// what a signature makes of it.
#[must_use]
pub fn in_signature(first: i32, from: i32, steps: i32) -> i32 {
    first + (from + 2 * steps - first).rem_euclid(7)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn letters_and_places_agree() {
        for (name, place) in [
            ("C4", 0),
            ("G2", 1),
            ("F5", -1),
            ("B3", 5),
            ("F#4", 6),
            ("Bb3", -2),
            ("Ebb4", -10),
            ("C##5", 14),
        ] {
            let pitch: Pitch = name.parse().unwrap();
            assert_eq!(fifths(pitch), place, "{name}");
            assert_eq!(letter_at(place), pitch.letter(), "{name}");
            assert_eq!(named(place), pitch.class_name());
        }
    }

    #[test]
    fn a_signature_makes_the_letter_what_it_is() {
        // The third over D: F# with two sharps, F with none; the sixth over C# with two: A.
        assert_eq!(named(in_signature(1, 2, 2)), "F#");
        assert_eq!(named(in_signature(-1, 2, 2)), "F");
        assert_eq!(named(in_signature(1, 7, 5)), "A");
    }
}
