//! `rules`: the catalogue as a table, or one rule whole.

mod house;
mod page;
mod table;

use std::path::Path;

use partwright_rules::{Case, Entry, Severity, Style, catalogue, entry};

use crate::arguments::Rules;
use crate::houses::Houses;
use crate::outcome::Outcome;
use crate::prose::harmless;
use crate::report::Plain;
use crate::stage::Stage;
use crate::styles::{Asked, unknown};
use house::InForce;

/// Runs the command.
pub(crate) fn run(wanted: &Rules, stage: &mut Stage<'_>) -> Outcome {
    let look = Plain {
        width: stage.terminal.measure(),
        colour: wanted.colour.wanted(stage.terminal),
    };
    let mut houses = Houses::new();
    let nearest = houses.nearest(Path::new(""));
    let mut outcome = Outcome::Clean;
    for words in houses.troubles() {
        stage.complain(&format!("partwright: {}\n", harmless(&words)));
        outcome = Outcome::Trouble;
    }
    let in_force = nearest.house().map(|house| InForce::of(house, &houses));
    let view = match (Asked::of(wanted.style.as_deref()), &in_force) {
        (Asked::Nothing, Some(house)) => View::AllAnd(house),
        (Asked::Nothing, None) => View::All,
        (Asked::Style(style), _) => View::Style(style),
        (Asked::House(name), Some(house)) if house.is_called(&name) => View::House(house),
        (Asked::House(name), _) => {
            let words = unknown(&name, &houses.names());
            stage.complain(&format!("partwright: {}\n", harmless(&words)));
            return Outcome::Trouble;
        }
    };
    let text = match wanted.name.as_deref().map(|name| (name, entry(name))) {
        Some((_, Some(entry))) => page::page(entry, view, look),
        Some((family, None)) => table::table(&in_family(Some(family)), view, look),
        None => table::table(&in_family(None), view, look),
    };
    stage.out.print(&text);
    outcome
}

/// Which styles are shown.
#[derive(Clone, Copy)]
enum View<'a> {
    /// All of ours.
    All,
    /// All of ours, and what the house style changes.
    AllAnd(&'a InForce),
    /// One of ours.
    Style(Style),
    /// The house style.
    House(&'a InForce),
}

impl View<'_> {
    /// The styles of ours that are shown.
    fn shows(self, style: Style) -> bool {
        match self {
            View::All | View::AllAnd(_) => true,
            View::Style(wanted) => wanted == style,
            View::House(_) => false,
        }
    }

    /// The house style, where its changes are shown.
    fn house(&self) -> Option<&InForce> {
        match self {
            View::AllAnd(house) | View::House(house) => Some(house),
            View::All | View::Style(_) => None,
        }
    }
}

/// The rules of a family, or all.
fn in_family(family: Option<&str>) -> Vec<&'static Entry> {
    catalogue()
        .iter()
        .filter(|entry| family.is_none_or(|family| entry.family == family))
        .collect()
}

/// How strictly a style takes a rule: as its strictest case. `None` where it allows them all.
fn strictest(entry: &Entry, style: Style) -> Option<Severity> {
    entry
        .rule
        .cases
        .iter()
        .filter_map(|case| severity(case, style))
        .max()
}

fn severity(case: &Case, style: Style) -> Option<Severity> {
    case.setting(style)?.severity
}
