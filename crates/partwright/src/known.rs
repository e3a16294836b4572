//! Known findings: a list by which an old collection takes up the checker, and only what is new
//! counts.
//!
//! JSON Lines, sorted, one finding a line, behind a line that says what the file is. A finding is
//! known again by its rule, its voices, its beat and its notes, never by its line or its bar: it
//! stays known when lines or bars come or go elsewhere, and is new once its own notes change.

use std::collections::{BTreeMap, BTreeSet};
use std::fs;
use std::path::{Path, PathBuf};

use partwright_check::{Checked, Finding, Related};
use serde::{Deserialize, Serialize};

use crate::files::{Sheet, reason};
use crate::houses::real_file;
use crate::save;

/// What the first line says; another number would be another form.
const HEAD: &str = r#"{"partwright":"known findings","form":1}"#;
/// Written text longer than this many characters is cut: it need only be told from its like.
const MOST_WRITTEN: usize = 80;

/// A finding as the list names it. The order of the fields is that of the list.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub(crate) struct Entry {
    /// The sheet, from the folder of the list, with `/` between its folders.
    path: String,
    rule: String,
    /// The voices by label.
    #[serde(default, skip_serializing_if = "Vec::is_empty")]
    voices: Vec<String>,
    #[serde(default, skip_serializing_if = "Option::is_none")]
    beat: Option<String>,
    /// The notes it is about, voice by voice: `S D5 E5, B G3 A3`.
    #[serde(default, skip_serializing_if = "String::is_empty")]
    notes: String,
    /// What is written there, where the writing is at fault.
    #[serde(default, skip_serializing_if = "String::is_empty")]
    written: String,
    /// The bar it stood in, for whoever reads the list; it may move.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    bar: Option<u32>,
}

/// What makes an entry the same finding in another state of the sheet.
type Key<'a> = (&'a str, &'a [String], &'a Option<String>, &'a str, &'a str);

impl Entry {
    fn key(&self) -> Key<'_> {
        (
            &self.rule,
            &self.voices,
            &self.beat,
            &self.notes,
            &self.written,
        )
    }

    /// A finding of a sheet, under the sheet's name in the list.
    pub(crate) fn of(path: &str, text: &str, checked: &Checked, finding: &Finding) -> Entry {
        let score = &checked.reading.score;
        let writing = partwright_rules::family_of(finding.rule) == Some("writing");
        let label = |v: usize| score.voices.get(v).map_or("", |voice| voice.label.as_str());
        Entry {
            path: path.to_owned(),
            rule: finding.rule.to_owned(),
            voices: finding
                .voices
                .iter()
                .map(|&v| label(v).to_owned())
                .collect(),
            beat: finding.place.map(|place| place.beat_text()),
            notes: if writing {
                String::new()
            } else {
                notes(checked, finding)
            },
            written: if writing {
                written(text, finding)
            } else {
                String::new()
            },
            bar: finding.place.map(|place| place.bar),
        }
    }

    /// A number that stands for the finding in other programs' lists (FNV-1a, 64 bits): the same
    /// as long as the list would know it again.
    pub(crate) fn fingerprint(&self) -> String {
        let beat = self.beat.as_deref().unwrap_or("");
        let voices = self.voices.join(" ");
        let parts = [&self.rule, &voices, beat, &self.notes, &self.written];
        let mut hash: u64 = 0xcbf2_9ce4_8422_2325;
        for byte in parts.join("\n").bytes() {
            hash = (hash ^ u64::from(byte)).wrapping_mul(0x0100_0000_01b3);
        }
        format!("{hash:016x}")
    }
}

/// The notes a finding is about: those of its voices where it stands, and the related ones.
fn notes(checked: &Checked, finding: &Finding) -> String {
    let score = &checked.reading.score;
    let here = finding.at.into_iter();
    let spots = here.flat_map(|at| finding.voices.iter().map(move |&voice| (voice, at)));
    let related = finding.related.iter();
    let spots = spots.chain(related.map(|&Related { voice, at, .. }| (voice, at)));
    let mut by_voice: BTreeMap<usize, BTreeSet<usize>> = BTreeMap::new();
    for (voice, at) in spots {
        let notes = by_voice.entry(voice).or_default();
        notes.extend(score.note_at(voice, at));
    }
    let words = by_voice.iter().filter_map(|(&voice, notes)| {
        let voice = score.voices.get(voice)?;
        let mut words = voice.label.clone();
        for note in notes.iter().filter_map(|&note| voice.notes.get(note)) {
            match note.sound.pitch() {
                Some(pitch) => words.push_str(&format!(" {pitch}")),
                None => words.push_str(" _"),
            }
        }
        Some(words)
    });
    words.collect::<Vec<_>>().join(", ")
}

