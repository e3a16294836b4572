//! The catalogue: one file a rule, and the styles that say which rules apply and how strictly.
//!
//! A rule never sees text and never computes an interval: it reads the steps that
//! `partwright_score` laid out, and names voices and moments.

mod catalogue;
mod finding;
mod found;
pub mod list;
mod page;
mod rule;
pub mod source;
mod style;
mod told;
mod view;

pub use catalogue::{Entry, catalogue, entry, family_of, is_family};
pub use finding::{Finding, Role, Spot};
pub use found::Found;
pub use page::{Example, Page};
pub use rule::{Case, FAMILIES, Looks, NumberOf, Rule, Severity};
pub use source::Source;
pub use style::{Number, Override, STYLES, Setting, Strictness, Style};
pub use view::{
    Altered, Cadence, Chord, Crossing, Direct, Discord, Doubled, Doubling, HighPoint, LastMove,
    Leaving, Level, Line, LineMove, Member, Minim, MinorDegree, Numbers, Over, PairMove,
    ParallelRun, Passage, Passing, Piece, Quick, Reached, Run, SixFive, Sounding, StatedHarmony,
    Stranger, Stretch, Stroke, Succession, Tessitura, Together, Tone, Value,
};

/// What every rule file needs.
pub mod prelude {
    pub use partwright_analysis::Figure;
    pub use partwright_analysis::figures::Near;
    pub use partwright_analysis::harmony::Quality;
    pub use partwright_score::{Interval, Note, Pair, Time};
    pub use partwright_space::{Consecutive, Family, Motion, Way};

    pub use crate::finding::{Role, Spot};
    pub use crate::found::Found;
    pub use crate::rule::{Case, Looks, NumberOf, Rule, Severity};
    pub use crate::source::{self, Source};
    pub use crate::style::{Setting, Style, allow, fault, remark, weakness};
    pub use crate::view::{
        Altered, Chord, CrossRelation, Direct, Discord, Doubling, LastMove, Leaving, Level, Line,
        LineMove, Member, MinorDegree, Numbers, Over, PairMove, ParallelRun, Passage, Piece,
        Reached, SixFour, SixFourUse, SixFourWant, Sounding, StatedHarmony, Stroke, Succession,
        Tone,
    };
}
