//! JSON Lines: one object a finding, for programs.

use partwright_check::{Finding, Related};
use partwright_score::{BarPlace, show_time};
use partwright_sheet::Span;
use serde::Serialize;

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
    /// Nothing is licensed yet.
    licence: Option<()>,
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

/// A finding as one line of JSON, with its line end.
pub(crate) fn json(page: &Page<'_>, finding: &Finding) -> Result<String, serde_json::Error> {
    let (start, end) = positions(page, finding.span);
    let line = Line {
        path: page.name,
        rule: finding.rule,
        severity: finding.severity.word(),
        bar: finding.place.map(bar),
        beat: finding.place.map(|place| place.beat_text()),
        onset: finding.at.map(show_time),
        voices: finding
            .voices
            .iter()
            .map(|&voice| label(page, voice))
            .collect(),
        message: &finding.message,
        start,
        end,
        related: finding
            .related
            .iter()
            .map(|related| other(page, related))
            .collect(),
        licence: None,
    };
    serde_json::to_string(&line).map(|text| text + "\n")
}

fn other<'a>(page: &Page<'a>, related: &Related) -> Other<'a> {
    let (start, end) = positions(page, related.span);
    Other {
        role: related.role.word(),
        voice: label(page, related.voice),
        bar: bar(related.place),
        beat: related.place.beat_text(),
        start,
        end,
    }
}

fn bar(place: BarPlace) -> String {
    place.bar.to_string()
}

fn label<'a>(page: &Page<'a>, voice: usize) -> &'a str {
    page.checked
        .reading
        .score
        .voices
        .get(voice)
        .map_or("", |voice| &voice.label)
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
