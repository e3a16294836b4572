//! Voicings in register, passages, and small voice leadings, against plain exhaustive search.
#![allow(clippy::unwrap_used, clippy::panic)]

use partwright_space::{
    Chord, Doubling, Leading, Norm, Octave, Pair, Part, Passage, Placing, Tone, in_order,
};
use proptest::prelude::*;
use std::collections::BTreeSet;

fn config() -> ProptestConfig {
    ProptestConfig {
        cases: 150,
        failure_persistence: None,
        rng_seed: proptest::test_runner::RngSeed::Fixed(20_260_101),
        ..ProptestConfig::default()
    }
}

fn norm() -> impl Strategy<Value = Norm> {
    prop_oneof![Just(Norm::L1), Just(Norm::L2), Just(Norm::Linf)]
}

/// Three voices, each with a range and a leap of its own, one of them perhaps held.
fn placing() -> impl Strategy<Value = Placing> {
    let part = (
        50..75_i32,
        0..10_i32,
        0..10_i32,
        2..9_u32,
        proptest::option::weighted(0.15, 50..75_i32),
    )
        .prop_map(|(from, below, above, leap, held)| Part {
            from,
            low: from - below,
            high: from + above,
            leap,
            held,
        });
    let tone = (0..12_i32, 0..3_u32, 1..4_u32).prop_map(|(class, at_least, at_most)| Tone {
        class,
        at_least: at_least.min(1),
        at_most,
    });
    (
        proptest::collection::vec(part, 3),
        proptest::collection::vec(tone, 1..5),
        norm(),
        any::<bool>(),
        any::<bool>(),
    )
        .prop_map(|(parts, tones, norm, crossing, overlap)| Placing {
            octave: Octave::SEMITONES,
            tones,
            parts,
            norm,
            crossing,
            overlap,
        })
}

/// Every lawful voicing, by the words of the question.
fn every_voicing(question: &Placing) -> Vec<(i64, Vec<i32>)> {
    let parts = &question.parts;
    let mut all: Vec<Vec<i32>> = vec![Vec::new()];
    for part in parts {
        let may = |q: i32| match part.held {
            Some(held) => q == held,
            None => {
                (part.low..=part.high).contains(&q)
                    && (q - part.from).unsigned_abs() <= part.leap
                    && question
                        .tones
                        .iter()
                        .any(|tone| tone.class == q.rem_euclid(12))
            }
        };
        all = all
            .into_iter()
            .flat_map(|way| {
                (30..95)
                    .filter(|&q| may(q))
                    .map(move |q| [way.clone(), vec![q]].concat())
            })
            .collect();
    }
    all.retain(|way| {
        let neighbours =
            || (1..way.len()).map(|i| (way[i - 1], way[i], parts[i - 1].from, parts[i].from));
        let sung = |class: i32| way.iter().filter(|q| q.rem_euclid(12) == class).count() as u32;
        (question.crossing || neighbours().all(|(q, r, ..)| q <= r))
            && (question.overlap
                || neighbours().all(|(q, r, was_q, was_r)| q <= was_r && r >= was_q))
            && question.tones.iter().all(|tone| {
                let sung = sung(tone.class);
                sung >= tone.at_least && sung <= tone.at_most
            })
    });
    let size = |way: &Vec<i32>| {
        question.norm.size(
            way.iter()
                .zip(parts)
                .map(|(q, part)| i64::from(q - part.from)),
        )
    };
    let mut sized: Vec<_> = all.into_iter().map(|way| (size(&way), way)).collect();
    sized.sort();
    sized
}

/// Every voice leading with one voice for each note of the larger chord and none moving further
/// than `reach`: all ways to give each voice a note, kept where all notes are sung.
fn every_leading(a: &Chord, b: &Chord, voices: usize, reach: i32) -> BTreeSet<Leading> {
    let octave = a.octave();
    let mut ways: Vec<Vec<Pair>> = vec![Vec::new()];
    for _ in 0..voices {
        let pairs: Vec<Pair> = a
            .counted()
            .iter()
            .flat_map(|&(from, _)| (-reach..=reach).map(move |by| Pair { from, by }))
            .filter(|pair| b.residues().contains(&pair.to(octave)))
            .collect();
        ways = ways
            .into_iter()
            .flat_map(|way| {
                // Ascending, so that each multiset comes once.
                let last = way.last().copied();
                pairs
                    .iter()
                    .filter(move |&&pair| last.is_none_or(|last| last <= pair))
                    .map(move |&pair| [way.clone(), vec![pair]].concat())
                    .collect::<Vec<_>>()
            })
            .collect();
    }
    let covers = |chord: &Chord, part: &Chord| {
        part.counted().iter().all(|&(note, times)| {
            chord
                .counted()
                .iter()
                .any(|&(other, sung)| other == note && sung >= times)
        })
    };
    ways.into_iter()
        .map(|pairs| Leading::new(octave, pairs))
        .filter(|leading| covers(&leading.source(), a) && covers(&leading.target(), b))
        .collect()
}

