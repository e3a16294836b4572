//! What a grammar cannot say: which problems depend on what stands elsewhere. The numbers are those
//! in the head of the grammar.

use crate::steer::descending;

/// Problems of the cases that the grammar cannot see.
pub(crate) struct Kind {
    /// Why not.
    pub(crate) reason: &'static str,
    /// What the cases call it, if they call nothing else so.
    pub(crate) words: &'static [&'static str],
    /// Cases in which its words have this meaning.
    pub(crate) cases: &'static [&'static str],
    /// What the reader of sheets says.
    pub(crate) messages: &'static [&'static str],
}

/// All kinds.
pub(crate) const KINDS: [Kind; 10] = [
    Kind {
        reason: "1: whether an octave figure carries over depends on the notes before",
        words: &[],
        cases: &[
            "after a copied bar the next note writes its figure",
            "the first note of a row writes its figure",
            "a row without any figure is one mistake",
            "the octave figure does not carry into the next row",
            "the first own note after a held beginning has no figure",
        ],
        messages: &["writes its octave figure"],
    },
    Kind {
        reason: "2 and 9: whether anything sounds that could go on",
        words: &["silence", "before"],
        cases: &[],
        messages: &["A dash goes on with"],
    },
    Kind {
        reason: "3: the metre, and the other rows, say how long a bar is",
        words: &["too long by"],
        cases: &[
            "a bar line left out is one mistake",
            "a bar line left out behind a pickup",
            "a mark behind a bar line left out is not idle",
        ],
        messages: &["The bar is too long by"],
    },
    Kind {
        reason: "4: where the other rows close a section",
        words: &[],
        cases: &[
            "one row forgets the double bar line",
            "the double bar line at the end is missing in one row",
            "a double bar line in one row only",
            "the double bar line is missing in the words",
        ],
        messages: &["The other rows close"],
    },
    Kind {
        reason: "5: which voices there are, and what they copy and double",
        words: &["itself", "each other", "blank line"],
        cases: &[
            "a copy of a voice that is not there",
            "a copied bar below the lowest octave",
            "an equal voice that is not there",
            "a licence for a voice that is not there",
            "a row whose label no voice has",
            "a label misspelt is one mistake",
            "a new label in the second system",
            "a label declared twice",
            "a label written twice in place of the only one missing",
            "a label written twice while voices are missing",
            "a label written twice where the first system declares the voices",
            "doubling a voice that is not there",
            "words for a voice that is not there",
        ],
        messages: &[
            "No voice is labelled",
            "is declared twice",
            "does not copy itself",
            "copy each other",
            "this copy would leave the octaves",
            "does not double itself",
            "double each other in a ring",
            "A second row of this name",
            // Which words of a licence name voices.
            "The rules come before the voices",
            // Of a licence whose only word names a voice.
            "The rule is missing",
        ],
    },
    Kind {
        reason: "6: whether it was given before",
        words: &["twice"],
        cases: &[
            "a title given twice",
            "a metre given twice",
            "both spellings of metre are one header",
        ],
        messages: &["is given twice", "stands here twice"],
    },
    Kind {
        reason: "7: sums and comparisons of numbers and pitches",
        words: &[],
        cases: &[
            "groups that do not make up the bar",
            "a cell that does not divide the bar",
            "a limit upside down",
        ],
        messages: &[
            "add up to",
            "does not divide into",
            "lower end of a compass",
        ],
    },
    Kind {
        reason: "8: whether mark and footnote have each other",
        words: &["footnote"],
        cases: &["a footnote without its mark"],
        messages: &[
            "No note carries the mark",
            "has no footnote",
            "has a footnote already",
        ],
    },
    Kind {
        reason: "9: what stands over the words and figures, and which figure is higher",
        words: &[],
        cases: &[
            "figures stand highest first",
            "more syllables than notes",
            "fewer syllables than notes",
            "syllables too few for one of two voices",
            "more bars of words than of notes",
        ],
        messages: &[
            "more bars than the music",
            "in a system without notes",
            "syllables than notes",
            "no syllable fits",
            "Figures stand the highest first",
        ],
    },
    Kind {
        reason: "10: whether a key is in force",
        words: &[],
        cases: &[
            "numerals without a key",
            "numerals before the first key in the row",
            "numerals where the sheet says there is no key",
        ],
        messages: &["No key is stated here"],
    },
];

/// Whether what the reader of sheets says of a place depends on what stands elsewhere.
pub(crate) fn is_context(message: &str, place: &str) -> bool {
    let all = KINDS.iter().flat_map(|kind| kind.messages);
    // A figure written twice cannot be put in order, and is told as any other bad figure.
    let twice = message.contains("is no figure") && place.contains('/') && !descending(place);
    twice || all.into_iter().any(|words| message.contains(words))
}
