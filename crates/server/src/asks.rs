//! Asking the client something without ever depending on an answer.
//!
//! The question runs in a task of its own that is never given up, since the library panics at a
//! late answer nobody waits for; only the wait for it has an end. Never from inside a request's
//! handler: there the client may be waiting for us.

use std::future::Future;
use std::time::Duration;

use tokio::sync::oneshot;

/// The answer, or `None` if it has not come in time.
pub(crate) async fn ask<T: Send + 'static>(
    patience: Duration,
    question: impl Future<Output = T> + Send + 'static,
) -> Option<T> {
    let (sender, receiver) = oneshot::channel();
    tokio::spawn(async move {
        let _ = sender.send(question.await);
    });
    tokio::time::timeout(patience, receiver).await.ok()?.ok()
}
