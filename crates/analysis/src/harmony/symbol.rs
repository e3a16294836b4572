//! Chords in the short form of a lead sheet.

use super::chord::{Chord, Quality};
use crate::mode::named;

impl Chord {
    /// `Am7`; with the place among the fifths of another lowest note, `Am7/E`.
    #[must_use]
    pub fn symbol(self, bass: Option<i32>) -> String {
        let quality = match self.quality {
            Quality::Major => "",
            Quality::Minor => "m",
            Quality::Diminished => "dim",
            Quality::Augmented => "aug",
            Quality::DominantSeventh => "7",
            Quality::MajorSeventh => "maj7",
            Quality::MinorSeventh => "m7",
            Quality::HalfDiminishedSeventh => "m7b5",
            Quality::DiminishedSeventh => "dim7",
            Quality::ItalianSixth => " It6",
            Quality::GermanSixth => " Ger6",
            Quality::FrenchSixth => " Fr6",
        };
        let under = bass.filter(|&bass| bass != self.called_by());
        let under = under.map_or(String::new(), |bass| format!("/{}", named(bass)));
        format!("{}{quality}{under}", named(self.called_by()))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn symbols_as_on_a_lead_sheet() {
        let chord = |root, quality| Chord { root, quality };
        for (chord, bass, symbol) in [
            (chord(0, Quality::Major), Some(0), "C"),
            (chord(3, Quality::MinorSeventh), Some(4), "Am7/E"),
            (chord(6, Quality::HalfDiminishedSeventh), None, "F#m7b5"),
            (chord(-2, Quality::MajorSeventh), Some(-2), "Bbmaj7"),
            (chord(6, Quality::GermanSixth), Some(-4), "Ab Ger6"),
        ] {
            assert_eq!(chord.symbol(bass), symbol);
        }
    }
}
