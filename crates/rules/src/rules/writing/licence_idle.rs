//! A licence lifts nothing.
//!
//! Why: a licence without a finding is a reason for something that no longer happens: the music
//! was changed and the licence forgotten, or it stands on the wrong note.
//!
//! # Fails
//!
//! ```voices
//! S | D5 C*a |
//! //      ^^ licence idle (weakness)
//! B | G3 A   |
//! *a licence parallel-fifths: the drovers' horns
//! ```
//!
//! # Passes
//!
//! ```voices
//! S | D5 E*a |
//! B | G3 A   |
//! *a licence parallel-fifths: the drovers' horns
//! ```
//!
//! # Does not apply
//!
//! A mark without a footnote is a mistake of writing:
//!
//! ```voices
//! S | D5 E |
//! B | G3 B |
//! ```
//!
//! # What to do
//!
//! Remove the licence, or move its mark to the note it is meant for.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Text,
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[source::NOTATION],
};

static ORDINARY: Case = Case {
    name: "",
    when: "a footnote or a licence line none of whose rules stands where it points",
    settings: &[weakness(
        Style::Free,
        "it says something about the music that is not so",
    )],
};
