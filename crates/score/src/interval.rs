//! The names of intervals.

use std::fmt;

use partwright_space::Gap;

/// An interval with a name, read off both lattices: the letters give the size, the semitones the
/// quality.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub struct Interval(pub Gap);

/// Semitones of the perfect or major interval of each size within the octave.
const LARGE: [i32; 7] = [0, 2, 4, 5, 7, 9, 11];
const SIZES: [&str; 22] = [
    "unison",
    "second",
    "third",
    "fourth",
    "fifth",
    "sixth",
    "seventh",
    "octave",
    "ninth",
    "tenth",
    "eleventh",
    "twelfth",
    "thirteenth",
    "fourteenth",
    "fifteenth",
    "sixteenth",
    "seventeenth",
    "eighteenth",
    "nineteenth",
    "twentieth",
    "twenty-first",
    "twenty-second",
];

impl Interval {
    /// Scale steps as it sounds, lower note to higher: 0 for a unison.
    #[must_use]
    pub fn size(self) -> i32 {
        self.0.sounding().steps.abs()
    }

    /// How far the quality is from perfect or major: 0; -1 minor; otherwise augmented (positive)
    /// or diminished. The second value tells whether the size takes "perfect".
    fn quality(self) -> (i32, bool) {
        let gap = self.0.sounding();
        // Letters that run against the sound (B# under C) count as a diminished size.
        let (steps, semitones) = if gap.steps < 0 {
            (-gap.steps, -gap.semitones)
        } else {
            (gap.steps, gap.semitones)
        };
        let simple = steps.rem_euclid(7);
        let large = LARGE
            .get(usize::try_from(simple).unwrap_or(0))
            .copied()
            .unwrap_or(0);
        let off = semitones - 12 * steps.div_euclid(7) - large;
        (off, matches!(simple, 0 | 3 | 4))
    }

    /// Smaller than minor or perfect.
    #[must_use]
    pub fn is_diminished(self) -> bool {
        matches!(self.quality(), (..=-1, true) | (..=-2, false))
    }

    /// Larger than major or perfect.
    #[must_use]
    pub fn is_augmented(self) -> bool {
        self.quality().0 > 0
    }

    /// Minor.
    #[must_use]
    pub fn is_minor(self) -> bool {
        self.quality() == (-1, false)
    }

    /// In full, with its article: `a perfect fifth`, `an octave`, `an augmented fourth`.
    #[must_use]
    pub fn with_article(self) -> String {
        let name = self.name();
        let article = if name.starts_with(['a', 'e', 'o']) {
            "an"
        } else {
            "a"
        };
        format!("{article} {name}")
    }

    /// With its article, as it is said of two notes that sound together: from a fourteenth on,
    /// the octaves that only stand between are left out (`a minor ninth` for a sixteenth).
    #[must_use]
    pub fn spoken(self) -> String {
        let gap = self.0.sounding();
        let octaves = if gap.steps > 12 {
            (gap.steps - 6) / 7
        } else {
            0
        };
        let nearer = Gap {
            steps: gap.steps - 7 * octaves,
            semitones: gap.semitones - 12 * octaves,
        };
        Interval(nearer).with_article()
    }

    /// A size by its name, with its article: `an octave`, `a twelfth`, `two octaves` for 14 steps.
    #[must_use]
    pub fn noun(steps: i32) -> String {
        if steps == 14 {
            return "two octaves".to_owned();
        }
        let noun = usize::try_from(steps).ok().and_then(|size| SIZES.get(size));
        match noun {
            Some(noun) if noun.starts_with(['o', 'e']) => format!("an {noun}"),
            Some(noun) => format!("a {noun}"),
            None => format!("a {}th", steps + 1),
        }
    }

    /// In full: `perfect fifth`, `minor tenth`, `octave`, `augmented fourth`.
    #[must_use]
    pub fn name(self) -> String {
        let size = usize::try_from(self.size()).unwrap_or(0);
        let noun = match SIZES.get(size) {
            Some(noun) => (*noun).to_owned(),
            None => format!("{}th", size + 1),
        };
        let adjective = match self.quality() {
            (0, true) if size % 7 == 0 => return noun,
            (0, true) => "perfect",
            (0, false) => "major",
            (-1, false) => "minor",
            (1, _) => "augmented",
            (-1, true) | (-2, false) => "diminished",
            (2, _) => "doubly augmented",
            (-2, true) | (-3, false) => "doubly diminished",
            (more, _) if more > 0 => "more than doubly augmented",
            _ => "more than doubly diminished",
        };
        format!("{adjective} {noun}")
    }
}

/// In short: `P5`, `m10`, `A4`, `d5`, `P1`, `P8`.
impl fmt::Display for Interval {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let quality = match self.quality() {
            (0, true) => "P".to_owned(),
            (0, false) => "M".to_owned(),
            (-1, false) => "m".to_owned(),
            (off, _) if off > 0 => "A".repeat(usize::try_from(off).unwrap_or(1)),
            (off, true) => "d".repeat(usize::try_from(-off).unwrap_or(1)),
            (off, false) => "d".repeat(usize::try_from(-off - 1).unwrap_or(1)),
        };
        write!(f, "{quality}{}", self.size() + 1)
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::Pitch;

    #[test]
    fn far_octaves_are_not_said() {
        for (low, high, spoken) in [
            ("C4", "D5", "a major ninth"),
            ("C3", "A4", "a major thirteenth"),
            ("D3", "C5", "a minor seventh"),
            ("C3", "C5", "an octave"),
            ("E2", "F4", "a minor ninth"),
            ("C2", "F4", "a perfect eleventh"),
            ("C2", "B4", "a major seventh"),
        ] {
            let (low, high): (Pitch, Pitch) = (low.parse().unwrap(), high.parse().unwrap());
            let interval = Interval(low.place().up_to(high.place()));
            assert_eq!(interval.spoken(), spoken, "{low} {high}");
        }
    }

    #[test]
    fn names_follow_the_trade() {
        // Interval names: common practice.
        for (low, high, name, short) in [
            ("C4", "C4", "unison", "P1"),
            ("C4", "C5", "octave", "P8"),
            ("G3", "D5", "perfect twelfth", "P12"),
            ("C4", "Eb5", "minor tenth", "m10"),
            ("F4", "B4", "augmented fourth", "A4"),
            ("B3", "F4", "diminished fifth", "d5"),
            ("B3", "Ab4", "diminished seventh", "d7"),
            ("C4", "C#4", "augmented unison", "A1"),
            ("C4", "Fb4", "diminished fourth", "d4"),
            ("Cb4", "F##4", "more than doubly augmented fourth", "AAA4"),
        ] {
            let (low, high): (Pitch, Pitch) = (low.parse().unwrap(), high.parse().unwrap());
            for gap in [
                low.place().up_to(high.place()),
                high.place().up_to(low.place()),
            ] {
                assert_eq!(Interval(gap).name(), name);
                assert_eq!(Interval(gap).to_string(), short);
            }
        }
    }
}
