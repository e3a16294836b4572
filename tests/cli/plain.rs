//! The report for reading.

use unicode_width::UnicodeWidthStr;

use partwright_cli::{Stage, Terminal};

use crate::support::{FLAWED, Folder};

fn report(sheet: &str, arguments: &[&str]) -> String {
    let folder = Folder::with(&[("a.voices", sheet)]);
    folder
        .run(&[&["check", "a.voices"], arguments].concat())
        .out
}

/// The columns of each mark below the line that holds `row`.
#[track_caller]
fn marked(report: &str, row: &str) -> Vec<(usize, usize)> {
    let lines: Vec<&str> = report.lines().collect();
    let at = lines
        .iter()
        .position(|line| line.contains(row))
        .unwrap_or_else(|| panic!("no {row} in\n{report}"));
    let mut marks = Vec::new();
    let mut column = 0;
    for c in lines[at + 1].chars() {
        if matches!(c, '━' | '─' | '┯' | '┬') && column > 4 {
            match marks.last_mut() {
                Some((_, end)) if *end == column => *end += 1,
                _ => marks.push((column, column + 1)),
            }
        }
        column += unicode_width::UnicodeWidthChar::width(c).unwrap_or(0);
    }
    marks
}

/// The text of the line that holds `row` between two columns.
fn between(report: &str, row: &str, (start, end): (usize, usize)) -> String {
    let line = report.lines().find(|line| line.contains(row)).unwrap();
    let mut column = 0;
    let mut found = String::new();
    for c in line.chars() {
        if (start..end).contains(&column) {
            found.push(c);
        }
        column += unicode_width::UnicodeWidthChar::width(c).unwrap_or(0);
    }
    found
}

#[track_caller]
fn fits(report: &str, width: usize) {
    for line in report.lines() {
        assert!(line.width() <= width, "{} columns: {line}", line.width());
    }
}

/// Every mark in a report with the text it stands under: the report is right if these are notes.
#[track_caller]
fn marks_under(report: &str, rows: &[&str]) -> Vec<String> {
    rows.iter()
        .flat_map(|row| {
            marked(report, row)
                .into_iter()
                .map(|mark| between(report, row, mark))
        })
        .collect()
}

/// Four voices whose only flaw is named by the test; wide, since every bar is written out.
fn wide(bars: usize, flawed: usize, bar: impl Fn(&str) -> String) -> String {
    let row = |label: &str, good: &str, bad: &str| {
        let bars: Vec<String> = (1..=bars)
            .map(|n| bar(if n == flawed { bad } else { good }))
            .collect();
        format!("{label} |{}|\n", bars.join("|"))
    };
    // In the flawed bar soprano and bass go in fifths from beat 2 to beat 3.
    format!(
        "metre 4/4\n\n{}{}{}{}",
        row("S", "E5 E5 E5 E5", "E5 D5 E5 E5"),
        row("A", "C5 C5 C5 C5", "C5 B4 C5 C5"),
        row("T", "G4 G4 G4 G4", "G4 G4 A4 G4"),
        row("B", "C4 C4 C4 C4", "C4 G3 A3 C4"),
    )
}

#[test]
fn the_rows_are_marked_where_the_voices_move() {
    let report = report(FLAWED, &["--pick", "parallel-fifths"]);
    // The words are the rule's own; how they wrap is tested elsewhere.
    let block: Vec<&str> = report
        .lines()
        .skip(1)
        .take_while(|line| !line.contains("╭▸"))
        .collect();
    let message = block.join("\n").trim_start().to_owned();
    assert!(message.starts_with("Parallel fifths: "), "{report}");
    let expected = format!(
        "\
fault: parallel-fifths · bar 1, beat 2 · S and B
  {message}
  ╭▸ a.voices:4:8
4 │ S | D5 E | F E |
  │     ── ━ S from D5 to E5
5 │ B | G3 A | F E |
  ╰╴    ── ─ with B from G3 to A3

"
    );
    assert_eq!(report, expected);
}

#[test]
fn marks_stand_under_their_notes_in_columns() {
    for sheet in [
        "S | F♯5 G♯ |\nB | B3 C♯4 |\n",
        "S\t|\tF#5\tG#\t|\nB\t|\tB3\tC#4\t|\n",
        "S |\u{3000}F𝄪5\u{a0}G𝄪 |\nB |\u{3000}B♯3\u{a0}C𝄪4 |\n",
    ] {
        let report = report(sheet, &["--pick", "parallel-fifths"]);
        let rows: Vec<&str> = sheet
            .lines()
            .map(|row| row.split('\t').next().unwrap())
            .collect();
        let rows: Vec<String> = rows.iter().map(|row| format!("│ {}", &row[..1])).collect();
        let rows: Vec<&str> = rows.iter().map(String::as_str).collect();
        let notes: Vec<&str> = sheet
            .split_whitespace()
            .filter(|word| !matches!(*word, "S" | "B" | "|"))
            .collect();
        assert_eq!(marks_under(&report, &rows), notes, "{report}");
        assert!(!report.contains('\t'), "{report}");
        fits(&report, 80);
    }
}

