//! Sheets that the grammar derives: they stay grammatical, and are read the same.

use std::fs;
use std::path::Path;

use crate::derive::{Deriver, Free, Random, Sentence};
use crate::ebnf::Grammar;
use crate::lawful::aligned;
use crate::recognise::Recogniser;
use crate::steer::Steer;

/// The start of the grammar.
const SHEET: &str = "voice sheet";

/// A sheet that makes sense, for most seeds.
fn sheet(deriver: &mut Deriver<'_>, seed: u64) -> Option<Sentence> {
    deriver.random = Random::new(seed);
    let mut labels: Vec<Sentence> = Vec::new();
    for _ in 0..3 {
        let label = deriver.sentence("label", &mut Free)?;
        if labels.iter().all(|known| known.text != label.text) {
            labels.push(label);
        }
    }
    let mut steer = Steer::new(labels, &mut deriver.random);
    let sentence = deriver.sentence(SHEET, &mut steer)?;
    steer.is_finished().then_some(sentence)
}

#[test]
fn what_the_grammar_derives_stays_grammatical() {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("../../grammar/voicesheet.ebnf");
    let grammar = Grammar::read(&fs::read_to_string(path).unwrap()).unwrap();
    let recogniser = Recogniser::new(&grammar);
    let mut deriver = Deriver::new(&grammar, &recogniser, 350);
    let (mut derived, mut changed) = (0, 0);
    for seed in 0..400 {
        let Some(sentence) = sheet(&mut deriver, seed) else {
            continue;
        };
        let text = sentence.text;
        let aligned = aligned(&text);
        derived += 1;
        changed += usize::from(aligned != text);
        // What grows beyond a thousand columns takes the recogniser long.
        if aligned.len() < 4000 {
            assert_eq!(recogniser.recognise(SHEET, &aligned), Ok(()), "{aligned}");
        }
    }
    assert!(derived > 300 && changed > 200, "{changed} of {derived}");
}