fn written(text: &str, finding: &Finding) -> String {
    let span = finding.span.map(|span| span.range());
    let words = span.and_then(|range| text.get(range)).unwrap_or_default();
    words.chars().take(MOST_WRITTEN).collect()
}

/// A list of known findings, by sheet.
#[derive(Debug, Default)]
pub(crate) struct Known {
    by_sheet: BTreeMap<String, Vec<Entry>>,
}

impl Known {
    /// Reads a list.
    ///
    /// # Errors
    /// Why it is none, in words that name the line.
    pub(crate) fn read(file: &Path) -> Result<Known, String> {
        let bytes = fs::read(file).map_err(|error| match error.kind() {
            std::io::ErrorKind::NotFound => {
                "there is no such file; --write-known writes one".to_owned()
            }
            _ => reason(&error),
        })?;
        Known::of(&String::from_utf8_lossy(&bytes))
    }

    fn of(text: &str) -> Result<Known, String> {
        is_list(text)?;
        let mut known = Known::default();
        for (i, line) in text.lines().enumerate().skip(1) {
            if line.trim().is_empty() {
                continue;
            }
            let entry: Entry = serde_json::from_str(line)
                .map_err(|error| format!("line {} is no known finding: {error}", i + 1))?;
            let entries = known.by_sheet.entry(entry.path.clone()).or_default();
            entries.push(entry);
        }
        Ok(known)
    }

    /// Which findings of a sheet are known: each entry stands for one finding, and of several
    /// that are the same those whose bar is still right go first.
    pub(crate) fn among(&self, path: &str, found: &[Entry]) -> Matched {
        let entries = self.by_sheet.get(path).map_or(&[][..], Vec::as_slice);
        let mut known = vec![false; found.len()];
        let mut used = vec![false; entries.len()];
        for exactly in [true, false] {
            let key = |entry: &'_ Entry| if exactly { entry.bar } else { None };
            let mut free: BTreeMap<(Key<'_>, Option<u32>), Vec<usize>> = BTreeMap::new();
            // Taken from the end, so that the first entry goes first.
            for (i, entry) in entries.iter().enumerate().rev() {
                if used.get(i) == Some(&false) {
                    free.entry((entry.key(), key(entry))).or_default().push(i);
                }
            }
            for (finding, known) in found.iter().zip(&mut known).filter(|(_, known)| !**known) {
                let place = free.get_mut(&(finding.key(), key(finding)));
                if let Some(place) = place.and_then(Vec::pop) {
                    *known = true;
                    if let Some(used) = used.get_mut(place) {
                        *used = true;
                    }
                }
            }
        }
        let left = entries.iter().zip(used).filter(|(_, used)| !used);
        Matched {
            known,
            gone: left.map(|(entry, _)| entry.clone()).collect(),
        }
    }
}

/// What a list says to the findings of a sheet.
#[derive(Debug, Default)]
pub(crate) struct Matched {
    /// Of each finding, whether it is known.
    pub(crate) known: Vec<bool>,
    /// The entries that no finding answers to any more.
    pub(crate) gone: Vec<Entry>,
}

impl Entry {
    /// The rule, for who asks whether it was looked at.
    pub(crate) fn rule(&self) -> &str {
        &self.rule
    }

    /// `evensong.voices: parallel-fifths, bar 3, S and B`.
    pub(crate) fn words(&self) -> String {
        let bar = self.bar.map_or(String::new(), |bar| format!(", bar {bar}"));
        let voices: Vec<&str> = self.voices.iter().map(String::as_str).collect();
        let voices = match crate::prose::list(&voices) {
            voices if voices.is_empty() => voices,
            voices => format!(", {voices}"),
        };
        format!("{}: {}{bar}{voices}", self.path, self.rule)
    }
}

fn is_list(text: &str) -> Result<(), String> {
    if text.lines().next().map(str::trim_end) == Some(HEAD) {
        return Ok(());
    }
    Err(format!(
        "no list of known findings: its first line is not {HEAD}"
    ))
}

/// A file of known findings, and what its entries call the sheets.
#[derive(Clone, Debug)]
pub(crate) struct Place {
    /// The file as the call names it.
    pub(crate) file: PathBuf,
    folder: PathBuf,
}

impl Place {
    /// The place of a list.
    pub(crate) fn of(file: &Path) -> Place {
        let real = real_file(file);
        Place {
            file: file.to_owned(),
            folder: real.parent().unwrap_or(Path::new("")).to_owned(),
        }
    }

