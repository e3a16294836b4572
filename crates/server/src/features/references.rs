//! `textDocument/references`: every place where a label or a mark stands.

use partwright_sheet::Span;
use tower_lsp::lsp_types::{Location, Position};

use crate::convert;
use crate::documents::Outcome;
use crate::names::{self, Place};
use crate::session::Agreed;

/// The places of the name at a position, its declaration among them if that is wanted.
pub(crate) fn references(
    outcome: &Outcome,
    position: Position,
    declaration: bool,
    agreed: Agreed,
) -> Option<Vec<Location>> {
    let reading = &outcome.checked()?.reading;
    let text = &outcome.snapshot.text;
    let offset = convert::offset(text, position, agreed.columns);
    let (name, _) = names::at(text.as_str(), reading, offset)?;
    let places = names::places(text.as_str(), reading, &name);
    let wanted = places.into_iter().filter(|p| declaration || !p.declares);
    Some(locations(outcome, wanted, agreed))
}

/// Places in the document as the protocol says them.
pub(crate) fn locations(
    outcome: &Outcome,
    places: impl Iterator<Item = Place>,
    agreed: Agreed,
) -> Vec<Location> {
    let one = |place: Place| Location {
        uri: outcome.snapshot.uri.clone(),
        range: convert::range(
            &outcome.snapshot.text,
            Span::new(place.span.start, place.span.end),
            agreed.columns,
        ),
    };
    places.map(one).collect()
}
