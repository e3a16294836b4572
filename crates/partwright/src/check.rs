//! `check`: what the style forbids or discourages, in sheets and folders of them.

use partwright_rules::{Strictness, Style};

use crate::arguments::Check;
use crate::files::{self, Trouble};
use crate::houses::Houses;
use crate::in_order::in_order;
use crate::judge::{Counts, Job, Judge, Judged, LeftAlone, Listing, Refused, known_style};
use crate::known::{Entry, Known, Place};
use crate::met::Met;
use crate::outcome::Outcome;
use crate::progress::Progress;
use crate::prose::{count, harmless, list};
use crate::report::{Plain, Reporter};
use crate::stage::Stage;
use crate::styles::Asked;

/// Entries of a list of known findings that are told one by one when nothing answers to them.
const MOST_GONE: usize = 10;

/// What is said where the checker itself broke off.
pub(crate) const BROKE_OFF: &str =
    "the checker broke off here, which is a mistake of ours: please report it with this sheet";

/// Runs the command.
pub(crate) fn run(wanted: &Check, stage: &mut Stage<'_>) -> Outcome {
    let mut work = Work {
        wanted,
        progress: Progress::new(stage, wanted.quiet),
        tally: Tally::default(),
        troubles: Vec::new(),
        outcome: Outcome::Clean,
    };
    let place = wanted.known.as_ref().or(wanted.write_known.as_ref());
    let place = place.map(|file| Place::of(file));
    let known = match known(wanted, place.as_ref()) {
        Ok(known) => known,
        Err(words) => return work.refuse(stage, &words),
    };
    let found = files::find(&wanted.paths, wanted.named.as_deref(), |sheets| {
        work.progress
            .tell(stage, || format!("looking for sheets: {sheets} so far"));
    });
    let mut houses = Houses::new();
    let jobs = Job::all(found.sheets, &mut houses);
    let judge = Judge {
        asked: Asked::of(wanted.scope.style.as_deref()),
        scope: &wanted.scope,
        filter: wanted.scope.filter(),
        licensed: wanted.licensed,
        known,
        reporter: Reporter {
            form: wanted.report,
            plain: Plain {
                width: stage.terminal.measure(),
                colour: wanted.colour.wanted(stage.terminal),
            },
            licensed: wanted.licensed,
        },
    };
    if let Err(words) = known_style(&judge.asked, &jobs, &houses) {
        return work.refuse(stage, &words);
    }
    for trouble in &found.troubles {
        work.trouble(stage, trouble);
    }
    for words in houses.troubles() {
        work.broken(stage, &words);
    }
    for words in &found.words {
        work.word(stage, words);
    }
    work.judge(stage, &judge, &jobs);
    for words in work.tally.met.missing(&wanted.scope) {
        work.say(stage, &words);
        work.outcome = Outcome::Trouble;
    }
    if let Some(place) = &place {
        work.list(stage, place);
    }
    work.summary(stage);
    work.outcome
}

/// What a list of known findings is for in this call.
fn known<'a>(
    wanted: &Check,
    place: Option<&'a Place>,
) -> Result<Option<(&'a Place, Listing)>, String> {
    let Some(place) = place else { return Ok(None) };
    if wanted.write_known.is_some() {
        return Ok(Some((place, Listing::Write)));
    }
    let known =
        Known::read(&place.file).map_err(|words| format!("{}: {words}", place.file.display()))?;
    Ok(Some((place, Listing::Read(known))))
}

/// A check under way.
struct Work<'a> {
    wanted: &'a Check,
    progress: Progress,
    tally: Tally,
    /// What could not be read or used, in words.
    troubles: Vec<String>,
    outcome: Outcome,
}

/// What was seen so far.
#[derive(Default)]
struct Tally {
    counts: Counts,
    /// Sheets that were read.
    sheets: usize,
    /// Sheets with findings.
    flawed: usize,
    /// Paths that gave no score.
    unread: usize,
    /// What the filters may name.
    met: Met,
    /// For the list of known findings.
    entries: Vec<Entry>,
    /// On the list, and not found any more.
    gone: Vec<Entry>,
}

