//! Headers, voice lines, and the changes between systems.

use std::fmt::Write;

use partwright_score::{Change, Key, MOST_VOICES, Score, Time, Voice, ZERO};

use super::Heading;
use super::left::Left;
use super::measures::Measure;
use super::music::tame;
use super::names::Label;
use crate::chars::{Word, is_blank, words};
use crate::problem::Problem;
use crate::reading::Tempo;
use crate::span::Span;
use crate::{headers, voices};

/// What is stated before a measure.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub(super) struct Stated {
    pub(super) key: Option<String>,
    pub(super) metre: Option<String>,
    pub(super) tempo: Option<String>,
}

impl Stated {
    /// Whether nothing is.
    pub(super) fn is_nothing(&self) -> bool {
        self.key.is_none() && self.metre.is_none() && self.tempo.is_none()
    }

    /// Its lines.
    pub(super) fn lines(&self, out: &mut String) {
        let lines = [
            ("key", &self.key),
            ("metre", &self.metre),
            ("tempo", &self.tempo),
        ];
        for (word, value) in lines {
            line(out, word, value.as_deref());
        }
    }
}

fn line(out: &mut String, word: &str, value: Option<&str>) {
    if let Some(value) = value {
        // Writing to a string does not fail.
        let _ = writeln!(out, "{word:<7} {value}");
    }
}

/// What is stated before each measure; before the first, in the headers.
pub(super) fn changes(
    score: &Score,
    heading: &Heading,
    measures: &[Measure],
    left: &mut Left<'_>,
) -> Vec<Stated> {
    let mut stated: Vec<Stated> = vec![Stated::default(); measures.len().max(1)];
    let mut now = None;
    for (measure, stated) in measures.iter().zip(&mut stated) {
        if measure.restated || now != Some(&measure.metre) {
            stated.metre = Some(measure.metre.to_string());
            now = Some(&measure.metre);
        }
    }
    for change in &score.keys {
        if let Some(text) = key(&change.value, change.from, left)
            && let Some(index) = place(change, "Keys", measures, left)
            && let Some(stated) = stated.get_mut(index)
        {
            stated.key = Some(text);
        }
    }
    let cells = cells_change(score, measures);
    for change in &heading.tempos {
        let Some(index) = place(change, "Tempos", measures, left) else {
            continue;
        };
        let cell = score
            .bar_at(tame(change.from))
            .and_then(|i| score.bars.get(i));
        let cell = cell.and_then(|bar| score.metres.get(bar.metre as usize));
        let unit = change.value.unit;
        let unit = unit.or_else(|| cell.filter(|_| cells).map(|metre| metre.cell()));
        let meant = Tempo {
            unit,
            ..change.value
        };
        let text = match unit {
            Some(unit) => format!("{}/{} {}", unit.numer(), unit.denom(), meant.speed),
            None => meant.speed.to_string(),
        };
        if !reads_as(&text, headers::tempo, |read| *read == meant) {
            let what = "Tempos are 1 to 999 of a plain note value: others are left out";
            left.at(what, None, tame(change.from));
        } else if let Some(stated) = stated.get_mut(index) {
            stated.tempo = Some(text);
        }
    }
    stated
}

/// Whether some cell is another than the score's, so that a tempo must name its unit.
fn cells_change(score: &Score, measures: &[Measure]) -> bool {
    measures.iter().any(|measure| {
        let bar = score.bar_at(measure.from).and_then(|i| score.bars.get(i));
        let metre = bar.and_then(|bar| score.metres.get(bar.metre as usize));
        metre.is_none_or(|metre| metre.cell() != measure.metre.cell())
    })
}

/// The measure before which a change stands, by index.
fn place<T>(
    change: &Change<T>,
    what: &str,
    measures: &[Measure],
    left: &mut Left<'_>,
) -> Option<usize> {
    let at = tame(change.from).max(ZERO);
    let index = measures.partition_point(|measure| measure.from < at);
    match measures.get(index) {
        Some(measure) if measure.from == at => Some(index),
        Some(_) => {
            let what = format!("{what} change at bar lines: a change inside a bar waits for it");
            left.at(&what, None, at);
            Some(index)
        }
        // A score without bars has one place.
        None if at == ZERO => Some(0),
        None => {
            left.at(
                &format!("{what} that change at the end are left out"),
                None,
                at,
            );
            None
        }
    }
}

