//! How many chords there are: closed formulas for the spaces.
//!
//! All return `None` where the numbers outgrow 128 bits on the way, and beyond a million notes.
//! Sources: stars and bars;
//! Burnside's lemma for the types; Ramanujan sums for the layers. The tests hold them against
//! enumeration.

use crate::octave::Octave;

const MOST_NOTES: u64 = 1 << 20;

/// `n` over `k`.
#[must_use]
pub fn binomial(n: u64, k: u64) -> Option<u128> {
    if k > n {
        return Some(0);
    }
    (0..k.min(n - k)).try_fold(1_u128, |product, i| {
        // Exact at every stage: a product of i + 1 neighbours over (i + 1)!.
        Some(product.checked_mul(u128::from(n - i))? / u128::from(i + 1))
    })
}

/// All chords of `notes` notes, doublings included.
#[must_use]
pub fn chords(octave: Octave, notes: u64) -> Option<u128> {
    multisets(points(octave), notes)
}

/// The chords of `notes` notes without a doubled one: the interior of the space.
#[must_use]
pub fn interior(octave: Octave, notes: u64) -> Option<u128> {
    binomial(points(octave), notes)
}

/// The chords with a doubled note: the boundary.
#[must_use]
pub fn boundary(octave: Octave, notes: u64) -> Option<u128> {
    chords(octave, notes)?.checked_sub(interior(octave, notes)?)
}

/// The chords that lie on exactly `mirrors` mirrors: notes less distinct notes.
#[must_use]
pub fn on_mirrors(octave: Octave, notes: u64, mirrors: u64) -> Option<u128> {
    if notes == 0 {
        return Some(u128::from(mirrors == 0));
    }
    let Some(distinct) = notes.checked_sub(mirrors) else {
        return Some(0);
    };
    binomial(points(octave), distinct)?.checked_mul(binomial(notes - 1, mirrors)?)
}

/// The chords on one layer: those whose notes sum to `layer` modulo the octave.
#[must_use]
pub fn on_layer(octave: Octave, notes: u64, layer: i32) -> Option<u128> {
    let n = points(octave);
    let layer = octave.residue(layer).unsigned_abs();
    let terms = common_divisors(n, notes).map(|d| {
        let even = i128::try_from(multisets(n / d, notes / d)?).ok()?;
        ramanujan(d, u64::from(layer)).checked_mul(even)
    });
    let sum = terms
        .into_iter()
        .try_fold(0_i128, |sum, term| sum.checked_add(term?))?;
    u128::try_from(sum / i128::from(n)).ok()
}

/// Chords up to transposition.
#[must_use]
pub fn transposition_types(octave: Octave, notes: u64) -> Option<u128> {
    Some(turned(octave, notes, multisets)? / u128::from(points(octave)))
}

/// Chords without a doubled note up to transposition.
#[must_use]
pub fn interior_transposition_types(octave: Octave, notes: u64) -> Option<u128> {
    Some(turned(octave, notes, binomial)? / u128::from(points(octave)))
}

/// Chords up to transposition and inversion.
#[must_use]
pub fn inversion_types(octave: Octave, notes: u64) -> Option<u128> {
    let sum =
        turned(octave, notes, multisets)?.checked_add(reflected(octave, notes, multisets)?)?;
    Some(sum / u128::from(2 * points(octave)))
}

/// Chords without a doubled note up to transposition and inversion.
#[must_use]
pub fn interior_inversion_types(octave: Octave, notes: u64) -> Option<u128> {
    let sum = turned(octave, notes, binomial)?.checked_add(reflected(octave, notes, binomial)?)?;
    Some(sum / u128::from(2 * points(octave)))
}

