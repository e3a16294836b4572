//! A line that tells how far long work has come, on a terminal only.

use std::time::{Duration, Instant};

use crate::stage::Stage;

/// Shown only once the work has taken this long.
const PATIENCE: Duration = Duration::from_secs(1);
/// And no more often than this.
const PACE: Duration = Duration::from_millis(100);

/// The line, rewritten in place and wiped before anything else is said.
pub(crate) struct Progress {
    wanted: bool,
    next: Instant,
    shown: bool,
}

impl Progress {
    /// A line for work that begins now.
    pub(crate) fn new(stage: &Stage<'_>, quiet: bool) -> Progress {
        Progress {
            wanted: stage.terminal.err && !quiet,
            next: Instant::now() + PATIENCE,
            shown: false,
        }
    }

    /// Tells how far the work is, where it is time to.
    pub(crate) fn tell(&mut self, stage: &mut Stage<'_>, words: impl FnOnce() -> String) {
        if !self.wanted || Instant::now() < self.next {
            return;
        }
        stage.complain(&format!("\r\x1b[K{}", words()));
        self.shown = true;
        self.next = Instant::now() + PACE;
    }

    /// Wipes the line, so that something else can stand there.
    pub(crate) fn wipe(&mut self, stage: &mut Stage<'_>) {
        if self.shown {
            stage.complain("\r\x1b[K");
            self.shown = false;
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::stage::Terminal;

    /// What is said by one word of progress under these circumstances.
    fn said(err: bool, quiet: bool, patience: Duration) -> String {
        let (mut input, mut out, mut words) = (std::io::empty(), Vec::new(), Vec::new());
        let terminal = Terminal {
            err,
            ..Terminal::default()
        };
        let mut stage = Stage::new(&mut input, &mut out, &mut words, terminal);
        let mut progress = Progress::new(&stage, quiet);
        progress.next = Instant::now() + patience;
        progress.tell(&mut stage, || "3 of 9 sheets".to_owned());
        progress.wipe(&mut stage);
        String::from_utf8(words).unwrap()
    }

    #[test]
    fn only_on_a_terminal_after_a_while_and_wiped() {
        assert_eq!(
            said(true, false, Duration::ZERO),
            "\r\x1b[K3 of 9 sheets\r\x1b[K"
        );
        assert_eq!(said(true, false, PATIENCE), "");
        assert_eq!(said(false, false, Duration::ZERO), "");
        assert_eq!(said(true, true, Duration::ZERO), "");
    }
}
