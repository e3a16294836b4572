//! Neighbouring voices stand too far apart.
//!
//! Why: a gap between upper voices makes the chord fall into two groups, and the singers no
//! longer hear each other.
//!
//! # Fails
//!
//! ```voices
//! style chorale
//!
//! S | C5 F5 C5 |
//! //     ^^ spacing (weakness): S and A
//! A | E4 C4 E4 |
//! T | G3 A3 G3 |
//! B | C3 F2 C3 |
//! ```
//!
//! Up to a tenth one or two chords are worth a word only:
//!
//! ```voices
//! style chorale
//!
//! S | C5 E5 C5 |
//! //     ^^ spacing (remark): S and A
//! A | E4 D4 E4 |
//! T | G3 B3 G3 |
//! B | C3 G2 C3 |
//! ```
//!
//! Over more than two chords it is a fault in a chorale:
//!
//! ```voices
//! style chorale
//!
//! S | E5 F5 G5 |
//! //  ^^ spacing: S and A
//! A | C4 D4 E4 |
//! T | B3 C4 D4 |
//! B | C3 D3 E3 |
//! ```
//!
//! In two strict parts, beyond a twelfth, or beyond a tenth for long:
//!
//! ```voices
//! style species-1
//!
//! S | E5 A5 G5 |
//! //     ^^ spacing (weakness): S and B
//! B | C4 C4 E4 |
//! ```
//!
//! # Passes
//!
//! ```voices
//! style chorale
//!
//! S | C5 D5 C5 |
//! A | E4 D4 E4 |
//! T | G3 B3 G3 |
//! B | C3 G2 C3 |
//! ```
//!
//! # Does not apply
//!
//! Instruments, and the gap between tenor and bass within two octaves:
//!
//! ```voices
//! voice V violin
//! voice A viola
//! voice C cello
//!
//! V | E6 F6 |
//! A | C4 D4 |
//! C | C3 B2 |
//! ```
//!
//! A gap that another voice fills, and in a motet one chord within a tenth:
//!
//! ```voices
//! style motet
//! equal S T
//! voice S soprano
//! voice A alto
//! voice T tenor
//! voice B bass
//!
//! S | E5 - |
//! A | C4 - |
//! T | G4 - |
//! B | C3 - |
//! ```
//!
//! ```voices
//! style motet
//! voice T tenor
//! voice S soprano
//! voice A alto
//! voice B bass
//!
//! T | G3 - |
//! S | E5 - |
//! A | E4 - |
//! B | C3 - |
//! ```
//!
//! ```voices
//! style motet
//!
//! S | C5 E5 C5 |
//! A | E4 C4 E4 |
//! B | C3 C3 C3 |
//! ```
//!
//! Nor what passes between two beats:
//!
//! ```voices
//! style chorale
//!
//! S | C5    C5 |
//! A | E4.D4 E4 |
//! T | G3    G3 |
//! B | C3    C3 |
//! ```
//!
//! # What to do
//!
//! Raise the lower voice or lower the upper one, or exchange notes with a third.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Piece(check),
    cases: &[&UPPER, &UPPER_LONG, &UPPER_BRIEF, &TWO_PARTS, &TWO_PARTS_LONG, &BASS, &BASS_ADVICE, &SOPRANO_TENOR],
    numbers: &[&NEIGHBOURS, &CHORDS, &BASS_GAP, &BASS_ADVISED, &FIRST_AND_THIRD, &TWO_PARTS_GAP],
    sources: &[
        source::OPEN_MUSIC_THEORY,
        source::LEHMANN.at("lesson XI"),
        source::CHORAL_GUIDE.at("tenor and bass within a twelfth"),
        source::BACH_CHORALES.at("soprano and alto 143, alto and tenor 334, of 30,038 sonorities; the bass beyond a twelfth 312"),
        source::FUX_FIGURES.at("at most a twelfth and a semitone in two parts"),
    ],
};

