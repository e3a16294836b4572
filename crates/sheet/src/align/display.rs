//! Display columns: how wide a text is shown, and the blanks between texts.

use unicode_width::UnicodeWidthStr;

const BLANKS: &str = "                                                                ";

/// How many columns a text takes.
pub(super) fn width(text: &str) -> usize {
    // Almost everything in a sheet is; looking each character up would take most of the time.
    if text.bytes().all(|byte| (b' '..0x7f).contains(&byte)) {
        text.len()
    } else {
        text.width()
    }
}

/// Adds so many blanks to a text.
pub(super) fn blanks(text: &mut String, mut number: usize) {
    while number > 0 {
        let some = BLANKS.get(..number).unwrap_or(BLANKS);
        text.push_str(some);
        number -= some.len();
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn widths_and_blanks() {
        for (text, columns) in [
            ("", 0),
            ("G4 |", 4),
            ("港の灯", 6),
            ("e\u{301}", 1),
            ("♯", 1),
        ] {
            assert_eq!(width(text), columns, "{text}");
            assert_eq!(width(text), text.width());
        }
        for number in [0, 1, 63, 64, 65, 200] {
            let mut text = String::from("x");
            blanks(&mut text, number);
            assert_eq!(text, format!("x{}", " ".repeat(number)));
        }
    }
}