    /// What the list calls a sheet: its path from the list's folder, so that the list holds
    /// wherever the program is run; the whole path for a sheet elsewhere.
    pub(crate) fn name(&self, sheet: &Sheet) -> String {
        let Some(file) = sheet.place.as_deref().map(real_file) else {
            return sheet.name.clone();
        };
        let inside = file.strip_prefix(&self.folder).unwrap_or(&file);
        inside
            .to_string_lossy()
            .replace(std::path::MAIN_SEPARATOR, "/")
    }

    /// Writes the list anew.
    ///
    /// # Errors
    /// Why nothing was written; a file that is no such list is never replaced.
    pub(crate) fn write(&self, mut entries: Vec<Entry>) -> Result<(), String> {
        entries.sort();
        let mut text = format!("{HEAD}\n");
        for entry in &entries {
            let line = serde_json::to_string(entry).map_err(|error| error.to_string())?;
            text.push_str(&line);
            text.push('\n');
        }
        save::write(&self.file, &text, is_list)
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use partwright_check::Wishes;

    /// The parallel fifths and octaves of a sheet, as a list names them.
    fn found(text: &str) -> Vec<Entry> {
        let wishes = Wishes {
            pick: vec!["motion".to_owned(), "reading".to_owned()],
            ..Wishes::default()
        };
        let checked = Checked::text(text, &wishes);
        let entry = |finding| Entry::of("a.voices", text, &checked, finding);
        checked.findings.iter().map(entry).collect()
    }

    fn list(entries: &[Entry]) -> Known {
        let lines = entries.iter().map(|e| serde_json::to_string(e).unwrap());
        let text: Vec<String> = std::iter::once(HEAD.to_owned()).chain(lines).collect();
        Known::of(&text.join("\n")).unwrap()
    }

    const SHEET: &str = "metre 2/4\n\nS | D5 E | C5 C |\nB | G3 A | E3 C |\n";

    #[test]
    fn a_finding_is_known_by_its_notes_wherever_its_bar_and_line_are() {
        let before = found(SHEET);
        assert_eq!(before.len(), 1);
        assert_eq!(before[0].notes, "S D5 E5, B G3 A3");
        let later = "metre 2/4\n// a bar before\n\nS | C5 C | D5 E |\nB | E3 C | G3 A |\n";
        let matched = list(&before).among("a.voices", &found(later));
        assert_eq!((matched.known, matched.gone.len()), (vec![true], 0));
        // Another note makes it new, and what was known is gone.
        let moved = SHEET.replace("G3 A", "A3 B");
        let moved = moved.replace("D5 E", "E5 F#");
        let matched = list(&before).among("a.voices", &found(&moved));
        assert_eq!((matched.known, matched.gone.len()), (vec![false], 1));
        let elsewhere = list(&before).among("b.voices", &before);
        assert_eq!(elsewhere.known, [false]);
    }

    #[test]
    fn two_alike_need_two_entries_and_the_right_bar_goes_first() {
        let twice = "metre 2/4\n\nS | D5 E | C5 C | D5 E |\nB | G3 A | E3 C | G3 A |\n";
        let twice = found(twice);
        assert_eq!(twice.len(), 2);
        assert_eq!(
            list(&twice[..1]).among("a.voices", &twice).known,
            [true, false]
        );
        assert_eq!(
            list(&twice[1..]).among("a.voices", &twice).known,
            [false, true]
        );
        let matched = list(&twice).among("a.voices", &twice[..1]);
        assert_eq!((matched.known, matched.gone.len()), (vec![true], 1));
    }

    #[test]
    fn bad_writing_is_known_by_what_is_written() {
        let before = found("S | H4 |\n");
        assert_eq!(before[0].written, "H4");
        let other = found("S | X4 |\n");
        assert_eq!(list(&before).among("a.voices", &other).known, [false]);
        assert_ne!(before[0].fingerprint(), other[0].fingerprint());
        assert_eq!(
            before[0].fingerprint(),
            found("// x\nS | H4 |\n")[0].fingerprint()
        );
    }

    #[test]
    fn what_is_no_list_is_refused_with_its_line() {
        for text in [
            "",
            "{}",
            "S | C4 |\n",
            "{\"partwright\":\"known findings\",\"form\":2}",
        ] {
            assert!(Known::of(text).unwrap_err().contains("no list"), "{text}");
        }
        for line in [
            "x",
            "{}",
            "{\"path\":\"a\",\"rule\":\"b\",\"line\":3}",
            "[]",
        ] {
            let said = Known::of(&format!("{HEAD}\n\n{line}\n")).unwrap_err();
            assert!(said.contains("line 3"), "{said}");
        }
        let bare = format!("{HEAD}\r\n{{\"path\":\"a\",\"rule\":\"b\"}}\r\n");
        assert_eq!(Known::of(&bare).unwrap().by_sheet["a"].len(), 1);
    }
}