static NEIGHBOURS: NumberOf = NumberOf {
    name: "neighbours",
    means: "the widest interval between neighbouring upper voices, as its number (8 is an octave)",
    value: 8,
    bounds: (3, 22),
};
static CHORDS: NumberOf = NumberOf {
    name: "chords",
    means: "how many successive chords may be wider before it counts as long",
    value: 2,
    bounds: (0, 64),
};
static BASS_GAP: NumberOf = NumberOf {
    name: "bass",
    means: "the widest interval between the bass and its neighbour, as its number",
    value: 15,
    bounds: (8, 36),
};
static BASS_ADVISED: NumberOf = NumberOf {
    name: "bass-advised",
    means: "the interval between the bass and its neighbour that choral guides advise to keep within, as its number",
    value: 12,
    bounds: (8, 36),
};
static FIRST_AND_THIRD: NumberOf = NumberOf {
    name: "first-and-third",
    means: "the widest interval between the first and the third of four voices, as its number",
    value: 12,
    bounds: (8, 36),
};
static TWO_PARTS_GAP: NumberOf = NumberOf {
    name: "two-parts",
    means: "the widest interval between two voices in two parts, as its number",
    value: 12,
    bounds: (8, 36),
};

static UPPER: Case = Case {
    name: "",
    when: "neighbouring upper voices more than an octave apart, in three parts or more, on a beat",
    settings: &[
        weakness(Style::Free, "common practice"),
        weakness(
            Style::Chorale,
            "beyond a tenth one chord is too many (handbooks)",
        ),
        weakness(Style::Species1, "in three parts (Lehmann, lesson XI)"),
    ],
};

static UPPER_LONG: Case = Case {
    name: "long",
    when: "the same over more than two successive chords",
    settings: &[
        weakness(Style::Free, "common practice"),
        fault(Style::Chorale, "handbooks allow one or two chords"),
    ],
};

static UPPER_BRIEF: Case = Case {
    name: "brief",
    when: "the same within a tenth, over one or two chords",
    settings: &[
        allow(Style::Free, "one or two chords are let pass (handbooks)"),
        remark(
            Style::Chorale,
            "one or two chords up to a tenth are let pass with a word (Lehmann, lesson XI)",
        ),
    ],
};

static TWO_PARTS: Case = Case {
    name: "two-parts",
    when: "two voices more than a twelfth apart, in two parts",
    settings: &[
        allow(Style::Free, "open writing is free"),
        weakness(Style::Motet, "as in strict counterpoint"),
        weakness(Style::Species1, "Fux stays within it but once"),
    ],
};

static TWO_PARTS_LONG: Case = Case {
    name: "two-parts-long",
    when: "two voices more than a tenth apart over more than two sonorities, in two parts",
    settings: &[
        allow(Style::Free, "open writing is free"),
        weakness(Style::Motet, "as in strict counterpoint"),
        weakness(Style::Species1, "eight sonorities in Fux's figures"),
    ],
};

static BASS: Case = Case {
    name: "bass",
    when: "the bass more than two octaves under its neighbour, in three parts or more",
    settings: &[
        allow(Style::Free, "open writing is free"),
        weakness(Style::Chorale, "choral handbooks"),
    ],
};

static BASS_ADVICE: Case = Case {
    name: "bass-advice",
    when: "the bass more than a twelfth under its neighbour, but within two octaves",
    settings: &[
        allow(Style::Free, "open writing is free"),
        remark(Style::Chorale, "advised against (choral guides)"),
    ],
};

static SOPRANO_TENOR: Case = Case {
    name: "soprano-tenor",
    when: "the first and the third of four voices more than a twelfth apart on a beat, neither more than an octave from the second",
    settings: &[
        allow(Style::Free, "open writing is free"),
        weakness(
            Style::Chorale,
            "choral handbooks; 170 of 12,191 sonorities of 156 chorales, where chance would make 302",
        ),
    ],
};

