//! The checker's thread: takes the documents that changed, checks them, publishes what it finds.

use std::panic::{AssertUnwindSafe, catch_unwind};

use partwright_check::{Checked, Wishes};
use tower_lsp::lsp_types::MessageType;

use crate::documents::{Outcome, Snapshot, Verdict};
use crate::features::publish_diagnostics;
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
                session.outbox.findings(uri, Some(*generation), message);
            }
        });
    }
}

/// Checks a document and puts its findings into a message. A panic on the way is an outcome too.
fn check(
    session: &Session,
    snapshot: Snapshot,
    before: Option<&Outcome>,
) -> Option<(Outcome, Vec<u8>)> {
    let is_current = || {
        session
            .documents
            .is_current(&snapshot.uri, snapshot.generation)
    };
    let said = |outcome| {
        (
            publish_diagnostics::message(&outcome, session.agreed()),
            outcome,
        )
    };
    let work = || {
        break_if_asked(session);
        let text = snapshot.text.as_str();
        let wishes = Wishes::default();
        let checked = match before.and_then(Outcome::checked) {
            Some(before) => before.again(text, &wishes),
            None => Checked::text(text, &wishes),
        };
        let verdict = Verdict::Done(Box::new(checked));
        is_current().then(|| {
            said(Outcome {
                snapshot: snapshot.clone(),
                verdict,
            })
        })
    };
    let done = catch_unwind(AssertUnwindSafe(work)).unwrap_or_else(|_| {
        let (uri, version) = (&snapshot.uri, snapshot.version);
        session.log(
            MessageType::ERROR,
            format!("The check of {uri}, version {version}, broke off."),
        );
        Some(said(Outcome {
            snapshot: snapshot.clone(),
            verdict: Verdict::BrokeOff,
        }))
    });
    done.map(|(message, outcome)| (outcome, message))
}

#[expect(clippy::panic, reason = "a test asked for it")]
fn break_if_asked(session: &Session) {
    if session.take_break() {
        panic!("asked to break off");
    }
}
