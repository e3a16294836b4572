//! What may stand on the command line. Help, usage and messages all come from here.

mod align;
mod check;
mod mend;

pub(crate) use align::Align;
pub(crate) use check::Check;
pub(crate) use mend::Mend;

use clap::builder::NonEmptyStringValueParser;
use clap::{Args, Parser, Subcommand, ValueEnum};
use partwright_check::{BarRange, Filter};
use partwright_rules::Severity;

use crate::names::rule_or_family;

/// Checks voice parts: consecutives, crossings, compasses and whatever else a style forbids.
#[derive(Debug, Parser)]
#[command(name = "partwright", version, max_term_width = 80)]
#[command(after_help = "\
A voice sheet is a plain text file with the ending .voices: every voice a row, every cell a beat.

    S | D5 E |
    B | G3 A |

`partwright check` names every place where the chosen style is broken, with the notes marked. \
`partwright rules NAME` says why a rule holds, who says so, and what to do.")]
pub(crate) struct Arguments {
    #[command(subcommand)]
    pub(crate) command: Command,
}

/// The commands.
#[derive(Debug, Subcommand)]
pub(crate) enum Command {
    /// Report what the style forbids or discourages, in sheets and folders of them
    Check(Check),
    /// Show repairs as a diff, or write them
    Mend(Mend),
    /// Set the beats of sheets in columns
    Align(Align),
    /// List the rules, or explain one of them
    Rules(Rules),
    /// Run the language server, which shows findings in a text editor as you write
    Serve(Serve),
}

/// Which findings are meant: options that several commands share.
#[derive(Args, Debug)]
pub(crate) struct Scope {
    /// Judge by this style, whatever the sheet says: free, chorale, motet, species-1 to
    /// species-5, or the name of the house style
    #[arg(long, value_name = "NAME", value_parser = NonEmptyStringValueParser::new())]
    pub(crate) style: Option<String>,
    /// Only these rules or families of rules; several with commas between, or repeated
    #[arg(long, value_name = "RULE", value_delimiter = ',', value_parser = rule_or_family)]
    pub(crate) pick: Vec<String>,
    /// Not these rules or families of rules; dropping comes after picking
    #[arg(long, value_name = "RULE", value_delimiter = ',', value_parser = rule_or_family)]
    pub(crate) drop: Vec<String>,
    /// Only findings in these bars: 12..20, 12.., ..20 or 12 (the pickup is bar 0)
    #[arg(long, value_name = "BARS")]
    pub(crate) bars: Option<BarRange>,
    /// Only findings in which one of these voices takes part, by the labels of their rows: S,B
    #[arg(long, value_name = "LABEL", value_delimiter = ',', value_parser = NonEmptyStringValueParser::new())]
    pub(crate) voices: Vec<String>,
}

impl Scope {
    /// Which findings are shown.
    pub(crate) fn filter(&self) -> Filter {
        Filter {
            bars: self.bars,
            voices: self.voices.clone(),
        }
    }
}

/// List the rules, or explain one of them.
///
/// Without a name: all the rules by family, with how strictly each style takes them. With the
/// name of a family: that family. With the name of a rule: why it holds, when it applies and how
/// strictly, examples, what to do, and who says so.
#[derive(Args, Debug)]
#[command(after_help = "\
Examples:
  partwright rules
  partwright rules --style chorale
  partwright rules motion
  partwright rules parallel-fifths

Below the table stands what the house style of this folder changes (partwright.toml, found from \
here upwards), and why.")]
pub(crate) struct Rules {
    /// A rule or a family of rules
    #[arg(value_name = "NAME", value_parser = rule_or_family)]
    pub(crate) name: Option<String>,
    /// Only what holds in this style: free, chorale, motet, species-1 to species-5, or the name of
    /// the house style
    #[arg(long, value_name = "NAME", value_parser = NonEmptyStringValueParser::new())]
    pub(crate) style: Option<String>,
    #[command(flatten)]
    pub(crate) colour: ColourChoice,
}

/// Run the language server, which shows findings in a text editor as you write.
///
/// An editor starts it by itself, and talks to it over standard input and output (Language Server
/// Protocol 3.17). It is of no use in a terminal.
#[derive(Args, Debug)]
pub(crate) struct Serve {
    /// Standard input and output: what it does anyway; some editors insist on saying so
    #[arg(long)]
    stdio: bool,
}

/// Whether to use colour.
#[derive(Args, Clone, Copy, Debug)]
pub(crate) struct ColourChoice {
    /// Whether to use colour; auto is on a terminal, unless NO_COLOR is set
    #[arg(
        long = "colour",
        alias = "color",
        value_name = "WHEN",
        default_value = "auto"
    )]
    pub(crate) when: Colour,
}

/// When to use colour.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
pub(crate) enum Colour {
    Auto,
    Always,
    Never,
}

/// How findings are reported.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
pub(crate) enum Report {
    Plain,
    Json,
    Sarif,
}

/// The level that makes the exit status 1.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
pub(crate) enum FailOn {
    Fault,
    Weakness,
    Remark,
    Never,
}

impl FailOn {
    /// Whether a finding of that severity counts.
    pub(crate) fn counts(self, severity: Severity) -> bool {
        let least = match self {
            FailOn::Fault => Severity::Fault,
            FailOn::Weakness => Severity::Weakness,
            FailOn::Remark => Severity::Remark,
            FailOn::Never => return false,
        };
        severity >= least
    }
}

impl ColourChoice {
    /// Whether standard output is coloured.
    pub(crate) fn wanted(self, terminal: crate::stage::Terminal) -> bool {
        match self.when {
            Colour::Always => true,
            Colour::Never => false,
            Colour::Auto => terminal.out && !terminal.colourless,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use clap::CommandFactory;

    #[test]
    fn the_arguments_make_sense_to_the_parser() {
        Arguments::command().debug_assert();
    }

    #[test]
    fn the_level_that_counts() {
        let counts = |level: FailOn| {
            [Severity::Fault, Severity::Weakness, Severity::Remark]
                .map(|severity| level.counts(severity))
        };
        assert_eq!(counts(FailOn::Fault), [true, false, false]);
        assert_eq!(counts(FailOn::Weakness), [true, true, false]);
        assert_eq!(counts(FailOn::Remark), [true, true, true]);
        assert_eq!(counts(FailOn::Never), [false, false, false]);
    }

    #[test]
    fn colour_is_for_terminals_that_have_it() {
        let on = crate::stage::Terminal {
            out: true,
            ..Default::default()
        };
        let off = crate::stage::Terminal::default();
        let wanted = |when, terminal| ColourChoice { when }.wanted(terminal);
        assert!(wanted(Colour::Auto, on));
        assert!(!wanted(Colour::Auto, off));
        assert!(!wanted(
            Colour::Auto,
            crate::stage::Terminal {
                colourless: true,
                ..on
            }
        ));
        assert!(wanted(Colour::Always, off));
        assert!(!wanted(Colour::Never, on));
    }
}
