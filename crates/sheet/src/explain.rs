//! Why a part could not be read, in a musician's words, and what was probably meant.
//!
//! Only parts that the grammar refuses come here, so nothing here needs to be fast.

use nom::Parser;
use nom::combinator::{all_consuming, opt};
use nom::multi::many_m_n;

use crate::lines::is_label;
use crate::near::short;
use crate::parts::{LETTERS, Read, bare_part, letter, pitch, sign};

/// An unreadable part, explained.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) struct Explained {
    /// What was expected.
    pub(crate) message: String,
    /// What could stand there instead, the likeliest first.
    pub(crate) instead: Vec<String>,
    /// Alone in a bar it was meant for the whole bar.
    pub(crate) throughout: bool,
}

fn explained(message: impl Into<String>, instead: &[&str]) -> Explained {
    Explained {
        message: message.into(),
        instead: instead.iter().map(|&text| text.to_owned()).collect(),
        throughout: false,
    }
}

/// Explains a part that is none, given without its marks.
pub(crate) fn explain(part: &str) -> Explained {
    let rules: [fn(&str) -> Option<Explained>; 12] = [
        backslash,
        strokes,
        copies,
        not_in_version_1,
        other_languages,
        rests,
        capital_flat,
        misplaced_sign,
        too_many_signs,
        figures,
        run_together,
        other_letters,
    ];
    rules.iter().find_map(|rule| rule(part)).unwrap_or_else(|| {
        explained(
            format!(
                "{} is no note. Expected a letter A to G with its sign and octave figure, as in \
                 F#4, or - to go on, _ for silence, ? for not written yet.",
                short(part)
            ),
            &[],
        )
    })
}

fn backslash(part: &str) -> Option<Explained> {
    part.contains('\\').then(|| {
        explained(
            "A backslash (\\) makes a character plain in titles, words and reasons; among the \
             notes it has no place.",
            &[&part.replace('\\', "")],
        )
    })
}

/// Dashes and underscores in other shapes.
fn strokes(part: &str) -> Option<Explained> {
    let all = |set: &[char]| part.chars().all(|c| set.contains(&c));
    let count = part.chars().count();
    let spaced = |with: &str| vec![with; count].join(" ");
    let found = if count > 1 && all(&['-']) {
        let instead = spaced("-");
        explained(
            format!(
                "Every beat has its own dash, with a blank between: write {}.",
                short(&instead)
            ),
            &[&instead],
        )
    } else if count > 1 && all(&['_']) {
        let instead = spaced("_");
        explained(
            format!(
                "Every silent beat has its own underscore: write {}.",
                short(&instead)
            ),
            &[&instead],
        )
    } else if all(&['‐', '‑', '‒', '–', '—', '―', '−']) {
        explained("The dash that goes on is the plain one: write -.", &["-"])
    } else {
        return None;
    };
    Some(Explained {
        throughout: true,
        ..found
    })
}

fn copies(part: &str) -> Option<Explained> {
    let body = part.strip_prefix('=')?;
    let label: String = body
        .chars()
        .take_while(char::is_ascii_alphanumeric)
        .collect();
    let rest = body.get(label.len()..).unwrap_or_default();
    let way = rest.chars().next().filter(|c| matches!(c, '-' | '+'));
    let instead = match way {
        Some(way) if is_label(&label) => vec![format!("={label}{way}8")],
        None if is_label(&label) => vec![format!("={label}")],
        _ => Vec::new(),
    };
    Some(Explained {
        message: "A copied bar is = and a voice's label, alone in the bar: =S, or an octave off \
                  =S-8 and =S+8."
            .to_owned(),
        instead,
        throughout: true,
    })
}

/// What version 1 has no writing for.
fn not_in_version_1(part: &str) -> Option<Explained> {
    let has = |set: &[char]| part.contains(set);
    let message = if has(&['(', ')']) {
        "Version 1 has no slurs: write the notes without them."
    } else if has(&['{', '}']) {
        "Version 1 has no grace notes: give the note its share of the beat."
    } else if has(&['~']) {
        "Version 1 has no ties as marks: a note that lasts goes on with -."
    } else if has(&['<', '>', '[', ']', '+', '/', '&']) {
        "A voice sings one note at a time; two notes at once (divisi) are two voices, each with a \
         row of its own."
    } else {
        return None;
    };
    let bare = part.replace(['(', ')'], "");
    let readable = all_consuming(bare_part)
        .parse_complete(bare.as_bytes())
        .is_ok();
    let instead = if readable {
        vec![bare.as_str()]
    } else {
        vec![]
    };
    Some(explained(message, &instead))
}

