//! Who says so: treatises, handbooks and counts in music.

use std::fmt;

/// How a source is known.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Known {
    /// The passage was read.
    Read,
    /// Known as another text gives it.
    AsGivenIn(&'static str),
    /// Quoted from memory.
    FromMemory,
    /// Counted in the music itself.
    Counted,
}

/// How a source stands to our rule.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Stand {
    /// It says the same.
    Same,
    /// It is stricter, in this.
    Stricter(&'static str),
    /// It is looser, in this.
    Looser(&'static str),
}

/// A source of a rule.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Source {
    /// Who.
    pub author: &'static str,
    /// The work.
    pub work: &'static str,
    /// Its year; 0 where it has none.
    pub year: u16,
    /// The place in it; may be empty.
    pub place: &'static str,
    /// How it is known.
    pub known: Known,
    /// How it stands to our rule.
    pub stand: Stand,
}

const fn source(author: &'static str, work: &'static str, year: u16, known: Known) -> Source {
    Source {
        author,
        work,
        year,
        place: "",
        known,
        stand: Stand::Same,
    }
}

impl Source {
    /// The same source at a place.
    #[must_use]
    pub const fn at(mut self, place: &'static str) -> Source {
        self.place = place;
        self
    }

    /// The same source, stricter than our rule.
    #[must_use]
    pub const fn stricter(mut self, how: &'static str) -> Source {
        self.stand = Stand::Stricter(how);
        self
    }

    /// The same source, looser than our rule.
    #[must_use]
    pub const fn looser(mut self, how: &'static str) -> Source {
        self.stand = Stand::Looser(how);
        self
    }
}

/// `F. J. Lehmann, A Treatise on Simple Counterpoint in Forty Lessons (1907), lesson XI; looser: …`
impl fmt::Display for Source {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        if !self.author.is_empty() {
            write!(f, "{}, ", self.author)?;
        }
        f.write_str(self.work)?;
        if self.year > 0 {
            write!(f, " ({})", self.year)?;
        }
        if !self.place.is_empty() {
            write!(f, ", {}", self.place)?;
        }
        match self.known {
            Known::Read => {}
            Known::AsGivenIn(text) => write!(f, " [as given in {text}]")?,
            Known::FromMemory => f.write_str(" [from memory]")?,
            Known::Counted => f.write_str(" [counted]")?,
        }
        match self.stand {
            Stand::Same => Ok(()),
            Stand::Stricter(how) => write!(f, "; stricter: {how}"),
            Stand::Looser(how) => write!(f, "; looser: {how}"),
        }
    }
}

