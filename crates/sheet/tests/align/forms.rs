//! Sheets before and after: what the notation's own example looks like, row by row.

use crate::lawful::aligned;

/// The example of the notation's description.
const EVENSONG: &str = "\
title   Lamplighters' evensong
style   chorale
key     G major
metre   4/4
tempo   72

voice S soprano
voice A alto
voice T tenor
voice B bass  E2..D4

// first line of the hymn
S | G4 | A4  B4 C5 B4.A | B4^ - - ||
A | D4 | F#4 G4 G  G.F# | G4^ - - ||
T | B3 | D4  D  E  D    | D4^ - - ||
B | G3 | D3  G3 C3 D3   | G2^ - - ||
";

#[track_caller]
fn becomes(before: &str, after: &str) {
    assert_eq!(aligned(before), after);
}

#[track_caller]
fn stays(sheet: &str) {
    becomes(sheet, sheet);
}

#[test]
fn the_example_of_the_notation_stays_as_it_is() {
    stays(EVENSONG);
}

#[test]
fn the_example_of_the_notation_comes_back_from_any_blanks() {
    let mut wild = String::new();
    for line in EVENSONG.lines() {
        if line.starts_with("//") || line.starts_with("title") || line.is_empty() {
            wild.push_str(line);
        } else {
            let words: Vec<&str> = line.split_whitespace().collect();
            wild.push_str(" \t");
            wild.push_str(&words.join("\u{3000}\t "));
            wild.push('\u{a0}');
        }
        wild.push('\n');
    }
    becomes(&wild, EVENSONG);
    let mut close = EVENSONG.to_owned();
    for _ in 0..4 {
        close = close
            .replace("  ", " ")
            .replace(" |", "|")
            .replace("| ", "|");
    }
    becomes(&close, EVENSONG);
}

#[test]
fn headers_changes_and_voices_stand_in_columns() {
    becomes(
        "\
title Lamplighters'  evensong\\\\ // working\ttitle
by\tAda Wick
  key  b♭ minor signature 1♭
meter 6/8   by 3/8
tempo 3/8\t72
equal  S1   S2
license spacing : written  for the organ  // ask
style chorale
voice S1 soprano  cantus   easy d♯4..g5
voice S2   soprano
voice Low bass doubles S1   e♭2..D4
voice V  cantus

S1 | D5 |

metre 2/4
key  d  dorian
S1 | D5 E5*a |
*a   license   parallel-fifths  line :  the drovers'  horns
",
        "\
title   Lamplighters'  evensong\\\\ // working\ttitle
by      Ada Wick
key     Bb minor signature 1b
metre   6/8 by 3/8
tempo   3/8 72
equal   S1 S2
licence spacing: written  for the organ // ask
style   chorale
voice S1  soprano  cantus easy D#4..G5
voice S2  soprano
voice Low bass     doubles S1 Eb2..D4
voice V   cantus

S1 | D5 |

metre   2/4
key     D dorian
S1 | D5 E5*a |
*a licence parallel-fifths line: the drovers'  horns
",
    );
    becomes(
        "subtitle for four voices\ntitle Quay lanterns\n",
        "subtitle for four voices\ntitle    Quay lanterns\n",
    );
}

#[test]
fn what_cannot_be_read_stays_as_it_is() {
    stays(
        "\
metre  4/5
key  H  minor
voice  S  sopran
title
style   two  words
tempo  fast
lamps   of the  quay
*a   lamps

title  |  Lamp   light
 |  G4  A |
S   G4   A |
words  S  la  la
S |  G4 |// no comment   here
harmony   I  |  V |
",
    );
}

#[test]
fn a_backslash_that_makes_nothing_plain_makes_no_blank_plain() {
    stays("S | G4 A |\nwords S | la\\\r  lu |\n");
    becomes(
        "S | G4  A |\nwords S |la\\ \\|  lu\\\\|\n",
        "S       | G4     A    |\nwords S | la\\ \\| lu\\\\ |\n",
    );
}

#[test]
fn a_spoilt_part_is_set_as_it_is_written() {
    becomes(
        "S | g4 H4 a | mf b4 | c5 p |\nB | g3 - f♯.x | G3 A | C |\n",
        "S | G4 H4 a    | mf B4   | C5 p |\nB | G3 -  F#.x | G3    A | C    |\n",
    );
}

