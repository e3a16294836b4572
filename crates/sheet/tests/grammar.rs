//! The grammar itself, read from its file: is it well formed, does it agree with the cases, and
//! do it and the reader of sheets take and refuse the same?

#![allow(clippy::unwrap_used, clippy::panic)]

#[path = "grammar/cases.rs"]
mod cases;
#[path = "grammar/context.rs"]
mod context;
#[path = "grammar/derive.rs"]
mod derive;
#[path = "grammar/ebnf.rs"]
mod ebnf;
#[path = "grammar/recognise.rs"]
mod recognise;
#[path = "grammar/spoil.rs"]
mod spoil;
#[path = "grammar/steer.rs"]
mod steer;

use std::collections::HashSet;
use std::fmt::Write;
use std::fs;
use std::path::Path;

use cases::cases;
use context::{KINDS, is_context};
use derive::{Deriver, Free, Random, Sentence};
use ebnf::{Grammar, Node};
use partwright_sheet::{Problem, ProblemKind, Sheet};
use recognise::Recogniser;
use steer::Steer;

/// The start of the grammar.
const SHEET: &str = "voice sheet";

fn grammar() -> Grammar {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("../../grammar/voicesheet.ebnf");
    Grammar::read(&fs::read_to_string(path).unwrap()).unwrap()
}

/// What the reader of sheets cannot read in a text.
fn unread(text: &str) -> Vec<Problem> {
    let problems = Sheet::read(text).lower(text).problems;
    problems
        .into_iter()
        .filter(|problem| problem.kind == ProblemKind::Reading)
        .collect()
}

/// A sheet that makes sense, for most seeds.
fn sheet(deriver: &mut Deriver<'_>, seed: u64) -> Option<Sentence> {
    deriver.random = Random::new(seed);
    let wanted = 1 + deriver.random.below(4);
    let mut labels: Vec<Sentence> = Vec::new();
    while labels.len() < wanted {
        let label = deriver.sentence("label", &mut Free)?;
        if labels.iter().all(|known| known.text != label.text) {
            labels.push(label);
        }
    }
    let mut steer = Steer::new(labels, &mut deriver.random);
    let sentence = deriver.sentence(SHEET, &mut steer)?;
    steer.is_finished().then_some(sentence)
}

/// Problems with the words they stand on and the sheet, as a failure is reported.
fn report(text: &str, problems: &[Problem]) -> String {
    let mut report = String::new();
    for problem in problems {
        let place = &text[problem.span.range()];
        let _ = writeln!(report, "  {place:?}: {}", problem.message);
    }
    let _ = writeln!(report, "  in {text:?}");
    report
}

#[test]
fn the_grammar_is_well_formed() {
    let grammar = grammar();
    assert!(
        grammar.rules.len() > 80,
        "only {} rules",
        grammar.rules.len()
    );
    assert_eq!(grammar.faults(), Vec::<String>::new());
    assert_eq!(grammar.rules[0].name, SHEET);
}

#[test]
fn the_grammar_takes_the_cases_that_are_well_written() {
    let recogniser = Recogniser::new(&grammar());
    let cases = cases();
    assert!(cases.len() > 400, "only {} cases", cases.len());
    let names: HashSet<&str> = cases.iter().map(|case| case.name.as_str()).collect();
    for name in KINDS.iter().flat_map(|kind| kind.cases) {
        assert!(names.contains(name), "there is no case “{name}” any more");
    }
    let mut wrong = String::new();
    let mut refused = 0;
    for case in &cases {
        let kind = |words: &str| {
            KINDS.iter().find(|kind| {
                kind.words.contains(&words) || kind.cases.contains(&case.name.as_str())
            })
        };
        let reasons: Vec<Option<&str>> = case
            .reading_problems
            .iter()
            .map(|words| Some(kind(words)?.reason))
            .collect();
        let taken = recogniser.recognise(SHEET, &case.sheet);
        refused += usize::from(taken.is_err());
        let fault = match taken {
            Err(at) if reasons.iter().all(Option::is_some) => {
                format!("refused from character {at} on, though grammatical: {reasons:?}")
            }
            Ok(()) if reasons.contains(&None) => format!(
                "taken, though {:?} should not be; if only context tells, name the case in context.rs",
                case.reading_problems
            ),
            _ => continue,
        };
        let _ = writeln!(wrong, "{}: {fault}\n{}", case.name, case.sheet);
    }
    assert!(wrong.is_empty(), "{wrong}");
    assert!(refused > 100, "only {refused} cases are refused");
}

