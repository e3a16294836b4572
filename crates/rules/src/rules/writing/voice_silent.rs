//! A declared voice has no row in a system.
//!
//! Why: it is silent there, which may be meant, and may be a row forgotten.
//!
//! # Fails
//!
//! ```voices
//! voice S soprano
//! voice B bass
//!
//! S | G4 A |
//! B | G3 F |
//!
//!    S | B4 C5 |
//! // ^ voice silent (remark): B
//! ```
//!
//! # Passes
//!
//! ```voices
//! voice S soprano
//! voice B bass
//!
//! S | G4 A |
//! B | G3 F |
//!
//! S | B4 C5 |
//! B | _ |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! S | G4 A |
//! B | G3 F |
//! ```
//!
//! # What to do
//!
//! Write the row, with `_` for its bars if the silence is meant.

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
    when: "a system without a row for a declared voice",
    settings: &[remark(Style::Free, "silence is lawful")],
};