#[test]
fn what_fills_a_bar_alone_reaches_over_its_columns() {
    becomes(
        "S | D5 E F G | =A2+8 | ? | A5.G.F.E |\nA2 | _ | D4 E F# G | G4 - | G |\nB | D3 - | D - - - | | G3 A B\n",
        "\
S  | D5 E F G | =A2+8     | ?    | A5.G.F.E     |
A2 | _        | D4 E F# G | G4 - | G            |
B  | D3 -     | D  - -  - |      | G3       A B
",
    );
}

#[test]
fn syllables_stand_under_their_notes() {
    becomes(
        "\
S | G4 - A | B - - | _ G A.B | =A | - - A
words S 1 | light the | lamp | good man now | to the Quay | ~ too many ||
words A | a
words Q S | x y |
A | D4 | G4 A B | C4
",
        "\
S         | G4 -  A   | B  - - | _  G    A.B     | =A          | - - A
words S 1 | light the | lamp   |    good man now | to the Quay |     ~ too many ||
words A   | a
words Q S | x     y   |
A         | D4        | G4 A B | C4
",
    );
}

#[test]
fn chords_and_figures_stand_in_the_columns_of_the_notes() {
    becomes(
        "S | D5 E F♯ G | A - - - ||\nharmony | I d♭:  ii65 V7/V.V - | B♭: _ I ||\nfigures | 6/5 - b.# 6 | _ ||\n",
        "\
S       | D5  E        F#     G | A     - - - ||
harmony | I   db: ii65 V7/V.V - | Bb: _ I     ||
figures | 6/5 -        b.#    6 | _           ||
",
    );
}

#[test]
fn bar_lines_with_signs_of_other_writings_stay_one_sign() {
    becomes(
        "S |: G4 A :|: B4|C5 : |||D5||\nB||G3 A|B | C| D|\n",
        "S |: G4 A :|: B4 | C5 : ||| D5 ||\nB || G3 A |   B  | C    |   D  |\n",
    );
}

#[test]
fn comments_at_line_ends_of_neighbours_stand_in_a_column() {
    becomes(
        "\
voice S soprano // Ada
voice A alto  //   the Quay sisters  \ntempo 72 // slow

S | G4 A | // one
A | D4 | // two
B | G3 A |
T | B3 C | // three
",
        "\
voice S soprano // Ada
voice A alto    //   the Quay sisters  \ntempo   72      // slow

S | G4 A | // one
A | D4   | // two
B | G3 A |
T | B3 C | // three
",
    );
}

#[test]
fn marks_drawn_under_notes_stay_under_them() {
    becomes(
        "\
S | D5 E F | G♯5 |
//   ^ no note begins here
//     ^   ^^  two of them ^
//         ^^^ wide
//           ^^ at the line
A|D4 F𝄪4.A4*a F|
    //  ^   ^^^ ^ behind everything
//^ close to the line
// ^^
B | _ |
//     ^^ under the voice above
// no ^ mark

//     ^ in no system
",
        "\
S | D5 E         F | G#5 |
//   ^ no note begins here
//     ^           ^^  two of them ^
//                 ^^^ wide
//                   ^^ at the line
A | D4 F##4.A4*a F |
    //     ^   ^^^  ^ behind everything
//  ^ close to the line
//   ^^
B | _              |
//       ^^ under the voice above
// no ^ mark

//     ^ in no system
",
    );
}

#[test]
fn wide_characters_are_counted_as_they_are_shown() {
    becomes(
        "S | G4 A | B C5 |\nwords S | 港の 灯 | e\u{301}t- é |\n",
        "S       | G4   A  | B   C5 |\nwords S | 港の 灯 | e\u{301}t- é  |\n",
    );
}

#[test]
fn line_ends_marks_of_order_and_missing_ends_stay() {
    becomes(
        "\u{feff}  title Quay\r\n \t \r\n\r\nS|g4|\r\n// a \r\nB|g3 a|",
        "\u{feff}title   Quay\r\n \t \r\n\r\nS | G4   |\r\n// a \r\nB | G3 A |",
    );
    becomes("\u{feff}S|g4|\n", "\u{feff}S | G4 |\n");
    stays(" \u{feff}S|g4|\n");
    stays("");
    stays("\r\n \n");
}

#[test]
fn no_figure_is_added_and_none_is_taken() {
    stays(
        "S | G4 A4 A  B4 | C | C5 B5 | =A | A4 A4 |\nA | B4 C  D4 -  | _ | G4 -  | G4 | _     |\n",
    );
}
