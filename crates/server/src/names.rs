//! The names in a sheet, labels and footnote marks, and every place where they stand.

use std::ops::Range;

use partwright_sheet::Reading;

use crate::lines::{Kind, lines, words};

/// A name.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) enum Name {
    /// A voice's label.
    Label(String),
    /// The letters of a footnote mark.
    Mark(String),
}

/// A place where a name stands.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) struct Place {
    /// The name's own bytes, without the asterisk of a mark.
    pub(crate) span: Range<usize>,
    /// The voice is declared here, or the footnote of the mark stands here.
    pub(crate) declares: bool,
}

/// The name at an offset (its end counts as it), with the bytes it takes there.
pub(crate) fn at(text: &str, reading: &Reading, offset: usize) -> Option<(Name, Range<usize>)> {
    let holds = |span: &Range<usize>| span.start <= offset && offset <= span.end;
    let mark = marks(text, reading).find(|(_, place)| {
        let with_asterisk = place.span.start.saturating_sub(1)..place.span.end;
        holds(&with_asterisk)
    });
    if let Some((name, place)) = mark {
        return Some((Name::Mark(name.to_owned()), place.span));
    }
    let label = labels(text).into_iter().find(|(_, p)| holds(&p.span));
    label.map(|(name, place)| (Name::Label(name.to_owned()), place.span))
}

/// Every place where a name stands, in the order of the text.
pub(crate) fn places(text: &str, reading: &Reading, name: &Name) -> Vec<Place> {
    let mut found: Vec<Place> = match name {
        Name::Label(label) => labels(text)
            .into_iter()
            .filter(|(name, _)| name == label)
            .map(|(_, place)| place)
            .collect(),
        Name::Mark(mark) => marks(text, reading)
            .filter(|(name, _)| name == mark)
            .map(|(_, place)| place)
            .collect(),
    };
    found.sort_by_key(|place| place.span.start);
    found
}

/// The marks on parts, and those before footnotes.
fn marks<'a>(text: &'a str, reading: &'a Reading) -> impl Iterator<Item = (&'a str, Place)> {
    let on_parts = reading.marks.iter().map(|mark| {
        let span = mark.span.range();
        let place = Place {
            span: span.start + 1..span.end,
            declares: false,
        };
        (mark.name.as_str(), place)
    });
    let footnotes = lines(text).filter(|line| line.kind == Kind::Footnote);
    let footnotes = footnotes.filter_map(|line| {
        let span = line.word.start + 1..line.word.end;
        let letters = text.get(span.clone())?;
        let lawful = !letters.is_empty() && letters.bytes().all(|b| b.is_ascii_alphabetic());
        let place = Place {
            span,
            declares: true,
        };
        lawful.then_some((letters, place))
    });
    on_parts.chain(footnotes)
}

/// The labels of the voices in the order of their declaration: those of the `voice` lines, or of
/// the first system. Reads no further than that.
pub(crate) fn declared(text: &str) -> Vec<&str> {
    let mut found = Vec::new();
    let mut by_lines = false;
    let mut in_system = false;
    for line in lines(text) {
        let word = text.get(line.word.clone()).unwrap_or_default();
        match line.kind {
            Kind::Header if word == "voice" => {
                by_lines = true;
                let label = words(text, line.value()).next();
                found.extend(label.and_then(|label| text.get(label)));
            }
            Kind::Music if by_lines => break,
            Kind::Music if found.contains(&word) => break,
            Kind::Music => {
                in_system = true;
                found.push(word);
            }
            Kind::Header if in_system => break,
            // A comment goes on, a blank line ends the system.
            Kind::Empty if in_system && line.comment == line.span.end => break,
            _ => {}
        }
    }
    found
}

