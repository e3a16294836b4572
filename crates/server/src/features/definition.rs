//! `textDocument/definition`: from a label to its declaration, from a mark to its footnote, and
//! from a footnote back to its marks.

use tower_lsp::lsp_types::{Location, Position};

use crate::convert;
use crate::documents::Outcome;
use crate::features::references::locations;
use crate::names::{self, Name};
use crate::session::Agreed;

/// Where the name at a position is explained.
pub(crate) fn definition(
    outcome: &Outcome,
    position: Position,
    agreed: Agreed,
) -> Option<Vec<Location>> {
    let reading = &outcome.checked()?.reading;
    let text = &outcome.snapshot.text;
    let offset = convert::offset(text, position, agreed.columns);
    let (name, here) = names::at(text.as_str(), reading, offset)?;
    let places = names::places(text.as_str(), reading, &name);
    let at_footnote = matches!(name, Name::Mark(_))
        && places
            .iter()
            .any(|place| place.declares && place.span == here);
    let wanted = places.into_iter().filter(|p| p.declares != at_footnote);
    Some(locations(outcome, wanted, agreed)).filter(|found| !found.is_empty())
}
