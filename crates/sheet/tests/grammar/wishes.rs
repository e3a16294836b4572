//! How gladly the guide takes each way.

use super::{Steer, Voice};
use crate::derive::Wish;

fn may(allowed: bool, weight: u32) -> Wish {
    if allowed {
        Wish::Weigh(weight)
    } else {
        Wish::Never
    }
}

fn must(needed: bool, weight: u32) -> Wish {
    if needed {
        Wish::Must
    } else {
        Wish::Weigh(weight)
    }
}

impl Steer {
    pub(super) fn choice(&self, rule: &str, way: &str) -> Wish {
        let noted = !self.noted.is_empty();
        let open = !self.open.is_empty();
        match (rule, way) {
            ("voice sheet", "version line") => Wish::Weigh(1),
            ("voice sheet", _) => Wish::Weigh(60),
            ("lines", "head") => must(self.declared || !self.music, 2),
            ("head line", "voice line") => {
                may(self.declared && self.voice_lines < self.voices.len(), 6)
            }
            ("header", "equal") => may(
                self.has_voices() && self.voices.len() > 1 && !self.given.contains(way),
                2,
            ),
            ("header", "licence") => Wish::Weigh(2),
            ("header" | "change line", _) => may(!self.given.contains(way), 2),
            ("break", "change line") => may(self.given.len() < 3, 2),
            ("gap", "aside") => must(open, 1),
            ("aside", "footnote line") if open => Wish::Must,
            ("aside", "footnote line") => {
                let follows = if self.in_head {
                    self.music
                } else {
                    self.ends.is_some() && self.absent()
                };
                may(follows && !noted, 1)
            }
            ("option", "doubles") => may(
                self.voice + 1 < self.voices.len() && !self.options.contains(way),
                2,
            ),
            ("option", _) => may(!self.options.contains(way), 2),
            ("time", "groups") => may(self.timed.is_some_and(|(upper, ..)| upper > 1), 2),
            ("system", "row line") => must(noted && self.absent(), 6),
            ("system", "aside") => Wish::Weigh(if open { 6 } else { 1 }),
            ("row", "music row") if self.ends.is_none() => Wish::Must,
            ("row", "music row") => {
                if noted {
                    must(self.absent(), 1)
                } else {
                    may(self.absent(), 4)
                }
            }
            ("row", "words row") => {
                let free = |voice: &Voice| voice.row.is_some() && !voice.worded;
                may(self.voices.iter().any(free), 2)
            }
            ("row", "harmony row") => may(!self.harmony, 1),
            ("row", "figures row") => may(!self.figures, 1),
            ("music bar", "gap in line") => may(!noted, 1),
            ("music bar", "blanks") => Wish::Weigh(6),
            ("music bar", "copy") => may(!noted && !self.copies().is_empty(), 1),
            ("music bar", "cells") => Wish::Weigh(4),
            ("copy", "-8") => may(self.shift(-1), 2),
            ("copy", "+8") => may(self.shift(1), 2),
            ("bar end", end) => match self.ends.as_ref() {
                None => Wish::Weigh(if end == "|" { 6 } else { 1 }),
                Some(ends) => may(ends.get(self.bar).is_some_and(|there| there == end), 1),
            },
            ("part", "note") => Wish::Weigh(8),
            ("part", "go on") => may(self.voices[self.voice].sounding, 4),
            ("part", "unwritten") => may(!noted, 1),
            ("part", "silence") => Wish::Weigh(1),
            ("mark", "footnote mark") => must(noted, 1),
            ("words bar", "gap in line") => must(self.syllables().is_none(), 1),
            ("words bar", _) => Wish::Weigh(6),
            ("harmony part" | "figures part", "go on") => may(self.chord, 2),
            _ => Wish::Weigh(2),
        }
    }

    pub(super) fn optional(&self, rule: &str, what: &str) -> Wish {
        match (rule, what) {
            ("lines", _) => {
                if self.music {
                    Wish::Must
                } else {
                    Wish::Never
                }
            }
            ("music", _) => must(!self.open.is_empty(), 2),
            ("copy", _) => may(self.shift(-1) || self.shift(1), 4),
            ("note", "octave") => must(self.octave.is_none(), 2),
            _ => Wish::Weigh(2),
        }
    }

    pub(super) fn again(&self, rule: &str, what: &str, taken: usize) -> Wish {
        let noted = !self.noted.is_empty();
        let open = !self.open.is_empty();
        match (rule, what) {
            ("blanks", _) => Wish::Weigh(3),
            ("gap in line", _) => Wish::Weigh(1),
            ("head", _) => must(self.declared && self.voice_lines < self.voices.len(), 12),
            ("gap", _) => must(open, 2),
            ("music", _) => Wish::Weigh(3),
            ("system", _) => {
                let undeclared = !self.declared && self.systems == 1;
                let needed = self.absent() && (undeclared || noted);
                must(needed, if self.absent() || open { 18 } else { 3 })
            }
            ("equal", _) => may(self.listed.len() < self.voices.len(), 2),
            ("licence", _) => may(
                self.has_voices() && self.listed.len() < self.voices.len(),
                2,
            ),
            ("groups", _) => {
                if self.counts.is_empty() {
                    Wish::Never
                } else {
                    Wish::Must
                }
            }
            ("voice line", _) => may(self.options.len() < 7, 4),
            ("music row", _) => match &self.ends {
                None => must(noted && taken == 0, if taken < 5 { 12 } else { 1 }),
                Some(ends) => may(taken < ends.len(), 90),
            },
            ("words row", "gap in line") => may(!self.candidates().is_empty(), 4),
            ("words row", _) => {
                let row = self
                    .listed
                    .first()
                    .and_then(|first| self.voices[*first].row.as_ref());
                may(row.is_some_and(|row| taken < row.len()), 60)
            }
            ("harmony row" | "figures row", _) => may(taken < self.longest_row(), 60),
            ("cells", _) => may(self.cells.is_none_or(|cells| taken + 1 < cells), 14),
            ("harmony bar" | "figures bar", _) => may(taken + 1 < self.longest_bar(), 14),
            ("words bar", _) => {
                let more = self.syllables().is_some_and(|n| taken + 1 < n);
                if more { Wish::Must } else { Wish::Never }
            }
            ("part", "mark") => must(noted && taken == 0, 1),
            _ => Wish::Weigh(3),
        }
    }
}
