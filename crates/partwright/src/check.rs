//! `check`: what the style forbids or discourages, in sheets and folders of them.

use std::collections::BTreeSet;

use partwright_check::{Checked, Choice, Filter, Finding, Severity, Wishes};

use crate::arguments::{Check, Report};
use crate::files::{self, Trouble};
use crate::names::near;
use crate::outcome::Outcome;
use crate::progress::Progress;
use crate::prose::{count, harmless, list};
use crate::report::{Page, Plain, json};
use crate::stage::Stage;

/// Runs the command.
pub(crate) fn run(wanted: &Check, stage: &mut Stage<'_>) -> Outcome {
    let mut work = Work {
        wanted,
        wishes: Wishes {
            style: wanted.style.map(Choice::Style),
            pick: wanted.pick.clone(),
            drop: wanted.drop.clone(),
            ..Wishes::default()
        },
        filter: Filter {
            bars: wanted.bars,
            voices: wanted.voices.clone(),
        },
        plain: Plain {
            width: stage.terminal.measure(),
            colour: wanted.colour.wanted(stage.terminal),
        },
        progress: Progress::new(stage, wanted.quiet),
        tally: Tally::default(),
        outcome: Outcome::Clean,
    };
    let found = files::find(&wanted.paths, wanted.named.as_deref(), |sheets| {
        work.progress
            .tell(stage, || format!("looking for sheets: {sheets} so far"));
    });
    for trouble in &found.troubles {
        work.trouble(stage, trouble);
    }
    for words in &found.words {
        work.word(stage, words);
    }
    for (done, sheet) in found.sheets.iter().enumerate() {
        work.progress
            .tell(stage, || format!("{done} of {} sheets", found.sheets.len()));
        match files::read(sheet, stage.input) {
            Ok(text) => work.sheet(stage, &sheet.name, &text),
            Err(trouble) => work.trouble(stage, &trouble),
        }
    }
    work.progress.wipe(stage);
    work.unmet_filters(stage);
    work.summary(stage);
    work.outcome
}

/// A check under way.
struct Work<'a> {
    wanted: &'a Check,
    wishes: Wishes,
    filter: Filter,
    plain: Plain,
    progress: Progress,
    tally: Tally,
    outcome: Outcome,
}

/// What was seen so far.
#[derive(Default)]
struct Tally {
    faults: usize,
    weaknesses: usize,
    remarks: usize,
    /// Sheets that were read.
    sheets: usize,
    /// Sheets with findings.
    flawed: usize,
    /// Paths that gave no score.
    troubles: usize,
    /// The labels of all voices.
    labels: BTreeSet<String>,
    /// The highest bar number; `None` without a bar.
    last_bar: Option<u32>,
}