#[test]
fn rows_of_300_characters_are_cut_around_the_marks() {
    let aligned = |bar: &str| format!(" {bar}   ");
    let ragged = |bar: &str| format!(" {} ", bar.replace("E5 E5", "E5  E5"));
    for (sheet, place) in [
        (wide(20, 1, aligned), "bar 1, beat 3"),
        (wide(20, 10, aligned), "bar 10, beat 3"),
        (wide(20, 20, aligned), "bar 20, beat 3"),
        (wide(20, 10, ragged), "bar 10, beat 3"),
    ] {
        assert!(sheet.lines().any(|line| line.len() >= 300));
        let report = report(&sheet, &["--pick", "parallel-fifths", "--voices", "B"]);
        assert!(report.contains(place), "{report}");
        assert_eq!(
            marks_under(&report, &["│ S |", "│ B |"]),
            ["D5", "E5", "G3", "A3"],
            "{report}"
        );
        assert!(
            report.contains("│ A |") && report.contains("│ T |"),
            "the other voices too: {report}"
        );
        assert!(report.contains('…'), "{report}");
        fits(&report, 80);
    }
}

#[test]
fn a_bar_of_300_characters_is_cut_between_its_cells() {
    // One bar in a free metre: the flawed beats are 38 and 39.
    let sheet = wide(20, 10, str::to_owned).replace("metre 4/4", "metre free");
    let rows: Vec<String> = sheet
        .lines()
        .map(|line| match line.split_once('|') {
            Some((label, cells)) => format!(
                "{label}| {} |",
                cells.trim_end_matches('|').replace('|', " ")
            ),
            None => line.to_owned(),
        })
        .collect();
    let report = report(
        &(rows.join("\n") + "\n"),
        &["--pick", "parallel-fifths", "--voices", "B"],
    );
    assert!(report.contains("bar 1, beat 39"), "{report}");
    assert_eq!(
        marks_under(&report, &["│ S |", "│ B |"]),
        ["D5", "E5", "G3", "A3"],
        "{report}"
    );
    fits(&report, 80);
}

#[test]
fn a_line_of_a_megabyte_is_reported_like_any_other() {
    let bars = 60_000;
    let sheet = wide(bars, bars, |bar| format!(" {bar} "));
    assert!(sheet.lines().any(|line| line.len() > 800_000));
    let report = report(&sheet, &["--pick", "parallel-fifths", "--voices", "B"]);
    assert!(report.contains(&format!("bar {bars}, beat 3")), "{report}");
    assert_eq!(
        marks_under(&report, &["│ S |", "│ B |"]),
        ["D5", "E5", "G3", "A3"],
        "{report}"
    );
    fits(&report, 80);
}

#[test]
fn a_step_over_two_systems_shows_both() {
    let sheet = "metre 2/4\n\nS | C5 D5 |\nB | C4 G3 |\n\nS | E5 C5 |\nB | A3 C4 |\n";
    let report = report(sheet, &["--pick", "parallel-fifths"]);
    assert!(report.contains("bar 2, beat 1"), "{report}");
    assert_eq!(
        marks_under(&report, &["3 │ S", "4 │ B", "6 │ S", "7 │ B"]),
        ["D5", "G3", "E5", "A3"],
        "{report}"
    );
    assert!(
        report.contains("from D5\n") && report.contains("S from D5 to E5"),
        "{report}"
    );
}

#[test]
fn only_the_marked_rows_of_a_large_score() {
    let rows: String = (1..=9)
        .map(|n| format!("V{n} | {} |\n", if n == 2 { "D5 E5" } else { "G4 G4" }))
        .collect();
    let sheet = rows.replace("V8 | G4 G4", "V8 | G3 A3");
    let report = report(&sheet, &["--pick", "parallel-fifths", "--voices", "V8"]);
    assert_eq!(
        marks_under(&report, &["│ V2", "│ V8"]),
        ["D5", "E5", "G3", "A3"],
        "{report}"
    );
    assert!(!report.contains("V5"), "{report}");
}

#[test]
fn right_forms_are_offered() {
    let report = report("S | G4 H4 | A4 B4 |\n", &["--pick", "reading"]);
    assert!(report.starts_with("fault: reading · "), "{report}");
    assert!(
        report
            .lines()
            .any(|line| line.contains("help: ") && line.contains("B4")),
        "{report}"
    );
    assert_eq!(marks_under(&report, &["│ S"]), ["H4"]);
}

