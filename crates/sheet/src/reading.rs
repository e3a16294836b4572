//! What a sheet says: the score, what could not be read, and where everything stands.

use partwright_score::{Key, Metre, Pitch, Score, Time};

use crate::Span;
use crate::harmony::{Chord, Figure};
use crate::lookup::Map;
use crate::problem::Problem;

/// Something the sheet states, with the place where it does.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Stated<T> {
    /// What is stated.
    pub value: T,
    /// Its words in the text, without the header's own word.
    pub span: Span,
}

/// How fast: `tempo 72`, `tempo 3/8 72`.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Tempo {
    /// The note value counted, in whole notes; a cell where none is named.
    pub unit: Option<Time>,
    /// Units a minute, 1 to 999.
    pub speed: u16,
}

/// The headers that were given. Keys, metres and the style stand in the score too.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Head {
    /// `title`, escapes resolved.
    pub title: Option<Stated<String>>,
    /// `subtitle`, escapes resolved.
    pub subtitle: Option<Stated<String>>,
    /// `by`, escapes resolved.
    pub by: Option<Stated<String>>,
    /// `style`: one of ours or a house style's name.
    pub style: Option<Stated<String>>,
    /// The first `key`.
    pub key: Option<Stated<Key>>,
    /// The first `metre`.
    pub metre: Option<Stated<Metre>>,
    /// The first `tempo`.
    pub tempo: Option<Stated<Tempo>>,
    /// `equal`: voices, by index, that may cross freely.
    pub equal: Option<Stated<Vec<usize>>>,
}

/// What a line between systems changes.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Changed {
    /// `key …`
    Key(Key),
    /// `metre …`
    Metre(Metre),
    /// `tempo …`
    Tempo(Tempo),
}

/// A change between systems.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct ChangeLine {
    /// The number of the bar from which it holds.
    pub bar: u32,
    /// The moment from which it holds.
    pub at: Time,
    /// What changes.
    pub what: Changed,
    /// Its value in the text.
    pub span: Span,
}

/// A footnote mark on a part: `*a`.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Mark {
    /// Its letters, without the asterisk.
    pub name: String,
    /// The voice it stands in, by index.
    pub voice: usize,
    /// The moment of its part.
    pub at: Time,
    /// From the asterisk to its last letter.
    pub span: Span,
}

/// A footnote: `*a licence RULE…: reason`.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Footnote {
    /// The letters of its mark.
    pub mark: String,
    /// The mark, with its asterisk.
    pub mark_span: Span,
    /// The rules or families it lifts, each with its place.
    pub rules: Vec<(String, Span)>,
    /// Why, escapes resolved.
    pub reason: String,
    /// The whole footnote.
    pub span: Span,
}

/// A licence among the headers: for the sheet, or for some voices.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct HeadLicence {
    /// The rules or families it lifts, each with its place.
    pub rules: Vec<(String, Span)>,
    /// The voices it is for, by index; empty for all.
    pub voices: Vec<usize>,
    /// Why, escapes resolved.
    pub reason: String,
    /// The whole header.
    pub span: Span,
}

/// The text of one set of voices in one verse, through the whole sheet.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Words {
    /// The voices that sing it, by index, as its rows name them.
    pub voices: Vec<usize>,
    /// The verse, where one is named.
    pub verse: Option<u8>,
    /// The stretches of time its rows stand over, each from and to.
    pub over: Vec<(Time, Time)>,
    /// What is written, in order of time.
    pub syllables: Vec<Syllable>,
}

/// What a words row writes for one note.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Syllable {
    /// The moment at which its note is struck (in the first of the voices).
    pub at: Time,
    /// Where it is written; its text is read by [`Reading::syllable`].
    pub span: Span,
}

/// A chord stated in a harmony row, or time without one.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Harmony {
    /// From when.
    pub at: Time,
    /// For how long; held cells are merged.
    pub length: Time,
    /// The chord meant; `None` where the row says there is none.
    pub chord: Option<Chord>,
    /// The key a `D:` in front of the chord changes to; its octave means nothing, and a small
    /// letter is minor.
    pub key: Option<(Pitch, bool)>,
    /// Its words in the text, a key in front included.
    pub span: Span,
}

/// A stack of the figured bass, or time without one.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Figures {
    /// From when.
    pub at: Time,
    /// For how long; held cells are merged.
    pub length: Time,
    /// The figures, highest first; empty where the row says there are none.
    pub stack: Vec<Figure>,
    /// The part in the text.
    pub span: Span,
}

/// What a sheet says.
///
/// Lookups between the text and moments of the score are methods: they go through the tree when
/// they are asked, since findings are few and notes are many.
#[derive(Clone, Debug)]
pub struct Reading {
    /// The score. Voices have no gaps from the beginning to the end, ties are merged, and pitches
    /// are as they sound.
    pub score: Score,
    /// What the sheet says badly, doubtfully or not yet, in order of place.
    pub problems: Vec<Problem>,
    /// The headers that were given.
    pub head: Head,
    /// Changes between systems, in order.
    pub changes: Vec<ChangeLine>,
    /// Every footnote mark on a part, in order of the text.
    pub marks: Vec<Mark>,
    /// Every footnote, in order of the text.
    pub footnotes: Vec<Footnote>,
    /// Every licence among the headers.
    pub licences: Vec<HeadLicence>,
    /// The text under the notes, one entry for each set of voices and verse.
    pub words: Vec<Words>,
    /// The chords meant, where the composer states them, in order of time.
    pub harmony: Vec<Harmony>,
    /// The figured bass, in order of time.
    pub figures: Vec<Figures>,
    /// Where everything stands.
    pub(crate) map: Map,
}
