//! The streams a run reads and writes, and the terminal they may stand on.

use std::io::{self, ErrorKind, IsTerminal, Read, Write};

use crate::outcome::Outcome;

/// What is known of the terminal.
#[derive(Clone, Copy, Debug, Default)]
pub struct Terminal {
    /// Results go to a terminal.
    pub out: bool,
    /// Words go to a terminal.
    pub err: bool,
    /// Its width in columns, where there is one.
    pub width: Option<usize>,
    /// The user wants no colour, or the terminal has none.
    pub colourless: bool,
}

impl Terminal {
    /// The terminal of this process. `NO_COLOR` counts where it is set and not empty
    /// (no-color.org); a terminal called `dumb` has no colour either.
    #[must_use]
    pub fn of_this_process() -> Terminal {
        let is = |name, wanted: fn(&std::ffi::OsStr) -> bool| {
            std::env::var_os(name).is_some_and(|value| wanted(&value))
        };
        Terminal {
            out: io::stdout().is_terminal(),
            err: io::stderr().is_terminal(),
            width: terminal_size::terminal_size().map(|(width, _)| usize::from(width.0)),
            colourless: is("NO_COLOR", |value| !value.is_empty())
                || is("TERM", |value| value == "dumb"),
        }
    }

    /// The width that reports are set in: 80 columns, or the terminal's where it is between 40
    /// and 100. Longer lines are tiring to read.
    #[must_use]
    pub fn measure(&self) -> usize {
        self.width
            .filter(|_| self.out)
            .map_or(80, |width| width.clamp(40, 100))
    }
}

/// Standard output. Once its reader has gone (`| head`) nothing more is written and nobody is
/// told; any other failure is kept for the end.
pub struct Output<'a> {
    to: &'a mut dyn Write,
    failure: Option<io::Error>,
}

impl Output<'_> {
    /// Writes a text as it is.
    pub fn print(&mut self, text: &str) {
        if self.failure.is_none() {
            self.failure = self.to.write_all(text.as_bytes()).err();
        }
    }

    /// Hands on what is written so far.
    pub fn flush(&mut self) {
        if self.failure.is_none() {
            self.failure = self.to.flush().err();
        }
    }
}

/// Everything a run touches besides files.
pub struct Stage<'a> {
    /// Standard input.
    pub input: &'a mut dyn Read,
    /// Standard output.
    pub out: Output<'a>,
    err: &'a mut dyn Write,
    /// The terminal.
    pub terminal: Terminal,
}

impl<'a> Stage<'a> {
    /// A stage on these streams.
    pub fn new(
        input: &'a mut dyn Read,
        out: &'a mut dyn Write,
        err: &'a mut dyn Write,
        terminal: Terminal,
    ) -> Stage<'a> {
        Stage {
            input,
            out: Output {
                to: out,
                failure: None,
            },
            err,
            terminal,
        }
    }

    /// Says something on standard error, after the results so far. Who cannot hear it cannot be
    /// told so.
    pub fn complain(&mut self, text: &str) {
        self.out.flush();
        let _ = self
            .err
            .write_all(text.as_bytes())
            .and_then(|()| self.err.flush());
    }

    /// Ends the run: the last results go out, and it is said where they could not.
    pub fn finish(&mut self) -> Outcome {
        self.out.flush();
        match self.out.failure.take() {
            Some(failure) if failure.kind() != ErrorKind::BrokenPipe => {
                let reason = crate::files::reason(&failure);
                self.complain(&format!(
                    "partwright: the results could not be written: {reason}\n"
                ));
                Outcome::Trouble
            }
            _ => Outcome::Clean,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_measure_is_the_terminals_within_reason() {
        let at = |out, width| {
            Terminal {
                out,
                width,
                ..Terminal::default()
            }
            .measure()
        };
        assert_eq!(at(true, Some(60)), 60);
        assert_eq!(at(true, Some(200)), 100);
        assert_eq!(at(true, Some(10)), 40);
        assert_eq!(at(true, None), 80);
        assert_eq!(at(false, Some(60)), 80, "a file has no width");
    }
}
