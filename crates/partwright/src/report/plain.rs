//! The plain report: for each finding a heading, the message, and the rows with the notes marked.

use annotate_snippets::renderer::{AnsiColor, DecorStyle, Effects, Style};
use annotate_snippets::{AnnotationKind, Group, Level, Renderer, Snippet};
use partwright_check::{Finding, Severity};
use unicode_width::UnicodeWidthStr;

use super::Page;
use super::excerpt::{Cutter, Excerpt};
use super::marks::marks;
use crate::prose::{block, harmless, list, shortened};

/// What a report looks like.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Plain {
    /// Columns in a line.
    pub(crate) width: usize,
    /// With colour.
    pub(crate) colour: bool,
}

/// The style of a severity's word and of the mark where a finding stands.
pub(crate) const fn severity_style(severity: Severity) -> Style {
    let colour = match severity {
        Severity::Fault => AnsiColor::Red,
        Severity::Weakness => AnsiColor::Yellow,
        Severity::Remark => AnsiColor::Cyan,
    };
    colour.on_default().effects(Effects::BOLD)
}

/// The style of headings.
pub(crate) const fn heading() -> Style {
    Style::new().effects(Effects::BOLD)
}

/// Line numbers and rails stand back. Thin marks and their labels have no colour of their own,
/// and are legible on any ground.
const QUIET: Style = AnsiColor::BrightBlue.on_default();

impl Plain {
    /// The findings of a page, an empty line behind each.
    pub(crate) fn report(
        self,
        page: &Page<'_>,
        findings: &[&Finding],
        mut print: impl FnMut(String),
    ) {
        let mut cutter = Cutter::new(page, self.width);
        for finding in findings {
            print(self.finding(page, &mut cutter, finding));
        }
    }

    /// A text in a style, where there is colour.
    pub(crate) fn paint(self, style: Style, text: &str) -> String {
        if self.colour {
            format!("{style}{text}{style:#}")
        } else {
            text.to_owned()
        }
    }

    fn finding(self, page: &Page<'_>, cutter: &mut Cutter<'_>, finding: &Finding) -> String {
        let mut text = self.heading(page, finding);
        text.push_str(&block(&harmless(&finding.message), self.width, 2));
        if let Some(lifted) = &finding.licence {
            let licence = match &lifted.mark {
                Some(mark) => format!("Licence *{mark}: {}", lifted.reason),
                None => format!("Licence: {}", lifted.reason),
            };
            text.push_str(&block(&harmless(&licence), self.width, 2));
        }
        let position = finding
            .span
            .map(|span| page.lines.position(span.start as usize));
        let place = position.map_or_else(String::new, |(line, column)| format!(":{line}:{column}"));
        let excerpt = cutter.cut(&marks(page, finding), finding.voices.len() > 1);
        match excerpt {
            Some(excerpt) => {
                let indent = " ".repeat(excerpt.last.to_string().len() + 1);
                let corner = self.paint(QUIET, &format!("{indent}╭▸"));
                text.push_str(&format!("{corner} {}{place}\n", harmless(page.name)));
                text.push_str(&self.drawing(finding, &excerpt));
            }
            None => text.push_str(&format!("  {}{place}\n", harmless(page.name))),
        }
        text.push('\n');
        text
    }

    /// `fault: parallel-fifths · bar 3, beat 2½ · soprano and bass`, on two lines where one is
    /// too short.
    fn heading(self, page: &Page<'_>, finding: &Finding) -> String {
        let severity = finding.severity.word();
        let (word, style) = match finding.licence {
            // It is lawful here: no colour of warning.
            Some(_) => (format!("licensed {severity}"), QUIET),
            None => (severity.to_owned(), severity_style(finding.severity)),
        };
        let painted = format!(
            "{}: {}",
            self.paint(style, &word),
            self.paint(heading(), finding.rule)
        );
        let mut place = Vec::new();
        if let Some(at) = finding.at {
            let piece = page.checked.piece();
            place.push(piece.place_text(at));
        }
        if !finding.voices.is_empty() {
            place.push(names(page, finding));
        }
        if place.is_empty() {
            return painted + "\n";
        }
        let place = place.join(" · ");
        let room = word.len() + 2 + finding.rule.len() + 3 + place.width() <= self.width;
        format!("{painted}{}{place}\n", if room { " · " } else { "\n  " })
    }

    /// The rows with their marks, and the right forms on offer.
    fn drawing(self, finding: &Finding, excerpt: &Excerpt) -> String {
        let marks = excerpt.marks.iter().map(|mark| {
            let kind = if mark.primary {
                AnnotationKind::Primary
            } else {
                AnnotationKind::Context
            };
            let label = (!mark.label.is_empty()).then_some(mark.label.as_str());
            kind.span(mark.span.clone())
                .label(label)
                .highlight_source(mark.primary)
        });
        let shown = excerpt
            .shown
            .iter()
            .map(|line| AnnotationKind::Visible.span(line.clone()));
        let rows = Snippet::source(excerpt.source.as_str())
            .line_start(excerpt.first)
            .annotations(marks.chain(shown));
        let room = self
            .width
            .saturating_sub(excerpt.last.to_string().len() + "  ╰ help: ".width());
        let offers: Vec<_> = finding
            .offers
            .iter()
            .map(|offer| harmless(&offer.title))
            .collect();
        let offers = offers
            .iter()
            .map(|offer| Level::HELP.message(shortened(offer, room)));
        let group = Group::with_level(Level::ERROR)
            .element(rows)
            .elements(offers);
        let drawn = self.renderer(finding.severity).render(&[group]);
        // The first line is the corner, which stands above with the place; a last line that only
        // closes the rail says nothing.
        let rest = drawn.split_once('\n').map_or("", |(_, rest)| rest);
        match rest.rsplit_once('\n') {
            Some((rows, rail)) if bare(rail).trim() == "╰╴" => format!("{rows}\n"),
            _ => format!("{rest}\n"),
        }
    }

    fn renderer(self, severity: Severity) -> Renderer {
        let renderer = Renderer::plain()
            .decor_style(DecorStyle::Unicode)
            .term_width(self.width);
        if !self.colour {
            return renderer;
        }
        renderer
            .error(severity_style(severity))
            .line_num(QUIET)
            .emphasis(heading())
    }
}

/// What a musician calls the voices of a finding; of many, the first few.
fn names(page: &Page<'_>, finding: &Finding) -> String {
    let names: Vec<&str> = finding
        .voices
        .iter()
        .map(|&voice| page.checked.reading.score.voice_name(voice))
        .collect();
    match names.as_slice() {
        [first, second, third, rest @ ..] if rest.len() > 1 => {
            format!("{first}, {second}, {third} and {} others", rest.len())
        }
        names => list(names),
    }
}

/// A text without its colours.
fn bare(text: &str) -> String {
    let mut bare = String::new();
    for (i, piece) in text.split('\x1b').enumerate() {
        let shown = if i == 0 {
            piece
        } else {
            piece.split_once('m').map_or("", |(_, shown)| shown)
        };
        bare.push_str(shown);
    }
    bare
}
