//! The values of headers and changes: keys, metres, tempos.

use nom::Parser;
use nom::bytes::complete::{tag, take_while_m_n};
use nom::combinator::{all_consuming, map_opt};
use nom::multi::separated_list1;
use nom::sequence::separated_pair;

use partwright_score::{Key, Metre, MetreError, Mode, Pitch, Time};

use crate::chars::Word;
use crate::explain::foreign;
use crate::harmony::one_sign;
use crate::near::{near, short};
use crate::parts::{Read, letter};
use crate::problem::Problem;
use crate::reading::Tempo;
use crate::span::Span;
use crate::system::problem;

/// Reports something wrong in a value, with what could stand there instead.
pub(crate) fn wrong(problems: &mut Vec<Problem>, span: Span, message: &str, instead: &[&str]) {
    problems.push(problem(span, message.to_owned(), instead));
}

/// One or two digits, the first no 0.
fn count(input: &[u8]) -> Read<'_, u16> {
    map_opt(
        take_while_m_n(1, 2, |b: u8| b.is_ascii_digit()),
        |digits: &[u8]| {
            let number: u16 = crate::parts::text(digits).parse().ok()?;
            (digits.first() != Some(&b'0')).then_some(number)
        },
    )
    .parse_complete(input)
}

/// `3/8`
fn fraction(input: &[u8]) -> Read<'_, (u16, u16)> {
    separated_pair(count, tag("/"), count).parse_complete(input)
}

fn whole_fraction(word: &str) -> Option<(u16, u16)> {
    all_consuming(fraction)
        .parse_complete(word.as_bytes())
        .ok()
        .map(|(_, value)| value)
}

fn is_unit(unit: u16) -> bool {
    unit.is_power_of_two() && unit <= 64
}

/// A note value, or a report of what is wrong with it.
fn note_value(problems: &mut Vec<Problem>, word: Word<'_>) -> Option<(u16, u16)> {
    const UNITS: &str = "The lower figure is a note value: 1, 2, 4, 8, 16, 32 or 64.";
    match whole_fraction(word.text) {
        Some((count, unit)) if is_unit(unit) => Some((count, unit)),
        Some(_) => {
            wrong(problems, word.span, UNITS, &[]);
            None
        }
        None => {
            let (message, instead): (String, &[&str]) = match word.text {
                "C" | "c" => ("Write the old sign of common time as 4/4.".into(), &["4/4"]),
                "C|" | "¢" => ("Write the old sign of alla breve as 2/2.".into(), &["2/2"]),
                text => (
                    format!(
                        "{} is no metre and no note value: write two figures, as in 3/4.",
                        short(text)
                    ),
                    &[],
                ),
            };
            wrong(problems, word.span, &message, instead);
            None
        }
    }
}

