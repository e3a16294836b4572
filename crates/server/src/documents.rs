//! The open documents: their text, and what the checker makes of it.
//!
//! One writer: the text changes only in [`Documents::open`], [`Documents::change`] and
//! [`Documents::close`], which the reader of the input calls in the order of arrival. Everybody
//! else reads snapshots.

use std::collections::{HashMap, VecDeque};
use std::fmt;
use std::sync::{Arc, Condvar, Mutex, MutexGuard, PoisonError};

use partwright_check::Checked;
use partwright_check::house::HouseError;
use partwright_mend::Mend;
use tokio::sync::watch;
use tower_lsp::lsp_types::Url;

use crate::text::{BadPlace, Columns, Place, Text};

/// A document at one moment.
#[derive(Clone, Debug)]
pub(crate) struct Snapshot {
    /// Its name.
    pub(crate) uri: Url,
    /// Its version, as the client counts.
    pub(crate) version: i32,
    /// Its state, as the server counts: every opening and every change is a new one.
    pub(crate) generation: u64,
    /// The generation of its text: it stays when only a house style changed.
    pub(crate) edited: u64,
    /// Its text.
    pub(crate) text: Arc<Text>,
}

/// What the checker made of a snapshot.
#[derive(Debug)]
pub(crate) struct Outcome {
    /// Of what.
    pub(crate) snapshot: Snapshot,
    /// What was found.
    pub(crate) verdict: Verdict,
    /// The mends found so far, by the index of their finding.
    pub(crate) mends: Mutex<HashMap<usize, Arc<[Mend]>>>,
}

/// How a check ended.
#[derive(Debug)]
pub(crate) enum Verdict {
    /// It was done.
    Done(Box<Checked>),
    /// It is no sheet but a house style, with what is wrong with it.
    House(Option<HouseError>),
    /// The checker itself broke off.
    BrokeOff,
}

impl Outcome {
    /// What was made of a snapshot.
    pub(crate) fn new(snapshot: Snapshot, verdict: Verdict) -> Outcome {
        Outcome {
            snapshot,
            verdict,
            mends: Mutex::default(),
        }
    }

    /// The checked sheet, where there is one.
    pub(crate) fn checked(&self) -> Option<&Checked> {
        match &self.verdict {
            Verdict::Done(checked) => Some(checked),
            Verdict::House(_) | Verdict::BrokeOff => None,
        }
    }
}

/// One change of a batch.
#[derive(Clone, Debug)]
pub(crate) struct Change {
    /// What is replaced; `None` for all.
    pub(crate) range: Option<(Place, Place)>,
    /// By what.
    pub(crate) text: String,
}

/// Why a batch of changes was not applied.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Refused {
    /// The document is not open.
    NotOpen,
    /// A range is none.
    Range(BadPlace),
}

impl fmt::Display for Refused {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Refused::NotOpen => f.write_str("it is not open"),
            Refused::Range(bad) => bad.fmt(f),
        }
    }
}

struct Document {
    snapshot: Snapshot,
    outcome: watch::Sender<Option<Arc<Outcome>>>,
}

#[derive(Default)]
struct State {
    open: HashMap<Url, Document>,
    /// Documents whose present state nobody has checked yet, longest waiting first: one place
    /// each, however often it changes.
    waiting: VecDeque<Url>,
    generation: u64,
}

impl State {
    fn touched(&mut self, uri: &Url) -> u64 {
        if !self.waiting.contains(uri) {
            self.waiting.push_back(uri.clone());
        }
        self.generation += 1;
        self.generation
    }
}

/// The open documents.
#[derive(Default)]
pub(crate) struct Documents {
    state: Mutex<State>,
    work: Condvar,
}

