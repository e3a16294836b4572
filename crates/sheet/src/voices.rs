//! Voice lines: `voice LABEL [KIND] [options]`.

use nom::Parser;
use nom::bytes::complete::tag;
use nom::combinator::all_consuming;
use nom::sequence::separated_pair;

use partwright_score::{Compass, KINDS, Kind, Pitch, Voice};

use crate::chars::Word;
use crate::headers::{tonic, wrong};
use crate::lines::{is_label, is_reserved};
use crate::near::{MOST_GUESSES, near, short};
use crate::parts::{letter, pitch};
use crate::problem::Problem;
use crate::span::Span;

/// The words that begin an option.
const OPTIONS: [&str; 7] = [
    "easy",
    "cantus",
    "species",
    "clef",
    "written",
    "doubles",
    "sixteen-foot",
];
const CLEFS: [&str; 7] = [
    "treble", "soprano", "mezzo", "alto", "tenor", "baritone", "bass",
];

/// A voice as its line declares it.
#[derive(Clone, Debug)]
pub(crate) struct Declared<'a> {
    pub(crate) voice: Voice,
    pub(crate) label: Span,
    /// The label behind `doubles`, looked up when all voices are known.
    pub(crate) doubles: Option<Word<'a>>,
}

/// Why a word cannot be a label, if it cannot.
pub(crate) fn label_fault(word: &str) -> Option<String> {
    if is_reserved(word) {
        Some(format!(
            "{word} is a word of the notation and cannot be a voice's label."
        ))
    } else if is_label(word) {
        None
    } else {
        Some(format!(
            "{} cannot be a label: it is a letter and at most seven more letters or digits, eight \
             in all.",
            short(word)
        ))
    }
}

/// The value of a voice line; nothing if it has no label that can stand.
pub(crate) fn declaration<'a>(
    problems: &mut Vec<Problem>,
    header: Span,
    words: &[Word<'a>],
) -> Option<Declared<'a>> {
    let Some((label, rest)) = words.split_first() else {
        let message = "The label is missing: voice S soprano, for instance.";
        wrong(problems, header, message, &[]);
        return None;
    };
    if let Some(message) = label_fault(label.text) {
        wrong(problems, label.span, &message, &[]);
        return None;
    }
    let kind = rest.first().and_then(|word| Kind::named(word.text));
    let options = if kind.is_some() {
        rest.get(1..).unwrap_or_default()
    } else {
        rest
    };
    let mut line = VoiceLine {
        problems,
        declared: Declared {
            voice: Voice::new(label.text, kind.unwrap_or_else(Kind::plain)),
            label: label.span,
            doubles: None,
        },
        given: Vec::new(),
    };
    let mut left = options;
    while let Some((option, rest)) = left.split_first() {
        let used = line.option(*option, rest);
        left = rest.get(used..).unwrap_or_default();
    }
    Some(line.declared)
}

struct VoiceLine<'p, 'a> {
    problems: &'p mut Vec<Problem>,
    declared: Declared<'a>,
    /// The options met so far, a limit as `..`.
    given: Vec<&'a str>,
}

