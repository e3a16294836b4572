//! Licences: footnotes `*a licence RULE…: reason`, and the header `licence RULE… [LABEL…]: reason`.

use crate::chars::{Word, free_text, plain, words};
use crate::headers::wrong;
use crate::lines::is_label;
use crate::near::short;
use crate::problem::Problem;
use crate::reading::{Footnote, HeadLicence};
use crate::span::Span;
use crate::system::problem;

const FORM: &str = "licence parallel-fifths: why";

/// What stands before and behind the colon of a licence.
struct Halves<'a> {
    /// The words before it.
    names: Vec<Word<'a>>,
    /// The reason, without the blanks about it; empty if there is none.
    reason: Span,
}

fn halves(text: &str, from: usize, to: usize) -> Halves<'_> {
    let mut names = Vec::new();
    for word in words(text, from, to) {
        let Some(name) = word.text.strip_suffix(':') else {
            names.push(word);
            continue;
        };
        if !name.is_empty() {
            let end = word.span.end - 1;
            let span = Span { end, ..word.span };
            names.push(Word { text: name, span });
        }
        let reason = free_text(text, word.span.end as usize, to);
        return Halves { names, reason };
    }
    let end = Span::new(to, to);
    Halves { names, reason: end }
}

fn is_rule(word: &str) -> bool {
    let part = |p: &str| !p.is_empty() && p.bytes().all(|b| b.is_ascii_lowercase());
    word.split('-').all(part)
}

/// Free text at a place, its escapes resolved; a backslash at its end is reported.
pub(crate) fn written_text(problems: &mut Vec<Problem>, text: &str, span: Span) -> String {
    let (resolved, dangling) = plain(text.get(span.range()).unwrap_or_default());
    if dangling {
        let message = "A backslash (\\) makes the next character plain; none follows it.";
        let start = span.end - 1;
        wrong(problems, Span { start, ..span }, message, &[]);
    }
    resolved.into_owned()
}

/// Takes a rule's name, or reports why it is none.
fn rule(problems: &mut Vec<Problem>, word: Word<'_>) -> Option<(String, Span)> {
    if word.text == "reading" {
        let message = "What cannot be read cannot be licensed either: mend the writing.";
        wrong(problems, word.span, message, &[]);
        return None;
    }
    if let Some(bare) = word.text.strip_suffix(',').filter(|bare| is_rule(bare)) {
        let message = "Rules stand side by side with a blank between, without commas.";
        wrong(problems, word.span, message, &[bare]);
        return Some((bare.to_owned(), word.span));
    }
    if !is_rule(word.text) {
        let message = format!(
            "{} is no rule: rules and families are named in small letters with hyphens, as in \
             parallel-fifths. The reason follows a colon.",
            short(word.text)
        );
        wrong(problems, word.span, &message, &[]);
        return None;
    }
    Some((word.text.to_owned(), word.span))
}

/// A footnote line, as far as it can be read.
pub(crate) struct FootnoteLine {
    /// The letters of its mark and their place, if it has a lawful one.
    pub(crate) mark: Option<(String, Span)>,
    /// The footnote, if all of it can stand.
    pub(crate) footnote: Option<Footnote>,
}

/// Reads a footnote line whose first word is `word`.
pub(crate) fn footnote(
    problems: &mut Vec<Problem>,
    text: &str,
    word: Span,
    end: usize,
) -> FootnoteLine {
    let none = |mark| FootnoteLine {
        mark,
        footnote: None,
    };
    let name = text.get(word.range()).unwrap_or_default();
    let letters = name.strip_prefix('*').unwrap_or_default();
    if letters.is_empty() || !letters.bytes().all(|b| b.is_ascii_alphabetic()) {
        let message =
            format!("A footnote begins with its mark, an asterisk and letters: *a {FORM}.");
        wrong(problems, word, &message, &[]);
        return none(None);
    }
    let mark = (letters.to_owned(), word);
    let Halves { names, reason } = halves(text, word.end as usize, end);
    let names = match names.split_first() {
        Some((first, names)) if matches!(first.text, "licence" | "license") => names,
        _ => {
            let message = format!("A footnote grants a licence: {name} {FORM}.");
            wrong(problems, word, &message, &[]);
            return none(Some(mark));
        }
    };
    if reason.start == reason.end {
        let message = format!("The reason is missing: {name} {FORM}.");
        wrong(problems, word, &message, &[]);
        return none(Some(mark));
    }
    if names.is_empty() {
        let message = format!("The rule is missing: {name} {FORM}.");
        wrong(problems, word, &message, &[]);
        return none(Some(mark));
    }
    let rules: Vec<_> = names
        .iter()
        .filter_map(|word| rule(problems, *word))
        .collect();
    let footnote = Footnote {
        mark: mark.0.clone(),
        mark_span: word,
        reason: written_text(problems, text, reason),
        span: Span {
            start: word.start,
            end: reason.end,
        },
        rules,
    };
    FootnoteLine {
        footnote: (!footnote.rules.is_empty()).then_some(footnote),
        mark: Some(mark),
    }
}

