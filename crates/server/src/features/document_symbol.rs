//! `textDocument/documentSymbol`: systems, and in them bars and voices.

use partwright_check::Checked;
use partwright_sheet::Span;
use tower_lsp::lsp_types::{
    DocumentSymbol, DocumentSymbolResponse, Location, SymbolInformation, SymbolKind,
};

use crate::convert;
use crate::documents::Outcome;
use crate::session::Agreed;
use crate::systems::{System, systems};
use crate::text::Text;

/// A symbol before it is told in the one form or the other.
struct Symbol {
    name: String,
    detail: Option<String>,
    kind: SymbolKind,
    span: Span,
    selection: Span,
    inside: Vec<Symbol>,
}

/// The symbols of a document.
pub(crate) fn symbols(outcome: &Outcome, agreed: Agreed) -> Option<DocumentSymbolResponse> {
    let checked = outcome.checked()?;
    let text = &outcome.snapshot.text;
    let all: Vec<Symbol> = systems(checked)
        .iter()
        .map(|system| symbol(system, checked, text))
        .collect();
    Some(if agreed.symbol_trees {
        let trees = all.into_iter().map(|s| tree(s, text, agreed)).collect();
        DocumentSymbolResponse::Nested(trees)
    } else {
        let mut flat = Vec::new();
        for system in all {
            let container = system.name.clone();
            flat.push(information(&system, None, outcome, agreed));
            for inner in &system.inside {
                flat.push(information(inner, Some(&container), outcome, agreed));
            }
        }
        DocumentSymbolResponse::Flat(flat)
    })
}

fn symbol(system: &System, checked: &Checked, text: &Text) -> Symbol {
    let reading = &checked.reading;
    let score = &reading.score;
    let top = system.rows.first();
    let bars = system.bars.clone().filter_map(|index| {
        let (bar, (voice, _)) = (score.bars.get(index)?, top?);
        let first = reading.span_at(*voice, bar.onset)?;
        // From its first part to its bar line.
        let rest = text.line_from(first.start as usize);
        let ahead = text.as_str().get(rest.clone()).unwrap_or_default();
        let length = ahead.find('|').unwrap_or(ahead.len());
        let written = ahead.get(..length).unwrap_or_default().trim_end();
        Some(Symbol {
            name: format!("Bar {}", bar.number),
            detail: None,
            kind: SymbolKind::NUMBER,
            span: Span::new(rest.start, rest.start + written.len()),
            selection: first,
            inside: Vec::new(),
        })
    });
    let voices = system.rows.iter().filter_map(|&(voice, label)| {
        let declared = score.voices.get(voice)?;
        let line = text.line_from(label.start as usize);
        Some(Symbol {
            name: declared.label.clone(),
            detail: Some(declared.kind.name.to_owned()),
            kind: SymbolKind::FIELD,
            span: Span::new(line.start, line.end),
            selection: label,
            inside: Vec::new(),
        })
    });
    Symbol {
        name: system.name(checked),
        detail: None,
        kind: SymbolKind::NAMESPACE,
        span: system.span,
        selection: top.map_or(system.span, |(_, label)| *label),
        inside: bars.chain(voices).collect(),
    }
}

#[expect(deprecated, reason = "the type has a field that is out of use")]
fn tree(symbol: Symbol, text: &Text, agreed: Agreed) -> DocumentSymbol {
    // Symbols are two deep.
    let inside = symbol.inside.into_iter().map(|s| tree(s, text, agreed));
    let inside: Vec<DocumentSymbol> = inside.collect();
    DocumentSymbol {
        name: symbol.name,
        detail: symbol.detail,
        kind: symbol.kind,
        tags: None,
        deprecated: None,
        range: convert::range(text, symbol.span, agreed.columns),
        selection_range: convert::range(text, symbol.selection, agreed.columns),
        children: (!inside.is_empty()).then_some(inside),
    }
}

#[expect(deprecated, reason = "the type has a field that is out of use")]
fn information(
    symbol: &Symbol,
    container: Option<&str>,
    outcome: &Outcome,
    agreed: Agreed,
) -> SymbolInformation {
    SymbolInformation {
        name: symbol.name.clone(),
        kind: symbol.kind,
        tags: None,
        deprecated: None,
        location: Location {
            uri: outcome.snapshot.uri.clone(),
            range: convert::range(&outcome.snapshot.text, symbol.span, agreed.columns),
        },
        container_name: container.map(str::to_owned),
    }
}
