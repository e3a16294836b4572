//! From the tree to the score.
//!
//! In order: the headers and the voices (`head`), which bars there are (`bars`), the notes
//! (`music`), the rows under them (`under`), and what can only be told at the end.

pub(crate) mod bars;
mod copies;
mod flow;
mod head;
mod labels;
mod lane;
mod music;
mod reports;
mod stated;
mod under;
mod words;

use std::collections::{HashMap, HashSet};
use std::sync::Arc;

use partwright_score::Score;

use crate::lookup::Map;
use crate::problem::{Edit, Offer, Problem, ProblemKind};
use crate::reading::{Head, Reading};
use crate::sheet::Tree;
use crate::span::Span;
use crate::system::problem;

/// Lowers a tree.
pub(crate) fn lower(tree: &Arc<Tree>) -> Reading {
    let mut reading = Reading {
        score: Score::default(),
        problems: Vec::new(),
        head: Head::default(),
        changes: Vec::new(),
        marks: Vec::new(),
        footnotes: Vec::new(),
        licences: Vec::new(),
        words: Vec::new(),
        harmony: Vec::new(),
        figures: Vec::new(),
        map: Map {
            tree: Arc::clone(tree),
            plan: bars::Plan::default(),
            declared: Vec::new(),
        },
    };
    if tree.too_large {
        let most = crate::LARGEST >> 20;
        let message = format!("The sheet is larger than {most} MiB and is not read.");
        reading
            .problems
            .push(problem(Span::new(0, 0), message, &[]));
        return reading;
    }
    let mut lowering = Lowering {
        tree,
        text: &tree.text,
        reading,
        labels: HashMap::new(),
        declared: Vec::new(),
        refused: HashSet::new(),
        stray_marks: HashSet::new(),
        guesses: crate::near::MOST_GUESSES,
        line_end: line_end(&tree.text),
    };
    lowering.lone_returns();
    let outline = head::head(&mut lowering);
    let plan = bars::bars(&mut lowering, &outline);
    music::music(&mut lowering, &plan);
    under::under(&mut lowering, &plan);
    lowering.footnotes(&outline);
    let declared = lowering.declared;
    let mut reading = lowering.reading;
    reading.marks.sort_by_key(|mark| mark.span.start);
    reading.problems.sort_by_key(|p| (p.span.start, p.span.end));
    reading.map.plan = plan;
    reading.map.declared = declared;
    reading
}

/// A sheet on its way to the score.
struct Lowering<'a> {
    tree: &'a Tree,
    text: &'a str,
    reading: Reading,
    /// The voices by their labels.
    labels: HashMap<&'a str, usize>,
    /// The labels where they are declared.
    declared: Vec<Span>,
    /// Labels of voices beyond the most there can be: told once, where they are declared.
    refused: HashSet<&'a str>,
    /// Footnote marks in rows that are not read.
    stray_marks: HashSet<String>,
    /// Nearest words that may still be looked for.
    guesses: usize,
    /// The line end this text uses.
    line_end: &'static str,
}

fn line_end(text: &str) -> &'static str {
    let first = text.find('\n').unwrap_or(0);
    let before = first.checked_sub(1).and_then(|i| text.as_bytes().get(i));
    if before == Some(&b'\r') { "\r\n" } else { "\n" }
}

