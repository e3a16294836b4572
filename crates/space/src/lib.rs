//! Chord-space geometry: points, vectors and quotients. Integers, no music.
//!
//! A pair of voices is a point in the plane; a step of the pair is a vector; rotated by 45 degrees
//! the vector has a component *along* the diagonal and one *across* it, and these two tell how
//! the pair moves ([`Leg`], [`Vector`]). Everything about motion is computed on two lattices at
//! once: scale steps and semitones ([`Place`]).
//!
//! Octaves and the order of the voices are divided out step by step:
//!
//! | space | what is forgotten | here |
//! | --- | --- | --- |
//! | plane | nothing | [`PlanePoint`] |
//! | torus | octaves | [`on_torus`] |
//! | half-plane | the order of the voices | [`unordered`] |
//! | strip, prism and so on | both | [`StripPoint`], [`PrismPoint`], [`AlcovePoint`], [`Chord`] |
//!
//! Between two chords there are voice leadings ([`Leading`]): the least of them ([`least`]), all
//! without crossings ([`crossing_free`]), all ([`in_order`]); in register and with its limits
//! ([`Placing`]); and through a row of chords ([`Passage`]). [`draw::path`] cuts the straight path
//! of a step for a picture of one of the spaces, and [`count`] knows how many chords there are.
//!
//! Units: a pitch is a whole number of lattice points, [`Octave`] of them to the octave. L2 sizes
//! are squared, to stay whole. Whatever is equally good is given together, in ascending order,
//! never one picked in silence. Nothing panics on its input: what cannot be answered is a
//! [`SpaceError`], and differences at the far ends of `i32` stop there.
//!
//! Sources: D. Tymoczko, "The Geometry of Musical Chords", Science 313 (2006), with its supporting
//! text; C. Callender, I. Quinn and D. Tymoczko, "Generalized Voice-Leading Spaces", Science 320
//! (2008); D. Tymoczko, "Scale Theory, Serial Theory and Voice Leading", Music Analysis 27 (2008);
//! J. Delon, J. Salomon and A. Sobolevski, SIAM J. Appl. Math. 70 (2010), for convexity on the
//! circle; K. G. Murty, Oper. Res. 16 (1968), for assignments in order. The first three are known
//! in part, the last two by their abstracts.

mod alcove;
mod bijective;
mod chord;
mod consecutive;
pub mod count;
pub mod draw;
mod error;
mod evenness;
mod lattice;
mod leading;
mod least;
mod meeting;
mod motion;
mod norm;
mod octave;
mod ordered;
mod passage;
mod plane;
mod prism;
mod register;
mod staircase;
mod strip;

pub use alcove::AlcovePoint;
pub use bijective::turned;
pub use chord::Chord;
pub use consecutive::{Consecutive, Family, Way};
pub use error::SpaceError;
pub use evenness::Zeta;
pub use lattice::{Gap, Place};
pub use leading::{Leading, Pair};
pub use least::{CrossingFree, Doubling, Least, crossing_free, in_order, least, least_size};
pub use meeting::{crossed, side};
pub use motion::{Leg, Motion, Vector};
pub use norm::Norm;
pub use octave::Octave;
pub use ordered::InOrder;
pub use passage::{Passage, Ways};
pub use plane::{PlanePoint, on_torus, unordered};
pub use prism::PrismPoint;
pub use register::{AllowAll, Part, Placing, Placings, Tone, Voicing};
pub use strip::StripPoint;
