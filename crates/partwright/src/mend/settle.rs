//! Mending a sheet until there is nothing left to mend.
//!
//! Every change is tried on the whole sheet. One that does not make it better is left out, so the
//! changes come to an end, and what they come to is not changed by mending again.

use std::collections::BTreeMap;

use partwright_check::{Checked, Filter, Finding, Severity, Wishes};
use partwright_score::{Score, Time};
use partwright_sheet::{Edit, Span, apply};

use super::writing::{self, Mend};
use crate::arguments::Scope;

/// Rounds before the work is given up. Each but the last makes the sheet better, and music of any
/// length takes a few.
const MOST_ROUNDS: usize = 100;

/// Which findings are mended, and how.
pub(crate) struct Wanted<'a> {
    pub(crate) scope: &'a Scope,
    pub(crate) filter: Filter,
    /// Sounding notes may move.
    pub(crate) notes: bool,
}

/// A sheet, mended.
#[derive(Debug)]
pub(crate) struct Settled {
    /// Its text.
    pub(crate) text: String,
    /// The sheet as it was.
    pub(crate) before: Checked,
    /// What was done, in words.
    pub(crate) done: Vec<String>,
}

/// Mends a sheet. `wishes` name no rules: a mend of one rule must not break another.
pub(crate) fn settle(text: &str, wishes: &Wishes, wanted: &Wanted<'_>) -> Settled {
    let before = Checked::text(text, wishes);
    let mut state = State {
        wishes,
        wanted,
        text: text.to_owned(),
        checked: before.clone(),
        done: Vec::new(),
    };
    for _ in 0..MOST_ROUNDS {
        let done = state.done.len();
        state.writing();
        if wanted.notes {
            state.notes();
        }
        if state.done.len() == done {
            break;
        }
    }
    if !state.done.is_empty() {
        state.columns(&before, text);
    }
    Settled {
        text: state.text,
        before,
        done: state.done,
    }
}

/// A sheet on its way.
struct State<'a> {
    wishes: &'a Wishes,
    wanted: &'a Wanted<'a>,
    text: String,
    checked: Checked,
    done: Vec<String>,
}