#[test]
fn the_words_are_a_musicians() {
    let sheet = "style chorale\n\nS | D4 E F A |\nA | C4 F E F4 |\nB | A3 C D C |\n\nS | H4 |\nA | C4 A |\n";
    let report = report(sheet, &[]);
    for word in ["fault: ", "weakness: ", "remark: "] {
        assert!(
            report.lines().any(|line| line.starts_with(word)),
            "{word}{report}"
        );
    }
    for word in ["error", "warning", "note:", "info:"] {
        assert!(!report.contains(word), "{word}: {report}");
    }
}

#[test]
fn lines_are_as_wide_as_the_terminal_within_reason() {
    let folder = Folder::with(&[("a.voices", &wide(20, 10, |bar| format!(" {bar}   ")))]);
    let printed = |width: usize| {
        let (mut input, mut out, mut err) = (std::io::empty(), Vec::new(), Vec::new());
        let terminal = Terminal {
            out: true,
            err: true,
            width: Some(width),
            colourless: true,
        };
        let mut stage = Stage::new(&mut input, &mut out, &mut err, terminal);
        let path = folder.path("a.voices");
        let _ = partwright_cli::run(
            ["partwright".into(), "check".into(), path.into()],
            &mut stage,
        );
        let text = String::from_utf8(out).unwrap();
        // The path of the temporary folder is as long as it is.
        text.lines()
            .filter(|line| !line.contains("╭▸"))
            .map(|line| line.width())
            .max()
            .unwrap()
    };
    assert!(printed(60) <= 60);
    assert!((80..=100).contains(&printed(250)), "{}", printed(250));
}

#[test]
fn windows_line_ends_and_a_byte_order_mark_shift_nothing() {
    let plain = report(FLAWED, &["--pick", "motion"]);
    let windows = format!("\u{feff}{}", FLAWED.replace('\n', "\r\n"));
    assert_eq!(report(&windows, &["--pick", "motion"]), plain);
    // On the first line, the mark itself is no column.
    let first = report("\u{feff}S | H4 |\n", &["--pick", "reading"]);
    assert!(
        first.contains("a.voices:1:5") && first.contains("1 │ S | H4 |\n"),
        "{first}"
    );
}

#[test]
fn nothing_in_a_sheet_or_its_name_steers_the_terminal() {
    let folder = Folder::new();
    let sheet = "title a\u{1b}[2J\n\nS | C4 \u{1b}[31m \u{202e}4 | x\u{7}y |\n\u{9b}31m |\n";
    folder.write("a\u{1b}[31m.voices", sheet.as_bytes());
    for arguments in [
        ["check", "."].as_slice(),
        &["check", "--bars", "9", "."],
        &["check", "b\u{1b}[1m.voices"],
    ] {
        let ran = folder.run(arguments);
        let steers = |c: char| (c.is_control() && c != '\n') || c == '\u{202e}';
        assert!(!(ran.out + &ran.err).contains(steers), "{arguments:?}");
    }
}

#[test]
fn a_wide_beat_in_front_of_the_first_bar_line_is_cut_too() {
    let wide = format!("C4{}", ".-".repeat(38));
    let sheet = format!("C4 {wide} | F♯5\n S S\n C4 {wide} |");
    let folder = Folder::with(&[("wide.voices", &sheet)]);
    let ran = folder.run(&["check", "wide.voices"]);
    assert!(ran.out.contains("from F#5"), "{}", ran.out);
    fits(&ran.out, 80);
}

proptest::proptest! {
    /// Whatever is typed, something is reported, at the width of the page.
    #[test]
    fn any_text_is_reported_within_80_columns(
        words in proptest::collection::vec(
            proptest::sample::select(&[
                "S", "B", "V1", "|", "||", "C4", "F♯5", "B𝄫3", "H4", ".", "-", "_", "?", "^", "全", "\t", "\n", "\n\n",
                "\r\n", " ", "  ", "\u{3000}", "\u{301}", "\u{200d}", "//", "*a", "licence", "crossing:", "words", "=S",
                "voice", "metre 3/4", "C4.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-.-",
            ][..]),
            0..160,
        ),
        blanks in proptest::bool::ANY,
    ) {
        let text = words.join(if blanks { " " } else { "" });
        let (mut input, mut out, mut err) = (text.as_bytes(), Vec::new(), Vec::new());
        let mut stage = Stage::new(&mut input, &mut out, &mut err, Terminal::default());
        let _ = partwright_cli::run(["partwright", "check", "-"].map(Into::into), &mut stage);
        let (out, err) = (String::from_utf8(out).unwrap(), String::from_utf8(err).unwrap());
        fits(&out, 80);
        let found = out.lines().filter(|line| line.contains("╭▸")).count();
        proptest::prop_assert_eq!(found > 0, !err.contains("Nothing found"), "{}{}", out, err);
    }
}
