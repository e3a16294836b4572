//! Identities that hold for all chords: symmetry, invariance, inequalities, convexity.
#![allow(clippy::unwrap_used, clippy::panic)]

use num_rational::Ratio;
use partwright_space::{
    AlcovePoint, Chord, Doubling, Leading, Norm, Octave, crossing_free, in_order, least,
    least_size, turned,
};
use proptest::prelude::*;

fn octaves() -> impl Strategy<Value = Octave> {
    prop_oneof![Just(12), Just(7), 1..=24_i32].prop_map(|size| Octave::new(size).unwrap())
}

fn notes(count: impl Into<proptest::collection::SizeRange>) -> impl Strategy<Value = Vec<i32>> {
    proptest::collection::vec(-40..100_i32, count)
}

fn chord() -> impl Strategy<Value = Chord> {
    (octaves(), notes(1..6)).prop_map(|(octave, notes)| Chord::new(octave, notes))
}

/// Chords of one size on one lattice.
fn chords<const COUNT: usize>() -> impl Strategy<Value = [Chord; COUNT]> {
    (octaves(), 1..6_usize).prop_flat_map(|(octave, size)| {
        std::array::from_fn(|_| notes(size).prop_map(move |notes| Chord::new(octave, notes)))
    })
}

/// Two chords of any sizes on one lattice.
fn any_two() -> impl Strategy<Value = [Chord; 2]> {
    (octaves(), notes(1..5), notes(1..5))
        .prop_map(|(octave, a, b)| [Chord::new(octave, a), Chord::new(octave, b)])
}

fn norm() -> impl Strategy<Value = Norm> {
    prop_oneof![Just(Norm::L1), Just(Norm::L2), Just(Norm::Linf)]
}

fn size(a: &Chord, b: &Chord, norm: Norm) -> i64 {
    least_size(a, b, Doubling::None, norm).unwrap()
}

fn doubled(a: &Chord, b: &Chord, doubling: Doubling, norm: Norm) -> i64 {
    least_size(a, b, doubling, norm).unwrap()
}

/// The same cases in every run, and no file left behind by a failure.
fn config() -> ProptestConfig {
    ProptestConfig {
        cases: 256,
        failure_persistence: None,
        rng_seed: proptest::test_runner::RngSeed::Fixed(20_260_101),
        ..ProptestConfig::default()
    }
}

