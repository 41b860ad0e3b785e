//! `wattsieve rail`

use super::args::RailArgs;
use super::failure::Failure;
use super::input::Source;
use super::{Done, output};
use crate::answer::rail::understood;
use crate::show::{self, Format};

pub(super) fn run(command: &RailArgs) -> Result<Done, Failure> {
    let source = Source::given(command.rail.as_deref(), &command.common)?;
    let understood = understood(&source.name, &source.rail().map_err(Failure::Input)?);
    let text = match command.common.format.into() {
        Format::Table => show::rail::screen(&understood),
        Format::Csv => show::csv::rail(&understood),
        Format::Json => show::json::text(&show::json::rail(&understood)),
    };
    output::write(&text, command.common.out.as_deref())?;
    Ok(Done::Well)
}
