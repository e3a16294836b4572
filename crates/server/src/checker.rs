//! The checker's thread: takes the documents that changed, checks them, publishes what it finds.

use std::panic::{AssertUnwindSafe, catch_unwind};
use std::path::{Path, PathBuf};
use std::sync::Arc;

use partwright_check::{Checked, Choice, House, Style, Wishes};
use tower_lsp::lsp_types::{MessageType, Url};

use crate::documents::{Outcome, Snapshot, Verdict};
use crate::features::publish_diagnostics;
use crate::houses::{self, Nearest};
use crate::lifecycle::State;
use crate::session::Session;

/// Checks what comes, for ever.
pub(crate) fn run(session: &Session) -> ! {
    loop {
        let (snapshot, before) = session.documents.next_to_check();
        let Some((outcome, message)) = check(session, snapshot, before.as_deref()) else {
            // Overtaken while it was checked: the next round publishes.
            continue;
        };
        session.documents.settle(outcome, |outcome| {
            if session.lifecycle.state() == State::Running {
                let Snapshot {
                    uri, generation, ..
                } = &outcome.snapshot;
                if let Some(message) = message {
                    session.outbox.findings(uri, Some(*generation), message);
                }
            }
        });
    }
}

/// Checks a document and puts its findings into a message. A panic on the way is an outcome too.
fn check(
    session: &Session,
    snapshot: Snapshot,
    before: Option<&Outcome>,
) -> Option<(Outcome, Option<Vec<u8>>)> {
    let is_current = || {
        session
            .documents
            .is_current(&snapshot.uri, snapshot.generation)
    };
    let agreed = session.agreed();
    // A client that asks for findings is not sent them as well.
    let said = |verdict| {
        let outcome = Outcome::new(snapshot.clone(), verdict);
        let message = (!agreed.pull).then(|| publish_diagnostics::message(&outcome, agreed));
        (outcome, message)
    };
    let work = || {
        break_if_asked(session);
        let verdict = verdict(session, &snapshot, before);
        is_current().then(|| said(verdict))
    };
    catch_unwind(AssertUnwindSafe(work)).unwrap_or_else(|_| {
        let (uri, version) = (&snapshot.uri, snapshot.version);
        session.log(
            MessageType::ERROR,
            format!("The check of {uri}, version {version}, broke off."),
        );
        Some(said(Verdict::BrokeOff))
    })
}

/// What a document is, checked: a sheet, or a house style.
fn verdict(session: &Session, snapshot: &Snapshot, before: Option<&Outcome>) -> Verdict {
    if houses::is_house(&snapshot.uri) {
        let trouble = |file: PathBuf| session.houses.trouble(&file, &session.documents);
        return Verdict::House(houses::path(&snapshot.uri).and_then(trouble));
    }
    let text = snapshot.text.as_str();
    let wishes = wishes(session, &snapshot.uri);
    Verdict::Done(Box::new(match before.and_then(Outcome::checked) {
        Some(before) => before.again(text, &wishes),
        None => Checked::text(text, &wishes),
    }))
}

/// How a sheet is to be checked: by its house style, and the style the user set.
fn wishes(session: &Session, uri: &Url) -> Wishes {
    let file = houses::path(uri);
    let house = file.as_deref().and_then(|file| house(session, uri, file));
    let mut wishes = Wishes {
        house,
        file,
        ..Wishes::default()
    };
    wishes.style = session.settings().style.and_then(|name| {
        let house = || wishes.house_is_called(&name).then_some(Choice::House);
        Style::named(&name).map(Choice::Style).or_else(house)
    });
    wishes
}

fn house(session: &Session, uri: &Url, file: &Path) -> Option<Arc<House>> {
    let found = session.houses.nearest(file, &session.documents);
    if found.anew {
        session.documents.check_again(Some(uri));
        session.findings_may_differ();
    }
    match found.nearest {
        Nearest::None => None,
        Nearest::House(house) => Some(house),
        Nearest::Broken(error) => {
            let open = Url::from_file_path(&error.file)
                .ok()
                .and_then(|uri| session.documents.snapshot(&uri));
            // One that is open has a finding where the trouble is.
            if found.news && open.is_none() {
                session.show(
                    MessageType::WARNING,
                    format!("{error} Sheets go without this house style until it is put right."),
                );
            }
            None
        }
    }
}

#[expect(clippy::panic, reason = "a test asked for it")]
fn break_if_asked(session: &Session) {
    if session.take_break() {
        panic!("asked to break off");
    }
}
