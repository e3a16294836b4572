//! Paths cut for a picture: every piece in its cell, nothing lost between them, ends where the
//! lattice says.
#![allow(clippy::unwrap_used, clippy::panic)]

use num_rational::Ratio;
use partwright_space::draw::{Picture, Piece, Spot, path};
use partwright_space::{AlcovePoint, Leg, Octave, Place, StripPoint};
use proptest::prelude::*;

fn whole(value: i64) -> Ratio<i64> {
    Ratio::from_integer(value)
}

fn steps() -> impl Strategy<Value = (Octave, Vec<(i32, i32)>)> {
    let octave = prop_oneof![Just(12), Just(7), 1..=15_i32];
    let voices = proptest::collection::vec((30..70_i32, 30..70_i32), 1..5);
    (octave.prop_map(|size| Octave::new(size).unwrap()), voices)
}

/// Layer and gaps.
fn coordinates(spot: &Spot, octave: Octave) -> Vec<Ratio<i64>> {
    let mut all = spot.gaps(octave);
    all.insert(0, spot.layer());
    all
}

fn lattice_point(point: &AlcovePoint) -> Vec<Ratio<i64>> {
    let gaps = point.gaps().iter().map(|&g| i64::from(g));
    std::iter::once(point.layer())
        .chain(gaps)
        .map(whole)
        .collect()
}

/// The same place, seen from the cell before: over the seam after the glide.
fn over_the_seam(spot: &Spot, octave: Octave, times: i64) -> Vec<Ratio<i64>> {
    let mut gaps = spot.gaps(octave);
    let count = gaps.len() as i64;
    gaps.rotate_left(times.rem_euclid(count) as usize);
    gaps.insert(0, spot.layer() + times * octave.wide());
    gaps
}

fn config() -> ProptestConfig {
    ProptestConfig {
        cases: 256,
        failure_persistence: None,
        rng_seed: proptest::test_runner::RngSeed::Fixed(20_260_101),
        ..ProptestConfig::default()
    }
}

fn times_follow(pieces: &[Piece]) -> bool {
    let starts = pieces.first().map(|p| p.start) == Some(whole(0));
    let ends = pieces.last().map(|p| p.end) == Some(whole(1));
    starts
        && ends
        && pieces
            .windows(2)
            .all(|w| w[0].end == w[1].start && w[0].start < w[0].end)
}

proptest! {
    #![proptest_config(config())]

    #[test]
    fn chords((octave, voices) in steps()) {
        let (before, after): (Vec<i32>, Vec<i32>) = voices.into_iter().unzip();
        let pieces = path(Picture::Chords, octave, &before, &after).unwrap();
        prop_assert!(times_follow(&pieces));
        for piece in &pieces {
            for spot in [&piece.from, &piece.to] {
                let gaps = spot.gaps(octave);
                prop_assert!(spot.layer() >= whole(0) && spot.layer() <= whole(octave.wide()));
                prop_assert!(gaps.iter().all(|&g| g >= whole(0) && g <= whole(octave.wide())));
            }
            // The layer goes evenly through every piece.
            let along: i64 = before.iter().zip(&after).map(|(b, a)| i64::from(a - b)).sum();
            let gone = piece.to.layer() - piece.from.layer();
            prop_assert_eq!(gone, (piece.end - piece.start) * along);
        }
        // The ends are the chords, up to the seam on which an end may lie.
        for (spot, pitches) in [
            (&pieces[0].from, &before),
            (&pieces[pieces.len() - 1].to, &after),
        ] {
            let chord = lattice_point(&AlcovePoint::under(octave, pitches).reduced());
            let seam = spot.layer() == whole(octave.wide());
            let here = if seam { over_the_seam(spot, octave, -1) } else { coordinates(spot, octave) };
            prop_assert_eq!(here, chord);
        }
        for w in pieces.windows(2) {
            let glide = w[1].copy - w[0].copy;
            prop_assert_eq!(glide != 0, w[0].meets_seam);
            let next = over_the_seam(&w[1].from, octave, glide);
            prop_assert_eq!(coordinates(&w[0].to, octave), next);
            if w[0].meets_mirror {
                prop_assert!(w[0].to.gaps(octave).contains(&whole(0)));
            }
        }
    }

    #[test]
    fn unrolled((octave, voices) in steps()) {
        let (before, after): (Vec<i32>, Vec<i32>) = voices.into_iter().unzip();
        let pieces = path(Picture::Unrolled, octave, &before, &after).unwrap();
        prop_assert!(times_follow(&pieces));
        let ends = [(&pieces[0].from, &before), (&pieces[pieces.len() - 1].to, &after)];
        for (spot, pitches) in ends {
            let point = AlcovePoint::under(octave, pitches);
            prop_assert_eq!(coordinates(spot, octave), lattice_point(&point));
        }
        for w in pieces.windows(2) {
            prop_assert_eq!(&w[0].to, &w[1].from);
            prop_assert!(w[0].meets_mirror && !w[0].meets_seam);
        }
        for piece in &pieces {
            // A fold keeps lengths: the squares of the displacements, voice for voice.
            let squares = |moves: Vec<Ratio<i64>>| moves.into_iter().map(|d| d * d).sum::<Ratio<i64>>();
            let drawn = piece.from.pitches().iter().zip(piece.to.pitches()).map(|(a, b)| b - a);
            let time = piece.end - piece.start;
            let sung = before.iter().zip(&after).map(|(b, a)| time * i64::from(a - b));
            prop_assert_eq!(squares(drawn.collect()), squares(sung.collect()));
        }
    }

    #[test]
    fn torus_and_half_space((octave, voices) in steps()) {
        let (before, after): (Vec<i32>, Vec<i32>) = voices.into_iter().unzip();
        for piece in path(Picture::Torus, octave, &before, &after).unwrap() {
            let cell = |&p: &Ratio<i64>| p >= whole(0) && p <= whole(octave.wide());
            prop_assert!(piece.from.pitches().iter().chain(piece.to.pitches()).all(cell));
            prop_assert!(!piece.meets_mirror);
        }
        let pieces = path(Picture::Unordered, octave, &before, &after).unwrap();
        prop_assert!(times_follow(&pieces));
        let sorted = |pitches: &[i32]| {
            let mut sorted: Vec<_> = pitches.iter().map(|&p| whole(i64::from(p))).collect();
            sorted.sort();
            sorted
        };
        prop_assert_eq!(pieces[0].from.pitches(), sorted(&before));
        prop_assert_eq!(pieces[pieces.len() - 1].to.pitches(), sorted(&after));
        prop_assert!(pieces.iter().all(|p| p.from.pitches().is_sorted() && p.to.pitches().is_sorted()));
        for w in pieces.windows(2) {
            prop_assert_eq!(&w[0].to, &w[1].from);
        }
    }

    #[test]
    fn the_strip_bounces_where_the_step_passes_a_mirror(
        (x, dx) in (40..80_i32, -20..20_i32), (y, dy) in (40..80_i32, -20..20_i32),
    ) {
        let octave = Octave::SEMITONES;
        let pieces = path(Picture::Unrolled, octave, &[x, y], &[x + dx, y + dy]).unwrap();
        let place = |semitone| Place { step: 0, semitone };
        let leg = Leg {
            lower: (place(x), place(x + dx)),
            upper: (place(y), place(y + dy)),
        };
        prop_assert_eq!(pieces.len() as u32, 1 + leg.mirrors_passed());
        for piece in pieces {
            // Level, upright, 45 degrees: the slope keeps its absolute value.
            let time = piece.end - piece.start;
            let u = piece.to.layer() - piece.from.layer();
            let v = piece.to.gaps(octave)[0] - piece.from.gaps(octave)[0];
            prop_assert_eq!(u, time * i64::from(leg.semitones().along()));
            prop_assert_eq!(v * v, time * time * i64::from(leg.semitones().across().pow(2)));
        }
    }
}

