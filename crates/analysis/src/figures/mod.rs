//! Dissonances, and the figures that account for them.
//!
//! A dissonance is two notes that sound together and disagree. Each figure is a question to one of
//! them: how it came, where it stands in the bar, how it goes on. They are asked in the order a
//! handbook tells them; the first that fits is the reading, and [`tried`] tells what the others
//! missed.

mod anticipation;
mod appoggiatura;
mod cambiata;
mod diminished_fifth;
mod double_neighbour;
mod escape;
mod fourth;
mod neighbour;
mod passing;
mod pedal;
mod place;
mod suspension;
mod sweep;

use partwright_score::{Score, Texture, Time};
use partwright_space::Gap;

pub use place::Place;
pub use suspension::{Held, Near, near_suspension};
pub(crate) use sweep::dissonances;

/// What a dissonant note is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Figure {
    /// It fills a step between two notes, going on the same way.
    Passing {
        /// It stands on a stronger moment than a note beside it.
        accented: bool,
    },
    /// It leaves a note by step and comes back to it.
    Neighbour {
        /// Above the main note.
        upper: bool,
        /// It stands on a stronger moment than a note beside it.
        accented: bool,
    },
    /// One of the two middle notes that go round the main note before it comes back.
    DoubleNeighbour,
    /// Left by a third onward; the line then turns back by step.
    Cambiata {
        /// Upward: the textbooks' inverse.
        rising: bool,
        /// A second step follows, as in the five notes of the strict form.
        whole: bool,
    },
    /// Reached by step and left by a leap the other way.
    Escape,
    /// It sounds the next strong note early.
    Anticipation,
    /// Held over from a consonance, and resolved down by step.
    Suspension(Held),
    /// Held over from a consonance, and resolved up by step.
    Retardation(Held),
    /// Reached by leap on a strong moment, left by step.
    Appoggiatura,
    /// A fourth over a held bass that is held in its turn and then resolves down.
    ConsonantFourth,
    /// A diminished fifth over the lowest voice that closes to a third.
    DiminishedFifth,
    /// The lowest voice holds its note while the others change.
    Pedal,
}

impl Figure {
    /// What a musician calls it.
    #[must_use]
    pub const fn name(self) -> &'static str {
        match self {
            Figure::Passing { accented: false } => "passing note",
            Figure::Passing { accented: true } => "accented passing note",
            Figure::Neighbour { upper: true, .. } => "upper neighbour",
            Figure::Neighbour { upper: false, .. } => "lower neighbour",
            Figure::DoubleNeighbour => "double neighbour",
            Figure::Cambiata { rising: false, .. } => "cambiata",
            Figure::Cambiata { rising: true, .. } => "rising cambiata",
            Figure::Escape => "escape note",
            Figure::Anticipation => "anticipation",
            Figure::Suspension(_) => "suspension",
            Figure::Retardation(_) => "retardation",
            Figure::Appoggiatura => "appoggiatura",
            Figure::ConsonantFourth => "consonant fourth",
            Figure::DiminishedFifth => "diminished fifth that closes",
            Figure::Pedal => "pedal",
        }
    }
}

/// Which of the two notes is the figure.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Reading {
    /// Its voice, by index.
    pub voice: usize,
    /// Its note, by index in that voice.
    pub note: usize,
    /// What it is.
    pub figure: Figure,
}

/// Two notes that sound together and disagree.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Dissonance {
    /// The sonority in which they first do.
    pub sonority: usize,
    /// When that begins, in whole notes from the start.
    pub at: Time,
    /// The voice nearer the top of the score, and its note by index.
    pub upper: (usize, usize),
    /// The voice nearer its foot, and its note.
    pub lower: (usize, usize),
    /// One of them is the lowest voice, or the lowest above a pedal.
    pub over_bass: bool,
    /// The interval; measured from the lowest voice where one of them is that.
    pub gap: Gap,
    /// The first figure that fits; `None` where none does.
    pub reading: Option<Reading>,
}

impl Dissonance {
    /// The two notes, the upper voice first.
    #[must_use]
    pub const fn notes(&self) -> [(usize, usize); 2] {
        [self.upper, self.lower]
    }

    /// The other voice.
    #[must_use]
    pub const fn other(&self, voice: usize) -> (usize, usize) {
        if voice == self.upper.0 {
            self.lower
        } else {
            self.upper
        }
    }
}

/// A question to a dissonant note: the figure it is, or what is missing, in a few words.
type Question = fn(&Place<'_>) -> Result<Figure, &'static str>;

/// The figures in the order they are asked, with their names. The struck ones of weak moments
/// come first (but for the double neighbour, whose second note may be strong); a held note is asked for its resolution down before the note struck against it is
/// taken for an accented ornament, and for one up only after. A pedal is asked before accented
/// ornaments under long notes, and after them under short ones.
const QUESTIONS: [(&str, Question); 17] = [
    ("diminished fifth that closes", diminished_fifth::together),
    ("passing note", passing::unaccented),
    ("consonant fourth", fourth::ask),
    ("diminished fifth that closes", diminished_fifth::ask),
    ("neighbour", neighbour::unaccented),
    ("cambiata", cambiata::ask),
    ("anticipation", anticipation::ask),
    ("suspension", suspension::ask),
    ("double neighbour", double_neighbour::ask),
    ("pedal", pedal::under_long),
    ("accented passing note", passing::accented),
    ("accented neighbour", neighbour::accented),
    ("suspension", suspension::ask_relieved),
    ("retardation", suspension::ask_upward),
    ("pedal", pedal::ask),
    ("escape note", escape::ask),
    ("appoggiatura", appoggiatura::ask),
];

/// One figure asked of one note, and what it missed.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Tried {
    /// The voice asked.
    pub voice: usize,
    /// The figure's name.
    pub figure: &'static str,
    /// What was missing; `None` where it fits.
    pub missing: Option<&'static str>,
}

/// Every figure asked of both notes, in order, up to the one that fits.
#[must_use]
pub fn tried(score: &Score, texture: &Texture, dissonance: &Dissonance) -> Vec<Tried> {
    let mut list = Vec::new();
    for (figure, question) in QUESTIONS {
        for place in Place::both(score, texture, dissonance) {
            let missing = question(&place).err();
            list.push(Tried {
                voice: place.voice,
                figure,
                missing,
            });
            if missing.is_none() {
                return list;
            }
        }
    }
    list
}
