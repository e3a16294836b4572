//! The arguments of `align`.

use std::path::PathBuf;

use clap::Args;

/// Set the beats of sheets in columns, in place.
///
/// The cells of every system stand under each other, and so do its bar lines; a syllable stands
/// under its note, a header's value and a voice's kind and options in columns of their own. Notes
/// are spelt alike: F#4 for f♯4. What a sheet says never changes: no note, no octave figure, no
/// comment, no blank line. What cannot be read stays as it is.
///
/// Marks drawn under notes in comments (// ^^) move with their notes.
#[derive(Args, Debug)]
#[command(after_help = "\
A file is replaced whole or not at all, with its permissions kept, and not touched where nothing \
changes. One that another program saved meanwhile, or that is read-only, is left alone with a \
word. A sheet that would grow beyond 8 MiB stays as it is.

Exit status:
  0  all of it stands in columns, now or already
  1  with --verify: a sheet that does not
  2  a path that could not be read or written or is no sheet, or a wrong call;
     the rest is still done

The sheets that --verify finds go to standard output, and so does the text of standard input, set \
in columns.

Examples:
  partwright align hymns
  partwright align --verify hymns
  partwright align - < draft.voices")]
pub(crate) struct Align {
    /// A voice sheet, a folder of them, or - for standard input
    #[arg(required = true, value_name = "PATH")]
    pub(crate) paths: Vec<PathBuf>,
    /// Write nothing: name the sheets that do not stand in columns
    #[arg(long)]
    pub(crate) verify: bool,
    /// Name standard input, for messages and to tell what it holds
    #[arg(long = "as", value_name = "PATH")]
    pub(crate) named: Option<PathBuf>,
    /// No summary, no words about the work's progress
    #[arg(long)]
    pub(crate) quiet: bool,
}
