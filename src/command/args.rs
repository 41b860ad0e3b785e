//! The arguments, and the help made of them.

use std::path::PathBuf;

use clap::{Args, Parser, Subcommand, ValueEnum};

use crate::search::Distinct;
use crate::show::Format;

/// Ranks every combination of your approved power-stage parts by loss, cost and area, with proof.
///
/// Parts get hot, inputs can be high, batteries burn: what is ranked here is a shortlist to be verified by a qualified designer
/// under the codes that apply.
#[derive(Debug, Parser)]
#[command(name = "wattsieve", version, max_term_width = 100, before_help = "Example: wattsieve shortlist")]
pub(super) struct Arguments {
    #[command(subcommand)]
    pub command: Command,
}

#[derive(Debug, Subcommand)]
pub(super) enum Command {
    /// The best stages of all, proven
    #[command(before_help = "Example: wattsieve shortlist --top 3")]
    Shortlist(ShortlistArgs),
    /// One stage, every watt by cause at every point
    #[command(before_help = "Example: wattsieve account --rank 2")]
    Account(AccountArgs),
    /// What became of each part: the best stage with it, or the limit that stops it
    #[command(before_help = "Example: wattsieve fate")]
    Fate(FateArgs),
    /// The rail as understood, and where each value comes from
    #[command(before_help = "Example: wattsieve rail")]
    Rail(RailArgs),
    /// The catalogs alone: bad and doubtful cells
    #[command(before_help = "Example: wattsieve audit")]
    Audit(AuditArgs),
    /// Writes the demo rails and catalogs to begin from
    #[command(before_help = "Example: wattsieve starter my-rail")]
    Starter(StarterArgs),
}

/// Options that every command has.
#[derive(Debug, Args)]
pub(super) struct Common {
    /// Folder with switches.csv, diodes.csv, inductors.csv and capacitors.csv; by default the folder of the rail file, or the
    /// built-in demo
    #[arg(long, value_name = "DIR")]
    pub catalogs: Option<PathBuf>,
    /// For people, spreadsheets or programs
    #[arg(long, value_enum, default_value_t)]
    pub format: FormatArg,
    /// Write the result to this file, all or nothing; - is standard output
    #[arg(long, value_name = "FILE")]
    pub out: Option<PathBuf>,
    /// Worker threads, up to 1024; by default one a processor. The answer is the same whatever the number
    #[arg(long, value_name = "N", default_value_t = 0, hide_default_value = true,
          value_parser = clap::value_parser!(u16).range(0..=1024))]
    pub threads: u16,
    /// Leave out bad catalog rows instead of stopping at them
    #[arg(long)]
    pub skip_bad: bool,
    /// Print the result and errors only
    #[arg(long)]
    pub quiet: bool,
    /// Colours in messages
    #[arg(long, value_enum, default_value_t)]
    pub color: Color,
}

#[derive(Debug, Args)]
pub(super) struct ShortlistArgs {
    /// Rail file; - is standard input; without it the built-in demo
    #[arg(value_name = "RAIL")]
    pub rail: Option<PathBuf>,
    #[command(flatten)]
    pub common: Common,
    /// How many stages
    #[arg(long, value_name = "N", default_value_t = 10, value_parser = clap::value_parser!(u32).range(1..=10_000))]
    pub top: u32,
    /// Which stages count as different
    #[arg(long, value_enum, default_value_t)]
    pub distinct: DistinctArg,
    /// When stopped by Ctrl-C, print what has been found, marked as not proven, with the gap that is left
    #[arg(long)]
    pub best_so_far: bool,
    /// Save the rail, the catalog rows used and the list, for `account --from` and later comparison
    #[arg(long, value_name = "FILE")]
    pub save: Option<PathBuf>,
}

