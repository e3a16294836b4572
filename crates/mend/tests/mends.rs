//! Every mend that is offered, applied to the text, removes its finding and brings none.

#![allow(clippy::unwrap_used, clippy::panic, clippy::print_stdout)]

use std::collections::BTreeMap;
use std::fs;
use std::path::PathBuf;
use std::sync::Arc;

use partwright_check::{Checked, Finding, House, Severity, Wishes};
use partwright_mend::{MOST, mends};
use partwright_rules::catalogue;
use partwright_sheet::apply;

/// What makes a finding the same in two runs, counted.
fn counted<'a>(findings: impl Iterator<Item = &'a Finding>) -> BTreeMap<String, usize> {
    let mut counts = BTreeMap::new();
    for f in findings.filter(|f| f.severity >= Severity::Weakness) {
        *counts
            .entry(format!("{} {:?} {:?}", f.rule, f.voices, f.at))
            .or_default() += 1;
    }
    counts
}

/// Applies every mend of every finding of a sheet; tells how many findings had one.
fn hold(name: &str, text: &str, wishes: &Wishes) -> (usize, usize) {
    let checked = Checked::text(text, wishes);
    let before = counted(checked.findings.iter());
    let (mut with, mut all) = (0, 0);
    for finding in &checked.findings {
        let offered = mends(&checked, finding);
        assert!(offered.len() <= MOST);
        all += 1;
        with += usize::from(!offered.is_empty());
        for mend in &offered {
            let elsewhere = finding.at.is_some_and(|at| at != mend.at);
            assert!(
                !elsewhere || mend.title.contains(" in bar "),
                "where is it: {}",
                mend.title
            );
            let mended = apply(text, &mend.edits(&checked, text));
            let after = Checked::text(&mended, wishes);
            let here = format!(
                "{name}: {} at {:?}: {}\n{mended}",
                finding.rule, finding.place, mend.title
            );
            let gone = !after.findings.iter().any(|f| {
                f.rule == finding.rule && f.voices == finding.voices && f.at == finding.at
            });
            assert!(gone, "it stays: {here}");
            for (key, count) in counted(after.findings.iter()) {
                assert!(
                    before.get(&key).copied().unwrap_or(0) >= count,
                    "it brings {key}: {here}"
                );
            }
            let problems = |c: &Checked| c.reading.problems.len();
            assert!(
                problems(&after) <= problems(&checked),
                "the text says something else: {here}"
            );
        }
    }
    (with, all)
}

#[test]
fn mends_of_the_demo_scores_hold() {
    let mut folders = vec![PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("../../demo-scores")];
    let mut sum = (0, 0);
    let mut houses = 0;
    while let Some(folder) = folders.pop() {
        let mut paths: Vec<PathBuf> = fs::read_dir(&folder)
            .unwrap()
            .map(|e| e.unwrap().path())
            .collect();
        paths.sort();
        let file = folder.join("partwright.toml");
        let house = fs::read_to_string(&file).ok().map(|text| {
            houses += 1;
            Arc::new(House::read(&file, &mut |_| Ok(text.clone())).unwrap())
        });
        for path in paths {
            if path.is_dir() {
                folders.push(path);
            } else if path.extension().is_some_and(|end| end == "voices") {
                let text = fs::read_to_string(&path).unwrap();
                let wishes = Wishes {
                    house: house.clone(),
                    file: Some(path.clone()),
                    ..Wishes::default()
                };
                let (with, all) = hold(&path.display().to_string(), &text, &wishes);
                sum = (sum.0 + with, sum.1 + all);
            }
        }
    }
    assert_eq!(houses, 2);
    println!("{} of {} findings have a mend", sum.0, sum.1);
    assert!(
        sum.0 * 2 > sum.1,
        "most findings in real music have a mend: {sum:?}"
    );
}

#[test]
fn mends_of_the_pages_examples_hold() {
    let mut sum = (0, 0);
    for entry in catalogue() {
        for example in &entry.page.examples {
            let (with, all) = hold(&entry.id, &example.sheet, &Wishes::default());
            sum = (sum.0 + with, sum.1 + all);
        }
    }
    println!("{} of {} findings have a mend", sum.0, sum.1);
    assert!(sum.0 > 20);
}

#[test]
fn what_may_not_move_does_not() {
    let text = "style species-1\nvoice S\nvoice C cantus\n\nS | D5 E |\nC | G3 A |\n";
    let checked = Checked::text(text, &Wishes::default());
    let finding = checked
        .findings
        .iter()
        .find(|f| f.rule == "parallel-fifths")
        .unwrap();
    let offered = mends(&checked, finding);
    assert!(!offered.is_empty());
    assert!(
        offered.iter().all(|mend| mend.voice == 0),
        "the cantus stays"
    );
    // A licensed finding has no mend.
    let licensed = "S | D5 E*a |\nB | G3 A |\n*a licence parallel-fifths: the drovers' horns\n";
    let checked = Checked::text(licensed, &Wishes::default());
    assert!(
        checked
            .findings
            .iter()
            .all(|f| mends(&checked, f).is_empty())
    );
}

#[test]
fn a_note_of_the_scale_comes_before_a_sharp_out_of_nowhere() {
    let text = "style chorale\nkey G major\nvoice S soprano\nvoice B\n\n\
                S | B4 C5 D E |\nB | G3 C D G |\n";
    let checked = Checked::text(text, &Wishes::default());
    let octaves = checked.findings.iter();
    let octaves = octaves.filter(|f| f.rule == "parallel-octaves");
    let offered: Vec<_> = octaves.flat_map(|f| mends(&checked, f)).collect();
    let first = offered.first().unwrap();
    assert_eq!(first.to.sign, 0, "{}", first.title);
    // A plain voice is called as the messages call it.
    assert!(
        offered.iter().any(|mend| mend.title.contains("voice B")),
        "{offered:?}"
    );
}
