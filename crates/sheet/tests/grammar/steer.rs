//! Steers what is derived from the grammar of sheets, so that it makes sense: labels are those of
//! voices, first notes have their octave figure, bars end together. What is steered is what the
//! head of the grammar says that it cannot say.

#[path = "wishes.rs"]
mod wishes;

use std::collections::HashSet;

use crate::derive::{At, Guide, Random, Sentence, Supply, Wish};

/// What is known of a bar of a music row.
#[derive(Clone, Debug, Default)]
struct Bar {
    /// Notes struck, if syllables can be counted out for them.
    struck: Option<usize>,
    /// The lowest and the highest octave that sounds in it.
    octaves: Option<(i32, i32)>,
    cells: usize,
}

/// A voice as the sheet goes along.
#[derive(Clone, Debug, Default)]
struct Voice {
    /// Something sounds, or it is unknown whether it does.
    sounding: bool,
    /// The octave of the last note.
    held: Option<i32>,
    /// Its row in this system.
    row: Option<Vec<Bar>>,
    /// It has a words row in this system.
    worded: bool,
}

/// The guide to sheets that make sense.
#[derive(Clone, Debug)]
pub(crate) struct Steer {
    labels: Vec<Sentence>,
    voices: Vec<Voice>,
    /// Voice lines declare the voices.
    declared: bool,
    /// There are systems.
    music: bool,
    in_head: bool,
    voice_lines: usize,
    /// Headers given, or the changes of this gap.
    given: HashSet<String>,
    options: HashSet<String>,
    /// The last rule that takes labels, and the labels it took.
    within: String,
    listed: Vec<usize>,
    /// The voice of this line or row, and the one it copies.
    voice: usize,
    source: usize,
    /// The metre in force; the value just read, and what is to be counted out next.
    cells: Option<usize>,
    timed: Option<(usize, usize, usize)>,
    in_time: bool,
    counts: Vec<usize>,
    unit: Option<usize>,
    systems: usize,
    /// How the bars of this system end, once its first row stands.
    ends: Option<Vec<String>>,
    first_ends: Vec<String>,
    harmony: bool,
    figures: bool,
    /// Inside a row: its bar, the octave that carries along, what this bar holds.
    bar: usize,
    octave: Option<i32>,
    here: Bar,
    in_music: bool,
    /// A chord or a figure that "go on" may hold, and the cells of this bar.
    chord: bool,
    filled: usize,
    /// Marks without footnote, footnotes without mark, and those that have both.
    open: Vec<String>,
    noted: Vec<String>,
    closed: Vec<String>,
    marking: bool,
    fresh: bool,
}

impl Steer {
    /// A guide with these labels, all different.
    pub(crate) fn new(labels: Vec<Sentence>, random: &mut Random) -> Steer {
        let music = random.below(12) > 0;
        Steer {
            voices: vec![Voice::default(); labels.len()],
            labels,
            declared: random.below(2) > 0,
            music,
            in_head: true,
            voice_lines: 0,
            given: HashSet::new(),
            options: HashSet::new(),
            within: String::new(),
            listed: Vec::new(),
            voice: 0,
            source: 0,
            cells: None,
            timed: None,
            in_time: false,
            counts: Vec::new(),
            unit: None,
            systems: 0,
            ends: None,
            first_ends: Vec::new(),
            harmony: false,
            figures: false,
            bar: 0,
            octave: None,
            here: Bar::default(),
            in_music: false,
            chord: false,
            filled: 0,
            open: Vec::new(),
            noted: Vec::new(),
            closed: Vec::new(),
            marking: false,
            fresh: false,
        }
    }

    /// Whether every mark has its footnote and every footnote its mark.
    pub(crate) fn is_finished(&self) -> bool {
        self.open.is_empty() && self.noted.is_empty()
    }

    /// Whether there are voices that headers may name.
    fn has_voices(&self) -> bool {
        self.declared || self.music
    }

    fn absent(&self) -> bool {
        self.voices.iter().any(|voice| voice.row.is_none())
    }

