//! The least sizes against independent solvers, on ten thousand random pairs of chords.
//!
//! Without register limits every voice leading can take the short way round the circle, so the
//! least sizes are problems on circle distances alone, and classical ones: assignment (no
//! doubling), assignment with free rows (the smaller chord doubled), edge cover (both doubled;
//! turned into an assignment). The assignments are solved by the library `pathfinding`.
#![allow(clippy::unwrap_used, clippy::panic)]

use partwright_space::{Chord, Doubling, Norm, Octave, least_size};
use pathfinding::kuhn_munkres::kuhn_munkres_min;
use pathfinding::matrix::Matrix;

/// Larger than any sum of costs here.
const NEVER: i64 = 1 << 40;

/// Numbers by Steele, Lea and Flood's SplitMix64, so that every run sees the same pairs.
struct Numbers(u64);

impl Numbers {
    fn below(&mut self, limit: u64) -> u64 {
        self.0 = self.0.wrapping_add(0x9e37_79b9_7f4a_7c15);
        let mut z = self.0;
        z = (z ^ (z >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
        z = (z ^ (z >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
        (z ^ (z >> 31)) % limit
    }

    fn chord(&mut self, octave: Octave, notes: u64) -> Chord {
        let size = u64::try_from(octave.size()).unwrap();
        Chord::new(
            octave,
            (0..notes).map(|_| i32::try_from(self.below(size)).unwrap()),
        )
    }
}

/// Distances on the circle, worked out by trying the neighbouring octaves.
fn distances(a: &Chord, b: &Chord) -> Vec<Vec<i64>> {
    let n = a.octave().size();
    let distance = |x: i32, y: i32| {
        [y - x, y - x + n, y - x - n]
            .map(i32::abs)
            .into_iter()
            .min()
    };
    let row = |x: &i32| {
        b.residues()
            .iter()
            .map(|&y| i64::from(distance(*x, y).unwrap()))
            .collect()
    };
    a.residues().iter().map(row).collect()
}

type Costs = Vec<Vec<i64>>;

fn assignment(costs: Costs) -> i64 {
    kuhn_munkres_min(&Matrix::from_rows(costs).unwrap()).0
}

/// As many rows as columns: each row in turn takes a column.
fn no_doubling(costs: &Costs) -> i64 {
    assignment(costs.clone())
}

/// Rows are the smaller chord: its notes are mandatory rows, the others hold column minima.
fn smaller_doubled(costs: &Costs) -> i64 {
    let mut rows = costs.clone();
    let least: Vec<i64> = (0..costs[0].len())
        .map(|j| costs.iter().map(|row| row[j]).min().unwrap())
        .collect();
    rows.resize(least.len(), least);
    assignment(rows)
}

/// Least edge cover: a note left unmatched takes its own cheapest edge.
fn both_doubled(costs: &Costs) -> i64 {
    let (m, n) = (costs.len(), costs[0].len());
    let mut rows = vec![vec![NEVER; m + n]; m + n];
    for i in 0..m {
        rows[i][..n].copy_from_slice(&costs[i]);
        rows[i][n + i] = *costs[i].iter().min().unwrap();
    }
    for j in 0..n {
        rows[m + j][j] = costs.iter().map(|row| row[j]).min().unwrap();
        rows[m + j][n..].fill(0);
    }
    assignment(rows)
}

/// The bottleneck: the least distance for which everything can be done without a longer one.
fn bottleneck(distances: &Costs, solve: fn(&Costs) -> i64) -> i64 {
    let mut thresholds: Vec<i64> = distances.iter().flatten().copied().collect();
    thresholds.sort_unstable();
    thresholds.dedup();
    let fits = |threshold: i64| {
        let longer = |d: &i64| i64::from(*d > threshold);
        solve(
            &distances
                .iter()
                .map(|row| row.iter().map(longer).collect())
                .collect(),
        ) == 0
    };
    thresholds
        .into_iter()
        .find(|&threshold| fits(threshold))
        .unwrap()
}

fn judge(distances: &Costs, norm: Norm, solve: fn(&Costs) -> i64) -> i64 {
    let squared = || {
        distances
            .iter()
            .map(|row| row.iter().map(|d| d * d).collect())
            .collect()
    };
    match norm {
        Norm::L1 => solve(distances),
        Norm::L2 => solve(&squared()),
        Norm::Linf => bottleneck(distances, solve),
    }
}

#[test]
fn ten_thousand_pairs() {
    let mut numbers = Numbers(20_260_101);
    let mut bijective = 0;
    for round in 0..10_000 {
        let octave = Octave::new([12, 7, 12, 5, 12, 31, 12, 1][round % 8]).unwrap();
        let notes = 1 + numbers.below(6);
        let other = if round % 3 == 0 {
            notes
        } else {
            1 + numbers.below(6)
        };
        let (a, b) = (numbers.chord(octave, notes), numbers.chord(octave, other));
        let distances = distances(&a, &b);
        let across = if notes <= other {
            distances.clone()
        } else {
            self::distances(&b, &a)
        };
        for norm in Norm::ALL {
            let size = |doubling| least_size(&a, &b, doubling, norm).unwrap();
            let what = || format!("{norm:?}, octave {}, {a:?} to {b:?}", octave.size());
            if notes == other {
                bijective += 1;
                let judged = judge(&distances, norm, no_doubling);
                assert_eq!(size(Doubling::None), judged, "no doubling, {}", what());
            }
            let judged = judge(&across, norm, smaller_doubled);
            assert_eq!(
                size(Doubling::Smaller),
                judged,
                "smaller doubled, {}",
                what()
            );
            let judged = judge(&distances, norm, both_doubled);
            assert_eq!(size(Doubling::Both), judged, "both doubled, {}", what());
        }
    }
    assert!(bijective > 10_000);
}