impl<'a> VoiceLine<'_, 'a> {
    fn wrong(&mut self, span: Span, message: &str, instead: &[&str]) {
        wrong(self.problems, span, message, instead);
    }

    /// Reads an option; returns how many of the words behind it belong to it.
    fn option(&mut self, word: Word<'a>, rest: &[Word<'a>]) -> usize {
        let limit = looks_like_a_range(word.text);
        let name = if limit { ".." } else { word.text };
        let again = self.given.contains(&name);
        if again {
            let message = format!("{} is given twice for one voice.", short(word.text));
            self.wrong(word.span, &message, &[]);
        } else if limit || OPTIONS.contains(&name) {
            self.given.push(name);
        }
        if limit {
            if !again {
                self.declared.voice.limit = self.range(word);
            }
            return 0;
        }
        match word.text {
            "cantus" => self.declared.voice.cantus = true,
            "sixteen-foot" => self.declared.voice.sixteen_foot = true,
            "easy" | "species" | "clef" | "written" | "doubles" => {
                let value = rest
                    .first()
                    .filter(|next| !self.is_option(word.text, next.text));
                let Some(value) = value else {
                    let message = match word.text {
                        "easy" => "easy wants its compass: easy E2..C4.",
                        "species" => "species wants its number, 1 to 5.",
                        "clef" => "clef wants its name: clef alto.",
                        "written" => "written wants the pitch sounded for a C: written Bb.",
                        _ => "doubles wants the label of the other voice.",
                    };
                    self.wrong(word.span, message, &[]);
                    return 0;
                };
                if !again {
                    self.value(word.text, *value);
                }
                return 1;
            }
            other => self.unknown(other, word.span),
        }
        0
    }

    /// Whether the word behind an option is another option and not its value.
    fn is_option(&self, option: &str, next: &str) -> bool {
        OPTIONS.contains(&next) || (option != "easy" && looks_like_a_range(next))
    }

    fn value(&mut self, option: &str, value: Word<'a>) {
        match option {
            "easy" => self.declared.voice.easy = self.range(value),
            "species" => {
                self.declared.voice.species = match value.text {
                    "1" | "2" | "3" | "4" | "5" => value.text.parse().ok(),
                    _ => {
                        self.wrong(value.span, "The species are 1 to 5.", &[]);
                        None
                    }
                }
            }
            "clef" => {
                if CLEFS.contains(&value.text) {
                    self.declared.voice.clef = Some(value.text.to_owned());
                } else {
                    let other = near(value.text, CLEFS.into_iter());
                    let message = format!("Expected a clef: {}.", CLEFS.join(", "));
                    let instead: Vec<&str> = other.into_iter().collect();
                    self.wrong(value.span, &message, &instead);
                }
            }
            "written" => {
                let read = tonic(self.problems, value);
                self.declared.voice.written = read.map(Pitch::class_name);
            }
            _ => self.declared.doubles = Some(value),
        }
    }

    fn unknown(&mut self, word: &str, span: Span) {
        let kinds = || KINDS.iter().map(|kind| kind.name);
        if kinds().any(|kind| kind == word) {
            let message = "The kind of a voice stands once, right behind its label.";
            return self.wrong(span, message, &[]);
        }
        let guess = self.problems.len() < MOST_GUESSES;
        let other = near(word, kinds().chain(OPTIONS).filter(|_| guess));
        let message = match other {
            Some(other) => format!("{} is unknown here. Is {other} meant?", short(word)),
            None => format!(
                "{} is no kind of voice, as alto or viola is, and no option. The options are {}, \
                 and a compass such as E2..D4.",
                short(word),
                OPTIONS.join(", ")
            ),
        };
        let instead: Vec<&str> = other.into_iter().collect();
        self.wrong(span, &message, &instead);
    }

    fn range(&mut self, word: Word<'_>) -> Option<Compass> {
        let ends = |between: &'static str| {
            all_consuming(separated_pair(pitch, tag(between), pitch))
                .parse_complete(word.text.as_bytes())
                .ok()
                .map(|(_, ends)| ends)
        };
        let (dotted, found) = match ends("..") {
            Some(found) => (true, Some(found)),
            None => (
                false,
                ends("-").or_else(|| ends(".")).or_else(|| ends("...")),
            ),
        };
        let Some(((low, low_sign, low_octave), (high, high_sign, high_octave))) = found else {
            let message = format!(
                "{} is no compass. Expected the lowest and the highest pitch with two dots \
                 between: E2..D4.",
                short(word.text)
            );
            self.wrong(word.span, &message, &[]);
            return None;
        };
        let (Some(low_octave), Some(high_octave)) = (low_octave, high_octave) else {
            let message = "Both ends of a compass have their octave figure: E2..D4.";
            self.wrong(word.span, message, &[]);
            return None;
        };
        let of = |at: i8, sign: i8, octave: u8| Pitch::new(at.unsigned_abs(), sign, octave as i8);
        let low = of(low, low_sign, low_octave);
        let high = of(high, high_sign, high_octave);
        if !dotted {
            let instead = format!("{low}..{high}");
            let message = format!("Two dots stand between the ends of a compass: {instead}.");
            self.wrong(word.span, &message, &[&instead]);
            return None;
        }
        if low.place().semitone > high.place().semitone {
            let instead = format!("{high}..{low}");
            let message = format!("The lower end of a compass stands first: {instead}.");
            self.wrong(word.span, &message, &[&instead]);
            return None;
        }
        Some(Compass { low, high })
    }
}

/// Whether a word was meant for a compass: a pitch, then dots or a hyphen.
fn looks_like_a_range(word: &str) -> bool {
    let bytes = word.as_bytes();
    let after_pitch = pitch(bytes).is_ok_and(|(rest, _)| matches!(rest, [b'.' | b'-', _, ..]));
    letter(bytes).is_ok() && (word.contains("..") || after_pitch)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::chars::words;

    fn declare(text: &str) -> (Option<Voice>, Vec<String>) {
        let mut problems = Vec::new();
        let words: Vec<_> = words(text, 0, text.len()).collect();
        let declared = declaration(&mut problems, Span::new(0, 0), &words);
        let messages = problems.into_iter().map(|p| p.message).collect();
        (declared.map(|d| d.voice), messages)
    }

    #[test]
    fn options_in_any_order() {
        let (voice, messages) =
            declare("V alto easy A3..B4 written Bb species 3 F3..D5 clef bass cantus sixteen-foot");
        let voice = voice.unwrap();
        assert_eq!(messages, Vec::<String>::new());
        assert_eq!(voice.kind.name, "alto");
        assert_eq!(voice.limit.unwrap().low.to_string(), "F3");
        assert_eq!(voice.easy.unwrap().high.to_string(), "B4");
        assert_eq!(voice.species, Some(3));
        assert_eq!(voice.written.as_deref(), Some("Bb"));
        assert!(voice.cantus && voice.sixteen_foot);
    }

    #[test]
    fn what_is_wrong_is_left_out_and_told_once() {
        for text in [
            "",
            "1S",
            "key",
            "S sopran",
            "S alto bass",
            "S E2..",
            "S E2-D4",
            "S D4..E2",
            "S E..D4",
            "S easy",
            "S easy cantus",
            "S species",
            "S species 6",
            "S species x cantus",
            "S clef",
            "S clef quay",
            "S written H",
            "S doubles",
            "S cantus cantus",
            "S easy A3..B4 easy A3..C4",
            "S xyz",
        ] {
            assert_eq!(declare(text).1.len(), 1, "{text}");
        }
    }
}