/// The relations between two chords of `m` and `n` different notes in which every note takes
/// part: the ways to lead one to the other with free doubling, octaves left aside. They are the
/// 0-1 matrices without an empty row or column (OEIS A048291 for `m = n`), counted by inclusion
/// and exclusion over the rows; Tymoczko 2008 gives the number for two hexachords.
#[must_use]
pub fn relations(m: u32, n: u32) -> Option<u128> {
    let terms = (0..=m).map(|left_out| {
        let rows = m - left_out;
        let columns = 1_i128.checked_shl(rows).filter(|_| rows < 127)? - 1;
        let choices = i128::try_from(binomial(u64::from(m), u64::from(left_out))?).ok()?;
        let term = choices.checked_mul(columns.checked_pow(n)?)?;
        Some(if left_out % 2 == 0 { term } else { -term })
    });
    let sum = terms
        .into_iter()
        .try_fold(0_i128, |sum, term| sum.checked_add(term?))?;
    u128::try_from(sum).ok()
}

/// The ways to pair the notes of two chords of `notes` notes one to one, octaves left aside.
#[must_use]
pub fn bijections(notes: u32) -> Option<u128> {
    (1..=u128::from(notes)).try_fold(1_u128, u128::checked_mul)
}

fn points(octave: Octave) -> u64 {
    u64::from(octave.size().unsigned_abs())
}

/// Multisets of `size` out of `kinds`.
fn multisets(kinds: u64, size: u64) -> Option<u128> {
    match kinds.checked_add(size)?.checked_sub(1) {
        Some(places) => binomial(places, size),
        None => Some(1),
    }
}

/// Sum over all transpositions of the chords they leave alone. A transposition of order `d`
/// leaves alone what repeats `d` times round the circle.
fn turned(octave: Octave, notes: u64, choose: fn(u64, u64) -> Option<u128>) -> Option<u128> {
    let n = points(octave);
    common_divisors(n, notes).try_fold(0_u128, |sum, d| {
        let alone = choose(n / d, notes / d)?.checked_mul(u128::from(totient(d)))?;
        sum.checked_add(alone)
    })
}

/// Sum over all inversions `x -> c - x` of the chords they leave alone.
fn reflected(octave: Octave, notes: u64, choose: fn(u64, u64) -> Option<u128>) -> Option<u128> {
    let n = points(octave);
    // An inversion has as many axis points as 2x = c has solutions; the rest go in pairs.
    let kinds: &[(u64, u64)] = if n % 2 == 1 {
        &[(1, n)]
    } else {
        &[(0, n / 2), (2, n / 2)]
    };
    if notes > MOST_NOTES {
        return None;
    }
    kinds.iter().try_fold(0_u128, |sum, &(axis, times)| {
        let pairs = (n - axis) / 2;
        let alone = (0..=notes / 2).try_fold(0_u128, |sum, paired| {
            let ways = choose(pairs, paired)?.checked_mul(choose(axis, notes - 2 * paired)?)?;
            sum.checked_add(ways)
        })?;
        sum.checked_add(alone.checked_mul(u128::from(times))?)
    })
}

/// The divisors of the octave that divide the number of notes as well; all, for no notes.
fn common_divisors(n: u64, notes: u64) -> impl Iterator<Item = u64> {
    (1..=n).filter(move |&d| n.is_multiple_of(d) && notes.is_multiple_of(d))
}

fn factors(mut n: u64) -> Vec<(u64, u32)> {
    let mut found = Vec::new();
    let mut p = 2;
    while p * p <= n {
        let mut power = 0;
        while n.is_multiple_of(p) {
            n /= p;
            power += 1;
        }
        if power > 0 {
            found.push((p, power));
        }
        p += 1;
    }
    if n > 1 {
        found.push((n, 1));
    }
    found
}

fn totient(n: u64) -> u64 {
    let parts = factors(n).into_iter();
    parts.map(|(p, power)| (p - 1) * p.pow(power - 1)).product()
}

/// Ramanujan's sum: the `d`-th roots of unity of order `d`, each to the power `s`, added up. It
/// is multiplicative in `d`.
fn ramanujan(d: u64, s: u64) -> i128 {
    let parts = factors(d).into_iter().map(|(p, power)| {
        let below = i128::from(p.pow(power - 1));
        if s.is_multiple_of(p.pow(power)) {
            below * i128::from(p - 1)
        } else if s.is_multiple_of(p.pow(power - 1)) {
            -below
        } else {
            0
        }
    });
    parts.product()
}