impl<'a> Lowering<'a> {
    fn at(&self, span: Span) -> &'a str {
        self.text.get(span.range()).unwrap_or_default()
    }

    /// Whether one more nearest word may be looked for.
    fn guess(&mut self) -> bool {
        let left = self.guesses > 0;
        self.guesses = self.guesses.saturating_sub(1);
        left
    }

    /// A voice at the beginning of a sentence: `The tenor`, or its label.
    fn called(&self, voice: usize) -> String {
        let score = &self.reading.score;
        let name = score.voice_name(voice);
        match score.voices.get(voice) {
            Some(voice) if voice.label != name => format!("The {name}"),
            _ => name.to_owned(),
        }
    }

    fn wrong(&mut self, span: Span, message: &str, instead: &[&str]) {
        crate::headers::wrong(&mut self.reading.problems, span, message, instead);
    }

    /// Carriage returns that end no line: one word for all, since one editor made them all.
    fn lone_returns(&mut self) {
        let bytes = self.text.as_bytes();
        let lone = |at: &usize| bytes.get(at + 1) != Some(&b'\n');
        let mut found = self.text.match_indices('\r').map(|(at, _)| at).filter(lone);
        let Some(first) = found.next() else { return };
        let edits = std::iter::once(first).chain(found).map(|at| Edit {
            span: Span::new(at, at + 1),
            text: self.line_end.to_owned(),
        });
        let offer = Offer {
            title: "End the line here".to_owned(),
            edits: edits.collect(),
        };
        let message = "A carriage return alone ends no line: lines end with a line feed.";
        let span = Span::new(first, first + 1);
        self.reading.problems.push(Problem {
            offers: vec![offer],
            ..problem(span, message.to_owned(), &[])
        });
    }

    /// A mark without footnote, a footnote without mark, two for one mark.
    fn footnotes(&mut self, outline: &head::Outline) {
        let used: HashSet<&str> = self
            .reading
            .marks
            .iter()
            .map(|mark| mark.name.as_str())
            .chain(self.stray_marks.iter().map(String::as_str))
            .collect();
        let mut explained: HashSet<&str> = HashSet::new();
        let mut found = Vec::new();
        for (mark, span) in &outline.marks {
            if !explained.insert(mark) {
                found.push((
                    *span,
                    format!("*{mark} has a footnote already: the first stands."),
                ));
            } else if !used.contains(mark.as_str()) {
                let message = format!("No note carries the mark *{mark} of this footnote.");
                found.push((*span, message));
            }
        }
        let mut told: HashSet<&str> = HashSet::new();
        let mut marks: Vec<_> = self.reading.marks.iter().collect();
        marks.sort_by_key(|mark| mark.span.start);
        let mut bare = Vec::new();
        for mark in marks {
            let name = mark.name.as_str();
            if !explained.contains(name) && told.insert(name) {
                let message = format!(
                    "The mark *{name} has no footnote. Write one on a line of its own: *{name} \
                     licence parallel-fifths: why."
                );
                bare.push(Problem {
                    voice: Some(mark.voice),
                    at: Some(mark.at),
                    ..problem(mark.span, message, &[])
                });
            }
        }
        let found = found.into_iter().map(|(span, m)| problem(span, m, &[]));
        let all: Vec<Problem> = found.chain(bare).collect();
        self.reading.problems.extend(all);
        let mut first = HashSet::new();
        self.reading
            .footnotes
            .retain(|footnote| first.insert(footnote.mark.clone()));
    }
}

/// A problem that is no fault of reading.
fn remark(kind: ProblemKind, span: Span, message: &str) -> Problem {
    Problem {
        kind,
        ..problem(span, message.to_owned(), &[])
    }
}

/// The edit that puts a text in front of a place.
fn insertion(at: u32, text: &str, title: &str) -> Offer {
    Offer {
        title: title.to_owned(),
        edits: vec![Edit {
            span: Span { start: at, end: at },
            text: text.to_owned(),
        }],
    }
}

#[cfg(test)]
mod tests {
    use crate::{Sheet, apply};

    #[test]
    fn carriage_returns_alone_are_one_trouble_with_one_mend() {
        let text = "title Quay\rS | G4 |\rA | E4 |\r\n";
        let reading = Sheet::read(text).lower(text);
        let told: Vec<_> = reading
            .problems
            .iter()
            .filter(|p| p.message.contains("carriage return"))
            .collect();
        assert_eq!(told.len(), 1);
        assert_eq!(told[0].span.range(), 10..11);
        let mended = apply(text, &told[0].offers[0].edits);
        assert_eq!(mended, "title Quay\r\nS | G4 |\r\nA | E4 |\r\n");
        let again = Sheet::read(&mended).lower(&mended);
        assert_eq!(again.problems, []);
    }
}
