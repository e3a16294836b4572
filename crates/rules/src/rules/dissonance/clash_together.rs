//! Two ornaments struck together clash with each other.
//!
//! Why: two voices may leave the chord at once if they keep each other company in thirds or sixths;
//! a second or a seventh between them is heard as a mistake.
//!
//! # Fails
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | C5 B4 C5 - |
//! //     ^ clash together: S and A
//! A | G4 A4 G4 - |
//! T | G3 -  -  - |
//! B | C3 -  -  - |
//! ```
//!
//! # Passes
//!
//! In sixths:
//!
//! ```voices
//! style motet
//! metre 4/2
//!
//! S | E5 F5 E5 - |
//! A | G4 A4 G4 - |
//! T | G3 -  -  - |
//! B | C3 -  -  - |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! style species-2
//! metre 2/2
//! voice S
//! voice C cantus
//!
//! S | _ A4 | D5 A4 | B4 C#5 | D5 - ||
//! C | D4 - | F4 -  | E4 -   | D4 - ||
//! ```
//!
//! # What to do
//!
//! Let the two go in thirds, sixths or tenths, or one after the other.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Dissonances(check),
    cases: &[&ORDINARY, &FOURTH],
    numbers: &[],
    sources: &[
        source::LEHMANN.at("lessons III, V and XIII"),
        source::HUTCHINSON.at("sec. 28.2"),
    ],
};

static ORDINARY: Case = Case {
    name: "",
    when: "in a second, a seventh or a ninth; where chords are heard, only two notes strange to the sure chord",
    settings: &[
        weakness(
            Style::Free,
            "unless one of the two belongs to the chord (Hutchinson, sec. 28.2)",
        ),
        fault(Style::Motet, "the two must agree with each other"),
        fault(
            Style::Species1,
            "the two must agree with each other (Lehmann)",
        ),
    ],
};

static FOURTH: Case = Case {
    name: "fourth",
    when: "in a fourth, unless in contrary motion, or a tritone that does not resolve",
    settings: &[
        allow(Style::Free, "fourths among upper voices are consonant"),
        fault(
            Style::Species1,
            "a fourth only in contrary motion, a tritone only if it resolves (Lehmann)",
        ),
    ],
};

fn check(discord: &Discord<'_>, found: &mut Found<'_>) {
    let Some(together) = discord.together().filter(|t| !t.is_lawful_fourth) else {
        return;
    };
    if found.style().has_chords() && !discord.leaves_sure_chord(together.voice) {
        return;
    }
    let case = if together.is_fourth {
        &FOURTH
    } else {
        &ORDINARY
    };
    found.clash(case, discord, together.voice, || {
        format!(
            "Clash together: {} and {} leave the chord at once, {} apart. Let them go in thirds or sixths.",
            discord.piece.name(discord.dissonant().0),
            discord.piece.name(together.voice),
            together.interval.with_article()
        )
    });
}
