//! What rules say of notes that belong to a chord, and of notes that do not.

#![allow(clippy::unwrap_used)]

use partwright_check::{Checked, Severity, Wishes};

/// How a rule minds four voices in a style, S to B separated by `/`: the gravest word.
fn told(rule: &str, style: &str, voices: &str) -> Option<Severity> {
    let rows = ["S", "A", "T", "B"].iter().zip(voices.split('/'));
    let rows: String = rows
        .map(|(name, row)| format!("{name} | {} ||\n", row.trim()))
        .collect();
    let text = format!("style {style}\nkey C major\nmetre 4/4\n\n{rows}");
    let findings = Checked::text(&text, &Wishes::default()).findings;
    assert!(findings.iter().all(|f| f.rule != "reading"), "{text}");
    let own = findings.iter().filter(|f| f.rule == rule);
    own.map(|f| f.severity).max()
}

/// Each passage in the chorale and in free style, and what the rule says there.
fn holds(rule: &str, cases: &[(&str, Option<Severity>, Option<Severity>)]) {
    for (voices, chorale, free) in cases {
        assert_eq!(told(rule, "chorale", voices), *chorale, "chorale: {voices}");
        assert_eq!(told(rule, "free", voices), *free, "free: {voices}");
    }
}

const FAULT: Option<Severity> = Some(Severity::Fault);
const WEAK: Option<Severity> = Some(Severity::Weakness);

/// A minor, F major, a six-four on G, G major, C major.
#[test]
fn the_six_four_before_the_dominant() {
    holds(
        "six-four",
        &[
            // The fourth goes down by step, the bass is doubled.
            (
                "C5 - A4 - | G4 - G4 - | G4 - - - / E4 - F4 - | E4 - D4 - | E4 - - - / A3 - C4 - | C4 - B3 - | C4 - - - / A2 - F3 - | G3 - G2 - | C3 - - -",
                None,
                None,
            ),
            // The fourth leaps to the seventh.
            (
                "C5 - A4 - | G4 - B4 - | C5 - - - / E4 - F4 - | E4 - D4 - | E4 - - - / A3 - C4 - | C4 - F4 - | E4 - - - / A2 - F3 - | G3 - G2 - | C3 - - -",
                FAULT,
                WEAK,
            ),
            // The sixth rises.
            (
                "C5 - A4 - | G4 - G4 - | G4 - - - / E4 - F4 - | E4 - F4 - | E4 - - - / A3 - C4 - | C4 - B3 - | C4 - - - / A2 - F3 - | G3 - G2 - | C3 - - -",
                WEAK,
                WEAK,
            ),
            // The fourth is reached by leap: a note of the chord, and no appoggiatura.
            (
                "C5 - A4 - | C5 - B4 - | C5 - - - / E4 - F4 - | E4 - D4 - | E4 - - - / A3 - C4 - | G3 - G3 - | G3 - - - / A2 - F3 - | G3 - G2 - | C3 - - -",
                WEAK,
                None,
            ),
            // The fourth is doubled, and not the bass: told of by itself.
            (
                "C5 - A4 - | C5 - B4 - | C5 - - - / E4 - F4 - | E4 - D4 - | E4 - - - / A3 - C4 - | C4 - G3 - | G3 - - - / A2 - F3 - | G3 - G2 - | C3 - - -",
                None,
                None,
            ),
            // It comes from the dominant.
            (
                "C5 - B4 - | C5 - - B4 | C5 - - - / E4 - D4 - | E4 - - D4 | E4 - - - / A3 - G3 - | G3 - - F3 | G3 - - - / A2 - G2 - | G3 - - G2 | C3 - - -",
                WEAK,
                WEAK,
            ),
        ],
    );
}

