//! Reports of findings: for reading, and for programs.

mod excerpt;
mod json;
mod marks;
mod plain;
mod rows;
mod sarif;
mod window;

pub(crate) use plain::{Plain, heading, severity_style};
pub(crate) use rows::is_music_row;

use std::path::Path;

use partwright_check::{Checked, Finding};
use partwright_rules::Strictness;
use partwright_sheet::Lines;

use crate::arguments::Report;
use crate::files::Sheet;

/// A checked sheet with what reports look up in it.
pub(crate) struct Page<'a> {
    /// What reports call the sheet.
    pub(crate) name: &'a str,
    /// The file it is taken for.
    place: Option<&'a Path>,
    /// Its text.
    pub(crate) text: &'a str,
    /// What was found, and where everything stands.
    pub(crate) checked: &'a Checked,
    lines: Lines<'a>,
}

impl<'a> Page<'a> {
    /// A page on a checked text.
    pub(crate) fn new(sheet: &'a Sheet, text: &'a str, checked: &'a Checked) -> Page<'a> {
        Page {
            name: &sheet.name,
            place: sheet.place.as_deref(),
            text,
            checked,
            lines: Lines::of(text),
        }
    }

    /// The label of a voice.
    fn label(&self, voice: usize) -> &'a str {
        let voices = &self.checked.reading.score.voices;
        voices.get(voice).map_or("", |voice| &voice.label)
    }
}

/// Sets reports in one form.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Reporter {
    pub(crate) form: Report,
    pub(crate) plain: Plain,
    /// Licensed findings are among those shown.
    pub(crate) licensed: bool,
}

impl Reporter {
    /// The findings of a page, one piece after another.
    pub(crate) fn set(self, page: &Page<'_>, findings: &[&Finding], mut print: impl FnMut(String)) {
        match self.form {
            Report::Plain => self.plain.report(page, findings, print),
            Report::Json => findings.iter().for_each(|f| print(json::line(page, f))),
            Report::Sarif => {
                let uri = sarif::uri(page);
                let result = |f: &&Finding| sarif::result(page, &uri, f, self.licensed);
                findings.iter().for_each(|f| print(result(f)));
            }
        }
    }

    /// What stands before the first piece: `rules` tells which rules take part.
    pub(crate) fn head(self, rules: &Strictness) -> String {
        match self.form {
            Report::Plain | Report::Json => String::new(),
            Report::Sarif => sarif::head(rules),
        }
    }

    /// What stands between two pieces.
    pub(crate) fn between(self) -> &'static str {
        match self.form {
            Report::Plain | Report::Json => "",
            Report::Sarif => ",\n",
        }
    }

    /// What stands behind the last piece.
    pub(crate) fn tail(self, troubles: &[String]) -> String {
        match self.form {
            Report::Plain | Report::Json => String::new(),
            Report::Sarif => sarif::tail(troubles),
        }
    }
}
