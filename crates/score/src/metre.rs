//! Metres: how long a bar and a cell are, and how strong a moment is.

use std::fmt;

use crate::{Time, ZERO};

/// A metre. One cell is one unit of the lower figure unless `by` says otherwise.
#[derive(Clone, Debug, PartialEq, Eq, Hash)]
pub struct Metre {
    /// Upper figure; 0 for `metre free`.
    count: u16,
    /// Lower figure.
    unit: u16,
    /// Length of one cell in whole notes.
    cell: Time,
    /// Groups in units of the lower figure as written, `3+2`; empty where not written.
    groups: Vec<u16>,
    /// Where groups begin, as lengths from the bar line; without the bar line itself.
    starts: Vec<Time>,
    /// Cell and group starts on the grid; none where they do not fit it.
    grid: Option<(i64, Vec<i64>)>,
}

/// Parts of a whole note on which nearly all music falls: levels are told there in integers.
const GRID: i64 = 768;

fn on_grid(time: Time) -> Option<i64> {
    let denominator = *time.denom();
    (GRID % denominator == 0).then(|| time.numer() * (GRID / denominator))
}

fn grid(cell: Time, starts: &[Time]) -> Option<(i64, Vec<i64>)> {
    Some((
        on_grid(cell)?,
        starts
            .iter()
            .map(|&s| on_grid(s))
            .collect::<Option<Vec<i64>>>()?,
    ))
}

/// Why figures make no metre.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum MetreError {
    /// The upper figure must be 1 to 99.
    Count,
    /// The lower figure must be 1, 2, 4, 8, 16, 32 or 64.
    Unit,
    /// The cell must go into the bar without remainder.
    Cell,
    /// The groups must add up to the upper figure.
    Groups,
}

impl Metre {
    /// `metre COUNT/UNIT [by CELL] [GROUPS]`.
    ///
    /// # Errors
    /// Where the figures do not fit together: see [`MetreError`].
    pub fn new(
        count: u16,
        unit: u16,
        cell: Option<Time>,
        groups: &[u16],
    ) -> Result<Metre, MetreError> {
        if !(1..=99).contains(&count) {
            return Err(MetreError::Count);
        }
        if !(unit.is_power_of_two() && unit <= 64) {
            return Err(MetreError::Unit);
        }
        let one = Time::new(1, i64::from(unit));
        let bar = one * i64::from(count);
        let cell = cell.unwrap_or(one);
        if cell <= ZERO || !(bar / cell).is_integer() {
            return Err(MetreError::Cell);
        }
        if !groups.is_empty()
            && (groups.contains(&0)
                || groups.iter().map(|&g| u32::from(g)).sum::<u32>() != u32::from(count))
        {
            return Err(MetreError::Groups);
        }
        let starts = group_starts(count, one, cell, groups);
        Ok(Metre {
            count,
            unit,
            cell,
            groups: groups.to_vec(),
            grid: grid(cell, &starts),
            starts,
        })
    }

    /// `metre free`: a bar is as long as its longest row, a cell is a crotchet.
    #[must_use]
    pub fn free() -> Metre {
        Metre {
            count: 0,
            unit: 4,
            cell: Time::new(1, 4),
            groups: Vec::new(),
            starts: Vec::new(),
            grid: grid(Time::new(1, 4), &[]),
        }
    }

    /// Whether bars have no fixed length.
    #[must_use]
    pub const fn is_free(&self) -> bool {
        self.count == 0
    }

    /// Length of a full bar in whole notes; `None` in a free metre.
    #[must_use]
    pub fn bar_length(&self) -> Option<Time> {
        (!self.is_free()).then(|| Time::new(i64::from(self.count), i64::from(self.unit)))
    }

    /// Length of a cell in whole notes.
    #[must_use]
    pub const fn cell(&self) -> Time {
        self.cell
    }

    /// Cells in a full bar; `None` in a free metre.
    #[must_use]
    pub fn cells(&self) -> Option<usize> {
        let bar = self.bar_length()?;
        usize::try_from((bar / self.cell).to_integer()).ok()
    }

    /// The lower figure's note value in whole notes: the unit in which beats are numbered.
    #[must_use]
    pub fn unit(&self) -> Time {
        Time::new(1, i64::from(self.unit))
    }

    /// The weakest level that is still on a beat: in a compound metre of short units the groups
    /// are the beats (a dotted crotchet in 6/8), else the cells are. See [`Metre::level`].
    #[must_use]
    pub fn beat_level(&self) -> u8 {
        let by_threes = matches!(self.count, 6 | 9 | 12) && self.groups.iter().all(|&g| g == 3);
        if by_threes && self.unit >= 8 && self.cell == self.unit() {
            1
        } else {
            2
        }
    }

