//! SARIF 2.1.0 (OASIS Standard, 27 March 2020): one log of one run, for programs that gather the
//! findings of many tools.
//!
//! The log is printed as it grows: the rules first, a result a line, and at the end how the run
//! went.

use partwright_check::{Finding, Severity};
use partwright_rules::{Entry, Strictness, catalogue};
use partwright_score::BarPlace;
use partwright_sheet::{Edit, Span};
use serde_json::{Value, json};
use url::Url;

use super::Page;
use super::marks::related_label;
use crate::houses::{real, real_file};
use crate::known;
use crate::mend::writing;

/// The published schema.
const SCHEMA: &str =
    "https://docs.oasis-open.org/sarif/sarif/v2.1.0/errata01/os/schemas/sarif-schema-2.1.0.json";
const VERSION: &str = env!("CARGO_PKG_VERSION");

/// The log up to its first result.
pub(super) fn head(rules: &Strictness) -> String {
    let rules: Vec<Value> = rules_of(rules).map(rule).collect();
    let driver = json!({
        "name": "partwright",
        "version": VERSION,
        "semanticVersion": VERSION,
        "language": "en-GB",
        "rules": rules,
    });
    format!(
        "{{\"$schema\":{},\"version\":\"2.1.0\",\"runs\":[{{\n\"tool\":{},\n\
         \"columnKind\":\"unicodeCodePoints\",\n\"results\":[\n",
        json!(SCHEMA),
        json!({ "driver": driver }),
    )
}

/// The log behind its last result.
pub(super) fn tail(troubles: &[String]) -> String {
    let notes: Vec<Value> = troubles
        .iter()
        .map(|words| json!({"level": "error", "message": {"text": words}}))
        .collect();
    let invocation = json!({
        "executionSuccessful": notes.is_empty(),
        "toolExecutionNotifications": notes,
    });
    format!("\n],\n\"invocations\":[{invocation}]\n}}]}}\n")
}

/// The rules that take part.
fn rules_of(strictness: &Strictness) -> impl Iterator<Item = &'static Entry> {
    let takes = |entry: &&Entry| strictness.takes(&entry.id, entry.family);
    catalogue().iter().filter(takes)
}

fn rule(entry: &Entry) -> Value {
    let mut rule = json!({
        "id": entry.id,
        "shortDescription": {"text": entry.page.title},
        "help": {"text": entry.page.text, "markdown": entry.page.text},
        "properties": {"tags": [entry.family]},
    });
    let why = entry.page.section("").unwrap_or_default();
    if !why.is_empty() {
        let why: Vec<&str> = why.split_whitespace().collect();
        rule["fullDescription"] = json!({"text": why.join(" ")});
    }
    rule
}

/// What a log calls the file of a page: its path from the current folder where it is below it,
/// else the whole path.
pub(super) fn uri(page: &Page<'_>) -> String {
    let Some(place) = page.place else {
        return page.name.to_owned();
    };
    let (here, file) = (real(std::path::Path::new("")), real_file(place));
    let (Ok(base), Ok(url)) = (Url::from_directory_path(&here), Url::from_file_path(&file)) else {
        return page.name.to_owned();
    };
    match base.make_relative(&url) {
        Some(path) if file.starts_with(&here) => {
            // A colon in a first name would make a scheme of it.
            let first = path.split('/').next().unwrap_or_default();
            if first.contains(':') {
                format!("./{path}")
            } else {
                path
            }
        }
        _ => url.to_string(),
    }
}

/// A finding as a result.
pub(super) fn result(page: &Page<'_>, uri: &str, finding: &Finding, licensed: bool) -> String {
    let related: Vec<Value> = finding
        .related
        .iter()
        .enumerate()
        .map(|(i, related)| {
            let mut place = location(page, uri, related.span);
            let score = &page.checked.reading.score;
            place["id"] = json!(i);
            place["message"] = json!({"text": related_label(score, finding, related)});
            place["logicalLocations"] = music(page, Some(related.place), &[related.voice]);
            place
        })
        .collect();
    let mut place = location(page, uri, finding.span);
    if finding.place.is_some() || !finding.voices.is_empty() {
        place["logicalLocations"] = music(page, finding.place, &finding.voices);
    }
    let entry = known::Entry::of("", page.text, page.checked, finding);
    let mut result = json!({
        "ruleId": finding.rule,
        "level": level(finding.severity),
        "message": {"text": finding.message},
        "locations": [place],
        "partialFingerprints": {"notes/v1": entry.fingerprint()},
    });
    if !related.is_empty() {
        result["relatedLocations"] = json!(related);
    }
    if let Some(mend) = writing::mend(page.checked, page.text, finding) {
        let replacements: Vec<Value> = mend.edits.iter().map(|e| replacement(page, e)).collect();
        result["fixes"] = json!([{
            "description": {"text": mend.title},
            "artifactChanges": [{"artifactLocation": {"uri": uri}, "replacements": replacements}],
        }]);
    }
    if licensed {
        // Where one result says whether it is suppressed, all must.
        result["suppressions"] = suppressions(page, finding);
    }
    result.to_string()
}

const fn level(severity: Severity) -> &'static str {
    match severity {
        Severity::Fault => "error",
        Severity::Weakness => "warning",
        Severity::Remark => "note",
    }
}

fn location(page: &Page<'_>, uri: &str, span: Option<Span>) -> Value {
    let mut place = json!({"artifactLocation": {"uri": uri}});
    if let Some(span) = span {
        place["region"] = region(page, span);
    }
    json!({"physicalLocation": place})
}

fn region(page: &Page<'_>, span: Span) -> Value {
    let (line, column) = page.lines.position(span.start as usize);
    let (end_line, end_column) = page.lines.position(span.end as usize);
    json!({
        "startLine": line,
        "startColumn": column,
        "endLine": end_line,
        "endColumn": end_column,
    })
}

/// The place in the music: its bar, its beat, its voices.
fn music(page: &Page<'_>, place: Option<BarPlace>, voices: &[usize]) -> Value {
    let mut places = Vec::new();
    if let Some(place) = place {
        let (bar, beat) = (
            format!("bar {}", place.bar),
            format!("beat {}", place.beat_text()),
        );
        let whole = format!("{bar}, {beat}");
        places.push(json!({"kind": "bar", "name": bar}));
        places.push(json!({"kind": "beat", "name": beat, "fullyQualifiedName": whole}));
    }
    let label = |&voice: &usize| json!({"kind": "voice", "name": page.label(voice)});
    places.extend(voices.iter().map(label));
    json!(places)
}

fn replacement(page: &Page<'_>, edit: &Edit) -> Value {
    json!({
        "deletedRegion": region(page, edit.span),
        "insertedContent": {"text": edit.text},
    })
}

/// The licence of a finding, as SARIF says it; none is an empty list.
fn suppressions(page: &Page<'_>, finding: &Finding) -> Value {
    let Some(lifted) = &finding.licence else {
        return json!([]);
    };
    let headers = &page.checked.reading.licences;
    let here = lifted.mark.is_some() || headers.iter().any(|l| l.reason == lifted.reason);
    json!([{
        "kind": if here { "inSource" } else { "external" },
        "status": "accepted",
        "justification": lifted.reason,
    }])
}
