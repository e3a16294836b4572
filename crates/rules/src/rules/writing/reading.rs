//! The text cannot be read as a voice sheet.
//!
//! Why: a part that cannot be read is no part of the music. It is left out, and the rest of the
//! sheet is checked all the same.
//!
//! # Fails
//!
//! ```voices
//! S | G4 H4 | A |
//! //     ^^ reading: S
//! ```
//!
//! # Passes
//!
//! ```voices
//! S | G4 B | A |
//! ```
//!
//! # Does not apply
//!
//! Time not written yet is no mistake:
//!
//! ```voices
//! S | G4 ? | A |
//! ```
//!
//! # What to do
//!
//! Write what the message asks for; the nearest right form is offered where there is one.

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
    when: "wherever the notation is broken",
    settings: &[fault(
        Style::Free,
        "what cannot be read cannot be checked or sung",
    )],
};