/// A pitch as the notation writes it.
fn written(letter: i8, sign: i8, octave: &str) -> String {
    let name = usize::try_from(letter).ok().and_then(|i| LETTERS.get(i));
    let sign = match sign {
        -2 => "bb",
        -1 => "b",
        1 => "#",
        2 => "##",
        _ => "",
    };
    format!("{}{sign}{octave}", name.unwrap_or(&'C'))
}

const LATIN: [(&str, i8); 9] = [
    ("sol", 4),
    ("do", 0),
    ("ut", 0),
    ("re", 1),
    ("mi", 2),
    ("fa", 3),
    ("la", 5),
    ("si", 6),
    ("ti", 6),
];

/// A German note name and what follows it: `fis`, `as`, `heses`.
fn german(name: &str) -> Option<(i8, i8, &str)> {
    let first = name.chars().next()?;
    let at = match first {
        'h' => 6,
        _ => letter(name.as_bytes()).ok()?.1,
    };
    let rest = name.get(first.len_utf8()..)?;
    let endings: &[(&str, i8)] = match first {
        'a' => &[("isis", 2), ("is", 1), ("ses", -2), ("s", -1)],
        'e' => &[("isis", 2), ("is", 1), ("ses", -2), ("s", -1)],
        'b' => &[],
        _ => &[("isis", 2), ("is", 1), ("eses", -2), ("es", -1)],
    };
    for (ending, sign) in endings {
        if let Some(after) = rest.strip_prefix(ending) {
            return Some((at, *sign, after));
        }
    }
    (first == 'h').then_some((at, 0, rest))
}

/// The language of a note name that is not ours, and the name in our letters.
pub(crate) fn foreign(name: &str) -> Option<(&'static str, String)> {
    let lower = name.to_lowercase().replace('é', "e");
    let latin = LATIN.iter().find_map(|&(syllable, at)| {
        let after = lower.strip_prefix(syllable)?;
        Some(("Latin", at, 0, after))
    });
    let found = latin.or_else(|| german(&lower).map(|(at, s, after)| ("German", at, s, after)));
    let (language, at, base, after) = found?;
    let (digits, extra) = sign(after.as_bytes()).ok()?;
    let digits = std::str::from_utf8(digits).ok()?;
    let whole = digits.len() <= 1 && digits.bytes().all(|b| b.is_ascii_digit());
    let both = base + extra;
    let lawful = whole && (-2..=2).contains(&both) && (base == 0 || extra == 0);
    lawful.then(|| (language, written(at, both, digits)))
}

fn other_languages(part: &str) -> Option<Explained> {
    let (language, instead) = foreign(part)?;
    Some(explained(
        format!("{part} is a {language} note name; here it is {instead}."),
        &[&instead],
    ))
}

fn rests(part: &str) -> Option<Explained> {
    let name = part.trim_end_matches(|c: char| c.is_ascii_digit());
    let rest = ["r", "R", "rest", "z"].contains(&name);
    rest.then(|| explained("Silence is written with an underscore: _.", &["_"]))
}

/// `BB2`, `EBB4`: a flat typed as a capital.
fn capital_flat(part: &str) -> Option<Explained> {
    let body = part.trim_end_matches(|c: char| c.is_ascii_digit());
    let figure = part.get(body.len()..)?;
    let (first, flats) = body.split_at_checked(1)?;
    let capital = first.starts_with(|c: char| matches!(c, 'A'..='G'));
    if !capital || !matches!(flats, "B" | "BB") || figure.len() > 1 {
        return None;
    }
    if figure.is_empty() && body != "BB" {
        return None;
    }
    let instead = format!("{first}{}{figure}", flats.to_lowercase());
    Some(explained(
        format!("A flat is a small b behind its letter: {instead}?"),
        &[&instead],
    ))
}

