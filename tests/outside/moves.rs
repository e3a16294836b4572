//! How Bach's voices leave leading notes and sevenths, beside a larger count of his chorales.

use std::collections::BTreeMap;

use partwright_check::Analysis;
use partwright_rules::{Leaving, Piece, Tone};
use partwright_score::Texture;

use crate::scores::set;

/// Counts by what was left and how.
type Counts = BTreeMap<(&'static str, &'static str), usize>;

fn way(leaving: &Leaving<'_>) -> &'static str {
    match leaving {
        l if l.rises_semitone() => "rises",
        l if l.steps_down() || l.next_note_is_step(false) => "falls a step",
        l if l.falls_third() => "falls a third",
        l if l.stays() || l.is_chromatic() => "stays",
        _ => "leaps",
    }
}

fn tritone(leaving: &Leaving<'_>) -> &'static str {
    match leaving {
        l if l.steps_up() => "rises",
        l if l.steps_down() || l.stays() => "falls",
        _ => "leaps",
    }
}

fn count(piece: Piece<'_>, counts: &mut Counts) {
    let mut add = |what, how| *counts.entry((what, how)).or_default() += 1;
    let top = &piece.score.voices[0].notes;
    let last = piece.score.voices.len() - 1;
    for chord in piece.chords() {
        let leavings = chord.leavings();
        let rests = |l: &Leaving<'_>| {
            let at = l.to.onset;
            top.iter()
                .any(|n| n.fermata && n.onset <= at && at < n.end())
        };
        if chord.quality().name() == "dominant seventh" && chord.has_sure_seventh() {
            let moves = |l: &&Leaving<'_>| {
                l.from.tone == Tone::Seventh && !chord.keeps_root(&l.next) && !l.stays()
            };
            for l in leavings.iter().filter(moves) {
                add("seventh", way(l));
            }
        }
        if chord.resolves_to().is_none() {
            continue;
        }
        let leads = |l: &&Leaving<'_>| chord.is_leading_note(l.from.pitch);
        for l in leavings.iter().filter(leads) {
            match l.voice() {
                0 => add("soprano", way(l)),
                v if v == last => add("bass", way(l)),
                _ if rests(l) => add("inside, at a fermata", way(l)),
                _ => add("inside", way(l)),
            }
        }
        if chord.quality().name() == "diminished"
            && let Some(leading) = leavings.iter().find(leads)
        {
            for l in leavings.iter().filter(|l| l.is_tritone_from(leading)) {
                let fourth = l.is_under(leading);
                let what = if fourth {
                    "augmented fourth"
                } else {
                    "diminished fifth"
                };
                add(what, tritone(l));
            }
        }
    }
}

#[test]
fn leading_notes_and_sevenths_go_as_in_the_larger_count() {
    let mut counts = Counts::new();
    for name in ["chorales-dcml", "chorales-nba"] {
        let Some(pieces) = set(name) else { return };
        for mut piece in pieces {
            piece.score.voices.last_mut().unwrap().sixteen_foot = true;
            let texture = Texture::of(&piece.score);
            let analysis = Analysis::of(&piece.score, &texture);
            let seen = Piece {
                score: &piece.score,
                texture: &texture,
                analysis: &analysis,
            };
            count(seen, &mut counts);
        }
    }
    for ((what, how), n) in &counts {
        println!("{what}: {how} {n}");
    }
    let get = |what, how| counts.get(&(what, how)).copied().unwrap_or(0);
    let of = |what| {
        let all = counts.iter().filter(|((w, _), _)| *w == what);
        all.map(|(_, n)| n).sum::<usize>()
    };
    let share = |part: usize, all: usize| 100.0 * part as f64 / all as f64;
    let inside = "inside, at a fermata";
    let (falls, rises) = (get(inside, "falls a third"), get(inside, "rises"));
    // 370 chorales, counted by beats and fermatas; here 156, by inferred chords.
    for (what, ours, theirs) in [
        (
            "soprano",
            share(get("soprano", "rises"), of("soprano")),
            share(226, 245),
        ),
        (
            "seventh",
            share(get("seventh", "falls a step"), of("seventh")),
            share(883, 902),
        ),
        (inside, share(falls, falls + rises), share(747, 747 + 271)),
    ] {
        println!("outside: {what}: {ours:.1} in a hundred, in the larger count {theirs:.1}");
        assert!((ours - theirs).abs() < 5.0, "{what}");
    }
    // An augmented fourth in a diminished triad opens to a fourth more often than to a sixth.
    assert!(get("augmented fourth", "rises") > get("augmented fourth", "falls"));
}
