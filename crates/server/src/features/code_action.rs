//! `textDocument/codeAction` and `codeAction/resolve`: mends, right forms, licences.
//!
//! What the client says about findings is not relied on: the findings are the checker's own, those
//! at or over the range. Mends need a search, which is done once for each finding of an outcome
//! and never on the reader's thread.

mod licence;

use std::cell::OnceCell;
use std::collections::BTreeMap;
use std::ops::Range;
use std::sync::{Arc, PoisonError};

use partwright_check::{Checked, Finding};
use partwright_mend::{Mend, mends};
use partwright_score::Pitch;
use partwright_sheet::{Edit, Offer, Span};
use serde::{Deserialize, Serialize};
use tower_lsp::lsp_types::{
    CodeAction, CodeActionContext, CodeActionKind, CodeActionOrCommand, Command, Diagnostic,
    WorkspaceEdit,
};

use crate::convert;
use crate::documents::Outcome;
use crate::features::execute_command::SELECT;
use crate::features::publish_diagnostics::{diagnostic, span};
use crate::lines::{Kind, line_at};
use crate::session::Agreed;
use crate::text::Text;

/// For so many findings in a range are mends looked for; the worst come first.
const MOST_FINDINGS: usize = 12;

/// The kinds of action that are offered.
pub(crate) const KINDS: [CodeActionKind; 2] =
    [CodeActionKind::QUICKFIX, CodeActionKind::SOURCE_FIX_ALL];

/// What an unresolved action keeps of its mend: of which state of which document, which finding's,
/// which of its mends.
#[derive(Clone, Debug, Serialize, Deserialize, PartialEq, Eq)]
pub(crate) struct Unresolved {
    /// The document.
    pub(crate) uri: tower_lsp::lsp_types::Url,
    /// Its state.
    pub(crate) generation: u64,
    finding: usize,
    mend: usize,
}

/// Whether actions of a kind are wanted; a kind stands for those under it too.
fn wants(context: &CodeActionContext, kind: &CodeActionKind) -> bool {
    context.only.as_ref().is_none_or(|only| {
        only.iter().any(|wanted| {
            let (wanted, kind) = (wanted.as_str(), kind.as_str());
            wanted.is_empty()
                || kind
                    .strip_prefix(wanted)
                    .is_some_and(|rest| rest.is_empty() || rest.starts_with('.'))
        })
    })
}

/// What is asked for.
pub(crate) struct Question {
    /// The bytes of the range.
    pub(crate) range: Range<usize>,
    /// Which kinds.
    pub(crate) context: CodeActionContext,
}

/// The findings at or over a range that no licence lifts, the worst first.
fn findings_at(checked: &Checked, range: &Range<usize>) -> Vec<usize> {
    let over = |finding: &Finding| {
        let span = span(finding, checked).range();
        span.start <= range.end && range.start <= span.end
    };
    let mut found: Vec<usize> = (0..checked.findings.len())
        .filter(|&i| {
            let finding = checked.findings.get(i);
            finding.is_some_and(|f| f.licence.is_none() && over(f))
        })
        .collect();
    found.sort_by_key(|&i| std::cmp::Reverse(checked.findings.get(i).map(|f| f.severity)));
    found.truncate(MOST_FINDINGS);
    found
}

/// Whether all mends that are needed were looked for already.
pub(crate) fn is_known(outcome: &Outcome, question: &Question) -> bool {
    let Some(checked) = outcome.checked() else {
        return true;
    };
    let known = outcome.mends.lock().unwrap_or_else(PoisonError::into_inner);
    !wants(&question.context, &CodeActionKind::QUICKFIX)
        || findings_at(checked, &question.range)
            .iter()
            .all(|index| known.contains_key(index))
}

/// The mends of a finding, looked for once.
fn mends_of(outcome: &Outcome, checked: &Checked, index: usize) -> Arc<[Mend]> {
    let known = || outcome.mends.lock().unwrap_or_else(PoisonError::into_inner);
    if let Some(found) = known().get(&index) {
        return Arc::clone(found);
    }
    let found: Arc<[Mend]> = match checked.findings.get(index) {
        Some(finding) => mends(checked, finding).into(),
        None => [].into(),
    };
    Arc::clone(known().entry(index).or_insert(found))
}