    /// The voices that a label may name here.
    fn candidates(&self) -> Vec<usize> {
        let all = 0..self.voices.len();
        let row = |i: usize| self.voices[i].row.as_deref();
        let struck = |i: usize| -> Vec<Option<usize>> {
            row(i)
                .unwrap_or_default()
                .iter()
                .map(|bar| bar.struck)
                .collect()
        };
        let unlisted = |i: &usize| !self.listed.contains(i);
        match self.within.as_str() {
            "voice line" => all.skip(self.voice_lines).take(1).collect(),
            // Only a later one: there is no ring.
            "option" => all.skip(self.voice + 1).collect(),
            "music row" => all.filter(|i| row(*i).is_none()).collect(),
            "copy" => all
                .filter(|i| *i != self.voice)
                .filter(|i| row(*i).is_some_and(|bars| bars.len() > self.bar))
                .collect(),
            "words row" => all
                .filter(unlisted)
                .filter(|i| row(*i).is_some() && !self.voices[*i].worded)
                .filter(|i| {
                    self.listed
                        .first()
                        .is_none_or(|first| struck(*first) == struck(*i))
                })
                .collect(),
            _ => all.filter(unlisted).collect(),
        }
    }

    fn copies(&self) -> Vec<usize> {
        let steer = Steer {
            within: "copy".to_owned(),
            ..self.clone()
        };
        steer.candidates()
    }

    fn label(&mut self, random: &mut Random) -> Supply {
        let Some(&found) = random.one(&self.candidates()) else {
            return Supply::Nothing;
        };
        self.listed.push(found);
        match self.within.as_str() {
            "voice line" => {
                self.voice = found;
                self.voice_lines += 1;
            }
            "music row" => {
                self.voice = found;
                self.voices[found].row = Some(Vec::new());
            }
            "copy" => self.source = found,
            "words row" => self.voices[found].worded = true,
            _ => {}
        }
        Supply::Text(self.labels[found].clone())
    }

    fn mark_name(&mut self, random: &mut Random) -> Supply {
        let known = if self.marking {
            if let Some(name) = self.noted.pop() {
                self.closed.push(name.clone());
                Some(name)
            } else {
                let all: Vec<String> = self.open.iter().chain(&self.closed).cloned().collect();
                let again = all.len() >= 4 || random.below(3) == 0;
                random.one(&all).filter(|_| again).cloned()
            }
        } else if self.open.is_empty() {
            None
        } else {
            let name = self.open.remove(0);
            self.closed.push(name.clone());
            Some(name)
        };
        self.fresh = known.is_none();
        known.map_or(Supply::Derive, written)
    }

    /// How many bars a row under the notes may have.
    fn longest_row(&self) -> usize {
        self.voices
            .iter()
            .filter_map(|voice| Some(voice.row.as_ref()?.len()))
            .max()
            .unwrap_or(0)
    }

    /// How many cells this bar has, as far as the rows above say.
    fn longest_bar(&self) -> usize {
        let rows = self
            .voices
            .iter()
            .filter_map(|voice| voice.row.as_ref()?.get(self.bar));
        rows.map(|bar| bar.cells).max().unwrap_or(0).max(1)
    }

    fn shift(&self, by: i32) -> bool {
        let row = self.voices[self.source].row.as_deref().unwrap_or_default();
        let octaves = row.get(self.bar).and_then(|bar| bar.octaves);
        octaves.is_none_or(|(low, high)| low + by >= 0 && high + by <= 9)
    }

    /// The syllables that this bar of a words row may have.
    fn syllables(&self) -> Option<usize> {
        let row = self.voices[*self.listed.first()?].row.as_deref()?;
        row.get(self.bar)?.struck.filter(|n| *n > 0)
    }

    fn end_bar(&mut self, text: &str) {
        if self.in_music && self.ends.is_none() {
            self.first_ends.push(text.to_owned());
        }
        if self.in_music {
            let bar = std::mem::take(&mut self.here);
            if let Some(row) = &mut self.voices[self.voice].row {
                row.push(bar);
            }
        }
        // A bar short of its cells states nothing for the rest; in free metre later rows say whether
        // it is.
        self.chord &= Some(std::mem::take(&mut self.filled)) == self.cells;
        self.bar += 1;
    }

