//! Lines: what each one is, told from its first word alone.

use crate::chars::{after_blanks, blank_at, comment_at};
use crate::parts::begins_like_a_part;

/// What a line is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum LineKind {
    /// Blanks only.
    Blank,
    /// A comment.
    Comment,
    /// `*mark …`.
    Footnote,
    /// A row.
    Row(RowKind),
    /// A header, a change, or a word that is none.
    Word(Header),
    /// `| …`: a row that forgot its label.
    Unlabelled,
}

/// What a row holds.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum RowKind {
    /// `LABEL | …`
    Music,
    /// `words LABEL … | …`
    Words,
    /// `harmony | …`
    Harmony,
    /// `figures | …`
    Figures,
}

/// The word a line that is no row begins with.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[allow(missing_docs)]
pub(crate) enum Header {
    Sheet,
    Title,
    Subtitle,
    By,
    Style,
    Key,
    Metre,
    Tempo,
    Equal,
    Licence,
    Voice,
    /// None of ours.
    Unknown,
}

/// Every word a line may begin with.
pub(crate) const HEADERS: [(&str, Header); 13] = [
    ("sheet", Header::Sheet),
    ("title", Header::Title),
    ("subtitle", Header::Subtitle),
    ("by", Header::By),
    ("style", Header::Style),
    ("key", Header::Key),
    ("metre", Header::Metre),
    ("meter", Header::Metre),
    ("tempo", Header::Tempo),
    ("equal", Header::Equal),
    ("licence", Header::Licence),
    ("license", Header::Licence),
    ("voice", Header::Voice),
];

impl Header {
    fn of(word: &str) -> Header {
        let found = HEADERS.iter().find(|(name, _)| *name == word);
        found.map_or(Header::Unknown, |(_, header)| *header)
    }

    /// Whether it may also stand between systems.
    pub(crate) const fn is_change(self) -> bool {
        matches!(self, Header::Key | Header::Metre | Header::Tempo)
    }
}

/// A line of the text, by byte offsets.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Line {
    /// Where it begins.
    pub(crate) start: usize,
    /// Where it ends, without its line end.
    pub(crate) end: usize,
    /// Where its first word begins.
    pub(crate) word: usize,
    /// Where its first word ends.
    pub(crate) word_end: usize,
    /// What it is.
    pub(crate) kind: LineKind,
}

/// The lines of a text from `from` on.
pub(crate) fn lines(text: &str, from: usize) -> impl Iterator<Item = Line> + '_ {
    let mut at = from;
    std::iter::from_fn(move || {
        let rest = text.get(at..)?;
        if rest.is_empty() {
            return None;
        }
        let length = rest.find('\n').unwrap_or(rest.len());
        let start = at;
        at = start + length + 1;
        let whole = rest.get(..length).unwrap_or_default();
        let end = start + whole.strip_suffix('\r').unwrap_or(whole).len();
        Some(line(text, start, end))
    })
}

fn line(text: &str, start: usize, end: usize) -> Line {
    let bytes = text.as_bytes().get(..end).unwrap_or_default();
    let word = after_blanks(bytes, start);
    let mut word_end = word;
    while word_end < end && bytes.get(word_end) != Some(&b'|') && blank_at(bytes, word_end) == 0 {
        word_end += 1;
    }
    let kind = match bytes.get(word) {
        None => LineKind::Blank,
        Some(b'/') if comment_at(bytes, word) => LineKind::Comment,
        Some(b'*') => LineKind::Footnote,
        Some(b'|') => LineKind::Unlabelled,
        Some(_) => named(text, word, word_end, end),
    };
    Line {
        start,
        end,
        word,
        word_end,
        kind,
    }
}

fn named(text: &str, word: usize, word_end: usize, end: usize) -> LineKind {
    let bytes = text.as_bytes().get(..end).unwrap_or_default();
    let name = text.get(word..word_end).unwrap_or_default();
    let next = after_blanks(bytes, word_end);
    let bar_follows = bytes.get(next) == Some(&b'|');
    match name {
        "words" => return LineKind::Row(RowKind::Words),
        "harmony" => return LineKind::Row(RowKind::Harmony),
        "figures" => return LineKind::Row(RowKind::Figures),
        _ if bar_follows => return LineKind::Row(RowKind::Music),
        _ => {}
    }
    let header = Header::of(name);
    // A row whose first bar line was forgotten is still a row: the voice is not lost.
    let forgotten = header == Header::Unknown
        && bytes.len() > next
        && is_label(name)
        && begins_like_a_part(bytes.get(next..).unwrap_or_default())
        && bytes.get(next..).is_some_and(|rest| rest.contains(&b'|'));
    if forgotten {
        LineKind::Row(RowKind::Music)
    } else {
        LineKind::Word(header)
    }
}

/// Words that cannot be labels: those of headers, rows, options, families and short rules.
const RESERVED: [&str; 14] = [
    "words", "harmony", "figures", "easy", "cantus", "species", "clef", "written", "doubles",
    "line", "motion", "sonority", "cadence", "range",
];
const RESERVED_RULES: [&str; 8] = [
    "writing", "reading", "spacing", "crossing", "overlap", "compass", "cambiata", "pedal",
];

/// Whether a word is shaped like a label: a letter and at most seven more letters or digits.
pub(crate) fn is_label(word: &str) -> bool {
    word.len() <= 8
        && word.starts_with(|c: char| c.is_ascii_alphabetic())
        && word.bytes().all(|b| b.is_ascii_alphanumeric())
}

/// Whether a word belongs to the notation and cannot be a label.
pub(crate) fn is_reserved(word: &str) -> bool {
    RESERVED.contains(&word)
        || RESERVED_RULES.contains(&word)
        || Header::of(word) != Header::Unknown
}

#[cfg(test)]
mod tests {
    use super::*;

    fn kinds(text: &str) -> Vec<LineKind> {
        lines(text, 0).map(|l| l.kind).collect()
    }

    #[test]
    fn the_first_word_tells_what_a_line_is() {
        assert_eq!(
            kinds(
                "title | x\r\n\r\nkey G major\n// c\n*a licence x: y\nS|\nS | G4\nwords S |\n|x\nS G4 |\nS G4"
            ),
            [
                LineKind::Row(RowKind::Music),
                LineKind::Blank,
                LineKind::Word(Header::Key),
                LineKind::Comment,
                LineKind::Footnote,
                LineKind::Row(RowKind::Music),
                LineKind::Row(RowKind::Music),
                LineKind::Row(RowKind::Words),
                LineKind::Unlabelled,
                LineKind::Row(RowKind::Music),
                LineKind::Word(Header::Unknown),
            ]
        );
    }

    #[test]
    fn labels() {
        for good in ["S", "s", "S1", "Lampmen1", "alto"] {
            assert!(is_label(good) && !is_reserved(good), "{good}");
        }
        for bad in ["", "1S", "S-1", "Lamplighter", "É"] {
            assert!(!is_label(bad), "{bad}");
        }
        for word in ["words", "key", "motion", "license"] {
            assert!(is_reserved(word), "{word}");
        }
    }
}
