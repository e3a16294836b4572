//! Sheets spoilt by a slip of the hand, and where the grammar and the reader of sheets are known to
//! differ.

use crate::derive::Random;
use crate::ebnf::BLANKS;

/// What a hand strikes by mistake.
pub(crate) const STRUCK: &str = "  \t\n\n||//..--__??^,*a1b#=:+\\~SG4x890rvVinoø♮";

/// Lines with a gap: what may stand there is judged word by word.
pub(crate) const GAPS: [&str; 27] = [
    "{}",
    "sheet {}",
    "title {}",
    "style {}",
    "key {} major",
    "key D {}",
    "key D dorian {}",
    "key D dorian signature {}",
    "metre {}",
    "metre 6/8 {}",
    "metre 6/8 by {}",
    "tempo {}",
    "tempo {} 72",
    "licence {}: lamps",
    "licence spacing {}",
    "voice {}",
    "voice S {}",
    "voice S clef {}",
    "voice S written {}",
    "voice S species {}",
    "voice S easy {}",
    "S | {} |",
    "S | G4{} |",
    "S | G4 {}",
    "S | G4 |\nwords S | {} |",
    "key G major\nS | G4 |\nharmony | {} |",
    "S | G4 |\nfigures | {} |",
];

/// A text with one or two slips in it: characters struck, left out and turned round, and words that
/// belong elsewhere.
pub(crate) fn spoil(text: &str, words: &[&str], random: &mut Random) -> String {
    let struck: Vec<char> = STRUCK.chars().collect();
    let mut all: Vec<char> = text.chars().collect();
    for _ in 0..=random.below(2) {
        if all.is_empty() {
            break;
        }
        let at = random.below(all.len());
        let c = *random.one(&struck).unwrap_or(&' ');
        match random.below(8) {
            0 => drop(all.remove(at)),
            1 => all.insert(at, c),
            2 => all[at] = c,
            3 => {
                let other = random.below(all.len());
                all.swap(at, other);
            }
            4 => {
                let next = (at + 1) % all.len();
                all.swap(at, next);
            }
            5 => {
                let end = (at + random.below(6)).min(all.len());
                all.drain(at..end);
            }
            _ => {
                let parts = |c: &char| c.is_whitespace();
                let start = all[..at]
                    .iter()
                    .rposition(parts)
                    .map_or(0, |before| before + 1);
                let end = all[at..]
                    .iter()
                    .position(parts)
                    .map_or(all.len(), |after| at + after);
                let word = random.one(words).unwrap_or(&"");
                all.splice(start..end, word.chars());
            }
        }
    }
    all.into_iter().collect()
}

/// What the grammar refuses and the reader lets pass: a join of words with nothing to join.
pub(crate) fn is_left_open(text: &str) -> bool {
    let blank = |c| BLANKS.contains(&c) || c == '\u{feff}';
    text.lines()
        .map(|line| line.trim_start_matches(blank))
        .any(is_words_left_open)
}

fn is_words_left_open(line: &str) -> bool {
    if !line.starts_with("words") {
        return false;
    }
    // What a backslash makes plain is as good as a letter.
    let mut plain = String::new();
    let mut all = line.chars();
    while let Some(c) = all.next() {
        plain.push(if c == '\\' {
            all.next().map_or('\\', |_| 'x')
        } else {
            c
        });
    }
    let edge = |c: Option<char>| c.is_none_or(|c| c == '|' || c == '~' || c.is_whitespace());
    plain.match_indices('~').any(|(at, _)| {
        edge(plain[..at].chars().next_back()) || edge(plain[at + 1..].chars().next())
    })
}
