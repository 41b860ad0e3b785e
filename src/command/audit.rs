//! `wattsieve audit`

use super::args::AuditArgs;
use super::failure::Failure;
use super::{Done, input, output};
use crate::show::{self, Format};

pub(super) fn run(command: &AuditArgs) -> Result<Done, Failure> {
    let read = input::catalogs(command.common.catalogs.as_deref(), &command.common, false);
    if read.machine_failed {
        return Err(Failure::MachineFaults(read.faults));
    }
    let parts = &read.parts;
    let count = parts.switches.len() + parts.diodes.len() + parts.inductors.len() + parts.capacitors.len();
    let text = match command.common.format.into() {
        Format::Table => show::audit::screen(&read.faults, count),
        Format::Csv => show::csv::audit(&read.faults),
        Format::Json => show::json::text(&show::json::audit(&read.faults)),
    };
    output::write(&text, command.common.out.as_deref())?;
    Ok(match (read.faults.has_errors(), read.faults.is_empty()) {
        (true, _) => Done::BadInput,
        (false, false) => Done::NothingPasses,
        (false, true) => Done::Well,
    })
}
