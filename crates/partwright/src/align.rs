//! `align`: the beats of sheets set in columns, in place.

use std::fs;
use std::io::{self, Read};

use crate::arguments::Align;
use crate::check::BROKE_OFF;
use crate::files::{self, Sheet, Trouble};
use crate::in_order::in_order;
use crate::outcome::Outcome;
use crate::progress::Progress;
use crate::prose::{count, harmless};
use crate::save;
use crate::stage::Stage;

/// Runs the command.
pub(crate) fn run(wanted: &Align, stage: &mut Stage<'_>) -> Outcome {
    let mut work = Work {
        wanted,
        progress: Progress::new(stage, wanted.quiet),
        sheets: 0,
        changed: 0,
        outcome: Outcome::Clean,
    };
    let found = files::find(&wanted.paths, wanted.named.as_deref(), |sheets| {
        work.progress
            .tell(stage, || format!("looking for sheets: {sheets} so far"));
    });
    for trouble in &found.troubles {
        work.trouble(stage, trouble);
    }
    for words in found.words.iter().filter(|_| !wanted.quiet) {
        work.say(stage, words);
    }
    let sheets = &found.sheets;
    // Standard input is read when its turn comes, below.
    let apart = |sheet: &Sheet| {
        let file = sheet.file.is_some();
        file.then(|| aligned(sheet, wanted.verify, &mut io::empty()))
    };
    in_order(sheets, apart, |done, aligned_apart| {
        let Some(sheet) = sheets.get(done) else {
            return;
        };
        work.progress
            .tell(stage, || format!("{done} of {} sheets", sheets.len()));
        let result = match aligned_apart {
            Some(Some(result)) => result,
            Some(None) => aligned(sheet, wanted.verify, stage.input),
            None => Err(Trouble::of(sheet, BROKE_OFF)),
        };
        match result {
            Ok(texts) => work.sheet(stage, sheet, &texts),
            Err(trouble) => work.trouble(stage, &trouble),
        }
    });
    work.progress.wipe(stage);
    let input_only = sheets.iter().all(|sheet| sheet.file.is_none());
    if !wanted.quiet && work.sheets > 0 && (wanted.verify || !input_only) {
        work.summary(stage);
    }
    work.outcome
}

/// A sheet as it is, and in columns.
struct Texts {
    before: String,
    after: String,
    /// In columns it would be too large, and so it is not set.
    outgrown: bool,
}

/// Reads a sheet and sets it in columns.
fn aligned(sheet: &Sheet, verify: bool, input: &mut dyn Read) -> Result<Texts, Trouble> {
    if let Some(file) = sheet.file.as_ref().filter(|_| !verify) {
        // A pipe, say. Where there is nothing at all, reading tells why.
        let special = fs::metadata(file).is_ok_and(|data| !data.is_file());
        if special {
            let words = "no file that could be replaced; what it holds is read from standard \
                         input, as -";
            return Err(Trouble::of(sheet, words));
        }
    }
    let before = files::read(sheet, input)?;
    if before.contains('\0') {
        let words = "no text but a binary file; expected a voice sheet";
        return Err(Trouble::of(sheet, words));
    }
    let after = partwright_sheet::try_align(&before);
    Ok(Texts {
        outgrown: after.is_none(),
        after: after.unwrap_or_else(|| before.clone()),
        before,
    })
}

/// Aligning under way.
struct Work<'a> {
    wanted: &'a Align,
    progress: Progress,
    /// Sheets that were read, and those that did not stand in columns.
    sheets: usize,
    changed: usize,
    outcome: Outcome,
}

impl Work<'_> {
    /// Tells or writes what became of a sheet.
    fn sheet(&mut self, stage: &mut Stage<'_>, sheet: &Sheet, texts: &Texts) {
        self.sheets += 1;
        let changed = texts.before != texts.after;
        if texts.outgrown {
            let words = "stays as it is: in columns it would be larger than 8 MiB, the most that \
                         is read; part it into several sheets or its longest rows into several";
            self.say(stage, &Trouble::of(sheet, words).to_string());
        }
        match &sheet.file {
            _ if self.wanted.verify => {
                if changed {
                    self.progress.wipe(stage);
                    let name = sheet.name.replace('\n', "\u{fffd}");
                    stage.out.print(&format!("{}\n", harmless(&name)));
                    self.outcome = self.outcome.max(Outcome::Found);
                }
            }
            None => stage.out.print(&texts.after),
            Some(file) if changed => {
                if let Err(words) = save::replace(file, &texts.before, &texts.after) {
                    return self.trouble(stage, &Trouble::of(sheet, words));
                }
            }
            Some(_) => {}
        }
        self.changed += usize::from(changed);
    }

    fn trouble(&mut self, stage: &mut Stage<'_>, trouble: &Trouble) {
        self.say(stage, &trouble.to_string());
        self.outcome = Outcome::Trouble;
    }

    fn say(&mut self, stage: &mut Stage<'_>, words: &str) {
        self.progress.wipe(stage);
        stage.complain(&format!("partwright: {}\n", harmless(words)));
    }

    fn summary(&self, stage: &mut Stage<'_>) {
        let sheets = count(self.sheets, "sheet", "sheets");
        let some = match self.changed {
            changed if changed == self.sheets => sheets.clone(),
            changed => format!("{changed} of {sheets}"),
        };
        let words = match (self.changed, self.wanted.verify) {
            (0, _) => format!("Nothing to align in {sheets}."),
            (_, false) => format!("Aligned {some}."),
            (_, true) => format!("Not in columns: {some}."),
        };
        stage.complain(&format!("{words}\n"));
    }
}
