//! Marks drawn under the notes in comments: how rule pages, cases and demo scores say what is to be
//! found where.

use crate::chars::is_blank;

/// A mark drawn under the notes in a comment: `//   ^^^ some words`.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct DrawnMark {
    /// Line of the comment, from 1.
    pub line: usize,
    /// Column of the first caret in Unicode scalars, from 0.
    pub column: usize,
    /// How many carets.
    pub width: usize,
    /// The words after them, trimmed.
    pub text: String,
}

/// The marks drawn in the comment lines of a text: only blanks stand between the `//` and the
/// carets.
#[must_use]
pub fn drawn_marks(text: &str) -> Vec<DrawnMark> {
    let mut found = Vec::new();
    for (number, line) in text.lines().enumerate() {
        let line = line.strip_prefix('\u{feff}').unwrap_or(line);
        let Some(after) = line.trim_start_matches(is_blank).strip_prefix("//") else {
            continue;
        };
        let drawn = after.trim_start_matches(is_blank);
        let width = drawn.len() - drawn.trim_start_matches('^').len();
        if width == 0 {
            continue;
        }
        let column = line.chars().count() - drawn.chars().count();
        found.push(DrawnMark {
            line: number + 1,
            column,
            width,
            text: drawn[width..].trim().to_owned(),
        });
    }
    found
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn marks_are_found_where_they_are_drawn() {
        let text = "\u{feff}S | D♯5 E |\r\n//     ^^^ parallel fifths: S and B \r\n\t// ^\n// no ^ mark\nS | G4 | // ^ no line of its own\n";
        let mark = |line, column, width, text: &str| DrawnMark {
            line,
            column,
            width,
            text: text.to_owned(),
        };
        assert_eq!(
            drawn_marks(text),
            [mark(2, 7, 3, "parallel fifths: S and B"), mark(3, 4, 1, "")]
        );
    }
}
