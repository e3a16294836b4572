//! Values that are in print, and landmarks of the spaces anyone can work out by hand. They need
//! no file of check values.
//!
//! Sources: D. Tymoczko, Science 313 (2006), supporting text, and Music Analysis 27 (2008); the
//! two minor-chord neighbours with two and three moving notes, and the neo-Riemannian P, L and R,
//! are common knowledge in the field (sizes worked out, names from memory).
#![allow(clippy::unwrap_used, clippy::panic)]

use num_rational::Ratio;
use partwright_space::{
    Chord, Doubling, Leading, Norm, Octave, PrismPoint, count, in_order, least, least_size,
};

fn chord(notes: &[i32]) -> Chord {
    Chord::new(Octave::SEMITONES, notes.iter().copied())
}

fn major(root: i32) -> Chord {
    chord(&[0, 4, 7]).transposed(root)
}

fn minor(root: i32) -> Chord {
    chord(&[0, 3, 7]).transposed(root)
}

fn sizes(a: &Chord, b: &Chord, doubling: Doubling) -> [i64; 3] {
    Norm::ALL.map(|norm| least_size(a, b, doubling, norm).unwrap())
}

#[test]
fn triads() {
    let from_c = |to: Chord| sizes(&major(0), &to, Doubling::None);
    assert_eq!(
        [from_c(minor(0)), from_c(minor(4))],
        [[1, 1, 1]; 2],
        "parallel, leading-note exchange"
    );
    assert_eq!(from_c(minor(9)), [2, 4, 2], "relative");
    assert_eq!(from_c(minor(5)), [2, 2, 1], "two notes move");
    assert_eq!(from_c(minor(8)), [3, 3, 1], "every note by a semitone");
    assert_eq!([from_c(major(4)), from_c(major(8))], [[2, 2, 1]; 2]);
    assert_eq!([from_c(major(5)), from_c(major(7))], [[3, 5, 2]; 2]);
    assert_eq!(from_c(major(6)), [6, 14, 3]);
    let far = least(&major(0), &major(6), Doubling::None, Norm::L1).unwrap();
    assert_eq!(far.leadings.len(), 2);
}

/// How often each L1 size stands between two of the 24 triads.
#[test]
fn all_triads() {
    let all: Vec<Chord> = (0..12)
        .flat_map(|root| [major(root), minor(root)])
        .collect();
    let mut histogram = [0; 7];
    for a in &all {
        for b in &all {
            let size = least_size(a, b, Doubling::None, Norm::L1).unwrap();
            histogram[usize::try_from(size).unwrap()] += 1;
        }
    }
    assert_eq!(histogram, [24, 48, 120, 168, 72, 72, 72]);
}

/// Six triads lie one semitone from each augmented triad, eight sevenths from each diminished
/// seventh: four dominant, four half-diminished.
#[test]
fn neighbours_of_the_even_chords() {
    let near = |core: &Chord, other: Chord| sizes(core, &other, Doubling::None)[0] == 1;
    for turn in 0..12 {
        let augmented = chord(&[0, 4, 8]).transposed(turn);
        let count = |kind: fn(i32) -> Chord| (0..12).filter(|&r| near(&augmented, kind(r))).count();
        assert_eq!([count(major), count(minor)], [3, 3]);
        let diminished = chord(&[0, 3, 6, 9]).transposed(turn);
        let count = |notes: &[i32]| {
            (0..12)
                .filter(|&r| near(&diminished, chord(notes).transposed(r)))
                .count()
        };
        assert_eq!([count(&[0, 4, 7, 10]), count(&[0, 3, 6, 10])], [4, 4]);
    }
}

/// Tymoczko 2006, supporting text, figure S12: with free doubling (4, 4, 7, 11, 0) goes to
/// (3, 4, 8, 11, 11) in three semitones; without, it takes four.
#[test]
fn free_doubling() {
    let (c, e) = (chord(&[0, 4, 7, 11]), chord(&[4, 8, 11, 3]));
    let free = least(&c, &e, Doubling::Both, Norm::L1).unwrap();
    assert_eq!(free.size, 3);
    let figure = Leading::between(Octave::SEMITONES, &[4, 4, 7, 11, 12], &[3, 4, 8, 11, 11]);
    assert!(free.leadings.contains(&figure.unwrap()));
    assert_eq!(sizes(&c, &e, Doubling::None)[0], 4);
    // More voices can cost more: a dominant seventh to the major triad a semitone up.
    let seventh = chord(&[0, 4, 7, 10]);
    let with = |voices| sizes(&seventh, &major(1), Doubling::Voices(voices))[0];
    assert_eq!([with(4), with(5)], [5, 6]);
}

