//! Labels and kinds from the names of voices.

use std::collections::HashSet;

use partwright_score::{KINDS, Kind, Voice};

use crate::lines::{is_label, is_reserved};

/// How a voice is called in the sheet.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) struct Label {
    /// What its rows carry.
    pub(super) label: String,
    /// What it is.
    pub(super) kind: &'static Kind,
    /// The name it had, where neither label nor kind says it.
    pub(super) name: Option<String>,
}

/// The usual short forms of the kinds (common practice in scores), in their order.
const SHORT: [&str; 20] = [
    "S", "M", "A", "T", "Bar", "B", "Vn", "Va", "Vc", "Db", "Fl", "Ob", "Cl", "Bn", "Hn", "Tpt",
    "Tbn", "Tba", "Org", "V",
];

/// Other words for kinds.
const OTHER: [(&str, &str); 8] = [
    ("mezzosoprano", "mezzo"),
    ("basses", "bass"),
    ("contrabass", "doublebass"),
    ("contrabasses", "doublebass"),
    ("doublebasses", "doublebass"),
    ("violoncello", "cello"),
    ("violoncellos", "cello"),
    ("frenchhorn", "horn"),
];

/// Lawful labels, each another, in the order of the voices.
pub(super) fn labels(voices: &[Voice]) -> Vec<Label> {
    // Where one of them is a name and no label, so are the other long ones.
    let named = voices.iter().any(|voice| {
        let plain = voice.kind == Kind::plain();
        !is_lawful(&voice.label) || (plain && kind_named(&voice.label).is_some())
    });
    let proposals = voices.iter().map(|voice| proposal(voice, named));
    let proposals: Vec<Proposal> = proposals.collect();
    let mut taken: HashSet<String> = HashSet::new();
    let mut labels: Vec<Option<String>> = vec![None; voices.len()];
    // Labels that can stay as they are come first.
    for stays in [true, false] {
        for (proposal, label) in proposals.iter().zip(&mut labels) {
            if proposal.stays == stays {
                *label = Some(unlike(&proposal.label, &mut taken));
            }
        }
    }
    let said = |label: &str, kind: &Kind, name: &str| {
        let by_kind = kind_named(name).is_some_and(|(named, short, number)| {
            let same = number.is_empty() || label == format!("{short}{number}");
            named.name == kind.name && label.starts_with(short) && same
        });
        by_kind || words(name).concat() == label || name.is_empty()
    };
    let all = voices.iter().zip(proposals).zip(labels);
    all.map(|((voice, proposal), label)| {
        let label = label.unwrap_or_default();
        let name = voice.label.split_whitespace().collect::<Vec<_>>().join(" ");
        Label {
            name: (!said(&label, proposal.kind, &name)).then_some(name),
            kind: proposal.kind,
            label,
        }
    })
    .collect()
}

struct Proposal {
    label: String,
    kind: &'static Kind,
    /// It is the label the voice has.
    stays: bool,
}

fn is_lawful(label: &str) -> bool {
    is_label(label) && !is_reserved(label)
}

fn proposal(voice: &Voice, named: bool) -> Proposal {
    let plain = voice.kind == Kind::plain();
    let stays = is_lawful(&voice.label) && !(named && plain && voice.label.len() > 3);
    let kind = kind_named(&voice.label).filter(|_| !stays);
    let label = match &kind {
        _ if stays => voice.label.clone(),
        Some((_, short, number)) => format!("{short}{number}"),
        None => initials(&voice.label),
    };
    Proposal {
        label,
        kind: match kind {
            Some((kind, ..)) if plain => kind,
            _ => voice.kind,
        },
        stays,
    }
}

/// The words of a name: letters and digits without accents and marks, numbers apart from letters.
fn words(name: &str) -> Vec<String> {
    let mut words = vec![String::new()];
    let mut digits = false;
    for c in name.chars() {
        // The long s of old prints.
        let c = if c == 'ſ' { 's' } else { c };
        if !c.is_alphanumeric() || c.is_ascii_digit() != digits {
            words.push(String::new());
        }
        digits = c.is_ascii_digit();
        if c.is_ascii_alphanumeric()
            && let Some(word) = words.last_mut()
        {
            word.push(c);
        }
    }
    words.retain(|word| !word.is_empty());
    words
}

/// The number a word is, as digits.
fn number(word: &str) -> Option<String> {
    const ROMAN: [&str; 12] = [
        "I", "II", "III", "IV", "V", "VI", "VII", "VIII", "IX", "X", "XI", "XII",
    ];
    if word.len() <= 2 && word.bytes().all(|b| b.is_ascii_digit()) {
        return Some(word.to_owned());
    }
    let roman = ROMAN.iter().position(|roman| *roman == word)?;
    Some((roman + 1).to_string())
}

