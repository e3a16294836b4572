//! `rules`: the catalogue as a table, or one rule whole.

mod page;
mod table;

use partwright_rules::{Case, Entry, Severity, Style, catalogue, entry};

use crate::arguments::Rules;
use crate::outcome::Outcome;
use crate::report::Plain;
use crate::stage::Stage;

/// Runs the command.
pub(crate) fn run(wanted: &Rules, stage: &mut Stage<'_>) -> Outcome {
    let look = Plain {
        width: stage.terminal.measure(),
        colour: wanted.colour.wanted(stage.terminal),
    };
    let text = match wanted.name.as_deref().map(|name| (name, entry(name))) {
        Some((_, Some(entry))) => page::page(entry, wanted.style, look),
        Some((family, None)) => table::table(&in_family(Some(family)), wanted.style, look),
        None => table::table(&in_family(None), wanted.style, look),
    };
    stage.out.print(&text);
    Outcome::Clean
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