/// A crossing voice leading can be as small in L1 as the best without: {1, 3, 11} to {4, 6, 11}.
#[test]
fn a_crossing_one_among_the_least() {
    let (a, b) = (chord(&[1, 3, 11]), chord(&[4, 6, 11]));
    let all = in_order(&a, &b, Doubling::None, Norm::L1).unwrap();
    let least: Vec<_> = all
        .take_while(|found| found.0 == 6)
        .map(|found| found.1)
        .collect();
    assert_eq!(least.len(), 2);
    assert_eq!(
        least
            .iter()
            .filter(|leading| leading.crossing_free())
            .count(),
        1
    );
    // And the best depends on the norm: {0, 3} to {0, 8}.
    let (a, b) = (chord(&[0, 3]), chord(&[0, 8]));
    let by = |norm| least_by(&a, &b, norm);
    assert_eq!([by(Norm::L1), by(Norm::Linf)], [vec![0, 5], vec![-4, -3]]);
}

fn least_by(a: &Chord, b: &Chord, norm: Norm) -> Vec<i64> {
    let least = least(a, b, Doubling::None, norm).unwrap();
    assert_eq!(least.leadings.len(), 1);
    least.leadings[0].displacements().collect()
}

#[test]
fn the_prism() {
    let at = |chord: Chord| {
        let point = PrismPoint::of(&chord).unwrap();
        (point.layer(), point.gaps())
    };
    assert_eq!(at(major(0)), (11, [4, 3, 5]));
    assert_eq!(at(minor(0)), (10, [3, 4, 5]));
    assert_eq!(at(chord(&[0, 3, 6])), (9, [3, 3, 6]));
    assert_eq!(at(chord(&[0, 4, 8])), (0, [4, 4, 4]));
    for root in 0..12 {
        assert_eq!((major(root).layer() % 3, minor(root).layer() % 3), (2, 1));
    }
    // The straight way is as long as the voice leading along it.
    let [a, b] = [[60, 64, 67], [60, 64, 68]].map(|p| PrismPoint::under(Octave::SEMITONES, p));
    let apart =
        |a: [f64; 3], b: [f64; 3]| a.iter().zip(b).map(|(a, b)| (a - b).powi(2)).sum::<f64>();
    let glided = [12.0 / 3_f64.sqrt(), 4.0 / 2_f64.sqrt(), 12.0 / 6_f64.sqrt()];
    assert_eq!((a.layer(), b.layer()), (11, 0));
    assert!((apart(a.isometric(), glided) - 1.0).abs() < 1e-9);
}

#[test]
fn evenness() {
    let core = |notes: &[i32]| chord(notes).core_distance_squared().unwrap();
    let even: [&[i32]; 4] = [&[0, 6], &[0, 4, 8], &[0, 3, 6, 9], &[0, 2, 4, 6, 8, 10]];
    assert!(
        even.iter()
            .all(|notes| core(notes) == Ratio::from_integer(0))
    );
    assert_eq!(core(&[0, 7]), Ratio::new(1, 2));
    assert_eq!(core(&[0, 4, 7]), Ratio::new(2, 3));
    assert_eq!(core(&[0, 2, 4, 7, 9]), Ratio::new(2, 5));
    assert_eq!(core(&[0, 2, 4, 5, 7, 9, 11]), Ratio::new(4, 7));
    assert_eq!(core(&[0, 1, 2]), Ratio::from_integer(18));
    assert_eq!(
        chord(&[0, 1, 2]).boundary_distance(Norm::L2),
        Some(Ratio::new(1, 2))
    );
}

/// Relations between two hexachords: Tymoczko 2008. The count by inclusion and exclusion against
/// all 0-1 matrices, where those can be gone through. Interval classes, trichords, tetrachords
/// and pentachords up to inversion: the usual numbers of set classes (from memory).
#[test]
fn counts() {
    assert_eq!(count::relations(6, 6), Some(57_366_997_447));
    for m in 0..=4_u32 {
        for n in 0..=4_u32 {
            let covers = |matrix: &u32| {
                let row = (1 << n) - 1;
                let rows = (0..m).map(|i| matrix >> (i * n) & row);
                rows.clone().all(|r| r != 0) && rows.fold(0, |all, r| all | r) == row
            };
            let listed = (0..1_u32 << (m * n)).filter(covers).count();
            assert_eq!(count::relations(m, n), Some(listed as u128), "{m} by {n}");
        }
    }
    let octave = Octave::SEMITONES;
    let inside = [2, 3, 4, 5].map(|n| count::interior_inversion_types(octave, n).unwrap());
    assert_eq!(inside, [6, 12, 29, 38]);
    assert_eq!(
        [2, 3, 4].map(|n| count::chords(octave, n).unwrap()),
        [78, 364, 1365]
    );
}
