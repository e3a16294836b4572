//! Chords of a harmony row and figures of a figured bass.

use std::fmt;

use nom::Parser;
use nom::branch::alt;
use nom::bytes::complete::tag;
use nom::character::complete::one_of;
use nom::combinator::{all_consuming, map, opt, value};
use nom::multi::{many0, separated_list1};
use nom::sequence::{pair, preceded, terminated};

use partwright_score::Pitch;

use crate::parts::{Read, letter};

/// A degree of the scale as a Roman numeral.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub struct Numeral {
    /// 1 to 7.
    pub degree: u8,
    /// Written in capitals: a major third over its root.
    pub capital: bool,
}

/// A chord as a harmony row states it: `bVI`, `viio7/V`, `ii6/5`.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Chord {
    /// Semitones by which the degree is altered: `#` 1, `b` -1.
    pub sign: i8,
    /// The degree it stands on.
    pub numeral: Numeral,
    /// `o` diminished, `+` augmented, `ø` half-diminished.
    pub quality: Option<char>,
    /// Figures over its bass, as written.
    pub figures: Vec<u8>,
    /// The degree whose key it is taken from: the `V` of `V7/V`.
    pub applied: Option<Numeral>,
}

/// One figure of a figured bass: `6`, `#6`, `b`.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Figure {
    /// `#`, `b` or `n`.
    pub sign: Option<char>,
    /// The interval over the bass; a sign alone means the third.
    pub number: Option<u8>,
}

const NUMERALS: [&str; 7] = ["I", "II", "III", "IV", "V", "VI", "VII"];
const SMALL: [&str; 7] = ["i", "ii", "iii", "iv", "v", "vi", "vii"];

fn numeral(input: &[u8]) -> Read<'_, Numeral> {
    let mut found: Option<(&[u8], Numeral)> = None;
    for (capital, names) in [(true, NUMERALS), (false, SMALL)] {
        for (degree, name) in (1..).zip(names) {
            // The longest that fits: `VI` rather than `V`.
            if let Some(rest) = input.strip_prefix(name.as_bytes())
                && found.is_none_or(|(shortest, _)| rest.len() < shortest.len())
            {
                found = Some((rest, Numeral { degree, capital }));
            }
        }
    }
    found.ok_or(nom::Err::Error(()))
}

fn figure_number(input: &[u8]) -> Read<'_, u8> {
    map(one_of("23456789"), |c| c as u8 - b'0').parse_complete(input)
}

/// A chord, to the end of its part.
pub(crate) fn chord(input: &[u8]) -> Option<Chord> {
    let sign = alt((value(1, tag("#")), value(-1, tag("b")), value(0, tag(""))));
    let quality = alt((
        value('o', tag("o")),
        value('+', tag("+")),
        value('ø', tag("ø")),
    ));
    let more = many0(preceded(opt(tag("/")), figure_number));
    let figures = opt(pair(figure_number, more));
    let applied = opt(preceded(tag("/"), numeral));
    let whole = (sign, numeral, opt(quality), figures, applied);
    let (_, (sign, numeral, quality, figures, applied)) =
        all_consuming(whole).parse_complete(input).ok()?;
    let figures = figures.map(|(first, mut rest)| {
        rest.insert(0, first);
        rest
    });
    Some(Chord {
        sign,
        numeral,
        quality,
        figures: figures.unwrap_or_default(),
        applied,
    })
}

fn figure(input: &[u8]) -> Read<'_, Figure> {
    let (rest, (sign, number)) = (opt(one_of("#bn")), opt(figure_number)).parse_complete(input)?;
    if sign.is_none() && number.is_none() {
        return Err(nom::Err::Error(()));
    }
    Ok((rest, Figure { sign, number }))
}

/// A stack of figures, to the end of its part.
pub(crate) fn stack(input: &[u8]) -> Option<Vec<Figure>> {
    let whole = separated_list1(tag("/"), figure);
    Some(all_consuming(whole).parse_complete(input).ok()?.1)
}

/// `D:`, to the end of its word: the tonic, and whether a small letter makes it minor.
pub(crate) fn key_prefix(input: &[u8]) -> Option<(Pitch, bool)> {
    let whole = terminated((letter, one_sign), tag(":"));
    let (_, (at, sign)) = all_consuming(whole).parse_complete(input).ok()?;
    let minor = input.first().is_some_and(u8::is_ascii_lowercase);
    Some((Pitch::new(at.unsigned_abs(), sign, 4), minor))
}

/// At most one sign, as a tonic has it.
pub(crate) fn one_sign(input: &[u8]) -> Read<'_, i8> {
    alt((
        value(1, alt((tag("#"), tag("♯")))),
        value(-1, alt((tag("b"), tag("♭")))),
        value(0, tag("")),
    ))
    .parse_complete(input)
}

impl fmt::Display for Numeral {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let names = if self.capital { NUMERALS } else { SMALL };
        let index = usize::from(self.degree.saturating_sub(1));
        f.write_str(names.get(index).copied().unwrap_or(""))
    }
}

impl fmt::Display for Chord {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(match self.sign {
            1 => "#",
            -1 => "b",
            _ => "",
        })?;
        write!(f, "{}", self.numeral)?;
        if let Some(quality) = self.quality {
            write!(f, "{quality}")?;
        }
        for (i, figure) in self.figures.iter().enumerate() {
            write!(f, "{}{figure}", if i == 0 { "" } else { "/" })?;
        }
        match self.applied {
            Some(applied) => write!(f, "/{applied}"),
            None => Ok(()),
        }
    }
}

impl fmt::Display for Figure {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        if let Some(sign) = self.sign {
            write!(f, "{sign}")?;
        }
        match self.number {
            Some(number) => write!(f, "{number}"),
            None => Ok(()),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn chords_are_read_and_shown() {
        for (text, shown) in [
            ("I", "I"),
            ("bVI", "bVI"),
            ("viio7/V", "viio7/V"),
            ("ii65", "ii6/5"),
            ("V4/2", "V4/2"),
            ("V7/V", "V7/V"),
            ("viiø7", "viiø7"),
            ("III+", "III+"),
            ("iv6", "iv6"),
        ] {
            let read = chord(text.as_bytes()).unwrap();
            assert_eq!(read.to_string(), shown, "{text}");
        }
        for bad in ["", "VIII", "IIII", "Iv", "V/", "v1", "X", "V7/x"] {
            assert_eq!(chord(bad.as_bytes()), None, "{bad}");
        }
    }

    #[test]
    fn stacks_are_read_and_shown() {
        for text in ["6", "6/5", "#6/4", "b7/5/#", "n", "4/#3"] {
            let read = stack(text.as_bytes()).unwrap();
            let shown: Vec<String> = read.iter().map(Figure::to_string).collect();
            assert_eq!(shown.join("/"), text);
        }
        for bad in ["", "6/", "1", "x", "65", "6#"] {
            assert_eq!(stack(bad.as_bytes()), None, "{bad}");
        }
    }

    #[test]
    fn a_key_in_front_of_its_chord() {
        let (tonic, minor) = key_prefix("e♭:".as_bytes()).unwrap();
        assert_eq!((tonic.class_name().as_str(), minor), ("Eb", true));
        assert_eq!(key_prefix(b"H:"), None);
    }
}