/// `#F4`, `F4#`.
fn misplaced_sign(part: &str) -> Option<Explained> {
    let bytes = part.as_bytes();
    let before = all_consuming((
        sign,
        letter,
        opt(nom::character::complete::one_of("0123456789")),
    ))
    .parse_complete(bytes);
    let after = all_consuming((letter, nom::character::complete::one_of("0123456789"), sign))
        .parse_complete(bytes);
    let instead = match (before, after) {
        (Ok((_, (sign, at, figure))), _) => {
            written(at, sign, &figure.map(String::from).unwrap_or_default())
        }
        (_, Ok((_, (at, figure, sign)))) => written(at, sign, &figure.to_string()),
        _ => return None,
    };
    Some(explained(
        format!("A sign stands between its letter and the octave figure: {instead}."),
        &[&instead],
    ))
}

const SIGNS: [char; 7] = ['#', '♯', 'x', '𝄪', 'b', '♭', '𝄫'];

fn too_many_signs(part: &str) -> Option<Explained> {
    let (rest, at) = letter(part.as_bytes()).ok()?;
    let rest = std::str::from_utf8(rest).ok()?;
    let figure = rest.trim_start_matches(|c| SIGNS.contains(&c) || c == '♮');
    let signs = rest.get(..rest.len() - figure.len())?;
    let whole = figure.len() <= 1 && figure.bytes().all(|b| b.is_ascii_digit());
    if signs.is_empty() || !whole {
        return None;
    }
    let sharp = signs.contains(['#', '♯', 'x', '𝄪']);
    let flat = signs.contains(['b', '♭', '𝄫']);
    if sharp && flat {
        let (sharpened, flattened) = (written(at, 1, figure), written(at, -1, figure));
        return Some(explained(
            format!("A note has one kind of sign, sharp or flat: {sharpened} or {flattened}."),
            &[&sharpened, &flattened],
        ));
    }
    let double = written(at, if sharp { 2 } else { -2 }, figure);
    Some(explained(
        format!("A note has at most two signs, of one shape: {double}."),
        &[&double],
    ))
}

/// Octave figures without a letter, of two digits, below 0; and numbers.
fn figures(part: &str) -> Option<Explained> {
    if part.bytes().all(|b| b.is_ascii_digit()) {
        return Some(if part.len() == 1 {
            explained(
                format!("An octave figure stands behind its letter; {part} alone is no note."),
                &[],
            )
        } else {
            explained(
                "Expected a pitch, a letter with its octave figure (middle C is C4), not a \
                 number.",
                &[],
            )
        });
    }
    if part.chars().all(|c| SIGNS.contains(&c) || c == '♮') {
        return Some(explained(
            format!(
                "A sign stands behind its letter; {} alone is no note.",
                short(part)
            ),
            &[],
        ));
    }
    let (rest, _) = (letter, sign).parse_complete(part.as_bytes()).ok()?;
    let digits = rest.strip_prefix(b"-").unwrap_or(rest);
    let number = !digits.is_empty() && digits.iter().all(u8::is_ascii_digit);
    number.then(|| {
        explained(
            "The octave figure is one figure, 0 to 9 (middle C is C4); lengths are written with \
             dashes and dots.",
            &[],
        )
    })
}

/// `G4A4`: several parts without a blank.
fn run_together(part: &str) -> Option<Explained> {
    let one = |input| -> Read<'_, usize> {
        let (rest, _) = bare_part(input)?;
        Ok((rest, input.len() - rest.len()))
    };
    let (_, lengths) = all_consuming(many_m_n(2, 64, one))
        .parse_complete(part.as_bytes())
        .ok()?;
    let mut at = 0;
    let pieces: Vec<&str> = lengths
        .into_iter()
        .map(|n| {
            at += n;
            part.get(at - n..at).unwrap_or_default()
        })
        .collect();
    let (spaced, joined) = (pieces.join(" "), pieces.join("."));
    Some(explained(
        format!("A blank parts two beats, a dot two notes of one beat: {spaced} or {joined}."),
        &[&spaced, &joined],
    ))
}

