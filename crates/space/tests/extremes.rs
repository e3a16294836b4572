//! Nothing panics at the far ends, and nothing fills the memory: an answer or a plain refusal.
#![allow(clippy::unwrap_used, clippy::panic)]

use partwright_space::draw::{Picture, path};
use partwright_space::{
    AlcovePoint, Chord, Doubling, Gap, Leading, Leg, Motion, Norm, Octave, Pair, Part, Passage,
    Place, Placing, PlanePoint, PrismPoint, SpaceError, StripPoint, Tone, Vector, count, crossed,
    crossing_free, in_order, least, least_size, side, turned,
};

const ENDS: [i32; 7] = [i32::MIN, i32::MIN + 1, -1, 0, 1, i32::MAX - 1, i32::MAX];

#[test]
fn steps_at_the_ends() {
    for a in ENDS {
        for b in ENDS {
            let step = Vector { dx: a, dy: b };
            let sum = i64::from(a) + i64::from(b);
            assert_eq!(
                i64::from(step.along()),
                sum.clamp(i32::MIN.into(), i32::MAX.into())
            );
            let _ = (step.across(), Norm::ALL.map(|norm| step.size(norm)));
            let want = match (a.signum(), b.signum()) {
                (0, 0) => Motion::Still,
                (0, _) | (_, 0) => Motion::Oblique,
                (x, y) if x != y => Motion::Contrary,
                _ if a == b => Motion::Parallel,
                _ => Motion::Similar,
            };
            assert_eq!(step.class(), want, "{step:?}");
            let gap = Gap {
                steps: a,
                semitones: b,
            };
            let _ = (
                gap.sounding(),
                gap.family(),
                gap.generic_family(),
                side(gap),
                crossed(gap),
            );
            for c in ENDS {
                let place = |step, semitone| Place { step, semitone };
                let leg = Leg {
                    lower: (place(a, b), place(c, a)),
                    upper: (place(b, c), place(a, c)),
                };
                let _ = (
                    leg.motion(),
                    leg.consecutive(),
                    leg.crosses(),
                    leg.overlaps(),
                );
                let _ = (
                    leg.exchanges(),
                    leg.exchanges_classes(),
                    leg.mirrors_passed(),
                );
                let _ = (
                    leg.parallel_in_classes(),
                    leg.enters_unison(),
                    leg.leaves_unison(),
                );
            }
            let _ = Place::white_key(a);
            let point = PlanePoint { x: a, y: b };
            assert_eq!(PlanePoint::at(point.along(), point.across()), Some(point));
            let _ = (
                point.reflected(Octave::SEMITONES, b),
                point.glided(Octave::SEMITONES),
            );
        }
    }
}

#[test]
fn octaves_of_every_size() {
    for size in [i32::MIN, -12, 0, Octave::LARGEST + 1, i32::MAX] {
        assert_eq!(Octave::new(size), Err(SpaceError::OctaveSize(size)));
    }
    for size in [1, 2, 3, 12, Octave::LARGEST] {
        let octave = Octave::new(size).unwrap();
        let strip = StripPoint::under(octave, i32::MIN, i32::MAX);
        assert!((0..size).contains(&strip.u()) && (0..=size).contains(&strip.v()));
        let chord = Chord::new(octave, ENDS);
        assert_eq!(
            chord.canonical(),
            AlcovePoint::under(octave, &ENDS).reduced()
        );
        let _ = PrismPoint::under(octave, [i32::MIN, 0, i32::MAX]).isometric();
        let other = chord.transposed(i32::MAX).inverted();
        for norm in Norm::ALL {
            let least = least(&chord, &other, Doubling::None, norm).unwrap();
            assert!(least.size >= 0 && !least.leadings.is_empty());
            let few = Chord::new(octave, [3, i32::MIN]);
            assert!(least_size(&chord, &few, Doubling::Both, norm).unwrap() >= 0);
            let mut order = in_order(&chord, &few, Doubling::Smaller, norm).unwrap();
            let size = least_size(&chord, &few, Doubling::Smaller, norm).unwrap();
            assert_eq!(order.next().unwrap().0, size);
        }
    }
}

