//! One sheet judged: read, checked, and its report set, all apart from every other sheet, so that
//! many can be judged at once.

use std::collections::BTreeMap;
use std::io;
use std::path::PathBuf;
use std::sync::Arc;

use partwright_check::{Checked, Filter, Finding, Severity, Style, Wishes};
use partwright_rules::{Strictness, entry};

use crate::arguments::Scope;
use crate::files::{self, Sheet, Trouble};
use crate::houses::{Houses, Nearest, real_file};
use crate::known::{Entry, Known, Place};
use crate::met::Met;
use crate::prose::{count, list};
use crate::report::{Page, Reporter};
use crate::styles::{Asked, unknown};

/// A report of more findings than this is set as it is printed, and need not be in memory.
const MOST_AT_ONCE: usize = 1000;

/// Sheets left alone for one reason that are named.
const MOST_NAMED: usize = 5;

/// A sheet to judge, with the house style above it.
pub(crate) struct Job {
    pub(crate) sheet: Sheet,
    pub(crate) nearest: Nearest,
}

impl Job {
    /// The sheets with their house styles, in order.
    pub(crate) fn all(sheets: Vec<Sheet>, houses: &mut Houses) -> Vec<Job> {
        let mut job = |sheet: Sheet| Job {
            nearest: houses.nearest(sheet.folder()),
            sheet,
        };
        sheets.into_iter().map(&mut job).collect()
    }

    /// The file whose licences of the house it takes.
    fn file(&self) -> Option<PathBuf> {
        self.sheet.place.as_deref().map(real_file)
    }

    /// How it is checked.
    ///
    /// # Errors
    /// Where the house style asked for is not the one above it.
    pub(crate) fn wishes(&self, asked: &Asked) -> Result<Wishes, Trouble> {
        let house = self.nearest.house();
        let style = asked.choice(house.map(Arc::as_ref)).map_err(|name| {
            let words = match house.and_then(|house| house.name.as_ref()) {
                Some(other) => {
                    format!("no style is called {name} here; the house style is {other}")
                }
                None => format!(
                    "no style is called {name} here; no house style of that name stands above it"
                ),
            };
            Trouble::of(&self.sheet, words)
        })?;
        Ok(Wishes {
            style,
            house: house.cloned(),
            file: self.file(),
            ..Wishes::default()
        })
    }
}

/// Refuses a house style's name that no sheet has above it.
///
/// # Errors
/// What to say.
pub(crate) fn known_style(asked: &Asked, jobs: &[Job], houses: &Houses) -> Result<(), String> {
    let fits = |job: &Job| asked.choice(job.nearest.house().map(Arc::as_ref)).is_ok();
    match asked {
        // Where a house style could not be read, its name is not known.
        Asked::House(_)
            if jobs
                .iter()
                .any(|job| matches!(job.nearest, Nearest::Broken(_))) =>
        {
            Ok(())
        }
        Asked::House(name) if !jobs.iter().any(fits) => Err(unknown(name, &houses.names())),
        _ => Ok(()),
    }
}

/// Why nothing is done with a sheet.
#[derive(Debug)]
pub(crate) enum Refused {
    /// It has a trouble of its own.
    Trouble(Trouble),
    /// The house style above it cannot be used; its file.
    House(Arc<str>),
}

impl From<Trouble> for Refused {
    fn from(trouble: Trouble) -> Refused {
        Refused::Trouble(trouble)
    }
}

/// The sheets left alone because of their house styles, by its file.
#[derive(Debug, Default)]
pub(crate) struct LeftAlone(BTreeMap<Arc<str>, Vec<String>>);

impl LeftAlone {
    pub(crate) fn add(&mut self, file: Arc<str>, sheet: &Sheet) {
        self.0.entry(file).or_default().push(sheet.name.clone());
    }

    /// What to say of them, a line a house style: `because` follows its file.
    pub(crate) fn words(&self, because: &str) -> Vec<String> {
        let words = |(file, sheets): (&Arc<str>, &Vec<String>)| {
            let mut names: Vec<&str> = sheets.iter().take(MOST_NAMED).map(String::as_str).collect();
            let more = sheets.len() - names.len();
            let more = count(more, "other sheet", "other sheets");
            if sheets.len() > names.len() {
                names.push(&more);
            }
            format!("{file}: {because}: {}", list(&names))
        };
        self.0.iter().map(words).collect()
    }
}

/// How sheets are judged.
pub(crate) struct Judge<'a> {
    pub(crate) asked: Asked,
    pub(crate) scope: &'a Scope,
    pub(crate) filter: Filter,
    /// Licensed findings are shown.
    pub(crate) licensed: bool,
    /// The list of known findings, and whether it is being written.
    pub(crate) known: Option<(&'a Place, Listing)>,
    pub(crate) reporter: Reporter,
}

/// What is done with a list of known findings.
pub(crate) enum Listing {
    /// It is read.
    Read(Known),
    /// It is written.
    Write,
}

/// How many findings there are.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub(crate) struct Counts {
    pub(crate) faults: usize,
    pub(crate) weaknesses: usize,
    pub(crate) remarks: usize,
    pub(crate) licensed: usize,
    pub(crate) known: usize,
}

impl std::ops::AddAssign for Counts {
    fn add_assign(&mut self, other: Counts) {
        self.faults += other.faults;
        self.weaknesses += other.weaknesses;
        self.remarks += other.remarks;
        self.licensed += other.licensed;
        self.known += other.known;
    }
}

impl Counts {
    fn add(&mut self, severity: Severity) {
        match severity {
            Severity::Fault => self.faults += 1,
            Severity::Weakness => self.weaknesses += 1,
            Severity::Remark => self.remarks += 1,
        }
    }
}