fn other_letters(part: &str) -> Option<Explained> {
    let helmholtz = part.trim_end_matches(['\'', '’']);
    let strokes = part.chars().count() - helmholtz.chars().count();
    if strokes > 0
        && let Ok((b"", (at, sign, None))) = pitch(helmholtz.as_bytes())
    {
        let octave = (3 + strokes).min(9).to_string();
        let instead = written(at, sign, &octave);
        return Some(explained(
            format!("The octave is a figure behind the letter (middle C is C4): {instead}."),
            &[&instead],
        ));
    }
    let body = part.trim_end_matches(|c: char| c.is_ascii_digit() || SIGNS.contains(&c));
    let alone = body.chars().count() == 1 && body.chars().all(char::is_alphabetic);
    alone.then(|| {
        explained(
            format!("Notes are named A to G; {body} is none of them."),
            &[],
        )
    })
}

/// Words among the notes that take no beat of their own, as a whole cell: why they cannot stand.
pub(crate) fn beatless(cell: &str) -> Option<&'static str> {
    const DYNAMICS: [&str; 22] = [
        "p", "pp", "ppp", "pppp", "mp", "mf", "ff", "fff", "ffff", "sf", "sfz", "fz", "fp", "rfz",
        "<", ">", "cresc", "cresc.", "decresc", "decresc.", "dim", "dim.",
    ];
    if DYNAMICS.contains(&cell) {
        return Some("Version 1 has no dynamics: leave them to the printed parts.");
    }
    if cell == ":" || cell == "%" {
        return Some(REPEAT);
    }
    let volta = cell
        .bytes()
        .all(|b| b.is_ascii_digit() || b".,[]".contains(&b))
        && cell.bytes().any(|b| b.is_ascii_digit())
        && (cell.ends_with('.') || cell.contains(['[', ']']));
    if volta {
        return Some("Version 1 has no voltas (first- and second-time bars): write the bars out.");
    }
    let marks = crate::parts::marks(cell.as_bytes()).is_ok_and(|(rest, _)| rest.is_empty());
    (marks && !cell.is_empty())
        .then_some("A mark stands right behind its part, without a blank between.")
}

/// What is said about repeat signs.
pub(crate) const REPEAT: &str = "Version 1 has no repeats: write the repeated bars out.";

#[cfg(test)]
mod tests {
    use super::*;

    fn offered(part: &str) -> String {
        explain(part).instead.join(" / ")
    }

    #[test]
    fn the_nearest_right_form_is_offered() {
        for (part, instead) in [
            ("H4", "B4"),
            ("h", "B"),
            ("His3", "B#3"),
            ("Hb4", "Bb4"),
            ("Fis4", "F#4"),
            ("Es4", "Eb4"),
            ("As", "Ab"),
            ("ases4", "Abb4"),
            ("Des5", "Db5"),
            ("gisis", "G##"),
            ("do5", "C5"),
            ("Sol", "G"),
            ("ré4", "D4"),
            ("sib3", "Bb3"),
            ("Fa#4", "F#4"),
            ("BB2", "Bb2"),
            ("EBB4", "Ebb4"),
            ("#F4", "F#4"),
            ("F4#", "F#4"),
            ("C#b4", "C#4 / Cb4"),
            ("C###4", "C##4"),
            ("G4A4", "G4 A4 / G4.A4"),
            ("G4-", "G4 - / G4.-"),
            ("--", "- -"),
            ("—", "-"),
            ("r4", "_"),
            ("=S-15", "=S-8"),
            ("=-8", ""),
            ("c''", "C5"),
            ("(G4", "G4"),
        ] {
            assert_eq!(offered(part), instead, "{part}");
        }
    }

    #[test]
    fn what_is_offered_can_be_read() {
        for part in ["H4", "fis", "BB2", "C###4", "F4#", "sib3", "c'", "C#b"] {
            for instead in explain(part).instead {
                let read = all_consuming(bare_part).parse_complete(instead.as_bytes());
                assert!(read.is_ok(), "{part}: {instead}");
            }
        }
    }

    #[test]
    fn some_words_take_no_beat() {
        for cell in ["mf", "ff", "<", ":", "1.", "[2.", "^", "*a"] {
            assert!(beatless(cell).is_some(), "{cell}");
        }
        for cell in ["f", "5", "60", "D", ""] {
            assert!(beatless(cell).is_none(), "{cell}");
        }
    }
}
