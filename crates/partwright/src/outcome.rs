//! How a run ends.

use std::process::ExitCode;

/// The exit status, from the best to the worst; the worst of a run wins.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord)]
pub enum Outcome {
    /// 0: nothing at or above the level that counts.
    #[default]
    Clean,
    /// 1: findings at or above it.
    Found,
    /// 2: a path that could not be opened or is no score, or a wrong call.
    Trouble,
}

impl From<Outcome> for ExitCode {
    fn from(outcome: Outcome) -> ExitCode {
        ExitCode::from(match outcome {
            Outcome::Clean => 0,
            Outcome::Found => 1,
            Outcome::Trouble => 2,
        })
    }
}
