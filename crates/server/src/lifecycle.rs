//! Where the conversation with the client stands.

use std::sync::atomic::{AtomicU8, Ordering};

/// The states of LSP 3.17, "Lifecycle Messages".
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum State {
    /// `initialize` has not been answered yet.
    Waiting,
    /// Between the answer to `initialize` and `shutdown`.
    Running,
    /// After `shutdown`.
    ShutDown,
    /// After `exit`: nothing is answered any more.
    Ended,
}

const STATES: [State; 4] = [
    State::Waiting,
    State::Running,
    State::ShutDown,
    State::Ended,
];

/// The state, shared between threads, and the exit status it asks for.
#[derive(Debug, Default)]
pub(crate) struct Lifecycle {
    state: AtomicU8,
    /// `shutdown` was asked for.
    orderly: AtomicU8,
}

impl Lifecycle {
    /// The state now.
    pub(crate) fn state(&self) -> State {
        let state = usize::from(self.state.load(Ordering::SeqCst));
        STATES.get(state).copied().unwrap_or(State::Ended)
    }

    /// Moves on to a state.
    pub(crate) fn enter(&self, state: State) {
        if state == State::ShutDown {
            self.orderly.store(1, Ordering::SeqCst);
        }
        self.state.store(state as u8, Ordering::SeqCst);
    }

    /// The exit status of the process: 0 once `shutdown` was asked for, else 1.
    pub(crate) fn exit_status(&self) -> u8 {
        1 - self.orderly.load(Ordering::SeqCst)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_exit_status_tells_whether_shutdown_came_first() {
        let rude = Lifecycle::default();
        assert_eq!(rude.state(), State::Waiting);
        rude.enter(State::Running);
        rude.enter(State::Ended);
        assert_eq!((rude.state(), rude.exit_status()), (State::Ended, 1));
        let polite = Lifecycle::default();
        for state in [State::Running, State::ShutDown, State::Ended] {
            polite.enter(state);
        }
        assert_eq!((polite.state(), polite.exit_status()), (State::Ended, 0));
    }
}