impl Work<'_> {
    /// Checks a sheet and reports its findings.
    fn sheet(&mut self, stage: &mut Stage<'_>, name: &str, text: &str) {
        let checked = Checked::text(text, &self.wishes);
        let score = &checked.reading.score;
        self.tally.sheets += 1;
        self.tally
            .labels
            .extend(score.voices.iter().map(|voice| voice.label.clone()));
        self.tally.last_bar = self
            .tally
            .last_bar
            .max(score.bars.last().map(|bar| bar.number));
        if score.bars.is_empty() && checked.reading.problems.is_empty() {
            self.word(
                stage,
                &format!("{name}: an empty sheet, without a bar of music"),
            );
        }
        let findings: Vec<&Finding> = checked
            .findings
            .iter()
            .filter(|f| self.filter.shows(f, score))
            .collect();
        if findings.is_empty() {
            return;
        }
        self.tally.flawed += 1;
        for finding in &findings {
            self.count(finding.severity);
        }
        self.progress.wipe(stage);
        let page = Page::new(name, text, &checked);
        match self.wanted.report {
            Report::Plain => self
                .plain
                .report(&page, &findings, |text| stage.out.print(text)),
            Report::Json => {
                for finding in findings {
                    match json(&page, finding) {
                        Ok(line) => stage.out.print(&line),
                        Err(error) => self.say(
                            stage,
                            &format!("{name}: a finding could not be written: {error}"),
                        ),
                    }
                }
            }
        }
        stage.out.flush();
    }

    fn count(&mut self, severity: Severity) {
        match severity {
            Severity::Fault => self.tally.faults += 1,
            Severity::Weakness => self.tally.weaknesses += 1,
            Severity::Remark => self.tally.remarks += 1,
        }
        if self.wanted.fail_on.counts(severity) {
            self.outcome = self.outcome.max(Outcome::Found);
        }
    }

    /// Says why a path gives no score.
    fn trouble(&mut self, stage: &mut Stage<'_>, trouble: &Trouble) {
        self.say(stage, &trouble.to_string());
        self.tally.troubles += 1;
        self.outcome = Outcome::Trouble;
    }

    /// Says something worth knowing, unless asked not to.
    fn word(&mut self, stage: &mut Stage<'_>, words: &str) {
        if !self.wanted.quiet {
            self.say(stage, words);
        }
    }

    fn say(&mut self, stage: &mut Stage<'_>, words: &str) {
        self.progress.wipe(stage);
        stage.complain(&format!("partwright: {}\n", harmless(words)));
    }

    /// A voice or bars that no sheet has would pass for a clean score: a wrong call.
    fn unmet_filters(&mut self, stage: &mut Stage<'_>) {
        for label in &self.wanted.voices {
            if self.tally.labels.is_empty() || self.tally.labels.contains(label) {
                continue;
            }
            let known: Vec<&str> = self.tally.labels.iter().map(String::as_str).collect();
            let advice = match near(label, known.iter().copied()).first() {
                Some(near) => format!("did you mean {near}?"),
                None if known.len() <= 12 => format!("there is {}", list(&known)),
                None => "give the label of its rows".to_owned(),
            };
            self.say(
                stage,
                &format!("--voices: no voice has the label {label}; {advice}"),
            );
            self.outcome = Outcome::Trouble;
        }
        if let (Some(bars), Some(last)) = (self.wanted.bars, self.tally.last_bar)
            && bars.first > last
        {
            self.say(
                stage,
                &format!(
                    "--bars: there is no bar {}; the last is bar {last}",
                    bars.first
                ),
            );
            self.outcome = Outcome::Trouble;
        }
    }

    /// The last line: how much was found, and in how many sheets.
    fn summary(&mut self, stage: &mut Stage<'_>) {
        if self.wanted.quiet || (self.tally.sheets == 0 && self.tally.troubles > 0) {
            return;
        }
        stage.complain(&format!("{}\n", self.tally.words()));
    }
}

impl Tally {
    fn words(&self) -> String {
        let counted = [
            (self.faults, "fault", "faults"),
            (self.weaknesses, "weakness", "weaknesses"),
            (self.remarks, "remark", "remarks"),
        ];
        let counted: Vec<String> = counted
            .into_iter()
            .filter(|(number, ..)| *number > 0)
            .map(|(number, one, many)| count(number, one, many))
            .collect();
        let counted: Vec<&str> = counted.iter().map(String::as_str).collect();
        let sheets = count(self.sheets, "sheet", "sheets");
        let place = match (self.flawed, self.sheets) {
            (flawed, sheets_read) if flawed < sheets_read && flawed > 0 => {
                format!("{flawed} of {sheets}")
            }
            _ => sheets,
        };
        let unread = match self.troubles {
            0 => String::new(),
            troubles => format!(" {} could not be read.", count(troubles, "path", "paths")),
        };
        let found = if counted.is_empty() {
            "Nothing found".to_owned()
        } else {
            list(&counted)
        };
        format!("{found} in {place}.{unread}")
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_summary_counts() {
        let words = |faults, remarks, sheets, flawed, troubles| {
            Tally {
                faults,
                remarks,
                sheets,
                flawed,
                troubles,
                ..Tally::default()
            }
            .words()
        };
        assert_eq!(words(0, 0, 1, 0, 0), "Nothing found in 1 sheet.");
        assert_eq!(words(2, 1, 1, 1, 0), "2 faults and 1 remark in 1 sheet.");
        assert_eq!(
            words(1, 0, 9, 3, 1),
            "1 fault in 3 of 9 sheets. 1 path could not be read."
        );
    }
}
