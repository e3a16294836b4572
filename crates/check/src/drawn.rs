//! Expectations drawn under the notes: how rule pages and demo scores state their findings.
//!
//! A comment line of carets and words, `//     ^ parallel fifths: S and B`, stands under the row
//! whose note it means; the severity follows in brackets where it is not a fault, and `licensed`
//! where a licence lifts it.

use partwright_rules::Severity;
use partwright_sheet::{Lines, drawn_marks};

use crate::{Checked, Finding};

/// The differences between what is drawn in a sheet and what was found, one a line, in words.
/// With a rule's id only that rule's findings are compared.
#[must_use]
pub fn unlike_drawn(text: &str, checked: &Checked, rule: Option<&str>) -> Vec<String> {
    let lines = Lines::of(text);
    let rows: Vec<&str> = text.lines().collect();
    let mut found: Vec<(usize, usize, String)> = checked
        .findings
        .iter()
        .filter(|finding| rule.is_none_or(|id| id == finding.rule))
        .map(|finding| {
            let start = finding.span.map_or(0, |span| span.start as usize);
            let (line, column) = lines.position(start);
            (line, column, words(finding, checked))
        })
        .collect();
    let mut unlike = Vec::new();
    for mark in drawn_marks(text) {
        // A mark belongs to the rows of its own system that stand above it.
        let above = rows
            .iter()
            .take(mark.line)
            .rev()
            .take_while(|row| !row.trim().is_empty())
            .count();
        let first = mark.line - above;
        let place = found.iter().position(|(line, column, words)| {
            (first..=mark.line).contains(line) && *column == mark.column + 1 && *words == mark.text
        });
        match place {
            Some(index) => drop(found.remove(index)),
            None => unlike.push(format!(
                "line {}: drawn, not found: {}",
                mark.line, mark.text
            )),
        }
    }
    unlike.extend(found.into_iter().map(|(line, column, words)| {
        format!("line {line}, column {column}: found, not drawn: {words}")
    }));
    unlike
}

/// `parallel fifths (weakness): S and B`.
fn words(finding: &Finding, checked: &Checked) -> String {
    let name = finding.rule.replace('-', " ");
    let severity = match finding.severity {
        _ if finding.licence.is_some() => " (licensed)".to_owned(),
        Severity::Fault => String::new(),
        other => format!(" ({other})"),
    };
    let label = |v: &usize| {
        checked
            .reading
            .score
            .voices
            .get(*v)
            .map(|voice| voice.label.clone())
    };
    let labels: Vec<String> = finding.voices.iter().filter_map(label).collect();
    if labels.is_empty() {
        format!("{name}{severity}")
    } else {
        format!("{name}{severity}: {}", labels.join(" and "))
    }
}
