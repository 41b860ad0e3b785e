//! `wattsieve account`

use super::args::AccountArgs;
use super::failure::Failure;
use super::input::Source;
use super::saved::Saved;
use super::{Done, input, named, output};
use crate::account::account;
use crate::answer::shortlist::{Options, shortlist};
use crate::part::Parts;
use crate::rail::Rail;
use crate::search::Distinct;
use crate::show::{self, Format};
use crate::stage::NamedStage;

pub(super) fn run(command: &AccountArgs) -> Result<Done, Failure> {
    let common = &command.common;
    let saved = command.from.as_deref().map(Saved::read).transpose()?;
    let source = match (&command.rail, &saved) {
        (None, Some(saved)) => saved.rail.source(common),
        (rail, _) => Source::given(rail.as_deref(), common)?,
    };
    let (rail, read) = input::rail_and_catalogs(&source, common, false)?;
    let Some(stage) = chosen(command, saved, &rail, &read.parts)? else {
        if !common.quiet {
            anstream::eprintln!(
                "nothing meets all limits, so there is no stage to account for; name one with --parts or --stage"
            );
        }
        return Ok(Done::NothingPasses);
    };
    let account = account(&rail, &read.parts, &named::find(&stage, &read.parts)?);
    let text = match common.format.into() {
        Format::Table => show::account::screen(&account),
        Format::Csv => show::csv::account(&account),
        Format::Json => show::json::text(&show::json::account(&account)),
    };
    output::write(&text, common.out.as_deref())?;
    Ok(if account.passes() { Done::Well } else { Done::NothingPasses })
}

/// The stage asked for; `None` when it is the first of a list that is empty.
fn chosen(
    command: &AccountArgs,
    saved: Option<Saved>,
    rail: &Rail,
    parts: &Parts,
) -> Result<Option<NamedStage>, Failure> {
    let rank = command.rank as usize;
    if let Some(path) = &command.stage {
        let name = path.display();
        return serde_json::from_str(&input::text_of(path)?)
            .map(Some)
            .map_err(|error| Failure::Usage(format!("{name} is not a stage: {error}")));
    }
    if let (Some(words), Some(frequency)) = (&command.parts, &command.frequency) {
        return named::from_words(words, frequency, parts).map(Some);
    }
    if let Some(saved) = saved {
        let count = saved.stages.len();
        return saved
            .stages
            .into_iter()
            .nth(rank - 1)
            .map(|saved| Some(saved.stage))
            .ok_or_else(|| Failure::Usage(format!("{count} stages are saved, there is no rank {rank}")));
    }
    let options =
        Options { top: rank, distinct: Distinct::Triple, threads: usize::from(command.common.threads), progress: None };
    let picks = shortlist(rail, parts, &options).picks;
    let count = picks.len();
    match picks.into_iter().nth(rank - 1) {
        Some(pick) => Ok(Some(pick.stage)),
        None if count == 0 => Ok(None),
        None => Err(Failure::Usage(format!("the shortlist holds {count} stages, there is no rank {rank}"))),
    }
}
