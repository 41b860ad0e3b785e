//! `wattsieve rail`

use super::args::RailArgs;
use super::failure::Failure;
use super::{Done, input, output};
use crate::answer::rail::understood;
use crate::show::{self, Format};

pub(super) fn run(command: &RailArgs) -> Result<Done, Failure> {
    let rail = input::rail(command.rail.as_deref())?;
    let understood = understood(&rail.name, &rail.reading);
    let text = match command.common.format.into() {
        Format::Table => show::rail::screen(&understood),
        Format::Csv => show::csv::rail(&understood),
        Format::Json => show::json::text(&show::json::rail(&understood)),
    };
    output::write(&text, command.common.out.as_deref())?;
    Ok(Done::Well)
}