/// The kind a name states, with its short form and a number behind it: `Soprano`, `Violin II`.
fn kind_named(name: &str) -> Option<(&'static Kind, &'static str, String)> {
    let mut words = words(name);
    let mut digits = String::new();
    if words.len() > 1
        && let Some(found) = words.last().and_then(|word| number(word))
    {
        digits = found;
        words.pop();
    }
    let word = words.concat().to_lowercase();
    let other = OTHER.iter().find(|(other, _)| *other == word);
    let word = other.map_or(word.as_str(), |(_, kind)| kind);
    let same = |kind: &Kind| word == kind.name || word.strip_suffix('s') == Some(kind.name);
    let index = KINDS.iter().position(same)?;
    Some((KINDS.get(index)?, SHORT.get(index)?, digits))
}

/// A label from the first letters of a name and its number: `counterpoint 1` gives `C1`.
fn initials(name: &str) -> String {
    let words = words(name);
    let initial = |(i, word): (usize, &String)| match number(word).filter(|_| i > 0) {
        Some(number) => Some(number),
        None => Some(word.get(..1)?.to_uppercase()),
    };
    let mut label: String = words.iter().enumerate().filter_map(initial).collect();
    label.truncate(8);
    if is_lawful(&label) {
        label
    } else {
        "V".to_owned()
    }
}

/// The label itself, or with a number behind it that makes it another than those taken.
fn unlike(label: &str, taken: &mut HashSet<String>) -> String {
    let mut found = label.to_owned();
    for number in 2_usize.. {
        if taken.insert(found.clone()) {
            break;
        }
        let number = number.to_string();
        let stem = label.trim_end_matches(|c: char| c.is_ascii_digit());
        let room = 8_usize.saturating_sub(number.len());
        found = format!("{}{number}", stem.get(..room).unwrap_or(stem));
    }
    found
}

#[cfg(test)]
mod tests {
    use super::*;

    fn named(names: &[&str]) -> String {
        let voices: Vec<Voice> = names.iter().map(|n| Voice::new(n, Kind::plain())).collect();
        let show = |l: Label| {
            let name = l.name.map_or(String::new(), |name| format!(" ({name})"));
            format!("{} {}{name}", l.label, l.kind.name)
        };
        let shown: Vec<String> = labels(&voices).into_iter().map(show).collect();
        shown.join(", ")
    }

    #[test]
    fn labels_and_kinds_come_from_names() {
        assert_eq!(
            named(&["Soprano", "Alto", "Tenor", "Bass"]),
            "S soprano, A alto, T tenor, B bass"
        );
        assert_eq!(
            named(&["counterpoint 1", "counterpoint 2", "cantus firmus"]),
            "C1 voice (counterpoint 1), C2 voice (counterpoint 2), CF voice (cantus firmus)"
        );
        assert_eq!(
            named(&["Violin I", "Violin II", "Double Bass", "Mezzo-soprano 2"]),
            "Vn1 violin, Vn2 violin, Db doublebass, \
             M2 mezzo"
        );
        assert_eq!(
            named(&["Baſsus II.", "[Cantus.]", "Bass clarinet", "S", "cantus"]),
            "B2 voice (Baſsus II.), C voice ([Cantus.]), BC voice (Bass clarinet), S voice, \
             C2 voice (cantus)"
        );
    }

    #[test]
    fn labels_are_lawful_and_each_another() {
        assert_eq!(
            named(&["Soprano", "Soprano", "S", "", "Ж", "1", "line"]),
            "S2 soprano, S3 soprano, S voice, V voice, V2 voice (Ж), V3 voice (1), L voice (line)"
        );
        assert_eq!(
            named(&["Lampmen1", "Lampmen1", "Quay"]),
            "Lampmen1 voice, Lampmen2 voice (Lampmen1), Quay voice"
        );
        assert_eq!(
            named(&["CANTVS", "ALTVS", "TENOR", "BASSVS"]),
            "C voice (CANTVS), A voice (ALTVS), T tenor, B voice (BASSVS)"
        );
    }

    #[test]
    fn every_kind_has_its_short_form() {
        for kind in &KINDS {
            let (found, short, _) = kind_named(kind.name).unwrap();
            assert_eq!(found.name, kind.name);
            assert!(is_label(short) && !is_reserved(short));
        }
    }
}
