//! Consonant or dissonant: by letters and semitones, against the lowest voice or among upper ones.
//!
//! The strict style's reckoning (Fux, Gradus ad Parnassum, Book I; Grove, Dictionary of Music,
//! "Strict Counterpoint"): a fourth is dissonant over the lowest voice, and among upper voices
//! consonant where both agree with the lowest.

use partwright_space::Gap;

/// A gap within one octave: scale steps 0 to 6, semitones 0 to 11.
fn class(gap: Gap) -> (i32, i32) {
    (gap.steps.rem_euclid(7), gap.semitones.rem_euclid(12))
}

/// Consonant over the lowest voice; the gap is measured from that voice up.
#[must_use]
pub fn over_bass(gap: Gap) -> bool {
    matches!(class(gap), (0, 0) | (2, 3 | 4) | (4, 7) | (5, 8 | 9))
}

/// Consonant between two upper voices that both agree with the lowest.
#[must_use]
pub fn among_upper(gap: Gap) -> bool {
    over_bass(gap) || matches!(class(gap), (3, 5 | 6) | (4, 6))
}

/// A perfect fourth within the octave.
#[must_use]
pub fn is_fourth(gap: Gap) -> bool {
    class(gap) == (3, 5)
}

/// A diminished fifth within the octave.
#[must_use]
pub fn is_diminished_fifth(gap: Gap) -> bool {
    class(gap) == (4, 6)
}

/// A tritone written as a diminished fifth or an augmented fourth.
#[must_use]
pub fn is_tritone(gap: Gap) -> bool {
    matches!(class(gap), (3 | 4, 6))
}

#[cfg(test)]
mod tests {
    use super::*;

    const fn gap(steps: i32, semitones: i32) -> Gap {
        Gap { steps, semitones }
    }

    #[test]
    fn the_fourth_depends_on_where_it_stands() {
        assert!(!over_bass(gap(3, 5)) && among_upper(gap(3, 5)));
        assert!(!over_bass(gap(10, 17)) && among_upper(gap(10, 17)));
    }

    #[test]
    fn spelling_decides() {
        assert!(over_bass(gap(5, 8)) && !among_upper(gap(4, 8)));
        assert!(over_bass(gap(2, 4)) && !among_upper(gap(3, 4)));
    }

    #[test]
    fn a_gap_downward_is_its_complement() {
        // A fourth below a voice is a fifth above it once the octave is put right.
        assert!(over_bass(gap(-3, -5)) && !over_bass(gap(-4, -7)));
    }
}
