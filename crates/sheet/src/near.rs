//! The nearest right word for a mistyped one.

use strsim::damerau_levenshtein;

/// The most nearest words looked for in one sheet: measuring words against each other is slow, and
/// whoever mistypes thousands has other troubles.
pub(crate) const MOST_GUESSES: usize = 2_000;

/// The candidate nearest to a word, if one is near enough to have been meant.
pub(crate) fn near<'a>(word: &str, candidates: impl Iterator<Item = &'a str>) -> Option<&'a str> {
    let word = word.trim_end_matches(':').to_lowercase();
    let letters = word.chars().count();
    let allowed = match letters {
        0..=2 => 0,
        3..=4 => 1,
        5..=24 => 2,
        // Longer than any word of ours: not worth measuring.
        _ => return None,
    };
    let mut best: Option<(usize, &str)> = None;
    for candidate in candidates {
        if candidate.chars().count().abs_diff(letters) > allowed {
            continue;
        }
        let distance = damerau_levenshtein(&word, &candidate.to_lowercase());
        if distance <= allowed && best.is_none_or(|(least, _)| distance < least) {
            best = Some((distance, candidate));
        }
    }
    best.map(|(_, candidate)| candidate)
}

/// A piece of the text short enough for a message.
pub(crate) fn short(text: &str) -> String {
    if text.chars().nth(24).is_none() {
        return text.to_owned();
    }
    text.chars().take(23).chain(['…']).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn near_words() {
        let kinds = || ["soprano", "alto", "tenor", "S", "s2"].into_iter();
        assert_eq!(near("soparno", kinds()), Some("soprano"));
        assert_eq!(near("Alto", kinds()), Some("alto"));
        assert_eq!(near("title:", ["title"].into_iter()), Some("title"));
        assert_eq!(near("B", kinds()), None);
        assert_eq!(near("S2", kinds()), Some("s2"));
        assert_eq!(near("weather", kinds()), None);
    }

    #[test]
    fn long_pieces_are_shortened() {
        assert_eq!(short("G4"), "G4");
        assert_eq!(short(&"é".repeat(90)).chars().count(), 24);
    }
}
