//! `mend`: repairs, shown as a diff or written into the sheets.

mod diff;
mod settle;
pub(crate) mod writing;

use std::sync::Arc;

use crate::arguments::Mend;
use crate::check::BROKE_OFF;
use crate::files::{self, Trouble};
use crate::houses::{Houses, Nearest};
use crate::in_order::in_order;
use crate::judge::{Job, LeftAlone, Refused, known_style};
use crate::met::Met;
use crate::outcome::Outcome;
use crate::progress::Progress;
use crate::prose::{count, harmless};
use crate::report::Plain;
use crate::save;
use crate::stage::Stage;
use crate::styles::Asked;
use diff::Look;
use settle::{Settled, Wanted, settle};

/// Runs the command.
pub(crate) fn run(wanted: &Mend, stage: &mut Stage<'_>) -> Outcome {
    let mut work = Work {
        wanted,
        progress: Progress::new(stage, wanted.quiet),
        look: Look {
            plain: Plain {
                width: stage.terminal.measure(),
                colour: wanted.colour.wanted(stage.terminal),
            },
            terminal: stage.terminal.out,
        },
        sheets: 0,
        mended: 0,
        mends: 0,
        met: Met::default(),
        outcome: Outcome::Clean,
    };
    let found = files::find(&wanted.paths, wanted.named.as_deref(), |sheets| {
        work.progress
            .tell(stage, || format!("looking for sheets: {sheets} so far"));
    });
    let mut houses = Houses::new();
    let jobs = Job::all(found.sheets, &mut houses);
    let asked = Asked::of(wanted.scope.style.as_deref());
    if let Err(words) = known_style(&asked, &jobs, &houses) {
        work.trouble(stage, &words);
        return work.outcome;
    }
    let troubles = found.troubles.iter().map(ToString::to_string);
    for trouble in troubles.chain(houses.troubles()) {
        work.trouble(stage, &trouble);
    }
    for words in &found.words {
        work.word(stage, words);
    }
    work.mend(stage, &asked, &jobs);
    for words in work.met.missing(&wanted.scope) {
        work.trouble(stage, &words);
    }
    work.summary(stage);
    work.outcome
}

/// Mending under way.
struct Work<'a> {
    wanted: &'a Mend,
    progress: Progress,
    look: Look,
    /// Sheets that were read.
    sheets: usize,
    /// Sheets with something to mend.
    mended: usize,
    /// Mends in all of them.
    mends: usize,
    /// What the filters may name.
    met: Met,
    outcome: Outcome,
}

impl Work<'_> {
    fn mend(&mut self, stage: &mut Stage<'_>, asked: &Asked, jobs: &[Job]) {
        let wanted = self.wanted;
        let how = Wanted {
            scope: &wanted.scope,
            filter: wanted.scope.filter(),
            notes: wanted.notes,
        };
        let mut left_alone = LeftAlone::default();
        // Standard input is read when its turn comes, here.
        let apart = |job: &Job| {
            let file = job.sheet.file.is_some();
            file.then(|| settled(job, asked, &how, &mut std::io::empty()))
        };
        in_order(jobs, apart, |done, settled_apart| {
            let Some(job) = jobs.get(done) else { return };
            self.progress
                .tell(stage, || format!("{done} of {} sheets", jobs.len()));
            let result = match settled_apart {
                Some(Some(result)) => result,
                Some(None) => settled(job, asked, &how, stage.input),
                None => Err(Trouble::of(&job.sheet, BROKE_OFF).into()),
            };
            match result {
                Ok((text, settled)) => self.settled(stage, job, &text, &settled),
                Err(Refused::Trouble(trouble)) => self.trouble(stage, &trouble.to_string()),
                Err(Refused::House(file)) => left_alone.add(file, &job.sheet),
            }
        });
        self.progress.wipe(stage);
        // Its licences would say which notes must stay.
        for words in left_alone.words("not mended, since it may speak of them") {
            self.trouble(stage, &words);
        }
    }

    /// Shows or writes what became of a sheet.
    fn settled(&mut self, stage: &mut Stage<'_>, job: &Job, text: &str, settled: &Settled) {
        let name = &job.sheet.name;
        self.sheets += 1;
        self.met.add(Met::of(&settled.before.reading.score));
        self.progress.wipe(stage);
        let changed = settled.text != text;
        match (&job.sheet.file, self.wanted.write) {
            (None, true) => stage.out.print(&settled.text),
            (Some(file), true) if changed => {
                if let Err(words) = save::replace(file, text, &settled.text) {
                    return self.trouble(stage, &format!("{name}: {words}"));
                }
            }
            (_, true) => {}
            (_, false) => {
                let diff = self.look.diff(&harmless_name(name), text, &settled.text);
                stage.out.print(&diff);
            }
        }
        if !changed {
            return;
        }
        self.mended += 1;
        self.mends += settled.done.len();
        if !self.wanted.write {
            self.outcome = self.outcome.max(Outcome::Found);
        }
        for done in &settled.done {
            self.word(stage, &format!("{name}: {done}"));
        }
    }

    fn trouble(&mut self, stage: &mut Stage<'_>, words: &str) {
        self.say(stage, words);
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

    fn summary(&mut self, stage: &mut Stage<'_>) {
        if self.wanted.quiet || self.sheets == 0 {
            return;
        }
        let sheets = count(self.sheets, "sheet", "sheets");
        let place = if self.mended < self.sheets && self.mended > 0 {
            format!("{} of {sheets}", self.mended)
        } else {
            sheets
        };
        let mends = count(self.mends, "mend", "mends");
        let words = match (self.mends, self.wanted.write) {
            (0, _) => format!("Nothing to mend in {place}."),
            (_, true) => format!("{mends} written in {place}."),
            (_, false) => format!("{mends} in {place}; --write writes them."),
        };
        stage.complain(&format!("{words}\n"));
    }
}

/// A name that stands on a line of its own.
fn harmless_name(name: &str) -> String {
    name.replace(['\n', '\r'], "\u{fffd}")
}

/// Reads and mends a sheet; its text as it was comes first.
fn settled(
    job: &Job,
    asked: &Asked,
    how: &Wanted<'_>,
    input: &mut dyn std::io::Read,
) -> Result<(String, Settled), Refused> {
    if let Nearest::Broken(file) = &job.nearest {
        return Err(Refused::House(Arc::clone(file)));
    }
    let wishes = job.wishes(asked)?;
    let text = files::read(&job.sheet, input)?;
    let settled = settle(&text, &wishes, how);
    Ok((text, settled))
}