#[test]
fn the_other_six_fours() {
    holds(
        "six-four",
        &[
            // Reached and left by leap.
            (
                "C5 - C5 - | D5 - B4 - | C5 - - - / E4 - E4 - | F4 - G4 - | G4 - - - / A3 - C4 - | A3 - D4 - | E4 - - - / A2 - G3 - | D3 - G2 - | C3 - - -",
                FAULT,
                FAULT,
            ),
            // The bass passes through it.
            (
                "C5 - B4 - | C5 - - - | C5 - - - / G4 - G4 - | G4 - - - | G4 - - - / E4 - D4 - | C4 - - - | E4 - - - / C3 - D3 - | E3 - - - | C3 - - -",
                None,
                None,
            ),
            // Over a held bass.
            (
                "G4 - A4 - | G4 - - - | G4 - - - / E4 - F4 - | E4 - - - | E4 - - - / C4 - C4 - | C4 - - - | C4 - - - / C3 - - - | - - - - | C3 - - -",
                None,
                None,
            ),
            // The chord is broken.
            (
                "C5 - C5 - | C5 - - - | C5 - - - / G4 - G4 - | G4 - - - | G4 - - - / E4 - E4 - | E4 - - - | E4 - - - / C3 - G3 - | E3 - - - | C3 - - -",
                None,
                None,
            ),
        ],
    );
}

#[test]
fn a_note_that_the_chord_has_needs_no_figure() {
    holds(
        "free-dissonance",
        &[
            // F leaps into a chord of C, and out of it.
            (
                "C5 - C5 - | C5 - - - / E4 - C4 F4 | C4 - - - / G3 - G3 - | G3 - - - / C3 - C3 - | C3 - - -",
                FAULT,
                WEAK,
            ),
            // The seventh of a chord leaps.
            (
                "C5 - B4 - | C5 - - - / G4 - D4 F4 | E4 - - - / E4 - G3 - | G3 - - - / C3 - G2 - | C3 - - -",
                None,
                None,
            ),
        ],
    );
    holds(
        "suspension-resolution",
        &[
            // D is held into a chord of C, and goes up a fourth.
            (
                "C5 - D5 - | D5 - G4 - | G4 - - - / G4 - G4 - | G4 - E4 - | E4 - - - / E4 - B3 - | C4 - C4 - | C4 - - - / C3 - G3 - | C3 - C3 - | C3 - - -",
                FAULT,
                None,
            ),
            // It goes round to its resolution.
            (
                "C5 - D5 - | D5 B4 C5 - | C5 - - - / G4 - G4 - | G4 - G4 - | G4 - - - / E4 - B3 - | C4 - E4 - | E4 - - - / C3 - G3 - | C3 - C3 - | C3 - - -",
                None,
                None,
            ),
        ],
    );
}

#[test]
fn a_note_strange_to_the_chord_is_told() {
    // D was strange to C major, and still is as the bass moves.
    holds(
        "suspension-preparation",
        &[(
            "C5 - - - | C5 - - - | C5 - - - / E4 - - D4.D4 | D4 - A4 - | E4 - - - / G3 - - - | G3 - - - | G3 - - - / C3 - - - | E3 - - - | C3 - - -",
            FAULT,
            WEAK,
        )],
    );
    // B and A leave C major together, a second apart; B and D do so a third apart.
    holds(
        "clash-together",
        &[
            (
                "E5 - C5.B4 C5 | E5 - - - / G4 - G4.A4 G4 | G4 - - - / G3 - - - | G3 - - - / C3 - - - | C3 - - -",
                WEAK,
                WEAK,
            ),
            (
                "E5 - E5.D5 E5 | E5 - - - / C5 - C5.B4 C5 | C5 - - - / G3 - - - | G3 - - - / C3 - - - | C3 - - -",
                None,
                None,
            ),
        ],
    );
    // Ab is a sixth over C, and clashes with G; it comes and goes by leap, or by step.
    holds(
        "upper-clash",
        &[
            (
                "E5 - - - | E5 - - - / C5 - - E5.Ab4 | C5 - - - / G3 - - - | G3 - - - / C3 - - - | C3 - - -",
                WEAK,
                WEAK,
            ),
            (
                "E5 - - - | E5 - - - / C5 - - G4.Ab4 | G4 - - - / G3 - - - | G3 - - - / C3 - - - | C3 - - -",
                None,
                None,
            ),
        ],
    );
}