#[test]
fn empty_chords() {
    let octave = Octave::SEMITONES;
    let empty = Chord::new(octave, []);
    let full = Chord::new(octave, [0, 4]);
    for doubling in [
        Doubling::None,
        Doubling::Smaller,
        Doubling::Both,
        Doubling::Voices(3),
    ] {
        for norm in Norm::ALL {
            let none = least(&empty, &empty, doubling, norm).unwrap();
            assert_eq!((none.size, none.leadings.len()), (0, 1));
            assert_eq!(none.leadings[0].pairs(), []);
            assert_eq!(
                crossing_free(&empty, &empty, doubling, norm)
                    .unwrap()
                    .count(),
                1
            );
            assert_eq!(in_order(&empty, &empty, doubling, norm).unwrap().count(), 1);
            for (a, b) in [(&empty, &full), (&full, &empty)] {
                assert_eq!(least(a, b, doubling, norm), Err(SpaceError::EmptyChord));
                assert!(in_order(a, b, doubling, norm).is_err());
            }
        }
    }
    assert_eq!(turned(&empty, &full, 0), Err(SpaceError::EmptyChord));
    assert!(turned(&empty, &empty, i64::MAX).unwrap().pairs().is_empty());
    assert_eq!(empty.canonical().pitches(), []);
    assert_eq!(empty.core_distance_squared(), Ok(0.into()));
    assert_eq!(empty.boundary_distance(Norm::L1), None);
    assert!(empty.zeta().norm_squared() == 0.0 && empty.transposition_type().is_empty());
    assert_eq!(Chord::all(octave, 0).count(), 1);
    assert!(AlcovePoint::new(octave, 0, vec![]).is_some());
    assert!(AlcovePoint::new(octave, 1, vec![]).is_none());
    assert_eq!(path(Picture::Chords, octave, &[], &[]).unwrap().len(), 1);
}

#[test]
fn plain_refusals() {
    let octave = Octave::SEMITONES;
    let chord = |notes: &[i32]| Chord::new(octave, notes.iter().copied());
    let (two, three) = (chord(&[0, 1]), chord(&[0, 4, 7]));
    let norm = Norm::L1;
    let of = |doubling| least_size(&two, &three, doubling, norm);
    assert_eq!(of(Doubling::None), Err(SpaceError::DifferentSizes(2, 3)));
    assert_eq!(
        of(Doubling::Voices(2)),
        Err(SpaceError::TooFewVoices {
            voices: 2,
            notes: 3
        })
    );
    assert_eq!(
        of(Doubling::Voices(usize::MAX)),
        Err(SpaceError::TooManyChoices)
    );
    let steps = Chord::new(Octave::STEPS, [0, 1]);
    assert_eq!(
        least_size(&two, &steps, Doubling::None, norm),
        Err(SpaceError::DifferentOctaves(12, 7))
    );
    assert_eq!(
        in_order(&two, &three, Doubling::Both, norm).err(),
        Some(SpaceError::EndlessVoices)
    );
    let endless = in_order(&two, &three, Doubling::Voices(usize::MAX), norm);
    assert_eq!(endless.err(), Some(SpaceError::TooManyChoices));
    assert_eq!(
        turned(&three, &three, i64::MAX),
        Err(SpaceError::OutOfRange)
    );
    assert_eq!(
        turned(&three, &three, i64::MIN),
        Err(SpaceError::OutOfRange)
    );
    assert!(turned(&three, &three, 1 << 20).is_ok());
    assert_eq!(
        PrismPoint::of(&two),
        Err(SpaceError::NoteCount {
            wanted: 3,
            found: 2
        })
    );
    assert_eq!(Leading::between(octave, &[0], &[0, 1]), None);
    assert_eq!(Leading::between(octave, &[i32::MIN], &[i32::MAX]), None);
    let far = Leading::new(
        octave,
        [Pair {
            from: i32::MIN,
            by: i32::MIN,
        }; 2],
    );
    assert!(far.crossing_free() && far.inverse().pairs().len() == 2 && far.size(Norm::L2) > 0);
    // Equal notes without end: one size, and a refusal to list a flood.
    let crowd = Chord::new(octave, [0; 60]);
    assert_eq!(least_size(&crowd, &crowd, Doubling::Both, norm), Ok(0));
    assert_eq!(
        least(&crowd, &crowd, Doubling::Both, norm),
        Err(SpaceError::TooManyChoices)
    );
    assert_eq!(
        least(&crowd, &crowd, Doubling::None, norm)
            .unwrap()
            .leadings
            .len(),
        1
    );
    for error in [
        SpaceError::EmptyChord,
        SpaceError::OutOfRange,
        SpaceError::TooManyChoices,
    ] {
        assert!(!error.to_string().is_empty());
    }
}

