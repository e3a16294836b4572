//! Licences as edits: one granted, one removed.

use std::collections::HashSet;

use partwright_check::{Checked, Finding};
use partwright_rules::family_of;
use partwright_sheet::{Edit, Span};

use crate::lines::{Kind, line_at};

/// What stands for the reason until the user has typed one.
pub(crate) const WHY: &str = "why";

/// A licence to be granted.
pub(crate) struct Grant {
    /// The mark on the note, and the footnote.
    pub(crate) edits: Vec<Edit>,
    /// Where the reason will stand once the edits are made, as bytes of the new text.
    pub(crate) reason: Span,
}

/// The edits that license a finding: a fresh mark on its part, and a footnote under its system.
/// `None` where there is no part to mark, and for what is written badly.
pub(crate) fn grant(
    checked: &Checked,
    text: &str,
    finding: &Finding,
    mark: impl FnOnce() -> String,
) -> Option<Grant> {
    let part = finding.span?;
    let system = checked.reading.system_at(part.start as usize)?;
    let written = text
        .get(part.range())
        .filter(|w| !w.is_empty() && *w != "?")?;
    if family_of(finding.rule) == Some("writing") || written.contains(char::is_whitespace) {
        return None;
    }
    let mark = mark();
    let (at, before, after) = footnote_place(text, system.end as usize);
    let line = format!("*{mark} licence {}: ", finding.rule);
    let on_part = format!("*{mark}");
    let reason = at + on_part.len() + before.len() + line.len();
    let insert = |at: usize, text: String| Edit {
        span: Span::new(at, at),
        text,
    };
    Some(Grant {
        reason: Span::new(reason, reason + WHY.len()),
        edits: vec![
            insert(part.end as usize, on_part),
            insert(at, format!("{before}{line}{WHY}{after}")),
        ],
    })
}

/// The first of `a`, `b`, … `z`, `aa`, … that stands behind no asterisk in the text.
pub(crate) fn fresh_mark(text: &str) -> String {
    let behind = text.match_indices('*').filter_map(|(at, _)| {
        let rest = text.get(at + 1..)?;
        let end = rest.find(|c: char| !c.is_ascii_alphabetic());
        rest.get(..end.unwrap_or(rest.len()))
    });
    let taken: HashSet<&str> = behind.collect();
    // One of so many is free.
    (0..=taken.len())
        .map(letters)
        .find(|mark| !taken.contains(mark.as_str()))
        .unwrap_or_default()
}

fn letters(mut number: usize) -> String {
    let mut word = Vec::new();
    loop {
        word.insert(0, b'a' + u8::try_from(number % 26).unwrap_or(0));
        match (number / 26).checked_sub(1) {
            Some(rest) => number = rest,
            None => return String::from_utf8(word).unwrap_or_default(),
        }
    }
}

/// Where a footnote goes, with what stands before and behind it: under the system's last row and
/// the comments and footnotes that follow it directly.
fn footnote_place(text: &str, system_end: usize) -> (usize, &str, &str) {
    let end = |from: usize| -> (usize, &str) {
        let rest = text.get(from..).unwrap_or_default();
        if rest.starts_with("\r\n") {
            (from + 2, "\r\n")
        } else if rest.starts_with('\n') {
            (from + 1, "\n")
        } else {
            (from, "")
        }
    };
    let mut at = line_at(text, system_end).span.end;
    let usual = if text.contains("\r\n") { "\r\n" } else { "\n" };
    loop {
        let (next, line_end) = end(at);
        if line_end.is_empty() {
            return (at, usual, "");
        }
        let line = line_at(text, next);
        let comment = line.kind == Kind::Empty && line.comment < line.span.end;
        if next == text.len() || !(comment || line.kind == Kind::Footnote) {
            return (next, "", line_end);
        }
        at = line.span.end;
    }
}