impl State<'_> {
    /// Mends the writing: all at once where that is lawful, else half by half, so that one bad
    /// change among many costs little.
    fn writing(&mut self) {
        let mut ends = 0;
        let found = self.checked.findings.iter().filter(|f| self.means(f));
        let mut mends: Vec<Mend> = found
            .filter_map(|finding| writing::mend(&self.checked, &self.text, finding))
            .collect();
        mends.sort_by_key(|mend| mend.edits.first().map(|edit| edit.span));
        // Those that touch each other are for another round.
        mends.retain(|mend| {
            let apart = mend.edits.iter().all(|edit| edit.span.start >= ends);
            if apart {
                ends = mend
                    .edits
                    .iter()
                    .map(|e| e.span.end + 1)
                    .max()
                    .unwrap_or(ends);
            }
            apart
        });
        let mut accepted: Vec<Mend> = Vec::new();
        let mut stack = vec![mends];
        while let Some(mut some) = stack.pop() {
            let whole: Vec<&Mend> = accepted.iter().chain(&some).collect();
            if some.is_empty() {
                continue;
            }
            if self.lawful(&whole).is_some() {
                accepted.extend(some);
            } else if some.len() > 1 {
                let second = some.split_off(some.len() / 2);
                stack.push(second);
                stack.push(some);
            }
        }
        let whole: Vec<&Mend> = accepted.iter().collect();
        if let Some((text, checked)) = self.lawful(&whole).filter(|_| !whole.is_empty()) {
            let places = accepted.iter().map(|mend| self.told(mend));
            let told: Vec<String> = places.collect();
            self.done.extend(told);
            (self.text, self.checked) = (text, checked);
        }
    }

    /// The sheet with some mends of the writing, if every one of them makes it better.
    fn lawful(&self, mends: &[&Mend]) -> Option<(String, Checked)> {
        let edits: Vec<Edit> = mends.iter().flat_map(|m| m.edits.iter().cloned()).collect();
        let (text, checked) = self.tried(&edits);
        let silent = mends.iter().all(|mend| mend.silent);
        let sounds_alike = !silent || checked.reading.score == self.checked.reading.score;
        let (was, is) = (Weight::of(&self.checked), Weight::of(&checked));
        let better = is.total() + mends.len() <= was.total() && is.nowhere_above(was);
        (sounds_alike && better).then_some((text, checked))
    }

    /// Moves notes, finding by finding: the best mend that holds for the whole sheet.
    fn notes(&mut self) {
        let found = self.checked.findings.iter();
        let targets: Vec<Target> = found
            .filter(|f| self.means(f) && f.severity >= Severity::Weakness)
            .filter_map(Target::of)
            .collect();
        for target in targets {
            let here = self.checked.findings.iter().find(|f| target.is(f));
            let Some(finding) = here.filter(|f| f.licence.is_none()) else {
                continue;
            };
            for mend in partwright_mend::mends(&self.checked, finding) {
                let (text, checked) = self.tried(&mend.edits(&self.checked, &self.text));
                if self.keeps(&checked, mend.voice, mend.note) && self.brings_nothing(&checked) {
                    let score = &self.checked.reading.score;
                    let place = score.place(finding.at.unwrap_or(mend.at));
                    let rule = finding.rule;
                    self.done.push(format!(
                        "bar {}, beat {}, {rule}: {}",
                        place.bar,
                        place.beat_text(),
                        mend.title
                    ));
                    (self.text, self.checked) = (text, checked);
                    break;
                }
            }
        }
    }

    /// Whether nothing but that note changed: the text says what was meant.
    fn keeps(&self, checked: &Checked, voice: usize, note: usize) -> bool {
        let without = |score: &Score| {
            let mut score = score.clone();
            if let Some(voice) = score.voices.get_mut(voice) {
                let gone = voice.notes.get_mut(note);
                gone.into_iter()
                    .for_each(|n| n.sound = partwright_score::Sound::Rest);
            }
            score
        };
        without(&checked.reading.score) == without(&self.checked.reading.score)
    }

    /// Whether a state of the sheet is better, and has no fault or weakness that was not there.
    fn brings_nothing(&self, checked: &Checked) -> bool {
        let (was, is) = (Weight::of(&self.checked), Weight::of(checked));
        let mut before: BTreeMap<Identity<'_>, Severity> = BTreeMap::new();
        for finding in self.checked.open() {
            let worst = before.entry(identity(finding)).or_insert(finding.severity);
            *worst = finding.severity.max(*worst);
        }
        let new = checked
            .open()
            .filter(|f| f.severity >= Severity::Weakness)
            .any(|f| before.get(&identity(f)) < Some(&f.severity));
        is.total() < was.total() && is.nowhere_above(was) && !new
    }

    /// Sets in columns what stood in columns before: systems, or the whole sheet.
    fn columns(&mut self, before: &Checked, text: &str) {
        let mut edits = self.checked.sheet.align_edits();
        let edits_before = before.sheet.align_edits();
        if !edits_before.is_empty() {
            let (were, are) = (systems(before, text), systems(&self.checked, &self.text));
            // Where there are other systems than before, nobody can say which is which.
            let pairs = were.iter().zip(&are).filter(|_| were.len() == are.len());
            let kept: Vec<Span> = pairs
                .filter(|(was, _)| !edits_before.iter().any(|edit| within(edit.span, **was)))
                .map(|(_, is)| *is)
                .collect();
            edits.retain(|edit| kept.iter().any(|system| within(edit.span, *system)));
        }
        let text = apply(&self.text, &edits);
        let checked = Checked::text(&text, self.wishes);
        let alike = checked.reading.score == self.checked.reading.score;
        if alike && Weight::of(&checked).nowhere_above(Weight::of(&self.checked)) {
            (self.text, self.checked) = (text, checked);
        }
    }

    fn tried(&self, edits: &[Edit]) -> (String, Checked) {
        let text = apply(&self.text, edits);
        let checked = self.checked.again(&text, self.wishes);
        (text, checked)
    }

    /// Whether a finding is among those to mend.
    fn means(&self, finding: &Finding) -> bool {
        let takes = |list: &[String]| {
            let family = partwright_rules::family_of(finding.rule);
            list.iter()
                .any(|name| name == finding.rule || family == Some(name))
        };
        let scope = self.wanted.scope;
        finding.licence.is_none()
            && (scope.pick.is_empty() || takes(&scope.pick))
            && !takes(&scope.drop)
            && self
                .wanted
                .filter
                .shows(finding, &self.checked.reading.score)
    }

    /// A mend of the writing with its line.
    fn told(&self, mend: &Mend) -> String {
        let at = mend.edits.first().map_or(0, |edit| edit.span.start);
        let (line, _) = partwright_sheet::line_column(&self.text, at as usize);
        format!("line {line}: {}", mend.title)
    }
}

