//! What was mended, as a unified diff.

use annotate_snippets::renderer::{AnsiColor, Style};
use similar::{ChangeTag, TextDiff};

use crate::prose::harmless;
use crate::report::{Plain, heading};

/// Lines around a change.
const CONTEXT: usize = 3;

/// How a diff is shown.
#[derive(Clone, Copy, Debug)]
pub(super) struct Look {
    pub(super) plain: Plain,
    /// It goes to a terminal, which nothing in a sheet may steer; elsewhere every byte counts.
    pub(super) terminal: bool,
}

impl Look {
    /// The difference between two texts of a sheet; empty where there is none.
    pub(super) fn diff(self, name: &str, before: &str, after: &str) -> String {
        let diff = TextDiff::from_lines(before, after);
        let mut text = String::new();
        let mut unified = diff.unified_diff();
        for hunk in unified.context_radius(CONTEXT).iter_hunks() {
            if text.is_empty() {
                for head in [format!("--- {name}"), format!("+++ {name}")] {
                    self.line(&mut text, heading(), &head);
                }
            }
            self.line(
                &mut text,
                AnsiColor::Cyan.on_default(),
                &hunk.header().to_string(),
            );
            for change in hunk.iter_changes() {
                let (sign, style) = match change.tag() {
                    ChangeTag::Delete => ('-', AnsiColor::Red.on_default()),
                    ChangeTag::Insert => ('+', AnsiColor::Green.on_default()),
                    ChangeTag::Equal => (' ', Style::new()),
                };
                let line = change.value();
                let ended = line.strip_suffix('\n');
                self.line(
                    &mut text,
                    style,
                    &format!("{sign}{}", ended.unwrap_or(line)),
                );
                if ended.is_none() {
                    text.push_str("\\ No newline at end of file\n");
                }
            }
        }
        text
    }

    fn line(self, text: &mut String, style: Style, line: &str) {
        let shown = if self.terminal {
            harmless(line)
        } else {
            line.into()
        };
        text.push_str(&self.plain.paint(style, &shown));
        text.push('\n');
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn diff(before: &str, after: &str, terminal: bool) -> String {
        let plain = Plain {
            width: 80,
            colour: false,
        };
        Look { plain, terminal }.diff("a.voices", before, after)
    }

    #[test]
    fn a_diff_has_its_context_and_tells_of_a_missing_line_end() {
        assert_eq!(diff("a\n", "a\n", false), "");
        let (before, after) = ("1\n2\n3\n4\n5\nB4 C", "1\n2\n3\n4\n5\nB4 C4");
        assert_eq!(
            diff(before, after, false),
            "--- a.voices\n+++ a.voices\n@@ -3,4 +3,4 @@\n 3\n 4\n 5\n-B4 C\n\\ No newline at end of file\n+B4 C4\n\\ No newline at end of file\n"
        );
    }

    #[test]
    fn bytes_are_kept_but_steer_no_terminal() {
        let (before, after) = ("B4 C\r\n", "B4 C4\u{1b}[2J\r\n");
        assert!(diff(before, after, false).contains("+B4 C4\u{1b}[2J\r\n"));
        assert!(!diff(before, after, true).contains(['\u{1b}', '\r']));
    }
}
