//! Time that is not written yet.
//!
//! Why: nothing is found about unwritten time or needs it, so a sheet in the making stays quiet;
//! before it goes out, nothing should be left open. A house style can raise this to a fault.
//!
//! # Fails
//!
//! ```voices
//! metre 2/4
//!
//! S | G4 A | B - |
//! B | G3 ? | G - |
//! //     ^ unwritten (remark): B
//! ```
//!
//! # Passes
//!
//! ```voices
//! metre 2/4
//!
//! S | G4 A | B - |
//! B | G3 _ | G - |
//! ```
//!
//! # Does not apply
//!
//! A pickup, and the last bar that makes up for it:
//!
//! ```voices
//! metre 2/4
//!
//! S | D4 | G A | B ||
//! ```
//!
//! # What to do
//!
//! Write it, or write `_` where silence is meant.

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
    when: "a `?`, a bar short of its cells, an empty bar, a row with fewer bars than the others",
    settings: &[remark(Style::Free, "a draft is no mistake")],
};
