//! Scores written as sheets and read back: whatever they are made of, nothing changes.

#![allow(clippy::unwrap_used, clippy::panic)]

#[path = "write/forms.rs"]
mod forms;
#[path = "write/made.rs"]
mod made;

use std::collections::BTreeMap;

use made::{Made, made, wild};
use partwright_score::{Bar, Note, Score, Sound, Time, ZERO};
use partwright_sheet::{
    Changed, Heading, ProblemKind, Reading, Sheet, Tempo, Written, align, write,
};
use proptest::prelude::*;

fn read(text: &str) -> Reading {
    Sheet::read(text).lower(text)
}

/// Problems, but for time that is not written.
fn wrong(reading: &Reading) -> Vec<String> {
    let other = reading
        .problems
        .iter()
        .filter(|problem| problem.kind != ProblemKind::Unwritten);
    other.map(|problem| problem.message.clone()).collect()
}

/// Halves of bars that no end of a section parts are one bar.
fn joined(bars: &[Bar]) -> Vec<(u32, Time, Time, Time, bool)> {
    let mut out: Vec<(u32, Time, Time, Time, bool)> = Vec::new();
    for bar in bars {
        match out.last_mut() {
            Some(last) if last.0 == bar.number && !last.4 => {
                last.2 += bar.length;
                last.4 = bar.section_end;
            }
            _ => out.push((bar.number, bar.onset, bar.length, bar.lead, bar.section_end)),
        }
    }
    out
}

/// A voice with nothing in it is silent.
fn notes(notes: &[Note], end: Time) -> Vec<Note> {
    if notes.is_empty() {
        vec![Note::new(ZERO, end, Sound::Rest)]
    } else {
        notes.to_vec()
    }
}

fn tempos(reading: &Reading) -> Vec<(Time, Tempo)> {
    let first = reading.head.tempo.iter().map(|tempo| (ZERO, tempo.value));
    let later = reading
        .changes
        .iter()
        .filter_map(|change| match change.what {
            Changed::Tempo(tempo) => Some((change.at, tempo)),
            _ => None,
        });
    first.chain(later).collect()
}

/// Syllables by voice and verse, those that only go on left out.
type Text = BTreeMap<(usize, Option<u8>), Vec<(Time, String)>>;

fn sung(reading: &Reading) -> Text {
    let mut text = Text::new();
    for words in &reading.words {
        let syllables = words.syllables.iter();
        let all = syllables.map(|syllable| (syllable.at, reading.syllable(*syllable)));
        let own = text.entry((words.voices[0], words.verse)).or_default();
        own.extend(all.filter(|(_, text)| text != "-"));
    }
    text.retain(|_, own| !own.is_empty());
    text
}

fn asked(heading: &Heading) -> Text {
    let words = heading.words.iter();
    words
        .filter(|sung| !sung.syllables.is_empty())
        .map(|sung| ((sung.voice, sung.verse), sung.syllables.clone()))
        .collect()
}

fn check(made: &Made) -> Result<(), TestCaseError> {
    let Made { score, heading } = made;
    let Written { text, left_behind } = write(score, heading);
    prop_assert_eq!(left_behind, Vec::<String>::new(), "{}", text);
    prop_assert_eq!(&align(&text), &text);
    let reading = read(&text);
    prop_assert_eq!(wrong(&reading), Vec::<String>::new(), "{}", text);
    let found = &reading.score;
    prop_assert_eq!(found.voices.len(), score.voices.len());
    for (given, found) in score.voices.iter().zip(&found.voices) {
        let (asked, read) = (notes(&given.notes, score.end()), &found.notes);
        prop_assert_eq!(&asked, read, "{}", text);
        let mut bare = (given.clone(), found.clone());
        (bare.0.notes, bare.1.notes) = (Vec::new(), Vec::new());
        prop_assert_eq!(bare.0, bare.1);
    }
    prop_assert_eq!(joined(&found.bars), joined(&score.bars), "{}", text);
    for bar in &score.bars {
        let metre = |score: &Score, bar: &Bar| score.metres[bar.metre as usize].clone();
        let of = &found.bars[found.bar_at(bar.onset).unwrap()];
        let (asked, read) = (metre(score, bar), metre(found, of));
        // Bars of another length than their metre says have one of their own.
        if asked.bar_length() == Some(of.length) || of.lead > ZERO {
            prop_assert_eq!(asked.bar_length(), read.bar_length(), "{}", text);
            prop_assert_eq!(asked.unit(), read.unit(), "{}", text);
        }
    }
    prop_assert_eq!(&found.keys, &score.keys, "{}", text);
    prop_assert_eq!(&found.equal, &score.equal);
    prop_assert_eq!(&found.style, &score.style);
    let title = reading.head.title.as_ref().map(|title| title.value.clone());
    prop_assert_eq!(title, heading.title.clone());
    let asked_tempos = heading.tempos.iter().map(|tempo| (tempo.from, tempo.value));
    prop_assert_eq!(
        tempos(&reading),
        asked_tempos.collect::<Vec<_>>(),
        "{}",
        text
    );
    prop_assert_eq!(sung(&reading), asked(heading), "{}", text);
    // What was read is written again without loss.
    let again = write(found, heading);
    prop_assert_eq!(again.left_behind, Vec::<String>::new(), "{}", again.text);
    let again = read(&again.text).score;
    prop_assert_eq!(&again.voices, &found.voices);
    prop_assert_eq!(&again.bars.len(), &found.bars.len());
    Ok(())
}

proptest! {
    #![proptest_config(ProptestConfig {
        failure_persistence: None,
        max_shrink_iters: 1000,
        ..ProptestConfig::with_cases(250)
    })]

    #[test]
    fn scores_are_read_back_as_they_were(made in made()) {
        check(&made)?;
    }

    /// Whatever a score holds, what is written can be read.
    #[test]
    fn any_score_is_written_without_a_fault(made in wild()) {
        let written = write(&made.score, &made.heading);
        let reading = read(&written.text);
        prop_assert_eq!(wrong(&reading), Vec::<String>::new(), "{}", written.text);
        let again = write(&reading.score, &Heading::default());
        prop_assert_eq!(again.left_behind, Vec::<String>::new(), "{}", written.text);
        prop_assert_eq!(wrong(&read(&again.text)), Vec::<String>::new(), "{}", again.text);
    }
}
