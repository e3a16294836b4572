//! Chord-space geometry: points, vectors and quotients. Integers, no music.
//!
//! A pair of voices is a point in the plane; a step of the pair is a vector; rotated by 45 degrees
//! the vector has a component *along* the diagonal and one *across* it, and these two tell how
//! the pair moves. Everything is computed on two lattices at once: scale steps and semitones.

mod consecutive;
mod lattice;
mod meeting;
mod motion;

pub use consecutive::{Consecutive, Family, Way};
pub use lattice::{Gap, Place};
pub use meeting::{crossed, side};
pub use motion::{Leg, Motion, Vector};
