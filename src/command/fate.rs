//! `wattsieve fate`

use std::sync::Arc;

use super::args::FateArgs;
use super::failure::Failure;
use super::input::Source;
use super::{Done, input, output};
use crate::answer::fate::{Options, fates};
use crate::search::Progress;
use crate::show::{self, Format};

pub(super) fn run(command: &FateArgs) -> Result<Done, Failure> {
    let common = &command.common;
    let source = Source::given(command.rail.as_deref(), common)?;
    let (rail, read) = input::rail_and_catalogs(&source, common, false)?;
    let progress = Arc::new(Progress::new());
    let stop = Arc::clone(&progress);
    ctrlc::set_handler(move || stop.stop())
        .map_err(|error| Failure::Machine(format!("cannot listen for Ctrl-C: {error}")))?;
    let options = Options {
        ranked_to: command.top as usize,
        least: command.least,
        threads: usize::from(common.threads),
        progress: Some(&progress),
    };
    let Some(fates) = fates(&rail, &read.parts, &options) else { return Ok(Done::Stopped) };
    let text = match common.format.into() {
        Format::Table => show::fate::screen(&fates),
        Format::Csv => show::fate::csv(&fates),
        Format::Json => show::json::text(&show::fate::json(&fates)),
    };
    output::write(&text, common.out.as_deref())?;
    Ok(if fates.best.is_some() { Done::Well } else { Done::NothingPasses })
}
