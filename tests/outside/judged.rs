//! Short passages judged by a textbook, and pairs that separate a fault from its nearest lawful
//! neighbour.
//!
//! Lehmann is F. J. Lehmann, A Treatise on Simple Counterpoint in Forty Lessons (1907); the pairs
//! are built from the rules' own conditions. A passage asserts only the rule it is about, and
//! that no other finding of that family stands.

use partwright_check::{Checked, Wishes};
use partwright_rules::{Severity, family_of};

/// What a passage must give.
enum Verdict {
    /// This rule, as a fault or a weakness.
    Bad(&'static str),
    /// This rule, as a fault.
    Fault(&'static str),
    /// Nothing of this family.
    Clean(&'static str),
    /// No fault of this family.
    NoFault(&'static str),
}
use Verdict::{Bad, Clean, Fault, NoFault};

/// Source, style, passage (rows joined by `/`), verdict.
const CASES: &[(&str, &str, &str, Verdict)] = &[
    (
        "Lehmann, Fig. 92c",
        "species-1",
        "a | F4 G | / b | B3 C4 | / c | D3 E |",
        Clean("motion"),
    ),
    (
        "parallel fifths",
        "chorale",
        "a | G4 A | / b | C4 D |",
        Fault("parallel-fifths"),
    ),
    (
        "parallel fifths",
        "free",
        "a | G4 A | / b | C4 D |",
        Fault("parallel-fifths"),
    ),
    (
        "parallel fifths",
        "motet",
        "a | G4 A | / b | C4 D |",
        Fault("parallel-fifths"),
    ),
    (
        "parallel fifths",
        "species-3",
        "a | G4 A | / b | C4 D |",
        Fault("parallel-fifths"),
    ),
    (
        "re-struck fifth",
        "chorale",
        "a | G4 G | / b | C4 C |",
        Clean("motion"),
    ),
    (
        "fifths by contrary motion",
        "chorale",
        "a | G4 D5 | / b | C4 G3 |",
        Fault("contrary-fifths"),
    ),
    (
        "parallel octaves",
        "chorale",
        "a | C5 D | / b | C4 D |",
        Fault("parallel-octaves"),
    ),
    (
        "octaves of one voice",
        "chorale",
        "voice a soprano/voice b alto doubles a/a | C5 D | / b | C4 D |",
        Clean("motion"),
    ),
    (
        "direct fifth, upper voice leaping",
        "chorale",
        "a | E4 A | / b | C4 D |",
        Fault("direct-fifths"),
    ),
    (
        "direct fifth, upper voice by step",
        "species-1",
        "a | B4 A | / b | G3 D |",
        Fault("direct-fifths"),
    ),
    (
        "direct fifth, upper voice by step",
        "chorale",
        "a | B4 A | / b | G3 D |",
        Clean("motion"),
    ),
    (
        "unequal fifths with the bass",
        "chorale",
        "a | F4 G | / b | B3 C4 |",
        Fault("unequal-fifths"),
    ),
    (
        "a diminished fifth that closes",
        "chorale",
        "a | F4 E | / b | B3 C4 |",
        Clean("motion"),
    ),
    (
        "cross relation",
        "chorale",
        "a | A4 A4 | / b | F#4 D4 | / c | D3 F3 |",
        Bad("cross-relation"),
    ),
    (
        "crossing",
        "chorale",
        "a | D4 E | / b | C4 F |",
        Bad("crossing"),
    ),
    (
        "inner leading note falls, outer octave by step",
        "chorale",
        "s | D5 C | / a | B4 G4 | / t | F4 E4 | / b | G3 C3 |",
        NoFault("motion"),
    ),
    (
        "outer fifth with a leap in the soprano",
        "chorale",
        "s | B4 G4 | / a | D4 E4 | / t | G3 G3 | / b | G3 C3 |",
        Fault("direct-fifths"),
    ),
    (
        "leading note falling in the soprano",
        "chorale",
        "key C major/s | B4 G4 | / a | D4 E4 | / t | G3 G3 | / b | G3 C3 |",
        Fault("leading-note-resolution"),
    ),
    (
        "inner leading note falls, outer octave by step",
        "chorale",
        "key C major/s | D5 C | / a | B4 G4 | / t | F4 E4 | / b | G3 C3 |",
        Clean("harmony"),
    ),
    (
        "unequal fifths rising over tenths",
        "chorale",
        "s | F4 G4 | / a | B3 C4 | / b | D3 E3 |",
        Clean("motion"),
    ),
    (
        "Lehmann, Fig. 9",
        "species-1",
        "a | F4 C5 G5 |",
        Bad("leaps-one-way"),
    ),
    (
        "Lehmann, Fig. 9a",
        "species-1",
        "a | F#4 A4 C5 |",
        Clean("line"),
    ),
    (
        "Lehmann, Fig. 9c",
        "species-1",
        "a | C4 G4 D5 |",
        Bad("leaps-one-way"),
    ),
    (
        "Lehmann, Fig. 9c, second",
        "species-1",
        "a | C4 A4 F5 |",
        Bad("leaps-one-way"),
    ),
    (
        "augmented fourth down",
        "chorale",
        "a | B4 F4 G4 |",
        Fault("augmented-interval"),
    ),
    (
        "augmented second",
        "chorale",
        "key C minor/a | Ab4 B4 C5 |",
        Fault("augmented-interval"),
    ),
    (
        "diminished fifth, turned back inside",
        "chorale",
        "a | F4 B3 C4 |",
        Clean("line"),
    ),
    (
        "diminished fifth, turned back inside",
        "species-1",
        "a | F4 B3 C4 |",
        Fault("diminished-interval"),
    ),
];

/// The same where values and bars matter: whole sheets but for the style.
const MEASURED: &[(&str, &str, &str, Verdict)] = &[
    (
        "Lehmann, Fig. 13a",
        "species-1",
        "a | B4 A4 |\nb | E4 F4 |",
        Bad("mi-contra-fa"),
    ),
    (
        "Lehmann, Fig. 13a, second",
        "species-1",
        "a | A4 B4 |\nb | F4 E4 |",
        Bad("mi-contra-fa"),
    ),
    (
        "Lehmann, Fig. 13a, third",
        "species-1",
        "a | B4 C5 |\nb | G4 F4 |",
        Bad("mi-contra-fa"),
    ),
    (
        "Lehmann, Fig. 13a, fourth",
        "species-1",
        "a | C5 B4 |\nb | F4 G4 |",
        Bad("mi-contra-fa"),
    ),
    (
        "Lehmann, Fig. 14",
        "species-1",
        "a | A4 B4 A4 |\nb | F4 G4 F4 |",
        Bad("mi-contra-fa"),
    ),
    (
        "Lehmann, Fig. 28, first",
        "species-2",
        "metre 4/4\nvoice a\nvoice b cantus\na | E5 - C5 - | D5 - B4 - |\nb | A4 - - - | G4 - - - |",
        Bad("downbeat-consecutives"),
    ),
    (
        "Lehmann, Fig. 28, third",
        "species-2",
        "metre 4/4\nvoice a\nvoice b cantus\na | E4 - G4 - | F4 - A4 - |\nb | C4 - - - | D4 - - - |",
        Bad("offbeat-consecutives"),
    ),
    (
        "Lehmann, Fig. 28, fifth",
        "species-2",
        "metre 4/4\nvoice a\nvoice b cantus\na | E5 - G4 - | A4 - C5 - |\nb | C4 - - - | F4 - - - |",
        Clean("motion"),
    ),
    (
        "Lehmann, Fig. 47, first",
        "species-3",
        "metre 4/4\nvoice a\nvoice b cantus\na | G4 C5 E5 D5 | C5 B4 A4 ? |\nb | C4 - - - | F4 - - - |",
        Bad("downbeat-consecutives"),
    ),
    (
        "Lehmann, Fig. 47, fourth",
        "species-3",
        "metre 4/4\nvoice a\nvoice b cantus\na | C5 E5 D5 C5 | D5 G4 A4 B4 |\nb | A4 - - - | G4 - - - |",
        Bad("barline-consecutives"),
    ),
    (
        "Grove, third-species model",
        "species-3",
        "metre 4/4\nvoice a cantus\nvoice b\na | C5 - - - | D5 - - - | E5 - - - | F5 - - - | E5 - - - | D5 - - - | C5 - - - ||\nb | _ C5 B4 A4 | B4 G4 A4 B4 | C5 B4 G4 A4 | F4 D4 E4 F4 | G4 C4 D4 E4 | F4 G4 A4 B4 | C5 - - - ||",
        NoFault("dissonance"),
    ),
    (
        "Grove, third-species model",
        "species-3",
        "metre 4/4\nvoice a cantus\nvoice b\na | C5 - - - | D5 - - - | E5 - - - | F5 - - - | E5 - - - | D5 - - - | C5 - - - ||\nb | _ C5 B4 A4 | B4 G4 A4 B4 | C5 B4 G4 A4 | F4 D4 E4 F4 | G4 C4 D4 E4 | F4 G4 A4 B4 | C5 - - - ||",
        NoFault("motion"),
    ),
    (
        "second to unison",
        "chorale",
        "a | E4 D4 |\nb | D4 D4 |",
        Bad("dissonance-into-perfect"),
    ),
    (
        "seven to six",
        "species-4",
        "metre 4/4\nvoice a\nvoice b cantus\na | _ _ C5 - | - - B4 - |\nb | E4 - - - | D4 - - - |",
        Clean("dissonance"),
    ),
    (
        "nine to eight",
        "species-4",
        "metre 4/4\nvoice a\nvoice b cantus\na | _ _ E5 - | - - D5 - |\nb | C4 - - - | D4 - - - |",
        Clean("dissonance"),
    ),
    (
        "two to three",
        "species-4",
        "metre 4/4\nvoice a cantus\nvoice b\na | G4 - - - | F4 - - - |\nb | _ _ E4 - | - - D4 - |",
        Clean("dissonance"),
    ),
    (
        "a suspension that rises",
        "species-4",
        "metre 4/4\nvoice a\nvoice b cantus\na | _ _ C5 - | - - D5 - |\nb | E4 - - - | D4 - - - |",
        Fault("retardation"),
    ),
    (
        "a passing half",
        "species-2",
        "metre 4/4\nvoice a\nvoice b cantus\na | E4 - F4 - | G4 - - - |\nb | C4 - - - | B3 - - - |",
        Clean("dissonance"),
    ),
    (
        "cambiata",
        "species-3",
        "metre 4/4\nvoice a\nvoice b cantus\na | E5 D5 B4 C5 | D5 - - - |\nb | E4 - - - | D4 - - - |",
        Clean("dissonance"),
    ),
    (
        "fifths of an anticipation",
        "chorale",
        "metre 4/4\ns | B4.A4 A4 - - |\na | G#4 E4 - - |\nt | E4.D4 C#4 - - |\nb | E3 A2 - - |",
        NoFault("motion"),
    ),
    (
        "sixth to octave",
        "species-1",
        "voice a\nvoice b cantus\na | C#5 D5 ||\nb | E4 D4 ||",
        Clean("cadence"),
    ),
    (
        "fifth before the last",
        "species-1",
        "voice a\nvoice b cantus\na | A4 A4 F4 A4 B4 D5 ||\nb | D4 F4 A4 F4 E4 D4 ||",
        Bad("closing-approach"),
    ),
];

#[test]
fn judged_passages_get_their_verdict() {
    let mut wrong = Vec::new();
    let short = CASES.iter().map(|(source, style, passage, verdict)| {
        let rows: Vec<&str> = passage.split('/').map(str::trim).collect();
        (source, style, rows.join("\n"), verdict)
    });
    let measured = MEASURED
        .iter()
        .map(|(source, style, sheet, verdict)| (source, style, (*sheet).to_owned(), verdict));
    for (source, style, sheet, verdict) in short.chain(measured) {
        let text = format!("style {style}\n{sheet}\n");
        let checked = Checked::text(&text, &Wishes::default());
        let found: Vec<_> = checked
            .findings
            .iter()
            .map(|f| (f.rule, f.severity))
            .collect();
        let family = match verdict {
            Bad(rule) | Fault(rule) => family_of(rule).unwrap(),
            Clean(family) | NoFault(family) => family,
        };
        let of_family: Vec<_> = found
            .iter()
            .filter(|(rule, _)| family_of(rule) == Some(family))
            .collect();
        let right = match verdict {
            // Figure 9c holds a major sixth as well, a rule of its own.
            Bad(rule) => {
                of_family
                    .iter()
                    .any(|(r, s)| r == rule && *s >= Severity::Weakness)
                    && of_family
                        .iter()
                        .all(|(r, _)| r == rule || *r == "sixth-leap" || *r == "leap-unrecovered")
            }
            Fault(rule) => matches!(of_family[..], [(r, Severity::Fault)] if r == rule),
            Clean(_) => of_family.is_empty(),
            NoFault(_) => of_family.iter().all(|(_, s)| *s < Severity::Fault),
        };
        let readable = found.iter().all(|(rule, _)| *rule != "reading");
        if !right || !readable {
            wrong.push(format!("{source} in {style}: {found:?}\n{text}"));
        }
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
    println!("outside: {} judged passages", CASES.len() + MEASURED.len());
}