/// Reports voices in front of rules: the licence is read all the same.
fn out_of_order(
    problems: &mut Vec<Problem>,
    names: &[Word<'_>],
    voice: impl Fn(&str) -> Option<usize>,
) {
    let is_voice = |name: &&Word<'_>| voice(name.text).is_some();
    let (voices, rules): (Vec<&Word<'_>>, Vec<_>) = names.iter().partition(is_voice);
    let (Some(first_voice), Some(last_rule)) = (voices.first(), rules.last()) else {
        return;
    };
    let lawful = rules.iter().all(|name| is_rule(name.text));
    if !lawful || first_voice.span.start > last_rule.span.start {
        return;
    }
    let right: Vec<&str> = rules.iter().chain(&voices).map(|name| name.text).collect();
    let right = right.join(" ");
    let ends = (names.first(), names.last());
    if let (Some(first), Some(last)) = ends {
        let span = Span {
            start: first.span.start,
            end: last.span.end,
        };
        let message = format!("The rules come before the voices: {}.", short(&right));
        // The voice is marked; what is offered replaces all the names.
        problems.push(Problem {
            span: first_voice.span,
            ..problem(span, message, &[&right])
        });
    }
}

/// Reads a licence header whose first word is `word`; `voice` finds a declared voice.
pub(crate) fn licence(
    problems: &mut Vec<Problem>,
    text: &str,
    word: Span,
    end: usize,
    voice: impl Fn(&str) -> Option<usize>,
) -> Option<HeadLicence> {
    let Halves { names, reason } = halves(text, word.end as usize, end);
    if reason.start == reason.end {
        let message = format!("The reason is missing: {FORM}.");
        wrong(problems, word, &message, &[]);
        return None;
    }
    let mut rules = Vec::new();
    let mut voices = Vec::new();
    let mut named = 0;
    out_of_order(problems, &names, &voice);
    for name in names {
        if let Some(index) = voice(name.text) {
            if !voices.contains(&index) {
                voices.push(index);
            }
        } else if is_label(name.text) && !is_rule(name.text) {
            let message = format!("No voice is labelled {}.", name.text);
            wrong(problems, name.span, &message, &[]);
            // A licence meant for one voice must not become one for all.
            return None;
        } else {
            named += 1;
            rules.extend(rule(problems, name));
        }
    }
    if named == 0 {
        let message = format!("The rule is missing: {FORM}.");
        wrong(problems, word, &message, &[]);
    }
    let reason_text = written_text(problems, text, reason);
    (!rules.is_empty()).then_some(HeadLicence {
        rules,
        voices,
        reason: reason_text,
        span: Span {
            start: word.start,
            end: reason.end,
        },
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn footnotes() {
        let read = |line: &str| {
            let mut problems = Vec::new();
            let end = line.find(' ').unwrap_or(line.len());
            let found = footnote(&mut problems, line, Span::new(0, end), line.len());
            (found, problems.len())
        };
        let (found, problems) = read("*ab license parallel-fifths line: a: b \\// c // d");
        let footnote = found.footnote.unwrap();
        assert_eq!(problems, 0);
        assert_eq!(footnote.mark, "ab");
        assert_eq!(footnote.rules.len(), 2);
        assert_eq!(footnote.reason, "a: b // c");
        for bad in [
            "*",
            "*1 licence line: x",
            "*a",
            "*a licence",
            "*a licence line",
            "*a licence line:",
            "*a licence : x",
            "*a licence reading: x",
            "*a line: x",
            "*a licence Line: x",
        ] {
            let (found, problems) = read(bad);
            assert!(found.footnote.is_none() && problems == 1, "{bad}");
        }
    }
}
