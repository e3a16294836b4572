//! Exact time, in whole notes.

use num_rational::Ratio;

/// A moment or a length as an exact fraction of a whole note.
pub type Time = Ratio<i64>;

/// The beginning, or no length at all.
pub const ZERO: Time = Ratio::new_raw(0, 1);

/// A time as text: `3/4`, or `2` where it is whole.
#[must_use]
pub fn show_time(time: Time) -> String {
    if time.is_integer() {
        time.numer().to_string()
    } else {
        format!("{}/{}", time.numer(), time.denom())
    }
}