#[test]
fn voicings_and_passages_without_limits() {
    let part = |from, leap, held| Part {
        from,
        low: i32::MIN,
        high: i32::MAX,
        leap,
        held,
    };
    let mut question = Placing {
        octave: Octave::SEMITONES,
        tones: vec![Tone::wanted(i32::MIN), Tone::wanted(4)],
        parts: vec![part(i32::MIN, 30, None), part(i32::MAX, 30, None)],
        norm: Norm::L2,
        crossing: true,
        overlap: true,
    };
    assert!(question.least().unwrap().is_some());
    question.parts.push(part(0, u32::MAX, Some(i32::MAX)));
    assert!(question.least().unwrap().is_some());
    question.parts.push(part(0, u32::MAX, None));
    assert_eq!(question.least(), Err(SpaceError::TooManyChoices));
    question.parts.clear();
    assert_eq!(question.least(), Ok(None));
    question.tones.clear();
    assert_eq!(question.least(), Ok(Some((0, vec![vec![]]))));

    let layers = [vec![(); 2], vec![(); 2]];
    let far = Passage::new(&layers, |_, ()| Some(i64::MAX), |_, (), ()| Some(i64::MAX));
    assert_eq!(far.least().unwrap().1.len(), 4);
    let none: [Vec<()>; 0] = [];
    let empty = Passage::new(&none, |_, ()| None, |_, (), ()| None);
    assert_eq!(empty.least(), Some((0, vec![vec![]])));
}

#[test]
fn pictures_and_counts_too_large() {
    let octave = Octave::SEMITONES;
    let draw = |before: &[i32], after: &[i32]| path(Picture::Chords, octave, before, after);
    assert_eq!(draw(&[0], &[0, 1]), Err(SpaceError::DifferentSizes(1, 2)));
    assert_eq!(draw(&[i32::MIN], &[i32::MAX]), Err(SpaceError::OutOfRange));
    assert_eq!(
        draw(&[0, 0], &[0, 1 << 24]),
        Err(SpaceError::TooManyChoices)
    );
    assert_eq!(draw(&[0; 65], &[0; 65]), Err(SpaceError::TooManyChoices));
    assert!(draw(&[1 << 24, 0], &[(1 << 24) - 7, 3]).is_ok());
    for notes in [u64::MAX, u64::MAX / 2] {
        let _ = (
            count::chords(octave, notes),
            count::on_mirrors(octave, notes, notes - 1),
        );
        let _ = (
            count::on_layer(octave, notes, i32::MIN),
            count::transposition_types(octave, notes),
        );
        assert_eq!(count::inversion_types(octave, notes), None);
    }
    assert_eq!(count::interior(octave, 13), Some(0));
    assert_eq!(count::relations(u32::MAX, u32::MAX), None);
    assert_eq!(count::relations(2, 2), Some(7));
    assert_eq!(count::bijections(u32::MAX), None);
    let crowd = Chord::new(
        Octave::new(Octave::LARGEST).unwrap(),
        (0..4000).map(|i| i * 7),
    );
    assert!(crowd.core_distance_squared().is_ok());
}
