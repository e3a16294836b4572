//! Which characters are blanks, and where words and comments end.

use std::borrow::Cow;

use crate::Span;

/// Whether a character is a blank: a space, a tab, or any other of category Zs (no-break and wide
/// blanks). A stray carriage return is one too.
pub(crate) const fn is_blank(c: char) -> bool {
    matches!(
        c,
        ' ' | '\t' | '\r' | '\u{a0}' | '\u{1680}' | '\u{2000}'
            ..='\u{200a}' | '\u{202f}' | '\u{205f}' | '\u{3000}'
    )
}

/// Length in bytes of the blank that starts at `at`, 0 if none does.
pub(crate) fn blank_at(text: &[u8], at: usize) -> usize {
    match text.get(at) {
        Some(b' ' | b'\t' | b'\r') => 1,
        Some(b) if *b < 0x80 => 0,
        // The blanks beyond ASCII, in UTF-8.
        Some(0xc2) if text.get(at + 1) == Some(&0xa0) => 2,
        Some(0xe1) if text.get(at + 1..at + 3) == Some(&[0x9a, 0x80]) => 3,
        Some(0xe2) => match text.get(at + 1..at + 3) {
            Some([0x80, 0x80..=0x8a | 0xaf] | [0x81, 0x9f]) => 3,
            _ => 0,
        },
        Some(0xe3) if text.get(at + 1..at + 3) == Some(&[0x80, 0x80]) => 3,
        _ => 0,
    }
}

/// The first offset from `at` on at which no blank stands.
pub(crate) fn after_blanks(text: &[u8], mut at: usize) -> usize {
    loop {
        match blank_at(text, at) {
            0 => return at,
            n => at += n,
        }
    }
}

/// The first offset from `at` on at which a blank stands, or the end.
pub(crate) fn word_end(text: &[u8], mut at: usize) -> usize {
    while at < text.len() && blank_at(text, at) == 0 {
        at += 1;
    }
    at
}

/// Whether a comment begins at `at`, given that a blank or the start of the line stands before it.
pub(crate) fn comment_at(text: &[u8], at: usize) -> bool {
    text.get(at..at + 2) == Some(b"//")
}

/// A word of a line with its place.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) struct Word<'a> {
    /// Its characters.
    pub(crate) text: &'a str,
    /// Where it stands.
    pub(crate) span: Span,
}

/// The words from `from` to `to`, up to a comment.
pub(crate) fn words(text: &str, from: usize, to: usize) -> impl Iterator<Item = Word<'_>> {
    let bytes = text.as_bytes().get(..to).unwrap_or_default();
    let mut at = from;
    std::iter::from_fn(move || {
        let start = after_blanks(bytes, at);
        if start >= bytes.len() || comment_at(bytes, start) {
            at = bytes.len();
            return None;
        }
        let end = word_end(bytes, start);
        at = end;
        Some(Word {
            text: text.get(start..end).unwrap_or_default(),
            span: Span::new(start, end),
        })
    })
}

/// Where free text from `from` to `to` begins and ends, without the blanks and the comment about
/// it. A blank behind a backslash is a character like another.
pub(crate) fn free_text(text: &str, from: usize, to: usize) -> Span {
    let bytes = text.as_bytes().get(..to).unwrap_or_default();
    let start = after_blanks(bytes, from);
    let (mut at, mut end) = (start, start);
    while at < bytes.len() && !comment_at(bytes, at) {
        while at < bytes.len() && blank_at(bytes, at) == 0 {
            at += 1;
            if bytes.get(at - 1) == Some(&b'\\') && at < bytes.len() {
                at += blank_at(bytes, at).max(1);
            }
        }
        end = at;
        at = after_blanks(bytes, at);
    }
    if end == start {
        return Span::new(from, from);
    }
    Span::new(start, end)
}

/// Free text with its escapes resolved, and whether it ends in a backslash that makes nothing
/// plain.
pub(crate) fn plain(text: &str) -> (Cow<'_, str>, bool) {
    if !text.contains('\\') {
        return (Cow::Borrowed(text), false);
    }
    let mut out = String::with_capacity(text.len());
    let mut escaped = false;
    for c in text.chars() {
        if c == '\\' && !escaped {
            escaped = true;
        } else {
            out.push(c);
            escaped = false;
        }
    }
    (
        Cow::Owned(out.trim_end_matches(is_blank).to_owned()),
        escaped,
    )
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn blanks_are_the_same_as_bytes_and_as_characters() {
        for c in (0..=0x3_0000).filter_map(char::from_u32) {
            let mut buffer = [0; 4];
            let text = c.encode_utf8(&mut buffer);
            let expected = if is_blank(c) { c.len_utf8() } else { 0 };
            assert_eq!(blank_at(text.as_bytes(), 0), expected, "{c:?}");
        }
    }

    #[test]
    fn words_stop_at_a_comment() {
        let line = " key\u{a0}G  major//x // major";
        let found: Vec<&str> = words(line, 0, line.len()).map(|w| w.text).collect();
        assert_eq!(found, ["key", "G", "major//x"]);
        assert_eq!(free_text(line, 4, line.len()).range(), 6..17);
        let line = "title  Quay\\  // lamps\\ // dusk";
        assert_eq!(free_text(line, 5, line.len()).range(), 7..13);
        assert_eq!(free_text(line, 13, line.len()).range(), 13..13);
        assert_eq!(free_text(line, 16, line.len()).range(), 17..31);
    }
}