#[test]
fn a_cross_relation_is_of_two_voices() {
    holds(
        "cross-relation",
        &[
            (
                "A4 - A4 - | G4 - - - / F#4 - D4 - | E4 - - - / D4 - A3 - | C4 - - - / D3 - F3 - | C3 - - -",
                WEAK,
                WEAK,
            ),
            // Between the outer voices.
            (
                "F#4 - A4 - | G4 - - - / D4 - D4 - | E4 - - - / A3 - A3 - | C4 - - - / D3 - F3 - | C3 - - -",
                FAULT,
                WEAK,
            ),
            // It was two beats ago.
            (
                "F#4 - G4 A4 | G4 - - - / D4 - D4 - | E4 - - - / A3 - B3 A3 | C4 - - - / D3 - G3 F3 | C3 - - -",
                None,
                None,
            ),
            // The Neapolitan sixth goes to the dominant; to G minor it would not.
            (
                "Db5 - B4 - | C5 - - - / F4 - G4 - | G4 - - - / Ab3 - D4 - | E4 - - - / F3 - G3 - | C3 - - -",
                None,
                None,
            ),
            (
                "Db5 - Bb4 - | C5 - - - / F4 - G4 - | G4 - - - / Ab3 - D4 - | E4 - - - / F3 - G3 - | C3 - - -",
                WEAK,
                WEAK,
            ),
            // F# belongs to a diminished seventh chord; then to a seventh chord on D.
            (
                "A4 - C5 - | Bb4 - - - / F4 - Eb4 - | D4 - - - / A3 - A3 - | G3 - - - / D3 - F#3 - | G3 - - -",
                None,
                None,
            ),
            (
                "A4 - C5 - | Bb4 - - - / F4 - D4 - | D4 - - - / A3 - A3 - | G3 - - - / D3 - F#3 - | G3 - - -",
                WEAK,
                WEAK,
            ),
            // The voice that has the second form had the first itself.
            (
                "A4 - A4 - | G4 - - - / D4 - D4 - | E4 - - - / A3 - A3 - | C4 - - - / F#3 - F3 - | E3 - - -",
                None,
                None,
            ),
        ],
    );
    // Within a beat, with a note between, it is let pass in the 16th century.
    let between = "F#4.E4 A4 - - | G4 - - - / D4.C4 D4 - - | E4 - - - / A3.G3 A3 - - | C4 - - - / D3.C3 F3 - - | C3 - - -";
    assert_eq!(told("cross-relation", "chorale", between), FAULT);
    assert_eq!(told("cross-relation", "free", between), WEAK);
    assert_eq!(told("cross-relation", "motet", between), None);
}

#[test]
fn a_chord_that_is_kept_is_no_arrival() {
    // Another position of A minor, passing notes between.
    holds(
        "direct-octaves",
        &[(
            "E4 A4 - - | A4 - - - / C4.D4 E4 - - | E4 - - - / A3.B3 C4 - - | C4 - - - / A2 A3 - - | A3 - - -",
            None,
            None,
        )],
    );
    // The fifths of an anticipation are a label over a dominant only.
    let over = |third: &str| {
        format!(
            "B4 - - B4.A4 | A4 - - - / {third} - - {third} | E4 - - - / E4 - - E4.D4 | C4 - - - / E3 - - E3 | A2 - - -"
        )
    };
    let dominant = over("G#4");
    assert_eq!(
        told("parallel-fifths", "chorale", &dominant),
        Some(Severity::Remark)
    );
    assert_eq!(told("parallel-fifths", "free", &dominant), None);
    let minor = over("G4");
    assert_eq!(told("parallel-fifths", "chorale", &minor), WEAK);
    assert_eq!(told("parallel-fifths", "free", &minor), WEAK);
}
