//! Mends of the writing: what is heard stays as it is.

use std::ops::Range;

use partwright_check::{Checked, Finding};
use partwright_sheet::{Edit, Span};

use crate::report::is_music_row;

/// A change of the text that removes a finding.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) struct Mend {
    /// What it does.
    pub(crate) title: String,
    /// The edits.
    pub(crate) edits: Vec<Edit>,
    /// Every note sounds as before: true of all but words that could not be read.
    pub(crate) silent: bool,
}

/// The one way to put right what a finding says of the writing; `None` where there is none, or
/// more than one that somebody must choose from.
pub(crate) fn mend(checked: &Checked, text: &str, finding: &Finding) -> Option<Mend> {
    if finding.licence.is_some() {
        return None;
    }
    match finding.rule {
        "octave-doubt" => figure(text, finding),
        "licence-idle" => idle_licence(checked, text, finding),
        "reading" => word(checked, text, finding),
        _ => None,
    }
}

/// The octave figure as it is read: the first of the readings on offer is the one in force.
fn figure(text: &str, finding: &Finding) -> Option<Mend> {
    let edit = finding.offers.first()?.edits.first()?;
    let figure = edit
        .text
        .strip_prefix(|_: char| true)
        .map(|_| edit.text.as_str())?;
    let figure = figure.get(figure.len() - 1..)?;
    let note = text.get(edit.span.range())?;
    let end = edit.span.end;
    Some(Mend {
        title: format!("Write {note}{figure}"),
        // The note's own letters stay: a sharp may be written in two ways.
        edits: vec![Edit {
            span: Span { start: end, end },
            text: figure.to_owned(),
        }],
        silent: true,
    })
}

/// A word outside the rows of notes, where just one can be meant.
fn word(checked: &Checked, text: &str, finding: &Finding) -> Option<Mend> {
    let [offer] = finding.offers.as_slice() else {
        return None;
    };
    let at = finding.span?.start as usize;
    if checked.reading.system_at(at).is_some() && is_music_row(text, at) {
        return None;
    }
    Some(Mend {
        title: offer.title.clone(),
        edits: offer.edits.clone(),
        silent: false,
    })
}

/// The licence that lifts nothing, with its marks.
fn idle_licence(checked: &Checked, text: &str, finding: &Finding) -> Option<Mend> {
    let reading = &checked.reading;
    let span = finding.span?;
    if let Some(mark) = reading.marks.iter().find(|mark| mark.span == span) {
        let name = &mark.name;
        let mut notes = reading.footnotes.iter().filter(|note| note.mark == *name);
        let (Some(note), None) = (notes.next(), notes.next()) else {
            return None;
        };
        let marks = reading.marks.iter().filter(|mark| mark.name == *name);
        let mut edits: Vec<Edit> = marks.map(|mark| removed(mark.span)).collect();
        edits.push(removed(whole_line(text, note.span.range())));
        edits.sort_by_key(|edit| edit.span);
        return Some(Mend {
            title: format!("Remove the licence *{name}"),
            edits,
            silent: true,
        });
    }
    let first = |rules: &[(String, Span)]| rules.first().map(|(_, span)| *span);
    let licence = reading
        .licences
        .iter()
        .find(|l| first(&l.rules) == Some(span))?;
    Some(Mend {
        title: "Remove this licence".to_owned(),
        edits: vec![removed(whole_line(text, licence.span.range()))],
        silent: true,
    })
}

fn removed(span: Span) -> Edit {
    Edit {
        span,
        text: String::new(),
    }
}

/// The whole line around a statement, with its end; without the comment that may follow. An empty
/// line that would be left over between others, or at the end, goes too.
fn whole_line(text: &str, statement: Range<usize>) -> Span {
    let before = text.get(..statement.start).unwrap_or_default();
    let after = text.get(statement.end..).unwrap_or_default();
    let mut start = before.rfind('\n').map_or(0, |end| end + 1);
    let line = after.find('\n').map_or(after, |end| &after[..end]);
    if !line.trim().is_empty() {
        let blanks = line.len() - line.trim_start().len();
        return Span::new(start, statement.end + blanks);
    }
    let end = statement.end + after.len().min(line.len() + 1);
    let above = text.get(..start).unwrap_or_default();
    let below = text.get(end..).unwrap_or_default();
    let empty = |line: Option<&str>| line.is_none_or(|line| line.trim().is_empty());
    let line_above = above.lines().next_back();
    if line_above.is_some_and(|line| line.trim().is_empty()) && empty(below.lines().next()) {
        let without = above.strip_suffix('\n').unwrap_or(above);
        start = without.rfind('\n').map_or(0, |end| end + 1);
    }
    Span::new(start, end)
}

#[cfg(test)]
mod tests {
    use super::*;
    use partwright_check::Wishes;
    use partwright_sheet::apply;

    /// The text with the one mend of each finding of a rule.
    fn mended(rule: &str, text: &str) -> String {
        let checked = Checked::text(text, &Wishes::default());
        let found = checked.findings.iter().filter(|f| f.rule == rule);
        let edits: Vec<Edit> = found
            .filter_map(|finding| mend(&checked, text, finding))
            .flat_map(|mend| mend.edits)
            .collect();
        apply(text, &edits)
    }

    #[test]
    fn octave_figures_are_written_as_they_are_read() {
        assert_eq!(
            mended("octave-doubt", "S | B4 C | C♯4 A♯^ |\n"),
            "S | B4 C4 | C♯4 A♯4^ |\n"
        );
    }

    #[test]
    fn idle_licences_go_with_their_marks() {
        let sheet = "S | D5*a C*a^ |\nB | G3 A |\n*a licence crossing: the weir\n\nS | C5 |\n";
        let without = "S | D5 C^ |\nB | G3 A |\n\nS | C5 |\n";
        assert_eq!(
            mended("licence-idle", &sheet.replace("*a^", "^*a")),
            without
        );
        // A comment stays, and no empty lines are left over.
        let sheet = "licence crossing: a // b\n\nS | D5*a*b |\n\n*a licence overlap: c // d\n\n*b licence spacing: e";
        assert_eq!(mended("licence-idle", sheet), "// b\n\nS | D5 |\n\n// d\n");
        let windows = "S | D5*a |\r\n\r\n*a licence overlap: c\r\n";
        assert_eq!(mended("licence-idle", windows), "S | D5 |\r\n");
    }

    #[test]
    fn one_right_word_is_written_and_notes_are_left_to_the_composer() {
        assert_eq!(
            mended("reading", "stlye motet\n\nS | C4 |\n"),
            "style motet\n\nS | C4 |\n"
        );
        let notes = "S | C4 BB4 H4 |\n";
        assert_eq!(mended("reading", notes), notes);
    }
}