fn check(piece: &Piece<'_>, found: &mut Found<'_>) {
    let sung = |v: usize| piece.score.voices.get(v).is_some_and(|v| v.kind.is_sung());
    for &pair in piece
        .texture
        .pairs()
        .iter()
        .filter(|pair| sung(pair.upper) && sung(pair.lower))
    {
        let steps = |number| found.number(number) - 1;
        let (neighbours, bass, third, two) = (
            steps(&NEIGHBOURS),
            steps(&BASS_GAP),
            steps(&FIRST_AND_THIRD),
            steps(&TWO_PARTS_GAP),
        );
        let long = usize::try_from(found.number(&CHORDS)).unwrap_or(0);
        // What is not wide by any measure is no matter: most sonorities end here.
        let advised = steps(&BASS_ADVISED);
        let least = [neighbours, bass, advised, third, two, LONG_TENTH]
            .into_iter()
            .min()
            .unwrap_or(0);
        let wide = piece.passages(pair, |s| s.is_wider_than(pair, least));
        let mut report = |test: &dyn Fn(&Sounding<'_>) -> bool, limit, case| {
            for run in piece.within(pair, &wide, |s| s.is_wider_than(pair, limit) && test(&s)) {
                // Between two beats a note passes; the chord is not spaced anew.
                if piece.is_on_a_beat(&run) || piece.voices() == 2 {
                    tell(piece, found, pair, &run, case, limit);
                }
            }
        };
        let beside = |s: &Sounding<'_>| s.parts() >= 3 && s.are_neighbours(pair);
        report(
            &|s| beside(s) && s.is_lowest_present(pair.lower),
            bass,
            &BASS,
        );
        report(
            &|s| {
                s.parts() == 4 && s.are_first_and_third(pair) && !s.has_wide_neighbours(neighbours)
            },
            third,
            &SOPRANO_TENOR,
        );
        report(&|s| piece.voices() == 2 && s.parts() == 2, two, &TWO_PARTS);
        let upper = |s: Sounding<'_>| beside(&s) && !s.stands_on_bass(pair);
        for run in piece.within(pair, &wide, |s| {
            upper(s) && s.is_wider_than(pair, neighbours) && !s.is_filled(pair)
        }) {
            if !piece.is_on_a_beat(&run) {
                continue;
            }
            let wider =
                (run.first..run.end).any(|k| piece.sounding(k).is_wider_than(pair, LONG_TENTH));
            let case = match run.chords > long {
                true => &UPPER_LONG,
                false if wider => &UPPER,
                false => &UPPER_BRIEF,
            };
            tell(piece, found, pair, &run, case, neighbours);
        }
        let low = |s: Sounding<'_>| beside(&s) && s.is_lowest_present(pair.lower);
        for run in piece.within(pair, &wide, |s| low(s) && s.is_wider_than(pair, advised)) {
            let wider = (run.first..run.end).any(|k| piece.sounding(k).is_wider_than(pair, bass));
            if !wider && piece.is_on_a_beat(&run) {
                tell(piece, found, pair, &run, &BASS_ADVICE, advised);
            }
        }
        for run in piece.within(pair, &wide, |s| {
            piece.voices() == 2 && s.is_wider_than(pair, LONG_TENTH) && s.parts() == 2
        }) {
            let wider = (run.first..run.end).any(|k| piece.sounding(k).is_wider_than(pair, two));
            if run.chords > long && !wider {
                tell(piece, found, pair, &run, &TWO_PARTS_LONG, LONG_TENTH);
            }
        }
    }
}

/// A tenth, in scale steps: what two voices in two parts do not exceed for long.
const LONG_TENTH: i32 = 9;

fn tell(
    piece: &Piece<'_>,
    found: &mut Found<'_>,
    pair: Pair,
    run: &Passage,
    case: &'static Case,
    limit: i32,
) {
    found.passage(
        case,
        &[pair.upper, pair.lower],
        (run.from, run.until),
        || {
            format!(
                "Spacing: {} and {} are more than {} apart {}. Bring them closer.",
                piece.name(pair.upper),
                piece.name(pair.lower),
                Interval::noun(limit),
                piece.extent_text(run.from, run.until)
            )
        },
    );
}
