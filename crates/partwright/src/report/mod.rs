//! Reports of findings: for reading, and for programs.

mod excerpt;
mod json;
mod marks;
mod plain;
mod rows;
mod window;

pub(crate) use json::json;
pub(crate) use plain::{Plain, heading, severity_style};

use partwright_check::Checked;
use partwright_sheet::Lines;

/// A checked sheet with what reports look up in it.
pub(crate) struct Page<'a> {
    /// What reports call the sheet.
    pub(crate) name: &'a str,
    /// Its text.
    pub(crate) text: &'a str,
    /// What was found, and where everything stands.
    pub(crate) checked: &'a Checked,
    lines: Lines<'a>,
}

impl<'a> Page<'a> {
    /// A page on a checked text.
    pub(crate) fn new(name: &'a str, text: &'a str, checked: &'a Checked) -> Page<'a> {
        Page {
            name,
            text,
            checked,
            lines: Lines::of(text),
        }
    }
}
