//! The grammar of parts: `F#4`, `F#`, `-`, `_`, `?`, `=S-8`, with their marks.

use nom::branch::alt;
use nom::bytes::complete::tag;
use nom::character::complete::{alpha1, one_of};
use nom::combinator::{map, opt, value, verify};
use nom::multi::fold_many0;
use nom::sequence::preceded;
use nom::{IResult, Parser};

use crate::lines::is_label;
use crate::tree::{BREATH, FERMATA, MARKED, PartKind};

/// What the combinators return: bytes in, no error detail (a bad part is explained elsewhere).
pub(crate) type Read<'a, T> = IResult<&'a [u8], T, ()>;

/// A part as it is written.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) struct Written {
    pub(crate) kind: PartKind,
    /// Letter of a note, 0 = C … 6 = B; octaves of a copy.
    pub(crate) letter: i8,
    pub(crate) sign: i8,
    pub(crate) octave: Option<u8>,
    pub(crate) flags: u8,
}

/// The letters of notes, from C.
pub(crate) const LETTERS: [char; 7] = ['C', 'D', 'E', 'F', 'G', 'A', 'B'];

const NONE: nom::Err<()> = nom::Err::Error(());

/// A note letter, either case.
pub(crate) fn letter(input: &[u8]) -> Read<'_, i8> {
    let Some((first, rest)) = input.split_first() else {
        return Err(NONE);
    };
    let place = match first | 0x20 {
        b'c' => 0,
        b'd' => 1,
        b'e' => 2,
        b'f' => 3,
        b'g' => 4,
        b'a' => 5,
        b'b' => 6,
        _ => return Err(NONE),
    };
    Ok((rest, place))
}

/// The signs in front of which no other may stand, longest first.
fn written_sign(input: &[u8]) -> Read<'_, i8> {
    alt((
        value(2, alt((tag("##"), tag("♯♯"), tag("x"), tag("𝄪")))),
        value(-2, alt((tag("bb"), tag("♭♭"), tag("𝄫")))),
        value(1, alt((tag("#"), tag("♯")))),
        value(-1, alt((tag("b"), tag("♭")))),
        value(0, tag("♮")),
    ))
    .parse_complete(input)
}

/// A sign, or none.
pub(crate) fn sign(input: &[u8]) -> Read<'_, i8> {
    match input.first() {
        Some(b'#' | b'b' | b'x' | 0xe2 | 0xf0) => {
            map(opt(written_sign), Option::unwrap_or_default).parse_complete(input)
        }
        _ => Ok((input, 0)),
    }
}

fn octave(input: &[u8]) -> Read<'_, u8> {
    map(one_of("0123456789"), |c| c as u8 - b'0').parse_complete(input)
}

/// A letter, its sign and its octave figure if there is one.
pub(crate) fn pitch(input: &[u8]) -> Read<'_, (i8, i8, Option<u8>)> {
    (letter, sign, opt(octave)).parse_complete(input)
}

fn note(input: &[u8]) -> Read<'_, Written> {
    map(pitch, |(letter, sign, octave)| Written {
        kind: PartKind::Note,
        letter,
        sign,
        octave,
        flags: 0,
    })
    .parse_complete(input)
}

fn plain(kind: PartKind) -> Written {
    Written {
        kind,
        letter: 0,
        sign: 0,
        octave: None,
        flags: 0,
    }
}

/// The marks after a part, all together.
pub(crate) fn marks(input: &[u8]) -> Read<'_, u8> {
    match input.first() {
        Some(b'^' | b',' | b'*') => fold_many0(
            alt((
                value(FERMATA, tag("^")),
                value(BREATH, tag(",")),
                value(MARKED, preceded(tag("*"), alpha1)),
            )),
            || 0,
            |all, mark| all | mark,
        )
        .parse_complete(input),
        _ => Ok((input, 0)),
    }
}

/// A part without its marks.
pub(crate) fn bare_part(input: &[u8]) -> Read<'_, Written> {
    match input.first() {
        Some(b'-') => map(tag("-"), |_| plain(PartKind::Hold)).parse_complete(input),
        Some(b'_') => map(tag("_"), |_| plain(PartKind::Rest)).parse_complete(input),
        Some(b'?') => map(tag("?"), |_| plain(PartKind::Unwritten)).parse_complete(input),
        _ => note(input),
    }
}

/// A part with its marks.
pub(crate) fn part(input: &[u8]) -> Read<'_, Written> {
    let (rest, written) = bare_part(input)?;
    if written.kind == PartKind::Unwritten {
        return Ok((rest, written));
    }
    let (rest, flags) = marks(rest)?;
    Ok((rest, Written { flags, ..written }))
}

/// `=S`, `=S-8`, `=S+8`.
pub(crate) fn copy(input: &[u8]) -> Read<'_, Written> {
    let octaves = alt((value(-1, tag("-8")), value(1, tag("+8"))));
    let (rest, (_, shift)) = preceded(tag("="), (label, opt(octaves))).parse_complete(input)?;
    let mut written = plain(PartKind::Copy);
    written.letter = shift.unwrap_or(0);
    Ok((rest, written))
}

/// A label, whatever it may name.
pub(crate) fn label(input: &[u8]) -> Read<'_, &str> {
    let letters = nom::bytes::complete::take_while1(|b: u8| b.is_ascii_alphanumeric());
    verify(map(letters, text), |word: &str| is_label(word)).parse_complete(input)
}

/// Bytes known to be text as text.
pub(crate) fn text(bytes: &[u8]) -> &str {
    std::str::from_utf8(bytes).unwrap_or_default()
}

/// Whether the first word could be a cell of music: enough to tell a row whose first bar line was
/// forgotten.
pub(crate) fn begins_like_a_part(input: &[u8]) -> bool {
    let ends = |rest: &[u8]| crate::tree::part_ends_at(rest, 0);
    part(input).is_ok_and(|(rest, _)| ends(rest)) || copy(input).is_ok_and(|(rest, _)| ends(rest))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn read(text: &str) -> Option<(i8, i8, Option<u8>)> {
        match part(text.as_bytes()) {
            Ok((b"", w)) if w.kind == PartKind::Note => Some((w.letter, w.sign, w.octave)),
            _ => None,
        }
    }

    #[test]
    fn pitches_in_all_spellings() {
        assert_eq!(read("F#4"), Some((3, 1, Some(4))));
        for sharp in ["f##4", "Fx4", "F♯♯4", "F𝄪4"] {
            assert_eq!(read(sharp), Some((3, 2, Some(4))), "{sharp}");
        }
        for flat in ["bbb", "B𝄫", "B♭♭"] {
            assert_eq!(read(flat), Some((6, -2, None)), "{flat}");
        }
        assert_eq!(read("C♮5"), Some((0, 0, Some(5))));
        for bad in ["H4", "#F", "F#b", "F###", "", "4"] {
            assert_eq!(read(bad), None, "{bad}");
        }
    }

    #[test]
    fn marks_in_any_order() {
        let (rest, written) = part(b"-,*ab^ x").unwrap();
        assert_eq!(rest, b" x");
        assert_eq!(written.flags, FERMATA | BREATH | MARKED);
        assert_eq!(part(b"G4*1").unwrap().0, b"*1");
        assert_eq!(part(b"?^").unwrap().0, b"^");
    }

    #[test]
    fn copies() {
        let (rest, written) = copy(b"=S1-8").unwrap();
        assert_eq!((rest, written.letter), (&b""[..], -1));
        assert!(copy(b"=1").is_err());
    }
}
