//! `wattsieve shortlist`

use std::sync::Arc;

use super::args::{DistinctArg, ShortlistArgs};
use super::failure::Failure;
use super::input::{Source, is_stream};
use super::saved::{Saved, SavedOptions, SavedRail};
use super::watch::watched;
use super::{Done, input, output};
use crate::answer::shortlist::{Options, shortlist};
use crate::search::Progress;
use crate::show::{self, Format};

pub(super) fn run(command: &ShortlistArgs) -> Result<Done, Failure> {
    let common = &command.common;
    if command.save.as_deref().is_some_and(is_stream) && common.out.as_deref().is_none_or(is_stream) {
        return Err(Failure::Usage(
            "the list and what is saved cannot both go to standard output; add --out".to_owned(),
        ));
    }
    let source = Source::given(command.rail.as_deref(), common)?;
    let (rail, read) = input::rail_and_catalogs(&source, common, command.save.is_some())?;
    let top = command.top as usize;
    let progress = Arc::new(Progress::new());
    let stop = Arc::clone(&progress);
    ctrlc::set_handler(move || stop.stop())
        .map_err(|error| Failure::Machine(format!("cannot listen for Ctrl-C: {error}")))?;
    let distinct = command.distinct.into();
    let options = Options { top, distinct, threads: usize::from(common.threads), progress: Some(&progress) };
    let list = watched(common, &progress, || shortlist(&rail, &read.parts, &options));
    if !list.proven && !command.best_so_far {
        return Ok(Done::Stopped);
    }
    let text = match common.format.into() {
        Format::Table => show::shortlist::screen(&list),
        Format::Csv => show::csv::shortlist(&list),
        Format::Json => show::json::text(&show::json::shortlist(&list)),
    };
    if let Some(path) = &command.save {
        let rail = SavedRail::of(source);
        let distinct = match command.distinct {
            DistinctArg::Triple => "triple",
            DistinctArg::Stage => "stage",
            DistinctArg::Switches => "switches",
        };
        let options = SavedOptions { top, distinct: distinct.to_owned() };
        let saved = Saved::new(rail, options, &list, &read.parts, &read.rows);
        output::write(&saved.to_text()?, Some(path))?;
    }
    output::write(&text, common.out.as_deref())?;
    Ok(match (list.proven, list.picks.is_empty()) {
        (false, _) => Done::Stopped,
        (true, true) => Done::NothingPasses,
        (true, false) => Done::Well,
    })
}
