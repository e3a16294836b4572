//! The arguments of `check`.

use std::path::PathBuf;

use clap::Args;

use super::{ColourChoice, FailOn, Report, Scope};

/// Report what the style forbids or discourages, in sheets and folders of them.
///
/// Each finding is a fault (the style forbids it), a weakness (the style discourages it) or a
/// remark (worth knowing). It is shown with its bar and beat, and with the notes marked: a thick
/// line under the note where it happens, thin ones under the notes it comes from and those of
/// other voices.
#[derive(Args, Debug)]
#[command(after_help = "\
Which style: the one named with --style, else the one the sheet names, else the house style \
(partwright.toml, in the folder of the sheet or the nearest above it), else free.

Folders: every file below that ends in .voices, in order of their names. Hidden files and those \
that git ignores are left out, and links are not followed.

Licensed findings are no findings: they are counted in the last line and shown with --licensed.

An old collection: `--write-known known.jsonl` lists what is found today, and with \
`--known known.jsonl` only what is new is shown and counts. The list names notes, not lines: it \
holds when bars or lines are added elsewhere, and a finding whose own notes change is new again. \
Commit it beside the scores.

Exit status:
  0  nothing at or above the level of --fail-on
  1  something at or above it
  2  a path that could not be read or is no score, a house style that cannot be used,
     or a wrong call; whatever else was found is still reported

Findings go to standard output, everything else to standard error.

Examples:
  partwright check evensong.voices
  partwright check --style chorale --drop range,octave-doubt hymns
  partwright check --bars 12..20 --voices S,B evensong.voices
  partwright check --report json --fail-on weakness hymns > findings.jsonl
  partwright check --report sarif hymns > findings.sarif")]
pub(crate) struct Check {
    /// A voice sheet, a folder of them, or - for standard input
    #[arg(required = true, value_name = "PATH")]
    pub(crate) paths: Vec<PathBuf>,
    #[command(flatten)]
    pub(crate) scope: Scope,
    /// How findings are reported: plain for reading; for programs json (JSON Lines, one object a
    /// finding) or sarif (SARIF 2.1.0)
    #[arg(long, value_name = "FORM", default_value = "plain")]
    pub(crate) report: Report,
    /// The level that makes the exit status 1
    #[arg(long, value_name = "LEVEL", default_value = "fault")]
    pub(crate) fail_on: FailOn,
    /// Show licensed findings too, each with its licence; they never count
    #[arg(long)]
    pub(crate) licensed: bool,
    /// A list of known findings: they are neither shown nor counted
    #[arg(long, value_name = "FILE")]
    pub(crate) known: Option<PathBuf>,
    /// Write what is found as a list of known findings, whole: name every sheet it is for
    #[arg(long, value_name = "FILE", conflicts_with = "known")]
    pub(crate) write_known: Option<PathBuf>,
    /// Name standard input, for reports, to tell what it holds and to find its house style
    #[arg(long = "as", value_name = "PATH")]
    pub(crate) named: Option<PathBuf>,
    /// Findings only: no summary, no words about empty sheets or about the work's progress
    #[arg(long)]
    pub(crate) quiet: bool,
    #[command(flatten)]
    pub(crate) colour: ColourChoice,
}