impl Documents {
    fn lock(&self) -> MutexGuard<'_, State> {
        self.state.lock().unwrap_or_else(PoisonError::into_inner)
    }

    /// Opens a document; one that was open already begins anew.
    pub(crate) fn open(&self, uri: &Url, version: i32, text: String) {
        let text = Arc::new(Text::new(text));
        let mut state = self.lock();
        let generation = state.touched(uri);
        let snapshot = Snapshot {
            uri: uri.clone(),
            version,
            generation,
            edited: generation,
            text,
        };
        let outcome = watch::Sender::new(None);
        state
            .open
            .insert(uri.clone(), Document { snapshot, outcome });
        self.work.notify_one();
    }

    /// Applies a batch of changes, one after the other, or none of them.
    ///
    /// # Errors
    /// Where the document is not open, or a range is none of the text at its turn: the text and
    /// its version then stay as they were.
    pub(crate) fn change(
        &self,
        uri: &Url,
        version: i32,
        changes: &[Change],
        columns: Columns,
    ) -> Result<(), Refused> {
        let mut state = self.lock();
        let document = state.open.get_mut(uri).ok_or(Refused::NotOpen)?;
        if let [
            Change {
                range: Some((start, end)),
                text: new,
            },
        ] = changes
        {
            // The usual case in place: the text is copied only while somebody reads the old one.
            let range = document
                .snapshot
                .text
                .range(*start, *end, columns)
                .map_err(Refused::Range)?;
            Arc::make_mut(&mut document.snapshot.text).replace(range, new);
        } else {
            let mut text = Arc::clone(&document.snapshot.text);
            for change in changes {
                match change.range {
                    None => text = Arc::new(Text::new(change.text.clone())),
                    Some((start, end)) => {
                        let range = text.range(start, end, columns).map_err(Refused::Range)?;
                        Arc::make_mut(&mut text).replace(range, &change.text);
                    }
                }
            }
            document.snapshot.text = text;
        }
        document.snapshot.version = version;
        let generation = state.touched(uri);
        if let Some(document) = state.open.get_mut(uri) {
            document.snapshot.generation = generation;
            document.snapshot.edited = generation;
        }
        self.work.notify_one();
        Ok(())
    }

    /// Has every open document but one checked again, though its text is the same.
    pub(crate) fn check_again(&self, but: Option<&Url>) {
        let mut state = self.lock();
        let uris: Vec<Url> = state.open.keys().cloned().collect();
        for uri in uris.iter().filter(|uri| Some(*uri) != but) {
            let generation = state.touched(uri);
            if let Some(document) = state.open.get_mut(uri) {
                document.snapshot.generation = generation;
            }
        }
        self.work.notify_one();
    }

    /// What was made of a document, if it still is as it was then.
    pub(crate) fn settled(&self, uri: &Url, generation: u64) -> Option<Arc<Outcome>> {
        let state = self.lock();
        let outcome = state.open.get(uri)?.outcome.borrow().clone();
        outcome.filter(|o| o.snapshot.generation == generation)
    }

    /// Closes a document, and tells whether it was open. `after` runs before anybody can publish
    /// anything more.
    pub(crate) fn close(&self, uri: &Url, after: impl FnOnce()) -> bool {
        let mut state = self.lock();
        state.waiting.retain(|waiting| waiting != uri);
        let was_open = state.open.remove(uri).is_some();
        if was_open {
            after();
        }
        was_open
    }

    /// A document as it is now.
    pub(crate) fn snapshot(&self, uri: &Url) -> Option<Snapshot> {
        Some(self.lock().open.get(uri)?.snapshot.clone())
    }

    /// Whether a document is still in that state.
    pub(crate) fn is_current(&self, uri: &Url, generation: u64) -> bool {
        self.lock()
            .open
            .get(uri)
            .is_some_and(|d| d.snapshot.generation == generation)
    }

    /// What the checker makes of a document as it is when this is called; `None` where it is not
    /// open, or changes or is closed before it is checked.
    pub(crate) async fn outcome(&self, uri: &Url) -> Option<Arc<Outcome>> {
        let (generation, edited, mut outcomes) = {
            let state = self.lock();
            let Document { snapshot, outcome } = state.open.get(uri)?;
            (snapshot.generation, snapshot.edited, outcome.subscribe())
        };
        let of = |outcome: &Option<Arc<Outcome>>| outcome.as_ref().map(|o| o.snapshot.generation);
        let outcome = outcomes
            .wait_for(|o| of(o).is_some_and(|g| g >= generation))
            .await
            .ok()?;
        outcome.clone().filter(|o| o.snapshot.edited == edited)
    }

    /// Waits for a document to check, and returns it with what was made of it before.
    pub(crate) fn next_to_check(&self) -> (Snapshot, Option<Arc<Outcome>>) {
        let mut state = self.lock();
        loop {
            while let Some(uri) = state.waiting.pop_front() {
                if let Some(document) = state.open.get(&uri) {
                    return (document.snapshot.clone(), document.outcome.borrow().clone());
                }
            }
            state = self
                .work
                .wait(state)
                .unwrap_or_else(PoisonError::into_inner);
        }
    }

    /// Takes an outcome over, unless its document has changed or was closed since; then `publish`
    /// runs before the document can change again.
    pub(crate) fn settle(&self, outcome: Outcome, publish: impl FnOnce(&Outcome)) {
        let state = self.lock();
        if let Some(document) = state.open.get(&outcome.snapshot.uri)
            && document.snapshot.generation == outcome.snapshot.generation
        {
            publish(&outcome);
            document.outcome.send_replace(Some(Arc::new(outcome)));
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn uri() -> Url {
        "file:///evensong.voices".parse().unwrap()
    }

    fn change(range: Option<[usize; 4]>, text: &str) -> Change {
        let place = |line, column| Place { line, column };
        let range = range.map(|[a, b, c, d]| (place(a, b), place(c, d)));
        Change {
            range,
            text: text.to_owned(),
        }
    }

    fn text(documents: &Documents) -> (i32, String) {
        let snapshot = documents.snapshot(&uri()).unwrap();
        (snapshot.version, snapshot.text.as_str().to_owned())
    }

    #[test]
    fn a_batch_is_applied_whole_or_not_at_all() {
        let documents = Documents::default();
        documents.open(&uri(), 1, "ab\ncd".to_owned());
        let good = [
            change(Some([0, 0, 0, 1]), "xyz"),
            change(Some([0, 3, 1, 0]), "-"),
        ];
        assert_eq!(documents.change(&uri(), 2, &good, Columns::Utf16), Ok(()));
        assert_eq!(
            text(&documents),
            (2, "xyz-cd".to_owned()),
            "the second saw the first"
        );
        for bad in [
            vec![
                change(Some([0, 0, 0, 1]), "Q"),
                change(Some([0, 3, 0, 1]), "reversed"),
            ],
            vec![
                change(Some([0, 0, 0, 1]), "Q"),
                change(Some([9, 0, 9, 0]), "far"),
            ],
            vec![change(Some([9, 0, 9, 0]), "far")],
            vec![change(Some([0, 2, 0, 1]), "reversed")],
        ] {
            let refused = documents.change(&uri(), 3, &bad, Columns::Utf16);
            assert!(matches!(refused, Err(Refused::Range(_))), "{refused:?}");
            assert_eq!(text(&documents), (2, "xyz-cd".to_owned()));
        }
        let all = [
            change(Some([0, 0, 0, 6]), ""),
            change(None, "new"),
            change(Some([0, 3, 0, 3]), "er"),
        ];
        assert_eq!(documents.change(&uri(), 4, &all, Columns::Utf16), Ok(()));
        assert_eq!(text(&documents), (4, "newer".to_owned()));
        assert_eq!(documents.change(&uri(), 5, &[], Columns::Utf16), Ok(()));
        assert_eq!(
            text(&documents),
            (5, "newer".to_owned()),
            "an empty batch is a new version"
        );
    }

    #[test]
    fn a_snapshot_stays_as_it_was() {
        let documents = Documents::default();
        documents.open(&uri(), 1, "ab".to_owned());
        let before = documents.snapshot(&uri()).unwrap();
        documents
            .change(&uri(), 2, &[change(Some([0, 0, 0, 0]), "x")], Columns::Utf8)
            .unwrap();
        assert_eq!(before.text.as_str(), "ab");
        assert!(!documents.is_current(&uri(), before.generation));
    }

    #[test]
    fn the_checker_gets_the_latest_state_once() {
        let documents = Documents::default();
        documents.open(&uri(), 1, "a".to_owned());
        for version in 2..50 {
            documents
                .change(&uri(), version, &[change(None, "b")], Columns::Utf8)
                .unwrap();
        }
        let (job, before) = documents.next_to_check();
        assert_eq!((job.version, before.is_none()), (49, true));
        assert!(documents.lock().waiting.is_empty());
    }

    #[test]
    fn an_outcome_of_an_earlier_state_is_not_published() {
        let documents = Documents::default();
        documents.open(&uri(), 1, "a".to_owned());
        let (old, _) = documents.next_to_check();
        documents
            .change(&uri(), 2, &[change(None, "b")], Columns::Utf8)
            .unwrap();
        let outcome = |snapshot| Outcome::new(snapshot, Verdict::BrokeOff);
        let mut published = Vec::new();
        documents.settle(outcome(old.clone()), |o| published.push(o.snapshot.version));
        let (new, _) = documents.next_to_check();
        documents.settle(outcome(new.clone()), |o| published.push(o.snapshot.version));
        documents.close(&uri(), || ());
        documents.settle(outcome(new), |o| published.push(o.snapshot.version));
        assert_eq!(published, [2]);
    }

    #[test]
    fn who_waits_for_an_outcome_gets_that_of_its_own_state_or_none() {
        let (documents, uri) = (Documents::default(), uri());
        let settle = || {
            let (snapshot, _) = documents.next_to_check();
            documents.settle(Outcome::new(snapshot, Verdict::BrokeOff), |_| ());
        };
        let now = |waiting: &mut _| futures::FutureExt::now_or_never(waiting);
        documents.open(&uri, 1, "a".to_owned());
        let mut waiting = Box::pin(documents.outcome(&uri));
        assert!(now(&mut waiting).is_none(), "not checked yet");
        settle();
        let outcome = now(&mut waiting).unwrap();
        assert_eq!(outcome.unwrap().snapshot.version, 1);

        documents.change(&uri, 2, &[], Columns::Utf8).unwrap();
        let mut overtaken = Box::pin(documents.outcome(&uri));
        assert!(now(&mut overtaken).is_none());
        documents.change(&uri, 3, &[], Columns::Utf8).unwrap();
        settle();
        assert!(
            now(&mut overtaken).unwrap().is_none(),
            "the document moved on"
        );

        documents.change(&uri, 4, &[], Columns::Utf8).unwrap();
        let mut closed = Box::pin(documents.outcome(&uri));
        assert!(now(&mut closed).is_none());
        documents.close(&uri, || ());
        assert!(now(&mut closed).unwrap().is_none());
    }
}
