//! Repairs: the nearest clean notes for a finding, and the text edits that write them.
//!
//! A mend changes the pitch of one note. It is offered only after the music around it was checked
//! again with the change made: the finding is gone, and nothing at or above weakness came in the
//! steps before, at and after, over all pairs.

mod candidates;
mod mend;
mod window;

pub use mend::{MOST, Mend, mends};
