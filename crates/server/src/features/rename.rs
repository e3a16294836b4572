//! `textDocument/rename`: another label for a voice, or other letters for a footnote mark,
//! wherever they stand.

use partwright_sheet::{Edit, Sheet, Span, apply};
use tower_lsp::jsonrpc::{Error, Result};
use tower_lsp::lsp_types::{Position, PrepareRenameResponse, WorkspaceEdit};

use crate::convert;
use crate::documents::Outcome;
use crate::names::{self, Name};
use crate::session::Agreed;

/// The name at a position, and its words.
pub(crate) fn prepare(
    outcome: &Outcome,
    position: Position,
    agreed: Agreed,
) -> Option<PrepareRenameResponse> {
    let reading = &outcome.checked()?.reading;
    let text = &outcome.snapshot.text;
    let offset = convert::offset(text, position, agreed.columns);
    let (name, here) = names::at(text.as_str(), reading, offset)?;
    let (Name::Label(placeholder) | Name::Mark(placeholder)) = name;
    Some(PrepareRenameResponse::RangeWithPlaceholder {
        range: convert::range(text, Span::new(here.start, here.end), agreed.columns),
        placeholder,
    })
}

fn refused(why: String) -> Error {
    Error {
        message: why.into(),
        ..Error::invalid_params("")
    }
}

/// The edits that rename it.
///
/// # Errors
/// Where the new name cannot stand, or stands for something else already.
pub(crate) fn rename(
    outcome: &Outcome,
    position: Position,
    new: &str,
    agreed: Agreed,
) -> Result<Option<WorkspaceEdit>> {
    let Some(checked) = outcome.checked() else {
        return Ok(None);
    };
    let text = &outcome.snapshot.text;
    let offset = convert::offset(text, position, agreed.columns);
    let Some((name, _)) = names::at(text.as_str(), &checked.reading, offset) else {
        return Err(refused(
            "Here stands nothing with a name: a voice's label and a footnote mark can be renamed."
                .to_owned(),
        ));
    };
    let new = new.trim();
    let (old, renamed) = match &name {
        Name::Label(old) => (old, Name::Label(new.to_owned())),
        Name::Mark(old) => {
            let new = new.strip_prefix('*').unwrap_or(new);
            (old, Name::Mark(new.to_owned()))
        }
    };
    let (word, lawful) = match &renamed {
        Name::Label(word) => (word, is_label(word)),
        Name::Mark(word) => {
            let letters = word.bytes().all(|b| b.is_ascii_alphabetic());
            (word, letters && !word.is_empty())
        }
    };
    if word == old {
        return Ok(None);
    }
    if !lawful {
        return Err(refused(match renamed {
            Name::Label(_) => format!(
                "{word} cannot be a label: it is a letter and at most seven more letters or \
                 digits, eight in all."
            ),
            Name::Mark(_) => format!("{word} cannot be a mark: marks are letters only."),
        }));
    }
    if !names::places(text.as_str(), &checked.reading, &renamed).is_empty() {
        return Err(refused(format!("{word} is taken already.")));
    }
    let places = names::places(text.as_str(), &checked.reading, &name);
    let edits: Vec<Edit> = places
        .into_iter()
        .map(|place| Edit {
            span: Span::new(place.span.start, place.span.end),
            text: word.clone(),
        })
        .collect();
    // Words of the notation cannot be labels, and some shapes mean something else in their place:
    // the sheet is read with the new name, and must read as well as before.
    let after = apply(text.as_str(), &edits);
    let problems = Sheet::read(&after).lower(&after).problems.len();
    if problems > checked.reading.problems.len() {
        return Err(refused(format!(
            "{word} cannot stand here: it is a word of the notation, or means something else."
        )));
    }
    Ok(Some(convert::workspace_edit(
        &outcome.snapshot,
        &edits,
        agreed,
    )))
}

/// A letter and at most seven more letters or digits.
fn is_label(word: &str) -> bool {
    word.len() <= 8
        && word.starts_with(|c: char| c.is_ascii_alphabetic())
        && word.bytes().all(|b| b.is_ascii_alphanumeric())
}
