//! `wattsieve starter`

use std::io::Write;

use super::Done;
use super::args::StarterArgs;
use super::failure::Failure;
use crate::demo;

pub(super) fn run(command: &StarterArgs) -> Result<Done, Failure> {
    let folder = &command.folder;
    std::fs::create_dir_all(folder)
        .map_err(|error| Failure::file("cannot make", &folder.display().to_string(), &error))?;
    let files = demo::RAILS.iter().chain(&demo::CATALOGS);
    let taken: Vec<String> = files
        .clone()
        .map(|(name, _)| folder.join(name))
        .filter(|path| path.exists())
        .map(|path| path.display().to_string())
        .collect();
    if !taken.is_empty() {
        return Err(Failure::Usage(format!("{} already there; nothing is overwritten", taken.join(", "))));
    }
    for (name, text) in files {
        let path = folder.join(name);
        let shown = path.display().to_string();
        let failed = |error: std::io::Error| Failure::file("cannot write", &shown, &error);
        let mut file = std::fs::File::create_new(&path).map_err(failed)?;
        file.write_all(text.as_bytes()).map_err(|error| {
            // Half a file would stand in the way of the next try.
            let _ = std::fs::remove_file(&path);
            failed(error)
        })?;
    }
    let shown = folder.display();
    anstream::eprintln!("wrote the demo rails and catalogs, all invented, to {shown}");
    anstream::eprintln!("next: edit {shown}/rail.toml and the catalogs, then: wattsieve shortlist {shown}/rail.toml");
    Ok(Done::Well)
}
