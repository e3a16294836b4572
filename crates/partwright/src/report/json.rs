//! JSON Lines: one object a finding, for programs.

use partwright_check::{Finding, Lifted, Related};
use partwright_score::{BarPlace, show_time};
use partwright_sheet::Span;
use serde::Serialize;
use serde_json::json;

use super::Page;

/// A finding. Fractions are text, exact; lines and columns count from 1, columns in Unicode
/// scalar values.
#[derive(Serialize)]
struct Line<'a> {
    path: &'a str,
    rule: &'a str,
    severity: &'a str,
    bar: Option<String>,
    beat: Option<String>,
    onset: Option<String>,
    voices: Vec<&'a str>,
    message: &'a str,
    start: Option<Position>,
    end: Option<Position>,
    related: Vec<Other<'a>>,
    licence: Option<Licence<'a>>,
}

/// A place in the text.
#[derive(Serialize)]
struct Position {
    line: usize,
    column: usize,
}

/// Another note that belongs to a finding.
#[derive(Serialize)]
struct Other<'a> {
    role: &'a str,
    voice: &'a str,
    bar: String,
    beat: String,
    start: Option<Position>,
    end: Option<Position>,
}

/// The licence that lifts it; the mark is null for one of the whole sheet or of the house.
#[derive(Serialize)]
struct Licence<'a> {
    mark: Option<&'a str>,
    reason: &'a str,
}

impl<'a> Licence<'a> {
    fn of(lifted: &'a Lifted) -> Licence<'a> {
        Licence {
            mark: lifted.mark.as_deref(),
            reason: &lifted.reason,
        }
    }
}

/// A finding as one line of JSON, with its line end.
pub(crate) fn line(page: &Page<'_>, finding: &Finding) -> String {
    let (start, end) = positions(page, finding.span);
    let line = Line {
        path: page.name,
        rule: finding.rule,
        severity: finding.severity.word(),
        bar: finding.place.map(bar),
        beat: finding.place.map(|place| place.beat_text()),
        onset: finding.at.map(show_time),
        voices: finding.voices.iter().map(|&v| page.label(v)).collect(),
        message: &finding.message,
        start,
        end,
        related: finding
            .related
            .iter()
            .map(|related| other(page, related))
            .collect(),
        licence: finding.licence.as_ref().map(Licence::of),
    };
    // Nothing in it can fail; should it, the program that reads must see it.
    serde_json::to_string(&line)
        .unwrap_or_else(|error| json!({"path": page.name, "error": error.to_string()}).to_string())
        + "\n"
}

fn other<'a>(page: &Page<'a>, related: &Related) -> Other<'a> {
    let (start, end) = positions(page, related.span);
    Other {
        role: related.role.word(),
        voice: page.label(related.voice),
        bar: bar(related.place),
        beat: related.place.beat_text(),
        start,
        end,
    }
}

fn bar(place: BarPlace) -> String {
    place.bar.to_string()
}

fn positions(page: &Page<'_>, span: Option<Span>) -> (Option<Position>, Option<Position>) {
    let position = |offset: u32| {
        let (line, column) = page.lines.position(offset as usize);
        Position { line, column }
    };
    (
        span.map(|span| position(span.start)),
        span.map(|span| position(span.end)),
    )
}