    /// How strong a moment is, by its distance from the bar line: 0 the bar line, 1 a group,
    /// 2 a cell, 3 its half, 4 its quarter and so on. Inside a cell of 3, 5 or 7 parts only the
    /// first is stronger than the rest.
    #[must_use]
    pub fn level(&self, offset: Time) -> u8 {
        if offset == ZERO {
            return 0;
        }
        if self.starts.binary_search(&offset).is_ok() {
            return 1;
        }
        weight_inside(*(offset / self.cell).denom())
    }

    /// The level of a moment in a bar that begins `lead` into its full length: [`Metre::level`] of
    /// `lead + at - bar`, in integers wherever the music falls on the grid.
    pub(crate) fn level_at(&self, lead: Time, bar: Time, at: Time) -> u8 {
        let whole = || {
            Some((
                on_grid(lead)? + on_grid(at)? - on_grid(bar)?,
                self.grid.as_ref()?,
            ))
        };
        let Some((offset, (cell, starts))) = whole() else {
            return self.level(lead + at - bar);
        };
        if offset == 0 {
            return 0;
        }
        if starts.binary_search(&offset).is_ok() {
            return 1;
        }
        let (mut a, mut b) = (*cell, offset.rem_euclid(*cell));
        while b != 0 {
            (a, b) = (b, a % b);
        }
        weight_inside(cell / a)
    }
}

/// The level of a moment whose distance from the last cell has this denominator, in cells.
fn weight_inside(denominator: i64) -> u8 {
    if denominator == 1 {
        return 2;
    }
    let halvings = denominator.trailing_zeros();
    let odd = denominator >> halvings > 1;
    u8::try_from(2 + halvings + u32::from(odd)).unwrap_or(u8::MAX)
}

/// Where groups begin. Unwritten groups: four units pair up, and six, nine and twelve go by
/// threes (common practice); where a cell is shorter than the unit, units are the groups.
fn group_starts(count: u16, one: Time, cell: Time, groups: &[u16]) -> Vec<Time> {
    let every = |n: u16| (1..count / n).map(|i| one * i64::from(i * n)).collect();
    if !groups.is_empty() {
        let ends = groups.iter().scan(ZERO, |at, &g| {
            *at += one * i64::from(g);
            Some(*at)
        });
        return ends.take(groups.len() - 1).collect();
    }
    match count {
        4 => every(2),
        6 | 9 | 12 => every(3),
        _ if cell < one => every(1),
        _ => Vec::new(),
    }
}

/// The value of a `metre` line: `4/4`, `6/8 by 3/8`, `5/8 3+2`, `free`.
impl fmt::Display for Metre {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        if self.is_free() {
            return f.write_str("free");
        }
        write!(f, "{}/{}", self.count, self.unit)?;
        if self.cell != self.unit() {
            write!(f, " by {}/{}", self.cell.numer(), self.cell.denom())?;
        }
        for (i, group) in self.groups.iter().enumerate() {
            write!(f, "{}{group}", if i == 0 { " " } else { "+" })?;
        }
        Ok(())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn levels(metre: &Metre, parts: i64) -> Vec<u8> {
        let bar = metre.bar_length().unwrap();
        let level = |i| {
            let level = metre.level(bar * i / parts);
            // The way in integers says the same.
            assert_eq!(
                metre.level_at(ZERO, bar * 3, bar * 3 + bar * i / parts),
                level
            );
            level
        };
        (0..parts).map(level).collect()
    }

    #[test]
    fn metric_weight_follows_the_metre() {
        let common = Metre::new(4, 4, None, &[]).unwrap();
        assert_eq!(levels(&common, 8), [0, 3, 2, 3, 1, 3, 2, 3]);
        let compound = Metre::new(6, 8, None, &[]).unwrap();
        assert_eq!(levels(&compound, 6), [0, 2, 2, 1, 2, 2]);
        let by = Metre::new(6, 8, Some(Time::new(3, 8)), &[]).unwrap();
        assert_eq!(levels(&by, 6), [0, 3, 3, 1, 3, 3]);
        assert_eq!(by.cells(), Some(2));
        let five = Metre::new(5, 8, None, &[3, 2]).unwrap();
        assert_eq!(levels(&five, 5), [0, 2, 2, 1, 2]);
        let three = Metre::new(3, 4, None, &[]).unwrap();
        assert_eq!(levels(&three, 9), [0, 3, 3, 2, 3, 3, 2, 3, 3]);
        assert_eq!(levels(&three, 21)[..8], [0, 3, 3, 3, 3, 3, 3, 2]);
    }

    #[test]
    fn figures_that_make_no_metre() {
        let half = Some(Time::new(1, 2));
        assert_eq!(Metre::new(0, 4, None, &[]), Err(MetreError::Count));
        assert_eq!(Metre::new(4, 3, None, &[]), Err(MetreError::Unit));
        assert_eq!(Metre::new(3, 4, half, &[]), Err(MetreError::Cell));
        assert_eq!(Metre::new(5, 8, None, &[3, 3]), Err(MetreError::Groups));
    }
}