/// Fux's treatise, Book II.
pub const FUX: Source = source(
    "J. J. Fux",
    "Gradus ad Parnassum",
    1725,
    Known::AsGivenIn("a workbook after A. Mann's translation, and in Grove"),
);
/// Counts in the figures of Fux's treatise.
pub const FUX_FIGURES: Source = source(
    "",
    "The figures of Fux's Gradus ad Parnassum",
    1725,
    Known::Counted,
);
/// Lehmann's forty lessons.
pub const LEHMANN: Source = source(
    "F. J. Lehmann",
    "A Treatise on Simple Counterpoint in Forty Lessons",
    1907,
    Known::Read,
);
/// Rockstro's articles in the first edition of Grove.
pub const GROVE: Source = source(
    "W. S. Rockstro",
    "articles in Grove, A Dictionary of Music and Musicians, 1st ed.",
    1883,
    Known::Read,
);
/// An open textbook.
pub const OPEN_MUSIC_THEORY: Source = source("", "Open Music Theory, 1st ed.", 2014, Known::Read);
/// An open textbook.
pub const BUTTERFIELD: Source = source(
    "S. Butterfield",
    "Integrated Musicianship: Theory",
    0,
    Known::Read,
);
/// The glossaries of a widely used handbook.
pub const KOSTKA_PAYNE: Source = source(
    "S. Kostka, D. Payne, B. Almén",
    "Tonal Harmony, glossaries",
    0,
    Known::Read,
);
/// An open textbook.
pub const HUTCHINSON: Source = source(
    "R. Hutchinson",
    "Music Theory for the 21st-Century Classroom",
    0,
    Known::Read,
);
/// Marking guidelines of an examination.
pub const ADVANCED_PLACEMENT: Source = source(
    "College Board",
    "AP Music Theory, scoring guidelines",
    2015,
    Known::Read,
);
/// Two writers of the 15th century.
pub const TINCTORIS_GAFFURIUS: Source = source(
    "J. Tinctoris, F. Gaffurius",
    "on dissonance in counterpoint",
    0,
    Known::AsGivenIn("a summary of both"),
);
/// Prout's counterpoint.
pub const PROUT_COUNTERPOINT: Source = source(
    "E. Prout",
    "Counterpoint: Strict and Free",
    1890,
    Known::FromMemory,
);
/// Prout's harmony.
pub const PROUT_HARMONY: Source = source(
    "E. Prout",
    "Harmony: Its Theory and Practice",
    1889,
    Known::FromMemory,
);
/// Counterpoint after Schenker.
pub const SALZER_SCHACHTER: Source = source(
    "F. Salzer, C. Schachter",
    "Counterpoint in Composition",
    1969,
    Known::FromMemory,
);
/// Jeppesen's study of the Palestrina style.
pub const JEPPESEN: Source = source(
    "K. Jeppesen",
    "Counterpoint: The Polyphonic Vocal Style of the Sixteenth Century",
    1931,
    Known::FromMemory,
);
/// A listening study of direct octaves.
pub const ARTHUR_HURON: Source = source(
    "C. Arthur, D. Huron",
    "The direct octaves rule, Musicae Scientiae (abstract)",
    2016,
    Known::Read,
);
/// An article on consecutives in the chorales.
pub const DAHN: Source = source(
    "L. Dahn",
    "Consecutive fifths and octaves in Bach chorales",
    2016,
    Known::Read,
);
/// Counts in the four-part chorales of J. S. Bach.
pub const BACH_CHORALES: Source = source(
    "",
    "370 four-part chorales of J. S. Bach",
    0,
    Known::Counted,
);
/// Counts in the chorales whose every place was read beside the rules.
pub const CHORALES_READ: Source = source(
    "",
    "156 four-part chorales of J. S. Bach, 2,487 bars",
    0,
    Known::Counted,
);
/// Counts in vocal polyphony of the 16th century.
pub const RENAISSANCE_WORKS: Source = source(
    "",
    "314 works of 16th-century vocal polyphony (Palestrina, Asola, Certon, Marenzio and others)",
    0,
    Known::Counted,
);
/// Choral handbooks, as the rule research lists them.
pub const CHORAL_HANDBOOKS: Source = source(
    "",
    "compasses in Piston, Prout, Aldwell & Schachter, Kostka & Payne",
    0,
    Known::FromMemory,
);
/// Orchestration handbooks.
pub const ORCHESTRATION_HANDBOOKS: Source = source(
    "",
    "compasses in orchestration handbooks",
    0,
    Known::FromMemory,
);
/// A training text.
pub const NAVY: Source = source(
    "",
    "Harmony, a training text of the US Navy",
    0,
    Known::Read,
);
/// An examiners' guide.
pub const AP_GUIDE: Source = source(
    "",
    "AP Music Theory, scoring guidelines for part-writing",
    2015,
    Known::Read,
);
/// A study of the listener's ear, by its rules.
pub const HURON: Source = source(
    "D. Huron",
    "Tone and Voice, Music Perception (its list of rules, from seminar slides)",
    2001,
    Known::Read,
);
/// A choral guide.
pub const CHORAL_GUIDE: Source = source("", "a guide to chorale writing", 0, Known::Read);
/// Cherubini's course.
pub const CHERUBINI: Source = source(
    "L. Cherubini",
    "A Course of Counterpoint and Fugue",
    1835,
    Known::FromMemory,
);
/// Conventions of part-writing.
pub const COLAROS: Source = source("Colaros", "Part-writing Conventions", 0, Known::Read);
/// An article on doublings.
pub const AARDEN_VON_HIPPEL: Source = source(
    "B. Aarden, P. von Hippel",
    "Rules for Chord Doubling (and Spacing), Music Theory Online 10.2",
    2004,
    Known::Read,
);
/// Altered notes in part-writing.
pub const FEEZELL: Source = source("Feezell", "Chromatic part-writing", 0, Known::Read);
/// Voice-leading guidelines.
pub const WIELAND: Source = source("Wieland", "More voice-leading guidelines", 0, Known::Read);
/// What the trade agrees on.
pub const COMMON_PRACTICE: Source = source("", "common practice", 0, Known::FromMemory);
/// The definition of our own notation.
pub const NOTATION: Source = source("", "the voice sheet, version 1", 0, Known::Read);