/// A sheet, judged.
#[derive(Default)]
pub(crate) struct Judged {
    pub(crate) counts: Counts,
    /// The worst that counts.
    pub(crate) worst: Option<Severity>,
    /// Its voices and bars.
    pub(crate) met: Met,
    /// Neither a bar of music nor anything that is wrong.
    pub(crate) empty: bool,
    /// What the list of known findings is to hold.
    pub(crate) entries: Vec<Entry>,
    /// What it held and no finding answers to.
    pub(crate) gone: Vec<Entry>,
    report: Report,
}

/// A report, set or still to be set.
#[derive(Default)]
enum Report {
    /// Nothing to report.
    #[default]
    Nothing,
    Set(Vec<String>),
    Long {
        text: String,
        checked: Box<Checked>,
        shown: Vec<usize>,
    },
}

impl Judge<'_> {
    /// Judges a sheet: reads it, checks it, sets its report.
    ///
    /// # Errors
    /// Why it could not be read or not be checked.
    pub(crate) fn judge(&self, job: &Job, input: &mut dyn io::Read) -> Result<Judged, Refused> {
        let text = files::read(&job.sheet, input)?;
        let wishes = Wishes {
            pick: self.scope.pick.clone(),
            drop: self.scope.drop.clone(),
            ..match &job.nearest {
                // The name it would have is not known.
                Nearest::Broken(_) if matches!(self.asked, Asked::House(_)) => Wishes::default(),
                _ => job.wishes(&self.asked)?,
            }
        };
        let checked = Checked::text(&text, &wishes);
        if let Nearest::Broken(file) = &job.nearest {
            // Only a style of its own keeps a sheet out of the house.
            let own = checked.reading.head.style.as_ref();
            let own = own.is_some_and(|style| Style::named(&style.value).is_some());
            if wishes.style.is_none() && (matches!(self.asked, Asked::House(_)) || !own) {
                return Err(Refused::House(Arc::clone(file)));
            }
        }
        Ok(self.judged(job, text, checked))
    }

    fn judged(&self, job: &Job, text: String, checked: Checked) -> Judged {
        let score = &checked.reading.score;
        let mut judged = Judged {
            met: Met::of(score),
            empty: score.bars.is_empty() && checked.reading.problems.is_empty(),
            ..Judged::default()
        };
        let findings = checked.findings.iter().enumerate();
        let mut shown: Vec<(usize, &Finding)> = findings
            .filter(|(_, finding)| self.filter.shows(finding, score))
            .collect();
        self.known(job, &text, &checked, &mut shown, &mut judged);
        shown.retain(|(_, finding)| {
            if finding.licence.is_some() {
                judged.counts.licensed += 1;
                return self.licensed;
            }
            judged.counts.add(finding.severity);
            judged.worst = judged.worst.max(Some(finding.severity));
            true
        });
        let shown: Vec<usize> = shown.into_iter().map(|(i, _)| i).collect();
        judged.report = if shown.is_empty() {
            Report::Nothing
        } else if shown.len() > MOST_AT_ONCE {
            Report::Long {
                text,
                checked: Box::new(checked),
                shown,
            }
        } else {
            let mut set = Vec::new();
            self.set(job, &text, &checked, &shown, |piece| set.push(piece));
            Report::Set(set)
        };
        judged
    }

    /// Takes out what is known, or puts it all on the list.
    fn known(
        &self,
        job: &Job,
        text: &str,
        checked: &Checked,
        shown: &mut Vec<(usize, &Finding)>,
        judged: &mut Judged,
    ) {
        let Some((place, listing)) = &self.known else {
            return;
        };
        let path = place.name(&job.sheet);
        let open = shown
            .iter()
            .filter(|(_, finding)| finding.licence.is_none());
        let entries: Vec<Entry> = open
            .map(|(_, finding)| Entry::of(&path, text, checked, finding))
            .collect();
        let known = match listing {
            Listing::Write => {
                let all = vec![true; entries.len()];
                judged.entries = entries;
                all
            }
            Listing::Read(list) => {
                let matched = list.among(&path, &entries);
                judged.gone = matched.gone;
                // What was not looked for cannot be found.
                judged
                    .gone
                    .retain(|entry| self.looks_for(entry, &checked.strictness));
                matched.known
            }
        };
        let mut known = known.into_iter();
        shown.retain(|(_, finding)| {
            finding.licence.is_some() || !known.next().unwrap_or(false) || {
                judged.counts.known += 1;
                false
            }
        });
    }

    fn looks_for(&self, wanted: &Entry, strictness: &Strictness) -> bool {
        self.filter == Filter::default()
            && entry(wanted.rule()).is_none_or(|rule| strictness.takes(&rule.id, rule.family))
    }

    fn set(
        &self,
        job: &Job,
        text: &str,
        checked: &Checked,
        shown: &[usize],
        print: impl FnMut(String),
    ) {
        let page = Page::new(&job.sheet, text, checked);
        let findings: Vec<&Finding> = shown
            .iter()
            .filter_map(|&i| checked.findings.get(i))
            .collect();
        self.reporter.set(&page, &findings, print);
    }

    /// Prints the report of a sheet, piece by piece.
    pub(crate) fn print(&self, job: &Job, judged: &mut Judged, mut print: impl FnMut(&str)) {
        match std::mem::take(&mut judged.report) {
            Report::Nothing => {}
            Report::Set(pieces) => pieces.iter().for_each(|piece| print(piece)),
            Report::Long {
                text,
                checked,
                shown,
            } => self.set(job, &text, &checked, &shown, |piece| print(&piece)),
        }
    }
}