#[test]
fn every_reserved_word_is_refused_as_a_label() {
    let grammar = grammar();
    let recogniser = Recogniser::new(&grammar);
    let body = grammar
        .body(grammar.rule("reserved word").unwrap())
        .unwrap();
    let words: Vec<&String> = grammar
        .children(body)
        .into_iter()
        .filter_map(|id| match &grammar.nodes[id] {
            Node::Terminal(word) => Some(word),
            _ => None,
        })
        .collect();
    assert!(words.len() > 20 && words.len() == grammar.children(body).len());
    for word in words {
        for text in [format!("voice {word}\n"), format!("{word} | G4 |\n")] {
            // Three of them begin rows of their own, where G4 says nothing.
            assert!(
                recogniser.recognise(SHEET, &text).is_err(),
                "the grammar takes {text:?}"
            );
            assert!(!unread(&text).is_empty(), "the reader takes {text:?}");
        }
    }
}

#[test]
fn the_reader_takes_what_the_grammar_derives() {
    let grammar = grammar();
    let recogniser = Recogniser::new(&grammar);
    let mut deriver = Deriver::new(&grammar, &recogniser, 350);
    let mut wrong = String::new();
    let (mut derived, mut clean, mut longest) = (0, 0, 0);
    for seed in 0..3000 {
        // Several hundred, and more as long as a way is left.
        if seed >= 600 && deriver.unused().is_empty() {
            break;
        }
        let Some(sentence) = sheet(&mut deriver, seed) else {
            continue;
        };
        derived += 1;
        let text = &sentence.text;
        longest = longest.max(text.len());
        assert_eq!(
            recogniser.recognise(SHEET, text),
            Ok(()),
            "seed {seed}: {text:?}"
        );
        let mut problems = unread(text);
        if problems.is_empty() {
            clean += 1;
            deriver.count(&sentence);
        }
        problems.retain(|p| !spoil::is_blank_made_plain(text, p));
        if !problems.is_empty() {
            let _ = writeln!(wrong, "seed {seed}:\n{}", report(text, &problems));
        }
    }
    assert!(wrong.is_empty(), "{wrong}");
    assert_eq!(
        deriver.unused(),
        Vec::<String>::new(),
        "no sentence takes these ways"
    );
    assert!(derived > 500, "only {derived} sentences");
    assert!(
        clean * 20 > derived * 19,
        "only {clean} of {derived} sentences make sense"
    );
    assert!(longest < 4000, "a sentence of {longest} bytes");
}

#[test]
fn the_reader_and_the_grammar_judge_spoilt_sheets_alike() {
    let grammar = grammar();
    let recogniser = Recogniser::new(&grammar);
    let mut deriver = Deriver::new(&grammar, &recogniser, 120);
    let cases = cases();
    let words: HashSet<&str> = cases
        .iter()
        .flat_map(|case| case.sheet.split_whitespace())
        .collect();
    let mut words: Vec<&str> = words.into_iter().collect();
    words.sort_unstable();
    let mut texts: Vec<String> = cases.iter().map(|case| case.sheet.clone()).collect();
    let derived = (0..300).filter_map(|seed| Some(sheet(&mut deriver, seed)?.text));
    texts.extend(derived.filter(|text| text.len() < 400));
    let mut wrong = String::new();
    let (mut taken, mut refused) = (0, 0);
    let mut random = Random::new(5);
    for text in texts.iter().cycle().take(5000) {
        let spoilt = spoil::spoil(text, &words, &mut random);
        let mut problems = unread(&spoilt);
        if recogniser.recognise(SHEET, &spoilt).is_ok() {
            taken += 1;
            problems.retain(|p| {
                let place = &spoilt[p.span.range()];
                !is_context(&p.message, place) && !spoil::is_blank_made_plain(&spoilt, p)
            });
            if !problems.is_empty() {
                let _ = writeln!(
                    wrong,
                    "only the reader refuses\n{}",
                    report(&spoilt, &problems)
                );
            }
        } else {
            refused += 1;
            if problems.is_empty() && !spoil::is_left_open(&spoilt) {
                let _ = writeln!(wrong, "only the grammar refuses\n  {spoilt:?}");
            }
        }
    }
    assert!(wrong.is_empty(), "{wrong}");
    assert!(
        taken > 500 && refused > 2000,
        "{taken} taken, {refused} refused"
    );
}
