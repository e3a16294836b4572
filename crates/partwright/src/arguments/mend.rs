//! The arguments of `mend`.

use std::path::PathBuf;

use clap::Args;

use super::{ColourChoice, Scope};

/// Show repairs as a diff, or write them.
///
/// Without --notes only the writing is mended, and every note sounds as before: octave figures
/// are written where the carried one leaves a doubt, licences that lift nothing are removed, and a
/// word that is mistyped outside the rows of notes is written as it is meant where only one word
/// can be.
///
/// With --notes, notes move as well: for each fault and weakness the smallest change of one note
/// that removes it and brings no other. A cantus, a copied bar and a note that a licence speaks of
/// never move. Read what it did: it is your music.
#[derive(Args, Debug)]
#[command(after_help = "\
Each repair is tried on the whole sheet, and is left out if it brings as much as it removes. A \
sheet that stood in columns stands in columns afterwards. What was mended once is not changed by \
mending again.

A file is replaced whole or not at all, with its permissions kept. One that another program saved \
meanwhile, or that is read-only, is left alone with a word.

Exit status:
  0  nothing to mend, or with --write all of it written
  1  without --write: something to mend
  2  a path that could not be read or written or is no sheet, a house style that cannot be used,
     or a wrong call

The diff goes to standard output, and so does, with --write, the text of standard input.

Examples:
  partwright mend hymns
  partwright mend --write hymns
  partwright mend --notes --bars 12..20 evensong.voices
  partwright mend --notes --pick parallel-fifths --write evensong.voices")]
pub(crate) struct Mend {
    /// A voice sheet, a folder of them, or - for standard input
    #[arg(required = true, value_name = "PATH")]
    pub(crate) paths: Vec<PathBuf>,
    /// Write the repairs into the sheets
    #[arg(long)]
    pub(crate) write: bool,
    /// Move sounding notes too
    #[arg(long)]
    pub(crate) notes: bool,
    #[command(flatten)]
    pub(crate) scope: Scope,
    /// Name standard input, for the diff, to tell what it holds and to find its house style
    #[arg(long = "as", value_name = "PATH")]
    pub(crate) named: Option<PathBuf>,
    /// No words about what was mended, no summary, nothing about the work's progress
    #[arg(long)]
    pub(crate) quiet: bool,
    #[command(flatten)]
    pub(crate) colour: ColourChoice,
}