/// The actions. `goes_on` tells whether there is still a point in looking for mends.
pub(crate) fn actions(
    outcome: &Outcome,
    question: &Question,
    agreed: Agreed,
    goes_on: impl Fn() -> bool,
) -> Vec<CodeActionOrCommand> {
    let Some(checked) = outcome.checked().filter(|_| agreed.actions) else {
        return Vec::new();
    };
    let mut made = Vec::new();
    let mut maker = Maker {
        offered: Vec::new(),
        licensed: Vec::new(),
        mark: OnceCell::new(),
        outcome,
        checked,
        agreed,
    };
    if wants(&question.context, &CodeActionKind::QUICKFIX) {
        let found = findings_at(checked, &question.range);
        for &index in &found {
            if !goes_on() {
                return Vec::new();
            }
            maker.right_forms(index, &mut made);
            maker.mends(index, &mut made);
        }
        for &index in &found {
            maker.licences(index, &mut made);
        }
    }
    // Only where it is asked for: it is about the whole sheet, and no part of a menu on a note.
    let fix_all_wanted = question.context.only.is_some();
    if fix_all_wanted && wants(&question.context, &CodeActionKind::SOURCE_FIX_ALL) {
        let edits = fix_all(checked, outcome.snapshot.text.as_str());
        if !edits.is_empty() {
            made.push(CodeAction {
                title: "Set the writing right: figures as read, idle licences, headers".to_owned(),
                kind: Some(CodeActionKind::SOURCE_FIX_ALL),
                edit: Some(convert::workspace_edit(&outcome.snapshot, &edits, agreed)),
                ..CodeAction::default()
            });
        }
    }
    made.into_iter()
        .map(CodeActionOrCommand::CodeAction)
        .collect()
}

struct Maker<'a> {
    outcome: &'a Outcome,
    checked: &'a Checked,
    agreed: Agreed,
    /// The mends that are offered already (voice, note, pitch), with the index of their action.
    offered: Vec<(usize, usize, Pitch, usize)>,
    /// The parts and rules for which a licence is offered already.
    licensed: Vec<(Option<Span>, &'static str)>,
    /// A mark that is free.
    mark: OnceCell<String>,
}

impl Maker<'_> {
    fn edit(&self, edits: &[Edit]) -> WorkspaceEdit {
        convert::workspace_edit(&self.outcome.snapshot, edits, self.agreed)
    }

    fn diagnostic(&self, finding: &Finding) -> Diagnostic {
        diagnostic(finding, self.checked, &self.outcome.snapshot, self.agreed)
    }

    fn quick_fix(&self, title: String, finding: &Finding) -> CodeAction {
        CodeAction {
            title,
            kind: Some(CodeActionKind::QUICKFIX),
            diagnostics: Some(vec![self.diagnostic(finding)]),
            ..CodeAction::default()
        }
    }

    /// What is written badly or doubtfully, in its right forms. Only one that stands alone is
    /// preferred: between two readings the composer chooses.
    fn right_forms(&self, index: usize, made: &mut Vec<CodeAction>) {
        let Some(finding) = self.checked.findings.get(index) else {
            return;
        };
        for offer in &finding.offers {
            made.push(CodeAction {
                edit: Some(self.edit(&offer.edits)),
                is_preferred: (finding.offers.len() == 1).then_some(true),
                ..self.quick_fix(offer.title.clone(), finding)
            });
        }
    }

    /// The mends, the best one preferred. One that serves several findings is told once.
    fn mends(&mut self, index: usize, made: &mut Vec<CodeAction>) {
        let Some(finding) = self.checked.findings.get(index) else {
            return;
        };
        let text = self.outcome.snapshot.text.as_str();
        for (order, mend) in mends_of(self.outcome, self.checked, index)
            .iter()
            .enumerate()
        {
            let same = |(voice, note, to, _): &&(usize, usize, Pitch, usize)| {
                (*voice, *note, *to) == (mend.voice, mend.note, mend.to)
            };
            let known = self.offered.iter().find(same).map(|&(.., at)| at);
            if let Some(known) = known.and_then(|at| made.get_mut(at)) {
                let list = known.diagnostics.get_or_insert_default();
                list.push(self.diagnostic(finding));
                continue;
            }
            let later = Unresolved {
                uri: self.outcome.snapshot.uri.clone(),
                generation: self.outcome.snapshot.generation,
                finding: index,
                mend: order,
            };
            self.offered
                .push((mend.voice, mend.note, mend.to, made.len()));
            let edit = || self.edit(&mend.edits(self.checked, text));
            made.push(CodeAction {
                is_preferred: (order == 0).then_some(true),
                edit: (!self.agreed.resolves_edits).then(edit),
                data: serde_json::to_value(later)
                    .ok()
                    .filter(|_| self.agreed.resolves_edits),
                ..self.quick_fix(mend.title.clone(), finding)
            });
        }
    }

    fn licences(&mut self, index: usize, made: &mut Vec<CodeAction>) {
        let Some(finding) = self.checked.findings.get(index) else {
            return;
        };
        let text = self.outcome.snapshot.text.as_str();
        if finding.rule == "licence-idle" {
            if let Some(edits) = licence::remove(self.checked, text, finding) {
                made.push(CodeAction {
                    edit: Some(self.edit(&edits)),
                    is_preferred: Some(true),
                    ..self.quick_fix("Remove this licence".to_owned(), finding)
                });
            }
            return;
        }
        if let Some(grant) = licence::grant(self.checked, text, finding, || {
            let mark = self.mark.get_or_init(|| licence::fresh_mark(text));
            mark.clone()
        }) {
            // Several findings of one rule on one part need one licence only.
            let place = (finding.span, finding.rule);
            if self.licensed.contains(&place) {
                return;
            }
            self.licensed.push(place);
            let title = format!("Grant a licence for {}", finding.rule);
            let command = self.agreed.shows_documents.then(|| self.select(&grant));
            made.push(CodeAction {
                edit: Some(self.edit(&grant.edits)),
                command,
                ..self.quick_fix(title, finding)
            });
        }
    }

    /// Selects the reason, once the edit is made.
    fn select(&self, grant: &licence::Grant) -> Command {
        let text = self.outcome.snapshot.text.as_str();
        let new = Text::new(partwright_sheet::apply(text, &grant.edits));
        let range = convert::range(&new, grant.reason, self.agreed.columns);
        Command {
            title: "Select the reason".to_owned(),
            command: SELECT.to_owned(),
            arguments: Some(vec![
                self.outcome.snapshot.uri.to_string().into(),
                serde_json::to_value(range).unwrap_or_default(),
            ]),
        }
    }
}