    fn begin_row(&mut self, music: bool) {
        self.bar = 0;
        self.octave = None;
        self.in_music = music;
        self.chord = false;
        self.filled = 0;
    }

    fn touch(&mut self, octave: Option<i32>) {
        if let Some(octave) = octave {
            let (low, high) = self.here.octaves.unwrap_or((octave, octave));
            self.here.octaves = Some((low.min(octave), high.max(octave)));
        }
    }

    /// The value behind "by": one that divides the bar.
    fn divide(&mut self, random: &mut Random) {
        let Some((upper, lower, _)) = self.timed else {
            return;
        };
        let mut fits = Vec::new();
        for unit in [1, 2, 4, 8, 16, 32, 64] {
            for n in 1..=99 {
                if (upper * unit).is_multiple_of(n * lower) {
                    fits.push((n, unit));
                }
            }
        }
        if let Some(&(n, unit)) = random.one(&fits) {
            self.counts = vec![n];
            self.unit = Some(unit);
        }
    }

    /// Groups that make up the upper figure.
    fn group(&mut self, random: &mut Random) {
        let Some((upper, ..)) = self.timed else {
            return;
        };
        let mut groups = vec![1; (2 + random.below(3)).min(upper)];
        for _ in groups.len()..upper {
            let at = random.below(groups.len());
            groups[at] += 1;
        }
        self.counts = groups;
    }

    fn read_value(&mut self, text: &str) {
        let mut figures = text.split('/').filter_map(|figure| figure.parse().ok());
        if let (Some(n), Some(unit)) = (figures.next(), figures.next()) {
            self.timed = match self.timed {
                None => Some((n, unit, n)),
                Some((upper, lower, _)) => Some((upper, lower, upper * unit / (n * lower))),
            };
        }
    }
}

/// A sentence that counts for nothing.
fn written(text: String) -> Supply {
    Supply::Text(Sentence {
        text,
        ways: Vec::new(),
    })
}

/// Semitones of a pitch from C0, by its own name.
fn semitone(pitch: &str) -> i32 {
    let mut all = pitch.chars();
    let letter = all
        .next()
        .and_then(|c| "C.D.EF.G.A.B".find(c.to_ascii_uppercase()));
    let at = letter.and_then(|at| i32::try_from(at).ok()).unwrap_or(0);
    all.fold(at, |at, c| match c {
        '#' | '♯' => at + 1,
        'x' | '𝄪' => at + 2,
        'b' | '♭' => at - 1,
        '𝄫' => at - 2,
        _ => {
            at + 12
                * c.to_digit(10)
                    .and_then(|c| i32::try_from(c).ok())
                    .unwrap_or(0)
        }
    })
}

/// Whether figures stand highest first; a sign alone stands for the third.
pub(crate) fn descending(stack: &str) -> bool {
    let height = |figure: &str| figure.chars().find_map(|c| c.to_digit(10)).unwrap_or(3);
    stack.split('/').map(height).is_sorted_by(|a, b| a > b)
}

impl Guide for Steer {
    fn may_refuse(&self, rule: &str) -> bool {
        matches!(rule, "mark name" | "range" | "rule" | "figures part")
    }