/// C4 E4 to E4 C4: straight up to the edge, and the same way back; the layer never changes.
#[test]
fn a_voice_exchange() {
    let octave = Octave::SEMITONES;
    let pieces = path(Picture::Chords, octave, &[60, 64], &[64, 60]).unwrap();
    let u_v = |spot: &Spot| (spot.layer(), spot.gaps(octave)[0]);
    let way: Vec<_> = pieces
        .iter()
        .flat_map(|p| [u_v(&p.from), u_v(&p.to)])
        .collect();
    let home = StripPoint::under(octave, 60, 64);
    let (home, edge) = (
        (whole(i64::from(home.u())), whole(i64::from(home.v()))),
        (whole(4), whole(0)),
    );
    assert_eq!(way, [home, edge, edge, home]);
    assert!(pieces[0].meets_mirror && !pieces[1].meets_mirror);
}

/// C4 G4 to D4 A4 to E4 B4: level, and over the seam, where a fifth turns up as a fourth would.
#[test]
fn parallel_fifths_over_the_seam() {
    let octave = Octave::SEMITONES;
    let pieces = path(Picture::Chords, octave, &[0, 7], &[4, 11]).unwrap();
    assert_eq!(pieces.len(), 2);
    assert!(pieces[0].meets_seam && !pieces[0].meets_mirror);
    let v: Vec<_> = pieces
        .iter()
        .map(|p| (p.from.gaps(octave)[0], p.to.gaps(octave)[0]))
        .collect();
    assert_eq!(v, [(whole(7), whole(7)), (whole(5), whole(5))]);
    assert_eq!(pieces[0].end, Ratio::new(5, 8));
}

/// Parallel unisons and octaves run along the edge: one piece, on the mirror all the way.
#[test]
fn along_the_edge() {
    let octave = Octave::SEMITONES;
    for upper in [0, 12] {
        let (before, after) = ([0, upper], [5, upper + 5]);
        for picture in [Picture::Chords, Picture::Unrolled, Picture::Unordered] {
            let pieces = path(picture, octave, &before, &after).unwrap();
            assert!(
                pieces.iter().all(|piece| !piece.meets_mirror),
                "{picture:?}"
            );
            if picture == Picture::Unordered {
                continue;
            }
            for piece in pieces {
                let [from, to] = [piece.from, piece.to].map(|spot| spot.gaps(octave)[0]);
                assert!(
                    from == to && (from == whole(0) || from == whole(12)),
                    "{picture:?}"
                );
            }
        }
    }
    // Standing still is one piece without length.
    let still = path(Picture::Unordered, octave, &[7, 7], &[7, 7]).unwrap();
    assert_eq!((still.len(), &still[0].from), (1, &still[0].to));
}