proptest! {
    #![proptest_config(config())]

    #[test]
    fn voicings_in_order(question in placing()) {
        // A class given twice keeps both its limits, which the plain search reads one by one.
        let want = every_voicing(&question);
        let got: Vec<_> = question.in_order().unwrap().collect();
        prop_assert_eq!(&got, &want);
        let least = question.least().unwrap();
        prop_assert_eq!(least.as_ref().map(|l| l.0), want.first().map(|w| w.0));
        // A ban on pairs of voices only leaves voicings out.
        let far = |lower: i32, upper: i32| (upper - lower) % 12 != 7;
        let got: Vec<_> = question.in_order_where(|_, p, _, q| far(p, q)).unwrap().collect();
        let lawful = |way: &[i32]| {
            far(way[0], way[1]) && far(way[0], way[2]) && far(way[1], way[2])
        };
        let want: Vec<_> = want.into_iter().filter(|(_, way)| lawful(way)).collect();
        prop_assert_eq!(got, want);
    }

    /// Uncrossing survives limits where ranges rise and the limit to leaps is common.
    #[test]
    fn rising_ranges_need_no_crossing(
        parts in proptest::collection::vec((50..75_i32, 8..14_i32), 4),
        classes in proptest::collection::btree_set(0..12_i32, 2..4), leap in 5..13_u32, norm in norm(),
    ) {
        let mut lows: Vec<i32> = parts.iter().map(|&(from, _)| from - 5).collect();
        let mut highs: Vec<i32> = parts.iter().map(|&(from, span)| from + span).collect();
        let mut froms: Vec<i32> = parts.iter().map(|&(from, _)| from).collect();
        lows.sort_unstable();
        highs.sort_unstable();
        froms.sort_unstable();
        let part = |i: usize| Part { from: froms[i], low: lows[i], high: highs[i], leap, held: None };
        let mut question = Placing {
            octave: Octave::SEMITONES,
            tones: classes.into_iter().map(Tone::wanted).collect(),
            parts: (0..4).map(part).collect(),
            norm,
            crossing: false,
            overlap: true,
        };
        let size = |question: &Placing| question.least().unwrap().map(|least| least.0);
        let free = size(&question);
        question.crossing = true;
        prop_assert_eq!(free, size(&question));
    }

    #[test]
    fn ways_through_a_passage(
        layers in proptest::collection::vec(proptest::collection::vec(0..12_i64, 0..4), 0..5),
    ) {
        // Some candidates and some steps are not allowed.
        let node = |_: usize, x: &i64| (x % 5 != 4).then_some(x % 3);
        let step = |_: usize, x: &i64, y: &i64| ((x + y) % 6 != 5).then_some(3 - (x - y).abs());
        let passage = Passage::new(&layers, node, step);
        let mut ways: Vec<(i64, Vec<usize>)> = vec![(0, Vec::new())];
        for (at, layer) in layers.iter().enumerate() {
            ways = ways.into_iter().flat_map(|(total, way)| {
                let layers = &layers;
                layer.iter().enumerate().filter_map(move |(i, x)| {
                    let before = way.last().map(|&last| step(at - 1, &layers[at - 1][last], x));
                    let total = total + node(at, x)? + before.unwrap_or(Some(0))?;
                    Some((total, [way.clone(), vec![i]].concat()))
                })
            }).collect();
        }
        ways.sort();
        let got: Vec<_> = passage.in_order().collect();
        prop_assert_eq!(&got, &ways);
        let least = passage.least();
        let ties = ways.iter().filter(|way| way.0 == ways[0].0).count();
        prop_assert_eq!(least.as_ref().map(|l| l.1.len()), (!ways.is_empty()).then_some(ties));
    }

    #[test]
    fn small_voice_leadings(
        a in proptest::collection::vec(0..7_i32, 1..4), b in proptest::collection::vec(0..7_i32, 1..4),
        more in 0..2_usize, norm in norm(),
    ) {
        let (a, b) = (Chord::new(Octave::STEPS, a), Chord::new(Octave::STEPS, b));
        let voices = a.len().max(b.len()) + more;
        let reach = 4;
        let mut want: Vec<_> = every_leading(&a, &b, voices, reach)
            .into_iter()
            .map(|leading| (leading.size(norm), leading))
            .collect();
        want.sort();
        // Complete up to the size of one voice alone that moves too far.
        let bound = norm.of(i64::from(reach));
        let want: Vec<_> = want.into_iter().take_while(|found| found.0 <= bound).collect();
        let all = in_order(&a, &b, Doubling::Voices(voices), norm).unwrap();
        let got: Vec<_> = all.take_while(|found| found.0 <= bound).collect();
        prop_assert_eq!(got, want);
    }
}

/// Where a note is held the least voicing without a crossing can be larger than the least of all:
/// F, A and C over a held C in the bass, from G sharp, C, F and G sharp.
#[test]
fn a_held_note_can_force_a_crossing() {
    let part = |from: i32, held| Part {
        from,
        low: from - 24,
        high: from + 24,
        leap: 24,
        held,
    };
    let mut question = Placing {
        octave: Octave::SEMITONES,
        tones: [5, 9, 0].map(Tone::wanted).to_vec(),
        parts: vec![
            part(44, Some(60)),
            part(48, None),
            part(65, None),
            part(80, None),
        ],
        norm: Norm::L1,
        crossing: false,
        overlap: true,
    };
    assert_eq!(question.least().unwrap().unwrap().0, 29);
    question.crossing = true;
    assert_eq!(question.least().unwrap().unwrap().0, 17);
}
