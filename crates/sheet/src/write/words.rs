//! The text under the notes.

use partwright_score::{Note, Time, ZERO};

use super::Sung;
use super::left::Left;
use super::measures::Measure;
use super::music::{Music, during, tame};
use super::names::Label;
use crate::chars::is_blank;

/// The words of a voice in one verse, as rows write them.
pub(super) struct Verse {
    pub(super) voice: usize,
    /// What stands in front of its first bar line: `words S 1`.
    pub(super) head: String,
    /// Syllables with the moments of their notes, in order.
    syllables: Vec<(Time, String)>,
}

/// The verses that can be written.
pub(super) fn words(
    given: &[Sung],
    music: &Music,
    measures: &[Measure],
    labels: &[Label],
    left: &mut Left<'_>,
) -> Vec<Verse> {
    let mut verses: Vec<Verse> = Vec::new();
    for sung in given {
        let (Some(label), Some(notes)) = (labels.get(sung.voice), music.voices.get(sung.voice))
        else {
            left.tell("Words of a voice that is not in the score are left out.".to_owned());
            continue;
        };
        let verse = sung.verse.filter(|verse| (1..=99).contains(verse));
        if verse != sung.verse {
            left.tell(format!(
                "Verses are numbered 1 to 99: another of {} has no number.",
                label.label
            ));
        }
        let mut head = format!("words {}", label.label);
        if let Some(verse) = verse {
            head = format!("{head} {verse}");
        }
        if verses.iter().any(|other| other.head == head) {
            left.tell(format!("{head}: the second such verse is left out."));
            continue;
        }
        let mut syllables = Vec::new();
        for (at, text) in &sung.syllables {
            let moment = tame(*at);
            let text = plain(text);
            if text.is_empty() {
                continue;
            }
            if sings(notes, measures, moment) {
                syllables.push((moment, text));
            } else {
                let what = "Syllables stand under notes as they are struck, and under none behind \
                            unwritten time in a bar: others are left out";
                left.at(what, Some(sung.voice), moment);
            }
        }
        syllables.sort_by_key(|(at, _)| *at);
        syllables.dedup_by(|next, first| {
            let same = next.0 == first.0;
            if same {
                let what = "A note has one syllable: others are left out";
                left.at(what, Some(sung.voice), next.0);
            }
            same
        });
        verses.push(Verse {
            voice: sung.voice,
            head,
            syllables,
        });
    }
    verses
}

/// Whether a syllable can stand at a moment: a note is struck there, and every note before it in
/// the bar is known, for syllables are counted from the bar line on.
fn sings(notes: &[Note], measures: &[Measure], at: Time) -> bool {
    let Ok(index) = notes.binary_search_by(|note| note.onset.cmp(&at)) else {
        return false;
    };
    let after = measures.partition_point(|measure| measure.from <= at);
    let bar = after.checked_sub(1).and_then(|i| measures.get(i));
    let from = bar.map_or(ZERO, |bar| bar.from);
    let before = during(notes, from, at).start.min(index)..index;
    let mut before = notes.get(before).unwrap_or_default().iter();
    let struck = notes.get(index).is_some_and(|n| n.sound.pitch().is_some());
    struck && before.all(|note| !note.sound.is_unknown())
}

/// A syllable as a row writes it, what means something in a row made plain.
fn plain(text: &str) -> String {
    let words = text.split(|c| is_blank(c) || c == '\n');
    let words: Vec<&str> = words.filter(|word| !word.is_empty()).collect();
    let mut out = String::with_capacity(text.len());
    for (i, word) in words.iter().enumerate() {
        if i > 0 {
            out.push('~');
        }
        let special = matches!(*word, "-" | "_") && words.len() == 1;
        if i == 0 && (special || word.starts_with("//") || word.starts_with(':')) {
            out.push('\\');
        }
        for c in word.chars() {
            if matches!(c, '\\' | '|' | '~') {
                out.push('\\');
            }
            out.push(c);
        }
    }
    out
}

impl Verse {
    /// The text under the cells of a measure, or nothing where the measure has none.
    pub(super) fn under(&self, measure: &Measure, music: &Music) -> Option<Vec<String>> {
        let from = self.syllables.partition_point(|(at, _)| *at < measure.from);
        let to = self.syllables.partition_point(|(at, _)| *at < measure.to);
        let own = self.syllables.get(from..to).filter(|own| !own.is_empty())?;
        let mut own = own.iter().peekable();
        let mut cells = vec![String::new(); measure.cells()];
        let notes = music.voices.get(self.voice)?;
        let sounding = notes.get(during(notes, measure.from, measure.to))?;
        for note in sounding {
            if note.onset < measure.from || note.sound.pitch().is_none() {
                continue;
            }
            let here = own.next_if(|(at, _)| *at == note.onset);
            let cell = ((note.onset - measure.from) / measure.metre.cell()).to_integer();
            let cell = usize::try_from(cell).ok().and_then(|i| cells.get_mut(i))?;
            if !cell.is_empty() {
                cell.push(' ');
            }
            cell.push_str(here.map_or("-", |(_, text)| text));
        }
        Some(cells)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn syllables_are_made_plain() {
        for (given, expected) in [
            ("har-", "har-"),
            (" the  eve-", "the~eve-"),
            ("-", "\\-"),
            ("a|b~c\\", "a\\|b\\~c\\\\"),
            ("//", "\\//"),
            (":", "\\:"),
            (" \n", ""),
        ] {
            assert_eq!(plain(given), expected);
        }
    }
}