#[derive(Debug, Args)]
pub(super) struct AccountArgs {
    /// Rail file; - is standard input; without it the built-in demo
    #[arg(value_name = "RAIL")]
    pub rail: Option<PathBuf>,
    #[command(flatten)]
    pub common: Common,
    /// The stage as JSON, as in the results of `--format json`; - is standard input
    #[arg(long, value_name = "FILE", conflicts_with_all = ["parts", "from"])]
    pub stage: Option<PathBuf>,
    /// The stage by its parts: "high=P,rectifier=P*2,inductor=P,input=P*3,output=P*4"; a rectifier name that stands in both
    /// catalogs takes `switch:` or `diode:` before it
    #[arg(long, value_name = "PARTS", requires = "frequency", conflicts_with = "from")]
    pub parts: Option<String>,
    /// Switching frequency with --parts, such as "400 kHz"
    #[arg(long, value_name = "FREQUENCY", requires = "parts")]
    pub frequency: Option<String>,
    /// A saved shortlist to take the stage from, and its rail and catalogs where none are given
    #[arg(long, value_name = "SAVED")]
    pub from: Option<PathBuf>,
    /// Which stage of the shortlist
    #[arg(long, value_name = "N", default_value_t = 1, value_parser = clap::value_parser!(u32).range(1..=10_000),
          conflicts_with_all = ["stage", "parts"])]
    pub rank: u32,
}

#[derive(Debug, Args)]
pub(super) struct FateArgs {
    /// Rail file; - is standard input; without it the built-in demo
    #[arg(value_name = "RAIL")]
    pub rail: Option<PathBuf>,
    #[command(flatten)]
    pub common: Common,
    /// Give the rank of stages down to this place of the shortlist
    #[arg(long, value_name = "N", default_value_t = 100,
          value_parser = clap::value_parser!(u32).range(1..=10_000))]
    pub top: u32,
    /// Find the least by which a limit must give for each part that no stage passes with, even where many parts make that long
    #[arg(long)]
    pub least: bool,
}

#[derive(Debug, Args)]
pub(super) struct RailArgs {
    /// Rail file; - is standard input; without it the built-in demo
    #[arg(value_name = "RAIL")]
    pub rail: Option<PathBuf>,
    #[command(flatten)]
    pub common: Common,
}

#[derive(Debug, Args)]
pub(super) struct AuditArgs {
    #[command(flatten)]
    pub common: Common,
}

#[derive(Debug, Args)]
pub(super) struct StarterArgs {
    /// Folder to write into; made if it is not there. Nothing is overwritten
    #[arg(value_name = "DIR")]
    pub folder: PathBuf,
}

#[derive(Debug, Clone, Copy, Default, ValueEnum)]
pub(super) enum FormatArg {
    #[default]
    Table,
    Csv,
    Json,
}

impl From<FormatArg> for Format {
    fn from(argument: FormatArg) -> Self {
        match argument {
            FormatArg::Table => Self::Table,
            FormatArg::Csv => Self::Csv,
            FormatArg::Json => Self::Json,
        }
    }
}

#[derive(Debug, Clone, Copy, Default, ValueEnum)]
pub(super) enum DistinctArg {
    /// One for each high switch, rectifier and inductor
    #[default]
    Triple,
    /// Every stage
    Stage,
    /// One for each high switch and rectifier
    Switches,
}

impl From<DistinctArg> for Distinct {
    fn from(argument: DistinctArg) -> Self {
        match argument {
            DistinctArg::Triple => Self::Triple,
            DistinctArg::Stage => Self::Stage,
            DistinctArg::Switches => Self::Switches,
        }
    }
}

#[derive(Debug, Clone, Copy, Default, ValueEnum)]
pub(super) enum Color {
    #[default]
    Auto,
    Always,
    Never,
}

impl Color {
    /// For everything written after this.
    pub(super) fn apply(self) {
        match self {
            Self::Auto => anstream::ColorChoice::Auto,
            Self::Always => anstream::ColorChoice::Always,
            Self::Never => anstream::ColorChoice::Never,
        }
        .write_global();
    }
}
