//! Steps of two voices: the plane, its mirrors and the strip, for all steps.
#![allow(clippy::unwrap_used, clippy::panic)]

use partwright_space::{
    Chord, Leg, Motion, Norm, Octave, Place, PlanePoint, StripPoint, Vector, on_torus, unordered,
};

/// The class as the trade defines it, from the two displacements.
fn by_definition(dx: i32, dy: i32) -> Motion {
    match (dx, dy) {
        (0, 0) => Motion::Still,
        (0, _) | (_, 0) => Motion::Oblique,
        _ if dx == dy => Motion::Parallel,
        _ if (dx > 0) == (dy > 0) => Motion::Similar,
        _ => Motion::Contrary,
    }
}

#[test]
fn the_class_is_the_place_in_the_cone() {
    for dx in -14..=14_i32 {
        for dy in -14..=14_i32 {
            let step = Vector { dx, dy };
            assert_eq!(step.class(), by_definition(dx, dy), "{step:?}");
            assert_eq!(step.exactly_contrary(), dx == -dy && dx != 0);
            // Renaming the voices and every mirror turn the sign of the component across.
            let renamed = Vector { dx: dy, dy: dx };
            assert_eq!(
                (renamed.along(), renamed.across()),
                (step.along(), -step.across())
            );
            assert_eq!(renamed.class(), step.class());
            for norm in Norm::ALL {
                let size = norm.size([i64::from(dx), i64::from(dy)]);
                assert_eq!(step.size(norm), size, "{norm:?} {step:?}");
            }
        }
    }
}

#[test]
fn strip_and_canonical_form_agree() {
    for size in [1, 2, 5, 7, 12] {
        let octave = Octave::new(size).unwrap();
        for x in -30..=30 {
            for y in -30..=30 {
                let at = StripPoint::under(octave, x, y);
                let chord = Chord::new(octave, [x, y]);
                let canonical = chord.canonical();
                let want = (canonical.layer(), canonical.gaps()[0]);
                assert_eq!((i64::from(at.u()), at.v()), want, "octave {size}, {x} {y}");
                assert_eq!(at.residues(), chord.residues());
                assert_eq!(at, StripPoint::under(octave, y, x));
                assert_eq!(at.on_edge(), chord.coincidences() == 1);
                let interval = octave.circle_distance(x, y);
                assert_eq!(at.height(), interval, "octave {size}, {x} {y}");
            }
        }
    }
}

/// The strip's named places: unisons on the edge, tritones on the centre line, and fifth and
/// fourth at one height.
#[test]
fn landmarks_of_the_strip() {
    let at = |x, y| {
        let at = StripPoint::under(Octave::SEMITONES, x, y);
        (at.u(), at.v())
    };
    assert_eq!([at(0, 7), at(5, 0)], [(7, 7), (5, 5)]);
    assert_eq!(
        [at(0, 0), at(5, 5), at(6, 6), at(11, 11)],
        [(0, 0), (10, 0), (0, 12), (10, 12)]
    );
    assert_eq!([at(0, 6), at(3, 9)], [(6, 6), (0, 6)]);
    for x in 0..12 {
        let tritone = StripPoint::under(Octave::SEMITONES, x, x + 6);
        assert_eq!(tritone.twice_from_centre(), 0);
        assert_eq!(tritone.u(), (2 * x + 6) % 12);
    }
}

#[test]
fn mirrors_of_the_plane() {
    let octave = Octave::SEMITONES;
    for (x, y) in [(0, 7), (60, 48), (-5, 31), (12, 12)] {
        let point = PlanePoint { x, y };
        assert_eq!(PlanePoint::at(point.along(), point.across()), Some(point));
        assert_eq!(PlanePoint::at(point.along() + 1, point.across()), None);
        for k in -2..=2 {
            let image = point.reflected(octave, k).unwrap();
            assert_eq!(image.along(), point.along());
            assert_eq!(
                image.across() + point.across(),
                i64::from(2 * k * octave.size())
            );
            assert_eq!(image.reflected(octave, k), Some(point));
        }
        let glided = point.glided(octave).unwrap();
        assert_eq!(glided.across(), octave.wide() - point.across());
        let same = StripPoint::under(octave, point.x, point.y);
        assert_eq!(StripPoint::under(octave, glided.x, glided.y), same);
        let torus = point.on_torus(octave);
        assert_eq!(vec![torus.x, torus.y], on_torus(octave, &[x, y]));
        let half = point.unordered();
        assert_eq!(vec![half.x, half.y], unordered(&[x, y]));
    }
}

/// Octave shifts of a voice in both chords change nothing but crossings and overlaps.
#[test]
fn shifting_a_voice_by_octaves() {
    let place = |step: i32| Place::white_key(step);
    let up = |p: Place| Place {
        step: p.step + 7,
        semitone: p.semitone + 12,
    };
    for x in 20..24 {
        for dx in -4..=4 {
            for y in 24..30 {
                for dy in -4..=4 {
                    let leg = Leg {
                        lower: (place(x), place(x + dx)),
                        upper: (place(y), place(y + dy)),
                    };
                    let shifted = Leg {
                        lower: leg.lower,
                        upper: (up(leg.upper.0), up(leg.upper.1)),
                    };
                    assert_eq!(leg.motion(), shifted.motion());
                    assert_eq!(leg.parallel_in_classes(), shifted.parallel_in_classes());
                    assert_eq!(leg.exchanges_classes(), shifted.exchanges_classes());
                    assert_eq!(leg.same_direction(), dx * dy > 0);
                }
            }
        }
    }
}

/// The white keys, from the scale itself.
#[test]
fn white_keys() {
    let scale = [0, 2, 4, 5, 7, 9, 11];
    for step in -50..90_i32 {
        let within = scale[usize::try_from(step.rem_euclid(7)).unwrap()];
        let semitone = 12 + within + 12 * step.div_euclid(7);
        assert_eq!(Place::white_key(step), Place { step, semitone });
    }
    assert_eq!(Place::white_key(28).semitone, 60);
}