/// The systems of a sheet with the comments behind them, in order.
fn systems(checked: &Checked, text: &str) -> Vec<Span> {
    let mut systems: Vec<Span> = Vec::new();
    let mut offset = 0;
    for line in text.split_inclusive('\n') {
        let end = offset + line.len();
        match (checked.reading.system_at(offset), systems.last_mut()) {
            (Some(system), Some(last)) if system.start <= last.end => {
                last.end = last.end.max(system.end);
            }
            (Some(system), _) => systems.push(system),
            // Marks drawn under the last row.
            (None, Some(last)) if line.starts_with("//") && last.end as usize + 2 >= offset => {
                last.end = Span::new(end, end).start;
            }
            (None, _) => {}
        }
        offset = end;
    }
    systems
}

fn within(span: Span, system: Span) -> bool {
    system.start <= span.start && span.end <= system.end
}

/// What makes a finding the same in two states of a sheet: one without a place in the music is
/// told by its words.
type Identity<'a> = (&'a str, &'a [usize], Option<Time>, &'a str);

fn identity(finding: &Finding) -> Identity<'_> {
    let words = match finding.at {
        Some(_) => "",
        None => &finding.message,
    };
    (finding.rule, &finding.voices, finding.at, words)
}

/// A finding to look for in a later state.
struct Target {
    rule: &'static str,
    voices: Vec<usize>,
    at: Time,
}

impl Target {
    fn of(finding: &Finding) -> Option<Target> {
        Some(Target {
            rule: finding.rule,
            voices: finding.voices.clone(),
            at: finding.at?,
        })
    }

    fn is(&self, finding: &Finding) -> bool {
        self.rule == finding.rule && self.voices == finding.voices && Some(self.at) == finding.at
    }
}

/// How much is wrong with a sheet: its faults; with its weaknesses; with its remarks. What is
/// licensed is lawful; what waits for a doubtful octave counts all the same.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
struct Weight([usize; 3]);

impl Weight {
    fn of(checked: &Checked) -> Weight {
        let levels = [Severity::Fault, Severity::Weakness, Severity::Remark];
        let all = || {
            let waiting = checked.open().flat_map(|f| f.held.iter().copied());
            checked.open().map(|f| f.severity).chain(waiting)
        };
        Weight(levels.map(|least| all().filter(|severity| *severity >= least).count()))
    }

    fn total(self) -> usize {
        self.0.iter().sum()
    }

    /// Neither more findings nor worse ones.
    fn nowhere_above(self, other: Weight) -> bool {
        self.0
            .iter()
            .zip(other.0)
            .all(|(here, there)| *here <= there)
    }
}
