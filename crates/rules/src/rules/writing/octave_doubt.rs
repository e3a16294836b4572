//! A carried octave figure makes a sixth or a seventh.
//!
//! Why: the octave figure holds along the row until another is written, so that `B4 C` falls a
//! seventh. Where the rising step was meant, the figure is missing; where the leap was meant,
//! writing the figure says so. What is found about the place of such a note is told with the doubt,
//! which is then as grave as the gravest of it.
//!
//! # Fails
//!
//! ```voices
//! S | B4 D |
//! //     ^ octave doubt (remark): S
//! ```
//!
//! # Passes
//!
//! ```voices
//! S | B4 C5 |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! S | C4 G |
//! ```
//!
//! # What to do
//!
//! Write the octave figure that is meant.

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
    when: "a note without a figure, a sixth or seventh from the note before",
    settings: &[remark(Style::Free, "either reading is lawful")],
};
