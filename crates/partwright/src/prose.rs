//! Text in lines of a given width.

use std::borrow::Cow;

use textwrap::{Options, WordSplitter};
use unicode_width::{UnicodeWidthChar, UnicodeWidthStr};

/// Sets a text in lines of at most `width` columns, all but the first behind `indent` blanks; the
/// first line stands as if `indent` blanks were before it. Words are never split, and a line
/// break in the text stays one.
pub(crate) fn wrap(text: &str, width: usize, indent: usize) -> Vec<String> {
    // Breaks stand only at blanks: `D5–E5` and `parallel-fifths` are words.
    let options = Options::new(width.saturating_sub(indent).max(20))
        .break_words(false)
        .word_splitter(WordSplitter::NoHyphenation)
        .word_separator(textwrap::WordSeparator::AsciiSpace);
    textwrap::wrap(text, options)
        .into_iter()
        .map(|line| line.trim_end().to_owned())
        .collect()
}

/// The same as one text, every line behind `indent` blanks and ended.
pub(crate) fn block(text: &str, width: usize, indent: usize) -> String {
    let blanks = " ".repeat(indent);
    let line = |line: String| {
        if line.is_empty() {
            "\n".to_owned()
        } else {
            format!("{blanks}{line}\n")
        }
    };
    wrap(text, width, indent).into_iter().map(line).collect()
}

/// A text for a terminal: what would steer it, or turn the direction of writing, is shown and not
/// obeyed. Line breaks stay.
pub(crate) fn harmless(text: &str) -> Cow<'_, str> {
    let harmless = |c: char| if c == '\n' { c } else { harmless_char(c) };
    if text.chars().all(|c| harmless(c) == c) {
        return Cow::Borrowed(text);
    }
    Cow::Owned(text.chars().map(harmless).collect())
}

/// The same for a character; a tab or a line break is one that steers.
pub(crate) fn harmless_char(c: char) -> char {
    match c {
        '\t' => ' ',
        // The pictures of the control characters stand in their own order.
        '\0'..='\u{1f}' => char::from_u32(0x2400 + u32::from(c)).unwrap_or('\u{fffd}'),
        '\u{7f}' => '␡',
        '\u{80}'..='\u{9f}'
        | '\u{200b}'..='\u{200f}'
        | '\u{2028}'..='\u{202e}'
        | '\u{2060}'..='\u{2069}'
        | '\u{feff}' => '\u{fffd}',
        c => c,
    }
}

/// As much of a text as fits into some columns, with dots for the rest.
pub(crate) fn shortened(text: &str, width: usize) -> Cow<'_, str> {
    if text.width() <= width {
        return Cow::Borrowed(text);
    }
    let mut short = String::new();
    let mut columns = 1;
    for c in text.chars() {
        columns += c.width().unwrap_or(1);
        if columns > width {
            break;
        }
        short.push(c);
    }
    Cow::Owned(short + "…")
}

/// A number with its noun: `1 fault`, `2 weaknesses`.
pub(crate) fn count(number: usize, one: &str, many: &str) -> String {
    format!("{number} {}", if number == 1 { one } else { many })
}

/// Items in a row: `soprano, alto and bass`.
pub(crate) fn list(items: &[&str]) -> String {
    match items {
        [] => String::new(),
        [one] => (*one).to_owned(),
        [before @ .., last] => format!("{} and {last}", before.join(", ")),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn lines_keep_to_the_width_and_words_whole() {
        let text = "soprano and bass go from G3–D5 to A3–E5 in parallel-fifths ♯♯ 全音 and on";
        let lines = wrap(text, 30, 2);
        assert!(lines.iter().all(|line| line.width() <= 28), "{lines:?}");
        assert_eq!(lines.join(" "), text);
        assert_eq!(block("one\ntwo", 30, 2), "  one\n  two\n");
    }

    #[test]
    fn nothing_in_a_sheet_steers_the_terminal() {
        assert_eq!(
            harmless("\u{1b}[31mF♯4\u{202e}\0\u{7f}"),
            "␛[31mF♯4\u{fffd}␀␡"
        );
        assert_eq!(harmless("D5\tE5\nnext"), "D5 E5\nnext");
        assert_eq!(harmless("𝄪 and 全"), "𝄪 and 全");
    }

    #[test]
    fn what_is_too_long_ends_in_dots() {
        assert_eq!(shortened("Write G4.-.-", 12), "Write G4.-.-");
        assert_eq!(shortened("Write G4.-.-", 11), "Write G4.-…");
        assert_eq!(shortened("全音", 3), "全…");
    }

    #[test]
    fn numbers_and_lists_in_words() {
        assert_eq!(count(1, "weakness", "weaknesses"), "1 weakness");
        assert_eq!(count(0, "weakness", "weaknesses"), "0 weaknesses");
        assert_eq!(list(&["soprano", "alto", "bass"]), "soprano, alto and bass");
        assert_eq!(list(&["tenor"]), "tenor");
    }
}