impl Work<'_> {
    /// Judges the sheets and reports their findings, in order.
    fn judge(&mut self, stage: &mut Stage<'_>, judge: &Judge<'_>, jobs: &[Job]) {
        let rules = Strictness {
            pick: self.wanted.scope.pick.clone(),
            drop: self.wanted.scope.drop.clone(),
            ..Strictness::plain(Style::Free)
        };
        stage.out.print(&judge.reporter.head(&rules));
        let mut between = "";
        let mut left_alone = LeftAlone::default();
        // Standard input is read when its turn comes, here.
        let apart = |job: &Job| {
            job.sheet
                .file
                .is_some()
                .then(|| judge.judge(job, &mut std::io::empty()))
        };
        in_order(jobs, apart, |done, judged| {
            let Some(job) = jobs.get(done) else { return };
            self.progress
                .tell(stage, || format!("{done} of {} sheets", jobs.len()));
            let judged = match judged {
                Some(Some(judged)) => judged,
                Some(None) => judge.judge(job, stage.input),
                None => Err(Trouble::of(&job.sheet, BROKE_OFF).into()),
            };
            let mut judged = match judged {
                Ok(judged) => judged,
                Err(Refused::Trouble(trouble)) => return self.trouble(stage, &trouble),
                Err(Refused::House(file)) => return left_alone.add(file, &job.sheet),
            };
            self.progress.wipe(stage);
            judge.print(job, &mut judged, |piece| {
                stage.out.print(between);
                stage.out.print(piece);
                between = judge.reporter.between();
            });
            stage.out.flush();
            if judged.empty {
                let name = &job.sheet.name;
                self.word(
                    stage,
                    &format!("{name}: an empty sheet, without a bar of music"),
                );
            }
            self.add(judged);
        });
        self.progress.wipe(stage);
        for words in left_alone.words("not checked, since their style would come from it") {
            self.broken(stage, &words);
        }
        stage.out.print(&judge.reporter.tail(&self.troubles));
    }

    fn add(&mut self, judged: Judged) {
        if judged
            .worst
            .is_some_and(|worst| self.wanted.fail_on.counts(worst))
        {
            self.outcome = self.outcome.max(Outcome::Found);
        }
        let tally = &mut self.tally;
        tally.sheets += 1;
        tally.flawed += usize::from(judged.worst.is_some());
        tally.counts += judged.counts;
        tally.met.add(judged.met);
        tally.entries.extend(judged.entries);
        tally.gone.extend(judged.gone);
    }

    /// A call that cannot be answered.
    fn refuse(&mut self, stage: &mut Stage<'_>, words: &str) -> Outcome {
        self.say(stage, words);
        Outcome::Trouble
    }

    /// Says why a path gives no score.
    fn trouble(&mut self, stage: &mut Stage<'_>, trouble: &Trouble) {
        self.tally.unread += 1;
        self.broken(stage, &trouble.to_string());
    }

    /// Says what else could not be done.
    fn broken(&mut self, stage: &mut Stage<'_>, words: &str) {
        self.say(stage, words);
        self.troubles.push(words.to_owned());
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

    /// Writes the list of known findings, or tells what on it is not found any more.
    fn list(&mut self, stage: &mut Stage<'_>, place: &Place) {
        let file = place.file.display();
        if self.wanted.write_known.is_some() {
            if self.outcome == Outcome::Trouble {
                let words = format!("{file}: not written, since not everything could be checked");
                return self.say(stage, &words);
            }
            let entries = std::mem::take(&mut self.tally.entries);
            let written = count(entries.len(), "known finding", "known findings");
            match place.write(entries) {
                Ok(()) => self.word(stage, &format!("{file}: {written} written")),
                Err(words) => self.broken(stage, &format!("{file}: {words}")),
            }
            return;
        }
        let gone = std::mem::take(&mut self.tally.gone);
        for entry in gone.iter().take(MOST_GONE) {
            self.word(
                stage,
                &format!("{file}: not found any more: {}", entry.words()),
            );
        }
        if gone.len() > MOST_GONE {
            let more = gone.len() - MOST_GONE;
            self.word(stage, &format!("{file}: nor {more} more"));
        }
        if !gone.is_empty() {
            self.word(
                stage,
                &format!("{file}: --write-known writes the list anew"),
            );
        }
    }

    /// The last line: how much was found, and in how many sheets.
    fn summary(&mut self, stage: &mut Stage<'_>) {
        if self.wanted.quiet || (self.tally.sheets == 0 && !self.troubles.is_empty()) {
            return;
        }
        stage.complain(&format!("{}\n", self.tally.words()));
    }
}

impl Tally {
    fn words(&self) -> String {
        let counted = [
            (self.counts.faults, "fault", "faults"),
            (self.counts.weaknesses, "weakness", "weaknesses"),
            (self.counts.remarks, "remark", "remarks"),
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
        let unread = match self.unread {
            0 => String::new(),
            unread => format!(" {} could not be read.", count(unread, "path", "paths")),
        };
        let apart = [
            (self.counts.licensed, "licensed"),
            (self.counts.known, "known"),
        ];
        let apart: Vec<String> = apart
            .into_iter()
            .filter(|(number, _)| *number > 0)
            .map(|(number, word)| format!("{number} {word}"))
            .collect();
        let apart: Vec<&str> = apart.iter().map(String::as_str).collect();
        let apart = match list(&apart) {
            apart if apart.is_empty() => apart,
            apart => format!("; {apart}"),
        };
        let found = if counted.is_empty() {
            "Nothing found".to_owned()
        } else {
            list(&counted)
        };
        format!("{found} in {place}{apart}.{unread}")
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_summary_counts() {
        let words = |faults, remarks, licensed, known, sheets, flawed, unread| {
            Tally {
                counts: Counts {
                    faults,
                    remarks,
                    licensed,
                    known,
                    ..Counts::default()
                },
                sheets,
                flawed,
                unread,
                ..Tally::default()
            }
            .words()
        };
        assert_eq!(words(0, 0, 0, 0, 1, 0, 0), "Nothing found in 1 sheet.");
        assert_eq!(
            words(2, 1, 0, 0, 1, 1, 0),
            "2 faults and 1 remark in 1 sheet."
        );
        assert_eq!(
            words(1, 0, 0, 0, 9, 3, 1),
            "1 fault in 3 of 9 sheets. 1 path could not be read."
        );
        assert_eq!(
            words(0, 0, 2, 0, 1, 0, 0),
            "Nothing found in 1 sheet; 2 licensed."
        );
        assert_eq!(
            words(1, 0, 1, 7, 2, 1, 0),
            "1 fault in 1 of 2 sheets; 1 licensed and 7 known."
        );
    }
}