/// The edits that remove an idle licence: its marks and its footnote, or its header.
pub(crate) fn remove(checked: &Checked, text: &str, finding: &Finding) -> Option<Vec<Edit>> {
    let at = finding.span?;
    let reading = &checked.reading;
    let cut = |span: Span| Edit {
        span,
        text: String::new(),
    };
    let header = reading
        .licences
        .iter()
        .find(|licence| licence.span.start <= at.start && at.end <= licence.span.end);
    if let Some(licence) = header {
        return Some(vec![cut(whole_line(text, licence.span.start as usize))]);
    }
    let name = reading
        .marks
        .iter()
        .find(|mark| mark.span == at)
        .map(|mark| mark.name.as_str())
        .or_else(|| {
            let mut notes = reading.footnotes.iter();
            let note = notes.find(|note| note.mark_span == at)?;
            Some(note.mark.as_str())
        })?;
    let marks = reading.marks.iter().filter(|mark| mark.name == name);
    let notes = reading.footnotes.iter().filter(|note| note.mark == name);
    let mut edits: Vec<Edit> = marks.map(|mark| cut(mark.span)).collect();
    edits.extend(notes.map(|note| cut(whole_line(text, note.span.start as usize))));
    Some(edits)
}

/// The line around an offset with its end; where it is the last one, with the end before it.
fn whole_line(text: &str, offset: usize) -> Span {
    let line = line_at(text, offset).span;
    let rest = text.get(line.end..).unwrap_or_default();
    let end = rest.find('\n').map(|at| line.end + at + 1);
    match end {
        Some(end) => Span::new(line.start, end),
        None => {
            let before = text.get(..line.start).unwrap_or_default();
            let before = before.strip_suffix('\n').unwrap_or(before);
            let before = before.strip_suffix('\r').unwrap_or(before);
            Span::new(before.len(), line.end)
        }
    }
}

#[cfg(test)]
mod tests {
    use partwright_check::Wishes;
    use partwright_sheet::apply;

    use super::*;

    fn granted(text: &str) -> String {
        let checked = Checked::text(text, &Wishes::default());
        let mut open = checked.open();
        let finding = open.find(|f| f.rule == "parallel-fifths").unwrap();
        let grant = grant(&checked, text, finding, || fresh_mark(text)).unwrap();
        let new = apply(text, &grant.edits);
        assert_eq!(&new[grant.reason.range()], WHY);
        new
    }

    #[test]
    fn a_licence_is_a_mark_and_a_footnote() {
        assert_eq!(
            granted("S | D5 E^ |\nB | G3 A |\n\nS | G4 |\n"),
            "S | D5 E*a^ |\nB | G3 A |\n*a licence parallel-fifths: why\n\nS | G4 |\n"
        );
        assert_eq!(
            granted("S | D5 E |\r\nB | G3 A |"),
            "S | D5 E*a |\r\nB | G3 A |\r\n*a licence parallel-fifths: why"
        );
        let marked =
            "S | D5*a E |\nB | G3 A |\n//     ^\n*a licence line: so\n*c licence line: so\n";
        assert_eq!(
            granted(marked),
            "S | D5*a E*b |\nB | G3 A |\n//     ^\n*a licence line: so\n*c licence line: so\n*b licence parallel-fifths: why\n"
        );
    }

    #[test]
    fn marks_go_on_behind_z() {
        let words: Vec<String> = [0, 25, 26, 27, 51, 52, 701, 702].map(letters).into();
        assert_eq!(words, ["a", "z", "aa", "ab", "az", "ba", "zz", "aaa"]);
    }

    #[test]
    fn an_idle_licence_goes_whole() {
        for (text, left) in [
            (
                "S | G4*a A*b |\n*b licence line: so\n*a licence line: so",
                "S | G4 A*b |\n*b licence line: so",
            ),
            ("licence spacing: so\r\nS | G4 A |\r\n", "S | G4 A |\r\n"),
        ] {
            let checked = Checked::text(text, &Wishes::default());
            let idle = checked.open().find(|f| f.rule == "licence-idle").unwrap();
            let edits = remove(&checked, text, idle).unwrap();
            assert_eq!(apply(text, &edits), left);
        }
    }
}