    fn enter(&mut self, rule: &str, random: &mut Random) -> Supply {
        match rule {
            "equal" | "licence" | "voice line" | "option" | "music row" | "copy" | "words row" => {
                rule.clone_into(&mut self.within);
                self.listed.clear();
            }
            _ => {}
        }
        match rule {
            "label" => return self.label(random),
            "mark name" => return self.mark_name(random),
            "mark" => self.marking = true,
            "footnote" => self.marking = false,
            "voice line" => self.options.clear(),
            "title" | "subtitle" | "by" | "style" | "key" | "metre" | "tempo" | "equal" => {
                self.given.insert(rule.to_owned());
            }
            "music" => self.in_head = false,
            "gap" => self.given.clear(),
            "system" => {
                self.systems += 1;
                self.ends = None;
                self.first_ends.clear();
                self.harmony = false;
                self.figures = false;
                for voice in &mut self.voices {
                    voice.sounding &= voice.row.is_some();
                    voice.row = None;
                    voice.worded = false;
                }
            }
            "music row" => self.begin_row(true),
            "words row" => self.begin_row(false),
            "harmony row" => {
                self.begin_row(false);
                self.harmony = true;
            }
            "figures row" => {
                self.begin_row(false);
                self.figures = true;
            }
            "cells" => {
                self.here = Bar {
                    struck: Some(0),
                    ..Bar::default()
                };
                self.touch(self.voices[self.voice].held);
            }
            "time" => {
                self.in_time = true;
                self.timed = None;
            }
            "note value" if self.in_time => self.divide(random),
            "groups" => self.group(random),
            "count" if !self.counts.is_empty() => {
                return written(self.counts.remove(0).to_string());
            }
            "unit" => {
                if let Some(unit) = self.unit.take() {
                    return written(unit.to_string());
                }
            }
            _ => {}
        }
        Supply::Derive
    }

    fn leave(&mut self, rule: &str, text: &str) -> bool {
        match rule {
            "mark name" if self.fresh => {
                let known = [&self.open, &self.noted, &self.closed];
                if known
                    .iter()
                    .any(|names| names.iter().any(|name| name == text))
                {
                    return false;
                }
                let names = if self.marking {
                    &mut self.open
                } else {
                    &mut self.noted
                };
                names.push(text.to_owned());
            }
            "range" => {
                return text
                    .split_once("..")
                    .is_some_and(|(low, high)| semitone(low) <= semitone(high));
            }
            "rule" => return self.labels.iter().all(|label| label.text != text),
            "option" => {
                let name = text
                    .split(|c: char| !c.is_ascii_lowercase())
                    .next()
                    .unwrap_or_default();
                let name = if text.contains("..") && name != "easy" {
                    "range"
                } else {
                    name
                };
                // "sixteen-foot" begins with this.
                let name = if name == "sixteen" {
                    "sixteen-foot"
                } else {
                    name
                };
                self.options.insert(name.to_owned());
            }
            "note value" if self.in_time => self.read_value(text),
            "time" => self.in_time = false,
            "metre" => {
                let free = text.ends_with("free");
                self.cells = self.timed.filter(|_| !free).map(|(.., cells)| cells);
            }
            "music row" if self.ends.is_none() => {
                self.ends = Some(std::mem::take(&mut self.first_ends));
            }
            "copy" => {
                let row = self.voices[self.source].row.as_deref().unwrap_or_default();
                self.here = row.get(self.bar).cloned().unwrap_or_default();
                let by = if text.ends_with("-8") {
                    -1
                } else {
                    i32::from(text.ends_with("+8"))
                };
                self.here.struck = None;
                self.here.cells = 0;
                self.here.octaves = self.here.octaves.map(|(low, high)| (low + by, high + by));
                self.octave = None;
                self.voices[self.voice].sounding = false;
            }
            "bar end" => self.end_bar(text),
            "cell" => self.here.cells += 1,
            "harmony cell" | "figures cell" => self.filled += 1,
            "octave" => self.octave = text.parse().ok(),
            "note" => {
                self.here.struck = self.here.struck.map(|n| n + 1);
                self.touch(self.octave);
                self.voices[self.voice].sounding = true;
                self.voices[self.voice].held = self.octave;
            }
            "silence" if self.in_music => self.voices[self.voice].sounding = false,
            "unwritten" => self.voices[self.voice].sounding = true,
            "harmony part" | "figures part" => {
                self.chord = text != "_" && (self.chord || text != "-");
                return rule == "harmony part" || descending(text);
            }
            _ => {}
        }
        true
    }

    fn wish(&mut self, rule: &str, at: At<'_>) -> Wish {
        match at {
            At::Choice(way) => self.choice(rule, way),
            At::Optional(what) => self.optional(rule, what),
            At::Again(what, taken) => self.again(rule, what, taken),
        }
    }
}
