//! `textDocument/publishDiagnostics`: findings.

use partwright_check::house::HouseError;
use partwright_check::{Checked, Finding, Related, Role};
use partwright_score::Score;
use partwright_sheet::Span;
use tower_lsp::lsp_types::{
    Diagnostic, DiagnosticRelatedInformation, DiagnosticSeverity, Location, NumberOrString,
    PublishDiagnosticsParams, Url, notification::PublishDiagnostics,
};

use crate::convert;
use crate::documents::{Outcome, Snapshot, Verdict};
use crate::houses;
use crate::session::{Agreed, notification};

/// Whose findings they are.
const SOURCE: &str = "partwright";

/// The notification with an outcome's findings.
pub(crate) fn message(outcome: &Outcome, agreed: Agreed) -> Vec<u8> {
    let Snapshot { uri, version, .. } = &outcome.snapshot;
    publish(uri, diagnostics(outcome, agreed), Some(*version))
}

/// The notification that takes all findings back.
pub(crate) fn clear(uri: &Url) -> Vec<u8> {
    publish(uri, Vec::new(), None)
}

fn publish(uri: &Url, diagnostics: Vec<Diagnostic>, version: Option<i32>) -> Vec<u8> {
    notification::<PublishDiagnostics>(PublishDiagnosticsParams {
        uri: uri.clone(),
        diagnostics,
        version,
    })
}

/// The findings of an outcome.
pub(crate) fn diagnostics(outcome: &Outcome, agreed: Agreed) -> Vec<Diagnostic> {
    match &outcome.verdict {
        Verdict::Done(checked) => {
            let one = |finding| diagnostic(finding, checked, &outcome.snapshot, agreed);
            checked.open().map(one).collect()
        }
        Verdict::House(trouble) => trouble
            .iter()
            .map(|trouble| house(trouble, &outcome.snapshot, agreed))
            .collect(),
        Verdict::BrokeOff => vec![Diagnostic {
            range: convert::range(&outcome.snapshot.text, Span::new(0, 0), agreed.columns),
            severity: Some(DiagnosticSeverity::ERROR),
            source: Some(SOURCE.to_owned()),
            message: "The check of this sheet broke off, so its findings are not known. It is \
                      tried again at the next change. Please report the sheet as it is now."
                .to_owned(),
            ..Diagnostic::default()
        }],
    }
}

/// What is wrong with a house style: from where it stands to the end of that line.
fn house(trouble: &HouseError, snapshot: &Snapshot, agreed: Agreed) -> Diagnostic {
    let text = &snapshot.text;
    let elsewhere = houses::path(&snapshot.uri).is_none_or(|path| path != trouble.file);
    let at = trouble.at.filter(|_| !elsewhere);
    let span = at.map_or(Span::new(0, 0), |(line, column)| {
        let rest = text.line_from_column(line.saturating_sub(1), column.saturating_sub(1));
        Span::new(rest.start, rest.end)
    });
    Diagnostic {
        range: convert::range(text, span, agreed.columns),
        severity: Some(DiagnosticSeverity::ERROR),
        source: Some(SOURCE.to_owned()),
        message: if elsewhere {
            trouble.to_string()
        } else {
            trouble.message.clone()
        },
        ..Diagnostic::default()
    }
}

/// Where a finding is shown. What has no written part of its own stands at the label of its voice.
pub(crate) fn span(finding: &Finding, checked: &Checked) -> Span {
    let label = || {
        let voice = *finding.voices.first()?;
        checked.reading.label_span(voice, finding.at?)
    };
    finding.span.or_else(label).unwrap_or(Span::new(0, 0))
}

/// A finding.
pub(crate) fn diagnostic(
    finding: &Finding,
    checked: &Checked,
    snapshot: &Snapshot,
    agreed: Agreed,
) -> Diagnostic {
    let range = |span| convert::range(&snapshot.text, span, agreed.columns);
    let related = finding.related.iter().filter_map(|related| {
        Some(DiagnosticRelatedInformation {
            location: Location {
                uri: snapshot.uri.clone(),
                range: range(related.span?),
            },
            message: role(related, &checked.reading.score),
        })
    });
    let related: Option<Vec<_>> = agreed.related.then(|| related.collect());
    Diagnostic {
        range: range(span(finding, checked)),
        severity: Some(convert::severity(finding.severity)),
        code: Some(NumberOrString::String(finding.rule.to_owned())),
        source: Some(SOURCE.to_owned()),
        message: finding.message.clone(),
        related_information: related.filter(|list| !list.is_empty()),
        ..Diagnostic::default()
    }
}

/// What a related place has to do with the finding: `from here: soprano D5`.
fn role(related: &Related, score: &Score) -> String {
    let word = match related.role {
        Role::From => "from here",
        Role::With => "with",
        Role::Resolves => "resolves here",
        Role::Struck => "struck here",
    };
    let note = score.note_at(related.voice, related.at);
    let voice = score.voices.get(related.voice);
    let pitch = voice.and_then(|v| v.notes.get(note?)?.sound.pitch());
    let name = score.spoken_name(related.voice);
    pitch.map_or_else(
        || format!("{word}: {name}"),
        |pitch| format!("{word}: {name} {pitch}"),
    )
}
