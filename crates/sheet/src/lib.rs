//! The voice sheet, our notation: text to a tree with spans, never failing; the tree to a score.
//!
//! [`Sheet::read`] takes text apart system by system; a bad part spoils that part only.
//! [`Sheet::lower`] turns the tree into a [`Reading`]: the score, what could not be read, and
//! where everything stands in the text.
//!
//! Inside, in the order of the way through: lines (`lines`), gathered into systems (`sheet`); rows
//! and their cells (`system`, `music`, `under`) into the tree (`tree`); the values of headers and
//! voice lines (`headers`, `voices`, `footnotes`); and from the tree to the score (`lower`).

mod align;
mod chars;
mod describe;
mod drawn;
mod edit;
mod explain;
mod footnotes;
mod harmony;
mod headers;
mod lines;
mod lookup;
mod lower;
mod music;
mod near;
mod numerals;
mod parts;
mod position;
mod problem;
mod reading;
mod sheet;
mod span;
mod system;
mod tree;
mod under;
mod voices;
mod write;

pub use align::{align, align_edits, try_align};
pub use drawn::{DrawnMark, drawn_marks};
pub use edit::{apply, note_edits};
pub use harmony::{Chord, Figure, Numeral};
pub use lookup::BarLine;
pub use position::{Lines, line_column};
pub use problem::{Edit, Offer, Problem, ProblemKind};
pub use reading::{
    ChangeLine, Changed, Figures, Footnote, Harmony, Head, HeadLicence, Mark, Reading, Stated,
    Syllable, Tempo, Words,
};
pub use sheet::Sheet;
pub use span::Span;
pub use write::{Heading, Sung, Written, write};

/// The largest sheet that is read, in bytes; a larger one is refused with that reason.
pub const LARGEST: usize = 8 << 20;