/// Every place where a declared label stands, in the order of the text.
fn labels(text: &str) -> Vec<(&str, Place)> {
    let declared = declared(text);
    let by_lines = lines(text)
        .take_while(|line| line.kind != Kind::Music)
        .any(|line| text.get(line.word) == Some("voice"));
    let mut found: Vec<(&str, Place)> = Vec::new();
    let mut seen = vec![false; declared.len()];
    let mut add = |span: Range<usize>, declares: bool| {
        let Some(name) = text.get(span.clone()) else {
            return;
        };
        if let Some(index) = declared.iter().position(|label| *label == name) {
            let first = seen
                .get_mut(index)
                .is_some_and(|s| !std::mem::replace(s, declares));
            let declares = declares && first;
            found.push((name, Place { span, declares }));
        }
    };
    for line in lines(text) {
        let word = text.get(line.word.clone()).unwrap_or_default();
        match (line.kind, word) {
            (Kind::Music, _) => {
                add(line.word.clone(), !by_lines);
                copies(text, line.value()).for_each(|span| add(span, false));
            }
            (Kind::Words, _) => words(text, line.head(text)).for_each(|span| add(span, false)),
            (Kind::Header, "voice") => {
                let mut words = words(text, line.value());
                if let Some(label) = words.next() {
                    add(label, true);
                }
                let mut doubles = false;
                for word in words {
                    if doubles {
                        add(word.clone(), false);
                    }
                    doubles = text.get(word) == Some("doubles");
                }
            }
            (Kind::Header, "equal") => words(text, line.value()).for_each(|w| add(w, false)),
            (Kind::Header, "licence" | "license") => {
                for word in words(text, line.value()) {
                    let name = text.get(word.clone()).unwrap_or_default();
                    let bare = name.strip_suffix(':').unwrap_or(name);
                    add(word.start..word.start + bare.len(), false);
                    if bare.len() < name.len() {
                        break;
                    }
                }
            }
            _ => {}
        }
    }
    found
}

/// The labels in the copied bars of a row: `=S`, `=S-8`.
fn copies(text: &str, row: Range<usize>) -> impl Iterator<Item = Range<usize>> + '_ {
    let some = text.get(row.clone()).is_some_and(|row| row.contains('='));
    let row = if some { row } else { 0..0 };
    words(text, row).filter_map(|word| {
        let name = text.get(word.clone())?.strip_prefix('=')?;
        let length = name
            .find(|c: char| !c.is_ascii_alphanumeric())
            .unwrap_or(name.len());
        Some(word.start + 1..word.start + 1 + length)
    })
}

#[cfg(test)]
mod tests {
    use partwright_sheet::Sheet;

    use super::*;

    const SHEET: &str = "\
equal S A
licence spacing S: S is far
voice S soprano
voice A alto doubles S

S | G4*b | G4 |
A | =S-8 | G4*b |
words S 1 | S | la |
*b licence motion: S leads
";

    #[test]
    fn labels_stand_in_many_places() {
        let reading = Sheet::read(SHEET).lower(SHEET);
        let at_s = SHEET.find("S soprano").unwrap();
        let (name, _) = at(SHEET, &reading, at_s).unwrap();
        assert_eq!(name, Name::Label("S".to_owned()));
        let places = places(SHEET, &reading, &name);
        let rest: Vec<&str> = places.iter().map(|p| &SHEET[p.span.start..][..3]).collect();
        assert_eq!(rest, ["S A", "S: ", "S s", "S\n\n", "S |", "S-8", "S 1"]);
        let declaring: Vec<usize> = places
            .iter()
            .filter(|p| p.declares)
            .map(|p| p.span.start)
            .collect();
        assert_eq!(declaring, [at_s]);
        assert_eq!(declared(SHEET), ["S", "A"]);
    }

    #[test]
    fn marks_and_their_footnote() {
        let reading = Sheet::read(SHEET).lower(SHEET);
        let (name, _) = at(SHEET, &reading, SHEET.find("*b licence").unwrap()).unwrap();
        assert_eq!(name, Name::Mark("b".to_owned()));
        let places = places(SHEET, &reading, &name);
        let declares: Vec<bool> = places.iter().map(|p| p.declares).collect();
        assert_eq!(declares, [false, false, true]);
    }

    #[test]
    fn without_voice_lines_the_first_system_declares() {
        let text = "title x\n\nS | G4 |\n// c\nB | G3 |\n\nT | G4 |\n";
        assert_eq!(declared(text), ["S", "B"]);
        let declares: Vec<bool> = labels("S | G4 |\nS | G4 |\n")
            .iter()
            .map(|l| l.1.declares)
            .collect();
        assert_eq!(declares, [true, false]);
    }
}