/// Whether the reader of sheets takes a value for what is meant.
fn reads_as<T>(
    text: &str,
    reader: fn(&mut Vec<Problem>, Span, &[Word<'_>]) -> Option<T>,
    meant: impl Fn(&T) -> bool,
) -> bool {
    let mut problems = Vec::new();
    let value: Vec<Word<'_>> = words(text, 0, text.len()).collect();
    let read = reader(&mut problems, Span::new(0, 0), &value);
    problems.is_empty() && read.as_ref().is_some_and(meant)
}

/// The value of a `key` line.
fn key(key: &Key, at: Time, left: &mut Left<'_>) -> Option<String> {
    let class = |key: &Key| match key {
        Key::Of { tonic, .. } => Some((tonic.letter(), tonic.sign)),
        Key::None => None,
    };
    let same = |text: &str| reads_as(text, headers::key, |read| class(read) == class(key));
    let text = key.to_string();
    if same(&text) {
        return Some(text);
    }
    // A signature without signs, or with more than seven.
    let plain = match *key {
        Key::Of { tonic, mode, .. } => Key::Of {
            tonic,
            mode,
            signature: None,
        },
        Key::None => Key::None,
    };
    let plain = Some(plain.to_string()).filter(|plain| same(plain));
    let what = match plain {
        Some(_) => "Signatures have one to seven signs: others are left out",
        None => "Keys on a tonic with two signs are left out",
    };
    left.at(what, None, at);
    plain
}

/// The headers and the voice lines.
pub(super) fn headers(
    score: &Score,
    heading: &Heading,
    labels: &[Label],
    changes: &[Stated],
    left: &mut Left<'_>,
) -> String {
    let mut out = String::new();
    let texts = [
        ("title", &heading.title),
        ("subtitle", &heading.subtitle),
        ("by", &heading.by),
    ];
    for (word, text) in texts {
        let text = text.as_deref().map(free_text);
        line(&mut out, word, text.as_deref().filter(|t| !t.is_empty()));
    }
    let lawful = |style: &&String| {
        style.starts_with(|c: char| c.is_ascii_alphabetic())
            && style
                .bytes()
                .all(|b| b.is_ascii_alphanumeric() || b == b'-')
    };
    let style = score.style.as_ref().filter(lawful);
    if style.is_none()
        && let Some(style) = &score.style
    {
        left.tell(format!("The style {style:?} has no lawful name."));
    }
    line(&mut out, "style", style.map(String::as_str));
    if let Some(first) = changes.first() {
        first.lines(&mut out);
    }
    equal(&mut out, score, labels, left);
    declarations(&mut out, score, labels, left);
    out
}

/// A text in one line, the characters that mean something made plain.
fn free_text(text: &str) -> String {
    let line: String = text
        .chars()
        .map(|c| if matches!(c, '\r' | '\n') { ' ' } else { c })
        .collect();
    let line = line.trim_matches(is_blank);
    let mut out = String::with_capacity(line.len());
    let mut after_blank = true;
    for (i, c) in line.char_indices() {
        let rest = line.get(i..).unwrap_or_default();
        let comment = after_blank && rest.starts_with("//");
        if c == '\\' || comment || (i == 0 && c == '|') {
            out.push('\\');
        }
        out.push(c);
        after_blank = is_blank(c);
    }
    out
}

fn equal(out: &mut String, score: &Score, labels: &[Label], left: &mut Left<'_>) {
    let mut written = false;
    for group in &score.equal {
        let mut names: Vec<&str> = Vec::new();
        for voice in group {
            if let Some(label) = labels.get(*voice).filter(|_| *voice < MOST_VOICES)
                && !names.contains(&label.label.as_str())
            {
                names.push(&label.label);
            }
        }
        if names.len() < 2 || written {
            left.tell(format!(
                "A sheet has one group of equal voices: {} is left out.",
                names.join(" ")
            ));
            continue;
        }
        line(out, "equal", Some(&names.join(" ")));
        written = true;
    }
}

fn declarations(out: &mut String, score: &Score, labels: &[Label], left: &mut Left<'_>) {
    if labels.is_empty() {
        return;
    }
    if !out.is_empty() {
        out.push('\n');
    }
    let labels = labels.get(..MOST_VOICES).unwrap_or(labels);
    let mut doubled = vec![None; labels.len()];
    for (index, (voice, label)) in score.voices.iter().zip(labels).enumerate() {
        let mut declared = format!("voice {}", label.label);
        if label.kind.ordinary.is_some() {
            let _ = write!(declared, " {}", label.kind.name);
        }
        for option in options(voice) {
            let line = format!("{} {option}", label.label);
            if reads_as(&line, declared_by, |()| true) {
                let _ = write!(declared, " {option}");
            } else {
                left.tell(format!("The voice {} is not {option}.", label.label));
            }
        }
        if let Some(other) = voice.doubles {
            let target = labels
                .get(other)
                .filter(|_| !leads_to(&doubled, other, index));
            if let (Some(target), Some(place)) = (target, doubled.get_mut(index)) {
                *place = Some(other);
                let _ = write!(declared, " doubles {}", target.label);
            } else {
                left.tell(format!("The voice {} doubles no other.", label.label));
            }
        }
        if let Some(name) = &label.name {
            let _ = write!(declared, " // {name}");
        }
        let _ = writeln!(out, "{declared}");
    }
}

/// Reads a voice line, to learn whether it is lawful.
fn declared_by(problems: &mut Vec<Problem>, span: Span, words: &[Word<'_>]) -> Option<()> {
    voices::declaration(problems, span, words).map(|_| ())
}

/// Whether the doublings from one voice on lead to another.
fn leads_to(doubled: &[Option<usize>], from: usize, to: usize) -> bool {
    let mut at = from;
    for _ in 0..=doubled.len() {
        if at == to {
            return true;
        }
        match doubled.get(at).copied().flatten() {
            Some(next) => at = next,
            None => return false,
        }
    }
    false
}

/// The options of a voice line, but the voice it doubles.
fn options(voice: &Voice) -> Vec<String> {
    let mut options = Vec::new();
    if let Some(limit) = voice.limit {
        options.push(format!("{}..{}", limit.low, limit.high));
    }
    if let Some(easy) = voice.easy {
        options.push(format!("easy {}..{}", easy.low, easy.high));
    }
    if voice.cantus {
        options.push("cantus".to_owned());
    }
    if let Some(species) = voice.species {
        options.push(format!("species {species}"));
    }
    if let Some(clef) = &voice.clef {
        options.push(format!("clef {clef}"));
    }
    if let Some(written) = &voice.written {
        options.push(format!("written {written}"));
    }
    if voice.sixteen_foot {
        options.push("sixteen-foot".to_owned());
    }
    options
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn titles_are_one_plain_line() {
        for (given, expected) in [
            ("Lamplighters' evensong", "Lamplighters' evensong"),
            (" Quay\r\n| and // mole \\ ", "Quay  | and \\// mole \\\\"),
            ("| first", "\\| first"),
            ("// x//y", "\\// x//y"),
            ("\n", ""),
        ] {
            assert_eq!(free_text(given), expected);
        }
    }
}