/// Words behind a complete value.
fn surplus(problems: &mut Vec<Problem>, rest: &[Word<'_>], after: &str) {
    if let (Some(first), Some(last)) = (rest.first(), rest.last()) {
        let span = Span {
            start: first.span.start,
            end: last.span.end,
        };
        let message = format!("Nothing more was expected here: {after}. A comment begins with //.");
        wrong(problems, span, &message, &[]);
    }
}

/// `4/4`, `6/8 by 3/8`, `5/8 3+2`, `free`.
pub(crate) fn metre(
    problems: &mut Vec<Problem>,
    header: Span,
    words: &[Word<'_>],
) -> Option<Metre> {
    const FORMS: &str = "a metre is 4/4, 6/8 by 3/8, 5/8 3+2 or free";
    let Some((first, rest)) = words.split_first() else {
        let message = format!("The metre is missing: {FORMS}.");
        wrong(problems, header, &message, &[]);
        return None;
    };
    if first.text == "free" {
        surplus(problems, rest, FORMS);
        return Some(Metre::free());
    }
    let (count, unit) = note_value(problems, *first)?;
    let plain = || Metre::new(count, unit, None, &[]).ok();
    match rest {
        [] => plain(),
        [by, rest @ ..] if by.text == "by" => {
            let Some((cell, rest)) = rest.split_first() else {
                let message = "The length of a cell is missing: by 3/8, for instance.";
                wrong(problems, by.span, message, &[]);
                return plain();
            };
            let metre = note_value(problems, *cell).and_then(|(over, under)| {
                let length = Time::new(i64::from(over), i64::from(under));
                Metre::new(count, unit, Some(length), &[]).ok().or_else(|| {
                    let message = format!(
                        "A bar of {count}/{unit} does not divide into cells of {}.",
                        cell.text
                    );
                    wrong(problems, cell.span, &message, &[]);
                    None
                })
            });
            surplus(problems, rest, FORMS);
            metre.or_else(plain)
        }
        [groups, rest @ ..] => {
            let sizes = all_consuming(separated_list1(tag("+"), self::count))
                .parse_complete(groups.text.as_bytes());
            let metre = match sizes {
                Ok((_, sizes)) if sizes.len() > 1 => {
                    let made = Metre::new(count, unit, None, &sizes);
                    if made == Err(MetreError::Groups) {
                        let message = format!("The groups of {count}/{unit} add up to {count}.");
                        wrong(problems, groups.span, &message, &[]);
                    }
                    made.ok()
                }
                _ => {
                    let message = format!("{} was not expected here: {FORMS}.", short(groups.text));
                    wrong(problems, groups.span, &message, &[]);
                    None
                }
            };
            surplus(problems, rest, FORMS);
            metre.or_else(plain)
        }
    }
}

/// A tonic, or a report of what is wrong with it.
pub(crate) fn tonic(problems: &mut Vec<Problem>, word: Word<'_>) -> Option<Pitch> {
    let read = all_consuming((letter, one_sign)).parse_complete(word.text.as_bytes());
    if let Ok((_, (at, sign))) = read {
        return Some(Pitch::new(at.unsigned_abs(), sign, 4));
    }
    if let Some((language, name)) = foreign(word.text) {
        let message = format!("{} is a {language} name; here it is {name}.", word.text);
        wrong(problems, word.span, &message, &[&name]);
    } else {
        let message = format!(
            "{} is no tonic. Expected a letter A to G and at most one sign, as in F# or Bb.",
            short(word.text)
        );
        wrong(problems, word.span, &message, &[]);
    }
    None
}

fn mode(problems: &mut Vec<Problem>, word: Word<'_>) -> Option<Mode> {
    if let Some(mode) = Mode::named(word.text) {
        return Some(mode);
    }
    let other = match word.text.to_lowercase().as_str() {
        "dur" | "maj" | "ionic" => Some("major"),
        "moll" | "min" => Some("minor"),
        _ => near(word.text, Mode::ALL.into_iter().map(Mode::name)),
    };
    let names: Vec<&str> = Mode::ALL.into_iter().map(Mode::name).collect();
    let message = match other {
        Some(other) => format!("{} is no mode. Is {other} meant?", short(word.text)),
        None => format!(
            "{} is no mode. Expected {}.",
            short(word.text),
            names.join(", ")
        ),
    };
    let instead: Vec<&str> = other.into_iter().collect();
    wrong(problems, word.span, &message, &instead);
    None
}

/// `1b`, `3♯`: sharps positive, flats negative.
fn signature(word: &str) -> Option<i8> {
    let mut chars = word.chars();
    let count = i8::try_from(chars.next()?.to_digit(10)?).ok()?;
    let sign = match chars.as_str() {
        "#" | "♯" => 1,
        "b" | "♭" => -1,
        _ => return None,
    };
    (1..=7).contains(&count).then_some(count * sign)
}

/// `G major`, `D dorian signature 1b`, `none`.
pub(crate) fn key(problems: &mut Vec<Problem>, header: Span, words: &[Word<'_>]) -> Option<Key> {
    const FORMS: &str = "a key is G major, E minor, D dorian or none";
    let Some((first, rest)) = words.split_first() else {
        let message = format!("The key is missing: {FORMS}.");
        wrong(problems, header, &message, &[]);
        return None;
    };
    if first.text == "none" {
        surplus(problems, rest, FORMS);
        return Some(Key::None);
    }
    let tonic = tonic(problems, *first)?;
    let Some((word, rest)) = rest.split_first() else {
        let name = tonic.class_name();
        let message = format!("The mode is missing: {name} major or {name} minor, for instance.");
        let instead = [format!("{name} major"), format!("{name} minor")];
        wrong(problems, first.span, &message, &[&instead[0], &instead[1]]);
        return None;
    };
    let mode = mode(problems, *word)?;
    const SIGNATURE: &str =
        "A printed signature is one to seven signs: signature 1b, signature 3#.";
    let signature = match rest {
        [] => None,
        [word] if word.text == "signature" => {
            wrong(problems, word.span, SIGNATURE, &[]);
            None
        }
        [word, signs, rest @ ..] if word.text == "signature" => {
            let read = signature(signs.text);
            if read.is_none() {
                wrong(problems, signs.span, SIGNATURE, &[]);
            }
            surplus(problems, rest, FORMS);
            read
        }
        rest => {
            surplus(problems, rest, FORMS);
            None
        }
    };
    Some(Key::Of {
        tonic,
        mode,
        signature,
    })
}

/// `72`, `3/8 72`.
pub(crate) fn tempo(
    problems: &mut Vec<Problem>,
    header: Span,
    words: &[Word<'_>],
) -> Option<Tempo> {
    const FORMS: &str = "a tempo is a number of cells a minute, tempo 72, or of a note value, \
                         tempo 3/8 72";
    let Some(first) = words.first() else {
        let message = format!("The tempo is missing: {FORMS}.");
        wrong(problems, header, &message, &[]);
        return None;
    };
    let (unit, rest) = if first.text.contains('/') {
        let (over, under) = note_value(problems, *first)?;
        let unit = Time::new(i64::from(over), i64::from(under));
        (Some(unit), words.get(1..).unwrap_or_default())
    } else {
        (None, words)
    };
    let Some((word, rest)) = rest.split_first() else {
        let message = format!("The number is missing: {FORMS}.");
        wrong(problems, first.span, &message, &[]);
        return None;
    };
    let number = word.text.bytes().all(|b| b.is_ascii_digit()) && !word.text.starts_with('0');
    let speed = word
        .text
        .parse()
        .ok()
        .filter(|n| number && (1..=999).contains(n));
    if speed.is_none() {
        let message = format!("Expected a number from 1 to 999: {FORMS}.");
        wrong(problems, word.span, &message, &[]);
    }
    surplus(problems, rest, FORMS);
    speed.map(|speed| Tempo { unit, speed })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::chars::words;

    fn read<T>(
        text: &str,
        reader: fn(&mut Vec<Problem>, Span, &[Word<'_>]) -> Option<T>,
    ) -> (Option<T>, usize) {
        let mut problems = Vec::new();
        let words: Vec<_> = words(text, 0, text.len()).collect();
        let value = reader(&mut problems, Span::new(0, 0), &words);
        (value, problems.len())
    }

    #[test]
    fn metres() {
        for good in [
            "4/4",
            "6/8 by 3/8",
            "5/8 3+2",
            "free",
            "99/64",
            "2/1 by 1/2",
        ] {
            let (value, problems) = read(good, metre);
            assert_eq!((value.unwrap().to_string().as_str(), problems), (good, 0));
        }
        for (bad, left) in [
            ("", None),
            ("100/4", None),
            ("4/4 fast", Some("4/4")),
            ("4/4 by", Some("4/4")),
            ("6/8 by 1/2", Some("6/8")),
            ("6/8 by 1/3", Some("6/8")),
            ("5/8 3+3", Some("5/8")),
            ("free 4/4", Some("free")),
        ] {
            let (value, problems) = read(bad, metre);
            assert_eq!(value.map(|m| m.to_string()).as_deref(), left, "{bad}");
            assert_eq!(problems, 1, "{bad}");
        }
    }

    #[test]
    fn keys() {
        for good in [
            "G major",
            "Bb minor signature 1b",
            "F# dorian signature 3#",
            "none",
        ] {
            let (value, problems) = read(good, key);
            assert_eq!((value.unwrap().to_string().as_str(), problems), (good, 0));
        }
        for bad in [
            "",
            "G",
            "H major",
            "G dur",
            "G major signature",
            "G major 1b",
            "none at all",
        ] {
            assert_eq!(read(bad, key).1, 1, "{bad}");
        }
    }

    #[test]
    fn tempos() {
        assert_eq!(read("72", tempo).0.unwrap().speed, 72);
        let of = read("3/8 60", tempo).0.unwrap();
        assert_eq!((of.unit, of.speed), (Some(Time::new(3, 8)), 60));
        for bad in ["", "0", "1000", "+5", "fast", "1/4", "3/5 60", "60 or so"] {
            assert_eq!(read(bad, tempo).1, 1, "{bad}");
        }
    }
}
