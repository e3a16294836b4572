//! One note moved by a step or a third, two thousand times: how often the checker finds it.
//!
//! A moved note need not break any rule; of those not found, fifty are printed on request
//! (`PARTWRIGHT_SHOW=hurts`) and judged in `places/hurts.md`.

use partwright_check::{Finding, Severity, Wishes, check_score};
use partwright_rules::Style;
use partwright_score::{Pitch, Score, Sound};
use proptest::prelude::Rng as _;
use proptest::test_runner::{RngAlgorithm, TestRng};

use crate::scores::{Piece, chorales, set};
use crate::treatise::figures;

/// A piece with the style it is judged in, and what is found in it unhurt.
struct Judged {
    piece: Piece,
    style: Style,
    before: Vec<Finding>,
}

fn judge(score: &Score, style: Style) -> Vec<Finding> {
    check_score(score, &Wishes::of_style(style))
}

/// What the hurt brought: the worst new finding.
fn worst_new(before: &[Finding], after: &[Finding]) -> Option<Severity> {
    let is_new = |f: &&Finding| {
        !before
            .iter()
            .any(|b| (b.rule, b.at, &b.voices, b.severity) == (f.rule, f.at, &f.voices, f.severity))
    };
    after.iter().filter(is_new).map(|f| f.severity).max()
}

struct Dice(TestRng);

impl Dice {
    fn below(&mut self, n: usize) -> usize {
        self.0.next_u64() as usize % n
    }
}

/// Moves a note by one or two steps, up or down, with the sign it has: where, and from what to what.
fn hurt(score: &mut Score, dice: &mut Dice) -> Option<(usize, usize, Pitch, Pitch)> {
    let voice = dice.below(score.voices.len());
    if score.voices[voice].cantus {
        return None;
    }
    let notes = &mut score.voices[voice].notes;
    let note = dice.below(notes.len());
    let steps = [-2, -1, 1, 2][dice.below(4)];
    let Sound::Pitch(from) = notes[note].sound else {
        return None;
    };
    let to = Pitch {
        step: from.step + steps,
        sign: from.sign,
    };
    notes[note].sound = Sound::Pitch(to);
    Some((voice, note, from, to))
}

#[test]
fn two_thousand_hurts() {
    let (Some(treatise), Some(renaissance), Some(chorales)) =
        (figures(), set("renaissance"), chorales())
    else {
        return;
    };
    let in_style = |set: Vec<Piece>, style| set.into_iter().map(move |piece| (piece, style));
    let sets = [
        treatise,
        in_style(renaissance, Style::Motet).collect(),
        in_style(chorales, Style::Chorale).collect(),
    ];
    let mut pieces = sets.map(|set: Vec<_>| {
        let judged = set.into_iter().map(|(piece, style)| Judged {
            before: judge(&piece.score, style),
            piece,
            style,
        });
        judged.collect::<Vec<_>>()
    });
    let show = std::env::var("PARTWRIGHT_SHOW").is_ok_and(|what| what == "hurts");
    let mut dice = Dice(TestRng::from_seed(RngAlgorithm::ChaCha, &[7; 32]));
    for ((name, number, least), set) in LEAST.iter().zip(&mut pieces) {
        let (mut tried, mut found, mut faults, mut shown) = (0, 0, 0, 0);
        while tried < *number {
            let chosen = dice.below(set.len());
            let judged = &set[chosen];
            let mut score = judged.piece.score.clone();
            let Some((voice, note, from, to)) = hurt(&mut score, &mut dice) else {
                continue;
            };
            tried += 1;
            match worst_new(&judged.before, &judge(&score, judged.style)) {
                Some(Severity::Fault) => {
                    found += 1;
                    faults += 1;
                }
                Some(_) => found += 1,
                None if show && shown < 25 => {
                    shown += 1;
                    let at = score.place(score.voices[voice].notes[note].onset);
                    let label = &score.voices[voice].label;
                    println!(
                        "{} bar {} beat {} {label}: {from} to {to}",
                        judged.piece.id, at.bar, at.beat
                    );
                }
                None => {}
            }
        }
        println!("outside: {name}: of {tried} hurts {found} found, {faults} of them by a fault");
        // What was measured may only grow.
        assert!(
            found >= least.0 && faults >= least.1,
            "{name}: {found} {faults}"
        );
    }
}

/// How many hurts are tried in each set, and the least number found, and found by a fault. Leaps of
/// inner voices in motets (see `similar-leaps`) count no longer, nor what two voices do as a third
/// falls silent.
const LEAST: [(&str, usize, (usize, usize)); 3] = [
    ("treatise", 500, (474, 427)),
    ("renaissance", 500, (402, 349)),
    ("chorales", 1000, (588, 359)),
];