proptest! {
    #![proptest_config(config())]

    #[test]
    fn least_is_symmetric([a, b] in any_two(), norm in norm()) {
        for doubling in [Doubling::Smaller, Doubling::Both, Doubling::Voices(6)] {
            let there = least(&a, &b, doubling, norm).unwrap();
            let back = least(&b, &a, doubling, norm).unwrap();
            prop_assert_eq!(there.size, back.size);
            let mut turned: Vec<Leading> = there.leadings.iter().map(Leading::inverse).collect();
            turned.sort();
            prop_assert_eq!(turned, back.leadings);
        }
    }

    #[test]
    fn transposing_and_inverting_both_changes_nothing(
        [a, b] in any_two(), by in any::<i32>(), norm in norm(),
    ) {
        for doubling in [Doubling::Smaller, Doubling::Both] {
            let plain = least(&a, &b, doubling, norm).unwrap();
            let moved = least(&a.transposed(by), &b.transposed(by), doubling, norm).unwrap();
            let turned = least(&a.inverted(), &b.inverted(), doubling, norm).unwrap();
            let key = |least: &partwright_space::Least| (least.size, least.leadings.len());
            prop_assert_eq!(key(&moved), key(&plain));
            prop_assert_eq!(key(&turned), key(&plain));
        }
    }

    #[test]
    fn triangle_inequality([a, b, c] in chords::<3>(), norm in norm()) {
        let length = |x: &Chord, y: &Chord| norm.length(size(x, y, norm));
        prop_assert!(length(&a, &c) <= length(&a, &b) + length(&b, &c) + 1e-9);
        prop_assert_eq!(size(&a, &a, norm), 0);
        prop_assert_eq!(size(&a, &b, norm) == 0, a == b);
    }

    #[test]
    fn layers_are_a_lower_bound([a, b] in chords::<2>()) {
        let apart = a.octave().circle_distance(a.layer(), b.layer());
        prop_assert!(size(&a, &b, Norm::L1) >= i64::from(apart));
    }

    #[test]
    fn the_three_sizes_in_their_order([a, b] in chords::<2>()) {
        let [l1, l2, linf] = Norm::ALL.map(|norm| size(&a, &b, norm));
        prop_assert!(linf * linf <= l2);
        prop_assert!(l2 <= l1 * l1);
        prop_assert!(l1 * l1 <= l2 * a.len() as i64);
    }

    #[test]
    fn more_freedom_is_never_larger([a, b] in any_two(), norm in norm()) {
        let both = doubled(&a, &b, Doubling::Both, norm);
        let smaller = doubled(&a, &b, Doubling::Smaller, norm);
        prop_assert!(both <= smaller);
        if a.len() == b.len() {
            prop_assert_eq!(smaller, size(&a, &b, norm));
        }
        // A staircase needs at most one voice for every note of either chord.
        let notes = a.len().max(b.len());
        let voices: Vec<i64> = (notes..=a.len() + b.len())
            .map(|voices| doubled(&a, &b, Doubling::Voices(voices), norm))
            .collect();
        prop_assert_eq!(voices[0], smaller);
        prop_assert_eq!(voices.into_iter().min(), Some(both));
    }

    #[test]
    fn the_total_tells_the_turn([a, b] in chords::<2>(), k in -9..9_i64) {
        let sum = |chord: &Chord| chord.residues().iter().map(|&r| i64::from(r)).sum::<i64>();
        let leading = turned(&a, &b, k).unwrap();
        prop_assert_eq!(leading.total(), sum(&b) - sum(&a) + k * a.octave().wide());
        prop_assert!(leading.crossing_free());
        prop_assert_eq!((leading.source(), leading.target()), (a, b));
    }

    #[test]
    fn totals_of_any_voice_leading([a, b] in chords::<2>(), norm in norm()) {
        for (size, leading) in in_order(&a, &b, Doubling::None, norm).unwrap().take(20) {
            let off = leading.total() - i64::from(b.layer() - a.layer());
            prop_assert_eq!(off.rem_euclid(a.octave().wide()), 0);
            prop_assert_eq!(leading.size(norm), size);
            prop_assert_eq!((leading.source(), leading.target()), (a.clone(), b.clone()));
        }
    }

    #[test]
    fn sizes_fall_and_rise_with_the_turns([a, b] in chords::<2>()) {
        for norm in Norm::ALL {
            let sizes: Vec<i64> = (-12..=12).map(|k| turned(&a, &b, k).unwrap().size(norm)).collect();
            let convex = |w: &[i64]| w[0] + w[2] >= 2 * w[1];
            let least = sizes.iter().position(|s| Some(s) == sizes.iter().min()).unwrap();
            prop_assert!(norm == Norm::Linf || sizes.windows(3).all(convex));
            prop_assert!(sizes[..=least].is_sorted_by(|x, y| x >= y) && sizes[least..].is_sorted());
            prop_assert_eq!(sizes[least], size(&a, &b, norm));
        }
    }

    #[test]
    fn all_least_in_l2_are_free_of_crossings([a, b] in chords::<2>()) {
        let least = least(&a, &b, Doubling::None, Norm::L2).unwrap();
        let all = in_order(&a, &b, Doubling::None, Norm::L2).unwrap();
        let all: Vec<Leading> = all.take_while(|f| f.0 == least.size).map(|f| f.1).collect();
        prop_assert_eq!(all, least.leadings);
    }

    #[test]
    fn the_two_lists_agree([a, b] in any_two(), norm in norm()) {
        for doubling in [Doubling::Smaller, Doubling::Voices(5)] {
            let all: Vec<_> = in_order(&a, &b, doubling, norm).unwrap().take(150).collect();
            prop_assert!(all.windows(2).all(|w| w[0] < w[1]), "ascending, each once");
            let last = all.last().unwrap().0;
            let free = crossing_free(&a, &b, doubling, norm).unwrap();
            let free: Vec<_> = free.take_while(|found| found.0 < last).collect();
            let filtered: Vec<_> = all
                .into_iter()
                .filter(|found| found.0 < last && found.1.crossing_free())
                .collect();
            prop_assert_eq!(free, filtered);
        }
    }

    #[test]
    fn free_doubling_lists_what_some_number_of_voices_can([a, b] in any_two(), norm in norm()) {
        let found: Vec<_> = crossing_free(&a, &b, Doubling::Both, norm).unwrap().take(12).collect();
        prop_assert!(found.windows(2).all(|w| w[0] < w[1]));
        for (size, leading) in found {
            prop_assert!(leading.crossing_free());
            let voices = Doubling::Voices(leading.pairs().len());
            let mut same = crossing_free(&a, &b, voices, norm).unwrap();
            prop_assert!(same.any(|other| other.0 > size || other.1 == leading));
            let distinct = |chord: &Chord| chord.counted().into_iter().map(|(r, _)| r).collect::<Vec<_>>();
            prop_assert_eq!(distinct(&leading.source()), distinct(&a));
            prop_assert_eq!(distinct(&leading.target()), distinct(&b));
        }
    }

    #[test]
    fn uncrossing_on_the_line_is_least(
        pairs in proptest::collection::vec((-50..50_i32, -50..50_i32), 1..6), norm in norm(),
    ) {
        let total = |a: &[i32], b: &[i32]| {
            norm.size(a.iter().zip(b).map(|(a, b)| i64::from(b - a)))
        };
        let (mut a, mut b): (Vec<i32>, Vec<i32>) = pairs.into_iter().unzip();
        let crossed = total(&a, &b);
        a.sort_unstable();
        b.sort_unstable();
        prop_assert!(total(&a, &b) <= crossed);
    }

    #[test]
    fn canonical_form_forgets_octaves_and_order(
        octave in octaves(), notes in notes(0..7), shifts in proptest::collection::vec(-5..5_i32, 7),
        turn in any::<prop::sample::Index>(),
    ) {
        let chord = Chord::new(octave, notes.iter().copied());
        let mut moved: Vec<i32> = notes.iter().zip(&shifts).map(|(n, k)| n + k * octave.size()).collect();
        if !moved.is_empty() {
            let at = turn.index(moved.len());
            moved.rotate_left(at);
            moved.swap(0, at);
        }
        let point = chord.canonical();
        prop_assert_eq!(&point, &Chord::new(octave, moved.iter().copied()).canonical());
        prop_assert_eq!(&point, &AlcovePoint::under(octave, &moved).reduced());
        prop_assert_eq!(point.chord(), chord.clone());
        prop_assert_eq!(point.layer(), i64::from(chord.layer()));
        prop_assert_eq!(point.coincidences(), chord.coincidences());
        let again = AlcovePoint::new(octave, point.layer(), point.gaps().to_vec());
        prop_assert_eq!(again, Some(point));
    }

    #[test]
    fn the_fold_keeps_the_layer(octave in octaves(), notes in notes(1..7), by in -30..30_i32) {
        let point = AlcovePoint::under(octave, &notes);
        prop_assert_eq!(point.layer(), notes.iter().map(|&n| i64::from(n)).sum::<i64>());
        let pitches = point.pitches();
        prop_assert!(pitches.is_sorted() && pitches[pitches.len() - 1] <= pitches[0] + octave.wide());
        // The glide as it is defined: the lowest note an octave up.
        let mut glided = pitches.clone();
        glided.rotate_left(1);
        *glided.last_mut().unwrap() += octave.wide();
        prop_assert_eq!(point.clone().glided(1).pitches(), glided);
        prop_assert_eq!(point.clone().glided(5).glided(-5), point.clone());
        let moved: Vec<i32> = notes.iter().map(|n| n + by).collect();
        prop_assert_eq!(point.clone().transposed(by), AlcovePoint::under(octave, &moved));
        let turned: Vec<i32> = notes.iter().map(|n| -n).collect();
        prop_assert_eq!(point.inverted(), AlcovePoint::under(octave, &turned));
    }

    #[test]
    fn core_and_boundary(chord in chord()) {
        let point = chord.canonical();
        let gaps = point.gaps();
        let core = chord.core_distance_squared().unwrap();
        let even = gaps.iter().all(|gap| *gap == gaps[0]);
        prop_assert_eq!(core == Ratio::from_integer(0), even);
        prop_assert!(core >= Ratio::from_integer(0));
        if chord.len() > 1 {
            prop_assert_eq!(chord.zeta().norm_squared() < 1e-9, even || balanced(gaps));
        }
        prop_assert_eq!(chord.smallest_gap() == Some(0), chord.coincidences() > 0);
        let moved = chord.transposed(5);
        prop_assert_eq!(moved.core_distance_squared().unwrap(), core);
        prop_assert!((moved.zeta().norm_squared() - chord.zeta().norm_squared()).abs() < 1e-6);
        if chord.len() == 3 {
            // zeta and the gaps: |zeta|^2 = 3/2 sum (g - N/3)^2.
            let third = f64::from(chord.octave().size()) / 3.0;
            let squares: f64 = gaps.iter().map(|&g| (f64::from(g) - third).powi(2)).sum();
            prop_assert!((chord.zeta().norm_squared() - 1.5 * squares).abs() < 1e-6);
        }
    }

    #[test]
    fn the_boundary_is_where_it_is_said_to_be([a] in chords::<1>()) {
        // The nearest chord with a doubled note, by trying them all.
        prop_assume!(a.len() >= 2 && a.len() <= 3 && a.octave().size() <= 12);
        let walls = || Chord::all(a.octave(), a.len()).filter(|b| b.coincidences() > 0);
        let nearest = walls().map(|wall| size(&a, &wall, Norm::L1)).min().unwrap();
        prop_assert_eq!(a.boundary_distance(Norm::L1), Some(Ratio::from_integer(nearest)));
        // On the lattice an odd gap closes half a point further on.
        let nearest = walls().map(|wall| size(&a, &wall, Norm::Linf)).min().unwrap();
        prop_assert_eq!(a.boundary_distance(Norm::Linf).unwrap().ceil(), Ratio::from_integer(nearest));
    }
}

/// With four notes the gaps can cancel without being equal: like gaps opposite each other.
fn balanced(gaps: &[i32]) -> bool {
    matches!(*gaps, [a, b, c, d] if a == c && b == d)
}
