//! The catalogue as a table, by family.

use partwright_rules::{Entry, STYLES, Severity, catalogue};

use super::{View, strictest};
use crate::prose::wrap;
use crate::report::{Plain, heading, severity_style};

/// Columns of a style in the table of all the styles.
const COLUMNS: [usize; STYLES.len()] = [6, 9, 7, 3, 3, 3, 3, 3];
const LEGEND: &str = "F fault   W weakness   R remark   - allowed\n";
const MORE: &str =
    "A rule of several cases stands as its strictest. `partwright rules NAME` tells a rule whole.";

/// The rules with how strictly each style takes them, or one style does: then only those that
/// hold in it. What the house style changes stands below.
pub(super) fn table(entries: &[&Entry], view: View<'_>, look: Plain) -> String {
    let name = entries
        .iter()
        .map(|entry| entry.id.len())
        .max()
        .unwrap_or(0)
        + 4;
    let mut text = String::new();
    match view {
        View::Style(style) => text.push_str(&format!(
            "In the style {}: {}.\n",
            style.name(),
            style.summary()
        )),
        View::House(house) => {
            let words = format!("In the house style {}.", house.title());
            text.push_str(&crate::prose::block(&words, look.width, 0));
        }
        View::All | View::AllAnd(_) => {
            text.push_str(LEGEND);
            text.push('\n');
            text.push_str(&headings(name, look));
        }
    }
    let mut family = "";
    let mut rules = 0;
    for entry in entries {
        let severity = match view {
            View::All | View::AllAnd(_) => None,
            View::Style(style) => Some(strictest(entry, style)),
            View::House(house) => Some(house.strictest(entry)),
        };
        let row = match severity {
            None => letters(entry, name, look),
            Some(Some(severity)) => one_style(entry, severity, name, look),
            Some(None) => continue,
        };
        rules += 1;
        if entry.family != family {
            family = entry.family;
            text.push_str(&format!("\n{}\n", look.paint(heading(), family)));
        }
        text.push_str(&row);
    }
    if rules == 0 {
        text.push_str("\nNo rule here yet.\n");
    }
    text.push('\n');
    if let Some(house) = view.house() {
        let all = entries.len() == catalogue().len();
        text.push_str(&house.changes(entries, all, look));
        text.push('\n');
    }
    text.push_str(&crate::prose::block(MORE, look.width, 0));
    text
}

/// Two lines, for the species share a word.
fn headings(name: usize, look: Plain) -> String {
    let species: usize = COLUMNS.iter().skip(3).sum();
    let before: usize = COLUMNS.iter().take(3).sum();
    let above = format!("{:name$}{:before$}{:species$}", "", "", "species-");
    let mut below = format!("{:name$}", "");
    for (style, width) in STYLES.iter().zip(COLUMNS) {
        let short = style
            .name()
            .strip_prefix("species-")
            .unwrap_or(style.name());
        below.push_str(&format!("{short:width$}"));
    }
    format!(
        "{}\n{}\n",
        look.paint(heading(), above.trim_end()),
        look.paint(heading(), below.trim_end())
    )
}

/// A rule with a letter for each style, and its title below.
fn letters(entry: &Entry, name: usize, look: Plain) -> String {
    let mut row = format!("  {:rest$}", entry.id, rest = name - 2);
    for (style, width) in STYLES.into_iter().zip(COLUMNS) {
        let severity = strictest(entry, style);
        let letter = match severity {
            Some(Severity::Fault) => "F",
            Some(Severity::Weakness) => "W",
            Some(Severity::Remark) => "R",
            None => "-",
        };
        let painted = severity.map_or(letter.to_owned(), |severity| {
            look.paint(severity_style(severity), letter)
        });
        row.push_str(&painted);
        row.push_str(&" ".repeat(width - 1));
    }
    let title = crate::prose::block(&entry.page.title, look.width, 6);
    format!("{}\n{title}", row.trim_end())
}

/// A rule with the word of its severity and its title.
fn one_style(entry: &Entry, severity: Severity, name: usize, look: Plain) -> String {
    let word = look.paint(severity_style(severity), severity.word());
    let blanks = " ".repeat(10 - severity.word().len());
    let indent = name + 10;
    let title = wrap(&entry.page.title, look.width, indent).join(&format!("\n{:indent$}", ""));
    format!(
        "  {:rest$}{word}{blanks}{title}\n",
        entry.id,
        rest = name - 2
    )
}