/// The edits of writing that need no choice: octave figures as they are read now, idle licences,
/// and headers whose right form is beyond doubt.
fn fix_all(checked: &Checked, text: &str) -> Vec<Edit> {
    // By where they begin; none touches another.
    let mut edits: BTreeMap<u32, Edit> = BTreeMap::new();
    for finding in checked.open() {
        let wanted: Option<Vec<Edit>> = match (finding.rule, &finding.offers[..]) {
            ("octave-doubt", offers) => as_read(checked, finding, offers),
            ("licence-idle", _) => licence::remove(checked, text, finding),
            ("reading", [only]) => finding
                .span
                .filter(|span| {
                    let line = line_at(text, span.start as usize);
                    matches!(line.kind, Kind::Header | Kind::Other | Kind::Footnote)
                })
                .map(|_| only.edits.clone()),
            _ => None,
        };
        let Some(wanted) = wanted else { continue };
        let free = |new: &Edit| {
            let mut before = edits.range(..=new.span.end);
            before
                .next_back()
                .is_none_or(|(_, old)| old.span.end < new.span.start)
        };
        if wanted.iter().all(free) {
            edits.extend(wanted.into_iter().map(|edit| (edit.span.start, edit)));
        }
    }
    edits.into_values().collect()
}

/// The offer that writes down what is read anyway.
fn as_read(checked: &Checked, finding: &Finding, offers: &[Offer]) -> Option<Vec<Edit>> {
    let (voice, at) = checked.reading.at_offset(finding.span?.start as usize)?;
    let score = &checked.reading.score;
    let note = score.note_at(voice, at)?;
    let pitch = score.voices.get(voice)?.notes.get(note)?.sound.pitch()?;
    let figure = pitch.octave().to_string();
    let fits = |offer: &&Offer| {
        let words = offer.edits.iter().map(|edit| edit.text.as_str());
        words.collect::<String>().ends_with(&figure)
    };
    offers.iter().find(fits).map(|offer| offer.edits.clone())
}

/// The edit of an action that was left unresolved; `None` where it is none of this outcome.
pub(crate) fn resolve(
    outcome: &Outcome,
    unresolved: &Unresolved,
    agreed: Agreed,
) -> Option<WorkspaceEdit> {
    let checked = outcome.checked()?;
    let found = mends_of(outcome, checked, unresolved.finding);
    let mend = found.get(unresolved.mend)?;
    let edits = mend.edits(checked, outcome.snapshot.text.as_str());
    Some(convert::workspace_edit(&outcome.snapshot, &edits, agreed))
}

/// The bytes a range of the client stands for.
pub(crate) fn bytes(
    text: &Text,
    range: tower_lsp::lsp_types::Range,
    agreed: Agreed,
) -> Range<usize> {
    let start = convert::offset(text, range.start, agreed.columns);
    let end = convert::offset(text, range.end, agreed.columns);
    let span = Span::new(start.min(end), start.max(end));
    span.range()
}
