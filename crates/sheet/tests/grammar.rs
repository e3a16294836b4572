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

use cases::{Case, cases};
use context::{KINDS, is_context};
use derive::{Deriver, Free, Random, Sentence};
use ebnf::{Grammar, Id, Node};
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
        // Keys are not steered: numerals without one are well written.
        let mut problems = unread(text);
        problems.retain(|problem| !problem.message.starts_with("No key is stated"));
        if problems.is_empty() {
            clean += 1;
            deriver.count(&sentence);
        }
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

/// What is wrong if the grammar and the reader of sheets do not judge a text alike.
fn judged_apart(recogniser: &Recogniser, text: &str) -> Option<String> {
    let mut problems = unread(text);
    if recogniser.recognise(SHEET, text).is_err() {
        let apart = problems.is_empty() && !spoil::is_left_open(text);
        return apart.then(|| format!("only the grammar refuses\n  in {text:?}\n"));
    }
    problems.retain(|p| {
        let place = &text[p.span.range()];
        !is_context(&p.message, place)
    });
    (!problems.is_empty()).then(|| format!("only the reader refuses\n{}", report(text, &problems)))
}

/// All words of all cases.
fn words(cases: &[Case]) -> Vec<&str> {
    let words: HashSet<&str> = cases
        .iter()
        .flat_map(|case| case.sheet.split_whitespace())
        .collect();
    let mut words: Vec<&str> = words.into_iter().collect();
    words.sort_unstable();
    words
}

#[test]
fn the_reader_and_the_grammar_judge_spoilt_sheets_alike() {
    let grammar = grammar();
    let recogniser = Recogniser::new(&grammar);
    let mut deriver = Deriver::new(&grammar, &recogniser, 120);
    let cases = cases();
    let words = words(&cases);
    let mut texts: Vec<String> = cases.iter().map(|case| case.sheet.clone()).collect();
    let derived = (0..300).filter_map(|seed| Some(sheet(&mut deriver, seed)?.text));
    texts.extend(derived.filter(|text| text.len() < 400));
    let mut random = Random::new(5);
    let spoilt = texts
        .iter()
        .cycle()
        .take(5000)
        .map(|text| spoil::spoil(text, &words, &mut random));
    let wrong: String = spoilt
        .filter_map(|text| judged_apart(&recogniser, &text))
        .collect();
    assert!(wrong.is_empty(), "{wrong}");
}

#[test]
fn the_reader_and_the_grammar_judge_every_word_in_its_place_alike() {
    let grammar = grammar();
    let recogniser = Recogniser::new(&grammar);
    let cases = cases();
    let mut all: HashSet<String> = words(&cases).into_iter().map(str::to_owned).collect();
    all.extend(grammar.nodes.iter().filter_map(|node| match node {
        Node::Terminal(text) => Some(text.clone()),
        _ => None,
    }));
    let struck: HashSet<char> = spoil::STRUCK.chars().collect();
    let pairs = struck
        .iter()
        .flat_map(|a| struck.iter().map(move |b| format!("{a}{b}")));
    let pairs: Vec<String> = pairs.collect();
    let mut wrong = Vec::new();
    for gap in spoil::GAPS {
        // In rows, all that two strokes of the hand can make as well.
        let pairs = pairs.iter().filter(|_| gap.contains('|'));
        for word in all.iter().chain(pairs) {
            wrong.extend(judged_apart(&recogniser, &gap.replace("{}", word)));
        }
    }
    wrong.sort();
    let wrong = wrong.concat();
    assert!(wrong.is_empty(), "{wrong}");
}

#[test]
fn one_more_than_the_most_is_refused() {
    let grammar = grammar();
    let recogniser = Recogniser::new(&grammar);
    let mut deriver = Deriver::new(&grammar, &recogniser, 350);
    let counted = |node: &Node| matches!(node, Node::UpTo(..));
    let ids: Vec<Id> = (0..grammar.nodes.len())
        .filter(|id| counted(&grammar.nodes[*id]))
        .collect();
    assert!(ids.len() > 2);
    for id in ids {
        deriver.beyond = Some(id);
        let mut found = 0;
        for sentence in (0..200).filter_map(|seed| sheet(&mut deriver, seed)) {
            if sentence.ways.contains(&(id, 2)) {
                found += 1;
                let text = &sentence.text;
                let taken = recogniser.recognise(SHEET, text).is_ok();
                assert!(!taken, "the grammar takes {text:?}");
                let open = spoil::is_left_open(text);
                assert!(
                    open || !unread(text).is_empty(),
                    "the reader takes {text:?}"
                );
            }
        }
        assert!(found > 0, "{} was never taken", grammar.show(id));
    }
}
